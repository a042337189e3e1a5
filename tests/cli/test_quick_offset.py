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
    assert (found["verdict"], found["status"]) == (None, 0)


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
