"""Where a result goes: whole into a file or not at all, never over what is read."""

import io
import os
from pathlib import Path

import pytest
import typer

from safeamp.cli import output
from safeamp.cli.files import FilesRead
from safeamp.complaints import Complaint
from tests.cli.test_commands import HEALTHY, run

COMPLAINTS = (
    Complaint("amp.toml", 7, "supply.no_load", "35 has no unit"),
    Complaint("amp.toml", 112, "loudspeaker.x", "not a known key"),
    Complaint("own.toml", None, "", "is empty"),
)


def test_complaints_stand_file_by_file_with_line_and_key() -> None:
    assert output.complaints_text(COMPLAINTS).splitlines() == [
        "amp.toml: 2 problems",
        "  line 7   supply.no_load: 35 has no unit",
        "  line 112 loudspeaker.x: not a known key",
        "own.toml: 1 problem",
        "  is empty",
    ]


@pytest.fixture
def sheet(tmp_path: Path) -> Path:
    path = tmp_path / "amp.toml"
    path.write_bytes(HEALTHY.read_bytes())
    return path


def test_a_report_is_written_as_it_would_be_printed(sheet: Path) -> None:
    target = sheet.with_name("report.txt")
    target.write_text("old", encoding="utf-8")
    result = run("check", sheet, "--output", target)
    assert result.stdout == ""
    assert result.exit_code == run("check", sheet).exit_code
    assert target.read_text(encoding="utf-8") == run("check", sheet).stdout
    assert sorted(path.name for path in sheet.parent.iterdir()) == ["amp.toml", "report.txt"]


@pytest.mark.parametrize("way", ["itself", "link", "hard link", "detour", "limits", "device"])
def test_a_file_that_is_read_is_never_written_over(sheet: Path, way: str) -> None:
    before = sheet.read_bytes()
    target, more = sheet, ()
    if way == "link":
        target = sheet.with_name("link.toml")
        target.symlink_to(sheet)
    elif way == "hard link":
        target = sheet.with_name("hard.toml")
        os.link(sheet, target)
    elif way == "detour":
        target = sheet.parent / "." / ".." / sheet.parent.name / "amp.toml"
    elif way == "limits":
        target = sheet.with_name("own.toml")
        target.write_text('[cold.devices]\ngo = "2 kohm"\n', encoding="utf-8")
        more = ("--limits", target)
    elif way == "device":
        target = sheet.with_name("device.toml")
        target.write_text("", encoding="utf-8")
        more = ("--device-folder", target.parent)
    result = run("check", sheet, "--output", target, *more)
    assert result.exit_code == 2
    assert f"--output {target} is a file that is read" in result.stderr
    assert sheet.read_bytes() == before


CURVE = "frequency [Hz], impedance [ohm], phase [deg]\n" + "".join(
    f"{hertz}, {8 + hertz / 1000}, 10\n" for hertz in (20, 50, 100, 200, 500, 1000, 2000, 20000)
)


@pytest.mark.parametrize(
    "words",
    [
        ("check", "SHEET"),
        ("check", "SHEET", "--format", "csv"),
        ("jobsheet", "SHEET"),
        ("solve", "SHEET", "heatsink.air"),
        ("tolerance", "SHEET", "--samples", "100"),
        ("substitute", "SHEET", "to3-npn-140v-150w"),
        ("overview", "FOLDER"),
    ],
    ids=" ".join,
)
def test_a_measured_curve_that_a_sheet_names_is_never_written_over(
    sheet: Path, words: tuple[str, ...]
) -> None:
    curve = sheet.with_name("two way.csv")
    curve.write_text(CURVE, encoding="utf-8")
    text = sheet.read_text(encoding="utf-8")
    sheet.write_text(text.replace("[loudspeaker]", f'[loudspeaker]\nimpedance_curve = "{curve.name}"'))
    named = {"SHEET": sheet, "FOLDER": sheet.parent}
    call = [named.get(word, word) for word in words]
    assert "two way.csv" in run("check", sheet, "--format", "json").stdout
    result = run(*call, "--output", curve)
    assert result.exit_code == 2
    assert f"--output {curve} is a file that is read" in result.stderr
    assert curve.read_text(encoding="utf-8") == CURVE


def test_what_a_broken_sheet_names_is_its_own_trouble(tmp_path: Path) -> None:
    broken, odd = tmp_path / "broken.toml", tmp_path / "odd.toml"
    broken.write_text("[[[", encoding="utf-8")
    odd.write_text(f'a = ["{"x" * 5000}", "\\u0000", "", 3, {{b = "odd.toml"}}]', encoding="utf-8")
    assert list(FilesRead(broken)) == [broken]
    assert list(FilesRead(odd, limits=broken)) == [odd, odd, broken]
    assert list(FilesRead(tmp_path / "none.toml")) == [tmp_path / "none.toml"]


def test_only_files_are_written_into(sheet: Path) -> None:
    result = run("check", sheet, "--output", sheet.parent)
    assert result.exit_code == 2
    assert f"--output {sheet.parent} is not a file" in result.stderr
    assert "there is no folder" in run("check", sheet, "--output", sheet.parent / "no" / "r.txt").stderr
    assert Path(os.devnull).is_char_device()
    assert "is not a file" in run("check", sheet, "--output", os.devnull).stderr
    assert Path(os.devnull).is_char_device()


def test_what_cannot_be_written_whole_is_not_written(sheet: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    target = sheet.with_name("report.txt")
    target.write_text("old", encoding="utf-8")

    def full(path: Path, target: Path) -> Path:
        raise OSError(28, "No space left on device")

    monkeypatch.setattr(Path, "replace", full)
    result = run("check", sheet, "--output", target)
    assert result.exit_code == 2
    assert "No space left on device" in result.stderr
    assert target.read_text(encoding="utf-8") == "old"
    assert not list(sheet.parent.glob(".*"))


def test_a_stdout_that_takes_nothing_is_said(
    monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture
) -> None:
    class Full(io.StringIO):
        def flush(self) -> None:
            raise OSError(28, "No space left on device")

    monkeypatch.setattr("sys.stdout", Full())
    with pytest.raises(typer.Exit) as ended:
        output.emit("text")
    assert ended.value.exit_code == 2
    assert "could not be written: No space left on device" in capsys.readouterr().err


class Terminal(io.StringIO):
    def isatty(self) -> bool:
        return True


@pytest.mark.parametrize(
    ("environment", "colourful"),
    [({}, True), ({"NO_COLOR": "1"}, False), ({"NO_COLOR": ""}, True), ({"TERM": "dumb"}, False)],
)
def test_colour_only_where_it_is_wanted(
    monkeypatch: pytest.MonkeyPatch, environment: dict[str, str], colourful: bool
) -> None:
    monkeypatch.delenv("NO_COLOR", raising=False)
    monkeypatch.setenv("TERM", "xterm")
    for name, value in environment.items():
        monkeypatch.setenv(name, value)
    monkeypatch.setattr("sys.stdout", Terminal())
    assert output.colourful() is colourful
    monkeypatch.setattr("sys.stdout", io.StringIO())
    assert output.colourful() is False


@pytest.mark.parametrize(("wide", "found"), [("40", 80), ("90", 90), ("200", 100)])
def test_width_follows_the_terminal_within_bounds(
    monkeypatch: pytest.MonkeyPatch, wide: str, found: int
) -> None:
    monkeypatch.setenv("COLUMNS", wide)
    monkeypatch.setattr("sys.stdout", Terminal())
    assert output.columns() == found
    monkeypatch.setattr("sys.stdout", io.StringIO())
    assert output.columns() == 80


@pytest.mark.parametrize(
    ("text", "found"), [("2200 µF", "2200 uF"), ("8 Ω ±5 °C", "8 ohm +/-5 degC"), ("☃", "\\u2603")]
)
def test_letters_that_a_terminal_lacks_are_spelt_out(
    monkeypatch: pytest.MonkeyPatch, text: str, found: str
) -> None:
    raw = io.BytesIO()
    monkeypatch.setattr("sys.stdout", io.TextIOWrapper(raw, encoding="ascii"))
    output.prepare_streams()
    output.emit(text)
    assert raw.getvalue() == found.encode("ascii")


def test_only_letters_that_cannot_be_written_are_spelt_out() -> None:
    trouble = UnicodeDecodeError("ascii", b"\xff", 0, 1, "no letter")
    with pytest.raises(UnicodeDecodeError):
        output._spell_out(trouble)
