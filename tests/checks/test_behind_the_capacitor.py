"""A loudspeaker behind its output capacitor: every angle and every note from the lowest up, by brute force."""

import numpy as np
import pytest

from safeamp.checks import operating, safe_area, thermal
from tests.scenarios.sheets import GONE, sheet, tables


def within_its_angle(amplifier, magnitude, most, side, heating):
    """Return the largest use over angles of the load within `most` and notes from the lowest one up."""
    farads, note = amplifier.output_capacitor.capacitance, amplifier.loudspeaker.lowest_note
    esr = amplifier.output_capacitor.esr or 0.0
    turn = np.deg2rad(np.linspace(-most, most, 121))[:, None]
    reactance = np.linspace(0.0, 1.0, 160) / (2.0 * np.pi * note * farads)
    seen = magnitude * np.exp(1j * turn) + esr - 1j * reactance
    case = thermal.hotter_case(amplifier, side, thermal.ONE_EIGHTH, heating)
    load = safe_area.Load(np.abs(seen).ravel(), np.abs(np.rad2deg(np.angle(seen))).ravel(), "")
    rating = safe_area.rating_of(amplifier, side)
    return float(np.max(safe_area.use_of(amplifier, side, load, case, rating).use))


@pytest.mark.parametrize("device", [{}, {"current": "4 A, data sheet"}])
@pytest.mark.parametrize("farads", ["1000 uF, marked", "2200 uF, marked", "10000 uF, marked"])
@pytest.mark.parametrize("angle", [45, 60, 75])
@pytest.mark.parametrize("name", ["single_rail", "15w_single_rail_to3", "30w_single_rail_to3"])
def test_no_note_and_no_angle_within_the_largest_uses_more(name, angle, farads, device):
    changes = {"loudspeaker.phase_angle": f"{angle} deg, measured", "output_capacitor.capacitance": farads}
    changes |= {"output_capacitor.marked_capacitance": GONE}
    changes |= {
        f"device.{key}.{what}": value for key in tables(name)["device"] for what, value in device.items()
    }
    amplifier = sheet(name, changes).amplifier
    judged = safe_area.into_loudspeaker(amplifier)
    most = float(operating.phase_angle(amplifier))
    loads = (
        (operating.nominal_load(amplifier, most)[0], most),
        (operating.minimum_load(amplifier, safe_area.MINIMUM_ANGLE)[0], safe_area.MINIMUM_ANGLE),
    )
    brute = max(
        within_its_angle(amplifier, magnitude, turned, side, most)
        for magnitude, turned in loads
        for side in safe_area.sides_to_judge(amplifier)
    )
    assert judged >= 0.99 * brute
    assert judged <= 1.0001 * brute


def test_an_inductive_loudspeaker_that_resonates_with_its_capacitor_draws_more_than_alone():
    """8 ohm at +75 deg are 2.07 + j7.73 ohm, and 2150 uF at 20 Hz take 3.70 ohm of that away: 4.53 ohm at 63 deg."""
    changes = {"output_capacitor.capacitance": "2150 uF, marked", "output_capacitor.marked_capacitance": GONE}
    amplifier = sheet("30w_single_rail_to3", changes | {"loudspeaker.lowest_note": "20 Hz"}).amplifier
    magnitude, angle = operating.behind_capacitor(amplifier, 8.0, 75.0, 0.0)
    assert (magnitude, angle) == (pytest.approx(4.53, abs=0.01), pytest.approx(62.8, abs=0.3))
    magnitude, angle = operating.behind_capacitor(amplifier, 8.0, 75.0, 90.0)
    assert (magnitude, angle) == (
        pytest.approx(np.hypot(2.07, 11.43), abs=0.01),
        pytest.approx(79.7, abs=0.1),
    )
    assert operating.behind_capacitor(amplifier, 8.0, 20.0, 0.0) == pytest.approx(
        (8.0 * np.cos(np.deg2rad(20)), 0.0)
    )
