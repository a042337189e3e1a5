"""What stands under every report: the hazards that no computation removes."""

from typing import Final

#: Common practice, no source.
SAFETY: Final[tuple[str, ...]] = (
    (
        "Mains kills. Work inside only with the mains cord out of the socket; on a live amplifier keep one "
        "hand away from it, never work alone, and use an isolating transformer or a residual-current "
        "device."
    ),
    (
        "Capacitors hold their charge after switch-off: discharge them through a resistor, then measure "
        "that the voltage is gone."
    ),
    (
        "An isolating transformer protects no one who touches both sides, and a variable transformer "
        "neither isolates nor limits current."
    ),
    (
        "Capacitors and devices burst: wear eye protection, stand back at switch-on, keep what burns away "
        "and the means to switch off within reach."
    ),
    "No loudspeaker and no headphones before the steps before it are cleared.",
    (
        "The maker's data and instructions come before anything said here, and so do the laws, codes and "
        "licences for work on mains equipment where you are."
    ),
)
