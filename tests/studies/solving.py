"""Sheets whose numbers are moved, for the tests of solving."""

import safeamp
from safeamp.amplifier import written_key
from safeamp.findings import Verdict
from safeamp.quantities import Origin
from safeamp.reading import open_mapping
from safeamp.reading.movable import movable, movable_keys
from safeamp.studies.solve import solve
from tests.scenarios.sheets import changed, limits, tables


def number(name, key, changes=None):
    """Return one number of a scenario."""
    return movable(open_mapping(changed(tables(name), changes or {}), limits=limits()), key)


def solved(name, key, *findings, changes=None, **options):
    """Return where some findings hold."""
    return solve(number(name, key, changes), limits(), findings=findings, **options)


def written_numbers(name):
    """Return the keys of a scenario that hold a number somebody wrote."""
    sheet = open_mapping(tables(name), limits=limits()).sheet()
    written = {written_key(path) for path, one in sheet.entries.items() if one.origin is not Origin.ASSUMED}
    return [key for key in movable_keys(sheet) if key in written]


def words(sheet):
    """Return id -> word of the whole report on a sheet."""
    return {one.id: one.verdict for one in safeamp.check(sheet, limits=limits()).findings}


def held(found, solution):
    """Whether the findings that a solution speaks of hold, by the words of a whole report."""
    return all(found.get(id, Verdict.GO) <= solution.until for id in solution.findings)
