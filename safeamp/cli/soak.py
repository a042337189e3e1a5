"""The quick command for the soak of a heatsink."""

from __future__ import annotations

from pathlib import Path
from typing import TYPE_CHECKING, Annotated

import typer

from safeamp.cli.options import LimitsOption
from safeamp.cli.quick import Format, FormatOption, run_beside

if TYPE_CHECKING:
    from safeamp.amplifier import SoakLog
    from safeamp.answers import QuickAnswer
    from safeamp.studies.quick.desk import Desk

Log = Annotated[
    Path,
    typer.Argument(
        help="Readings while it warms up, a CSV: time [min], heatsink [degC], and if read air [degC], power [W]."
    ),
]
Air = Annotated[
    str | None, typer.Option(help='Air at the heatsink, such as "24 degC", without such a column.')
]
Power = Annotated[
    str | None, typer.Option(help='Mean heat put into the heatsink, such as "18 W", without such a column.')
]
ReadingError = Annotated[
    str | None, typer.Option(help='Standard error of one reading; "1 K" is assumed when left out.')
]


def soak(
    log: Log,
    air: Air = None,
    power: Power = None,
    reading_error: ReadingError = None,
    format_: FormatOption = Format.TEXT,
    limits: LimitsOption = None,
) -> None:
    """Say where a heatsink settles, and its K/W, from a few readings while it warms up."""

    def read() -> SoakLog:
        from safeamp.reading.soak_log import read_soak_log

        return read_soak_log(log)

    def study(desk: Desk, found: SoakLog) -> QuickAnswer:
        from safeamp.studies.quick.soak import soak_answer

        return soak_answer(desk, found)

    options = {"air": air, "power": power, "reading_error": reading_error}
    run_beside("soak", options, read, study, format_, limits)
