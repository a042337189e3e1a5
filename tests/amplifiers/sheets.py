"""The ten healthy amplifiers as mappings, and how a value written as text is changed."""

import copy
import re
import tomllib
from functools import cache
from pathlib import Path

import safeamp
from safeamp.findings import Verdict
from safeamp.limits import Limits

FOLDER = Path(__file__).parent / "healthy"
NAMES = tuple(sorted(path.stem for path in FOLDER.glob("*.toml")))
NUMBER = re.compile(r"-?\d+(\.\d+)?")


@cache
def _limits() -> Limits:
    return safeamp.load_limits()


@cache
def _read(name):
    return tomllib.loads((FOLDER / f"{name}.toml").read_text(encoding="utf-8"))


def sheet(name):
    """Return a copy of the tables of one amplifier."""
    return copy.deepcopy(_read(name))


def report(tables):
    return safeamp.check(tables, limits=_limits())


@cache
def healthy(name):
    return report(_read(name))


def verdicts(found):
    """Return the verdict of each finding by its id."""
    return {finding.id: finding.verdict for finding in found.findings}


def blocked(found):
    """Return the ids of the findings that let nobody pass."""
    return {id for id, verdict in verdicts(found).items() if verdict >= Verdict.UNVERIFIED}


def number(text):
    """Return the first number of a written value."""
    return float(NUMBER.search(text)[0])


def scaled(text, factor):
    """Return a written value with its first number multiplied; unit, tolerance and origin stay."""
    if isinstance(text, list):
        return [scaled(item, factor) for item in text]
    return NUMBER.sub(lambda found: f"{float(found[0]) * factor:.6g}", text, count=1)


def scale(tables, factor, *paths):
    """Multiply the values at the key paths that the sheet has; return how many there were."""
    count = 0
    for path in paths:
        *outer, last = path.split(".")
        table = tables
        for key in outer:
            table = table.get(key, {})
        if table.get(last, "none") != "none":
            table[last] = scaled(table[last], factor)
            count += 1
    return count


def outputs(tables):
    """Return the tables of the output devices."""
    names = dict.fromkeys((tables["stage"]["upper"], tables["stage"]["lower"]))
    return [tables["device"][name] for name in names]
