"""DC at the output without a sheet: coil current, coil power, cone displacement."""

from __future__ import annotations

import numpy as np

from safeamp.answers import QuickAnswer
from safeamp.complaints import OptionsError
from safeamp.findings import Measure, Remark, Verdict
from safeamp.physics import offset
from safeamp.quantities import (
    COMPLIANCE,
    CURRENT,
    FORCE_FACTOR,
    LENGTH,
    PERCENT,
    POWER,
    RATIO,
    RESISTANCE,
    VOLTAGE,
    Number,
)
from safeamp.studies.quick.desk import Cases, Desk, Page, shown

DRIVER = ("dc_resistance", "force_factor", "compliance")
#: Up to here a reading may be that of an output whose relay never closed, V.
PERHAPS_OPEN = 0.5e-3
CAUTIONS = (
    "One reading speaks for one moment: read cold, after 40 minutes and with signal, without a loudspeaker.",
    "Read before and behind the relay: a relay that did not close shows nothing of the offset.",
)


def offset_answer(desk: Desk) -> QuickAnswer:
    """Return what a standing DC does to the coil and the cone, or which DC a share of the excursion allows.

    Raises
    ------
    OptionsError
        If too little is given or options contradict one another.
    """
    _ask(desk)
    page = Page(desk.cases())
    if desk.has("reading"):
        volts, holds_for = page.cases["reading"], "this one reading, at the moment it was taken"
        _judge(page, volts)
    else:
        volts, holds_for = _allowed(page), "this DC if it stood at the output"
        _judge_allowed(page, volts)
    if desk.has("dc_resistance"):
        _coil(page, volts)
    if desk.has("force_factor"):
        _cone(page, volts)
    return page.answer("DC at the output", holds_for, CAUTIONS)


def _ask(desk: Desk) -> None:
    if desk.has("reading", "share"):
        raise OptionsError("--reading and --share contradict each other; leave one of them out")
    if not desk.has("reading"):
        if not desk.has("share"):
            raise OptionsError("too little is given; add --reading, the DC at the output")
        desk.need(*DRIVER, "linear_excursion")
    if any(desk.has(name) for name in (*DRIVER[1:], "linear_excursion")):
        desk.need(*DRIVER)


def _allowed(page: Page) -> Number:
    """Return the DC that takes a share of the linear excursion, V."""
    cases = page.cases
    volts = offset.allowed_dc(
        share=cases["share"],
        linear_excursion=cases["linear_excursion"],
        dc_resistance=cases["dc_resistance"],
        force_factor=cases["force_factor"],
        compliance=cases["compliance"],
    )
    page.add("reading", volts, VOLTAGE)
    share, most = shown(cases["share"], PERCENT), shown(cases["linear_excursion"], LENGTH)
    page.say(
        "allowed DC = share of the linear excursion x DC resistance / (force factor x compliance)",
        f"{share} x {most} x {_ohms(cases)} / ({_force(cases)} x {_compliance(cases)}) = {shown(volts, VOLTAGE)}",
    )
    return volts


def _ohms(cases: Cases) -> str:
    return shown(cases["dc_resistance"], RESISTANCE)


def _force(cases: Cases) -> str:
    return shown(cases["force_factor"], FORCE_FACTOR)


def _compliance(cases: Cases) -> str:
    return shown(cases["compliance"], COMPLIANCE)


def _crosses_zero(volts: Number) -> bool:
    """Whether the ends of a reading lie on both sides of 0 V."""
    return bool(np.min(volts) < 0.0 < np.max(volts))


def _coil(page: Page, volts: Number) -> None:
    coil, put = page.cases["dc_resistance"], f"({shown(volts, VOLTAGE)})"
    current = offset.coil_current(voltage=volts, dc_resistance=coil)
    power = offset.coil_power(voltage=volts, dc_resistance=coil)
    page.add("current", current, CURRENT)
    page.add("power", power, POWER, through_zero=_crosses_zero(volts))
    ohms = _ohms(page.cases)
    page.say("current = DC / DC resistance of the coil", f"{put} / {ohms} = {shown(current, CURRENT)}")
    page.say("power = DC squared / DC resistance", f"{put}^2 / {ohms} = {shown(power, POWER)}")


def _cone(page: Page, volts: Number) -> None:
    cases = page.cases
    shift = offset.cone_displacement(
        voltage=volts,
        dc_resistance=cases["dc_resistance"],
        force_factor=cases["force_factor"],
        compliance=cases["compliance"],
    )
    page.add("cone_displacement", shift, LENGTH)
    if cases.desk.has("linear_excursion"):
        page.add(
            "excursion_share",
            np.abs(shift) / cases["linear_excursion"],
            RATIO,
            through_zero=_crosses_zero(volts),
        )
    current = shown(np.asarray(volts) / cases["dc_resistance"], CURRENT)
    page.say(
        "cone displacement = force factor x current x compliance",
        f"{_force(cases)} x ({current}) x {_compliance(cases)} = {shown(shift, LENGTH)}",
    )


def _judge(page: Page, volts: Number) -> None:
    size = np.abs(np.asarray(volts))
    says = f"{shown(size, VOLTAGE)} of DC at the output"
    if float(size.flat[0]) > page.cases.desk.limits["offset.output"].extra["switch_off_above"]:
        says = f"{says}: switch off, the stage is stuck towards a rail"
    because = "so little may be an output whose relay is open: read before the relay"
    remarks = (Remark(Verdict.UNVERIFIED, because),) if float(size.flat[0]) <= PERHAPS_OPEN else ()
    measure = Measure(size, says, remarks=remarks, next="read again after 40 minutes and with signal")
    page.judge("offset.output", measure, ("reading",))


def _judge_allowed(page: Page, volts: Number) -> None:
    """Judge the DC that a share of the excursion allows as if it were read at the output."""
    measure = Measure(
        volts,
        f"{shown(volts, VOLTAGE)} of DC at the output, as the share allows",
        next="what the cone stands is not what the output may have: allow a smaller share",
    )
    page.judge("offset.output", measure, (*DRIVER, "linear_excursion", "share"))
