"""Voltage and current of the worst device while a sine flows through a load.

Arrays have the phase on their first axis and the cases behind it: so the inner loops run over thousands of cases
instead of a few phases.
"""

from dataclasses import dataclass, field
from typing import Any

import numpy as np
from numpy.typing import ArrayLike, NDArray

from safeamp.physics._checks import Array, array, non_negative, refuse
from safeamp.physics.stage import Law, carrying_current, device_currents, worst_device_current
from safeamp.physics.stage.law import carries_alone

Marks = NDArray[np.bool_]
NEGLIGIBLE = 1e-6
"""Relative error of a current below which the current of the partner device is left out."""
ROUGH = 1e-3
"""The same while phases are only compared with each other."""


@dataclass(frozen=True, eq=False)
class Device:
    """The worst of parallel devices of one side; every value a number or an array of cases."""

    supply: Any
    """V of the side."""
    swing: Any
    """V, peak of the output."""
    each: Any
    """A, peak of the load current that one device carries."""
    resistor: Any
    idle: Any
    pairs: Any
    law: Law
    imbalance: Any
    parameter: Any
    thermal_voltage: float
    angle: Any
    """deg, 0 to 90, of the load."""
    cosine: Any = field(init=False)
    sine: Any = field(init=False)

    def __post_init__(self) -> None:
        """Refuse what no stage can do, and turn the angle once."""
        non_negative(idle_current=self.idle, emitter_resistor=self.resistor)
        refuse("pairs", self.pairs, array(self.pairs) < 1, "one or more")
        if self.imbalance is not None:
            non_negative(imbalance=self.imbalance)
        radians = np.deg2rad(self.angle)
        object.__setattr__(self, "cosine", np.cos(radians))
        object.__setattr__(self, "sine", np.sin(radians))

    def voltage(self, sine: Array, cosine: Array, mean: Array) -> Array:
        """Return the voltage across the device at a phase of the load current, V."""
        output = sine * self.cosine - cosine * self.sine
        across: Array = self.supply - self.swing * output - mean * self.resistor
        return across

    def mean_current(self, sine: Array) -> Array:
        """Return the current of the mean device at a phase of the load current, A."""
        load: Array = self.each * sine
        if np.all(self.alone(np.min(sine))):
            return load
        return carrying_current(
            load_current=load,
            idle_current=self.idle,
            emitter_resistor=self.resistor,
            law=self.law,
            transconductance_parameter=self.parameter,
            thermal_voltage=self.thermal_voltage,
        )

    def worst_current(self, mean: Array) -> Array:
        """Return the current of the worst of parallel devices, A."""
        if np.all(self.pairs == 1):
            return mean
        if self.imbalance is not None:
            uneven: Array = mean * (1.0 + np.where(self.pairs == 1, 0.0, self.imbalance))
            return uneven
        return worst_device_current(
            mean=mean,
            emitter_resistor=self.resistor,
            pairs=self.pairs,
            thermal_voltage=self.thermal_voltage,
        )

    def at(self, sine: Array) -> tuple[Array, Array]:
        """Return device voltage and worst current at sines of the phase of the load current, from -90 to 90 deg."""
        mean = self.mean_current(sine)
        cosine = np.sqrt(np.maximum(1.0 - sine**2, 0.0))
        return self.voltage(sine, cosine, mean), self.worst_current(mean)

    def over(self, rising: Array, axes: int) -> tuple[Array, Array, Array]:
        """Return phases, device voltage and worst current over positive phases and their mirror images.

        Parameters
        ----------
        rising : numpy.ndarray
            deg, rising from above 0 to 90.
        axes : int
            Axes of the cases.

        Returns
        -------
        tuple of numpy.ndarray
            deg, rising, of shape (phases,); V and A of shape (phases, cases). Without the negative phases at which
            the device carries next to nothing.
        """
        sines = np.sin(np.deg2rad(rising))
        shared = int(np.sum(~self.alone(sines, ROUGH)))
        columns = sines.reshape(-1, *(1,) * axes)
        load = self.each * columns
        larger, smaller = load[:shared], load[:0]
        if shared:
            larger, smaller = device_currents(
                load_current=load[:shared],
                idle_current=self.idle,
                emitter_resistor=self.resistor,
                law=self.law,
                transconductance_parameter=self.parameter,
                thermal_voltage=self.thermal_voltage,
            )
        alone = np.broadcast_to(load[shared:], (len(load) - shared, *larger.shape[1:]))
        mean = np.concatenate([smaller[::-1], larger, alone])
        phases = np.concatenate([-rising[:shared][::-1], rising])
        turned = np.concatenate([-columns[:shared][::-1], columns])
        cosine = np.cos(np.deg2rad(phases)).reshape(turned.shape)
        return phases, self.voltage(turned, cosine, mean), self.worst_current(mean)

    @property
    def shape(self) -> tuple[int, ...]:
        """Shape of the cases."""
        values = (self.supply, self.swing, self.each, self.resistor, self.idle, self.pairs, self.angle)
        return np.broadcast_shapes(
            *(np.shape(value) for value in (*values, self.imbalance, self.parameter) if value is not None)
        )

    @property
    def highest(self) -> Array:
        """V across the device at most."""
        found: Array = self.supply + self.swing
        return found

    def alone(self, sine: ArrayLike, error: float = NEGLIGIBLE) -> Marks:
        """Tell whether the device carries the load current alone at a sine, in every case."""
        return carries_alone(
            load_current=np.min(self.each) * sine,
            idle_current=self.idle,
            emitter_resistor=self.resistor,
            law=self.law,
            error=error,
            thermal_voltage=self.thermal_voltage,
        )


def device_of(
    *,
    half_supply: ArrayLike,
    peak: ArrayLike,
    load_magnitude: ArrayLike,
    phase_angle: ArrayLike,
    conducting: ArrayLike,
    emitter_resistor: ArrayLike,
    idle_current: ArrayLike,
    law: Law,
    imbalance: ArrayLike | None,
    transconductance_parameter: ArrayLike | None,
    thermal_voltage: float,
) -> Device:
    """Return the worst device of a stage into a load."""
    return Device(
        supply=array(half_supply),
        swing=array(peak),
        each=array(peak) / array(load_magnitude) / array(conducting),
        resistor=array(emitter_resistor),
        idle=array(idle_current),
        pairs=array(conducting),
        law=law,
        imbalance=None if imbalance is None else array(imbalance),
        parameter=None if transconductance_parameter is None else array(transconductance_parameter),
        thermal_voltage=thermal_voltage,
        angle=np.abs(array(phase_angle)),
    )
