"""Options that several commands share."""

from __future__ import annotations

from pathlib import Path
from typing import Annotated

import typer

SheetArgument = Annotated[Path, typer.Argument(help="The sheet of one channel, a TOML file.")]
OutputOption = Annotated[
    Path | None, typer.Option("--output", help="Write into this file instead, whole or not at all.")
]
LimitsOption = Annotated[
    Path | None, typer.Option("--limits", help="Your own limits file; it replaces single entries.")
]
DeviceFolderOption = Annotated[
    Path | None, typer.Option("--device-folder", help="Folder of your device files.")
]
