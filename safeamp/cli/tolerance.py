"""The command that says how likely each verdict is, and which unknown matters most."""

from __future__ import annotations

import sys
from collections.abc import Callable, Iterator
from contextlib import contextmanager
from enum import StrEnum
from typing import TYPE_CHECKING, Annotated

import typer

from safeamp.cli.figures import (
    FigureFormat,
    FigureFormatOption,
    FiguresOption,
    check_folder,
    write_figures,
)
from safeamp.cli.files import FilesRead
from safeamp.cli.options import DeviceFolderOption, LimitsOption, OutputOption, SheetArgument
from safeamp.cli.output import check_output, columns, complaining, emit, fail

if TYPE_CHECKING:
    from safeamp.amplifier import Sheet
    from safeamp.answers import Tolerance
    from safeamp.figures import Gallery
    from safeamp.limits import Limits


#: More would fill the memory before they said more: the interval of a chance is then below 0.1 % anyway.
MOST_SAMPLES = 10_000_000


class Format(StrEnum):
    """How the chances are printed."""

    TEXT = "text"
    JSON = "json"
    CSV = "csv"


class DistributionName(StrEnum):
    """How values lie inside their tolerances."""

    UNIFORM = "uniform"
    NORMAL = "normal"


def tolerance(
    sheet: SheetArgument,
    samples: Annotated[
        int, typer.Option("--samples", min=100, help="How many samples, up to 10 million.")
    ] = 100_000,
    seed: Annotated[int, typer.Option("--seed", min=0, help="The same seed draws the same samples.")] = 1,
    distribution: Annotated[
        DistributionName,
        typer.Option("--distribution", help="normal: tolerance ends at 2 standard deviations, cut off."),
    ] = DistributionName.UNIFORM,
    format_: Annotated[Format, typer.Option("--format", help="How the answer is printed.")] = Format.TEXT,
    output: OutputOption = None,
    limits: LimitsOption = None,
    device_folder: DeviceFolderOption = None,
    figures: FiguresOption = None,
    figures_format: FigureFormatOption = FigureFormat.SVG,
) -> None:
    """Say how likely each verdict is inside the tolerances, and which unknown matters most; clears nothing."""
    from safeamp.reading import load_sheet
    from safeamp.reading.limits import load_limits
    from safeamp.studies.tolerance import tolerance as study

    if samples > MOST_SAMPLES:
        fail(f"--samples {samples}: at most {MOST_SAMPLES}")
    never = FilesRead(sheet, limits=limits, device_folder=device_folder)
    if output is not None:
        check_output(output, never)
    check_folder(figures, output)
    with complaining():
        rules = load_limits(limits)
        read = load_sheet(sheet, device_folder=device_folder, limits=rules)
    with _progress(samples) as step:
        answer = study(
            read, rules, samples=samples, seed=seed, distribution=distribution.value, progress=step
        )
    if figures is not None:
        write_figures(_histograms(answer, read, rules), figures, figures_format, never=never)
    emit(_text(answer, format_, 80 if output else columns()), output, never=never)


def _histograms(answer: Tolerance, sheet: Sheet, limits: Limits) -> Gallery:
    """Return the histograms with the limits that hold at the nominal values."""
    from safeamp.figures import histograms_of
    from safeamp.studies.verdict import verdict

    judged = verdict(sheet, limits).findings
    return histograms_of(answer, {one.id: one.bound for one in judged if one.bound is not None}, limits)


def _text(answer: Tolerance, format_: Format, width: int) -> str:
    from safeamp.report import tolerance as report

    if format_ is Format.JSON:
        return report.tolerance_json(answer)
    if format_ is Format.CSV:
        return report.tolerance_csv(answer)
    return report.render_tolerance(answer, width=width)


@contextmanager
def _progress(samples: int) -> Iterator[Callable[[int], None] | None]:
    """Show a bar on stderr while it lasts, if that is a terminal."""
    if not sys.stderr.isatty():
        yield None
        return
    from rich.console import Console
    from rich.progress import Progress

    with Progress(console=Console(stderr=True), transient=True) as bar:
        task = bar.add_task("samples", total=samples)
        yield lambda done: bar.advance(task, done)
