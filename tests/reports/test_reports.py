"""Whole reports, word by word: what changes one is seen; `python -m tests.reports` writes them anew."""

import re

import pytest

from safeamp.checks import CHECKS
from tests.reports.recorded import HERE, SHEETS, printed, recording


@pytest.mark.parametrize("name", SHEETS)
def test_the_report_is_the_one_that_was_read_and_found_right(name):
    assert printed(name) == recording(name).read_text(encoding="utf-8")


def test_every_recording_has_its_sheet():
    assert {path.stem for path in HERE.glob("*.txt")} == set(SHEETS)
    assert {path.stem for path in HERE.glob("*.toml")} <= set(SHEETS)


def test_the_sheets_together_show_every_finding():
    text = "".join(recording(name).read_text(encoding="utf-8") for name in SHEETS)
    shown = set(re.findall(r"^  (?:go|caution|unverified|stop) +([a-z_]+\.[a-z_]+):", text, re.MULTILINE))
    assert shown == set(CHECKS)


WORDS = {
    "single_rail": ("capacitor.cutoff", "offset.midpoint: 5 %", "behind the output capacitor"),
    "bridged": ("mind: bridged: neither loudspeaker terminal may touch chassis or 0 V", "50.4 V"),
    "three_pairs": ("3 devices a side",),
    "vertical_mosfet": ("runs away",),
    "headphones": ("into 77 ohm", "a resistor of 79 ohm"),
    "class_a": ("1.3 A of each device",),
    "bench_mockup": ("150 ohm resistor",),
}


@pytest.mark.parametrize(("name", "words"), WORDS.items())
def test_a_report_says_what_its_stage_is_known_by(name, words):
    text = " ".join(recording(name).read_text(encoding="utf-8").split())
    assert [word for word in words if word not in text] == []


def test_a_changed_value_changes_the_report(monkeypatch, tmp_path):
    other = tmp_path / "class_a.toml"
    text = SHEETS["class_a"].read_text(encoding="utf-8")
    other.write_text(text.replace('sink_to_air = "0.32 K/W', 'sink_to_air = "0.33 K/W'), encoding="utf-8")
    monkeypatch.setitem(SHEETS, "class_a", other)
    assert printed("class_a") != recording("class_a").read_text(encoding="utf-8")


def test_both_losses_of_the_quasi_complementary_stage_count():
    text = SHEETS["quasi_complementary"].read_text(encoding="utf-8")
    assert 'arrangement = "quasi-complementary"' in text
    assert re.search(r'swing_loss_up = "3 V.*\n.*swing_loss_down = "2 V', text)
