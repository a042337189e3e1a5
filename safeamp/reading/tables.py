"""A CSV with its units in the head, read whole or refused whole: every complaint at once, each with its line."""

from __future__ import annotations

import csv
import re
from collections.abc import Iterator, Mapping
from dataclasses import dataclass, field
from pathlib import Path

from safeamp.complaints import Complaint
from safeamp.limits import nearest
from safeamp.quantities import Kind, read, show

LARGEST = 16 * 2**20
#: From so many complaints on the rest is counted.
LISTED = 50

_CELL = r"(?P<name>[^\[\]]*)\[(?P<unit>[^\[\]]*)\]\s*"
_NUMBER = r"[+-]?(?:[0-9]+(?:\.[0-9]*)?|\.[0-9]+)(?:[eE][+-]?[0-9]{1,3})?"

#: A line of a table: its number in the file, and the value of each column that the head has.
Row = tuple[int, dict[str, float]]


@dataclass(frozen=True)
class Column:
    """A column: its kind, what is believed of its values, in the unit of the kind, and the units it is written in."""

    kind: Kind
    believable: tuple[float, float]
    units: tuple[str, ...] = ()
    optional: bool = False

    @property
    def spellings(self) -> tuple[str, ...]:
        """The units that are read here: all of the kind where none are named."""
        return self.units or tuple(self.kind.spellings)


@dataclass(frozen=True)
class Form:
    """What a table holds, and how people call it.

    Parameters
    ----------
    name, rows : str
        What the whole is called, and what its lines are: "curve" and "points".
    columns : mapping of str to Column
        By name; the values of the first one rise from line to line.
    head : str
        The head as a user should write it.
    least, most : int
        Lines that are needed, and that are read.
    """

    name: str
    rows: str
    columns: Mapping[str, Column]
    head: str
    least: int
    most: int

    @property
    def rising(self) -> str:
        """The column whose values rise."""
        return next(iter(self.columns))


@dataclass
class _File:
    """One file while it is read: complaints by line, and how its columns are written."""

    path: str
    form: Form
    complaints: list[Complaint] = field(default_factory=list)
    factors: list[tuple[str, float]] = field(default_factory=list)

    def complain(self, line: int | None, text: str) -> None:
        """Add a complaint about a line."""
        plain = "".join(sign if sign.isprintable() else "\ufffd" for sign in text)
        self.complaints.append(Complaint(self.path, line, "", plain))

    def listed(self) -> list[Complaint]:
        """Return the complaints, the last of too many a count of those left out."""
        more = len(self.complaints) - LISTED
        if more <= 1:
            return self.complaints
        rest = Complaint(self.path, None, "", f"{more} more lines like these; put them right and read again")
        return [*self.complaints[:LISTED], rest]


def read_table(path: Path, form: Form) -> tuple[list[Row], list[Complaint]]:
    """Return the lines of a file, and every complaint about it; where there is one, the lines are not to be used.

    Parameters
    ----------
    path : Path
        The file.
    form : Form
        What it must hold.
    """
    file = _File(str(path), form)
    text = _text(path, file)
    found = _lines(text, file) if text is not None else []
    return found, file.listed()


def _text(path: Path, file: _File) -> str | None:
    try:
        with path.open("rb") as opened:
            content = opened.read(LARGEST + 1)
    except OSError as trouble:
        file.complain(None, f"cannot be read: {trouble.strerror or trouble}")
        return None
    if len(content) > LARGEST:
        file.complain(None, f"is larger than 16 MiB; that is more than a {file.form.name} can need")
        return None
    try:
        return content.decode("utf-8-sig")  # an editor's byte order mark is no part of the text
    except UnicodeDecodeError:
        file.complain(None, "is not a UTF-8 text; save it again as CSV in UTF-8")
        return None


def _lines(text: str, file: _File) -> list[Row]:
    form, rows = file.form, _rows(text, file)
    line, head = next(rows, (None, []))
    if line is None:
        if not file.complaints:
            file.complain(
                None,
                f"is empty; write the head {form.head} and a line for each {form.rows.removesuffix('s')}",
            )
        return []
    _read_head(file, line, head)
    if file.complaints:
        return []
    found: list[Row] = []
    for line, cells in rows:
        values = _values(file, line, cells)
        if values is not None:
            _in_order(file, line, found, values)
            found.append((line, values))
        if len(found) > form.most:
            file.complain(line, f"the {form.name} has more than {form.most} {form.rows}; leave some out")
            return []
    if len(found) < form.least and not file.complaints:
        file.complain(None, f"the {form.name} needs {form.least} {form.rows} or more")
    return found


def _rows(text: str, file: _File) -> Iterator[tuple[int, list[str]]]:
    """Yield line number and cells of each line that is not empty."""
    first = next((line for line in text.splitlines() if line.strip()), "")
    delimiter = ";" if ";" in first else ","
    reader = csv.reader(text.splitlines(), delimiter=delimiter, skipinitialspace=True, strict=True)
    try:
        for cells in reader:
            if any(cell.strip() for cell in cells):
                yield reader.line_num, [cell.strip() for cell in cells]
    except csv.Error as trouble:
        file.complain(reader.line_num, f"is not a line of a CSV ({trouble}); write plain numbers")


def _read_head(file: _File, line: int, cells: list[str]) -> None:
    head = file.form.head
    for cell in cells:
        found = re.fullmatch(_CELL, cell)
        if found is None:
            file.complain(line, f'"{cell[:40]}" is not a column with its unit; write the head {head}')
            continue
        _column(file, line, " ".join(found["name"].lower().split()), found["unit"].strip())
    if file.complaints:
        return
    names = [name for name, _ in file.factors]
    for name, column in file.form.columns.items():
        if names.count(name) > 1:
            file.complain(line, f"the column {name} stands twice; write the head {head}")
        elif name not in names and not column.optional:
            file.complain(line, f"the column {name} is missing; write the head {head}")


def _column(file: _File, line: int, name: str, unit: str) -> None:
    form = file.form
    if name not in form.columns:
        known = nearest(name, form.columns)
        file.complain(
            line, f'"{name[:40]}" is not a column of a {form.name}{known}; the columns are {form.head}'
        )
        return
    column = form.columns[name]
    spelling = unit.replace("\u2126", "Ω")
    if spelling not in column.spellings:
        units = ", ".join(column.spellings)
        file.complain(line, f'"{unit[:20]}" is not a unit of the column {name}; write one of {units}')
        return
    file.factors.append((name, read(f"1 {spelling}", column.kind).nominal))


def _values(file: _File, line: int, cells: list[str]) -> dict[str, float] | None:
    if len(cells) != len(file.factors):
        text = f"has {len(cells)} cells where the head has {len(file.factors)}"
        file.complain(line, f"{text}; write decimals after a point, and every cell")
        return None
    found = {
        name: _number(file, line, name, factor, cell)
        for (name, factor), cell in zip(file.factors, cells, strict=True)
    }
    numbers = {name: number for name, number in found.items() if number is not None}
    return numbers if len(numbers) == len(found) else None


def _number(file: _File, line: int, name: str, factor: float, cell: str) -> float | None:
    plain = cell.replace("\u2212", "-")
    if not re.fullmatch(_NUMBER, plain):
        file.complain(line, f'"{cell[:40]}" is not a number of the column {name}; write digits and a point')
        return None
    column = file.form.columns[name]
    value, (low, high) = float(plain) * factor, column.believable
    if not low <= value <= high:
        text = f"{cell[:40]} in the column {name} is not believable"
        ends = f"{show(low, column.kind)} and {show(high, column.kind)}"
        file.complain(line, f"{text}; it lies between {ends}")
        return None
    return value


def _in_order(file: _File, line: int, before: list[Row], values: dict[str, float]) -> None:
    name = file.form.rising
    if before and values[name] <= before[-1][1][name]:
        kind = file.form.columns[name].kind
        text = f"{show(values[name], kind)} does not rise above {show(before[-1][1][name], kind)}"
        file.complain(line, f"{text}; write the {file.form.rows} in order of rising {name}")
