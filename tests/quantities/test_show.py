"""Numbers as people write them."""

import pytest

from safeamp import quantities as q
from safeamp.quantities import Sign, read, show, show_reading

SHOWN = [
    (0.0021, q.VOLTAGE, "2.1 mV"),
    (0.9999, q.VOLTAGE, "1 V"),
    (-0.9999, q.VOLTAGE, "-1 V"),
    (0.9994, q.VOLTAGE, "999 mV"),
    (999.6, q.VOLTAGE, "1 kV"),
    (0.0, q.VOLTAGE, "0 V"),
    (-0.0, q.VOLTAGE, "0 V"),
    (-1e-30, q.VOLTAGE, "-1e-27 mV"),
    (35.0, q.VOLTAGE, "35 V"),
    (35.25, q.VOLTAGE, "35.3 V"),
    (1e-7, q.VOLTAGE, "0.0001 mV"),
    (float("inf"), q.VOLTAGE, "unbounded"),
    (float("-inf"), q.VOLTAGE, "unbounded"),
    (float("nan"), q.VOLTAGE, "unknown"),
    (None, q.VOLTAGE, "unknown"),
    (7e-6, q.CURRENT, "7 µA"),
    (0.03, q.CURRENT, "30 mA"),
    (0.0022, q.CAPACITANCE, "2200 µF"),
    (0.1, q.CAPACITANCE, "100000 µF"),
    (1e-7, q.CAPACITANCE, "100 nF"),
    (9.996e-7, q.CAPACITANCE, "1 µF"),
    (47e-12, q.CAPACITANCE, "47 pF"),
    (0.0, q.CAPACITANCE, "0 µF"),
    (4700.0, q.RESISTANCE, "4.7 kohm"),
    (0.22, q.RESISTANCE, "0.22 ohm"),
    (0.0047, q.RESISTANCE, "4.7 mohm"),
    (5e7, q.RESISTANCE, "50 Mohm"),
    (0.25, q.POWER, "250 mW"),
    (0.0005, q.INDUCTANCE, "500 uH"),
    (20e3, q.FREQUENCY, "20 kHz"),
    (5.05, q.FREQUENCY, "5.05 Hz"),
    (0.06, q.TIME, "60 ms"),
    (299.0, q.TIME, "299 s"),
    (2400.0, q.TIME, "40 min"),
    (7200.0, q.TIME, "2 h"),
    (58.2, q.TEMPERATURE, "58.2 °C"),
    (-10.04, q.TEMPERATURE, "-10 °C"),
    (0.0, q.TEMPERATURE, "0 °C"),
    (10.0, q.TEMPERATURE_DIFFERENCE, "10 K"),
    (0.95, q.THERMAL_RESISTANCE, "0.95 K/W"),
    (0.12, q.LENGTH, "120 mm"),
    (0.025, q.MASS, "25 g"),
    (7.5, q.FORCE_FACTOR, "7.5 N/A"),
    (0.0012, q.COMPLIANCE, "1.2 mm/N"),
    (45.0, q.ANGLE, "45 deg"),
    (3.0103, q.LEVEL, "3.01 dB"),
    (0.85, q.PERCENT, "85 %"),
    (0.0, q.PERCENT, "0 %"),
    (0.828, q.RATIO, "0.828"),
    (1234.0, q.RATIO, "1230"),
    (2.0, q.TRANSCONDUCTANCE_PARAMETER, "2 A/V2"),
    (-0.0021, q.TEMPERATURE_COEFFICIENT, "-2.1 mV/K"),
    (0.02, q.ENERGY, "20 mJ"),
    (3000.0, q.ENERGY, "3 kJ"),
]


@pytest.mark.parametrize(("value", "kind", "text"), SHOWN)
def test_show(value, kind, text):
    assert show(value, kind) == text


def test_digits():
    assert show(35.2468, q.VOLTAGE, 5) == "35.247 V"
    assert show(35.2468, q.VOLTAGE, digits=1) == "40 V"
    assert show(0.125, q.RATIO, 2) == "0.13"


@pytest.mark.parametrize("digits", [0, 16, -1])
def test_digits_outside_their_range(digits):
    with pytest.raises(ValueError, match=f"digits must be 1 to 15, not {digits}"):
        show(1.0, q.VOLTAGE, digits)


@pytest.mark.parametrize(
    ("text", "kind", "shown"),
    [
        ("34.8 V ±2 %, measured", q.VOLTAGE, "34.8 V ±2 %, measured"),
        ("2200u, marked", q.CAPACITANCE, "2200 µF, marked"),
        ("2200u -20/+50 %, data sheet", q.CAPACITANCE, "2200 µF -20/+50 %, data sheet"),
        ("35 V ±2 V", q.VOLTAGE, "35 V ±2 V, stated"),
        ("35 V -2/+3 V", q.VOLTAGE, "35 V -2/+3 V, stated"),
        ("31..35 V", q.VOLTAGE, "33 V ±2 V, stated"),
        ("0 V ±5 mV", q.VOLTAGE, "0 V ±0.005 V, stated"),
        ("20 mV, guess", q.VOLTAGE, "20 mV ±25 %, guess"),
        ("-20 mV -10/+50 %, measured", q.VOLTAGE, "-20 mV -10/+50 %, measured"),
        ("35 degC ±5 K, measured", q.TEMPERATURE, "35 °C ±5 K, measured"),
        ("35 degC, guess", q.TEMPERATURE, "35 °C ±10 K, guess"),
        ("45 deg, guess", q.ANGLE, "45 deg ±15 deg, guess"),
        ("70..100 %", q.PERCENT, "70..100 %, stated"),
        ("0.828", q.RATIO, "0.828, stated"),
        ("0.8 ±0.1", q.RATIO, "0.8 ±12.5 %, stated"),
        ("0.7 ±0.1", q.RATIO, "0.7 ±0.1, stated"),
        ("123456.7 ohm", q.RESISTANCE, "123.4567 kohm, stated"),
    ],
)
def test_show_reading(text, kind, shown):
    assert show_reading(read(text, kind, sign=Sign.ANY)) == shown


def test_show_reading_tells_of_a_dropped_sign():
    reading = read("-40 V, data sheet", q.VOLTAGE, sign=Sign.MAGNITUDE)
    assert show_reading(reading) == "40 V, data sheet (sign dropped)"
