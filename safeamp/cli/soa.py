"""The quick command for the safe area of one device."""

from __future__ import annotations

from collections.abc import Callable
from functools import partial
from pathlib import Path
from typing import TYPE_CHECKING, Annotated

import typer

from safeamp.cli.figures import (
    FigureFormat,
    FigureFormatOption,
    FiguresOption,
    check_folder,
    write_figures,
)
from safeamp.cli.files import FilesRead
from safeamp.cli.options import DeviceFolderOption, LimitsOption
from safeamp.cli.output import complaining
from safeamp.cli.quick import (
    EmitterResistor,
    Format,
    FormatOption,
    Load,
    Pairs,
    SingleRail,
    SplitRail,
    SwingLoss,
    run,
)

if TYPE_CHECKING:
    from safeamp.answers import QuickAnswer
    from safeamp.studies.quick.desk import Desk


PhaseAngle = Annotated[
    str | None,
    typer.Option(help='Largest angle of the load, 45 deg when left out; "0 deg" is a resistor.'),
]
Idle = Annotated[str | None, typer.Option(help='Idle current of each device, such as "50 mA".')]
CaseTemperature = Annotated[str | None, typer.Option(help='Case of the device, such as "70 degC".')]
Highest = Annotated[str | None, typer.Option(help="Highest over actual mains, 1.1 when left out.")]
Device = Annotated[str | None, typer.Option(help='Name of a device; "safeamp devices" lists them.')]


def soa(
    split_rail: SplitRail = None,
    single_rail: SingleRail = None,
    load: Load = None,
    phase_angle: PhaseAngle = None,
    emitter_resistor: EmitterResistor = None,
    pairs: Pairs = None,
    swing_loss: SwingLoss = None,
    idle: Idle = None,
    case_temperature: CaseTemperature = None,
    highest: Highest = None,
    device: Device = None,
    device_folder: DeviceFolderOption = None,
    format_: FormatOption = Format.TEXT,
    limits: LimitsOption = None,
    figures: FiguresOption = None,
    figures_format: FigureFormatOption = FigureFormat.SVG,
) -> None:
    """Say how much of its safe area a device uses into a load."""
    drawn = partial(_draw, figures, figures_format, (limits, device_folder))
    options = {
        "split_rail": split_rail,
        "single_rail": single_rail,
        "load": load,
        "phase_angle": phase_angle,
        "emitter_resistor": emitter_resistor,
        "pairs": pairs,
        "swing_loss": swing_loss,
        "idle": idle,
        "case_temperature": case_temperature,
        "highest": highest,
    }
    check_folder(figures)
    run("soa", options, partial(_answer, device, device_folder, drawn), format_, limits)


def _answer(
    device: str | None, device_folder: Path | None, drawn: Callable[[QuickAnswer], None], desk: Desk
) -> QuickAnswer:
    from safeamp.reading.one_device import read_device
    from safeamp.studies.quick.safe_area import safe_area_answer

    with complaining():
        sheet = None if device is None else read_device(device, device_folder)
    answer = safe_area_answer(desk, sheet)
    drawn(answer)
    return answer


def _draw(
    folder: Path | None,
    format_: FigureFormat,
    read: tuple[Path | None, Path | None],
    answer: QuickAnswer,
) -> None:
    if folder is None or answer.plane is None:
        return
    from safeamp.figures import plane_pictures

    limits, devices = read
    never = FilesRead(limits=limits, device_folder=devices)
    write_figures(plane_pictures(answer.plane), folder, format_, never=never)
