"""Whole amplifiers worked by hand beforehand: from the supply to the use of the safe area.

Rails at a level fall with the square root of its power; case = air + P*sink_to_air + P/2*case_to_sink.
"""

import pytest

from safeamp.physics import stage
from safeamp.physics.safe_area import Rating, angle_use, envelope_use
from safeamp.physics.stage import Law
from tests.physics.safe_area_cases import DEVICE

SPLIT = {
    "no_load": 34.0,
    "full_load": 31.0,
    "loss": 2.2,
    "idle": 0.014 / 0.33,
    "sink_to_air": 0.95,
    "case_to_sink": 0.45,
    "rating": DEVICE,
}
HEALTHY = SPLIT | {"no_load": 22.0, "full_load": 20.0, "loss": 2.0, "sink_to_air": 0.9}
OLD = SPLIT | {
    "no_load": 38.0,
    "full_load": 33.0,
    "loss": 2.5,
    "idle": 0.040,
    "sink_to_air": 0.9,
    "case_to_sink": 0.6,
    "rating": Rating(
        current=15,
        power=150,
        power_at=25,
        junction_limit=200,
        junction_to_case=1.167,
        voltage=80,
        points=((48, 3.125), (65, 1.8), (80, 1.1)),
    ),
}


def devices(a):
    return {"conducting": 1, "emitter_resistor": 0.33, "idle_current": a["idle"], "law": Law.BIPOLAR}


def clipping(a, rail, load):
    return stage.clipped_peak(
        side_voltage=a[rail], swing_loss=a["loss"], load_magnitude=load, emitter_resistor=0.33, conducting=1
    )


def heat(a, fraction, angle):
    return stage.pair_heat(
        half_supply=a["no_load"] - fraction**0.5 * (a["no_load"] - a["full_load"]),
        peak=stage.level_peak(clipping_peak=clipping(a, "full_load", 8), fraction=fraction),
        load_magnitude=8,
        phase_angle=angle,
        **devices(a),
    )


def case_temperature(a, fraction, angle):
    power = heat(a, fraction, angle)
    return 35 + power * a["sink_to_air"] + power / 2 * a["case_to_sink"]


def resistive(a):
    return angle_use(
        half_supply=a["no_load"],
        peak=clipping(a, "no_load", 8),
        load_magnitude=8,
        phase_angle=0,
        imbalance=None,
        case_temperature=case_temperature(a, 1 / 3, 0),
        rating=a["rating"],
        **devices(a),
    ).use


def loudspeaker(a, load=8.0, angle=45.0):
    return envelope_use(
        half_supply=a["no_load"],
        peak=clipping(a, "no_load", load),
        load_magnitude=load,
        phase_angle=angle,
        imbalance=None,
        case_temperature=case_temperature(a, 1 / 8, 45),
        rating=a["rating"],
        **devices(a),
    ).use


def on_mains(a, factor):
    return a | {"no_load": a["no_load"] * factor, "full_load": a["full_load"] * factor}


def test_split_rail_amplifier():
    assert case_temperature(SPLIT, 1 / 3, 0) == pytest.approx(63.7, abs=0.1)
    assert resistive(SPLIT) == pytest.approx(0.335, abs=0.001)
    assert loudspeaker(SPLIT) == pytest.approx(0.828, abs=0.001)
    assert loudspeaker(on_mains(SPLIT, 1.1)) == pytest.approx(1.07, abs=0.01)


@pytest.mark.parametrize(
    ("load", "angle", "use"),
    [(8, 60, 1.059), (6.4, 30, 0.781), (4, 0, 0.618), (4, 30, 1.196), (4, 45, 1.553)],
)
def test_other_loads_of_the_split_rail_amplifier(load, angle, use):
    assert loudspeaker(SPLIT, load, angle) == pytest.approx(use, abs=0.001)


def test_healthy_amplifier():
    assert case_temperature(HEALTHY, 1 / 3, 0) == pytest.approx(46.4, abs=0.1)
    assert resistive(HEALTHY) == pytest.approx(0.200, abs=0.001)
    assert loudspeaker(HEALTHY) == pytest.approx(0.289, abs=0.001)
    assert loudspeaker(on_mains(HEALTHY, 1.1)) == pytest.approx(0.360, abs=0.001)


@pytest.mark.parametrize(
    ("mains", "third", "use"), [(220, 28.7, 0.964), (240, 34.2, 1.206), (253, 38.1, 1.388)]
)
def test_amplifier_on_more_mains_than_its_plate_says(mains, third, use):
    amplifier = on_mains(OLD, mains / 220)
    assert heat(amplifier, 1 / 3, 0) == pytest.approx(third, abs=0.1)
    assert loudspeaker(amplifier) == pytest.approx(use, rel=2e-3)


def test_class_a_amplifier_is_hottest_without_signal_and_leaves_its_safe_area_at_45_degrees():
    # +-24 V, +-22.5 V loaded, loss 2 V, 0.47 ohm, 1.6 A: 2*1.6*(24 - 0.752) = 74.39 W
    still = stage.no_signal_heat(half_supply=24, idle_current=1.6, emitter_resistor=0.47, conducting=1)
    sink = 30 + 0.8 * still
    class_a = {"conducting": 1, "emitter_resistor": 0.47, "idle_current": 1.6, "law": Law.BIPOLAR}
    peak = stage.clipped_peak(
        side_voltage=24, swing_loss=2, load_magnitude=8, emitter_resistor=0.47, conducting=1
    )
    third = stage.pair_heat(half_supply=23.1, peak=peak / 3**0.5, load_magnitude=8, phase_angle=0, **class_a)
    use = envelope_use(
        half_supply=24,
        peak=peak,
        load_magnitude=8,
        phase_angle=45,
        imbalance=None,
        case_temperature=sink + 0.5 * still / 2,
        rating=DEVICE,
        **class_a,
    ).use
    assert sink == pytest.approx(89.5, abs=0.05)
    assert third < still
    assert use == pytest.approx(1.30, abs=0.01)
