"""The fuse of a sheet or an option as the gates of its letter."""

from __future__ import annotations

from math import inf

from safeamp.amplifier import Fuse
from safeamp.limits import Limits
from safeamp.physics.fuse import Gates

#: Letter of the fuse that no other is slower than.
SLOWEST = "TT"


def gates_of(fuse: Fuse, limits: Limits) -> Gates:
    """Return the gates of a fuse's letter; without a table of its own the slower one's, and never acting if none is."""
    table = limits.fuse_gates.get(fuse.letter)
    if table is None and fuse.letter == SLOWEST:
        return Gates(multiples=(1.0,), fastest=(0.0,), slowest=(inf,))
    table = table or limits.fuse_gates["T"]
    return Gates(
        multiples=tuple(gate.times_rating for gate in table.gates),
        fastest=tuple(gate.shortest for gate in table.gates),
        slowest=tuple(gate.longest for gate in table.gates),
    )
