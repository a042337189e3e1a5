"""The version of the program, where every room may read it."""

__version__ = "0.1.0"
