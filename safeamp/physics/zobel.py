"""Network of resistor and capacitor across the output."""

import numpy as np
from numpy.typing import ArrayLike

from safeamp.physics._checks import Array, array, non_negative, positive


def dissipation(
    *, voltage_rms: ArrayLike, resistance: ArrayLike, capacitance: ArrayLike, frequency: ArrayLike
) -> Array:
    """Return the heat, W, of the resistor of a Zobel network.

    Parameters
    ----------
    voltage_rms, resistance, capacitance, frequency : array_like
        V (>= 0), ohm (> 0), F (> 0), Hz (> 0); they broadcast.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Derived: V^2 R / (R^2 + Xc^2).
    """
    non_negative(voltage_rms=voltage_rms)
    positive(resistance=resistance, capacitance=capacitance, frequency=frequency)
    ohms = array(resistance)
    reactance = 1 / (2 * np.pi * array(frequency) * array(capacitance))
    return array(voltage_rms) ** 2 * ohms / (ohms**2 + reactance**2)
