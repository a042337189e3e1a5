"""Properties: what is shown is read back, and no text breaks the reader."""

import math

import pytest
from hypothesis import example, given, settings
from hypothesis import strategies as st

from safeamp import quantities as q
from safeamp.quantities import KINDS, Origin, QuantityError, Reading, Sign, read, show, show_reading

READ = [kind for kind in KINDS.values() if kind.spellings]
PIECES = st.sampled_from(
    [
        *"0123456789.,;:+-−±%/*^()<>~@ eEVAWRFkKMmunpµΩ°²x×'_",
        *("..", "degC", "ohm", "uF", "mV", "deg", "+/-", "nan", ", measured", ", guess", ", data sheet"),
        *("\u00a0", "\u200b", "٣", "999", "4R7", "2u2", "35 V", " -20/+50 %"),
    ]
)


def values_of(kind):
    low, high = kind.believable
    magnitudes = st.floats(max(low, 1e-6 * high), high * 0.99)
    return (
        magnitudes
        if kind.sign in (Sign.POSITIVE, Sign.NON_NEGATIVE)
        else magnitudes | magnitudes.map(lambda x: -x)
    )


@pytest.mark.parametrize("kind", READ, ids=[kind.name for kind in READ])
@given(data=st.data(), digits=st.integers(2, 12))
@settings(deadline=None, max_examples=40)
def test_what_is_shown_is_read_back(kind, data, digits):
    value = data.draw(values_of(kind))
    if kind is q.TEMPERATURE:
        value = max(value, -59.0)
    again = read(show(value, kind, digits), kind, believable=(-1e30, 1e30))
    # Half a unit of the last digit, and never more than ten times that at a leading 1.
    assert again.nominal == pytest.approx(value, rel=0.51 * 10.0 ** (1 - digits), abs=0.0)
    assert not again.toleranced


@pytest.mark.parametrize("kind", READ, ids=[kind.name for kind in READ])
@given(data=st.data(), percent=st.integers(1, 90), origin=st.sampled_from(["measured", "marked", "guess"]))
@settings(deadline=None, max_examples=25)
def test_a_reading_in_full_is_read_back(kind, data, percent, origin):
    value = round(data.draw(values_of(kind)), 6) or kind.believable[1]
    text = show(value, kind, 6)
    if kind.percent_tolerance:
        text += f" ±{percent} %"
    elif kind is q.TEMPERATURE:
        text = f"{abs(value) % 100:.2f} degC ±{percent} K"
    elif kind is q.PERCENT:
        text = f"{percent}..{percent + 7} %"
    else:
        text = f"{percent / 10} {kind.unit} ±{percent / 100} {kind.unit}"
    first = read(f"{text}, {origin}", kind, believable=(-1e30, 1e30))
    again = read(show_reading(first), kind, believable=(-1e30, 1e30))
    assert again.origin is first.origin
    for end in ("nominal", "low", "high"):
        assert getattr(again, end) == pytest.approx(getattr(first, end), rel=1e-6, abs=1e-9 * abs(first.high))


@given(text=st.lists(PIECES, max_size=14).map("".join) | st.text(max_size=90), kind=st.sampled_from(READ))
@settings(deadline=None, max_examples=600)
@example(text="9**9**9 V", kind=q.VOLTAGE)
@example(text="1e999999999 V", kind=q.VOLTAGE)
@example(text="0" * 79 + "V", kind=q.VOLTAGE)
@example(text="+" * 80, kind=q.VOLTAGE)
@example(text=" 1" * 40, kind=q.VOLTAGE)
@example(text="1 V/" * 20, kind=q.VOLTAGE)
@example(text="\ud800", kind=q.VOLTAGE)
def test_any_text_is_read_or_refused(text, kind):
    for sign in Sign if kind is not q.TEMPERATURE else (Sign.ANY, Sign.POSITIVE, Sign.NON_NEGATIVE):
        outcome = read_or_refuse(text, kind, sign)
        if isinstance(outcome, Reading):
            assert_sound(outcome, sign)
        else:
            assert outcome.found
            assert outcome.write
            assert "None" not in str(outcome) or "None" in text


def read_or_refuse(text, kind, sign):
    try:
        return read(text, kind, sign=sign)
    except QuantityError as error:
        return error


def assert_sound(reading: Reading, sign: Sign) -> None:
    assert all(math.isfinite(end) for end in (reading.nominal, reading.low, reading.high))
    assert reading.low <= reading.nominal <= reading.high
    assert reading.toleranced or reading.low == reading.high
    assert reading.origin is not Origin.ASSUMED
    if sign is Sign.POSITIVE:
        assert reading.low > 0
    if sign in (Sign.NON_NEGATIVE, Sign.MAGNITUDE):
        assert reading.low >= 0


@given(number=st.decimals(1, 900, places=3), blank=st.sampled_from(["", " ", "\u00a0"]))
@settings(deadline=None)
def test_blanks_change_nothing(number, blank):
    assert read(f"{number}{blank}V", q.VOLTAGE).nominal == float(number)


@given(value=st.floats(), kind=st.sampled_from(list(KINDS.values())), digits=st.integers(1, 15))
@settings(deadline=None, max_examples=300)
def test_show_never_prints_minus_zero_or_an_odd_number(value, kind, digits):
    text = show(value, kind, digits)
    assert not text.startswith("-0 ")
    assert text != "-0"
    assert "nan" not in text
    assert "E" not in text.split(" ")[0]
