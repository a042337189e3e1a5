"""Designs of corners: complete up to twelve inputs, searched above, guesses pinned besides."""

from dataclasses import replace
from itertools import pairwise

import numpy as np
import pytest

from safeamp.amplifier import Entry, value_at
from safeamp.quantities import RATIO, Origin
from safeamp.studies import corners
from tests.scenarios.sheets import finding, report, sheet


def entry(path, low=0.9, high=1.1, *, nominal=1.0, origin=Origin.MEASURED, middle=()):
    return Entry(path, nominal, low, high, origin, RATIO, middle=middle)


def several(count, **more):
    return [entry(f"key{place}", **more) for place in range(count)]


@pytest.mark.parametrize("count", [1, 2, 5, 12])
def test_corners_are_complete(count):
    entries = [entry(f"key{place}", 0.9 - place / 100, 1.1 + place / 100) for place in range(count)]
    design = corners.complete_design(entries)
    assert len(design.rows) == 1 + 2 * count + 2**count
    assert design.complete
    assert design.alone == 2 * count
    wanted = {
        tuple(row)
        for row in np.stack(np.meshgrid(*[(e.low, e.high) for e in entries]), -1).reshape(-1, count)
    }
    assert {tuple(row) for row in design.rows[1 + 2 * count :]} == wanted
    assert len(wanted) == 2**count


def test_nominal_comes_first_and_each_key_alone_after_it():
    design = corners.complete_design([entry("one"), entry("two", 0.5, 2.0)])
    assert design.rows[:5].tolist() == [[1, 1], [0.9, 1], [1.1, 1], [1, 0.5], [1, 2.0]]
    assert design.moved(0) == {}
    assert design.moved(4) == {"two": 2.0}
    assert design.paths == ("one", "two")


def test_without_tolerances_there_is_the_nominal_case():
    design = corners.complete_design([])
    assert design.rows.shape[1] == 0
    assert len(design.rows) >= 1
    assert not np.any(design.guessed)


def test_levels_between_the_ends_are_corners_too():
    middle = entry("one", middle=(1.0,))
    assert corners.ends(middle) == (0.9, 1.0, 1.1)
    design = corners.complete_design([middle, entry("two")])
    assert len(design.rows) == 1 + (3 + 2) + 3 * 2
    assert [1.0, 0.9] in design.rows[6:].tolist()


def test_one_sided_tolerances_have_their_nominal_as_an_end():
    assert corners.ends(entry("air", 1.0, 1.4)) == (1.0, 1.4)


@pytest.mark.parametrize("origin", [Origin.GUESS, Origin.ASSUMED])
def test_guesses_are_pinned_in_corners_of_their_own(origin):
    design = corners.complete_design([entry("one"), entry("two", origin=origin)])
    assert len(design.rows) == 1 + 4 + 2 + 4
    assert design.rows[5:7].tolist() == [[0.9, 1.0], [1.1, 1.0]]
    assert design.guessed.tolist() == [False, False, False, True, True, False, False, True, True, True, True]


@pytest.mark.parametrize("origin", [o for o in Origin if o not in (Origin.GUESS, Origin.ASSUMED)])
def test_no_other_origin_is_a_guess(origin):
    assert not np.any(corners.complete_design([entry("one", origin=origin)]).guessed)


def test_a_guess_at_its_nominal_end_is_not_moved():
    design = corners.complete_design([entry("air", 1.0, 1.4, origin=Origin.GUESS)])
    at_nominal = design.rows[:, 0] == 1.0
    assert design.guessed.tolist() == (~at_nominal).tolist()


def monotone(rows, signs):
    """Return a result that is monotone in each key, with keys that work together."""
    moved = (rows - 1.0) * signs
    return np.exp(moved.sum(axis=1)) + np.prod(1.0 + moved, axis=1)


@pytest.mark.parametrize("count", [13, 15])
@pytest.mark.parametrize("seed", [1, 2, 3])
def test_the_search_finds_the_worst_corner_of_a_monotone_result(count, seed):
    chance = np.random.default_rng(seed)
    signs = chance.choice([-1.0, 1.0], count) * chance.uniform(0.01, 1.0, count)
    entries = [
        entry(f"key{place}", 1 - width, 1 + width)
        for place, width in enumerate(chance.uniform(0.05, 0.4, count))
    ]
    screen = corners.screening_design(entries)
    assert len(screen.rows) == 1 + 2 * count
    design = corners.searched_design(screen, monotone(screen.rows, signs))
    worst = np.array([[e.high if sign > 0 else e.low for e, sign in zip(entries, signs, strict=True)]])
    assert np.max(monotone(design.rows, signs)) == pytest.approx(float(monotone(worst, signs)[0]), rel=1e-12)
    assert len(design.rows) <= 1 + 2 * count + 2**corners.COMPLETE
    assert not design.complete


def test_the_search_frees_the_keys_of_the_largest_effect():
    entries = [entry(f"key{place}") for place in range(14)]
    weights = np.arange(14.0)
    screen = corners.screening_design(entries)
    design = corners.searched_design(screen, (screen.rows - 1.0) @ weights)
    found = design.rows[29:]
    assert [len(set(column)) for column in found.T] == [1, 1, *12 * [2]]
    assert set(found[:, :2].ravel()) == {0.9, 1.1}  # no effect: the first end; some effect: the worse one
    assert set(found[:, 1]) == {1.1}


def test_the_search_pins_guesses_besides():
    entries = [*several(12), entry("two", origin=Origin.GUESS), entry("three", origin=Origin.ASSUMED)]
    screen = corners.screening_design(entries)
    design = corners.searched_design(screen, (screen.rows - 1.0) @ np.ones(14))
    pinned = design.rows[~design.guessed][1 + 2 * 12 :]
    assert np.all(pinned[:, 12:] == 1.0)
    assert pinned[:, :12].max(axis=1).max() == 1.1
    assert np.any(np.all(pinned[:, :12] == 1.1, axis=1))  # the worst corner without a guess


def test_a_key_of_unknown_effect_is_free():
    entries = several(14)
    screen = corners.screening_design(entries)
    bad = (screen.rows - 1.0) @ np.arange(14.0)
    bad[1] = np.inf  # key0 alone at its low end: unknown
    design = corners.searched_design(screen, bad)
    assert len(set(design.rows[29:][:, 0])) == 2


def test_entries_read_are_those_with_a_spread_and_lists_by_their_items():
    entries = [
        entry("supply.no_load.0"),
        entry("supply.no_load.1", 1.0, 1.0),
        entry("heatsink.air"),
        entry("stage.idle"),
        entry("device.a.safe_area.0"),
    ]
    found = corners.read_by(entries, ["supply.no_load", "heatsink.air", "device.a.power"])
    assert [one.path for one in found] == ["supply.no_load.0", "heatsink.air"]


def test_cases_stand_in_the_amplifier_nominal_first():
    read = sheet("split_rail", {"supply.no_load": ["34 V ±1 V, measured", "33 V ±1 V, measured"]})
    entries = [read.entries[path] for path in ("supply.no_load.0", "supply.no_load.1", "heatsink.air")]
    design = corners.complete_design(entries)
    amplifier = design.applied_to(read.amplifier)
    for place, path in enumerate(design.paths):
        column = value_at(amplifier, path)
        assert column[0] == value_at(read.amplifier, path)
        assert column.tolist() == design.rows[:, place].tolist()
    assert value_at(amplifier, "supply.full_load.0") == 31.0


#: Tolerances of twelve keys that the use into a loudspeaker reads, and of one more.
MANY = {
    "supply.no_load": "34 V ±2 %, measured",
    "supply.full_load": "31 V ±2 %, measured",
    "stage.emitter_resistor": "0.33 ohm ±5 %, marked",
    "stage.idle": "14 mV ±10 %, measured",
    "stage.swing_loss": "2.2 V ±20 %, measured",
    "heatsink.case_to_sink": "0.45 K/W ±20 %, measured",
    "loudspeaker.nominal_impedance": "8 ohm ±5 %, marked",
    "loudspeaker.minimum_impedance": "6.4 ohm ±5 %, measured",
    "device.fitted.junction_to_case": "0.8333 K/W ±5 %, data sheet",
}
ONE_MORE = {"loudspeaker.phase_angle": "45..55 deg, measured"}


def test_above_twelve_the_report_says_how_the_corners_were_searched():
    few, many = (finding(report("split_rail", more), "soa.loudspeaker") for more in (MANY, MANY | ONE_MORE))
    assert not [text for text in few.because if "toleranced inputs" in text]
    assert "13 toleranced inputs: corners complete over the 12 that matter most" in many.because
    assert many.worst > few.worst


def test_the_search_on_an_amplifier_finds_what_all_corners_find(monkeypatch):
    complete = report("split_rail", MANY | ONE_MORE | {"title": "complete"})
    monkeypatch.setattr(corners, "COMPLETE", 6)
    searched = report("split_rail", MANY | ONE_MORE | {"title": "searched"})
    for one in complete.findings:
        if one.worst is not None:
            assert finding(searched, one.id).worst == pytest.approx(one.worst, rel=1e-9), one.id
        assert finding(searched, one.id).verdict is one.verdict


def test_entries_of_a_sheet_know_their_spread():
    spreads = [
        replace(entry("one"), low=low, high=high).spread for low, high in pairwise((0.9, 1.0, 1.0, 1.1))
    ]
    assert spreads == [True, False, True]
