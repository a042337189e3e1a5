"""The quick command for the heatsink of one device."""

from __future__ import annotations

from typing import Annotated

import typer

from safeamp.cli.options import LimitsOption
from safeamp.cli.quick import Format, FormatOption, run

Power = Annotated[str | None, typer.Option(help='Heat of the device, such as "30 W".')]
Air = Annotated[str | None, typer.Option(help='Air inside the cabinet, such as "40 degC".')]
SinkToAir = Annotated[str | None, typer.Option(help='Of the heatsink, such as "0.8 K/W".')]
CaseToSink = Annotated[str | None, typer.Option(help='Of the insulator, such as "0.45 K/W".')]
JunctionToCase = Annotated[str | None, typer.Option(help='Of the device, such as "1.2 K/W".')]
Junction = Annotated[str | None, typer.Option(help='Junction to be kept, such as "150 degC".')]
JunctionLimit = Annotated[str | None, typer.Option(help='Data sheet limit, such as "200 degC".')]
SinkTemperature = Annotated[str | None, typer.Option(help='Of the heatsink, such as "70 degC".')]
Fins = Annotated[
    str | None, typer.Option(metavar="WxHxD", help='Width, upright height, fin depth: "150x75x35 mm".')
]
Thickness = Annotated[str | None, typer.Option(help='Thickness of a fin, such as "2 mm".')]
Count = Annotated[str | None, typer.Option(help="Number of fins, such as 14.")]
Plate = Annotated[str | None, typer.Option(help='Thickness of the plate, such as "6 mm".')]
Emissivity = Annotated[str | None, typer.Option(help="Of the surface; 0.1 when left out.")]


def heatsink(
    power: Power = None,
    air: Air = None,
    sink_to_air: SinkToAir = None,
    case_to_sink: CaseToSink = None,
    junction_to_case: JunctionToCase = None,
    junction: Junction = None,
    junction_limit: JunctionLimit = None,
    sink_temperature: SinkTemperature = None,
    fins: Fins = None,
    thickness: Thickness = None,
    count: Count = None,
    plate: Plate = None,
    emissivity: Emissivity = None,
    format_: FormatOption = Format.TEXT,
    limits: LimitsOption = None,
) -> None:
    """Size a heatsink for one device, or say how hot it gets; what is left out is solved for."""
    from safeamp.studies.quick.heatsink import heatsink_answer

    options = {
        "power": power,
        "air": air,
        "sink_to_air": sink_to_air,
        "case_to_sink": case_to_sink,
        "junction_to_case": junction_to_case,
        "junction": junction,
        "junction_limit": junction_limit,
        "sink_temperature": sink_temperature,
        "fins": fins,
        "thickness": thickness,
        "count": count,
        "plate": plate,
        "emissivity": emissivity,
    }
    run("heatsink", options, heatsink_answer, format_, limits)
