"""Load the values that somebody else printed: `case("stage-1")`, `printed(...)` for the comparison."""

import re
import tomllib
from pathlib import Path
from typing import Any

import pytest

_FILE = Path(__file__).with_name("published.toml")
_CASES = {entry["id"]: entry for entry in tomllib.loads(_FILE.read_text(encoding="utf-8"))["case"]}
_NUMBER = re.compile(r"(-?\d+(?:\.\d+)?(?:e-?\d+)?)\s*(.*)")
_FACTOR = {"%": 1e-2, "k": 1e3, "M": 1e6, "m": 1e-3, "u": 1e-6, "n": 1e-9}
_WHOLE = {
    "",
    "V",
    "A",
    "W",
    "Hz",
    "H",
    "F",
    "ohm",
    "s",
    "min",
    "h",
    "degC",
    "deg",
    "K",
    "K/W",
    "W/K",
    "dB",
    "N/A",
    "/K",
}


def case(name: str) -> dict[str, Any]:
    """Return a published case: given, expected, source, evidence, perhaps tolerance and trap."""
    return _CASES[name]


def _split(text: str | float) -> tuple[str, float]:
    """Return the digits of a printed value and the factor of its unit to the base unit."""
    digits, unit = _NUMBER.fullmatch(str(text)).groups()
    if unit in _WHOLE:
        return digits, {"min": 60.0, "h": 3600.0}.get(unit, 1.0)
    return digits, _FACTOR[unit[0]]


def number(text: Any) -> Any:
    """Return a printed value, or a list of them, as SI floats; ratios for percents and fractions."""
    if isinstance(text, list):
        return [number(item) for item in text]
    if isinstance(text, str) and "/" in text and text.replace("/", "").isdigit():
        numerator, denominator = text.split("/")
        return int(numerator) / int(denominator)
    digits, factor = _split(text)
    return float(digits) * factor


def half_unit(text: str | float) -> float:
    """Return half a unit in the last printed place."""
    digits, factor = _split(text)
    mantissa, _, exponent = digits.partition("e")
    places = len(mantissa.partition(".")[2])
    return 0.5000001 * 10.0 ** (int(exponent or 0) - places) * factor


def given(name: str) -> dict[str, Any]:
    """Return the inputs of a case as SI floats; words stay words."""
    return {key: _numeric(value) for key, value in case(name)["given"].items()}


def _numeric(value: Any) -> Any:
    """Return a printed value as a float, anything else as it is."""
    items = value if isinstance(value, list) else [value]
    numeric = all(
        not isinstance(i, bool) and re.fullmatch(r"-?[\d.]+(e-?\d+)?( ?[\w%]*)?(/[\w]+)?", str(i))
        for i in items
    )
    return number(value) if numeric else value


def printed(name: str, key: str) -> Any:
    """Return what `key` of a case must come to, with the tolerance of the case or of its printed digits."""
    entry = case(name)
    text = entry["expected"][key]
    if isinstance(text, list):
        return Printed([_approximately(item, entry) for item in text])
    return _approximately(text, entry)


def _approximately(text: str | float, entry: dict[str, Any]) -> Any:
    if "tolerance" in entry:
        return pytest.approx(number(text), rel=number(entry["tolerance"]))
    return pytest.approx(number(text), rel=0, abs=half_unit(text))


class Printed(list[Any]):
    """A list of printed values that compares item by item with any sequence of the same length."""

    def __eq__(self, other: object) -> bool:
        values = list(other)
        return len(values) == len(self) and all(v == item for v, item in zip(values, self, strict=True))

    __hash__ = None
