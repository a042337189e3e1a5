"""What a sheet becomes: values, entries, origins, remarks; from a file and from a program alike."""

import hashlib
import math

import pytest

from safeamp.amplifier import Fuse, Limiter, value_at, with_values
from safeamp.complaints import ReadingError
from safeamp.quantities import CURRENT, RESISTANCE, VOLTAGE, Origin, quantity
from safeamp.reading import load_sheet, sheet_from
from tests.reading.desk import GONE, SCENARIOS, change, load, scenario

NAMES = (
    "bench_mockup",
    "healthy",
    "leaky_capacitor",
    "mosfet_substitute",
    "old_mains",
    "single_rail",
    "split_rail",
)


@pytest.mark.parametrize("name", NAMES)
def test_every_entry_has_its_value_in_the_amplifier_and_an_origin(name):
    sheet = load_sheet(SCENARIOS / f"{name}.toml")
    for path, entry in sheet.entries.items():
        assert value_at(sheet.amplifier, path) == entry.nominal
        assert entry.low <= entry.nominal <= entry.high
        assert sheet.amplifier.origin(path) is entry.origin
        assert value_at(with_values(sheet.amplifier, {path: 7.0}), path) == 7.0


@pytest.mark.parametrize("name", NAMES)
def test_every_key_that_is_written_has_a_value_and_an_origin(name):
    sheet = load_sheet(SCENARIOS / f"{name}.toml")
    for table, keys in scenario(name).items():
        for key in keys if isinstance(keys, dict) and table != "device" else ():
            assert value_at(sheet.amplifier, f"{table}.{key}") is not None
            assert sheet.amplifier.origin(f"{table}.{key}") not in (None, Origin.ASSUMED)


def test_source_and_digest_are_those_of_the_file():
    file = SCENARIOS / "healthy.toml"
    sheet = load_sheet(str(file))
    assert sheet.source == "healthy.toml"
    assert sheet.digest == hashlib.sha256(file.read_bytes()).hexdigest()


def test_numbers_come_in_si_with_line_text_and_origin(tmp_path):
    entry = load_sheet(SCENARIOS / "split_rail.toml").entries["supply.reservoir_rated_voltage"]
    assert (entry.nominal, entry.kind, entry.origin, entry.text) == (
        50.0,
        VOLTAGE,
        Origin.MARKED,
        "50 V, marked",
    )
    lines = (SCENARIOS / "split_rail.toml").read_text().splitlines()
    assert lines[entry.line - 1].startswith("reservoir_rated_voltage")
    entry = load(tmp_path, {"supply.no_load": ["22 V ±1 %, measured", "-21 V, guess"]}).entries[
        "supply.no_load.1"
    ]
    assert (entry.nominal, entry.low, entry.high) == (21.0, 15.75, 26.25)


def test_a_list_has_the_origin_of_its_weakest_value(tmp_path):
    amplifier = load(tmp_path, {"supply.no_load": ["22 V, measured", "21 V, guess"]}).amplifier
    assert amplifier.supply.no_load == (22.0, 21.0)
    assert amplifier.origin("supply.no_load") is Origin.GUESS
    assert amplifier.origin("supply.no_load.0") is Origin.MEASURED
    amplifier = load(tmp_path, {"supply.no_load": ["22 V, example", "21 V, guess"]}).amplifier
    assert amplifier.origin("supply.no_load") is Origin.EXAMPLE


def test_one_rail_may_be_written_without_a_list(tmp_path):
    assert load(tmp_path, {"supply.no_load": "22 V"}).amplifier.supply.no_load == (22.0,)


def test_idle_is_volts_or_amperes_and_the_unit_stands_beside(tmp_path):
    stage = load(tmp_path, {"stage.idle_specified": "40 mA"}).amplifier.stage
    assert (stage.idle, stage.idle_unit) == (0.014, "V")
    assert (stage.idle_specified, stage.idle_specified_unit) == (0.04, "A")


@pytest.mark.parametrize(
    ("text", "fuse"),
    [
        ("T 2 A", ("T", 2.0)),
        ("T2A", ("T", 2.0)),
        ("T2AL250V", ("T", 2.0, "L", 250.0)),
        ("T3.15AH250V", ("T", 3.15, "H", 250.0)),
        ("F500mAL250V", ("F", 0.5, "L", 250.0)),
        ("T2AE", ("T", 2.0, "E")),
        ("T 2 A L / 63 V", ("T", 2.0, "L", 63.0)),
        ("F 500 mA", ("F", 0.5)),
        ("T 3.15 A", ("T", 3.15)),
        ("FF 1 A", ("FF", 1.0)),
        ("M 1 A", ("M", 1.0)),
        ("TT 1 A", ("TT", 1.0)),
        ("T 2 A 250 V", ("T", 2.0, "", 250.0)),
        ("T2A/250V", ("T", 2.0, "", 250.0)),
        ("quick 2 A", ("F", 2.0)),
        ("Time-lag 2 A", ("T", 2.0)),
    ],
)  # fmt: skip
def test_fuse(tmp_path, text, fuse):
    sheet = load(tmp_path, {"supply.rail_fuse": f"{text}, marked"})
    letter, rating, *imprint = fuse
    assert sheet.amplifier.supply.rail_fuse == Fuse(
        letter, rating, text, *imprint
    )  # its origin stands beside it
    assert sheet.amplifier.origin("supply.rail_fuse") is Origin.MARKED
    assert load(tmp_path, {"supply.rail_fuse": text}).amplifier.origin("supply.rail_fuse") is Origin.STATED


@pytest.mark.parametrize(
    ("text", "limiter"),
    [
        ("60 W lamp", ("lamp", 60.0)),
        ("lamp 100W", ("lamp", 100.0)),
        ("22 ohm", ("resistor", 22.0)),
        ("4k7", ("resistor", 4700.0)),
        ("bench", ("bench", None)),
        ("Bench supply", ("bench", None)),
    ],
)
def test_limiter(tmp_path, text, limiter):
    assert load(tmp_path, {"readings.limiter": text}).amplifier.readings.limiter == Limiter(*limiter, text)
    if limiter[0] != "bench":
        marked = load(tmp_path, {"readings.limiter": f"{text}, marked"})
        assert marked.amplifier.readings.limiter == Limiter(*limiter, text)
        assert marked.amplifier.origin("readings.limiter") is Origin.MARKED


@pytest.mark.parametrize(
    "path",
    [
        "supply.rail_fuse", "stage.drivers", "stage.series_resistor", "stage.zobel_resistor", "protection.trip_voltage",
        "protection.trip_delay", "protection.vi_limiter", "protection.loudspeaker_fuse", "readings.earth_resistance",
    ],
)  # fmt: skip
def test_none_is_a_part_that_is_not_fitted(tmp_path, path):
    sheet = load(tmp_path, {path: " None"})
    assert path in sheet.amplifier.absent
    assert value_at(sheet.amplifier, path) is None
    assert sheet.amplifier.origin(path) is Origin.STATED
    assert path not in sheet.entries
    assert path not in sheet.unassessed


def test_no_emitter_resistor_is_zero_ohm(tmp_path):
    changes = {"stage.emitter_resistor": "none"}
    sheet = load(tmp_path, changes, base="bench_mockup")
    assert sheet.amplifier.stage.emitter_resistor == 0.0
    assert "stage.emitter_resistor" in sheet.amplifier.absent


def test_none_is_a_word_where_it_is_a_choice(tmp_path):
    amplifier = load(tmp_path, {"stage.bias_sensor": "none"}).amplifier
    assert amplifier.stage.bias_sensor == "none"
    assert "stage.bias_sensor" not in amplifier.absent


def test_words_may_be_typed_with_blanks_hyphens_and_capitals(tmp_path):
    changes = {
        "stage.arrangement": "Quasi complementary",
        "device.fitted.kind": "Vertical-MOSFET",
        "stage.upper": "Fitted",
    }
    amplifier = load(tmp_path, changes).amplifier
    assert amplifier.stage.arrangement == "quasi-complementary"
    assert amplifier.device["fitted"].kind == "vertical mosfet"
    assert amplifier.stage.upper == "fitted"


def test_readings_without_a_written_sign_are_remembered(tmp_path):
    changes = {
        "readings.offset_cold": "+12 mV",
        "readings.offset_warm": "18 mV",
        "readings.offset_with_signal": "−3 mV",
    }
    readings = load(tmp_path, changes).amplifier.readings
    assert readings.offset_with_signal == -0.003
    assert readings.unsigned == {"readings.offset_warm", "readings.limiter_output"}


def test_dropped_signs_are_said_once_for_each_key(tmp_path):
    changes = {
        "device.fitted.voltage": "-160 V",
        "device.fitted.safe_area": [["-40 V", "-3.75 A"], ["-100 V", "-0.75 A"]],
        "supply.no_load": ["22 V", "-22 V"],
    }
    sheet = load(tmp_path, changes)
    assert sheet.amplifier.device["fitted"].voltage == 160.0
    assert sheet.amplifier.device["fitted"].safe_area == ((40.0, 3.75), (100.0, 0.75))
    [remark] = sheet.remarks
    assert sorted(remark.split(" dropped")[0].removeprefix("signs of ").split(", ")) == [
        "device.fitted.safe_area",
        "device.fitted.voltage",
        "supply.no_load",
    ]


def test_points_and_curves(tmp_path):
    changes = {
        "device.fitted.pulse": [
            ["1 ms", ["40 V", "9 A"]],
            ["10 ms", ["40 V", "5 A"], ["100 V", "1 A, example"]],
        ],
        "device.fitted.transient": [["0.3 K/W", "2 ms"], ["0.1 K/W", "1 ms"]],
        "protection.vi_limiter": [["0 V", "6 A"], ["60 V", "0 A"]],
    }
    amplifier = load(tmp_path, changes).amplifier
    fitted = amplifier.device["fitted"]
    assert fitted.pulse == ((0.001, ((40.0, 9.0),)), (0.01, ((40.0, 5.0), (100.0, 1.0))))
    assert fitted.transient == ((0.3, 0.002), (0.1, 0.001))
    assert amplifier.protection.vi_limiter == ((0.0, 6.0), (60.0, 0.0))
    assert amplifier.origin("device.fitted.pulse") is Origin.EXAMPLE
    assert amplifier.origin("protection.vi_limiter") is Origin.STATED


def test_fins_are_a_table_inside_a_table(tmp_path):
    fins = {"width": "200 mm", "height": "75 mm", "depth": "30 mm", "thickness": "2 mm", "count": 12}
    sheet = load(tmp_path, {"heatsink.sink_to_air": GONE, "heatsink.fins": fins})
    assert sheet.amplifier.heatsink.fins.count == 12
    assert sheet.entries["heatsink.fins.width"].nominal == pytest.approx(0.2)


def test_floats_and_quantities_of_a_program_are_the_texts_of_a_file():
    text = scenario("split_rail")
    numbers = change(
        text,
        {
            "supply.no_load": 34.0,
            "supply.full_load": [31.0],
            "supply.reservoir": 6800e-6,
            "stage.emitter_resistor": quantity(0.33, RESISTANCE),
            "stage.idle": quantity(0.014, VOLTAGE),
            "heatsink.air": 35.0,
            "loudspeaker.phase_angle": 45,
            "readings.offset_cold": 0.034,
            "readings.limiter_rails": (12.2, quantity(12.1, VOLTAGE)),
            "device.fitted.current": quantity(12.0, CURRENT),
            "device.fitted.safe_area": [(40.0, 3.75), (100.0, quantity(0.75, CURRENT)), (160.0, 0.25)],
        },
    )
    plain, said = sheet_from(numbers), sheet_from(text)
    assert {path: entry.nominal for path, entry in plain.entries.items()} == {
        path: entry.nominal for path, entry in said.entries.items()
    }
    assert plain.amplifier.device["fitted"].safe_area == said.amplifier.device["fitted"].safe_area
    assert plain.amplifier.readings.unsigned == said.amplifier.readings.unsigned
    assert plain.amplifier.stage.idle_unit == "V"
    assert (
        "readings.offset_cold"
        not in sheet_from(change(numbers, {"readings.offset_cold": -0.034})).amplifier.readings.unsigned
    )


@pytest.mark.parametrize("name", NAMES)
def test_the_same_tables_from_file_and_program_are_one_sheet(name):
    file, program = load_sheet(SCENARIOS / f"{name}.toml"), sheet_from(scenario(name))
    assert program.amplifier.origins == file.amplifier.origins
    assert program.assumptions == file.assumptions
    assert {p: (e.nominal, e.low, e.high, e.middle) for p, e in program.entries.items()} == {
        p: (e.nominal, e.low, e.high, e.middle) for p, e in file.entries.items()
    }


@pytest.mark.parametrize(
    "value", [0.014, math.nan, math.inf, object(), {"a": 1}, None, quantity(1.0, RESISTANCE)]
)
def test_a_program_is_refused_what_has_no_meaning(value):
    with pytest.raises(ReadingError, match=r"python: stage\.idle: .* write a voltage, such as"):
        sheet_from(change(scenario("healthy"), {"stage.idle": value}))


def test_a_temperature_may_lie_below_zero():
    sheet = sheet_from(change(scenario("healthy"), {"heatsink.air": "-5 degC, measured"}))
    assert sheet.amplifier.heatsink.air == -5.0
