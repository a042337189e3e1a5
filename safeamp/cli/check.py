"""The main job: a sheet judged, as text for people or for programs; and the same on a built-in example."""

from __future__ import annotations

from enum import StrEnum
from pathlib import Path
from typing import Annotated

import typer

from safeamp.cli.figures import (
    AllFiguresOption,
    FigureFormat,
    FigureFormatOption,
    FiguresOption,
    check_folder,
    write_figures,
)
from safeamp.cli.files import FilesRead
from safeamp.cli.judged import Judged, drawings, judged, left_out, step_of
from safeamp.cli.options import DeviceFolderOption, LimitsOption, OutputOption, SheetArgument
from safeamp.cli.output import check_output, colourful, columns, emit, fail


class Format(StrEnum):
    """How a report is printed."""

    TEXT = "text"
    JSON = "json"
    MARKDOWN = "markdown"
    HTML = "html"
    CSV = "csv"


FormatOption = Annotated[Format, typer.Option("--format", help="How the report is printed.")]


def check(
    sheet: SheetArgument,
    format_: FormatOption = Format.TEXT,
    output: OutputOption = None,
    step: Annotated[
        str | None, typer.Option("--step", help="Judge up to and including this step, such as cold-checks.")
    ] = None,
    limits: LimitsOption = None,
    device_folder: DeviceFolderOption = None,
    on_paper: Annotated[
        bool, typer.Option("--on-paper", help="Judge only what is computed; clears no power.")
    ] = False,
    explain: Annotated[
        list[str] | None,
        typer.Option("--explain", help="Show how a finding comes about, by its id; may be repeated."),
    ] = None,
    figures: FiguresOption = None,
    figures_format: FigureFormatOption = FigureFormat.SVG,
    all_figures: AllFiguresOption = False,
) -> None:
    """Say whether the next step may be taken, what to read, and at which reading to switch off."""
    up_to = None if step is None else step_of(step)
    if explain and format_ is Format.CSV:
        fail("--explain: a row of csv has no room for a calculation; take text, json, markdown or html")
    _check_page(format_, all_figures=all_figures)
    never = FilesRead(sheet, limits=limits, device_folder=device_folder)
    if output is not None:
        check_output(output, never)
    check_folder(figures, output)
    found = judged(sheet, limits=limits, device_folder=device_folder, on_paper=on_paper, up_to=up_to)
    if figures is not None:
        write_figures(found.gallery, figures, figures_format, never=never)
    emit(
        _text(found, format_, explain, all_figures=all_figures, on_terminal=output is None),
        output,
        never=never,
    )
    raise typer.Exit(found.report.exit_status)


def demo(
    format_: FormatOption = Format.TEXT,
    output: OutputOption = None,
    figures: FiguresOption = None,
    figures_format: FigureFormatOption = FigureFormat.SVG,
    all_figures: AllFiguresOption = False,
) -> None:
    """Show a report on a built-in amplifier that is invented."""
    _check_page(format_, all_figures=all_figures)
    check_folder(figures, output)
    found = judged(Path(__file__).with_name("demo.toml"), demo=True)
    if figures is not None:
        write_figures(found.gallery, figures, figures_format)
    emit(_text(found, format_, None, all_figures=all_figures, on_terminal=output is None), output)


def _check_page(format_: Format, *, all_figures: bool) -> None:
    if all_figures and format_ is not Format.HTML:
        fail("--all-figures draws into a page: add --format html; --figures FOLDER draws into files")


def _text(
    found: Judged, format_: Format, explain: list[str] | None, *, all_figures: bool, on_terminal: bool
) -> str:
    """Return the report as text; a page holds every calculation anyway, folded."""
    if format_ is Format.HTML:
        return _page(found, all_figures=all_figures)
    workings = found.workings(explain) if explain else {}
    if format_ is Format.JSON:
        from safeamp.report.json_ import as_json

        return as_json(found.report, workings)
    if format_ is Format.CSV:
        from safeamp.report.csv_ import as_csv

        return as_csv(found.report)
    if format_ is Format.MARKDOWN:
        from safeamp.report.markdown import as_markdown

        return as_markdown(found.report, workings)
    from safeamp.report.text import render

    width = columns() if on_terminal else 80
    return render(found.report, width=width, colour=on_terminal and colourful(), workings=workings)


def _page(found: Judged, *, all_figures: bool) -> str:
    from safeamp.figures import FURTHER
    from safeamp.report.html import as_html

    figures = found.gallery if all_figures else found.first_figures()
    on_request = "" if all_figures else f"Further figures, with --all-figures: {', '.join(FURTHER)}."
    return as_html(found.report, found.workings(), drawings(figures), left_out(figures), on_request)
