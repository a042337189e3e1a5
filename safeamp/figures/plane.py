"""What is drawn of an amplifier in the plane of voltage and current: the loads that count, and what was judged."""

from __future__ import annotations

import numpy as np
import numpy.typing as npt

from safeamp.amplifier import Amplifier
from safeamp.answers import Path, Plane
from safeamp.checks import operating
from safeamp.checks import safe_area as check
from safeamp.checks.words import nominal
from safeamp.figures.look import NotDrawnError
from safeamp.physics.safe_area import limiter_current

ANGLES: npt.NDArray[np.float64] = np.linspace(-90.0, 90.0, 721)
RESISTOR, LOUDSPEAKER = "soa.resistive_load", "soa.loudspeaker"


def finding_of(amplifier: Amplifier) -> str:
    """Return the id of the finding that is drawn: of the loudspeaker, or of a resistor that is connected."""
    return RESISTOR if amplifier.loudspeaker.load == "resistor" else LOUDSPEAKER


def plane_of(amplifier: Amplifier) -> Plane:
    """Return what is drawn of an amplifier.

    Raises
    ------
    NotDrawnError
        If the use of the safe area cannot be computed.
    """
    if finding_of(amplifier) == RESISTOR:
        worst = check.worst_into_resistor(amplifier)
    else:
        worst = check.worst_into_loudspeaker(amplifier)
    if np.isnan(nominal(worst.point.use)):
        raise NotDrawnError("the use of the safe area cannot be computed")
    others = {load.name: load for load in _loads(amplifier) if load.name != worst.load.name}
    paths = [_path(amplifier, worst.side, load) for load in others.values()]
    return Plane(
        device=f"{worst.side} device, a {operating.device_of(amplifier, worst.side).kind}",
        rating=check.rating_of(amplifier, worst.side),
        case=nominal(worst.case),
        use=nominal(worst.point.use),
        voltage=nominal(worst.point.voltage),
        current=nominal(worst.point.current),
        paths=(*paths, _worst_path(amplifier, worst)),
        limiter=amplifier.protection.vi_limiter or (),
        pulse=worst.cut.pulse,
        steady=nominal(operating.idle_current(amplifier)),
    )


def _loads(amplifier: Amplifier) -> tuple[check.Load, ...]:
    """Return the loads that are drawn beside the worst one."""
    resistor = check.resistors(amplifier)[0]
    if finding_of(amplifier) == RESISTOR or amplifier.loudspeaker.impedance_curve is not None:
        return (resistor,)
    return resistor, *check.loads(amplifier, operating.phase_angle(amplifier))[:2]


def _path(amplifier: Amplifier, side: str, load: check.Load, *, one_angle: bool = False) -> Path:
    voltage, current = check.path_of(amplifier, side, load, ANGLES, one_angle=one_angle)
    return Path(load.name, np.asarray(voltage), np.asarray(current))


def _worst_path(amplifier: Amplifier, worst: check.Worst) -> Path:
    """Return the path of the worst load, cut where a limiter that was measured cuts it."""
    whole = _path(amplifier, worst.side, worst.load, one_angle=bool(np.isfinite(worst.frequency)))
    if not worst.cut.limiter:
        return whole
    most = limiter_current(voltage=whole.voltage, points=worst.cut.limiter)
    return Path(f"{whole.name}, cut by the limiter", whole.voltage, np.minimum(whole.current, most))
