"""The command `jobsheet`: the paper to keep."""

from __future__ import annotations

from enum import StrEnum
from typing import Annotated

import typer

from safeamp.cli.files import FilesRead
from safeamp.cli.judged import Judged, drawings, judged, left_out
from safeamp.cli.options import DeviceFolderOption, LimitsOption, OutputOption, SheetArgument
from safeamp.cli.output import check_output, columns, complaining, emit


class Form(StrEnum):
    """How the job sheet is printed."""

    TEXT = "text"
    MARKDOWN = "markdown"
    HTML = "html"


def jobsheet(
    sheet: SheetArgument,
    format_: Annotated[Form, typer.Option("--format", help="How the job sheet is printed.")] = Form.TEXT,
    output: OutputOption = None,
    limits: LimitsOption = None,
    device_folder: DeviceFolderOption = None,
) -> None:
    """Print one page for the customer and the full record; refused while a value is still an example."""
    never = FilesRead(sheet, limits=limits, device_folder=device_folder)
    if output is not None:
        check_output(output, never)
    found = judged(sheet, limits=limits, device_folder=device_folder)
    _refuse_examples(found)
    emit(_text(found, format_, columns() if output is None else 80), output, never=never)
    raise typer.Exit(found.report.exit_status)


def _refuse_examples(found: Judged) -> None:
    from safeamp.complaints import ReadingError
    from safeamp.report.jobsheet import examples_left

    left = examples_left(found.sheet)
    if left:
        with complaining():
            raise ReadingError(left)


def _text(found: Judged, format_: Form, width: int) -> str:
    from safeamp.report.jobsheet import jobsheet_html, jobsheet_markdown, jobsheet_text

    if format_ is Form.TEXT:
        return jobsheet_text(found.sheet, found.report, width=width)
    if format_ is Form.MARKDOWN:
        return jobsheet_markdown(found.sheet, found.report, found.workings())
    figures = found.gallery
    return jobsheet_html(found.sheet, found.report, found.workings(), drawings(figures), left_out(figures))
