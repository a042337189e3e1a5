"""How much work one sample is: the safe area and the whole pass of chances against two bare logarithms a phase."""

from __future__ import annotations

import time
from collections.abc import Callable
from pathlib import Path
from statistics import median

import numpy as np

from safeamp.physics.safe_area import Rating, envelope_use
from safeamp.physics.stage import Law
from safeamp.reading import load_sheet
from safeamp.reading.limits import load_limits
from safeamp.studies.tolerance import BATCH, tolerance

PHASES = 256
CASES = BATCH + 1
SAMPLES = 100_000
UNIT = "two logarithms of 256 phases"
GOALS = {UNIT: None, "use of the safe area": 3.5, "every finding, with chances": 15.0}


def logarithms() -> None:
    """Take two bare logarithms of every phase of every sample, a piece that stays in the cache at a time."""
    piece = 512
    for _ in range(CASES // piece):
        for _ in range(2):
            np.log(_VALUES, out=_ROOM)


_VALUES = np.random.default_rng(0).uniform(1.0, 2.0, (512, PHASES))
_ROOM = np.empty_like(_VALUES)


def _spread(value: float, share: float, random: np.random.Generator) -> np.ndarray:
    return value * random.uniform(1.0 - share, 1.0 + share, CASES)


def safe_area() -> Callable[[], object]:
    """Return the use of the safe area at random cases of one pair in class AB at 45 deg."""
    random = np.random.default_rng(1)
    points = ((40.0, 3.75), (100.0, 0.75), (160.0, 0.25))
    rating = Rating(12.0, 150.0, 25.0, 150.0, 0.8333, 160.0, points)
    cases = {
        "half_supply": _spread(34.0, 0.02, random),
        "peak": _spread(30.0, 0.05, random),
        "load_magnitude": _spread(8.0, 0.05, random),
        "emitter_resistor": _spread(0.33, 0.05, random),
        "idle_current": _spread(0.0424, 0.1, random),
        "case_temperature": _spread(60.0, 0.1, random),
    }
    plain = {"phase_angle": 45.0, "conducting": 1.0, "law": Law.BIPOLAR, "imbalance": None, "rating": rating}
    return lambda: envelope_use(**cases, **plain)


def chances() -> Callable[[], object]:
    """Return a pass of as many samples through every finding of a sheet with twelve toleranced inputs."""
    limits = load_limits()
    sheet = load_sheet(Path(__file__).with_name("twelve.toml"), limits=limits)
    return lambda: tolerance(sheet, limits, samples=SAMPLES)


def measured(rounds: int) -> dict[str, float]:
    """Return the median processor time of each per sample, s, over interleaved rounds; the first is dropped."""
    runs = {UNIT: (logarithms, CASES)}
    names = list(GOALS)
    runs |= {names[1]: (safe_area(), CASES), names[2]: (chances(), SAMPLES)}
    found: dict[str, list[float]] = {name: [] for name in runs}
    for number in range(rounds + 1):
        for name, (run, samples) in runs.items():
            start = time.process_time()
            run()
            if number:
                found[name].append((time.process_time() - start) / samples)
    return {name: median(times) for name, times in found.items()}


def lines(rounds: int) -> list[str]:
    """Return one line a run: ratio, microseconds a sample, goal."""
    times = measured(rounds)
    found = [f"{'per sample':30} {'ratio':>6} {'us':>6}  goal"]
    for name, taken in times.items():
        ratio, goal = taken / times[UNIT], GOALS[name]
        said = "" if goal is None else f"{goal:g} {'kept' if ratio <= goal else 'MISSED'}"
        found.append(f"{name:30} {ratio:6.2f} {taken * 1e6:6.2f}  {said}".rstrip())
    return found
