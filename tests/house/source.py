"""The program text as it stands: files, functions, docstrings."""

import ast
from collections.abc import Iterator
from dataclasses import dataclass
from functools import cache
from pathlib import Path

TREE = Path(__file__).resolve().parents[2]
FUNCTIONS = (ast.FunctionDef, ast.AsyncFunctionDef)


@dataclass(frozen=True)
class Function:
    """A function: where it stands, its full name, how many lines of code it has."""

    path: Path
    name: str
    lines: int
    docstring: str | None

    def __str__(self) -> str:
        return f"{self.path.relative_to(TREE)}: {self.name}"


def files(*rooms: str) -> list[Path]:
    return sorted(path for room in rooms for path in (TREE / room).rglob("*.py"))


def length(path: Path) -> int:
    return len(path.read_text(encoding="utf-8").splitlines())


def code_lines(node: ast.AST, lines: list[str]) -> int:
    """Return the lines of a function without its docstring, blank lines and comments."""
    first, *_ = node.body
    words = range(first.lineno, first.end_lineno + 1) if ast.get_docstring(node) is not None else ()
    inside = [
        lines[number - 1].strip() for number in range(node.lineno, node.end_lineno + 1) if number not in words
    ]
    return sum(1 for line in inside if line and not line.startswith("#"))


def walk(node: ast.AST, outer: str = "") -> Iterator[tuple[str, ast.AST]]:
    """Yield every function below a node with its full name."""
    for child in ast.iter_child_nodes(node):
        named = isinstance(child, (*FUNCTIONS, ast.ClassDef))
        name = f"{outer}.{child.name}".lstrip(".") if named else outer
        if isinstance(child, FUNCTIONS):
            yield name, child
        yield from walk(child, name)


@cache
def functions(*rooms: str) -> tuple[Function, ...]:
    found = []
    for path in files(*rooms):
        text = path.read_text(encoding="utf-8")
        for name, node in walk(ast.parse(text)):
            found.append(Function(path, name, code_lines(node, text.splitlines()), ast.get_docstring(node)))
    return tuple(found)
