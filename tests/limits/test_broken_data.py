"""Data files with a fault are refused with file, line and key: no limit is dropped or read in half."""

import shutil

import pytest

from safeamp.complaints import ReadingError
from safeamp.reading.data import limits_folder
from safeamp.reading.limits import load_limits


@pytest.fixture
def broken(tmp_path):
    """Replace one text in one file of a copy of the data and return what is complained of."""

    def complaints(*changes):
        folder = tmp_path / "limits"
        shutil.copytree(limits_folder(), folder)
        for name, old, new in changes:
            text = (folder / name).read_text(encoding="utf-8")
            assert old in text
            (folder / name).write_text(text.replace(old, new, 1), encoding="utf-8")
        with pytest.raises(ReadingError) as caught:
            load_limits(folder=folder)
        return [(one.path.rpartition("/")[2], one.key, one.text) for one in caught.value.complaints]

    return complaints


@pytest.mark.parametrize(
    ("name", "old", "new", "key", "said"),
    [
        ("offset.toml", "sense     =", "sence     =", "offset.output", "sense is missing"),
        ("offset.toml", "source    =", "sauce    =", "offset.output", "not an origin"),
        ("offset.toml", "unit      =", "#", "offset.output", "unit is missing"),
        (
            "offset.toml",
            'unit      = "V"',
            'unit      = "%"',
            "offset.output",
            '"%" is not known here; write one of',
        ),
        ("offset.toml", '"at most"', '"below"', "offset.output", "at most, at least, between"),
        ("offset.toml", '"100 mV"', '"10 mV"', "offset.output", "contradict each other"),
        ("offset.toml", '"unverified"', '"go"', "offset.output", "caution, unverified"),
        ("offset.toml", 'evidence  = "common practice"', 'evidence  = "hearsay"', "offset.output", "hearsay"),
        ("offset.toml", '"1 V"', '"1 volts"', "offset.output", '"1 volts" has no known unit'),
        ("offset.toml", '"1 V"', '""', "offset.output", "has no known unit"),
        ("defaults.toml", "value    = 1.0", "valeu    = 1.0", "mains.present", "value is missing"),
        ("defaults.toml", "low      = 0.9", "low      = 1.05", "mains.present", "in rising order"),
        ("defaults.toml", "low      = 0.9", 'low      = "1 V"', "mains.present", "1 V"),
        ("interface.toml", '"0.1 K/W"', '"0.1 W"', "interface.to-3 greased", "power"),
        ("fuses.toml", 'shortest = "3600 s"', 'shortest = "3600 mA"', "fuse.T", "current"),
        ("preferred.toml", "4.7]", "nan]", "series.E3", "nan"),
    ],
)
def test_one_fault_is_told_with_its_key(broken, name, old, new, key, said):
    [(found_name, found_key, text)] = broken((name, old, new))
    assert (found_name, found_key) == (name, key)
    assert said in text


def test_faults_of_several_files_are_told_at_once(broken):
    found = broken(
        ("bias.toml", '"26 mV"', '"26 m"'),
        ("soa.toml", '"at most"', '"most"'),
        ("fuses.toml", 'evidence = "seen"', 'evidence = "heard"'),
    )
    assert [row[:2] for row in found] == [
        ("bias.toml", "bias.idle"),
        ("soa.toml", "soa.resistive_load"),
        ("fuses.toml", "fuse.T"),
    ]


def test_a_missing_table_file_is_told(tmp_path):
    with pytest.raises(ReadingError, match=r"defaults\.toml: cannot be read"):
        load_limits(folder=tmp_path)
