"""README names every command and option that exists, and none that does not."""

import re

import pytest

from safeamp.cli.output import WRONG
from safeamp.findings import Step, Verdict
from safeamp.report.starter_values import STARTERS
from tests.docs.documents import README, blocks, prose, read, rows, section
from tests.docs.surface import all_options, arguments, commands, options

TEXT = read(README)
TABLE = {row[0].strip("`").split()[1]: row for row in rows(section(TEXT, "Commands"))}
OPTION = re.compile(r"(?<![\w-])--[a-z][a-z0-9-]*")


def test_every_command_has_its_row_and_every_row_its_command() -> None:
    assert set(TABLE) == set(commands())


@pytest.mark.parametrize("name", sorted(commands()))
def test_a_row_names_arguments_and_options_of_its_command(name: str) -> None:
    words = TABLE[name][0].strip("`").split()
    command = commands()[name]
    assert words[0] == "safeamp"
    assert [word.strip("[]").lower() for word in words[2:]] == arguments(command)
    assert set(OPTION.findall(TABLE[name][2])) == options(command)
    assert TABLE[name][1].endswith((".", "?"))


def test_every_option_that_is_named_exists() -> None:
    assert set(OPTION.findall(TEXT)) <= all_options()


def test_every_command_that_is_named_exists() -> None:
    shown = "\n".join(block.text for block in blocks(TEXT)) + "".join(re.findall(r"`[^`]+`", prose(TEXT)))
    named = set(re.findall(r"(?:^|[\s`/])safeamp ([a-z]+)\b", shown))
    assert named >= {"check", "demo", "new"}
    assert named <= set(commands())


def test_every_exit_status_has_its_meaning() -> None:
    found = {int(status.strip("`")): meaning for status, meaning in rows(section(TEXT, "Exit status"))}
    assert set(found) == {verdict.exit_status for verdict in Verdict} | {WRONG, 1}
    for verdict in Verdict:
        assert found[verdict.exit_status].startswith(f"`{verdict.word}`")
    assert "wrong input" in found[WRONG]
    assert "crash" in found[1]


def test_the_four_words_in_their_order() -> None:
    found = [word.strip("`") for word, _ in rows(section(TEXT, "Four words"))]
    assert found == [verdict.word for verdict in sorted(Verdict)]


def test_the_seven_steps_in_their_order() -> None:
    found = [row[1].strip("`") for row in rows(section(TEXT, "Seven steps"))]
    assert found == [step.value for step in Step]


def test_every_starter_is_named() -> None:
    named = set(re.findall(r"`([a-z-]+)`", section(TEXT, "Write a sheet of your own")))
    assert set(STARTERS) <= named
