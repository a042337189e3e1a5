"""Making an input worse never makes a verdict better, finding by finding."""

from itertools import pairwise

import pytest
from hypothesis import Phase, given, settings
from hypothesis import strategies as st

from safeamp.complaints import ReadingError
from safeamp.findings import Verdict
from tests.amplifiers.sheets import NAMES, healthy, outputs, report, scale, scaled, sheet

#: What grows when an amplifier gets worse.
GROWS = {
    "mains.actual": ("mains.actual",),
    "rails": ("supply.no_load", "supply.full_load"),
    "sink to air": ("heatsink.sink_to_air",),
    "case to sink": ("heatsink.case_to_sink",),
    "air": ("heatsink.air",),
    "fuse": ("supply.rail_fuse",),
    "loudspeaker fuse": ("protection.loudspeaker_fuse",),
    "trip voltage": ("protection.trip_voltage",),
    "trip delay": ("protection.trip_delay",),
    "offset": ("readings.offset_cold", "readings.offset_warm", "readings.offset_with_signal"),
    "output on the limiter": ("readings.limiter_output",),
    "leakage": ("readings.capacitor_leakage_drop",),
    "noise": ("readings.output_ac",),
    "earth": ("readings.earth_resistance",),
    "idle": ("stage.idle", "readings.idle_upper", "readings.idle_lower"),
    "heatsink reading": ("readings.heatsink_temperature",),
}
SHRINKS = {
    "loudspeaker": (
        "loudspeaker.nominal_impedance",
        "loudspeaker.minimum_impedance",
        "loudspeaker.dc_resistance",
    ),
    "coil": ("loudspeaker.dc_resistance",),
    "rated power": ("loudspeaker.rated_power",),
    "coil limit": ("loudspeaker.coil_limit",),
    "reservoir voltage": ("supply.reservoir_rated_voltage",),
    "capacitance": ("output_capacitor.capacitance",),
    "capacitor voltage": ("output_capacitor.rated_voltage",),
    "ripple current": ("output_capacitor.ripple_current",),
    "device ohms": ("readings.device_ohms",),
    "insulation": ("readings.insulation",),
    "mains insulation": ("readings.mains_insulation",),
    "driver voltage": ("device.driver.voltage",),
}
#: A reading of the heatsink is held against the computed rise: what warms the computed one alone flatters it.
WARMS_THE_COMPUTED_RISE = ("mains.actual", "rails", "sink to air", "idle", "loudspeaker", "coil")
#: More current through the coil burns it sooner, and blows the fuse sooner still.
BLOWS_THE_FUSE = ("mains.actual", "rails", "loudspeaker", "coil")
LARGEST = {"air": 2.0, "heatsink reading": 2.5, "idle": 2.5, "mains.actual": 1.24, "rails": 1.5}


def worsen(tables, what, factor):
    """Make one thing worse by a factor above 1; False where the amplifier has no such thing."""
    if what in GROWS:
        return scale(tables, factor, *GROWS[what]) > 0
    if what in SHRINKS:
        return scale(tables, 1.0 / factor, *SHRINKS[what]) > 0
    for device in outputs(tables):
        _weaken(device, factor)
    return True


def _weaken(device, factor):
    device["junction_to_case"] = scaled(device["junction_to_case"], factor)
    for key in ("power", "current"):
        device[key] = scaled(device[key], 1.0 / factor)
    if "safe_area" in device:
        device["safe_area"] = [
            [volts, scaled(amperes, 1.0 / factor)] for volts, amperes in device["safe_area"]
        ]


def words(found):
    """Return how bad each finding is; two words that the rule of corners does not rank are one.

    A corner beyond stop is unverified while only an assumed value takes it there, and caution as soon as what was
    stated does so too: the amplifier got worse, and nothing has to be measured any more.
    """
    return {finding.id: _ranked(finding) for finding in found.findings}


def _ranked(finding):
    only_assumed = any(reason.startswith("beyond the stop level if") for reason in finding.because)
    return Verdict.CAUTION if only_assumed and finding.verdict is Verdict.UNVERIFIED else finding.verdict


def words_when(name, what, factor):
    """Return the same of a worsened amplifier; None where it has no such thing or the reader asks back."""
    tables = sheet(name)
    if not worsen(tables, what, factor):
        return None
    try:
        return words(report(tables))
    except ReadingError:
        return None


def _better(before, after, what, tables):
    """Return the ids whose verdict got better although it must not."""
    ignored = {"heat.reading"} if what in WARMS_THE_COMPUTED_RISE else set()
    if what in BLOWS_THE_FUSE and tables["protection"].get("loudspeaker_fuse", "none") != "none":
        ignored.add("loudspeaker.dc_fault")
    return {id for id in before if after[id] < before[id]} - ignored


@pytest.mark.parametrize("what", [*GROWS, *SHRINKS, "devices"])
@settings(max_examples=3, deadline=None, database=None, phases=[Phase.generate])
@given(data=st.data())
def test_worse_is_never_better(what: str, data: st.DataObject) -> None:
    name = data.draw(st.sampled_from([name for name in NAMES if worsen(sheet(name), what, 2.0)]))
    shares = sorted(data.draw(st.tuples(st.floats(0.0, 1.0), st.floats(0.0, 1.0))))
    steps = [1.0 + share * (LARGEST.get(what, 4.0) - 1.0) for share in shares]
    chain = [words(healthy(name)), *(words_when(name, what, step) for step in steps)]
    read = [found for found in chain if found is not None]
    for before, after in pairwise(read):
        assert before.keys() == after.keys()
        assert not _better(before, after, what, sheet(name))


@pytest.mark.parametrize(
    ("what", "id"),
    [
        ("mains.actual", "supply.mains"),
        ("devices", "soa.loudspeaker"),
        ("loudspeaker", "soa.loudspeaker"),
        ("sink to air", "heat.heatsink"),
        ("idle", "bias.idle"),
        ("leakage", "capacitor.leakage"),
        ("driver voltage", "supply.rail_to_rail"),
    ],
)
def test_worse_enough_turns_the_finding_that_it_concerns(what: str, id: str) -> None:
    # Without this the property above could hold because nothing ever changes.
    factor = {"leakage": 20.0, "mains.actual": 1.24}.get(what, 2.5)
    found = {name: words_when(name, what, factor) for name in NAMES if id in words(healthy(name))}
    turned = [name for name, now in found.items() if now and now[id] > words(healthy(name))[id]]
    assert len(turned) >= 3
