"""Loudspeaker: power words, crest factors, impedance rule, DC fault of a cold coil."""

import numpy as np
import pytest

from safeamp.physics import loudspeaker
from tests.published_cases import given, printed


def test_published_lowest_impedance():
    found = loudspeaker.minimum_allowed_impedance(nominal=given("loudspeaker-1")["rated"])
    assert printed("loudspeaker-1", "lowest_allowed") == list(found)


def test_published_voltage():
    values = given("loudspeaker-3")
    found = loudspeaker.noise_voltage(power=values["power"], impedance=values["rated"])
    assert found == printed("loudspeaker-3", "voltage")


def test_published_crest_factors():
    found = [
        loudspeaker.crest_decibels(crest_factor=loudspeaker.CREST_FACTORS[waveform])
        for waveform in given("loudspeaker-4")["waveform"]
    ]
    assert printed("loudspeaker-4", "crest") == found


@pytest.mark.parametrize("waveform", sorted(loudspeaker.CREST_FACTORS))
def test_crest_factors_of_sampled_waves(waveform):
    phase = (np.arange(100000) + 0.5) / 100000 * 2 * np.pi
    sine = np.sin(phase)
    waves = {
        "square": np.sign(sine),
        "sine": sine,
        "half-wave": np.maximum(sine, 0),
        "triangle": np.arcsin(sine),
    }
    wave = waves[waveform]
    crest = np.max(wave) / np.sqrt(np.mean(wave**2))
    assert loudspeaker.CREST_FACTORS[waveform] == pytest.approx(crest, rel=1e-4)


@pytest.mark.parametrize(("word", "watts"), [("rated noise", 100), ("programme", 50), ("peak", 25)])
def test_power_words(word, watts):
    # Common practice: programme is twice, peak four times the rated noise power.
    assert loudspeaker.rated_noise_power(power=100, word=word) == pytest.approx(watts)


def test_unknown_power_word():
    with pytest.raises(ValueError, match=r"^word must be one of rated noise, programme, peak, got music$"):
        loudspeaker.rated_noise_power(power=100, word="music")


def test_published_copper():
    ratio = loudspeaker.copper_ratio(rise=200, start=20)
    assert ratio == printed("loudspeaker-5", "resistance_ratio")
    assert loudspeaker.power_change(resistance_ratio=ratio) == printed("loudspeaker-5", "power_drop")


def test_copper_from_another_start():
    # Derived: two steps of one line multiply; zero resistance lies at 20 - 1/0.00393 = -234.45 degC.
    first = loudspeaker.copper_ratio(rise=30, start=20)
    second = loudspeaker.copper_ratio(rise=170, start=50)
    assert first * second == pytest.approx(loudspeaker.copper_ratio(rise=200, start=20))
    assert loudspeaker.copper_ratio(rise=100, start=25) == pytest.approx(
        (125 + 234.453) / (25 + 234.453), rel=1e-5
    )
    with pytest.raises(ValueError, match=r"^resistance_after_rise must be greater than zero"):
        loudspeaker.copper_ratio(rise=-255)
    with pytest.raises(ValueError, match=r"^resistance_at_start must be greater than zero"):
        loudspeaker.copper_ratio(rise=300, start=-235)


@pytest.mark.parametrize(("ratio", "decibels"), [(1, 0), (2, -3.0103), (10, -10), (0.5, 3.0103)])
def test_power_change(ratio, decibels):
    assert loudspeaker.power_change(resistance_ratio=ratio) == pytest.approx(decibels, abs=1e-4)


def test_published_fault_current_and_its_heat():
    values = given("offset-4")
    fault = {"voltage": values["rail"], "dc_resistance": values["coil"]}
    assert loudspeaker.dc_fault_current(**fault) == printed("offset-4", "current")
    # Derived: 60 V x 10.714 A.
    assert loudspeaker.dc_fault_power(**fault) == pytest.approx(642.857, rel=1e-6)


@pytest.mark.parametrize(
    ("volts", "amperes", "watts"), [(0, 0, 0), (6, 1, 6), (30, 5, 150), (60, 10, 600), (90, 15, 1350)]
)
def test_fault_of_a_6_ohm_coil(volts, amperes, watts):
    fault = {"voltage": volts, "dc_resistance": 6}
    assert loudspeaker.dc_fault_current(**fault) == pytest.approx(amperes)
    assert loudspeaker.dc_fault_power(**fault) == pytest.approx(watts)


def test_power_of_a_programme_with_the_peaks_of_a_sine():
    # 80 W sine into 8 ohm: 160 W at the peak. 12 dB crest: 160/15.85 W; a square wave: 160 W; a sine: 80 W
    crest = [10 ** (12.0 / 20), loudspeaker.CREST_FACTORS["square"], loudspeaker.CREST_FACTORS["sine"]]
    found = loudspeaker.programme_power(power=80.0, crest_factor=crest)
    assert found == pytest.approx([10.095, 160.0, 80.0], rel=1e-4)
