"""A report as one HTML file that needs nothing else: no script, no network, printable, readable by ear."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from pathlib import Path
from typing import Any

import jinja2
from markupsafe import Markup, escape

from safeamp.answers import Report, Working
from safeamp.report.layout import clean, held
from safeamp.report.page import page_of
from safeamp.report.working import HOW, working_texts

TEMPLATES = Path(__file__).with_name("templates")


@dataclass(frozen=True)
class Drawing:
    """A figure as an `svg` element, with its title and what it shows in words."""

    title: str
    says: str
    svg: str


def as_html(
    report: Report,
    workings: Mapping[str, Working],
    drawings: Sequence[Drawing] = (),
    left_out: Sequence[str] = (),
    on_request: str = "",
) -> str:
    """Return the report as a whole HTML document; texts of the sheet stand in it as they are, never as markup.

    Parameters
    ----------
    workings : mapping of str to Working
        Id of a finding -> its calculation.
    drawings : sequence of Drawing
        Figures; their `svg` is taken as it is.
    left_out : sequence of str
        Which figures are not drawn, and why.
    on_request : str
        Which figures nobody asked for, and how to have them.
    """
    return filled("report.html.j2", report, workings, drawings, left_out, on_request=on_request)


def filled(
    template: str,
    report: Report,
    workings: Mapping[str, Working],
    drawings: Sequence[Drawing],
    left_out: Sequence[str],
    *,
    on_request: str = "",
    **more: Any,
) -> str:
    """Return a template filled in with a report, its calculations and figures, and more."""
    return rendered(
        template,
        page=page_of(report),
        workings={id: escape("\n".join(working_texts(one))) for id, one in workings.items()},
        how=HOW,
        figures=[{"title": one.title, "says": one.says, "svg": Markup(one.svg)} for one in drawings],
        left_out=left_out,
        on_request=on_request,
        **more,
    )


def rendered(template: str, **values: Any) -> str:
    """Return a template filled in; everything but our own style and shapes is escaped."""
    environment = jinja2.Environment(
        loader=jinja2.FileSystemLoader(TEMPLATES, encoding="utf-8"),
        autoescape=True,
        finalize=_said,
        undefined=jinja2.StrictUndefined,
        trim_blocks=True,
        lstrip_blocks=True,
    )
    own = {name: Markup(_file(file)) for name, file in (("style", "style.css"), ("shapes", "shapes.svg"))}
    return environment.get_template(template).render(**own, **values) + "\n"


def _said(value: Any) -> Any:
    """Return a text on one line without control characters, its numbers held to their units."""
    return held(clean(value)) if isinstance(value, str) and not isinstance(value, Markup) else value


def _file(name: str) -> str:
    return (TEMPLATES / name).read_text(encoding="utf-8").strip()
