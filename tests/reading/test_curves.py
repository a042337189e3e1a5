"""Impedance curves as files: what is read, and every refusal with its line."""

import pytest

from safeamp.complaints import ReadingError
from safeamp.reading.curves import read_curve
from safeamp.reading.draft import Draft
from tests.reading.desk import GONE, complaints, load

KEY = {"loudspeaker.impedance_curve": "curve.csv"}
HEAD = "frequency [Hz], impedance [ohm], phase [deg]"
GOOD = f"{HEAD}\n20, 7.5, 30\n200, 6.1, -20\n2000, 9, 15\n"


def read(folder, content, encoding="utf-8"):
    (folder / "curve.csv").write_bytes(content.encode(encoding) if isinstance(content, str) else content)
    return load(folder, KEY).amplifier.loudspeaker.impedance_curve


def refused(folder, content):
    """Return the complaints about a curve, each as ``line: text``, all of them about its file."""
    with pytest.raises(ReadingError) as trouble:
        read(folder, content)
    found = trouble.value.complaints
    assert {one.path for one in found} == {str(folder / "curve.csv")}
    return [f"{one.line}: {one.text}" for one in found]


def test_a_plain_curve(tmp_path):
    curve = read(tmp_path, GOOD)
    assert curve.frequencies == (20.0, 200.0, 2000.0)
    assert curve.impedances == (7.5, 6.1, 9.0)
    assert curve.phases == (30.0, -20.0, 15.0)
    assert curve.text == "curve.csv"


SAME = {
    "semicolons": GOOD.replace(",", ";"),
    "carriage returns": GOOD.replace("\n", "\r\n"),
    "byte order mark": "\ufeff" + GOOD,
    "no last line end": GOOD.rstrip("\n"),
    "empty lines": GOOD.replace("\n", "\n\n") + "\n\n",
    "quotes": GOOD.replace("6.1", '"6.1"'),
    "units": "frequency [kHz], impedance [mohm], phase [deg]\n.02, 7500, 30\n0.2, 6.1e3, \u221220\n2., 9000, +15\n",
    "omega": GOOD.replace("[ohm]", "[\u2126]"),
    "order": "Phase [deg],FREQUENCY [Hz],impedance[ohm]\n30,20,7.5\n-20,200,6.1\n15,2000,9\n",
}


@pytest.mark.parametrize("name", SAME)
def test_other_ways_to_write_the_same_curve(tmp_path, name):
    curve, plain = read(tmp_path, SAME[name]), read(tmp_path, GOOD)
    assert curve.frequencies == pytest.approx(plain.frequencies)
    assert curve.impedances == pytest.approx(plain.impedances)
    assert curve.phases == plain.phases


REFUSED = [
    ("", "None: is empty; write the head frequency [Hz], impedance [ohm], phase [deg] and a line for each"),
    ("\n \n", "None: is empty"),
    (HEAD, "None: the curve needs 2 points or more"),
    (f"{HEAD}\n20, 8, 0\n", "None: the curve needs 2 points or more"),
    ("frequency [Hz], impedance [ohm]\n20, 8\n", "1: the column phase is missing; write the head frequency [Hz]"),
    (f"{HEAD}, phase [deg]\n", "1: the column phase stands twice"),
    ("frequency, impedance [ohm], phase [deg]\n", '1: "frequency" is not a column with its unit'),
    ("20, 8, 0\n200, 7, 1\n", '1: "20" is not a column with its unit'),
    (GOOD.replace("[Hz]", "[MHz]"), '1: "MHz" is not a unit of the column frequency; write one of Hz, kHz'),
    (GOOD.replace("[deg]", "[rad]"), '1: "rad" is not a unit of the column phase; write one of deg'),
    (GOOD.replace("phase", "phace"), '1: "phace" is not a column of a curve; did you mean phase?'),
    (GOOD.replace("phase", "level"), '1: "level" is not a column of a curve'),
    (GOOD.replace("6.1", "6,1"), "3: has 4 cells where the head has 3; write decimals after a point"),
    (GOOD.replace(", -20", ""), "3: has 2 cells where the head has 3"),
    (GOOD.replace("6.1", ""), '3: "" is not a number of the column impedance'),
    (GOOD.replace("6.1", "6.1 ohm"), '3: "6.1 ohm" is not a number of the column impedance'),
    (GOOD.replace("6.1", "nan"), '3: "nan" is not a number of the column impedance'),
    (GOOD.replace("6.1", "0"), "3: 0 in the column impedance is not believable; it lies between 0.1 ohm and 100 kohm"),
    (GOOD.replace("6.1", "-6.1"), "3: -6.1 in the column impedance is not believable"),
    (GOOD.replace("6.1", "1e9"), "3: 1e9 in the column impedance is not believable"),
    (GOOD.replace("-20", "-90.1"), "3: -90.1 in the column phase is not believable; it lies between -90 deg and"),
    (GOOD.replace("20, 7.5", "0, 7.5"), "2: 0 in the column frequency is not believable"),
    (GOOD.replace("200,", "20,"), "3: 20 Hz does not rise above 20 Hz; write the points in order of rising frequency"),
    (GOOD.replace("2000,", "100,"), "4: 100 Hz does not rise above 200 Hz"),
    (GOOD.replace("6.1", '"6.1'), "is not a line of a CSV"),
    (GOOD.encode("utf-16"), "None: is not a UTF-8 text; save it again as CSV in UTF-8"),
    (b"frequency [Hz]\x00, \xff", "None: is not a UTF-8 text"),
]  # fmt: skip


@pytest.mark.parametrize(("content", "wanted"), REFUSED)
def test_refusals(tmp_path, content, wanted):
    found = refused(tmp_path, content)
    assert any(wanted in one for one in found), found


def test_ends_of_what_is_believed(tmp_path):
    ends = f"{HEAD}\n0.1, 0.1, -90\n1e6, 1e5, 90\n"
    (tmp_path / "ends.csv").write_text(ends)
    assert read_curve(tmp_path / "ends.csv", "ends.csv", Draft(places=None)).phases == (-90.0, 90.0)
    assert refused(tmp_path, ends.replace("0.1, 0.1", "0.0999, 0.1")) == [
        "2: 0.0999 in the column frequency is not believable; it lies between 0.1 Hz and 1000 kHz"
    ]


def test_every_complaint_at_once_with_those_of_the_sheet(tmp_path):
    (tmp_path / "curve.csv").write_text(f"{HEAD}\n20, x, 0\n20, 8, 95\n10, 8\n")
    with pytest.raises(ReadingError) as trouble:
        load(tmp_path, {**KEY, "supply.no_load": "35 A"})
    found = [(one.path.rpartition("/")[2], one.line) for one in trouble.value.complaints]
    assert found[0][0] == "sheet.toml"
    assert found[1:] == [("curve.csv", 2), ("curve.csv", 3), ("curve.csv", 4)]


def test_very_many_complaints_are_counted(tmp_path):
    found = refused(tmp_path, HEAD + "\n" + "20, 8, x\n" * 300)
    assert len(found) == 51
    assert found[-1] == "None: 250 more lines like these; put them right and read again"


def test_the_most_points_and_one_more(tmp_path):
    lines = [f"{1 + place / 1000}, 8, 10" for place in range(100_000)]
    assert len(read(tmp_path, "\n".join([HEAD, *lines])).frequencies) == 100_000
    found = refused(tmp_path, "\n".join([HEAD, *lines, "200000, 8, 10", "300000, 8, 10"]))
    assert found == ["100002: the curve has more than 100000 points; leave some out"]


def test_a_file_too_large_and_one_that_is_no_file(tmp_path):
    assert refused(tmp_path, b" " * (16 * 2**20 + 1)) == [
        "None: is larger than 16 MiB; that is more than a curve can need"
    ]
    with pytest.raises(ReadingError, match=r'"nothing\.csv" is not a file beside the sheet'):
        load(tmp_path, {"loudspeaker.impedance_curve": "nothing.csv"})


def test_a_curve_is_found_beside_the_sheet_and_not_beside_the_user(tmp_path, monkeypatch):
    (tmp_path / "elsewhere").mkdir()
    monkeypatch.chdir(tmp_path / "elsewhere")
    assert read(tmp_path, GOOD).text == "curve.csv"


COIL = "loudspeaker.dc_resistance"


def asked(folder, low, high, **changes):
    """Return what is asked about a curve of two points, at 100 Hz and 5 kHz, beside a label of 8 ohm."""
    (folder / "curve.csv").write_text(f"{HEAD}\n100, {low}, 0\n5000, {high}, 0\n")
    return complaints(folder, {**KEY, COIL: "6 ohm, measured", **changes})


def test_a_curve_below_the_coil_at_low_notes_is_asked_about(tmp_path):
    # 0.95 of 6 ohm is 5.7 ohm: so far the meter may be off.
    assert asked(tmp_path, 5.7, 9) == []
    assert asked(tmp_path, 5.69, 9) == [
        (
            "loudspeaker.impedance_curve: 5.69 ohm at 100 Hz is below dc_resistance, 6 ohm: at low notes no loudspeaker"
            " has less than its coil; is it the curve of this one, in ohm? read the coil again"
        )
    ]


def test_of_a_coil_with_a_tolerance_its_low_end_counts(tmp_path):
    assert asked(tmp_path, 4.9, 9, **{COIL: "6 ohm ±20 %"}) == []
    assert asked(tmp_path, 4.7, 9, **{COIL: "6 ohm ±20 %"})


def test_at_high_notes_another_way_of_the_box_may_draw_more_than_the_coil(tmp_path):
    assert asked(tmp_path, 6.5, 3.2) == []


@pytest.mark.parametrize(("inside", "outside"), [(3.2, 3.1), (12, 12.1)])
def test_a_curve_far_from_the_label_is_asked_about(tmp_path, inside, outside):
    # 0.4 and 1.5 of 8 ohm; nobody read the coil.
    assert asked(tmp_path, inside, inside, **{COIL: GONE}) == []
    assert asked(tmp_path, outside, outside, **{COIL: GONE}) == [
        (
            f"loudspeaker.impedance_curve: its lowest, {outside:g} ohm, is far from nominal_impedance, 8 ohm:"
            " is it the curve of one loudspeaker alone, in ohm? read label and curve again"
        )
    ]


def test_a_curve_that_the_coil_confirms_is_not_held_against_the_label(tmp_path):
    # A label of 8 ohm on 3 ohm of coil is judged by loudspeaker.label.
    assert asked(tmp_path, 3.1, 3.1, **{COIL: "3 ohm"}) == []
    assert asked(tmp_path, 12.5, 12.5, **{COIL: "9 ohm"}) == []
    assert asked(tmp_path, 13.6, 13.6, **{COIL: "9 ohm"})
