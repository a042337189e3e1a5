"""The look that all figures share: quiet, readable in grey, units on every axis, the same bytes every time."""

from __future__ import annotations

from collections.abc import Callable, Iterable, Sequence
from dataclasses import dataclass
from functools import wraps
from io import BytesIO
from typing import Any, Literal, NamedTuple, ParamSpec, TypeVar

import matplotlib as mpl
import numpy as np
from matplotlib.axes import Axes
from matplotlib.backends.backend_agg import FigureCanvasAgg
from matplotlib.figure import Figure
from matplotlib.ticker import FixedLocator, FuncFormatter, NullLocator

from safeamp._version import __version__

P = ParamSpec("P")
T = TypeVar("T")
Format = Literal["svg", "png"]

BLACK = "#000000"
VERMILLION = "#D55E00"
BLUE = "#0072B2"
GREY = "#595959"
PALE = "#c8c8c8"
WASH = "#ececec"

WIDTH, HEIGHT = 6.4, 4.4
#: A legend under the axes, where it hides nothing.
BELOW: dict[str, Any] = {
    "loc": "upper left",
    "bbox_to_anchor": (-0.01, -0.13),
    "borderaxespad": 0.0,
    "frameon": False,
}
RESOLUTION = 150
STYLE: dict[str, Any] = {
    "axes.axisbelow": True,
    "axes.edgecolor": GREY,
    "axes.grid": True,
    "axes.labelcolor": BLACK,
    "axes.labelsize": 9.0,
    "axes.linewidth": 0.8,
    "axes.spines.right": False,
    "axes.spines.top": False,
    "axes.titlelocation": "left",
    "axes.titlepad": 8.0,
    "axes.titlesize": 10.5,
    "axes.titley": 1.0,  # nothing stands above the axes; to look for it takes a tenth of the drawing
    "axes.titleweight": "bold",
    "axes.unicode_minus": True,
    "font.family": ["sans-serif"],
    "font.sans-serif": ["DejaVu Sans", "sans-serif"],
    "font.size": 8.5,
    "grid.color": WASH,
    "grid.linewidth": 0.8,
    "hatch.linewidth": 0.6,
    "legend.fontsize": 8.0,
    "legend.framealpha": 1.0,
    "legend.edgecolor": PALE,
    "legend.fancybox": False,
    "legend.handlelength": 2.8,
    "lines.linewidth": 1.6,
    "lines.markersize": 6.0,
    "svg.fonttype": "none",
    "svg.hashsalt": "safeamp",
    "text.parse_math": False,  # a dollar sign in a sheet is a dollar sign
    "xtick.color": GREY,
    "xtick.labelcolor": BLACK,
    "ytick.color": GREY,
    "ytick.labelcolor": BLACK,
}


def settings() -> Any:
    """Return every setting that a figure depends on, so that no file of the user's changes it."""
    foreign = ("backend", "webagg", "interactive", "toolbar", "timezone", "savefig.directory")
    plain = mpl.rcParamsDefault.copy()
    return {name: value for name, value in plain.items() if not name.startswith(foreign)} | STYLE


def quiet(function: Callable[P, T]) -> Callable[P, T]:
    """Run a function in the look of all figures."""

    @wraps(function)
    def styled(*args: P.args, **kwargs: P.kwargs) -> T:
        with mpl.rc_context(settings()):
            return function(*args, **kwargs)

    return styled


@dataclass(frozen=True, eq=False)
class Picture:
    """A figure with its name (of a file, or in front of its ids), its title, and what it shows in words."""

    name: str
    title: str
    says: str
    figure: Figure


class Margins(NamedTuple):
    """Room around the axes, inches."""

    left: float
    right: float
    bottom: float
    top: float


class NotDrawnError(ValueError):
    """Why a figure is left out."""


@quiet
def picture(
    name: str,
    title: str,
    draw: Callable[[Axes], str],
    *,
    width: float = WIDTH,
    height: float = HEIGHT,
    margins: Margins | None = None,
) -> Picture:
    """Return a picture of one pair of axes, inches.

    Parameters
    ----------
    margins : Margins, optional
        Known room for the texts around the axes; without, it is found by measuring every text.

    Raises
    ------
    NotDrawnError
        If `draw` has nothing to draw.
    """
    figure = Figure(figsize=(width, height), layout="constrained" if margins is None else None)
    if margins is not None:
        figure.subplots_adjust(
            left=margins.left / width,
            right=1.0 - margins.right / width,
            bottom=margins.bottom / height,
            top=1.0 - margins.top / height,
        )
    FigureCanvasAgg(figure)
    axes = figure.subplots()
    axes.set_title(title)
    return Picture(name, title, draw(axes), figure)


def laid_out(figure: Figure) -> None:
    """Lay a figure out once and for all: left to the saving, the layout would cost a drawing of its own."""
    engine = figure.get_layout_engine()
    if engine is not None:
        engine.execute(figure)
        figure.set_layout_engine(None)


@quiet
def rendered(figure: Figure, format_: Format = "svg") -> bytes:
    """Return a figure as the bytes of a file: the same ones for the same figure."""
    file = BytesIO()
    if format_ == "svg":
        metadata: dict[str, Any] = {"Date": None, "Creator": f"safeamp {__version__}"}
    else:
        metadata = {"Software": f"safeamp {__version__}"}
    laid_out(figure)
    figure.savefig(file, format=format_, metadata=metadata, dpi=RESOLUTION)
    return file.getvalue()


def plain_number(value: float, _: int | None = None) -> str:
    """Return a number on an axis as people write it."""
    return f"{value:.10g}".replace("-", "\N{MINUS SIGN}")


def logarithmic(
    axes: Axes, which: Literal["x", "y"], low: float, high: float, steps: Sequence[float] = (1.0, 2.0, 5.0)
) -> None:
    """Give one axis decades from `low` to `high` with plain numbers at the steps of each."""
    decades = range(int(np.floor(np.log10(low))), int(np.ceil(np.log10(high))) + 1)
    places = [step * 10.0**decade for decade in decades for step in steps]
    axes.set(**{f"{which}scale": "log", f"{which}lim": (low, high)})
    axis = axes.xaxis if which == "x" else axes.yaxis
    axis.set_major_locator(FixedLocator([one for one in places if low * 0.999 <= one <= high * 1.001]))
    axis.set_minor_locator(NullLocator())
    axis.set_major_formatter(FuncFormatter(plain_number))


def apart(places: Sequence[float], least: float) -> list[float]:
    """Return places moved up or down as little as keeps each `least` from the next, in the same order."""
    order = sorted(range(len(places)), key=lambda one: places[one])
    groups: list[list[int]] = []
    for one in order:
        groups.append([one])
        while len(groups) > 1 and _top(groups[-2], places, least) + least > _bottom(
            groups[-1], places, least
        ):
            last = groups.pop()
            groups[-1] += last
    found = list(places)
    for group in groups:
        start = _bottom(group, places, least)
        for number, one in enumerate(group):
            found[one] = start + number * least
    return found


def _bottom(group: Iterable[int], places: Sequence[float], least: float) -> float:
    members = [places[one] for one in group]
    return sum(members) / len(members) - least * (len(members) - 1) / 2.0


def _top(group: Sequence[int], places: Sequence[float], least: float) -> float:
    return _bottom(group, places, least) + least * (len(group) - 1)
