"""Component codes against the printed examples of the standard."""

import tomllib
from pathlib import Path

import pytest

from safeamp.quantities import CAPACITANCE, RESISTANCE, QuantityError, read

PUBLISHED = tomllib.loads((Path(__file__).parents[1] / "published.toml").read_text(encoding="utf-8"))
CASE = next(case for case in PUBLISHED["case"] if case["id"] == "capacitor-8")  # IEC 60062


@pytest.mark.parametrize(
    ("code", "printed"), list(zip(CASE["given"]["code"], CASE["expected"]["resistance"], strict=True))
)
def test_published_resistor_codes(code, printed):
    assert read(code, RESISTANCE).nominal == read(printed, RESISTANCE).nominal


# Derived: the letter stands for the decimal point and the prefix.
@pytest.mark.parametrize(
    ("code", "kind", "value"),
    [
        ("0R33", RESISTANCE, 0.33),
        ("R22", RESISTANCE, 0.22),
        ("1R0", RESISTANCE, 1.0),
        ("4k7", RESISTANCE, 4700.0),
        ("10K", RESISTANCE, 10e3),
        ("4M7", RESISTANCE, 4.7e6),
        ("10M", RESISTANCE, 10e6),
        ("2u2", CAPACITANCE, 2.2e-6),
        ("2\u00b52", CAPACITANCE, 2.2e-6),
        ("100n", CAPACITANCE, 100e-9),
        ("2200u", CAPACITANCE, 2200e-6),
        ("4n7", CAPACITANCE, 4.7e-9),
        ("p47", CAPACITANCE, 0.47e-12),
        ("47p", CAPACITANCE, 47e-12),
    ],
)
def test_codes(code, kind, value):
    reading = read(f"{code}, marked", kind)
    assert (reading.nominal, reading.toleranced) == (value, False)


# Letters of IEC 60062 (memory): F 1 %, G 2 %, J 5 %, K 10 %, M 20 %.
@pytest.mark.parametrize(
    ("code", "kind", "low", "high"),
    [
        ("100RF", RESISTANCE, 99.0, 101.0),
        ("100RG", RESISTANCE, 98.0, 102.0),
        ("100RJ", RESISTANCE, 95.0, 105.0),
        ("100R J", RESISTANCE, 95.0, 105.0),
        ("100RK", RESISTANCE, 90.0, 110.0),
        ("100RM", RESISTANCE, 80.0, 120.0),
        ("4K0K", RESISTANCE, 3600.0, 4400.0),
        ("10KJ", RESISTANCE, 9500.0, 10500.0),
        ("2M0M", RESISTANCE, 1.6e6, 2.4e6),
        ("100nK", CAPACITANCE, 90e-9, 110e-9),
        ("2u0F", CAPACITANCE, 1.98e-6, 2.02e-6),
    ],
)
def test_tolerance_letters(code, kind, low, high):
    reading = read(code, kind)
    assert (reading.low, reading.high, reading.toleranced) == (low, high, True)


def test_farad_behind_a_whole_number_is_a_unit_not_a_letter():
    assert not read("100nF", CAPACITANCE).toleranced


@pytest.mark.parametrize("text", ["4R7R", "R", "k", "4R7 7", "1234567R1", "4R7Z", "4m7", "4r7"])
def test_what_is_no_code_is_refused(text):
    with pytest.raises(QuantityError, match="; write "):
        read(text, RESISTANCE)
