"""The command `powerup`: the card for the first power-up."""

from __future__ import annotations

from enum import StrEnum
from pathlib import Path
from typing import TYPE_CHECKING, Annotated

import typer

from safeamp.cli.files import FilesRead
from safeamp.cli.options import DeviceFolderOption, LimitsOption, OutputOption, SheetArgument
from safeamp.cli.output import check_output, colourful, columns, complaining, emit, fail
from safeamp.complaints import ReadingError

if TYPE_CHECKING:
    from safeamp.amplifier import Sheet
    from safeamp.answers import PowerUp
    from safeamp.limits import Limits

LIMITER = "readings.limiter"


class Form(StrEnum):
    """How the card is printed."""

    TEXT = "text"
    JSON = "json"
    MARKDOWN = "markdown"


def powerup(
    sheet: SheetArgument,
    limiter: Annotated[
        str | None,
        typer.Option("--limiter", help='"60 W lamp", "22 ohm" or "bench", in place of the sheet\'s.'),
    ] = None,
    format_: Annotated[Form, typer.Option("--format", help="How the card is printed.")] = Form.TEXT,
    output: OutputOption = None,
    limits: LimitsOption = None,
    device_folder: DeviceFolderOption = None,
) -> None:
    """Print the card for the first power-up: limiter, readings, when to switch off; clears nothing."""
    from safeamp.reading.limits import load_limits
    from safeamp.studies.power_up import power_up

    never = FilesRead(sheet, limits=limits, device_folder=device_folder)
    if output is not None:
        check_output(output, never)
    with complaining():
        rules = load_limits(limits)
        read = _read(sheet, limiter, rules, device_folder)
    card = power_up(read, rules)
    emit(_text(card, format_, output), output, never=never)


def _read(path: Path, limiter: str | None, limits: Limits, device_folder: Path | None) -> Sheet:
    """Return the sheet with the limiter asked for; what is wrong with that is said of the option."""
    from safeamp.reading import open_sheet

    source = open_sheet(path, device_folder=device_folder, limits=limits)
    if limiter is None:
        return source.sheet()
    try:
        return source.sheet({LIMITER: limiter})
    except ReadingError as trouble:
        others = [one for one in trouble.complaints if one.key != LIMITER]
        if others:
            raise
        fail(f"--limiter: {trouble.complaints[0].text}")


def _text(card: PowerUp, form: Form, output: Path | None) -> str:
    from safeamp.report import power_up as report

    if form is Form.JSON:
        return report.power_up_json(card)
    if form is Form.MARKDOWN:
        return report.power_up_markdown(card)
    if output is not None:
        return report.render_power_up(card)
    return report.render_power_up(card, width=columns(), colour=colourful())
