import re
from dataclasses import replace
from decimal import Decimal

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from safeamp.findings import Bound, Step, Verdict
from safeamp.quantities import RATIO, RESISTANCE
from safeamp.report.text import render
from tests.report.hand_made import DEVICES, OFFSET, SAFE_AREA, SCOPE, caution, report_of

LONG = "word " * 60 + "x" * 200


def lines_of(*findings, **more) -> list[str]:
    return render(report_of(*findings, **more)).splitlines()


def section(lines: list[str], head: str) -> str:
    start = lines.index(head) + 1
    length = next((place for place, line in enumerate(lines[start:]) if not line), None)
    return " ".join(" ".join(lines[start:][:length]).split())


@pytest.mark.parametrize("width", [80, 100])
def test_no_line_is_longer_than_the_width(width: int) -> None:
    report = report_of(
        replace(DEVICES, says=LONG),
        replace(SAFE_AREA, because=(LONG,), needs=(LONG,), next=LONG, id="soa." + "x" * 90),
        title=LONG,
        scope=LONG,
        remarks=(LONG,),
        source=LONG,
        overridden=(LONG,),
        unassessed={LONG: ("soa.loudspeaker",)},
    )
    assert max(map(len, render(report, width=width).splitlines())) <= width


def test_a_width_that_cannot_be_kept_is_refused() -> None:
    with pytest.raises(ValueError, match="80 columns, not 79"):
        render(report_of(DEVICES), width=79)


def test_the_head_says_the_verdict_for_what_and_by_what() -> None:
    lines = lines_of(DEVICES, OFFSET, SAFE_AREA)
    assert f"STOP for {SCOPE}" in lines[:6]
    assert "  decided by: soa.loudspeaker" in lines[:7]


@pytest.mark.parametrize("finding", [DEVICES, caution(DEVICES)])
def test_the_last_line_names_what_all_steps_are_cleared_for(finding) -> None:
    with_care = "" if finding is DEVICES else " with the cautions above"
    assert (
        render(report_of(finding)).replace("\n", " ").endswith(f"All steps cleared{with_care} for: {SCOPE} ")
    )


def test_the_last_line_names_the_first_step_not_cleared_and_what_clears_it() -> None:
    lines = lines_of(DEVICES, OFFSET, SAFE_AREA)
    assert lines[-1] == "First step not cleared: bias (unverified); to clear: offset.output"
    assert section(lines, "What clears the step bias") == (
        "- offset.output (unverified): Read the DC at the output after twenty minutes; "
        "give readings.offset_cold, readings.offset_warm"
    )


def test_the_last_line_stays_one_line_when_much_is_missing() -> None:
    many = [replace(OFFSET, id=f"offset.reading_{number}") for number in range(9)]
    last = lines_of(*many)[-1]
    assert last.startswith("First step not cleared: bias (unverified); to clear: offset.reading_0")
    assert last.endswith("+8")


def test_the_worst_stands_first_among_what_clears_a_step() -> None:
    worse = replace(OFFSET, id="offset.drift", verdict=Verdict.STOP, needs=(), next="Find the cause.")
    assert lines_of(OFFSET, worse)[-1].endswith("bias (stop); to clear: offset.drift, offset.output")


@pytest.mark.parametrize(
    ("more", "text"),
    [
        ({}, "now 121 %, must be at most 100 %; Use a loudspeaker of more ohms; give stage.rated_load"),
        ({"nominal": None, "unbounded": True}, "now without bound, must be at most 100 %; Use a loudspeaker"),
        ({"next": "give stage.rated_load"}, "now 121 %, must be at most 100 %; give stage.rated_load"),
        ({"bound": None, "next": "", "needs": ()}, "remove the cause: 1.21 of the safe area is used"),
        ({"bound": None, "next": "", "needs": (), "because": ()}, "remove the cause: The device leaves"),
        ({"bound": Bound(1.0, float("-inf"), "at most", "s", "e")}, "Use a loudspeaker of more ohms"),
    ],
)
def test_what_clears_a_stop_begins_with_how_far_it_is_off(more: dict, text: str) -> None:
    found = section(lines_of(replace(SAFE_AREA, **more)), "What clears the step loudspeaker")
    assert found.startswith(f"- soa.loudspeaker (stop): {text}")
    assert found.count("stage.rated_load") <= 1


def test_a_stop_that_is_too_low_must_rise() -> None:
    shorted = replace(DEVICES, verdict=Verdict.STOP, nominal=20.0, worst=20.0, next="Find it.")
    found = section(lines_of(shorted), "What clears the step cold checks")
    assert found == "- cold.devices (stop): now 20 ohm, must be at least 100 ohm; Find it"


def test_a_level_without_end_is_not_shown() -> None:
    text = " ".join(lines_of(replace(OFFSET, bound=Bound(0.05, float("-inf"), "at most", "s", "e"))))
    assert "(go up to 50 mV)" in text


def test_the_head_names_a_handful_of_what_decides() -> None:
    many = [replace(OFFSET, id=f"offset.reading_{number}") for number in range(9)]
    text = " ".join(" ".join(lines_of(*many)).split())
    assert "offset.reading_4, offset.reading_5 and 3 more Steps" in text
    assert "offset.reading_5 and" not in " ".join(lines_of(*many[:6]))


@pytest.mark.parametrize("shift", range(20))
def test_number_and_unit_stay_on_one_line(shift: int) -> None:
    lines = lines_of(
        replace(SAFE_AREA, because=("x" * shift + " 12 % 3.5 mV 7 K/W 4 kohm 25 °C 45 deg" * 3,))
    )
    assert not [line for line in lines if re.match(r" *(%|mV|K/W|kohm|°C|deg)( |$)", line)]


def test_steps_after_one_that_is_not_cleared_are_not_reached() -> None:
    steps = section(lines_of(DEVICES, OFFSET, SAFE_AREA), "Steps, in their order")
    assert "go for cold checks" in steps
    assert "first power-up: nothing to judge" in steps
    assert "unverified for bias: the first step not cleared" in steps
    assert "not reached loudspeaker (its findings alone: stop)" in steps


def test_steps_up_to_one_never_speak_for_those_after_it() -> None:
    text = render(report_of(DEVICES, SAFE_AREA, up_to=Step.BIAS))
    assert "GO for the steps up to bias and nothing after it (8 ohm" in text.replace("\n  ", " ")
    assert " cleared for: the steps up to bias and nothing after it" in text.replace("\n", " ")
    assert f"GO for {SCOPE[:5]}" not in text


def test_on_paper_clears_no_power() -> None:
    lines = lines_of(DEVICES, on_paper=True, still_to_read=("offset.output",))
    assert "GO for 8 ohm loudspeaker, phase up to 45 deg, mains up to 253 V; on paper:" in " ".join(lines)
    assert "All steps cleared" not in " ".join(lines)
    assert "which clears no power" in " ".join(lines[-2:])
    assert section(lines, "Still to be read at the bench") == "- offset.output"


def test_the_demo_says_first_that_it_is_invented() -> None:
    lines = lines_of(DEVICES, demo=True)
    assert "this amplifier is invented" in lines[1]
    assert " ".join(lines[-2:]).endswith(f"All steps cleared for: {SCOPE} (an invented amplifier)")
    assert "invented" not in render(report_of(DEVICES))


def test_a_use_is_told_as_used_and_left() -> None:
    text = " ".join(lines_of(SAFE_AREA))
    assert "uses 121 % of the safe area, 21 % too much" in text
    good = replace(SAFE_AREA, verdict=Verdict.GO, nominal=0.85, worst=0.85)
    assert "uses 85 % of the safe area, 15 % left (go up to 80 %, stop above 100 %)" in " ".join(
        " ".join(lines_of(good)).split()
    )


@pytest.mark.parametrize("use", [0.4677, 0.4674, 0.0002, 0.9996, 1.3333, 0.5])
def test_used_and_left_add_up(use: float) -> None:
    text = " ".join(" ".join(lines_of(replace(SAFE_AREA, nominal=use))).split())
    used, other, word = re.search(
        r"uses ([\d.]+) % of the safe area, ([\d.]+) % (left|too much)", text
    ).groups()
    assert Decimal(used) + Decimal(other) * (1 if word == "left" else -1) == 100


def test_a_finding_that_rests_on_a_word_shows_no_number() -> None:
    finding = replace(DEVICES, id="power_up.draw", kind=RATIO, nominal=2.0, says="the limiter is bright")
    text = " ".join(" ".join(lines_of(finding)).split())
    assert "power_up.draw: the limiter is bright (go when dark or dim, stop when bright or rising)" in text
    assert text.count("the limiter is bright") == 1


def test_ratios_that_people_read_as_percentages() -> None:
    finding = replace(SAFE_AREA, id="bias.balance", nominal=0.125, worst=0.125)
    assert "bias.balance: 12.5 % (go up to 80 %, stop above 100 %)" in " ".join(lines_of(finding))


def test_a_go_level_beyond_stop_is_not_shown_as_go() -> None:
    text = " ".join(lines_of(replace(OFFSET, bound=Bound(0.026, 0.022, "at most", "s", "e"))))
    assert "(go up to 22 mV, stop above 22 mV)" in text


def test_nothing_is_called_margin_or_safe() -> None:
    text = render(report_of(DEVICES, OFFSET, SAFE_AREA)).lower()
    assert not re.search(r"margin|safety factor|\bpass\b|\bok\b", text)


def test_a_value_beyond_a_limit_never_looks_equal_to_it() -> None:
    finding = replace(SAFE_AREA, nominal=1.0004, worst=1.0004)
    assert "uses 100.04 % of the safe area, 0.04 % too much" in " ".join(lines_of(finding))


def test_a_finding_shows_corner_place_reason_and_next_reading() -> None:
    text = " ".join(" ".join(lines_of(SAFE_AREA)).split())
    for part in (
        "worst case 143 %",
        "because: 1.21 of the safe area is used",
        "worst case at: supply.no_load 38.5 V, mains 253 V, stage.pairs 1",
        "there: voltage 36.4 V, current 3.1 A, zone power",
        "also: 60 deg 155 %",
        "hangs on: loudspeaker.phase_angle",
        "to settle it, give: stage.rated_load",
        "next: Use a loudspeaker of more ohms.",
    ):
        assert part in text


def test_a_good_finding_takes_two_lines() -> None:
    text = section(lines_of(replace(DEVICES, next="y", needs=("z",))), "Cold checks")
    assert text == (
        "go cold.devices: 180 kohm (go from 1 kohm, stop below 100 ohm) Lowest reading across outputs and drivers."
    )


def test_what_is_to_be_minded_beside_a_go_is_never_left_out() -> None:
    text = section(lines_of(replace(DEVICES, because=("no terminal may touch chassis",))), "Cold checks")
    assert text.endswith("drivers. mind: no terminal may touch chassis")
    assert "because:" not in text


@pytest.mark.parametrize(
    ("more", "text"),
    [
        ({"nominal": None, "to_be_read": True}, "not read"),
        ({"nominal": None, "to_be_read": False}, "not known"),
        ({"nominal": float("nan")}, "not known"),
        ({"nominal": None, "unbounded": True, "to_be_read": False}, "without bound"),
        ({"nominal": 0.02, "worst": None}, "20 mV"),
        ({"nominal": 0.02, "worst": 0.02}, "20 mV"),
        ({"nominal": 0.02, "worst": 0.03}, "20 mV; worst case 30 mV"),
        ({"nominal": 0.02, "worst": float("inf")}, "20 mV; worst case unbounded"),
    ],
)
def test_number_of_a_finding(more: dict, text: str) -> None:
    finding = replace(OFFSET, to_be_read=False, bound=None) if "to_be_read" not in more else OFFSET
    line = next(
        line
        for line in lines_of(replace(finding, bound=None, **more))
        if line[13:].startswith("offset.output: ")
    )
    assert line.endswith(f"offset.output: {text}")


@pytest.mark.parametrize(
    ("bound", "text"),
    [
        (Bound(0.05, 0.1, "at most", "s", "e"), "(go up to 50 mV, stop above 100 mV)"),
        (Bound(None, 0.1, "at most", "s", "e"), "(stop above 100 mV)"),
        (Bound((0.01, 0.02), 0.1, "between", "s", "e"), "(go from 10 mV to 20 mV, stop above 100 mV)"),
        (Bound(0.05, None, "at least", "s", "e"), "(go from 50 mV)"),
        (
            Bound(0.05, None, "at most", "mine", "e", True),
            "(go up to 50 mV, changed by your limits file: mine)",
        ),
    ],
)
def test_limit_of_a_finding(bound: Bound, text: str) -> None:
    finding = replace(OFFSET, nominal=0.03, worst=0.03, bound=bound)
    assert text in " ".join(" ".join(lines_of(finding)).split())


def test_notes_stand_in_their_sections() -> None:
    lines = lines_of(
        SAFE_AREA,
        remarks=("signs dropped",),
        overridden=("offset.output",),
        unassessed={"device.a.pulse": ("soa.loudspeaker",), "loudspeaker.resonance": ()},
    )
    assert section(lines, "Does not apply") == '- offset.midpoint: stage.coupling = "direct"'
    assumed = section(lines, "Assumed, because the sheet does not say")
    assert assumed == "- loudspeaker.phase_angle = 45 deg: nobody has measured it"
    assert section(lines, "Limits changed by your own file") == "- offset.output"
    assert section(lines, "Remarks") == (
        "- signs dropped - device.a.pulse is not assessed, which leaves unverified: soa.loudspeaker "
        "- loudspeaker.resonance is not assessed"
    )


@pytest.mark.parametrize(
    "word", ["Mains kills", "discharge", "isolating transformer", "one hand", "eye", "codes"]
)
def test_the_hazards_are_named(word: str) -> None:
    assert word in section(lines_of(DEVICES), "Safety")


def test_a_caution_is_cleared_with_its_limits_written_out() -> None:
    text = section(lines_of(caution(DEVICES)), "Cleared only with these cautions")
    assert text == "- cold.devices: only up to 253 V"


def test_colour_adds_nothing_but_colour() -> None:
    report = report_of(DEVICES, OFFSET, SAFE_AREA)
    coloured = render(report, colour=True)
    assert "\x1b[1;31mSTOP\x1b[0m" in coloured
    assert re.sub(r"\x1b\[[0-9;]*m", "", coloured) == render(report)
    assert "\x1b" not in render(report)


@settings(deadline=None, max_examples=50)
@given(st.text(), st.text())
def test_no_title_steers_the_terminal(title: str, scope: str) -> None:
    text = render(report_of(DEVICES, title=title, scope=scope))
    assert not re.search(r"[\x00-\x09\x0b-\x1f\x7f-\x9f]", text)


def test_kinds_of_other_values_are_printed_too() -> None:
    finding = replace(
        DEVICES, kind=RESISTANCE, worst_case={"device.fitted.power": 150.0, "stage.idle": 0.012}
    )
    finding = replace(caution(finding), inputs=(replace(SAFE_AREA.inputs[0], key="stage.idle", unit="V"),))
    text = " ".join(lines_of(finding))
    assert "device.fitted.power 150 W, stage.idle 12 mV" in text


def test_nothing_judged_is_told_as_nothing_cleared() -> None:
    lines = lines_of()
    assert " ".join(lines[-2:]) == f"Nothing is cleared: unverified for {SCOPE}"
    assert "All steps cleared" not in " ".join(lines)


def test_an_id_too_long_for_the_last_line_is_looked_up_above() -> None:
    last = lines_of(replace(OFFSET, id="offset." + "x" * 70))[-1]
    assert last == "First step not cleared: bias (unverified); to clear: see above"


def test_a_report_without_a_file_names_none() -> None:
    assert "SHA-256" not in render(report_of(DEVICES, source=""))
