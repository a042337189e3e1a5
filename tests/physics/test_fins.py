"""Fins by ruler: printed examples, an independent package, the balance, and what is refused."""

from dataclasses import replace

import numpy as np
import pytest
from ht import conv_free_immersed, radiation
from hypothesis import given, settings
from hypothesis import strategies as st

from safeamp.physics import convection, fins
from safeamp.physics.air import Air, air_at
from tests.published_cases import case, number, printed

SINK = fins.Geometry(
    width=0.15, height=0.075, depth=0.035, thickness=0.002, count=14, plate=0.006, emissivity=0.8
)


def book(name, expansion):
    """Return air as the source of a case prints it."""
    stated = case(name)["given"]
    return Air(stated["air_k"], stated["air_nu"], stated["air_prandtl"], expansion)


def fin_channels(air):
    """Return Rayleigh number, best gap and heat of 14 fins of 180 mm by 24 mm at that gap, 50 K above air."""
    tall = convection.rayleigh_number(rise=50.0, length=0.180, air=air)
    gap = convection.best_gap(rayleigh=tall, height=0.180)
    narrow = convection.rayleigh_number(rise=50.0, length=gap, air=air)
    coefficient = convection.channel_nusselt(rayleigh=narrow, gap=gap, height=0.180) * air.conductivity / gap
    return tall, gap, coefficient * 2 * 14 * 0.180 * 0.024 * 50.0


def test_fins_of_the_book():
    tall, gap, heat = fin_channels(book("heat-7", 1 / 328.0))
    assert tall == printed("heat-7", "rayleigh")
    assert gap * 1e3 == pytest.approx(
        number(case("heat-7")["expected"]["best_gap"].removesuffix(" mm")), rel=0.01
    )
    assert heat == printed("heat-7", "heat")


def test_fins_of_the_book_with_our_own_air():
    assert fin_channels(air_at(temperature=55.0))[2] == pytest.approx(29.4, rel=0.03)


def plate(rise, height, width, air):
    tall = convection.rayleigh_number(rise=rise, length=height, air=air)
    nusselt = convection.plate_nusselt(rayleigh=tall, prandtl=air.prandtl)
    return tall, nusselt, nusselt * air.conductivity / height * height * width * rise


def test_plate_of_the_book():
    tall, nusselt, heat = plate(60.0, 0.6, 0.6, book("heat-8", 1 / 333.0))
    assert tall == printed("heat-8", "rayleigh")
    assert nusselt == printed("heat-8", "nusselt")
    assert heat == printed("heat-8", "heat_one_side")


def test_screen_of_the_book():
    assert plate(209.0, 0.71, 1.02, book("heat-9", 0.0025))[2] == printed("heat-9", "heat")


@pytest.mark.parametrize(
    ("rise", "height", "width", "film", "heat"),
    [(60.0, 0.6, 0.6, 60.0, 114.6), (209.0, 0.71, 1.02, 127.5, 1060.0)],
)
def test_plates_of_the_books_with_our_own_air(rise, height, width, film, heat):
    assert plate(rise, height, width, air_at(temperature=film))[2] == pytest.approx(heat, rel=0.03)


def test_air_at_300_and_350_kelvin():
    # F. Incropera et al., Fundamentals of Heat and Mass Transfer, Wiley, Table A.4: nu, k, Pr of air.
    found = air_at(temperature=np.array([300.0, 350.0]) - 273.15)
    np.testing.assert_allclose(found.viscosity, [15.89e-6, 20.92e-6], rtol=0.02)
    np.testing.assert_allclose(found.conductivity, [26.3e-3, 30.0e-3], rtol=0.02)
    np.testing.assert_allclose(found.prandtl, [0.707, 0.700], rtol=0.02)
    np.testing.assert_allclose(found.expansion, [1 / 300.0, 1 / 350.0], rtol=1e-12)


@pytest.mark.parametrize("rayleigh", [1e3, 1e5, 7.6e8, 1e11])
def test_plate_agrees_with_an_independent_package(rayleigh):
    other = conv_free_immersed.Nu_vertical_plate_Churchill(0.71, rayleigh / 0.71)
    assert convection.plate_nusselt(rayleigh=rayleigh, prandtl=0.71) == pytest.approx(other, rel=1e-9)


def test_radiation_agrees_with_an_independent_package():
    other = radiation.q_rad(emissivity=0.8, T=353.15, T2=303.15) * 0.05
    found = convection.radiated_heat(area=0.05, emissivity=0.8, surface=80.0, surroundings=30.0)
    assert found == pytest.approx(other, rel=1e-5)  # ht: rounded constant


def test_channel_has_its_two_limits():
    # Elenbaas: close plates Nu = El/24, far ones those of a single plate, (El/2.873**2)**0.25.
    close = convection.channel_nusselt(rayleigh=0.1, gap=0.01, height=0.1)
    assert close == pytest.approx(0.01 / 24.0, rel=1e-3)
    far = convection.channel_nusselt(rayleigh=1e9, gap=0.1, height=0.1)
    assert far == pytest.approx((1e9**0.5 / 2.873) ** 0.5, rel=1e-3)


def test_best_gap_is_best():
    # At the best gap the heat of a given width has its maximum: Nu/gap**2 (fins a width go with 1/gap).
    tall = convection.rayleigh_number(rise=50.0, length=0.18, air=air_at(temperature=55.0))
    gap = convection.best_gap(rayleigh=tall, height=0.18)
    gaps = gap * np.array([0.97, 1.0, 1.03])
    narrow = tall * (gaps / 0.18) ** 3
    shed = convection.channel_nusselt(rayleigh=narrow, gap=gaps, height=0.18) / gaps**2
    assert shed[1] > shed[0]
    assert shed[1] > shed[2]


def test_fin_efficiency():
    # Derived: mL = sqrt(2 h/(k t)) L = 1 with h = 10, k = 200, t = 1 mm, L = 0.1 m; tanh(1)/1.
    assert convection.fin_efficiency(coefficient=10.0, thickness=0.001, depth=0.1) == pytest.approx(
        np.tanh(1.0)
    )
    assert convection.fin_efficiency(coefficient=0.0, thickness=0.001, depth=0.1) == 1.0


def test_parts_of_the_heat_add_up():
    # Derived with the pieces that the tests above hold: a single fin is a plate on both faces.
    single = replace(SINK, count=1, thickness=0.15 / 2, emissivity=0.0)
    film = air_at(temperature=60.0)
    tall = convection.rayleigh_number(rise=50.0, length=0.075, air=film)
    coefficient = convection.plate_nusselt(rayleigh=tall, prandtl=film.prandtl) * film.conductivity / 0.075
    efficiency = convection.fin_efficiency(coefficient=coefficient, thickness=0.075, depth=0.035)
    found = fins.fins_heat(geometry=single, rise=50.0, air=35.0)
    assert found.channels == pytest.approx(coefficient * 2 * 0.035 * 0.075 * 50.0 * efficiency)
    assert found.back == pytest.approx(coefficient * 0.15 * 0.075 * 50.0)
    assert found.radiated == 0.0
    assert found.total == found.channels + found.back
    box = 2 * (0.15 * 0.075 + 0.15 * 0.041 + 0.075 * 0.041)
    assert SINK.envelope == pytest.approx(box)
    assert SINK.gap == pytest.approx((0.15 - 0.028) / 13)


lengths = st.floats(0.02, 0.4)


@settings(deadline=None, max_examples=60)
@given(
    width=lengths, height=lengths, depth=st.floats(0.005, 0.15), count=st.integers(1, 60),
    filled=st.floats(0.02, 0.95), emissivity=st.floats(0.0, 1.0), heat=st.floats(1e-3, 500.0), air=st.floats(-10, 90),
)  # fmt: skip
def test_the_balance_holds_and_more_heat_is_hotter(
    width, height, depth, count, filled, emissivity, heat, air
):
    geometry = fins.Geometry(width, height, depth, width * filled / count, count, 0.003, emissivity)
    rise = fins.sink_rise(geometry=geometry, heat=np.array([heat, 1.01 * heat]), air=air)
    assert rise[1] > rise[0] or np.isinf(rise[0])
    if np.isfinite(rise[0]):
        shed = fins.fins_heat(geometry=geometry, rise=rise[0], air=air).total
        assert shed == pytest.approx(heat, rel=1e-6)
        assert rise[0] <= fins.MOST_RISE
    else:
        assert fins.fins_heat(geometry=geometry, rise=fins.MOST_RISE, air=air).total < heat


def test_worse_heatsinks_are_hotter():
    bare = fins.sink_rise(geometry=SINK, heat=30.0, air=35.0)
    for worse in (
        {"width": 0.14},
        {"height": 0.07},
        {"depth": 0.03},
        {"emissivity": 0.1},
        {"thickness": 0.003},
    ):
        assert fins.sink_rise(geometry=replace(SINK, **worse), heat=30.0, air=35.0) > bare


def test_no_heat_no_rise_and_unknown_heat_unknown_rise():
    rise = fins.sink_rise(geometry=SINK, heat=np.array([0.0, np.nan, 30.0]), air=35.0)
    assert rise[0] == 0.0
    assert np.isnan(rise[1])
    assert rise[2] == fins.sink_rise(geometry=SINK, heat=30.0, air=35.0)
    assert np.isnan(fins.sink_rise(geometry=replace(SINK, height=np.nan), heat=30.0, air=35.0))
    assert np.isnan(fins.sink_rise(geometry=SINK, heat=30.0, air=np.nan))


def test_resistance_falls_with_heat_and_is_infinite_beyond_reach():
    heat = np.array([3.0, 30.0, 5000.0])
    found = fins.sink_to_air(geometry=SINK, heat=heat, air=35.0)
    np.testing.assert_allclose(found[:2] * heat[:2], fins.sink_rise(geometry=SINK, heat=heat[:2], air=35.0))
    assert found[0] > found[1]
    assert np.isinf(found[2])


def test_cases_run_together_as_one_by_one():
    depths = np.array([0.030, 0.035, 0.040])
    together = fins.sink_rise(geometry=replace(SINK, depth=depths), heat=30.0, air=35.0)
    single = [fins.sink_rise(geometry=replace(SINK, depth=one), heat=30.0, air=35.0) for one in depths]
    np.testing.assert_allclose(together, single, rtol=1e-9)


@pytest.mark.parametrize(
    ("changes", "says"),
    [
        ({"width": 0.0}, r"^width must be greater than zero, got 0\.0$"),
        ({"height": -0.1}, r"^height must be greater than zero, got -0\.1$"),
        ({"depth": 0.0}, r"^depth must be greater than zero, got 0\.0$"),
        ({"thickness": 0.0}, r"^thickness must be greater than zero, got 0\.0$"),
        ({"count": 0}, r"^count must be one or more, got 0$"),
        ({"plate": -1e-3}, r"^plate must be zero or more, got -0\.001$"),
        ({"emissivity": 1.1}, r"^emissivity must be between 0 and 1, got 1\.1$"),
        ({"count": 75}, r"^width less that of all fins must be greater than zero, got 0\.0$"),
    ],
)
def test_impossible_heatsinks_are_refused(changes, says):
    with pytest.raises(ValueError, match=says):
        replace(SINK, **changes)
    assert replace(SINK, count=74).gap > 0


@pytest.mark.parametrize(
    ("call", "says"),
    [
        (lambda: air_at(temperature=-100.1), r"^temperature must be between -100 and 800, got -100\.1$"),
        (lambda: air_at(temperature=800.1), r"^temperature must be between -100 and 800, got 800\.1$"),
        (
            lambda: fins.sink_rise(geometry=SINK, heat=-1.0, air=35.0),
            r"^heat must be zero or more, got -1\.0$",
        ),
        (
            lambda: fins.sink_to_air(geometry=SINK, heat=0.0, air=35.0),
            r"^heat must be greater than zero, got 0\.0$",
        ),
        (
            lambda: fins.fins_heat(geometry=SINK, rise=-1.0, air=35.0),
            r"^rise must be zero or more, got -1\.0$",
        ),
        (lambda: convection.plate_nusselt(rayleigh=-1.0, prandtl=0.7), r"^rayleigh must be zero or more"),
        (lambda: convection.plate_nusselt(rayleigh=1.0, prandtl=0.0), r"^prandtl must be greater than zero"),
        (
            lambda: convection.channel_nusselt(rayleigh=1.0, gap=0.0, height=0.1),
            r"^gap must be greater than zero",
        ),
        (lambda: convection.best_gap(rayleigh=0.0, height=0.1), r"^rayleigh must be greater than zero"),
        (
            lambda: convection.radiated_heat(area=1.0, emissivity=-0.1, surface=80.0, surroundings=20.0),
            r"^emissivity must be between 0 and 1, got -0\.1$",
        ),
        (
            lambda: convection.fin_efficiency(coefficient=-1.0, thickness=0.001, depth=0.1),
            r"^coefficient must be zero or more, got -1\.0$",
        ),
    ],
)
def test_values_outside_the_range_are_refused(call, says):
    with pytest.raises(ValueError, match=says):
        call()
