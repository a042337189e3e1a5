"""Free convection at upright plates, between them, and radiation."""

import numpy as np
from numpy.typing import ArrayLike

from safeamp.physics._checks import Array, array, non_negative, positive, within
from safeamp.physics.air import ZERO, Air

GRAVITY = 9.80665
"""m/s2."""
STEFAN_BOLTZMANN = 5.670374419e-8
"""W/(m2 K4) (exact constants of the SI, 2019)."""
FIN_CONDUCTIVITY = 200.0
"""W/(m K) of extruded aluminium (memory)."""


def rayleigh_number(*, rise: ArrayLike, length: ArrayLike, air: Air) -> Array:
    """Return the Rayleigh number of a surface `rise` K above the air.

    Parameters
    ----------
    rise, length : array_like
        K (>= 0) and m (> 0); height of a plate, or gap of a channel.
    air : Air
        At film temperature.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    F. Incropera et al., Fundamentals of Heat and Mass Transfer, Wiley, ch. 9.
    """
    non_negative(rise=rise)
    positive(length=length)
    driven = GRAVITY * array(air.expansion) * array(rise) * array(length) ** 3
    return driven * array(air.prandtl) / array(air.viscosity) ** 2


def plate_nusselt(*, rayleigh: ArrayLike, prandtl: ArrayLike) -> Array:
    """Return the mean Nusselt number, on its height, of an isothermal upright plate.

    Parameters
    ----------
    rayleigh, prandtl : array_like
        On the height (>= 0), and > 0.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    S. W. Churchill, H. H. S. Chu, Int. J. Heat Mass Transfer 18, 1975; Y. Cengel, Heat and Mass Transfer, eq. 9-21.
    """
    non_negative(rayleigh=rayleigh)
    positive(prandtl=prandtl)
    of_gas = (1.0 + (0.492 / array(prandtl)) ** (9.0 / 16.0)) ** (8.0 / 27.0)
    return (0.825 + 0.387 * array(rayleigh) ** (1.0 / 6.0) / of_gas) ** 2


def channel_nusselt(*, rayleigh: ArrayLike, gap: ArrayLike, height: ArrayLike) -> Array:
    """Return the mean Nusselt number, on the gap, between isothermal upright plates.

    Parameters
    ----------
    rayleigh : array_like
        On the gap, >= 0.
    gap, height : array_like
        m, > 0.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    W. Elenbaas, Physica 9, 1942; A. Bar-Cohen, W. M. Rohsenow, J. Heat Transfer 106, 1984, composite relation.
    """
    non_negative(rayleigh=rayleigh)
    positive(gap=gap, height=height)
    number = array(rayleigh) * array(gap) / array(height)
    with np.errstate(divide="ignore"):
        nusselt: Array = (576.0 / number**2 + 2.873 / np.sqrt(number)) ** -0.5
    return nusselt


def best_gap(*, rayleigh: ArrayLike, height: ArrayLike) -> Array:
    """Return the gap, m, at which upright plates on a given width shed the most heat.

    Parameters
    ----------
    rayleigh, height : array_like
        On the height (> 0), and m (> 0).

    Raises
    ------
    ValueError
        If a value is not greater than zero.

    References
    ----------
    A. Bar-Cohen, W. M. Rohsenow, J. Heat Transfer 106, 1984; Y. Cengel, Heat and Mass Transfer, eq. 9-32.
    """
    positive(rayleigh=rayleigh, height=height)
    return 2.714 * array(height) / array(rayleigh) ** 0.25


def fin_efficiency(
    *,
    coefficient: ArrayLike,
    thickness: ArrayLike,
    depth: ArrayLike,
    conductivity: ArrayLike = FIN_CONDUCTIVITY,
) -> Array:
    """Return the heat of a straight fin over that of one as hot at its tip as at its root, ratio.

    Parameters
    ----------
    coefficient : array_like
        W/(m2 K) of its faces, >= 0.
    thickness, depth : array_like
        m, > 0.
    conductivity : array_like
        W/(m K), > 0.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    F. Incropera et al., Fundamentals of Heat and Mass Transfer, Wiley, Table 3.5: tanh(mL)/(mL), adiabatic tip.
    """
    non_negative(coefficient=coefficient)
    positive(thickness=thickness, depth=depth, conductivity=conductivity)
    slender = np.sqrt(2.0 * array(coefficient) / (array(conductivity) * array(thickness))) * array(depth)
    # tanh(x)/x has no value at zero, only a limit of one.
    some = np.where(slender > 1e-9, slender, 1e-9)
    return np.where(np.isnan(slender), np.nan, np.tanh(some) / some)


def radiated_heat(
    *, area: ArrayLike, emissivity: ArrayLike, surface: ArrayLike, surroundings: ArrayLike
) -> Array:
    """Return the heat, W, that a grey body radiates into surroundings that enclose it.

    Parameters
    ----------
    area, emissivity : array_like
        m2 (>= 0) and ratio (0 to 1).
    surface, surroundings : array_like
        degC.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Stefan-Boltzmann law.
    """
    non_negative(area=area)
    within(0.0, 1.0, emissivity=emissivity)
    hot, cold = array(surface) + ZERO, array(surroundings) + ZERO
    return array(emissivity) * STEFAN_BOLTZMANN * array(area) * (hot**4 - cold**4)
