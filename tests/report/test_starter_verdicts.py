"""A starter shows an amplifier in good order: nothing holds it back but that its values are examples."""

import tomllib

import pytest

import safeamp
from safeamp.findings import Verdict
from safeamp.report.starters import render_starter


@pytest.mark.parametrize("kind", ["split-rail", "single-rail", "bridged", "mosfet", "bench-mockup"])
def test_no_example_is_a_stop_and_none_is_go(kind: str) -> None:
    report = safeamp.check(tomllib.loads(render_starter(kind)))
    assert report.verdict is Verdict.UNVERIFIED
    assert [one.id for one in report.findings if one.verdict is Verdict.STOP] == []
