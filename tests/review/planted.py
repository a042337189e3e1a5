"""Sheets of healthy amplifiers with single keys changed or taken out."""

from tests.amplifiers.sheets import report, sheet

SPLIT, SINGLE, TWO_PAIRS = "40w_split_rail_to3", "30w_single_rail_to3", "60w_two_pairs"


def changed(name, changes=None, without=()):
    """Return the tables of an amplifier with values at key paths changed, and others taken out."""
    tables = sheet(name)
    for path, value in (changes or {}).items():
        table, key = path.rsplit(".", 1)
        at = tables
        for part in table.split("."):
            at = at.setdefault(part, {})
        at[key] = value
    for path in without:
        table, _, key = path.rpartition(".")
        at = tables
        for part in table.split(".") if table else ():
            at = at[part]
        at.pop(key, None)
    return tables


def found(name, changes=None, without=()):
    """Return id -> finding of such a sheet."""
    return {one.id: one for one in report(changed(name, changes, without)).findings}
