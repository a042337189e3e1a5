"""Defaults, interfaces, fuse gates, preferred values and levels against what others printed."""

from math import inf, log10, sqrt

import pytest

from safeamp.limits import EVIDENCE
from safeamp.quantities import ANGLE, POWER, TEMPERATURE, VOLTAGE, read
from safeamp.reading.limits import load_limits
from tests.published_cases import case


@pytest.fixture(scope="module")
def limits():
    return load_limits()


@pytest.mark.parametrize(("letter", "published"), [("T", "fuse-1"), ("F", "fuse-2")])
def test_fuse_gates_are_the_printed_ones(limits, letter, published):
    printed = case(published)
    fuse = limits.fuse_gates[letter]
    assert [gate.times_rating for gate in fuse.gates] == printed["given"]["times_rating"]
    gates = [[gate.shortest, gate.longest] for gate in fuse.gates]
    assert gates == [pytest.approx(gate) for gate in printed["expected"]["gate_s"]]


@pytest.mark.parametrize("letter", ["T", "F"])
def test_a_higher_current_never_opens_a_fuse_later(limits, letter):
    longest = [gate.longest for gate in limits.fuse_gates[letter].gates]
    assert longest == sorted(longest, reverse=True)
    assert all(gate.shortest < gate.longest for gate in limits.fuse_gates[letter].gates)


def test_e12_is_the_printed_series(limits):
    assert [round(value * 10) for value in limits.series["E12"].values] == case("capacitor-9")["expected"][
        "values"
    ]


@pytest.mark.parametrize(("coarse", "fine"), [("E3", "E6"), ("E6", "E12"), ("E12", "E24")])
def test_every_second_value_of_a_series_is_the_coarser_series(limits, coarse, fine):
    assert limits.series[fine].values[::2] == limits.series[coarse].values


@pytest.mark.parametrize(("name", "count"), [("E3", 3), ("E6", 6), ("E12", 12), ("E24", 24)])
def test_series_are_near_the_geometric_one(limits, name, count):
    # IEC 60063 rounds 10**(n/count), by up to half a digit and in the middle of the decade by up to 5 % more
    values = limits.series[name].values
    assert len(values) == count
    assert values == pytest.approx([10 ** (n / count) for n in range(count)], rel=0.055)


def test_rated_voltages_rise(limits):
    series = limits.series["electrolytic_voltage"]
    assert series.kind == VOLTAGE
    assert series.values == (6.3, 10, 16, 25, 35, 40, 50, 63, 80, 100, 160)


def test_lamps_for_the_mains_rise_in_power(limits):
    assert limits.series["series_lamps"].kind == POWER
    assert limits.series["series_lamps"].values == (25, 40, 60, 100)


def test_cold_filaments_are_the_printed_ones(limits):
    ratio = limits.default("power_up.cold_ratio")
    assert [ratio.low, ratio.high] == case("lamp-1")["expected"]["cold_ratio"]


def test_a_lamp_that_lets_the_most_heat_through_is_bright(limits):
    # Derived: at a share s of its voltage the rest takes (1 - s) s^0.55, most at s = 0.55/1.55; the lamp s^1.55.
    share = 0.55 / 1.55
    assert share**1.55 > limits.default("power_up.dim_up_to").nominal


def test_declared_mains_voltages(limits):
    assert limits.series["mains_voltage"].values == (100, 120, 127, 230)


def test_mains_band_is_the_printed_one(limits):
    printed = case("supply-1")
    nominal = read(printed["given"]["mains"], VOLTAGE).nominal
    band = limits.default("mains.present")
    assert nominal * band.low == pytest.approx(read(printed["expected"]["low"], VOLTAGE).nominal)
    assert nominal * band.high == pytest.approx(read(printed["expected"]["high"], VOLTAGE).nominal)


def test_minimum_impedance_share_is_the_printed_one(limits):
    printed = case("loudspeaker-1")
    rated = [float(text.split()[0]) for text in printed["given"]["rated"]]
    lowest = [float(text.split()[0]) for text in printed["expected"]["lowest_allowed"]]
    share = limits.default("loudspeaker.minimum_impedance").nominal
    assert [value * share for value in rated] == pytest.approx(lowest)


def test_crest_factor_of_a_sine(limits):
    # peak over rms of a sine is the root of 2; two decimals are printed
    assert limits.level("crest_factor.sine").nominal == pytest.approx(20 * log10(sqrt(2)), abs=0.005)


def test_rated_noise_and_power_words_agree(limits):
    # peak power four times the rated one is twice the voltage: 6 dB to the printed digit
    assert limits.level("crest_factor.rated_noise").nominal == pytest.approx(20 * log10(2), abs=0.05)
    assert limits.default("loudspeaker.rated_power").low == 1 / 4
    assert limits.default("loudspeaker.rated_power").nominal == 1 / 2


def test_test_levels(limits):
    assert limits.level("level.one_eighth").nominal == 1 / 8
    assert limits.level("level.one_third").nominal == 1 / 3


DEFAULTS = {
    "mains.present": (1, 0.9, 1.1),
    "supply.full_load": (0.875, 0.8, 0.95),
    "stage.bias_tracking": (0.8, 0.7, 1),
    "stage.swing_loss": (0, 0, 0),
    "stage.imbalance.device_spread": (0.05, 0.05, 0.05),
    "stage.imbalance.no_resistor": (1, 1, 1),
    "device.temperature_coefficient.bipolar": (-2e-3, -2e-3, -2e-3),
    "device.temperature_coefficient.darlington": (-4.4e-3, -4.4e-3, -4.4e-3),
    "output_capacitor.capacitance": (1, 0.8, 1.2),
    "output_capacitor.target_cutoff": (20, 20, 20),
    "heatsink.air": (0, 0, 10),
    "heatsink.sink_to_air": (1, 0.7, 1.7),
    "heatsink.sink_to_air.data_sheet": (1, 0.9, 1.3),
    "heatsink.fins.emissivity": (0.1, 0.1, 0.1),
    "heatsink.insulator": (1, 0.8, 2),
    "heatsink.other_heat": (0, 0, 0),
    "loudspeaker.minimum_impedance": (0.8, 0.8, 0.8),
    "loudspeaker.minimum_impedance.phase_angle": (30, 30, 30),
    "loudspeaker.phase_angle": (45, 45, 45),
    "loudspeaker.phase_angle.beside": (60, 60, 60),
    "loudspeaker.lowest_note": (20, 20, 20),
    "loudspeaker.rated_power": (0.5, 0.25, 0.5),
    "soak.reading_error": (1, 1, 1),
    "soak.scatter": (3, 3, 3),
    "soak.air_moves": (3, 3, 3),
    "soak.power_moves": (0.2, 0.2, 0.2),
    "soak.end_uncertainty": (5, 5, 5),
    "guess.value": (1, 0.75, 1.25),
    "guess.temperature": (0, -10, 10),
    "guess.angle": (0, -15, 15),
    "power_up.other_draw": (5, 1, 12),
    "power_up.rails_draw": (2, 0.5, 6),
    "power_up.channels": (2, 1, 2),
    "power_up.apparent": (1.2, 1, 1.4),
    "power_up.idle_exponent": (1, 1, 2),
    "power_up.cold_ratio": (12.5, 10, 15),
    "power_up.dark_up_to": (0.02, 0.02, 0.02),
    "power_up.dim_up_to": (0.15, 0.15, 0.15),
    "power_up.rails_left": (0.8, 0.8, 0.8),
    "power_up.wait": (5, 5, 5),
    "power_up.bench_limit": (2, 2, 2),
}


def test_defaults_are_the_agreed_ones(limits):
    found = {id: (one.nominal, one.low, one.high) for id, one in limits.defaults.items()}
    assert found == {id: pytest.approx(row) for id, row in DEFAULTS.items()}


def test_defaults_tables_and_levels_have_source_and_evidence(limits):
    for table in (limits.defaults, limits.interfaces, limits.fuse_gates, limits.series, limits.levels):
        assert table
        for noun in table.values():
            assert noun.source
            assert noun.evidence in EVIDENCE


@pytest.mark.parametrize(
    ("text", "kind", "id", "relative"),
    [
        ("40 V, guess", VOLTAGE, "guess.value", True),
        ("40 degC, guess", TEMPERATURE, "guess.temperature", False),
        ("40 deg, guess", ANGLE, "guess.angle", False),
    ],
)
def test_printed_spread_of_a_guess_is_the_one_that_the_reader_uses(limits, text, kind, id, relative):
    reading, spread = read(text, kind), limits.default(id)
    bounds = [40 * spread.low, 40 * spread.high] if relative else [40 + spread.low, 40 + spread.high]
    assert [reading.low, reading.high] == pytest.approx(bounds)


def test_interfaces_carry_the_spread_of_tabulated_values(limits):
    mica = limits.interface("TO-3 mica greased")
    assert (mica.nominal, mica.low, mica.high) == pytest.approx((0.36, 0.36 * 0.8, 0.36 * 2))


def test_interfaces_are_the_agreed_ones(limits):
    assert {name: one.nominal for name, one in limits.interfaces.items()} == {
        "to-3 greased": 0.1,
        "to-3 mica greased": 0.36,
        "to-3 mica dry": 1.3,
        "flat plastic greased": 0.24,
        "flat plastic mica greased": 0.5,
        "flat plastic silicone rubber dry": 0.5,
        "small tab greased": 1.0,
        "small tab mica greased": 1.6,
    }


def test_a_fuse_below_its_first_gate_may_never_open(limits):
    assert limits.fuse_gates["T"].gates[0].longest == inf
