"""Sheets as mappings: read, changed key by key, checked; shared by the tests of scenarios, studies and checks."""

import copy
import tomllib
from functools import cache
from pathlib import Path

import safeamp
from safeamp.studies.verdict import verdict

HERE = Path(__file__).parent
NAMES = sorted(path.stem for path in HERE.glob("*.toml") if not path.stem.endswith(".expected"))
HEALTHY = HERE.parent / "amplifiers" / "healthy"
GONE = object()

#: A pure class-A stage: so much idle current that neither device ever lets go.
CLASS_A = {
    "title": "Class A, one pair, direct coupled",
    "mains": {"nominal": "230 V", "actual": "230 V, measured"},
    "supply": {"rails": "split", "no_load": "24 V", "full_load": "22.5 V", "at_mains": "230 V"},
    "stage": {
        "coupling": "direct",
        "bridged": False,
        "pairs": 1,
        "upper": "fitted",
        "lower": "fitted",
        "emitter_resistor": "0R47",
        "idle": "1.6 A, measured",
        "swing_loss": "2 V",
    },
    "heatsink": {
        "sink_to_air": "0.8 K/W, measured",
        "case_to_sink": "0.5 K/W",
        "air": "30 degC ±1 K, measured",
        "shared_by": 1,
    },
    "loudspeaker": {"nominal_impedance": "8 ohm"},
}


@cache
def limits():
    """Return the shipped limits."""
    return safeamp.load_limits()


@cache
def expected(name):
    """Return what an expert says of a scenario."""
    return tomllib.loads((HERE / f"{name}.expected.toml").read_text(encoding="utf-8"))


def tables(name):
    """Return the tables of a scenario, of the class-A stage, or of one of the healthy amplifiers."""
    if name == "class_a":
        return copy.deepcopy(CLASS_A | {"device": tables("split_rail")["device"]})
    path = HERE / f"{name}.toml"
    path = path if path.exists() else HEALTHY / f"{name}.toml"
    return tomllib.loads(path.read_text(encoding="utf-8"))


def changed(data, changes):
    """Return the tables with each key path set to a value, or taken away with GONE."""
    data = copy.deepcopy(data)
    for path, value in changes.items():
        *outer, last = path.split(".")
        table = data
        for name in outer:
            table = table.setdefault(name, {})
        if value is GONE:
            table.pop(last, None)
        else:
            table[last] = value
    return data


def sheet(name, changes=None):
    """Return a sheet as read, with changes."""
    return safeamp.sheet_from(changed(tables(name), changes or {}), limits=limits())


@cache
def _kept(name, changes):
    return verdict(sheet(name, dict(changes)), limits())


def report(name, changes=None, **options):
    """Return the report on a sheet, with changes; kept where the changes are plain words."""
    try:
        changed_so = tuple((changes or {}).items())
        hash(changed_so)
    except TypeError:
        return verdict(sheet(name, changes), limits(), **options)
    return verdict(sheet(name, changes), limits(), **options) if options else _kept(name, changed_so)


def finding(answer, identity):
    """Return one finding of a report."""
    return next(one for one in answer.findings if one.id == identity)


def beside(one, at):
    """Return a number shown beside a finding, by what is said of it."""
    return next(also.value for also in one.also if also.at == at)
