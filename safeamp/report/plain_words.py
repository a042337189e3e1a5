"""What each finding looks at, in words of someone who does not know amplifiers."""

from typing import Final

LOOKS_AT: Final = {
    "cold.devices": "short-circuits in the output devices, before power",
    "cold.insulation": "insulation between devices and heatsink",
    "supply.fuse": "kind and size of the rail fuses",
    "supply.rail_to_rail": "voltage that the devices have to stand",
    "supply.reservoir_voltage": "voltage that the reservoirs have to stand",
    "supply.mains": "mains voltage and frequency against the plate",
    "supply.transformer": "load of the transformer",
    "touch.rails": "voltage inside, to the touch",
    "capacitor.wear": "wear of the output capacitor",
    "capacitor.cutoff": "lowest note that the output capacitor passes",
    "capacitor.voltage": "voltage that the output capacitor has to stand",
    "capacitor.ripple": "current that the output capacitor has to stand",
    "capacitor.leakage": "leakage of the output capacitor",
    "power_up.draw": "current drawn at the first power-up",
    "power_up.rails": "equal rails at the first power-up",
    "power_up.output": "DC at the output at the first power-up",
    "bias.idle": "idle current",
    "bias.imbalance": "how parallel devices share the current",
    "bias.balance": "equal idle current of both sides",
    "bias.drift": "idle current, cold against warm",
    "bias.runaway": "whether the idle current stays put when it gets warm",
    "offset.output": "DC at the loudspeaker terminals",
    "offset.drift": "DC at the terminals, cold against warm",
    "offset.midpoint": "DC in the middle of the stage",
    "heat.heatsink": "temperature of the heatsink",
    "heat.junction": "temperature inside the devices",
    "heat.reading": "temperature read against temperature computed",
    "soa.resistive_load": "stress of the devices into a test resistor",
    "soa.loudspeaker": "stress of the devices into the loudspeaker",
    "stability.output": "oscillation",
    "loudspeaker.label": "whether the loudspeaker is what its label says",
    "loudspeaker.power": "power of the amplifier against that of the loudspeaker",
    "loudspeaker.dc_fault": "what happens to the loudspeaker when a device fails",
    "protection.short": "what happens when the loudspeaker wires touch",
    "touch.mains": "insulation of the mains from metal, and protective earth",
    "touch.voltage": "voltage at the terminals, to the touch",
    "touch.temperature": "hot metal within reach",
}

#: What no finding covers; common practice, no source.
NEVER: Final = (
    "noise, hum, distortion, tone and stereo",
    "controls, switches, sockets and everything before the output stage",
    "how long parts will last",
    "any other channel: each has a sheet of its own",
)
#: What whoever uses the amplifier has to mind; common practice, no source.
RULES: Final = (
    "Connect no loudspeaker of a lower impedance, no second pair and no other box than named here.",
    "Leave its openings free and its lid on: there is mains voltage inside, and voltage stays after switch-off.",
    "Let nobody fit another fuse than the one printed.",
    "Pull the plug at smoke, smell, hum, a cone that stands out or in, or a heatsink hotter than before.",
)
BRIDGED: Final = (
    "Neither loudspeaker terminal may touch metal, earth or another amplifier: both carry voltage."
)

#: What was measured, by the key that holds it; the other readings stand in the record.
MEASURED: Final = {
    "mains.actual": "mains in the socket",
    "supply.no_load": "supply inside, without load",
    "supply.full_load": "supply inside, under load",
    "stage.idle": "idle, across one resistor",
    "stage.clipped_peak": "peak at clipping",
    "output_capacitor.capacitance": "output capacitor",
    "heatsink.sink_to_air": "cooling of the heatsink",
    "loudspeaker.dc_resistance": "loudspeaker by meter",
    "protection.trip_voltage": "relay opens at",
    "protection.trip_delay": "relay opens within",
    "readings.device_ohms": "output devices, before power",
    "readings.insulation": "devices to heatsink",
    "readings.mains_insulation": "mains to metal",
    "readings.earth_resistance": "protective earth to metal",
    "readings.limiter_output": "output at the first power-up",
    "readings.offset_cold": "DC at the terminals, cold",
    "readings.offset_warm": "DC at the terminals, warm",
    "readings.offset_with_signal": "DC at the terminals, with signal",
    "readings.midpoint": "middle of the stage",
    "readings.idle_cold": "idle, cold",
    "readings.idle_upper": "idle, upper devices",
    "readings.idle_lower": "idle, lower devices",
    "readings.capacitor_leakage_drop": "leakage of the output capacitor, across the test resistor",
    "readings.output_ac": "AC at the terminals without signal",
    "readings.heatsink_temperature": "heatsink",
    "readings.heatsink_air": "air beside it",
}
