"""Where devices come from: the sheet first, then the user's folder, then the generic types."""

import pytest

from safeamp.complaints import ReadingError
from safeamp.quantities import Origin
from tests.reading.desk import GONE, complaints, load, scenario, toml

GENERIC = "to3-npn-140v-150w"
SHEET = {"stage.upper": GENERIC, "stage.lower": GENERIC, "stage.drivers": "none", "device": GONE}


def folder_with(tmp_path, name, changes=None):
    folder = tmp_path / "devices"
    folder.mkdir(exist_ok=True)
    device = {**scenario("healthy")["device"]["fitted"], **(changes or {})}
    (folder / "one.toml").write_text(toml({"device": {name: device}}), encoding="utf-8")
    return folder


def test_a_generic_device_is_assumed_in_every_value_and_listed_once(tmp_path):
    sheet = load(tmp_path, SHEET)
    amplifier = sheet.amplifier
    assert amplifier.device[GENERIC].voltage == 140.0
    prefix = f"device.{GENERIC}."
    assert {entry.origin for path, entry in sheet.entries.items() if path.startswith(prefix)} == {
        Origin.ASSUMED
    }
    assert {origin for path, origin in amplifier.origins.items() if path.startswith(prefix)} == {
        Origin.ASSUMED
    }
    assert amplifier.origin(f"{prefix}safe_area") is Origin.ASSUMED
    [assumed] = [assumed for assumed in sheet.assumptions if assumed.key.startswith("device.")]
    assert (assumed.key, assumed.value) == (f"device.{GENERIC}", "generic typical values")
    assert "replace" in assumed.why


def test_a_generic_device_may_be_typed_with_blanks(tmp_path):
    sheet = load(tmp_path, SHEET | {"stage.upper": "TO3 NPN 140V 150W"})
    assert sheet.amplifier.stage.upper == GENERIC


def test_a_device_of_the_folder_keeps_its_origins(tmp_path):
    folder = folder_with(tmp_path, "own-type")
    names = {
        "stage.upper": "own-type",
        "stage.lower": "own type",
        "stage.drivers": ["Own-Type"],
        "device": GONE,
    }
    sheet = load(tmp_path, names, device_folder=folder)
    assert sheet.amplifier.origin("device.own-type.voltage") is Origin.DATA_SHEET
    assert sheet.amplifier.stage.lower == "own-type"
    assert sheet.amplifier.stage.drivers == ("own-type",)
    assert sheet.assumptions[0].key != "device.own-type"


def test_folder_goes_before_generic_and_sheet_before_folder(tmp_path):
    folder = folder_with(tmp_path, GENERIC, {"voltage": "150 V"})
    sheet = load(tmp_path, SHEET, device_folder=str(folder))
    assert sheet.amplifier.device[GENERIC].voltage == 150.0
    inline = {**scenario("healthy")["device"]["fitted"], "voltage": "155 V"}
    sheet = load(tmp_path, SHEET | {"device": {GENERIC: inline}}, device_folder=folder)
    assert sheet.amplifier.device[GENERIC].voltage == 155.0


def test_a_device_that_is_not_used_is_left_out_with_a_remark(tmp_path):
    sheet = load(tmp_path, {"stage.drivers": GONE})
    assert list(sheet.amplifier.device) == ["fitted"]
    assert not any(path.startswith("device.driver") for path in (*sheet.entries, *sheet.amplifier.origins))
    assert not any(assumed.key.startswith("device.driver") for assumed in sheet.assumptions)
    assert sheet.remarks == ("device.driver is not used: stage names other devices",)


def test_a_device_that_is_not_used_is_read_all_the_same(tmp_path):
    [found] = complaints(tmp_path, {"stage.drivers": GONE, "device.driver.power": "20 V"})
    assert found.startswith('device.driver.power: "20 V" is a voltage')


def test_complaints_about_a_device_file_name_that_file_and_its_line(tmp_path):
    folder = folder_with(tmp_path, "own", {"power": "150", "junction_limit": "none"})
    with pytest.raises(ReadingError) as caught:
        load(tmp_path, {"stage.upper": "own", "supply.no_load": 3}, device_folder=folder)
    sheet, power, limit = caught.value.complaints
    assert (sheet.path, sheet.key) == (str(tmp_path / "sheet.toml"), "supply.no_load")
    lines = (folder / "one.toml").read_text(encoding="utf-8").splitlines()
    assert (power.path, power.key) == (str(folder / "one.toml"), "device.own.power")
    assert lines[power.line - 1] == 'power = "150"'
    assert lines[limit.line - 1] == 'junction_limit = "none"'


def test_what_a_device_file_lacks_is_said_of_that_file(tmp_path):
    folder = folder_with(tmp_path, "own")
    text = (folder / "one.toml").read_text(encoding="utf-8")
    lines = [line for line in text.splitlines() if not line.startswith(("junction_to_case", "current"))]
    (folder / "one.toml").write_text("\n".join(lines), encoding="utf-8")
    with pytest.raises(ReadingError) as caught:
        load(tmp_path, {"stage.upper": "own"}, device_folder=folder)
    assert [(complaint.path, complaint.key) for complaint in caught.value.complaints] == [
        (str(folder / "one.toml"), "device.own.current"),
        (str(folder / "one.toml"), "device.own.junction_to_case"),
    ]


def test_troubles_of_the_folder_are_said_with_those_of_the_sheet(tmp_path):
    found = complaints(tmp_path, {"supply.no_load": 3}, device_folder=tmp_path / "nowhere")
    assert any(text.startswith("supply.no_load: 3 has no unit") for text in found)
    assert any("is not a folder of device files" in text for text in found)


def test_an_unknown_device_is_refused_with_the_nearest_generic_name(tmp_path):
    found = complaints(tmp_path, {"stage.upper": "to3-npn-140v-160w"})
    assert any(f"did you mean {GENERIC}?" in text for text in found)


@pytest.mark.parametrize("name", ["to3.npn", "7", " "])
def test_a_name_that_cannot_stand_in_a_key_is_refused_in_a_device_file_too(tmp_path, name):
    folder = folder_with(tmp_path, "own")
    file = folder / "one.toml"
    file.write_text(
        file.read_text(encoding="utf-8").replace("[device.own]", f'[device."{name}"]'), encoding="utf-8"
    )
    found = complaints(tmp_path, {"stage.upper": name}, device_folder=folder)
    words = "is not a text" if name == " " else "is no name for a device; write letters, digits and hyphens"
    assert any(words in text for text in found), found
