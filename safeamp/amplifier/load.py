"""The tables of the load and of the bench: loudspeaker, readings."""

from __future__ import annotations

from dataclasses import dataclass, field

from safeamp.amplifier.keys import count, flag, internal, number, special, word
from safeamp.quantities import (
    ANGLE,
    COMPLIANCE,
    FORCE_FACTOR,
    FREQUENCY,
    INDUCTANCE,
    LENGTH,
    LEVEL,
    MASS,
    POWER,
    RATIO,
    RESISTANCE,
    TEMPERATURE,
    THERMAL_RESISTANCE,
    TIME,
    VOLTAGE,
    Number,
    Sign,
)

OHMS = (0.5, 10e3)


@dataclass(frozen=True)
class Limiter:
    """What limits the current at the first power-up: a lamp (W), a resistor (ohm) or a bench supply."""

    kind: str
    value: float | None = None
    text: str = ""


@dataclass(frozen=True)
class Curve:
    """A measured impedance: Hz (rising), ohm and deg of each point, and the file that holds them."""

    frequencies: tuple[float, ...] = field(repr=False)
    impedances: tuple[float, ...] = field(repr=False)
    phases: tuple[float, ...] = field(repr=False)
    text: str = ""


@dataclass(frozen=True, eq=False, kw_only=True)
class Loudspeaker:
    """The load: a loudspeaker or a resistor."""

    load: str | None = word(
        "what is connected",
        "loudspeaker",
        "resistor",
        default="loudspeaker",
        why="what an amplifier is made for",
    )
    parallel: Number | None = count(
        "loudspeakers driven at once, or branches of several in series",
        believable=(1, 16),
        default="1",
        why="one loudspeaker",
    )
    series: Number | None = count(
        "loudspeakers in series in each branch", believable=(1, 16), default="1", why="one loudspeaker"
    )
    nominal_impedance: Number | None = number(
        RESISTANCE, "nominal impedance on the label", required=True, believable=OHMS
    )
    minimum_impedance: Number | None = number(
        RESISTANCE, "lowest impedance; 80 % of nominal when left out (IEC 60268-3)", believable=OHMS
    )
    minimum_share: Number | None = internal()
    phase_angle: Number | None = number(
        ANGLE,
        "largest phase angle of the impedance; less than 45 deg counts only with a curve",
        sign=Sign.MAGNITUDE,
        believable=(0.0, 90.0),
        default="45 deg",
        why="usual for loudspeakers whose angle nobody has measured",
    )
    dc_resistance: Number | None = number(
        RESISTANCE, "DC resistance of the coil by meter", believable=(0.3, 10e3)
    )
    rated_power: Number | None = number(POWER, "power printed on the loudspeaker", believable=(0.05, 5000.0))
    power_word: str | None = word("what kind of power that is", "rated noise", "programme", "peak")
    power_share: Number | None = internal()
    crest_factor: Number | None = number(LEVEL, "crest factor of the programme", believable=(0.0, 30.0))
    lowest_note: Number | None = number(
        FREQUENCY,
        "lowest note to be played",
        believable=(5.0, 2000.0),
        default="20 Hz",
        why="the low end of hearing",
    )
    impedance_curve: Curve | None = special("file", "CSV with frequency [Hz], impedance [ohm], phase [deg]")
    resonance: Number | None = number(
        FREQUENCY, "resonance of the driver", symbol="f_s", believable=(5.0, 2000.0)
    )
    q_mechanical: Number | None = number(RATIO, "mechanical Q", symbol="Q_ms", believable=(0.1, 100.0))
    q_electrical: Number | None = number(RATIO, "electrical Q", symbol="Q_es", believable=(0.05, 20.0))
    inductance: Number | None = number(
        INDUCTANCE, "inductance of the coil", symbol="L_e", believable=(1e-6, 0.1)
    )
    force_factor: Number | None = number(FORCE_FACTOR, "force factor", symbol="Bl", believable=(0.2, 60.0))
    compliance: Number | None = number(
        COMPLIANCE, "compliance of the suspension", symbol="C_ms", believable=(1e-6, 0.05)
    )
    moving_mass: Number | None = number(MASS, "moving mass", symbol="M_ms", believable=(1e-5, 1.0))
    linear_excursion: Number | None = number(
        LENGTH, "linear excursion, one way", symbol="X_max", believable=(1e-5, 0.1)
    )
    coil_to_magnet: Number | None = number(THERMAL_RESISTANCE, "thermal resistance from coil to magnet")
    coil_time_constant: Number | None = number(
        TIME, "thermal time constant of the coil", believable=(0.1, 600.0)
    )
    magnet_to_air: Number | None = number(THERMAL_RESISTANCE, "thermal resistance from magnet to air")
    magnet_time_constant: Number | None = number(
        TIME, "thermal time constant of the magnet", believable=(10.0, 36000.0)
    )
    coil_limit: Number | None = number(
        TEMPERATURE, "highest temperature of the coil", believable=(60.0, 400.0)
    )


@dataclass(frozen=True, eq=False, kw_only=True)
class Readings:
    """What was read at the bench."""

    offset_cold: Number | None = number(
        VOLTAGE, "DC at the output, cold, input shorted, no load", sign=Sign.ANY
    )
    offset_warm: Number | None = number(VOLTAGE, "the same, warm", sign=Sign.ANY)
    offset_with_signal: Number | None = number(VOLTAGE, "the same, with signal", sign=Sign.ANY)
    offset_other_side: Number | None = number(VOLTAGE, "bridged: the other output against 0 V", sign=Sign.ANY)
    midpoint_share: Number | None = internal()
    midpoint: Number | None = number(
        VOLTAGE, "midpoint of a single-rail stage against 0 V", believable=(0.05, 300.0)
    )
    idle_upper: tuple[Number, ...] | None = number(
        VOLTAGE,
        "V across each emitter resistor of the upper side",
        shape="list",
        sign=Sign.MAGNITUDE,
        believable=(0.0, 5.0),
    )
    idle_lower: tuple[Number, ...] | None = number(
        VOLTAGE,
        "V across each emitter resistor of the lower side",
        shape="list",
        sign=Sign.MAGNITUDE,
        believable=(0.0, 5.0),
    )
    idle_cold: Number | None = number(
        VOLTAGE,
        "V across one emitter resistor just after switch-on",
        sign=Sign.MAGNITUDE,
        believable=(0.0, 5.0),
    )
    capacitor_leakage_drop: Number | None = number(
        VOLTAGE, "V across the leakage resistor", sign=Sign.MAGNITUDE
    )
    capacitor_leakage_resistor: Number | None = number(
        RESISTANCE, "resistor from the output terminal to 0 V, 10 kohm at most", believable=(0.5, 10e6)
    )
    capacitor_leakage_trend: str | None = word("whether that reading moves", "falling", "steady", "rising")
    output_ac: Number | None = number(VOLTAGE, "AC at the output without signal, rms", sign=Sign.NON_NEGATIVE)
    zobel_hot: bool | None = flag("the resistor across the output gets hot")
    heatsink_temperature: Number | None = number(
        TEMPERATURE, "heatsink after it has settled", believable=(-10.0, 200.0)
    )
    heatsink_air: Number | None = number(
        TEMPERATURE, "air beside it at that reading", believable=(-10.0, 90.0)
    )
    heatsink_level: str | None = word("level at that reading", "idle", "one eighth", "one third")
    device_ohms: Number | None = number(
        RESISTANCE,
        "lowest collector-emitter or collector-base reading of outputs and drivers, both ways",
        sign=Sign.NON_NEGATIVE,
        believable=(0.0, 1e12),
    )
    insulation: Number | None = number(
        RESISTANCE, "case to heatsink, links lifted", sign=Sign.NON_NEGATIVE, believable=(0.0, 1e15)
    )
    mains_insulation: Number | None = number(
        RESISTANCE, "mains pins to metal", sign=Sign.NON_NEGATIVE, believable=(0.0, 1e15)
    )
    earth_resistance: Number | None = number(
        RESISTANCE,
        'protective earth pin to metal, or "none" for an amplifier without earth',
        sign=Sign.NON_NEGATIVE,
        believable=(0.0, 1e9),
        none="absent",
    )
    limiter: Limiter | None = special("limiter", 'what limits the current: "60 W lamp", "22 ohm" or "bench"')
    limiter_state: str | None = word("the limiter after the first flash", "dark", "dim", "bright", "rising")
    limiter_rails: tuple[Number, ...] | None = number(
        VOLTAGE, "rails on the limiter, as a list", shape="list", sign=Sign.MAGNITUDE, believable=(0.0, 300.0)
    )
    limiter_output: Number | None = number(
        VOLTAGE, "output on the limiter: V (split) or midpoint (single)", sign=Sign.ANY
    )
    taken_on: str | None = word(
        "what fed the amplifier at these readings",
        "mains",
        "limiter",
        default="mains",
        why="readings count at full mains",
    )
    unsigned: frozenset[str] | None = internal()
