"""Every public function of physics says its parameters, what it refuses and where its formula comes from."""

import inspect
import re

import pytest

from tests.docs.test_parameters import functions, taken

FUNCTIONS = functions()
#: Looked up in a table by one value: nothing could be mistaken for it.
ALONE = {"preferred.next_preferred", "preferred.next_rated_voltage", "safe_area.points_problem"}
SECTION = re.compile(r"(?m)^([A-Z]\w+)\n-{3,}$")


def sections(function) -> dict[str, str]:
    """Return the sections of a docstring by their titles."""
    parts = SECTION.split(inspect.getdoc(function) or "")
    return dict(zip(parts[1::2], parts[2::2], strict=True))


def described(text: str) -> set[str]:
    """Return the names that a section of parameters describes; a list of names may run over lines."""
    whole = re.sub(r",\s*\\?\n", ", ", text)
    heads = re.findall(r"(?m)^(\w[\w, ]*?)(?: : .*)?$", whole)
    return {name.strip() for head in heads for name in head.split(",")}


def borrowed(function) -> set[str]:
    """Return the parameters of the functions to which "as in" and "as for" refer."""
    names = re.findall(r"[Aa]s (?:in|for) `(\w+)`", inspect.getdoc(function) or "")
    found = [inspect.signature(other) for key, other in FUNCTIONS.items() if key.rpartition(".")[2] in names]
    return {parameter for signature in found for parameter in signature.parameters}


@pytest.mark.parametrize("name", FUNCTIONS)
def test_first_line_is_a_sentence(name):
    first = (inspect.getdoc(FUNCTIONS[name]) or "").partition("\n")[0]
    assert re.fullmatch(r"[A-Z].*[.]", first), name


@pytest.mark.parametrize("name", FUNCTIONS)
def test_parameters_and_references(name):
    function = FUNCTIONS[name]
    found = sections(function)
    assert "References" in found, f"{name} does not say where its formula comes from"
    parameters = taken(function)
    own = described(found.get("Parameters", ""))
    assert own <= parameters, f"{name} describes what it does not take"
    assert parameters <= own | borrowed(function), name


@pytest.mark.parametrize("name", FUNCTIONS)
def test_what_it_refuses(name):
    source = inspect.getsource(FUNCTIONS[name])
    if re.search(r"\b(?:raise |positive\(|non_negative\(|within\(|refuse\()", source):
        said = "errors as in" in (inspect.getdoc(FUNCTIONS[name]) or "")
        assert said or "Raises" in sections(FUNCTIONS[name]), name


@pytest.mark.parametrize("name", FUNCTIONS)
def test_arguments_are_given_by_name(name):
    if name in ALONE:
        return
    kinds = {parameter.kind for parameter in inspect.signature(FUNCTIONS[name]).parameters.values()}
    assert kinds <= {inspect.Parameter.KEYWORD_ONLY, inspect.Parameter.VAR_KEYWORD}, name
