"""Peak dissipation of a class-B stage into a reactive load."""

import numpy as np
from numpy.typing import ArrayLike

from safeamp.physics._checks import Array, array, positive, within


def _sharing(load_magnitude: ArrayLike, phase_angle: ArrayLike) -> Array:
    """Return (1 - sin t)*sin(t + angle) at its maximum, t = (90 deg - 2*angle)/3."""
    positive(load_magnitude=load_magnitude)
    within(-90.0, 90.0, phase_angle=phase_angle)
    angle = np.abs(np.deg2rad(array(phase_angle)))
    t = (np.pi / 2.0 - 2.0 * angle) / 3.0
    sharing: Array = (1.0 - np.sin(t)) * np.sin(t + angle)
    return sharing


def equivalent_resistance(*, load_magnitude: ArrayLike, phase_angle: ArrayLike) -> Array:
    """Return the resistor that stresses the devices as much, at full swing, as a reactive load.

    Parameters
    ----------
    load_magnitude : array_like
        Ohm, > 0.
    phase_angle : array_like
        deg, -90 to 90.

    Returns
    -------
    numpy.ndarray
        Ohm, broadcast shape of the inputs.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    E. Benjamin, J. Audio Eng. Soc. 42(9), 1994.
    """
    resistance: Array = 0.25 * array(load_magnitude) / _sharing(load_magnitude, phase_angle)
    return resistance


def peak_dissipation(*, half_supply: ArrayLike, load_magnitude: ArrayLike, phase_angle: ArrayLike) -> Array:
    """Return the largest instantaneous dissipation of one side in class B at full swing.

    Parameters
    ----------
    half_supply : array_like
        V of each side, > 0.
    load_magnitude : array_like
        Ohm, > 0.
    phase_angle : array_like
        deg, -90 to 90.

    Returns
    -------
    numpy.ndarray
        W, broadcast shape of the inputs; shared by the devices in parallel.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    E. Benjamin, J. Audio Eng. Soc. 42(9), 1994.
    """
    positive(half_supply=half_supply)
    sharing = _sharing(load_magnitude, phase_angle)
    dissipation: Array = array(half_supply) ** 2 / array(load_magnitude) * sharing
    return dissipation
