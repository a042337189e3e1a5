"""Faults that are planted in the healthy amplifiers: each changes a sheet as the bench would find it."""

from collections.abc import Callable
from dataclasses import dataclass

from tests.amplifiers.sheets import NAMES, number, outputs, scale, scaled

SINGLE_RAIL = tuple(name for name in NAMES if "single_rail" in name)
IN_GROUPS = ("100w_lateral_mosfet", "120w_three_pairs", "60w_two_pairs", "80w_two_pairs_shared_heatsink")


@dataclass(frozen=True)
class Fault:
    """A fault: how it is planted, the findings that must stop, and the amplifiers that it takes too far."""

    plant: Callable[[dict], None]
    stops: tuple[str, ...]
    amplifiers: tuple[str, ...] = NAMES
    #: What else may then stop or become unverified.
    besides: tuple[str, ...] = ()


def four_ohm(tables):
    loudspeaker = tables["loudspeaker"]
    loudspeaker["nominal_impedance"] = "4 ohm, marked"
    scale(tables, 0.5, "loudspeaker.minimum_impedance", "loudspeaker.dc_resistance")


def more_mains(tables):
    scale(
        tables, 1.2 * number(tables["mains"]["nominal"]) / number(tables["mains"]["actual"]), "mains.actual"
    )


def dead_device(tables):
    """One device of the upper group carries nothing; its neighbours carry its share."""
    stage, readings = tables["stage"], tables["readings"]
    pairs = stage["pairs"]
    stage["pairs_conducting"] = pairs - 1
    rest = [scaled(text, pairs / (pairs - 1)) for text in readings["idle_upper"][1:]]
    readings["idle_upper"] = ["0 mV, measured", *rest]
    scale(tables, pairs / (pairs - 1), "readings.idle_cold")


def dead_device_not_counted_out(tables):
    dead_device(tables)
    tables["stage"].pop("pairs_conducting")


def half_the_device(tables):
    """A substitute of half the power and half the currents, with the voltage of the original."""
    tables["stage"]["original_devices"] = False
    for device in outputs(tables):
        for key, factor in (("power", 0.5), ("current", 0.5), ("junction_to_case", 2.0)):
            device[key] = scaled(device[key], factor)
        if "safe_area" in device:
            device["safe_area"] = [[volts, scaled(amperes, 0.5)] for volts, amperes in device["safe_area"]]


def lower_voltage(tables):
    """A substitute of the same power that stands 0.6 of the voltage."""
    tables["stage"]["original_devices"] = False
    for device in outputs(tables):
        device["voltage"] = scaled(device["voltage"], 0.6)
        if "safe_area" in device:
            device["safe_area"] = [
                [scaled(volts, 0.6), scaled(amperes, 1.0 / 0.6)] for volts, amperes in device["safe_area"]
            ]


def collector_on_heatsink(tables):
    tables["readings"]["insulation"] = "0.3 ohm, measured"


def shorted_device(tables):
    tables["readings"] |= {"device_ohms": "0.4 ohm, measured", "limiter_state": "bright"}


def worn_capacitor(tables):
    table = tables["output_capacitor"]
    table["capacitance"] = f"{0.45 * number(table['marked_capacitance']):.6g} uF, measured"


def leaking_capacitor(tables):
    tables["readings"]["capacitor_leakage_trend"] = "rising"
    scale(tables, 20.0, "readings.capacitor_leakage_drop")


def larger_fuse(tables):
    scale(tables, 2.0, "supply.rail_fuse")


def other_letter(tables):
    tables["supply"]["rail_fuse"] = tables["supply"]["rail_fuse"].replace("T", "F")


def other_channel_not_declared(tables):
    """The heatsink carries two channels and the sheet says one: it is read twice as far above its air."""
    heatsink, readings = tables["heatsink"], tables["readings"]
    if heatsink["shared_by"] == 2:
        heatsink["shared_by"] = 1
        return
    rise = number(readings["heatsink_temperature"]) - number(readings["heatsink_air"])
    readings["heatsink_temperature"] = f"{number(readings['heatsink_air']) + 2.0 * rise:.1f} degC, measured"


def false_label(tables):
    tables["loudspeaker"]["dc_resistance"] = "3.1 ohm, measured"


def _all_but(*names):
    return tuple(name for name in NAMES if name not in names)


#: The 15 W amplifier has devices for four times its power: these faults leave it inside its safe area.
ALL_BUT_15_W = _all_but("15w_single_rail_to3")
#: The two whose maker prints 4 ohm and whose devices stand it.
ALL_BUT_MADE_FOR_4_OHM = _all_but("15w_single_rail_to3", "60w_two_pairs")
BEYOND_WITH_MORE_MAINS = _all_but("15w_single_rail_to3", "25w_split_rail_darlington", "30w_single_rail_to3")
#: Rail to rail at the highest mains is more than 0.6 of the original's voltage.
BEYOND_AT_LESS_VOLTAGE = _all_but("15w_single_rail_to3", "25w_split_rail_darlington", "50w_split_rail_120v")

LOUD = ("soa.loudspeaker", "soa.resistive_load", "heat.junction", "bias.runaway", "protection.short")

FAULTS = {
    "4 ohm for 8": Fault(four_ohm, ("soa.loudspeaker",), ALL_BUT_MADE_FOR_4_OHM, LOUD),
    "20 % more mains": Fault(more_mains, ("supply.mains",), NAMES, LOUD),
    "20 % more mains, at the loudspeaker": Fault(
        more_mains, ("supply.mains", "soa.loudspeaker"), BEYOND_WITH_MORE_MAINS, LOUD
    ),
    "one device of a group dead": Fault(
        dead_device, ("bias.imbalance", "soa.loudspeaker"), IN_GROUPS, (*LOUD, "bias.idle")
    ),
    "one device of a group dead, not counted out": Fault(
        dead_device_not_counted_out,
        ("bias.imbalance", "soa.resistive_load", "soa.loudspeaker", "heat.junction"),
        IN_GROUPS,
        ("bias.idle", "protection.short"),
    ),
    "weaker substitute": Fault(half_the_device, ("soa.loudspeaker",), ALL_BUT_15_W, LOUD),
    "substitute of too low a voltage": Fault(
        lower_voltage, ("supply.rail_to_rail",), BEYOND_AT_LESS_VOLTAGE, LOUD
    ),
    "collector on the heatsink": Fault(collector_on_heatsink, ("cold.insulation",)),
    "shorted device": Fault(shorted_device, ("cold.devices", "power_up.draw")),
    "worn output capacitor": Fault(worn_capacitor, ("capacitor.wear",), SINGLE_RAIL),
    "leaking output capacitor": Fault(leaking_capacitor, ("capacitor.leakage",), SINGLE_RAIL),
    "fuse too large": Fault(larger_fuse, ("supply.fuse",)),
    "fuse of another letter": Fault(other_letter, ("supply.fuse",)),
    "heatsink shared but declared single": Fault(other_channel_not_declared, ("heat.reading",)),
    "label that the coil contradicts": Fault(false_label, ("soa.loudspeaker",), ALL_BUT_15_W, LOUD),
}
