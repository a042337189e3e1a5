"""Looking up limits by id, with the nearest name when it is not known."""

from dataclasses import FrozenInstanceError

import pytest

from safeamp.limits import nearest, plain
from safeamp.reading.limits import load_limits


@pytest.fixture(scope="module")
def limits():
    return load_limits()


def test_unknown_limit_names_the_nearest(limits):
    with pytest.raises(KeyError, match=r"offset\.ouput is not a known limit; did you mean offset\.output\?"):
        limits["offset.ouput"]


def test_unknown_default_names_the_nearest(limits):
    with pytest.raises(KeyError, match=r"known default; did you mean heatsink\.insulator\?"):
        limits.default("heatsink.insulater")


def test_unknown_level_names_the_nearest(limits):
    with pytest.raises(KeyError, match=r"known level; did you mean level\.one_third\?"):
        limits.level("level.one_thrid")


def test_unknown_interface_names_the_nearest(limits):
    with pytest.raises(
        KeyError, match=r"known interface between case and heatsink; did you mean to 3 mica dry\?"
    ):
        limits.interface("to-3 mica dri")


def test_nothing_near_is_not_guessed(limits):
    with pytest.raises(KeyError, match=r"zzz is not a known limit'"):
        limits["zzz"]


@pytest.mark.parametrize("name", ["to-3 mica greased", "TO-3 mica-greased", "to 3  mica greased"])
def test_interface_may_be_typed_with_hyphens_or_blanks(limits, name):
    assert limits.interface(name).name == "to-3 mica greased"


def test_names_in_plain_form():
    assert plain("TO-3  Mica-Greased ") == "to 3 mica greased"


def test_nearest_of_none_is_empty():
    assert nearest("offset.output", []) == ""


def test_a_limit_cannot_be_changed_in_place(limits):
    with pytest.raises(FrozenInstanceError):
        limits["offset.output"].go = 1.0
    with pytest.raises(TypeError):
        limits.entries["offset.output"] = None
    with pytest.raises(TypeError):
        limits["offset.output"].extra["switch_off_above"] = 9.0


def test_limits_are_read_once(limits):
    assert load_limits() is limits
