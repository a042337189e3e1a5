"""Device folders: every device by name, and every problem of every file at once."""

import pytest

from safeamp.complaints import ReadingError
from safeamp.reading.devices import device_files


def write(folder, **files):
    for stem, text in files.items():
        (folder / f"{stem}.toml").write_text(text, encoding="utf-8")
    return folder


def refused(folder):
    with pytest.raises(ReadingError) as caught:
        device_files(folder)
    return [(one.path.rpartition("/")[2], one.line, one.key, one.text) for one in caught.value.complaints]


def test_several_devices_of_several_files(tmp_path):
    write(
        tmp_path,
        a='[device.one]\nkind = "bipolar"\n[device.two]\nkind = "x"\n',
        b='[device.three]\nkind = "y"\n',
    )
    (tmp_path / "notes.txt").write_text("no device")
    found = device_files(tmp_path)
    assert list(found) == ["one", "two", "three"]
    assert found["one"].data == {"kind": "bipolar"}
    assert found["two"].path == str(tmp_path / "a.toml")
    assert found["two"].line("kind") == 4
    assert found["two"].line("voltage") == 3


def test_an_empty_folder_has_no_devices(tmp_path):
    assert device_files(tmp_path) == {}


def test_a_missing_folder(tmp_path):
    with pytest.raises(ReadingError, match="nowhere: is not a folder of device files"):
        device_files(tmp_path / "nowhere")


def test_every_problem_of_every_file(tmp_path):
    write(
        tmp_path,
        a='[device.one]\nkind = "bipolar"\n',
        b='[device.one]\nkind = "x"\n',
        c="[mains]\n[device]\ntwo = 3\n",
        d="title = \n",
        e="# none\n",
        f="device = 1\n",
    )
    found = refused(tmp_path)
    assert [row[:3] for row in found] == [
        ("b.toml", 1, "device.one"),
        ("c.toml", 1, "mains"),
        ("c.toml", 3, "device.two"),
        ("d.toml", 1, ""),
        ("e.toml", None, ""),
        ("f.toml", 1, "device"),
    ]
    said = ["a.toml too; rename", "not a device", "not a table", "not valid TOML", "no device", "no device"]
    assert all(words in row[3] for words, row in zip(said, found, strict=True))
