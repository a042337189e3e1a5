"""Every working under the id of its finding."""

from safeamp.checks.working import (
    bias,
    capacitor,
    heat,
    loudspeaker,
    offset,
    protection,
    readings,
    runaway,
    safe_area,
    supply,
)
from safeamp.checks.working.register import WORKINGS, working_of

__all__ = [
    "WORKINGS",
    "bias",
    "capacitor",
    "heat",
    "loudspeaker",
    "offset",
    "protection",
    "readings",
    "runaway",
    "safe_area",
    "supply",
    "working_of",
]
