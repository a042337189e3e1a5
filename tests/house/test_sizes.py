"""Files and functions stay small enough to be read at one sitting."""

import ast
from statistics import median, quantiles

import pytest

from tests.house.source import TREE, code_lines, files, functions, length

ROOMS = ("safeamp", "tests")


def test_no_file_is_over_400_lines():
    long = {str(path.relative_to(TREE)): length(path) for path in files(*ROOMS) if length(path) > 400}
    assert long == {}


def test_half_of_the_files_are_within_120_lines():
    found = files(*ROOMS)
    assert len(found) > 150
    assert median(map(length, found)) <= 120


@pytest.mark.parametrize("room", ROOMS)
def test_no_function_is_over_40_lines_of_code(room):
    long = {str(one): one.lines for one in functions(room) if one.lines > 40}
    assert long == {}


@pytest.mark.parametrize("room", ROOMS)
def test_functions_are_small(room):
    lines = [one.lines for one in functions(room)]
    assert len(lines) > 500
    assert median(lines) <= 8
    assert quantiles(lines, n=10)[-1] <= 25


def test_what_counts_as_a_line_of_code():
    text = 'def f(\n    a,\n):\n    """Say.\n\n    More.\n    """\n    # why\n    b = a\n\n    return b\n'
    [node] = ast.parse(text).body
    assert code_lines(node, text.splitlines()) == 5
