"""Figures into a folder: whole or not at all, never over what is read, and only when asked for."""

import os
import re
from pathlib import Path

import pytest
import typer

from safeamp.cli import figures
from tests.cli.test_commands import HEALTHY, run
from tests.cli.test_processes import process

SPLIT = HEALTHY.with_name("split_rail.toml")
DRAWN = {"overview", "safe-area", "temperatures", "heat"}


@pytest.fixture(scope="module")
def drawn(tmp_path_factory):
    folder = tmp_path_factory.mktemp("report") / "figures"
    return run("check", SPLIT, "--figures", folder, "--format", "json"), folder


def test_every_figure_is_a_file_and_the_report_is_as_ever(drawn):
    done, folder = drawn
    assert {path.name for path in folder.iterdir()} == {f"{name}.svg" for name in DRAWN}
    assert all(path.read_bytes().startswith(b"<?xml") for path in folder.iterdir())
    plain = run("check", SPLIT, "--format", "json")
    assert (done.stdout, done.exit_code) == (plain.stdout, plain.exit_code)


def test_what_is_left_out_is_said_beside_the_result(drawn):
    said = drawn[0].stderr.splitlines()
    assert (
        'safeamp: figure low-notes is left out: stage.coupling = "direct": there is no output capacitor'
        in said
    )
    left_out = {re.match(r"safeamp: figure ([\w-]+) is left out: ", line)[1] for line in said}
    assert left_out == {"low-notes", "coil", "impedance", "cone-travel"}


def test_figures_of_the_demo_as_png(tmp_path):
    done = run("demo", "--figures", tmp_path, "--figures-format", "png")
    assert done.exit_code == 0
    assert {path.name for path in tmp_path.iterdir()} == {f"{name}.png" for name in {*DRAWN, "coil"}}
    assert all(path.read_bytes().startswith(b"\x89PNG") for path in tmp_path.iterdir())


def test_an_older_figure_that_is_no_longer_drawn_is_named(tmp_path):
    (tmp_path / "coil.svg").write_text("old")
    done = run("check", SPLIT, "--figures", tmp_path)
    [line] = [line for line in done.stderr.splitlines() if "figure coil" in line]
    assert line.endswith(f"; {tmp_path / 'coil.svg'} is an older one")
    assert (tmp_path / "coil.svg").read_text() == "old"


def test_the_safe_area_without_a_sheet(tmp_path):
    line = ["soa", "--split-rail", "34 V", "--load", "8 ohm", "--case-temperature", "60 degC"]
    device = run("devices").stdout.split()
    name = next(word for word in device if run(*line, "--device", word).exit_code != 2)
    done = run(*line, "--device", name, "--figures", tmp_path)
    assert done.stdout == run(*line, "--device", name).stdout
    assert [path.name for path in tmp_path.iterdir()] == ["safe-area.svg"]
    use = re.search(r"use +(\d+\.\d+)", done.stdout)[1]
    judged = re.search(r"Worst point: (\d+)% used", (tmp_path / "safe-area.svg").read_text(encoding="utf-8"))[
        1
    ]
    assert int(judged) >= round(100 * float(use)) - 1


def test_histograms_of_the_samples(tmp_path):
    done = run("tolerance", SPLIT, "--samples", "200", "--figures", tmp_path)
    assert done.exit_code == 0
    names = {path.name for path in tmp_path.iterdir()}
    assert {"tolerance-soa-loudspeaker.svg", "tolerance-heat-heatsink.svg"} <= names
    assert "figure tolerance-bias-idle is left out: it has the same value" in done.stderr
    assert "stop above 100 %<" in (tmp_path / "tolerance-soa-loudspeaker.svg").read_text(encoding="utf-8")


def refused(done, words):
    assert (done.exit_code, done.stdout) == (2, "")
    [line] = done.stderr.splitlines()
    assert words in line


def test_a_sheet_is_never_drawn_over(tmp_path):
    sheet = tmp_path / "overview.svg"
    sheet.write_bytes(SPLIT.read_bytes())
    refused(run("check", sheet, "--figures", tmp_path), "overview.svg is a file that is read")
    assert [path.name for path in tmp_path.iterdir()] == ["overview.svg"]
    assert sheet.read_bytes() == SPLIT.read_bytes()


def test_places_that_cannot_hold_figures_are_refused(tmp_path):
    (tmp_path / "file").write_text("")
    (tmp_path / "heat.svg").mkdir()
    refused(run("check", SPLIT, "--figures", tmp_path / "file"), "is not a folder")
    refused(
        run("check", SPLIT, "--figures", tmp_path / "no" / "such"),
        f"there is no folder {tmp_path / 'no'}",
    )
    refused(run("check", SPLIT, "--figures", tmp_path), "heat.svg is not a file")
    assert {path.name for path in tmp_path.iterdir()} == {"file", "heat.svg"}


@pytest.mark.parametrize("name", ["pictures", "pictures/overview.svg", "pictures/report.png"])
def test_a_result_never_takes_the_place_of_a_figure(tmp_path, name):
    folder, target = tmp_path / "pictures", tmp_path / name
    if target != folder:
        folder.mkdir()
    refused(run("check", SPLIT, "--figures", folder, "--output", target), "would take the place of a figure")
    assert [path.name for path in tmp_path.rglob("*")] == (["pictures"] if target != folder else [])
    assert run("check", SPLIT, "--figures", folder, "--output", folder.parent / "report.txt").exit_code == 3


def test_what_cannot_be_written_leaves_nothing_behind(tmp_path, monkeypatch, capsys):
    def broken(self, target):
        raise OSError(28, os.strerror(28))

    monkeypatch.setattr(Path, "replace", broken)
    with pytest.raises(typer.Exit) as ended:
        figures._write({"a.svg": b"a", "b.svg": b"b"}, tmp_path / "figures")
    assert ended.value.exit_code == 2
    assert capsys.readouterr().err == f"safeamp: --figures {tmp_path / 'figures'}: {os.strerror(28)}\n"
    assert list(tmp_path.iterdir()) == []
    with pytest.raises(typer.Exit):
        figures._write({"a.svg": b"a"}, tmp_path)
    assert list(tmp_path.iterdir()) == []  # and a folder that was there stays


def test_without_figures_no_figure_room_is_imported():
    code = "import sys\nfrom safeamp.cli import main\ntry: main()\nexcept SystemExit: print(*sys.modules)"
    found = process("check", HEALTHY, "--step", "cold-checks", code=code).stdout.split()
    assert "safeamp.report.text" in found
    assert not {"matplotlib", "safeamp.figures"} & set(found)


@pytest.mark.parametrize(
    ("words", "shown"),
    [
        (["--capacitance", "2200 uF", "--load", "8 ohm"], ["into 8 ohm: 9.04 Hz", "low end): 11.3 Hz"]),
        (["--cutoff", "20 Hz", "--load", "6.4 ohm"], ["2200 µF into 6.4 ohm: 11.3 Hz", "Target: 20 Hz"]),
        (["--cutoff", "20 Hz", "--capacitance", "1000 uF ±20 %"], ["into 7.96 ohm: 20 Hz", "Target: 20 Hz"]),
    ],
)
def test_low_notes_without_a_sheet(tmp_path, words, shown):
    done = run("capacitor", *words, "--figures", tmp_path)
    assert done.stdout == run("capacitor", *words).stdout
    assert [path.name for path in tmp_path.iterdir()] == ["low-notes.svg"]
    text = (tmp_path / "low-notes.svg").read_text(encoding="utf-8")
    assert [one for one in shown if one not in text] == []


def test_a_rating_alone_has_no_figure_and_says_so(tmp_path):
    done = run("capacitor", "--single-rail", "60 V", "--figures", tmp_path)
    assert done.exit_code == run("capacitor", "--single-rail", "60 V").exit_code
    assert "no figure: neither a cutoff nor a capacitance was asked for" in done.stderr
    assert list(tmp_path.iterdir()) == []
