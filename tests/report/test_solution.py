"""The answer of solving as text and as JSON."""

import json
import re

import pytest

from safeamp.answers import Edge, Forbidding, Interval, Solution
from safeamp.findings import Finding, Step, Verdict
from safeamp.quantities import CAPACITANCE, RATIO, VOLTAGE
from safeamp.report.solution import render_solution, solution_json


def finding(id, verdict, **more):
    return Finding(
        id=id,
        step=Step.COLD_CHECKS,
        verdict=verdict,
        kind=RATIO,
        says="too much",
        nominal=1.0,
        worst=1.1,
        **more,
    )


BOUND = finding("supply.reservoir_voltage", Verdict.CAUTION, worst_case={"mains.present": 253.0})
HIGH = Edge(
    value=40.9, written='"40.9 V, measured"', beyond=40.9001, verdict=Verdict.STOP, binds=(BOUND,), preferred=40.0,
    series="E6",
)  # fmt: skip
LOW = Edge(
    value=31.0, written='"31 V, measured"', beyond=30.9, verdict=Verdict.GO, refused="full_load is above",
    series="E24",
)  # fmt: skip


def solution(**more):
    plain = {
        "title": "Kitchen radio",
        "key": "supply.no_load",
        "kind": VOLTAGE,
        "until": Verdict.GO,
        "findings": ("supply.reservoir_voltage", "touch.rails"),
        "span": (1.0, 300.0),
        "now": 34.0,
        "now_holds": True,
        "tried": 49,
        "source": "radio.toml",
        "digest": "0123456789abcdef01",
    }
    return Solution(**(plain | more))


def text(**more):
    return render_solution(solution(**more))


def flat(**more):
    return re.sub(r"\s+", " ", text(**more))


def test_both_ends():
    assert text(intervals=(Interval(LOW, HIGH),)).splitlines()[1:] == [
        "Kitchen radio",
        "sheet radio.toml, SHA-256 0123456789abcdef",
        "",
        "supply.no_load: from 31 V to 40.9 V (the sheet has 34 V, which holds)",
        "  below 31 V: the sheet is refused: full_load is above",
        "  no preferred value (E24) lies inside",
        '  in the sheet: no_load = "31 V, measured"; the whole sheet is then go',
        "  above 40.9 V: supply.reservoir_voltage becomes caution, worst case at mains",
        "    253 V",
        "  next preferred value: 40 V (E6), judged in full",
        '  in the sheet: no_load = "40.9 V, measured"; the whole sheet is then stop',
        "",
        "Asked for",
        "  - go, at the worst corner too, of supply.reservoir_voltage, touch.rails",
        "  - 49 values tried from 1 V to 300 V",
        "",
        "This clears no step: write the value into the sheet and check it.",
    ]


@pytest.mark.parametrize(
    ("intervals", "says"),
    [
        ((Interval(None, HIGH),), "supply.no_load: at most 40.9 V"),
        ((Interval(LOW, None),), "supply.no_load: at least 31 V"),
        ((Interval(LOW, LOW),), "supply.no_load: only 31 V"),
        ((Interval(None, None),), "supply.no_load: any value from 1 V to 300 V"),
        ((Interval(None, LOW), Interval(HIGH, None)), "supply.no_load: at most 31 V, or at least 40.9 V"),
        ((), "supply.no_load: no value will do"),
    ],
)
def test_what_will_do_stands_first(intervals, says):
    assert f" {says} (the sheet has 34 V" in flat(intervals=intervals)


def test_what_forbids_every_value_is_named():
    never = Forbidding(finding("touch.rails", Verdict.UNVERIFIED, needs=("readings.offset_warm",)), 34.0)
    found = flat(forbidden=(never,), now_holds=False)
    assert "(the sheet has 34 V, which does not hold)" in found
    assert (
        "touch.rails is never go; at 34 V unverified: too much; to settle it, give readings.offset_warm"
        in found
    )
    assert "--until caution" not in found


def test_a_caution_says_how_to_ask_for_less():
    never = Forbidding(finding("touch.rails", Verdict.CAUTION), 34.0)
    assert "--until caution asks for what clears with care." in flat(forbidden=(never,))
    assert "--until caution" not in flat(forbidden=(never,), until=Verdict.CAUTION)


def test_what_excludes_each_other_says_where_it_holds():
    contrary = Forbidding(BOUND, 34.0, (1.0, 20.0))
    assert "supply.reservoir_voltage holds for some values from 1 V to 20 V only" in flat(
        forbidden=(contrary,)
    )


def test_the_others_are_answered_below():
    rest = solution(findings=("touch.rails",), intervals=(Interval(None, HIGH),))
    found = flat(forbidden=(Forbidding(BOUND, 34.0),), otherwise=rest)
    assert "Without these findings, and so clearing nothing of them: supply.no_load: at most 40.9 V" in found


def test_a_key_that_nothing_reads():
    found = flat(findings=(), now=None)
    assert "no finding reads it, so no value of it changes a verdict (not in the sheet)" in found
    assert "Asked for" not in found
    assert "(the sheet has 34 V)" in flat(findings=())


def test_values_that_the_sheet_refuses_are_counted_and_the_commonest_reason_is_named():
    refused = {"refused": 40, "refusal": "device.fitted.power: junction_limit means 150 W"}
    found = flat(**refused)
    assert (
        "49 values tried from 1 V to 300 V; 40 of them the sheet cannot have, most often: "
        "device.fitted.power: junction_limit means 150 W" in found
    )
    bounded = flat(**refused, intervals=(Interval(LOW, HIGH),))
    assert "40 of them the sheet cannot have This clears" in bounded
    found = json.loads(solution_json(solution(**refused)))
    assert found["refused"] == {"count": 40, "most_often": refused["refusal"]}


def test_a_list_says_that_it_moves_together_and_an_item_stands_in_its_list():
    found = flat(items=3, intervals=(Interval(LOW, HIGH),))
    assert (
        "all 3 items move together, in proportion: the largest is told; one alone: "
        "supply.no_load.0 to .2" in found
    )
    alone = flat(key="supply.no_load.1", intervals=(Interval(LOW, HIGH),))
    assert 'in the sheet: no_load = "31 V, measured"' in alone
    assert "move together" not in alone


def test_an_end_beside_zero_says_where_the_search_stopped():
    small = Edge(value=1e-6, written='"1 µV"', beyond=0.0, verdict=Verdict.GO, binds=(BOUND,))
    assert "nothing was tried: no smaller value is told from zero" in flat(intervals=(Interval(small, None),))
    assert "told from zero" not in flat(intervals=(Interval(LOW, HIGH),))


def test_what_nobody_wrote_is_not_said_to_be_in_the_sheet():
    intervals = (Interval(LOW, HIGH),)
    assert "(not in the sheet, which takes 34 V, which holds)" in flat(written=False, intervals=intervals)


def test_on_paper_is_said():
    assert "on paper, without what is read at the bench" in flat(
        intervals=(Interval(None, None),), on_paper=True
    )


def test_no_line_is_too_long():
    wide = text(intervals=(Interval(LOW, HIGH),), title="word " * 60, findings=("soa.loudspeaker",) * 20)
    assert max(map(len, wide.splitlines())) <= 80


def test_json():
    found = json.loads(solution_json(solution(intervals=(Interval(LOW, HIGH),))))
    assert found["results"] == {
        "smallest": {"value": 31.0, "unit": "V"},
        "largest": {"value": 40.9, "unit": "V"},
        "largest_preferred": {"value": 40.0, "unit": "V"},
    }
    assert (found["command"], found["key"], found["outcome"]) == ("solve", "supply.no_load", "bounded")
    assert found["intervals"][0]["largest"]["binds"] == [
        {
            "id": "supply.reservoir_voltage",
            "verdict": "caution",
            "because": [],
            "worst_case": {"mains.present": 253.0},
            "needs": [],
        }
    ]
    assert found["safety"]


def test_json_of_no_value():
    never = Forbidding(BOUND, 34.0)
    rest = solution(kind=CAPACITANCE, intervals=(Interval(None, None),))
    found = json.loads(solution_json(solution(forbidden=(never,), otherwise=rest)))
    assert (found["outcome"], found["results"], found["intervals"]) == ("none", {}, [])
    assert found["forbidden_by"][0]["at"] == 34.0
    assert found["forbidden_by"][0]["holds"] is None
    assert found["otherwise"]["outcome"] == "any"
    assert found["otherwise"]["unit"] == "F"
