import tomllib
from pathlib import Path

import pytest

from safeamp.reading.limits import load_limits
from safeamp.report.devices import render_devices
from safeamp.report.limits_ import render_limits

DEVICES = Path(__file__).parents[2] / "limits" / "devices"


@pytest.fixture(scope="module")
def limits():
    return load_limits()


def entry(text: str, name: str) -> str:
    block = next(block for block in text.split("\n\n") if block.startswith(f"{name}\n"))
    return " ".join(block.split())


def test_every_limit_stands_with_source_evidence_and_sentence(limits) -> None:
    text = render_limits(limits)
    for limit in limits.entries.values():
        found = entry(text, limit.id)
        assert limit.says in found
        assert f"source: {limit.source} (evidence: {limit.evidence})" in found
        assert f"when not given: {limit.not_given or 'unverified'}" in found
    for default in limits.defaults.values():
        assert default.says in entry(text, default.id)
    for name in limits.interfaces:
        assert f"  {name}: " in text
    assert max(map(len, text.splitlines())) <= 80


@pytest.mark.parametrize(
    ("name", "levels"),
    [
        ("offset.output", "go at most 50 mV; stop above 100 mV"),
        ("cold.devices", "go at least 1 kohm; stop below 100 ohm"),
        ("supply.mains", "go between 0.9 and 1.05; stop above 1.15"),
        ("touch.rails", "go at most 60 V; stop none by this number"),
        ("heat.junction", "go no fixed level; stop none by this number"),
    ],
)
def test_levels_in_words(limits, name: str, levels: str) -> None:
    assert levels in entry(render_limits(limits), name)


def test_a_changed_limit_says_so(tmp_path: Path) -> None:
    own = tmp_path / "own.toml"
    own.write_text('[offset.output]\ngo = "30 mV"\n', encoding="utf-8")
    text = render_limits(load_limits(own))
    assert "changed by your own file go at most 30 mV" in entry(text, "offset.output")
    assert text.count("changed by your own file") == 1


def test_every_device_stands_with_its_ratings() -> None:
    data = {}
    for path in sorted(DEVICES.glob("*.toml")):
        data |= tomllib.loads(path.read_text(encoding="utf-8"))["device"]
    text = render_devices(data)
    assert len(data) >= 8
    for name, ratings in data.items():
        found = entry(text, name)
        for key in ratings:
            assert f" {key.replace('_', ' ')}: " in found
    assert "safe area: 50 V 3.0 A; 80 V 1.3 A; 140 V 0.35 A" in entry(text, "to3-npn-140v-150w")
    assert max(map(len, text.splitlines())) <= 80
