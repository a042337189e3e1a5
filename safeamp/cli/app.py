"""The commands: parse, call, print, return a status. Rooms are imported by the command that needs them."""

from __future__ import annotations

from functools import cache
from importlib import import_module
from typing import TYPE_CHECKING, Annotated, Any

import typer

if TYPE_CHECKING:
    app: typer.Typer

#: Command -> the file of this room that holds its function, in the order in which help lists them.
FILES = {
    "check": "check",
    "demo": "check",
    "new": "lists",
    "keys": "lists",
    "limits": "lists",
    "devices": "lists",
    "schema": "schema",
    "powerup": "powerup",
    "jobsheet": "jobsheet",
    "tolerance": "tolerance",
    "substitute": "substitute",
    "capacitor": "capacitor",
    "soa": "soa",
    "heatsink": "heatsink",
    "soak": "soak",
    "offset": "offset",
    "loudspeaker": "loudspeaker",
    "solve": "solve",
    "overview": "overview",
}


def _version(wanted: bool) -> None:
    if wanted:
        from safeamp._version import __version__
        from safeamp.cli.output import emit

        emit(f"safeamp {__version__}\n")
        raise typer.Exit


def _common(
    version: Annotated[
        bool, typer.Option("--version", callback=_version, is_eager=True, help="Print the version.")
    ] = False,
) -> None:
    pass


@cache
def program(asked: str | None = None) -> typer.Typer:
    """Return the program that takes the one command asked for, or every command where that is none.

    Reading the options of all commands takes a start longer than most answers do.
    """
    made = typer.Typer(
        name="safeamp",
        help="Check a transistor power amplifier before power is applied and before a loudspeaker is connected.",
        epilog="Exit status of check: 0 go, 3 caution, 4 unverified, 5 stop; 2 wrong input, nothing computed.",
        rich_markup_mode=None,
        pretty_exceptions_enable=False,
        add_completion=False,
        no_args_is_help=True,
        context_settings={"help_option_names": ["-h", "--help"]},
    )
    made.callback()(_common)
    for name in (asked,) if asked in FILES else FILES:
        made.command(name)(getattr(import_module(f"safeamp.cli.{FILES[name]}"), name))
    return made


def __getattr__(name: str) -> Any:
    if name != "app":
        raise AttributeError(f"module {__name__!r} has no attribute {name!r}")
    return program()
