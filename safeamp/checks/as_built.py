"""Whether the maker's own ratings cover this load, these devices and this mains."""

from __future__ import annotations

from safeamp.amplifier import Amplifier
from safeamp.checks import operating
from safeamp.checks.loudspeaker import label_ratio
from safeamp.checks.trace import needed
from safeamp.checks.words import nominal
from safeamp.findings import AsBuilt
from safeamp.limits import Limit
from safeamp.quantities import Number, Origin

#: What nobody read off the amplifier or measured is no rating of its maker.
NOT_GIVEN = (Origin.GUESS, Origin.EXAMPLE)
#: A rated impedance may fall to this share at some note (IEC 60268-5; value memory).
LEAST_OF_RATED = 0.8
#: Condition -> keys that it rests on.
RESTS_ON = {
    "stage.rated_load": ("stage.rated_load",),
    "loudspeaker.dc_resistance": ("loudspeaker.dc_resistance", "loudspeaker.nominal_impedance"),
    "mains.rated": ("mains.rated", "mains.actual"),
}


def as_built(amplifier: Amplifier, limit: Limit, label: Limit) -> AsBuilt:
    """Return whether the maker's own ratings cover this load, these devices and this mains."""
    table, mains = amplifier.stage, amplifier.mains
    most = limit.extra["as_built_mains_over_rated"]
    load = nominal(operating.believed_nominal(amplifier) * operating.together(amplifier))
    conditions = {
        "stage.rated_load": table.rated_load is not None and nominal(table.rated_load) <= load * (1.0 + 1e-9),
        "loudspeaker.minimum_impedance": _minimum_is_covered(amplifier),
        "stage.original_devices": table.original_devices is True,
        "stage.pairs_conducting": _all_conduct(amplifier),
        "loudspeaker.dc_resistance": _label_is_go(amplifier, label),
        "mains.rated": _mains_within(mains.actual, mains.rated, most),
        "loudspeaker.impedance_curve": amplifier.loudspeaker.impedance_curve is None,
    }
    failed = tuple(key for key, holds in conditions.items() if not (holds and _is_given(amplifier, key)))
    return AsBuilt(not failed, limit.extra["as_built_ceiling"], failed)


def _minimum_is_covered(amplifier: Amplifier) -> bool:
    """Whether the lowest impedance is one that a loudspeaker of the maker's rated load may have."""
    rated = amplifier.stage.rated_load
    lowest = nominal(operating.believed_minimum(amplifier) * operating.together(amplifier))
    return rated is not None and lowest >= LEAST_OF_RATED * nominal(rated) * (1.0 - 1e-9)


def _is_given(amplifier: Amplifier, condition: str) -> bool:
    return all(amplifier.origin(path) not in NOT_GIVEN for path in RESTS_ON.get(condition, ()))


def _all_conduct(amplifier: Amplifier) -> bool:
    conducting = operating.conducting(amplifier)
    return nominal(conducting) >= nominal(needed(amplifier, "stage.pairs")[0])


def _label_is_go(amplifier: Amplifier, label: Limit) -> bool:
    if amplifier.loudspeaker.dc_resistance is None or not isinstance(label.go, tuple):
        return False
    return bool(label.go[0] <= nominal(label_ratio(amplifier)) <= label.go[1])


def _mains_within(actual: Number | None, rated: Number | None, most: float) -> bool:
    if actual is None or rated is None:
        return False
    return nominal(actual) <= most * nominal(rated) * (1.0 + 1e-9)
