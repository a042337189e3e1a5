"""pint behind the border: scales, quantities in and out, and what an import costs."""

import subprocess
import sys

import numpy as np
import pint
import pytest

from safeamp import quantities as q
from safeamp.quantities import KINDS, QuantityError, Sign, convert, quantity, read, read_any, registry
from safeamp.quantities.units import scale, scale_of_pint


def test_registry_is_built_once():
    assert registry() is registry()


@pytest.mark.parametrize("kind", list(KINDS.values()), ids=list(KINDS))
def test_units_of_a_kind_share_its_dimension(kind):
    ureg = registry()
    base = ureg.Quantity(1.0, kind.base or "dimensionless")
    for unit in [*kind.spellings.values(), *(unit for _, unit, _ in kind.shown)]:
        assert ureg.Quantity(1.0, unit).dimensionality == base.dimensionality


@pytest.mark.parametrize("kind", list(KINDS.values()), ids=list(KINDS))
def test_printing_units_rise(kind):
    least = [smallest for _, _, smallest in kind.shown]
    assert least == sorted(least)
    assert least[0] == 0.0


def test_our_units_agree_with_the_full_registry_of_pint():
    full = pint.UnitRegistry(cache_folder=None)
    for kind in KINDS.values():
        for unit in kind.spellings.values():
            if kind in (q.LEVEL, q.PERCENT, q.RATIO):
                continue
            factor, offset = (float(number) for number in scale(unit, kind.base))
            theirs = full.Quantity(7.0, unit).to(kind.base).magnitude
            assert 7.0 * factor + offset == pytest.approx(theirs, rel=1e-12)


@pytest.mark.parametrize("kind", list(KINDS.values()), ids=list(KINDS))
def test_a_shift_of_the_decimal_point_is_what_pint_says(kind):
    printed = [unit for _, unit, _ in kind.shown]
    for unit in [kind.base, *kind.spellings.values(), *printed]:
        assert scale(unit, kind.base) == scale_of_pint(unit, kind.base), unit


def test_differences_of_temperature_are_what_pint_says():
    for unit in q.TEMPERATURE.difference.values():
        assert scale(unit, "kelvin")[0] == scale_of_pint(unit, q.TEMPERATURE.base)[0]


def test_a_prefix_alone_loads_no_pint():
    code = (
        "import sys; from safeamp import quantities as q\n"
        "texts = (('22 mV', q.VOLTAGE), ('35 degC \u00b15 K', q.TEMPERATURE), ('20 %', q.PERCENT), ('5 min', q.TIME))\n"
        "print(*(q.show_reading(q.read(text, kind)) for text, kind in texts), 'pint' in sys.modules, sep='; ')\n"
        "q.read('300 K', q.TEMPERATURE)\n"
        "print('pint' in sys.modules)"
    )
    done = subprocess.run([sys.executable, "-X", "utf8", "-c", code], capture_output=True, check=False)
    assert (done.returncode, done.stderr.decode()) == (0, "")
    assert done.stdout.decode().split("\n") == [
        "22 mV, stated; 35 °C ±5 K, stated; 20 %, stated; 5 min, stated; False",
        "True",
        "",
    ]


def test_derived_units_of_formulas():
    # Ohm's law, the -3 dB corner, the force on a coil, heat through a thermal resistance.
    ureg = registry()
    volt, ohm, farad = (ureg.Quantity(1.0, unit) for unit in ("volt", "ohm", "farad"))
    assert (volt / ohm).to("A").magnitude == 1.0
    assert (volt**2 / ohm).to("W").magnitude == 1.0
    assert (1 / (ohm * farad)).to("Hz").magnitude == pytest.approx(1.0)
    assert ureg.Quantity(1.0, "tesla * meter").to("N/A").magnitude == pytest.approx(1.0)
    assert (ureg.Quantity(2.0, "K/W") * ureg.Quantity(3.0, "W")).to("K").magnitude == 6.0
    assert ureg.Quantity(180.0, "degree").to("radian").magnitude == pytest.approx(np.pi)
    assert ureg.Quantity(1.0, "joule").to("watt * second").magnitude == pytest.approx(1.0)
    with pytest.raises(pint.DimensionalityError):
        volt.to("A")


def test_quantity_of_numbers_and_arrays():
    assert quantity(35.0, q.VOLTAGE).to("mV").magnitude == 35000.0
    assert quantity(25.0, q.TEMPERATURE).to("kelvin").magnitude == pytest.approx(298.15)
    assert quantity(np.array([90.0, 180.0]), q.ANGLE).to("radian").magnitude == pytest.approx(
        [np.pi / 2, np.pi]
    )
    assert quantity(0.2, q.PERCENT).dimensionless


@pytest.mark.parametrize("kind", list(KINDS.values()), ids=list(KINDS))
def test_quantity_and_convert_are_inverse(kind):
    assert convert(quantity(0.75, kind), kind) == pytest.approx(0.75)


def test_convert():
    assert convert("22 mV", q.VOLTAGE) == 0.022
    assert convert("-22 mV", q.VOLTAGE) == -0.022
    assert convert(0.022, q.VOLTAGE) == 0.022
    assert convert(np.float64(0.022), q.VOLTAGE) == 0.022
    assert convert(25, q.TEMPERATURE) == 25.0
    assert convert("25 degC, measured", q.TEMPERATURE) == 25.0
    with pytest.raises(QuantityError, match="above zero"):
        convert("-22 mV", q.VOLTAGE, sign=Sign.POSITIVE)


@pytest.mark.parametrize("text", ["35 V ±2 %", "35 V, guess"])
def test_convert_does_not_drop_a_spread(text):
    with pytest.raises(
        QuantityError, match='is a guess, which is not used here; write one number, such as "35 V"'
    ):
        convert(text, q.VOLTAGE)


@pytest.mark.parametrize("value", [float("nan"), float("inf"), True, "nan V", None])
def test_convert_lets_no_odd_value_through(value):
    with pytest.raises(QuantityError, match="; "):
        convert(value, q.VOLTAGE)


def test_floats_and_quantities_only_where_allowed():
    assert read(35.0, q.VOLTAGE, allow_si=True).text == "35 V"
    assert read(quantity(35.0, q.VOLTAGE), q.VOLTAGE, allow_si=True).nominal == 35.0
    assert read_any(quantity(0.03, q.CURRENT), (q.VOLTAGE, q.CURRENT), allow_si=True).kind is q.CURRENT
    with pytest.raises(QuantityError, match="is not a voltage"):
        read(quantity(35.0, q.VOLTAGE), q.VOLTAGE)
    with pytest.raises(QuantityError, match="is not above zero"):
        read(-35.0, q.VOLTAGE, allow_si=True)
    with pytest.raises(QuantityError, match="35 kV is not believable here"):
        read(35000.0, q.VOLTAGE, allow_si=True)


def test_quantity_of_another_dimension_or_shape():
    with pytest.raises(QuantityError, match="a quantity in ampere is not a voltage; give a voltage in V"):
        convert(quantity(1.0, q.CURRENT), q.VOLTAGE)
    with pytest.raises(QuantityError, match="a quantity of several values is not one voltage"):
        convert(quantity(np.array([1.0, 2.0]), q.VOLTAGE), q.VOLTAGE)
    with pytest.raises(QuantityError, match='write a voltage, such as "35 V" or a current'):
        read_any(quantity(1.0, q.MASS), (q.VOLTAGE, q.CURRENT), allow_si=True)


def test_quantity_of_a_foreign_registry():
    foreign = pint.UnitRegistry(cache_folder=None)
    assert convert(foreign.Quantity(22.0, "mV"), q.VOLTAGE) == pytest.approx(0.022)
    assert convert(foreign.Quantity(77.0, "degF"), q.TEMPERATURE) == pytest.approx(25.0)


def test_import_loads_neither_pint_nor_numpy():
    code = (
        "import sys, safeamp.quantities\n"
        "heavy = {'pint', 'numpy', 'scipy', 'pandas', 'matplotlib'} & set(sys.modules)\n"
        "print(sorted(heavy))"
    )
    done = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=False)
    assert (done.returncode, done.stdout.strip(), done.stderr) == (0, "[]", "")


def test_kinds_are_found_by_name_and_compare_by_it():
    assert KINDS["voltage"] is q.VOLTAGE
    assert len({*KINDS.values()}) == len(KINDS)
    assert q.VOLTAGE.article == "a voltage"
    assert q.INDUCTANCE.article == "an inductance"
