"""Every point of a measured curve counts and nothing else does; what the corners leave out is proven to be small."""

import numpy as np
import pytest

from safeamp.amplifier import at_case, number_of_cases
from safeamp.checks import curve as curves
from safeamp.checks import operating, safe_area, thermal
from safeamp.findings import Verdict
from safeamp.physics.safe_area import angle_use
from safeamp.studies import corners
from tests.checks.loads import RULES, curve_of, flat_curve, judged, wild_curve, with_curve, woofer
from tests.scenarios.sheets import GONE, finding, report, sheet

TOLERANCED = {
    "split_rail": {
        "stage.emitter_resistor": "0.22 ohm ±10 %",
        "stage.swing_loss": "3 V ±20 %",
        "supply.no_load": "35 V ±3 %",
    },
    "single_rail": {"output_capacitor.capacitance": "1000 uF ±20 %", "output_capacitor.esr": "80 mohm ±40 %"},
}


def cases_of(name, changes=None):
    """Return a scenario as an amplifier of all corners."""
    read = sheet(name, {**TOLERANCED.get(name, {}), **(changes or {})})
    entries = [entry for entry in read.entries.values() if entry.spread][: corners.COMPLETE]
    return read.amplifier, corners.complete_design(entries).applied_to(read.amplifier)


@pytest.mark.parametrize("name", ["split_rail", "single_rail", "healthy"])
@pytest.mark.parametrize("seed", range(4))
def test_ranked_corners_lack_less_than_a_thousandth(name, seed, monkeypatch):
    _, cases = cases_of(name)
    amplifier = with_curve(cases, wild_curve(seed))
    monkeypatch.setattr(curves, "FULL", 10**9)
    full = safe_area.worst_into_loudspeaker(amplifier)
    monkeypatch.setattr(curves, "FULL", 0)
    ranked = safe_area.worst_into_loudspeaker(amplifier)
    assert full.use.shape == (number_of_cases(cases),)
    assert np.all(ranked.use >= full.use * (1.0 - 1e-3))
    assert np.all(ranked.use <= full.use * (1.0 + 1e-12))
    assert np.array_equal(ranked.unknown, full.unknown)


def test_a_long_curve_lacks_less_than_a_thousandth(monkeypatch):
    _, cases = cases_of("split_rail")
    amplifier = with_curve(cases, curve_of(woofer(), count=240))
    monkeypatch.setattr(curves, "RANKED", 40)
    ranked = safe_area.worst_into_loudspeaker(amplifier)
    monkeypatch.setattr(curves, "FULL", 10**9)
    full = safe_area.worst_into_loudspeaker(amplifier)
    assert np.all(ranked.use >= full.use * (1.0 - 1e-3))


def test_ranking_counts_a_point_that_is_worst_at_some_corners_only():
    use = np.array([[1.0, 0.99, 0.5, 0.98], [1.0, 1.01, 0.5, 0.98]])
    unknown = np.zeros(use.shape, dtype=bool)
    assert sorted(curves._chosen(use, unknown)) == [0, 1]
    unknown[1, 2] = True
    assert sorted(curves._chosen(use, unknown)) == [0, 1, 2]
    use[0, 3] = np.inf
    assert sorted(curves._chosen(use, unknown)) == [1, 2, 3]


@pytest.mark.parametrize("name", ["split_rail", "healthy"])
def test_a_flat_curve_is_the_sheet_without_one(name, tmp_path):
    # 8 ohm at 45 deg everywhere: the envelope of all angles up to 45 deg is worst at 45 deg itself here
    found = finding(judged(tmp_path, flat_curve(8.0, 45.0), name), "soa.loudspeaker")
    without = finding(report(name, {"loudspeaker.minimum_impedance": "8 ohm"}), "soa.loudspeaker")
    assert found.nominal == pytest.approx(without.nominal, rel=2e-3)
    assert found.worst == pytest.approx(without.worst, rel=2e-3)


def test_each_point_counts_with_its_own_magnitude_and_angle():
    amplifier = with_curve(sheet("split_rail", RULES).amplifier, wild_curve(3))
    points = curves.points_of(amplifier)
    heating = curves.heating_load(amplifier, points, thermal.ONE_EIGHTH)
    case = thermal.hotter_case(amplifier, "upper", thermal.ONE_EIGHTH, load=heating)
    side = operating.sides(amplifier)[0]
    each = [
        angle_use(
            half_supply=side.burst,
            peak=operating.peak_into(amplifier, side.burst, side.loss, ohms),
            load_magnitude=ohms,
            phase_angle=degrees,
            conducting=1,
            emitter_resistor=amplifier.stage.emitter_resistor,
            idle_current=operating.idle_current(amplifier),
            law=operating.law_of(side.device),
            imbalance=0.0,
            case_temperature=case,
            rating=safe_area.rating_of(amplifier, "upper"),
        ).use
        for ohms, degrees in zip(points.impedance, points.angle, strict=True)
    ]
    found = safe_area.worst_into_loudspeaker(amplifier)
    assert found.use == pytest.approx(max(each))
    assert found.frequency == pytest.approx(points.frequency[int(np.argmax(each))])


def test_the_worst_point_is_named_with_its_frequency(tmp_path):
    answer = judged(tmp_path, curve_of(woofer()), "split_rail")
    one = finding(answer, "soa.loudspeaker")
    assert one.at["frequency"] == pytest.approx(2540.0, rel=0.05)
    assert "kHz of the curve" in one.says
    assert all(also.at != "60 deg" for also in one.also)
    assert "every point of its impedance curve" in answer.scope
    shown = {item.key: item.value for item in one.inputs}
    assert shown["loudspeaker.impedance_curve"] == "curve.csv"
    assert "loudspeaker.phase_angle" not in shown


def test_no_assumed_angle_and_no_word_of_a_key_not_assessed(tmp_path):
    answer = judged(tmp_path, curve_of(woofer()), "healthy")
    assert answer.unassessed == {}
    assert finding(answer, "soa.loudspeaker").verdict is Verdict.GO
    assert all(one.key != "loudspeaker.phase_angle" for one in answer.assumptions)


def test_a_curve_with_a_bad_point_stops_what_the_rule_would_pass(tmp_path):
    good, bad = flat_curve(8.0, 20.0), flat_curve(8.0, 20.0)
    low = type(bad)(bad.frequencies, (8.0, 8.0, 3.3), (20.0, 20.0, -60.0))
    assert finding(judged(tmp_path, good, "split_rail"), "soa.loudspeaker").nominal < 1.0
    one = finding(judged(tmp_path, low, "split_rail"), "soa.loudspeaker")
    assert one.verdict is Verdict.STOP
    assert one.at["frequency"] == 2000.0


def test_as_built_needs_an_amplifier_without_a_curve(tmp_path):
    built = {
        "stage.rated_load": "4 ohm",
        "stage.original_devices": True,
        "mains.rated": "230 V",
        "loudspeaker.nominal_impedance": "5.5 ohm",
        "loudspeaker.dc_resistance": "4.5 ohm",
    }
    ruled = finding(
        report("split_rail", {**built, "loudspeaker.minimum_impedance": "5.5 ohm"}), "soa.loudspeaker"
    )
    assert 1.0 < ruled.nominal < 1.8
    assert ruled.verdict is Verdict.CAUTION
    measured = finding(judged(tmp_path, flat_curve(5.5, 45.0), "split_rail", built), "soa.loudspeaker")
    assert 1.0 < measured.nominal < 1.8
    assert measured.verdict is Verdict.STOP


def test_several_loudspeakers_and_what_stands_in_series(tmp_path):
    curve = curve_of(woofer())

    def points(changes):
        amplifier = with_curve(sheet("split_rail", changes).amplifier, curve)
        return curves.seen(amplifier, curves.points_of(amplifier))

    alone, turned = points({})
    assert points({"loudspeaker.parallel": 2})[0] == pytest.approx(alone / 2.0)
    assert points({"loudspeaker.series": 2})[0] == pytest.approx(alone * 2.0)
    both = points({"loudspeaker.series": 2, "loudspeaker.parallel": 2})
    assert both[0] == pytest.approx(alone)
    assert both[1] == pytest.approx(turned)
    resistor = points({"stage.series_resistor": "1 ohm"})
    wanted = alone * np.exp(1j * np.deg2rad(turned)) + 1.0
    assert resistor[0] == pytest.approx(np.abs(wanted))


def test_the_output_capacitor_counts_at_the_frequency_of_each_point():
    amplifier = with_curve(
        sheet("single_rail", {"output_capacitor.esr": "0.1 ohm"}).amplifier, curve_of(woofer())
    )
    points = curves.points_of(amplifier)
    magnitude, angle = curves.seen(amplifier, points)
    turn = 2j * np.pi * points.frequency
    wanted = points.impedance * np.exp(1j * np.deg2rad(points.angle)) + 0.1 + 1.0 / (turn * 680e-6)
    assert magnitude == pytest.approx(np.abs(wanted))
    assert angle == pytest.approx(np.rad2deg(np.angle(wanted)))


def test_heat_counts_the_worst_angle_of_the_curve_and_no_impedance_below_nominal():
    amplifier = with_curve(sheet("split_rail", RULES).amplifier, curve_of(woofer()))
    magnitude, angle = curves.heating_load(amplifier, curves.points_of(amplifier), thermal.ONE_EIGHTH)
    assert magnitude >= 8.0
    assert 30.0 < abs(angle) < 60.0
    low = with_curve(amplifier, flat_curve(6.0, 70.0))
    assert curves.heating_load(low, curves.points_of(low), thermal.ONE_EIGHTH) == pytest.approx((8.0, 70.0))


SHORT = {"device.fitted.safe_area": [["40 V", "3 A"], ["60 V", "1.3 A"]]}


def test_one_point_that_enters_the_unknown_makes_the_use_unknown(tmp_path):
    # 35 V rails: 60 V lie across a device while the output stands at -25 V; only the turned point carries current there
    mostly = flat_curve(30.0, 0.0)
    turned = type(mostly)(mostly.frequencies, (8.0, 100.0, 30.0), (0.0, 80.0, 0.0))
    quiet = {**SHORT, "stage.idle": "0.1 mA", "stage.emitter_resistor": "none"}
    assert not safe_area.worst_into_loudspeaker(
        with_curve(sheet("split_rail", quiet).amplifier, mostly)
    ).unknown
    found = safe_area.worst_into_loudspeaker(with_curve(sheet("split_rail", quiet).amplifier, turned))
    assert found.unknown
    assert found.frequency == 20.0
    one = finding(judged(tmp_path, turned, "split_rail", quiet), "soa.loudspeaker")
    assert one.verdict is Verdict.UNVERIFIED
    assert any("of which the data sheet says nothing" in because for because in one.because)


def test_a_lower_impedance_never_uses_less():
    amplifier, curve = sheet("split_rail", RULES).amplifier, curve_of(woofer())
    uses = []
    for share in (1.2, 1.0, 0.8, 0.6, 0.4):
        lower = type(curve)(curve.frequencies, tuple(share * z for z in curve.impedances), curve.phases)
        uses.append(float(safe_area.worst_into_loudspeaker(with_curve(amplifier, lower)).use))
    assert uses == sorted(uses)


def test_what_is_missing_leaves_the_use_unknown(tmp_path):
    one = finding(judged(tmp_path, curve_of(woofer()), "split_rail", {"stage.idle": GONE}), "soa.loudspeaker")
    assert one.verdict is not Verdict.GO
    unknown = with_curve(
        sheet("split_rail", {**RULES, "heatsink.case_to_sink": GONE}).amplifier, flat_curve(8.0, 45.0)
    )
    assert np.isnan(safe_area.worst_into_loudspeaker(unknown).use)


def test_one_case_of_an_amplifier():
    nominal, cases = cases_of("single_rail")
    assert number_of_cases(nominal) is None
    assert number_of_cases(cases) > 8
    first = at_case(cases, 0)
    assert number_of_cases(first) is None
    assert first.output_capacitor.capacitance == nominal.output_capacitor.capacitance
    assert first.supply.no_load == nominal.supply.no_load
    last = at_case(cases, number_of_cases(cases) - 1)
    assert last.output_capacitor.capacitance == pytest.approx(1200e-6)
    assert last.device["fitted"].safe_area == nominal.device["fitted"].safe_area
