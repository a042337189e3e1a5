"""The nouns of the sheet: one frozen tree for file, key tables, starters, schema and computation.

Numbers are SI floats, or arrays over the flat case axis (index 0 nominal); temperatures in degC, angles in deg.
"""

from safeamp.amplifier.cases import at_case, number_of_cases
from safeamp.amplifier.keys import Key, keys_of
from safeamp.amplifier.load import Curve, Limiter, Loudspeaker, Readings
from safeamp.amplifier.power import Fins, Fuse, Heatsink, Mains, Protection, Supply
from safeamp.amplifier.sheet import Assumption, Entry, Sheet
from safeamp.amplifier.soak import SoakLog
from safeamp.amplifier.stage import Device, OutputCapacitor, Stage
from safeamp.amplifier.tree import TABLES, Amplifier, is_mapping, value_at, with_values, written_key

__all__ = [
    "TABLES",
    "Amplifier",
    "Assumption",
    "Curve",
    "Device",
    "Entry",
    "Fins",
    "Fuse",
    "Heatsink",
    "Key",
    "Limiter",
    "Loudspeaker",
    "Mains",
    "OutputCapacitor",
    "Protection",
    "Readings",
    "Sheet",
    "SoakLog",
    "Stage",
    "Supply",
    "at_case",
    "is_mapping",
    "keys_of",
    "number_of_cases",
    "value_at",
    "with_values",
    "written_key",
]
