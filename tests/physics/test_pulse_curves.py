"""Pulse curves: what the boundary allows for half a cycle, and the use that follows."""

import numpy as np
import pytest

from safeamp.physics.safe_area import Pulse, Rating, allowed_current, curves_problem, cut_use, envelope_use
from safeamp.physics.safe_area.boundary import boundary
from safeamp.physics.safe_area.pulse import pulsed
from safeamp.physics.stage import Law
from tests.physics.safe_area_cases import BASE, DEVICE, SHEET

#: Shaped like a data sheet's: 10 ms and 100 ms, at a case of 25 degC.
CURVES = ((10e-3, ((40.0, 9.0), (100.0, 2.4), (160.0, 0.9))), (100e-3, ((40.0, 5.0), (100.0, 1.2))))


def pulse(duration=25e-3, junction=25.0, curves=CURVES, **more):
    return Pulse(duration=duration, junction=junction, curves=curves, **more)


def allowed(volts, given, case=25.0, rating=DEVICE):
    return pulsed(boundary(rating, case), given, 0.0).pulse_allowed(np.asarray(volts))


@pytest.mark.parametrize(
    ("duration", "wanted"),
    [
        (10e-3, 9.0),  # on a curve
        (1e-3, 9.0),  # shorter than the shortest: nothing better is known
        (100e-3, 5.0),
        (np.sqrt(1e-3), np.sqrt(45.0)),  # halfway in log time: the geometric mean
        (100.001e-3, 3.75),  # longer than the longest: the DC curve
    ],
)
def test_interpolates_in_log_time(duration, wanted):
    assert float(allowed(40.0, pulse(duration))) == pytest.approx(wanted, rel=1e-6)


def test_between_points_a_straight_line_on_log_paper():
    middle = np.sqrt(40.0 * 100.0)
    assert float(allowed(middle, pulse(10e-3))) == pytest.approx(np.sqrt(9.0 * 2.4), rel=1e-9)


def test_left_of_the_first_point_its_current_or_the_dc_curve():
    # 9 A at 40 V: at 20 V at least as much, for the allowed current never rises with voltage; DC 150 W is 7.5 A.
    assert float(allowed(20.0, pulse(10e-3))) == pytest.approx(9.0)
    assert float(allowed(14.0, pulse(10e-3))) == pytest.approx(150.0 / 14.0, rel=1e-4)
    assert float(allowed(5.0, pulse(10e-3))) == pytest.approx(12.0)  # the current limit


def test_no_pulse_exceeds_the_current_limit():
    brief = ((10e-3, ((10.0, 20.0), (100.0, 2.4))),)
    assert float(allowed(10.0, pulse(10e-3, curves=brief))) == pytest.approx(12.0)


def test_beyond_the_last_point_of_either_curve_the_dc_curve():
    dc = float(allowed_current(voltage=120.0, case_temperature=25.0, rating=DEVICE))
    assert float(allowed(120.0, pulse(25e-3))) == dc
    assert float(allowed(120.0, pulse(10e-3))) > dc
    assert float(allowed(160.001, pulse(10e-3))) == 0.0


def test_derated_from_the_mean_junction_and_never_below_dc():
    half = float(allowed(40.0, pulse(10e-3, junction=87.5), case=40.0))
    assert half == pytest.approx(4.5)
    dc = allowed_current(voltage=40.0, case_temperature=40.0, rating=DEVICE)
    assert float(allowed(40.0, pulse(10e-3, junction=150.0), case=40.0)) == pytest.approx(float(dc))


def test_the_thermal_resistance_of_the_pulse_is_not_exceeded():
    # Z(25 ms) = 0.5*(1 - exp(-1)) = 0.316 K/W: 125 K allow 395.5 W, 9.89 A at 40 V; a longer one less.
    generous = ((10e-3, ((40.0, 11.9), (100.0, 2.4))), (100e-3, ((40.0, 11.8), (100.0, 1.2))))
    found = allowed(40.0, pulse(25e-3, curves=generous, transient=((0.5, 25e-3),)))
    assert float(found) == pytest.approx(125.0 / (0.5 * (1 - np.exp(-1)) * 40.0), rel=1e-9)


def test_without_curve_and_limiter_it_is_the_envelope():
    for change in ({}, {"idle_current": 1.2}, {"conducting": 2.0}, {"phase_angle": 0.0}, {"peak": 33.0}):
        given = BASE | change
        ours, theirs = cut_use(**given), envelope_use(**given)
        assert float(ours.use) == pytest.approx(float(theirs.use), rel=1e-3)
        assert bool(ours.enters_unknown) == bool(theirs.enters_unknown)
        assert int(ours.zone) == int(theirs.zone)


def test_use_agrees_with_a_dense_grid_in_class_b():
    given = BASE | {"idle_current": 0.0, "case_temperature": 60.0}
    t = np.deg2rad(np.linspace(-90.0, 90.0, 40_001))
    x = np.maximum(30.0 / 8.0 * np.sin(np.minimum(np.pi / 2, t + np.pi / 4)), 0.0)
    v = 34.0 - 30.0 * np.sin(t) - 0.33 * x
    for duration in (15e-3, 25e-3, 60e-3):
        of = pulse(duration, junction=80.0)
        dense = np.max(x / allowed(v, of, case=60.0))
        assert float(cut_use(**given, pulse=of).use) == pytest.approx(dense, rel=1e-4)
        assert dense < (1.0 + 1e-6) * float(envelope_use(**given).use)
    assert float(cut_use(**given, pulse=pulse(15e-3, 80.0)).use) < 0.95 * float(envelope_use(**given).use)


def test_the_idle_part_is_judged_by_the_dc_curve():
    # Class A: half the peak flows for good. Idle over DC plus the rest over the pulse curve, never the whole over it.
    given = BASE | {"idle_current": 1.9, "peak": 30.0, "imbalance": 0.0}
    with_pulse = float(cut_use(**given, pulse=pulse(10e-3)).use)
    idle_alone = float(cut_use(**given | {"peak": 1e-9}, pulse=pulse(10e-3)).use)
    dc = float(envelope_use(**given).use)
    assert idle_alone == pytest.approx(float(envelope_use(**given | {"peak": 1e-9}).use), rel=1e-6)
    assert idle_alone < with_pulse < dc


@pytest.mark.parametrize("worse", ["lower note", "hotter junction", "hotter case"])
def test_worse_input_never_uses_less(worse):
    steps = np.linspace(0.0, 1.0, 9)
    duration = 8e-3 + steps * 150e-3 if worse == "lower note" else 25e-3
    junction = 60.0 + 100.0 * steps if worse == "hotter junction" else 80.0
    case = 30.0 + 110.0 * steps if worse == "hotter case" else 60.0
    found = cut_use(**BASE | {"case_temperature": case}, pulse=pulse(duration, junction))
    uses = np.broadcast_to(found.use, (9,))
    assert np.all(np.diff(uses) >= -1e-9)
    assert uses[-1] > uses[0]


def test_cases_agree_with_single_calls_and_nan_stays_in_its_case():
    peaks, durations = np.array([20.0, 30.0, 33.0, np.nan]), np.array([5e-3, 25e-3, 90e-3, 25e-3])
    found = cut_use(**BASE | {"peak": peaks}, pulse=pulse(durations, 70.0))
    for place in range(4):
        one = cut_use(**BASE | {"peak": peaks[place]}, pulse=pulse(durations[place], 70.0))
        np.testing.assert_allclose(found.use[place], one.use)
    assert np.isnan(found.use[3])
    assert not np.any(np.isnan(found.use[:3]))


def test_more_cases_than_one_piece():
    many = np.linspace(20.0, 33.0, 1300)
    found = cut_use(**BASE | {"peak": many}, pulse=pulse(25e-3, np.full(1300, 70.0)))
    assert found.use.shape == (1300,)
    assert found.use[1299] == pytest.approx(
        float(cut_use(**BASE | {"peak": 33.0}, pulse=pulse(25e-3, 70.0)).use)
    )


def test_the_limiter_cuts_the_locus():
    # A resistor in class B against a flat limit of 2 A: the use is the largest of min(i, 2)/allowed along the line.
    given = BASE | {"phase_angle": 0.0, "idle_current": 0.0}
    i = np.linspace(0.0, 30.0 / 8.0, 40_001)
    x = np.minimum(i, 2.0)
    v = 34.0 - 8.0 * i - 0.33 * x
    dense = np.max(x / allowed_current(voltage=v, case_temperature=60.0, rating=DEVICE))
    found = cut_use(**given, limiter=((0.0, 2.0),))
    assert float(found.use) == pytest.approx(dense, rel=1e-4)
    assert float(found.current) == pytest.approx(2.0, rel=5e-4)
    assert float(found.use) < float(envelope_use(**given).use)


def test_the_worst_of_parallel_devices_exceeds_the_limit():
    given = BASE | {"conducting": 2.0, "imbalance": 0.25, "idle_current": 0.0}
    found = cut_use(**given, limiter=((0.0, 0.5),))
    assert float(found.current) == pytest.approx(0.625)


def test_a_limiter_that_never_acts_changes_nothing_and_a_tighter_one_never_uses_more():
    lines = [((0.0, top), (90.0, 0.1)) for top in (20.0, 6.0, 4.0, 2.0, 1.0)]
    uses = [float(cut_use(**BASE, limiter=line).use) for line in lines]
    assert uses[0] == pytest.approx(float(cut_use(**BASE).use), rel=1e-9)
    assert np.all(np.diff(uses) <= 1e-9)
    assert uses[-1] < 0.5 * uses[0]


def test_no_current_beyond_a_limiter_that_closes():
    narrow = Rating(**SHEET | {"voltage": 45.0, "points": ((40.0, 3.75), (45.0, 2.5))})
    given = BASE | {"rating": narrow}
    assert np.isposinf(float(envelope_use(**given).use))
    assert np.isfinite(float(cut_use(**given, limiter=((0.0, 4.0), (44.0, 0.0))).use))


@pytest.mark.parametrize(
    ("curves", "message"),
    [
        (CURVES, None),
        (
            ((10e-3, ((40.0, 4.7), (100.0, 2.4))), (100e-3, ((40.0, 5.0), (100.0, 1.2)))),
            "the curve at 10 ms lies under the one at 100 ms",
        ),
        (((10e-3, ((40.0, 3.5), (100.0, 2.4))),), "the curve at 10 ms lies under the DC curve at 40 V"),
        (((10e-3, ((40.0, 3.6), (100.0, 2.4))),), None),  # within the 5 % of reading a printed curve
    ],
)
def test_curves_that_contradict_each_other(curves, message):
    assert curves_problem(rating=DEVICE, curves=curves) == message


@pytest.mark.parametrize(
    ("change", "message"),
    [
        ({"duration": 0.0}, "duration must be greater than zero, got 0.0"),
        ({"curves": ()}, "curves must have at least one duration with its points"),
        ({"curves": CURVES[::-1]}, "duration of a curve must be above the one before it, got 0.01"),
        ({"curves": ((1e-2, ((40.0, 0.0),)),)}, "pulse_current must be greater than zero, got 0.0"),
    ],
)
def test_refusals(change, message):
    with pytest.raises(ValueError, match=message):
        pulse(**change)


def test_square_law_and_stated_parameter_run_too():
    given = BASE | {"law": Law.MOSFET, "transconductance_parameter": 1.5, "idle_current": 0.1}
    assert 0.0 < float(cut_use(**given, pulse=pulse()).use) < float(envelope_use(**given).use)
