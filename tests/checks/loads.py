"""Impedance curves for the tests: written beside a sheet, or put into an amplifier."""

from dataclasses import replace

import numpy as np

import safeamp
from safeamp.amplifier import Curve
from safeamp.physics import driver as drivers
from safeamp.physics.driver import Driver
from safeamp.studies.verdict import verdict
from tests.scenarios.sheets import GONE, changed, limits, tables

#: What a sheet says without a curve and a curve says better.
RULES = {"loudspeaker.phase_angle": GONE, "loudspeaker.minimum_impedance": GONE}
#: Parameters of a woofer of 8 ohm: 6.2 ohm, 45 Hz, Q 4 and 0.4.
WOOFER = {
    "loudspeaker.dc_resistance": "6.2 ohm",
    "loudspeaker.resonance": "45 Hz",
    "loudspeaker.q_mechanical": 4.0,
    "loudspeaker.q_electrical": 0.4,
}


def woofer(inductance=0.4e-3):
    """Return the driver of `WOOFER`."""
    parts = drivers.motional_elements(dc_resistance=6.2, resonance=45.0, q_mechanical=4.0, q_electrical=0.4)
    return Driver(6.2, parts, inductance)


def curve_of(driver, low=10.0, high=20e3, count=200):
    """Return the curve of a driver."""
    frequency = np.geomspace(low, high, count)
    magnitude, angle = drivers.impedance(driver=driver, frequency=frequency)
    return Curve(tuple(frequency.tolist()), tuple(magnitude.tolist()), tuple(angle.tolist()), "woofer.csv")


def wild_curve(seed, count=40):
    """Return a curve that no loudspeaker has: it wanders in magnitude and angle."""
    rng = np.random.default_rng(seed)
    magnitude = 8.0 * np.exp(np.cumsum(rng.normal(0.0, 0.12, count)))
    angle = 75.0 * np.sin(np.cumsum(rng.normal(0.0, 0.5, count)))
    low = np.clip(magnitude, 5.0, 60.0) / np.cos(np.deg2rad(0.6 * angle))
    return Curve(tuple(np.geomspace(15.0, 2e4, count).tolist()), tuple(low.tolist()), tuple(angle.tolist()))


def flat_curve(ohms, degrees):
    return Curve((20.0, 200.0, 2000.0), (ohms,) * 3, (degrees,) * 3, "flat.csv")


def written(folder, curve, name="curve.csv"):
    """Write a curve and return its name."""
    rows = zip(curve.frequencies, curve.impedances, curve.phases, strict=True)
    lines = ["frequency [Hz], impedance [ohm], phase [deg]", *(f"{f!r}, {z!r}, {a!r}" for f, z, a in rows)]
    (folder / name).write_text("\n".join(lines), encoding="utf-8")
    return name


def with_curve(amplifier, curve):
    """Return an amplifier with another curve."""
    return replace(amplifier, loudspeaker=replace(amplifier.loudspeaker, impedance_curve=curve))


def judged(folder, curve, name, changes=None):
    """Return the report on a scenario with a curve."""
    both = {**RULES, **(changes or {}), "loudspeaker.impedance_curve": written(folder, curve)}
    sheet = safeamp.sheet_from(changed(tables(name), both), limits=limits(), folder=folder)
    return verdict(sheet, limits())
