"""The main question: whether the next step may be taken."""

from __future__ import annotations

from collections.abc import Iterable

import numpy as np

from safeamp.amplifier import Amplifier, Sheet
from safeamp.answers import NotApplying, Report, StepVerdict
from safeamp.checks import CHECKS, operating
from safeamp.findings import Finding, NotApplicable, Step, Verdict
from safeamp.limits import Limits
from safeamp.quantities import ANGLE, RESISTANCE, VOLTAGE, show
from safeamp.studies.findings import Bench, find


def verdict(
    sheet: Sheet, limits: Limits, *, on_paper: bool = False, up_to: Step | None = None, demo: bool = False
) -> Report:
    """Return every finding of a sheet and what follows for the steps of the job.

    Parameters
    ----------
    sheet : Sheet
        As read.
    limits : Limits
        What the findings are judged by.
    on_paper : bool
        Judge only what is computed; what is read at the bench is listed as still to be read.
    up_to : Step or None
        The last step that verdict and exit status speak for.
    demo : bool
        Whether values of origin example count: only in the built-in example.
    """
    bench = Bench(sheet, limits, demo)
    asked = [check for check in CHECKS.values() if not (on_paper and check.at_bench)]
    results = {check.id: find(check, bench) for check in asked}
    findings = _in_order(result for result in results.values() if isinstance(result, Finding))
    steps = _steps(findings)
    return Report(
        title=sheet.amplifier.title,
        scope=_scope(sheet.amplifier, on_paper=on_paper),
        verdict=_overall(findings, up_to),
        steps=steps,
        findings=findings,
        not_applicable=tuple(
            NotApplying(identity, result.because)
            for identity, result in results.items()
            if isinstance(result, NotApplicable)
        ),
        assumptions=sheet.assumptions,
        remarks=sheet.remarks,
        still_to_read=tuple(check.id for check in CHECKS.values() if on_paper and check.at_bench),
        on_paper=on_paper,
        demo=demo,
        up_to=up_to,
        source=sheet.source,
        digest=sheet.digest,
        notes=sheet.amplifier.notes,
        overridden=tuple(limit.id for limit in limits.overridden),
        unassessed=sheet.unassessed,
    )


def _in_order(findings: Iterable[Finding]) -> tuple[Finding, ...]:
    return tuple(sorted(findings, key=lambda finding: finding.step.place))


def _steps(findings: tuple[Finding, ...]) -> tuple[StepVerdict, ...]:
    """Return the worst word of each step; a step after one that is not cleared is not reached."""
    steps, reached = [], True
    for step in Step:
        words = [finding.verdict for finding in findings if finding.step is step]
        worst = max(words) if words else None
        steps.append(StepVerdict(step, worst, reached))
        reached = reached and (worst is None or worst.clears)
    return tuple(steps)


def _overall(findings: tuple[Finding, ...], up_to: Step | None) -> Verdict:
    """Return the worst word of the steps asked for; where nothing was judged nothing is cleared."""
    last = len(Step) if up_to is None else up_to.place
    return max((f.verdict for f in findings if f.step.place <= last), default=Verdict.UNVERIFIED)


def _scope(amplifier: Amplifier, *, on_paper: bool) -> str:
    """Return for what the verdict holds."""
    ohms = float(np.asarray(operating.believed_nominal(amplifier)).flat[0])
    load = f"{show(ohms, RESISTANCE)} {amplifier.loudspeaker.load}"
    for word in ("series", "parallel"):
        count = float(np.asarray(getattr(amplifier.loudspeaker, word)).flat[0])
        if count > 1:
            load = f"{count:.0f} in {word} of {load}"
    parts = [load]
    if amplifier.loudspeaker.load != "resistor":
        angle = float(np.asarray(operating.phase_angle(amplifier)).flat[0])
        measured = amplifier.loudspeaker.impedance_curve is not None
        parts.append(
            "every point of its impedance curve" if measured else f"phase up to {show(angle, ANGLE)}"
        )
    parts.append(_supply_scope(amplifier))
    return ", ".join(parts) + ("; on paper: clears no power" if on_paper else "")


def _supply_scope(amplifier: Amplifier) -> str:
    if operating.is_fixed(amplifier):
        return f"{amplifier.supply.source} supply"
    if amplifier.mains.highest is None:
        return "mains not given"
    highest = float(np.asarray(amplifier.mains.highest).flat[0])
    return f"mains up to {show(highest, VOLTAGE)}"
