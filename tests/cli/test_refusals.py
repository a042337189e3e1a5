"""Every refusal of a sheet as a user meets it: status 2, no report, no traceback, the line and what to write."""

from pathlib import Path

import pytest
from typer.testing import CliRunner

from safeamp.cli.app import app
from safeamp.quantities import ENERGY
from tests.quantities.test_read_refused import OTHERS, VOLTS
from tests.reading.desk import change, scenario, toml
from tests.reading.test_questions import BOUNDARIES
from tests.reading.test_refusals import CURVES, KEYS_AND_WORDS, MISSING, NUMBERS

UNCOVERED = [
    ({"stage.arrangement": word}, f"stage.arrangement: {reason}")
    for word, reason in (
        ("single-ended", "single-ended stages are not covered"),
        ("output transformer", "stages with an output transformer are not covered"),
        ("class G", "class G is not covered"),
        ("class H", "class H is not covered"),
        ("class D", "class D is not covered"),
    )
]
#: What no amplifier has: zero or less, beyond all belief, or a tolerance that gets there.
IMPOSSIBLE = [
    ({"stage.pairs": 0}, "stage.pairs: 0 is not above zero; write a whole number above zero"),
    ({"stage.pairs": -1}, "stage.pairs: -1 is not above zero; write a whole number above zero"),
    ({"stage.pairs": True}, "stage.pairs: true is not a whole number"),
    ({"stage.pairs": 1e9}, "stage.pairs: 1000000000 is not believable here (1 to 50); write a whole number"),
    ({"heatsink.shared_by": 0}, "heatsink.shared_by: 0 is not above zero"),
    ({"loudspeaker.parallel": -2}, "loudspeaker.parallel: -2 is not above zero"),
    ({"supply.no_load": "0 V"}, 'supply.no_load: "0 V" is not above zero'),
    ({"supply.no_load": "1e9 V"}, 'supply.no_load: "1e9 V" is not believable here (1 V to 300 V)'),
    ({"supply.no_load": "20 V ±20 V"}, 'supply.no_load: "20 V ±20 V" reaches down to 0 V'),
    ({"supply.no_load": "35 V ±35 V"}, 'supply.no_load: "35 V ±35 V" reaches down to 0 V, which is not above zero'),
    ({"supply.no_load": "35 V ±200 %"}, 'supply.no_load: "35 V ±200 %" reaches down to -35 V'),
    ({"mains.actual": "0 V"}, 'mains.actual: "0 V" is not above zero'),
    ({"mains.actual": "-230 V"}, 'mains.actual: "-230 V" is not above zero'),
    ({"heatsink.sink_to_air": "0 K/W"}, 'heatsink.sink_to_air: "0 K/W" is not above zero'),
    ({"heatsink.case_to_sink": "-1 K/W"}, 'heatsink.case_to_sink: "-1 K/W" is not above zero'),
    ({"loudspeaker.nominal_impedance": "0 ohm"}, 'loudspeaker.nominal_impedance: "0 ohm" is not above zero'),
    ({"loudspeaker.nominal_impedance": "8 ohm ±100 %"}, '"8 ohm ±100 %" reaches down to 0 ohm'),
    ({"stage.idle": "-14 mV"}, 'stage.idle: "-14 mV" is not above zero'),
    ({"device.fitted.power": "-150 W"}, 'device.fitted.power: "-150 W" is not above zero'),
    ({"loudspeaker.phase_angle": "95 deg"}, 'loudspeaker.phase_angle: "95 deg" reaches 95 deg'),
]  # fmt: skip
#: Each row of the grammar at one key of its kind.
PLACES = {
    "capacitance": ("output_capacitor.capacitance", "single_rail"),
    "resistance": ("loudspeaker.nominal_impedance", "healthy"),
    "temperature": ("heatsink.air", "healthy"),
    "angle": ("loudspeaker.phase_angle", "healthy"),
    "level": ("loudspeaker.crest_factor", "healthy"),
    "percentage": ("stage.bias_tracking", "healthy"),
    "ratio": ("loudspeaker.q_mechanical", "healthy"),
    "current": ("output_capacitor.ripple_current", "single_rail"),
    "time": ("protection.trip_delay", "healthy"),
    "force factor": ("loudspeaker.force_factor", "healthy"),
}
#: An energy is never written.
TEXTS = [row for row in OTHERS if isinstance(row, tuple) and isinstance(row[0], str) and row[1] != ENERGY]


def refused(folder: Path, changes: dict, base: str = "healthy") -> str:
    file = folder / "amp.toml"
    file.write_text(toml(change(scenario(base), changes)), encoding="utf-8")
    result = CliRunner().invoke(app, ["check", str(file)])
    assert result.exception is None or isinstance(result.exception, SystemExit), result.exception
    assert (result.exit_code, result.stdout) == (2, "")
    head, *lines = result.stderr.splitlines()
    assert head == f"{file}: {len(lines)} problem{'s' if len(lines) > 1 else ''}"
    return result.stderr


@pytest.mark.parametrize(
    ("changes", "words"), [*KEYS_AND_WORDS, *NUMBERS, *CURVES, *MISSING, *UNCOVERED, *IMPOSSIBLE]
)
def test_a_refused_sheet(tmp_path: Path, changes: dict, words: str) -> None:
    assert words in refused(tmp_path, changes)


@pytest.mark.parametrize(("base", "inside", "outside", "words"), BOUNDARIES)
def test_a_question(tmp_path: Path, base: str, inside: dict, outside: dict, words: str) -> None:
    assert words in refused(tmp_path, outside, base)


@pytest.mark.parametrize(("text", "words"), VOLTS)
def test_a_voltage_that_is_not_read(tmp_path: Path, text: str, words: str) -> None:
    if text == "none":
        words = '"none" is meaningless here'
    assert f"supply.full_load: {words}" in said(refused(tmp_path, {"supply.full_load": text}), words)


@pytest.mark.parametrize(("text", "kind", "words"), TEXTS)
def test_a_value_of_another_kind(tmp_path: Path, text: str, kind, words: str) -> None:
    key, base = PLACES[kind.name]
    assert words in refused(tmp_path, {key: text}, base)


def said(stderr: str, words: str) -> str:
    """Return the message with what stands between key and words left out."""
    at = stderr.find(words)
    key = "supply.full_load: "
    start = stderr.find(key)
    return key + stderr[at:] if 0 <= start < at else stderr


@pytest.mark.parametrize(
    ("content", "line", "words"),
    [
        (b"", None, "is empty; write at least a title and the tables"),
        (b"\0\1\2", None, "is not a text but binary data"),
        (b"\x89PNG\r\n\x1a\n", None, "is not a UTF-8 text"),
        (b'title = "x"\n[supply]\nno_load = 35 V\n', 3, 'write the value in quotes: no_load = "35 V"'),
        (b'title = "x"\n[supply\n', 2, "is not valid TOML here"),
        (b'title = "x"\nnotes = [1,\n\n', 2, "is not valid TOML here (Invalid value, at the end of the file)"),
        (b'title = "x"\nnotes', 2, "at the end of the file"),
    ],
)  # fmt: skip
def test_a_file_that_is_no_sheet(tmp_path: Path, content: bytes, line: int | None, words: str) -> None:
    file = tmp_path / "amp.toml"
    file.write_bytes(content)
    result = CliRunner().invoke(app, ["check", str(file)])
    assert (result.exit_code, result.stdout) == (2, "")
    place = f"line {line}  " if line else ""
    assert result.stderr.startswith(f"{file}: 1 problem\n  {place}")
    assert words in result.stderr


@pytest.mark.parametrize(
    ("name", "words"), [("", "is a folder; give a file"), ("no.toml", "cannot be read: No such")]
)
def test_what_is_no_file(tmp_path: Path, name: str, words: str) -> None:
    result = CliRunner().invoke(app, ["check", str(tmp_path / name)])
    assert (result.exit_code, result.stdout) == (2, "")
    assert words in result.stderr
