"""What a driver's parameters tell: bass through an output capacitor, any signal, heat, travel, several loudspeakers."""

import numpy as np
import pytest

from safeamp.checks import CHECKS, operating
from safeamp.checks.as_built import as_built
from safeamp.findings import Verdict
from safeamp.physics import any_signal, capacitor, coupling
from safeamp.physics import driver as drivers
from safeamp.studies.findings import Bench, look
from tests.checks.loads import WOOFER, flat_curve, judged, woofer
from tests.scenarios.sheets import GONE, beside, finding, limits, report, sheet

INDUCTANCE = {"loudspeaker.inductance": "0.4 mH"}
MECHANICS = {"loudspeaker.force_factor": "8 N/A", "loudspeaker.linear_excursion": "4 mm"}
THERMAL = {
    "loudspeaker.coil_to_magnet": "4 K/W",
    "loudspeaker.coil_time_constant": "5 s",
    "loudspeaker.magnet_to_air": "3 K/W",
    "loudspeaker.magnet_time_constant": "20 min",
    "loudspeaker.coil_limit": "200 degC",
}
POWER = {"loudspeaker.rated_power": "60 W", "loudspeaker.power_word": "rated noise"}
ANY = "largest current of any signal"


def has(one, at):
    return any(also.at.startswith(at) for also in one.also)


def test_cutoff_into_a_driver():
    one = finding(report("single_rail", {**WOOFER, **INDUCTANCE}), "capacitor.cutoff")
    wanted = coupling.cutoff_frequency(driver=woofer(), capacitance=680e-6)
    assert one.nominal == pytest.approx(float(wanted))
    peak, at = coupling.low_peak(driver=woofer(), capacitance=680e-6)
    assert beside(one, "highest response of the low notes") == pytest.approx(float(peak))
    assert beside(one, "frequency of that response") == pytest.approx(float(at))
    plain = finding(report("single_rail"), "capacitor.cutoff")
    assert beside(one, "-3 dB into a resistor of the minimum impedance") == pytest.approx(plain.nominal)
    assert not has(plain, "-3 dB into a resistor")
    assert plain.nominal == pytest.approx(
        float(capacitor.cutoff_frequency(capacitance=680e-6, load_resistance=6.4))
    )


def test_cutoff_is_worst_at_a_corner_of_the_capacitor():
    one = finding(
        report("single_rail", {**WOOFER, "output_capacitor.capacitance": "1000 uF -20/+50 %"}),
        "capacitor.cutoff",
    )
    ends = coupling.cutoff_frequency(driver=woofer(0.0), capacitance=np.array([800e-6, 1500e-6]))
    assert one.worst == pytest.approx(float(np.max(ends)))
    assert one.worst > one.nominal


def test_esr_and_series_resistor_count_in_the_cutoff():
    more = {"output_capacitor.esr": "0.2 ohm", "stage.series_resistor": "0.3 ohm"}
    one = finding(report("single_rail", {**WOOFER, **more}), "capacitor.cutoff")
    wanted = coupling.cutoff_frequency(driver=woofer(0.0), capacitance=680e-6, series_resistor=0.5)
    assert one.nominal == pytest.approx(float(wanted))


@pytest.mark.parametrize("left_out", WOOFER)
def test_a_driver_that_is_begun_and_not_finished_is_not_passed_over(left_out):
    one = finding(
        report("single_rail", {**WOOFER, left_out: GONE}),
        "capacitor.cutoff",
    )
    assert one.verdict is Verdict.UNVERIFIED
    assert one.needs == (left_out,)
    assert any(f"{left_out} not given" in because for because in one.because)


def test_a_coil_alone_is_no_driver_that_was_begun():
    one = finding(report("single_rail", {"loudspeaker.dc_resistance": "6.2 ohm"}), "capacitor.cutoff")
    assert one.verdict is Verdict.CAUTION
    assert one.needs == ()


def test_mass_compliance_and_force_factor_stand_for_resonance_and_electrical_q():
    mass, compliance = drivers.mechanics(force_factor=8.0, motional=woofer().motional)
    moving = {
        "loudspeaker.dc_resistance": "6.2 ohm",
        "loudspeaker.q_mechanical": 4.0,
        "loudspeaker.force_factor": "8 N/A",
        "loudspeaker.moving_mass": f"{1e3 * mass:.9f} g",
        "loudspeaker.compliance": f"{1e3 * compliance:.9f} mm/N",
    }
    one = finding(report("single_rail", moving), "capacitor.cutoff")
    other = finding(report("single_rail", WOOFER), "capacitor.cutoff")
    assert one.nominal == pytest.approx(other.nominal)


def test_minimum_of_a_curve_counts_in_the_cutoff(tmp_path):
    one = finding(judged(tmp_path, flat_curve(5.0, 20.0), "single_rail"), "capacitor.cutoff")
    wanted = capacitor.cutoff_frequency(capacitance=680e-6, load_resistance=5.0)
    assert one.nominal == pytest.approx(float(wanted))


def test_largest_current_of_any_signal_beside_that_of_a_sine():
    one = finding(report("split_rail", {**WOOFER, **INDUCTANCE}), "soa.loudspeaker")
    amplifier = sheet("split_rail").amplifier
    side = operating.sides(amplifier)[0]
    peak = float(operating.peak_into(amplifier, side.burst, side.loss, 8.0))
    norm = float(any_signal.admittance_norm(driver=woofer()))
    assert beside(one, ANY) == pytest.approx(peak * norm)
    lowest = float(operating.peak_into(amplifier, side.burst, side.loss, 6.4))
    assert beside(one, "largest current of a sine") == pytest.approx(lowest / 6.4)
    assert beside(one, ANY) > beside(one, "largest current of a sine")
    limit = amplifier.device["fitted"].current
    assert beside(one, "any signal, of the current limit") == pytest.approx(peak * norm / limit)
    plain = finding(report("split_rail"), "soa.loudspeaker")
    assert (one.nominal, one.worst, one.verdict) == (plain.nominal, plain.worst, plain.verdict)


def test_any_signal_through_capacitor_and_resistor():
    more = {"output_capacitor.esr": "0.2 ohm", "stage.series_resistor": "0.3 ohm"}
    one = finding(report("single_rail", {**WOOFER, **more}), "soa.loudspeaker")
    amplifier = sheet("single_rail", {**WOOFER, **more}).amplifier
    norm = any_signal.admittance_norm(driver=woofer(0.0), series_resistor=0.5, capacitance=680e-6)
    peaks = [
        float(operating.peak_into(amplifier, side.burst, side.loss, operating.nominal_load(amplifier)[0]))
        for side in operating.sides(amplifier)
    ]
    assert beside(one, ANY) == pytest.approx(max(peaks) * float(norm))


def test_any_signal_is_not_shown_without_a_whole_driver(tmp_path):
    assert not has(finding(report("split_rail"), "soa.loudspeaker"), ANY)
    partly = {**WOOFER, "loudspeaker.q_electrical": GONE}
    assert not has(finding(report("split_rail", partly), "soa.loudspeaker"), ANY)
    with_curve = judged(tmp_path, flat_curve(8.0, 45.0), "split_rail")
    assert not has(finding(with_curve, "soa.loudspeaker"), ANY)


def test_what_is_only_shown_moves_no_corner_and_is_still_an_input():
    loose = {"loudspeaker.q_electrical": 0.4, "loudspeaker.inductance": "0.4 mH ±30 %"}
    one = finding(report("split_rail", {**WOOFER, **loose}), "soa.loudspeaker")
    assert "loudspeaker.inductance" in {item.key for item in one.inputs}
    assert "loudspeaker.inductance" not in one.worst_case
    example = {**WOOFER, "loudspeaker.inductance": "0.4 mH, example"}
    assert finding(report("split_rail", example), "soa.loudspeaker").verdict >= Verdict.UNVERIFIED


def test_programme_power_and_where_coil_and_magnet_settle():
    crest = {"loudspeaker.crest_factor": "12 dB"}
    one = finding(report("split_rail", {**POWER, **THERMAL, **crest}), "loudspeaker.power")
    sine = beside(one, "power at clipping")
    programme = beside(one, "power of the programme at clipping")
    assert programme == pytest.approx(2.0 * sine / 10**1.2)
    for power, what in ((programme, "the programme"), (2.0 * sine, "a fully clipped sine")):
        coil = beside(one, f"coil in the end with {what}")
        # P/(copper's ratio)·(4 + 3) K/W above 25 degC: what was given balances what is left of the power
        left = power / (1.0 + 0.00393 * (coil - 20.0))
        assert coil - 25.0 == pytest.approx(left * 7.0)
        assert beside(one, f"magnet in the end with {what}") - 25.0 == pytest.approx(left * 3.0)
    plain = finding(report("split_rail", POWER), "loudspeaker.power")
    assert one.nominal == plain.nominal == pytest.approx(sine / 60.0)
    assert not has(plain, "coil in the end")
    assert not has(plain, "power of the programme")


def test_a_larger_crest_factor_heats_less():
    answers = [
        report("split_rail", {**POWER, **THERMAL, "loudspeaker.crest_factor": f"{crest} dB"})
        for crest in (3.01, 6.0, 12.0, 20.0)
    ]
    hot = [beside(finding(one, "loudspeaker.power"), "coil in the end with the programme") for one in answers]
    assert hot == sorted(hot, reverse=True)


def test_travel_at_clipping():
    one = finding(report("split_rail", {**POWER, **WOOFER, **MECHANICS}), "loudspeaker.power")
    peak = float(operating.clipping_peak(sheet("split_rail").amplifier))
    sweep = drivers.excursion(
        driver=woofer(0.0), force_factor=8.0, peak=peak, frequency=np.linspace(20.0, 90.0, 5001)
    )
    at = "cone travel at clipping, sine from 20 Hz"
    assert beside(one, at) == pytest.approx(float(np.max(sweep)), rel=1e-6)
    assert beside(one, f"{at}, of the linear excursion") == pytest.approx(float(np.max(sweep)) / 4e-3)
    assert not has(finding(report("split_rail", {**POWER, **WOOFER}), "loudspeaker.power"), at)


def test_two_in_series_share_volts_and_power():
    one = finding(report("split_rail", {**POWER, **MECHANICS, **WOOFER}), "loudspeaker.power")
    two = finding(
        report("split_rail", {**POWER, **MECHANICS, **WOOFER, "loudspeaker.series": 2}), "loudspeaker.power"
    )
    amplifier = sheet("split_rail", {"loudspeaker.series": 2}).amplifier
    assert operating.nominal_load(amplifier)[0] == 16.0
    peak = float(operating.clipping_peak(amplifier))
    assert beside(two, "power at clipping") == pytest.approx(peak**2 / 2.0 / 16.0 / 2.0)
    assert beside(two, "power at clipping") < 0.3 * beside(one, "power at clipping")
    at = "cone travel at clipping, sine from 20 Hz"
    assert beside(two, at) == pytest.approx(beside(one, at) * peak / 2.0 / _clipping("split_rail"))


def _clipping(name):
    return float(operating.clipping_peak(sheet(name).amplifier))


def test_two_in_series_share_a_shorted_rail_and_an_offset():
    one, two = (report("healthy", {"loudspeaker.series": count}) for count in (1, 2))
    alone, shared = (finding(answer, "loudspeaker.dc_fault").nominal for answer in (one, two))
    assert shared == pytest.approx(alone / 4.0)
    alone, shared = (beside(finding(answer, "offset.output"), "power in the coil") for answer in (one, two))
    assert shared == pytest.approx(alone / 4.0)
    assert "2 in series of 8 ohm loudspeaker" in two.scope


def test_series_of_two_in_parallel_are_the_load_of_one():
    alone = report("split_rail")
    four = report("split_rail", {"loudspeaker.series": 2, "loudspeaker.parallel": 2})
    for identity in ("soa.loudspeaker", "heat.heatsink", "heat.junction", "touch.voltage"):
        assert finding(four, identity).nominal == finding(alone, identity).nominal
    assert "2 in parallel of 2 in series of 8 ohm loudspeaker" in four.scope


SWITCH_ON = {
    "output_capacitor.rise_time": "20 ms",
    "output_capacitor.bleeder": "1 kohm",
    "loudspeaker.compliance": "1 mm/N",
}


def test_switch_on_with_the_motion_of_the_driver():
    one = finding(report("single_rail", {**WOOFER, **MECHANICS, **SWITCH_ON}), "offset.midpoint")
    given = {"capacitance": 680e-6, "load_resistance": 8.0, "midpoint": 30.4, "rise_time": 0.02}
    assert beside(one, "peak across the loudspeaker at switch-on") == pytest.approx(
        float(capacitor.turn_on_peak(**given))
    )
    energy = beside(one, "energy into the loudspeaker at switch-on")
    assert energy == pytest.approx(float(capacitor.turn_on_energy(**given)))
    assert energy < 680e-6 * 30.4**2 / 2.0
    moved = coupling.turn_on_displacement(
        driver=woofer(0.0), force_factor=8.0, capacitance=680e-6, midpoint=30.4, rise_time=0.02
    )
    at = "cone displacement at switch-on"
    assert beside(one, at) == pytest.approx(moved)
    assert beside(one, f"{at}, of the linear excursion") == pytest.approx(moved / 4e-3)


def test_switch_on_with_force_factor_and_compliance_alone_takes_the_peak_as_if_it_stood():
    bare = {**MECHANICS, **SWITCH_ON, "loudspeaker.dc_resistance": "6.2 ohm"}
    one = finding(report("single_rail", bare), "offset.midpoint")
    volts = beside(one, "peak across the loudspeaker at switch-on")
    assert beside(one, "cone displacement at switch-on") == pytest.approx(8.0 * volts / 6.2 * 1e-3)
    moving = finding(report("single_rail", {**bare, **WOOFER}), "offset.midpoint")
    assert beside(moving, "cone displacement at switch-on") < 8.0 * volts / 6.2 * 1e-3


def test_settling_and_emptying_of_the_output_capacitor():
    one = finding(report("single_rail", SWITCH_ON), "offset.midpoint")
    assert beside(one, "output settles after switch-on in") == pytest.approx(5.0 * 8.0 * 680e-6 + 0.02)
    assert beside(one, "capacitor empties through the bleeder in") == pytest.approx(5.0 * 1e3 * 680e-6)
    plain = finding(report("single_rail"), "offset.midpoint")
    assert beside(plain, "output settles after switch-on in") == pytest.approx(5.0 * 8.0 * 680e-6)
    assert not has(plain, "capacitor empties")
    assert not has(plain, "peak across")


def test_each_side_of_a_bridge_sees_half_and_the_loudspeaker_gets_both_peaks():
    bridged = {**POWER, **WOOFER, **MECHANICS, "stage.bridged": True}
    answer, amplifier = report("split_rail", bridged), sheet("split_rail", bridged).amplifier
    side = operating.sides(amplifier)[0]
    peak = float(operating.peak_into(amplifier, side.burst, side.loss, 4.0))
    norm = float(any_signal.admittance_norm(driver=woofer(0.0).scaled(0.5)))
    assert beside(finding(answer, "soa.loudspeaker"), ANY) == pytest.approx(peak * norm)
    across = 2.0 * float(operating.clipping_peak(amplifier))
    travel = drivers.largest_excursion(
        driver=woofer(0.0), force_factor=8.0, peak=across, lowest=20.0, highest=90.0
    )
    at = "cone travel at clipping, sine from 20 Hz"
    assert beside(finding(answer, "loudspeaker.power"), at) == pytest.approx(float(travel))


def test_what_is_only_shown_is_read_aside():
    sheet_of = sheet("split_rail", {**WOOFER, **INDUCTANCE})
    _, trace = look(CHECKS["soa.loudspeaker"], Bench(sheet_of, limits()))
    assert "loudspeaker.inductance" not in trace.reads
    assert {"loudspeaker.inductance", "loudspeaker.resonance"} <= set(trace.shown)
    assert trace.missing == {}


def test_relay_contacts_open_the_whole_rail_though_two_in_series_share_it():
    rails = {"supply.no_load": "40 V, measured", "supply.full_load": "37 V, measured"}
    one = finding(report("healthy", {**rails, "loudspeaker.series": 2}), "loudspeaker.dc_fault")
    assert any("relay contacts on more than 35 V DC" in because for because in one.because)


def test_two_in_series_share_the_travel_at_switch_on():
    both = {**WOOFER, **MECHANICS, **SWITCH_ON, "loudspeaker.series": 2}
    one = finding(report("single_rail", both), "offset.midpoint")
    moved = coupling.turn_on_displacement(
        driver=woofer(0.0).scaled(2.0), force_factor=8.0, capacitance=680e-6, midpoint=30.4, rise_time=0.02
    )
    assert beside(one, "cone displacement at switch-on") == pytest.approx(moved / 2.0)


def test_as_built_looks_at_all_loudspeakers_together():
    rated = limits()["soa.loudspeaker"], limits()["loudspeaker.label"]
    for changes, holds in (
        ({"loudspeaker.parallel": 2}, False),
        ({"loudspeaker.parallel": 2, "loudspeaker.series": 2}, True),
    ):
        amplifier = sheet("split_rail", {"stage.rated_load": "8 ohm", **changes}).amplifier
        assert ("stage.rated_load" not in as_built(amplifier, *rated).missing) is holds
