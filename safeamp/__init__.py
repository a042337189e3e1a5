"""Check a transistor audio power amplifier before power is applied and before a loudspeaker is connected."""

__version__ = "0.1.0"
