"""Formulas through which quantities cannot run, with every unit made larger or smaller at once.

Searches, logarithms, tables and polynomials take plain numbers. So the base units themselves are changed, each by a
factor of its own; pint says which factor a unit gets from them. An answer that does not change as its unit says has
a wrong power of something in it. Constants of nature change with the units, properties of air are handed over.
"""

import inspect
from pathlib import Path
from types import SimpleNamespace

import numpy as np
import pint
import pytest

from safeamp.physics import (
    any_signal,
    coil_heating,
    convection,
    coupling,
    driver,
    fins,
    heat,
    lamp,
    power_up,
    safe_area,
    settling,
    soak,
    stage,
    supply,
    transient,
)
from safeamp.physics.air import Air, air_at
from safeamp.physics.driver import Driver, Motional
from safeamp.physics.safe_area import Rating
from safeamp.physics.stage import THERMAL_VOLTAGE, Law
from tests.docs.test_parameters import functions
from tests.physics.formulas import FORMULAS

UNITS = pint.UnitRegistry()
PLAIN = {"[mass]": 1.0, "[length]": 1.0, "[time]": 1.0, "[current]": 1.0, "[temperature]": 1.0}
#: No product of small powers of these is one.
CHANGED = {"[mass]": 1.31, "[length]": 1.07, "[time]": 0.83, "[current]": 0.91, "[temperature]": 1.0}
WARMER = CHANGED | {"[temperature]": 1.13}


class System:
    """A system of units: `system(6.0, "ohm")` is the number that stands for 6 ohm in it."""

    def __init__(self, base):
        self.base = base

    def factor(self, unit):
        powers = UNITS.Unit(unit).dimensionality
        return float(np.prod([self.base[name] ** power for name, power in powers.items()]))

    def __call__(self, value, unit):
        return value * self.factor(unit)


def of_driver(u):
    moving = Motional(u(30.0, "ohm"), u(500e-6, "F"), u(0.02, "H"))
    return Driver(u(6.0, "ohm"), moving, u(0.6e-3, "H"))


def of_device(u):
    points = tuple((u(v, "V"), u(i, "A")) for v, i in ((40.0, 3.75), (100.0, 0.75), (160.0, 0.25)))
    return Rating(
        current=u(12.0, "A"), power=u(150.0, "W"), power_at=u(25.0, "K"), junction_limit=u(150.0, "K"),
        junction_to_case=u(0.8333, "K/W"), voltage=u(160.0, "V"), points=points,
    )  # fmt: skip


def of_stage(u, law=Law.BIPOLAR):
    return {
        "half_supply": u(34.0, "V"), "peak": u(30.0, "V"), "load_magnitude": u(8.0, "ohm"), "phase_angle": 45.0,
        "conducting": 2.0, "emitter_resistor": u(0.33, "ohm"), "idle_current": u(0.042, "A"), "law": law,
        "thermal_voltage": u(THERMAL_VOLTAGE, "V"),
    }  # fmt: skip


def of_fault(u):
    return {
        "voltage": u(35.0, "V"), "dc_resistance": u(6.0, "ohm"), "coil_to_magnet": u(2.0, "K/W"),
        "magnet_to_air": u(1.5, "K/W"), "air": 25.0,
    }  # fmt: skip


def limiter_points(u):
    return ((u(0.0, "V"), u(6.0, "A")), (u(50.0, "V"), u(1.0, "A")))


def in_units(u, air):
    conductivity, viscosity = u(air.conductivity, "W/(m*K)"), u(air.viscosity, "m**2/s")
    return Air(conductivity, viscosity, air.prandtl, u(air.expansion, "1/K"))


def of_air(u):
    return in_units(u, air_at(temperature=50.0))


def piece(u):
    lengths = {"width": 0.1, "height": 0.08, "depth": 0.04, "thickness": 0.002, "plate": 0.005}
    return fins.Geometry(**{name: u(value, "m") for name, value in lengths.items()}, count=8, emissivity=0.9)


def shed(u):
    found = fins.fins_heat(geometry=piece(u), rise=40.0, air=30.0)
    return found.channels, found.back, found.radiated


def pairs(u):
    return {"resistances": u(np.array([0.2, 0.6]), "K/W"), "time_constants": u(np.array([2e-3, 0.09]), "s")}


def network(u):
    above, below = any_signal.admittance(
        driver=of_driver(u), series_resistor=u(0.2, "ohm"), capacitance=u(2e-3, "F")
    )
    turn = u(2j * np.pi * 50.0, "Hz")
    return abs(np.polyval(above, turn) / np.polyval(below, turn))


def through(u):
    return {"driver": of_driver(u), "capacitance": u(1e-3, "F"), "series_resistor": u(0.2, "ohm")}


def currents(u, law):
    given = {key: of_stage(u)[key] for key in ("idle_current", "emitter_resistor", "thermal_voltage")}
    return stage.device_currents(load_current=u(np.array([0.05, 1.0]), "A"), **given, law=law)


def path(u, function):
    return function(output_angle=np.array([10.0, 60.0]), **of_stage(u), imbalance=0.2)


def use(u, function, **more):
    found = function(**of_stage(u), imbalance=0.2, case_temperature=u(60.0, "K"), rating=of_device(u), **more)
    return found.use, found.voltage, found.current


def let_through(u):
    points, device = limiter_points(u), of_device(u)
    found = safe_area.limiter_use(
        points=points, case_temperature=u(60.0, "K"), rating=device, highest_voltage=u(70.0, "V")
    )
    return found.use, found.current


def settled(u, **law):
    return settling.settled_idle(
        set_current=u(0.03, "A"), device_voltage=u(35.0, "V"), junction_to_case=u(0.7, "K/W"),
        case_to_sink=u(0.45, "K/W"), sink_resistance=u(3.0, "K/W"), sensor="heatsink", tracking=0.8,
        idle_at="cold", set_air=u(30.0, "K"), air=u(50.0, "K"), junction_limit=u(150.0, "K"),
        drift=u(2e-3, "V/K"), emitter_resistor=u(0.33, "ohm"), sink_rise=u(5.0, "K"),
        thermal_voltage=u(THERMAL_VOLTAGE, "V"), **law,
    )  # fmt: skip


def lit(u):
    return lamp.voltage_behind_lamp(
        mains=u(230.0, "V"), resistance=u(500.0, "ohm"), rated_power=u(60.0, "W"), rated_voltage=u(230.0, "V")
    )


def idle(u, function, **limiter):
    return function(mains=u(230.0, "V"), apparent_power=u(15.0, "W"), exponent=1.4, **limiter)


def heat_of_means(u):
    means = SimpleNamespace(mean=u(0.6, "A"), mean_square=u(0.9, "A**2"))
    keys = ("half_supply", "peak", "load_magnitude", "phase_angle", "conducting", "emitter_resistor")
    return stage.heat_of_currents(currents=means, **{key: of_stage(u)[key] for key in keys})


def moving(u):
    return {"moving_mass": u(0.02, "kg"), "compliance": u(1.2e-3, "m/N")}


def motor(u):
    return {"force_factor": u(8.0, "N/A")}


def warming(u):
    times, read = [0.0, 300.0, 600.0, 1200.0, 2400.0], [24.0, 35.0, 42.0, 52.0, 57.5]
    return {
        "time": u(np.array(times), "s"), "sink": u(np.array(read), "K"), "reading_error": u(0.5, "K"),
    }  # fmt: skip


def soaked(u):
    found = soak.soak_fit(**warming(u))
    return found.end, found.low, found.high, found.time_constant, found.scatter


def elements(found):
    return found.resistance, found.capacitance, found.inductance


def small(u):
    return {
        "dc_resistance": u(6.0, "ohm"),
        "resonance": u(40.0, "Hz"),
        "q_mechanical": 4.0,
        "q_electrical": 0.5,
    }


def without_resonance(u, *names):
    return {name: small(u)[name] for name in names}


MOTIONAL = ("ohm", "F", "H")
#: Formula -> its answer in a system of units, and the unit of each number in it.
SCALED = {
    "any_signal.admittance": (network, "1/ohm"),
    "any_signal.admittance_norm": (lambda u: any_signal.admittance_norm(**through(u)), "1/ohm"),
    "any_signal.largest_current": (lambda u: any_signal.largest_current(peak=u(30.0, "V"), **through(u)), "A"),
    "convection.rayleigh_number": (
        lambda u: convection.rayleigh_number(rise=u(30.0, "K"), length=u(0.1, "m"), air=of_air(u)), ""),
    "convection.channel_nusselt": (
        lambda u: convection.channel_nusselt(rayleigh=5e3, gap=u(0.01, "m"), height=u(0.1, "m")), ""),
    "convection.best_gap": (lambda u: convection.best_gap(rayleigh=5e6, height=u(0.1, "m")), "m"),
    "convection.fin_efficiency": (
        lambda u: convection.fin_efficiency(
            coefficient=u(6.0, "W/(m**2*K)"), thickness=u(2e-3, "m"), depth=u(0.05, "m"),
            conductivity=u(200.0, "W/(m*K)")), ""),
    "convection.radiated_heat": (
        lambda u: convection.radiated_heat(area=u(0.05, "m**2"), emissivity=0.9, surface=70.0, surroundings=30.0),
        "W"),
    "coupling.response": (lambda u: coupling.response(frequency=u(np.array([20.0, 60.0]), "Hz"), **through(u)), ""),
    "coupling.cutoff_frequency": (lambda u: coupling.cutoff_frequency(**through(u)), "Hz"),
    "coupling.low_peak": (lambda u: coupling.low_peak(**through(u)), ("", "Hz")),
    "coupling.turn_on_displacement": (
        lambda u: coupling.turn_on_displacement(
            **motor(u), midpoint=u(30.0, "V"), rise_time=u(0.1, "s"), **through(u)), "m"),
    "driver.motional_elements": (lambda u: elements(driver.motional_elements(**small(u))), MOTIONAL),
    "driver.small_signal_parameters": (
        lambda u: driver.small_signal_parameters(dc_resistance=u(6.0, "ohm"), motional=of_driver(u).motional),
        ("Hz", "", "")),
    "driver.motional_from_mechanics": (
        lambda u: elements(driver.motional_from_mechanics(**motor(u), **moving(u), q_mechanical=4.0)), MOTIONAL),
    "driver.mechanics": (
        lambda u: driver.mechanics(**motor(u), motional=of_driver(u).motional), ("kg", "m/N")),
    "driver.free_resonance": (lambda u: driver.free_resonance(**moving(u)), "Hz"),
    "driver.electrical_q": (
        lambda u: driver.electrical_q(
            dc_resistance=u(6.0, "ohm"), **motor(u), moving_mass=u(0.02, "kg"), resonance=u(40.0, "Hz")), ""),
    "driver.complex_impedance": (
        lambda u: abs(driver.complex_impedance(driver=of_driver(u), frequency=u(60.0, "Hz"))), "ohm"),
    "driver.impedance": (
        lambda u: driver.impedance(driver=of_driver(u), frequency=u(60.0, "Hz")), ("ohm", "")),
    "driver.impedance_at_resonance": (
        lambda u: driver.impedance_at_resonance(
            **without_resonance(u, "dc_resistance", "q_mechanical", "q_electrical")), "ohm"),
    "driver.excursion": (
        lambda u: driver.excursion(
            driver=of_driver(u), **motor(u), peak=u(30.0, "V"), frequency=u(60.0, "Hz")), "m"),
    "driver.largest_excursion": (
        lambda u: driver.largest_excursion(
            driver=of_driver(u), **motor(u), peak=u(30.0, "V"), lowest=u(20.0, "Hz"), highest=u(200.0, "Hz")), "m"),
    "fins.fins_heat": (shed, ("W", "W", "W")),
    "fins.sink_rise": (lambda u: fins.sink_rise(geometry=piece(u), heat=u(20.0, "W"), air=30.0), ""),
    "fins.sink_to_air": (
        lambda u: fins.sink_to_air(geometry=piece(u), heat=u(20.0, "W"), air=30.0), "K/W"),
    "heat.foster_impedance": (lambda u: heat.foster_impedance(**pairs(u), time=u(0.01, "s")), "K/W"),
    "heat.periodic_rise": (
        lambda u: heat.periodic_rise(**pairs(u), power=u(np.array([60.0, 0.0]), "W"), period=u(0.05, "s")), "K"),
    "transient.peak_ripple": (
        lambda u: transient.peak_ripple(**pairs(u), power=u(np.array([60.0, 20.0, 0.0]), "W"), period=u(0.05, "s")),
        "K"),
    "transient.cycle_dissipation": (lambda u: transient.cycle_dissipation(**of_stage(u)), "W"),
    "lamp.voltage_behind_lamp": (lit, "V"),
    "power_up.idle_behind_lamp": (
        lambda u: idle(u, power_up.idle_behind_lamp, rated_power=u(60.0, "W"), rated_voltage=u(230.0, "V")), "V"),
    "power_up.idle_behind_resistor": (
        lambda u: idle(u, power_up.idle_behind_resistor, resistance=u(680.0, "ohm")), "V"),
    "safe_area.allowed_current": (
        lambda u: safe_area.allowed_current(
            voltage=u(np.array([10.0, 50.0, 120.0]), "V"), case_temperature=u(60.0, "K"), rating=of_device(u)), "A"),
    "safe_area.angle_path": (lambda u: path(u, safe_area.angle_path), ("V", "A")),
    "safe_area.envelope_path": (lambda u: path(u, safe_area.envelope_path), ("V", "A")),
    "safe_area.angle_use": (lambda u: use(u, safe_area.angle_use), ("", "V", "A")),
    "safe_area.envelope_use": (lambda u: use(u, safe_area.envelope_use), ("", "V", "A")),
    "safe_area.cut_use": (
        lambda u: use(u, safe_area.cut_use, limiter=limiter_points(u)), ("", "V", "A")),
    "safe_area.limiter_current": (
        lambda u: safe_area.limiter_current(voltage=u(30.0, "V"), points=limiter_points(u)), "A"),
    "safe_area.limiter_reach": (
        lambda u: safe_area.limiter_reach(points=limiter_points(u), **of_stage(u)), ""),
    "safe_area.limiter_use": (let_through, ("", "A")),
    "settling.settled_idle": (settled, "A"),
    "bias.settled_idle": (lambda u: settled(u, transconductance_parameter=u(3.0, "A/V**2")), "A"),
    "soak.soak_fit": (soaked, ("K", "K", "K", "s", "K")),
    "soak.time_needed": (lambda u: soak.time_needed(**warming(u), within=u(1.0, "K")), "s"),
    "stage.device_currents": (lambda u: currents(u, Law.BIPOLAR), ("A", "A")),
    "stage.heat_of_currents": (heat_of_means, "W"),
    "supply.mains_band": (lambda u: supply.mains_band(nominal=u(230.0, "V")), ("V", "V")),
    "coil_heating.settled_coil_temperature": (lambda u: coil_heating.settled_coil_temperature(**of_fault(u)), ""),
    "coil_heating.fault_coil_temperature": (
        lambda u: coil_heating.fault_coil_temperature(
            **of_fault(u), coil_time_constant=u(4.0, "s"), magnet_time_constant=u(900.0, "s"), start=25.0,
            time=u(10.0, "s")), ""),
    "coil_heating.time_to_temperature": (
        lambda u: coil_heating.time_to_temperature(
            **of_fault(u), coil_time_constant=u(4.0, "s"), magnet_time_constant=u(900.0, "s"), start=25.0,
            limit=180.0), "s"),
}  # fmt: skip
#: Their temperatures stand on a scale with its own zero, or on that of copper or air: kelvin stays kelvin here.
ON_A_SCALE = {
    "convection.radiated_heat", "fins.fins_heat", "fins.sink_rise", "fins.sink_to_air",
    "coil_heating.settled_coil_temperature", "coil_heating.fault_coil_temperature",
    "coil_heating.time_to_temperature",
}  # fmt: skip
#: Ratios in and out, words, codes in their own unit, or the properties of air themselves: nothing to change.
WITHOUT_UNITS = {
    "air.air_at", "bias.untracked", "feedback.untracked", "convection.plate_nusselt", "fuse.slowest_time",
    "fuse.fastest_time", "preferred.next_preferred", "preferred.next_rated_voltage", "safe_area.curves_problem",
    "safe_area.points_problem",
}  # fmt: skip


@pytest.fixture
def constants(monkeypatch):
    """Let the constants of nature change with the units."""

    def change(u):
        monkeypatch.setattr(convection, "GRAVITY", u(9.80665, "m/s**2"))
        monkeypatch.setattr(convection, "STEFAN_BOLTZMANN", u(5.670374419e-8, "W/(m**2*K**4)"))
        monkeypatch.setattr(
            fins, "air_at", lambda *, temperature: in_units(u, air_at(temperature=temperature))
        )
        monkeypatch.setitem(
            convection.fin_efficiency.__kwdefaults__,
            "conductivity",
            u(convection.FIN_CONDUCTIVITY, "W/(m*K)"),
        )

    return change


def numbers(answer, u, units):
    if isinstance(units, str):
        return [np.asarray(answer) / u.factor(units)]
    return [np.asarray(one) / u.factor(unit) for one, unit in zip(answer, units, strict=True)]


@pytest.mark.parametrize("name", SCALED)
def test_an_answer_changes_as_its_unit_does(name, constants):
    formula, units = SCALED[name]
    plain, other = System(PLAIN), System(CHANGED if name in ON_A_SCALE else WARMER)
    before = numbers(formula(plain), plain, units)
    constants(other)
    after = numbers(formula(other), other, units)
    for one, two in zip(before, after, strict=True):
        assert np.all(np.isfinite(one))
        np.testing.assert_allclose(two, one, rtol=2e-5)


@pytest.mark.parametrize("name", ["driver.free_resonance", "heat.foster_impedance", "safe_area.envelope_use"])
def test_a_wrong_unit_is_seen(name):
    formula, _ = SCALED[name]
    plain, other = System(PLAIN), System(WARMER)
    wrong = ["V"] * 3 if name == "safe_area.envelope_use" else "m"
    before, after = numbers(formula(plain), plain, wrong), numbers(formula(other), other, wrong)
    assert not np.allclose(np.ravel(before[0]), np.ravel(after[0]), rtol=1e-3)


def test_every_formula_has_its_dimension_checked():
    through_pint = {str(one) for one in FORMULAS if one.unit is not None}
    in_quantities = Path(__file__).with_name("test_stage_dimensions.py").read_text(encoding="utf-8")
    left = {
        name
        for name, function in functions().items()
        if not (
            name in SCALED.keys() | WITHOUT_UNITS
            or f"{inspect.getmodule(function).__name__.rpartition('.')[2]}.{function.__name__}"
            in through_pint | SCALED.keys()
            or any(one.endswith(f".{function.__name__}") for one in through_pint)
            or f"{name.partition('.')[0]}.{function.__name__}" in in_quantities
        )
    }
    assert left == set()
