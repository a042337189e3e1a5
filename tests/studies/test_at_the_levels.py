"""Each computed finding at its levels, just below and just above, by limits that are moved to where it stands."""

from dataclasses import replace

import numpy as np
import pytest

from safeamp.amplifier import value_at, with_values
from safeamp.checks import CHECKS
from safeamp.findings import Verdict
from safeamp.studies.verdict import verdict
from tests.scenarios.sheets import GONE, finding, limits, report, sheet

GO, CAUTION, UNVERIFIED, STOP = Verdict.GO, Verdict.CAUTION, Verdict.UNVERIFIED, Verdict.STOP
LIMITER = {"protection.vi_limiter": [["0 V", "4 A"], ["50 V", "0.6 A"]]}
TRANSFORMER = {"supply.transformer_power": "120 W"}
RIPPLE = {"output_capacitor.ripple_current": "3 A, data sheet"}
#: Finding that more is worse for -> sheet and changes with which it is go.
MORE_IS_WORSE = {
    "bias.runaway": ("healthy", {}),
    "heat.heatsink": ("healthy", {}),
    "soa.resistive_load": ("healthy", {}),
    "soa.loudspeaker": ("healthy", {}),
    "loudspeaker.power": ("healthy", {}),
    "protection.short": ("healthy", LIMITER),
    "supply.transformer": ("healthy", TRANSFORMER),
    "supply.rail_to_rail": ("healthy", {"supply.no_load": "22 V ±2 %, measured"}),
    "capacitor.ripple": ("30w_single_rail_to3", RIPPLE),
    "touch.temperature": ("healthy", {}),
}
OFF = 1e-6


def judged(identity, name, changes, **levels):
    """Return a finding under a limit whose levels are moved."""
    shipped = limits()
    entry = replace(shipped[identity], **levels)
    moved = replace(shipped, entries=dict(shipped.entries) | {identity: entry})
    return finding(verdict(sheet(name, changes), moved), identity)


@pytest.mark.parametrize("identity", MORE_IS_WORSE)
def test_at_the_go_level_just_below_and_just_above(identity):
    name, changes = MORE_IS_WORSE[identity]
    one = finding(report(name, changes), identity)
    assert one.verdict is GO
    # a finding that must hold everywhere is go only where its worst corner is
    value = one.worst if identity == "protection.short" else one.nominal
    assert judged(identity, name, changes, go=value).verdict is GO
    assert judged(identity, name, changes, go=value * (1.0 + OFF)).verdict is GO
    assert judged(identity, name, changes, go=value * (1.0 - OFF)).verdict is CAUTION


@pytest.mark.parametrize("identity", MORE_IS_WORSE)
def test_at_the_stop_level_just_below_and_just_above(identity):
    name, changes = MORE_IS_WORSE[identity]
    value = finding(report(name, changes), identity).nominal
    at = {"go": value * 0.5}
    assert judged(identity, name, changes, **at, stop=value).verdict is not STOP
    assert judged(identity, name, changes, **at, stop=value * (1.0 + OFF)).verdict is not STOP
    assert judged(identity, name, changes, **at, stop=value * (1.0 - OFF)).verdict is STOP


@pytest.mark.parametrize("identity", MORE_IS_WORSE)
def test_a_corner_beyond_the_stop_level_takes_the_go_away(identity):
    name, changes = MORE_IS_WORSE[identity]
    one = finding(report(name, changes), identity)
    if not one.worst > one.nominal * (1.0 + 1e-3):
        pytest.fail(f"{identity} has no worse corner on this sheet")
    between = (one.nominal + one.worst) / 2.0
    found = judged(identity, name, changes, go=between, stop=between)
    assert found.verdict in (CAUTION, UNVERIFIED)  # unverified where only an assumption leads there
    assert found.worst == pytest.approx(one.worst)
    assert found.worst_case
    assert judged(identity, name, changes, go=between, stop=one.worst * (1.0 + OFF)).verdict <= CAUTION


SETTLED = "bias.runaway.settled"


def settled_under(**levels):
    shipped = limits()
    entry = replace(shipped[SETTLED], **levels)
    moved = replace(shipped, entries=dict(shipped.entries) | {SETTLED: entry})
    return finding(verdict(sheet("healthy"), moved), "bias.runaway")


def test_settled_over_set_idle_has_levels_of_its_own():
    one = finding(report("healthy"), "bias.runaway")
    most = max(also.value for also in one.also if also.at.startswith("settled over set idle"))
    assert 1.0 < most < 2.0
    high = 10.0 * most
    assert settled_under(go=most * (1.0 + OFF), stop=high).verdict is GO
    assert settled_under(go=most * (1.0 - OFF), stop=high).verdict is CAUTION
    assert settled_under(go=most / 2.0, stop=most * (1.0 + OFF)).verdict is not STOP
    assert settled_under(go=most / 2.0, stop=most * (1.0 - OFF)).verdict is STOP


NO_IDLE = {"stage.idle": GONE, "readings.idle_upper": GONE, "readings.idle_lower": GONE}
#: Finding, sheet, what is taken away, the key that must be named.
TAKEN = [
    ("bias.runaway", "mosfet_substitute", {"device.fitted.transconductance_parameter": GONE},
     "device.fitted.transconductance_parameter"),
    ("bias.runaway", "mosfet_substitute", {"device.fitted.temperature_coefficient": GONE},
     "device.fitted.temperature_coefficient"),
    ("bias.runaway", "healthy", {"heatsink.sink_to_air": GONE}, "heatsink.sink_to_air"),
    ("bias.runaway", "healthy", NO_IDLE, "stage.idle"),
    ("protection.short", "healthy", {**LIMITER, "heatsink.sink_to_air": GONE}, "heatsink.sink_to_air"),
]  # fmt: skip


@pytest.mark.parametrize(("identity", "name", "changes", "key"), TAKEN)
def test_what_lacks_an_input_is_never_go_and_names_the_key(identity, name, changes, key):
    one = finding(report(name, changes), identity)
    assert one.verdict in (CAUTION, UNVERIFIED)
    assert one.nominal is None
    assert key in one.needs


@pytest.mark.parametrize(
    ("identity", "name", "changes", "key", "way"),
    [
        ("protection.short", "healthy", LIMITER, "heatsink.sink_to_air", 1),
        ("protection.short", "healthy", LIMITER, "heatsink.air", 1),
        ("protection.short", "healthy", LIMITER, "device.fitted.junction_limit", -1),
        ("supply.transformer", "healthy", TRANSFORMER, "supply.transformer_power", -1),
        ("supply.transformer", "healthy", TRANSFORMER, "loudspeaker.nominal_impedance", -1),
        ("supply.transformer", "healthy", TRANSFORMER, "stage.swing_loss", -1),
        ("capacitor.ripple", "30w_single_rail_to3", RIPPLE, "output_capacitor.ripple_current", -1),
        ("capacitor.ripple", "30w_single_rail_to3", RIPPLE, "supply.full_load.0", 1),
    ],
)
def test_the_value_moves_one_way_with_its_key(identity, name, changes, key, way):
    amplifier = sheet(name, changes).amplifier
    steps = np.linspace(0.85, 1.1, 9)
    with np.errstate(all="ignore"):
        trial = with_values(amplifier, {key: value_at(amplifier, key) * steps})
        value = np.broadcast_to(
            np.asarray(CHECKS[identity].run(trial, limits()).value, dtype=float), steps.shape
        )
    assert np.all(way * np.diff(value) >= -1e-9 * np.abs(value[1:])), value
    assert way * (value[-1] - value[0]) > 0.0
