import tomllib
from pathlib import Path

import pytest

from safeamp.complaints import ReadingError
from safeamp.quantities import CURRENT, VOLTAGE, Origin
from safeamp.reading import open_mapping, open_sheet, sheet_from
from safeamp.reading.movable import movable, movable_keys

SPLIT = Path(__file__).parents[1] / "scenarios" / "split_rail.toml"


def tables(**changes):
    data = tomllib.loads(SPLIT.read_text(encoding="utf-8"))
    for path, value in changes.items():
        table, _, name = path.partition("__")
        data.setdefault(table, {})[name] = value
    return data


def moved(key, value, **changes):
    return movable(open_mapping(tables(**changes)), key).at(value)


def test_a_file_is_read_with_another_number():
    key = movable(open_sheet(SPLIT), "supply.no_load")
    assert (key.now, key.kind, key.span, key.whole) == (34.0, VOLTAGE, (1.0, 300.0), False)
    sheet = key.at(36.5)
    assert sheet.amplifier.supply.no_load == (36.5,)
    assert sheet.amplifier.origin("supply.no_load") is Origin.MEASURED
    assert sheet.source == "split_rail.toml"
    assert open_sheet(SPLIT).sheet().amplifier.supply.no_load == (34.0,)


# The sheet is read again, so what follows from a value follows from the new one.
def test_what_the_sheet_fills_in_follows():
    sheet = moved("mains.actual", 200.0)
    assert sheet.entries["mains.present"].nominal == 200.0
    assert moved("stage.pairs", 3).amplifier.stage.pairs_conducting == 3.0


def test_a_tolerance_goes_with_its_value():
    entry = moved("heatsink.sink_to_air", 1.9).entries["heatsink.sink_to_air"]
    assert (entry.low, entry.high) == pytest.approx((1.71, 2.09))
    entry = moved("heatsink.air", 50.0).entries["heatsink.air"]
    assert (entry.low, entry.high) == (45.0, 55.0)


def test_a_list_keeps_its_proportions_to_the_largest():
    key = movable(open_mapping(tables(supply__no_load=["33 V", "44 V ±1 V"])), "supply.no_load")
    assert key.now == 44.0
    assert key.written(66.0) == ["49.5 V", "66 V ±1.5 V"]
    assert key.at(66.0).amplifier.supply.no_load == pytest.approx((49.5, 66.0))


# 14.2 / 15 of 13.86 mV are 13.1208 mV, and in floats a little more.
@pytest.mark.parametrize(
    ("value", "expected"),
    [
        (0.01386, ["13.86 mV", "13.12 mV"]), (0.0138612, ["13.8612 mV", "13.1219 mV"]),
        (0.014, ["14 mV", "13.25 mV"]), (0.015, ["15 mV", "14.2 mV"]),
        (0.013861234567890123, ["13.861234567890122 mV", "13.1219687243 mV"]),
    ],
)  # fmt: skip
def test_what_is_scaled_in_a_list_has_the_digits_of_the_value_and_no_noise(value, expected):
    two = tables(readings__idle_upper=["15 mV", "14.2 mV"], stage__pairs=2)
    assert movable(open_mapping(two), "readings.idle_upper").written(value) == expected


def test_the_value_that_is_there_leaves_the_others_as_they_are():
    there = ["15 mV", "14.2345678901234 mV"]
    two = tables(readings__idle_upper=there, stage__pairs=2)
    assert movable(open_mapping(two), "readings.idle_upper").written(0.015) == there


def test_a_list_of_zeros_becomes_the_value():
    key = movable(
        open_mapping(tables(readings__idle_upper=["0 mV", "0 mV"], stage__pairs=2)), "readings.idle_upper"
    )
    assert key.written(0.014) == ["14 mV", "14 mV"]


def test_a_key_that_is_not_written_is_moved_too():
    key = movable(open_mapping(tables()), "loudspeaker.lowest_note")
    assert key.at(40.0).amplifier.loudspeaker.lowest_note == 40.0
    key = movable(open_mapping(tables()), "output_capacitor.capacitance")
    assert key.now is None
    data = tables()
    del data["protection"]
    assert movable(open_mapping(data), "protection.trip_delay").at(0.1).amplifier.protection.trip_delay == 0.1


@pytest.mark.parametrize(
    ("changes", "kind"),
    [({}, VOLTAGE), ({"stage__idle": "40 mA"}, CURRENT)],
)
def test_a_key_of_two_kinds_keeps_its_own(changes, kind):
    assert movable(open_mapping(tables(**changes)), "stage.idle").kind == kind


def test_idle_that_is_not_written_is_a_current_without_a_resistor():
    data = tables(stage__emitter_resistor="none")
    del data["stage"]["idle"]
    key = movable(open_mapping(data), "stage.idle")
    assert key.kind == CURRENT
    assert key.at(0.05).amplifier.stage.idle == 0.05


@pytest.mark.parametrize("text", ["34 mV, measured", "+34 mV, measured"])
def test_a_reading_without_a_sign_stays_without(text):
    key = movable(open_mapping(tables(readings__offset_cold=text)), "readings.offset_cold")
    signed = text.startswith("+")
    assert key.span == ((-1000.0, 1000.0) if signed else (1e-6, 1000.0))
    assert ("readings.offset_cold" in key.at(0.02).amplifier.readings.unsigned) is not signed


def test_a_dropped_sign_is_written_again():
    data = tables()
    data["device"]["fitted"]["current"] = "-12 A"
    sheet = movable(open_mapping(data), "device.fitted.current").at(8.0)
    assert sheet.amplifier.device["fitted"].current == 8.0
    assert any("signs of device.fitted.current dropped" in remark for remark in sheet.remarks)


def test_a_device_of_a_folder_is_moved(tmp_path):
    data = tables()
    device = data.pop("device")["fitted"]
    lines = [f'{key} = "{value}"' for key, value in device.items() if isinstance(value, str)]
    (tmp_path / "mine.toml").write_text("\n".join(["[device.fitted]", *lines]), encoding="utf-8")
    key = movable(open_mapping(data, device_folder=tmp_path), "device.fitted.power")
    assert key.now == 150.0
    assert key.at(160.0).amplifier.device["fitted"].power == 160.0


def test_what_the_sheet_cannot_have_is_refused_as_if_it_were_written():
    with pytest.raises(ReadingError, match="is above no_load, 20 V"):
        moved("supply.no_load", 20.0)
    with pytest.raises(ReadingError, match="say the same thing twice"):
        moved("stage.clipped_peak", 25.0)


@pytest.mark.parametrize(
    ("key", "trouble", "text"),
    [
        ("supply.no_lod", KeyError, "supply.no_lod is not a key of this sheet; did you mean supply.no_load"),
        (
            "device.other.power",
            KeyError,
            "device.other.power is not a key of this sheet; did you mean device",
        ),
        ("supply.rails", ValueError, "supply.rails holds a word, not a number that can be moved"),
        ("stage.bridged", ValueError, "stage.bridged holds a word"),
        ("device.fitted.safe_area", ValueError, "device.fitted.safe_area holds a curve"),
    ],
)
def test_a_key_that_holds_no_number_is_refused_by_name(key, trouble, text):
    with pytest.raises(trouble, match=text):
        movable(open_mapping(tables()), key)


def test_typed_words_may_use_blanks_and_capitals():
    assert movable(open_mapping(tables()), " Supply.no_load ").path == "supply.no_load"


def test_every_number_that_is_written_can_be_moved_to_itself():
    source = open_sheet(SPLIT)
    sheet = source.sheet()
    keys = movable_keys(sheet)
    assert {"device.fitted.power", "supply.no_load", "stage.idle", "heatsink.fins.width"} <= set(keys)
    assert not {"supply.rails", "device.fitted.safe_area", "supply.rail_fuse"} & set(keys)
    written = [key for key in keys if sheet.amplifier.origin(key) not in (None, Origin.ASSUMED)]
    assert len(written) > 30
    for key in written:
        found = movable(source, key)
        assert found.now is not None
        assert numbers(found.at(found.now)) == numbers(sheet), key


def numbers(sheet):
    return {path: (one.nominal, one.low, one.high, one.origin) for path, one in sheet.entries.items()}


def test_a_float_of_a_program_is_moved():
    data = tables(supply__no_load=34.0)
    assert sheet_from(data).amplifier.supply.no_load == (34.0,)
    assert movable(open_mapping(data), "supply.no_load").at(36.0).amplifier.supply.no_load == (36.0,)


def test_an_item_of_a_list_moves_alone():
    key = movable(open_mapping(tables(supply__no_load=["33 V", "44 V ±1 V"])), "supply.no_load.1")
    assert (key.path, key.now) == ("supply.no_load.1", 44.0)
    assert key.written(66.0) == ["33 V", "66 V ±1.5 V"]
    assert key.at(40.0).amplifier.supply.no_load == pytest.approx((33.0, 40.0))
    assert movable(open_mapping(tables()), "supply.no_load.0").at(40.0).amplifier.supply.no_load == (40.0,)


@pytest.mark.parametrize(
    ("typed", "text"),
    [
        ("supply.no_load[1]", "is not how an item is named; write supply.no_load.1, counted from 0"),
        ("supply.no_load.2", "is not there: supply.no_load has 1 in the sheet, counted from 0"),
        ("supply.full_load_share.0", "is not a key of this sheet"),
    ],
)
def test_an_item_that_is_named_otherwise_or_not_there_is_refused(typed, text):
    with pytest.raises(KeyError, match=text):
        movable(open_mapping(tables()), typed)
