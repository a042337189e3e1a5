"""What is no number, or has no bound, never reaches go."""

import json
from dataclasses import replace

import numpy as np
import pytest

from safeamp.amplifier import value_at, with_values
from safeamp.checks import CHECKS
from safeamp.findings import Finding, Measure, Verdict
from safeamp.report.json_ import as_json
from safeamp.studies.findings import Bench, find
from tests.scenarios.sheets import finding, limits, report, sheet

SHEETS = [
    "healthy",
    "single_rail",
    "15w_single_rail_to3",
    "60w_two_pairs",
    "100w_lateral_mosfet",
    "bench_mockup",
]


def without(read, path):
    """Return the sheet with one value that is no number; the nominal case is enough for it."""
    return replace(read, amplifier=with_values(read.amplifier, {path: np.nan}), entries={})


def matters(check, read, path):
    """Whether the number of a check hangs on a value: it moves when the value does."""

    def number(factor):
        amplifier = with_values(read.amplifier, {path: factor * value_at(read.amplifier, path)})
        try:
            with np.errstate(all="ignore"):
                measure = check.run(amplifier, limits())
        except ValueError:
            return None
        if not isinstance(measure, Measure):
            return None
        return [repr(np.asarray(part)) for part in (measure.value, measure.go, measure.stop)]

    still = number(1.0)
    return any(number(factor) not in (None, still) for factor in (0.5, 1.1))


@pytest.mark.parametrize("name", SHEETS)
def test_no_number_is_never_go(name):
    read, tried = sheet(name), 0
    for one in report(name).findings:
        check = CHECKS[one.id]
        paths = [item.key for item in one.inputs if item.key in read.entries]
        for path in paths if one.verdict is Verdict.GO else ():
            tried += 1
            found = find(check, Bench(without(read, path), limits()))
            if isinstance(found, Finding) and found.verdict is Verdict.GO:
                assert not matters(check, read, path), (one.id, path)
    assert tried >= 15


@pytest.mark.parametrize("name", SHEETS)
def test_the_corners_may_not_be_unknown_either(name):
    read = sheet(name)
    for one in report(name).findings:
        spread = [
            item.key for item in one.inputs if item.key in read.entries and read.entries[item.key].spread
        ]
        for path in spread:
            if one.verdict is Verdict.GO and matters(CHECKS[one.id], read, path):
                entries = {**read.entries, path: replace(read.entries[path], high=np.nan, low=-np.inf)}
                found = find(CHECKS[one.id], Bench(replace(read, entries=entries), limits()))
                assert found.verdict is not Verdict.GO, (one.id, path)


def test_current_where_none_is_allowed_is_a_stop_without_bound():
    # 34 V rails reach 68 V across a device that stands 50: beyond its rating no current is allowed
    weak = {
        "device.fitted.voltage": "50 V, data sheet",
        "device.fitted.safe_area": [["40 V", "3.75 A"], ["50 V", "2.7 A"]],
    }
    answer = report("split_rail", weak)
    one = finding(answer, "soa.loudspeaker")
    assert one.verdict is Verdict.STOP
    assert one.unbounded
    assert one.nominal is None
    printed = next(f for f in json.loads(as_json(answer))["findings"] if f["id"] == "soa.loudspeaker")
    assert printed["value"]["unbounded"] is True
    assert printed["value"]["nominal"] is None


def test_no_json_holds_what_is_no_number():
    for name in SHEETS:
        text = as_json(report(name))
        assert "NaN" not in text
        assert "Infinity" not in text


def test_current_beyond_the_rated_voltage_at_the_highest_mains_is_no_go():
    # with idle at the end of its swing current flows up to 60 V at the present mains, a tenth more at the highest
    weak = {
        "device.fitted.voltage": "62 V, data sheet",
        "device.fitted.safe_area": [["40 V", "3.75 A"], ["62 V", "2.4 A"]],
        "loudspeaker.nominal_impedance": "16 ohm, marked",
        "loudspeaker.minimum_impedance": "13 ohm",
        "loudspeaker.dc_resistance": "12 ohm, measured",
    }
    one = finding(report("split_rail", weak), "soa.loudspeaker")
    assert one.nominal < 0.8
    assert one.worst is None
    assert one.verdict is Verdict.CAUTION
    assert not one.unbounded


def test_the_internal_error_of_a_check_is_unverified_and_says_so():
    read = sheet("healthy")
    broken = replace(read, amplifier=with_values(read.amplifier, {"stage.emitter_resistor": -1.0}))
    one = find(CHECKS["soa.loudspeaker"], Bench(broken, limits()))
    assert one.verdict is Verdict.UNVERIFIED
    assert one.says.startswith("cannot be computed: ")
