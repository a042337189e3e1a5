"""In which direction each key moves each finding: the table by which the ends of tolerances are the corners."""

import numpy as np
import pytest

from safeamp.amplifier import value_at, with_values
from safeamp.checks import CHECKS
from tests.scenarios.sheets import limits, sheet

UP, DOWN = 1, -1
STEPS = np.linspace(0.7, 1.3, 25)
#: Sheet -> finding -> key and the direction of its number; a key that is not here is not relied on to be monotone.
TABLE = {
    "split_rail": {
        "supply.rail_to_rail": {"supply.no_load.0": UP, "mains.highest": UP, "device.fitted.voltage": DOWN},
        "supply.reservoir_voltage": {"supply.no_load.0": UP, "supply.reservoir_rated_voltage": DOWN},
        "supply.mains": {"mains.actual": UP, "mains.rated": DOWN, "mains.frequency": DOWN},
        "touch.rails": {"supply.no_load.0": UP, "mains.highest": UP},
        "touch.voltage": {"supply.full_load.0": UP, "stage.swing_loss": DOWN, "stage.emitter_resistor": DOWN},
        "heat.heatsink": {
            "supply.no_load.0": UP,
            "supply.full_load.0": UP,
            "stage.swing_loss": DOWN,
            "stage.emitter_resistor": DOWN,
            "stage.idle": UP,
            "heatsink.sink_to_air": UP,
            "heatsink.air": UP,
            "heatsink.shared_by": UP,
            "loudspeaker.nominal_impedance": DOWN,
            "mains.present": UP,
        },
        "heat.junction": {
            "heatsink.case_to_sink": UP,
            "device.fitted.junction_to_case": UP,
            "heatsink.sink_to_air": UP,
            "heatsink.air": UP,
            "stage.idle": UP,
            "mains.present": UP,
        },
        "soa.resistive_load": {
            "supply.no_load.0": UP,
            "supply.full_load.0": UP,
            "stage.swing_loss": DOWN,
            "heatsink.sink_to_air": UP,
            "heatsink.case_to_sink": UP,
            "heatsink.air": UP,
            "mains.present": UP,
            "device.fitted.power": DOWN,
            "device.fitted.junction_limit": DOWN,
        },
        "soa.loudspeaker": {
            "supply.no_load.0": UP,
            "stage.swing_loss": DOWN,
            "stage.idle": UP,
            "heatsink.sink_to_air": UP,
            "heatsink.air": UP,
            "loudspeaker.nominal_impedance": DOWN,
            "loudspeaker.minimum_impedance": DOWN,
            "loudspeaker.phase_angle": UP,
            "mains.present": UP,
            "device.fitted.junction_to_case": UP,
        },
        "loudspeaker.power": {
            "supply.full_load.0": UP,
            "loudspeaker.rated_power": DOWN,
            "loudspeaker.power_share": DOWN,
            "loudspeaker.nominal_impedance": DOWN,
            "mains.present": UP,
        },
        "loudspeaker.dc_fault": {"supply.no_load.0": UP, "loudspeaker.dc_resistance": DOWN},
        "loudspeaker.label": {"loudspeaker.dc_resistance": UP, "loudspeaker.nominal_impedance": DOWN},
        "bias.runaway": {
            "supply.no_load.0": UP,
            "stage.idle": UP,
            "stage.emitter_resistor": DOWN,
            "heatsink.sink_to_air": UP,
            "heatsink.case_to_sink": UP,
            "device.fitted.junction_to_case": UP,
            "stage.bias_tracking": DOWN,
        },
        "touch.temperature": {"heatsink.sink_to_air": UP, "supply.no_load.0": UP, "stage.swing_loss": DOWN},
    },
    "single_rail": {
        "capacitor.wear": {"output_capacitor.capacitance": UP, "output_capacitor.marked_capacitance": DOWN},
        "capacitor.cutoff": {"output_capacitor.capacitance": DOWN, "loudspeaker.minimum_impedance": DOWN},
        "capacitor.voltage": {"output_capacitor.rated_voltage": DOWN},
        "supply.rail_to_rail": {"supply.no_load.0": UP},
        "heat.heatsink": {
            "stage.swing_loss_down": DOWN,
            "supply.full_load.0": UP,
            "heatsink.sink_to_air": UP,
        },
    },
    "class_a": {
        "heat.heatsink": {"stage.idle": UP, "supply.no_load.0": UP, "heatsink.sink_to_air": UP},
        "heat.junction": {"stage.idle": UP, "heatsink.case_to_sink": UP},
        "soa.resistive_load": {"stage.idle": UP, "heatsink.air": UP},
    },
}
ROWS = [
    pytest.param(name, identity, key, way, id=f"{name}-{identity}-{key}")
    for name, findings in TABLE.items()
    for identity, keys in findings.items()
    for key, way in keys.items()
]


@pytest.mark.parametrize(("name", "identity", "key", "way"), ROWS)
def test_a_finding_moves_one_way_with_its_key(name, identity, key, way):
    amplifier = sheet(name).amplifier
    nominal = value_at(amplifier, key)
    steps = STEPS[STEPS <= 1.0] if key == "stage.bias_tracking" else STEPS
    if key == "supply.full_load.0":  # a rail that rises under load is none
        steps = STEPS[STEPS * nominal <= value_at(amplifier, "supply.no_load.0")]
    if key == "supply.no_load.0":
        least = value_at(amplifier, "supply.full_load.0") if amplifier.supply.full_load else 0.0
        steps = STEPS[STEPS * nominal >= least]
    if key == "loudspeaker.nominal_impedance" and amplifier.loudspeaker.dc_resistance:
        # a label that the coil contradicts is not believed: one jump, beyond which nothing moves any more
        steps = STEPS[STEPS * nominal * 0.65 <= amplifier.loudspeaker.dc_resistance]
    with np.errstate(all="ignore"):
        measure = CHECKS[identity].run(with_values(amplifier, {key: nominal * steps}), limits())
    value = np.broadcast_to(np.asarray(measure.value, dtype=float), steps.shape)
    assert len(steps) >= 5
    assert np.all(way * np.diff(value) >= -1e-9 * np.abs(value[1:])), value
    assert way * (value[-1] - value[0]) > 0.0
