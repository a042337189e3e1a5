"""The same ten with one fault each: the finding that the fault concerns stops, and no other one for no reason."""

import json
from functools import cache

import pytest
from typer.testing import CliRunner

from safeamp.cli.app import app
from safeamp.findings import Verdict
from tests.amplifiers.faults import FAULTS
from tests.amplifiers.sheets import blocked, healthy, report, sheet, verdicts
from tests.reading.desk import toml

TWINS = [(fault, name) for fault, planted in FAULTS.items() for name in planted.amplifiers]
COMMANDS = ["4 ohm for 8", "shorted device", "worn output capacitor", "label that the coil contradicts"]


@cache
def judged(fault, name):
    return report(twin(fault, name))


def twin(fault, name):
    tables = sheet(name)
    FAULTS[fault].plant(tables)
    return tables


@pytest.mark.parametrize(("fault", "name"), TWINS)
def test_the_finding_that_a_fault_concerns_holds_it_up(fault: str, name: str) -> None:
    planted, found = FAULTS[fault], judged(fault, name)
    now, before = verdicts(found), verdicts(healthy(name))
    for id in planted.stops:
        assert before[id] <= Verdict.CAUTION
        assert now[id] >= Verdict.UNVERIFIED, f"{id} is {now[id].word}"
    assert now[planted.stops[0]] is Verdict.STOP
    assert blocked(found) - blocked(healthy(name)) - set(planted.stops) <= set(planted.besides)


@pytest.mark.parametrize(("fault", "name"), TWINS)
def test_the_step_of_a_fault_is_not_cleared_and_nothing_after_it_is_reached(fault: str, name: str) -> None:
    found = judged(fault, name)
    places = [finding.step.place for finding in found.findings if finding.id in FAULTS[fault].stops]
    assert found.verdict is Verdict.STOP
    assert found.exit_status == 5
    assert found.first_blocked is not None
    assert found.first_blocked.step.place <= min(places)
    assert not any(entry.reached for entry in found.steps if entry.step.place > min(places))


@pytest.mark.parametrize("fault", FAULTS)
def test_each_fault_is_planted_in_at_least_three(fault: str) -> None:
    assert len(set(FAULTS[fault].amplifiers)) >= 3


@pytest.mark.parametrize("name", ["15w_single_rail_to3", "60w_two_pairs"])
def test_a_load_that_the_maker_prints_is_no_fault(name: str) -> None:
    tables = sheet(name)
    FAULTS["4 ohm for 8"].plant(tables)
    assert verdicts(report(tables))["soa.loudspeaker"] is Verdict.CAUTION


@pytest.mark.parametrize("fault", COMMANDS)
def test_the_command_ends_with_five(fault: str, tmp_path) -> None:
    name = FAULTS[fault].amplifiers[0]
    file = tmp_path / "twin.toml"
    file.write_text(toml(twin(fault, name)), encoding="utf-8")
    result = CliRunner().invoke(app, ["check", str(file), "--format", "json"])
    assert result.exit_code == 5
    stopped = {found["id"] for found in json.loads(result.stdout)["findings"] if found["verdict"] == "stop"}
    assert set(FAULTS[fault].stops) <= stopped
