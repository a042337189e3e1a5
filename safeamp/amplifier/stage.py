"""The tables of the output stage: stage, output capacitor, device."""

from __future__ import annotations

from dataclasses import dataclass

from safeamp.amplifier.keys import count, flag, internal, number, word
from safeamp.quantities import (
    CAPACITANCE,
    CURRENT,
    FREQUENCY,
    PERCENT,
    POWER,
    RESISTANCE,
    TEMPERATURE,
    TEMPERATURE_COEFFICIENT,
    THERMAL_RESISTANCE,
    TIME,
    TRANSCONDUCTANCE_PARAMETER,
    VOLTAGE,
    Number,
    Sign,
)

IDLE = (VOLTAGE, CURRENT)
IDLE_HELP = "V across ONE emitter resistor, or A; drivers not included"


@dataclass(frozen=True, eq=False, kw_only=True)
class Stage:
    """The output stage of one channel."""

    arrangement: str | None = word(
        "arrangement of the output devices",
        "complementary",
        "quasi-complementary",
        default="complementary",
        why="the usual arrangement",
    )
    coupling: str | None = word("how the loudspeaker is connected", "direct", "capacitor", required=True)
    bridged: bool | None = flag("true: the loudspeaker stands between two outputs", required=True)
    pairs: Number | None = count(
        "devices in parallel on each side", believable=(1, 50), default="1", why="one device on each side"
    )
    pairs_conducting: Number | None = count("of these, how many carry current", believable=(1, 50))
    upper: str | None = word("name of the upper device", required=True)
    lower: str | None = word("name of the lower device", required=True)
    drivers: tuple[str, ...] | None = word("names of the driver devices", shape="list", none="absent")
    original_devices: bool | None = flag("true: the types the maker fitted")
    rated_load: Number | None = number(
        RESISTANCE, "lowest load that the maker prints", believable=(1.0, 1000.0)
    )
    emitter_resistor: Number | None = number(
        RESISTANCE,
        'emitter or source resistor of each device, or "none"',
        required=True,
        believable=(0.005, 50.0),
        none="zero",
    )
    idle: Number | None = number(IDLE, f"idle current of each device: {IDLE_HELP}")
    idle_unit: str | None = internal()
    idle_specified: Number | None = number(IDLE, f"idle current the maker prescribes: {IDLE_HELP}")
    idle_specified_unit: str | None = internal()
    idle_at: str | None = word(
        "whether idle was set cold or warm",
        "cold",
        "warm",
    )
    bias_sensor: str | None = word(
        "where the bias generator feels the temperature",
        "heatsink",
        "device",
        "none",
        default="none",
        why="without a sensor the idle current follows the heat: the unsafe side",
    )
    bias_tracking: Number | None = number(
        PERCENT, "share of the temperature rise that the bias generator follows", believable=(0.0, 1.2)
    )
    swing_loss: Number | None = number(
        VOLTAGE,
        "V between rail and clipped peak, without the drop in the emitter resistor",
        sign=Sign.NON_NEGATIVE,
        believable=(0.0, 60.0),
    )
    swing_loss_up: Number | None = number(
        VOLTAGE, "the same upward", sign=Sign.NON_NEGATIVE, believable=(0.0, 60.0)
    )
    swing_loss_down: Number | None = number(
        VOLTAGE, "the same downward", sign=Sign.NON_NEGATIVE, believable=(0.0, 60.0)
    )
    clipped_peak: Number | None = number(
        VOLTAGE, "clipped peak measured at the output, in place of swing_loss", believable=(0.1, 300.0)
    )
    imbalance: Number | None = number(
        PERCENT,
        "excess current of the worst of parallel devices",
        sign=Sign.NON_NEGATIVE,
        believable=(0.0, 10.0),
    )
    series_resistor: Number | None = number(
        RESISTANCE, 'resistor in series with the load, or "none"', none="absent", believable=(0.01, 10e3)
    )
    zobel_resistor: Number | None = number(
        RESISTANCE,
        'resistor of the network across the output, or "none"',
        none="absent",
        believable=(0.5, 1e3),
    )
    zobel_capacitor: Number | None = number(
        CAPACITANCE,
        'capacitor of the network across the output, or "none"',
        none="absent",
        believable=(1e-9, 10e-6),
    )


@dataclass(frozen=True, eq=False, kw_only=True)
class OutputCapacitor:
    """The capacitor between a single-rail stage and the loudspeaker."""

    capacitance: Number | None = number(CAPACITANCE, "capacitance", required=True, believable=(1e-6, 0.5))
    marked_capacitance: Number | None = number(
        CAPACITANCE, "capacitance printed on it", believable=(1e-6, 0.5)
    )
    rated_voltage: Number | None = number(
        VOLTAGE, "rated voltage printed on it", required=True, believable=(3.0, 1000.0)
    )
    ripple_current: Number | None = number(CURRENT, "rated ripple current, rms", believable=(0.01, 100.0))
    esr: Number | None = number(RESISTANCE, "equivalent series resistance", believable=(0.0005, 20.0))
    target_cutoff: Number | None = number(
        FREQUENCY,
        "-3 dB frequency wanted",
        believable=(0.5, 20e3),
        default="20 Hz",
        why="the low end of hearing",
    )
    rise_time: Number | None = number(
        TIME, "rise time of the midpoint at switch-on", believable=(0.001, 60.0)
    )
    bleeder: Number | None = number(
        RESISTANCE,
        'resistor from the capacitor\'s output side to 0 V, or "none"',
        none="absent",
        believable=(10.0, 1e6),
    )


@dataclass(frozen=True, eq=False, kw_only=True)
class Device:
    """Ratings of an output or driver device, from its data sheet."""

    kind: str | None = word(
        "what it is", "bipolar", "darlington", "vertical mosfet", "lateral mosfet", required=True
    )
    voltage: Number | None = number(
        VOLTAGE,
        "V_CEO (never V_CBO) or V_DSS",
        required=True,
        sign=Sign.MAGNITUDE,
        symbol="V_CEO",
        believable=(5.0, 2000.0),
    )
    current: Number | None = number(
        CURRENT,
        "continuous collector or drain current",
        required=True,
        sign=Sign.MAGNITUDE,
        symbol="I_C",
        believable=(0.01, 500.0),
    )
    power: Number | None = number(
        POWER, "rated dissipation", required=True, symbol="P_tot", believable=(0.05, 2000.0)
    )
    power_at: Number | None = number(
        TEMPERATURE,
        "case temperature of that rating",
        default="25 degC",
        why="data sheets rate power at a case of 25 °C",
        believable=(0.0, 150.0),
    )
    junction_limit: Number | None = number(
        TEMPERATURE, "highest junction temperature", required=True, symbol="T_j max", believable=(60.0, 250.0)
    )
    junction_to_case: Number | None = number(
        THERMAL_RESISTANCE,
        "thermal resistance from junction to case",
        symbol="R_th j-c",
        believable=(0.05, 100.0),
    )
    junction_to_ambient: Number | None = number(
        THERMAL_RESISTANCE,
        "thermal resistance in free air, no heatsink",
        symbol="R_th j-a",
        believable=(5.0, 1000.0),
    )
    safe_area: tuple[tuple[Number, Number], ...] | None = number(
        (VOLTAGE, CURRENT),
        "points of the DC curve beyond the power line, at a case of power_at",
        shape="points",
        sign=Sign.MAGNITUDE,
    )
    pulse: tuple[tuple[float, tuple[tuple[float, float], ...]], ...] | None = number(
        (TIME, VOLTAGE, CURRENT),
        'further curves, each a duration and its points: [["10 ms", ["40 V", "5 A"], ["100 V", "1 A"]], ...]',
        shape="curves",
        sign=Sign.MAGNITUDE,
    )
    transconductance_parameter: Number | None = number(
        TRANSCONDUCTANCE_PARAMETER,
        "K of I = K/2 times overdrive squared",
        symbol="K",
        believable=(0.01, 500.0),
    )
    temperature_coefficient: Number | None = number(
        TEMPERATURE_COEFFICIENT,
        "mV/K of the control voltage at constant current",
        sign=Sign.ANY,
        believable=(0.0, 0.03),
    )
    transient: tuple[tuple[Number, Number], ...] | None = number(
        (THERMAL_RESISTANCE, TIME), "Foster pairs of the transient thermal resistance", shape="points"
    )
    reference: str | None = word("where the data come from")
