"""The generic devices agree with themselves, so that none of them looks better than it can be."""

from itertools import pairwise

import pytest

from safeamp.quantities import CURRENT, POWER, TEMPERATURE, THERMAL_RESISTANCE, VOLTAGE, read
from safeamp.reading.data import device_folder
from safeamp.reading.devices import device_files, generic_devices

DEVICES = device_files(device_folder())
WITH_SAFE_AREA = [name for name, device in DEVICES.items() if device.data["kind"] != "lateral mosfet"]


def value(device, key, kind):
    return read(device.data[key], kind).nominal


def safe_area(device):
    return [(read(v, VOLTAGE).nominal, read(i, CURRENT).nominal) for v, i in device.data["safe_area"]]


def test_packages_and_kinds_that_a_repair_needs_are_there():
    assert len(DEVICES) >= 8
    assert {name.split("-")[0] for name in DEVICES} == {"to3", "flat", "tab"}
    kinds = {device.data["kind"] for device in DEVICES.values()}
    assert kinds == {"bipolar", "darlington", "vertical mosfet", "lateral mosfet"}
    assert {"npn", "pnp"} <= {word for name in DEVICES for word in name.split("-")}


@pytest.mark.parametrize("name", DEVICES)
def test_name_tells_voltage_and_power(name):
    device = DEVICES[name]
    voltage, power = value(device, "voltage", VOLTAGE), value(device, "power", POWER)
    assert name.endswith(f"-{voltage:g}v-{power:g}w")
    assert device.path.endswith(f"{name}.toml")


@pytest.mark.parametrize("name", DEVICES)
def test_every_device_says_that_its_values_are_invented(name):
    assert DEVICES[name].data["reference"] == "invented typical values: replace by your data sheet"


@pytest.mark.parametrize("name", DEVICES)
def test_power_is_the_span_over_the_thermal_resistance(name):
    device = DEVICES[name]
    span = value(device, "junction_limit", TEMPERATURE) - value(device, "power_at", TEMPERATURE)
    by_span = span / value(device, "junction_to_case", THERMAL_RESISTANCE)
    assert by_span == pytest.approx(value(device, "power", POWER), rel=0.15)


@pytest.mark.parametrize("name", WITH_SAFE_AREA)
def test_safe_area_lies_under_the_power_line_and_ends_at_the_voltage_rating(name):
    device = DEVICES[name]
    points = safe_area(device)
    power = value(device, "power", POWER)
    assert all(volts * amperes <= power for volts, amperes in points)
    assert all(amperes <= value(device, "current", CURRENT) for _, amperes in points)
    assert points[-1][0] == value(device, "voltage", VOLTAGE)
    # The first point must meet the power line, or the curve would have to be continued to the left.
    assert points[0][0] * points[0][1] == pytest.approx(power, rel=0.05)


@pytest.mark.parametrize("name", WITH_SAFE_AREA)
def test_safe_area_falls_faster_than_the_power_line(name):
    # beyond the knee second breakdown takes over: volts times amperes falls from point to point
    for (volts, amperes), (further, fewer) in pairwise(safe_area(DEVICES[name])):
        assert further > volts
        assert further * fewer < volts * amperes


def test_only_lateral_mosfets_have_no_safe_area():
    without = [name for name, device in DEVICES.items() if "safe_area" not in device.data]
    assert without == [name for name in DEVICES if name not in WITH_SAFE_AREA]


def test_mosfets_have_what_the_square_law_needs():
    for device in DEVICES.values():
        has = {"transconductance_parameter", "temperature_coefficient"} <= set(device.data)
        assert has == ("mosfet" in device.data["kind"])


def test_each_file_bears_the_name_of_its_device():
    # only so can one be read without the others
    assert {name: table.data for name, table in generic_devices().items()} == {
        name: table.data for name, table in DEVICES.items()
    }
    with pytest.raises(KeyError, match="nobody"):
        generic_devices()["nobody"]
