"""What happens before and in the loudspeaker: low notes, a coil with a rail on it, impedance, travel."""

from dataclasses import replace

import numpy as np
import pytest

from safeamp.amplifier import Curve
from safeamp.figures import coil, response
from safeamp.figures.driver import draw_excursion, draw_impedance
from safeamp.figures.look import NotDrawnError
from safeamp.figures.look import picture as drawn
from safeamp.figures.response import HALF_POWER
from safeamp.studies.verdict import verdict
from tests.figures.drawing import DRIVER, FULL, axes, gallery, labels, line, picture
from tests.scenarios.sheets import beside, finding, limits, sheet


@pytest.fixture(scope="module")
def judged():
    changes = {**FULL, "protection.vi_limiter": [["0 V", "5 A"], ["50 V", "1 A"]]}
    return verdict(sheet("single_rail", changes), limits())


def cutoffs(plane):
    return {label.rpartition(": ")[0]: label.rpartition(": ")[2] for label in labels(plane)}


def test_cutoffs_are_marked_half_power_down():
    """Derived: 1/(2 pi R C) of 2200 µF, at -20 and +20 %, into 8 and 6.4 ohm."""
    plane = axes("low-notes")
    marks = [one for one in plane.lines if len(one.get_xdata()) == 1]
    assert all(one.get_ydata()[0] == HALF_POWER for one in marks)
    expected = [1 / (2 * np.pi * ohms * farads) for ohms, farads in (
        (8, 2200e-6), (6.4, 2200e-6), (6.4, 1760e-6), (8, 2640e-6)
    )]  # fmt: skip
    assert [one.get_xdata()[0] for one in marks[:4]] == pytest.approx(expected)
    assert cutoffs(plane) == {
        "2200 µF into 8 ohm": "9.04 Hz",
        "2200 µF into 6.4 ohm (minimum)": "11.3 Hz",
        "1760 µF into 6.4 ohm (low end)": "14.1 Hz",
        "2640 µF into 8 ohm (high end)": "7.54 Hz",
        "2200 µF into the driver": "7.47 Hz",
        "Target": "20 Hz",
    }


def test_every_curve_goes_through_its_mark():
    plane = axes("low-notes")
    curves = [one for one in plane.lines if len(one.get_xdata()) > 100]
    marks = [one for one in plane.lines if len(one.get_xdata()) == 1]
    for curve, mark in zip(curves, marks, strict=True):
        level = np.interp(mark.get_xdata()[0], *curve.get_data())
        assert level == pytest.approx(HALF_POWER, abs=0.02)
    assert len({str(one.get_linestyle()) + str(one._dash_pattern) for one in curves}) == len(curves)


def test_the_coil_reaches_its_limit_at_the_mark_of_the_finding(judged):
    plane = axes("coil")
    mark = line(plane, "Limit reached after")
    after = beside(finding(judged, "loudspeaker.dc_fault"), "coil reaches its limit after")
    assert mark.get_xdata()[0] == pytest.approx(after)
    assert mark.get_ydata()[0] == 180.0
    seconds, degrees = line(plane, "Coil at 64 V").get_data()
    assert np.interp(after, seconds, degrees) == pytest.approx(180.0, rel=2e-3)


def test_what_stops_the_fault_stands_at_its_time():
    plane = axes("coil")
    assert line(plane, "Relay opens after 100 ms").get_xdata()[0] == 0.1
    assert line(plane, "Fuse at the latest after 120 s").get_xdata()[0] == 120.0
    assert "Fuse may act" in labels(plane)
    without = axes("coil", gallery("split_rail", {**DRIVER, "protection.loudspeaker_fuse": "none"}))
    assert not [label for label in labels(without) if "use" in label]


def test_a_coil_that_stays_cool_is_drawn_below_its_limit():
    changes = {**DRIVER, "loudspeaker.dc_resistance": "10 kohm", "loudspeaker.nominal_impedance": "10 kohm",
               "loudspeaker.minimum_impedance": "8 kohm"}  # fmt: skip
    shown = picture("coil", gallery("split_rail", changes))
    assert "is reached never" in shown.says
    plane = shown.figure.axes[0]
    assert not [label for label in labels(plane) if label.startswith("Limit reached")]
    assert "Limit never reached" in labels(plane)
    # to the end state: nothing moves any more over the last third of the time
    seconds, degrees = line(plane, "Coil at").get_data()
    assert seconds[-1] == plane.get_xlim()[1] > 4 * 25 * 60
    third = np.interp(seconds[-1] * 2 / 3, seconds, degrees)
    assert degrees[-1] - third < 0.05 * (degrees[-1] - degrees[0])


def test_the_impedance_has_its_peak_at_the_resonance_and_its_lowest_marked():
    """Derived: R_e (1 + Q_ms/Q_es) at f_s."""
    plane = axes("impedance")
    hertz, ohms = line(plane, "Magnitude").get_data()
    low = hertz < 200.0
    assert hertz[low][np.argmax(ohms[low])] == pytest.approx(42.0, rel=0.01)
    assert ohms[low].max() == pytest.approx(6.1 * (1 + 3.1 / 0.45), rel=0.01)
    assert line(plane, "Lowest 6.13 ohm at 508 Hz").get_ydata()[0] == ohms.min()
    assert line(plane, "Nominal 8 ohm").get_ydata()[0] == 8.0


def test_a_measured_curve_is_drawn_in_place_of_the_parameters():
    curve = Curve((20.0, 60.0, 200.0), (6.0, 7.0, 9.0), (40.0, -60.0, 20.0), "curve.csv")
    amplifier = sheet("single_rail", DRIVER).amplifier
    amplifier = replace(amplifier, loudspeaker=replace(amplifier.loudspeaker, impedance_curve=curve))
    shown = drawn("impedance", "so", lambda one: draw_impedance(one, amplifier))
    assert list(line(shown.figure.axes[0], "Magnitude, measured").get_ydata()) == [6.0, 7.0, 9.0]
    assert list(shown.figure.axes[1].lines[0].get_ydata()) == [40.0, -60.0, 20.0]
    assert "lowest 6 ohm at 20 Hz; largest angle 60 deg" in shown.says


def test_the_travel_is_that_of_the_finding_with_its_limit(judged):
    plane = axes("cone-travel")
    most = beside(finding(judged, "loudspeaker.power"), "cone travel at clipping, sine from 20 Hz")
    assert line(plane, "Most").get_ydata()[0] == pytest.approx(
        1e3 * most, rel=5e-3
    )  # the finding leaves the coil's inductance out
    assert line(plane, "Linear up to 5 mm").get_ydata()[0] == 5.0


def with_driver(**changes):
    return sheet(
        "single_rail", {**DRIVER, **{key.replace("__", "."): value for key, value in changes.items()}}
    )


@pytest.mark.parametrize(
    ("fitted", "said"),
    [
        ({"protection__loudspeaker_fuse": "none"}, ["Relay opens after 100 ms"]),
        ({"protection__trip_delay": "none"}, ["Fuse at the latest after 120 s", "Fuse may act"]),
        ({"protection__trip_delay": "none", "protection__loudspeaker_fuse": "none"}, []),
    ],
)
def test_only_what_is_fitted_is_drawn(fitted, said):
    amplifier = with_driver(**fitted).amplifier
    shown = drawn("coil", "so", lambda one: coil.draw(one, amplifier, limits()))
    assert labels(shown.figure.axes[0])[3:] == said
    assert shown.says.endswith("nothing stops it.") is (said == [])


@pytest.mark.parametrize(
    ("fuse", "said", "earliest", "words"),
    [
        # 34 V on 6.1 ohm are 5.6 A: 1.9 times 3 A, held for 0.6 s; 1.4 times 4 A, held for an hour; less than 6.3 A
        ("T 3 A", "Fuse T 3 A: not for certain", 0.6, "the fuse T 3 A acts not for certain"),
        ("T 4 A", "Fuse T 4 A: not for certain", 3600.0, "the fuse T 4 A acts not for certain"),
        ("T 6.3 A", "Fuse T 6.3 A: does not act", None, "the fuse T 6.3 A does not act"),
    ],
)
def test_a_fuse_that_does_not_act_for_certain_is_said(fuse, said, earliest, words):
    changes = {**DRIVER, "protection.loudspeaker_fuse": fuse}
    shown = picture("coil", gallery("split_rail", changes))
    plane = shown.figure.axes[0]
    assert said in labels(plane)
    assert not [one for one in labels(plane) if one.startswith(("Fuse at the latest", "Fuse may"))]
    to_data = plane.transData.inverted()
    boxes = [
        one.get_extents().transformed(to_data) for one in plane.patches
    ]  # a rectangle or, once, a polygon
    spans, (low, high) = [(box.x0, box.x1) for box in boxes], plane.get_xlim()
    assert spans == ([] if earliest is None else [pytest.approx((max(low, earliest), high))])
    assert words in shown.says


def test_without_a_target_or_a_linear_travel_none_is_drawn():
    amplifier = with_driver().amplifier
    bare = replace(
        amplifier,
        loudspeaker=replace(amplifier.loudspeaker, linear_excursion=None),
        output_capacitor=replace(amplifier.output_capacitor, target_cutoff=None),
    )
    travel = drawn("cone-travel", "so", lambda one: draw_excursion(one, bare)).figure.axes[0]
    assert len(labels(travel)) == 2
    notes = drawn("low-notes", "so", lambda one: response.draw(one, bare, {})).figure.axes[0]
    assert "Target: 20 Hz" not in labels(notes)


@pytest.mark.parametrize(
    ("table", "name", "draw", "reason"),
    [
        ("output_capacitor", "capacitance", lambda one, of: response.draw(one, of, {}), "its cutoff cannot"),
        ("stage", "swing_loss_up", draw_excursion, "the clipped peak cannot be computed"),
    ],
)
def test_a_value_that_is_no_number_is_not_drawn(table, name, draw, reason):
    amplifier = with_driver().amplifier
    broken = replace(amplifier, **{table: replace(getattr(amplifier, table), **{name: np.nan})})
    with pytest.raises(NotDrawnError, match=reason):
        drawn("so", "so", lambda one: draw(one, broken))
