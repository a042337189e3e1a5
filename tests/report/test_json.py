import json
from dataclasses import replace
from typing import Any

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from safeamp.findings import Also, Bound
from safeamp.quantities import RATIO, TEMPERATURE
from safeamp.report.json_ import as_json, as_mapping, plain
from tests.report.hand_made import DEVICES, OFFSET, SAFE_AREA, report_of

ORDER = [
    "safeamp",
    "title",
    "scope",
    "verdict",
    "steps",
    "findings",
    "not_applicable",
    "assumptions",
    "safety",
]


def refuse(word: str) -> Any:
    raise AssertionError(f"{word} in JSON")


def read_back(text: str) -> Any:
    return json.loads(text, parse_constant=refuse)


def test_the_text_reads_back_as_it_was() -> None:
    report = report_of(DEVICES, OFFSET, SAFE_AREA)
    assert read_back(as_json(report)) == as_mapping(report)


def test_keys_stand_in_their_order() -> None:
    found = read_back(
        as_json(report_of(DEVICES, overridden=("soa.loudspeaker",), unassessed={"a.b": ("c.d",)}))
    )
    assert list(found)[: len(ORDER)] == ORDER
    assert found["overridden"] == ["soa.loudspeaker"]
    assert found["unassessed"] == {"a.b": ["c.d"]}
    assert found["sheet"] == {"source": "amp.toml", "sha256": "ab" * 32}


def test_a_finding_as_a_whole() -> None:
    found = read_back(as_json(report_of(SAFE_AREA)))["findings"][0]
    assert found == {
        "id": "soa.loudspeaker",
        "step": "loudspeaker",
        "verdict": "stop",
        "says": "The device leaves its safe area into this loudspeaker.",
        "value": {"nominal": 1.21, "worst": 1.43, "unit": "1"},
        "also": [{"at": "60 deg", "value": 1.55, "unit": "1"}],
        "limit": {
            "go": 0.8,
            "stop": 1.0,
            "sense": "at most",
            "unit": "1",
            "source": "definition",
            "evidence": "common practice",
            "overridden": False,
        },
        "worst_case": {"supply.no_load.0": 38.5, "mains.present": 253.0, "stage.pairs": 1.0},
        "at": {"voltage": 36.4, "current": 3.1, "zone": "power"},
        "inputs": [{"key": "loudspeaker.phase_angle", "value": 45.0, "unit": "deg", "origin": "assumed"}],
        "needs": ["stage.rated_load"],
        "next": "Use a loudspeaker of more ohms.",
        "method": "closed envelope",
        "because": ["1.21 of the safe area is used"],
        "overturned_by": "loudspeaker.phase_angle",
        "explanation": "",
        "to_be_read": False,
    }


def test_steps_with_nothing_to_judge_are_null() -> None:
    steps = as_mapping(report_of(DEVICES, OFFSET, SAFE_AREA))["steps"]
    assert steps[0] == {"step": "cold checks", "verdict": "go", "reached": True}
    assert steps[1] == {"step": "first power-up", "verdict": None, "reached": True}
    assert steps[5] == {"step": "loudspeaker", "verdict": "stop", "reached": False}


@pytest.mark.parametrize(
    ("more", "value"),
    [
        ({"nominal": None, "worst": None}, {"nominal": None, "worst": None, "unit": "1"}),
        ({"nominal": float("nan")}, {"nominal": None, "worst": 1.43, "unit": "1"}),
        ({"worst": float("inf")}, {"nominal": 1.21, "worst": None, "unit": "1", "unbounded": True}),
        (
            {"nominal": None, "worst": None, "unbounded": True},
            {"nominal": None, "worst": None, "unit": "1", "unbounded": True},
        ),
    ],
)
def test_what_is_not_known_is_null(more: dict, value: dict) -> None:
    assert as_mapping(report_of(replace(SAFE_AREA, **more)))["findings"][0]["value"] == value


def test_temperatures_are_in_degc_and_a_pair_of_levels_is_a_list() -> None:
    bound = Bound((20.0, 60.0), None, "between", "s", "memory", True)
    finding = replace(DEVICES, kind=TEMPERATURE, nominal=55.0, bound=bound)
    found = as_mapping(report_of(finding))["findings"][0]
    assert found["value"]["unit"] == "degC"
    assert found["limit"]["go"] == [20.0, 60.0]
    assert found["limit"]["unit"] == "degC"
    assert found["limit"]["stop"] is None
    assert found["limit"]["overridden"] is True


def test_a_finding_without_limit_has_none() -> None:
    assert as_mapping(report_of(replace(DEVICES, bound=None)))["findings"][0]["limit"] is None


@settings(deadline=None)
@given(st.floats(), st.floats(), st.floats())
def test_no_number_breaks_the_json(nominal: float, worst: float, other: float) -> None:
    finding = replace(
        SAFE_AREA,
        nominal=nominal,
        worst=worst,
        also=(Also("x", other, RATIO),),
        worst_case={"a.b": other},
        at={"current": other},
    )
    assert read_back(as_json(report_of(finding)))["findings"][0]["id"] == "soa.loudspeaker"


@pytest.mark.parametrize(("value", "found"), [(True, True), ("dark", "dark"), (None, None), (2, 2.0)])
def test_words_and_flags_stay_as_they_are(value: object, found: object) -> None:
    assert plain(value) == found
    assert type(plain(value)) is type(found)


def test_what_is_not_one_value_is_refused() -> None:
    with pytest.raises(TypeError, match="list"):
        plain([1.0, 2.0])
