"""Every refusal of a sheet, matched on the words that were filled in."""

# One case a line, however long, so that a table reads as one.
# ruff: noqa: E501

import re

import pytest

from tests.reading.desk import GONE, complaints, load

RC = {
    "kind": "bipolar",
    "voltage": "160 V",
    "current": "12 A",
    "power": "150 W",
    "junction_limit": "150 degC",
}
POINTS = "device.fitted.safe_area"
LIMITER = "protection.vi_limiter"

KEYS_AND_WORDS = [
    ({"loudspeaker.nominal_impedence": "8 ohm"}, "loudspeaker.nominal_impedence: not a known key; did you mean nominal_impedance?"),
    ({"suply.rails": "split"}, "suply: not a known table or key; did you mean supply?"),
    ({"rails": "split"}, "rails: not a known table or key; rails belongs into [supply]"),
    ({"stage.no_load": "30 V"}, "stage.no_load: not a known key; no_load belongs into [supply]"),
    ({"supply.xyzzy": 1}, "supply.xyzzy: not a known key; [supply] has source, rails, no_load"),
    ({"mains.present": "230 V"}, "mains.present: not a known key"),
    ({"stage.idle_unit": "V"}, "stage.idle_unit: not a known key"),
    ({"device.fitted.volts": "160 V"}, "device.fitted.volts: not a known key"),
    ({"heatsink.fins.hight": "80 mm"}, "heatsink.fins.hight: not a known key; did you mean height?"),
    ({"supply": "split"}, "supply: this is no table; write [supply] and its keys below it"),
    ({"heatsink.fins": 3}, "heatsink.fins: this is no table; write [heatsink.fins]"),
    ({"device": "fitted"}, "device: this is no table; write [device.NAME]"),
    ({"device.fitted": "bipolar"}, "device.fitted: this is no table; write [device.fitted]"),
    ({"device.7": RC}, "device.7: is no name for a device"),
    ({"supply.rails": "slpit"}, 'supply.rails: "slpit" is not known here; did you mean split?; write "split" or "single"'),
    ({"supply.rails": 2}, "supply.rails: 2 is not a text; write text in quotes"),
    ({"supply.rails": True}, "supply.rails: true is not a text"),
    ({"stage.upper": ""}, 'stage.upper: "" is not a text'),
    ({"stage.bridged": "no"}, 'stage.bridged: "no" is neither true nor false; write true or false, without quotes'),
    ({"stage.bridged": 0}, "stage.bridged: 0 is neither true nor false"),
    ({"stage.upper": "fited"}, 'stage.upper: "fited" is not a known device; did you mean fitted?'),
    ({"stage.drivers": ["driver", "drivr"]}, 'stage.drivers.1: "drivr" is not a known device; did you mean driver?'),
    ({"stage.drivers": []}, "stage.drivers: a list is not a list of names"),
    ({"stage.drivers": [1]}, "stage.drivers: 1 is not a text"),
    ({"title": GONE}, "title: is missing"),
    ({"title": " "}, "title: this is not a text"),
    ({"notes": 3}, "notes: this is not a text"),
    ({"sheet_version": 2}, "sheet_version: 2 is not read; this program reads sheet_version = 1"),
    ({"sheet_version": True}, "sheet_version: true is not read"),
    ({"heatsink.insulator": "mica gresed to-3", "heatsink.case_to_sink": GONE}, "heatsink.insulator: mica gresed to 3 is not a known interface"),
]  # fmt: skip

NUMBERS = [
    ({"supply.no_load": 35}, 'supply.no_load: 35 has no unit; write a voltage in quotes, such as "35 V"'),
    ({"supply.no_load": "35 A"}, 'supply.no_load: "35 A" is a current'),
    ({"supply.no_load": True}, "supply.no_load: true is not a voltage"),
    ({"supply.no_load": []}, "supply.no_load: this list is empty"),
    ({"supply.no_load": ["22 V", "22"]}, 'supply.no_load.1: "22" has no unit'),
    ({"supply.no_load": "22,5 V"}, "supply.no_load: \"22,5 V\""),
    ({"mains.actual": ["230 V"]}, "mains.actual: a list is not a voltage"),
    ({"stage.pairs": True}, "stage.pairs: true is not a whole number; write a bare whole number, such as 1"),
    ({"stage.pairs": "1"}, 'stage.pairs: "1" is not a whole number'),
    ({"stage.pairs": 1.5}, "stage.pairs: 1.5 is not a whole number"),
    ({"stage.pairs": 0}, "stage.pairs: 0 "),
    ({"stage.pairs": 51}, "stage.pairs: 51 "),
    ({"stage.pairs": 10**9}, "stage.pairs: "),
    ({"stage.pairs": 10**400}, "stage.pairs: "),
    ({"stage.idle": 14}, "stage.idle: 14 has no unit; write a voltage, such as"),
    ({"stage.idle": "14 W"}, "stage.idle: \"14 W\" is a power; write a voltage, such as"),
    ({"mains.actual": "none"}, 'mains.actual: "none" is meaningless here; write a voltage such as "35 V", or leave the key out'),
    ({"supply.rails": "none"}, 'supply.rails: "none" is meaningless here; write "split" or "single"'),
    ({"readings.limiter": "none"}, 'readings.limiter: "none" is meaningless here'),
    ({"supply.rail_fuse": "2 A"}, 'supply.rail_fuse: "2 A" is not read as a fuse: there is no letter of its time characteristic; write FF, F, M, T or TT before the rating, such as "T 2 A"'),
    ({"supply.rail_fuse": "X 2 A"}, '"X" is not a letter of its time characteristic'),
    ({"supply.rail_fuse": "T2,5A"}, 'supply.rail_fuse: "2,5A"'),
    ({"supply.rail_fuse": "T 2 V"}, 'supply.rail_fuse: "T 2 V" is not read as a fuse'),
    ({"supply.rail_fuse": "T 200 A"}, "supply.rail_fuse: "),
    ({"supply.rail_fuse": "T 2 A, guess"}, 'supply.rail_fuse: "T 2 A, guess" has a tolerance or is a guess'),
    ({"supply.rail_fuse": 2}, "supply.rail_fuse: 2 is not a text"),
    ({"readings.limiter": "60 W"}, 'readings.limiter: "60 W" is a power; write "60 W lamp", "22 ohm" or "bench"'),
    ({"readings.limiter": "60 V lamp"}, "readings.limiter: "),
    ({"loudspeaker.impedance_curve": "curve.csv"}, 'loudspeaker.impedance_curve: "curve.csv" is not a file beside the sheet'),
    ({"loudspeaker.impedance_curve": "a\0b"}, "loudspeaker.impedance_curve: "),
    ({"loudspeaker.impedance_curve": "x" * 300}, "is not a file beside the sheet"),
    ({"loudspeaker.q_mechanical": "none"}, 'loudspeaker.q_mechanical: "none" is meaningless here; write a bare number such as 0.8'),
]  # fmt: skip

CURVES = [
    ({POINTS: "40 V"}, f"{POINTS}: this is not a list of points"),
    ({POINTS: []}, f"{POINTS}: this is not a list of points"),
    ({POINTS: [["40 V"]]}, f'{POINTS}.0: this is not a point; write two texts, such as ["35 V", "30 mA"]'),
    ({POINTS: [["40 V", "3 A"], ["100 V", "1 W"]]}, f'{POINTS}.1: "1 W" is a power'),
    ({POINTS: [["40 V ±1 %", "3 A"]]}, f'{POINTS}.0: "40 V ±1 %" has a tolerance or is a guess'),
    ({POINTS: [["40 V", "3 A, guess"]]}, f'{POINTS}.0: "3 A, guess" has a tolerance or is a guess'),
    ({POINTS: [["100 V", "0.7 A"], ["40 V", "0.7 A"]]}, f"{POINTS}.1: 40 V does not rise above 100 V; write the points in order of rising voltage"),
    ({POINTS: [["40 V", "1 A"], ["40 V", "0.7 A"]]}, f"{POINTS}.1: 40 V does not rise above 40 V"),
    ({POINTS: [["40 V", "1 A"], ["100 V", "1.2 A"]]}, f"{POINTS}.1: 1.2 A at 100 V is more than 1 A at 40 V"),
    ({POINTS: [["0 V", "1 A"], ["100 V", "1 A"]]}, f"{POINTS}.0: a point of the safe area has a voltage and a current above zero"),
    ({POINTS: [["40 V", "1 A"], ["100 V", "0 A"]]}, f"{POINTS}.1: a point of the safe area has a voltage and a current above zero"),
    ({"device.fitted.pulse": [["1 ms", ["40 V", "5 A"]], ["1 ms", ["40 V", "5 A"]]]}, "device.fitted.pulse: the durations do not rise"),
    ({LIMITER: [["10 V", "1 A"], ["5 V", "1 A"]]}, f"{LIMITER}.1: 5 V does not rise above 10 V"),
    ({"device.fitted.pulse": "10 ms"}, "device.fitted.pulse: this is not a list of curves"),
    ({"device.fitted.pulse": [["10 ms"]]}, "device.fitted.pulse.0: this is not a duration and its points"),
    ({"device.fitted.pulse": [["10 V", ["40 V", "5 A"]]]}, 'device.fitted.pulse.0: "10 V" is a voltage'),
    ({"device.fitted.pulse": [["10 ms", ["40 V", "5 A"]], ["1 ms", ["40 V", "9 A"]]]}, "device.fitted.pulse: the durations do not rise"),
    ({"device.fitted.transient": [["2 ms", "0.3 K/W"]]}, 'device.fitted.transient.0: "2 ms" is a time'),
]  # fmt: skip

MISSING = [
    *(
        ({path: GONE}, f"{path}: is missing: ")
        for path in (
            "supply.rails", "supply.no_load", "stage.coupling", "stage.bridged", "stage.upper", "stage.lower",
            "stage.emitter_resistor", "heatsink.air", "heatsink.shared_by", "loudspeaker.nominal_impedance",
            "device.fitted.kind", "device.fitted.voltage", "device.fitted.current", "device.fitted.power",
            "device.fitted.junction_limit",
        )
    ),
    ({"supply.rails": GONE}, 'write "split" or "single"'),
    ({"device.fitted.junction_to_case": GONE}, "device.fitted.junction_to_case: is missing; write junction_to_case"),
    *(({table: GONE}, f"{table}: the table is missing; write [{table}] with ") for table in ("supply", "stage")),
    *(({table: GONE}, f"{table}: the table is missing; write [{table}] with ") for table in ("heatsink", "loudspeaker")),
    ({"stage.coupling": "capacitor"}, "output_capacitor: the table is missing; write [output_capacitor] with capacitance"),
    ({"stage.coupling": "capacitor", "output_capacitor.capacitance": "2200 uF"}, "output_capacitor.rated_voltage: is missing: "),
    ({"heatsink.fins.width": "200 mm"}, "heatsink.fins.height: is missing: "),
    ({"heatsink.sink_to_air": GONE, "heatsink.shared_by": GONE, "heatsink.fins": {"count": 8}}, "heatsink.shared_by: is missing: "),
]  # fmt: skip


@pytest.mark.parametrize(("changes", "words"), [*KEYS_AND_WORDS, *NUMBERS, *CURVES, *MISSING])
def test_refused_with_what_to_write(tmp_path, changes, words):
    found = complaints(tmp_path, changes)
    assert any(words in text for text in found), found


@pytest.mark.parametrize(
    ("word", "reason"),
    [
        ("single-ended", "single-ended stages are not covered"),
        ("Class G", "class G is not covered"),
        ("class-h", "class H is not covered"),
        ("class D amplifier", "class D is not covered"),
        ("output transformer", "stages with an output transformer are not covered"),
        ("valve", "valve stages are not covered"),
    ],
)
def test_an_arrangement_that_is_not_covered_is_refused_by_name(tmp_path, word, reason):
    [found] = complaints(tmp_path, {"stage.arrangement": word})
    assert re.match(
        f"stage.arrangement: {reason}.*; covered are complementary and quasi-complementary stages", found
    )


def test_an_arrangement_nobody_knows_is_refused_with_the_known_ones(tmp_path):
    [found] = complaints(tmp_path, {"stage.arrangement": "upside down"})
    assert 'write "complementary" or "quasi-complementary"' in found


def test_all_problems_are_said_at_once_in_the_order_of_the_lines(tmp_path):
    changes = {
        "supply.no_load": 35,
        "loudspeaker.nominal_impedence": "8 ohm",
        "loudspeaker.nominal_impedance": GONE,
        "stage.bridged": "no",
    }
    found = complaints(tmp_path, changes)
    keys = [text.partition(":")[0] for text in found]
    assert keys == [
        "supply.no_load",
        "stage.bridged",
        "loudspeaker.nominal_impedence",
        "loudspeaker.nominal_impedance",
    ]


def test_a_sound_sheet_has_no_complaint(tmp_path):
    assert load(tmp_path).amplifier.title


def test_what_would_move_the_cursor_of_a_terminal_is_not_handed_on(tmp_path):
    [found] = complaints(tmp_path, {"stage.upper": "\x1b[2J"})
    assert "\x1b" not in found
    assert "�[2J" in found
