"""Questions the reader asks, each at its boundary: just inside is read, just outside is asked about."""

# One case a line, however long, so that a table reads as one.
# ruff: noqa: E501

import pytest

from tests.reading.desk import GONE, complaints, load

POINTS = "device.fitted.safe_area"
SINGLE = "single_rail"
DROP = "readings.capacitor_leakage_drop"
LEAKING = {"readings.capacitor_leakage_resistor": "100 ohm", "readings.capacitor_leakage_trend": "falling"}

# Sheet, what is inside the boundary, what is outside, and the words.
BOUNDARIES = [
    # 150 W: 1.1 times is 165 W.
    ("healthy", {POINTS: [["40 V", "4.125 A"]]}, {POINTS: [["40 V", "4.13 A"]]}, f"{POINTS}.0: 165 W at 40 V is more than the 150 W of the device: this looks like a pulse curve; read the DC curve"),
    # 125 K over 0.8333 K/W is 150.0 W; 15 % more is 172.5 W, and 150/1.15 is 130.4 W.
    ("healthy", {"device.fitted.power": "172.4 W"}, {"device.fitted.power": "172.6 W", POINTS: GONE}, "device.fitted.power: 173 W is printed, but junction_limit and junction_to_case mean 150 W"),
    ("healthy", {"device.fitted.power": "130.5 W", POINTS: GONE}, {"device.fitted.power": "130.3 W", POINTS: GONE}, "device.fitted.power: 130 W is printed"),
    ("healthy", {"device.fitted.power_at": "25 degC"}, {"device.fitted.power_at": "150 degC"}, "device.fitted.junction_limit: 150 °C is not above power_at, 150 °C"),
    ("healthy", {"device.fitted.voltage": "22 V"}, {"device.fitted.voltage": "21.9 V"}, "device.fitted.voltage: 21.9 V is less than one rail, 22 V"),
    ("healthy", {"device.fitted.voltage": "24 V", "supply.no_load": ["22 V", "24 V"]}, {"device.fitted.voltage": "23 V", "supply.no_load": ["22 V", "24 V"]}, "device.fitted.voltage: 23 V is less than one rail, 24 V"),
    (SINGLE, {"device.fitted.voltage": "32 V"}, {"device.fitted.voltage": "31.9 V"}, "device.fitted.voltage: 31.9 V is less than half the rail, 32 V"),
    ("healthy", {"device.fitted.temperature_coefficient": "-2 mV/K"}, {"device.fitted.temperature_coefficient": "2 mV/K"}, "device.fitted.temperature_coefficient: 2 mV/K means a control voltage that grows with temperature: did you mean -2 mV/K?"),
    ("mosfet_substitute", {"device.fitted.temperature_coefficient": "2 mV/K"}, {"device.fitted.temperature_coefficient": "2 mV/K", "device.fitted.voltage": "-200 V"}, "device.fitted.temperature_coefficient: 2 mV/K means"),
    ("healthy", {"readings.offset_cold": "0.6 mV", "readings.offset_warm": "-0.6 mV"}, {"readings.offset_cold": "0.5 mV", "readings.offset_warm": "-0.6 mV"}, "readings.offset_cold: 0.5 mV with protection fitted: was it read before or behind the relay, and did it close?"),
    # The relay may have opened since the reading before: 12 mV cold say nothing of 0 V warm.
    ("healthy", {"readings.offset_cold": "12 mV", "readings.offset_warm": "0.1 mV ±0.1 mV"}, {"readings.offset_cold": "12 mV", "readings.offset_warm": "0 V"}, "readings.offset_warm: 0 V with protection fitted"),
    ("healthy", {"readings.offset_warm": "0 V", "readings.offset_cold": GONE, "protection": {"trip_voltage": "none"}}, {"readings.offset_warm": "0 V", "readings.offset_cold": GONE, "protection": {"trip_delay": "60 ms"}}, "did it close?"),
    ("healthy", {"heatsink.air": "30 degC"}, {"heatsink.air": "29.9 degC"}, 'heatsink.air: 29.9 °C inside a cabinet with its lid on is cold: is it the air of the room?'),
    ("healthy", {"heatsink.air": "20 degC, measured"}, {"heatsink.air": "20 degC, data sheet"}, "heatsink.air: 20 °C inside"),
    # Half of 64 V is 32 V; 30 % of it either way is 22.4 to 41.6 V.
    (SINGLE, {"readings.midpoint": "22.4 V"}, {"readings.midpoint": "22.3 V"}, "readings.midpoint: 22.3 V is far from half the rail, 32 V: was it read before the output capacitor"),
    (SINGLE, {"readings.midpoint": "41.6 V"}, {"readings.midpoint": "41.7 V"}, "readings.midpoint: 41.7 V is far"),
    (SINGLE, {"readings.midpoint": "10 V", "readings.taken_on": "limiter"}, {"readings.midpoint": "10 V"}, "readings.midpoint: 10 V is far"),
    ("healthy", {"loudspeaker.minimum_impedance": "8 ohm"}, {"loudspeaker.minimum_impedance": "8.1 ohm"}, "loudspeaker.minimum_impedance: 8.1 ohm is above loudspeaker.nominal_impedance, 8 ohm"),
    ("healthy", {"supply.full_load": "22 V"}, {"supply.full_load": "22.1 V"}, "supply.full_load: 22.1 V is above no_load, 22 V"),
    # 0.6 of 22 V is 13.2 V; what was measured is held by the findings instead.
    ("healthy", {"supply.full_load": "13.2 V"}, {"supply.full_load": "13.1 V"}, 'supply.full_load: 13.1 V is 59.5 % of no_load, 22 V: is it the rail under load, at the same mains, off the limiter? if it was read so, add ", measured"'),
    ("healthy", {"supply.full_load": "6 V, measured"}, {"supply.full_load": "6 V, manual"}, "supply.full_load: 6 V is 27.3 % of no_load"),
    ("healthy", {"supply.full_load": ["13.2 V", "20 V, measured"]}, {"supply.full_load": ["20 V, measured", "12 V"]}, "supply.full_load: 12 V is 54.5 % of no_load, 22 V"),
    ("healthy", {"supply.full_load": "12 V", "supply.source": "regulated"}, {"supply.full_load": "12 V"}, "supply.full_load: 12 V is 54.5 % of no_load"),
    ("healthy", {"supply.no_load": ["22 V", "21 V"]}, {"supply.no_load": ["22 V", "21 V"], "supply.full_load": ["20 V", "21.5 V"]}, "supply.full_load: 21.5 V is above no_load, 21 V"),
    ("healthy", {"supply.no_load": ["22 V", "-22 V"]}, {"supply.no_load": ["22 V", "22 V", "22 V"]}, "supply.no_load: 3 values are given; a split supply has two rails: write 2 at most"),
    (SINGLE, {"supply.no_load": ["64 V"]}, {"supply.no_load": ["32 V", "32 V"]}, "supply.no_load: 2 values are given; a single supply has one rail: write 1 at most"),
    ("healthy", {"mains.highest": "230 V"}, {"mains.highest": "229 V"}, "mains.highest: 229 V is below mains.actual, 230 V"),
    # 0.8 and 1.25 of 230 V are 184 and 287.5 V; of 100 V, 125 V: the highest mains follows from the declared one.
    ("healthy", {"mains.actual": "184 V"}, {"mains.actual": "183 V"}, "mains.nominal: 230 V is declared, and mains.actual is 183 V, 79.6 % of it: write the voltage that your public supply declares, or read the socket again"),
    ("healthy", {"mains.actual": "287 V"}, {"mains.actual": "288 V"}, "mains.nominal: 230 V is declared, and mains.actual is 288 V, 125 % of it"),
    ("healthy", {}, {"mains.nominal": "100 V"}, "mains.nominal: 100 V is declared, and mains.actual is 230 V, 230 % of it"),
    ("healthy", {"mains.nominal": "220 V"}, {"mains.nominal": "120 V", "mains.highest": "253 V"}, "mains.nominal: 120 V is declared, and mains.actual is 230 V"),
    # Left out, 127 V is the nearest to 160 V, and 230 V to 180 V.
    ("healthy", {"mains.nominal": GONE, "mains.actual": "158 V"}, {"mains.nominal": GONE, "mains.actual": "160 V"}, "mains.actual: 160 V is 126 % of the nearest declared voltage, 127 V: write the one of your public supply as mains.nominal, or read the socket again"),
    ("healthy", {"stage.pairs": 2, "stage.pairs_conducting": 2, "readings.idle_upper": GONE, "readings.idle_lower": GONE}, {"stage.pairs_conducting": 2}, "stage.pairs_conducting: 2 is more than the 1 pairs"),
    # 0.33 ohm: 3.3 V would be 10 A.
    ("healthy", {"stage.idle": "3.29 V"}, {"stage.idle": "3.31 V"}, "stage.idle: 3.31 V across 0.33 ohm means 10 A: did you mean 3.31 mV?"),
    ("healthy", {"stage.idle": "3 A"}, {"stage.idle": "30 A"}, "stage.idle: 30 A of idle current in each device: did you mean 30 mA?"),
    ("healthy", {"stage.idle": "3 A"}, {"stage.idle": "3.1 A"}, "did you mean 3.1 mA?"),
    ("healthy", {"stage.emitter_resistor": "22 ohm", "stage.idle": "5 V"}, {"stage.emitter_resistor": "22 ohm", "stage.idle": "5.1 V"}, "stage.idle: 5.1 V across one resistor: did you mean 5.1 mV?"),
    ("healthy", {"stage.idle_specified": "14 mV"}, {"stage.idle_specified": "14 V"}, "stage.idle_specified: 14 V across 0.33 ohm means 42.4 A: did you mean 14 mV?"),
    ("bench_mockup", {"stage.emitter_resistor": "none"}, {"stage.emitter_resistor": "none", "stage.idle": "2 mV"}, 'stage.idle: volts are read across a resistor, and emitter_resistor is "none"; write amperes'),
    ("healthy", {"readings.idle_upper": ["3.2 V"]}, {"readings.idle_upper": ["3.4 V"]}, "readings.idle_upper.0: 3.4 V across 0.33 ohm means 10.3 A: did you mean 3.4 mV?"),
    ("healthy", {"readings.idle_cold": "3.2 V"}, {"readings.idle_cold": "3.4 V"}, "readings.idle_cold: 3.4 V across 0.33 ohm"),
    ("bench_mockup", {"stage.emitter_resistor": "none"}, {"stage.emitter_resistor": "none", "readings.idle_cold": "2 mV"}, 'readings.idle_cold: volts are read across a resistor, and emitter_resistor is "none"'),
    ("healthy", {"readings.idle_upper": "14 mV"}, {"readings.idle_upper": ["14 mV", "13 mV"]}, "readings.idle_upper: 2 given, and stage.pairs is 1; write one for each device"),
    ("healthy", {"stage.pairs": 2, "readings.idle_upper": ["14 mV", "14 mV"], "readings.idle_lower": ["14 mV", "14 mV"]}, {"stage.pairs": 2}, "readings.idle_lower: 1 given, and stage.pairs is 2"),
    ("healthy", {"readings.limiter_rails": ["9 V", "9 V"]}, {"readings.limiter_rails": ["9 V"]}, "readings.limiter_rails: 1 given, and supply.rails is split; write 2"),
    (SINGLE, {"readings.limiter_rails": "9 V"}, {"readings.limiter_rails": ["9 V", "9 V"]}, "readings.limiter_rails: 2 given, and supply.rails is single; write 1"),
    ("leaky_capacitor", {"readings.capacitor_leakage_resistor": "10 kohm"}, {"readings.capacitor_leakage_resistor": "10.1 kohm"}, "readings.capacitor_leakage_resistor: 10.1 kohm is above 10 kohm: across so much, as across open terminals"),
    ("leaky_capacitor", {"readings.capacitor_leakage_resistor": "100 ohm"}, {"readings.capacitor_leakage_resistor": GONE}, "readings.capacitor_leakage_resistor: is missing: volts alone are no leakage"),
    # The resistor lies in series with the capacitor: it takes no more than the midpoint holds; unread, 0.65 of 64 V.
    (SINGLE, {"readings.midpoint": "30 V", **LEAKING, DROP: "30 V"}, {"readings.midpoint": "30 V", **LEAKING, DROP: "30.1 V"}, "readings.capacitor_leakage_drop: 30.1 V across the resistor is more than the midpoint holds, 30 V: did you mean 30.1 mV? read both again"),
    (SINGLE, {"readings.midpoint": GONE, **LEAKING, DROP: "41.6 V"}, {"readings.midpoint": GONE, **LEAKING, DROP: "41.7 V"}, "readings.capacitor_leakage_drop: 41.7 V across the resistor is more than the midpoint can hold, 41.6 V: did you mean 41.7 mV? read both again"),
    (SINGLE, {"output_capacitor.marked_capacitance": "3400 uF"}, {"output_capacitor.marked_capacitance": "3410 uF"}, "output_capacitor.marked_capacitance: 3410 µF is marked and 680 µF is there"),
    (SINGLE, {"output_capacitor.marked_capacitance": "136 uF"}, {"output_capacitor.marked_capacitance": "135 uF"}, "output_capacitor.marked_capacitance: 135 µF is marked"),
    ("healthy", {"readings.heatsink_temperature": "35 degC"}, {"readings.heatsink_temperature": "34.9 degC"}, "readings.heatsink_temperature: 34.9 °C is below heatsink_air, 35 °C"),
    (SINGLE, {}, {"stage.swing_loss_up": GONE}, "stage.swing_loss_down: stands without swing_loss_up"),
    (SINGLE, {}, {"stage.swing_loss": "2 V"}, "swing_loss and swing_loss_down and swing_loss_up say the same thing twice"),
    ("healthy", {}, {"stage.clipped_peak": "18 V"}, "clipped_peak and swing_loss say the same thing twice"),
    ("healthy", {"stage.swing_loss": "21.9 V"}, {"stage.swing_loss": "22 V"}, "stage.swing_loss: 22 V leaves nothing of 22 V from rail to midpoint"),
    ("healthy", {"stage.swing_loss": "23 V", "supply.no_load": ["22 V", "24 V"]}, {"stage.swing_loss": "24 V", "supply.no_load": ["22 V", "24 V"]}, "stage.swing_loss: 24 V leaves nothing of 24 V"),
    ("healthy", {"stage.swing_loss": GONE, "stage.clipped_peak": "20 V"}, {"stage.swing_loss": GONE, "stage.clipped_peak": "33 V"}, "stage.clipped_peak: 33 V leaves nothing of 22 V"),
    ("bench_mockup", {}, {"heatsink.shared_by": 1}, "heatsink.shared_by: nothing is shared in free air: junction_to_ambient is given, and no sink_to_air"),
    ("healthy", {"heatsink.sink_to_air": GONE}, {"heatsink.shared_by": GONE}, "heatsink.shared_by: is missing"),
]  # fmt: skip


@pytest.mark.parametrize(("base", "inside", "outside", "words"), BOUNDARIES)
def test_asked_beyond_the_boundary_and_only_there(tmp_path, base, inside, outside, words):
    assert complaints(tmp_path, inside, base=base) == []
    found = complaints(tmp_path, outside, base=base)
    assert any(words in text for text in found), found


def test_a_rail_is_asked_about_at_each_output_but_not_at_drivers(tmp_path):
    assert complaints(tmp_path, {"device.driver.voltage": "20 V"}) == []


def test_a_device_that_is_not_used_is_asked_about_too(tmp_path):
    spare = {
        "kind": "bipolar",
        "voltage": "60 V",
        "current": "1 A",
        "power": "1 W",
        "junction_limit": "60 degC",
    }
    [found] = complaints(
        tmp_path, {"device.spare": {**spare, "junction_to_case": "5 K/W", "power_at": "70 degC"}}
    )
    assert "device.spare.junction_limit: 60 °C is not above power_at, 70 °C" in found


def test_a_value_that_is_not_read_brings_no_second_complaint(tmp_path):
    for base, path in (
        ("single_rail", "stage.swing_loss_up"),
        ("healthy", "supply.no_load"),
        ("healthy", "stage.pairs"),
    ):
        assert len(complaints(tmp_path, {path: "1,5 V"}, base=base)) == 1


def test_the_midpoint_of_a_split_supply_is_left_aside_with_a_remark(tmp_path):
    sheet = load(tmp_path, {"readings.midpoint": "60 mV"})
    assert 'readings.midpoint is not used: supply.rails is "split"' in sheet.remarks
