"""Every line of every calculation, redone from its printed numbers."""

import math

import pytest

import safeamp
from safeamp.amplifier import with_values
from safeamp.answers import Working
from safeamp.checks import CHECKS
from safeamp.checks.working.book import WORKINGS, working_of
from safeamp.checks.working.paper import Paper
from safeamp.checks.working.register import working as register
from safeamp.physics.fuse import GATES, slowest_time
from safeamp.quantities import RATIO
from safeamp.report.working import number, put_in
from safeamp.studies.verdict import verdict
from tests.amplifiers import sheets as healthy
from tests.checks import loads
from tests.report.arithmetic import evaluated, half_a_digit, uncertainty
from tests.reports.recorded import SHEETS
from tests.scenarios import sheets

NAMES = (
    "healthy",
    "split_rail",
    "single_rail",
    "old_mains",
    "bench_mockup",
    "mosfet_substitute",
    "leaky_capacitor",
)
BRIDGED = {"stage.bridged": True, "readings.offset_other_side": "5 mV, measured", "heatsink.shared_by": 2}
FINS = {"width": "200 mm", "height": "75 mm", "depth": "40 mm", "thickness": "2 mm", "count": 14}
PULSE = [
    ["10 ms", ["40 V", "9 A"], ["100 V", "2.4 A"], ["160 V", "0.9 A"]],
    ["100 ms", ["40 V", "5 A"], ["100 V", "1.2 A"]],
]
PAIRS = [["0.05 K/W", "0.1 ms"], ["0.2 K/W", "1.5 ms"], ["0.35 K/W", "12 ms"], ["0.23 K/W", "90 ms"]]
WARM = {
    **sheets.tables("healthy")["device"]["fitted"],
    "junction_limit": "175 degC",
    "junction_to_case": "1 K/W",
}
#: Below this a difference of nearly equal numbers is not held to its digits.
SMALL = 0.5
#: What a sheet may say besides, one way of computing each.
OTHERWISE = {
    "bridged": BRIDGED,
    "bridged, signs not given": {**BRIDGED, "readings.offset_warm": "18 mV, measured"},
    "fins by ruler": {"heatsink.sink_to_air": sheets.GONE, "heatsink.fins": FINS},
    "pulse curves": {"device.fitted.pulse": PULSE},
    "a limiter that acts": {
        "protection.vi_limiter": [["0 V, measured", "2 A, measured"], ["50 V, measured", "0.2 A, measured"]]
    },
    "a limiter of one point": {"protection.vi_limiter": [["30 V", "1 A"]]},
    "Foster pairs": {"device.fitted.transient": PAIRS},
    "a series resistor": {"stage.series_resistor": "1 ohm"},
    "a series resistor in a bridge": {**BRIDGED, "stage.series_resistor": "1 ohm"},
    "several loudspeakers": {"loudspeaker.parallel": 2, "loudspeaker.series": 2},
    "two in parallel": {"loudspeaker.parallel": 2},
    "a label not believed": {"loudspeaker.dc_resistance": "3.1 ohm, measured"},
    "no minimum": {"loudspeaker.minimum_impedance": sheets.GONE},
    "no full load": {"supply.full_load": sheets.GONE},
    "unequal rails": {"supply.no_load": ["22 V", "21.5 V"], "supply.full_load": ["20 V", "19.4 V"]},
    "held rails": {"supply.source": "regulated"},
    "a clipped peak": {"stage.swing_loss": sheets.GONE, "stage.clipped_peak": "17.1 V, measured"},
    "no emitter resistor": {
        "stage.emitter_resistor": "none",
        "stage.idle": "40 mA, measured",
        "stage.idle_specified": sheets.GONE,
        "readings": {},
    },
    "two pairs": {
        "stage.pairs": 2,
        "readings.idle_upper": ["14 mV, measured", "15 mV, measured"],
        "readings.idle_lower": ["13.6 mV, measured", "14 mV, measured"],
    },
    "two pairs, one dead": {
        "stage.pairs": 2,
        "stage.pairs_conducting": 1,
        "readings.idle_upper": ["14 mV, measured", "0 mV, measured"],
        "readings.idle_lower": ["13.6 mV, measured", "13 mV, measured"],
    },
    "two pairs, imbalance stated": {"stage.pairs": 2, "stage.imbalance": "20 %", "readings": {}},
    "no sensor": {"stage.bias_sensor": "none"},
    "a sensor on the device": {"stage.bias_sensor": "device", "stage.bias_tracking": "90 %"},
    "set cold": {"stage.idle_at": "cold"},
    "a heatsink each": {"heatsink.each": True},
    "a fuse": {"protection.loudspeaker_fuse": "F 1 A", "protection.trip_delay": "none"},
    "a fuse behind a resistor": {
        "protection.loudspeaker_fuse": "F 1 A",
        "protection.trip_delay": "none",
        "stage.series_resistor": "1 ohm",
        "loudspeaker.parallel": 2,
    },
    "a fuse behind a series resistor": {
        "protection.loudspeaker_fuse": "F 1 A",
        "protection.trip_delay": "none",
        "stage.series_resistor": "1 ohm",
    },
    "no fuse printed": {"supply.rail_fuse_rated": "none"},
    "a transformer": {"supply.transformer_power": "80 W", "supply.secondary": "16 V"},
    "two devices": {"device.other": WARM, "stage.lower": "other"},
    "much idle": {"stage.idle": "300 mV, measured", "readings": {}},
    "readings gone": {"readings": {}},
    "an idle that runs away": {
        "stage.idle": "60 mV, measured",
        "stage.bias_sensor": "none",
        "heatsink.sink_to_air": "9 K/W",
    },
}
SINGLE = {
    "with ESR": {"output_capacitor.esr": "0.2 ohm"},
    "bridged": {"stage.bridged": True, "heatsink.shared_by": 2},
    "no midpoint": {"readings.midpoint": sheets.GONE},
    "a driver": loads.WOOFER,
    "measured": {
        "output_capacitor.capacitance": "650 uF, measured",
        "output_capacitor.marked_capacitance": "680 uF",
        "output_capacitor.ripple_current": "2 A",
    },
    "on the limiter": {
        "readings.taken_on": "limiter",
        "readings.limiter_rails": ["20 V"],
        "readings.limiter_output": "10.4 V",
        "readings.midpoint": "9.8 V, measured",
    },
    "a clipped peak": {
        "stage.swing_loss_up": sheets.GONE,
        "stage.swing_loss_down": sheets.GONE,
        "stage.clipped_peak": "23 V, measured",
    },
}


def _cases():
    for name in (*NAMES, "class_a", *healthy.NAMES):
        yield pytest.param(name, {}, id=name)
    for label, changes in OTHERWISE.items():
        yield pytest.param("healthy", changes, id=label)
    for label, changes in SINGLE.items():
        yield pytest.param("single_rail", changes, id=f"single rail, {label}")


CASES = list(_cases())


@pytest.fixture(scope="module")
def worked():
    kept = {}

    def of(name, changes):
        key = (name, repr(changes))
        if key not in kept:
            sheet = sheets.sheet(name, changes)
            kept[key] = {
                one.id: (one, working_of(one.id, sheet.amplifier, sheets.limits()))
                for one in sheets.report(name, changes).findings
            }
        return kept[key]

    return of


@pytest.mark.parametrize(
    "curve", [loads.curve_of(loads.woofer()), loads.flat_curve(6.0, 50.0)], ids=["woofer", "flat"]
)
@pytest.mark.parametrize(
    "changes", [{}, BRIDGED, {"stage.series_resistor": "1 ohm"}, {"loudspeaker.parallel": 2}]
)
@pytest.mark.parametrize("name", ["healthy", "single_rail"])
def test_the_worst_point_of_a_curve_is_worked_out(name, changes, curve):
    amplifier = loads.with_curve(sheets.sheet(name, changes).amplifier, curve)
    working = working_of("soa.loudspeaker", amplifier, sheets.limits())
    assert checked(working) > 20
    value = CHECKS["soa.loudspeaker"].run(amplifier, sheets.limits()).value
    assert working.lines[-1].value == pytest.approx(float(value), rel=1e-12)


@pytest.mark.parametrize("name", SHEETS)
def test_every_way_of_building_a_stage_is_worked_out(name):
    sheet = safeamp.load_sheet(SHEETS[name])
    for finding in verdict(sheet, sheets.limits()).findings:
        working = working_of(finding.id, sheet.amplifier, sheets.limits())
        checked(working)
        if finding.nominal is not None:
            assert working.lines[-1].value == pytest.approx(finding.nominal, rel=1e-12), finding.id


def test_every_finding_has_its_working_and_no_other():
    assert set(WORKINGS) == set(CHECKS)


@pytest.mark.parametrize(("name", "changes"), CASES)
def test_every_printed_line_comes_to_its_printed_result(worked, name, changes):
    found = worked(name, changes)
    assert sum(checked(working) for _, working in found.values()) > 2 * len(found)


def checked(working):
    """Redo every line that has numbers; return how many there were."""
    count = 0
    for line in working.lines:
        known = line.value is not None and math.isfinite(line.value)
        if not (line.formula and known and all(value is not None for _, value in line.terms)):
            continue
        text, printed = put_in(line), float(number(line.value))
        allowed = uncertainty(text) + half_a_digit(line.value) + 1e-12 * abs(line.value)
        assert abs(evaluated(text) - printed) <= allowed, (
            working.id,
            line.symbol,
            line.formula,
            text,
            printed,
        )
        assert allowed <= 1e-3 * abs(printed) or abs(printed) < SMALL, (
            working.id,
            line.symbol,
            text,
            allowed,
        )
        count += 1
    return count


@pytest.mark.parametrize(("name", "changes"), CASES)
def test_the_last_line_is_the_value_of_the_finding(worked, name, changes):
    for identity, (finding, working) in worked(name, changes).items():
        last = working.lines[-1]
        if finding.nominal is None:
            assert last.value is None or math.isinf(last.value) == finding.unbounded, identity
        else:
            assert last.value == pytest.approx(finding.nominal, rel=1e-12), identity
            assert last.kind == finding.kind or "1" in (last.kind.unit, finding.kind.unit)


@pytest.mark.parametrize(("name", "changes"), CASES)
def test_a_settled_current_is_proved_by_putting_it_in(worked, name, changes):
    found = worked(name, changes).get("bias.runaway")
    if found is None:
        return
    values = {line.symbol: line.value for line in found[1].lines}
    proofs = [symbol for symbol in values if symbol.startswith("V_takes")]
    for symbol in proofs:
        given = values[symbol.replace("takes", "gives")]
        assert given == pytest.approx(values[symbol], rel=1e-6, abs=1e-9)
    settled = [value for symbol, value in values.items() if symbol.startswith("u_")]
    assert len(proofs) == sum(value is not None and math.isfinite(value) for value in settled)


@pytest.mark.parametrize("label", ["a fuse", "a fuse behind a series resistor"])
def test_the_time_of_a_fuse_is_that_of_the_current_on_the_paper(worked, label):
    values = {
        line.symbol: line.value
        for line in worked("healthy", OTHERWISE[label])["loudspeaker.dc_fault"][1].lines
    }
    assert values["t_fuse"] == slowest_time(times_rating=values["x"], gates=GATES["F"])


def test_settled_currents_are_proved_at_all(worked):
    symbols = {line.symbol for line in worked("healthy", {})["bias.runaway"][1].lines}
    assert {"V_takes_now", "V_gives_warm", "V_gives_music"} <= symbols
    away = worked("healthy", OTHERWISE["an idle that runs away"])["bias.runaway"][1]
    assert any(line.symbol.startswith("u_") and math.isinf(line.value) for line in away.lines)


def test_a_value_without_a_formula_says_where_it_comes_from(worked):
    for name, changes in ((case.values[0], case.values[1]) for case in CASES):
        for _, working in worked(name, changes).values():
            for line in working.lines:
                assert line.formula or line.origin or line.value is None, (name, working.id, line)


def test_only_what_no_formula_gives_is_found_by_a_search(worked):
    found = {
        (working.id, line.symbol.split("_")[0])
        for name, changes in ((case.values[0], case.values[1]) for case in CASES)
        for _, working in worked(name, changes).values()
        for line in working.lines
        if line.origin.startswith("found ")
    }
    symbols = {"I", "psi", "u", "t", "V", "k", "dT", "f", "R"}
    assert {symbol for _, symbol in found} <= symbols
    assert not {identity for identity, _ in found} & {
        "supply.rail_to_rail", "supply.mains", "touch.voltage", "capacitor.voltage", "bias.idle", "offset.output",
        "loudspeaker.power", "loudspeaker.label", "capacitor.ripple",
    }  # fmt: skip


def test_a_symbol_that_no_line_explains_is_refused():
    paper = Paper(sheets.sheet("healthy").amplifier, sheets.limits())
    with pytest.raises(KeyError, match="V_nowhere"):
        paper.put("x", "nothing", "2 * V_nowhere", 1.0)


def test_a_symbol_keeps_its_first_value():
    paper = Paper(sheets.sheet("healthy").amplifier, sheets.limits())
    paper.taken("x", "first", 1.0, RATIO, "here")
    paper.taken("x", "second", 2.0, RATIO, "there")
    assert [line.words for line in paper.lines] == ["first"]


def test_a_finding_is_worked_out_once():
    with pytest.raises(ValueError, match=r"cold\.devices is worked out twice"):
        register("cold.devices")(lambda paper, value: None)


def test_what_does_not_apply_has_no_working():
    assert working_of("capacitor.wear", sheets.sheet("healthy").amplifier, sheets.limits()) is None


def test_a_value_that_no_amplifier_can_have_is_said(worked):
    amplifier = with_values(sheets.sheet("healthy").amplifier, {"stage.swing_loss": 30.0})
    last = working_of("soa.loudspeaker", amplifier, sheets.limits()).lines[-1]
    assert last.value is None
    assert "cannot be computed: side_voltage less swing_loss" in last.words


@pytest.mark.parametrize("text", ["__import__('os')", "2 +", "x", "[1]", "max.real", "'a'"])
def test_the_calculator_takes_nothing_but_arithmetic(text):
    with pytest.raises((ValueError, SyntaxError, KeyError)):
        evaluated(text)


def test_the_calculator_knows_how_far_rounding_moves_a_line():
    assert uncertainty("123456 - 123455") == pytest.approx(1.0)
    assert uncertainty("1 / 4") == pytest.approx(0.25 * 1e-5, rel=0.5)


def test_a_wrong_line_is_noticed():
    paper = Paper(sheets.sheet("healthy").amplifier, sheets.limits())
    paper.taken("x", "two", 2.0, RATIO, "here")
    paper.put("y", "its double", "2 * x", 4.001)
    with pytest.raises(AssertionError):
        checked(Working("none", tuple(paper.lines)))
