"""Ten invented amplifiers in good order: none may be held up, and every caution says what clears it."""

import json

import pytest
from typer.testing import CliRunner

from safeamp.cli.app import app
from safeamp.findings import Verdict
from tests.amplifiers.sheets import FOLDER, NAMES, blocked, healthy, number, outputs, report, sheet, verdicts


def test_there_are_ten_of_the_kinds_that_stand_in_homes() -> None:
    tables = [sheet(name) for name in NAMES]
    kinds = {device["kind"] for table in tables for device in outputs(table)}
    assert len(tables) == 10
    assert {table["supply"]["rails"] for table in tables} == {"split", "single"}
    assert kinds == {"bipolar", "darlington", "lateral mosfet"}
    assert {table["mains"]["nominal"] for table in tables} == {"230 V", "120 V"}
    assert {table["stage"]["pairs"] for table in tables} == {1, 2, 3}


@pytest.mark.parametrize("name", NAMES)
def test_it_gives_the_power_of_its_title_as_its_maker_rates_it(name: str) -> None:
    # The power at clipping is what heat.heatsink shows; 12 % is what a title rounds.
    found = next(finding for finding in healthy(name).findings if finding.id == "heat.heatsink")
    power = next(also.value for also in found.also if also.at.startswith("power at clipping"))
    assert power == pytest.approx(float(name.partition("w_")[0]), rel=0.12)
    assert sheet(name)["stage"]["original_devices"] is True
    assert number(sheet(name)["stage"]["rated_load"]) <= 8.0


@pytest.mark.parametrize("name", NAMES)
def test_its_heatsink_reads_what_is_computed(name: str) -> None:
    found = next(finding for finding in healthy(name).findings if finding.id == "heat.reading")
    assert found.nominal == pytest.approx(1.0, abs=0.1)


@pytest.mark.parametrize("name", NAMES)
def test_nothing_holds_it_up(name: str) -> None:
    found = healthy(name)
    not_assessed = {id for ids in found.unassessed.values() for id in ids}
    assert blocked(found) - not_assessed == set()
    assert not_assessed or all(entry.reached for entry in found.steps)


@pytest.mark.parametrize("name", NAMES)
def test_every_finding_of_its_bench_is_go(name: str) -> None:
    # What was read in good order is not even a caution: nobody shall look for a fault that is not there.
    read = ("cold.", "power_up.", "bias.", "offset.", "heat.", "stability.", "touch.mains", "supply.")
    found = {id: verdict for id, verdict in verdicts(healthy(name)).items() if id.startswith(read)}
    assert len(found) >= 14
    assert {id for id, verdict in found.items() if verdict is not Verdict.GO} == set()


@pytest.mark.parametrize("name", NAMES)
def test_every_caution_says_what_clears_it(name: str) -> None:
    cautions = [finding for finding in healthy(name).findings if finding.verdict is Verdict.CAUTION]
    assert cautions
    for finding in cautions:
        assert finding.next, finding.id
        assert finding.because or finding.bound is not None, finding.id


def test_the_safe_area_is_used_from_lightly_to_beyond_its_curve() -> None:
    # Only amplifiers on both sides of the levels show that the ones inside a maker's rating are let through.
    uses = {
        finding.nominal: finding.verdict
        for name in NAMES
        for finding in healthy(name).findings
        if finding.id == "soa.loudspeaker"
    }
    assert sum(use <= 0.8 for use in uses) >= 3
    assert sum(1.0 < use <= 1.8 for use in uses) >= 2
    assert {verdict for use, verdict in uses.items() if use > 1.0} == {Verdict.CAUTION}


@pytest.mark.parametrize(
    "condition", ["stage.rated_load", "stage.original_devices", "loudspeaker.dc_resistance"]
)
@pytest.mark.parametrize("name", ["50w_split_rail_120v", "80w_two_pairs_shared_heatsink"])
def test_beyond_its_curve_only_the_makers_rating_lets_it_through(name: str, condition: str) -> None:
    tables = sheet(name)
    table, key = condition.split(".")
    del tables[table][key]
    found = next(f for f in report(tables).findings if f.id == "soa.loudspeaker")
    assert found.verdict is Verdict.STOP
    assert condition in " ".join(found.because)


def run(*words):
    return CliRunner().invoke(app, ["check", *[str(word) for word in words]])


@pytest.mark.parametrize(("step", "status"), [("cold-checks", 0), ("soak", 0), ("hand-over", 3)])
def test_the_command_ends_with_the_status_of_the_steps_asked_for(step: str, status: int) -> None:
    result = run(FOLDER / "25w_split_rail_darlington.toml", "--step", step)
    assert result.exit_code == status


@pytest.mark.parametrize("name", NAMES[:3])
def test_the_report_prints_what_clears_each_caution(name: str) -> None:
    result = run(FOLDER / f"{name}.toml")
    text = " ".join(result.stdout.split())
    assert result.exit_code == 3
    for finding in healthy(name).findings:
        if finding.verdict is Verdict.CAUTION:
            assert f"next: {finding.next}" in text


def test_the_command_and_the_library_say_the_same() -> None:
    name = "100w_lateral_mosfet"
    result = json.loads(run(FOLDER / f"{name}.toml", "--format", "json").stdout)
    printed = {finding["id"]: finding["verdict"] for finding in result["findings"]}
    assert printed == {id: verdict.word for id, verdict in verdicts(healthy(name)).items()}
