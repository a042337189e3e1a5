"""Invented example values for starter sheets; no amplifier that exists.

A key path holds what stands behind it, without its origin: text, several texts, a flag, a number, points.
"""

from collections.abc import Mapping
from dataclasses import dataclass
from typing import Any, Final

#: A split-rail amplifier for 8 ohm, the ground that the other kinds depart from.
EXAMPLES: Final[Mapping[str, Any]] = {
    "notes": "Invented example: replace every value by your own, with the origin of each.",
    "sheet_version": 1,
    "mains.nominal": "230 V",
    "mains.rated": "230 V",
    "mains.rated_frequency": "50 Hz",
    "mains.actual": "231 V",
    "mains.highest": "253 V",
    "mains.frequency": "50 Hz",
    "supply.source": "mains",
    "supply.rails": "split",
    "supply.no_load": "30 V",
    "supply.full_load": "27.5 V",
    "supply.at_mains": "231 V",
    "supply.reservoir": "6800 uF",
    "supply.reservoir_rated_voltage": "50 V",
    "supply.rail_fuse": "T 2.5 A",
    "supply.rail_fuse_rated": "T 2.5 A",
    "supply.transformer_power": "160 W",
    "supply.secondary": "22 V",
    "stage.arrangement": "complementary",
    "stage.coupling": "direct",
    "stage.bridged": False,
    "stage.pairs": 1,
    "stage.pairs_conducting": 1,
    "stage.upper": "fitted",
    "stage.lower": "fitted",
    "stage.drivers": ("driver",),
    "stage.original_devices": True,
    "stage.rated_load": "8 ohm",
    "stage.emitter_resistor": "0.22 ohm",
    "stage.idle": "12 mV",
    "stage.idle_specified": "12 mV",
    "stage.idle_at": "warm",
    "stage.bias_sensor": "heatsink",
    "stage.bias_tracking": "80 %",
    "stage.swing_loss": "2.5 V",
    "stage.swing_loss_up": "2.5 V",
    "stage.swing_loss_down": "2.5 V",
    "stage.clipped_peak": "28 V",
    "stage.imbalance": "20 %",
    "stage.series_resistor": "none",
    "stage.zobel_resistor": "10 ohm",
    "stage.zobel_capacitor": "100 nF",
    "output_capacitor.capacitance": "2200 uF",
    "output_capacitor.marked_capacitance": "2200 uF",
    "output_capacitor.rated_voltage": "80 V",
    "output_capacitor.ripple_current": "3.5 A",
    "output_capacitor.esr": "0.08 ohm",
    "output_capacitor.target_cutoff": "20 Hz",
    "output_capacitor.rise_time": "0.5 s",
    "output_capacitor.bleeder": "1 kohm",
    "heatsink.sink_to_air": "0.8 K/W",
    "heatsink.case_to_sink": "0.45 K/W",
    "heatsink.insulator": "flat plastic mica greased",
    "heatsink.air": "35 degC",
    "heatsink.shared_by": 1,
    "heatsink.other_heat": "0 W",
    "heatsink.accessible": True,
    "heatsink.each": False,
    "heatsink.fins.width": "150 mm",
    "heatsink.fins.height": "75 mm",
    "heatsink.fins.depth": "35 mm",
    "heatsink.fins.thickness": "2 mm",
    "heatsink.fins.count": 14,
    "heatsink.fins.plate": "6 mm",
    "heatsink.fins.emissivity": 0.8,
    "loudspeaker.load": "loudspeaker",
    "loudspeaker.parallel": 1,
    "loudspeaker.series": 1,
    "loudspeaker.nominal_impedance": "8 ohm",
    "loudspeaker.minimum_impedance": "6.4 ohm",
    "loudspeaker.phase_angle": "45 deg",
    "loudspeaker.dc_resistance": "6.2 ohm",
    "loudspeaker.rated_power": "80 W",
    "loudspeaker.power_word": "rated noise",
    "loudspeaker.crest_factor": "12 dB",
    "loudspeaker.lowest_note": "30 Hz",
    "loudspeaker.impedance_curve": "impedance.csv",
    "loudspeaker.resonance": "38 Hz",
    "loudspeaker.q_mechanical": 4.2,
    "loudspeaker.q_electrical": 0.45,
    "loudspeaker.inductance": "0.6 mH",
    "loudspeaker.force_factor": "8 N/A",
    "loudspeaker.compliance": "0.9 mm/N",
    "loudspeaker.moving_mass": "20 g",
    "loudspeaker.linear_excursion": "4 mm",
    "loudspeaker.coil_to_magnet": "4 K/W",
    "loudspeaker.coil_time_constant": "6 s",
    "loudspeaker.magnet_to_air": "3 K/W",
    "loudspeaker.magnet_time_constant": "20 min",
    "loudspeaker.coil_limit": "180 degC",
    "protection.trip_voltage": "1.8 V",
    "protection.trip_delay": "80 ms",
    "protection.loudspeaker_fuse": "F 2 A",
    "protection.vi_limiter": (("0 V", "7 A"), ("60 V", "0.8 A")),
    "readings.offset_cold": "+14 mV",
    "readings.offset_warm": "+19 mV",
    "readings.offset_with_signal": "+21 mV",
    "readings.offset_other_side": "+17 mV",
    "readings.midpoint": "32 V",
    "readings.idle_upper": ("12 mV",),
    "readings.idle_lower": ("11.6 mV",),
    "readings.idle_cold": "11 mV",
    "readings.capacitor_leakage_drop": "25 mV",
    "readings.capacitor_leakage_resistor": "1 kohm",
    "readings.capacitor_leakage_trend": "falling",
    "readings.output_ac": "1.5 mV",
    "readings.zobel_hot": False,
    "readings.heatsink_temperature": "38 degC",
    "readings.heatsink_air": "35 degC",
    "readings.heatsink_level": "idle",
    "readings.device_ohms": "150 kohm",
    "readings.insulation": "20 Mohm",
    "readings.mains_insulation": "40 Mohm",
    "readings.earth_resistance": "0.08 ohm",
    "readings.limiter": "60 W lamp",
    "readings.limiter_state": "dark",
    "readings.limiter_rails": ("14.2 V", "14.1 V"),
    "readings.limiter_output": "+12 mV",
    "readings.taken_on": "mains",
    "device.kind": "bipolar",
    "device.voltage": "150 V",
    "device.current": "12 A",
    "device.power": "125 W",
    "device.power_at": "25 degC",
    "device.junction_limit": "150 degC",
    "device.junction_to_case": "1.0 K/W",
    "device.junction_to_ambient": "35 K/W",
    "device.safe_area": (("40 V", "3.1 A"), ("90 V", "0.8 A"), ("150 V", "0.25 A")),
    "device.pulse": (("10 ms", ("40 V", "6 A"), ("150 V", "0.6 A")),),
    "device.transconductance_parameter": "3 A/V2",
    "device.temperature_coefficient": "-2 mV/K",
    "device.transient": (("0.3 K/W", "2 ms"), ("0.7 K/W", "50 ms")),
    "device.reference": "invented example: replace by your data sheet",
}
#: Optional keys of that ground that begin as comments. A word or flag carries no origin, so that one that is
#: evidence by itself (the lamp stayed dark) must not stand in a sheet before somebody has seen it.
_COMMENTED = """
    mains.highest supply.transformer_power supply.secondary stage.pairs_conducting stage.bias_tracking
    stage.swing_loss_up stage.swing_loss_down stage.clipped_peak stage.imbalance stage.series_resistor
    stage.zobel_resistor stage.zobel_capacitor output_capacitor heatsink.insulator heatsink.fins
    loudspeaker.crest_factor loudspeaker.lowest_note loudspeaker.impedance_curve loudspeaker.resonance
    loudspeaker.q_mechanical loudspeaker.q_electrical loudspeaker.inductance loudspeaker.force_factor
    loudspeaker.compliance loudspeaker.moving_mass loudspeaker.linear_excursion loudspeaker.coil_to_magnet
    loudspeaker.coil_time_constant loudspeaker.magnet_to_air loudspeaker.magnet_time_constant
    loudspeaker.coil_limit protection.loudspeaker_fuse protection.vi_limiter readings.offset_with_signal
    readings.offset_other_side readings.midpoint readings.capacitor_leakage_drop
    readings.capacitor_leakage_resistor readings.capacitor_leakage_trend readings.limiter_state
    readings.zobel_hot stage.original_devices device.junction_to_ambient device.pulse
    device.transconductance_parameter device.temperature_coefficient device.transient
"""
COMMENTED: Final = frozenset(_COMMENTED.split())

_SINGLE_RAIL_COMMENTED = """
    stage.swing_loss protection.trip_voltage protection.trip_delay readings.offset_cold
    readings.offset_warm
"""
_BENCH_COMMENTED = """
    mains supply.full_load supply.at_mains supply.reservoir supply.reservoir_rated_voltage
    supply.rail_fuse supply.rail_fuse_rated stage.drivers stage.original_devices stage.rated_load
    stage.idle_specified heatsink.sink_to_air heatsink.case_to_sink heatsink.shared_by
    heatsink.other_heat loudspeaker.phase_angle loudspeaker.dc_resistance loudspeaker.rated_power
    loudspeaker.power_word protection readings.offset_cold readings.offset_warm
    readings.heatsink_temperature readings.heatsink_air readings.heatsink_level
    readings.mains_insulation readings.earth_resistance readings.insulation readings.limiter_rails
    device.junction_to_case device.safe_area
"""


@dataclass(frozen=True)
class Starter:
    """One kind of starter sheet: how it departs from the split-rail ground.

    `left_out` holds keys, or whole tables, that begin as comments besides those of the ground; a key of
    `values` is never a comment.
    """

    title: str
    values: Mapping[str, Any]
    left_out: frozenset[str] = frozenset()


STARTERS: Final[Mapping[str, Starter]] = {
    "split-rail": Starter("Example: split rails, 8 ohm, one pair, left channel", {}),
    "single-rail": Starter(
        "Example: single rail with an output capacitor, 8 ohm, left channel",
        {
            "supply.rails": "single",
            "supply.no_load": "64 V",
            "supply.full_load": "58 V",
            "supply.reservoir_rated_voltage": "80 V",
            "stage.coupling": "capacitor",
            "stage.clipped_peak": "25 V",
            "output_capacitor.capacitance": "2200 uF",
            "output_capacitor.marked_capacitance": "2200 uF",
            "output_capacitor.rated_voltage": "80 V",
            "output_capacitor.ripple_current": "3.5 A",
            "output_capacitor.target_cutoff": "20 Hz",
            "readings.midpoint": "32 V",
            "readings.capacitor_leakage_drop": "25 mV",
            "readings.capacitor_leakage_resistor": "1 kohm",
            "readings.limiter_rails": ("27 V",),
            "readings.limiter_output": "13.4 V",
        },
        frozenset(_SINGLE_RAIL_COMMENTED.split()),
    ),
    "bridged": Starter(
        "Example: bridged output, 8 ohm, one pair on each side of each half",
        {
            "stage.bridged": True,
            "supply.no_load": "21 V",
            "supply.full_load": "19.5 V",
            "supply.reservoir_rated_voltage": "40 V",
            "heatsink.sink_to_air": "0.4 K/W",
            "heatsink.shared_by": 2,
            "readings.heatsink_temperature": "37 degC",
            "loudspeaker.rated_power": "150 W",
        },
    ),
    "mosfet": Starter(
        "Example: vertical MOSFETs on split rails, 8 ohm, left channel",
        {
            "supply.no_load": "36 V",
            "supply.full_load": "33.5 V",
            "supply.reservoir_rated_voltage": "63 V",
            "stage.idle": "100 mA",
            "stage.idle_specified": "100 mA",
            "stage.swing_loss": "6 V",
            "readings.idle_upper": ("22 mV",),
            "readings.idle_lower": ("21.5 mV",),
            "readings.idle_cold": "20 mV",
            "readings.limiter_rails": ("17.2 V", "17.1 V"),
            "heatsink.sink_to_air": "0.6 K/W",
            "loudspeaker.rated_power": "120 W",
            "device.kind": "vertical mosfet",
            "device.voltage": "200 V",
            "device.power": "178 W",
            "device.junction_to_case": "0.7 K/W",
            "device.safe_area": (("50 V", "3.5 A"), ("100 V", "1.5 A"), ("200 V", "0.5 A")),
            "device.transconductance_parameter": "3 A/V2",
            "device.temperature_coefficient": "-5 mV/K",
        },
    ),
    "bench-mockup": Starter(
        "Example: low-voltage mock-up on a bench supply into a resistor",
        {
            "supply.source": "bench",
            "supply.rails": "single",
            "supply.no_load": "12 V",
            "stage.coupling": "capacitor",
            "stage.emitter_resistor": "1 ohm",
            "stage.idle": "2 mA",
            "stage.bias_sensor": "none",
            "stage.swing_loss": "1.2 V",
            "output_capacitor.capacitance": "100 uF",
            "output_capacitor.rated_voltage": "25 V",
            "output_capacitor.target_cutoff": "40 Hz",
            "loudspeaker.load": "resistor",
            "loudspeaker.nominal_impedance": "150 ohm",
            "loudspeaker.minimum_impedance": "150 ohm",
            "readings.midpoint": "6.1 V",
            "readings.idle_upper": ("2 mV",),
            "readings.idle_lower": ("2 mV",),
            "readings.idle_cold": "1.9 mV",
            "readings.limiter": "bench",
            "readings.limiter_output": "6 V",
            "device.voltage": "40 V",
            "device.current": "0.2 A",
            "device.power": "0.625 W",
            "device.junction_to_ambient": "200 K/W",
        },
        frozenset(_BENCH_COMMENTED.split()),
    ),
}
#: Values of the driver that stands beside the output device.
DRIVER: Final[Mapping[str, Any]] = {
    "kind": "bipolar",
    "voltage": "160 V",
    "current": "1.5 A",
    "power": "20 W",
    "power_at": "25 degC",
    "junction_limit": "150 degC",
    "junction_to_case": "6.25 K/W",
    "reference": "invented example: replace by your data sheet",
}
