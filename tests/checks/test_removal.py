"""Taking anything out of a sheet never makes it better: no go where there was none, no step that clears anew."""

from functools import cache

import pytest

from safeamp.amplifier import value_at
from safeamp.complaints import ReadingError
from safeamp.findings import Verdict
from safeamp.studies.verdict import verdict
from tests.scenarios.sheets import GONE, NAMES, changed, limits, report, sheet, tables

SHEETS = [*NAMES, "15w_single_rail_to3", "60w_two_pairs"]
#: A loaded rail stated as high as the unloaded one lies above all that is assumed in its place, so heat falls.
EXCEPTIONS = {("mosfet_substitute", "supply.full_load", "heat.junction")}


@cache
def lines(name):
    """Return the key path of every line and of every table of a sheet."""
    found = []
    for table, content in tables(name).items():
        if isinstance(content, dict):
            found.append(table)
            for key, value in content.items():
                found.append(f"{table}.{key}")
                if isinstance(value, dict):
                    found += [f"{table}.{key}.{inner}" for inner in value]
    return found


def cases():
    return [pytest.param(name, path, id=f"{name}-{path}") for name in SHEETS for path in lines(name)]


@pytest.mark.parametrize(("name", "path"), cases())
def test_taking_a_line_or_table_away_never_clears(name, path):
    before = report(name)
    try:
        read = sheet(name, {path: GONE})
    except ReadingError:
        return  # refused: nothing is cleared
    after = verdict(read, limits())
    known = {one.id: one.verdict for one in before.findings}
    for one in after.findings:
        was = known.get(one.id)
        if one.verdict is Verdict.GO:
            assert was is Verdict.GO, one.id
        elif one.verdict.clears and was is not None and not was.clears:
            assert may_clear(name, path, one.id), (one.id, one.says, one.because)
    for entry, held in zip(after.steps, before.steps, strict=True):
        if held.holds and not entry.holds:
            lost = [i for i, was in known.items() if not was.clears and step_of(before, i) is entry.step]
            assert all(limits()[identity].not_given == "caution" for identity in lost), lost
    assert stands_in(read, path)


def may_clear(name, path, identity):
    """Whether a finding may become caution: only where that is its word for an input that is not given."""
    return limits()[identity].not_given == "caution" or (name, path, identity) in EXCEPTIONS


def step_of(answer, identity):
    return next(one.step for one in answer.findings if one.id == identity)


def stands_in(read, path):
    """Whether a default that took the place of a line stands among the assumptions."""
    try:
        filled = value_at(read.amplifier, path)
    except (AttributeError, KeyError):
        return True
    if filled is None or path not in read.amplifier.origins:
        return True
    return path in {assumed.key for assumed in read.assumptions}


def test_removal_takes_away_what_it_says():
    assert "air" not in changed(tables("split_rail"), {"heatsink.air": GONE})["heatsink"]
    assert "protection" not in changed(tables("split_rail"), {"protection": GONE})
    assert len(cases()) > 300
