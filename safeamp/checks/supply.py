"""The supply before power: fuse, rail to rail, reservoir, mains, transformer."""

from __future__ import annotations

import numpy as np

from safeamp.amplifier import Amplifier, Fuse
from safeamp.checks import operating, thermal
from safeamp.checks.beside import plain
from safeamp.checks.registry import finding
from safeamp.checks.trace import aside, miss, needed
from safeamp.checks.words import nominal, text
from safeamp.findings import Also, Measure, NotApplicable, Remark, Step, Verdict
from safeamp.limits import Limits
from safeamp.physics import stage, supply
from safeamp.quantities import CURRENT, RATIO, VOLTAGE, Number, show

NEXT_FUSE = "read the fuse fitted and the one printed on plate or board: letter, amperes"

#: Letters of the breaking capacity, rising: 35 A or ten times the rating, 150 A, 1500 A (IEC 60127-2, memory).
BREAKING = "LEH"


def mean_rail_current(amplifier: Amplifier) -> Number:
    """Return the mean current of one rail at clipping into the nominal load, both bridged sides together, A."""
    magnitude, _ = operating.nominal_load(amplifier)
    each = stage.mean_supply_current(peak_current=operating.clipping_peak(amplifier) / magnitude)
    return each * (2.0 if amplifier.stage.bridged else 1.0)


@finding("supply.fuse", Step.COLD_CHECKS, RATIO)
def check_fuse(amplifier: Amplifier, limits: Limits) -> Measure | NotApplicable:
    """Fitted rating over the plate's; another letter is a stop; without a plate against the mean current."""
    fitted, plate = amplifier.supply.rail_fuse, amplifier.supply.rail_fuse_rated
    no_plate = "supply.rail_fuse_rated" in amplifier.absent
    unfused = "supply.rail_fuse" in amplifier.absent
    if unfused and no_plate:
        return NotApplicable('supply.rail_fuse and supply.rail_fuse_rated are "none"')
    if unfused and plate is not None:
        return Measure(np.inf, f"no fuse is fitted where the plate prints {_named(plate)}", next=NEXT_FUSE)
    if fitted is not None and no_plate:
        return _without_plate(amplifier, fitted, limits)
    if fitted is None or plate is None:
        miss(amplifier, *_missing_fuses(fitted, plate))
        return Measure(np.nan, "fuse fitted and fuse printed are not both known", next=NEXT_FUSE)
    return _against_plate(fitted, plate)


def _missing_fuses(fitted: Fuse | None, plate: Fuse | None) -> list[str]:
    pairs = (("supply.rail_fuse", fitted), ("supply.rail_fuse_rated", plate))
    return [path for path, fuse in pairs if fuse is None]


def _named(fuse: Fuse) -> str:
    volts = "" if fuse.voltage is None else show(fuse.voltage, VOLTAGE)
    return " ".join(part for part in (fuse.letter, show(fuse.rating, CURRENT), fuse.capacity, volts) if part)


def _imprint_remarks(fitted: Fuse, plate: Fuse) -> tuple[Remark, ...]:
    """Return what the fitted fuse does less than the printed one, where both say it."""
    found = []
    if fitted.capacity and plate.capacity:
        one, other = BREAKING.index(fitted.capacity), BREAKING.index(plate.capacity)
        if one < other:
            found.append(f"it interrupts less ({fitted.capacity}) than the one printed ({plate.capacity})")
    if fitted.voltage is not None and plate.voltage is not None and fitted.voltage < plate.voltage:
        fits, prints = show(fitted.voltage, VOLTAGE), show(plate.voltage, VOLTAGE)
        found.append(f"it is made for {fits}, the one printed for {prints}")
    return tuple(Remark(Verdict.CAUTION, f"{one}: at a short it may arc on or burst") for one in found)


def _against_plate(fitted: Fuse, plate: Fuse) -> Measure:
    ratio = fitted.rating / plate.rating
    says = f"{_named(fitted)} fitted, {_named(plate)} printed"
    if fitted.letter != plate.letter:
        return Measure(
            ratio, f"{says}: another time characteristic", stop=-np.inf, next="fit the fuse that is printed"
        )
    return Measure(
        ratio,
        says,
        remarks=_imprint_remarks(fitted, plate),
        next="fit the fuse that is printed, never the next size up",
        method="rated currents compared",
    )


def _without_plate(amplifier: Amplifier, fitted: Fuse, limits: Limits) -> Measure:
    times = limits["supply.fuse"].extra["caution_above_times_mean_current"]
    mean = mean_rail_current(amplifier)
    return Measure(
        fitted.rating / mean,
        f"{_named(fitted)} fitted, nothing printed; mean rail current at clipping {text(mean, CURRENT)}",
        go=times,
        without_stop=True,
        next="look for the maker's service sheet: the printed fuse outranks this comparison",
        method="fuse rating over the mean rail current of a sine at clipping",
    )


@finding("supply.rail_to_rail", Step.COLD_CHECKS, RATIO)
def check_rail_to_rail(amplifier: Amplifier, limits: Limits) -> Measure:
    """Rail to rail at the highest mains without load over the weakest of outputs and drivers."""
    span = operating.rail_to_rail_at_highest(amplifier)
    weakest, name = _weakest(amplifier)
    return Measure(
        span / weakest,
        f"{text(span, VOLTAGE)} between the rails at the highest mains, {name} stands {text(weakest, VOLTAGE)}",
        remarks=_driver_remarks(amplifier, span, limits),
        also=(Also("rail to rail at the highest mains", nominal(span), VOLTAGE),),
        next="enter the drivers of the output devices as stage.drivers with their V_CEO"
        if not amplifier.stage.drivers
        else "fit devices whose V_CEO (never V_CBO) stands rail to rail at the highest mains",
        method="no-load rails scaled to the highest mains, over the lowest V_CEO or V_DSS",
    )


def _weakest(amplifier: Amplifier) -> tuple[Number, str]:
    table = amplifier.stage
    names = [str(table.upper), str(table.lower), *(table.drivers or ())]
    volts = [needed(amplifier, f"device.{name}.voltage")[0] for name in dict.fromkeys(names)]
    lowest = volts[int(np.argmin([nominal(value) for value in volts]))]
    name = list(dict.fromkeys(names))[int(np.argmin([nominal(value) for value in volts]))]
    weakest = volts[0]
    for value in volts[1:]:
        weakest = np.minimum(weakest, value)
    return (weakest if np.ndim(weakest) else lowest), name


def _driver_remarks(amplifier: Amplifier, span: Number, limits: Limits) -> tuple[Remark, ...]:
    above = limits["supply.rail_to_rail"].extra["drivers_not_given_caution_above"]
    if amplifier.stage.drivers or "stage.drivers" in amplifier.absent or not np.any(np.asarray(span) > above):
        return ()
    return (Remark(Verdict.CAUTION, "the drivers stand the same voltage and are not given (stage.drivers)"),)


@finding("supply.reservoir_voltage", Step.COLD_CHECKS, RATIO)
def check_reservoir(amplifier: Amplifier, limits: Limits) -> Measure:
    """No-load rail at the highest mains over the reservoir's rated voltage."""
    (rated,) = needed(amplifier, "supply.reservoir_rated_voltage")
    larger = operating.rails_as_read(amplifier)
    rail = np.maximum(larger[0], larger[-1]) * operating.highest_factor(amplifier)
    return Measure(
        rail / rated,
        f"{text(rail, VOLTAGE)} at the highest mains on a reservoir of {text(rated, VOLTAGE)}",
        stop=_reservoir_stop(amplifier, limits),
        also=_ripple(amplifier),
        next="read the rated voltage printed on each reservoir; fit one that stands the rail at the highest mains",
        method="no-load rail scaled to the highest mains, over the rated voltage",
    )


def _reservoir_stop(amplifier: Amplifier, limits: Limits) -> Number:
    """Return the use at the highest mains beyond which it is a stop: 1 at the actual mains, more at the highest."""
    limit = limits["supply.reservoir_voltage"]
    if operating.is_fixed(amplifier):
        return float(limit.stop)  # type: ignore[arg-type]
    highest, actual = needed(amplifier, "mains.highest", "mains.actual")
    at_actual = limit.stop * highest / actual
    return np.minimum(limit.extra["stop_at_highest"], at_actual)


def _ripple(amplifier: Amplifier) -> tuple[Also, ...]:
    table, frequency = amplifier.supply, amplifier.mains.frequency
    if table.reservoir is None or frequency is None or operating.is_fixed(amplifier):
        return ()
    if plain(amplifier) is None:  # over the corners it would be work for nothing, and may have none
        return ()
    pp = supply.ripple_peak_to_peak(
        current=mean_rail_current(aside(amplifier)), capacitance=table.reservoir, frequency=frequency
    )
    return (Also("ripple at clipping, peak to peak at most", nominal(pp), VOLTAGE),)


@finding("supply.mains", Step.COLD_CHECKS, RATIO)
def check_mains(amplifier: Amplifier, limits: Limits) -> Measure | NotApplicable:
    """Volts per hertz of the mains today against the plate."""
    if operating.is_fixed(amplifier):
        return NotApplicable(
            f'supply.source is "{amplifier.supply.source}": the mains does not set these rails'
        )
    paths = ("mains.actual", "mains.rated", "mains.frequency", "mains.rated_frequency")
    actual, rated, frequency, rated_frequency = needed(amplifier, *paths)
    return Measure(
        supply.volts_per_hertz(
            actual=actual, rated=rated, frequency=frequency, rated_frequency=rated_frequency
        ),
        f"{text(actual, VOLTAGE)} in the socket, {text(rated, VOLTAGE)} on the plate",
        next="measure the mains today and read voltage and frequency on the amplifier's plate",
        method="(actual over rated) times (rated frequency over frequency)",
    )


@finding("supply.transformer", Step.COLD_CHECKS, RATIO)
def check_transformer(amplifier: Amplifier, limits: Limits) -> Measure | None:
    """Apparent power at one third of clipping power over the transformer's rating; judged where it is given."""
    rating = amplifier.supply.transformer_power
    if rating is None:
        return None
    drawn = thermal.at_level(amplifier, thermal.ONE_THIRD)
    sides = 2.0 if amplifier.stage.bridged else 1.0
    mean = drawn.mean_current * operating.conducting(amplifier) * sides
    half = operating.level_half_supply(amplifier, thermal.ONE_THIRD)
    needs = supply.transformer_va(power=2.0 * half * mean, mean_current=mean)
    return Measure(
        needs / rating,
        f"needs {nominal(needs):.3g} VA at one third of clipping power of this channel",
        also=_secondary(amplifier, mean),
        next="read the rating of the transformer; other channels on it add to this",
        method="1.4 times (power drawn from the rails plus 2 V times their mean current)",
    )


def _secondary(amplifier: Amplifier, mean: Number) -> tuple[Also, ...]:
    found = [Also("secondary current, rms", nominal(supply.secondary_current(mean_current=mean)), CURRENT)]
    if amplifier.supply.secondary is not None:
        rails = operating.rails_as_read(amplifier)
        found.append(
            Also("no-load rail over secondary voltage", nominal(rails[0] / amplifier.supply.secondary), RATIO)
        )
    return tuple(found)
