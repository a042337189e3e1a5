"""The index of lines on documents that grow: each addition brings the paths that the standard parser sees."""

import tomllib

from hypothesis import given, settings
from hypothesis import strategies as st

from safeamp.reading.lines import line_index

KEYS = st.one_of(
    st.text("abcXYZ09-_", min_size=1, max_size=6),
    st.text(st.characters(exclude_categories=("Cs", "Cc")), max_size=6).map(
        lambda t: f"'{t}'" if "'" not in t else '"q"'
    ),
    st.sampled_from(['"a.b"', '"with # hash"', '"quote \\" in"', '"tab \\t"', '""', '"="', '"[x]"']),
)
BLANK = st.sampled_from(["", " ", "\t", "  "])
COMMENT = st.sampled_from(["", " # no = 1", "# [table]", ' # "', " # '''", "#"])
GAP = st.sampled_from(["", " ", "\n", "\n\n", " # , ] } = \n", "\n# '\n\t"])
PLAIN = st.sampled_from(
    [
        "1", "-2.5e3", "true", "1979-05-27 07:32:00", "1979-05-27T07:32:00Z", "0xff", "inf",
        '"text"', "'literal'", '"a # b"', '"[1, 2]"', '"esc \\" \\\\"', "'back\\'", '""', "''",
        '"""many\nlines\n"""', '"""\n\\\n  end"""', '""""quoted""""', '"""""two"""""', '"""a \\""" b"""',
        "'''one\ntwo'''", "''''x'''''", '"""# = [ ] { }\n[table]\nkey = 1"""', "'''\n[x]\n'''",
    ]
)  # fmt: skip


@st.composite
def arrays(draw, values):
    items = draw(st.lists(values, max_size=3))
    text = ",".join(f"{draw(GAP)}{item}{draw(GAP)}" for item in items)
    return f"[{text}{draw(st.sampled_from(['', ',']) if items else st.just(''))}{draw(GAP)}]"


@st.composite
def inline_tables(draw, values):
    keys = draw(st.lists(KEYS, max_size=3, unique=True))
    return "{" + ", ".join(f"{draw(BLANK)}{key}{draw(BLANK)}= {draw(values)}" for key in keys) + "}"


VALUES = st.recursive(PLAIN, lambda inner: arrays(inner) | inline_tables(inner), max_leaves=6)


@st.composite
def dotted(draw):
    """Write one to three keys with blanks about the dots, not before the first or after the last."""
    keys = draw(st.lists(KEYS, min_size=1, max_size=3))
    return f"{draw(BLANK)}.{draw(BLANK)}".join(keys)


DOTTED = dotted()
LINES = st.one_of(
    st.builds(lambda key, value, end: f"{key} = {value}{end}", DOTTED, VALUES, COMMENT),
    st.builds(lambda key, end: f"[{key}]{end}", DOTTED, COMMENT),
    st.builds(lambda key, end: f"[[ {key} ]]{end}", DOTTED, COMMENT),
    st.sampled_from(["", "   ", "# comment = 1", "\t# [x]"]),
)


def paths_of(value, path=()):
    """Return every path of what the standard parser made."""
    yield path
    inner = value.items() if isinstance(value, dict) else enumerate(value) if isinstance(value, list) else ()
    for key, item in inner:
        yield from paths_of(item, (*path, key))


@st.composite
def documents(draw):
    """Grow a valid document line by line; return it with the paths that each addition brought."""
    text, line, known, born = "", 1, {()}, {}
    for addition in draw(st.lists(LINES, max_size=10)):
        try:
            found = set(paths_of(tomllib.loads(f"{text}{addition}\n")))
        except tomllib.TOMLDecodeError:
            continue
        last = line + addition.count("\n")
        born |= dict.fromkeys(found - known, (line, last))
        text, line, known = f"{text}{addition}\n", last + 1, found
    ending = draw(st.sampled_from(["\n", "\r\n"]))
    return text.replace("\n", ending), born


@settings(deadline=None, max_examples=400)
@given(documents())
def test_every_path_of_the_standard_parser_is_found_at_the_statement_that_brought_it(document):
    text, born = document
    found = line_index(text)
    for path, (first, last) in born.items():
        assert first <= found[path] <= last, path
    assert set(found) == set(born)
