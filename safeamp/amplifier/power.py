"""The tables of the power side: mains, supply, heatsink, protection."""

from __future__ import annotations

from dataclasses import dataclass, field

from safeamp.amplifier.keys import count, flag, internal, number, special, word
from safeamp.quantities import (
    CAPACITANCE,
    CURRENT,
    FREQUENCY,
    LENGTH,
    POWER,
    RATIO,
    TEMPERATURE,
    THERMAL_RESISTANCE,
    TIME,
    VOLTAGE,
    Number,
    Sign,
)

MAINS_VOLTS = (80.0, 300.0)
RAIL_VOLTS = (1.0, 300.0)


@dataclass(frozen=True)
class Fuse:
    """A fuse link: letter of its time characteristic (FF, F, M, T, TT), rated current in A.

    Where they are imprinted the letter of its breaking capacity (L, E, H) and its rated voltage in V.
    """

    letter: str
    rating: float
    text: str = ""
    capacity: str = ""
    voltage: float | None = None


@dataclass(frozen=True, eq=False, kw_only=True)
class Mains:
    """What the public supply is, what the plate says, what the socket gives today."""

    nominal: Number | None = number(VOLTAGE, "declared voltage of the public supply", believable=MAINS_VOLTS)
    rated: Number | None = number(VOLTAGE, "mains voltage on the amplifier's plate", believable=MAINS_VOLTS)
    rated_frequency: Number | None = number(
        FREQUENCY, "mains frequency on the amplifier's plate", believable=(15.0, 420.0)
    )
    actual: Number | None = number(VOLTAGE, "mains measured today", believable=MAINS_VOLTS)
    highest: Number | None = number(
        VOLTAGE,
        "highest mains the amplifier must stand; 1.1 times nominal when left out",
        believable=MAINS_VOLTS,
    )
    frequency: Number | None = number(FREQUENCY, "frequency of the public supply", believable=(15.0, 420.0))
    present: Number | None = internal()


@dataclass(frozen=True, eq=False, kw_only=True)
class Supply:
    """Rails, reservoir, fuses and transformer."""

    source: str | None = word(
        "what feeds the rails; the last three hold them fixed",
        "mains",
        "regulated",
        "battery",
        "bench",
        default="mains",
        why="nearly every amplifier is fed from the mains",
    )
    rails: str | None = word("two rails about 0 V, or one rail and 0 V", "split", "single", required=True)
    no_load: tuple[Number, ...] | None = number(
        VOLTAGE,
        "rail without load: each rail of a split supply (one value, or a list of two), the whole rail of a single one",
        shape="list",
        required=True,
        sign=Sign.MAGNITUDE,
        believable=RAIL_VOLTS,
    )
    full_load: tuple[Number, ...] | None = number(
        VOLTAGE,
        "rail with all channels on that supply driven; 0.80 to 0.95 of no_load when left out",
        shape="list",
        sign=Sign.MAGNITUDE,
        believable=RAIL_VOLTS,
    )
    full_load_share: Number | None = internal()
    at_mains: Number | None = number(
        VOLTAGE,
        "mains at the rail readings; mains.actual for a measured rail, else mains.rated, when left out",
        believable=MAINS_VOLTS,
    )
    reservoir: Number | None = number(CAPACITANCE, "reservoir capacitor of one rail", believable=(10e-6, 1.0))
    reservoir_rated_voltage: Number | None = number(
        VOLTAGE, "rated voltage printed on the reservoir", believable=(3.0, 1000.0)
    )
    rail_fuse: Fuse | None = special(
        "fuse", 'fuse fitted: "T 2 A", an imprint such as "T2AL250V", or "none"', none="absent"
    )
    rail_fuse_rated: Fuse | None = special("fuse", 'fuse printed on plate or board, or "none"', none="absent")
    transformer_power: Number | None = number(POWER, "rated power of the transformer, VA written as W")
    secondary: Number | None = number(VOLTAGE, "secondary voltage of one winding, rms", believable=RAIL_VOLTS)


@dataclass(frozen=True, eq=False, kw_only=True)
class Fins:
    """A finned heatsink by ruler."""

    width: Number | None = number(
        LENGTH, "width of the plate, across the fins", required=True, believable=(0.005, 2.0)
    )
    height: Number | None = number(
        LENGTH, "height, vertical, along the fins", required=True, believable=(0.005, 2.0)
    )
    depth: Number | None = number(
        LENGTH, "length of a fin from plate to tip", required=True, believable=(0.001, 0.5)
    )
    thickness: Number | None = number(LENGTH, "thickness of a fin", required=True, believable=(2e-4, 0.05))
    count: Number | None = count("number of fins", required=True, believable=(1, 500))
    plate: Number | None = number(LENGTH, "thickness of the plate; 0 when left out", believable=(5e-4, 0.1))
    emissivity: Number | None = number(
        RATIO, "emissivity, 0 to 1; bare metal when left out", believable=(0.01, 1.0)
    )


@dataclass(frozen=True, eq=False, kw_only=True)
class Heatsink:
    """The way of the heat from the case to the air."""

    sink_to_air: Number | None = number(
        THERMAL_RESISTANCE, "thermal resistance from heatsink to air", believable=(0.01, 100.0)
    )
    case_to_sink: Number | None = number(
        THERMAL_RESISTANCE,
        "thermal resistance from case to heatsink, insulator and paste included",
        believable=(0.005, 50.0),
    )
    insulator: str | None = word("name of a mounting in the table of interfaces, in place of case_to_sink")
    air: Number | None = number(
        TEMPERATURE,
        "air at the heatsink, inside the cabinet, lid on; without a tolerance the worst case adds 10 K",
        required=True,
        believable=(-10.0, 90.0),
    )
    shared_by: Number | None = count("channels or bridged sides on the whole heatsink", believable=(1, 16))
    other_heat: Number | None = number(
        POWER,
        "further heat on the same heatsink (drivers, regulators)",
        sign=Sign.NON_NEGATIVE,
        default="0 W",
        why="nothing else was said to heat this heatsink",
    )
    accessible: bool | None = flag(
        "can be touched with the lid on", default="true", why="what can be touched is judged as touched"
    )
    each: bool | None = flag("true: one heatsink for each device")
    fins: Fins = field(default_factory=Fins)
    fins_share: Number | None = internal()


@dataclass(frozen=True, eq=False, kw_only=True)
class Protection:
    """What stands between a fault and the loudspeaker."""

    trip_voltage: Number | None = number(
        VOLTAGE, 'DC at which the relay opens, or "none"', believable=(0.05, 60.0), none="absent"
    )
    trip_delay: Number | None = number(
        TIME, 'time from the fault to open contacts, or "none"', believable=(0.0005, 60.0), none="absent"
    )
    loudspeaker_fuse: Fuse | None = special("fuse", 'fuse in the loudspeaker line, or "none"', none="absent")
    vi_limiter: tuple[tuple[Number, Number], ...] | None = number(
        (VOLTAGE, CURRENT),
        'points of device voltage and device current at which the limiter acts, or "none"; '
        "only measured points cut the load's use of the safe area",
        shape="points",
        sign=Sign.MAGNITUDE,
        none="absent",
    )
