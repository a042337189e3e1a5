"""A pocket calculator: what a printed line comes to, and how far its rounded numbers may have moved it."""

import ast
import math
import re

NUMBER = re.compile(r"(?<![A-Za-z_])\d+(?:\.\d+)?(?:e-?\d+)?")
DIGITS = 6
FUNCTIONS = {
    "sqrt": math.sqrt,
    "ln": math.log,
    "exp": math.exp,
    "sin": lambda x: math.sin(math.radians(x)),
    "cos": lambda x: math.cos(math.radians(x)),
    "tan": lambda x: math.tan(math.radians(x)),
    "atan": lambda x: math.degrees(math.atan(x)),
    "max": max,
    "min": min,
    "abs": abs,
}
OPERATORS = {
    ast.Add: lambda a, b: a + b,
    ast.Sub: lambda a, b: a - b,
    ast.Mult: lambda a, b: a * b,
    ast.Div: lambda a, b: a / b,
    ast.Pow: lambda a, b: a**b,
}


def evaluated(text):
    """Return what a line of numbers comes to; anything but arithmetic is refused."""
    return _value(ast.parse(text.replace("^", "**"), mode="eval").body)


def _value(node):
    if isinstance(node, ast.Constant) and isinstance(node.value, int | float):
        return float(node.value)
    if isinstance(node, ast.Name) and node.id == "pi":
        return math.pi
    if isinstance(node, ast.UnaryOp) and isinstance(node.op, ast.USub):
        return -_value(node.operand)
    if isinstance(node, ast.BinOp):
        return OPERATORS[type(node.op)](_value(node.left), _value(node.right))
    if isinstance(node, ast.Call) and isinstance(node.func, ast.Name):
        return FUNCTIONS[node.func.id](*map(_value, node.args))
    raise ValueError(f"{ast.dump(node)} is no arithmetic")


def half_a_digit(value):
    """Return half of the last printed digit of a number."""
    return 0.5 * 10.0 ** (math.floor(math.log10(abs(value))) - DIGITS + 1) if value else 0.0


def uncertainty(text):
    """Return how far the rounding of the numbers in a line may have moved what it comes to."""
    plain, total = evaluated(text), 0.0
    for found in NUMBER.finditer(text):
        moved = float(found[0]) + half_a_digit(float(found[0]))
        changed = f"{text[: found.start()]}{moved!r}{text[found.end() :]}"
        total += abs(evaluated(changed) - plain)
    return total
