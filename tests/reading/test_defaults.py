"""Defaults: each steps in where the sheet says nothing, is listed, and never where something is said."""

# One case a line, however long, so that a table reads as one.
# ruff: noqa: E501

import pytest

from safeamp.amplifier import value_at
from safeamp.quantities import Origin
from safeamp.reading.supply_defaults import declared_voltage
from tests.reading.desk import GONE, load

ASSUMED, STATED, MEASURED = Origin.ASSUMED, Origin.STATED, Origin.MEASURED
SINGLE = "single_rail"

# Sheet, changes, key path, nominal, low, high, origin, key of the listed assumption (or None).
NUMBERS = [
    ("healthy", {"mains.nominal": GONE, "mains.actual": "118 V"}, "mains.nominal", 120, 120, 120, ASSUMED, "mains.nominal"),
    ("healthy", {}, "mains.highest", 253, 253, 253, STATED, "mains.highest"),
    ("healthy", {"mains.actual": "260 V, measured"}, "mains.highest", 260, 260, 260, STATED, "mains.highest"),
    ("healthy", {"mains.highest": "240 V"}, "mains.highest", 240, 240, 240, STATED, None),
    ("healthy", {}, "mains.present", 230, 230, 253, MEASURED, None),
    ("healthy", {"mains.actual": "230 V ±2 %"}, "mains.present", 230, 225.4, 253, STATED, None),
    ("healthy", {"mains.actual": "230 V ±20 V", "mains.highest": "231 V"}, "mains.present", 230, 210, 250, STATED, None),
    ("healthy", {"supply.at_mains": GONE, "mains.actual": "235 V"}, "supply.at_mains", 235, 235, 235, ASSUMED, "supply.at_mains"),
    ("healthy", {"supply.at_mains": GONE, "supply.no_load": "22 V", "mains.rated": "220 V"}, "supply.at_mains", 220, 220, 220, ASSUMED, "supply.at_mains"),
    ("healthy", {"supply.at_mains": GONE, "supply.no_load": ["22 V, measured", "22 V"], "mains.rated": "220 V"}, "supply.at_mains", 220, 220, 220, ASSUMED, "supply.at_mains"),
    ("healthy", {"supply.full_load": GONE}, "supply.full_load_share", 0.875, 0.8, 0.95, ASSUMED, "supply.full_load"),
    ("healthy", {}, "stage.bias_tracking", 0.8, 0.7, 1.0, ASSUMED, "stage.bias_tracking"),
    ("healthy", {"stage.pairs": GONE}, "stage.pairs", 1, 1, 1, ASSUMED, "stage.pairs"),
    ("split_rail", {"stage.pairs": 3}, "stage.pairs_conducting", 3, 3, 3, ASSUMED, "stage.pairs_conducting"),
    ("split_rail", {"stage.swing_loss": GONE}, "stage.swing_loss", 0, 0, 0, ASSUMED, "stage.swing_loss"),
    ("healthy", {}, "device.fitted.power_at", 25, 25, 25, ASSUMED, "device.fitted.power_at"),
    ("healthy", {}, "heatsink.other_heat", 0, 0, 0, ASSUMED, "heatsink.other_heat"),
    ("healthy", {"heatsink.air": "35 degC"}, "heatsink.air", 35, 35, 45, STATED, "heatsink.air"),
    ("healthy", {"heatsink.air": "35 degC, measured"}, "heatsink.air", 35, 35, 45, MEASURED, "heatsink.air"),
    ("healthy", {"heatsink.air": "35 degC, guess"}, "heatsink.air", 35, 25, 45, Origin.GUESS, None),
    ("healthy", {}, "heatsink.air", 35, 30, 40, MEASURED, None),
    ("healthy", {"heatsink.sink_to_air": "1 K/W"}, "heatsink.sink_to_air", 1, 0.7, 1.7, STATED, "heatsink.sink_to_air"),
    ("healthy", {"heatsink.sink_to_air": "1 K/W, manual"}, "heatsink.sink_to_air", 1, 0.7, 1.7, Origin.MANUAL, "heatsink.sink_to_air"),
    ("healthy", {"heatsink.sink_to_air": "1 K/W, data sheet"}, "heatsink.sink_to_air", 1, 0.9, 1.3, Origin.DATA_SHEET, "heatsink.sink_to_air"),
    ("healthy", {"heatsink.sink_to_air": "1 K/W, guess"}, "heatsink.sink_to_air", 1, 0.7, 1.7, Origin.GUESS, "heatsink.sink_to_air"),
    ("healthy", {"heatsink.sink_to_air": "1 K/W ±5 %, guess"}, "heatsink.sink_to_air", 1, 0.95, 1.05, Origin.GUESS, None),
    ("healthy", {"heatsink.sink_to_air": "1 K/W, measured"}, "heatsink.sink_to_air", 1, 1, 1, MEASURED, None),
    ("healthy", {"heatsink.sink_to_air": "1 K/W ±5 %"}, "heatsink.sink_to_air", 1, 0.95, 1.05, STATED, None),
    ("healthy", {"heatsink.case_to_sink": "1 K/W"}, "heatsink.case_to_sink", 1, 0.7, 1.7, STATED, "heatsink.case_to_sink"),
    ("healthy", {"heatsink.case_to_sink": GONE, "heatsink.insulator": "TO-3 mica greased"}, "heatsink.case_to_sink", 0.36, 0.288, 0.72, ASSUMED, "heatsink.case_to_sink"),
    ("healthy", {"loudspeaker.minimum_impedance": GONE}, "loudspeaker.minimum_share", 0.8, 0.8, 0.8, ASSUMED, "loudspeaker.minimum_impedance"),
    ("healthy", {"loudspeaker.phase_angle": GONE}, "loudspeaker.phase_angle", 45, 45, 45, ASSUMED, "loudspeaker.phase_angle"),
    ("healthy", {}, "loudspeaker.lowest_note", 20, 20, 20, ASSUMED, "loudspeaker.lowest_note"),
    ("healthy", {}, "loudspeaker.power_share", 1, 1, 1, STATED, None),
    ("healthy", {"loudspeaker.power_word": "programme"}, "loudspeaker.power_share", 0.5, 0.5, 0.5, STATED, None),
    ("healthy", {"loudspeaker.power_word": "Peak"}, "loudspeaker.power_share", 0.25, 0.25, 0.25, STATED, None),
    ("healthy", {"loudspeaker.power_word": GONE}, "loudspeaker.power_share", 0.5, 0.25, 0.5, ASSUMED, "loudspeaker.power_word"),
    (SINGLE, {"readings.midpoint": GONE}, "readings.midpoint_share", 0.5, 0.45, 0.55, ASSUMED, "readings.midpoint"),
    (SINGLE, {}, "output_capacitor.capacitance", 680e-6, 680e-6, 680e-6, MEASURED, None),
    (SINGLE, {"output_capacitor.capacitance": "680 uF, marked"}, "output_capacitor.capacitance", 680e-6, 544e-6, 816e-6, Origin.MARKED, "output_capacitor.capacitance"),
    (SINGLE, {"output_capacitor.capacitance": "680 uF ±10 %"}, "output_capacitor.capacitance", 680e-6, 612e-6, 748e-6, STATED, None),
    (SINGLE, {"output_capacitor.target_cutoff": GONE}, "output_capacitor.target_cutoff", 20, 20, 20, ASSUMED, "output_capacitor.target_cutoff"),
    ("healthy", {"stage.emitter_resistor": "none", "stage.idle": "40 mA", "stage.idle_specified": GONE, "readings": {"taken_on": "mains"}}, "stage.emitter_resistor", 0, 0, 0, STATED, None),
]  # fmt: skip

WORDS = [
    ("bench_mockup", {}, "stage.arrangement", "complementary", "stage.arrangement"),
    ("healthy", {"stage.bias_sensor": GONE}, "stage.bias_sensor", "none", "stage.bias_sensor"),
    ("healthy", {"stage.idle_at": GONE}, "stage.idle_at", "warm", "stage.idle_at"),
    ("healthy", {"stage.idle_at": GONE, "stage.idle": "14 mV"}, "stage.idle_at", "cold", "stage.idle_at"),
    ("healthy", {}, "heatsink.accessible", True, "heatsink.accessible"),
    ("healthy", {}, "loudspeaker.load", "loudspeaker", "loudspeaker.load"),
    ("healthy", {}, "readings.taken_on", "mains", "readings.taken_on"),
    ("healthy", {}, "supply.source", "mains", "supply.source"),
]

ABSENT = [
    ("healthy", {"stage.bias_sensor": "none"}, "stage.bias_tracking"),
    ("healthy", {"stage.idle_at": GONE, "stage.idle": GONE}, "stage.idle_at"),
    ("healthy", {}, "supply.full_load_share"),
    ("healthy", {"supply.at_mains": GONE, "supply.no_load": "22 V", "mains.rated": GONE}, "supply.at_mains"),
    ("healthy", {"supply.at_mains": GONE, "mains.actual": GONE}, "supply.at_mains"),
    ("healthy", {"mains": GONE}, "mains.highest"),
    ("healthy", {"mains": GONE}, "mains.present"),
    ("healthy", {"mains.actual": GONE}, "mains.present"),
    ("healthy", {"supply.source": "battery"}, "mains.present"),
    ("healthy", {"supply.source": "bench", "supply.full_load": GONE}, "supply.full_load_share"),
    ("healthy", {}, "loudspeaker.minimum_share"),
    ("healthy", {"loudspeaker.rated_power": GONE}, "loudspeaker.power_share"),
    ("healthy", {}, "readings.midpoint_share"),
    (SINGLE, {}, "readings.midpoint_share"),
    ("healthy", {}, "output_capacitor.target_cutoff"),
    (SINGLE, {}, "stage.swing_loss"),
    ("split_rail", {"stage.pairs": 2}, "stage.imbalance"),
]


@pytest.mark.parametrize(("base", "changes", "path", "nominal", "low", "high", "origin", "listed"), NUMBERS)
def test_number(tmp_path, base, changes, path, nominal, low, high, origin, listed):
    sheet = load(tmp_path, changes, base=base)
    entry = sheet.entries[path]
    assert (entry.nominal, entry.low, entry.high) == pytest.approx((nominal, low, high), rel=1e-12)
    assert value_at(sheet.amplifier, path) == entry.nominal
    assert entry.origin is origin
    assert sheet.amplifier.origin(path) is origin
    named = [assumed.key for assumed in sheet.assumptions]
    assert named.count(listed) == 1 if listed else path not in named


@pytest.mark.parametrize(("base", "changes", "path", "word", "listed"), WORDS)
def test_word(tmp_path, base, changes, path, word, listed):
    sheet = load(tmp_path, changes, base=base)
    assert value_at(sheet.amplifier, path) == word
    assert sheet.amplifier.origin(path) is ASSUMED
    assert [assumed.key for assumed in sheet.assumptions].count(listed) == 1


@pytest.mark.parametrize(("base", "changes", "path"), ABSENT)
def test_nothing_is_filled_in_where_it_does_not_apply(tmp_path, base, changes, path):
    sheet = load(tmp_path, changes, base=base)
    assert value_at(sheet.amplifier, path) is None
    assert path not in sheet.entries


@pytest.mark.parametrize(
    ("actual", "declared"),
    [
        (100, 100),
        (109, 100),
        (111, 120),
        (123, 120),
        (124, 127),
        (178, 127),
        (179, 230),
        (220, 230),
        (240, 230),
        (250, 230),
    ],
)
def test_declared_voltage_is_the_nearest(actual, declared):
    assert declared_voltage(actual) == declared


def test_imbalance_is_listed_for_parallel_devices_only(tmp_path):
    assert "stage.imbalance" in [
        a.key for a in load(tmp_path, {"stage.pairs": 2}, base="split_rail").assumptions
    ]
    assert "stage.imbalance" not in [a.key for a in load(tmp_path, base="split_rail").assumptions]


def test_conducting_pairs_are_listed_for_parallel_devices_only(tmp_path):
    assert "stage.pairs_conducting" not in [a.key for a in load(tmp_path, base="split_rail").assumptions]


def test_where_both_sides_clip_alike_is_a_level_when_the_midpoint_may_lie_on_either_side(tmp_path):
    # 58 V loaded, 3 V lost upward and 2 V downward: alike at (58 − 3 + 2)/2 of 58, that is 31.45 of 64 V without load
    inside = load(tmp_path, {"readings.midpoint": "31 V ±2 V"}, base=SINGLE)
    assert inside.entries["readings.midpoint"].middle == pytest.approx((64.0 * (58 - 3 + 2) / 2 / 58,))
    lossless = {"readings.midpoint": "31 V ±2 V", "stage.swing_loss_up": GONE, "stage.swing_loss_down": GONE}
    alike = load(tmp_path, lossless, base=SINGLE)
    assert alike.entries["readings.midpoint"].middle == (32.0,)
    assert (
        load(tmp_path, {"readings.midpoint": "30.4 V"}, base=SINGLE).entries["readings.midpoint"].middle == ()
    )
    beside = load(tmp_path, {"readings.midpoint": "30 V ±1 V"}, base=SINGLE)
    assert beside.entries["readings.midpoint"].middle == ()


def test_a_small_phase_angle_without_a_curve_is_said_to_count_as_45_degrees(tmp_path):
    sheet = load(tmp_path, {"loudspeaker.phase_angle": "30 deg"})
    assert "loudspeaker.phase_angle of 30 deg counts as 45 deg: there is no curve" in sheet.remarks
    assert sheet.amplifier.loudspeaker.phase_angle == 30
    curve = "frequency [Hz], impedance [ohm], phase [deg]\n20, 7.5, 30\n200, 6.1, -20\n"
    (tmp_path / "curve.csv").write_text(curve)
    sheet = load(tmp_path, {"loudspeaker.phase_angle": "30 deg", "loudspeaker.impedance_curve": "curve.csv"})
    assert sheet.remarks == ("loudspeaker.phase_angle does not count: the impedance curve has every angle",)


def test_a_curve_stands_in_place_of_an_assumed_angle_and_an_assumed_minimum(tmp_path):
    curve = "frequency [Hz], impedance [ohm], phase [deg]\n20, 7.5, 30\n200, 6.1, -20\n"
    (tmp_path / "curve.csv").write_text(curve)
    bare = {"loudspeaker.phase_angle": GONE, "loudspeaker.minimum_impedance": GONE}
    sheet = load(tmp_path, {**bare, "loudspeaker.impedance_curve": "curve.csv"})
    table = sheet.amplifier.loudspeaker
    assert (table.minimum_impedance, table.minimum_share, table.phase_angle) == (6.1, None, None)
    assumed = {one.key for one in sheet.assumptions}
    assert assumed.isdisjoint({"loudspeaker.phase_angle", "loudspeaker.minimum_impedance"})
    own = load(
        tmp_path, {"loudspeaker.minimum_impedance": "5 ohm", "loudspeaker.impedance_curve": "curve.csv"}
    )
    assert own.amplifier.loudspeaker.minimum_impedance == 5.0


def test_the_lowest_point_of_a_curve_may_lie_above_the_label(tmp_path):
    curve = "frequency [Hz], impedance [ohm], phase [deg]\n20, 9.5, 30\n200, 8.4, -20\n"
    (tmp_path / "curve.csv").write_text(curve)
    sheet = load(
        tmp_path, {"loudspeaker.minimum_impedance": GONE, "loudspeaker.impedance_curve": "curve.csv"}
    )
    assert sheet.amplifier.loudspeaker.minimum_impedance == 8.4


def test_an_insulator_beside_a_thermal_resistance_is_not_used_and_said_so(tmp_path):
    sheet = load(tmp_path, {"heatsink.insulator": "to-3 mica greased"})
    assert sheet.entries["heatsink.case_to_sink"].nominal == 0.45
    assert "heatsink.case_to_sink is given, so heatsink.insulator is not used" in sheet.remarks


def test_an_output_capacitor_of_a_direct_coupled_stage_is_set_aside_with_a_remark(tmp_path):
    sheet = load(tmp_path, {"output_capacitor.capacitance": "2200 uF"})
    assert sheet.amplifier.output_capacitor.capacitance is None
    assert "output_capacitor.capacitance" not in sheet.entries
    assert '[output_capacitor] is not used: stage.coupling is "direct"' in sheet.remarks
