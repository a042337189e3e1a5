"""Where loads take a device in the plane of voltage and current: what a picture of the safe area is drawn from."""

from __future__ import annotations

from dataclasses import dataclass
from typing import TYPE_CHECKING, Any, NamedTuple

if TYPE_CHECKING:
    from safeamp.physics.safe_area import Pulse, Rating


class Path(NamedTuple):
    """The path of one load: its name, V and A of the device along it, shape (points,)."""

    name: str
    voltage: Any
    current: Any


@dataclass(frozen=True, eq=False, kw_only=True)
class Plane:
    """One device at nominal values: what it stands, where loads take it, and the worst point.

    Parameters
    ----------
    device : str
        What it is, such as "upper device".
    case : float
        degC.
    use, voltage, current : float
        Share of what is allowed at the worst point, and its V and A.
    paths : tuple of Path
        The load of the worst point last.
    limiter : tuple of (float, float)
        V and A at which a V-I limiter acts; empty without one.
    pulse : Pulse or None
        Half a cycle with its curves, where they count beside the DC curve.
    steady : float
        A that flows all the time.
    """

    device: str
    rating: Rating
    case: float
    use: float
    voltage: float
    current: float
    paths: tuple[Path, ...]
    limiter: tuple[tuple[float, float], ...] = ()
    pulse: Pulse | None = None
    steady: float = 0.0
