"""A figure as an inline part of a page: its ids its own, its style its own, named for those who cannot see it."""

from __future__ import annotations

import re
from html import escape

from matplotlib.figure import Figure

from safeamp.figures.look import rendered

_ID = re.compile(r'(?<=\bid=")([^"]+)(?=")')
_REFERENCE = re.compile(r'(?<=href="#)([^"]+)(?=")|(?<=url\(#)([^)]+)(?=\))')
_METADATA = re.compile(r"\s*<metadata>.*?</metadata>", re.DOTALL)
_NAME = re.compile(r"[A-Za-z][\w-]*")


def svg_text(figure: Figure, prefix: str, title: str = "", description: str = "") -> str:
    """Return a figure as an `svg` element to stand in a page.

    Parameters
    ----------
    figure : matplotlib.figure.Figure
        The figure.
    prefix : str
        Put before every id, so that two figures of one page share none: a letter, then letters, digits, hyphens.
    title, description : str
        What is read out in place of the picture.

    Raises
    ------
    ValueError
        If the prefix cannot stand in an id.
    """
    if not _NAME.fullmatch(prefix):
        raise ValueError(f"prefix must be a letter, then letters, digits or hyphens, not {prefix!r}")
    text = rendered(figure, "svg").decode("utf-8")
    text = _METADATA.sub("", text[text.index("<svg") :])
    text = _ID.sub(rf"{prefix}-\1", text)
    text = _REFERENCE.sub(lambda found: f"{prefix}-{found[1] or found[2]}", text)
    # a rule for every element of the page would reach beyond the picture
    text = text.replace("*{stroke-linejoin", f"#{prefix} *{{stroke-linejoin", 1)
    return _named(text, prefix, title, description)


def _named(text: str, prefix: str, title: str, description: str) -> str:
    head, rest = text.split(">", 1)
    words = {"title": title, "desc": description}
    given = {tag: said for tag, said in words.items() if said}
    labels = " ".join(f"{prefix}-{tag}" for tag in given)
    labelled = f' aria-labelledby="{labels}"' if given else ""
    inside = "".join(f'\n <{tag} id="{prefix}-{tag}">{escape(said)}</{tag}>' for tag, said in given.items())
    return f'{head} id="{prefix}" role="img"{labelled}>{inside}{rest}'
