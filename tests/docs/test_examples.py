"""What README shows is what the program prints: sheets, commands, answers and Python are run as they stand."""

import re
import shlex
from pathlib import Path

import pytest
from typer.testing import CliRunner

from safeamp.cli.app import app
from tests.docs.documents import README, blocks, read

TEXT = read(README)
SHOWN = blocks(TEXT, "console")
PYTHON = blocks(TEXT, "python")
GAP = "..."


def prepare(folder: Path, line: int) -> None:
    """Write every named file of README as it stands above a line, changes applied."""
    for block in blocks(TEXT):
        if not block.name or block.line >= line:
            continue
        path = folder / block.name
        text = (
            change(path.read_text(encoding="utf-8"), block.text) if block.language == "diff" else block.text
        )
        path.write_text(text, encoding="utf-8")


def change(text: str, lines: str) -> str:
    """Return a text with each line behind a minus replaced by the ones behind a plus that follow it."""
    pairs = re.findall(r"(?m)^-(.*)\n((?:\+.*\n)+)", lines)
    assert "".join(f"-{old}\n{new}" for old, new in pairs) == lines
    for old, new in pairs:
        assert text.count(f"{old}\n") == 1, old
        text = text.replace(f"{old}\n", re.sub(r"(?m)^\+", "", new))
    return text


@pytest.fixture
def bench(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> Path:
    """A folder of its own, in which commands are run."""
    monkeypatch.chdir(tmp_path)
    return tmp_path


def calls(text: str) -> list[tuple[str, list[str]]]:
    """Return each command of a block with the lines that it is said to print."""
    found: list[tuple[str, list[str]]] = []
    for line in text.splitlines():
        if line.startswith("$ "):
            found.append((line[2:], []))
        else:
            found[-1][1].append(line)
    return [(command.replace(" \\", ""), lines) for command, lines in joined(found)]


def joined(found: list[tuple[str, list[str]]]) -> list[tuple[str, list[str]]]:
    """Return the commands with their continued lines taken from what they print."""
    whole = []
    for first, printed in found:
        command, rest = first, list(printed)
        while command.endswith("\\"):
            command = f"{command} {rest.pop(0).strip()}"
        whole.append((command, rest))
    return whole


def run(command: str) -> tuple[str, int]:
    """Return what a command prints and its exit status."""
    line, _, target = command.partition(" > ")
    words = shlex.split(line)
    assert words[0] == "safeamp", command
    result = CliRunner().invoke(app, words[1:])
    assert result.exception is None or isinstance(result.exception, SystemExit), result.exception
    if target:
        Path(target.strip()).write_text(result.stdout, encoding="utf-8")
        return "", result.exit_code
    return result.output, result.exit_code


def assert_shown(printed: list[str], shown: list[str]) -> None:
    """Assert that the lines shown are all that is printed, but for lines of three dots, which skip some."""
    place, free = 0, False
    for line in [*shown, None]:
        if line == GAP:
            free = True
            continue
        found = len(printed) if line is None else next_line(printed, line, place)
        assert free or found == place, f"not printed here: {line or 'the end'}"
        place, free = found + 1, False


def spaced(lines: list[str]) -> list[str]:
    """Return lines with single blanks: how columns are set is no promise."""
    return [" ".join(line.split()) for line in lines]


def next_line(printed: list[str], line: str, place: int) -> int:
    """Return where a line is printed next."""
    assert line in printed[place:], f"not printed: {line}"
    return printed.index(line, place)


@pytest.mark.parametrize("block", SHOWN, ids=lambda block: f"line {block.line}")
def test_commands_print_what_is_shown(bench: Path, block) -> None:
    prepare(bench, block.line)
    status = None
    for command, shown in calls(block.text):
        if command == "echo $?":
            assert shown == [str(status)]
            continue
        printed, status = run(command)
        if shown:
            assert_shown(spaced(printed.splitlines()), spaced(shown))


@pytest.mark.parametrize("block", PYTHON, ids=lambda block: f"line {block.line}")
def test_python_runs(bench: Path, block, capsys: pytest.CaptureFixture[str]) -> None:
    prepare(bench, block.line)
    exec(compile(block.text, "README.md", "exec"), {"__name__": "readme"})
    promised = re.findall(r"(?m)^print\(.*?\)  # (.*)$", block.text)
    assert promised
    assert capsys.readouterr().out.splitlines() == promised


def test_a_line_that_is_not_printed_is_noticed() -> None:
    printed = ["one", "two", "three", "four"]
    for right in (printed, ["one", GAP, "three", "four"], [GAP, "two", GAP], [GAP]):
        assert_shown(printed, right)
    for wrong in (
        ["two", GAP],
        ["one", "three", GAP],
        [GAP, "four", "three"],
        ["one", GAP, "five"],
        ["one", "two"],
    ):
        with pytest.raises(AssertionError, match="not printed"):
            assert_shown(printed, wrong)


def test_a_change_replaces_whole_lines_that_are_there() -> None:
    assert change("a = 1\nb = 2\n", "-b = 2\n+b = 3\n") == "a = 1\nb = 3\n"
    assert change("a = 1\nb = 2\n", "-a = 1\n+a = 1\n+\n+c = 3\n") == "a = 1\n\nc = 3\nb = 2\n"
    with pytest.raises(AssertionError, match="-b = 2"):
        change("a = 1\nb = 2\n", "-b = 2\n")
    with pytest.raises(AssertionError, match="c = 1"):
        change("a = 1\n", "-c = 1\n+c = 2\n")
