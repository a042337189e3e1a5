"""Percentages that never read certain where they are not, and what a line says."""

import pytest

from safeamp.answers import Chance, FindingChances
from safeamp.checks.amounts import shown_kind
from safeamp.findings import Step, Verdict
from safeamp.quantities import PERCENT, RATIO, TEMPERATURE
from safeamp.report.tolerance import (
    chance_text,
    key_text,
    render_tolerance,
    tolerance_mapping,
)
from safeamp.studies.tolerance import tolerance
from tests.scenarios.sheets import limits, sheet


@pytest.mark.parametrize(
    ("chance", "text"),
    [
        (Chance(1.0, 1.0, 1.0), "100 %"),
        (Chance(1.0, 0.9998, 1.0), "100 % (at least 99.98 %)"),
        (Chance(0.0, 0.0, 0.0002), "0 % (at most 0.02 %)"),
        (Chance(0.5, 0.4, 0.6), "50.0 % (40.0 % to 60.0 %)"),
    ],
)
def test_chance(chance, text):
    assert chance_text(chance) == text


@pytest.mark.parametrize(
    ("path", "text"),
    [
        ("supply.no_load.0", "supply.no_load"),
        ("supply.no_load.1", "supply.no_load (2)"),
        ("mains.present", "mains"),
        ("supply.full_load_share", "supply.full_load"),
    ],
)
def test_key(path, text):
    assert key_text(path) == text


def test_a_use_is_shown_as_a_percentage():
    words = {word: Chance(0.25, 0.2, 0.3) for word in Verdict}
    common = {"step": Step.SOAK, "words": words, "sampled": True}
    assert shown_kind(FindingChances(id="soa.loudspeaker", kind=RATIO, **common)) == PERCENT
    assert shown_kind(FindingChances(id="heat.junction", kind=TEMPERATURE, **common)) == TEMPERATURE


def test_a_value_without_bound_is_said():
    # a hot heatsink: in some samples nothing of the safe area is left
    changes = {"heatsink.sink_to_air": "3.6 K/W ±15 %, measured"}
    answer = tolerance(sheet("split_rail", changes), limits(), samples=600)
    use = next(one for one in answer.findings if one.id == "soa.resistive_load")
    assert use.quantiles[0.95] == float("inf")
    assert "95 % at or below unbounded" in " ".join(render_tolerance(answer).split())
    (mapped,) = [one for one in tolerance_mapping(answer)["findings"] if one["id"] == use.id]
    assert mapped["quantiles"][-1] == {"share": 0.95, "value": None}


def test_where_no_reading_decides_it_says_so():
    text = render_tolerance(tolerance(sheet("healthy"), limits(), samples=200))
    assert "No reading of what varies here changes whether a step is cleared." in text
    assert "measure next:" not in text


# The mains moves most of what follows here, and no reading makes them steady.
def test_the_mains_cannot_be_measured_away():
    answer = tolerance(sheet("split_rail"), limits(), samples=600)
    assert any("mains.present" in one.shares for one in answer.findings)
    assert "measure next: heatsink.air" in render_tolerance(answer).splitlines()
    assert "mains" not in render_tolerance(answer).partition("Measure next")[2]
