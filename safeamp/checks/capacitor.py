"""The output capacitor: wear, cutoff, voltage, ripple, leakage."""

from __future__ import annotations

import numpy as np

from safeamp.amplifier import Amplifier
from safeamp.checks import operating, thermal
from safeamp.checks.driver import in_series, is_started, parameters_of, seen_driver
from safeamp.checks.offset import DIRECT
from safeamp.checks.registry import finding
from safeamp.checks.trace import aside, miss, needed
from safeamp.checks.words import level, nominal, text
from safeamp.findings import Also, Measure, NotApplicable, Remark, Step, Verdict
from safeamp.limits import Limits
from safeamp.physics import capacitor, coupling, offset, preferred, stage
from safeamp.physics.driver import Driver
from safeamp.quantities import (
    CAPACITANCE,
    CURRENT,
    FREQUENCY,
    LEVEL,
    POWER,
    RATIO,
    RESISTANCE,
    TIME,
    VOLTAGE,
    Number,
    Origin,
)

INTO_MINIMUM = "1/(2 pi R C) into the minimum impedance"
INTO_DRIVER = "response through the capacitor into coil and motional impedance, over that of middle notes"


@finding("capacitor.wear", Step.COLD_CHECKS, RATIO)
def check_wear(amplifier: Amplifier, limits: Limits) -> Measure | NotApplicable:
    """Measured over marked capacitance."""
    if not operating.is_capacitor_coupled(amplifier):
        return NotApplicable(DIRECT)
    measured, marked = needed(
        amplifier, "output_capacitor.capacitance", "output_capacitor.marked_capacitance"
    )
    if amplifier.origin("output_capacitor.capacitance") not in (Origin.MEASURED, Origin.EXAMPLE):
        miss(amplifier, "output_capacitor.capacitance")
        measured = np.nan
    return Measure(
        measured / marked,
        f"{text(measured, CAPACITANCE)} measured, {text(marked, CAPACITANCE)} printed",
        next="discharge it, lift one end, measure it and enter both values, measured and printed",
        method="measured over marked capacitance",
    )


def _load_ohms(amplifier: Amplifier) -> Number:
    """Return what the capacitor works into at the loudspeaker's minimum, ohm."""
    return operating.minimum_load(amplifier)[0]


@finding("capacitor.cutoff", Step.COLD_CHECKS, FREQUENCY)
def check_cutoff(amplifier: Amplifier, limits: Limits) -> Measure | NotApplicable:
    """-3 dB frequency against the target: into the driver where its parameters are given, else into the minimum."""
    if not operating.is_capacitor_coupled(amplifier):
        return NotApplicable(DIRECT)
    farads, target = needed(amplifier, "output_capacitor.capacitance", "output_capacitor.target_cutoff")
    ohms, driver = _load_ohms(amplifier), seen_driver(amplifier)
    plain = capacitor.cutoff_frequency(capacitance=farads, load_resistance=ohms)
    value = plain if driver is None else _into_driver(amplifier, driver, farads)
    into = text(ohms, RESISTANCE) if driver is None else "the driver and its resonance"
    return Measure(
        value,
        f"-3 dB at {text(value, FREQUENCY)} with {text(farads, CAPACITANCE)} into {into}",
        go=target,
        without_stop=True,
        everywhere=True,
        remarks=_unfinished(amplifier, driver),
        needs=() if driver is not None or not is_started(amplifier) else parameters_of(amplifier).missing(),
        also=(*_peak(amplifier, driver, farads, plain), *_size(target, ohms)),
        next="it costs bass, not the amplifier; fit the next larger value if the bass is thin",
        method=INTO_MINIMUM if driver is None else INTO_DRIVER,
    )


def _into_driver(amplifier: Amplifier, driver: Driver, farads: Number) -> Number:
    return coupling.cutoff_frequency(driver=driver, capacitance=farads, series_resistor=in_series(amplifier))


def _unfinished(amplifier: Amplifier, driver: Driver | None) -> tuple[Remark, ...]:
    """Return what is said where a driver is begun and not finished: its resonance would change the answer."""
    if driver is not None or not is_started(amplifier):
        return ()
    keys = ", ".join(parameters_of(amplifier).missing())
    return (Remark(Verdict.UNVERIFIED, f"the driver's resonance is not counted: {keys} not given"),)


def _peak(amplifier: Amplifier, driver: Driver | None, farads: Number, plain: Number) -> tuple[Also, ...]:
    """Return the highest response of the low notes, and the figure into a resistor, beside that into a driver."""
    if driver is None or np.ndim(plain):
        return ()
    level, at = coupling.low_peak(driver=driver, capacitance=farads, series_resistor=in_series(amplifier))
    return (
        Also("highest response of the low notes", nominal(level), LEVEL),
        Also("frequency of that response", nominal(at), FREQUENCY),
        Also("-3 dB into a resistor of the minimum impedance", nominal(plain), FREQUENCY),
    )


def _size(target: Number, ohms: Number) -> tuple[Also, ...]:
    exact = nominal(capacitor.capacitance_for_cutoff(cutoff=target, load_resistance=ohms)) / 0.8
    if not np.isfinite(exact):
        return ()
    bought = float(np.asarray(preferred.next_preferred(exact, "E6")).flat[0])
    return (
        Also("capacitance for the target, at -20 %", exact, CAPACITANCE),
        Also("next preferred value", bought, CAPACITANCE),
    )


@finding("capacitor.voltage", Step.COLD_CHECKS, RATIO)
def check_voltage(amplifier: Amplifier, limits: Limits) -> Measure | NotApplicable:
    """Half the rail, or the larger part by the midpoint, at the highest mains over the rated voltage."""
    if not operating.is_capacitor_coupled(amplifier):
        return NotApplicable(DIRECT)
    (rated,) = needed(amplifier, "output_capacitor.rated_voltage")
    rail = operating.rails_as_read(amplifier)[0] * operating.highest_factor(amplifier)
    part = _larger_part(amplifier) * rail
    whole = rail / rated
    return Measure(
        part / rated,
        f"{text(part, VOLTAGE)} at rest on a capacitor of {text(rated, VOLTAGE)}; whole rail {text(rail, VOLTAGE)}",
        remarks=_whole_rail(whole, limits),
        also=(Also("whole rail over rated voltage", nominal(whole), RATIO), *_next_rating(rail)),
        next="fit a rated voltage that stands the whole rail at the highest mains",
        method="larger part of the rail at the highest mains over the rated voltage",
    )


def _larger_part(amplifier: Amplifier) -> Number:
    """Return the larger part into which the midpoint divides the rail, as a share of it."""
    share = operating.midpoint_share(amplifier)
    return np.maximum(share, 1.0 - share)


def _whole_rail(whole: Number, limits: Limits) -> tuple[Remark, ...]:
    above = limits["capacitor.voltage"].extra["whole_rail_caution_above"]
    if not np.any(np.asarray(whole) > above):
        return ()
    return (
        Remark(
            Verdict.CAUTION,
            "the rating holds only while nothing fails: a shorted upper device puts the whole rail on it",
        ),
    )


def _next_rating(rail: Number) -> tuple[Also, ...]:
    volts = nominal(rail)
    if not np.isfinite(volts) or volts > max(preferred.RATED_VOLTAGES):
        return ()
    rating = float(np.asarray(preferred.next_rated_voltage(volts)).flat[0])
    return (Also("rated voltage that stands the whole rail", rating, VOLTAGE),)


@finding("capacitor.ripple", Step.COLD_CHECKS, RATIO)
def check_ripple(amplifier: Amplifier, limits: Limits) -> Measure | NotApplicable:
    """Rms current at one third of clipping power over the rated ripple current."""
    if not operating.is_capacitor_coupled(amplifier):
        return NotApplicable(DIRECT)
    (rated,) = needed(amplifier, "output_capacitor.ripple_current")
    peak = stage.level_peak(clipping_peak=operating.clipping_peak(amplifier), fraction=thermal.ONE_THIRD)
    rms = peak / operating.nominal_load(amplifier)[0] / np.sqrt(2.0)
    return Measure(
        rms / rated,
        f"{text(rms, CURRENT)} rms at one third of clipping power",
        also=_ripple_also(amplifier, rms),
        next="look up the ripple current in the capacitor's data sheet (output_capacitor.ripple_current)",
        method="rms of the load current",
    )


def _ripple_also(amplifier: Amplifier, rms: Number) -> tuple[Also, ...]:
    found = [Also("ripple current at clipping", nominal(rms) * float(np.sqrt(3.0)), CURRENT)]
    if amplifier.output_capacitor.esr is not None:
        heat = nominal(rms**2 * amplifier.output_capacitor.esr)
        found.append(Also("heat in the capacitor at one third of clipping power", heat, POWER))
    return tuple(found)


@finding("capacitor.leakage", Step.BIAS, RATIO, at_bench=True)
def check_leakage(amplifier: Amplifier, limits: Limits) -> Measure | NotApplicable:
    """Leakage from the loaded reading over 0.01 C V."""
    if not operating.is_capacitor_coupled(amplifier):
        return NotApplicable(DIRECT)
    drop, resistor = needed(
        amplifier, "readings.capacitor_leakage_drop", "readings.capacitor_leakage_resistor"
    )
    farads, rated = needed(amplifier, "output_capacitor.capacitance", "output_capacitor.rated_voltage")
    current = capacitor.leakage_current(drop=drop, resistor=resistor)
    allowed = capacitor.leakage_limit(
        capacitance=farads, rated_voltage=rated, rate=limits["capacitor.leakage"].extra["leakage_per_charge"]
    )
    trend = amplifier.readings.capacitor_leakage_trend
    return Measure(
        current / allowed,
        f"{text(current, CURRENT)} leak ({trend or 'trend not given'}), {text(allowed, CURRENT)} is usual",
        stop=_leakage_stop(trend, limits),
        remarks=(*_trend_remarks(trend), *_flood(amplifier, drop, current / allowed, limits)),
        needs=() if trend else ("readings.capacitor_leakage_trend",),
        also=_leakage_also(amplifier, current, drop),
        next="load the terminal with 100 ohm to 1 kohm, never open, and read for ten minutes: it must fall",
        method="drop over resistor, against 0.01 times capacitance in µF times rated voltage, in µA",
    )


def _leakage_stop(trend: str | None, limits: Limits) -> Number:
    if trend == "rising":
        return -np.inf
    if trend == "falling":
        return np.inf
    return level(limits["capacitor.leakage"], "stop")


def _trend_remarks(trend: str | None) -> tuple[Remark, ...]:
    if trend is not None:
        return ()
    return (Remark(Verdict.UNVERIFIED, "whether the leakage falls or rises is not given"),)


def _flood(amplifier: Amplifier, drop: Number, times: Number, limits: Limits) -> tuple[Remark, ...]:
    """Return what holds back a leakage that falls and is still far too large to be left to fall unread."""
    if amplifier.readings.capacitor_leakage_trend != "falling":
        return ()
    extra, apart = limits["capacitor.leakage"].extra, aside(amplifier)
    midpoint = operating.midpoint_share(apart) * operating.rails_as_read(apart)[0]
    if np.abs(nominal(drop)) > extra["falling_share_of_midpoint"] * nominal(midpoint):
        found = f"takes {text(np.abs(drop), VOLTAGE)} of the {text(midpoint, VOLTAGE)} at the midpoint"
    elif nominal(times) > extra["falling_times_usual"]:
        found = f"is {nominal(times):.0f} times what is usual"
    else:
        return ()
    because = f"it falls, and still {found}: wait until it has fallen, and read again"
    return (Remark(Verdict.UNVERIFIED, because),)


def _leakage_also(amplifier: Amplifier, current: Number, drop: Number) -> tuple[Also, ...]:
    standing = operating.midpoint(aside(amplifier)) - drop
    found = [
        Also("leakage current", nominal(current), CURRENT),
        Also("heat in the capacitor", nominal(current * standing), POWER),
    ]
    coil, table = amplifier.loudspeaker.dc_resistance, amplifier.output_capacitor
    if coil is not None:
        volts = current * coil
        power = nominal(offset.coil_power(voltage=volts, dc_resistance=coil))
        found += [
            Also("DC across the loudspeaker", nominal(volts), VOLTAGE),
            Also("power in the coil", power, POWER),
        ]
    if table.bleeder is not None and table.capacitance is not None:
        settles = capacitor.settling_time(capacitance=table.capacitance, resistance=table.bleeder)
        found.append(Also("settles through the bleeder in", nominal(settles), TIME))
    return tuple(found)
