"""Results to stdout or whole into a file, troubles to stderr."""

from __future__ import annotations

import codecs
import io
import os
import shutil
import sys
from collections.abc import Iterable, Iterator
from contextlib import contextmanager, suppress
from itertools import groupby
from pathlib import Path
from typing import NoReturn

import typer

from safeamp.complaints import Complaint, ReadingError

WRONG = 2
_SPELT = str.maketrans({"µ": "u", "Ω": "ohm", "°": "deg", "±": "+/-", "−": "-", "²": "2", "·": "*"})


def _spell_out(trouble: UnicodeError) -> tuple[str, int]:
    """Replace what a terminal's encoding lacks: a dropped µ would turn microfarads into farads."""
    if not isinstance(trouble, UnicodeEncodeError):
        raise trouble
    text = trouble.object[trouble.start : trouble.end].translate(_SPELT)
    return text.encode("ascii", "backslashreplace").decode("ascii"), trouble.end


def prepare_streams() -> None:
    """Let no letter break the output, whatever the encoding of the terminal."""
    codecs.register_error("safeamp", _spell_out)
    for stream in (sys.stdout, sys.stderr):
        if isinstance(stream, io.TextIOWrapper):
            stream.reconfigure(errors="safeamp")


def fail(text: str) -> NoReturn:
    """Print what is wrong with the call and end with the status for wrong input."""
    sys.stderr.write(f"safeamp: {text}\n")
    raise typer.Exit(WRONG)


def note(text: str) -> None:
    """Print on stderr what the result leaves out."""
    sys.stderr.write(f"safeamp: {text}\n")


@contextmanager
def complaining() -> Iterator[None]:
    """Turn what reading complains of into lines on stderr and the status for wrong input."""
    try:
        yield
    except ReadingError as trouble:
        sys.stderr.write(complaints_text(trouble.complaints))
        raise typer.Exit(WRONG) from None


def complaints_text(complaints: Iterable[Complaint]) -> str:
    """Return every complaint, file by file, each with its line and key."""
    lines = []
    for path, group in groupby(complaints, key=lambda complaint: complaint.path):
        found = list(group)
        lines.append(f"{path}: {len(found)} problem{'s' if len(found) > 1 else ''}")
        lines += [f"  {_place(complaint)}{complaint.text}" for complaint in found]
    return "\n".join(lines) + "\n"


def _place(complaint: Complaint) -> str:
    line = "" if complaint.line is None else f"line {complaint.line}"
    key = f"{complaint.key}: " if complaint.key else ""
    return f"{line:<8} {key}" if line else key


def columns() -> int:
    """Return the width to print at: 80, or that of the terminal up to 100."""
    return min(max(shutil.get_terminal_size((80, 24)).columns, 80), 100) if sys.stdout.isatty() else 80


def colourful() -> bool:
    """Return whether colour may be used: on a terminal that nobody has asked to be plain."""
    plain = os.environ.get("NO_COLOR") or os.environ.get("TERM") == "dumb"
    return sys.stdout.isatty() and not plain


def emit(text: str, output: Path | None = None, *, never: Iterable[Path] = ()) -> None:
    """Write a result to stdout, or whole into a file that is none of the files in `never`."""
    if output is None:
        _print(text)
    else:
        check_output(output, never)
        _write(text, output)


def _print(text: str) -> None:
    try:
        sys.stdout.write(text)
        sys.stdout.flush()
    except OSError as trouble:
        # What is left in the buffer must not break out again when the interpreter ends.
        with suppress(OSError, ValueError):
            os.dup2(os.open(os.devnull, os.O_WRONLY), sys.stdout.fileno())
        if not isinstance(trouble, BrokenPipeError):
            fail(f"the result could not be written: {trouble.strerror}")


def check_output(output: Path, never: Iterable[Path] = ()) -> None:
    """End with the status for wrong input where a result must not or cannot be written."""
    for path in never:
        if path.exists() and output.exists() and output.samefile(path):
            fail(f"--output {output} is a file that is read; write the result into another one")
    if output.exists() and not output.is_file():
        fail(f"--output {output} is not a file; name a file to write into")
    if not output.parent.is_dir():
        fail(f"--output {output}: there is no folder {output.parent}")


def _write(text: str, output: Path) -> None:
    partial = output.with_name(f".{output.name}.{os.getpid()}.part")
    try:
        partial.write_text(text, encoding="utf-8", newline="\n")
        partial.replace(output)
    except OSError as trouble:
        partial.unlink(missing_ok=True)
        fail(f"--output {output}: {trouble.strerror}")
