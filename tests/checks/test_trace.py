"""What a check reads is recorded while it runs: nothing that moves its number may be left out."""

import numpy as np
import pytest

from safeamp.amplifier import value_at, with_values
from safeamp.checks import CHECKS
from safeamp.checks.trace import NAN, Trace, miss, needed, watched
from safeamp.findings import Measure
from tests.scenarios.sheets import NAMES, limits, sheet

SHEETS = [*NAMES, "class_a"]


def run(check, amplifier):
    with np.errstate(all="ignore"):
        return check.run(amplifier, limits())


def numbers(measure):
    """Return value and levels of a measure as a tuple that compares."""
    found = []
    for part in (measure.value, measure.go, measure.stop):
        found += [np.nan] if part is None else np.ravel(np.asarray(part, dtype=float)).tolist()
    return tuple("nan" if np.isnan(number) else number for number in found)


@pytest.mark.parametrize("name", SHEETS)
def test_moving_a_key_moves_only_findings_that_read_it(name):
    read = sheet(name)
    moved_at_all = set()
    for check in CHECKS.values():
        trace = Trace()
        measure = run(check, watched(read.amplifier, trace))
        if not isinstance(measure, Measure):
            continue
        still = numbers(measure)
        for path in read.entries:
            amplifier = with_values(read.amplifier, {path: 1.01 * value_at(read.amplifier, path) + 1e-9})
            try:
                other = run(check, amplifier)
            except ValueError:
                continue  # a value that no amplifier can have, such as a peak above its rail
            if isinstance(other, Measure) and numbers(other) != still:
                moved_at_all.add(path)
                assert any(path == key or path.startswith(f"{key}.") for key in trace.reads), (check.id, path)
    assert len(moved_at_all) >= 10


def test_a_read_is_noted_with_its_path():
    trace = Trace()
    amplifier = watched(sheet("split_rail").amplifier, trace)
    assert amplifier.heatsink.air == 35.0
    assert amplifier.device.fitted.power == 150.0
    assert amplifier.supply.no_load == (34.0,)
    assert list(trace.reads) == ["heatsink.air", "device.fitted.power", "supply.no_load"]
    assert not trace.missing


def test_a_fuse_is_one_value():
    trace = Trace()
    assert watched(sheet("split_rail").amplifier, trace).supply.rail_fuse.letter == "T"
    assert list(trace.reads) == ["supply.rail_fuse"]


def test_origins_and_parts_not_fitted_are_no_reads():
    trace = Trace()
    amplifier = watched(sheet("split_rail").amplifier, trace)
    assert amplifier.origin("heatsink.air") is not None
    assert "stage.series_resistor" not in amplifier.absent
    assert not trace.reads


def test_what_is_needed_and_not_there_is_noted_under_the_users_key():
    trace = Trace()
    amplifier = watched(sheet("split_rail").amplifier, trace)
    air, coil = needed(amplifier, "heatsink.air", "loudspeaker.coil_limit")
    assert air == 35.0
    assert np.isnan(coil)
    assert np.isnan(NAN)
    miss(amplifier, "supply.full_load_share")
    assert list(trace.missing) == ["loudspeaker.coil_limit", "supply.full_load"]


def test_without_a_trace_nothing_is_noted():
    amplifier = sheet("split_rail").amplifier
    miss(amplifier, "heatsink.air")
    assert np.isnan(needed(amplifier, "loudspeaker.coil_limit")[0])
