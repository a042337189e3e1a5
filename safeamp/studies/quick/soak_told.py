"""What the readings of a soak tell, in air that stands still or moves."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

import numpy as np
import numpy.typing as npt

from safeamp.amplifier import SoakLog
from safeamp.answers import Formula
from safeamp.physics.soak import LEVEL, SoakFit, settling_temperature, soak_fit, time_needed
from safeamp.quantities import PERCENT, TEMPERATURE, TEMPERATURE_DIFFERENCE, TIME, Kind
from safeamp.studies.quick.desk import Desk, shown

Array = npt.NDArray[np.float64]
Triple = tuple[float, float, float]


@dataclass(frozen=True)
class Told:
    """End of the heatsink with its interval, degC, and what goes with it.

    Parameters
    ----------
    end, low, high : float
        nan where nothing rises or all rises faster and faster; `high` is inf where nothing bounds it.
    rise : tuple of float or None
        Rise above air with its interval, K, where it was fitted itself because the air moved.
    trend : int
        1 rising, -1 falling, 0 neither.
    lagging : bool
        The later readings rise more steeply than one exponential does.
    hottest : float
        Hottest reading, degC.
    scatter, error : float
        Of the heatsink's readings, K.
    more_time : float
        s; 0 where none is needed, inf where it cannot be foreseen.
    expected : tuple of float or None
        Time, s, and temperature, degC, of the next reading by the curve.
    formulas : tuple of Formula
        In words and with the numbers put in.
    """

    end: float
    low: float
    high: float
    rise: Triple | None
    time_constant: float
    trend: int
    accelerating: bool
    lagging: bool
    hottest: float
    scatter: float
    error: float
    more_time: float
    expected: tuple[float, float] | None
    formulas: tuple[Formula, ...]

    @property
    def rising(self) -> bool:
        """Whether the readings rise on the way to an end, told or not."""
        return self.trend > 0 and not self.accelerating

    @property
    def known(self) -> bool:
        """Whether the end has a bound on either side."""
        return bool(np.isfinite(self.low) and np.isfinite(self.high))


def told(desk: Desk, log: SoakLog) -> Told:
    """Return what the readings tell.

    Where the air moved by more than a little, one exponential of the heatsink alone is the wrong curve: part of its
    rise is that of the air. Then the rise above the air of the same moment is fitted and the highest air added, because
    the heatsink follows a slow drift of its air. That forgets what the air will still do (a cabinet goes on warming),
    so the heatsink itself is fitted as well, which counts that in; of both the hotter end and the wider interval hold.
    """
    error, within = desk.entries["reading_error"].high, desk.limits.default("soak.end_uncertainty").nominal
    time, sink = np.asarray(log.time), np.asarray(log.sink)
    plain = soak_fit(time=time, sink=sink, reading_error=error)
    more = time_needed(time=time, sink=sink, reading_error=error, within=within)
    fits, above, rise = [plain], [0.0], None
    if log.air is not None and np.ptp(log.air) > desk.limits.default("soak.air_moves").nominal:
        warmer, off = sink - np.asarray(log.air), np.sqrt(2.0) * error  # the errors of two readings
        fit = soak_fit(time=time, sink=warmer, reading_error=off)
        more = max(more, time_needed(time=time, sink=warmer, reading_error=off, within=within))
        rise = (fit.end, fit.low, fit.high)
        fits, above = [fit, plain], [max(log.air), 0.0]
    first = fits[0]
    return Told(
        # What one of the fits cannot tell is nan and stays so.
        end=float(np.max([fit.end + air for fit, air in zip(fits, above, strict=True)])),
        low=float(np.min([fit.low + air for fit, air in zip(fits, above, strict=True)])),
        high=float(np.max([fit.high + air for fit, air in zip(fits, above, strict=True)])),
        rise=rise,
        time_constant=first.time_constant,
        trend=min(fit.trend for fit in fits),
        accelerating=any(fit.accelerating for fit in fits),
        lagging=any(fit.lagging for fit in fits),
        hottest=max(log.sink),
        scatter=first.scatter,
        error=first.error,
        more_time=more,
        expected=_expected(time, plain) if rise is None else None,
        formulas=tuple(_formulas(log, first, above[0], rise is not None)),
    )


def _expected(time: Array, fit: SoakFit) -> tuple[float, float] | None:
    """Return when the next reading is due, s, and what it should be, degC."""
    if not (np.isfinite(fit.end) and np.isfinite(fit.time_constant)):
        return None
    due = float(time[-1] + np.median(np.diff(time)))
    return due, _curve(fit, due - float(time[0]))


def _curve(fit: SoakFit, time: float) -> float:
    return float(
        settling_temperature(time=time, start=fit.start, end=fit.end, time_constant=fit.time_constant)
    )


def _formulas(log: SoakLog, fit: SoakFit, air: float, above: bool) -> Iterator[Formula]:
    what, kind = ("heatsink above air", TEMPERATURE_DIFFERENCE) if above else ("heatsink", TEMPERATURE)
    words = f"{what} = end - (end - start) x exp(-time / time constant), fitted to {len(log.time)} readings"
    yield Formula(words, _put_in(log, fit, kind))
    if np.isfinite(fit.low):
        words = f"{shown(LEVEL, PERCENT)} interval: every end that misses the readings by no more than their error"
        ends = f"{shown(fit.low, kind)} to {shown(fit.high, kind)}"
        yield Formula(words, f"error of a reading {shown(fit.error, TEMPERATURE_DIFFERENCE)}: {ends}")
    if above and np.isfinite(fit.end):
        put = f"{shown(fit.end, kind)} + {shown(air, TEMPERATURE)} = {shown(fit.end + air, TEMPERATURE)}"
        yield Formula("end = end above air + highest air, and no cooler than by the heatsink alone", put)


def _put_in(log: SoakLog, fit: SoakFit, kind: Kind) -> str:
    if fit.accelerating or fit.trend <= 0:
        return "no such curve can be told from these readings"
    if not np.isfinite(fit.high):
        return "many such curves fit these readings, up to a straight line"
    end, start = shown(fit.end, kind), shown(fit.start, kind)
    start = f"({start})" if fit.start < 0.0 else start
    if np.isnan(fit.time_constant):
        return f"{end} from the second reading on"
    length = log.time[-1] - log.time[0]
    way = f"({end} - {start}) x exp(-{shown(length, TIME)} / {shown(fit.time_constant, TIME)})"
    return f"{end} - {way} = {shown(_curve(fit, length), kind)} at the last reading"
