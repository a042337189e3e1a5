"""An impedance curve beside the sheet: a table of frequency, impedance and phase."""

from __future__ import annotations

from pathlib import Path

from safeamp.amplifier import Curve
from safeamp.quantities import ANGLE, FREQUENCY, RESISTANCE
from safeamp.reading.draft import Draft
from safeamp.reading.tables import Column, Form, read_table

#: What a loudspeaker has.
CURVE = Form(
    name="curve",
    rows="points",
    columns={
        "frequency": Column(FREQUENCY, (0.1, 1e6)),
        "impedance": Column(RESISTANCE, (0.1, 1e5)),
        "phase": Column(ANGLE, (-90.0, 90.0)),
    },
    head="frequency [Hz], impedance [ohm], phase [deg]",
    least=2,
    most=100_000,
)


def read_curve(path: Path, name: str, draft: Draft) -> Curve | None:
    """Return the curve of a file; None after complaints, each with its line.

    Parameters
    ----------
    path : Path
        The file.
    name : str
        As the sheet names it.
    draft : Draft
        Takes the complaints.
    """
    rows, complaints = read_table(path, CURVE)
    draft.complaints += complaints
    if complaints:
        return None
    frequencies, impedances, phases = (
        tuple(values[column] for _, values in rows) for column in CURVE.columns
    )
    return Curve(frequencies, impedances, phases, name)
