"""The page for the customer in plain words: what was fitted and measured, what the amplifier may drive, what not."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

import numpy as np

from safeamp.amplifier import Amplifier, Sheet
from safeamp.answers import Report
from safeamp.checks import operating
from safeamp.findings import Finding, Step, Verdict
from safeamp.quantities import CURRENT, POWER, RESISTANCE, TEMPERATURE, VOLTAGE, Origin, show
from safeamp.report.page import Note
from safeamp.report.plain_words import BRIDGED, CARE, LOOKS_AT, MEASURED, NEVER, RULES

FAILED = "What is not in order"


@dataclass(frozen=True)
class JobPage:
    """One page: whether it may be used at all, then what there is to know."""

    title: str
    verdict: Verdict
    standing: str
    notes: tuple[Note, ...]


def job_page(sheet: Sheet, report: Report) -> JobPage:
    """Return the customer's page of a sheet and its report."""
    amplifier = sheet.amplifier
    notes = (
        Note(FAILED, tuple(_failed(report))),
        Note("What it may drive", tuple(_drives(amplifier, report))),
        Note("On which mains", tuple(_mains(amplifier))),
        Note("In which position", (_position(sheet),)),
        Note("What is fitted", tuple(_fitted(amplifier))),
        Note("What was measured", tuple(_measured(sheet))),
        Note("Cleared only with care", tuple(_cautions(report))),
        Note("What was not tested", (*_untested(report), *NEVER)),
        Note("Please mind", (*RULES, *((BRIDGED,) if amplifier.stage.bridged else ()))),
        *((Note("Remarks", (amplifier.notes,)),) if amplifier.notes else ()),
    )
    return JobPage(
        report.title, report.verdict, _standing(report), tuple(note for note in notes if note.texts)
    )


def last_cleared(report: Report) -> Step | None:
    """Return the last step that is cleared with all before it, None when not even the first is."""
    cleared = None
    for entry in report.steps:
        if not entry.reached or entry.holds:
            break
        cleared = entry.step
    return cleared


def _standing(report: Report) -> str:
    first, last = report.first_blocked, last_cleared(report)
    so_far = "No step is cleared" if last is None else f"The last step that is cleared: {last.value}"
    if first is None or first.verdict is None:
        return f"{so_far}. All steps are cleared{_with_care(report)}."
    return f"{so_far}. Not cleared: {first.step.value} ({first.verdict.word}). It is not to be used."


def _with_care(report: Report) -> str:
    return ", with the care named below" if report.verdict is Verdict.CAUTION else ""


def _first(value: object) -> float:
    return float(np.asarray(value, dtype=float).flat[0])


def _drives(amplifier: Amplifier, report: Report) -> Iterator[str]:
    if report.first_blocked is not None:
        yield f"Nothing: the step {report.first_blocked.step.value} is not cleared."
        return
    table = amplifier.loudspeaker
    nominal, lowest = (
        _first(operating.believed_nominal(amplifier)),
        _first(operating.believed_minimum(amplifier)),
    )
    if table.load == "resistor":
        yield f"No loudspeaker: it was looked at with a resistor of {show(nominal, RESISTANCE)} only."
        return
    series, parallel = _first(table.series), _first(table.parallel)
    several = series * parallel > 1
    how = f" ({series:.0f} in series, {parallel:.0f} such in parallel)" if several else ""
    what = f"{series * parallel:.0f} loudspeakers{how}" if several else "One loudspeaker"
    yield f"{what} of {show(nominal, RESISTANCE)}, at no note below {show(lowest, RESISTANCE)}; nothing less."
    power = _first(operating.loudspeaker_power(amplifier))
    if np.isfinite(power):
        yield f"It gives up to {show(power, POWER)} (sine, at clipping) into {'each of them' if several else 'that'}."


def _mains(amplifier: Amplifier) -> Iterator[str]:
    mains = amplifier.mains
    if operating.is_fixed(amplifier):
        yield f"Not on the mains by itself: its rails come from a {amplifier.supply.source} supply."
        return
    if mains.highest is not None:
        yield f"Mains up to {show(_first(mains.highest), VOLTAGE)}."
    if mains.rated is not None:
        yield f"On its plate: {show(_first(mains.rated), VOLTAGE)}."
    if mains.actual is not None:
        yield f"In the socket at the bench: {show(_first(mains.actual), VOLTAGE)}."


def _position(sheet: Sheet) -> str:
    air = sheet.entries.get("heatsink.air")
    hottest = (
        "" if air is None else f" Computed for air of up to {show(air.high, TEMPERATURE)} at the heatsink."
    )
    return f"As it was at the bench, lid on, with free air around it.{hottest}"


def _fitted(amplifier: Amplifier) -> Iterator[str]:
    stage = amplifier.stage
    names = list(dict.fromkeys((str(stage.upper), str(stage.lower))))
    original = {True: ", the maker's types", False: ", other types than the maker's"}
    yield (
        f"Output devices: {' and '.join(names)} ({_kinds(amplifier, names)}), {_first(stage.pairs):.0f} on each side"
        f"{original.get(stage.original_devices, '') if stage.original_devices is not None else ''}."
    )
    if stage.drivers:
        yield f"Drivers: {', '.join(stage.drivers)}."
    if amplifier.supply.rail_fuse is not None:
        fuse = amplifier.supply.rail_fuse
        yield f"Rail fuse: {fuse.letter} {show(fuse.rating, CURRENT)}."
    capacitor = amplifier.output_capacitor
    if operating.is_capacitor_coupled(amplifier) and capacitor.rated_voltage is not None:
        yield f"Output capacitor: rated {show(_first(capacitor.rated_voltage), VOLTAGE)}."
    yield from _protection(amplifier)


def _kinds(amplifier: Amplifier, names: list[str]) -> str:
    return ", ".join(
        dict.fromkeys(str(amplifier.device[name].kind) for name in names if name in amplifier.device)
    )


def _protection(amplifier: Amplifier) -> Iterator[str]:
    table = amplifier.protection
    if table.trip_delay is not None:
        yield "A relay that takes the loudspeaker off at a fault."
    if table.loudspeaker_fuse is not None:
        fuse = table.loudspeaker_fuse
        yield f"Loudspeaker fuse: {fuse.letter} {show(fuse.rating, CURRENT)}."
    if {"protection.trip_delay", "protection.loudspeaker_fuse"} <= amplifier.absent:
        yield "Nothing that takes the loudspeaker off at a fault."


def _measured(sheet: Sheet) -> Iterator[str]:
    """Yield what was measured, in plain words; data of parts and what is computed do not count."""
    groups: dict[str, list[str]] = {}
    for path, entry in sheet.entries.items():
        key = ".".join(part for part in path.split(".") if not part.isdigit())
        if entry.origin is Origin.MEASURED and key in MEASURED:
            groups.setdefault(key, []).append(show(entry.nominal, entry.kind))
    for key, shown in groups.items():
        yield f"{MEASURED[key]} {', '.join(shown)}"


def _cautions(report: Report) -> Iterator[str]:
    if report.first_blocked is not None:
        return
    for finding in report.findings:
        if finding.verdict is Verdict.CAUTION and not _unknown(finding):
            yield f"{_looks_at(finding)}: {CARE[finding.id]}"


def _failed(report: Report) -> Iterator[str]:
    """Yield what stops, whichever step it belongs to: all of it is to be put right."""
    for finding in report.findings:
        if finding.verdict is Verdict.STOP:
            yield _looks_at(finding)


def _unknown(finding: Finding) -> bool:
    return finding.nominal is None and not finding.unbounded


def _looks_at(finding: Finding) -> str:
    return LOOKS_AT[finding.id]


def _untested(report: Report) -> Iterator[str]:
    for finding in report.findings:
        if finding.verdict is Verdict.UNVERIFIED or _unknown(finding):
            yield _looks_at(finding)
    for identity in report.still_to_read:
        yield LOOKS_AT[identity]
