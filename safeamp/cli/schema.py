"""The command that prints a JSON Schema."""

from __future__ import annotations

from typing import Annotated

import typer

from safeamp.cli.options import OutputOption
from safeamp.cli.output import emit, fail


def schema(
    what: Annotated[str, typer.Argument(help="sheet or result.")], output: OutputOption = None
) -> None:
    """Print the JSON Schema of a sheet, for editors that complete and check it, or of a result."""
    from safeamp.report.schema import render_schema

    try:
        text = render_schema(what)
    except KeyError as trouble:
        fail(trouble.args[0])
    emit(text, output)
