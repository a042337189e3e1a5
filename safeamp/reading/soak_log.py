"""The log of a soak: a table of time and heatsink and, where they were read, air and heat put in."""

from __future__ import annotations

from pathlib import Path

from safeamp.amplifier import SoakLog
from safeamp.complaints import ReadingError
from safeamp.quantities import POWER, TEMPERATURE, TIME
from safeamp.reading.tables import Column, Form, Row, read_table

_CELSIUS = ("degC", "°C")
#: Up to a week; three readings are the fewest that three unknowns can be found from, and a thousand say it all.
SOAK = Form(
    name="log",
    rows="readings",
    columns={
        "time": Column(TIME, (0.0, 7.0 * 86400.0), ("s", "min", "h")),
        "heatsink": Column(TEMPERATURE, (-20.0, 300.0), _CELSIUS),
        "air": Column(TEMPERATURE, (-20.0, 100.0), _CELSIUS, optional=True),
        "power": Column(POWER, (1e-3, 20e3), optional=True),
    },
    head="time [min], heatsink [degC] and, where read, air [degC], power [W]",
    least=3,
    most=1000,
)


def read_soak_log(path: Path) -> SoakLog:
    """Return the readings of a file.

    Raises
    ------
    ReadingError
        With every complaint, each with its line.
    """
    rows, complaints = read_table(path, SOAK)
    if complaints:
        raise ReadingError(tuple(complaints))
    return SoakLog(
        time=_column(rows, "time") or (),
        sink=_column(rows, "heatsink") or (),
        air=_column(rows, "air"),
        power=_column(rows, "power"),
        text=str(path),
    )


def _column(rows: list[Row], name: str) -> tuple[float, ...] | None:
    if name not in rows[0][1]:
        return None
    return tuple(values[name] for _, values in rows)
