"""The shapes of text that people write and that are not read here."""

from typing import Final, NamedTuple

_NUMBER: Final = r"(?:[0-9]+(?:\.[0-9]+)?|\.[0-9]+)(?:[eE][+-]?[0-9]+)?"
_SIGNED: Final = rf"[+-]?{_NUMBER}"
_UNIT: Final = r" ?(?:[A-Za-zΩµ°%][A-Za-zΩµ°%²/]*)?"
_WORD_BELOW: Final = r"(?:<|>|≤|≥|(?i:max|min|up to|under|over|less than|more than|at least|at most)\b)"


class Shape(NamedTuple):
    """A pattern of the whole text, what is found in it, what to write, and how to turn it into that."""

    pattern: str
    found: str
    write: str
    rewrite: str = ""


# Tried in this order; the first that matches is the one that is said.
SHAPES: Final = tuple(
    Shape(*texts)
    for texts in (
        (r"(?i:[+-]?(?:nan|inf|infinity))\b.*|[+-]?∞.*", "is no number",
         "write what was read, or leave the key out when it is not known"),
        (r"(?:~|≈|(?i:ca\b\.?|circa|about|approx\b\.?)) ?(.+)", "is only roughly a value",
         "write number and unit and call it a guess", r"\1, guess"),
        (rf"{_WORD_BELOW}.*", "is a bound, not a value",
         "write what was read, or a range from low to high with two dots"),
        (r".*@.*", "joins a value to its condition",
         "write the value alone, and the condition under its own key"),
        (rf"({_NUMBER}){_UNIT} ?[-–/] ?0 ?V? ?[-–/] ?{_NUMBER}({_UNIT})", "is a winding with a centre tap",
         "write one half of it", r"\1\2"),
        (rf"(?:±|\+/-|\+-) ?({_NUMBER}{_UNIT})", "gives both signs at once", "write one rail", r"\1"),
        (r"(?:±|\+/-|\+-).*", "starts with a tolerance", "write number and unit before it"),
        (r".*\*\*.*|.*\^.*", "is a calculation", "write its result"),
        (rf"{_NUMBER}{_UNIT} ?[xX×*·] ?{_NUMBER}.*", "is a product", "write one value, as one number"),
        (rf"({_SIGNED})\.({_UNIT})", "ends its number with a point",
         "write digits after the point or none", r"\1\2"),
        (rf"([+-]) ({_NUMBER}{_UNIT})", "has a blank after the sign", "write them together", r"\1\2"),
        (rf"({_SIGNED} ?[A-Za-zΩµ°][A-Za-zΩµ°²/]*) ?-({_NUMBER}) ?%", "has a tolerance to one side only",
         "write both sides", r"\1 -\2/+0 %"),
        (rf"({_SIGNED}){_UNIT} ?(?:\.\.+|…|–|—|-| to ) ?({_SIGNED})({_UNIT})", "looks like a range",
         "write its ends with two dots between them and the unit once, at the end", r"\1..\2\3"),
        (rf"{_SIGNED} ?\.\. ?{_SIGNED}.*(?:±|\+/-).*", "has a range and a tolerance", "write one of the two"),
        (r".*(?:±|\+/-).*(?:±|\+/-).*", "has two tolerances", "write one"),
        (r"(.*) (?:\+-|-\+|-/\+) ?([0-9].*)", "has a sign of tolerance that is not read", "write ± or +/-",
         r"\1 ±\2"),
        (rf"(.*[A-Za-zΩµ°%]) ?\+ ?({_NUMBER}{_UNIT})", "has a tolerance to one side only",
         "write both sides", r"\1 -0/+\2"),
        (r"([+-]?[0-9]{1,3})['’_ ]([0-9]{3})(?:['’_ ]([0-9]{3}))?(?:['’_ ]([0-9]{3}))?((?![0-9]).*)",
         "groups the digits of its number", "write them without a gap", r"\1\2\3\4\5"),
        (r".*[()\[\]{}].*", "has brackets",
         "write number and unit without them, and the origin after a comma"),
        (rf"({_SIGNED}{_UNIT}) ({_NUMBER} ?%)", "has a tolerance without a sign",
         "write ± before it", r"\1 ±\2"),
        (r".*[0-9.] ?[*/+=÷-] ?[0-9.].*|=.*", "is a calculation", "write its result"),
        (rf"{_SIGNED}{_UNIT} {_SIGNED}.*", "holds two numbers", "write one value, as one number"),
        (r"[+-]?[0-9]*\.?[0-9]+[eE][+-]?[0-9]{4,}.*", "has an exponent beyond all use",
         "write an ordinary number"),
        (r".*(?:[^\x00-\x7fΩµ°±²]|[0-9]²).*", "has a character that is not read",
         "write digits 0 to 9, a point for decimals, and the unit"),
    )
)  # fmt: skip
