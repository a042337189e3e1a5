"""Text <-> number: what a user writes becomes floats with bounds and origin, and floats become text.

All floats are in SI base units, except temperature (degC) and angle (deg); percentages are plain ratios.
"""

from safeamp.quantities.kinds import (
    ANGLE,
    CAPACITANCE,
    COMPLIANCE,
    CURRENT,
    ENERGY,
    FORCE_FACTOR,
    FREQUENCY,
    INDUCTANCE,
    KINDS,
    LENGTH,
    LEVEL,
    MASS,
    PERCENT,
    POWER,
    RATIO,
    RESISTANCE,
    TEMPERATURE,
    TEMPERATURE_COEFFICIENT,
    TEMPERATURE_DIFFERENCE,
    THERMAL_RESISTANCE,
    TIME,
    TRANSCONDUCTANCE_PARAMETER,
    VOLTAGE,
)
from safeamp.quantities.nouns import Kind, Number, Origin, QuantityError, Reading, Sign
from safeamp.quantities.output import show, show_reading
from safeamp.quantities.reading import convert, read, read_any
from safeamp.quantities.rewriting import plain_text, rewrite
from safeamp.quantities.units import quantity, registry

__all__ = [
    "ANGLE",
    "CAPACITANCE",
    "COMPLIANCE",
    "CURRENT",
    "ENERGY",
    "FORCE_FACTOR",
    "FREQUENCY",
    "INDUCTANCE",
    "KINDS",
    "LENGTH",
    "LEVEL",
    "MASS",
    "PERCENT",
    "POWER",
    "RATIO",
    "RESISTANCE",
    "TEMPERATURE",
    "TEMPERATURE_COEFFICIENT",
    "TEMPERATURE_DIFFERENCE",
    "THERMAL_RESISTANCE",
    "TIME",
    "TRANSCONDUCTANCE_PARAMETER",
    "VOLTAGE",
    "Kind",
    "Number",
    "Origin",
    "QuantityError",
    "Reading",
    "Sign",
    "convert",
    "plain_text",
    "quantity",
    "read",
    "read_any",
    "registry",
    "rewrite",
    "show",
    "show_reading",
]
