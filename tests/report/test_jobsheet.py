"""The paper to keep: plain words, no promise, one page, and nothing on it that was not found."""

import re

import pytest

from safeamp.amplifier import TABLES, keys_of
from safeamp.checks import CHECKS
from safeamp.findings import Step
from safeamp.quantities import POWER, show
from safeamp.report.jobsheet import RECORD, examples_left, jobsheet_html, jobsheet_markdown, jobsheet_text
from safeamp.report.jobsheet_page import job_page, last_cleared
from safeamp.report.page import page_of
from safeamp.report.plain_words import CARE, LOOKS_AT, MEASURED, NEVER
from safeamp.studies.explain import explained
from tests.amplifiers import sheets as amplifiers
from tests.scenarios import sheets

NAMES = (*sheets.NAMES, "class_a", *amplifiers.NAMES)
#: Lines of a page at six to the inch.
LINES = 66
PROMISES = re.compile(
    r"\b(safe(?!\s+area)|safely|guarante\w*|warrant\w*|promis\w*|certif\w*|perfect\w*|fine|passed|approved|ok)\b",
    re.IGNORECASE,
)


def page(name, changes=None):
    return job_page(sheets.sheet(name, changes or {}), sheets.report(name, changes or {}))


def said(found, head):
    return next((note.texts for note in found.notes if note.head == head), ())


def first_page(name, changes=None):
    whole = jobsheet_text(sheets.sheet(name, changes or {}), sheets.report(name, changes or {}))
    first, record = whole.split("\f")
    return first, record


def test_every_finding_has_plain_words_and_no_other():
    assert set(LOOKS_AT) == set(CHECKS)
    assert len(set(LOOKS_AT.values())) == len(LOOKS_AT)


def test_every_measured_value_that_is_named_is_a_key():
    for path in MEASURED:
        table, name = path.split(".")
        assert name in keys_of(TABLES[table])


@pytest.mark.parametrize("name", NAMES)
def test_the_page_is_one_page_in_plain_words_without_a_promise(name):
    first, _ = first_page(name)
    lines = first.splitlines()
    assert len(lines) <= LINES
    assert max(map(len, lines)) <= 80
    assert PROMISES.findall(first) == []
    assert not any(identity in first for identity in CHECKS)


def test_a_promise_is_noticed():
    assert PROMISES.findall("It is safe and guaranteed, OK?") == ["safe", "guaranteed", "OK"]
    assert PROMISES.findall("the safety of an unsafe thing; okra") == []


@pytest.mark.parametrize("name", NAMES)
def test_the_page_starts_with_the_verdict_and_what_is_cleared(name):
    first, _ = first_page(name)
    report = sheets.report(name)
    text = " ".join(first.split())
    assert f"{report.title} {report.verdict.word.upper()}. " in text
    cleared = last_cleared(report)
    assert (
        "No step is cleared" if cleared is None else f"The last step that is cleared: {cleared.value}."
    ) in text
    assert ("It is not to be used" in text) == (report.first_blocked is not None)


def test_what_is_not_cleared_may_drive_nothing():
    for name in NAMES:
        drives = said(page(name), "What it may drive")
        blocked = sheets.report(name).first_blocked
        assert (
            (drives[0] == f"Nothing: the step {blocked.step.value} is not cleared.")
            if blocked
            else "of " in drives[0]
        )


def test_a_cleared_amplifier_may_drive_what_was_judged_and_nothing_less():
    assert said(page("healthy"), "What it may drive") == (
        "One loudspeaker of 8 ohm, at no note below 6.4 ohm; nothing less.",
        "It gives up to 18.7 W (sine, at clipping) into that.",
    )
    two = page("healthy", {"loudspeaker.series": 2})
    assert "2 loudspeakers (2 in series, 1 such in parallel) of 8 ohm" in said(two, "What it may drive")[0]


@pytest.mark.parametrize(
    "changes",
    [
        {"stage.series_resistor": "8 ohm, marked"},
        {"loudspeaker.parallel": 2, "loudspeaker.nominal_impedance": "16 ohm, marked"},
        {"stage.series_resistor": "2 ohm, marked", "loudspeaker.series": 2},
    ],
)
def test_the_power_of_the_page_is_the_power_of_the_record(changes):
    found = sheets.finding(sheets.report("healthy", changes), "loudspeaker.power")
    watts = next(one.value for one in found.also if one.at == "power at clipping")
    drives = [text for note in page("healthy", changes).notes for text in note.texts if "gives up to" in text]
    several = any(key.startswith("loudspeaker.") for key in changes)
    end = "into each of them" if several else "into that"
    assert drives == [f"It gives up to {show(watts, POWER)} (sine, at clipping) {end}."]


def test_a_bench_load_is_no_loudspeaker():
    found = page("healthy", {"loudspeaker.load": "resistor"})
    assert said(found, "What it may drive")[0].startswith("Nothing: the step loudspeaker")


def test_mains_position_and_what_is_fitted():
    found = page("split_rail")
    assert said(found, "On which mains") == (
        "Mains up to 253 V.",
        "On its plate: 230 V.",
        "In the socket at the bench: 230 V.",
    )
    assert "air of up to 40 °C" in said(found, "In which position")[0]
    assert said(found, "What is fitted") == (
        "Output devices: fitted (bipolar), 1 on each side.",
        "Rail fuse: T 4 A.",
        "A relay that takes the loudspeaker off at a fault.",
    )
    assert "bench supply" in said(page("bench_mockup"), "On which mains")[0]


@pytest.mark.parametrize(
    ("original", "words"), [(True, "the maker's types"), (False, "other types than the maker's")]
)
def test_whose_types_are_fitted_is_said(original, words):
    found = page("healthy", {"stage.original_devices": original})
    assert words in said(found, "What is fitted")[0]


def test_no_protection_is_said_and_a_fuse_named():
    bare = {
        "protection.trip_delay": "none",
        "protection.trip_voltage": "none",
        "protection.loudspeaker_fuse": "none",
    }
    assert "Nothing that takes the loudspeaker off at a fault." in said(
        page("healthy", bare), "What is fitted"
    )
    fused = said(page("healthy", {"protection.loudspeaker_fuse": "F 1 A"}), "What is fitted")
    assert "Loudspeaker fuse: F 1 A." in fused


def test_only_what_was_measured_is_listed_as_measured():
    found = said(page("healthy"), "What was measured")
    assert "DC at the terminals, warm 18 mV" in found
    assert not any("reservoir" in one for one in found)
    changed = {"readings.offset_warm": "18 mV"}
    assert not any("warm 18 mV" in one for one in said(page("healthy", changed), "What was measured"))


def test_what_is_unverified_or_not_known_stands_under_what_was_not_tested():
    for name in NAMES:
        untested = said(page(name), "What was not tested")
        for finding in sheets.report(name).findings:
            known = finding.nominal is not None or finding.unbounded
            expected = finding.verdict.word == "unverified" or not known
            assert (LOOKS_AT[finding.id] in untested) == expected, (name, finding.id)
        assert untested[-len(NEVER) :] == NEVER


def test_care_is_named_where_steps_are_cleared_with_caution_and_nowhere_else():
    assert "DC at the terminals, cold against warm: it moves more than usual" in said(
        page("split_rail"), "Cleared only with care"
    )
    assert said(page("healthy"), "Cleared only with care") == ()
    assert said(page("old_mains"), "Cleared only with care") == ()


#: What a customer cannot know: figures of the bench, levels, keys, limiters by their letters.
BENCH_WORDS = re.compile(r"%|\bV-I\b|stop level|corner|toleranc|limiter|safe area|_|\bdegC\b|\d")


@pytest.mark.parametrize("name", NAMES)
def test_care_and_faults_are_named_in_no_words_of_the_bench(name):
    for head in ("Cleared only with care", "What is not in order"):
        for text in said(page(name), head):
            assert BENCH_WORDS.findall(text) == [], text


def test_every_finding_has_its_care_in_words_of_the_house():
    assert set(CARE) == set(LOOKS_AT)
    for text in CARE.values():
        assert BENCH_WORDS.findall(text) == [], text
        assert PROMISES.findall(text) == [], text


def test_a_limiter_that_lets_too_much_through_is_said_so_that_a_customer_can_mind_it():
    points = [["0 V", "9 A"], ["80 V", "9 A"]]
    limited = page("40w_split_rail_to3", {"protection.vi_limiter": points})
    assert (
        "what happens when the loudspeaker wires touch: the amplifier may break, never let them touch"
        in said(limited, "Cleared only with care")
    )


BROKEN = {
    "supply.rail_fuse": "T 6.3 A",
    "heatsink.sink_to_air": "6 K/W, measured",
    "readings.offset_warm": "480 mV, measured",
}


def test_a_page_that_stops_names_what_failed():
    found = page("healthy", BROKEN)
    failed = said(found, "What is not in order")
    assert found.notes[0].head == "What is not in order"
    assert {"kind and size of the rail fuses", "DC at the loudspeaker terminals"} <= set(failed)
    stopped = [one.id for one in sheets.report("healthy", BROKEN).findings if one.verdict.word == "stop"]
    assert failed == tuple(LOOKS_AT[id] for id in stopped)
    first, _ = first_page("healthy", BROKEN)
    assert len(first.splitlines()) <= LINES


@pytest.mark.parametrize("name", NAMES)
def test_nothing_is_said_to_be_out_of_order_but_what_stops(name):
    stopped = [one.id for one in sheets.report(name).findings if one.verdict.word == "stop"]
    assert said(page(name), "What is not in order") == tuple(LOOKS_AT[id] for id in stopped)


def test_a_bridge_is_warned_of_and_notes_stand_there():
    found = page("healthy", {"stage.bridged": True, "heatsink.shared_by": 2, "notes": "Knob loose."})
    assert any("Neither loudspeaker terminal" in one for one in said(found, "Please mind"))
    assert said(found, "Remarks") == ("Knob loose.",)


def test_last_cleared_is_the_last_in_a_row():
    assert last_cleared(sheets.report("healthy")) is Step.HAND_OVER
    assert last_cleared(sheets.report("old_mains")) is None


@pytest.mark.parametrize("name", ["healthy", "split_rail", "old_mains"])
def test_the_record_holds_every_number_origin_limit_and_method(name):
    report = sheets.report(name)
    _, record = first_page(name)
    text = " ".join(record.split())
    assert text.startswith(RECORD)
    for entry in page_of(report).entries:
        assert entry.number in text
        assert f"{entry.finding.id}: {entry.finding.method}" in text or not entry.finding.method
        for given in entry.inputs:
            assert f"{given.key} = {given.value} ({given.origin})" in text
        assert entry.source in text
    assert report.digest[:16] in text


@pytest.mark.parametrize("name", ["healthy", "split_rail"])
def test_markdown_and_html_hold_page_and_record(name):
    sheet, report = sheets.sheet(name), sheets.report(name)
    workings = explained(sheet, sheets.limits(), report)
    text, html = jobsheet_markdown(sheet, report, workings), jobsheet_html(sheet, report, workings)
    assert text.startswith("# Job sheet\n")
    assert f"\n# {RECORD}\n" in text
    assert text.count("\n## What was measured\n") == 1
    assert "\n## GO for" in text or "\n## CAUTION for" in text
    assert html.count("<h1>") == 2
    assert html.count("<article") == len(report.findings)
    for note in job_page(sheet, report).notes:
        assert note.head in text
        assert f"<h2>{note.head}</h2>" in html


def test_a_hostile_note_stays_text():
    sheet = sheets.sheet("healthy", {"notes": "<script>alert(1)</script> **x** \x1b[31m"})
    report = sheets.report("healthy")
    assert "<script" not in jobsheet_html(sheet, report, {})
    assert "<script" not in jobsheet_markdown(sheet, report, {}).replace("\\<", "")
    assert "\x1b" not in jobsheet_text(sheet, report)


def test_every_example_is_complained_of():
    changes = {
        "supply.no_load": ["22 V, example"],
        "supply.rail_fuse": "T 2 A, example",
        "heatsink.air": "30 degC, example",
    }
    left = examples_left(sheets.sheet("healthy", changes))
    assert {one.key for one in left} == set(changes)
    assert all("is still an example; write your own value" in one.text for one in left)
    assert examples_left(sheets.sheet("healthy")) == ()


def test_one_example_of_a_default_that_is_widened_is_enough():
    assert [
        one.key for one in examples_left(sheets.sheet("healthy", {"heatsink.sink_to_air": "1 K/W, example"}))
    ] == ["heatsink.sink_to_air"]
