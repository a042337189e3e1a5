"""How a finding comes about, in every format: the same lines, told apart from what is judged."""

import jsonschema
import pytest

from safeamp.answers import Line, Working
from safeamp.quantities import CAPACITANCE, POWER, RATIO, TEMPERATURE, VOLTAGE
from safeamp.report.html import as_html
from safeamp.report.json_ import as_mapping
from safeamp.report.markdown import as_markdown
from safeamp.report.result_schema import result_schema
from safeamp.report.text import render
from safeamp.report.working import line_texts, number, put_in, result, working_texts, wrapped
from safeamp.studies.explain import explained
from tests.report.hand_made import DEVICES, SAFE_AREA, report_of
from tests.scenarios import sheets

RAIL = Line("V_read", "rail as read", 35.2, VOLTAGE, origin="supply.no_load, measured")
SUM = Line("V_span", "rail to rail", 70.4, VOLTAGE, "V_read + V_read", terms=(("V_read", 35.2),))
SAME = Line("V", "held against the limit", 70.4, VOLTAGE, "V_span", terms=(("V_span", 70.4),))
WORKING = Working("soa.loudspeaker", (RAIL, SUM, SAME))


def test_a_line_stands_in_symbols_in_numbers_and_as_result():
    assert list(line_texts(SUM)) == [
        "V_span = V_read + V_read: rail to rail",
        "  = 35.2 + 35.2",
        "  = 70.4 V",
    ]


def test_a_given_value_says_where_it_comes_from_and_a_bare_symbol_is_not_put_in():
    assert list(line_texts(RAIL)) == ["V_read = 35.2 V: rail as read (supply.no_load, measured)"]
    assert list(line_texts(SAME)) == ["V = V_span: held against the limit", "  = 70.4 V"]


@pytest.mark.parametrize(
    ("value", "text"),
    [
        (0.000680001, "0.000680001"),
        (0.00000068, "6.8e-7"),
        (2.0, "2"),
        (1234567.0, "1.23457e6"),
        (-0.0, "0"),
        (None, "?"),
        (float("nan"), "?"),
        (float("inf"), "unbounded"),
    ],
)
def test_numbers_are_what_a_calculator_takes(value, text):
    assert number(value) == text


@pytest.mark.parametrize(
    ("value", "kind", "text"),
    [
        (0.00068, CAPACITANCE, "0.00068 F (680 µF)"),
        (0.014, VOLTAGE, "0.014 V (14 mV)"),
        (35.2, VOLTAGE, "35.2 V"),
        (58.2474, TEMPERATURE, "58.2474 degC"),
        (0.5, RATIO, "0.5"),
        (None, POWER, "not known"),
        (float("inf"), RATIO, "unbounded"),
    ],
)
def test_a_result_has_its_unit_and_is_told_as_people_read_it(value, kind, text):
    assert result(Line("x", "", value, kind)) == text


def test_negative_numbers_are_put_in_brackets_and_names_of_functions_stay():
    line = Line("x", "", 1.0, RATIO, "max(a, b) - a", terms=(("a", -2.0), ("b", None)))
    assert put_in(line) == "max((-2), ?) - (-2)"


def test_no_line_is_longer_than_the_width_and_none_ends_a_block_of_markdown():
    line = Line("x", "word " * 60 + "```", 1.0, RATIO, origin="here\nthere")
    lines = wrapped(Working("a.b", (line,)), 80, "  ")
    assert max(map(len, lines)) <= 80
    assert "`" not in "".join(working_texts(Working("a.b", (line,))))
    assert "\n" not in "".join(lines)


def test_text_has_the_calculation_and_the_limit_before_safety():
    lines = render(report_of(DEVICES, SAFE_AREA), workings={"soa.loudspeaker": WORKING}).splitlines()
    start = lines.index("How soa.loudspeaker comes about")
    assert "  V_span = V_read + V_read: rail to rail" in lines[start:]
    assert "  held against: go up to 80 %, stop above 100 %; definition (common practice)" in lines[start:]
    assert start < lines.index("Safety")
    assert not any(line.startswith("How ") for line in render(report_of(DEVICES)).splitlines())


def test_every_format_has_the_same_lines():
    report, workings = report_of(DEVICES, SAFE_AREA), {"soa.loudspeaker": WORKING}
    for text in working_texts(WORKING):
        assert text.strip() in as_markdown(report, workings)
        assert text.strip() in as_html(report, workings)
        assert text.strip() in render(report, workings=workings)


def test_json_has_the_lines_of_those_that_are_explained():
    mapping = as_mapping(report_of(DEVICES, SAFE_AREA), {"soa.loudspeaker": WORKING})
    first, second = mapping["findings"]
    assert "working" not in first
    assert second["working"][1] == {
        "symbol": "V_span",
        "words": "rail to rail",
        "origin": "",
        "formula": "V_read + V_read",
        "put_in": "35.2 + 35.2",
        "value": 70.4,
        "unit": "V",
    }
    jsonschema.Draft202012Validator(result_schema()).validate(mapping)


def test_an_explained_result_of_a_sheet_is_as_its_schema_says():
    report = sheets.report("old_mains")
    workings = explained(sheets.sheet("old_mains"), sheets.limits(), report)
    assert list(workings) == [finding.id for finding in report.findings]
    jsonschema.Draft202012Validator(result_schema()).validate(as_mapping(report, workings))


@pytest.mark.parametrize(
    ("identity", "said"),
    [
        ("soa.loudspaeker", "is not a finding; did you mean soa.loudspeaker"),
        ("capacitor.wear", 'does not apply: stage.coupling is "direct"'),
        ("supply.transformer", "is not judged: what it would need is not in the sheet"),
    ],
)
def test_what_cannot_be_explained_is_refused_with_the_reason(identity, said):
    with pytest.raises(KeyError, match=said):
        explained(sheets.sheet("healthy"), sheets.limits(), sheets.report("healthy"), [identity])


def test_what_is_read_at_the_bench_cannot_be_explained_on_paper():
    report = sheets.report("healthy", on_paper=True)
    with pytest.raises(KeyError, match="is still to be read at the bench"):
        explained(sheets.sheet("healthy"), sheets.limits(), report, ["bias.idle"])


def test_a_finding_is_explained_once_however_often_it_is_asked_for():
    found = explained(
        sheets.sheet("healthy"), sheets.limits(), sheets.report("healthy"), ["supply.mains", "supply.mains"]
    )
    assert list(found) == ["supply.mains"]
