"""Output stage: swing, currents of the devices, heat, supply current."""

from safeamp.physics.stage.class_b import (
    class_b_heat,
    mean_supply_current,
    noise_heat,
    worst_resistive_heat,
    worst_sine_peak,
)
from safeamp.physics.stage.heat import (
    MeanCurrents,
    heat_of_currents,
    mean_currents,
    mean_rail_current,
    no_signal_heat,
    pair_heat,
)
from safeamp.physics.stage.law import (
    THERMAL_VOLTAGE,
    Law,
    carrying_current,
    device_currents,
    worst_device_current,
)
from safeamp.physics.stage.swing import clipped_peak, level_peak, load_combination, load_power

__all__ = [
    "THERMAL_VOLTAGE",
    "Law",
    "MeanCurrents",
    "carrying_current",
    "class_b_heat",
    "clipped_peak",
    "device_currents",
    "heat_of_currents",
    "level_peak",
    "load_combination",
    "load_power",
    "mean_currents",
    "mean_rail_current",
    "mean_supply_current",
    "no_signal_heat",
    "noise_heat",
    "pair_heat",
    "worst_device_current",
    "worst_resistive_heat",
    "worst_sine_peak",
]
