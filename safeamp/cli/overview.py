"""The command `overview`: all sheets of a folder in one table."""

from __future__ import annotations

from enum import StrEnum
from pathlib import Path
from typing import TYPE_CHECKING, Annotated

import typer

from safeamp.cli.files import FilesRead
from safeamp.cli.options import DeviceFolderOption, LimitsOption, OutputOption
from safeamp.cli.output import check_output, columns, complaining, emit, fail

if TYPE_CHECKING:
    from safeamp.answers import Overview


class Form(StrEnum):
    """How the table is printed."""

    TEXT = "text"
    CSV = "csv"
    JSON = "json"
    MARKDOWN = "markdown"


def overview(
    folder: Annotated[Path, typer.Argument(help="The folder; its *.toml files are the sheets.")],
    on_paper: Annotated[
        bool, typer.Option("--on-paper", help="Judge only what is computed; clears no power.")
    ] = False,
    format_: Annotated[Form, typer.Option("--format", help="How the table is printed.")] = Form.TEXT,
    output: OutputOption = None,
    limits: LimitsOption = None,
    device_folder: DeviceFolderOption = None,
) -> None:
    """Show all sheets of a folder in one table; ends with the worst word, or 2 where one could not be read."""
    paths = _sheets(folder)
    never = FilesRead(*paths, limits=limits, device_folder=device_folder)
    if output is not None:
        check_output(output, never)
    found = _judge(paths, limits, device_folder, on_paper=on_paper)
    emit(_text(found, format_, columns() if output is None else 80), output, never=never)
    raise typer.Exit(found.exit_status)


def _sheets(folder: Path) -> list[Path]:
    if not folder.is_dir():
        fail(f"{folder} is not a folder; name the folder of the sheets")
    paths = sorted(path for path in folder.glob("*.toml") if not path.is_dir())
    if not paths:
        fail(f"{folder} holds no sheet; a sheet is a file that ends in .toml")
    return paths


def _judge(paths: list[Path], limits: Path | None, device_folder: Path | None, *, on_paper: bool) -> Overview:
    from functools import partial

    from safeamp.reading import load_sheet
    from safeamp.reading.limits import load_limits
    from safeamp.studies.overview import overview as answer

    with complaining():
        rules = load_limits(limits)
    read = partial(load_sheet, device_folder=device_folder, limits=rules)
    return answer(paths, read, rules, on_paper=on_paper)


def _text(found: Overview, form: Form, width: int) -> str:
    from safeamp.report.overview import overview_csv, overview_json, overview_markdown, render_overview

    if form is Form.CSV:
        return overview_csv(found)
    if form is Form.JSON:
        return overview_json(found)
    return overview_markdown(found) if form is Form.MARKDOWN else render_overview(found, width=width)
