"""What the quick answers share: options in, answer out, status of its verdict."""

from __future__ import annotations

from collections.abc import Callable, Mapping
from enum import StrEnum
from pathlib import Path
from typing import TYPE_CHECKING, Annotated, TypeVar

import typer

from safeamp.cli.output import colourful, columns, complaining, emit, fail

if TYPE_CHECKING:
    from safeamp.answers import QuickAnswer
    from safeamp.studies.quick.desk import Desk


_Read = TypeVar("_Read")


class Format(StrEnum):
    """How a quick answer is printed."""

    TEXT = "text"
    JSON = "json"


FormatOption = Annotated[Format, typer.Option("--format", help="How the answer is printed.")]
SplitRail = Annotated[str | None, typer.Option(help='One rail of a split supply, such as "35 V".')]
SingleRail = Annotated[str | None, typer.Option(help='The whole rail of a single supply, such as "64 V".')]
Load = Annotated[str | None, typer.Option(help='Impedance of the load, such as "8 ohm".')]
EmitterResistor = Annotated[
    str | None, typer.Option(help='Emitter or source resistor of each device, such as "0.22 ohm", or "none".')
]
Pairs = Annotated[str | None, typer.Option(help="Devices in parallel on each side, such as 1.")]
SwingLoss = Annotated[str | None, typer.Option(help='Between rail and clipped peak, such as "3 V".')]
DcResistance = Annotated[str | None, typer.Option(help='DC resistance of the coil, such as "6 ohm".')]


def run(
    command: str,
    options: Mapping[str, str | None],
    study: Callable[[Desk], QuickAnswer],
    format_: Format,
    limits: Path | None,
) -> None:
    """Read the options, compute, print, and end with the status of the verdict."""
    run_beside(command, options, lambda: None, lambda desk, _: study(desk), format_, limits)


def run_beside(
    command: str,
    options: Mapping[str, str | None],
    file: Callable[[], _Read],
    study: Callable[[Desk, _Read], QuickAnswer],
    format_: Format,
    limits: Path | None,
) -> None:
    """Do the same with a file that the options go with; troubles of both are said at once."""
    from safeamp.complaints import OptionsError
    from safeamp.reading.limits import load_limits
    from safeamp.reading.quick_options import read_beside, read_options
    from safeamp.studies.quick.desk import Desk

    try:
        with complaining():
            rules = load_limits(limits)
            entries, found = read_beside(lambda: read_options(command, options), file)
            answer = study(Desk(command, rules, entries), found)
    except OptionsError as trouble:
        fail(f"{command}: {trouble}")
    except ValueError as trouble:
        fail(f"{command}: no amplifier has such values: {trouble}")
    emit(_text(answer, format_))
    raise typer.Exit(answer.exit_status)


def _text(answer: QuickAnswer, format_: Format) -> str:
    from safeamp.report.quick import quick_json, render_quick

    if format_ is Format.JSON:
        return quick_json(answer)
    return render_quick(answer, width=columns(), colour=colourful())
