"""Every form that is refused, each with its own sentence."""

import re

import pytest

from safeamp import quantities as q
from safeamp.quantities import KINDS, QuantityError, Sign, read, read_any
from safeamp.quantities.refusals import refuse_shape

EXAMPLE = 'write a voltage, such as "35 V"'
RANGE = "write its ends with two dots between them and the unit once, at the end"
ORIGINS = "write one of measured, marked, data sheet, manual, guess, example"

VOLTS = [
    ("", '"" is empty; ' + EXAMPLE),
    ("   ", "is empty; " + EXAMPLE),
    ("35", '"35" has no unit; ' + EXAMPLE),
    ("V", '"V" has no number; ' + EXAMPLE),
    ("none", '"none" has no number'),
    ("35 V !", '"35 V !" is not read as a voltage; ' + EXAMPLE),
    # decimal comma and thousands
    ("4,7 V", '"4,7 V" has a comma; write decimals after a point: "4.7 V"'),
    ("0,500 V", '"0,500 V" has a comma; write decimals after a point: "0.500 V"'),
    ("1,500 V", 'write "1.500 V" if it marks decimals, "1500 V" if it marks thousands'),
    ("1.500,00 V", "write decimals after a point and thousands without a mark"),
    ("1,500,000 V", "write decimals after a point and thousands without a mark"),
    ("35 V ±2,5 %", 'has a comma; write decimals after a point: "35 V ±2.5 %"'),
    ("2 000 V", '"2 000 V" groups the digits of its number; write them without a gap: "2000 V"'),
    ("1'000 V", 'groups the digits of its number; write them without a gap: "1000 V"'),
    ("1 000 000 V", 'groups the digits of its number; write them without a gap: "1000000 V"'),
    ("1 000 3 V", "groups the digits of its number; write them without a gap"),
    # more than one number
    ("35 2 V", '"35 2 V" holds two numbers; write one value, as one number'),
    ("35 V 2", "holds two numbers"),
    ("35 V 20 A", "holds two numbers"),
    ("2 x 35 V", '"2 x 35 V" is a product; write one value'),
    ("2x35 V", "is a product"),
    ("2 × 35 V", "is a product"),
    ("2*35 V", "is a product"),
    ("35-0-35 V", '"35-0-35 V" is a winding with a centre tap; write one half of it: "35 V"'),
    ("35 V-0-35 V", 'a centre tap; write one half of it: "35 V"'),
    ("31-35 V", f'"31-35 V" looks like a range; {RANGE}: "31..35 V"'),
    ("31 to 35 V", f'looks like a range; {RANGE}: "31..35 V"'),
    ("31–35 V", f'looks like a range; {RANGE}: "31..35 V"'),
    ("31…35 V", f'looks like a range; {RANGE}: "31..35 V"'),
    ("0...5 V", f'looks like a range; {RANGE}: "0..5 V"'),
    ("31 V..35 V", f'looks like a range; {RANGE}: "31..35 V"'),
    ("35..31 V", 'does not rise; write the smaller end first: "31..35 V"'),
    ("35..35 V", "has two equal ends; write one number alone"),
    # not a value
    ("~30 V", '"~30 V" is only roughly a value; write number and unit and call it a guess: "30 V, guess"'),
    ("≈ 30 V", 'call it a guess: "30 V, guess"'),
    ("about 30 V", 'call it a guess: "30 V, guess"'),
    ("<5 V", '"<5 V" is a bound, not a value; write what was read, or a range'),
    ("≥ 5 V", "is a bound, not a value"),
    ("max 5 V", "is a bound, not a value"),
    ("35 V @ 2 A", "joins a value to its condition; write the value alone"),
    ("±35 V", '"±35 V" gives both signs at once; write one rail: "35 V"'),
    ("+/-35 V", 'write one rail: "35 V"'),
    ("± 2 % 35 V", "starts with a tolerance; write number and unit before it"),
    ("35+2 V", '"35+2 V" is a calculation; write its result'),
    ("70/2 V", "is a calculation"),
    ("9**9**9 V", "is a calculation"),
    ("9^9 V", "is a calculation"),
    ("=35 V", "is a calculation"),
    ("(35 V)", "has brackets; write number and unit without them"),
    ("nan V", '"nan V" is no number; write what was read, or leave the key out when it is not known'),
    ("NaN", "is no number"),
    ("-inf V", "is no number"),
    ("∞ V", "is no number"),
    ("infinity", "is no number"),
    ("9e999 V", '"9e999 V" is no finite number'),
    ("9e99999 V", "has an exponent beyond all use; write an ordinary number"),
    ("1e-999 V", "is nearer to zero than any number here"),
    ("35. V", 'ends its number with a point; write digits after the point or none: "35 V"'),
    ("- 35 V", 'has a blank after the sign; write them together: "-35 V"'),
    # characters
    ("٣٥ V", "has a character that is not read; write digits 0 to 9"),
    ("３５ V", "has a character that is not read"),
    ("10² V", "has a character that is not read"),
    ("½ V", '"½ V" '),
    ("35\nV", r'"35\u000aV" has an invisible character (U+000A)'),
    ("35\x00V", "has an invisible character (U+0000)"),
    ("35\u200bV", "has an invisible character (U+200B)"),
    ("35 \u202eV", "has an invisible character (U+202E)"),
    ("35 V" + " " * 80, "is longer than 80 characters"),
    # unit
    ("35 A", '"35 A" is a current; ' + EXAMPLE),
    ("35 K", '"35 K" is a temperature or a temperature difference; ' + EXAMPLE),
    ("2 A/V2", "is a transconductance parameter; " + EXAMPLE),
    ("35 foo", '"foo" is not a unit of a voltage here; write V, mV or kV'),
    ("35 Volts", '"Volts" is not a unit of a voltage here; write V, mV or kV'),
    ("35 V rms", '"V rms" is not a unit of a voltage here'),
    ("35 v", '"v" is not a unit of a voltage here; write "35 V"'),
    ("35 mv", 'write "35 mV"'),
    ("35 KV", 'write "35 kV"'),
    ("35 m V", 'write "35 mV"'),
    ("35 MV", '"35 MV": the M of MV means mega; write mV or V, whichever it is'),
    ("4R7", '"4R7" is a component code, which is read for resistances and capacitances only; ' + EXAMPLE),
    ("4V7", "is a component code"),
    ("10k", "is a component code"),
    ("100n", "is a component code"),
    # origin
    ("35 V measured", '"35 V measured" has no comma before the origin; write "35 V, measured"'),
    ("35 V, made", '"made" is not an origin; ' + ORIGINS),
    ("35 V, Measured", '"Measured" is not an origin; ' + ORIGINS),
    ("35 V, 2 A", '"2 A" is not an origin; ' + ORIGINS),
    ("35 V, measured, marked", '"measured, marked" is not an origin'),
    ("35 V,", '"35 V," ends with a comma; write an origin after it'),
    ("35 V, stated", "is never written; leave the word and its comma out"),
    ("35 V, assumed", 'which only the program fills in; write "guess" for your own'),
    ("35 V, measured ±2 %", "has its tolerance after the comma; write it before the comma"),
    # tolerance
    ("35 V ±2 A", "has a tolerance in A; write the tolerance of a voltage in % or V or mV or kV"),
    ("35 V ±2", "has a tolerance without unit; write the tolerance of a voltage in %"),
    ("35 V +-2 %", 'has a sign of tolerance that is not read; write ± or +/-: "35 V ±2 %"'),
    ("35 V 2 %", 'has a tolerance without a sign; write ± before it: "35 V ±2 %"'),
    ("35 V +2 %", 'has a tolerance to one side only; write both sides: "35 V -0/+2 %"'),
    ("35 V -2 %", 'has a tolerance to one side only; write both sides: "35 V -2/+0 %"'),
    ("35 V +20/+50 %", 'has a tolerance to one side twice; write it as "-20/+50 %"'),
    ("35 V ±2 % ±3 %", "has two tolerances; write one"),
    ("31..35 V ±2 %", "has a range and a tolerance; write one of the two"),
    ("35 V ±0 %", "has a tolerance of zero; leave the tolerance out"),
    ("35 V ±-2 %", "is not read as a voltage"),
    ("35 V ±9e999 %", "is no finite number"),
]


def says(words):
    return pytest.raises(QuantityError, match=re.escape(words))


@pytest.mark.parametrize(("text", "words"), VOLTS)
def test_refused_voltage(text, words):
    with says(words):
        read(text, q.VOLTAGE, sign=Sign.ANY, believable=(0, 1e9))


OTHERS = [
    ("2200 mF", q.CAPACITANCE, "mF is printed for microfarad, and also stands for millifarad"),
    ("2200 mf", q.CAPACITANCE, "mf is printed for microfarad, and also stands for millifarad"),
    ("2200 MF", q.CAPACITANCE, "MF is printed for microfarad, and also stands for millifarad"),
    ("1 F", q.CAPACITANCE, '"F" is not a unit of a capacitance here; write uF, µF, nF, pF, mfd or MFD'),
    ("100 NF", q.CAPACITANCE, 'write "100 nF"'),
    ("100 n", q.CAPACITANCE, 'n alone is not a unit; write "100 nF"'),
    ("4R7", q.CAPACITANCE, '"4R7" is not a code of a capacitance; write a capacitance, such as "2200 uF"'),
    ("2u2", q.RESISTANCE, '"2u2" is not a code of a resistance; write a resistance, such as "8 ohm"'),
    ("4R7 ohm", q.RESISTANCE, '"4R7 ohm" has more than a code; write the code alone: "4R7"'),
    ("-4R7", q.RESISTANCE, 'write the code alone: "4R7"'),
    ("4R7J ±5 %", q.RESISTANCE, "has a tolerance letter and a tolerance; write one of the two"),
    ("4R7 ~", q.RESISTANCE, '"4R7 ~" is not read as a resistance'),
    ("4R7 ±", q.RESISTANCE, '"4R7 ±" is not read as a resistance'),
    ("R", q.RESISTANCE, '"R" has no number'),
    ("10 K", q.RESISTANCE, 'K alone is not a unit; write "10 kohm"'),
    ("10 k", q.RESISTANCE, 'k alone is not a unit; write "10 kohm"'),
    ("4.7k", q.RESISTANCE, 'k alone is not a unit; write "4.7 kohm"'),
    ("8 Ohm", q.RESISTANCE, 'write "8 ohm"'),
    ("4.7 kΩ", q.RESISTANCE, 'write "4.7 kohm"'),
    ("5 MOHM", q.RESISTANCE, 'write "5 mohm" or "5 Mohm"'),
    ("25 C", q.TEMPERATURE, 'C alone is not a unit; write "25 degC"'),
    ("77 F", q.TEMPERATURE, "Fahrenheit is not read; write the temperature in degC"),
    ("77 °F", q.TEMPERATURE, "Fahrenheit is not read"),
    ("25 deg", q.TEMPERATURE, '"25 deg" is an angle; write a temperature, such as "35 degC"'),
    ("25 deg C", q.TEMPERATURE, 'write "25 degC"'),
    ("25 degC ±5 %", q.TEMPERATURE, "has a tolerance in %; write the tolerance of a temperature in K"),
    ("25 degC ±5 degC", q.TEMPERATURE, "has a tolerance in degC; write the tolerance of a temperature in K"),
    ("-274 degC", q.TEMPERATURE, "reaches -274 °C, which is impossible for a temperature"),
    ("-20 degC ±254 K", q.TEMPERATURE, "reaches -274 °C, which is impossible for a temperature"),
    ("45 deg ±10 %", q.ANGLE, "has a tolerance in %; write the tolerance of an angle in deg"),
    ("80 deg ±11 deg", q.ANGLE, "reaches 91 deg, which is impossible for an angle"),
    ("80 deg, guess", q.ANGLE, "widened as a guess, reaches 95 deg, which is impossible for an angle"),
    ("12 dB ±10 %", q.LEVEL, "write the tolerance of a level in dB"),
    ("80 % ±10 %", q.PERCENT, 'write a range with two dots instead, such as "70..90 %"'),
    ("20 %", q.RATIO, '"20 %" is a percentage; write a ratio, such as "0.8"'),
    ("2 foo", q.RATIO, '"foo" is not a unit of a ratio here; write a number alone, such as 0.8'),
    ("±5 mA", q.CURRENT, 'write one value: "5 mA"'),
    ("5 J", q.ENERGY, "an energy is only printed, never read"),
    ("12 m", q.TIME, '"12 m" is a length; write a time, such as "60 ms"'),
    ("7 Tm", q.FORCE_FACTOR, 'write "7 T m"'),
    ("45 °", q.ANGLE, '"°" is not a unit of an angle here; write deg'),
    (35, q.VOLTAGE, '35 has no unit; write a voltage in quotes, such as "35 V"'),
    (35.5, q.VOLTAGE, "35.5 has no unit"),
    pytest.param(10**5000, q.VOLTAGE, "the number has no unit", id="5001 digits"),
    (True, q.VOLTAGE, "true is not a voltage; write a voltage in quotes"),
    (False, q.RATIO, "false is not a ratio; write a bare number, such as 0.8"),
    ([35], q.VOLTAGE, "a list is not a voltage"),
    ({}, q.VOLTAGE, "a table is not a voltage"),
    (None, q.VOLTAGE, "nothing is not a voltage"),
    (1j, q.RATIO, "what stands here is not a ratio"),
    (float("nan"), q.RATIO, "nan is no finite number"),
    (float("inf"), q.RATIO, "inf is no finite number"),
    (10**400, q.RATIO, "the number is beyond all use"),
]


@pytest.mark.parametrize(("value", "kind", "words"), OTHERS)
def test_refused_value_of_another_kind(value, kind, words):
    with says(words):
        read(value, kind)


@pytest.mark.parametrize("unit", ["mF", "mf", "MF"])
def test_neither_reading_of_millifarad_is_suggested(unit):
    with pytest.raises(QuantityError) as caught:
        read(f"2200 {unit}", q.CAPACITANCE)
    assert "2200" not in caught.value.write
    assert "microfarad" in caught.value.found
    assert "millifarad" in caught.value.found


def test_error_is_one_sentence_of_found_and_write():
    with pytest.raises(QuantityError) as caught:
        read("4,7 V", q.VOLTAGE)
    error = caught.value
    assert (
        str(error)
        == f"{error.found}; {error.write}"
        == ('"4,7 V" has a comma; write decimals after a point: "4.7 V"')
    )


@pytest.mark.parametrize(("text", "words"), VOLTS)
def test_what_is_suggested_in_quotes_is_read(text, words):
    with pytest.raises(QuantityError) as caught:
        read(text, q.VOLTAGE, sign=Sign.ANY, believable=(0, 1e9))
    for suggestion in re.findall(r'"([^"]*[0-9] ?[^"]*)"', caught.value.write):
        if suggestion != "-20/+50 %":
            assert read(suggestion, q.VOLTAGE, sign=Sign.ANY, believable=(0, 1e9)).kind is q.VOLTAGE


@pytest.mark.parametrize("other", [kind for kind in KINDS.values() if kind.spellings])
def test_unit_of_another_kind_is_named(other):
    spelling = next(iter(other.spellings))
    for kind in KINDS.values():
        if not spelling or spelling in kind.spellings or kind == other:
            continue
        if kind is q.ENERGY or (kind is q.RESISTANCE and spelling == "K"):
            continue  # an energy is never read; "5 K" may be a code written apart
        with pytest.raises(QuantityError, match=rf"is .*\b{other.name}"):
            read(f"5 {spelling}", kind)


def test_read_any_names_all_kinds():
    with says('"3 kg" is a mass; write a voltage, such as "35 V" or a current, such as "30 mA"'):
        read_any("3 kg", (q.VOLTAGE, q.CURRENT))
    with says('30 has no unit; write a voltage, such as "35 V" or a current, such as "30 mA"'):
        read_any(30, (q.VOLTAGE, q.CURRENT))
    with says('"30" has no unit; write a voltage, such as "35 V" or a current, such as "30 mA"'):
        read_any("30", (q.VOLTAGE, q.CURRENT))


def test_read_any_keeps_a_concrete_suggestion():
    with says('write "30 mA"'):
        read_any("30 ma", (q.VOLTAGE, q.CURRENT))


def test_read_any_says_what_is_wrong_in_the_kind_that_fits():
    with says("has a tolerance of zero"):
        read_any("30 mA ±0 %", (q.VOLTAGE, q.CURRENT))


def test_a_suggestion_that_would_not_be_read_is_not_made():
    assert refuse_shape("31-35 foo", q.VOLTAGE, lambda text, kind: False).write == RANGE
