"""One table names every parameter of physics with its meaning and unit: none missing, none stale."""

import inspect
import pkgutil
from importlib import import_module

import pytest

from safeamp import physics
from tests.docs.documents import DEVELOPERS, read, rows, section
from tests.physics.formulas import FORMULAS

TABLE = rows(section(read(DEVELOPERS), "Names and units of all parameters of physics"))
UNITS = {
    "1", "1/K", "1/s", "A", "A/K", "A/V2", "A2", "F", "H", "Hz", "J", "K", "K/W", "N/A", "V", "V/K", "V and A", "W",
    "W/(m K)", "W/(m2 K)", "W/K", "any", "deg", "degC", "dB", "function", "kg", "m", "m/N", "m2", "ohm", "s", "word",
}  # fmt: skip
#: What the tests of dimensions write otherwise: temperatures enter there as kelvin.
SPELT = {"": {"1"}, "K": {"K", "degC"}, "A/V**2": {"A/V2"}}


def topics():
    """Return the modules and packages of physics that other rooms see."""
    found = pkgutil.iter_modules(physics.__path__, "safeamp.physics.")
    return [import_module(one.name) for one in found if not one.name.rpartition(".")[2].startswith("_")]


def shown(topic) -> list[str]:
    """Return the names that a topic offers: those of its list, else all its own without an underscore."""
    own = [name for name, item in vars(topic).items() if getattr(item, "__module__", None) == topic.__name__]
    return [name for name in getattr(topic, "__all__", own) if not name.startswith("_")]


def functions():
    """Return every public function of physics by topic and name."""
    return {
        f"{topic.__name__.rpartition('.')[2]}.{name}": getattr(topic, name)
        for topic in topics()
        for name in shown(topic)
        if inspect.isfunction(getattr(topic, name))
    }


def taken(function) -> set[str]:
    """Return the parameters that a function takes by their own names."""
    found = inspect.signature(function).parameters.values()
    return {parameter.name for parameter in found if parameter.kind is not parameter.VAR_KEYWORD}


def parameters() -> dict[str, str]:
    """Return each parameter with one function that has it."""
    return {parameter: name for name, function in functions().items() for parameter in taken(function)}


def units(cell: str) -> set[str]:
    return {unit.strip().strip("`") for unit in cell.split(",")}


def test_no_parameter_is_missing_and_none_is_stale() -> None:
    named = {row[0].strip("`") for row in TABLE}
    used = parameters()
    missing = {f"{name} of {used[name]}" for name in set(used) - named}
    assert missing == set(), "add a row to the table in DEVELOPERS.md"
    assert named - set(used) == set(), "these rows name no parameter any more"


def test_rows_stand_in_order_once_each() -> None:
    named = [row[0] for row in TABLE]
    assert all(name == f"`{name.strip('`')}`" for name in named)
    assert [name.strip("`") for name in named] == sorted({name.strip("`") for name in named})


@pytest.mark.parametrize("row", TABLE, ids=lambda row: row[0].strip("`"))
def test_a_row_has_a_meaning_and_known_units(row) -> None:
    name, meaning, unit = row
    assert len(meaning.split()) >= 2, name
    nouns = {name for topic in topics() for name, item in vars(topic).items() if inspect.isclass(item)}
    assert units(unit) <= UNITS | nouns, name


def test_units_agree_with_those_that_the_dimensions_are_tested_with() -> None:
    table = {row[0].strip("`"): units(row[2]) for row in TABLE}
    for formula in FORMULAS:
        for name, (_, _, unit) in formula.given.items():
            assert SPELT.get(unit, {unit}) & table[name], f"{formula}: {name} in {unit or '1'}"
