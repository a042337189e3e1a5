"""Whole reports, word for word, against those that somebody has read."""

import difflib

import pytest

from tests.report.record import FOLDER, FORMS, NAMES, path, report

CASES = [(name, form) for name in NAMES for form in FORMS]
HOW = "read the difference; if it is meant, run python -m tests.reports"


@pytest.mark.parametrize(("name", "form"), CASES)
def test_a_report_is_as_it_was_recorded(name, form):
    kept, found = path(name, form).read_text(encoding="utf-8"), FORMS[form](report(name))
    difference = list(
        difflib.unified_diff(kept.splitlines(), found.splitlines(), "recorded", "found", lineterm="", n=0)
    )
    assert not difference, "\n".join([HOW, *difference[:40]])


def test_every_recorded_report_is_compared():
    assert {one.name for one in FOLDER.iterdir()} == {path(*case).name for case in CASES}
