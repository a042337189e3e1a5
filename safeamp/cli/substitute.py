"""The command that holds another device against the fitted one."""

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
    from safeamp.answers import Substitute
    from safeamp.reading.sheets import Source


class Format(StrEnum):
    """How the comparison is printed."""

    TEXT = "text"
    JSON = "json"
    CSV = "csv"


class Side(StrEnum):
    """Which side gets the other device."""

    UPPER = "upper"
    LOWER = "lower"
    BOTH = "both"


def substitute(
    sheet: SheetArgument,
    device: Annotated[str, typer.Argument(help="The other device: of the sheet, of the folder, or generic.")],
    side: Annotated[Side, typer.Option("--side", help="Which side gets it.")] = Side.BOTH,
    format_: Annotated[Format, typer.Option("--format", help="How the answer is printed.")] = Format.TEXT,
    output: OutputOption = None,
    limits: LimitsOption = None,
    device_folder: DeviceFolderOption = None,
) -> None:
    """Hold another device against the fitted one along the same load lines, volt by volt."""
    never = FilesRead(sheet, limits=limits, device_folder=device_folder)
    if output is not None:
        check_output(output, never)
    answer = _compare(sheet, device, side, limits, device_folder)
    emit(_text(answer, format_, output), output, never=never)
    raise typer.Exit(answer.exit_status)


def _compare(
    path: Path, device: str, side: Side, limits: Path | None, device_folder: Path | None
) -> Substitute:
    from safeamp.reading import open_sheet
    from safeamp.reading.limits import load_limits
    from safeamp.studies.substitute import SameDeviceError
    from safeamp.studies.substitute import substitute as study

    with complaining():
        rules = load_limits(limits)
        source = open_sheet(path, device_folder=device_folder, limits=rules)
        fitted, other = source.sheet(), _with_other(source, device, side)
    try:
        return study(fitted, other, rules)
    except SameDeviceError as trouble:
        fail(str(trouble))


def _with_other(source: Source, device: str, side: Side) -> Sheet:
    """Return the sheet with the other device; that it is not known is said of the command, not of the sheet."""
    from safeamp.studies.substitute import changes

    try:
        return source.sheet(changes(device, side.value))
    except ReadingError as trouble:
        if any(complaint.key not in ("stage.upper", "stage.lower") for complaint in trouble.complaints):
            raise
        fail(f"{trouble.complaints[0].text}; safeamp devices lists those that are known by name")


def _text(answer: Substitute, format_: Format, output: Path | None) -> str:
    from safeamp.report import substitute as report

    if format_ is Format.JSON:
        return report.substitute_json(answer)
    if format_ is Format.CSV:
        return report.substitute_csv(answer)
    if output is not None:
        return report.render_substitute(answer)
    return report.render_substitute(answer, width=columns(), colour=colourful())
