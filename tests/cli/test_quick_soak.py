"""The quick answer about a soak: constants of exact logs, words, what cannot be told, refusals."""

import subprocess
import sys

import numpy as np
import pytest

from safeamp.report.safety import SAFETY
from tests.cli.soak_line import HEAD, TIME, answer, refusal, run, values, warm, write
from tests.cli.test_processes import heavy, imported_by

FULL = f"{HEAD}, air [degC], power [W]"
UNITS = {
    "end_temperature": "degC", "end_temperature_low": "degC", "end_temperature_high": "degC", "time_constant": "s",
    "rise": "K", "sink_to_air": "K/W", "sink_to_air_low": "K/W", "sink_to_air_high": "K/W", "more_time": "s",
}  # fmt: skip
FINE = {"reading_error": "0.01 K"}


def test_an_exact_log_returns_its_constants(tmp_path):
    found = answer(write(tmp_path, warm()), air="24 degC ±0.5 K", power="19 W", **FINE)
    assert {name: item["unit"] for name, item in found["results"].items()} == UNITS
    results = values(found)
    assert results["end_temperature"] == pytest.approx(62.0, rel=1e-6)
    assert results["time_constant"] == pytest.approx(1200.0, rel=1e-6)
    assert results["rise"] == pytest.approx(38.0, rel=1e-6)
    assert results["sink_to_air"] == pytest.approx(2.0, rel=1e-6)
    # Derived: air half a kelvin up or down makes 0.5 K / 19 W, beside the interval of the end.
    for end, air, name in (("low", 24.5, "sink_to_air_low"), ("high", 23.5, "sink_to_air_high")):
        assert results[name] == pytest.approx((results[f"end_temperature_{end}"] - air) / 19.0, rel=1e-9)
    assert results["more_time"] is None
    assert (found["command"], found["verdict"], found["status"]) == ("soak", "go", 0)
    assert found["safety"] == list(SAFETY)
    assert "air of 24 °C" in found["holds_for"]


def test_columns_give_air_and_heat(tmp_path):
    time = np.array([0.0, 10.0, 40.0, 60.0])
    file = write(
        tmp_path, time, warm(time=time), [23.0, 24.0, 25.0, 24.0], [21.0, 19.0, 19.0, 19.0], head=FULL
    )
    found = answer(file, **FINE)
    put_in = {one["option"]: one["value"] for one in found["inputs"]}
    # Derived: the mean over time of 21 W falling to 19 W within 10 of 60 minutes; the plain mean of the air.
    assert (put_in["air"], put_in["power"]) == ("24 °C", "19.17 W")
    results = values(found)
    assert results["rise"] == pytest.approx(38.0, rel=1e-6)
    assert results["sink_to_air"] == pytest.approx(38.0 / (19.0 + 10.0 / 60.0), rel=1e-6)
    assert results["sink_to_air_low"] < (62.0 - 24.9) / 19.17  # the hottest air of the log
    assert "4 readings in 60 min, from 24 °C to" in put_in["log"]


def test_air_that_was_read_once_may_be_off(tmp_path):
    file = write(tmp_path, warm())
    once = values(answer(file, air="24 degC", power="19 W"))
    stated = values(answer(file, air="24 degC ±1 K", power="19 W"))
    assert once["sink_to_air_high"] == pytest.approx(stated["sink_to_air_high"], rel=1e-9)


@pytest.mark.parametrize("missing", ["air", "power"])
def test_what_nobody_gave_is_null(tmp_path, missing):
    given = {"air": "24 degC", "power": "19 W"}
    del given[missing]
    found = answer(write(tmp_path, warm()), **given)
    assert values(found)["sink_to_air"] is None
    assert (values(found)["rise"] is None) == (missing == "air")
    assert found["verdict"] == "go"
    assert f"{missing} is not given" in run(write(tmp_path, warm()), **given).stdout


@pytest.mark.parametrize(
    ("end", "error", "word"),
    [
        (60.0, "1 K", "go"), (69.9, "0.01 K", "go"), (70.1, "0.01 K", "caution"),
        (69.0, "1 K", "caution"),  # its upper end is beyond go
        (99.9, "0.01 K", "caution"), (100.1, "0.01 K", "stop"), (99.0, "1 K", "unverified"), (130.0, "1 K", "stop"),
    ],
)  # fmt: skip
def test_words_by_the_upper_end_and_a_stop_by_the_best(tmp_path, end, error, word):
    found = answer(write(tmp_path, warm(end)), reading_error=error)
    assert (found["verdict"], found["status"]) == (
        word,
        {"go": 0, "caution": 3, "unverified": 4, "stop": 5}[word],
    )
    assert found["findings"][0]["id"] == "heat.heatsink"
    assert found["findings"][0]["step"] == "soak"


def test_the_text_says_that_the_upper_end_is_beyond_go(tmp_path):
    printed = " ".join(run(write(tmp_path, warm(69.0))).stdout.split())
    assert "because: not so at the upper end of the interval" in printed


def test_own_levels_rule(tmp_path):
    own = tmp_path / "own.toml"
    own.write_text('[heat.heatsink]\ngo = "50 degC"\nstop = "55 degC"\nsource = "my own"\n', encoding="utf-8")
    result = run(write(tmp_path, warm()), limits=str(own))
    assert result.exit_code == 5
    assert "changed by your limits file: my own" in " ".join(result.stdout.split())
    assert "Switch off when the heatsink reaches 55 °C" in result.stdout


@pytest.mark.parametrize("place", range(7))
def test_one_reading_beyond_stop_is_a_stop_whatever_the_fit_says(tmp_path, place):
    sink = warm()
    sink[place] = 101.0
    found = answer(write(tmp_path, sink))
    assert found["verdict"] == "stop"
    assert "switch off" in found["findings"][0]["next"]
    assert "read on" not in found["findings"][0]["next"]
    assert values(found)["more_time"] is None


@pytest.mark.parametrize("place", range(7))
def test_one_reading_above_go_is_never_go(tmp_path, place):
    sink = warm()
    sink[place] = 70.5
    assert answer(write(tmp_path, sink), reading_error="10 K")["verdict"] != "go"


STRAIGHT = np.array([25.0, 27.0, 29.0, 31.0])


def test_a_straight_line_cannot_be_told_yet(tmp_path):
    file = write(tmp_path, STRAIGHT)
    found = answer(file, air="24 degC", power="19 W")
    results = values(found)
    assert (found["verdict"], found["status"]) == ("unverified", 4)
    unknown = {
        "end_temperature",
        "end_temperature_high",
        "time_constant",
        "rise",
        "sink_to_air",
        "sink_to_air_high",
    }
    assert {name for name, value in results.items() if value is None} == unknown | {"more_time"}
    assert 29.0 < results["end_temperature_low"] < 31.0
    printed = " ".join(run(file).stdout.split())
    assert "where it ends cannot be told yet" in printed
    assert "end temperature cannot be told yet" in printed
    assert "more time not to be foreseen" in printed


def test_a_straight_line_that_must_end_beyond_stop_is_a_stop(tmp_path):
    file = write(tmp_path, np.array([60.0, 73.0, 86.0, 99.0]))
    low = values(answer(file, reading_error="0.1 K"))["end_temperature_low"]
    assert low > 100.0
    assert answer(file, reading_error="0.1 K")["verdict"] == "stop"
    assert answer(file, reading_error="5 K")["verdict"] == "unverified"


def test_three_readings_are_at_best_a_caution(tmp_path):
    three = answer(write(tmp_path, warm()[:3]), **FINE)
    assert (three["verdict"], three["status"]) == ("caution", 3)
    assert values(three)["end_temperature"] == pytest.approx(62.0, rel=1e-6)
    assert "a fourth tells whether this one holds" in str(three["findings"])
    assert answer(write(tmp_path, warm()[:4]), **FINE)["verdict"] == "go"


def test_more_time_is_what_another_log_confirms(tmp_path):
    few = TIME[:4]
    found = answer(write(tmp_path, few, warm(time=few)), reading_error="2 K")
    more = values(found)["more_time"] / 60.0
    assert found["verdict"] == "unverified"
    assert more % 10.0 == pytest.approx(0.0)
    assert f"read on for {more:g} min: then the end is known within 5 K" in found["findings"][0]["next"]
    later = np.arange(0.0, 30.0 + more + 1.0, 10.0)
    enough = values(answer(write(tmp_path, later, warm(time=later)), reading_error="2 K"))
    assert enough["more_time"] is None
    assert enough["end_temperature_high"] - enough["end_temperature"] <= 5.0


@pytest.mark.parametrize(
    "sink", [[25, 27, 30, 35, 43], [40, 42, 45, 49, 54, 60], [25.0, 25.9, 27.6, 31.0, 37.7]]
)
def test_faster_and_faster_is_a_stop(tmp_path, sink):
    found = answer(write(tmp_path, np.array(sink)), air="24 degC", power="10 W")
    assert (found["verdict"], found["status"]) == ("stop", 5)
    assert "faster and faster" in found["findings"][0]["says"]
    assert "switch off" in found["findings"][0]["next"]
    assert set(values(found).values()) == {None}


NO_WARM_UP = {
    "cooling": ([60, 50, 43, 38, 34], "the readings fall"),
    "cooling, straight": ([60, 55, 50, 45], "the readings fall"),
    "constant": ([50, 50, 50, 50], "do not rise beyond the reading error of 1 K"),
    "noise": ([50, 51, 49.5, 50.5, 50], "do not rise beyond the reading error"),
    "a step in the middle": ([25, 25, 25, 60, 60, 60], "not one undisturbed warm-up"),
    "switched off in between": ([25, 45, 55, 58, 48, 40, 35], "not one undisturbed warm-up"),
}


@pytest.mark.parametrize("name", NO_WARM_UP)
def test_what_is_no_warm_up_is_unverified_with_words(tmp_path, name):
    sink, why = NO_WARM_UP[name]
    found = answer(write(tmp_path, np.array(sink, dtype=float)), air="22 degC", power="10 W")
    assert (found["verdict"], found["status"]) == ("unverified", 4)
    assert why in run(write(tmp_path, np.array(sink, dtype=float))).stdout.replace("\n               ", " ")
    assert values(found)["end_temperature"] is None or "step" in name or "between" in name


def test_a_heat_that_moves_forecasts_nothing(tmp_path):
    steady, moving = np.full(7, 19.0), np.array([10.0, 10.0, 10.0, 10.0, 10.0, 10.0, 50.0])
    head = f"{HEAD}, power [W]"
    assert answer(write(tmp_path, TIME, warm(), steady, head=head))["verdict"] == "go"
    found = answer(write(tmp_path, TIME, warm(), moving, head=head))
    assert found["verdict"] == "unverified"
    assert "the heat moved by more than 20 % from its mean" in str(found["findings"])


AIR_HEAD = f"{HEAD}, air [degC]"


def test_air_that_moves_a_little_is_a_mean(tmp_path):
    air = np.linspace(23.0, 26.0, 7)
    found = answer(write(tmp_path, TIME, warm(), air, head=AIR_HEAD))
    assert values(found)["rise"] == pytest.approx(62.0 - 24.5, rel=1e-6)
    assert "The air moved" not in str(found["cautions"])


def test_air_that_moves_is_taken_off_and_its_highest_added(tmp_path):
    air = 24.0 + 6.0 * np.sin(TIME / 60.0 * np.pi)  # up to 30 °C and back again
    sink = warm(62.0) - 24.0 + air
    found = answer(write(tmp_path, TIME, sink, air, head=AIR_HEAD), power="19 W", **FINE)
    results = values(found)
    assert results["rise"] == pytest.approx(38.0, rel=1e-6)
    assert results["sink_to_air"] == pytest.approx(2.0, rel=1e-6)
    assert results["time_constant"] == pytest.approx(1200.0, rel=1e-6)
    assert results["end_temperature"] >= 68.0 - 1e-6  # 38 K above the highest air
    assert "The air moved by more than 3 K" in str(found["cautions"])
    assert "air of 30 °C" in found["holds_for"]
    # The rise is a difference of two readings: its error is that of one times the root of two.
    assert "error of a reading 0.01414 K" in str(found["formulas"])


def test_air_that_goes_on_warming_is_never_forgotten(tmp_path):
    """The rise alone has settled long ago, and the air of the cabinet still climbs: that is no go."""
    air = 24.0 + 0.2 * TIME
    sink = 30.0 * (1.0 - np.exp(-TIME / 5.0)) + air
    assert sink.max() == pytest.approx(66.0, abs=1e-3)
    for head, columns in ((AIR_HEAD, (sink, air)), (HEAD, (sink,))):
        found = answer(write(tmp_path, TIME, *columns, head=head))
        assert found["verdict"] == "unverified"
        assert "the air of the cabinet, still warms" in str(found["findings"])


def test_the_text(tmp_path):
    result = run(write(tmp_path, TIME, warm(), np.full(7, 24.0), np.full(7, 19.0), head=FULL))
    lines, printed = result.stdout.splitlines(), " ".join(result.stdout.split())
    heads = ["Put in", "Results", "Formulas", "Verdict", "Caution", "Safety"]
    assert [line for line in lines if line in heads] == heads
    assert max(map(len, lines)) <= 80
    for words in (
        "reading error 1 K (assumed",
        "heatsink = end - (end - start) x exp(-time / time constant), fitted to 7 readings",
        "62 °C - (62 °C - 24 °C) x exp(-60 min / 20 min) = 60.11 °C at the last reading",
        "95 % interval: every end that misses the readings by no more than their error",
        "62 °C - 24 °C = 38 K",
        "sink to air = rise / mean heat put in 38 K / 19 W = 2 K/W",
        "settles at 62 °C, between 59.89 °C and 64.66 °C; hottest reading 60.11 °C",
        "GO for this heatsink at the heat of this log, in air of 24 °C",
        "Switch off when the heatsink reaches 100 °C",
        "By the curve it is at 60.85 °C 70 min into the log: switch off when it is above 63.85 °C then.",
        "on a hotter day the heatsink is as much hotter",
        "Mains kills.",
    ):
        assert words in printed, words


def test_no_reading_above_stop_is_ever_expected(tmp_path):
    printed = " ".join(run(write(tmp_path, warm(99.9))).stdout.split())
    assert "By the curve" not in printed
    assert "Switch off when the heatsink reaches 100 °C" in printed


def test_a_sudden_warm_up_has_no_time_constant(tmp_path):
    found = answer(write(tmp_path, np.array([25.0, 60.0, 60.4, 59.6, 60.0])))
    assert values(found)["time_constant"] is None
    assert found["verdict"] == "go"
    printed = " ".join(run(write(tmp_path, np.array([25.0, 60.0, 60.4, 59.6, 60.0]))).stdout.split())
    assert "time constant shorter than these readings can tell" in printed
    assert "60 °C from the second reading on" in printed


def test_an_example_or_a_colder_heatsink_than_its_air_clears_nothing(tmp_path):
    file = write(tmp_path, warm())
    assert answer(file, air="24 degC, example")["verdict"] == "unverified"
    found = answer(file, air="70 degC", power="19 W")
    assert values(found)["sink_to_air"] is None


REFUSED = [
    ({"air": "24"}, "--air: "),
    ({"power": "0 W"}, "--power: "),
    ({"reading_error": "0 K"}, "--reading-error: "),
    ({"reading_error": "1 mV"}, "--reading-error: "),
    ({"reading_error": "1 K ±2 K"}, "--reading-error: "),
    ({"air": "24 degC"}, "soak: the log has a column air; leave --air out"),
    ({"power": "19 W"}, "soak: the log has a column power; leave --power out"),
]


@pytest.mark.parametrize(("options", "wanted"), REFUSED)
def test_options_that_are_refused(tmp_path, options, wanted):
    file = write(tmp_path, TIME, warm(), np.full(7, 24.0), np.full(7, 19.0), head=FULL)
    assert wanted in refusal(file, **options)


@pytest.mark.parametrize("typed", ["0.5 K", "±0.5 K", "+/-0.5 K"])
def test_a_reading_error_may_be_typed_with_its_sign(tmp_path, typed):
    file = write(tmp_path, warm())
    assert values(answer(file, reading_error=typed)) == values(answer(file, reading_error="0.5 K"))


LOGS = [
    ("", "is empty; write the head time [min], heatsink [degC]"),
    (f"{HEAD}\n0, 20\n1, 21\n", "the log needs 3 readings or more"),
    (f"{HEAD}\n0, 20\n1, 21\n1, 22\n", "line 4   60 s does not rise above 60 s"),
    (f"{HEAD}\n0, 20\n1, nan\n2, 22\n", 'line 3   "nan" is not a number of the column heatsink'),
    (f"{HEAD}\n0, 20\n1, 21,5\n2, 22\n", "line 3   has 3 cells where the head has 2"),
    (f"{HEAD}\n0, 20\n1, 400\n2, 22\n", "line 3   400 in the column heatsink is not believable"),
    ("minutes, heatsink [degC]\n0, 20\n", 'line 1   "minutes" is not a column with its unit'),
    ("time [min], sink [degC]\n0, 20\n", '"sink" is not a column of a log'),
    ("time [ms], heatsink [degC]\n0, 20\n", '"ms" is not a unit of the column time; write one of s, min, h'),
    ("time [min]\n0\n", "the column heatsink is missing"),
]


@pytest.mark.parametrize(("content", "wanted"), LOGS)
def test_logs_that_are_refused(tmp_path, content, wanted):
    file = tmp_path / "soak.csv"
    file.write_text(content, encoding="utf-8")
    found = refusal(file)
    assert found.startswith(f"{file}: ")
    assert wanted in found


def test_a_log_that_is_not_there(tmp_path):
    assert "nothing.csv: 1 problem\n  cannot be read: No such file" in refusal(tmp_path / "nothing.csv")


def test_every_trouble_of_options_and_log_at_once(tmp_path):
    file = tmp_path / "soak.csv"
    file.write_text(f"{HEAD}\n0, x\n1, 400\n", encoding="utf-8")
    found = refusal(file, air="warm", power="12")
    for words in ("soak: 2 problems", "--air: ", "--power: ", "soak.csv: 2 problems", "line 2", "line 3"):
        assert words in found
    good = refusal(write(tmp_path, warm()), power="12")
    assert "1 problem" in good
    assert "soak.csv" not in good


def test_it_imports_nothing_that_it_does_not_use(tmp_path):
    file = write(tmp_path, warm())
    found = imported_by("soak", str(file), "--air", "24 degC", "--power", "19 W")
    assert "safeamp.studies.quick.soak" in found
    assert heavy(found) == set()
    assert found.isdisjoint(
        {"pint", "safeamp.reading.sheets", "safeamp.checks.power_up", "safeamp.studies.verdict"}
    )


def test_as_a_program(tmp_path):
    line = [sys.executable, "-m", "safeamp", "soak", str(write(tmp_path, warm(130.0)))]
    done = subprocess.run(line, capture_output=True, text=True, encoding="utf-8", check=False)
    assert (done.returncode, done.stderr) == (5, "")
