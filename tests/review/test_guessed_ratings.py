"""What the maker's ratings excuse rests on what was read, never on a guess."""

import pytest

from safeamp.findings import Verdict
from tests.review.planted import found

BEYOND = "50w_split_rail_120v"  # uses 1.05 of its safe area into the loudspeaker, as its maker built it


@pytest.mark.parametrize(
    ("key", "value", "named"),
    [
        ("stage.rated_load", "8 ohm", "stage.rated_load"),
        ("loudspeaker.dc_resistance", "6.4 ohm", "loudspeaker.dc_resistance"),
        ("loudspeaker.nominal_impedance", "8 ohm", "loudspeaker.dc_resistance"),
        ("mains.rated", "120 V", "mains.rated"),
        ("mains.actual", "121 V", "mains.rated"),
    ],
)
def test_a_guessed_rating_excuses_nothing(key, value, named):
    stated = found(BEYOND, {key: f"{value} ±1 %"})["soa.loudspeaker"]
    guessed = found(BEYOND, {key: f"{value} ±1 %, guess"})["soa.loudspeaker"]
    assert (stated.verdict, guessed.verdict) == (Verdict.CAUTION, Verdict.STOP)
    assert guessed.because[0] == f"not excused as built by its maker: {named}"


@pytest.mark.parametrize(("spread", "word"), [("20 %", Verdict.CAUTION), ("45 %", Verdict.UNVERIFIED)])
def test_a_guess_beyond_the_ceiling_of_what_is_excused_has_to_be_measured(spread, word):
    """At 4 ohm of rating the sheet uses 0.67; a guess of the rails takes it beyond 1, and further beyond 1.8."""
    rails = {"supply.no_load": f"39.5 V ±{spread}, guess", "supply.full_load": f"35 V ±{spread}, guess"}
    one = found("60w_two_pairs", rails | {"supply.at_mains": "253 V"})["soa.loudspeaker"]
    assert one.worst > 1.0
    assert (one.worst > 1.8) is (word is Verdict.UNVERIFIED)
    assert one.verdict is word
