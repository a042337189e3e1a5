"""Dry air at one atmosphere: what free convection needs of it."""

from dataclasses import dataclass
from typing import Any

import numpy as np
from numpy.typing import ArrayLike

from safeamp.physics._checks import array, within

ZERO = 273.15
"""K at 0 degC."""
PRESSURE = 101325.0
"""Pa, one atmosphere; thinner air cools less."""
GAS_CONSTANT = 287.053
"""J/(kg K) of dry air (U.S. Standard Atmosphere, 1976)."""
HEAT_CAPACITY = 1007.0
"""J/(kg K) at constant pressure (F. Incropera et al., Fundamentals of Heat and Mass Transfer, Wiley, Table A.4)."""


@dataclass(frozen=True, eq=False)
class Air:
    """Properties of air; every field a number or an array of cases."""

    conductivity: Any
    """W/(m K)."""
    viscosity: Any
    """Kinematic, m2/s."""
    prandtl: Any
    """Ratio."""
    expansion: Any
    """1/K, of an ideal gas."""


def air_at(*, temperature: ArrayLike) -> Air:
    """Return the properties of air at a film temperature.

    Parameters
    ----------
    temperature : array_like
        degC, -100 to 800.

    Raises
    ------
    ValueError
        If the temperature is outside its range.

    References
    ----------
    U.S. Standard Atmosphere, 1976, NOAA/NASA/USAF, eq. (51) and (53): viscosity and thermal conductivity.
    """
    within(-100.0, 800.0, temperature=temperature)
    kelvin = array(temperature) + ZERO
    dynamic = 1.458e-6 * kelvin**1.5 / (kelvin + 110.4)
    conductivity = 2.64638e-3 * kelvin**1.5 / (kelvin + 245.4 * 10.0 ** (-12.0 / kelvin))
    return Air(
        conductivity=conductivity,
        viscosity=dynamic * GAS_CONSTANT * kelvin / PRESSURE,
        prandtl=dynamic * HEAT_CAPACITY / conductivity,
        expansion=np.reciprocal(kelvin),
    )
