"""The quick command for the output capacitor."""

from __future__ import annotations

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
from safeamp.cli.options import LimitsOption
from safeamp.cli.output import note
from safeamp.cli.quick import Format, FormatOption, Load, SingleRail, run

if TYPE_CHECKING:
    from safeamp.answers import QuickAnswer
    from safeamp.studies.quick.desk import Desk


def capacitor(
    cutoff: Annotated[str | None, typer.Option(help='-3 dB frequency to reach, such as "20 Hz".')] = None,
    load: Load = None,
    capacitance: Annotated[
        str | None, typer.Option(help='Capacitance that is there, such as "2200 uF".')
    ] = None,
    tolerance: Annotated[str | None, typer.Option(help='Low end of the tolerance, such as "20 %".')] = None,
    single_rail: SingleRail = None,
    highest: Annotated[str | None, typer.Option(help="Highest over actual mains, 1.1 when left out.")] = None,
    power: Annotated[
        str | None, typer.Option(help='Power in the load, such as "36 W", for the ripple.')
    ] = None,
    format_: FormatOption = Format.TEXT,
    limits: LimitsOption = None,
    figures: FiguresOption = None,
    figures_format: FigureFormatOption = FigureFormat.SVG,
) -> None:
    """Size an output capacitor, or say where it cuts off; what is left out is solved for."""

    def study(desk: Desk) -> QuickAnswer:
        from safeamp.studies.quick.capacitor import capacitor_answer

        answer = capacitor_answer(desk)
        _draw(figures, figures_format, limits, answer)
        return answer

    check_folder(figures)
    options = {
        "cutoff": cutoff,
        "load": load,
        "capacitance": capacitance,
        "tolerance": tolerance,
        "single_rail": single_rail,
        "highest": highest,
        "power": power,
    }
    run("capacitor", options, study, format_, limits)


def _draw(folder: Path | None, format_: FigureFormat, limits: Path | None, answer: QuickAnswer) -> None:
    if folder is None:
        return
    if answer.bass is None:
        note("no figure: neither a cutoff nor a capacitance was asked for")
        return
    from safeamp.figures import bass_pictures

    write_figures(bass_pictures(answer.bass), folder, format_, never=FilesRead(limits=limits))
