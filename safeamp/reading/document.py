"""One TOML file as it was written: its data, and the line of each key for complaints."""

import re
import tomllib
from dataclasses import dataclass
from functools import cached_property
from pathlib import Path
from typing import Any

from safeamp.complaints import Complaint, ReadingError
from safeamp.reading.lines import line_index

_AT = re.compile(r"\s*\(at (?:line (\d+), column \d+|end of document)\)$")


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
    """

    path: str
    text: str
    data: dict[str, Any]

    @cached_property
    def _lines(self) -> dict[tuple[str | int, ...], int]:
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
        If the file cannot be opened, is no UTF-8 text or no TOML.
    """
    try:
        # An editor's byte order mark is no part of the text.
        text = path.read_text(encoding="utf-8-sig")
    except OSError as trouble:
        raise _refusal(path, None, f"cannot be read: {trouble.strerror or trouble}") from trouble
    except UnicodeDecodeError as trouble:
        raise _refusal(path, None, "is not a UTF-8 text; save it again as UTF-8") from trouble
    return parse_document(text, str(path))


def parse_document(text: str, path: str) -> Document:
    """Parse the text of one TOML file; raises ReadingError like `read_document`."""
    try:
        return Document(path, text, tomllib.loads(text))
    except tomllib.TOMLDecodeError as trouble:
        where = _AT.search(str(trouble))
        line = int(where[1]) if where and where[1] else None
        what = _AT.sub("", str(trouble))
        hint = 'write text and every value with a unit in quotes, such as "35 V"'
        raise _refusal(path, line, f"is not valid TOML here ({what}); {hint}") from trouble


def _refusal(path: Path | str, line: int | None, text: str) -> ReadingError:
    return ReadingError((Complaint(str(path), line, "", text),))
