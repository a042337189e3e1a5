"""The commands: parse, call, print, return a status. Rooms are imported by the command that needs them."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass
from enum import StrEnum
from pathlib import Path
from typing import TYPE_CHECKING, Annotated

import typer

from safeamp.cli.capacitor import capacitor
from safeamp.cli.figures import (
    FigureFormat,
    FigureFormatOption,
    FiguresOption,
    check_folder,
    write_figures,
)
from safeamp.cli.heatsink import heatsink
from safeamp.cli.loudspeaker import loudspeaker
from safeamp.cli.offset import offset
from safeamp.cli.options import DeviceFolderOption, LimitsOption, OutputOption, SheetArgument
from safeamp.cli.output import check_output, colourful, columns, complaining, emit, fail
from safeamp.cli.overview import overview
from safeamp.cli.soa import soa
from safeamp.cli.solve import solve
from safeamp.cli.substitute import substitute
from safeamp.cli.tolerance import tolerance

if TYPE_CHECKING:
    from safeamp.amplifier import Sheet
    from safeamp.answers import Report
    from safeamp.findings import Step
    from safeamp.limits import Limits


class Format(StrEnum):
    """How a report is printed."""

    TEXT = "text"
    JSON = "json"


app = typer.Typer(
    name="safeamp",
    help="Check a transistor power amplifier before power is applied and before a loudspeaker is connected.",
    epilog="Exit status of check: 0 go, 3 caution, 4 unverified, 5 stop; 2 wrong input, nothing computed.",
    rich_markup_mode=None,
    pretty_exceptions_enable=False,
    add_completion=False,
    no_args_is_help=True,
    context_settings={"help_option_names": ["-h", "--help"]},
)

FormatOption = Annotated[Format, typer.Option("--format", help="How the report is printed.")]


def _version(wanted: bool) -> None:
    if wanted:
        from safeamp._version import __version__

        emit(f"safeamp {__version__}\n")
        raise typer.Exit


@app.callback()
def _common(
    version: Annotated[
        bool, typer.Option("--version", callback=_version, is_eager=True, help="Print the version.")
    ] = False,
) -> None:
    pass


@app.command()
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
    figures: FiguresOption = None,
    figures_format: FigureFormatOption = FigureFormat.SVG,
) -> None:
    """Say whether the next step may be taken, what to read, and at which reading to switch off."""
    up_to = None if step is None else _step(step)
    read_only = (sheet, limits, *(device_folder.glob("*.toml") if device_folder else ()))
    if output is not None:
        check_output(output, read_only)
    check_folder(figures)
    judged = _judge(sheet, limits=limits, device_folder=device_folder, on_paper=on_paper, up_to=up_to)
    if figures is not None:
        _draw(judged, figures, figures_format, read_only)
    _emit_report(judged.report, format_, output, read_only)
    raise typer.Exit(judged.report.exit_status)


@app.command()
def demo(
    format_: FormatOption = Format.TEXT,
    output: OutputOption = None,
    figures: FiguresOption = None,
    figures_format: FigureFormatOption = FigureFormat.SVG,
) -> None:
    """Show a report on a built-in amplifier that is invented."""
    check_folder(figures)
    judged = _judge(Path(__file__).with_name("demo.toml"), demo=True)
    if figures is not None:
        _draw(judged, figures, figures_format)
    _emit_report(judged.report, format_, output)


@app.command()
def new(
    kind: Annotated[str, typer.Argument(help="split-rail, single-rail, bridged, mosfet or bench-mockup.")],
    output: Annotated[Path | None, typer.Option("--output", help="Write into this new file.")] = None,
) -> None:
    """Print a commented starter sheet; its values are invented and clear nothing."""
    from safeamp.report.starters import render_starter

    if output is not None and output.exists():
        fail(f"--output {output} exists; a starter never replaces a file")
    try:
        text = render_starter(kind)
    except KeyError as trouble:
        fail(trouble.args[0])
    emit(text, output)


@app.command()
def keys(
    table: Annotated[str | None, typer.Argument(help="One table, such as supply; all when left out.")] = None,
) -> None:
    """List what can be written in a sheet: keys, units, forms, defaults."""
    from safeamp.report.keys import render_keys

    try:
        text = render_keys(table, width=columns())
    except KeyError as trouble:
        fail(trouble.args[0])
    emit(text)


@app.command()
def limits(limits: LimitsOption = None) -> None:
    """List which limits hold and where each comes from."""
    from safeamp.reading.limits import load_limits
    from safeamp.report.limits_ import render_limits

    with complaining():
        found = load_limits(limits)
    emit(render_limits(found, width=columns()))


@app.command()
def devices(device_folder: DeviceFolderOption = None) -> None:
    """List which devices are known by name, with their ratings."""
    from safeamp.reading import data
    from safeamp.reading.devices import device_files
    from safeamp.report.devices import render_devices

    with complaining():
        found = device_files(data.device_folder())
        found |= {} if device_folder is None else device_files(device_folder)
    emit(render_devices({name: table.data for name, table in found.items()}, width=columns()))


def _step(word: str) -> Step:
    from safeamp.findings import Step
    from safeamp.limits import nearest, plain

    steps = {plain(step.value): step for step in Step}
    found = steps.get(plain(word))
    if found is None:
        words = ", ".join(step.value for step in Step)
        fail(f"--step {word} is not a step{nearest(plain(word), steps)}; the steps are {words}")
    return found


@dataclass(frozen=True, eq=False)
class _Judged:
    """A report with what it was made from."""

    sheet: Sheet
    limits: Limits
    report: Report


def _judge(
    path: Path,
    *,
    limits: Path | None = None,
    device_folder: Path | None = None,
    on_paper: bool = False,
    up_to: Step | None = None,
    demo: bool = False,
) -> _Judged:
    from safeamp.reading import load_sheet
    from safeamp.reading.limits import load_limits
    from safeamp.studies.verdict import verdict

    with complaining():
        rules = load_limits(limits)
        sheet = load_sheet(path, device_folder=device_folder, limits=rules)
        report = verdict(sheet, rules, on_paper=on_paper, up_to=up_to, demo=demo)
    return _Judged(sheet, rules, report)


def _draw(judged: _Judged, folder: Path, format_: FigureFormat, never: Iterable[Path | None] = ()) -> None:
    from safeamp.figures import pictures_of

    gallery = pictures_of(judged.sheet, judged.report, judged.limits)
    write_figures(gallery, folder, format_, never=never)


def _emit_report(
    report: Report, format_: Format, output: Path | None, never: Iterable[Path | None] = ()
) -> None:
    if format_ is Format.JSON:
        from safeamp.report.json_ import as_json

        text = as_json(report)
    else:
        from safeamp.report.text import render

        on_terminal = output is None
        text = render(report, width=columns() if on_terminal else 80, colour=on_terminal and colourful())
    emit(text, output, never=never)


app.command("tolerance")(tolerance)
app.command("substitute")(substitute)
app.command("capacitor")(capacitor)
app.command("soa")(soa)
app.command("heatsink")(heatsink)
app.command("offset")(offset)
app.command("loudspeaker")(loudspeaker)
app.command("solve")(solve)
app.command("overview")(overview)
