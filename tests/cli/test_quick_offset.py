"""The quick answer about DC at the output: printed values, words, refusals."""

import pytest

from tests.cli.quick_line import answer, refusal
from tests.published_cases import printed


@pytest.mark.parametrize(
    ("reading", "word", "status"),
    [
        ("50 mV", "go", 0), ("-50 mV", "go", 0), ("51 mV", "caution", 3), ("100 mV", "caution", 3),
        ("-101 mV", "stop", 5), ("0.6 mV", "go", 0), ("0.5 mV", "unverified", 4),
        ("30 mV, example", "unverified", 4), ("45 mV, guess", "go", 0), ("90 mV, guess", "unverified", 4),
        ("90 mV ±20 %", "caution", 3),
    ],
)  # fmt: skip
def test_offset_is_judged_by_the_same_limits(reading, word, status):
    found = answer("offset", reading=reading, dc_resistance="6 ohm")
    assert (found["verdict"], found["status"]) == (word, status)


def test_printed_current_of_a_stuck_stage():
    found = answer("offset", reading="60 V", dc_resistance="5.6 ohm")
    assert found["results"]["current"]["value"] == printed("offset-4", "current")
    assert found["status"] == 5
    assert "switch off" in found["findings"][0]["says"]


def test_printed_dc_that_a_share_of_the_excursion_allows():
    driver = {"dc_resistance": "5.5 ohm", "force_factor": "8.2 N/A", "compliance": "1.34 mm/N"}
    found = answer("offset", share="10 %", linear_excursion="6.5 mm", **driver)
    assert found["results"]["reading"]["value"] == printed("offset-3", "allowed_dc")
    assert found["results"]["excursion_share"]["value"] == pytest.approx(0.1)
    assert (found["verdict"], found["status"]) == ("stop", 5)


DRIVER = {"dc_resistance": "6 ohm", "force_factor": "7.5 N/A", "compliance": "1.2 mm/N"}


# Derived: 5 mm x 6 ohm / (7.5 N/A x 1.2 mm/N) = 3.333 V for the whole excursion.
@pytest.mark.parametrize(
    ("share", "word", "status"),
    [
        ("10 %", "stop", 5), ("2.9 %", "caution", 3), ("1.4 %", "go", 0),
        ("2.9..3.2 %", "stop", 5), ("2.6..3.2 %", "caution", 3),
        ("1.3..1.5 %", "go", 0), ("0.01 %", "go", 0), ("1 %, example", "unverified", 4),
    ],
)  # fmt: skip
def test_dc_that_the_cone_would_stand_is_judged_as_if_it_were_read(share, word, status):
    found = answer("offset", share=share, linear_excursion="5 mm", **DRIVER)
    assert (found["verdict"], found["status"]) == (word, status)
    assert found["holds_for"] == "this DC if it stood at the output"


def test_it_is_said_that_the_cone_would_stand_more_than_the_output_may_have():
    found = answer("offset", share="10 %", linear_excursion="5 mm", **DRIVER)["findings"][0]
    assert (found["id"], found["says"]) == (
        "offset.output",
        "333.3 mV of DC at the output, as the share allows",
    )
    assert found["next"] == "what the cone stands is not what the output may have: allow a smaller share"


def test_a_range_that_crosses_zero_starts_at_no_power():
    # Derived: from -18 mV to 82 mV; (82 mV)^2 / 6 ohm = 1.121 mW, and 0 W in between.
    found = answer("offset", reading="32 mV ±50 mV", linear_excursion="5 mm", **DRIVER)["results"]
    assert (found["power"]["low"], found["power"]["high"]) == (0.0, pytest.approx(1.1207e-3, rel=1e-4))
    assert found["excursion_share"]["low"] == 0.0
    assert found["current"]["low"] == pytest.approx(-3e-3)
    sure = answer("offset", reading="32 mV ±20 mV", **DRIVER)["results"]
    assert sure["power"]["low"] == pytest.approx(0.012**2 / 6.0)


def test_cone_displacement_keeps_the_sign():
    # Derived: 7.5 N/A x (-30 mV / 6 ohm) x 1.2 mm/N = -45 um.
    found = answer(
        "offset", reading="-30 mV", dc_resistance="6 ohm", force_factor="7.5 N/A", compliance="1.2 mm/N"
    )
    assert found["results"]["cone_displacement"] == {"value": pytest.approx(-45e-6), "unit": "m"}
    assert found["results"]["power"]["value"] == pytest.approx(0.15e-3)


@pytest.mark.parametrize(
    ("options", "says"),
    [
        ({}, "offset: too little is given; add --reading"),
        ({"dc_resistance": "6 ohm"}, "add --reading"),
        ({"share": "10 %"}, "add --dc-resistance, --force-factor, --compliance and --linear-excursion"),
        ({"reading": "30 mV", "share": "10 %"}, "contradict each other"),
        ({"reading": "30 mV", "force_factor": "7 N/A"}, "add --dc-resistance and --compliance"),
        ({"reading": "30"}, "--reading: "),
    ],
)
def test_offset_says_what_to_add(options, says):
    assert says in refusal("offset", **options)
