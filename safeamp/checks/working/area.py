"""What the safe area allows at a device voltage that stands on the paper as V."""

from __future__ import annotations

import numpy as np

from safeamp.checks import safe_area
from safeamp.checks.working.chain import end_of, name_of
from safeamp.checks.working.paper import Paper
from safeamp.checks.working.rails import many
from safeamp.physics.safe_area import Rating, derating, usable_power
from safeamp.physics.safe_area.boundary import Boundary, boundary
from safeamp.physics.safe_area.rating import starts_under
from safeamp.quantities import CURRENT, POWER, TEMPERATURE, THERMAL_RESISTANCE, VOLTAGE


def allowed(paper: Paper, side: str, case: str) -> str:
    """Write down the allowed current of the device of a side at a case temperature."""
    rating = safe_area.rating_of(paper.amplifier, side)
    left = _left(paper, side, case, rating)
    area = boundary(rating, paper.value(case))
    lines = [_current(paper, side), _power(paper, side, left, rating), *_points(paper, side, left, area)]
    value = area.allowed(np.asarray(paper.value("V")))
    rated = paper.given(
        f"V_rated{end_of(paper, side)}",
        f"device.{name_of(paper, side)}.voltage",
        VOLTAGE,
        "nothing is allowed above",
    )
    if paper.value("V") > paper.value(rated):
        why = f"nothing is allowed above {rated}"
        return paper.taken("I_allowed", "allowed current", 0.0, CURRENT, why)
    return paper.put("I_allowed", "allowed current", many(lines, "min"), value, CURRENT)


def _left(paper: Paper, side: str, case: str, rating: Rating) -> str:
    device = f"device.{name_of(paper, side)}"
    paper.given("T_max", f"{device}.junction_limit", TEMPERATURE)
    paper.given("T_at", f"{device}.power_at", TEMPERATURE)
    value = derating(
        case_temperature=paper.value(case), power_at=rating.power_at, junction_limit=rating.junction_limit
    )
    formula = f"max(0, min(1, (T_max - {case}) / (T_max - T_at)))"
    return paper.put("d", "what is left of the ratings at this case temperature", formula, value)


def _current(paper: Paper, side: str) -> str:
    return paper.given("I_max", f"device.{name_of(paper, side)}.current", CURRENT)


def _power(paper: Paper, side: str, left: str, rating: Rating) -> str:
    device = f"device.{name_of(paper, side)}"
    paper.given("P_tot", f"{device}.power", POWER)
    usable = usable_power(
        power=rating.power,
        power_at=rating.power_at,
        junction_limit=rating.junction_limit,
        junction_to_case=rating.junction_to_case,
    )
    formula = "P_tot"
    if rating.junction_to_case is not None:
        paper.given("R_jc", f"{device}.junction_to_case", THERMAL_RESISTANCE)
        formula = "min(P_tot, (T_max - T_at) / R_jc)"
    paper.put("P_usable", "rated power that both prints allow", formula, usable, POWER)
    value = paper.value(left) * paper.value("P_usable") / paper.value("V")
    return paper.put("I_power", "allowed by the power line", f"{left} * P_usable / V", value, CURRENT)


def _points(paper: Paper, side: str, left: str, area: Boundary) -> list[str]:
    """Write down what the line of the safe area's points around the voltage allows; nothing beyond them."""
    points = area.rating.points
    volts = [float(np.asarray(at).flat[0]) for at, _ in points]
    if not area.lines or not paper.value("V") <= np.asarray(area.last).flat[0]:
        return []
    if paper.value("V") < volts[0] and not np.any(starts_under(area.rating)):
        return []
    first = min(max(int(np.searchsorted(volts, paper.value("V"))) - 1, 0), len(volts) - 2)
    why = f"device.{name_of(paper, side)}.safe_area"
    for place in (first, first + 1):
        at, amperes = points[place]
        paper.taken(f"V_{place + 1}", f"point {place + 1} of the DC curve", at, VOLTAGE, why)
        paper.taken(f"I_{place + 1}", "at a current of", amperes, CURRENT, why)
    one, other = first + 1, first + 2
    slope = f"(ln(I_{other} / I_{one}) / ln(V_{other} / V_{one}))"
    value = area.second_breakdown(np.asarray(paper.value("V")))
    words = "allowed by the line between them on log-log paper"
    return [paper.put("I_line", words, f"{left} * I_{one} * (V / V_{one})^{slope}", value, CURRENT)]
