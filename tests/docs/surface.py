"""Commands and options as the program itself knows them."""

from typing import Any

import typer

from safeamp.cli.app import app

HELP = {"-h", "--help"}


def commands() -> dict[str, Any]:
    """Return every command by its name."""
    group = typer.main.get_command(app)
    return dict(group.commands)


def options(command: Any) -> set[str]:
    """Return the long options of a command, that for help left out."""
    return {
        word
        for parameter in command.params
        if parameter.param_type_name == "option"
        for word in (*parameter.opts, *parameter.secondary_opts)
        if word.startswith("--")
    } - HELP


def arguments(command: Any) -> list[str]:
    """Return the arguments of a command in their order."""
    return [parameter.name for parameter in command.params if parameter.param_type_name == "argument"]


def all_options() -> set[str]:
    """Return the options of all commands, and that of the program itself."""
    return set().union(*map(options, commands().values())) | {"--version"} | HELP
