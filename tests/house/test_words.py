"""The project speaks of the project alone: no place on a machine, no file that nobody else has, nothing left to do."""

import re
from pathlib import Path

import pytest

from tests.house.source import TREE

SUFFIXES = {".py", ".toml", ".md", ".txt", ".j2", ".html", ".css", ".csv", ".json"}
ROOMS = ("safeamp", "tests", "limits", ".ci")
FORBIDDEN = {
    "a place on a machine": r"(?<![\w.$}])/(?:home|mnt|opt|root|srv|tmp|Users|work)/\w",
    "a drive of a machine": r"\b[A-Z]:\\\\?\w",
    "a note to oneself": r"\b(?:TODO|FIXME|XXX|HACK)\b",
}


def texts() -> list[Path]:
    """Return every text of the tree but this one, which has to name what it looks for."""
    found = [path for room in ROOMS for path in (TREE / room).rglob("*") if path.is_file()]
    kept = {path for path in found if path.suffix in SUFFIXES or path.parent.name == ".ci"}
    return sorted((kept | {*TREE.glob("*.md"), TREE / "pyproject.toml"}) - {Path(__file__).resolve()})


def lines() -> list[tuple[str, str]]:
    """Return every line with its place."""
    return [
        (f"{path.relative_to(TREE).as_posix()}:{number}", line)
        for path in texts()
        for number, line in enumerate(path.read_text(encoding="utf-8").splitlines(), 1)
    ]


@pytest.mark.parametrize("what", FORBIDDEN)
def test_nothing_forbidden_is_written(what):
    assert [(place, line) for place, line in lines() if re.search(FORBIDDEN[what], line)] == []


def test_every_document_that_is_named_is_there():
    named = {(word, place) for place, line in lines() for word in re.findall(r"\b[A-Z][\w-]*\.md\b", line)}
    missing = {(word, place) for word, place in named if not (TREE / word).is_file()}
    assert missing == set()
    assert {word for word, _ in named} >= {"README.md", "DEVELOPERS.md"}


def test_all_that_is_written_is_looked_at():
    names = {path.relative_to(TREE).as_posix() for path in texts()}
    assert names >= {
        "README.md",
        "DEVELOPERS.md",
        ".ci/run",
        "limits/heat.toml",
        "safeamp/quantities/units.txt",
    }


@pytest.mark.parametrize(
    ("what", "line"),
    [
        ("a place on a machine", "open('/home/me/amp.toml')"),
        ("a drive of a machine", r"open('C:\amps')"),
        ("a note to oneself", "# TODO: later"),
    ],
)
def test_each_is_noticed(what, line):
    assert re.search(FORBIDDEN[what], line)
    assert not re.search(FORBIDDEN[what], "half of the work/rest, K/W, $work/dist, a to-do list")
