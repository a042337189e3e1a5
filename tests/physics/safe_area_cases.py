"""Amplifiers and a dense brute force for the tests of the safe area."""

import numpy as np

from safeamp.physics.safe_area import Rating
from safeamp.physics.stage import Law, carrying_current

SHEET = {
    "current": 12.0,
    "power": 150.0,
    "power_at": 25.0,
    "junction_limit": 150.0,
    "junction_to_case": 0.8333,
    "voltage": 160.0,
    "points": ((40.0, 3.75), (100.0, 0.75), (160.0, 0.25)),
}
DEVICE = Rating(**SHEET)
BASE = {
    "half_supply": 34.0,
    "peak": 30.0,
    "load_magnitude": 8.0,
    "phase_angle": 45.0,
    "conducting": 1,
    "emitter_resistor": 0.33,
    "idle_current": 0.0424,
    "law": Law.BIPOLAR,
    "imbalance": None,
    "case_temperature": 60.0,
    "rating": DEVICE,
}


def allowed(voltage, case_temperature, rating):
    """The boundary from the words alone: np.interp on logarithms, one rule after the other."""
    limit, at = rating.junction_limit, rating.power_at
    power = min(rating.power, (limit - at) / rating.junction_to_case)
    k = min(1.0, max(0.0, (limit - case_temperature) / (limit - at)))
    current = np.minimum(rating.current, k * power / np.maximum(voltage, 1e-9))
    if rating.points:
        volts, amperes = np.log(np.array(rating.points)).T
        v = np.log(np.maximum(voltage, 1e-9))
        line = np.exp(np.interp(v, volts, amperes))
        first = np.exp(
            amperes[0] + (v - volts[0]) * (amperes[1] - amperes[0]) / (volts[1] - volts[0]),
        )
        below = first if np.exp(volts[0] + amperes[0]) < 0.95 * power else np.inf
        line = np.where(v < volts[0], below, np.where(v > volts[-1], np.inf, line))
        current = np.minimum(current, k * line)
    return np.where(voltage > rating.voltage, 0.0, current)


def brute_use(a, angles, phases=1441, amplitudes=(0.25, 0.5, 0.75, 0.9, 0.97, 1.0)):
    """Largest use over load angles, amplitudes and phases, and whether it enters the unknown."""
    phi = np.deg2rad(np.asarray(angles))[:, None, None]
    swing = a["peak"] * np.array(amplitudes)[None, :, None]
    t = np.linspace(-np.pi, np.pi, phases)[None, None, :]
    n = a["conducting"]
    x = carrying_current(
        load_current=swing / a["load_magnitude"] / n * np.sin(t + phi),
        idle_current=a["idle_current"],
        emitter_resistor=a["emitter_resistor"],
        law=a["law"],
    )
    voltage = a["half_supply"] - swing * np.sin(t) - x * a["emitter_resistor"]
    worst = np.where(x > 1e-5 * a["rating"].current / (1 + a["imbalance"]), x * (1 + a["imbalance"]), 0.0)
    if n == 1:
        worst = np.where(x > 1e-5 * a["rating"].current, x, 0.0)
    limit = allowed(voltage, a["case_temperature"], a["rating"])
    with np.errstate(divide="ignore", invalid="ignore"):
        use = np.where(worst == 0, 0.0, worst / limit)
    last = a["rating"].points[-1][0] if a["rating"].points else np.inf
    beyond = (worst > 0) & (voltage > last) & (last < a["rating"].voltage)
    return use.max(), bool(beyond.any())


def random_amplifier(seed):
    """An amplifier with everything drawn at random, from safe to hopeless."""
    random = np.random.default_rng(seed)
    supply = random.uniform(10, 75)
    power, voltage = random.uniform(40, 250), random.choice([90, 120, 160, 250])
    knee = random.uniform(20, 60)
    first = power / knee * random.choice([1.0, random.uniform(0.5, 1.05)])
    middle = random.uniform(knee + 10, voltage - 5)
    second = first * (knee / middle) ** random.uniform(1.2, 2.5)
    end = random.choice([voltage, random.uniform(middle + 2, voltage)])
    points = ((knee, first), (middle, second), (end, second * (middle / end) ** random.uniform(1.5, 3.5)))
    return {
        "half_supply": supply,
        "peak": supply * random.uniform(0.5, 0.97),
        "load_magnitude": random.uniform(2, 16),
        "phase_angle": random.choice([0, 30, 45, 60, random.uniform(0, 90)]),
        "conducting": int(random.integers(1, 5)),
        "emitter_resistor": random.choice([0, 0.1, 0.22, 0.47, 1]),
        "idle_current": random.choice([0, 5e-3, 0.04, 0.3, 1.5]),
        "law": random.choice(list(Law)),
        "imbalance": random.uniform(0, 0.5),
        "case_temperature": random.uniform(25, 120),
        "rating": Rating(
            current=random.uniform(5, 20),
            power=power,
            power_at=25.0,
            junction_limit=random.choice([150.0, 200.0]),
            junction_to_case=random.uniform(0.4, 2),
            voltage=float(voltage),
            points=points if random.uniform() < 0.75 else (),
        ),
    }
