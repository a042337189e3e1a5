"""The card for the first power-up, step by step."""

from safeamp.studies.power_up.card import power_up

__all__ = ["power_up"]
