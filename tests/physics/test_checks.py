"""The shared refusals."""

import numpy as np
import pint
import pytest

from safeamp.physics._checks import array, non_negative, positive, within


def test_numbers_become_float_arrays():
    assert array(3).dtype == float
    assert array([1, 2]).dtype == float
    assert array(np.array([1, 2])).dtype == float


def test_foreign_arrays_pass_through():
    quantity = pint.UnitRegistry().Quantity(3.0, "V")
    assert array(quantity) is quantity


@pytest.mark.parametrize("value", [1e-300, 1, [1, 2], np.nan, [np.nan, 1], np.inf])
def test_positive_accepts(value):
    positive(anything=value)


@pytest.mark.parametrize(
    ("value", "shown"), [(0, "0"), (-1e-300, "-1e-300"), ([1.0, -2.0, -3.0], r"-2\.0"), (-np.inf, "-inf")]
)
def test_positive_refuses_and_shows_the_first(value, shown):
    with pytest.raises(ValueError, match=f"^rail must be greater than zero, got {shown}$"):
        positive(load=8.0, rail=value)


@pytest.mark.parametrize("value", [0, 1, [0, 2], np.nan, [np.nan, 0]])
def test_non_negative_accepts(value):
    non_negative(anything=value)


def test_non_negative_refuses():
    with pytest.raises(ValueError, match=r"^idle must be zero or more, got -0\.1$"):
        non_negative(rail=0.0, idle=[[0.0], [-0.1]])


@pytest.mark.parametrize("value", [0, 1, 0.5, np.nan])
def test_within_includes_both_ends(value):
    within(0.0, 1.0, share=value)


@pytest.mark.parametrize("value", [-1e-12, 1 + 1e-12])
def test_within_refuses_just_outside(value):
    with pytest.raises(ValueError, match=f"^share must be between 0 and 1, got {value}$"):
        within(0.0, 1.0, share=value)
