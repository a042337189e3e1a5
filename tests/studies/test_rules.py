"""What holds a finding back whatever its number, and what follows for the steps."""

import re
from dataclasses import replace

import pytest

from safeamp.answers import Report, StepVerdict
from safeamp.checks import CHECKS
from safeamp.findings import Step, Verdict
from safeamp.reading.unassessed import WOULD_CHANGE
from safeamp.studies.verdict import verdict
from tests.scenarios.sheets import GONE, beside, finding, limits, report, sheet

GO, CAUTION, UNVERIFIED, STOP = Verdict.GO, Verdict.CAUTION, Verdict.UNVERIFIED, Verdict.STOP


def reads(one, key):
    return any(item.key == key for item in one.inputs)


def test_an_example_value_clears_nothing_that_reads_it():
    change = {"heatsink.air": "35 degC ±5 K, example"}
    answer, sound = report("healthy", change), report("healthy")
    touched = [one for one in answer.findings if reads(one, "heatsink.air")]
    assert len(touched) >= 5
    for one in touched:
        assert one.verdict >= UNVERIFIED
        assert any("example values are still in the sheet: heatsink.air" in text for text in one.because)
    for one in answer.findings:
        if one not in touched:
            assert one.verdict is finding(sound, one.id).verdict


def test_an_example_in_a_list_counts_too():
    one = finding(report("healthy", {"readings.idle_upper": ["14 mV, example"]}), "bias.balance")
    assert one.verdict is UNVERIFIED
    assert "readings.idle_upper" in one.because[0]


def test_the_demo_alone_may_use_examples():
    change = {"heatsink.air": "35 degC ±5 K, example"}
    assert report("healthy", change).verdict is UNVERIFIED
    demo = report("healthy", change, demo=True)
    assert demo.verdict is GO


def test_the_demo_could_answer_whatever_it_says():
    demo = report("split_rail", demo=True)
    assert demo.verdict is CAUTION
    assert demo.exit_status == 0


def test_readings_on_the_limiter_clear_first_power_up_only():
    answer, sound = report("healthy", {"readings.taken_on": "limiter"}), report("healthy")
    for one in answer.findings:
        later = one.step.place > Step.FIRST_POWER_UP.place
        held = CHECKS[one.id].at_bench and later and one.id != "touch.mains"  # read with the plug pulled
        assert one.verdict is (UNVERIFIED if held else finding(sound, one.id).verdict), one.id
    assert {"bias.idle", "offset.output", "heat.reading"} <= {
        one.id for one in answer.findings if one.verdict is UNVERIFIED
    }


def test_a_bench_load_says_nothing_of_a_loudspeaker():
    answer, sound = report("healthy", {"loudspeaker.load": "resistor"}), report("healthy")
    for one in answer.findings:
        held = one.step is Step.LOUDSPEAKER
        assert one.verdict is (UNVERIFIED if held else finding(sound, one.id).verdict), one.id


@pytest.mark.parametrize(
    ("name", "status"), [("healthy", 0), ("split_rail", 3), ("bench_mockup", 4), ("old_mains", 5)]
)
def test_exit_status_is_the_verdicts(name, status):
    answer = report(name)
    assert answer.exit_status == status
    assert answer.verdict is max(one.verdict for one in answer.findings)


def test_a_step_is_as_bad_as_its_worst_finding():
    answer = report("old_mains")
    for entry in answer.steps:
        assert entry.verdict is max(one.verdict for one in answer.findings if one.step is entry.step)


def test_steps_after_one_that_is_not_cleared_are_not_reached():
    assert [entry.reached for entry in report("old_mains").steps] == [True, *6 * [False]]
    assert all(entry.reached for entry in report("split_rail").steps)  # caution clears
    late = report("healthy", {"readings.offset_warm": "300 mV, measured"})
    assert [entry.reached for entry in late.steps] == [True, True, True, *4 * [False]]
    assert late.first_blocked.step is Step.BIAS
    assert report("healthy").first_blocked is None


@pytest.mark.parametrize(
    ("up_to", "wanted"),
    [
        (Step.COLD_CHECKS, GO),
        (Step.FIRST_POWER_UP, GO),
        (Step.BIAS, STOP),
        (Step.HAND_OVER, STOP),
        (None, STOP),
    ],
)
def test_the_last_step_asked_for_ends_the_verdict(up_to, wanted):
    answer = report("healthy", {"readings.offset_warm": "300 mV, measured"}, up_to=up_to)
    assert answer.verdict is wanted
    assert answer.exit_status == wanted.exit_status
    assert len(answer.steps) == 7


def test_on_paper_leaves_the_bench_out_and_clears_no_power():
    answer = report("healthy", on_paper=True)
    bench = {identity for identity, check in CHECKS.items() if check.at_bench}
    assert set(answer.still_to_read) == bench
    assert not bench & {one.id for one in answer.findings}
    assert answer.scope.endswith("on paper: clears no power")
    assert "on paper" not in report("healthy").scope
    assert not report("healthy").still_to_read


def test_a_step_with_nothing_to_judge_holds_nothing_back():
    steps = {entry.step: entry for entry in report("healthy", on_paper=True).steps}
    assert steps[Step.FIRST_POWER_UP].verdict is None
    assert not steps[Step.FIRST_POWER_UP].holds
    assert steps[Step.HAND_OVER].reached


def test_a_design_on_paper_needs_no_reading():
    gone = dict.fromkeys(("readings.device_ohms", "readings.insulation", "readings.offset_warm"), GONE)
    assert report("healthy", gone).verdict is UNVERIFIED
    assert report("healthy", gone, on_paper=True).verdict is GO


def test_no_report_is_better_than_its_findings():
    steps = (StepVerdict(Step.BIAS, STOP, True),)
    with pytest.raises(ValueError, match=r"the verdict go is better than what it stands on, stop"):
        Report(title="", scope="", verdict=GO, steps=steps, findings=())
    with pytest.raises(ValueError, match=r"the verdict caution is better than what it stands on, unverified"):
        Report(title="", scope="", verdict=CAUTION, steps=(), findings=())


SETTLED = {
    "heatsink.sink_to_air": "0.95 K/W, measured",
    "heatsink.case_to_sink": "0.45 K/W, measured",
    "heatsink.air": "35 degC ±0.1 K, measured",
}


def test_the_highest_mains_never_counts_as_assumed():
    answer = report("split_rail", SETTLED)
    one = finding(answer, "soa.loudspeaker")
    assert one.verdict is CAUTION
    assert one.nominal < 1.0 < one.worst
    assert one.worst_case["mains.present"] == pytest.approx(253.0)
    assert "at the highest mains" in one.because[0]
    assert "mains.highest" in [assumed.key for assumed in answer.assumptions]


def test_without_a_rising_mains_the_same_amplifier_goes_further():
    held = finding(report("split_rail", SETTLED | {"mains.highest": "231 V"}), "soa.loudspeaker")
    assert held.worst < 1.0
    assert not held.because


def test_what_only_an_assumption_reaches_is_unverified_and_names_it():
    one = finding(report("old_mains"), "bias.runaway")
    assert one.verdict is UNVERIFIED
    assert re.search(r"if stage\.bias_tracking is at the other end of its range: measure it", one.because[0])
    measured = {"stage.bias_tracking": "80 %, measured"}
    assert finding(report("old_mains", measured), "bias.runaway").verdict <= CAUTION


def test_a_guess_is_named_with_what_it_would_do():
    one = finding(report("single_rail"), "heat.heatsink")
    assert one.overturned_by.startswith("heatsink.sink_to_air (guess) at 1.7 K/W makes it 70.3 °C")


#: Finding -> keys taken away together, and the word that follows.
MISSING = [
    ("cold.devices", "readings.device_ohms", UNVERIFIED),
    ("cold.insulation", "readings.insulation", UNVERIFIED),
    ("supply.fuse", "supply.rail_fuse", UNVERIFIED),
    ("supply.fuse", "supply.rail_fuse_rated", UNVERIFIED),
    ("supply.reservoir_voltage", "supply.reservoir_rated_voltage", CAUTION),
    ("supply.mains", "mains.rated", UNVERIFIED),
    ("supply.mains", "mains.frequency", UNVERIFIED),
    ("power_up.draw", "readings.limiter_state", UNVERIFIED),
    ("power_up.rails", "readings.limiter_rails", UNVERIFIED),
    ("power_up.output", "readings.limiter_output", UNVERIFIED),
    ("bias.balance", "readings.idle_lower", CAUTION),
    ("bias.drift", "readings.idle_cold", CAUTION),
    ("offset.output", "readings.offset_warm", UNVERIFIED),
    ("offset.output", "readings.offset_cold", UNVERIFIED),
    ("offset.drift", "readings.offset_cold", CAUTION),
    ("heat.heatsink", "heatsink.sink_to_air", UNVERIFIED),
    ("heat.junction", "heatsink.case_to_sink", UNVERIFIED),
    ("heat.reading", "readings.heatsink_temperature", CAUTION),
    ("heat.reading", "readings.heatsink_level", CAUTION),
    ("soa.resistive_load", "device.fitted.safe_area", UNVERIFIED),
    ("soa.loudspeaker", "device.fitted.safe_area", UNVERIFIED),
    ("stability.output", "readings.output_ac", CAUTION),
    ("stability.output", "readings.zobel_hot", CAUTION),
    ("loudspeaker.label", "loudspeaker.dc_resistance", CAUTION),
    ("loudspeaker.power", "loudspeaker.rated_power", CAUTION),
    ("loudspeaker.dc_fault", "loudspeaker.coil_limit", CAUTION),
    ("protection.short", "protection.vi_limiter", CAUTION),
    ("touch.mains", "readings.mains_insulation", UNVERIFIED),
    ("touch.mains", "readings.earth_resistance", UNVERIFIED),
]


@pytest.mark.parametrize(("identity", "key", "wanted"), MISSING)
def test_a_missing_input_has_its_word_and_is_named(identity, key, wanted):
    one = finding(report("healthy", {key: GONE}), identity)
    assert one.verdict is wanted
    assert key in one.needs


def test_idle_is_missing_only_when_nobody_read_it():
    gone = {"readings.idle_upper": GONE, "readings.idle_lower": GONE}
    assert finding(report("healthy", gone), "bias.idle").verdict is GO
    one = finding(report("healthy", gone | {"stage.idle": "14 mV"}), "bias.idle")
    assert one.verdict is UNVERIFIED
    assert one.needs == ("readings.idle_upper", "readings.idle_lower")


def test_what_is_there_may_already_be_a_stop():
    one = finding(
        report("healthy", {"readings.offset_cold": "2 V, measured", "readings.offset_warm": GONE}),
        "offset.output",
    )
    assert one.verdict is STOP
    assert one.needs == ("readings.offset_warm",)


def test_numbers_known_stay_beside_a_finding_that_lacks_an_input():
    one = finding(report("split_rail"), "loudspeaker.dc_fault")
    assert one.needs
    assert beside(one, "current in the coil") == pytest.approx(34.0 / 6.2)


NOT_USED = {"device.fitted.transient": ("heat.junction",), "loudspeaker.crest_factor": ("loudspeaker.power",)}


@pytest.mark.parametrize("key", NOT_USED)
def test_a_key_that_is_not_used_clears_nothing_that_it_would_change(key):
    sound, ids = report("healthy"), NOT_USED[key]
    answer = verdict(replace(sheet("healthy"), unassessed={key: ids}), limits())
    for one in answer.findings:
        if one.id in ids:
            assert one.verdict is UNVERIFIED
            assert f"{key} is not assessed by this version" in one.because
        else:
            assert one.verdict is finding(sound, one.id).verdict


def test_such_a_key_of_a_sheet_reaches_its_finding(monkeypatch):
    monkeypatch.setitem(WOULD_CHANGE, "loudspeaker.crest_factor", ("loudspeaker.power",))
    answer = verdict(sheet("healthy", {"loudspeaker.crest_factor": "10 dB"}), limits())
    assert finding(answer, "loudspeaker.power").verdict is UNVERIFIED
    assert answer.unassessed == {"loudspeaker.crest_factor": ("loudspeaker.power",)}
