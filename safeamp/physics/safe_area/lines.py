"""The worst point of a load's locus against a boundary of straight lines on log-log paper.

Use is current over the smallest of a few lines, so its worst point is that of one line alone, or lies where the
boundary jumps or bends upward. One line alone is used smoothly, which takes few phases. Arrays have the phase on
their first axis and the cases behind it.
"""

from collections.abc import Callable, Iterator

import numpy as np
from numpy.typing import NDArray

from safeamp.physics._checks import Array
from safeamp.physics.safe_area.boundary import LEAST_VOLTAGE, Boundary
from safeamp.physics.safe_area.device import ROUGH, Device
from safeamp.physics.safe_area.locus import Use, _counted, _ratio, _zone

RISING = np.array([1.5, 3, 5, 7.5, 10.5, 14, 19, 25, 32, 40, 48, 56, 64, 73, 82, 90.0])
"""deg of the load current; close together where a steep line has its worst point, so that a parabola fits there."""
CLOSE = np.sort(np.concatenate([RISING, (RISING[1:] + RISING[:-1]) / 2.0]))
"""The same for a stage of much idle current: while the partner lets go the current bends sharply."""
LETS_GO = 15.0
"""deg up to where the partner may let go without that."""
_HALVINGS = 26  # of 180 deg: 3e-6 deg
_AROUND = 1.0  # deg

Three = tuple[Array, Array, Array]
Point = tuple[Array, Array, Array, Array]
Marks = NDArray[np.bool_]
Rows = NDArray[np.intp]


def _sine(phase: Array) -> Array:
    found: Array = np.sin(np.deg2rad(phase))
    return found


def _vertex(phases: Three, values: Three) -> Array:
    """Return where the parabola through three points is highest, the middle point where that says nothing."""
    (low, middle, high), (left, top, right) = phases, values
    before, after = middle - low, high - middle
    with np.errstate(divide="ignore", invalid="ignore"):
        falls, rises = before * (top - right), after * (top - left)
        found = middle - 0.5 * (before * falls - after * rises) / (falls + rises)
    inside: Array = np.where((found >= low) & (found <= high), found, middle)
    return inside


def _taken(values: Array, rows: Rows) -> Array:
    """Return the value of each case in its own row; far quicker than fancy indexing on two axes."""
    width = values[0].size
    flat = np.asarray(rows).ravel() * width + np.arange(width)
    taken: Array = values.reshape(-1).take(flat).reshape(values.shape[1:])
    return taken


def _peak(phases: Array, values: Array) -> Array:
    """Return the phase of the highest of some values, by the parabola around it."""
    rows = np.minimum(np.maximum(np.argmax(values, axis=0), 1), len(phases) - 2)
    around = (rows - 1, rows, rows + 1)
    low, middle, high = (phases.take(one) for one in around)
    left, top, right = (_taken(values, one) for one in around)
    return _vertex((low, middle, high), (left, top, right))


def _peaks(device: Device, boundary: Boundary, axes: int) -> Iterator[Array]:
    """Yield the phase that is worst against each line but the current limit, which the peak of the current uses."""
    early = np.all(device.alone(np.sin(np.deg2rad(LETS_GO)), ROUGH))
    phases, voltage, current = device.over(RISING if early else CLOSE, axes)
    yield _peak(phases, current * voltage)
    if boundary.lines:
        with np.errstate(divide="ignore"):
            amperes, volts = np.log(current), np.log(np.maximum(voltage, LEAST_VOLTAGE))
        for _, slope, _ in boundary.lines:
            yield _peak(phases, amperes - slope * volts)


def _bisected(device: Device, past: Callable[[Array, Array], Marks]) -> tuple[Array, Array]:
    """Return the phases just before and just after `past`, of voltage and current, turns from false to true."""
    low, high = device.angle - 90.0, np.asarray(90.0)
    for _ in range(_HALVINGS):
        middle = (low + high) / 2.0
        behind = past(*device.at(_sine(middle)))
        low, high = np.where(behind, low, middle), np.where(behind, middle, high)
    return low, high


def _bends(device: Device, boundary: Boundary) -> Iterator[Array]:
    """Yield the phases on both sides of every voltage at which the boundary jumps or bends upward.

    The device voltage falls while the load current rises from the foot of its cycle to its peak.
    """
    for volts in boundary.bends():
        if np.any(device.highest > volts):
            yield from _bisected(device, lambda voltage, _, at=volts: voltage <= at)  # type: ignore[misc]


def _flow(device: Device, boundary: Boundary) -> tuple[Array, Array]:
    """Return the phase from which on current flows and the device voltage there, -inf where none ever flows."""

    def flows(_: Array, current: Array) -> Marks:
        marks: Marks = _counted(current, boundary) > 0
        return marks

    foot = device.angle - 90.0
    first = np.where(flows(foot, device.at(_sine(foot))[1]), foot, _bisected(device, flows)[1])
    voltage, current = device.at(_sine(first))
    return first, np.where(flows(voltage, current), voltage, -np.inf)


def worst_along_lines(*, device: Device, boundary: Boundary) -> Use:
    """Return the worst point of a locus and how far it reaches.

    Along the half cycle from the foot of the load current to its peak, which holds the larger current of every
    output voltage. A grid of phases flatters, so parabolas go between its points. What reaches beyond the voltage
    rating, however short, is use without bound.
    """
    shape = np.broadcast_shapes(
        device.shape,
        np.shape(boundary.derating),
        np.shape(boundary.power),
        np.shape(boundary.last),
        np.shape(boundary.rating.current),
        np.shape(boundary.rating.voltage),
    )
    phases = [np.asarray(90.0), *_peaks(device, boundary, len(shape)), *_bends(device, boundary)]
    reach: Array = np.asarray(-np.inf)
    if not np.all(device.highest <= np.fmin(boundary.last, boundary.rating.voltage)):
        first, reach = _flow(device, boundary)
        phases.append(first)
    worst = _worst(np.stack([np.broadcast_to(one, shape) for one in phases]), device, boundary)
    closer = _closer(worst, device, boundary)
    use, voltage, current, _ = (
        np.where(closer[0] > worst[0], after, before) for before, after in zip(worst, closer, strict=True)
    )
    enters = (reach > boundary.last) & (boundary.last < boundary.rating.voltage)
    return Use(*np.broadcast_arrays(use, voltage, current, _zone(voltage, boundary), enters))


def _seen(phases: Array, device: Device, boundary: Boundary) -> Point:
    """Return share, voltage and current at some phases, with the phases."""
    voltage, current = device.at(_sine(phases))
    return _ratio(voltage, current, boundary), voltage, current, phases


def _worst(phases: Array, device: Device, boundary: Boundary) -> Point:
    """Return the worst of some phases of each case."""
    found = _seen(phases, device, boundary)
    rows = np.argmax(np.where(np.isnan(found[0]), -1.0, found[0]), axis=0)
    share, voltage, current, phase = (_taken(np.broadcast_to(one, phases.shape), rows) for one in found)
    return share, voltage, current, phase


def _closer(worst: Point, device: Device, boundary: Boundary) -> Point:
    """Return the point where the parabola close around the worst one is highest."""
    use, *_, phase = worst
    sides = np.stack([np.maximum(phase - _AROUND, -90.0), np.minimum(phase + _AROUND, 90.0)])
    before, after = _seen(sides, device, boundary)[0]
    return _seen(_vertex((sides[0], phase, sides[1]), (before, use, after)), device, boundary)
