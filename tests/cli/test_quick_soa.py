"""The quick answer about the safe area: printed values, words, devices, refusals."""

import pytest

from tests.cli.quick_line import answer, refusal
from tests.published_cases import printed

DEVICE = """
[device.fitted]
kind = "bipolar"
voltage = "140 V"
current = "16 A"
power = "150 W"
power_at = "25 degC"
junction_limit = "200 degC"
junction_to_case = "1.17 K/W"
safe_area = [["50 V", "3.0 A"], ["80 V", "1.3 A"], ["140 V", "0.35 A"]]
reference = "invented"
"""


LINE = {"load": "8 ohm", "emitter_resistor": "0.22 ohm", "case_temperature": "60 degC", "idle": "50 mA"}


@pytest.fixture
def folder(tmp_path):
    (tmp_path / "fitted.toml").write_text(DEVICE, encoding="utf-8")
    return str(tmp_path)


@pytest.mark.parametrize(
    ("rail", "word", "status"), [("20 V", "go", 0), ("34 V", "caution", 3), ("45 V", "stop", 5)]
)
def test_use_is_judged_by_the_same_limits(folder, rail, word, status):
    found = answer("soa", split_rail=rail, device="fitted", device_folder=folder, **LINE)
    assert (found["verdict"], found["status"]) == (word, status)
    assert found["findings"][0]["id"] == "soa.loudspeaker"
    assert found["findings"][0]["limit"]["go"] == 0.8
    assert found["results"]["zone"] == {"value": found["results"]["zone"]["value"], "unit": None}


def test_a_resistor_is_judged_as_a_resistor(folder):
    found = answer(
        "soa", split_rail="20 V", phase_angle="0 deg", device="fitted", device_folder=folder, **LINE
    )
    assert found["findings"][0]["id"] == "soa.resistive_load"
    assert "says nothing about a loudspeaker" in found["holds_for"]
    assert found["results"]["equivalent_resistance"]["value"] == pytest.approx(8.0)
    # Derived: the resistive peak of one side is Vs^2/(4 R).
    assert found["results"]["peak_dissipation"]["value"] == pytest.approx(20.0**2 / 32.0)


def test_printed_equivalent_resistances(folder):
    for angle, place in (("45 deg", 2), ("60 deg", 3), ("90 deg", 4)):
        found = answer(
            "soa", split_rail="20 V", phase_angle=angle, device="fitted", device_folder=folder, **LINE
        )
        share = found["results"]["equivalent_resistance"]["value"] / 8.0
        assert share == printed("stage-12", "equivalent_over_z")[place]
        peak = found["results"]["peak_dissipation"]["value"] / (20.0**2 / 32.0)
        assert peak == printed("stage-12", "peak_over_resistive")[place]


def test_a_small_angle_counts_as_45_degrees(folder):
    one = answer(
        "soa", split_rail="30 V", phase_angle="20 deg", device="fitted", device_folder=folder, **LINE
    )
    other = answer(
        "soa", split_rail="30 V", phase_angle="45 deg", device="fitted", device_folder=folder, **LINE
    )
    assert one["results"] == other["results"]
    assert any("counts as 45 deg" in item["why"] for item in one["inputs"])


def test_half_a_single_rail_is_a_rail(folder):
    one = answer("soa", split_rail="30 V", device="fitted", device_folder=folder, **LINE)
    other = answer("soa", single_rail="60 V", device="fitted", device_folder=folder, **LINE)
    assert one["results"] == other["results"]


def test_the_highest_mains_is_a_corner(folder):
    held = answer("soa", split_rail="34 V", highest="1", device="fitted", device_folder=folder, **LINE)[
        "results"
    ]
    free = answer("soa", split_rail="34 V", device="fitted", device_folder=folder, **LINE)["results"]
    assert "high" not in held["use"]
    assert free["use"]["value"] == held["use"]["value"]
    assert free["use"]["high"] > held["use"]["value"]


def test_typical_ratings_are_never_go():
    found = answer("soa", split_rail="10 V", device="to3-npn-140v-150w", **LINE)
    assert (found["verdict"], found["status"]) == ("unverified", 4)
    assert found["results"]["use"]["value"] < 0.8


def test_without_idle_at_best_caution(folder):
    line = {name: text for name, text in LINE.items() if name != "idle"}
    found = answer("soa", split_rail="20 V", device="fitted", device_folder=folder, **line)
    assert found["verdict"] == "caution"


def test_a_hot_case_allows_nothing(folder):
    found = answer(
        "soa",
        split_rail="20 V",
        device="fitted",
        device_folder=folder,
        **{**LINE, "case_temperature": "200 degC"},
    )
    assert found["verdict"] == "stop"
    assert found["results"]["use"]["value"] is None


def with_data(tmp_path, old, new):
    assert old in DEVICE
    (tmp_path / "fitted.toml").write_text(DEVICE.replace(old, new), encoding="utf-8")
    return {"device": "fitted", "device_folder": str(tmp_path), **LINE}


def test_the_lowest_impedance_counts_where_it_is_worse(tmp_path):
    # A device of 2.6 A: 20 V into 8 ohm stays below that, into 80 % of it not.
    line = with_data(tmp_path, 'current = "16 A"', 'current = "2.6 A"')
    found = answer("soa", split_rail="20 V", highest="1", **line)
    assert found["results"]["use"]["value"] < 1.0 < found["results"]["use_at_minimum_impedance"]["value"]
    assert found["verdict"] == "stop"
    assert "6.4 ohm at up to 30 deg" in found["findings"][0]["says"]


def test_where_the_data_end_nothing_is_go(tmp_path):
    line = with_data(tmp_path, ', ["80 V", "1.3 A"], ["140 V", "0.35 A"]]', ', ["60 V", "2.2 A"]]')
    short = answer("soa", split_rail="25 V", **line)
    assert short["verdict"] == "go"
    beyond = answer("soa", split_rail="33 V", highest="1", **{**line, "load": "16 ohm"})
    assert beyond["results"]["use"]["value"] < 0.8
    assert beyond["verdict"] == "unverified"


@pytest.mark.parametrize(
    ("options", "says"),
    [
        ({}, "soa: too little is given; add --split-rail or --single-rail"),
        (
            {"split_rail": "35 V", "single_rail": "70 V"},
            "--split-rail and --single-rail contradict each other",
        ),
        ({"split_rail": "35 V"}, "add --load and --case-temperature"),
        ({"split_rail": "35 V", "load": "8 ohm"}, "add --case-temperature"),
        ({"split_rail": "35 V", "load": "8 ohm", "case_temperature": "60 degC"}, "add --device"),
        (
            {
                "split_rail": "35 V",
                "load": "8 ohm",
                "case_temperature": "60 degC",
                "device": "to3-npn-140v-15w",
            },
            "did you mean to3-npn-140v-150w",
        ),
        (
            {
                "split_rail": "10 V",
                "load": "8 ohm",
                "case_temperature": "60 degC",
                "device": "to3-npn-140v-150w",
                "swing_loss": "10 V",
            },
            "--swing-loss: 10 V leaves nothing of 10 V from rail to midpoint",
        ),
    ],
)
def test_soa_says_what_to_add(options, says):
    assert says in " ".join(refusal("soa", **options).split())


def test_a_broken_device_file_is_named_with_its_line(tmp_path):
    (tmp_path / "fitted.toml").write_text(DEVICE.replace('"150 W"', '"150"'), encoding="utf-8")
    said = refusal("soa", split_rail="20 V", device="fitted", device_folder=str(tmp_path), **LINE)
    assert "fitted.toml" in said
    assert "line 6" in said
