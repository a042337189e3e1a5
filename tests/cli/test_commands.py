"""The commands in one process; what needs a real one stands in test_processes.py."""

import json
from pathlib import Path

import pytest
from typer.testing import CliRunner, Result

from safeamp import __version__
from safeamp.amplifier import TABLES
from safeamp.cli.app import app
from safeamp.findings import Step
from safeamp.report.starter_values import STARTERS

HEALTHY = Path(__file__).parents[1] / "scenarios" / "healthy.toml"
OLD_MAINS = HEALTHY.with_name("old_mains.toml")


def run(*words: object) -> Result:
    result = CliRunner().invoke(app, [str(word) for word in words])
    assert result.exception is None or isinstance(result.exception, SystemExit), result.exception
    return result


def verdict_of(*words: object) -> str:
    return json.loads(run("check", *words, "--format", "json").stdout)["verdict"]


def test_a_stop_ends_with_five() -> None:
    result = run("check", OLD_MAINS)
    assert result.exit_code == 5
    assert "\nSTOP for " in result.stdout
    assert result.stdout.splitlines()[-1].startswith("First step not cleared: cold checks (stop)")


def test_steps_up_to_a_good_one_end_with_zero() -> None:
    result = run("check", HEALTHY, "--step", "cold-checks")
    assert result.exit_code == 0
    assert "\nGO for the steps up to cold checks and nothing after it" in result.stdout


@pytest.mark.parametrize(("word", "status"), [("go", 0), ("caution", 3), ("unverified", 4), ("stop", 5)])
def test_verdict_and_exit_status_belong_together(word: str, status: int) -> None:
    sheets = [path for path in HEALTHY.parent.glob("*.toml") if "expected" not in path.name]
    steps = [step.value for step in Step]
    seen = {
        run("check", sheet, "--step", step).exit_code
        for sheet in sheets
        for step in (steps[0], steps[-1])
        if verdict_of(sheet, "--step", step) == word
    }
    assert seen <= {status}
    assert seen or word == "caution"


@pytest.mark.parametrize("step", ["first-power-up", "first power-up", "First Power up", "FIRST POWER-UP"])
def test_steps_may_be_typed_with_hyphens_or_blanks(step: str) -> None:
    assert "the steps up to first power-up" in run("check", HEALTHY, "--step", step).stdout


def test_an_unknown_step_names_the_steps() -> None:
    result = run("check", HEALTHY, "--step", "cold-cheks")
    assert result.exit_code == 2
    assert (
        "--step cold-cheks is not a step; did you mean cold checks?; the steps are cold checks"
        in result.stderr
    )


def test_on_paper_clears_no_power() -> None:
    result = run("check", HEALTHY, "--on-paper")
    assert "on paper: clears no power" in " ".join(result.stdout.split())
    assert "  - offset.output" in result.stdout


def test_json_holds_nothing_but_json() -> None:
    report = json.loads(run("check", HEALTHY, "--format", "json").stdout)
    assert report["safeamp"] == __version__
    assert report["sheet"]["source"] == "healthy.toml"


def test_every_problem_of_a_sheet_stands_on_its_line(tmp_path: Path) -> None:
    text = HEALTHY.read_text(encoding="utf-8").replace('no_load = "22 V, measured"', "no_load = 22")
    sheet = tmp_path / "amp.toml"
    sheet.write_text(text.replace("nominal_impedance", "nominal_impedence"), encoding="utf-8")
    result = run("check", sheet)
    assert result.exit_code == 2
    assert result.stdout == ""
    lines = result.stderr.splitlines()
    assert lines[0] == f"{sheet}: {len(lines) - 1} problems"
    number = text.splitlines().index("no_load = 22") + 1
    assert any(line.startswith(f"  line {number}  supply.no_load: ") for line in lines)
    assert any("did you mean nominal_impedance" in line for line in lines)


@pytest.mark.parametrize("content", [None, b"", b"\x00\xff", b"= 3"])
def test_what_is_no_sheet_is_a_complaint(tmp_path: Path, content: bytes | None) -> None:
    sheet = tmp_path / "amp.toml"
    if content is not None:
        sheet.write_bytes(content)
    result = run("check", sheet)
    assert result.exit_code == 2
    assert result.stderr.startswith(f"{sheet}: ")
    assert result.stdout == ""


def test_a_limits_file_is_used_and_named(tmp_path: Path) -> None:
    own = tmp_path / "own.toml"
    own.write_text('[cold.devices]\ngo = "400 kohm"\n', encoding="utf-8")
    assert verdict_of(HEALTHY, "--step", "cold-checks", "--limits", own) == "caution"
    assert (
        "Limits changed by your own file\n  - cold.devices" in run("check", HEALTHY, "--limits", own).stdout
    )
    assert "changed by your own file" in run("limits", "--limits", own).stdout


@pytest.mark.parametrize("words", [("check", HEALTHY), ("limits",)])
def test_a_broken_limits_file_is_a_complaint(tmp_path: Path, words: tuple) -> None:
    own = tmp_path / "own.toml"
    own.write_text('[cold.devices]\ngo = "400 V"\n[cold.devises]\nstop = "1 ohm"\n', encoding="utf-8")
    result = run(*words, "--limits", own)
    assert result.exit_code == 2
    assert result.stderr.startswith(f"{own}: 2 problems\n  line ")


def test_devices_of_a_folder_are_found(tmp_path: Path) -> None:
    text = HEALTHY.read_text(encoding="utf-8")
    sheet, devices = text[: text.index("[device.driver]")], text[text.index("[device.driver]") :]
    (tmp_path / "amp.toml").write_text(sheet, encoding="utf-8")
    folder = tmp_path / "devices"
    folder.mkdir()
    (folder / "own.toml").write_text(devices, encoding="utf-8")
    assert run("check", tmp_path / "amp.toml").exit_code == 2
    assert verdict_of(tmp_path / "amp.toml", "--device-folder", folder) == verdict_of(HEALTHY)
    listed = run("devices", "--device-folder", folder).stdout
    assert "\nfitted\n    kind: bipolar\n    voltage: 160 V, data sheet\n" in listed
    assert "\nto3-npn-140v-150w\n" in listed


def test_a_device_folder_that_is_none_is_a_complaint(tmp_path: Path) -> None:
    result = run("devices", "--device-folder", tmp_path / "nowhere")
    assert result.exit_code == 2
    assert "is not a folder of device files" in result.stderr


def test_the_demo_ends_well_and_says_that_it_is_invented() -> None:
    result = run("demo")
    assert result.exit_code == 0
    assert "this amplifier is invented" in result.stdout.splitlines()[1]
    assert json.loads(run("demo", "--format", "json").stdout)["demo"] is True


def test_the_demo_is_an_amplifier_in_good_order() -> None:
    report = json.loads(run("demo", "--format", "json").stdout)
    assert {finding["id"] for finding in report["findings"] if finding["verdict"] != "go"} == set()
    assert report["verdict"] == "go"


@pytest.mark.parametrize("kind", STARTERS)
def test_a_starter_can_be_checked_and_clears_nothing(tmp_path: Path, kind: str) -> None:
    sheet = tmp_path / "amp.toml"
    assert run("new", kind, "--output", sheet).exit_code == 0
    assert run("new", kind).stdout == sheet.read_text(encoding="utf-8")
    report = json.loads(run("check", sheet, "--format", "json").stdout)
    assert report["verdict"] in ("unverified", "stop")
    assert report["steps"][0]["verdict"] in ("unverified", "stop")
    evidence = [
        finding["id"]
        for finding in report["findings"]
        if finding["verdict"] == "go" and any(entry["origin"] == "example" for entry in finding["inputs"])
    ]
    assert evidence == []


def test_a_starter_never_replaces_a_file(tmp_path: Path) -> None:
    sheet = tmp_path / "amp.toml"
    sheet.write_text("mine", encoding="utf-8")
    result = run("new", "mosfet", "--output", sheet)
    assert result.exit_code == 2
    assert "exists; a starter never replaces a file" in result.stderr
    assert sheet.read_text(encoding="utf-8") == "mine"


def test_the_help_of_new_names_every_kind() -> None:
    text = " ".join(run("new", "--help").stdout.split())
    assert all(kind in text for kind in STARTERS)


def test_unknown_kinds_and_tables_are_refused() -> None:
    assert "mosfit is not a kind of starter; did you mean mosfet" in run("new", "mosfit").stderr
    assert run("new", "mosfit").exit_code == 2
    assert "suply is not a table of the sheet; did you mean supply" in run("keys", "suply").stderr
    assert run("keys", "suply").exit_code == 2


def test_lists() -> None:
    everything = run("keys").stdout
    assert all(f"[{table}" in everything for table in TABLES)
    assert "[supply]" not in run("keys", "mains").stdout
    assert "offset.output" in run("limits").stdout
    assert "to3-npn-140v-150w" in run("devices").stdout
    assert run("--version").stdout == f"safeamp {__version__}\n"


@pytest.mark.parametrize(
    "words", [("check",), ("chek", "a"), ("check", "a", "--format", "yaml"), ("check", "a", "--x")]
)
def test_wrong_usage_ends_with_two(words: tuple) -> None:
    result = run(*words)
    assert result.exit_code == 2
    assert result.stdout == ""
    assert "Traceback" not in result.stderr
