"""Sheets with everything that can be drawn, their pictures, and what the tests ask of them."""

import re
from functools import cache

from safeamp.figures import pictures_of
from safeamp.studies.verdict import verdict
from tests.scenarios.sheets import limits, sheet

UNIT = re.compile(r"\((?:V|A|W|s|Hz|dB|mm|%|Ω|°|°C|ratio)\)")

#: A driver with its parameters, its heating, and what protects it.
DRIVER = {
    "loudspeaker.dc_resistance": "6.1 ohm",
    "loudspeaker.resonance": "42 Hz",
    "loudspeaker.q_mechanical": "3.1",
    "loudspeaker.q_electrical": "0.45",
    "loudspeaker.inductance": "0.4 mH",
    "loudspeaker.force_factor": "8.2 N/A",
    "loudspeaker.linear_excursion": "5 mm",
    "loudspeaker.coil_to_magnet": "3.5 K/W",
    "loudspeaker.coil_time_constant": "6 s",
    "loudspeaker.magnet_to_air": "2.5 K/W",
    "loudspeaker.magnet_time_constant": "25 min",
    "loudspeaker.coil_limit": "180 degC",
    "protection.trip_voltage": "2 V",
    "protection.trip_delay": "0.1 s",
    "protection.loudspeaker_fuse": "T 2.5 A",
}
FULL = {
    **DRIVER,
    "output_capacitor.capacitance": "2200 uF ±20 %, measured",
    "protection.vi_limiter": (("0 V", "5 A"), ("50 V", "1 A")),
}
NAMES = ("overview", "safe-area", "temperatures", "heat", "low-notes", "coil", "impedance", "cone-travel")


@cache
def _gallery(name, changes):
    read = sheet(name, {key: _listed(value) for key, value in changes})
    return pictures_of(read, verdict(read, limits()), limits())


def _listed(value):
    return [_listed(one) for one in value] if isinstance(value, tuple) else value


def gallery(name="single_rail", changes=None):
    """Return the pictures of a scenario with changes."""
    return _gallery(name, tuple((FULL if changes is None else changes).items()))


def full():
    """Return the gallery of a sheet that has everything."""
    return gallery()


def picture(name, of=None):
    """Return one picture of a gallery."""
    return next(one for one in (of or full()).pictures if one.name == name)


def axes(name, of=None):
    """Return the main axes of a picture."""
    return picture(name, of).figure.axes[0]


def why(name, of):
    """Return why a picture is left out."""
    return next(one.because for one in of.left_out if one.name == name)


def labels(plane):
    """Return what the legend says."""
    return [text.get_text() for text in plane.get_legend().get_texts()]


def line(plane, beginning):
    """Return the line whose label begins so."""
    return next(one for one in plane.lines if str(one.get_label()).startswith(beginning))


def within(one):
    """Assert that nothing of a picture reaches beyond its edge."""
    one.figure.draw_without_rendering()
    drawn, (width, height) = one.figure.get_tightbbox(), one.figure.get_size_inches()
    assert min(drawn.x0, drawn.y0) >= -0.01, one.name
    assert max(drawn.x1 - width, drawn.y1 - height) <= 0.01, one.name
