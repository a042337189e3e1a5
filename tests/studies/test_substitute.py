"""Another device against the fitted one: volt by volt, by hand and by the checks themselves."""

import math
from dataclasses import replace

import numpy as np
import pytest

from safeamp.answers import Substitute
from safeamp.findings import Verdict
from safeamp.reading import open_mapping
from safeamp.studies.substitute import SameDeviceError, changes, substitute
from tests.scenarios.sheets import changed, limits, tables

FITTED = {
    "kind": "bipolar",
    "voltage": "100 V",
    "current": "15 A",
    "power": "117 W",
    "junction_limit": "200 degC",
    "junction_to_case": "1.49 K/W",
    "safe_area": [["58 V", "2.017 A"], ["100 V", "0.45 A"]],
}
# its junction limit is taken as 200 degC too: both are derated alike, and the comparison is that of the curves
OTHER = {
    "kind": "bipolar",
    "voltage": "140 V",
    "current": "16 A",
    "power": "150 W",
    "junction_limit": "200 degC",
    "junction_to_case": "1.16 K/W",
    "safe_area": [["25 V", "6 A"], ["50 V", "1.1 A"], ["100 V", "0.28 A"], ["140 V", "0.12 A"]],
}


def compared(other=None, side="both", **sheet_changes):
    data = changed(tables("split_rail"), sheet_changes)
    data["device"] = {"fitted": FITTED, "other": OTHER if other is None else other}
    source = open_mapping(data, limits=limits())
    return substitute(source.sheet(), source.sheet(changes("other", side)), limits())


@pytest.fixture(scope="module")
def bigger():
    return compared()


def test_from_which_voltage_the_one_that_looks_bigger_is_the_weaker(bigger):
    # Where 117 W/v meets the line from (25 V, 6 A) to (50 V, 1.1 A): v = (25**s * 6/117)**(1/(s - 1)), s its slope;
    # both are derated by the same factor, because both allow 200 degC on the same heatsink.
    slope = math.log(6.0 / 1.1) / math.log(2.0)
    crossing = (25.0**slope * 6.0 / 117.0) ** (1.0 / (slope - 1.0))
    assert crossing == pytest.approx(29.68, abs=0.01)
    assert all(pair.larger for pair in bigger.pairs)
    for line in bigger.lines:
        (weaker,) = line.weaker
        assert weaker.low == pytest.approx(crossing, abs=0.02)
        assert weaker.high == pytest.approx(100.0, abs=0.02)
    ((word, text),) = bigger.because
    assert word is Verdict.CAUTION
    assert text.startswith(
        "upper: although none of its ratings is smaller, it allows less current than the fitted"
    )
    assert "from 29.7 V on" in text


def test_the_verdict_is_the_worst_of_the_findings_that_read_the_device(bigger):
    words = {one.id: (one.fitted.verdict, one.other.verdict) for one in bigger.findings}
    assert words["soa.loudspeaker"] == (Verdict.CAUTION, Verdict.STOP)
    assert bigger.verdict is Verdict.STOP
    assert bigger.exit_status == 5
    assert {"supply.rail_to_rail", "heat.junction", "soa.resistive_load", "bias.runaway"} <= set(words)
    assert "offset.output" not in words


def test_each_stands_at_its_own_temperature_and_uses_what_the_checks_say(bigger):
    findings = {one.id: one for one in bigger.findings}
    for line, identity in zip(bigger.lines, ("soa.resistive_load", "soa.loudspeaker"), strict=True):
        assert line.fitted.use == pytest.approx(findings[identity].fitted.nominal, rel=1e-9)
        assert line.other.use == pytest.approx(findings[identity].other.nominal, rel=1e-9)
        assert line.fitted.case == pytest.approx(line.other.case)
        assert line.fitted.junction > line.other.junction > line.other.case  # 1.49 against 1.16 K/W
    assert bigger.lines[0].fitted.junction == pytest.approx(findings["heat.junction"].fitted.nominal)


def test_the_table_holds_every_volt(bigger):
    frame = bigger.frame()
    line = frame[frame["load"] == "8 ohm at up to 45 deg"].set_index("voltage")
    assert list(line.index) == [float(volts) for volts in range(1, 141)]
    assert not line.loc[29.0, "other allows less"]
    assert line.loc[30.0, "other allows less"]
    assert line.loc[110.0, "fitted allowed"] == 0.0
    # no voltage above the rail of 34 V and the peak below it
    assert np.isnan(line.loc[80.0, "fitted asked"])
    left = (200.0 - bigger.lines[1].fitted.case) / 175.0
    assert line.loc[40.0, "fitted allowed"] == pytest.approx(left * 117.0 / 40.0)
    assert line.loc[50.0, "other allowed"] == pytest.approx(left * 1.1)
    used = line.loc[40.0, "other asked"] / line.loc[40.0, "other allowed"]
    assert line.loc[40.0, "other use"] == pytest.approx(used)
    assert line["other use"].max() <= bigger.lines[1].other.use * (1 + 1e-9)
    assert line["other use"].max() == pytest.approx(bigger.lines[1].other.use, rel=0.01)


def test_a_stronger_device_is_weaker_nowhere():
    strong = {
        **FITTED,
        "power": "150 W",
        "junction_to_case": "1.16 K/W",
        "safe_area": [["60 V", "2.5 A"], ["100 V", "0.6 A"]],
    }
    found = compared(strong)
    assert all(not line.weaker for line in found.lines)
    assert not found.because
    assert found.verdict is max(one.other.verdict for one in found.findings)


def test_a_range_beyond_the_load_line_is_told_apart():
    late = {**FITTED, "safe_area": [["58 V", "2.017 A"], ["100 V", "0.40 A"]]}
    found = compared(late, **{"supply.no_load": "22 V, measured", "supply.full_load": "20 V, measured"})
    for line in found.lines:
        assert line.weaker[0].low == pytest.approx(58.0, abs=0.05)
        assert not line.weaker_in_use
    assert not found.because


def test_one_side_only_and_as_built_no_longer_excuses():
    data = changed(tables("split_rail"), {"stage.rated_load": "8 ohm", "stage.original_devices": True})
    data["device"] = {"fitted": FITTED, "other": OTHER}
    source = open_mapping(data, limits=limits())
    other = source.sheet(changes("other", "lower"))
    assert (other.amplifier.stage.upper, other.amplifier.stage.lower) == ("fitted", "other")
    assert other.amplifier.stage.original_devices is False
    found = substitute(source.sheet(), other, limits())
    assert [pair.side for pair in found.pairs] == ["lower"]
    assert {line.side for line in found.lines} == {"lower"}
    loudspeaker = next(one.other for one in found.findings if one.id == "soa.loudspeaker")
    assert loudspeaker.verdict is Verdict.STOP
    assert "stage.original_devices" in loudspeaker.because[0]


def test_another_kind_of_device_is_never_cleared():
    found = compared({**OTHER, "kind": "vertical mosfet", "transconductance_parameter": "4 A/V2"})
    assert (
        Verdict.UNVERIFIED,
        "upper: a vertical mosfet where a bipolar was; bias generator and drive must suit",
    ) in (found.because)
    assert not found.verdict.clears


def test_without_a_curve_or_with_typical_data_nothing_is_cleared():
    bare = {key: value for key, value in OTHER.items() if key != "safe_area"}
    assert not compared(bare).verdict.clears
    data = tables("healthy")
    source = open_mapping(data, limits=limits())
    generic = source.sheet(changes("to3-npn-140v-150w", "upper"))
    found = substitute(source.sheet(), generic, limits())
    assert found.verdict >= Verdict.UNVERIFIED


def test_a_missing_thermal_resistance_makes_no_use(bigger):
    free = {**OTHER, "junction_to_ambient": "40 K/W"}
    del free["junction_to_case"]
    found = compared(free)
    assert np.isnan(found.lines[0].other.junction)
    assert not found.verdict.clears


def test_the_same_device_is_no_substitute():
    data = tables("split_rail")
    source = open_mapping(data, limits=limits())
    with pytest.raises(SameDeviceError, match="fitted is what is fitted; name another device"):
        substitute(source.sheet(), source.sheet(changes("fitted", "both")), limits())


def test_no_verdict_better_than_what_it_rests_on(bigger):
    with pytest.raises(ValueError, match="the verdict caution is better than what it rests on, stop"):
        replace(bigger, verdict=Verdict.CAUTION)
    with pytest.raises(ValueError, match="the verdict go is better than what it rests on, unverified"):
        replace(bigger, verdict=Verdict.GO, findings=(), because=())
    assert isinstance(replace(bigger, verdict=Verdict.STOP), Substitute)


@pytest.mark.parametrize("name", ["single_rail", "healthy", "old_mains"])
def test_other_stages_are_compared_too(name):
    data = tables(name)
    data["device"]["stronger"] = {
        **data["device"][data["stage"]["upper"]],
        "current": "40 A",
    }
    source = open_mapping(data, limits=limits())
    found = substitute(source.sheet(), source.sheet(changes("stronger", "upper")), limits())
    assert found.lines
    assert all(not line.weaker for line in found.lines)
    assert all(line.other.use <= line.fitted.use * (1 + 1e-9) for line in found.lines)
