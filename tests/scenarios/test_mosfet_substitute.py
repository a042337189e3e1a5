"""Vertical MOSFETs with a bias generator that does not follow the heat: index and where idle settles."""

import re

import pytest
from scipy import optimize

from safeamp.findings import Verdict
from safeamp.physics import feedback
from tests.scenarios.sheets import beside, expected, finding, report

NAME = "mosfet_substitute"
TOLERANCE = 0.02
WANTED = expected(NAME)


def runaway(idle, **changes):
    return finding(report(NAME, {"stage.idle": f"{idle:.6g} mA", **changes}), "bias.runaway")


def test_both_devices_heat_the_sink():
    outer = feedback.sink_resistance(sink_to_air=1.5, conducting=1, shared_by=1)
    seen = 0.70 + 0.45 + float(outer)
    assert seen == pytest.approx(WANTED["thermal_resistance_seen_by_each"], rel=1e-9)


@pytest.mark.parametrize(("milliamperes", "index"), list(WANTED["index"].items()))
def test_index_by_idle_current(milliamperes, index):
    if milliamperes.startswith("current_where"):
        found = optimize.brentq(lambda idle: runaway(idle).nominal - 1.0, 100.0, 150.0, xtol=0.1)
        assert found == pytest.approx(index, rel=TOLERANCE)
    else:
        assert runaway(float(milliamperes)).nominal == pytest.approx(index, rel=TOLERANCE)


@pytest.mark.parametrize(("case", "wanted"), list(WANTED["equilibrium"].items()))
def test_equilibrium(case, wanted):
    idle, _, where = case.partition(" mA")
    one = runaway(float(idle))
    at = f"settled over set idle {where.strip() or 'now'}"
    if wanted == "passes 150 degC":
        assert at not in [also.at for also in one.also]  # no equilibrium, no number
        assert re.search(rf"runs away {where.strip() or 'now'}", one.says)
        assert one.verdict is Verdict.STOP
        return
    current, junction = (float(number) for number in re.findall(r"(\d+) (?:mA|degC)", wanted))
    settled = float(idle) * beside(one, at)
    assert settled == pytest.approx(current, rel=TOLERANCE)
    # 52 V across the device through 4.15 K/W, less what the source resistor drops
    assert 30.0 + (52.0 - 0.22 * settled / 1e3) * settled / 1e3 * 4.15 == pytest.approx(junction, abs=0.5)


def test_an_index_below_one_is_not_enough():
    one = runaway(20.0)
    assert one.nominal < 0.5
    assert one.verdict is Verdict.STOP
