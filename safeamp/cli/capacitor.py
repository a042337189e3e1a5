"""The quick command for the output capacitor."""

from __future__ import annotations

from typing import Annotated

import typer

from safeamp.cli.options import LimitsOption
from safeamp.cli.quick import Format, FormatOption, Load, SingleRail, run


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
) -> None:
    """Size an output capacitor, or say where it cuts off; what is left out is solved for."""
    from safeamp.studies.quick.capacitor import capacitor_answer

    options = {
        "cutoff": cutoff,
        "load": load,
        "capacitance": capacitance,
        "tolerance": tolerance,
        "single_rail": single_rail,
        "highest": highest,
        "power": power,
    }
    run("capacitor", options, capacitor_answer, format_, limits)
