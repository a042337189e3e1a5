"""Rails at the present mains, what each side has of them, and how far the output swings."""

from __future__ import annotations

from safeamp.checks import operating
from safeamp.checks.working.load import load
from safeamp.checks.working.paper import Paper
from safeamp.quantities import PERCENT, RATIO, RESISTANCE, VOLTAGE


def many(symbols: list[str], function: str) -> str:
    """Return the largest or smallest of some symbols as a formula; of one it is that one."""
    unique = list(dict.fromkeys(symbols))
    return unique[0] if len(unique) == 1 else f"{function}({', '.join(unique)})"


def read_rails(paper: Paper) -> list[str]:
    """Write down the no-load rails as they were read."""
    rails = paper.amplifier.supply.no_load or ()
    names = ["V_read"] if len(rails) < 2 else [f"V_read{place + 1}" for place in range(len(rails))]
    return [
        paper.given(name, f"supply.no_load.{place}", VOLTAGE)
        for place, name in enumerate(names if rails else [])
    ]


def mains_ratio(paper: Paper, at: str = "mains.present") -> str:
    """Return how the rails follow the mains as the end of a formula; nothing where they are held fixed."""
    if operating.is_fixed(paper.amplifier):
        return ""
    symbol = "U_high" if at == "mains.highest" else "U_mains"
    paper.given(symbol, at, VOLTAGE)
    paper.given("U_read", "supply.at_mains", VOLTAGE)
    return f" * {symbol} / U_read"


def no_load(paper: Paper) -> str:
    """Write down the larger rail without load at the present mains."""
    formula = many(read_rails(paper), "max") + mains_ratio(paper)
    rail = operating.no_load_rail(paper.amplifier)
    return paper.put("V_rail", "rail without load at the present mains", formula, rail, VOLTAGE)


def full_load(paper: Paper) -> str:
    """Write down the smaller rail with all channels driven, at the present mains."""
    table, value = paper.amplifier.supply, operating.full_load_rail(paper.amplifier)
    words = "smaller rail under full load at the present mains"
    if operating.is_fixed(paper.amplifier):
        return paper.put(
            "V_loaded", "rail under load, held fixed", many(read_rails(paper), "min"), value, VOLTAGE
        )
    if table.full_load is not None:
        names = [
            paper.given(f"V_full{place + 1}", f"supply.full_load.{place}", VOLTAGE)
            for place in range(len(table.full_load))
        ]
        return paper.put("V_loaded", words, many(names, "min") + mains_ratio(paper), value, VOLTAGE)
    paper.given("k_load", "supply.full_load_share", PERCENT, "rail under full load over rail without load")
    formula = f"k_load * {many(read_rails(paper), 'min')}{mains_ratio(paper)}"
    return paper.put("V_loaded", words, formula, value, VOLTAGE)


def midpoint(paper: Paper) -> None:
    """Write down at which share of a single rail its midpoint stands."""
    amplifier = paper.amplifier
    share = operating.midpoint_share(amplifier)
    words = "share of the rail at which the midpoint stands"
    if amplifier.readings.midpoint is None:
        paper.taken("m", words, share, RATIO, "half, or as far off as is usual, where no reading says")
        return
    paper.given("V_mid", "readings.midpoint", VOLTAGE)
    if amplifier.readings.taken_on == "limiter":
        names = limiter_rails(paper)
        paper.put("m", words, f"V_mid / {many(names, 'max')}", share)
        return
    read_rails(paper)
    paper.put("m", words, "V_mid / V_read", share)


def limiter_rails(paper: Paper) -> list[str]:
    """Write down the rails that were read on the limiter."""
    rails = paper.amplifier.readings.limiter_rails or ()
    return [
        paper.given(f"V_limiter{place + 1}", f"readings.limiter_rails.{place}", VOLTAGE)
        for place in range(len(rails))
    ]


def burst(paper: Paper, side: str) -> str:
    """Write down the volts of a side without load."""
    return _volts(paper, side, no_load(paper), "", "without load")


def loaded(paper: Paper, side: str) -> str:
    """Write down the volts of a side under full load."""
    return _volts(paper, side, full_load(paper), "_loaded", "under full load")


def _volts(paper: Paper, side: str, rail: str, end: str, words: str) -> str:
    amplifier = paper.amplifier
    if not operating.is_single(amplifier):
        return rail
    midpoint(paper)
    table = operating.sides(amplifier)[0 if side == "upper" else 1]
    share = "(1 - m)" if side == "upper" else "m"
    value = table.loaded if end else table.burst
    return paper.put(
        f"V_{side}{end}", f"volts of the {side} side {words}", f"{share} * {rail}", value, VOLTAGE
    )


def loss(paper: Paper, side: str) -> str:
    """Write down what the stage keeps of a side at clipping."""
    table = paper.amplifier.stage
    value = operating.sides(paper.amplifier)[0 if side == "upper" else 1].loss
    if table.clipped_peak is not None:
        return _implied_loss(paper, side, value)
    if table.swing_loss_up is not None or table.swing_loss_down is not None:
        name = "up" if side == "upper" else "down"
        return paper.given(f"V_loss_{name}", f"stage.swing_loss_{name}", VOLTAGE)
    return paper.given("V_loss", "stage.swing_loss", VOLTAGE)


def _implied_loss(paper: Paper, side: str, value: object) -> str:
    volts = loaded(paper, side)
    paper.given("V_peak", "stage.clipped_peak", VOLTAGE)
    magnitude, _ = load(paper)
    resistors(paper)
    ratio = mains_ratio(paper)
    at_reading = f"{volts} / (U_mains / U_read)" if ratio else volts
    formula = f"max({at_reading} - V_peak * (1 + R_e / n / {magnitude}), 0)"
    symbol = "V_loss" if not operating.is_single(paper.amplifier) else f"V_loss_{side}"
    return paper.put(symbol, "loss that the measured clipped peak stands for", formula, value, VOLTAGE)


def resistors(paper: Paper) -> None:
    """Write down emitter resistor and conducting devices."""
    path = "stage.emitter_resistor"
    if path in paper.amplifier.absent:
        paper.taken("R_e", "no emitter or source resistor", 0.0, RESISTANCE, f'{path} is "none"')
    else:
        paper.given("R_e", path, RESISTANCE, "emitter or source resistor of each device")
    given = paper.amplifier.stage.pairs_conducting is not None
    path = "stage.pairs_conducting" if given else "stage.pairs"
    paper.given("n", path, RATIO, "devices of each side that carry current")


def peak_into(paper: Paper, side: str, magnitude: str, *, sagged: bool) -> str:
    """Write down the clipped peak of a side into a load of which the magnitude stands on the paper."""
    volts = loaded(paper, side) if sagged else burst(paper, side)
    kept = loss(paper, side)
    resistors(paper)
    table = operating.sides(paper.amplifier)[0 if side == "upper" else 1]
    value = operating.peak_into(
        paper.amplifier, table.loaded if sagged else table.burst, table.loss, paper.value(magnitude)
    )
    same = not operating.is_single(paper.amplifier) and kept == "V_loss"
    end = (
        ("" if same else f"_{side}")
        + ("" if sagged else "_burst")
        + ("" if magnitude == "Z" else magnitude[1:])
    )
    words = "clipped peak" if sagged else "clipped peak in a burst, at the rail without load"
    formula = f"({volts} - {kept}) * {magnitude} / ({magnitude} + R_e / n)"
    return paper.put(
        f"V_clip{end}", f"{words}{'' if same else f' of the {side} side'}", formula, value, VOLTAGE
    )


def clipping(paper: Paper) -> str:
    """Write down the clipped peak into the nominal load, of the smaller side."""
    magnitude, _ = load(paper)
    peaks = [peak_into(paper, side, magnitude, sagged=True) for side in ("upper", "lower")]
    if len(set(peaks)) == 1:
        return peaks[0]
    value = operating.clipping_peak(paper.amplifier)
    return paper.put("V_clip", "clipped peak of the smaller side", many(peaks, "min"), value, VOLTAGE)
