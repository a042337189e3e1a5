"""The commands: parse, call, print, return a status. Rooms are imported by the command that needs them."""

from __future__ import annotations

from pathlib import Path
from typing import Annotated

import typer

from safeamp.cli.capacitor import capacitor
from safeamp.cli.check import check, demo
from safeamp.cli.heatsink import heatsink
from safeamp.cli.jobsheet import jobsheet
from safeamp.cli.loudspeaker import loudspeaker
from safeamp.cli.offset import offset
from safeamp.cli.options import DeviceFolderOption, LimitsOption
from safeamp.cli.output import columns, complaining, emit, fail
from safeamp.cli.overview import overview
from safeamp.cli.schema import schema
from safeamp.cli.soa import soa
from safeamp.cli.solve import solve
from safeamp.cli.substitute import substitute
from safeamp.cli.tolerance import tolerance

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


app.command("check")(check)
app.command("demo")(demo)


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


app.command("schema")(schema)
app.command("jobsheet")(jobsheet)
app.command("tolerance")(tolerance)
app.command("substitute")(substitute)
app.command("capacitor")(capacitor)
app.command("soa")(soa)
app.command("heatsink")(heatsink)
app.command("offset")(offset)
app.command("loudspeaker")(loudspeaker)
app.command("solve")(solve)
app.command("overview")(overview)
