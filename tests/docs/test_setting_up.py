"""The two commands that set safeamp up are word for word what is run before a change is taken."""

import re

from safeamp import __version__
from tests.docs.documents import DEVELOPERS, README, TREE, blocks, headings, read, section

SETUP = "python3 -m venv .venv && .venv/bin/pip install "
RUN = f"{SETUP}. && .venv/bin/safeamp demo\n"
TESTS = f'{SETUP}-e ".[test]" && .venv/bin/python -m pytest\n'


def normalized(script: str) -> str:
    """Return the lines of a script with its interpreters and folders by their plain names."""
    plain = re.sub(r'"?\$work/\w+/bin/?"?(\w+)"?|"\$bin/(\w+)"', lambda m: m[1] or m[2], script)
    plain = re.sub(r'"\$python"', "python3", plain)
    return plain.replace(" --quiet", "").replace('"', "")


def test_both_commands_are_fenced_each_alone() -> None:
    found = [block.text for block in blocks(section(read(README), "Set up"))]
    assert found == [RUN, TESTS]


def test_developers_read_the_same_command() -> None:
    assert TESTS in [block.text for block in blocks(read(DEVELOPERS))]


def test_what_is_run_before_a_change_runs_their_parts() -> None:
    script = normalized(read(TREE / ".ci" / "run"))
    parts = [part.replace(".venv/bin/", "").replace('"', "") for part in TESTS.strip().split(" && ")]
    assert parts[0] == "python3 -m venv .venv"
    assert re.search(r"^python3 -m venv \$work/test$", script, re.MULTILINE)
    for part in parts[1:]:
        assert re.search(rf"^{re.escape(part)}(?=\s|$)", script, re.MULTILINE), part
    assert re.search(r"^safeamp demo >", script, re.MULTILINE)


def test_the_changelog_stands_last_and_begins_with_this_version() -> None:
    titles = headings(read(README))
    second = [words for level, words in titles if level == 2]
    assert second[-1] == "Changelog"
    versions = [words for level, words in titles[titles.index((2, "Changelog")) + 1 :] if level == 3]
    assert versions[0].split()[0] == __version__
    assert titles[0] == (1, "safeamp")
