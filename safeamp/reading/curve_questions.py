"""Questions about an impedance curve: whether it is that of this loudspeaker."""

from __future__ import annotations

from safeamp.amplifier import Curve
from safeamp.quantities import FREQUENCY, RESISTANCE, show
from safeamp.reading.draft import Draft

PATH = "loudspeaker.impedance_curve"
COIL = "loudspeaker.dc_resistance"
#: Up to here the coil of the woofer is what a box has at least; above it another way lies in parallel, Hz.
LOW_NOTES = 200.0
#: What a meter may be off.
METER = 0.95
#: The lowest point of a curve over the label, and over the coil that confirms it; common practice, no source.
LEAST_OF_LABEL, MOST_OF_LABEL, MOST_OF_COIL = 0.4, 1.5, 1.5


def ask_curve(draft: Draft) -> None:
    """Complain of a curve that belongs to another loudspeaker or is in another unit."""
    curve = draft.values.get(PATH)
    if not isinstance(curve, Curve):
        return
    coil = draft.number(COIL)
    if coil is not None and _below_coil(draft, curve, coil):
        return
    label, lowest = draft.number("loudspeaker.nominal_impedance"), min(curve.impedances)
    if label is None or LEAST_OF_LABEL <= lowest / label <= MOST_OF_LABEL:
        return
    if coil is not None and METER <= lowest / coil <= MOST_OF_COIL:
        return
    text = f"its lowest, {show(lowest, RESISTANCE)}, is far from nominal_impedance, {show(label, RESISTANCE)}"
    ask = "is it the curve of one loudspeaker alone, in ohm?"
    draft.complain(PATH, f"{text}: {ask} read label and curve again")


def _below_coil(draft: Draft, curve: Curve, coil: float) -> bool:
    """Complain of low notes at which the curve lies below the coil; tell whether it does."""
    points = zip(curve.frequencies, curve.impedances, strict=True)
    low = [(ohms, note) for note, ohms in points if note <= LOW_NOTES]
    least = min(METER * coil, draft.entries[COIL].low)
    if not low or min(low)[0] >= least * (1.0 - 1e-9):
        return False
    ohms, note = min(low)
    text = f"{show(ohms, RESISTANCE)} at {show(note, FREQUENCY)} is below dc_resistance, {show(coil, RESISTANCE)}"
    why = "at low notes no loudspeaker has less than its coil"
    draft.complain(PATH, f"{text}: {why}; is it the curve of this one, in ohm? read the coil again")
    return True
