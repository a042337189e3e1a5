"""The user's own limits file: what it may replace, what it is refused, and that the report can tell."""

import pytest

from safeamp.complaints import ReadingError
from safeamp.reading.limits import load_limits


@pytest.fixture
def override(tmp_path):
    def load(text):
        path = tmp_path / "own.toml"
        path.write_text(text, encoding="utf-8")
        return load_limits(path)

    return load


def complaints_of(override, text):
    with pytest.raises(ReadingError) as caught:
        override(text)
    return [(one.line, one.key, one.text) for one in caught.value.complaints]


def test_a_level_is_replaced_and_marked(override):
    limits = override('[offset.output]\ngo = "30 mV"\nsource = "own rule"\nsays = "Mine."\n')
    limit = limits["offset.output"]
    assert (limit.go, limit.stop) == (0.03, 0.1)
    assert (limit.source, limit.evidence, limit.says) == ("own rule", "stated", "Mine.")
    assert limits.overridden == (limit,)


def test_without_a_source_the_file_is_the_source(override):
    limit = override('[offset.output]\nstop = "80 mV"\n')["offset.output"]
    assert limit.source.startswith("the user's own limits file ")
    assert limit.source.endswith("own.toml")


def test_shipped_limits_stay_as_they_were(override):
    override('[offset.output]\ngo = "30 mV"\n')
    assert load_limits()["offset.output"].go == 0.05
    assert load_limits().overridden == ()


def test_only_another_sentence_keeps_the_source_of_the_number(override):
    limit = override('[offset.output]\nsays = "Mine."\n')["offset.output"]
    assert limit.evidence == "common practice"
    assert limit.overridden


def test_an_inner_limit_is_replaced_without_its_outer_one(override):
    limits = override('[touch.mains.earth]\ngo = "0.05 ohm"\n')
    assert [limit.id for limit in limits.overridden] == ["touch.mains.earth"]
    assert limits["touch.mains.earth"].go == 0.05


def test_outer_and_inner_limit_together(override):
    limits = override('[touch.mains]\ngo = "5 Mohm"\n[touch.mains.earth]\nstop = "0.2 ohm"\n')
    assert (limits["touch.mains"].go, limits["touch.mains.earth"].stop) == (5e6, 0.2)


def test_a_further_number_is_replaced(override):
    limit = override("[heat.junction]\ngo_share_of_span = 0.7\n")["heat.junction"]
    assert dict(limit.extra) == {"span_from": 25, "go_share_of_span": 0.7}


def test_a_pair_is_replaced(override):
    assert override("[supply.mains]\ngo = [0.95, 1.02]\n")["supply.mains"].go == (0.95, 1.02)


def test_equal_levels_are_allowed(override):
    assert override('[offset.output]\ngo = "100 mV"\n')["offset.output"].go == 0.1


@pytest.mark.parametrize(
    ("text", "line", "key", "said"),
    [
        ('[offset.ouput]\ngo = "1 mV"\n', 1, "offset.ouput", "did you mean offset.output?"),
        ('[ofset.output]\ngo = "1 mV"\n', 1, "ofset", "not a known limit; did you mean offset?"),
        ('offset = "1 mV"\n', 1, "offset", "not a known limit"),
        ('[offset]\ngo = "1 mV"\n', 2, "offset.go", "not a known limit"),
        ("[offset.output]\n", 1, "offset.output", "sets nothing"),
        ('[offset.output]\nsotp = "1 V"\n', 2, "offset.output.sotp", "did you mean stop?"),
        ('[offset.output]\nsense = "at least"\n', 2, "offset.output.sense", "not a known key of this limit"),
        (
            '[offset.output]\nunit = "V"\n',
            2,
            "offset.output.unit",
            "write go, stop, says, source, switch_off",
        ),
        ("[offset.output]\ngo = 0.05\n", 2, "offset.output.go", "has no unit"),
        ('[offset.output]\ngo = "50 mA"\n', 2, "offset.output.go", "current"),
        ('[offset.output]\ngo = "0,05 V"\n', 2, "offset.output.go", "decimal"),
        ('[offset.output]\ngo = "50 mV ±10 %"\n', 2, "offset.output.go", "tolerance"),
        ('[offset.output]\ngo = "-50 mV"\n', 2, "offset.output.go", "zero"),
        ('[offset.output]\ngo = ["1 mV", "2 mV"]\n', 2, "offset.output.go", 'do not go with "at most"'),
        ('[offset.output]\ngo = "200 mV"\n', 1, "offset.output", "contradict each other"),
        ('[cold.devices]\ngo = "99 ohm"\n', 1, "cold.devices", "contradict each other"),
        ("[bias.drift]\ngo = nan\n", 2, "bias.drift.go", "nan is no finite number"),
        ("[bias.drift]\nstop = inf\n", 2, "bias.drift.stop", "inf is no finite number"),
        ("[bias.drift]\ngo = true\n", 2, "bias.drift.go", "true"),
        ("[supply.mains]\ngo = [0.9, 1.0, 1.1]\n", 2, "supply.mains.go", "3 numbers"),
        ("[supply.mains]\ngo = [1.1, 0.9]\n", 1, "supply.mains", "contradict each other"),
        ("[supply.mains]\nstop = 1.04\n", 1, "supply.mains", "contradict each other"),
        ('[touch.rails]\nstop = "80 V"\n', 2, "touch.rails.stop", "no stop level of its own; it has go"),
        ('[heat.junction]\ngo = "120 degC"\n', 2, "heat.junction.go", "it has span_from, go_share_of_span"),
        ('[capacitor.cutoff]\ngo = "20 Hz"\n', 2, "capacitor.cutoff.go", "it has no numbers"),
        ('[offset.output]\nsays = ""\n', 2, "offset.output.says", "is no sentence"),
        ("[offset.output]\nsource = 5\n", 2, "offset.output.source", "is no sentence"),
        ("[heatsink.insulator]\nvalue = 1.0\n", 1, "heatsink", "not a known limit"),
    ],
)
def test_refused(override, text, line, key, said):
    [(found_line, found_key, found_text)] = complaints_of(override, text)
    assert (found_line, found_key) == (line, key)
    assert said in found_text


def test_every_problem_is_told_at_once(override):
    text = "[offset.output]\ngo = 1\nsotp = 2\n\n[bias.drfit]\ngo = 1.1\n"
    assert [(line, key) for line, key, _ in complaints_of(override, text)] == [
        (2, "offset.output.go"),
        (3, "offset.output.sotp"),
        (5, "bias.drfit"),
    ]


def test_a_file_that_sets_nothing_is_refused(override):
    assert complaints_of(override, "# go = 5\n") == [
        (None, "", "sets no limit; write a table such as [offset.output]")
    ]


def test_a_missing_file_is_told(tmp_path):
    with pytest.raises(ReadingError, match=r"none\.toml: cannot be read: No such file"):
        load_limits(tmp_path / "none.toml")
