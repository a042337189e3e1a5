"""Every formula: what it refuses, how nan passes, how arrays broadcast, which dimension comes out."""

import inspect

import numpy as np
import pint
import pytest

from tests.physics.formulas import ELSEWHERE, FORMULAS, MODULES, F, N, P

REGISTRY = pint.UnitRegistry()
PARAMETERS = [
    pytest.param(formula, name, id=f"{formula}-{name}") for formula in FORMULAS for name in formula.given
]


def test_every_public_formula_is_listed_here():
    listed = {formula.name for formula in FORMULAS} | ELSEWHERE
    public = {
        name
        for module in MODULES
        for name, item in inspect.getmembers(module, inspect.isfunction)
        if item.__module__ == module.__name__ and not name.startswith("_")
    }
    assert public == listed


@pytest.mark.parametrize("formula", FORMULAS, ids=str)
def test_every_number_is_listed_and_keyword_only(formula):
    signature = inspect.signature(getattr(formula.module, formula.name)).parameters
    assert all(parameter.kind is parameter.KEYWORD_ONLY for parameter in signature.values())
    optional = {"transconductance_parameter", "resistance_at"} - set(formula.given)
    assert set(signature) - optional == set(formula.given) | set(formula.words)


@pytest.mark.parametrize(("formula", "name"), PARAMETERS)
def test_refuses_below_its_range_and_says_name_and_value(formula, name):
    rule = formula.given[name][1]
    if rule == F:
        formula(**{name: formula.given[name][0]})
        return
    for bad in (-1.5, [1.0, -1.5]):
        with pytest.raises(ValueError, match=rf"^{name} must be {rule}, got -1\.5$"):
            formula(**{name: bad})
    if rule == P:
        with pytest.raises(ValueError, match=rf"^{name} must be {rule}, got 0\.0$"):
            formula(**{name: 0.0})
    if rule == N:
        assert not np.isnan(formula(**{name: 0.0}))


VALUES_OF_AN_AMPLIFIER = [one for one in PARAMETERS if one.values[1] != "largest_resistor"]


@pytest.mark.parametrize(("formula", "name"), VALUES_OF_AN_AMPLIFIER)
def test_nan_comes_out_as_nan_and_touches_no_other_case(formula, name):
    value = formula.given[name][0]
    with_nan = formula(**{name: np.array([value, np.nan])})
    assert with_nan[0] == pytest.approx(formula(), rel=1e-12)
    assert np.isnan(with_nan[1])


@pytest.mark.parametrize(("formula", "name"), PARAMETERS)
def test_cases_broadcast_and_agree_with_single_calls(formula, name):
    value = formula.given[name][0]
    cases = value * np.array([1.0, 1.02, 0.98])
    together = formula(**{name: cases})
    assert np.shape(together) in ((3,), ())
    single = [formula(**{name: one}) for one in cases]
    np.testing.assert_allclose(np.broadcast_to(together, 3), single, rtol=1e-9)


@pytest.mark.parametrize("formula", [f for f in FORMULAS if f.unit is not None], ids=str)
def test_quantities_run_through_to_the_right_dimension(formula):
    quantities = {name: REGISTRY.Quantity(value, unit) for name, (value, _, unit) in formula.given.items()}
    result = REGISTRY.Quantity(1.0, "") * formula(**quantities)
    assert result.to(formula.unit or "dimensionless").magnitude == pytest.approx(formula(), rel=1e-12)
