"""Every formula with one value, range and unit a parameter: what the tests of ranges and units run on."""

from dataclasses import dataclass, field
from types import ModuleType

from safeamp.physics import (
    bias,
    capacitor,
    coil_heating,
    feedback,
    fuse,
    heat,
    lamp,
    limiter,
    loudspeaker,
    offset,
    power_up,
    settling,
    soak,
    supply,
    zobel,
)

MODULES: tuple[ModuleType, ...] = (
    bias, capacitor, coil_heating, feedback, fuse, heat, lamp, limiter, loudspeaker, offset, power_up, settling, soak,
    supply, zobel,
)  # fmt: skip

P, N, F = "greater than zero", "zero or more", "free"


@dataclass(frozen=True)
class Formula:
    module: ModuleType
    name: str
    unit: str
    """Unit of the result; "" a ratio, None where quantities cannot run through (a scaling test stands in)."""
    given: dict[str, tuple[float, str, str]]
    """Parameter: value, range, unit."""
    words: dict[str, object] = field(default_factory=dict)

    def __call__(self, **changed):
        numbers = {name: value for name, (value, _, _) in self.given.items()}
        return getattr(self.module, self.name)(**{**numbers, **self.words, **changed})

    def __str__(self):
        return f"{self.module.__name__.rpartition('.')[2]}.{self.name}"


FAULT = {
    "voltage": (35.0, N, "V"),
    "dc_resistance": (6.0, P, "ohm"),
    "coil_to_magnet": (2.0, P, "K/W"),
    "coil_time_constant": (4.0, P, "s"),
    "magnet_to_air": (1.5, P, "K/W"),
    "magnet_time_constant": (900.0, P, "s"),
    "start": (25.0, F, "K"),
    "air": (25.0, F, "K"),
}
LAMP = {"rated_power": (60.0, P, "W"), "rated_voltage": (230.0, P, "V")}
IDLE_DRAW = {
    "mains": (230.0, P, "V"),
    "apparent_power": (15.0, N, "W"),
    "exponent": (1.5, F, ""),
}
CHARGE = {
    "supply": (15.0, F, "V"),
    "resistance": (1e4, P, "ohm"),
    "capacitance": (1e-4, P, "F"),
    "time": (3.0, N, "s"),
}
TURN_ON = {
    "capacitance": (2.2e-3, P, "F"),
    "load_resistance": (8.0, P, "ohm"),
    "midpoint": (30.0, F, "V"),
    "rise_time": (0.05, N, "s"),
}
SEEN = {
    "junction_to_case": (0.7, N, "K/W"),
    "case_to_sink": (0.45, N, "K/W"),
    "sink_to_air": (1.5, N, "K/W"),
    "conducting": (1.0, P, ""),
    "shared_by": (1.0, P, ""),
    "tracking": (0.8, F, ""),
}
COIL = {"voltage": (0.05, F, "V"), "dc_resistance": (6.0, P, "ohm")}
DRIVER = {"force_factor": (8.2, P, "N/A"), "compliance": (1.34e-3, P, "m/N")}

FORMULAS = (
    Formula(heat, "sink_temperature", "K", {
        "air": (25.0, F, "K"), "stage_power": (40.0, N, "W"), "shared_by": (2.0, P, ""),
        "sink_to_air": (0.5, N, "K/W"), "other_heat": (3.0, N, "W"),
    }),
    Formula(heat, "case_temperature", "K", {
        "sink": (55.0, F, "K"), "device_power": (20.0, N, "W"), "case_to_sink": (0.5, N, "K/W"),
    }),
    Formula(heat, "junction_temperature", "K", {
        "case": (65.0, F, "K"), "device_power": (20.0, N, "W"), "junction_to_case": (1.5, N, "K/W"),
    }),
    Formula(heat, "free_air_junction", "K", {
        "air": (25.0, F, "K"), "device_power": (0.5, N, "W"), "junction_to_ambient": (60.0, N, "K/W"),
    }),
    Formula(heat, "hottest_device_power", "W", {
        "stage_power": (40.0, N, "W"), "conducting": (2.0, P, ""), "imbalance": (0.2, N, ""),
    }),
    Formula(heat, "allowed_power", "W", {
        "junction_limit": (150.0, F, "K"), "air": (40.0, F, "K"), "resistance": (2.6, P, "K/W"),
    }),
    Formula(heat, "sink_to_air_needed", "K/W", {
        "junction": (125.0, F, "K"), "air": (40.0, F, "K"), "power": (5.0, P, "W"),
        "junction_to_case": (2.5, N, "K/W"), "case_to_sink": (1.0, N, "K/W"),
    }),
    Formula(heat, "printed_junction_to_case", "K/W", {
        "power": (115.0, P, "W"), "junction_limit": (200.0, F, "K"), "power_at": (25.0, F, "K"),
    }),
    Formula(heat, "derated_power", "W", {
        "power": (80.0, P, "W"), "derating": (0.5, P, "W/K"), "case_temperature": (125.0, F, "K"),
        "power_at": (25.0, F, "K"),
    }),
    Formula(heat, "transient_rise", "K", {
        "normalized": (0.22, N, ""), "peak_power": (2.0, N, "W"), "resistance": (200.0, N, "K/W"),
    }),
    Formula(bias, "idle_current", "A", {"drop": (0.02, N, "V"), "emitter_resistor": (0.22, P, "ohm")}),
    Formula(bias, "oliver_idle", "A", {"emitter_resistor": (0.22, P, "ohm"), "drop": (0.026, P, "V")}),
    Formula(bias, "current_imbalance", "", {
        "current": (0.5, N, "A"), "emitter_resistor": (0.22, N, "ohm"), "spread": (0.05, N, "V"),
        "thermal_voltage": (0.0257, P, "V"),
    }),
    Formula(bias, "control_difference", "V", {
        "current": (0.12, P, "A"), "mean": (0.1, P, "A"), "emitter_resistor": (0.22, N, "ohm"),
        "junctions": (2.0, P, ""), "thermal_voltage": (0.0257, P, "V"),
    }),
    Formula(feedback, "sink_resistance", "K/W", {
        "sink_to_air": (1.5, N, "K/W"), "conducting": (1.0, P, ""), "shared_by": (1.0, P, ""),
    }),
    Formula(feedback, "seen_resistance", "K/W", SEEN, {"sensor": "heatsink"}),
    Formula(feedback, "current_slope_bipolar", "A/K", {
        "current": (0.1, P, "A"), "emitter_resistor": (0.22, N, "ohm"), "drift": (0.002, F, "V/K"),
        "thermal_voltage": (0.0257, P, "V"),
    }),
    Formula(feedback, "current_slope_mosfet", "A/K", {
        "current": (0.1, P, "A"), "source_resistor": (0.22, N, "ohm"),
        "transconductance_parameter": (3.0, P, "A/V**2"), "drift": (0.0064, F, "V/K"),
    }),
    Formula(feedback, "loop_index", "", {
        "device_voltage": (52.0, P, "V"), "seen_resistance": (4.15, F, "K/W"),
        "current_slope": (4e-3, F, "A/K"),
    }),
    Formula(settling, "programme_rise", "K", {
        "sink": (60.0, F, "K"), "air": (30.0, F, "K"), "sink_resistance": (3.0, N, "K/W"),
        "device_voltage": (52.0, P, "V"), "set_current": (0.05, P, "A"),
    }),
    Formula(settling, "idle_junction", "K", {
        "current": (0.05, N, "A"), "device_voltage": (52.0, P, "V"), "junction_to_case": (0.7, N, "K/W"),
        "case_to_sink": (0.45, N, "K/W"), "sink_resistance": (3.0, N, "K/W"), "air": (30.0, F, "K"),
        "sink_rise": (5.0, F, "K"),
    }),
    Formula(settling, "settled_idle", None, {
        "set_current": (0.02, P, "A"), "device_voltage": (52.0, P, "V"), "junction_to_case": (0.7, N, "K/W"),
        "case_to_sink": (0.45, N, "K/W"), "sink_resistance": (1.0, N, "K/W"), "tracking": (0.8, F, ""),
        "set_air": (30.0, F, "K"), "air": (32.0, F, "K"), "junction_limit": (150.0, F, "K"),
        "drift": (0.002, F, "V/K"), "emitter_resistor": (0.22, N, "ohm"), "sink_rise": (5.0, N, "K"),
        "thermal_voltage": (0.0257, P, "V"),
    }, {"sensor": "heatsink", "idle_at": "cold"}),
    Formula(capacitor, "cutoff_frequency", "Hz", {
        "capacitance": (1e-3, P, "F"), "load_resistance": (8.0, P, "ohm"),
    }),
    Formula(capacitor, "capacitance_for_cutoff", "F", {
        "cutoff": (20.0, P, "Hz"), "load_resistance": (8.0, P, "ohm"),
    }),
    Formula(capacitor, "gain", "", {
        "frequency": (20.0, N, "Hz"), "capacitance": (1e-3, P, "F"), "load_resistance": (8.0, P, "ohm"),
    }),
    Formula(capacitor, "load_current", "A", {"power": (8.0, N, "W"), "load_resistance": (8.0, P, "ohm")}),
    Formula(capacitor, "ripple_rms", "A", {"load_rms": (1.0, N, "A")}),
    Formula(capacitor, "leakage_current", "A", {
        "drop": (0.5, F, "V"), "resistor": (1e3, P, "ohm"), "largest_resistor": (1e4, F, "ohm"),
    }),
    Formula(capacitor, "leakage_limit", "A", {
        "capacitance": (2.2e-3, P, "F"), "rated_voltage": (63.0, P, "V"), "rate": (0.01, P, "1/s"),
    }),
    Formula(capacitor, "charging_voltage", "V", CHARGE),
    Formula(capacitor, "charging_current", "A", CHARGE),
    Formula(capacitor, "turn_on_peak", "V", TURN_ON),
    Formula(capacitor, "turn_on_energy", "J", TURN_ON),
    Formula(capacitor, "step_energy", "J", {"capacitance": (2.2e-3, P, "F"), "step": (30.0, F, "V")}),
    Formula(capacitor, "settling_time", "s", {
        "capacitance": (2.2e-3, P, "F"), "resistance": (1e3, P, "ohm"), "time_constants": (5.0, P, ""),
    }),
    Formula(zobel, "dissipation", "W", {
        "voltage_rms": (20.0, N, "V"), "resistance": (10.0, P, "ohm"), "capacitance": (1e-7, P, "F"),
        "frequency": (2e4, P, "Hz"),
    }),
    Formula(offset, "coil_current", "A", COIL),
    Formula(offset, "coil_power", "W", COIL),
    Formula(offset, "cone_displacement", "m", {**COIL, **DRIVER}),
    Formula(offset, "allowed_dc", "V", {
        **DRIVER, "linear_excursion": (6.5e-3, P, "m"), "dc_resistance": (5.5, P, "ohm"),
        "share": (0.1, P, ""),
    }),
    Formula(offset, "detector_threshold", "V", {
        "time_constant": (1.0, P, "s"), "step": (32.0, F, "V"), "trip_after": (0.05, N, "s"),
    }),
    Formula(offset, "detector_delay", "s", {
        "time_constant": (1.0, P, "s"), "step": (32.0, P, "V"), "threshold": (2.0, P, "V"),
    }),
    Formula(supply, "scaled", "V", {
        "reading": (35.0, F, "V"), "mains": (253.0, P, "V"), "at_mains": (230.0, P, "V"),
    }),
    Formula(supply, "level_rail", "V", {
        "no_load": (35.0, P, "V"), "full_load": (30.0, P, "V"), "fraction": (0.125, F, ""),
    }),
    Formula(supply, "ripple_peak_to_peak", "V", {
        "current": (1.0, N, "A"), "capacitance": (4.7e-3, P, "F"), "frequency": (50.0, P, "Hz"),
    }),
    Formula(supply, "ripple_rms", "V", {"peak_to_peak": (4.0, N, "V")}),
    Formula(supply, "regulation", "", {"no_load": (60.0, P, "V"), "full_load": (56.0, P, "V")}),
    Formula(supply, "secondary_current", "A", {"mean_current": (2.0, N, "A"), "form_factor": (1.7, F, "")}),
    Formula(supply, "transformer_va", "W", {
        "power": (100.0, N, "W"), "mean_current": (1.5, N, "A"), "factor": (1.4, P, ""),
        "rectifier_drop": (2.0, N, "V"),
    }),
    Formula(supply, "volts_per_hertz", "", {
        "actual": (240.0, P, "V"), "rated": (220.0, P, "V"), "frequency": (50.0, P, "Hz"),
        "rated_frequency": (60.0, P, "Hz"),
    }),
    Formula(limiter, "sense_resistor", "ohm", {"limit_current": (3.0, P, "A"), "threshold": (0.65, P, "V")}),
    Formula(limiter, "shorted_current", "A", {
        "limit_current": (3.0, P, "A"), "half_supply": (23.0, P, "V"), "slope_voltage": (60.0, P, "V"),
    }),
    Formula(limiter, "sensed_limit", "A", {
        "voltage": (20.0, N, "V"), "emitter_resistor": (0.22, P, "ohm"), "to_emitter": (330.0, P, "ohm"),
        "to_output": (1000.0, P, "ohm"), "to_rail": (22e3, P, "ohm"), "threshold": (0.65, P, "V"),
    }),
    Formula(limiter, "closing_voltage", "V", {
        "to_emitter": (330.0, P, "ohm"), "to_output": (1000.0, P, "ohm"), "to_rail": (22e3, P, "ohm"),
        "threshold": (0.65, P, "V"),
    }),
    Formula(limiter, "shorted_power", "W", {"shorted_current": (1.8, P, "A"), "half_supply": (23.0, P, "V")}),
    Formula(loudspeaker, "rated_noise_power", "W", {"power": (100.0, N, "W")}, {"word": "programme"}),
    Formula(loudspeaker, "noise_voltage", "V", {"power": (125.0, N, "W"), "impedance": (6.0, P, "ohm")}),
    Formula(loudspeaker, "programme_power", "W", {"power": (50.0, N, "W"), "crest_factor": (4.0, P, "")}),
    Formula(loudspeaker, "crest_decibels", "", {"crest_factor": (2.0, P, "")}),
    Formula(loudspeaker, "power_change", "", {"resistance_ratio": (1.8, P, "")}),
    Formula(loudspeaker, "minimum_allowed_impedance", "ohm", {
        "nominal": (8.0, P, "ohm"), "share": (0.8, P, ""),
    }),
    Formula(loudspeaker, "dc_fault_current", "A", {
        "voltage": (60.0, N, "V"), "dc_resistance": (5.6, P, "ohm"),
    }),
    Formula(loudspeaker, "dc_fault_power", "W", {
        "voltage": (60.0, N, "V"), "dc_resistance": (5.6, P, "ohm"),
    }),
    Formula(coil_heating, "copper_ratio", "", {
        "rise": (200.0, F, "K"), "start": (25.0, F, "K"), "coefficient": (0.00393, P, "1/K"),
        "coefficient_at": (20.0, F, "K"),
    }),
    Formula(coil_heating, "fault_coil_temperature", None, {**FAULT, "time": (10.0, N, "s")}),
    Formula(coil_heating, "time_to_temperature", None, {**FAULT, "limit": (180.0, F, "K")}),
    Formula(coil_heating, "settled_coil_temperature", None, {
        name: FAULT[name] for name in ("voltage", "dc_resistance", "coil_to_magnet", "magnet_to_air", "air")
    }),
    Formula(fuse, "slowest_time", None, {"times_rating": (3.0, N, "")}, {"gates": fuse.GATES["T"]}),
    Formula(fuse, "fastest_time", None, {"times_rating": (3.0, N, "")}, {"gates": fuse.GATES["T"]}),
    Formula(soak, "settling_temperature", "K", {
        "time": (600.0, F, "s"), "start": (24.0, F, "K"), "end": (62.0, F, "K"), "time_constant": (1200.0, P, "s"),
    }),
    Formula(soak, "soak_resistance", "K/W", {
        "sink": (62.0, F, "K"), "air": (24.0, F, "K"), "power": (38.0, P, "W"),
    }),
    Formula(lamp, "hot_resistance", "ohm", LAMP),
    Formula(lamp, "lamp_resistance", "ohm", {
        "voltage": (100.0, N, "V"), **LAMP, "cold_ratio": (12.0, F, ""),
    }),
    Formula(lamp, "lamp_current", "A", {"voltage": (100.0, N, "V"), **LAMP, "cold_ratio": (12.0, F, "")}),
    Formula(lamp, "worst_fault_power", "W", {"rated_power": (60.0, P, "W")}),
    Formula(lamp, "power_share", "", {"voltage": (100.0, N, "V"), **LAMP, "cold_ratio": (12.0, F, "")}),
    Formula(lamp, "voltage_behind_lamp", None, {
        "mains": (230.0, P, "V"), "resistance": (500.0, N, "ohm"), **LAMP, "cold_ratio": (12.0, F, ""),
    }),
    Formula(power_up, "winding_resistance", "ohm", {
        "no_load": (34.0, P, "V"), "full_load": (31.0, P, "V"), "mean_current": (1.1, P, "A"),
    }),
    Formula(power_up, "seen_from_mains", "ohm", {
        "resistance": (6.0, N, "ohm"), "mains": (230.0, P, "V"), "no_load": (68.0, P, "V"),
    }),
    Formula(power_up, "idle_mains_current", "A", {"voltage": (200.0, N, "V"), **IDLE_DRAW}),
    Formula(power_up, "idle_behind_lamp", None, {**IDLE_DRAW, **LAMP, "cold_ratio": (12.0, F, "")}),
    Formula(power_up, "idle_behind_resistor", None, {**IDLE_DRAW, "resistance": (680.0, P, "ohm")}),
    Formula(power_up, "most_through_lamp", "W", {"mains": (230.0, P, "V"), **LAMP}),
    Formula(power_up, "most_through_resistor", "W", {
        "mains": (230.0, P, "V"), "resistance": (680.0, P, "ohm"),
    }),
    Formula(power_up, "flash_time", "s", {
        "mains": (230.0, P, "V"), "capacitance": (3e-4, N, "F"), **LAMP,
    }),
)  # fmt: skip
"""Formulas whose parameters are plain numbers; the others (tables, pairs) are tested with their topic."""

ELSEWHERE = {"foster_impedance", "periodic_rise", "mains_band", "untracked", "soak_fit", "time_needed"}
"""Formulas that take more than numbers, or return a pair: tested with their topic."""
