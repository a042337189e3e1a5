"""Arrangements of output stages that are refused by name, so that nobody takes their silence for a go."""

from safeamp.limits import plain

_SWITCHED = "its rails or devices switch with the signal, so neither heat nor safe area follow from one rail"

#: Words by which an arrangement is known, and why it is not covered.
UNCOVERED = {
    (
        "single ended",
        "class a single ended",
    ): "single-ended stages are not covered: one device carries the whole current",
    ("output transformer", "transformer coupled", "transformer"): (
        "stages with an output transformer are not covered: the devices see another load than the loudspeaker"
    ),
    ("class g",): f"class G is not covered: {_SWITCHED}",
    ("class h",): f"class H is not covered: {_SWITCHED}",
    ("class d", "switching", "digital"): f"class D is not covered: {_SWITCHED}",
    ("valve", "tube", "valves", "tubes", "hybrid"): "valve stages are not covered: this is for transistors",
    ("floating supply", "floating supplies"): (
        "stages with floating supplies are not covered: no rail is fixed against the output"
    ),
    ("feedforward", "feed forward"): "feedforward stages are not covered: their devices share by another law",
    ("integrated", "integrated circuit", "chip", "ic", "module"): (
        "integrated amplifiers are not covered: their devices have no ratings of their own"
    ),
}


def not_covered(text: str) -> str:
    """Return why an arrangement is not covered; an empty text when its name is not known."""
    name = plain(text).removesuffix(" stage").removesuffix(" amplifier")
    return next((reason for words, reason in UNCOVERED.items() if name in words), "")
