"""Files that are no sheet, and values that nobody would write: a complaint, never a crash."""

import copy

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from safeamp.amplifier import Sheet
from safeamp.complaints import ReadingError
from safeamp.reading import load_sheet, sheet_from
from safeamp.reading.document import LARGEST
from tests.reading.desk import SCENARIOS, change, scenario


@pytest.mark.parametrize(
    ("content", "line", "words"),
    [
        (b"", None, "is empty"),
        (b" \n\t\r\n", None, "is empty"),
        (b"\xef\xbb\xbf", None, "is empty"),
        (b"title = 'x'\n\0", None, "is not a text but binary data"),
        (b"\x89PNG\r\n\x1a\n", None, "is not a UTF-8 text"),
        ("title = 'x'".encode("utf-16"), None, "is not a UTF-8 text"),
        (b"#" * (LARGEST + 1), None, "is larger than 1 MiB"),
        (b"title = 'x'\n[supply]\nno_load = 35 V # rail\n", 3, 'write the value in quotes: no_load = "35 V"'),
        (b"title = 'x'\r\n[supply]\r\nno_load = 35 V\r\n", 3, 'write the value in quotes: no_load = "35 V"'),
        (b"title = 'x'\ntitle = 'y'\n", 2, "is not valid TOML here (Cannot overwrite a value)"),
        (b"[stage]\n[stage]\n", 2, "is not valid TOML here (Cannot declare ('stage',) twice)"),
        (b"title = 'x\n", 1, "write text and every value with a unit in quotes"),
        (b"title", 1, "is not valid TOML here"),
        (b"x = " + b"[" * 5000, None, "is nested too deeply"),
        (b"x = " + b"1" * 5000, None, "is not valid TOML ("),
    ],
)
def test_a_file_that_is_no_sheet(tmp_path, content, line, words):
    file = tmp_path / "amp.toml"
    file.write_bytes(content)
    with pytest.raises(ReadingError) as caught:
        load_sheet(file)
    [complaint] = caught.value.complaints
    assert words in complaint.text
    assert (complaint.path, complaint.line or line) == (str(file), line or complaint.line)
    assert "(at " not in complaint.text


def test_a_file_of_just_the_largest_size_is_read(tmp_path):
    content = (SCENARIOS / "healthy.toml").read_bytes()
    file = tmp_path / "amp.toml"
    file.write_bytes(content + b"#" * (LARGEST - len(content)))
    assert load_sheet(file).amplifier.title


def test_windows_line_ends_and_a_byte_order_mark_change_nothing_but_the_digest(tmp_path):
    file = tmp_path / "amp.toml"
    file.write_bytes(b"\xef\xbb\xbf" + (SCENARIOS / "healthy.toml").read_bytes().replace(b"\n", b"\r\n"))
    there, here = load_sheet(SCENARIOS / "healthy.toml"), load_sheet(file)
    assert here.entries == there.entries
    assert here.digest != there.digest


@pytest.mark.parametrize("name", ["none.toml", "a\0b", "x" * 300, ""])
def test_a_file_that_is_not_there(tmp_path, name):
    with pytest.raises(ReadingError, match=r"cannot be read: |is a folder; give a file"):
        load_sheet(f"{tmp_path}/{name}")


def paths_of(table, path=()):
    for key, value in table.items():
        yield ".".join((*path, key))
        if isinstance(value, dict):
            yield from paths_of(value, (*path, key))


def complaints_of(tables):
    try:
        assert isinstance(sheet_from(tables), Sheet)
    except ReadingError as trouble:
        return trouble.complaints
    return ()


SHEETS = {name: scenario(name) for name in ("healthy", "single_rail", "bench_mockup")}
ODD = st.one_of(
    st.none(), st.booleans(), st.integers(), st.floats(), st.text(max_size=8), st.binary(max_size=3), st.dates(),
    st.lists(st.one_of(st.text(max_size=4), st.floats(), st.lists(st.text(max_size=4), max_size=3)), max_size=3),
    st.dictionaries(st.text(max_size=4), st.integers(), max_size=2),
    st.sampled_from(["none", "1 V", "0 V", "-5 V ±3 V", "1 mA, guess", "20 %", "9e999 V", "0R33", "35 degC", "bench"]),
    st.sampled_from([[["1 V", "1 A"]], [["0 V", "0 A"], ["1 V", "0 A"]], ["1 V", "2 V", "3 V"], [[["1 V"]]], [None]]),
)  # fmt: skip


@settings(deadline=None, max_examples=300)
@given(st.data())
def test_whatever_stands_at_a_key_is_read_or_complained_of(data):
    base = SHEETS[data.draw(st.sampled_from(sorted(SHEETS)))]
    changed = copy.deepcopy(base)
    for path in data.draw(st.lists(st.sampled_from(sorted(paths_of(base))), min_size=1, max_size=3)):
        outer = path.rpartition(".")[0]
        try:
            changed = change(changed, {path: data.draw(ODD)})
        except (TypeError, AttributeError):
            assert outer  # a table above it was replaced before
    assert all(complaint.text for complaint in complaints_of(changed))


@settings(deadline=None, max_examples=60)
@given(st.data())
def test_a_key_less_is_read_or_complained_of(data):
    base = SHEETS[data.draw(st.sampled_from(sorted(SHEETS)))]
    path = data.draw(st.sampled_from(sorted(paths_of(base))))
    changed = copy.deepcopy(base)
    *outer, last = path.split(".")
    table = changed
    for name in outer:
        table = table[name]
    del table[last]
    words = ("missing", "not a known device", "without")
    assert all(any(word in complaint.text for word in words) for complaint in complaints_of(changed))
