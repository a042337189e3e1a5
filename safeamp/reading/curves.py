"""An impedance curve beside the sheet: a CSV with its units in the head, read whole or refused whole."""

from __future__ import annotations

import csv
import re
from collections.abc import Iterator
from dataclasses import dataclass, field
from pathlib import Path

from safeamp.amplifier import Curve
from safeamp.complaints import Complaint
from safeamp.limits import nearest
from safeamp.quantities import ANGLE, FREQUENCY, RESISTANCE, Kind, read, show
from safeamp.reading.draft import Draft

#: Column -> kind, and the lowest and highest value that a loudspeaker has.
COLUMNS: dict[str, tuple[Kind, tuple[float, float]]] = {
    "frequency": (FREQUENCY, (0.1, 1e6)),
    "impedance": (RESISTANCE, (0.1, 1e5)),
    "phase": (ANGLE, (-90.0, 90.0)),
}
HEAD = "frequency [Hz], impedance [ohm], phase [deg]"
LEAST, MOST = 2, 100_000
LARGEST = 16 * 2**20
#: From so many complaints on the rest is counted.
LISTED = 50

_CELL = r"(?P<name>[^\[\]]*)\[(?P<unit>[^\[\]]*)\]\s*"
_NUMBER = r"[+-]?(?:[0-9]+(?:\.[0-9]*)?|\.[0-9]+)(?:[eE][+-]?[0-9]{1,3})?"


@dataclass
class _File:
    """One file while it is read: complaints by line, and how its columns are written."""

    path: str
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


def read_curve(path: Path, name: str, draft: Draft) -> Curve | None:
    """Return the curve of a file; None after complaints, each with its line.

    Parameters
    ----------
    path : Path
        The file.
    name : str
        As the sheet names it.
    draft : Draft
        Takes the complaints.
    """
    file = _File(str(path))
    text = _text(path, file)
    points = _points(text, file) if text is not None else []
    draft.complaints += file.listed()
    if file.complaints:
        return None
    frequencies, impedances, phases = zip(*points, strict=True)
    return Curve(frequencies, impedances, phases, name)


def _text(path: Path, file: _File) -> str | None:
    try:
        with path.open("rb") as opened:
            content = opened.read(LARGEST + 1)
    except OSError as trouble:
        file.complain(None, f"cannot be read: {trouble.strerror or trouble}")
        return None
    if len(content) > LARGEST:
        file.complain(None, "is larger than 16 MiB; that is more than a curve can need")
        return None
    try:
        return content.decode("utf-8-sig")  # an editor's byte order mark is no part of the text
    except UnicodeDecodeError:
        file.complain(None, "is not a UTF-8 text; save it again as CSV in UTF-8")
        return None


def _points(text: str, file: _File) -> list[tuple[float, ...]]:
    """Return frequency, impedance and phase of each line."""
    rows = _rows(text, file)
    line, head = next(rows, (None, []))
    if line is None:
        file.complain(None, f"is empty; write the head {HEAD} and a line for each point")
        return []
    _read_head(file, line, head)
    if file.complaints:
        return []
    points: list[tuple[float, ...]] = []
    for line, cells in rows:
        point = _point(file, line, cells)
        if point is not None:
            _in_order(file, line, points, point)
            points.append(point)
        if len(points) > MOST:
            file.complain(line, f"the curve has more than {MOST} points; leave some out")
            return []
    if len(points) < LEAST and not file.complaints:
        file.complain(None, f"the curve needs {LEAST} points or more")
    return points


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
    for cell in cells:
        found = re.fullmatch(_CELL, cell)
        if found is None:
            file.complain(line, f'"{cell[:40]}" is not a column with its unit; write the head {HEAD}')
            continue
        _column(file, line, " ".join(found["name"].lower().split()), found["unit"].strip())
    if file.complaints:
        return
    names = [name for name, _ in file.factors]
    for name in COLUMNS:
        if names.count(name) != 1:
            trouble = "is missing" if name not in names else "stands twice"
            file.complain(line, f"the column {name} {trouble}; write the head {HEAD}")


def _column(file: _File, line: int, name: str, unit: str) -> None:
    if name not in COLUMNS:
        file.complain(
            line, f'"{name[:40]}" is not a column of a curve{nearest(name, COLUMNS)}; the columns are {HEAD}'
        )
        return
    kind = COLUMNS[name][0]
    spelling = unit.replace("\u2126", "Ω")
    if spelling not in kind.spellings:
        units = ", ".join(kind.spellings)
        file.complain(line, f'"{unit[:20]}" is not a unit of the column {name}; write one of {units}')
        return
    file.factors.append((name, read(f"1 {spelling}", kind).nominal))


def _point(file: _File, line: int, cells: list[str]) -> tuple[float, ...] | None:
    if len(cells) != len(file.factors):
        text = f"has {len(cells)} cells where the head has {len(file.factors)}"
        file.complain(line, f"{text}; write decimals after a point, and every cell")
        return None
    found = {
        name: _number(file, line, name, factor, cell)
        for (name, factor), cell in zip(file.factors, cells, strict=True)
    }
    numbers = [found[name] for name in COLUMNS]
    return tuple(number for number in numbers if number is not None) if None not in numbers else None


def _number(file: _File, line: int, name: str, factor: float, cell: str) -> float | None:
    plain = cell.replace("\u2212", "-")
    if not re.fullmatch(_NUMBER, plain):
        file.complain(line, f'"{cell[:40]}" is not a number of the column {name}; write digits and a point')
        return None
    kind, (low, high) = COLUMNS[name]
    value = float(plain) * factor
    if not low <= value <= high:
        text = f"{cell[:40]} in the column {name} is not believable"
        file.complain(line, f"{text}; it lies between {show(low, kind)} and {show(high, kind)}")
        return None
    return value


def _in_order(file: _File, line: int, points: list[tuple[float, ...]], point: tuple[float, ...]) -> None:
    if points and point[0] <= points[-1][0]:
        text = f"{show(point[0], FREQUENCY)} does not rise above {show(points[-1][0], FREQUENCY)}"
        file.complain(line, f"{text}; write the points in order of rising frequency")
