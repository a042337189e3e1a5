"""Every written form that is read, and what it comes to (memory: the decimal prefixes of the SI)."""

import math

import pytest

from safeamp import quantities as q
from safeamp.quantities import KINDS, Origin, Sign, read, read_any

ACCEPTED = [
    # number
    ("35.2 V", q.VOLTAGE, 35.2),
    ("+35 V", q.VOLTAGE, 35.0),
    (".5 V", q.VOLTAGE, 0.5),
    ("1e3 mV", q.VOLTAGE, 1.0),
    ("1E+3 mV", q.VOLTAGE, 1.0),
    ("15e-1 V", q.VOLTAGE, 1.5),
    # blanks
    ("35V", q.VOLTAGE, 35.0),
    ("  35  V ", q.VOLTAGE, 35.0),
    ("35\u00a0V", q.VOLTAGE, 35.0),
    ("35\u2009V", q.VOLTAGE, 35.0),
    ("35\u202fV", q.VOLTAGE, 35.0),
    ("35\tV", q.VOLTAGE, 35.0),
    # every spelling of every kind
    ("22 mV", q.VOLTAGE, 0.022),
    ("0.4 kV", q.VOLTAGE, 400.0),
    ("3 A", q.CURRENT, 3.0),
    ("30 mA", q.CURRENT, 0.03),
    ("7 uA", q.CURRENT, 7e-6),
    ("7 \u00b5A", q.CURRENT, 7e-6),
    ("7 \u03bcA", q.CURRENT, 7e-6),
    ("60 W", q.POWER, 60.0),
    ("250 mW", q.POWER, 0.25),
    ("1.2 kW", q.POWER, 1200.0),
    ("8 ohm", q.RESISTANCE, 8.0),
    ("8 \u03a9", q.RESISTANCE, 8.0),
    ("8 \u2126", q.RESISTANCE, 8.0),
    ("8 R", q.RESISTANCE, 8.0),
    ("8R", q.RESISTANCE, 8.0),
    ("47 mohm", q.RESISTANCE, 0.047),
    ("4.7 kohm", q.RESISTANCE, 4700.0),
    ("50 Mohm", q.RESISTANCE, 50e6),
    ("2200 uF", q.CAPACITANCE, 0.0022),
    ("2200 \u00b5F", q.CAPACITANCE, 0.0022),
    ("2200 \u03bcF", q.CAPACITANCE, 0.0022),
    ("2200uF", q.CAPACITANCE, 0.0022),
    ("100nF", q.CAPACITANCE, 1e-7),
    ("100 nF", q.CAPACITANCE, 1e-7),
    ("47 pF", q.CAPACITANCE, 47e-12),
    ("2200 mfd", q.CAPACITANCE, 0.0022),
    ("2200 MFD", q.CAPACITANCE, 0.0022),
    ("1 H", q.INDUCTANCE, 1.0),
    ("0.5 mH", q.INDUCTANCE, 0.0005),
    ("2 uH", q.INDUCTANCE, 2e-6),
    ("50 Hz", q.FREQUENCY, 50.0),
    ("20 kHz", q.FREQUENCY, 20e3),
    ("5 s", q.TIME, 5.0),
    ("60 ms", q.TIME, 0.06),
    ("40 min", q.TIME, 2400.0),
    ("2 h", q.TIME, 7200.0),
    ("35 degC", q.TEMPERATURE, 35.0),
    ("35 °C", q.TEMPERATURE, 35.0),
    ("35 \u2103", q.TEMPERATURE, 35.0),
    ("-10 degC", q.TEMPERATURE, -10.0),
    ("0 degC", q.TEMPERATURE, 0.0),
    ("300 K", q.TEMPERATURE, 26.85),
    ("10 K", q.TEMPERATURE_DIFFERENCE, 10.0),
    ("0.95 K/W", q.THERMAL_RESISTANCE, 0.95),
    ("0.95 °C/W", q.THERMAL_RESISTANCE, 0.95),
    ("0.95 degC/W", q.THERMAL_RESISTANCE, 0.95),
    ("120 mm", q.LENGTH, 0.12),
    ("12 cm", q.LENGTH, 0.12),
    ("0.12 m", q.LENGTH, 0.12),
    ("25 g", q.MASS, 0.025),
    ("1.5 kg", q.MASS, 1.5),
    ("7.5 N/A", q.FORCE_FACTOR, 7.5),
    ("7.5 T m", q.FORCE_FACTOR, 7.5),
    ("1.2 mm/N", q.COMPLIANCE, 0.0012),
    ("45 deg", q.ANGLE, 45.0),
    ("-45 deg", q.ANGLE, -45.0),
    ("12 dB", q.LEVEL, 12.0),
    ("20 %", q.PERCENT, 0.2),
    ("0 %", q.PERCENT, 0.0),
    ("2 A/V2", q.TRANSCONDUCTANCE_PARAMETER, 2.0),
    ("2 A/V²", q.TRANSCONDUCTANCE_PARAMETER, 2.0),
    ("-2.1 mV/K", q.TEMPERATURE_COEFFICIENT, -0.0021),
    ("0.828", q.RATIO, 0.828),
    (0.828, q.RATIO, 0.828),
    (2, q.RATIO, 2.0),
]


@pytest.mark.parametrize(("text", "kind", "value"), ACCEPTED)
def test_plain_value_has_no_spread(text, kind, value):
    reading = read(text, kind)
    assert (reading.nominal, reading.low, reading.high) == (value, value, value)
    assert reading.origin is Origin.STATED
    assert not reading.toleranced
    assert not reading.sign_dropped
    assert reading.kind == kind


def test_every_spelling_is_in_the_table_above():
    for kind in KINDS.values():
        for spelling in kind.spellings:
            assert any(
                k == kind and spelling in str(text).replace("\u03bc", "µ") for text, k, _ in ACCEPTED
            ), f"{spelling} of {kind.name}"


@pytest.mark.parametrize("kind", [kind for kind in KINDS.values() if kind.spellings])
def test_example_of_each_kind_is_read(kind):
    assert math.isfinite(read(kind.example, kind).nominal)


@pytest.mark.parametrize(
    ("word", "origin"),
    [
        ("measured", Origin.MEASURED),
        ("marked", Origin.MARKED),
        ("data sheet", Origin.DATA_SHEET),
        ("data  sheet", Origin.DATA_SHEET),
        ("datasheet", Origin.DATA_SHEET),
        ("manual", Origin.MANUAL),
        ("guess", Origin.GUESS),
        ("example", Origin.EXAMPLE),
    ],
)
def test_origin_words(word, origin):
    assert read(f"35 V, {word}", q.VOLTAGE).origin is origin
    assert read(f"35 V ±2 %,{word}", q.VOLTAGE).origin is origin


def test_text_is_kept_as_written():
    assert read(" 35.2 V ±2 %, measured", q.VOLTAGE).text == " 35.2 V ±2 %, measured"


def test_minus_sign_u2212_is_a_minus():
    assert read("−5 V", q.VOLTAGE, sign=Sign.ANY).nominal == -5.0


@pytest.mark.parametrize("text", ["2200 uF", "2200u", "2200e0 uF", "2200000 nF", "2.2e9 pF"])
def test_values_are_rounded_once(text):
    # 2200 * 1e-6 in floats is one unit in the last place off for some digits; the decimal product is not.
    assert read(text, q.CAPACITANCE).nominal == float("2200e-6")


def test_hundred_values_round_correctly():
    for number in range(1, 1000):
        assert read(f"{number} uF", q.CAPACITANCE, believable=(0, 1)).nominal == float(f"{number}e-6")


def test_read_any_takes_the_kind_by_its_unit():
    assert read_any("14 mV, measured", (q.VOLTAGE, q.CURRENT)).kind is q.VOLTAGE
    assert read_any("30 mA", (q.VOLTAGE, q.CURRENT)).nominal == 0.03
    assert read_any("4R7", (q.VOLTAGE, q.RESISTANCE)).kind is q.RESISTANCE


def test_read_any_applies_the_range_of_the_kind_found():
    ranges = {"voltage": (0.0, 1.0), "current": (0.0, 1.0)}
    assert read_any("900 mV", (q.VOLTAGE, q.CURRENT), believable=ranges).nominal == 0.9
    with pytest.raises(q.QuantityError, match=r'"2 A" is not believable here \(0 A to 1 A\)'):
        read_any("2 A", (q.VOLTAGE, q.CURRENT), believable=ranges)
