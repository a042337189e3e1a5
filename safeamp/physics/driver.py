"""A moving-coil driver as a circuit: its motional branch, its impedance, the travel of its cone."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

import numpy as np
from numpy.typing import ArrayLike, NDArray

from safeamp.physics._checks import Array, array, non_negative, positive, refuse

Complex = NDArray[np.complex128]


@dataclass(frozen=True, eq=False)
class Motional:
    """What the moving parts look like behind the coil: three elements in parallel, each a number or one a case."""

    resistance: Any
    """ohm."""
    capacitance: Any
    """F."""
    inductance: Any
    """H."""


@dataclass(frozen=True, eq=False)
class Driver:
    """A driver, or several of them together, as the amplifier sees it."""

    dc_resistance: Any
    """ohm of the coil."""
    motional: Motional
    inductance: Any = 0.0
    """H of the coil."""

    def scaled(self, factor: ArrayLike) -> Driver:
        """Return the driver with every impedance times `factor`: 2 in series, 1/2 in parallel."""
        times, moving = array(factor), self.motional
        positive(factor=times)
        return Driver(
            array(self.dc_resistance) * times,
            Motional(
                array(moving.resistance) * times,
                array(moving.capacitance) / times,
                array(moving.inductance) * times,
            ),
            array(self.inductance) * times,
        )


def motional_elements(
    *, dc_resistance: ArrayLike, resonance: ArrayLike, q_mechanical: ArrayLike, q_electrical: ArrayLike
) -> Motional:
    """Return the motional branch behind the small-signal parameters of a driver.

    Parameters
    ----------
    dc_resistance, resonance, q_mechanical, q_electrical : array_like
        R_e in ohm, f_s in Hz, Q_ms and Q_es as ratios; all > 0.

    Raises
    ------
    ValueError
        If a value is not greater than zero.

    References
    ----------
    Thiele-Small parameters (article), integracoustics: R Q_ms/Q_es, Q_es/(w R), R/(w Q_es).
    """
    positive(
        dc_resistance=dc_resistance,
        resonance=resonance,
        q_mechanical=q_mechanical,
        q_electrical=q_electrical,
    )
    coil, turn, electrical = array(dc_resistance), 2 * np.pi * array(resonance), array(q_electrical)
    return Motional(
        resistance=coil * array(q_mechanical) / electrical,
        capacitance=electrical / (turn * coil),
        inductance=coil / (turn * electrical),
    )


def small_signal_parameters(*, dc_resistance: ArrayLike, motional: Motional) -> tuple[Array, Array, Array]:
    """Return resonance (Hz), mechanical Q and electrical Q of a motional branch behind a coil.

    Parameters
    ----------
    dc_resistance : array_like
        ohm, > 0.
    motional : Motional
        All elements > 0.

    Raises
    ------
    ValueError
        If a value is not greater than zero.

    References
    ----------
    Derived: `motional_elements` solved for the parameters.
    """
    farads, henries = array(motional.capacitance), array(motional.inductance)
    positive(
        dc_resistance=dc_resistance,
        motional_resistance=motional.resistance,
        motional_capacitance=farads,
        motional_inductance=henries,
    )
    turn = 1 / np.sqrt(farads * henries)
    return (
        turn / (2 * np.pi),
        turn * farads * array(motional.resistance),
        turn * farads * array(dc_resistance),
    )


def motional_from_mechanics(
    *, force_factor: ArrayLike, moving_mass: ArrayLike, compliance: ArrayLike, q_mechanical: ArrayLike
) -> Motional:
    """Return the motional branch behind the moving parts of a driver.

    Parameters
    ----------
    force_factor, moving_mass, compliance, q_mechanical : array_like
        Bl in N/A, M_ms in kg, C_ms in m/N, Q_ms as a ratio; all > 0.

    Raises
    ------
    ValueError
        If a value is not greater than zero.

    References
    ----------
    Derived: velocity u = e/Bl, force Bl i; M/Bl^2, C Bl^2, and Q_ms times the reactance at resonance.
    """
    positive(
        force_factor=force_factor, moving_mass=moving_mass, compliance=compliance, q_mechanical=q_mechanical
    )
    squared = array(force_factor) ** 2
    farads, henries = array(moving_mass) / squared, array(compliance) * squared
    return Motional(array(q_mechanical) * np.sqrt(henries / farads), farads, henries)


def mechanics(*, force_factor: ArrayLike, motional: Motional) -> tuple[Array, Array]:
    """Return moving mass (kg) and compliance (m/N) behind a motional branch.

    Parameters
    ----------
    force_factor : array_like
        N/A, > 0.
    motional : Motional
        All elements > 0.

    Raises
    ------
    ValueError
        If a value is not greater than zero.

    References
    ----------
    Derived: `motional_from_mechanics` solved for mass and compliance.
    """
    positive(
        force_factor=force_factor,
        motional_capacitance=motional.capacitance,
        motional_inductance=motional.inductance,
    )
    squared = array(force_factor) ** 2
    return array(motional.capacitance) * squared, array(motional.inductance) / squared


def free_resonance(*, moving_mass: ArrayLike, compliance: ArrayLike) -> Array:
    """Return the resonance, Hz, of a mass on a spring.

    Parameters
    ----------
    moving_mass, compliance : array_like
        kg and m/N, > 0.

    Raises
    ------
    ValueError
        If a value is not greater than zero.

    References
    ----------
    Derived: 1/(2 pi sqrt(M C)).
    """
    positive(moving_mass=moving_mass, compliance=compliance)
    return 1 / (2 * np.pi * np.sqrt(array(moving_mass) * array(compliance)))


def electrical_q(
    *, dc_resistance: ArrayLike, force_factor: ArrayLike, moving_mass: ArrayLike, resonance: ArrayLike
) -> Array:
    """Return the electrical Q of a driver.

    Parameters
    ----------
    dc_resistance, force_factor, moving_mass, resonance : array_like
        ohm, N/A, kg, Hz; all > 0.

    Raises
    ------
    ValueError
        If a value is not greater than zero.

    References
    ----------
    Derived: 2 pi f_s M R_e/Bl^2.
    """
    positive(
        dc_resistance=dc_resistance,
        force_factor=force_factor,
        moving_mass=moving_mass,
        resonance=resonance,
    )
    return 2 * np.pi * array(resonance) * array(moving_mass) * array(dc_resistance) / array(force_factor) ** 2


def _turning(frequency: ArrayLike) -> Complex:
    """Return j times the turns of a frequency in radians a second."""
    s: Complex = np.asarray(2j * np.pi * array(frequency), dtype=np.complex128)
    return s


def complex_impedance(*, driver: Driver, frequency: ArrayLike) -> Complex:
    """Return the complex impedance of a driver, ohm.

    Parameters
    ----------
    driver : Driver
        Its values broadcast against the frequencies.
    frequency : array_like
        Hz, >= 0; at zero the coil alone is left.

    Raises
    ------
    ValueError
        If a frequency is below zero.

    References
    ----------
    Derived: coil and inductance in series with the motional branch.
    """
    non_negative(frequency=frequency)
    s = _turning(frequency)
    found: Complex = array(driver.dc_resistance) + s * array(driver.inductance) + s / _moving(driver, s)
    return found


def _moving(driver: Driver, s: Complex) -> Complex:
    """Return s over the motional impedance, which stays finite at no frequency."""
    parts = driver.motional
    found: Complex = (
        s / array(parts.resistance) + s**2 * array(parts.capacitance) + 1 / array(parts.inductance)
    )
    return found


def impedance(*, driver: Driver, frequency: ArrayLike) -> tuple[Array, Array]:
    """Return magnitude (ohm) and angle (deg) of the impedance of a driver.

    Parameters
    ----------
    driver : Driver
        Its values broadcast against the frequencies.
    frequency : array_like
        Hz, >= 0; at zero the coil alone is left.

    Raises
    ------
    ValueError
        If a frequency is below zero.

    References
    ----------
    Derived: coil and inductance in series with the motional branch.
    """
    found = complex_impedance(driver=driver, frequency=frequency)
    return np.abs(found), np.rad2deg(np.angle(found))


def impedance_at_resonance(
    *, dc_resistance: ArrayLike, q_mechanical: ArrayLike, q_electrical: ArrayLike
) -> Array:
    """Return the impedance, ohm, at resonance, the inductance of the coil left out.

    Parameters
    ----------
    dc_resistance, q_mechanical, q_electrical : array_like
        ohm and ratios, all > 0.

    Raises
    ------
    ValueError
        If a value is not greater than zero.

    References
    ----------
    Thiele-Small parameters (article), integracoustics: R_e (1 + Q_ms/Q_es).
    """
    positive(dc_resistance=dc_resistance, q_mechanical=q_mechanical, q_electrical=q_electrical)
    return array(dc_resistance) * (1 + array(q_mechanical) / array(q_electrical))


def excursion(*, driver: Driver, force_factor: ArrayLike, peak: ArrayLike, frequency: ArrayLike) -> Array:
    """Return the peak travel of the cone one way, m, for a sine at the terminals.

    Parameters
    ----------
    driver : Driver
        One driver; its values broadcast against the others.
    force_factor : array_like
        N/A, > 0.
    peak, frequency : array_like
        V (>= 0) and Hz (>= 0; at zero a direct voltage).

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Derived: back voltage e of the motional branch, velocity e/Bl, travel velocity over 2 pi f.
    """
    positive(force_factor=force_factor)
    non_negative(peak=peak, frequency=frequency)
    s = _turning(frequency)
    coil = array(driver.dc_resistance) + s * array(driver.inductance)
    return array(peak) / (array(force_factor) * np.abs(s + coil * _moving(driver, s)))


def largest_excursion(
    *, driver: Driver, force_factor: ArrayLike, peak: ArrayLike, lowest: ArrayLike, highest: ArrayLike
) -> Array:
    """Return the largest peak travel of the cone, m, for a sine anywhere between two frequencies.

    The inductance of the coil is left out: about the resonance its share is small.

    Parameters
    ----------
    driver, force_factor, peak
        As for `excursion`.
    lowest, highest : array_like
        Hz, >= 0, the second not below the first.

    Raises
    ------
    ValueError
        If a value is outside its range.

    References
    ----------
    Derived: a low-pass of second order, largest at f_s sqrt(1 - 1/(2 Q^2)), held to the range.
    """
    refuse("highest", highest, array(highest) < array(lowest), "at least lowest")
    found, mechanical, electrical = small_signal_parameters(
        dc_resistance=driver.dc_resistance, motional=driver.motional
    )
    total = mechanical * electrical / (mechanical + electrical)
    top = found * np.sqrt(np.maximum(1 - 1 / (2 * total**2), 0.0))
    return excursion(
        driver=Driver(driver.dc_resistance, driver.motional),
        force_factor=force_factor,
        peak=peak,
        frequency=np.clip(top, array(lowest), array(highest)),
    )
