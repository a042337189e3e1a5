"""Every point of a measured impedance curve: the load it is, and the one that uses the safe area most.

A sine dwells at any of them, so each point counts with its own magnitude and angle, behind what stands in series at
its own frequency. Points times corners is too much to compute: the nominal amplifier and some corners rank the
points, and those that can be worst anywhere are computed at every corner.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass, field

import numpy as np
import numpy.typing as npt

from safeamp.amplifier import Amplifier, Curve, at_case, number_of_cases
from safeamp.checks import operating
from safeamp.checks.trace import needed
from safeamp.physics import stage
from safeamp.physics.safe_area import Use
from safeamp.quantities import FREQUENCY, Number, show

Cases = npt.NDArray[np.float64]
Marks = npt.NDArray[np.bool_]

#: Up to so many points times corners all are computed.
FULL = 6000
#: Corners at which the points are ranked, the nominal one among them.
PROBES = 24
#: Points that are ranked there: of a longer curve the worst of each stretch.
RANKED = 400
#: A point this near to the worst one of a ranking may be worst at another corner.
NEAR = 0.95
#: What is left unsaid: far below the 0.1 % that the result may lack.
SLACK = 1e-4
#: Looks at further corners after the ranking, and corners of each.
ROUNDS, LOOKS = 6, 10

#: A curve may begin a third of an octave above the lowest note, must reach voices, and leaves out no whole decade
#: (common practice): a dip that nobody measured clears nothing.
NEIGHBOUR, UP_TO, DECADE = 1.27, 1e3, 10.0 * (1.0 + 1e-9)

UseInto = Callable[[Amplifier, Number, Number, Number], Use]
"""Amplifier, magnitude (ohm), angle (deg), case temperature -> use; of many points or of many corners."""


@dataclass(frozen=True, eq=False)
class Points:
    """The points of a curve as loads of one loudspeaker: Hz, ohm, deg."""

    frequency: Number
    impedance: Number
    angle: Number

    def at(self, places: Number) -> Points:
        """Return some of them."""
        return Points(self.frequency[places], self.impedance[places], self.angle[places])


@dataclass(frozen=True, eq=False)
class OfCurve:
    """The worst use over a curve: one value a case, whether any point enters the unknown, and the nominal worst."""

    use: Number
    unknown: Number
    point: Use
    place: int


def points_of(amplifier: Amplifier) -> Points | None:
    """Return the points of the curve, None without one."""
    curve = amplifier.loudspeaker.impedance_curve
    if not isinstance(curve, Curve):
        return None
    return Points(np.array(curve.frequencies), np.array(curve.impedances), np.array(curve.phases))


def gap(amplifier: Amplifier) -> str:
    """Return between which notes a curve leaves the loudspeaker unknown; an empty text when it leaves none."""
    points = points_of(amplifier)
    if points is None:
        return ""
    notes, lowest = (
        points.frequency,
        float(np.asarray(needed(amplifier, "loudspeaker.lowest_note")[0]).flat[0]),
    )
    if notes[0] > NEIGHBOUR * lowest:
        text = f"the curve begins at {show(notes[0], FREQUENCY)}, loudspeaker.lowest_note is"
        return (
            f"{text} {show(lowest, FREQUENCY)}: measure further down, or write the lowest note that is played"
        )
    if notes[-1] < UP_TO:
        return f"the curve ends at {show(notes[-1], FREQUENCY)}: above it the loudspeaker is not known"
    wide = notes[1:] > DECADE * notes[:-1]
    if not np.any(wide):
        return ""
    place = int(np.argmax(wide))
    between = f"{show(notes[place], FREQUENCY)} and {show(notes[place + 1], FREQUENCY)}"
    return f"the curve has no point between {between}: a dip in between is not seen"


def seen(amplifier: Amplifier, points: Points) -> tuple[Number, Number]:
    """Return the magnitude (ohm) and angle (deg) of points as one side sees them, the output capacitor included."""
    magnitude, angle = operating.of_loudspeaker(amplifier, points.impedance, points.angle)
    if not operating.is_capacitor_coupled(amplifier):
        return magnitude, angle
    (farads,) = needed(amplifier, "output_capacitor.capacitance")
    esr = amplifier.output_capacitor.esr
    return stage.load_combination(
        impedance=magnitude,
        phase_angle=angle,
        series_resistor=0.0 if esr is None else esr,
        series_reactance=-1.0 / (2.0 * np.pi * points.frequency * farads),
    )


def heating_load(amplifier: Amplifier, points: Points, fraction: float) -> tuple[Number, Number]:
    """Return the load of one side that heats the stage most at a fraction of clipping power.

    Heat is reckoned into the nominal impedance, at the angle of a point; where the curve lies above nominal, its own
    magnitude counts. Class B ranks the points.
    """
    one = at_case(amplifier, 0) if number_of_cases(amplifier) else amplifier
    magnitude, angle = _not_below_nominal(one, points)
    peak = stage.level_peak(clipping_peak=operating.clipping_peak(one), fraction=fraction)
    heat = stage.class_b_heat(
        half_supply=np.maximum(operating.level_half_supply(one, fraction), peak),
        peak=peak,
        load_magnitude=magnitude,
        phase_angle=angle,
    )
    place = 0 if np.all(np.isnan(heat)) else int(np.nanargmax(heat))
    return _not_below_nominal(amplifier, points.at(place))


def _not_below_nominal(amplifier: Amplifier, points: Points) -> tuple[Number, Number]:
    magnitude, angle = seen(amplifier, points)
    return np.maximum(magnitude, operating.nominal_load(amplifier)[0]), angle


def worst_use(amplifier: Amplifier, points: Points, case: Number, use_into: UseInto) -> OfCurve:
    """Return the worst use over a curve.

    Parameters
    ----------
    amplifier : Amplifier
        A single one, or one of arrays over the cases.
    points : Points
        The curve.
    case : Number
        Case temperature, degC: a number, or one a case.
    use_into : callable
        How one side uses its safe area.

    Returns
    -------
    OfCurve
        Never lower than the use over all points by more than 0.1 % in any case.
    """
    count = number_of_cases(amplifier)
    search = _Search(amplifier, points, case, use_into)
    first = search.row(0)
    place = _place(np.atleast_1d(first.use))
    point = Use(*(np.atleast_1d(part)[place] for part in _parts(first)))
    if count is None:
        return OfCurve(point.use, np.any(first.enters_unknown), point, place)
    if count * len(points.frequency) <= FULL:
        use, unknown = search.in_full(count)
    else:
        use, unknown = search.ranked(count, first)
    return OfCurve(use, unknown, point, place)


def _parts(use: Use) -> tuple[Number, ...]:
    return use.use, use.voltage, use.current, use.zone, use.enters_unknown


def _place(use: Cases) -> int:
    """Return where a use is worst: where it is not known, else where it is largest."""
    return int(np.argmax(np.where(np.isnan(use), np.inf, use)))


@dataclass(eq=False)
class _Search:
    """Points against corners, row by row (one corner) and column by column (one point)."""

    amplifier: Amplifier
    points: Points
    case: Number
    use_into: UseInto
    columns: dict[int, Use] = field(default_factory=dict)

    def row(self, corner: int, places: npt.NDArray[np.intp] | None = None) -> Use:
        """Return the use of points at one corner."""
        points = self.points if places is None else self.points.at(places)
        single = number_of_cases(self.amplifier) is None
        one = self.amplifier if single else at_case(self.amplifier, corner)
        case = self.case if np.ndim(self.case) == 0 else self.case[corner]
        return self.use_into(one, *seen(one, points), case)

    def add(self, place: int, count: int) -> None:
        """Compute one point at every corner."""
        if place not in self.columns:
            load = seen(self.amplifier, self.points.at(place))
            found = self.use_into(self.amplifier, *load, self.case)
            self.columns[place] = Use(*(np.broadcast_to(part, (count,)) for part in _parts(found)))

    def worst(self) -> tuple[Cases, Marks]:
        """Return the worst use of the points computed, and whether one enters the unknown, at every corner."""
        use = np.max(np.stack([one.use for one in self.columns.values()]), axis=0)
        unknown = np.any(np.stack([one.enters_unknown for one in self.columns.values()]), axis=0)
        return use, unknown

    def in_full(self, count: int) -> tuple[Cases, Marks]:
        """Return the worst use of all points, by the fewer of rows and columns."""
        if count > len(self.points.frequency):
            for place in range(len(self.points.frequency)):
                self.add(place, count)
            return self.worst()
        rows = [self.row(corner) for corner in range(count)]
        use = np.array([np.max(row.use) for row in rows])
        return use, np.array([np.any(row.enters_unknown) for row in rows])

    def ranked(self, count: int, first: Use) -> tuple[Cases, Marks]:
        """Return the worst use of the points that can be worst anywhere."""
        places = _stretches(np.atleast_1d(first.use))
        probes = _spread(count, PROBES)
        rows = [self.row(int(corner), places) for corner in probes]
        chosen = _chosen(np.stack([row.use for row in rows]), np.stack([row.enters_unknown for row in rows]))
        for place in (*places[chosen], *self._extremes()):
            self.add(int(place), count)
        seen_at = set(probes.tolist())
        for turn in range(ROUNDS):
            if not self._look_again(count, turn, seen_at):
                break
        return self.worst()

    def _extremes(self) -> tuple[int, int]:
        """Return the points of the lowest magnitude and of the largest angle: one of them reaches farthest."""
        one = at_case(self.amplifier, 0)
        magnitude, angle = seen(one, self.points)
        return int(np.argmin(magnitude)), int(np.argmax(np.abs(angle)))

    def _look_again(self, count: int, turn: int, seen_at: set[int]) -> bool:
        """Look at all points at the worst corner and at some others; True when a point had been missed."""
        use, unknown = self.worst()
        others = _spread(count, LOOKS, turn + 1).tolist() if len(self.points.frequency) <= RANKED else []
        missed = False
        for corner in dict.fromkeys((_place(use), *others)):
            if corner in seen_at:
                continue
            seen_at.add(corner)
            row = self.row(corner)
            worse = _place(row.use)
            unseen = int(np.argmax(row.enters_unknown)) if np.any(row.enters_unknown) else None
            if row.use[worse] > use[corner] * (1.0 + SLACK):
                self.add(worse, count)
                missed = True
            if unseen is not None and not unknown[corner]:
                self.add(unseen, count)
                missed = True
        return missed or turn == 0


def _stretches(use: Cases) -> npt.NDArray[np.intp]:
    """Return the places to rank: all, or the worst of each stretch of a long curve."""
    if len(use) <= RANKED:
        return np.arange(len(use))
    stretches = np.array_split(np.arange(len(use)), RANKED)
    return np.array([stretch[_place(use[stretch])] for stretch in stretches])


def _spread(count: int, wanted: int, turn: int = 0) -> npt.NDArray[np.intp]:
    """Return cases spread over the corners by the golden section, which no pattern of two levels repeats."""
    share = np.arange(1, wanted) + turn * wanted
    cases = np.floor(np.modf(share * 0.6180339887498949)[0] * count).astype(int)
    return np.unique(np.concatenate([[0], cases]))


def _chosen(use: Cases, unknown: Marks) -> list[int]:
    """Return the columns of a ranking (corners, points) that no other column stands for at every corner."""
    use = np.where(np.isnan(use), np.inf, use)
    top = np.max(use, axis=1, keepdims=True)
    with np.errstate(invalid="ignore"):
        share = np.where(np.isinf(top), np.where(np.isinf(use), 1.0, 0.0), use / np.maximum(top, 1e-300))
    chosen = list(dict.fromkeys(np.argmax(share, axis=1).tolist()))
    for place in np.argsort(-np.max(share, axis=0), kind="stable").tolist():
        if np.max(share[:, place]) < NEAR:
            break
        covered = np.all(share[:, chosen] >= share[:, [place]] * (1.0 - SLACK), axis=0)
        if not np.any(covered):
            chosen.append(place)
    bare = np.any(unknown, axis=1) & ~np.any(unknown[:, chosen], axis=1)
    return [*chosen, *np.argmax(unknown[bare], axis=1).tolist()]
