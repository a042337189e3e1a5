"""Reports as pages: with every figure, made once, kept in a folder."""

from functools import cache
from pathlib import Path

import safeamp
from safeamp.figures import pictures_of, svg_text
from safeamp.report.html import Drawing, as_html
from safeamp.studies.verdict import verdict
from tests.scenarios import sheets

#: A title that tries to be markup.
HOSTILE = "<script>document.title='taken'</script><img src=x onerror=alert(1)>"


def tables(name):
    """Return the tables of a sheet; "hostile" is the healthy one under a title of another will."""
    return sheets.tables("healthy") | {"title": HOSTILE} if name == "hostile" else sheets.tables(name)


@cache
def sheet(name):
    """Return a sheet as read."""
    return safeamp.sheet_from(tables(name), limits=sheets.limits())


@cache
def report(name):
    """Return the report on a sheet."""
    return verdict(sheet(name), sheets.limits())


@cache
def gallery(name):
    """Return the figures of a sheet."""
    return pictures_of(sheet(name), report(name), sheets.limits())


def drawings(name):
    """Return the figures of a sheet, ready to stand in a page."""
    return [
        Drawing(one.title, one.says, svg_text(one.figure, f"figure-{one.name}", one.title, one.says))
        for one in gallery(name).pictures
    ]


@cache
def page(name):
    """Return the report on a sheet as HTML."""
    left_out = [f"{one.name}: {one.because}" for one in gallery(name).left_out]
    return as_html(report(name), {}, drawings(name), left_out)


def written(name, folder: Path) -> Path:
    """Return the file of a page."""
    path = folder / f"{name}.html"
    path.write_text(page(name), encoding="utf-8", newline="\n")
    return path
