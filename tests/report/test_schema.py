import json
import re
import tomllib
from pathlib import Path

import jsonschema
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from safeamp.findings import Step, Verdict
from safeamp.physics.safe_area import ZONES
from safeamp.quantities import KINDS, QuantityError, read
from safeamp.report import result_schema as result
from safeamp.report.json_ import as_mapping
from safeamp.report.keys import tables
from safeamp.report.schema import SCHEMAS, render_schema, sheet_schema
from safeamp.report.starter_values import STARTERS
from safeamp.report.starters import render_starter
from safeamp.report.text_patterns import FUSE, LIMITER, text_pattern
from tests.amplifiers import sheets as healthy
from tests.report.hand_made import DEVICES, OFFSET, SAFE_AREA, report_of
from tests.scenarios import sheets

SHEET = jsonschema.Draft202012Validator(sheet_schema())
RESULT = jsonschema.Draft202012Validator(SCHEMAS["result"]())
DEMO = Path(__file__).parents[2] / "safeamp" / "cli" / "demo.toml"
WRITTEN = {kind.name: kind for kind in KINDS.values() if any(kind.spellings)}


def problems(tables_):
    return [f"{'.'.join(map(str, one.path))}: {one.message}" for one in SHEET.iter_errors(tables_)]


@pytest.mark.parametrize("what", SCHEMAS)
def test_a_schema_is_one(what):
    schema = json.loads(render_schema(what))
    jsonschema.Draft202012Validator.check_schema(schema)
    assert schema["$schema"] == "https://json-schema.org/draft/2020-12/schema"


def test_another_name_is_refused_with_the_nearest():
    with pytest.raises(KeyError, match="sheets has no schema; did you mean sheet"):
        render_schema("sheets")


@pytest.mark.parametrize("name", [*sheets.NAMES, "class_a", *healthy.NAMES])
def test_every_sheet_is_valid(name):
    assert problems(sheets.tables(name)) == []


@pytest.mark.parametrize("kind", STARTERS)
def test_every_starter_is_valid(kind):
    assert problems(tomllib.loads(render_starter(kind))) == []


def test_the_demonstration_is_valid():
    assert problems(tomllib.loads(DEMO.read_text(encoding="utf-8"))) == []


@pytest.mark.parametrize(
    ("path", "value", "said"),
    [
        ("loudspeaker.nominal_impedence", "8 ohm", "'nominal_impedence' was unexpected"),
        ("amplifier.title", "mine", "'amplifier' was unexpected"),
        ("supply.no_load", 35, "35 is not valid under any of the given schemas"),
        ("supply.no_load", "35 ohm", "'35 ohm' is not valid under any"),
        ("supply.rails", "double", "'double' is not one of ['split', 'single']"),
        ("supply.rails", sheets.GONE, "'rails' is a required property"),
        ("stage.bridged", "no", "'no' is not of type 'boolean'"),
        ("stage.pairs", 1.5, "1.5 is not of type 'integer'"),
        ("device.fitted.power", "150", "'150' does not match"),
        ("device.fitted.safe_area", [["40 V"]], "is too short"),
        ("supply.rail_fuse", "2", "is not valid under any"),
        ("sheet_version", 2, "2 is not one of [1]"),
    ],
)
def test_what_is_wrong_fails(path, value, said):
    data = sheets.tables("healthy")
    name = next(iter(data["device"]))
    wrong = sheets.changed(data, {path.replace("fitted", name): value})
    assert any(said in one for one in problems(wrong)), problems(wrong)


def test_every_key_is_described_and_nothing_else_may_stand_there():
    schema = sheet_schema()
    for path, keys in tables().items():
        node = schema
        for part in path.split(".") if path != "top" else ():
            node = node["properties"][part]
        node = node["additionalProperties"] if path == "device" else node
        assert node["additionalProperties"] is False
        assert set(keys) <= set(node["properties"])
        for name, key in keys.items():
            assert key.help in node["properties"][name]["description"]


UNSIGNED = st.from_regex(r"[0-9]{1,3}(\.[0-9]{1,3})?", fullmatch=True)
AFTER = st.sampled_from(["", " ±10 %", "+/-5%", " -20/+50 %", " ± 2 K", " ±0.1 V"])
ORIGIN = st.sampled_from(["", ", measured", ",data sheet", ", datasheet", ", guess", " , example"])


def readable(text, kind):
    try:
        read(text, kind)
    except QuantityError:
        return False
    return True


@settings(deadline=None, max_examples=300)
@given(
    st.sampled_from(sorted(WRITTEN)),
    st.sampled_from(["", "-", "+", "\u2212"]),
    st.one_of(UNSIGNED, st.tuples(UNSIGNED, UNSIGNED).map("..".join)),
    st.sampled_from(["", " "]),
    st.data(),
)
def test_what_the_reader_takes_the_pattern_takes(name, sign, number, blank, data):
    kind = WRITTEN[name]
    unit = data.draw(st.sampled_from(sorted(kind.spellings)))
    text = f"{sign}{number}{blank}{unit}{data.draw(AFTER)}{data.draw(ORIGIN)}"
    assert re.search(text_pattern((kind,)), text) or not readable(text, kind)


@pytest.mark.parametrize(
    ("kind", "text"),
    [
        ("resistance", "4R7"),
        ("resistance", "0R33 K"),
        ("resistance", "R22"),
        ("resistance", "4k7, measured"),
        ("resistance", "8 \u2126"),
        ("resistance", "8 \u03a9"),
        ("capacitance", "2u2"),
        ("capacitance", "100n"),
        ("capacitance", "2200 \u00b5F -20/+50 %, marked"),
        ("capacitance", "2200 \u03bcF"),
        ("temperature", "40 °C ±5 K"),
        ("transconductance parameter", "2 A/V2 ±0.1 A/V2"),
        ("force factor", "7.5 T m"),
    ],
)
def test_a_form_of_the_trade_is_taken(kind, text):
    assert read(text, KINDS[kind])
    assert re.search(text_pattern((KINDS[kind],)), text)


@pytest.mark.parametrize("text", ["35", "35 A", "0,5 V", "35 V 2", "~35 V", "35 V, seen", "2 x 35 V"])
def test_what_is_no_voltage_is_not_taken(text):
    assert not re.search(text_pattern((KINDS["voltage"],)), text)


@pytest.mark.parametrize("text", ["T 2 A", "T2AL250V", "F 500 mA", "quick acting 2 A, marked"])
def test_fuses_are_taken(text):
    assert re.search(FUSE, text)


@pytest.mark.parametrize("text", ["60 W lamp", "lamp 60 W", "22 ohm", "22R", "bench", "bench supply"])
def test_limiters_are_taken(text):
    assert re.search(LIMITER, text)
    assert not re.search(LIMITER, "60 W")


@pytest.mark.parametrize("name", ["healthy", "split_rail", "old_mains", "single_rail", "bench_mockup"])
def test_results_are_valid(name):
    RESULT.validate(as_mapping(sheets.report(name)))


def test_a_result_made_by_hand_is_valid_and_every_key_must_be_there():
    mapping = as_mapping(report_of(DEVICES, OFFSET, SAFE_AREA))
    RESULT.validate(mapping)
    for key in mapping:
        with pytest.raises(jsonschema.ValidationError, match=f"'{key}' is a required property"):
            RESULT.validate({name: value for name, value in mapping.items() if name != key})
    for key in mapping["findings"][0]:
        less = {name: value for name, value in mapping["findings"][0].items() if name != key}
        with pytest.raises(jsonschema.ValidationError, match=f"'{key}' is a required property"):
            RESULT.validate({**mapping, "findings": [less]})
    with pytest.raises(jsonschema.ValidationError, match="'safe' is not one of"):
        RESULT.validate({**mapping, "verdict": "safe"})


def test_the_words_are_those_of_the_nouns():
    assert result.ZONES == ZONES
    assert result.WORD["enum"] == [verdict.word for verdict in Verdict]
    assert result.STEP["enum"] == [step.value for step in Step]


def test_choices_are_offered_word_by_word():
    stage = sheet_schema()["properties"]["stage"]["properties"]
    assert stage["coupling"]["enum"] == ["direct", "capacitor"]
    assert stage["emitter_resistor"]["anyOf"][1] == {"const": "none"}
