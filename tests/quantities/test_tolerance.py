"""Tolerances, ranges, guesses, and the sign and range of what is believed."""

import re

import pytest

from safeamp import quantities as q
from safeamp.quantities import Origin, QuantityError, Sign, read

# Derived by hand: nominal, then nominal times or plus the tolerance.
BOUNDS = [
    ("34.8 V ±2 %", q.VOLTAGE, 34.8, 34.104, 35.496),
    ("35 V ±10%", q.VOLTAGE, 35.0, 31.5, 38.5),
    ("35 V +/-10 %", q.VOLTAGE, 35.0, 31.5, 38.5),
    ("35 V +/- 10 %", q.VOLTAGE, 35.0, 31.5, 38.5),
    ("100 uF -20/+50 %", q.CAPACITANCE, 1e-4, 0.8e-4, 1.5e-4),
    ("100 uF +50/-20 %", q.CAPACITANCE, 1e-4, 0.8e-4, 1.5e-4),
    ("100 uF −20/+50 %", q.CAPACITANCE, 1e-4, 0.8e-4, 1.5e-4),
    ("100 V -0/+10 %", q.VOLTAGE, 100.0, 100.0, 110.0),
    ("35 V ±2 V", q.VOLTAGE, 35.0, 33.0, 37.0),
    ("35 V ±200 mV", q.VOLTAGE, 35.0, 34.8, 35.2),
    ("35 V -1/+2 V", q.VOLTAGE, 35.0, 34.0, 37.0),
    ("31..35 V", q.VOLTAGE, 33.0, 31.0, 35.0),
    ("31 .. 35 V", q.VOLTAGE, 33.0, 31.0, 35.0),
    ("70..100 %", q.PERCENT, 0.85, 0.7, 1.0),
    ("35 degC ±5 K", q.TEMPERATURE, 35.0, 30.0, 40.0),
    ("300 K ±5 K", q.TEMPERATURE, 26.85, 21.85, 31.85),
    ("30..40 degC", q.TEMPERATURE, 35.0, 30.0, 40.0),
    ("45 deg ±5 deg", q.ANGLE, 45.0, 40.0, 50.0),
    ("75 deg ±15 deg", q.ANGLE, 75.0, 60.0, 90.0),
    ("12 dB ±2 dB", q.LEVEL, 12.0, 10.0, 14.0),
    ("0.8 ±0.1", q.RATIO, 0.8, 0.7, 0.9),
    ("0.8 ±10 %", q.RATIO, 0.8, 0.72, 0.88),
    ("-2 mV/K ±10 %", q.TEMPERATURE_COEFFICIENT, -0.002, -0.0022, -0.0018),
    ("4R7 ±10 %", q.RESISTANCE, 4.7, 4.23, 5.17),
    ("4R7 ±0.1 ohm", q.RESISTANCE, 4.7, 4.6, 4.8),
]


@pytest.mark.parametrize(("text", "kind", "nominal", "low", "high"), BOUNDS)
def test_bounds(text, kind, nominal, low, high):
    reading = read(text, kind)
    assert (reading.nominal, reading.low, reading.high) == (nominal, low, high)
    assert reading.toleranced


# The widening of a guess is common practice, no source.
@pytest.mark.parametrize(
    ("text", "kind", "low", "high"),
    [
        ("40 V, guess", q.VOLTAGE, 30.0, 50.0),
        ("35 degC, guess", q.TEMPERATURE, 25.0, 45.0),
        ("300 K, guess", q.TEMPERATURE, 16.85, 36.85),
        ("45 deg, guess", q.ANGLE, 30.0, 60.0),
        ("75 deg, guess", q.ANGLE, 60.0, 90.0),
        ("80 %, guess", q.PERCENT, 0.6, 1.0),
        ("-2 mV/K, guess", q.TEMPERATURE_COEFFICIENT, -0.0025, -0.0015),
        ("4R0, guess", q.RESISTANCE, 3.0, 5.0),
    ],
)
def test_guess_is_widened(text, kind, low, high):
    reading = read(text, kind)
    assert (reading.low, reading.high) == (low, high)
    assert reading.toleranced
    assert reading.origin is Origin.GUESS


def test_guess_with_a_tolerance_keeps_it():
    reading = read("40 V ±1 %, guess", q.VOLTAGE)
    assert (reading.low, reading.high) == (39.6, 40.4)


def test_guess_of_zero_cannot_be_widened():
    with pytest.raises(
        QuantityError, match="guesses zero, which no share of it can widen; write how far off"
    ):
        read("0 V, guess", q.VOLTAGE, sign=Sign.ANY)


def test_percentage_of_zero_is_refused():
    with pytest.raises(QuantityError, match='"0 V ±10 %" is a percentage of zero; write the tolerance in V'):
        read("0 V ±10 %", q.VOLTAGE, sign=Sign.ANY)
    assert read("0 V ±5 mV", q.VOLTAGE, sign=Sign.ANY).high == 0.005


SIGNS = [
    # at zero, just below, just above
    ("0 V", Sign.POSITIVE, '"0 V" is not above zero; write a voltage above zero'),
    ("-1 mV", Sign.POSITIVE, "is not above zero"),
    ("1 mV", Sign.POSITIVE, None),
    ("0 V", Sign.NON_NEGATIVE, None),
    ("-1 mV", Sign.NON_NEGATIVE, '"-1 mV" is not zero or above; write a voltage zero or above'),
    ("-1 mV", Sign.ANY, None),
    ("0 V", Sign.MAGNITUDE, None),
    # and what the tolerance reaches
    ("1 V ±1 V", Sign.POSITIVE, '"1 V ±1 V" reaches down to 0 V, which is not above zero'),
    ("1 V ±100 %", Sign.POSITIVE, "reaches down to 0 V"),
    ("1 V ±999 mV", Sign.POSITIVE, None),
    ("1 V ±1 V", Sign.NON_NEGATIVE, None),
    ("1 V ±1001 mV", Sign.NON_NEGATIVE, "reaches down to -1 mV, which is not zero or above"),
    ("1 V ±2 V", Sign.ANY, None),
    ("1 V ±2 V", Sign.MAGNITUDE, "reaches down to -1 V"),
    ("-1 V ±2 V", Sign.MAGNITUDE, "reaches down to -1 V"),
    ("-5..5 mV", Sign.MAGNITUDE, "reaches down to -5 mV"),
]


@pytest.mark.parametrize(("text", "sign", "words"), SIGNS)
def test_sign(text, sign, words):
    if words is None:
        assert read(text, q.VOLTAGE, sign=sign).kind is q.VOLTAGE
        return
    with pytest.raises(QuantityError, match=re.escape(words)):
        read(text, q.VOLTAGE, sign=sign)


def test_magnitude_drops_the_sign_and_says_so():
    reading = read("−40 V -5/+10 %, data sheet", q.VOLTAGE, sign=Sign.MAGNITUDE)
    assert (reading.nominal, reading.low, reading.high) == (40.0, 38.0, 44.0)
    assert reading.sign_dropped
    assert not read("40 V", q.VOLTAGE, sign=Sign.MAGNITUDE).sign_dropped
    assert read("-35..-31 V", q.VOLTAGE, sign=Sign.MAGNITUDE).low == 31.0


@pytest.mark.parametrize("text", ["1 V", "500 V", "-500 V"])
def test_ends_of_the_believable_range_are_believed(text):
    assert read(text, q.VOLTAGE, sign=Sign.MAGNITUDE, believable=(1.0, 500.0)).kind is q.VOLTAGE


@pytest.mark.parametrize(
    ("text", "kind", "believable", "words"),
    [
        (
            "35000 V",
            q.VOLTAGE,
            (1, 500),
            '"35000 V" is not believable here (1 V to 500 V); did you mean 35 V?',
        ),
        ("22 V", q.VOLTAGE, (1e-4, 0.5), "did you mean 22 mV?"),
        ("501 V", q.VOLTAGE, (1, 500), "(1 V to 500 V); write a voltage in that range"),
        ("0.999 V", q.VOLTAGE, (1, 500), "(1 V to 500 V); write a voltage in that range"),
        ("0 V", q.VOLTAGE, (1, 500), "write a voltage in that range"),
        ("100 mohm", q.RESISTANCE, (1e6, 1e10), "did you mean 100 Mohm?"),
        ("4M7", q.RESISTANCE, (0.01, 1e5), "did you mean 4.7 ohm or 4.7 kohm?"),
        ("-61 degC", q.TEMPERATURE, None, "(-60 °C to 500 °C); write a temperature in that range"),
        ("150 K", q.TEMPERATURE, None, "did you mean 150 °C?"),
        ("2e4 V", q.VOLTAGE, None, '"2e4 V" is not believable here'),
        ("91 deg", q.ANGLE, None, "impossible for an angle"),
    ],
)
def test_unbelievable_value_is_a_question(text, kind, believable, words):
    with pytest.raises(QuantityError, match=re.escape(words)):
        read(text, kind, sign=Sign.ANY, believable=believable)


def test_zero_is_left_to_the_sign_where_the_caller_gives_no_range():
    assert read("0 V", q.VOLTAGE, sign=Sign.NON_NEGATIVE).nominal == 0.0


def test_range_with_negative_low_end_is_signed():
    assert read("-10 degC", q.TEMPERATURE, believable=(-20, 60)).nominal == -10.0
    with pytest.raises(QuantityError, match="not believable"):
        read("-30 degC", q.TEMPERATURE, believable=(-20, 60))


def test_temperature_has_no_magnitude():
    with pytest.raises(ValueError, match="a temperature has no magnitude"):
        read("-5 degC", q.TEMPERATURE, sign=Sign.MAGNITUDE)
    assert read("-45 deg", q.ANGLE, sign=Sign.MAGNITUDE).nominal == 45.0
