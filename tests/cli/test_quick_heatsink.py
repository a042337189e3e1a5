"""The quick answer about a heatsink: printed values, what is solved for, fins, refusals."""

import pytest

from tests.cli.quick_line import answer, refusal, value
from tests.published_cases import printed

CHAIN = {"sink_to_air": "0.3 K/W", "case_to_sink": "0.1 K/W", "junction_to_case": "0.8 K/W"}


def test_printed_chain_of_temperatures():
    found = answer("heatsink", power="100 W", air="25 degC", **CHAIN)["results"]
    for name in ("junction", "case", "sink"):
        assert found[name]["value"] == printed("heat-1", name)
        assert found[name]["unit"] == "degC"


@pytest.mark.parametrize(
    ("missing", "expected"), [("power", 100.0), ("air", 25.0), ("sink_to_air", 0.3), ("junction", 145.0)]
)
def test_what_is_left_out_is_solved_for(missing, expected):
    whole = {"power": "100 W", "air": "25 degC", "junction": "145 degC", **CHAIN}
    del whole[missing]
    found = answer("heatsink", **whole)["results"]
    assert found[missing]["value"] == pytest.approx(expected)
    assert found["sink"]["value"] == pytest.approx(55.0)


@pytest.mark.parametrize(("missing", "expected"), [("power", 100.0), ("air", 25.0), ("sink_to_air", 0.3)])
def test_the_same_from_the_temperature_of_the_heatsink(missing, expected):
    whole = {"power": "100 W", "air": "25 degC", "sink_temperature": "55 degC", "sink_to_air": "0.3 K/W"}
    del whole[missing]
    assert value("heatsink", missing, **whole) == pytest.approx(expected)


@pytest.mark.parametrize(
    ("limit", "word"),
    [("200 degC", "go"), ("160 degC", "caution"), ("140 degC", "stop"), (None, "unverified")],
)
def test_junction_is_judged_by_its_limit(limit, word):
    # 145 degC: go up to 25 + 0.8 x (limit - 25), stop above the limit; the worst corner is 183 degC.
    more = {} if limit is None else {"junction_limit": limit}
    assert answer("heatsink", power="100 W", air="25 degC", **CHAIN, **more)["verdict"] == word


@pytest.mark.parametrize(
    ("options", "added"),
    [
        ({"junction_limit": "150 degC"}, "--case-to-sink and --junction-to-case"),
        ({"junction_limit": "150 degC", "junction_to_case": "9 K/W"}, "--case-to-sink"),
        ({"junction_limit": "150 degC", "case_to_sink": "0.5 K/W"}, "--junction-to-case"),
        ({"junction_to_case": "9 K/W"}, "--case-to-sink"),
    ],
)
def test_a_junction_that_cannot_be_computed_is_asked_for_and_not_left_out(options, added):
    plain = {"power": "20 W", "air": "40 degC", "sink_to_air": "1 K/W"}
    fins = {"power": "20 W", "air": "40 degC", "fins": "150x75x35 mm", "thickness": "2 mm", "count": "14"}
    for given in (plain, fins):
        assert f"says nothing alone; add {added}" in refusal("heatsink", **given, **options)


def test_no_option_is_named_that_there_is_not():
    fins = {"fins": "150x75x35 mm", "thickness": "2 mm", "count": "14", "power": "28 W", "air": "40 degC"}
    [judged] = answer("heatsink", **fins)["findings"]
    assert "beyond the stop level if the K/W by ruler is at the other end" in " ".join(judged["because"])
    assert "--fins-share" not in " ".join(judged["because"])


def test_a_measured_chain_well_below_its_limit_is_go():
    measured = {name: f"{text}, measured" for name, text in CHAIN.items()}
    found = answer("heatsink", power="60 W", air="30 degC, measured", junction_limit="200 degC", **measured)
    assert (found["verdict"], found["status"]) == ("go", 0)
    assert found["results"]["junction"] == {"value": pytest.approx(102.0), "unit": "degC"}


def test_air_that_nobody_measured_may_be_10_kelvin_warmer():
    measured = answer("heatsink", power="50 W", air="35 degC, measured", sink_to_air="1 K/W, measured")
    assert "high" not in measured["results"]["sink"]
    stated = answer("heatsink", power="50 W", air="35 degC", sink_to_air="1 K/W, measured")
    assert stated["results"]["sink"] == {"value": 85.0, "unit": "degC", "low": 85.0, "high": 95.0}


def test_the_heatsink_alone_can_be_a_stop():
    found = answer("heatsink", power="100 W", air="40 degC", sink_to_air="0.7 K/W")
    assert (found["verdict"], found["status"]) == ("stop", 5)


def test_a_heat_that_no_heatsink_takes_is_a_stop():
    found = answer(
        "heatsink",
        power="200 W",
        air="40 degC",
        junction="150 degC",
        case_to_sink="0.5 K/W",
        junction_to_case="0.8 K/W",
    )
    assert found["verdict"] == "stop"
    assert found["results"].get("sink_to_air", {"value": None})["value"] is None
    assert "no heatsink is large enough" in found["findings"][0]["says"]


FINS = {"fins": "120x180x24 mm", "thickness": "1 mm", "count": "14"}


def test_fins_near_the_printed_example_and_at_best_caution():
    found = answer("heatsink", **FINS, sink_temperature="80 degC", air="30 degC")
    results = {name: item["value"] for name, item in found["results"].items()}
    # The book sets the fins 7.45 mm apart; 14 of them on 120 mm stand 8.15 mm apart and shed 8 % more.
    assert results["best_gap"] * 1e3 == pytest.approx(7.45, rel=0.01)
    assert results["gap"] * 1e3 == pytest.approx(8.15, abs=0.01)
    assert results["power_of_fins"] == pytest.approx(29.4 * 1.08, rel=0.03)
    assert results["power"] == pytest.approx(
        results["power_of_fins"] + results["power_of_back"] + results["power_radiated"]
    )
    assert results["sink_to_air"] == pytest.approx(50.0 / results["power"])
    assert found["verdict"] == "caution"
    assert "-30/+70 %" in found["cautions"][0]


def test_fins_are_never_go():
    found = answer("heatsink", **FINS, sink_temperature="50 degC", air="30 degC, measured")
    assert found["findings"][0]["limit"]["go"] == 70.0
    assert (found["verdict"], found["status"]) == ("caution", 3)


def test_fins_give_the_heat_back_that_they_were_solved_for():
    heat = value("heatsink", "power", **FINS, sink_temperature="80 degC", air="30 degC, measured")
    found = answer("heatsink", **FINS, power=f"{heat:.6f} W", air="30 degC, measured")["results"]
    assert found["sink"]["value"] == pytest.approx(80.0, abs=1e-3)
    # The spread of -30/+70 % is one of the rise.
    assert found["sink"]["low"] == pytest.approx(30 + 0.7 * 50, abs=1e-2)
    assert found["sink"]["high"] == pytest.approx(30 + 1.7 * 50, abs=1e-2)


@pytest.mark.parametrize(
    "written", ["120x180x24 mm", "120 mm x 180 mm x 24 mm", "12x18x2.4cm", "120×180×24mm"]
)
def test_fins_may_be_written_in_several_ways(written):
    found = value("heatsink", "power", **{**FINS, "fins": written}, sink_temperature="80 degC", air="30 degC")
    assert found == pytest.approx(
        value("heatsink", "power", **FINS, sink_temperature="80 degC", air="30 degC")
    )


@pytest.mark.parametrize(
    ("options", "says"),
    [
        ({}, "heatsink: too little is given; add --air, --power and --sink-to-air"),
        ({"power": "30 W"}, "add --air and --sink-to-air"),
        (
            {"junction": "150 degC", "power": "30 W", "air": "40 degC"},
            "add --case-to-sink and --junction-to-case",
        ),
        ({"junction": "150 degC", **CHAIN}, "add all but one of --air and --power"),
        (
            {"junction": "150 degC", "power": "30 W", "air": "40 degC", **CHAIN},
            "nothing is left to solve for",
        ),
        ({"junction": "150 degC", "sink_temperature": "80 degC"}, "contradict each other"),
        ({"junction": "30 degC", "air": "40 degC", **CHAIN}, "read --air again"),
        ({"thickness": "2 mm", "power": "30 W"}, "--thickness says nothing alone; add --fins"),
        ({"fins": "120x180x24 mm"}, "add --thickness, --count and --air"),
        ({**FINS, "air": "30 degC"}, "add --power or --sink-temperature"),
        ({**FINS, "air": "30 degC", "power": "9 W", "sink_temperature": "80 degC"}, "contradict each other"),
        (
            {**FINS, "air": "30 degC", "power": "9 W", "sink_to_air": "1 K/W"},
            "--fins and --sink-to-air contradict",
        ),
        ({**FINS, "air": "85 degC", "sink_temperature": "80 degC"}, "read --air again"),
        ({**FINS, "count": "120", "air": "30 degC", "power": "9 W"}, "--fins: 120 fins of 1 mm fill 120 mm"),
        ({**FINS, "count": "1.5", "air": "30 degC", "power": "9 W"}, "is not a whole number"),
        ({**FINS, "fins": "120x180 mm", "air": "30 degC", "power": "9 W"}, 'such as "150x75x35 mm"'),
        ({**FINS, "fins": "120x180x24", "air": "30 degC", "power": "9 W"}, 'such as "150x75x35 mm"'),
    ],
)
def test_heatsink_says_what_to_add(options, says):
    assert says in refusal("heatsink", **options)
