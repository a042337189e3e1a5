"""What stands in series with the mains: a lamp or a resistor, with the ends of what is assumed of it."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Protocol

import numpy as np
import numpy.typing as npt

from safeamp.limits import Limits
from safeamp.physics import lamp, power_up
from safeamp.quantities import Number

Array = npt.NDArray[np.float64]


class InSeries(Protocol):
    """A limiter in series with the mains."""

    def idle(self, mains: Array, apparent: Array, exponent: Array) -> Array:
        """Return the voltage left to a healthy amplifier, V."""

    def fault(self, mains: Array, resistance: Array) -> Array:
        """Return the voltage left to a resistance, V."""

    def current(self, voltage: Array) -> Array:
        """Return the current at a voltage across the limiter, A."""

    def most(self, mains: Array) -> Array:
        """Return the most heat that any resistive fault can draw, W."""


@dataclass(frozen=True, eq=False)
class Lamp:
    """A lamp for the declared voltage; `cold_ratio` is an array over what is assumed of it."""

    rated_power: float
    rated_voltage: Number
    cold_ratio: Array

    def idle(self, mains: Array, apparent: Array, exponent: Array) -> Array:
        """Return the voltage left to a healthy amplifier, V."""
        return power_up.idle_behind_lamp(
            mains=mains,
            apparent_power=apparent,
            exponent=exponent,
            rated_power=self.rated_power,
            rated_voltage=self.rated_voltage,
            cold_ratio=self.cold_ratio,
        )

    def fault(self, mains: Array, resistance: Array) -> Array:
        """Return the voltage left to a resistance, V."""
        return lamp.voltage_behind_lamp(
            mains=mains,
            resistance=resistance,
            rated_power=self.rated_power,
            rated_voltage=self.rated_voltage,
            cold_ratio=self.cold_ratio,
        )

    def current(self, voltage: Array) -> Array:
        """Return the current at a voltage across the lamp, A."""
        return lamp.lamp_current(
            voltage=voltage,
            rated_power=self.rated_power,
            rated_voltage=self.rated_voltage,
            cold_ratio=self.cold_ratio,
        )

    def share(self, voltage: Array) -> Array:
        """Return its power over its rated power."""
        return lamp.power_share(
            voltage=voltage,
            rated_power=self.rated_power,
            rated_voltage=self.rated_voltage,
            cold_ratio=self.cold_ratio,
        )

    def most(self, mains: Array) -> Array:
        """Return the most heat that any resistive fault can draw, W."""
        return power_up.most_through_lamp(
            mains=mains, rated_power=self.rated_power, rated_voltage=self.rated_voltage
        )


@dataclass(frozen=True, eq=False)
class Resistor:
    """A resistor, ohm."""

    resistance: float

    def idle(self, mains: Array, apparent: Array, exponent: Array) -> Array:
        """Return the voltage left to a healthy amplifier, V."""
        return power_up.idle_behind_resistor(
            mains=mains, apparent_power=apparent, exponent=exponent, resistance=self.resistance
        )

    def fault(self, mains: Array, resistance: Array) -> Array:
        """Return the voltage left to a resistance, V."""
        return mains * resistance / (resistance + self.resistance)

    def current(self, voltage: Array) -> Array:
        """Return the current at a voltage across the resistor, A."""
        return voltage / self.resistance

    def most(self, mains: Array) -> Array:
        """Return the most heat that any resistive fault can draw, W."""
        return power_up.most_through_resistor(mains=mains, resistance=self.resistance)


def look(share: float, limits: Limits) -> str:
    """Return how a lamp looks at a share of its rated power."""
    for word in ("dark", "dim"):
        if share <= limits.default(f"power_up.{word}_up_to").nominal:
            return word
    return "bright"


def looks(low: float, high: float, limits: Limits) -> str:
    """Return how a lamp looks from one share to another, such as "dark to dim"."""
    words = dict.fromkeys(look(share, limits) for share in (low, high))
    return " to ".join(words)
