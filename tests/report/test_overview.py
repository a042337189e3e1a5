"""The table of a folder in its four forms."""

import csv
import io
import json

import pytest

from safeamp.answers import Overview, OverviewRow
from safeamp.complaints import Complaint
from safeamp.findings import Step, Verdict
from safeamp.report.overview import overview_csv, overview_json, overview_markdown, render_overview

ROWS = (
    OverviewRow(file="a.toml", title="Kitchen radio", scope="4 ohm loudspeaker", verdict=Verdict.GO),
    OverviewRow(
        file="b.toml",
        title="=HYPERLINK(1)",
        scope="8 ohm loudspeaker",
        verdict=Verdict.STOP,
        first_blocked=Step.LOAD_TEST,
        deciding=("soa.resistive_load", "loudspeaker.power"),
    ),
    OverviewRow(
        file="c.toml",
        complaint=Complaint("folder/c.toml", 7, "supply.no_load", "35 has no | unit"),
        problems=3,
    ),
    OverviewRow(file="d.toml", complaint=Complaint("folder/devices.toml", None, "", "is empty"), problems=1),
)
WHOLE = Overview(ROWS)


def test_text():
    assert render_overview(WHOLE).splitlines()[1:] == [
        "",
        "file    verdict     first step not cleared",
        "------------------------------------------",
        "a.toml  go          none",
        "    Kitchen radio",
        "    for 4 ohm loudspeaker",
        "b.toml  stop        load test",
        "    =HYPERLINK(1)",
        "    for 8 ohm loudspeaker",
        "    decided by: soa.resistive_load, loudspeaker.power",
        "c.toml  not read    nothing computed",
        "    line 7 supply.no_load: 35 has no | unit (and 2 more)",
        "d.toml  not read    nothing computed",
        "    folder/devices.toml is empty",
        "",
        "4 sheets: 1 stop, 1 go, 2 not read",
    ]


def test_text_keeps_its_width_and_one_line_a_name():
    long = OverviewRow(file=f"{'x' * 90}\n.toml", title="word " * 60, verdict=Verdict.GO)
    lines = render_overview(Overview((long,))).splitlines()
    assert max(map(len, lines)) <= 80
    assert f"{'x' * 23}…  go" in lines[4]


def test_on_paper_clears_no_power():
    paper = Overview(ROWS, on_paper=True)
    assert "On paper: clears no power." in render_overview(paper)
    assert overview_markdown(paper).startswith("On paper: clears no power.")
    assert json.loads(overview_json(paper))["on_paper"] is True


def test_csv_is_read_back_and_computes_nothing():
    rows = list(csv.reader(io.StringIO(overview_csv(WHOLE))))
    assert rows[0] == ["file", "title", "verdict", "for", "first step not cleared", "decided by"]
    assert rows[2] == [
        "b.toml",
        "'=HYPERLINK(1)",
        "stop",
        "8 ohm loudspeaker",
        "load test",
        "soa.resistive_load, loudspeaker.power",
    ]
    assert rows[3][2:] == [
        "not read",
        "",
        "nothing computed",
        "line 7 supply.no_load: 35 has no | unit (and 2 more)",
    ]


def test_markdown_escapes_what_would_break_the_table():
    lines = overview_markdown(WHOLE).splitlines()
    assert lines[1] == "| --- | --- | --- | --- | --- | --- |"
    assert "35 has no \\| unit" in lines[4]
    assert "soa.resistive\\_load" in lines[3]


def test_json():
    found = json.loads(overview_json(WHOLE))
    assert (found["command"], found["verdict"], len(found["sheets"])) == ("overview", "stop", 4)
    assert found["sheets"][1] == {
        "file": "b.toml",
        "title": "=HYPERLINK(1)",
        "scope": "8 ohm loudspeaker",
        "verdict": "stop",
        "first_step_not_cleared": "load test",
        "decided_by": ["soa.resistive_load", "loudspeaker.power"],
        "complaint": None,
        "problems": 0,
    }
    assert found["sheets"][2]["verdict"] is None
    assert found["safety"]
    assert json.loads(overview_json(Overview(ROWS[2:])))["verdict"] is None


def _sheet(word):
    return OverviewRow(file="x.toml", verdict=word)


@pytest.mark.parametrize(
    ("rows", "word", "unread", "status"),
    [
        ([_sheet(Verdict.CAUTION)], "caution", 0, 3),
        ([_sheet(Verdict.CAUTION), ROWS[2]], None, 1, 2),
        ([_sheet(Verdict.GO), ROWS[2], ROWS[2]], None, 2, 2),
        ([_sheet(Verdict.STOP), ROWS[2]], "stop", 1, 5),
        ([ROWS[2]], None, 1, 2),
    ],
)
def test_json_says_what_the_exit_status_says(rows, word, unread, status):
    whole = Overview(tuple(rows))
    found = json.loads(overview_json(whole))
    assert (found["verdict"], found["unread"], found["exit_status"]) == (word, unread, status)
    assert whole.exit_status == status
