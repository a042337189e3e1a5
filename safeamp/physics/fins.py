"""Heatsinks by ruler: upright fins on a plate, in free air."""

from collections.abc import Callable
from dataclasses import dataclass
from typing import Any

import numpy as np
from numpy.typing import ArrayLike

from safeamp.physics import convection
from safeamp.physics._checks import Array, array, non_negative, positive, refuse, within
from safeamp.physics.air import air_at

MOST_RISE = 400.0
"""K above air up to which a balance is looked for; a heatsink that must be hotter sheds the heat at no temperature."""
_LEAST_RISE = 1e-9
_CLOSE = 1e-10  # of the logarithm of the heat
_ROUNDS = 60
_USUAL_SLOPE = 1.25  # of log heat over log rise: free convection goes with the power 5/4


@dataclass(frozen=True, eq=False)
class Geometry:
    """A heatsink by ruler; every value a number or an array of cases.

    Raises
    ------
    ValueError
        If a length is not above zero, the emissivity no ratio, or the fins fill the width.
    """

    width: Any
    """m, of the plate, across the fins."""
    height: Any
    """m, upright, along the fins."""
    depth: Any
    """m, of a fin from plate to tip."""
    thickness: Any
    """m, of a fin."""
    count: Any
    """Fins, >= 1."""
    plate: Any = 0.0
    """m, thickness of the plate."""
    emissivity: Any = 0.1
    """Ratio."""

    def __post_init__(self) -> None:
        """Refuse what no heatsink can be."""
        positive(width=self.width, height=self.height, depth=self.depth, thickness=self.thickness)
        refuse("count", self.count, array(self.count) < 1, "one or more")
        non_negative(plate=self.plate)
        within(0.0, 1.0, emissivity=self.emissivity)
        left = array(self.width) - array(self.count) * array(self.thickness)
        refuse("width less that of all fins", left, left <= 0, "greater than zero")

    @property
    def gap(self) -> Array:
        """Gap between two fins, m; the rest of the plate where there is one fin only."""
        left = array(self.width) - array(self.count) * array(self.thickness)
        return left / np.maximum(array(self.count) - 1.0, 1.0)

    @property
    def envelope(self) -> Array:
        """Surface of the box around plate and fins, m2."""
        width, height, deep = array(self.width), array(self.height), array(self.depth) + array(self.plate)
        return 2.0 * (width * height + deep * height + deep * width)


@dataclass(frozen=True, eq=False)
class FinHeat:
    """What a heatsink sheds, W, by its way."""

    channels: Any
    """From the faces of the fins."""
    back: Any
    """From the back of the plate."""
    radiated: Any
    """From the envelope."""

    @property
    def total(self) -> Any:
        """W, all three."""
        return self.channels + self.back + self.radiated


def fins_heat(*, geometry: Geometry, rise: ArrayLike, air: ArrayLike) -> FinHeat:
    """Return the heat that an upright heatsink sheds `rise` K above the air.

    Faces of the fins as parallel upright plates, less than isothermal by their efficiency; a single fin and the back
    of the plate as upright plates; the envelope as a grey body. The strips of plate between the fins are left out.

    Parameters
    ----------
    geometry : Geometry
        By ruler.
    rise, air : array_like
        K (>= 0) and degC; they broadcast.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    A. Bar-Cohen, W. M. Rohsenow, J. Heat Transfer 106, 1984; Y. Cengel, Heat and Mass Transfer, ch. 9.
    """
    above, height = array(rise), array(geometry.height)
    film = air_at(temperature=array(air) + above / 2.0)
    of_height = convection.rayleigh_number(rise=above, length=height, air=film)
    plate = convection.plate_nusselt(rayleigh=of_height, prandtl=film.prandtl) * film.conductivity / height
    of_gap = convection.rayleigh_number(rise=above, length=geometry.gap, air=film)
    nusselt = convection.channel_nusselt(rayleigh=of_gap, gap=geometry.gap, height=height)
    faces = np.where(array(geometry.count) > 1, nusselt * film.conductivity / geometry.gap, plate)
    efficiency = convection.fin_efficiency(
        coefficient=faces, thickness=geometry.thickness, depth=geometry.depth
    )
    area = 2.0 * array(geometry.count) * array(geometry.depth) * height
    radiated = convection.radiated_heat(
        area=geometry.envelope,
        emissivity=geometry.emissivity,
        surface=array(air) + above,
        surroundings=air,
    )
    return FinHeat(
        channels=efficiency * faces * area * above,
        back=plate * array(geometry.width) * height * above,
        radiated=radiated,
    )


def sink_rise(*, geometry: Geometry, heat: ArrayLike, air: ArrayLike) -> Array:
    """Return the rise of the heatsink above air, K, at which it sheds a heat.

    Parameters
    ----------
    geometry : Geometry
        By ruler.
    heat, air : array_like
        W (>= 0) and degC; they broadcast.

    Returns
    -------
    numpy.ndarray
        K; zero without heat, infinite where even `MOST_RISE` does not shed it.

    Raises
    ------
    ValueError
        If a value is outside its range.
    ArithmeticError
        If the balance does not settle.

    References
    ----------
    Balance of `fins_heat` with the heat; secant on log-log paper, where it is nearly straight.
    """
    non_negative(heat=heat)
    watts = array(heat)
    some = np.where(watts > 0, watts, 1.0)

    def excess(level: Array) -> Array:
        shed: Array = fins_heat(geometry=geometry, rise=np.exp(level), air=air).total
        above: Array = np.log(shed) - np.log(some)
        return above

    found = np.exp(_balance(excess, np.log(_LEAST_RISE), np.log(MOST_RISE)))
    beyond = excess(np.asarray(np.log(MOST_RISE))) < 0
    # Dividing keeps nan: a heat that is not known has no rise.
    rise: Array = np.where(watts == 0, 0.0 * found, np.where(beyond, np.inf, found) * (watts / some))[()]
    return rise


def _balance(excess: Callable[[Array], Array], low: float, high: float) -> Array:
    """Return where a rising, nearly straight function crosses zero; the upper end where it does not reach it."""
    before = np.asarray(high)
    value_before = excess(before)
    beyond = value_before <= 0
    root = np.where(beyond, high, np.maximum(high - value_before / _USUAL_SLOPE, low))
    for _ in range(_ROUNDS):
        value = excess(root)
        open_ = (np.abs(value) > _CLOSE) & ~beyond
        if not np.any(open_):
            return root
        run, climb = root - before, value - value_before
        slope = np.where(open_ & (climb * run > 0), climb, _USUAL_SLOPE) / np.where(climb * run > 0, run, 1.0)
        step = np.where(open_, value / slope, 0.0)
        before, value_before = root, value
        root = np.clip(root - step, low, high)
    raise ArithmeticError("the heat of the fins did not settle; the heatsink is far from any amplifier's")


def sink_to_air(*, geometry: Geometry, heat: ArrayLike, air: ArrayLike) -> Array:
    """Return the thermal resistance of an upright heatsink at the heat that it sheds, K/W.

    Parameters
    ----------
    geometry : Geometry
        By ruler.
    heat, air : array_like
        W (> 0) and degC; they broadcast.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Definition: rise over heat, by `sink_rise`; it falls as the heat grows.
    """
    positive(heat=heat)
    return sink_rise(geometry=geometry, heat=heat, air=air) / array(heat)
