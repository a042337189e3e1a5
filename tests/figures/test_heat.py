"""Temperatures and heat: the numbers of the findings, the limits at their places."""

import numpy as np
import pytest

from safeamp.checks import thermal
from safeamp.figures.levels import FRACTIONS, heat_over_level, levels_of
from safeamp.figures.look import VERMILLION
from safeamp.figures.temperatures import ladder
from safeamp.quantities import POWER, show
from tests.figures.drawing import axes, gallery, labels, line, picture, within
from tests.scenarios.sheets import beside, finding, report, sheet

SPLIT = gallery("split_rail", {})


def test_the_ladder_ends_in_the_air_and_in_the_junction_of_the_finding():
    amplifier = sheet("split_rail").amplifier
    third = next(one for one in levels_of(amplifier) if one.name == "one third")
    rungs = ladder(amplifier, third)
    assert list(rungs) == ["air", "heatsink", "case", "junction"]
    assert rungs["air"] == 35.0
    assert rungs["heatsink"] == pytest.approx(finding(report("split_rail"), "heat.heatsink").nominal)
    assert rungs["junction"] == pytest.approx(finding(report("split_rail"), "heat.junction").nominal)
    assert list(rungs.values()) == sorted(rungs.values())


def test_with_transient_data_the_peak_within_a_cycle_is_the_last_rung():
    pairs = [["0.2 K/W", "1.5 ms"], ["0.35 K/W", "12 ms"], ["0.2833 K/W", "90 ms"]]
    amplifier = sheet("split_rail", {"device.fitted.transient": pairs}).amplifier
    quiet, _, third, _ = (ladder(amplifier, one) for one in levels_of(amplifier))
    assert list(third)[-1] == "peak"
    judged = finding(report("split_rail", {"device.fitted.transient": pairs}), "heat.junction")
    assert third["peak"] == pytest.approx(judged.nominal)
    assert list(quiet)[-1] == "junction"


def test_in_free_air_there_is_no_heatsink_on_the_ladder():
    amplifier = sheet("bench_mockup").amplifier
    assert list(ladder(amplifier, levels_of(amplifier)[0])) == ["air", "junction"]


def test_limits_stand_at_their_numbers_and_levels_say_their_heat():
    plane = axes("temperatures", SPLIT)
    flat = [one.get_ydata()[0] for one in plane.lines if list(one.get_xdata()) == [0, 1]]
    assert flat == [150.0, 100.0]
    said = {text.get_text() for text in plane.texts}
    assert {"junction limit 150 °C", "heatsink: stop above 100 °C"} <= said
    assert [one.get_text().split("\n") for one in plane.get_xticklabels()][2] == ["one third", "24.5 W"]


def test_labels_of_a_ladder_do_not_cover_each_other():
    shown = picture("temperatures", SPLIT)
    shown.figure.draw_without_rendering()
    boxes = [
        text.get_window_extent()
        for text in shown.figure.axes[0].texts
        if text.get_text().split()[0] != "heatsink:"
    ]
    pairs = [(one, two) for place, one in enumerate(boxes) for two in boxes[:place]]
    assert not [pair for pair in pairs if pair[0].overlaps(pair[1])]


def test_the_marks_of_the_levels_lie_on_the_curve():
    plane = axes("heat", SPLIT)
    percent, watts = line(plane, "Into a resistor").get_data()
    amplifier = sheet("split_rail").amplifier
    for name, at in (("One eighth", 1 / 8), ("One third", 1 / 3)):
        mark = line(plane, name)
        expected = float(thermal.at_level(amplifier, at).stage_power)
        assert mark.get_xdata()[0] == pytest.approx(100 * at)
        assert mark.get_ydata()[0] == pytest.approx(expected)
        assert np.interp(100 * at, percent, watts) == pytest.approx(expected, rel=1e-3)
    judged = finding(report("split_rail"), "heat.heatsink")
    quiet = beside(judged, "heat of the stage without signal")
    assert line(plane, "No signal").get_ydata()[0] == pytest.approx(quiet)
    assert watts[0] == pytest.approx(quiet)
    assert labels(plane)[-1].startswith("Worst sine (")


def test_the_worst_sine_is_the_top_of_the_curve_and_that_of_the_finding():
    heat = heat_over_level(sheet("split_rail").amplifier)
    worst = levels_of(sheet("split_rail").amplifier)[-1]
    assert worst.fraction == pytest.approx(FRACTIONS[int(np.argmax(heat))], abs=0.005)
    assert worst.watts == pytest.approx(heat.max(), rel=1e-4)
    assert worst.hottest
    judged = finding(report("split_rail"), "heat.heatsink")
    assert worst.fraction == beside(judged, "worst level of a sine, share of clipping power")
    assert worst.watts == beside(judged, "heat of the stage at the worst level of a sine")
    assert 0.3 < worst.fraction < 0.6  # class B: 4/pi**2 = 0.41, a little more where the rail sags


def test_without_signal_hottest_there_is_no_worst_sine():
    plane = axes("heat", gallery("class_a", {}))
    assert [one.get_label().split(":")[0] for one in plane.lines[-3:]] == [
        "No signal, the hottest", "One eighth", "One third",
    ]  # fmt: skip
    assert [one.get_color() for one in plane.lines[-3:]] == [VERMILLION, "white", "white"]
    assert plane.lines[-3].get_ydata()[0] == plane.lines[0].get_ydata().max()
    rows = [
        one.get_text().split("\n")[0]
        for one in axes("temperatures", gallery("class_a", {})).get_xticklabels()
    ]
    assert rows == ["no signal, the hottest", "one eighth", "one third"]


def test_a_turned_load_makes_more_heat_and_is_drawn_otherwise():
    plane = axes("heat", SPLIT)
    straight, turned = line(plane, "Into a resistor"), line(plane, "Same voltage into 8 ohm at 45 deg")
    assert np.all(turned.get_ydata()[1:] > straight.get_ydata()[1:])
    assert straight.get_linestyle() != turned.get_linestyle()


@pytest.mark.parametrize(
    ("changes", "of"),
    [
        ({}, ""),
        ({"stage.bridged": True}, "one side of the bridge"),
        ({"stage.series_resistor": "47 ohm"}, "load with its series resistor"),
        ({"loudspeaker.parallel": 2, "loudspeaker.series": 2}, "all 4 loudspeakers together"),
    ],
)
def test_a_power_that_is_not_that_of_the_loudspeaker_says_whose_it_is(changes, of):
    found = gallery("split_rail", changes)
    heated = finding(report("split_rail", changes), "heat.heatsink")
    [name] = [one.at for one in heated.also if one.at.startswith("power at clipping into")]
    watts = beside(heated, "of that each side of the bridge" if "stage.bridged" in changes else name)
    said = show(watts, POWER)
    first, _, second = axes("heat", found).get_xlabel().partition("\n")
    assert first == f"Level of a sine: share of the {said} at clipping (%)"
    assert second == (f"{said}: {of}" if of else "")
    assert axes("temperatures", found).get_xlabel().partition("\n")[2] == of
    assert picture("heat", found).says.count(f"({of})") == bool(of)
    legend = labels(axes("heat", found))[0]
    assert legend.endswith(", the load with its series resistor") is ("stage.series_resistor" in changes)
    within(picture("heat", found))
    within(picture("temperatures", found))
