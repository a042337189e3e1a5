"""From a key of a TOML text to its line, which the standard parser does not tell."""

import re
import tomllib
from bisect import bisect_right
from collections.abc import Mapping
from typing import Any

Path = tuple[str | int, ...]

_BLANK = re.compile(r"(?:[ \t\r\n]|#[^\n]*)*")
_BASIC = r'"(?:[^"\\\n]|\\.)*"'
_LITERAL = r"'[^'\n]*'"
_KEY = re.compile(rf"(?:{_BASIC}|{_LITERAL}|[A-Za-z0-9_-]+|[ \t]*\.[ \t]*)+")
# A multi-line text may end in up to two more quotes of its own.
_TEXT = re.compile(
    rf'"""(?:[^\\]|\\.)*?"""(?:"{{0,2}})|\'\'\'.*?\'\'\'(?:\'{{0,2}})|{_BASIC}|{_LITERAL}', re.DOTALL
)
_PLAIN = re.compile(r"[^,\]}\n#]+")


def line_index(text: str) -> dict[Path, int]:
    """Return the line, counted from 1, of every table, key and array element of a valid TOML text.

    Parameters
    ----------
    text : str
        What `tomllib.loads` accepts; the result is meaningless for anything else.

    Returns
    -------
    dict
        Path of keys and, inside arrays, positions from 0; the first line where the path appears.
    """
    return _Walk(text.replace("\r\n", "\n")).document()


class _Walk:
    """One pass over the text, holding the place and what was found."""

    def __init__(self, text: str) -> None:
        self.text = text
        self.place = 0
        self.starts = [0, *(end.end() for end in re.finditer("\n", text))]
        self.found: dict[Path, int] = {}
        self.arrays: dict[Path, int] = {}

    def document(self) -> dict[Path, int]:
        table: Path = ()
        self.blank()
        while self.place < len(self.text):
            if self.text[self.place] == "[":
                table = self.header()
            else:
                self.pair(table)
            self.blank()
        return self.found

    def header(self) -> Path:
        array = self.text.startswith("[[", self.place)
        self.place += 2 if array else 1
        self.blank()
        *outer, last = self.key()
        path: Path = ()
        for part in outer:
            path = self.within(self.note((*path, part)))
        path = self.note((*path, last))
        if array:
            self.arrays[path] = self.arrays.get(path, -1) + 1
        self.blank()
        self.place += 2 if array else 1
        return self.note(self.within(path))

    def within(self, path: Path) -> Path:
        """Step into the newest element when the path is an array of tables."""
        return self.note((*path, self.arrays[path])) if path in self.arrays else path

    def pair(self, table: Path) -> None:
        path = table
        for part in self.key():
            path = self.note((*path, part))
        self.blank()
        self.place += 1  # the equals sign
        self.blank()
        self.value(path)

    def value(self, path: Path) -> None:
        first = self.text[self.place]
        if first == "[":
            self.array(path)
        elif first == "{":
            self.inline_table(path)
        else:
            self.skip(_TEXT if first in "\"'" else _PLAIN)

    def array(self, path: Path) -> None:
        self.place += 1
        position = 0
        while not self.closed("]"):
            self.value(self.note((*path, position)))
            position += 1

    def inline_table(self, path: Path) -> None:
        self.place += 1
        while not self.closed("}"):
            self.pair(path)

    def closed(self, bracket: str) -> bool:
        """Pass blanks and a comma; say whether the bracket followed, and pass it too."""
        self.blank()
        if self.text[self.place] == ",":
            self.place += 1
            self.blank()
        if self.text[self.place] != bracket:
            return False
        self.place += 1
        return True

    def key(self) -> list[str]:
        raw = self.skip(_KEY)
        if '"' not in raw and "'" not in raw:
            return [part.strip() for part in raw.split(".")]
        parts: list[str] = []
        inner: Mapping[str, Any] | int = tomllib.loads(f"{raw} = 0")
        while isinstance(inner, Mapping):
            [(part, inner)] = inner.items()
            parts.append(part)
        return parts

    def blank(self) -> None:
        self.skip(_BLANK)

    def skip(self, pattern: re.Pattern[str]) -> str:
        match = pattern.match(self.text, self.place)
        if match is None:
            raise ValueError(f"not TOML at line {self.line()}")
        self.place = match.end()
        return match.group()

    def note(self, path: Path) -> Path:
        self.found.setdefault(path, self.line())
        return path

    def line(self) -> int:
        return bisect_right(self.starts, self.place)
