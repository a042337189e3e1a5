"""The quick command for power at clipping and a DC fault."""

from __future__ import annotations

from typing import TYPE_CHECKING, Annotated

import typer

from safeamp.cli.options import LimitsOption
from safeamp.cli.output import complaining
from safeamp.cli.quick import (
    DcResistance,
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


RatedPower = Annotated[str | None, typer.Option(help='Power on the label, such as "60 W".')]
PowerWord = Annotated[str | None, typer.Option(help='Word beside it: "rated noise", "programme" or "peak".')]
Fuse = Annotated[str | None, typer.Option(help='Loudspeaker fuse, such as "F 2 A", or "none".')]
CoilLimit = Annotated[
    str | None, typer.Option(help='Coil at which the fuse is judged, "250 degC" when left out.')
]


def loudspeaker(
    split_rail: SplitRail = None,
    single_rail: SingleRail = None,
    swing_loss: SwingLoss = None,
    load: Load = None,
    emitter_resistor: EmitterResistor = None,
    pairs: Pairs = None,
    dc_resistance: DcResistance = None,
    rated_power: RatedPower = None,
    power_word: PowerWord = None,
    fuse: Fuse = None,
    coil_limit: CoilLimit = None,
    format_: FormatOption = Format.TEXT,
    limits: LimitsOption = None,
) -> None:
    """Say what an amplifier can do to a loudspeaker: power at clipping, and a rail on the coil."""

    def study(desk: Desk) -> QuickAnswer:
        from safeamp.reading.quick_options import read_fuse, read_power_word
        from safeamp.studies.quick.loudspeaker import loudspeaker_answer

        with complaining():
            fitted, word = read_fuse("loudspeaker", fuse), read_power_word("loudspeaker", power_word)
        return loudspeaker_answer(desk, fitted, word)

    options = {
        "split_rail": split_rail,
        "single_rail": single_rail,
        "swing_loss": swing_loss,
        "load": load,
        "emitter_resistor": emitter_resistor,
        "pairs": pairs,
        "dc_resistance": dc_resistance,
        "rated_power": rated_power,
        "coil_limit": coil_limit,
    }
    run("loudspeaker", options, study, format_, limits)
