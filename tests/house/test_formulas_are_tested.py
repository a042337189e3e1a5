"""Every formula of physics is called by a test that holds it against a number of somebody else's, or a derived one."""

import ast

import pytest

from tests.docs.test_parameters import functions
from tests.house.source import TREE

FOLDER = TREE / "tests" / "physics"
#: Files whose tests run over all formulas with the code's own results; they prove ranges and dimensions only.
GENERAL = {"formulas.py", "test_ranges.py"}


def named(path) -> set[str]:
    """Return every name that a file uses, as `name` or as `room.name`."""
    tree = ast.parse(path.read_text(encoding="utf-8"))
    return {node.attr for node in ast.walk(tree) if isinstance(node, ast.Attribute)} | {
        node.id for node in ast.walk(tree) if isinstance(node, ast.Name)
    }


USED = {path.name: named(path) for path in FOLDER.glob("*.py") if path.name not in GENERAL}


@pytest.mark.parametrize("name", functions())
def test_a_formula_is_named_in_the_tests_of_physics(name):
    formula = name.rpartition(".")[2]
    assert [path for path, names in USED.items() if formula in names], f"{name} has no test with a number"
