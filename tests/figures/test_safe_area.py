"""The plane of voltage and current: what is drawn is what was judged."""

from dataclasses import replace

import numpy as np
import pytest

from safeamp.amplifier import Curve
from safeamp.checks import safe_area as check
from safeamp.figures import safe_area
from safeamp.figures.look import picture as drawn
from safeamp.figures.plane import finding_of, plane_of
from safeamp.quantities import VOLTAGE, show
from tests.figures.drawing import axes, full, gallery, labels, line, picture, within
from tests.scenarios.sheets import GONE, finding, report, sheet


@pytest.fixture(scope="module")
def plane():
    return axes("safe-area", gallery("split_rail", {}))


@pytest.fixture(scope="module")
def judged():
    return finding(report("split_rail"), "soa.loudspeaker")


def test_the_worst_point_is_that_of_the_finding_and_says_how_much_is_used(plane, judged):
    worst = line(plane, "Worst point")
    assert worst.get_xdata()[0] == pytest.approx(judged.at["voltage"])
    assert worst.get_ydata()[0] == pytest.approx(judged.at["current"])
    volts = show(judged.at["voltage"], VOLTAGE)
    further = f"{judged.worst:.0%} at the worst corner of the tolerances"
    assert worst.get_label() == f"Worst point: {judged.nominal:.0%} used ({volts}, 2.75 A); {further}"


@pytest.mark.parametrize("scenario", ["split_rail", "single_rail", "mosfet_substitute", "bench_mockup"])
def test_the_worst_point_lies_on_its_path(scenario):
    shown = axes("safe-area", gallery(scenario, {}))
    worst = line(shown, "Worst point")
    path = next(one for one in shown.lines if one.get_color() == safe_area.BLUE)
    voltage, current = path.get_data()
    at = np.interp(worst.get_xdata()[0], voltage[::-1], current[::-1])
    assert at == pytest.approx(worst.get_ydata()[0], rel=1e-3)


def test_both_boundaries_stand_at_their_numbers(plane):
    cold, warm = line(plane, "Allowed, case at 25 °C"), line(plane, "Allowed, case at 60 °C")
    volts, amperes = cold.get_data()
    # the data sheet's points, and 150 W at 20 V before the first of them
    assert np.interp([20.0, 40.0, 100.0], volts, amperes) == pytest.approx([7.5, 3.75, 0.75], rel=2e-3)
    assert amperes[0] == 12.0
    assert volts.max() == 160.0
    # 59.98 °C of 25 to 150 °C are used up
    volts, amperes = warm.get_data()
    assert np.interp(40.0, volts, amperes) == pytest.approx(3.75 * (150 - 59.983) / 125, rel=2e-3)


def test_the_resistor_runs_along_its_load_line(plane):
    """Derived: full swing ends at swing loss; with no output the whole rail stands across an idle device."""
    voltage, current = line(plane, "A resistor of 8 ohm").get_data()
    assert voltage.max() > 34.0
    assert np.interp(34.0, voltage[::-1], current[::-1]) < 0.1
    assert current.max() == pytest.approx((34.0 - 2.2) / 8.33, rel=1e-3)


def test_zones_are_named_where_they_rule(plane):
    at = {text.get_text(): text.xy for text in plane.texts}
    assert set(at) == {"current", "power", "second breakdown", "voltage"}
    assert at["current"][0] < 12.5 < at["power"][0] < 40.0 < at["second breakdown"][0] < at["voltage"][0]
    assert at["voltage"][0] == 160.0


def test_where_the_data_sheet_says_nothing_the_boundary_is_dotted():
    changes = {"device.fitted.safe_area": [["40 V", "3.75 A"], ["80 V", "1.1 A"]]}
    amplifier = sheet("split_rail", changes).amplifier
    shown = drawn("safe-area", "so", lambda one: safe_area.draw(one, plane_of(amplifier)))
    plane = shown.figure.axes[0]
    dotted = [one for one in plane.lines if one.get_linestyle() == ":" and len(one.get_xdata()) > 2]
    assert all(one.get_xdata().min() > 80.0 for one in dotted[:2])
    assert "unknown" in {text.get_text() for text in plane.texts}


def test_a_limiter_is_drawn_where_it_acts():
    volts, amperes = line(axes("safe-area"), "V-I limiter").get_data()
    assert np.interp(25.0, volts, amperes) == pytest.approx(3.0, rel=1e-2)
    assert "V-I limiter acts" not in labels(axes("safe-area", gallery("split_rail", {})))


def test_a_bench_load_is_drawn_as_the_resistor_it_is():
    amplifier = sheet("bench_mockup").amplifier
    plane = plane_of(amplifier)
    assert finding_of(amplifier) == "soa.resistive_load"
    assert plane.use == pytest.approx(finding(report("bench_mockup"), "soa.resistive_load").nominal)


def test_each_load_that_counts_has_its_path():
    said = labels(axes("safe-area"))
    worst = check.worst_into_loudspeaker(sheet("single_rail").amplifier).load.name
    for beginning in (
        "A resistor of 8 ohm",
        "8 ohm at up to 45 deg",
        "6.4 ohm (minimum) at up to 30 deg",
        worst,
    ):
        assert [one for one in said if one.startswith(beginning)], beginning


def test_current_where_none_is_allowed_is_said_in_words():
    changes = {
        "device.fitted.voltage": "60 V",
        "device.fitted.safe_area": GONE,
        "loudspeaker.phase_angle": "60 deg",
    }
    amplifier = sheet("split_rail", changes).amplifier
    plane = plane_of(amplifier)
    assert np.isinf(plane.use)
    shown = drawn("safe-area", "so", lambda one: safe_area.draw(one, plane))
    assert (
        line(shown.figure.axes[0], "Worst point")
        .get_label()
        .startswith("Worst point: current where none is allowed")
    )
    assert "more than all" in shown.says


def test_of_a_measured_curve_the_path_is_that_of_its_worst_point():
    curve = Curve((20.0, 60.0, 200.0), (6.0, 7.0, 9.0), (40.0, -60.0, 20.0), "curve.csv")
    amplifier = sheet("split_rail").amplifier
    amplifier = replace(amplifier, loudspeaker=replace(amplifier.loudspeaker, impedance_curve=curve))
    plane = plane_of(amplifier)
    shown = drawn("safe-area", "so", lambda one: safe_area.draw(one, plane)).figure.axes[0]
    assert labels(shown)[2:4] == ["A resistor of 8 ohm", "7 ohm at -60 deg, 60 Hz of the curve"]
    voltage, current = line(shown, "7 ohm at -60 deg").get_data()
    worst = line(shown, "Worst point")
    at = np.interp(worst.get_xdata()[0], voltage[::-1], current[::-1])
    assert at == pytest.approx(worst.get_ydata()[0], rel=1e-3)
    assert current[-1] == pytest.approx(
        0.5 * current.max(), rel=0.03
    )  # sin(90 + 60 deg) at the peak of the voltage


def test_a_limiter_that_was_measured_cuts_the_path():
    points = [["0 V, measured", "3 A, measured"], ["60 V, measured", "1 A, measured"]]
    amplifier = sheet("split_rail", {"protection.vi_limiter": points}).amplifier
    plane = plane_of(amplifier)
    assert plane.paths[-1].name.endswith(", cut by the limiter")
    assert np.all(plane.paths[-1].current <= 3.0 - 2.0 * plane.paths[-1].voltage / 60.0 + 1e-9)
    voltage, current = plane.paths[-1].voltage, plane.paths[-1].current
    assert np.interp(plane.voltage, voltage[::-1], current[::-1]) == pytest.approx(plane.current, rel=1e-3)


def test_pulse_curves_are_drawn_above_the_dc_boundary():
    pulse = [["10 ms", ["40 V", "9 A"], ["100 V", "2.4 A"]], ["100 ms", ["40 V", "5 A"], ["100 V", "1.2 A"]]]
    amplifier = sheet("split_rail", {"device.fitted.pulse": pulse}).amplifier
    shown = drawn("safe-area", "so", lambda one: safe_area.draw(one, plane_of(amplifier))).figure.axes[0]
    for_pulse, warm = (
        line(shown, "Allowed for half a cycle").get_data(),
        line(shown, "Allowed, case at 60").get_data(),
    )
    at = np.array([20.0, 45.0, 60.0, 90.0])
    above = np.interp(at, *for_pulse) / np.interp(at, *warm)
    assert np.all(above >= 1.0 - 1e-9)
    assert np.all(above[1:] > 1.2)


def test_what_is_said_names_the_worst_point():
    assert "Into 8 ohm at up to 45 deg" in picture("safe-area", gallery("split_rail", {})).says
    assert "90% of what is allowed" in picture("safe-area", full()).says


def test_a_worst_point_at_nought_is_marked_at_the_edge_and_said():
    """A logarithmic scale has no place for 0 V."""
    whole = plane_of(sheet("split_rail").amplifier)
    paths = tuple(one._replace(voltage=one.voltage - one.voltage.min()) for one in whole.paths)
    at_nought = replace(whole, voltage=0.0, current=1.25, paths=paths)
    figure = drawn("safe-area", "so", lambda one: safe_area.draw(one, at_nought))
    shown = figure.figure.axes[0]
    left, _ = shown.get_xlim()
    assert 0.0 < left <= whole.rating.voltage / 100.0
    worst = line(shown, "Worst point")
    assert (worst.get_xdata()[0], worst.get_ydata()[0]) == (left, 1.25)
    assert "(0 V, 1.25 A)\nmarked at the left edge: this scale has no 0 V" in worst.get_label()
    within(figure)
    assert "left edge" not in line(axes("safe-area", gallery("split_rail", {})), "Worst point").get_label()


def test_where_nothing_is_allowed_no_line_is_promised():
    hot = replace(plane_of(sheet("split_rail").amplifier), case=150.0, use=np.inf)
    shown = drawn("safe-area", "so", lambda one: safe_area.draw(one, hot)).figure.axes[0]
    assert labels(shown)[:2] == ["Allowed, case at 25 °C", "Nothing allowed, case at 150 °C"]
    assert not [one for one in labels(shown) if one.startswith("Allowed, case at 150")]


UNKNOWN = {
    "device.fitted.voltage": "80 V",
    "device.fitted.safe_area": [["40 V", "2.9 A"], ["60 V", "1.5 A"]],
}
LIMITED = {"protection.vi_limiter": [["0 V", "8 A"], ["60 V", "2.2 A"], ["100 V", "2.2 A"]]}


@pytest.mark.parametrize("changes", [{}, UNKNOWN, LIMITED])
def test_names_of_zones_stand_on_no_line_and_on_no_other_name(changes):
    figure = drawn(
        "safe-area", "so", lambda one: safe_area.draw(one, plane_of(sheet("split_rail", changes).amplifier))
    ).figure
    figure.draw_without_rendering()
    plane = figure.axes[0]
    boxes = {text.get_text(): text.get_window_extent() for text in plane.texts}
    assert len(boxes) == 4 + (changes is UNKNOWN)
    for name, box in boxes.items():
        assert not [other for other, one in boxes.items() if other != name and box.overlaps(one)], name
        assert plane.bbox.containsx(box.x0 + 1.0)
        assert plane.bbox.containsx(box.x1 - 1.0)
        crossing = [
            one.get_label()
            for one in plane.lines
            if len(one.get_xdata()) > 1
            and one.get_transform().transform_path(one.get_path()).intersects_bbox(box, filled=False)
        ]
        assert not crossing, name
