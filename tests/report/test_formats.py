"""Every format of one run says the same, number by number."""

import csv
import io
import re
from dataclasses import replace

import pytest
from markdown_it import MarkdownIt

from safeamp._version import __version__
from safeamp.quantities import show
from safeamp.report.amounts import amount, number_text, shown_kind
from safeamp.report.csv_ import ABOUT, COLUMNS, as_csv
from safeamp.report.html import as_html
from safeamp.report.json_ import as_mapping
from safeamp.report.markdown import as_markdown
from safeamp.report.page import page_of
from safeamp.report.text import render
from tests.report.hand_made import DEVICES, OFFSET, SAFE_AREA, report_of
from tests.scenarios import sheets

NAMES = ("healthy", "split_rail", "single_rail")
HOSTILE = "=<script>alert(1)</script> | **bold** `code` [a](http://b) \x1b[31m"


def rows(report):
    return list(csv.DictReader(io.StringIO(as_csv(report), newline="")))


def joined(text):
    return " ".join(text.split())


@pytest.mark.parametrize("name", NAMES)
def test_text_markdown_and_csv_show_the_same_numbers(name):
    report = sheets.report(name)
    text = joined(render(report))
    plain = joined(unescaped(as_markdown(report)))
    table = rows(report)
    assert len(table) == len(report.findings)
    for entry, row in zip(page_of(report).entries, table, strict=True):
        for shown in (entry.number, entry.limit):
            assert shown in text
            assert shown in plain
        assert [row["id"], row["verdict"], row["shown"], row["limit_shown"]] == [
            entry.finding.id,
            entry.finding.verdict.word,
            entry.number,
            entry.limit,
        ]


def unescaped(text):
    return re.sub(r"\\(.)", r"\1", text)


@pytest.mark.parametrize("name", NAMES)
def test_json_and_csv_hold_in_full_what_is_shown(name):
    report = sheets.report(name)
    for found, row, finding in zip(
        as_mapping(report)["findings"], rows(report), report.findings, strict=True
    ):
        for which in ("nominal", "worst"):
            value = found["value"][which]
            assert row[which] == ("" if value is None else repr(float(value)))
        value = found["value"]["nominal"]
        if value is not None and not number_text(finding).startswith("the limiter"):
            levels = [found["limit"]["stop"], *as_list(found["limit"]["go"])]
            kept = [level for level in levels if level is not None]
            assert amount(value, shown_kind(finding), kept) in row["shown"]
            assert row["unit"] == found["value"]["unit"]


def as_list(value):
    return value if isinstance(value, list) else [value]


@pytest.mark.parametrize("name", NAMES)
def test_markdown_has_every_sentence_of_the_text(name):
    report = sheets.report(name)
    page = page_of(report)
    plain = joined(unescaped(as_markdown(report)))
    for note in (*page.notes, *([page.way_on] if page.way_on else [])):
        assert joined(note.head) in plain
        for text in (*note.texts, *page.safety):
            assert joined(text) in plain
    for step in page.steps:
        assert step.name in plain
    assert report.digest in plain
    assert plain.endswith(f"**{joined(page.last)}**")


def test_the_verdict_is_the_first_head():
    first = as_markdown(report_of(DEVICES, SAFE_AREA)).splitlines()[0]
    assert first.startswith("# STOP for 8 ohm loudspeaker")


@pytest.mark.parametrize("place", ["title", "source", "scope"])
def test_a_hostile_text_stays_text_in_markdown(place):
    report = report_of(replace(DEVICES, says=HOSTILE), remarks=(HOSTILE,), **{place: HOSTILE})
    page = MarkdownIt("commonmark").enable("table").render(as_markdown(report))
    assert "<script" not in page
    assert "<a " not in page
    assert "<code>code" not in page
    assert page.count("<strong>") == 1  # the last line
    assert "\x1b" not in page


def test_a_hostile_text_is_no_formula_in_csv():
    [row] = rows(report_of(replace(DEVICES, says=HOSTILE, next="-1+1", because=("@a",))))
    assert row["says"].startswith("'=")
    assert row["next"] == "'-1+1"
    assert row["because"] == "'@a"


def test_csv_has_a_column_for_each_key_of_a_finding_in_json():
    found = as_mapping(report_of(SAFE_AREA))["findings"][0]
    flat = {*found} - {"value", "limit"}
    flat |= {*found["value"]} | {f"limit_{key}" for key in found["limit"]} | {"unbounded"}
    assert set(COLUMNS) == flat | {"reached", "shown", "limit_shown"} | set(ABOUT)


def test_each_row_of_csv_says_what_it_is_about():
    # Whoever joins the rows of several channels and dates must still tell them apart.
    report = replace(report_of(DEVICES, OFFSET, SAFE_AREA), source="amp.toml", digest="ab12")
    found = rows(report)
    about = {name: cell for name, cell in found[0].items() if name in ABOUT}
    assert about == {
        "title": report.title,
        "sheet": "amp.toml",
        "sha256": "ab12",
        "version": __version__,
        "scope": page_of(report).scope,
        "verdict_for_scope": "stop",
    }
    assert all({name: row[name] for name in ABOUT} == about for row in found)
    assert COLUMNS[-len(ABOUT) :] == ABOUT  # who reads by place finds the others where they were


def test_a_hostile_title_is_no_formula_in_csv():
    [row] = rows(replace(report_of(DEVICES), title="=1+1", source="@a.toml"))
    assert (row["title"], row["sheet"]) == ("'=1+1", "'@a.toml")


NOTES = "Knob loose.\n\n<script>alert(1)</script> **x** \x1b[31m"


def test_the_notes_of_the_sheet_stand_in_page_and_markdown_as_they_are():
    report = replace(report_of(DEVICES), notes=NOTES)
    text, page = as_markdown(report), as_html(report, {})
    assert "\n## Notes\n\n- Knob loose.\n- \\<script\\>" in text
    assert text.index("## Notes") > text.index("cold.devices")
    assert "<h2>Notes</h2>\n<ul>\n<li>Knob loose.</li>\n<li>&lt;script&gt;alert(1)" in page
    for found in (MarkdownIt("commonmark").render(text), page):
        assert "<script>alert" not in found
        assert "\x1b" not in found


@pytest.mark.parametrize("notes", ["", " \n\t\n"])
def test_a_sheet_without_notes_has_no_head_for_them(notes):
    report = replace(report_of(DEVICES), notes=notes)
    assert "Notes" not in as_markdown(report)
    assert "<h2>Notes</h2>" not in as_html(report, {})


def test_the_notes_of_a_sheet_are_those_of_its_report():
    assert sheets.report("healthy", {"notes": "Knob loose."}).notes == "Knob loose."
    assert sheets.report("healthy").notes == ""


def test_csv_says_what_is_not_known_and_what_is_not_reached():
    first, second, third = rows(report_of(DEVICES, OFFSET, SAFE_AREA))
    assert (second["nominal"], second["shown"]) == ("", "not read")
    assert [one["reached"] for one in (first, second, third)] == ["true", "true", "false"]
    assert third["needs"] == "stage.rated_load"
    assert third["also"] == f"60 deg {show(1.55, shown_kind(SAFE_AREA))}"
    assert third["inputs"] == "loudspeaker.phase_angle = 45 deg (assumed)"


def test_csv_gives_both_ends_of_a_range():
    bound = replace(SAFE_AREA.bound, go=(0.65, 1.0), sense="between")
    [row] = rows(report_of(replace(SAFE_AREA, bound=bound)))
    assert row["limit_go"] == "0.65, 1.0"


def test_csv_marks_a_value_without_bound():
    [row] = rows(report_of(replace(SAFE_AREA, nominal=None, worst=None, unbounded=True)))
    assert (row["unbounded"], row["nominal"], row["shown"]) == ("true", "", "without bound")
