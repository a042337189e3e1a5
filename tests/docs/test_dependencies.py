"""Every package that safeamp asks for is named with its reason, and no other."""

import re
import tomllib

from tests.docs.documents import DEVELOPERS, TREE, read, rows, section

PROJECT = tomllib.loads(read(TREE / "pyproject.toml"))["project"]
TEXT = section(read(DEVELOPERS), "Dependencies, each with its reason")


def names(requirements: list[str]) -> list[str]:
    return [re.match(r"[\w-]+", requirement)[0] for requirement in requirements]


def test_every_package_has_its_reason() -> None:
    assert {row[0] for row in rows(TEXT)} == set(names(PROJECT["dependencies"]))
    assert all(len(row[1].split()) > 3 for row in rows(TEXT))


def test_every_package_of_the_tests_is_named() -> None:
    below = TEXT.partition("For the tests:")[2]
    missing = [name for name in names(PROJECT["optional-dependencies"]["test"]) if name not in below]
    assert missing == []
