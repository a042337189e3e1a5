"""The quick command for DC at the output."""

from __future__ import annotations

from typing import Annotated

import typer

from safeamp.cli.options import LimitsOption
from safeamp.cli.quick import DcResistance, Format, FormatOption, run


def offset(
    reading: Annotated[str | None, typer.Option(help='DC read at the output, such as "-32 mV".')] = None,
    dc_resistance: DcResistance = None,
    force_factor: Annotated[str | None, typer.Option(help='Bl of the driver, such as "7.5 N/A".')] = None,
    compliance: Annotated[str | None, typer.Option(help='C_ms of the driver, such as "1.2 mm/N".')] = None,
    linear_excursion: Annotated[str | None, typer.Option(help='X_max, one way, such as "5 mm".')] = None,
    share: Annotated[
        str | None,
        typer.Option(help='In place of a reading: share of the excursion to allow, such as "10 %".'),
    ] = None,
    format_: FormatOption = Format.TEXT,
    limits: LimitsOption = None,
) -> None:
    """Say what a standing DC does to coil and cone, or which DC a share of the excursion allows."""
    from safeamp.studies.quick.offset import offset_answer

    options = {
        "reading": reading,
        "dc_resistance": dc_resistance,
        "force_factor": force_factor,
        "compliance": compliance,
        "linear_excursion": linear_excursion,
        "share": share,
    }
    run("offset", options, offset_answer, format_, limits)
