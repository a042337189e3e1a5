"""Words that a technician would not have given."""

import pytest

from safeamp.findings import Verdict
from tests.review.planted import SINGLE, SPLIT, found

TOO_MUCH = {
    "stage.swing_loss": "20 V, measured",
    "loudspeaker.nominal_impedance": "2 ohm",
    "loudspeaker.minimum_impedance": "1.6 ohm",
    "loudspeaker.dc_resistance": "1.5 ohm, measured",
}
WIDE = {"supply.no_load": "33 V ±40 %, measured", "supply.full_load": "29.5 V ±40 %, measured"}


@pytest.mark.parametrize("id", ["soa.resistive_load", "soa.loudspeaker"])
def test_a_stop_stays_one_where_a_corner_cannot_be_computed(id):
    """At the low end of the rails 20 V of loss leaves nothing: that corner says nothing, the nominal values do."""
    assert found(SPLIT, TOO_MUCH, without=["stage.clipped_peak"])[id].verdict is Verdict.STOP
    assert found(SPLIT, TOO_MUCH | WIDE, without=["stage.clipped_peak"])[id].verdict is Verdict.STOP


def test_go_does_not_stay_where_a_corner_cannot_be_computed():
    one = found(SPLIT, {"stage.swing_loss": "20 V, measured"} | WIDE, without=["stage.clipped_peak"])
    assert one["touch.voltage"].verdict is Verdict.UNVERIFIED
    assert one["supply.reservoir_voltage"].verdict is Verdict.GO  # it needs no swing


def test_idle_that_was_set_cold_says_nothing_of_its_drift():
    idle = {"stage.idle": "11 mV, measured", "readings.idle_cold": "11 mV, measured"}
    gone = ("readings.idle_upper", "readings.idle_lower")
    cold = found(SPLIT, idle | {"stage.idle_at": "cold"}, gone)["bias.drift"]
    warm = found(SPLIT, idle | {"stage.idle_at": "warm"}, gone)["bias.drift"]
    assert (cold.verdict, warm.verdict) == (Verdict.CAUTION, Verdict.GO)
    assert cold.needs == gone


@pytest.mark.parametrize(
    ("letter", "seconds"), [("TT", None), ("T", 3.0), ("M", 3.0), ("FF", 3.0), ("F", 0.3)]
)
def test_no_fuse_is_taken_for_a_quicker_one(letter, seconds):
    """4.3 times its rating; the gates of T stand in for M and FF, which are quicker, and never for TT."""
    changes = {
        "protection.loudspeaker_fuse": f"{letter} 1.3 A",
        "output_capacitor.rated_voltage": "40 V, marked",
    }
    also = {one.at: one.value for one in found(SINGLE, changes)["loudspeaker.dc_fault"].also}
    assert also.get("protection acts after") == seconds


def test_a_slow_fuse_clears_nothing_that_a_time_lag_one_would():
    slow_coil = {
        "output_capacitor.rated_voltage": "40 V, marked",
        "loudspeaker.coil_to_magnet": "0.2 K/W, data sheet",
        "loudspeaker.coil_time_constant": "60 s, data sheet",
        "loudspeaker.magnet_to_air": "0.3 K/W, data sheet",
    }
    words = {
        letter: found(SINGLE, slow_coil | {"protection.loudspeaker_fuse": f"{letter} 1 A"})[
            "loudspeaker.dc_fault"
        ].verdict
        for letter in ("T", "TT")
    }
    assert words == {"T": Verdict.GO, "TT": Verdict.CAUTION}


@pytest.mark.parametrize(
    ("changes", "gone"),
    [
        ({"readings.mains_insulation": "0.5 Mohm, measured"}, "readings.earth_resistance"),
        ({"readings.earth_resistance": "1 ohm, measured"}, "readings.mains_insulation"),
    ],
)
def test_half_of_what_touches_mains_is_enough_for_a_stop(changes, gone):
    """Insulation under 1 Mohm stops without an earth reading; an earth of 1 ohm needs the other one to be judged."""
    one = found(SPLIT, changes, [gone])["touch.mains"]
    assert one.verdict is (Verdict.STOP if "insulation" in next(iter(changes)) else Verdict.UNVERIFIED)
    assert one.needs == (gone,)


def test_a_power_that_holds_at_a_cooled_case_is_no_safe_area_in_free_air():
    """115 W at a case of 25 °C; in free air (200 - 25) K over 30 K/W leave 5.83 W."""
    gone = ("heatsink.sink_to_air", "heatsink.insulator", "heatsink.shared_by")
    one = found(SPLIT, {"device.power.junction_to_ambient": "30 K/W, data sheet"}, gone)
    assert one["soa.resistive_load"].verdict is Verdict.UNVERIFIED
    assert "in free air 5.83 W are left" in " ".join(one["soa.resistive_load"].because)


def test_a_series_resistor_takes_its_share_of_the_power():
    """25.2 V peak on 330 ohm and 32 ohm: 32/362 of 25.2²/(2·362) W reach the headphones.

    The clipped peak was measured into what is named as the load, so it stands at resistor and headphones together.
    """
    phones = {
        "stage.series_resistor": "330 ohm",
        "loudspeaker.nominal_impedance": "32 ohm",
        "loudspeaker.minimum_impedance": "30 ohm",
        "loudspeaker.dc_resistance": "28 ohm, measured",
        "loudspeaker.rated_power": "0.2 W, marked",
    }
    watts = 25.2**2 / (2.0 * 362.0) * 32.0 / 362.0
    assert found(SPLIT, phones)["loudspeaker.power"].nominal == pytest.approx(watts / 0.2, rel=1e-9)


def test_needs_are_keys():
    assert found(SINGLE, {"output_capacitor.capacitance": "3200 uF"})["capacitor.wear"].needs == (
        "output_capacitor.capacitance",
    )
