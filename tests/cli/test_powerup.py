"""The command that prints the card for the first power-up."""

import json
import re
from pathlib import Path

import pytest
from markdown_it import MarkdownIt

from safeamp.report.starter_values import STARTERS
from tests.cli.test_commands import HEALTHY, OLD_MAINS, run
from tests.cli.test_processes import heavy, imported_by

TESTS = Path(__file__).parents[1]
SHEETS = sorted(
    path
    for folder in ("scenarios", "amplifiers/healthy", "reports", "bench")
    for path in (TESTS / folder).glob("*.toml")
    if not path.name.endswith(".expected.toml")
)
SPLIT_RAIL = HEALTHY.with_name("split_rail.toml")
#: Words that would send somebody to the switch.
ON = re.compile(
    r"(?i)\b(switch(?:ed|ing)? on\b|power (?:it )?(?:on|up)\b(?! to which)|plug in|step by step|may be applied)"
)
#: Readings of which each alone stops or leaves open the cold checks.
SPOILT = {
    "a shorted device": ('device_ohms = "180 kohm, measured"', 'device_ohms = "12 ohm, measured"'),
    "an insulator through": ('insulation = "20 Mohm, measured"', 'insulation = "40 kohm, measured"'),
    "insulation not read": ('insulation = "20 Mohm, measured"', ""),
    "devices not read": ('device_ohms = "180 kohm, measured"', ""),
    "another fuse": ('rail_fuse = "T 4 A"', 'rail_fuse = "F 4 A"'),
    "a fuse of unknown rating": ('rail_fuse_rated = "T 4 A, marked"', ""),
    "a weak reservoir": (
        'reservoir_rated_voltage = "50 V, marked"',
        'reservoir_rated_voltage = "25 V, marked"',
    ),
    "a weak device": ('voltage = "160 V, data sheet"', 'voltage = "60 V, data sheet"'),
    "mains not read": ('actual = "230 V, measured"', ""),
    "an example": ('insulation = "20 Mohm, measured"', 'insulation = "20 Mohm, example"'),
}


def card(*words):
    return json.loads(run("powerup", *words, "--format", "json").stdout)


def spoilt(tmp_path, what):
    old, new = SPOILT[what]
    text = SPLIT_RAIL.read_text(encoding="utf-8")
    assert old in text
    path = tmp_path / "spoilt.toml"
    # The last curve point of a device lies at its voltage.
    path.write_text(text.replace(old, new).replace(', ["160 V", "0.25 A"]', ""), encoding="utf-8")
    return path


@pytest.mark.parametrize("path", SHEETS, ids=lambda path: path.stem)
def test_every_sheet_gets_a_card_with_the_word_of_its_cold_checks(path):
    checked = json.loads(run("check", path, "--step", "cold-checks", "--format", "json").stdout)
    result = run("powerup", path)
    assert result.exit_code == 0
    assert json.loads(run("powerup", path, "--format", "json").stdout)["verdict"] == checked["verdict"]
    assert result.stderr == ""
    assert "The card clears nothing." in " ".join(result.stdout.split())
    assert max(map(len, result.stdout.splitlines())) <= 80


@pytest.mark.parametrize("path", SHEETS, ids=lambda path: path.stem)
@pytest.mark.parametrize("limiter", ["60 W lamp", "470 ohm", "bench"])
def test_every_limiter_has_a_card_for_every_sheet(path, limiter):
    found = card(path, "--limiter", limiter)
    assert found["limiter"]["recommended"] is False
    for state in found["states"]:
        assert bool(state["readings"]) is not state["unverified"]
        assert state["needs"] or state["because"] or state["readings"]
        for one in state["readings"]:
            if one["expected"] is not None:
                ends = [one["expected"][end] for end in ("low", "nominal", "high")]
                assert ends == sorted(ends), one


@pytest.mark.parametrize("what", SPOILT)
@pytest.mark.parametrize("form", ["text", "markdown", "json"])
def test_after_cold_checks_that_do_not_clear_nobody_is_told_to_power(tmp_path, what, form):
    result = run("powerup", spoilt(tmp_path, what), "--format", form)
    assert result.exit_code == 0  # the card is the answer: it clears nothing, whatever its status
    text = " ".join(result.stdout.split()).replace("Do not power", "")
    assert "Do not power yet" in " ".join(result.stdout.split())
    assert (
        ON.findall(
            text.replace("first power-up", "").replace("FIRST POWER-UP", "").replace("First power-up", "")
        )
        == []
    )


def test_the_same_sheet_in_good_order_is_told_to_power_with_care():
    result = run("powerup", SPLIT_RAIL)
    assert result.exit_code == 0
    assert ON.search(result.stdout)
    assert "Do not power" not in result.stdout


def test_what_blocks_is_named_with_what_clears_it():
    text = " ".join(run("powerup", OLD_MAINS).stdout.split())
    assert "Do not power yet: first clear cold.devices, cold.insulation" in text
    assert "to settle it, give: readings.device_ohms" in text
    found = card(OLD_MAINS)
    assert found["verdict"] == "stop"
    assert found["steps"] == found["afterwards"] == []
    assert {one["id"] for one in found["cold_checks"]} >= {"cold.devices", "supply.reservoir_voltage"}


def test_the_parts_stand_in_their_order():
    text = run("powerup", SPLIT_RAIL).stdout
    heads = re.findall(r"(?m)^(\d) ", text)
    assert heads == ["0", "1", "2", "3", "4", "5", "6"]
    assert text.index("0 Before anything") < text.index("Mains:") < text.index("Stored charge")
    for words in ("one hand", "protects parts, not people", "variable transformer is no current limiter"):
        assert words in " ".join(text.split())


def test_switch_off_readings_are_those_of_the_limits(tmp_path):
    own = tmp_path / "own.toml"
    own.write_text(
        '[power_up.output]\ngo = "70 mV"\nstop = "0.7 V"\n[power_up.rails]\ngo = 0.04\nstop = 0.12\n',
        encoding="utf-8",
    )
    plain, changed = (
        {one["limit"]: one for one in card(SPLIT_RAIL, *words)["switch_off"]}
        for words in ((), ("--limits", own))
    )
    assert "more than 1 V DC" in plain["power_up.output"]["when"]
    assert "up to 100 mV is go" in plain["power_up.output"]["when"]
    assert "more than 700 mV DC" in changed["power_up.output"]["when"]
    assert "up to 70 mV is go" in changed["power_up.output"]["when"]
    assert "more than 12 %" in changed["power_up.rails"]["when"]
    assert changed["power_up.output"]["source"].startswith("changed by your limits file")
    text = " ".join(run("powerup", SPLIT_RAIL, "--limits", own).stdout.split())
    assert "within 70 mV" in text
    assert "-70 mV to 70 mV" in text
    assert "rails more than 4 % of their mean apart" in text


def test_a_limiter_of_the_command_stands_in_for_that_of_the_sheet():
    assert card(SPLIT_RAIL)["limiter"]["limiter"] == "60 W lamp"
    assert card(SPLIT_RAIL, "--limiter", "lamp 100 W")["limiter"]["limiter"] == "100 W lamp"
    assert card(SPLIT_RAIL, "--limiter", "470R")["limiter"] | {"why": 0, "choices": 0} == {
        "kind": "resistor", "limiter": "470 ohm resistor", "recommended": False, "why": 0, "choices": 0,
    }  # fmt: skip


@pytest.mark.parametrize("limiter", ["60", "60 V lamp", "", "60 W lamp ±5 %", "none"])
def test_a_limiter_that_is_none_is_a_wrong_word_of_the_option(limiter):
    result = run("powerup", SPLIT_RAIL, "--limiter", limiter)
    assert result.exit_code == 2
    assert result.stderr.startswith("safeamp: --limiter: ")
    assert result.stdout == ""


def test_what_is_wrong_in_the_sheet_is_said_of_the_sheet(tmp_path):
    broken = tmp_path / "amp.toml"
    broken.write_text(SPLIT_RAIL.read_text(encoding="utf-8").replace("no_load", "noload"), encoding="utf-8")
    for words in ((), ("--limiter", "60 W lamp"), ("--limiter", "60")):
        result = run("powerup", broken, *words)
        assert result.exit_code == 2
        assert result.stderr.startswith(f"{broken}: ")


def test_the_card_goes_into_a_file_but_never_into_the_sheet(tmp_path):
    output = tmp_path / "card.md"
    assert run("powerup", SPLIT_RAIL, "--format", "markdown", "--output", output).stdout == ""
    tokens = MarkdownIt().parse(output.read_text(encoding="utf-8"))
    heads = [tokens[place + 1].content for place, one in enumerate(tokens) if one.type == "heading_open"]
    assert heads[0] == "First power-up card"
    assert "4 When to switch off at once" in heads
    sheet = tmp_path / "amp.toml"
    sheet.write_text(SPLIT_RAIL.read_text(encoding="utf-8"), encoding="utf-8")
    assert run("powerup", sheet, "--output", sheet).exit_code == 2


def test_json_says_what_the_text_says():
    found, text = card(SPLIT_RAIL), " ".join(run("powerup", SPLIT_RAIL).stdout.split())
    assert set(found) == {
        "safeamp", "command", "title", "verdict", "of", "says", "cautions", "cold_checks", "limiter", "steps", "states",
        "switch_off", "patterns", "afterwards", "missing", "assumptions", "overridden", "remarks", "safety", "sheet",
    }  # fmt: skip
    assert found["command"] == "powerup"
    for part in ("cautions", "steps", "afterwards", "remarks"):
        assert found[part]
        assert all(one in text for one in found[part])
    for one in found["switch_off"]:
        assert one["when"] in text
    for one in found["patterns"]:
        assert one["seen"] in text
    readings = {one["what"]: one["expected"] for one in found["states"][0]["readings"]}
    assert readings["across the limiter"]["unit"] == "V"
    assert readings["from the mains"]["unit"] == "A"
    assert readings["lamp"] is None


@pytest.mark.parametrize("kind", STARTERS)
def test_a_starter_is_all_unverified(tmp_path, kind):
    path = tmp_path / "starter.toml"
    path.write_text(run("new", kind).stdout, encoding="utf-8")
    found = card(path)
    assert found["verdict"] == "unverified"
    assert all(one["unverified"] for one in found["states"])


def test_the_pencil_has_room_beside_what_is_read_and_nowhere_else():
    lines = run("powerup", SPLIT_RAIL).stdout.splitlines()
    blanks = [line for line in lines if "____" in line]
    assert len(blanks) == 10
    assert not any("heat" in line for line in blanks)


def test_the_command_imports_nothing_that_it_does_not_use():
    found = imported_by("powerup", SPLIT_RAIL)
    assert "safeamp.report.power_up" in found
    assert heavy(found) == set()


def test_the_lamp_is_named_with_its_voltage_and_kind():
    text = " ".join(run("powerup", SPLIT_RAIL).stdout.split())
    assert "put the 60 W lamp for 230 V in series with the live conductor" in text
    assert "an LED or energy-saving lamp limits nothing" in text
    resistor = " ".join(run("powerup", SPLIT_RAIL, "--limiter", "470 ohm").stdout.split())
    assert "put the 470 ohm resistor in series" in resistor


def test_the_volts_at_which_to_switch_off_are_those_that_no_healthy_one_reaches():
    found = card(SPLIT_RAIL)
    highs = [
        next(one["expected"]["high"] for one in state["readings"] if one["what"] == "across the limiter")
        for state in found["states"][:2]
    ]
    [said] = [one["when"] for one in found["switch_off"] if "across the limiter once" in one["when"]]
    assert [float(number) for number in re.findall(r"more than ([\d.]+) V", said)] == pytest.approx(
        highs, rel=5e-3
    )
