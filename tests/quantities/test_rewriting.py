import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from safeamp.quantities import (
    ANGLE,
    CAPACITANCE,
    PERCENT,
    RATIO,
    RESISTANCE,
    TEMPERATURE,
    TIME,
    VOLTAGE,
    QuantityError,
    Sign,
    plain_text,
    read,
    rewrite,
)


# Derived: the unit, the tolerance as a share of the value and the origin stay; only the number changes.
@pytest.mark.parametrize(
    ("text", "kind", "value", "expected"),
    [
        ("34.8 V ±2 %, measured", VOLTAGE, 30.0, "30 V ±2 %, measured"),
        ("34 V", VOLTAGE, 0.5, "0.5 V"),
        ("14 mV ±1 mV", VOLTAGE, 0.028, "28 mV ±2 mV"),
        ("10 V -20/+50 %, marked", VOLTAGE, 12.0, "12 V -20/+50 %, marked"),
        ("30..34 V", VOLTAGE, 64.0, "60..68 V"),
        ("8 ohm, guess", RESISTANCE, 4.0, "4 ohm, guess"),
        ("4R7J", RESISTANCE, 10.0, "10 ohm ±5 %"),
        ("2200 uF", CAPACITANCE, 0.001, "1000 uF"),
        ("+12 mV", VOLTAGE, 0.02, "+20 mV"),
        ("-12 mV", VOLTAGE, 0.02, "+20 mV"),
        ("-12 mV", VOLTAGE, -0.02, "-20 mV"),
        ("2 min", TIME, 30.0, "0.5 min"),
        # A share of a temperature or an angle says nothing: the width stays.
        ("35 degC ±5 K", TEMPERATURE, 70.0, "70 degC ±5 K"),
        ("30..40 degC", TEMPERATURE, 70.0, "65..75 degC"),
        ("45 deg ±5 deg", ANGLE, 60.0, "60 deg ±5 deg"),
        ("70..90 %", PERCENT, 0.4, "35..45 %"),
        ("0 V ±2 V", VOLTAGE, 5.0, "5 V ±2 V"),
        ("5 V ±2 V", VOLTAGE, 0.0, "0 V ±2 V"),
    ],
)
def test_only_the_number_changes(text, kind, value, expected):
    assert rewrite(text, kind, value) == expected


def test_a_text_that_is_not_read_is_not_written_anew():
    with pytest.raises(QuantityError, match='"half the rail"'):
        rewrite("half the rail", RATIO, 0.4)


@pytest.mark.parametrize(
    ("kind", "value", "text"),
    [
        (CAPACITANCE, 0.0022, "2200 uF"),
        (TEMPERATURE, -5.0, "-5 degC"),
        (PERCENT, 0.8, "80 %"),
        (RATIO, 2.0, "2"),
    ],
)
def test_a_number_alone_has_the_first_unit_of_its_kind(kind, value, text):
    assert plain_text(kind, value) == text


@settings(deadline=None)
@given(
    text=st.sampled_from(
        ["34.8 V ±2 %", "34.8 V", "31..35 V", "20 mV ±1 mV", "12 V, guess", "1 kV -10/+20 %"]
    ),
    value=st.floats(1e-5, 999.0),
)
def test_what_is_written_is_read_with_the_same_shares(text, value):
    before, after = read(text, VOLTAGE), read(rewrite(text, VOLTAGE, value), VOLTAGE)
    assert after.nominal == pytest.approx(value, rel=1e-15)
    assert after.low / after.nominal == pytest.approx(before.low / before.nominal, rel=1e-9)
    assert after.high / after.nominal == pytest.approx(before.high / before.nominal, rel=1e-9)
    assert (after.origin, after.toleranced) == (before.origin, before.toleranced)


@settings(deadline=None)
@given(value=st.floats(-900.0, 900.0).filter(lambda value: value == 0 or abs(value) > 1e-6))
def test_a_value_without_tolerance_comes_back_to_the_last_bit(value):
    assert read(rewrite("-3 mV", VOLTAGE, value), VOLTAGE, sign=Sign.ANY).nominal == value
