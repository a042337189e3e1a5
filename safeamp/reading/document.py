"""One TOML file as it was written: its data, and the line of each key for complaints."""

import re
import tomllib
from dataclasses import dataclass
from functools import cached_property
from hashlib import sha256
from pathlib import Path
from typing import Any

from safeamp.complaints import Complaint, ReadingError

#: A sheet has a few kilobytes; far beyond that the file is something else.
LARGEST = 2**20

# Patterns of trouble only: compiled when there is some.
_AT = r"\s*\(at (?:line (\d+), column \d+|end of document)\)$"
_UNQUOTED = r"\s*(?P<key>[A-Za-z0-9_.-]+)\s*=\s*(?P<value>[-+.\d][^\"'\[\]{}#]*?)\s*(?:#.*)?"
_IN_QUOTES = 'write text and every value with a unit in quotes, such as "35 V"'


@dataclass(frozen=True)
class Document:
    """A TOML file that the parser accepted.

    Parameters
    ----------
    path : str
        As the user named it.
    text : str
        The whole file.
    data : dict
        What the standard parser made of it.
    digest : str
        SHA-256 of the bytes of the file, empty for a text without one.
    """

    path: str
    text: str
    data: dict[str, Any]
    digest: str = ""

    @cached_property
    def _lines(self) -> dict[tuple[str | int, ...], int]:
        from safeamp.reading.lines import line_index  # only for a file of which a line is asked

        return line_index(self.text)

    def line(self, *key: str | int) -> int | None:
        """Return the line of a key, or of the nearest table around it; None when neither is in the file."""
        while key and key not in self._lines:
            key = key[:-1]
        return self._lines.get(key)

    def complaint(self, text: str, *key: str | int) -> Complaint:
        """Return a complaint about one key of this file."""
        return Complaint(self.path, self.line(*key), ".".join(str(part) for part in key), text)


def read_document(path: Path) -> Document:
    """Read one TOML file.

    Raises
    ------
    ReadingError
        If the file cannot be opened, is too large, is no UTF-8 text, is empty or no TOML.
    """
    content = _bytes_of(path)
    try:
        # An editor's byte order mark is no part of the text.
        text = content.decode("utf-8-sig")
    except UnicodeDecodeError as trouble:
        raise _refusal(path, None, "is not a UTF-8 text; save it again as UTF-8") from trouble
    if "\0" in text:
        raise _refusal(path, None, "is not a text but binary data; give a text file in TOML")
    if not text.strip():
        raise _refusal(path, None, "is empty; write at least a title and the tables")
    return parse_document(text, str(path), sha256(content).hexdigest())


def _bytes_of(path: Path) -> bytes:
    try:
        if path.is_dir():
            raise _refusal(path, None, "is a folder; give a file")
        if path.exists() and not path.is_file():
            raise _refusal(path, None, "is not a regular file; give a text file in TOML")
        with path.open("rb") as file:
            content = file.read(LARGEST + 1)
    except (OSError, ValueError) as trouble:
        reason = getattr(trouble, "strerror", None) or trouble
        raise _refusal(path, None, f"cannot be read: {reason}") from trouble
    if len(content) > LARGEST:
        raise _refusal(path, None, "is larger than 1 MiB; that is more than such a file can need")
    return content


def parse_document(text: str, path: str, digest: str = "") -> Document:
    """Parse the text of one TOML file; raises ReadingError like `read_document`."""
    try:
        return Document(path, text, tomllib.loads(text), digest)
    except tomllib.TOMLDecodeError as trouble:
        where = re.search(_AT, str(trouble))
        line = int(where[1]) if where and where[1] else len(text.rstrip().split("\n"))
        what = re.sub(_AT, "" if where and where[1] else ", at the end of the file", str(trouble))
        raise _refusal(path, line, f"is not valid TOML here ({what}); {_hint(text, line)}") from trouble
    except RecursionError as trouble:
        raise _refusal(path, None, "is nested too deeply; write plain tables and lists") from trouble
    except ValueError as trouble:
        # The parser hands on what int() and datetime say of a number with thousands of digits.
        raise _refusal(path, None, f"is not valid TOML ({trouble}); {_IN_QUOTES}") from trouble


def _hint(text: str, line: int | None) -> str:
    """Return what to write instead; the commonest slip is a value with a unit and no quotes."""
    lines = text.split("\n")
    found = re.fullmatch(_UNQUOTED, lines[line - 1].rstrip("\r")) if line and line <= len(lines) else None
    return f'write the value in quotes: {found["key"]} = "{found["value"]}"' if found else _IN_QUOTES


def _refusal(path: Path | str, line: int | None, text: str) -> ReadingError:
    return ReadingError((Complaint(str(path), line, "", text),))
