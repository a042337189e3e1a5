import re
import tomllib
from pathlib import Path
from typing import Any

import pytest

from safeamp.quantities import RATIO, Origin
from safeamp.reading import load_sheet
from safeamp.report.keys import tables
from safeamp.report.starter_values import COMMENTED, DRIVER, EXAMPLES, STARTERS
from safeamp.report.starters import render_starter

KINDS = ["split-rail", "single-rail", "bridged", "mosfet", "bench-mockup"]
#: Words and flags carry no origin; these would be evidence that nobody has seen.
EVIDENCE = [
    "readings.limiter_state",
    "readings.zobel_hot",
    "readings.capacitor_leakage_trend",
    "stage.original_devices",
]


def written(kind: str) -> dict[str, Any]:
    return tomllib.loads(render_starter(kind))


def without_comments(text: str) -> str:
    """Take the mark off keys and tables that are comments, as a user would."""
    return re.sub(r"(?m)^# (?=[a-z_0-9]+ = |\[)", "", text)


def test_the_kinds() -> None:
    assert list(STARTERS) == KINDS


@pytest.mark.parametrize("kind", KINDS)
def test_every_key_stands_in_every_starter(kind: str) -> None:
    found = tomllib.loads(without_comments(render_starter(kind)))
    found = {**found, "top": dict(found)}
    found["heatsink.fins"] = found["heatsink"]["fins"]
    found["device"] = found["device"]["fitted"]
    for table, keys in tables().items():
        assert set(keys) <= set(found.get(table, {})), table


@pytest.mark.parametrize("kind", KINDS)
def test_every_starter_is_read_without_complaint(kind: str, tmp_path: Path) -> None:
    path = tmp_path / "amp.toml"
    path.write_text(render_starter(kind), encoding="utf-8")
    sheet = load_sheet(path)
    own = [entry for entry in sheet.entries.values() if entry.line is not None and entry.kind != RATIO]
    assert len(own) > 10
    assert {entry.origin for entry in own} == {Origin.EXAMPLE}


@pytest.mark.parametrize("kind", KINDS)
def test_every_text_with_a_number_says_example(kind: str) -> None:
    lines = [line.lstrip("# ") for line in render_starter(kind).splitlines()]
    for line in lines:
        name, _, value = line.partition(" = ")
        if re.fullmatch(r'"[-+\d].*"', value) and name not in ("limiter", "sheet_version"):
            assert value.endswith(', example"') or "lamp" in value, line


@pytest.mark.parametrize("kind", KINDS)
@pytest.mark.parametrize("path", EVIDENCE)
def test_words_that_are_evidence_begin_as_comments(kind: str, path: str) -> None:
    table, _, name = path.partition(".")
    assert name not in written(kind).get(table, {})
    assert f"\n# {name} = " in render_starter(kind)


@pytest.mark.parametrize("kind", KINDS)
def test_required_keys_are_never_comments(kind: str) -> None:
    found = written(kind)
    for table, keys in tables().items():
        if table in ("top", "heatsink.fins", "device") or (
            table == "output_capacitor" and table not in found
        ):
            continue
        assert {name for name, key in keys.items() if key.required} <= set(found.get(table, {})), table


def test_the_kinds_are_what_they_say() -> None:
    assert written("single-rail")["stage"]["coupling"] == "capacitor"
    assert written("bridged")["stage"]["bridged"] is True
    assert written("mosfet")["device"]["fitted"]["kind"] == "vertical mosfet"
    assert written("bench-mockup")["supply"]["source"] == "bench"
    assert "output_capacitor" not in written("split-rail")
    assert "mains" not in written("bench-mockup")


@pytest.mark.parametrize("kind", ["Split Rail", "split-rail", "SPLIT-RAIL"])
def test_kinds_may_be_typed_with_hyphens_or_blanks(kind: str) -> None:
    assert render_starter(kind) == render_starter("split-rail")


def test_an_unknown_kind_names_the_kinds() -> None:
    with pytest.raises(
        KeyError, match=r"split-rial is not a kind of starter; did you mean split-rail.*bench-mockup"
    ):
        render_starter("split-rial")


def test_no_value_stands_for_a_key_that_is_gone() -> None:
    known = {f"{table}.{name}".removeprefix("top.") for table, keys in tables().items() for name in keys}
    assert set(EXAMPLES) <= known
    assert (COMMENTED - set(tables())) <= known
    assert set(DRIVER) <= set(tables()["device"])
    for starter in STARTERS.values():
        assert set(starter.values) <= known
        assert (starter.left_out - set(tables())) <= known


def test_every_key_has_an_example_of_its_own() -> None:
    known = {f"{table}.{name}".removeprefix("top.") for table, keys in tables().items() for name in keys}
    assert known - set(EXAMPLES) == {"title"}
