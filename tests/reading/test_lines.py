"""The line of each key, proved against the standard parser on written and on generated documents."""

import tomllib

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from safeamp.reading.lines import line_index

WRITTEN = '''\
# a comment with [brackets] and = signs
title = "One # no comment"   # a comment

[mains]
nominal = "230 V"
"odd key" = 1
a.b = 'x # y'

[stage] # table
points = [
    ["40 V", "3 A"], # first ]
    ["80 V",
     "1 A"],
]
gates = { low = 1, high = [2, 3] }
note = """
[not a table]
key = "not a key" \\"""
"""
after = true

[[log]]
time = 1
[[log]]
time = 2
[log.inner]
x = -1e3
[device."to-3.x"]
kind = 'bipolar'
'''
EXPECTED = {
    ("title",): 2,
    ("mains",): 4,
    ("mains", "nominal"): 5,
    ("mains", "odd key"): 6,
    ("mains", "a"): 7,
    ("mains", "a", "b"): 7,
    ("stage",): 9,
    ("stage", "points"): 10,
    ("stage", "points", 0): 11,
    ("stage", "points", 0, 0): 11,
    ("stage", "points", 0, 1): 11,
    ("stage", "points", 1): 12,
    ("stage", "points", 1, 0): 12,
    ("stage", "points", 1, 1): 13,
    ("stage", "gates"): 15,
    ("stage", "gates", "low"): 15,
    ("stage", "gates", "high"): 15,
    ("stage", "gates", "high", 0): 15,
    ("stage", "gates", "high", 1): 15,
    ("stage", "note"): 16,
    ("stage", "after"): 20,
    ("log",): 22,
    ("log", 0): 22,
    ("log", 0, "time"): 23,
    ("log", 1): 24,
    ("log", 1, "time"): 25,
    ("log", 1, "inner"): 26,
    ("log", 1, "inner", "x"): 27,
    ("device",): 28,
    ("device", "to-3.x"): 28,
    ("device", "to-3.x", "kind"): 29,
}


def paths(value, path=()):
    """Every path of a parsed document."""
    inner = value.items() if isinstance(value, dict) else enumerate(value) if isinstance(value, list) else ()
    for key, below in inner:
        yield (*path, key)
        yield from paths(below, (*path, key))


def test_written_document():
    assert line_index(WRITTEN) == EXPECTED


def test_written_document_has_the_paths_of_the_parser():
    assert set(EXPECTED) == set(paths(tomllib.loads(WRITTEN)))


def test_windows_line_ends_count_once():
    assert line_index(WRITTEN.replace("\n", "\r\n")) == EXPECTED


@pytest.mark.parametrize("text", ["", "\n\n", "# only a comment", "   \t"])
def test_nothing_is_found_in_nothing(text):
    assert line_index(text) == {}


def test_no_toml_is_told_with_its_line():
    with pytest.raises(ValueError, match="not TOML at line 2"):
        line_index("a = 1\n= 2\n")


BARE = st.text("abcXYZ019_-", min_size=1, max_size=6)
TEXT = st.text(st.characters(blacklist_categories=("Cs", "Cc"), blacklist_characters='"\\'), max_size=12)
QUOTED = TEXT.map(lambda text: f'"{text}"')
SCALAR = st.one_of(
    st.integers(-9999, 9999).map(str),
    st.floats(allow_nan=False, allow_infinity=False, width=32).map(lambda x: f"{x:.4f}"),
    st.sampled_from(
        ["true", "false", "inf", "nan", "1979-05-27", '"\\"]#"', "'#'", '"""\n[x]\ny=1\n"""', "'''\n#'''"]
    ),
    QUOTED,
)
VALUE = st.recursive(
    SCALAR,
    lambda inner: st.one_of(
        st.lists(inner, max_size=3).map(lambda items: "[\n" + ", # x\n ".join(items) + "\n]"),
        st.dictionaries(BARE, inner.filter(lambda text: "\n" not in text), max_size=3).map(
            lambda table: "{ " + ", ".join(f"{key} = {value}" for key, value in table.items()) + " }"
        ),
    ),
    max_leaves=6,
)
KEY = st.one_of(BARE, QUOTED)


@st.composite
def documents(draw):
    """Lines of a document, and the line where each key at the start of a line was written."""
    lines, written = [], {}

    def add(text):
        lines.extend(text.split("\n"))
        lines.extend(draw(st.sampled_from([[], [""], ["# a = 1"], ["  # [x]"]])))

    for table in draw(st.lists(KEY, max_size=3, unique=True)):
        add(f"[[{table}]]" if (array := draw(st.booleans())) else f"[ {table} ]")
        for key in draw(st.lists(KEY, max_size=3, unique=True)):
            name = next(iter(tomllib.loads(f"{key} = 0")))
            written[(next(iter(tomllib.loads(f"{table} = 0"))), *((0,) if array else ()), name)] = (
                len(lines) + 1
            )
            add(f"{key} = {draw(VALUE)}")
    return "\n".join(lines), written


@settings(deadline=None)
@given(documents())
def test_generated_documents_agree_with_the_parser(document):
    text, written = document
    try:
        data = tomllib.loads(text)
    except tomllib.TOMLDecodeError:
        return  # a bare and a quoted key may be the same one
    found = line_index(text)
    assert set(found) == set(paths(data))
    assert {path: found[path] for path in written} == written
