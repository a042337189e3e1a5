import re
from dataclasses import fields, is_dataclass

import pytest

from safeamp.amplifier import TABLES, Key
from safeamp.quantities import CURRENT, KINDS, RATIO, VOLTAGE
from safeamp.report.keys import TOP, WRITTEN_ORIGINS, form_text, render_keys, tables

PLACES = [(table, name) for table, keys in tables().items() for name in keys]


def test_every_field_of_every_noun_is_a_key_or_internal() -> None:
    for table, noun in TABLES.items():
        for item in fields(noun):
            if is_dataclass(item.default_factory):
                assert f"{table}.{item.name}" in tables()
            else:
                assert item.metadata["key"].internal != (item.name in tables()[table])


@pytest.mark.parametrize(("table", "name"), PLACES)
def test_every_key_is_listed_with_its_help(table: str, name: str) -> None:
    key = tables()[table][name]
    text = " ".join(render_keys(table).split())
    assert re.search(rf" {name}( \*)?: {re.escape(form_text(key)[:20])}", text)
    assert " ".join(key.help.split()) in text
    assert (f" {name} *: " in text) == key.required


@pytest.mark.parametrize("name", ["loudspeaker", "LOUDSPEAKER", "[loudspeaker]"])
def test_one_table_is_only_that_table(name: str) -> None:
    text = render_keys(name)
    assert "[loudspeaker]" in text
    assert "[supply]" not in text
    assert "f_s" in text


@pytest.mark.parametrize(
    "name", ["output-capacitor", "output capacitor", "output_capacitor", "heatsink.fins"]
)
def test_table_names_may_be_typed_with_hyphens_or_blanks(name: str) -> None:
    assert f"[{name.replace('-', '_').replace(' ', '_')}]" in render_keys(name)


def test_an_unknown_table_names_the_nearest() -> None:
    with pytest.raises(KeyError, match="suply is not a table of the sheet; did you mean supply"):
        render_keys("suply")


def test_all_tables_come_with_units_and_origins() -> None:
    text = render_keys()
    for table in TABLES:
        assert f"[{table}" in text
    for kind in KINDS.values():
        units = [unit for unit in kind.spellings if unit]
        assert not units or f"  {kind.name}: {' '.join(units)}" in text
    assert f"Origins: {', '.join(WRITTEN_ORIGINS)}" in " ".join(text.split())
    assert max(map(len, text.splitlines())) <= 80


def test_origins_that_only_the_program_gives_are_not_offered() -> None:
    assert set(WRITTEN_ORIGINS) == {"measured", "marked", "data sheet", "manual", "guess", "example"}


@pytest.mark.parametrize(
    ("key", "form"),
    [
        (Key(help="", flag=True), "true or false"),
        (Key(help="", choices=("a", "b")), 'one of "a", "b"'),
        (Key(help="", kinds=(VOLTAGE,), none="absent"), 'voltage, or "none"'),
        (Key(help="", kinds=(VOLTAGE, CURRENT)), "voltage or current"),
        (Key(help="", kinds=(VOLTAGE,), shape="list"), "voltage, or a list of them"),
        (Key(help="", kinds=(VOLTAGE, CURRENT), shape="points"), "list of pairs of voltage and current"),
        (Key(help="", kinds=(RATIO,), whole=True), "whole number"),
        (Key(help="", kinds=(RATIO,)), "number without unit"),
        (Key(help="", shape="list"), "list of names"),
        (Key(help=""), "text"),
    ],
)
def test_form_of_a_key(key: Key, form: str) -> None:
    assert form_text(key) == form


def test_a_default_is_told_with_its_reason() -> None:
    text = " ".join(render_keys("loudspeaker").split())
    assert "when left out: 45 deg, assumed: usual for loudspeakers" in text


def test_keys_outside_tables() -> None:
    assert set(TOP) == {"title", "notes", "sheet_version"}
    assert "title *: text" in render_keys("top")
