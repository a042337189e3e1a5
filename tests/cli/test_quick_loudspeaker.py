"""The quick answer about a loudspeaker: printed values, words, refusals."""

import pytest

from tests.cli.quick_line import answer, refusal, value
from tests.published_cases import number, printed


@pytest.mark.parametrize(
    ("case", "key", "rail", "load"),
    [("stage-1", "worst_heat_each", "30 V", "16 ohm"), ("stage-5", "worst_heat_each", "23 V", "8 ohm")],
)
def test_printed_worst_heat(case, key, rail, load):
    assert value("loudspeaker", "worst_dissipation_each", split_rail=rail, load=load) == printed(case, key)


def test_printed_power_at_full_swing():
    found = answer("loudspeaker", split_rail="25 V", load="4 ohm")
    assert found["results"]["clipping_power"]["value"] == printed("stage-4", "output")
    assert (found["verdict"], found["status"]) == (None, 0)
    single = value("loudspeaker", "clipping_power", single_rail="30 V", load="10 ohm")
    assert single == printed("stage-6", "output_max")


def test_the_emitter_resistors_share_the_swing():
    # Derived: (35 - 3) x 8 / (8 + 0.22/2) = 31.566 V, over 8 ohm 3.9457 A; 2 x 35^2/(pi^2 x 8)/4 = 7.757 W.
    found = answer(
        "loudspeaker",
        split_rail="35 V",
        load="8 ohm",
        swing_loss="3 V",
        emitter_resistor="0.22 ohm",
        pairs="2",
    )
    results = {name: item["value"] for name, item in found["results"].items()}
    assert results["peak_voltage"] == pytest.approx(31.566, abs=5e-4)
    assert results["peak_current"] == pytest.approx(3.9457, abs=5e-5)
    assert results["worst_dissipation_each"] == pytest.approx(7.757, abs=5e-4)


def test_dc_fault_is_never_go_and_its_fuse_is_judged_by_the_slowest_gate():
    found = answer("loudspeaker", split_rail="60 V", load="8 ohm", dc_resistance="5.6 ohm", fuse="F 1 A")
    assert found["results"]["dc_fault_current"]["value"] == printed("offset-4", "current")
    assert found["results"]["dc_fault_power"]["value"] == pytest.approx(60.0**2 / 5.6)
    # A coil of 250 degC has 1 + 0.00393 x 230 = 1.904 times its ohms: 5.63 times the rating, gate of 4: 0.3 s.
    assert found["results"]["fuse_time"]["value"] == number("0.3 s")
    assert (found["verdict"], found["status"]) == ("caution", 3)
    words = {item["id"]: item["verdict"] for item in found["findings"]}
    assert words["loudspeaker.dc_fault"] == "caution"


def test_a_fuse_too_large_may_never_act():
    found = answer("loudspeaker", split_rail="35 V", load="8 ohm", dc_resistance="6 ohm", fuse="F 2 A")
    assert found["results"]["fuse_time"]["value"] is None
    assert any("may never act" in item["says"] for item in found["findings"])


@pytest.mark.parametrize(
    ("rated", "word", "expected"),
    [
        ("200 W", "rated noise", "go"),
        ("200 W", "peak", "caution"),
        ("200 W", None, "caution"),
        ("70 W", "rated noise", "caution"),
    ],
)
def test_power_is_judged_against_rated_noise_power(rated, word, expected):
    # 76.6 W at clipping; a bare 200 W may stand for 50 W.
    more = {} if word is None else {"power_word": word}
    found = answer("loudspeaker", split_rail="35 V", load="8 ohm", rated_power=rated, **more)
    nominal = found["findings"][0]["value"]["nominal"]
    assert found["verdict"] == ("go" if nominal <= 1.0 else "caution")
    if word is not None:
        assert found["verdict"] == expected


def test_a_label_that_the_coil_contradicts_is_not_believed():
    found = answer("loudspeaker", split_rail="35 V", load="8 ohm", dc_resistance="3 ohm")
    assert found["results"]["clipping_power"]["value"] == pytest.approx(35.0**2 / (2 * 4.0))
    assert "everything is computed for 4 ohm" in found["cautions"][0]


@pytest.mark.parametrize(
    ("options", "says"),
    [
        ({}, "loudspeaker: too little is given; add --split-rail or --single-rail"),
        ({"split_rail": "35 V"}, "add --load"),
        ({"split_rail": "35 V", "single_rail": "70 V", "load": "8 ohm"}, "contradict each other"),
        ({"split_rail": "35 V", "load": "8 ohm", "fuse": "F 2 A"}, "add --dc-resistance"),
        ({"split_rail": "35 V", "load": "8 ohm", "fuse": "2 A"}, "--fuse: "),
        (
            {"split_rail": "35 V", "load": "8 ohm", "rated_power": "60 W", "power_word": "music"},
            "--power-word: ",
        ),
        (
            {"split_rail": "35 V", "load": "8 ohm", "coil_limit": "200 degC"},
            "--coil-limit says nothing alone",
        ),
        (
            {"single_rail": "6 V", "load": "8 ohm", "swing_loss": "3 V"},
            "--swing-loss: 3 V leaves nothing of 3 V from rail to midpoint; read both again",
        ),
        (
            {"split_rail": "35 V", "load": "8 ohm", "pairs": "0"},
            '"0" is not above zero; write a whole number',
        ),
        ({"split_rail": "35 V", "load": "8 ohm", "pairs": "true"}, "write a whole number, such as 1"),
    ],
)
def test_loudspeaker_says_what_to_add(options, says):
    assert says in refusal("loudspeaker", **options)
