"""Figures into a folder: all of them whole, or none."""

from __future__ import annotations

import os
from collections.abc import Iterable, Mapping
from contextlib import suppress
from enum import StrEnum
from pathlib import Path
from typing import TYPE_CHECKING, Annotated

import typer

from safeamp.cli.output import fail, note

if TYPE_CHECKING:
    from safeamp.figures import Gallery


class FigureFormat(StrEnum):
    """How figures are written."""

    SVG = "svg"
    PNG = "png"


FiguresOption = Annotated[
    Path | None, typer.Option("--figures", help="Draw into this folder, one file a figure.")
]
FigureFormatOption = Annotated[
    FigureFormat, typer.Option("--figures-format", help="How figures are written.")
]
AllFiguresOption = Annotated[
    bool, typer.Option("--all-figures", help="Draw every figure into the html page, not only the first two.")
]


def check_folder(folder: Path | None, output: Path | None = None) -> None:
    """End with the status for wrong input where figures are wanted and cannot be written, or not beside a result."""
    if folder is None:
        return
    if output is not None and folder.resolve() in (output.resolve(), output.resolve().parent):
        among = output.suffix in {f".{one.value}" for one in FigureFormat}
        if among or folder.resolve() == output.resolve():
            fail(f"--output {output} would take the place of a figure; name another file")
    if folder.exists() and not folder.is_dir():
        fail(f"--figures {folder} is not a folder; name a folder to write into")
    if not folder.parent.is_dir():
        fail(f"--figures {folder}: there is no folder {folder.parent}")


def write_figures(
    gallery: Gallery, folder: Path, format_: FigureFormat, *, never: Iterable[Path] = ()
) -> None:
    """Write every picture into a folder, over none of the files in `never`, and say what is left out."""
    from safeamp.figures import rendered

    check_folder(folder)
    files = {
        f"{picture.name}.{format_.value}": rendered(picture.figure, format_.value)
        for picture in gallery.pictures
    }
    for name in files:
        _check_file(folder / name, never)
    _write(files, folder)
    for one in gallery.left_out:
        old = folder / f"{one.name}.{format_.value}"
        stale = f"; {old} is an older one" if old.exists() else ""
        note(f"figure {one.name} is left out: {one.because}{stale}")


def _check_file(file: Path, never: Iterable[Path]) -> None:
    for path in never:
        if path.exists() and file.exists() and file.samefile(path):
            fail(f"--figures: {file} is a file that is read; draw into another folder")
    if file.exists() and not file.is_file():
        fail(f"--figures: {file} is not a file; draw into another folder")


def _write(files: Mapping[str, bytes], folder: Path) -> None:
    """Write all files beside their places first, so that none is replaced while one may still fail."""
    partial = {folder / f".{name}.{os.getpid()}.part": folder / name for name in files}
    made = not folder.exists()
    try:
        folder.mkdir(exist_ok=True)
        for path, data in zip(partial, files.values(), strict=True):
            path.write_bytes(data)
        for path, place in partial.items():
            path.replace(place)
    except OSError as trouble:
        with suppress(OSError):
            for path in partial:
                path.unlink(missing_ok=True)
            if made:
                folder.rmdir()
        fail(f"--figures {folder}: {trouble.strerror}")
