"""What only a process of its own can show: what is imported, pipes, encodings, exit status."""

import os
import re
import subprocess
import sys
from pathlib import Path

import pytest

from tests.cli.test_commands import HEALTHY, OLD_MAINS

HEAVY = ("numpy", "scipy", "pandas", "matplotlib", "pint", "rich", "jinja2")
IMPORTED = """
import sys
from safeamp.cli import main
try:
    main()
except SystemExit as ended:
    status = ended.code
print(status, *sorted(sys.modules), file=sys.stderr)
"""


def process(*words: object, code: str | None = None, **environment: str) -> subprocess.CompletedProcess[str]:
    start = ["-m", "safeamp"] if code is None else ["-c", code]
    root = Path(__file__).parents[2]
    inherited = {name: value for name, value in os.environ.items() if name not in ("NO_COLOR", "COLUMNS")}
    return subprocess.run(
        [sys.executable, *start, *map(str, words)],
        capture_output=True,
        text=True,
        encoding="utf-8",
        cwd=root,
        env={**inherited, "PYTHONPATH": str(root), "PYTHONIOENCODING": "utf-8", **environment},
        check=False,
    )


def imported_by(*words: object) -> set[str]:
    return set(process(*words, code=IMPORTED).stderr.split())


@pytest.mark.parametrize("words", [("--help",), ("check", "--help"), ("new", "--help"), ("--version",)])
def test_help_imports_nothing_heavy(words: tuple[str, ...]) -> None:
    found = imported_by(*words)
    assert "typer" in found
    assert found.isdisjoint(HEAVY)


def heavy(found: set[str]) -> set[str]:
    """Return what was imported without need; pint looks for numpy."""
    return {"scipy", "pandas", "matplotlib", "rich", "jinja2"} & found


@pytest.mark.parametrize("words", [("keys",), ("new", "mosfet")])
def test_lists_import_no_numbers(words: tuple[str, ...]) -> None:
    found = imported_by(*words)
    assert "safeamp.report" in found
    assert found.isdisjoint(HEAVY)


@pytest.mark.parametrize(
    "words", [("check", HEALTHY), ("demo",), ("demo", "--format", "json"), ("limits",), ("devices",)]
)
def test_check_imports_nothing_that_it_does_not_use(words: tuple[object, ...]) -> None:
    found = imported_by(*words)
    assert "safeamp.report" in found
    assert heavy(found) == set()


def test_threads_of_the_matrix_library_are_held_at_one_unless_said() -> None:
    code = "import os; from safeamp.cli import main\ntry: main()\nfinally: print(os.environ['OPENBLAS_NUM_THREADS'])"
    assert process("--version", code=code, OPENBLAS_NUM_THREADS="3").stdout.endswith("\n3\n")
    bare = code.replace("import os;", "import os; os.environ.pop('OPENBLAS_NUM_THREADS', None);")
    assert process("--version", code=bare).stdout.endswith("\n1\n")


@pytest.mark.parametrize(
    ("words", "status"),
    [
        (("check", OLD_MAINS), 5),
        (("check", HEALTHY, "--step", "cold-checks"), 0),
        (("check", "nowhere.toml"), 2),
        (("check",), 2),
        (("demo",), 0),
        (("--help",), 0),
    ],
)
def test_exit_status(words: tuple[object, ...], status: int) -> None:
    result = process(*words)
    assert result.returncode == status
    assert "Traceback" not in result.stderr
    assert (result.stderr == "") == (status != 2)


def test_no_colour_into_a_pipe_and_no_line_too_long() -> None:
    text = process("check", OLD_MAINS, COLUMNS="200", TERM="xterm").stdout
    assert "\x1b" not in text
    assert max(map(len, text.splitlines())) <= 80
    assert re.search(r"(?m)^STOP for ", text)


@pytest.mark.parametrize("words", [("check", OLD_MAINS), ("demo", "--format", "json"), ("keys",)])
def test_a_terminal_without_our_letters_gets_the_words(words: tuple[object, ...]) -> None:
    result = process(*words, PYTHONIOENCODING="ascii")
    assert result.stdout.isascii()
    assert "Traceback" not in result.stderr
    assert result.returncode == process(*words).returncode


@pytest.mark.skipif(os.name != "posix", reason="needs a shell with pipes")
def test_a_broken_pipe_is_quiet_and_keeps_the_verdict() -> None:
    line = f'"{sys.executable}" -m safeamp check "{OLD_MAINS}" | true; echo "${{PIPESTATUS[0]}}"'
    result = subprocess.run(
        ["bash", "-c", line], capture_output=True, text=True, cwd=Path(__file__).parents[2], check=False
    )
    assert result.stdout == "5\n"
    assert result.stderr == ""


@pytest.mark.skipif(not Path("/dev/full").exists(), reason="needs a device that takes nothing")
def test_a_full_disk_is_said_without_traceback() -> None:
    line = f'"{sys.executable}" -m safeamp demo > /dev/full'
    result = subprocess.run(
        ["bash", "-c", line], capture_output=True, text=True, cwd=Path(__file__).parents[2], check=False
    )
    assert result.returncode == 2
    assert result.stderr == "safeamp: the result could not be written: No space left on device\n"


def test_the_package_alone_costs_nothing() -> None:
    code = "import safeamp, sys; print(*sorted({name.partition('.')[0] for name in sys.modules}))"
    assert set(process(code=code).stdout.split()).isdisjoint({*HEAVY, "typer"})
