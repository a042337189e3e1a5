"""What the program knows, as lists: starter sheets, keys, limits, devices."""

from __future__ import annotations

from pathlib import Path
from typing import Annotated

import typer

from safeamp.cli.options import DeviceFolderOption, LimitsOption
from safeamp.cli.output import columns, complaining, emit, fail


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


def limits(limits: LimitsOption = None) -> None:
    """List which limits hold and where each comes from."""
    from safeamp.reading.limits import load_limits
    from safeamp.report.limits_ import render_limits

    with complaining():
        found = load_limits(limits)
    emit(render_limits(found, width=columns()))


def devices(device_folder: DeviceFolderOption = None) -> None:
    """List which devices are known by name, with their ratings."""
    from safeamp.reading import data
    from safeamp.reading.devices import device_files
    from safeamp.report.devices import render_devices

    with complaining():
        found = device_files(data.device_folder())
        found |= {} if device_folder is None else device_files(device_folder)
    emit(render_devices({name: table.data for name, table in found.items()}, width=columns()))
