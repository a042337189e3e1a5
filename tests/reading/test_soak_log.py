"""The log of a soak as a file: what is read, and every refusal with its line."""

import pytest

from safeamp.complaints import ReadingError
from safeamp.reading.soak_log import read_soak_log

HEAD = "time [min], heatsink [degC]"
GOOD = f"{HEAD}\n0, 24.5\n5, 31\n12.5, 38.25\n"
FULL = "time [min], heatsink [degC], air [degC], power [W]\n0, 24.5, 23, 12\n5, 31, 23.5, 12.1\n12.5, 38.25, 24, 12\n"


def read(folder, content):
    file = folder / "soak.csv"
    file.write_bytes(content.encode() if isinstance(content, str) else content)
    return read_soak_log(file)


def refused(folder, content):
    """Return the complaints about a log, each as ``line: text``, all of them about its file."""
    with pytest.raises(ReadingError) as trouble:
        read(folder, content)
    found = trouble.value.complaints
    assert {one.path for one in found} == {str(folder / "soak.csv")}
    return [f"{one.line}: {one.text}" for one in found]


def test_a_plain_log(tmp_path):
    log = read(tmp_path, GOOD)
    assert log.time == (0.0, 300.0, 750.0)
    assert log.sink == (24.5, 31.0, 38.25)
    assert (log.air, log.power) == (None, None)
    assert log.text == str(tmp_path / "soak.csv")


def test_air_and_heat_where_they_were_read(tmp_path):
    log = read(tmp_path, FULL)
    assert log.air == (23.0, 23.5, 24.0)
    assert log.power == (12.0, 12.1, 12.0)
    assert log.sink == read(tmp_path, GOOD).sink


SAME = {
    "semicolons": GOOD.replace(",", ";"),
    "byte order mark and carriage returns": "\ufeff" + GOOD.replace("\n", "\r\n"),
    "seconds": "time [s],heatsink [°C]\n0,24.5\n300,31\n750,38.25\n",
    "hours": "Time [h], Heatsink [degC]\n0, 24.5\n0.083333333333, 31\n.20833333333, 38.25\n",
    "order": "heatsink [degC], time [min]\n24.5, 0\n31, 5\n38.25, 12.5\n",
}


@pytest.mark.parametrize("name", SAME)
def test_other_ways_to_write_the_same_log(tmp_path, name):
    log, plain = read(tmp_path, SAME[name]), read(tmp_path, GOOD)
    assert log.time == pytest.approx(plain.time)
    assert log.sink == plain.sink


REFUSED = [
    ("", "None: is empty; write the head time [min], heatsink [degC] and, where read, air [degC], power [W] and a"),
    (HEAD, "None: the log needs 3 readings or more"),
    (f"{HEAD}\n0, 24\n5, 30\n", "None: the log needs 3 readings or more"),
    (GOOD.replace("time [min]", "air [degC]"), "1: the column time is missing; write the head time [min], heatsink"),
    (GOOD.replace(", heatsink [degC]", ""), "1: the column heatsink is missing"),
    (GOOD.replace("time [min]", "heatsink [degC]"), "1: the column heatsink stands twice"),
    (GOOD.replace("[degC]", "[degC], air [degC], air [degC]"), "1: the column air stands twice"),
    (GOOD.replace("time [min]", "time"), '1: "time" is not a column with its unit'),
    (GOOD.replace("[min]", "[ms]"), '1: "ms" is not a unit of the column time; write one of s, min, h'),
    (GOOD.replace("[degC]", "[K]"), '1: "K" is not a unit of the column heatsink; write one of degC, °C'),
    (GOOD.replace("[degC]", "[C]"), '1: "C" is not a unit of the column heatsink'),
    (GOOD.replace("heatsink", "heat sink"), '1: "heat sink" is not a column of a log; did you mean heatsink?'),
    (GOOD.replace("heatsink", "case"), '1: "case" is not a column of a log; the columns are time [min], heatsink'),
    (GOOD.replace("31", "31,5"), "3: has 3 cells where the head has 2; write decimals after a point"),
    (GOOD.replace("31", "nan"), '3: "nan" is not a number of the column heatsink'),
    (GOOD.replace("31", "inf"), '3: "inf" is not a number of the column heatsink'),
    (GOOD.replace("31", ""), '3: "" is not a number of the column heatsink'),
    (GOOD.replace("31", "31 degC"), '3: "31 degC" is not a number of the column heatsink'),
    (GOOD.replace("31", "301"), "3: 301 in the column heatsink is not believable; it lies between -20 °C and 300 °C"),
    (GOOD.replace("0, 24.5", "-1, 24.5"), "2: -1 in the column time is not believable; it lies between 0 s and 168 h"),
    (GOOD.replace("12.5,", "1e9,"), "4: 1e9 in the column time is not believable"),
    (GOOD.replace("12.5,", "5,"), "4: 5 min does not rise above 5 min; write the readings in order of rising time"),
    (GOOD.replace("12.5,", "4,"), "4: 240 s does not rise above 5 min"),
    (FULL.replace("23.5", "101"), "3: 101 in the column air is not believable; it lies between -20 °C and 100 °C"),
    (FULL.replace("12.1", "0"), "3: 0 in the column power is not believable; it lies between 1 mW and 20 kW"),
    (GOOD.replace("time", '"time'), "is not a line of a CSV"),
    (GOOD.encode("utf-16"), "None: is not a UTF-8 text; save it again as CSV in UTF-8"),
]  # fmt: skip


@pytest.mark.parametrize(("content", "wanted"), REFUSED)
def test_refusals(tmp_path, content, wanted):
    found = refused(tmp_path, content)
    assert any(wanted in one for one in found), found


def test_a_head_that_is_no_csv_is_said_once(tmp_path):
    assert len(refused(tmp_path, f'"{GOOD}')) == 1


def test_every_complaint_at_once(tmp_path):
    assert [one[:2] for one in refused(tmp_path, f"{HEAD}\n0, x\n5, 30\n5, 400\n4, 31\n")] == [
        "2:",
        "4:",
        "5:",
    ]


def test_the_most_readings_and_one_more(tmp_path):
    lines = [f"{place}, 30" for place in range(1000)]
    assert len(read(tmp_path, "\n".join([HEAD, *lines])).time) == 1000
    found = refused(tmp_path, "\n".join([HEAD, *lines, "1000, 30"]))
    assert found == ["1002: the log has more than 1000 readings; leave some out"]


def test_a_file_that_is_not_there_or_too_large(tmp_path):
    with pytest.raises(ReadingError, match="cannot be read: No such file"):
        read_soak_log(tmp_path / "nothing.csv")
    with pytest.raises(ReadingError, match="cannot be read"):
        read_soak_log(tmp_path)
    assert refused(tmp_path, b" " * (16 * 2**20 + 1)) == [
        "None: is larger than 16 MiB; that is more than a log can need"
    ]
