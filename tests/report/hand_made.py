"""Reports made by hand: what a report prints must not hang on what judging finds."""

from dataclasses import replace
from typing import Any

from safeamp.amplifier import Assumption
from safeamp.answers import NotApplying, Report, StepVerdict
from safeamp.findings import Also, Bound, Finding, Input, Step, Verdict
from safeamp.quantities import RATIO, RESISTANCE, VOLTAGE, Origin

SCOPE = "8 ohm loudspeaker, phase up to 45 deg, mains up to 253 V"

DEVICES = Finding(
    "cold.devices",
    Step.COLD_CHECKS,
    Verdict.GO,
    RESISTANCE,
    "Lowest reading across outputs and drivers.",
    180e3,
    180e3,
    bound=Bound(1e3, 100.0, "at least", "common practice, no source", "common practice"),
)
OFFSET = Finding(
    "offset.output",
    Step.BIAS,
    Verdict.UNVERIFIED,
    VOLTAGE,
    "DC at the output.",
    None,
    None,
    bound=Bound(0.05, 0.1, "at most", "common practice, no source", "common practice"),
    because=("no reading was given",),
    needs=("readings.offset_cold", "readings.offset_warm"),
    next="Read the DC at the output after twenty minutes.",
    to_be_read=True,
)
SAFE_AREA = Finding(
    "soa.loudspeaker",
    Step.LOUDSPEAKER,
    Verdict.STOP,
    RATIO,
    "The device leaves its safe area into this loudspeaker.",
    1.21,
    1.43,
    bound=Bound(0.8, 1.0, "at most", "definition", "common practice"),
    because=("1.21 of the safe area is used",),
    also=(Also("60 deg", 1.55, RATIO),),
    worst_case={"supply.no_load.0": 38.5, "mains.present": 253.0, "stage.pairs": 1.0},
    at={"voltage": 36.4, "current": 3.1, "zone": "power"},
    inputs=(Input("loudspeaker.phase_angle", 45.0, "deg", Origin.ASSUMED),),
    overturned_by="loudspeaker.phase_angle",
    needs=("stage.rated_load",),
    next="Use a loudspeaker of more ohms.",
    method="closed envelope",
)


def caution(finding: Finding) -> Finding:
    """Return the finding as a caution with a reason."""
    return replace(finding, verdict=Verdict.CAUTION, because=("only up to 253 V",))


def report_of(*findings: Finding, **more: Any) -> Report:
    """Return the report of some findings, its steps and verdict as judging would give them."""
    steps = []
    reached = True
    for step in Step:
        words = [finding.verdict for finding in findings if finding.step is step]
        steps.append(StepVerdict(step, max(words, default=None), reached))
        reached = reached and not steps[-1].holds
    up_to = more.get("up_to") or Step.HAND_OVER
    asked = [
        entry.verdict for entry in steps if entry.verdict is not None and entry.step.place <= up_to.place
    ]
    values: dict[str, Any] = {
        "title": "An amplifier",
        "scope": SCOPE,
        "verdict": max(asked, default=Verdict.UNVERIFIED),
        "steps": tuple(steps),
        "findings": findings,
        "not_applicable": (NotApplying("offset.midpoint", 'stage.coupling = "direct"'),),
        "assumptions": (Assumption("loudspeaker.phase_angle", "45 deg", "nobody has measured it"),),
        "source": "amp.toml",
        "digest": "ab" * 32,
    }
    return Report(**values | more)


__all__ = ["DEVICES", "OFFSET", "SAFE_AREA", "SCOPE", "caution", "report_of"]
