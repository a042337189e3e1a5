"""No point inside the tolerances is worse than the worst corner that a finding reports.

Allowed: 1 % of the value; for temperatures 1 % of the rise above air; for voltages 0.1 mV.
"""

from functools import cache

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from safeamp.amplifier import with_values
from safeamp.checks import CHECKS
from safeamp.findings import Measure, Verdict
from tests.scenarios.sheets import limits, report, sheet

POINTS = 160
#: Sheets with six to twelve toleranced inputs of a finding, some of them wide.
SHEETS = {
    "split_rail": {
        "supply.no_load": "34 V ±10 %, measured",
        "supply.full_load": "31 V ±5 %, measured",
        "stage.emitter_resistor": "0.33 ohm ±50 %",
        "stage.idle": "2..60 mV, measured",
        "stage.swing_loss": "0..6 V",
        "loudspeaker.dc_resistance": "3.5..7 ohm, measured",
        "loudspeaker.phase_angle": "20..70 deg",
    },
    "healthy": {
        "supply.no_load": "22 V ±5 %, measured",
        "stage.idle": "14 mV ±30 %, measured",
        "stage.emitter_resistor": "0.33 ohm ±10 %",
        "heatsink.case_to_sink": "0.2..1.2 K/W, measured",
        "loudspeaker.nominal_impedance": "4..16 ohm, marked",
        "readings.idle_upper": ["14 mV ±20 %, measured"],
        "readings.idle_lower": ["13.6 mV ±20 %, measured"],
        "readings.offset_warm": "-40..40 mV, measured",
        "readings.heatsink_temperature": "37 degC ±1 K, measured",
        "mains.frequency": "49..51 Hz",
    },
    "single_rail": {
        "supply.no_load": "64 V ±10 %, measured",
        "readings.midpoint": "28..38 V, measured",
        "stage.swing_loss_up": "0..6 V",
        "stage.swing_loss_down": "2 V ±50 %",
        "stage.emitter_resistor": "0.47 ohm ±20 %",
        "output_capacitor.rated_voltage": "40 V ±5 %",
        "output_capacitor.ripple_current": "1.5 A ±20 %, data sheet",
    },
    "bench_mockup": {
        "supply.no_load": "12 V ±10 %",
        "stage.swing_loss": "0.5..2 V",
        "loudspeaker.nominal_impedance": "120..180 ohm",
        "loudspeaker.minimum_impedance": "100..150 ohm",
        "device.fitted.junction_to_ambient": "150..250 K/W",
    },
    "class_a": {
        "supply.no_load": "24 V ±10 %",
        "supply.full_load": "22.5 V ±5 %",
        "stage.idle": "0.2..2 A, measured",
        "stage.emitter_resistor": "0.47 ohm ±30 %",
        "stage.swing_loss": "0..4 V",
        "loudspeaker.nominal_impedance": "6..10 ohm",
    },
    "mosfet_substitute": {
        "stage.idle": "5..60 mA",
        "heatsink.air": "15..35 degC, measured",
        "heatsink.sink_to_air": "0.3..1.5 K/W, measured",
        "heatsink.case_to_sink": "0.45 K/W ±20 %, measured",
        "supply.no_load": "40..52 V, measured",
        "supply.full_load": "38..40 V, measured",
        "loudspeaker.nominal_impedance": "4..8 ohm",
    },
}


@cache
def bench(name):
    """Return the sheet and its toleranced entries."""
    read = sheet(name, SHEETS[name])
    return read, [entry for entry in read.entries.values() if entry.spread]


def scattered(entries, seed):
    """Return points inside the tolerances by key path: each value low, high or anywhere between."""
    chance = np.random.default_rng(seed)
    found = {}
    for entry in entries:
        inside = chance.uniform(entry.low, entry.high, POINTS)
        where = chance.integers(0, 3, POINTS)
        found[entry.path] = np.choose(
            where, [np.full(POINTS, entry.low), np.full(POINTS, entry.high), inside]
        )
    return found


def allowed(check, one, amplifier):
    """Return by how much a point may be worse than the worst corner."""
    if check.kind.unit == "degC":
        air = 25.0 if check.id == "touch.temperature" else float(amplifier.heatsink.air)
        return 0.01 * abs(one.worst - air)
    least = 1e-4 if check.kind.unit == "V" else 1e-9
    return max(0.01 * abs(one.worst), least)


def over(value, count=POINTS):
    return np.broadcast_to(np.asarray(value, dtype=float), (count,))


def beyond(measure, limit):
    """Return whether any point is beyond its stop level."""
    stop = limit.stop if measure.stop is None else measure.stop
    if stop is None or measure.without_stop:
        return False
    value, level = over(measure.value), over(stop)
    close = 1e-6 * np.where(np.isfinite(level), np.abs(level), 0.0)
    return bool(np.any(value < level - close if limit.sense == "at least" else value > level + close))


@pytest.mark.parametrize("name", list(SHEETS))
@settings(max_examples=6, deadline=None)
@given(seed=st.integers(0, 2**32 - 1))
def test_no_point_is_worse_than_the_worst_corner(name, seed):
    read, entries = bench(name)
    answer, points = report_of(name), scattered(entries, seed)
    amplifier = with_values(read.amplifier, points)
    for one in answer.findings:
        check, limit = CHECKS[one.id], limits()[one.id]
        with np.errstate(all="ignore"):
            measure = check.run(amplifier, limits())
        if one.nominal is None or not isinstance(measure, Measure) or measure.word is not None:
            continue
        value = over(measure.value)
        assert not np.any(np.isnan(value)) or one.verdict >= Verdict.UNVERIFIED, one.id
        assert not beyond(measure, limit) or one.verdict is not Verdict.GO, one.id
        if one.worst is None or limit.sense == "between" or moving(measure):
            continue
        excess = one.worst - value if limit.sense == "at least" else value - one.worst
        if not np.all(np.isinf(excess)):
            assert np.nanmax(excess) <= allowed(check, one, read.amplifier), (
                one.id,
                {path: float(column[np.nanargmax(excess)]) for path, column in points.items()},
            )


def moving(measure):
    """Return whether the levels move with the cases, so that the largest value need not be the worst case."""
    return any(np.size(np.unique(over(level))) > 1 for level in (measure.go, measure.stop) if np.ndim(level))


@cache
def report_of(name):
    return report(name, SHEETS[name])


@pytest.mark.parametrize("name", list(SHEETS))
def test_these_sheets_are_wide_enough(name):
    answer, (_, entries) = report_of(name), bench(name)
    assert len(entries) >= 6
    moved = [one for one in answer.findings if one.worst is not None and one.worst != one.nominal]
    assert len(moved) >= 5


def test_a_midpoint_that_nobody_read_may_be_exact():
    # power is largest with the midpoint at half the rail, between the ends of what is assumed
    entry = bench("bench_mockup")[0].entries["readings.midpoint_share"]
    assert entry.middle == (0.5,)


def test_levels_of_the_midpoint_stand_where_both_sides_clip_alike():
    entry = bench("single_rail")[0].entries["readings.midpoint"]
    # nominal: 64 V, loaded 58 V, losses 3 V up (middle of 0..6) and 2 V down; high: 70.4 V, losses 0 V and 1 V
    wanted = (32.0 * (1 + (2 - 3) / 58), 35.2 * (1 + (1 - 0) / 58))
    assert entry.middle == pytest.approx(wanted)
