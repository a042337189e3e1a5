"""Safe area of the output devices and the use that a load makes of it."""

from safeamp.physics.safe_area.boundary import allowed_current
from safeamp.physics.safe_area.cut import cut_use
from safeamp.physics.safe_area.locus import ZONES, Use
from safeamp.physics.safe_area.path import angle_path, envelope_path
from safeamp.physics.safe_area.peak import equivalent_resistance, peak_dissipation
from safeamp.physics.safe_area.pulse import Pulse, curves_problem
from safeamp.physics.safe_area.rating import Rating, derating, points_problem, usable_power
from safeamp.physics.safe_area.use import angle_use, envelope_use
from safeamp.physics.safe_area.vi_limiter import limiter_current, limiter_reach, limiter_use

__all__ = [
    "ZONES",
    "Pulse",
    "Rating",
    "Use",
    "allowed_current",
    "angle_path",
    "angle_use",
    "curves_problem",
    "cut_use",
    "derating",
    "envelope_path",
    "envelope_use",
    "equivalent_resistance",
    "limiter_current",
    "limiter_reach",
    "limiter_use",
    "peak_dissipation",
    "points_problem",
    "usable_power",
]
