"""Names of the pieces of a line, each where it stands on no other line and on no other name."""

from __future__ import annotations

from collections.abc import Iterable
from typing import NamedTuple

import numpy as np
import numpy.typing as npt
from matplotlib.axes import Axes

from safeamp.figures.look import GREY, laid_out

Values = npt.NDArray[np.float64]

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
STEP = 2.0
#: So many places of a piece are tried.
TRIED = 41


class Piece(NamedTuple):
    """A piece of a line with its name, in data."""

    name: str
    across: Values
    up: Values


class Box(NamedTuple):
    """A rectangle, points from the lower left corner of the axes."""

    left: float
    bottom: float
    right: float
    top: float

    def hits(self, points: Values) -> int:
        """Return how many points lie inside or nearer than `ROOM`."""
        lower = np.array([self.left, self.bottom]) - ROOM
        upper = np.array([self.right, self.top]) + ROOM
        return int(np.sum(np.all((points > lower) & (points < upper), axis=1)))

    def overlaps(self, other: Box) -> bool:
        """Return whether two rectangles share anything."""
        apart = self.right <= other.left or other.right <= self.left
        return not (apart or self.top <= other.bottom or other.top <= self.bottom)


def name_pieces(axes: Axes, pieces: Iterable[Piece]) -> None:
    """Write the name of each piece that is in sight beside it; every line must have been drawn before."""
    laid_out(axes.figure.figure)
    size = 72.0 * np.array([axes.bbox.width, axes.bbox.height]) / axes.figure.dpi
    drawn = np.concatenate(
        [np.empty((0, 2)), *(_along(_points(axes, *one.get_data())) for one in axes.lines)]
    )
    taken: list[Box] = []
    for piece in pieces:
        places = _points(axes, piece.across, piece.up)
        seen = np.flatnonzero(np.all((places >= 0.0) & (places <= size), axis=1))
        if len(seen):
            _name(axes, piece, places, seen, (size, drawn, taken))


def _points(axes: Axes, across: object, up: object) -> Values:
    """Return data as points from the lower left corner; what is far out of sight is brought near to it."""
    data = np.column_stack([np.asarray(across, dtype=float), np.asarray(up, dtype=float)])
    shares = np.clip((axes.transScale + axes.transLimits).transform(data), -1.0, 2.0)
    found: Values = shares * 72.0 * np.array([axes.bbox.width, axes.bbox.height]) / axes.figure.dpi
    return found[~np.isnan(found).any(axis=1)]


def _along(corners: Values) -> Values:
    """Return points all along a line."""
    if len(corners) < 2:
        return corners
    way = np.append(0.0, np.cumsum(np.hypot(*np.diff(corners, axis=0).T)))
    at = np.arange(0.0, way[-1] + STEP, STEP)
    return np.column_stack([np.interp(at, way, corners[:, axis]) for axis in (0, 1)])


def _name(
    axes: Axes,
    piece: Piece,
    places: Values,
    seen: npt.NDArray[np.intp],
    around: tuple[Values, Values, list[Box]],
) -> None:
    """Write a name at the place that hides least, of those the one nearest to the middle of the piece."""
    size, drawn, taken = around
    middle = places[seen[len(seen) // 2]]
    tried = seen[np.unique(np.linspace(0, len(seen) - 1, TRIED).astype(int))]

    def cost(choice: tuple[int, tuple[float, float]]) -> tuple[bool, bool, int, int, float]:
        box = _box(piece.name, places[choice[0]], choice[1])
        outside = min(box.left, box.bottom) < 0.0 or box.right > size[0] or box.top > size[1]
        away = float(np.hypot(*(places[choice[0]] - middle)))
        covers = any(box.overlaps(other) for other in taken)
        return covers, outside, box.hits(drawn), OFFSETS.index(choice[1]), away

    index, offset = min(((int(one), offset) for one in tried for offset in OFFSETS), key=cost)
    taken.append(_box(piece.name, places[index], offset))
    axes.annotate(
        piece.name, (float(piece.across[index]), float(piece.up[index])), offset,
        textcoords="offset points", color=GREY, fontsize=SIZE,
        ha="left" if offset[0] > 0.0 else "right", va="bottom" if offset[1] > 0.0 else "top",
        bbox={"facecolor": "white", "edgecolor": "none", "pad": 0.5, "alpha": 0.8},
    )  # fmt: skip


def _box(name: str, place: Values, offset: tuple[float, float]) -> Box:
    width, height = LETTER * SIZE * len(name), LINE * SIZE
    x, y = float(place[0]) + offset[0], float(place[1]) + offset[1]
    left, bottom = x if offset[0] > 0.0 else x - width, y if offset[1] > 0.0 else y - height
    return Box(left, bottom, left + width, bottom + height)
