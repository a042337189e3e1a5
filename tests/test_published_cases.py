"""Every value that somebody else printed is compared with, unless it is kept as background only."""

import re
from pathlib import Path

import pytest

from tests.published_cases import _CASES

TESTS = Path(__file__).parent
SOURCES = [path.read_text(encoding="utf-8") for path in TESTS.rglob("test_*.py") if path != Path(__file__)]
BINDING = {name: entry for name, entry in _CASES.items() if entry.get("use") != "background"}


def sources_of(name):
    """Return the text of all tests that name a case."""
    return "".join(text for text in SOURCES if f'"{name}"' in text)


@pytest.mark.parametrize("name", BINDING)
def test_a_printed_case_has_a_test_for_each_of_its_results(name):
    text = sources_of(name)
    assert text, f"no test names {name}"
    forgotten = [key for key in BINDING[name]["expected"] if not re.search(rf'"{re.escape(key)}"', text)]
    assert forgotten == []


def test_there_are_printed_cases_and_a_forgotten_one_would_be_seen():
    assert len(BINDING) > 40
    assert sources_of("stage-" + "0") == ""
