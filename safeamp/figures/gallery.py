"""All pictures that a report can have; those whose inputs are missing are left out, and said so."""

from __future__ import annotations

from collections.abc import Callable, Collection, Mapping
from dataclasses import dataclass
from functools import partial

import numpy as np
from matplotlib.axes import Axes

from safeamp.amplifier import Amplifier, Sheet
from safeamp.answers import Bass, FindingChances, Plane, Report, Tolerance
from safeamp.checks.trace import Trace, watched
from safeamp.figures import chances, coil, driver, heat, look, overview, response, safe_area, temperatures
from safeamp.figures.look import NotDrawnError, Picture
from safeamp.figures.plane import finding_of, plane_of
from safeamp.findings import Bound, Finding
from safeamp.limits import Limits

#: The figures of a page when no more are asked for: how much of everything is used, and the safe area.
FIRST = ("overview", "safe-area")
#: The others that a sheet can have, in their order.
FURTHER = ("temperatures", "heat", "low-notes", "coil", "impedance", "cone-travel")


@dataclass(frozen=True)
class LeftOut:
    """A picture that is not drawn, and why."""

    name: str
    because: str


@dataclass(frozen=True)
class Gallery:
    """The pictures in the order in which they are shown, and those left out."""

    pictures: tuple[Picture, ...]
    left_out: tuple[LeftOut, ...] = ()


@dataclass(frozen=True)
class _Plan:
    name: str
    title: str
    draw: Callable[[Axes, Amplifier], str]
    height: float = look.HEIGHT
    margins: look.Margins | None = None


def pictures_of(
    sheet: Sheet, report: Report, limits: Limits, names: Collection[str] = (*FIRST, *FURTHER)
) -> Gallery:
    """Return the pictures of a sheet and its report.

    Parameters
    ----------
    sheet : Sheet
        As read: nominal values and the ends of their tolerances.
    report : Report
        What was found on that sheet.
    limits : Limits
        What the findings were judged by.
    names : collection of str, optional
        Which pictures are wanted; all of them unless said.
    """
    plans = [plan for plan in _plans(sheet, report, limits) if plan.name in names]
    return _gallery(plans, sheet.amplifier)


def _plans(sheet: Sheet, report: Report, limits: Limits) -> list[_Plan]:
    found = {finding.id: finding for finding in report.findings}
    return [
        _Plan(
            "overview", overview.TITLE, lambda axes, _: overview.draw(axes, report.findings),
            overview.height_of(report.findings), overview.MARGINS,
        ),
        _Plan("safe-area", safe_area.TITLE, partial(_safe_area, found), safe_area.HEIGHT),
        _Plan("temperatures", temperatures.TITLE, lambda axes, one: temperatures.draw(axes, one, limits)),
        _Plan("heat", heat.TITLE, heat.draw),
        _Plan("low-notes", response.TITLE, lambda axes, one: response.draw(axes, one, sheet.entries)),
        _Plan("coil", coil.TITLE, lambda axes, one: coil.draw(axes, one, limits), coil.HEIGHT),
        _Plan("impedance", driver.IMPEDANCE, driver.draw_impedance, driver.HEIGHT),
        _Plan("cone-travel", driver.EXCURSION, driver.draw_excursion, driver.HEIGHT),
    ]  # fmt: skip


def _safe_area(found: Mapping[str, Finding], axes: Axes, amplifier: Amplifier) -> str:
    finding = found.get(finding_of(amplifier))
    return safe_area.draw(axes, plane_of(amplifier), None if finding is None else finding.worst)


def plane_pictures(plane: Plane) -> Gallery:
    """Return the picture of a safe area that was computed without a sheet."""
    plan = _Plan("safe-area", safe_area.TITLE, lambda axes, _: safe_area.draw(axes, plane), safe_area.HEIGHT)
    return _gallery([plan], Amplifier())


def bass_pictures(bass: Bass) -> Gallery:
    """Return the picture of an output capacitor that was computed without a sheet."""
    plan = _Plan("low-notes", response.TITLE, lambda axes, _: response.draw_bass(axes, bass))
    return _gallery([plan], Amplifier())


def histograms_of(tolerance: Tolerance, bounds: Mapping[str, Bound], limits: Limits) -> Gallery:
    """Return one histogram for each finding that varies.

    Parameters
    ----------
    tolerance : Tolerance
        The answer over many samples.
    bounds : mapping of str to Bound
        Id of a finding -> its nominal limit, as a report has it.
    limits : Limits
        Where that limit has no levels, because something else decides at the nominal values, those of its rule.
    """
    plans = [
        _Plan(
            f"tolerance-{one.id.replace('.', '-').replace('_', '-')}",
            chances.title_of(one),
            partial(_histogram, one, bounds.get(one.id), limits),
            chances.HEIGHT,
        )
        for one in tolerance.findings
        if one.sampled
    ]
    return _gallery(plans, Amplifier())


def _histogram(one: FindingChances, bound: Bound | None, limits: Limits, axes: Axes, _: Amplifier) -> str:
    if bound is not None and (bound.go is not None or bound.stop is not None):
        return chances.draw(axes, one, bound)
    rule = limits[one.id]
    stop = rule.stop[1] if isinstance(rule.stop, tuple) else rule.stop
    if rule.go is None and stop is None:
        return chances.draw(axes, one, None)
    own = Bound(rule.go, stop, rule.sense, rule.source, rule.evidence, rule.overridden)
    return chances.draw(axes, one, own, alone=False)


def _gallery(plans: list[_Plan], amplifier: Amplifier) -> Gallery:
    pictures, left_out = [], []
    for plan in plans:
        try:
            pictures.append(_drawn(plan, amplifier))
        except NotDrawnError as reason:
            left_out.append(LeftOut(plan.name, str(reason)))
    return Gallery(tuple(pictures), tuple(left_out))


def _drawn(plan: _Plan, amplifier: Amplifier) -> Picture:
    """Return a picture; a missing input is noted while it is looked for, and its key is the better reason."""
    trace = Trace()
    try:
        with np.errstate(all="ignore"):
            found = look.picture(
                plan.name,
                plan.title,
                lambda axes: plan.draw(axes, watched(amplifier, trace)),
                height=plan.height,
                margins=plan.margins,
            )
    except ValueError as problem:
        if trace.missing:
            raise NotDrawnError(_not_given(trace)) from problem
        raise NotDrawnError(str(problem)) from problem
    if trace.missing:
        raise NotDrawnError(_not_given(trace))
    return found


def _not_given(trace: Trace) -> str:
    return f"not given: {', '.join(trace.missing)}"
