"""Names of the pieces of a line, each where it stands on no other line and on no other name."""

from __future__ import annotations

from collections.abc import Iterable
from typing import NamedTuple

import numpy as np
import numpy.typing as npt
from matplotlib.axes import Axes

from safeamp.figures.look import GREY, laid_out

Values = npt.NDArray[np.float64]
Indices = npt.NDArray[np.intp]

SIZE = 8.0
#: Width of a letter and height of a line of the font, as shares of its size.
LETTER, LINE = 0.62, 1.25
#: From the line to its name, points; to each side, above and below, the later the worse.
OFFSETS = tuple(
    (right * away, up * away)
    for away in (7.0, 14.0, 22.0)
    for right, up in ((1, 1), (-1, -1), (1, -1), (-1, 1))
)
#: Room that a name keeps from other lines, points; less than the smallest offset.
ROOM = 6.0
#: Distance of the points that lines are looked at by, points.
STEP = 3.0
#: So many places of a piece are tried.
TRIED = 25


class Piece(NamedTuple):
    """A piece of a line with its name, in data."""

    name: str
    across: Values
    up: Values


def name_pieces(axes: Axes, pieces: Iterable[Piece]) -> None:
    """Write the name of each piece that is in sight beside it; every line must have been drawn before."""
    laid_out(axes.figure.figure)
    size = 72.0 * np.array([axes.bbox.width, axes.bbox.height]) / axes.figure.dpi
    drawn = np.concatenate(
        [np.empty((0, 2)), *(_along(_points(axes, *one.get_data())) for one in axes.lines)]
    )
    taken = np.empty((0, 4))
    for piece in pieces:
        places = _points(axes, piece.across, piece.up)
        seen = np.flatnonzero(np.all((places >= 0.0) & (places <= size), axis=1))
        if len(seen):
            taken = np.vstack([taken, _name(axes, piece, places[seen], seen, (size, drawn, taken))])


def _points(axes: Axes, across: object, up: object) -> Values:
    """Return data as points from the lower left corner; what is far out of sight is brought near to it."""
    data = np.column_stack([np.asarray(across, dtype=float), np.asarray(up, dtype=float)])
    shares = np.clip((axes.transScale + axes.transLimits).transform(data), -1.0, 2.0)
    found: Values = shares * 72.0 * np.array([axes.bbox.width, axes.bbox.height]) / axes.figure.dpi
    return found


def _along(corners: Values) -> Values:
    """Return points all along a line, straight over its gaps."""
    corners = corners[~np.isnan(corners).any(axis=1)]
    if len(corners) < 2:
        return corners
    way = np.append(0.0, np.cumsum(np.hypot(*np.diff(corners, axis=0).T)))
    at = np.arange(0.0, way[-1] + STEP, STEP)
    return np.column_stack([np.interp(at, way, corners[:, axis]) for axis in (0, 1)])


def _name(
    axes: Axes, piece: Piece, places: Values, indices: Indices, around: tuple[Values, Values, Values]
) -> Values:
    """Write a name where it hides least, of such places nearest to the middle of the piece; return its box."""
    size, drawn, taken = around
    tried = np.unique(np.linspace(0, len(places) - 1, TRIED).astype(int))
    at, way = (grid.ravel() for grid in np.meshgrid(tried, np.arange(len(OFFSETS)), indexing="ij"))
    boxes = _boxes(piece.name, places[at] + np.array(OFFSETS)[way], np.array(OFFSETS)[way])
    outside = np.any((boxes[:, :2] < 0.0) | (boxes[:, 2:] > size), axis=1)
    away = np.hypot(*(places[at] - places[len(places) // 2]).T)
    worst_last = (away, way, _hits(boxes, drawn), outside, _overlaps(boxes, taken))
    best = np.lexsort(worst_last)[0]
    index, (right, up) = indices[at[best]], OFFSETS[way[best]]
    axes.annotate(
        piece.name, (float(piece.across[index]), float(piece.up[index])), (right, up),
        textcoords="offset points", color=GREY, fontsize=SIZE,
        ha="left" if right > 0.0 else "right", va="bottom" if up > 0.0 else "top",
        bbox={"facecolor": "white", "edgecolor": "none", "pad": 0.5, "alpha": 0.8},
    )  # fmt: skip
    return boxes[best : best + 1]


def _boxes(name: str, corners: Values, offsets: Values) -> Values:
    """Return left, bottom, right and top of a name with one corner at each place, points; shape (places, 4)."""
    sides = np.array([LETTER * SIZE * len(name), LINE * SIZE])
    lower = np.where(offsets > 0.0, corners, corners - sides)
    return np.hstack([lower, lower + sides])


def _hits(boxes: Values, points: Values) -> Indices:
    """Return how many points lie inside each box or nearer than `ROOM`."""
    x, y = points.T[:, None]
    left, bottom, right, top = boxes.T[:, :, None]
    inside = (x > left - ROOM) & (x < right + ROOM) & (y > bottom - ROOM) & (y < top + ROOM)
    count: Indices = np.count_nonzero(inside, axis=1)
    return count


def _overlaps(boxes: Values, taken: Values) -> npt.NDArray[np.bool_]:
    """Return which boxes share anything with one that is taken."""
    left, bottom, right, top = boxes.T[:, :, None]
    sides = taken.T
    apart = (right <= sides[0]) | (sides[2] <= left) | (top <= sides[1]) | (sides[3] <= bottom)
    shared: npt.NDArray[np.bool_] = ~np.all(apart, axis=1)
    return shared
