"""Keys that are set and not used: each alone makes its findings unverified, and nothing else does."""

import pytest

from safeamp.reading.unassessed import WOULD_CHANGE
from tests.reading.desk import GONE, load

VALUES = {
    "device.pulse": [["10 ms", ["40 V", "5 A"]]],
    "device.transient": [["0.3 K/W", "2 ms"]],
    "device.temperature_coefficient": "-2.1 mV/K",
    "device.transconductance_parameter": "3 A/V2",
    "loudspeaker.crest_factor": "12 dB",
    "loudspeaker.resonance": "40 Hz",
    "loudspeaker.q_mechanical": 3.5,
    "loudspeaker.q_electrical": 0.4,
    "loudspeaker.inductance": "0.5 mH",
    "loudspeaker.moving_mass": "25 g",
    "protection.vi_limiter": [["0 V", "6 A"], ["50 V", "1 A"]],
    "stage.bias_tracking": "80 %",
    "stage.idle_at": "warm",
    "stage.bias_sensor": "heatsink",
}
BARE = {"stage.bias_sensor": GONE}


@pytest.mark.parametrize("key", VALUES)
def test_each_key_alone(tmp_path, key, monkeypatch):
    monkeypatch.setitem(WOULD_CHANGE, key, ("heat.junction",))
    path = key.replace("device.", "device.fitted.")
    assert load(tmp_path, BARE, base="leaky_capacitor").unassessed == {}
    sheet = load(tmp_path, {**BARE, path: VALUES[key]}, base="leaky_capacitor")
    assert sheet.unassessed == {path: ("heat.junction",)}


def test_every_key_is_assessed(tmp_path):
    given = {key.replace("device.", "device.fitted."): value for key, value in VALUES.items()}
    assert load(tmp_path, {**BARE, **given}, base="leaky_capacitor").unassessed == {}


def test_data_of_a_driver_or_of_a_generic_device_are_not_keys_of_the_sheet(tmp_path, monkeypatch):
    monkeypatch.setitem(WOULD_CHANGE, "device.pulse", ("soa.loudspeaker",))
    assert (
        "device.driver.pulse"
        not in load(tmp_path, {"device.driver.pulse": VALUES["device.pulse"]}).unassessed
    )
    lateral = {"stage.upper": "to3-nmos-lateral-160v-125w"}
    assert not any(path.startswith("device.") for path in load(tmp_path, lateral).unassessed)
