"""Questions about the data of a device: sheets contradict themselves, and the wrong curve is easily read."""

from __future__ import annotations

from safeamp.quantities import POWER, TEMPERATURE, TEMPERATURE_COEFFICIENT, VOLTAGE, show
from safeamp.reading.draft import Draft

PULSE_CURVE = 1.1
POWERS_APART = 1.15


def ask_devices(draft: Draft) -> None:
    """Complain of contradictions in each device that has data."""
    names = {path.split(".")[1] for path in draft.values if path.startswith("device.")}
    for name in sorted(names):
        for question in (_thermal_path, _junction, _pulse_curve, _coefficient):
            question(draft, f"device.{name}")
    for name in draft.outputs():
        _rail(draft, f"device.{name}.voltage")


def _thermal_path(draft: Draft, device: str) -> None:
    keys = ("junction_to_case", "junction_to_ambient")
    if not any(f"{device}.{key}" in draft.seats for key in keys):
        text = (
            'is missing; write junction_to_case = "0.95 K/W", or junction_to_ambient for a device in free air'
        )
        draft.complain(f"{device}.junction_to_case", text)


def _junction(draft: Draft, device: str) -> None:
    limit, at = draft.number(f"{device}.junction_limit"), draft.number(f"{device}.power_at")
    if limit is None or at is None:
        return
    if limit <= at:
        text = f"{show(limit, TEMPERATURE)} is not above power_at, {show(at, TEMPERATURE)}"
        draft.complain(f"{device}.junction_limit", f"{text}; read both in the data sheet again")
        return
    power, resistance = draft.number(f"{device}.power"), draft.number(f"{device}.junction_to_case")
    if power is None or resistance is None:
        return
    implied = (limit - at) / resistance
    if max(power, implied) > POWERS_APART * min(power, implied):
        text = f"{show(power, POWER)} is printed, but junction_limit and junction_to_case mean"
        draft.complain(
            f"{device}.power", f"{text} {show(implied, POWER)}; read all four in the data sheet again"
        )


def _pulse_curve(draft: Draft, device: str) -> None:
    power = draft.number(f"{device}.power")
    for place, (volts, amperes) in enumerate(draft.values.get(f"{device}.safe_area") or ()):
        path = f"{device}.safe_area.{place}"
        if volts <= 0 or amperes <= 0:
            draft.complain(
                path, "a point of the safe area has a voltage and a current above zero; read it again"
            )
        elif power is not None and volts * amperes > PULSE_CURVE * power:
            at = f"{show(volts * amperes, POWER)} at {show(volts, VOLTAGE)} is more than"
            text = f"{at} the {show(power, POWER)} of the device: this looks like a pulse curve"
            draft.complain(path, f"{text}; read the DC curve")


def _coefficient(draft: Draft, device: str) -> None:
    path = f"{device}.temperature_coefficient"
    value = draft.number(path)
    negative_data = any(dropped.startswith(f"{device}.") for dropped in draft.dropped)
    bipolar = draft.word(f"{device}.kind") in ("bipolar", "darlington")
    if value is not None and value > 0 and (bipolar or negative_data):
        falling = show(-value, TEMPERATURE_COEFFICIENT)
        text = f"{show(value, TEMPERATURE_COEFFICIENT)} means a control voltage that grows with temperature"
        draft.complain(path, f"{text}: did you mean {falling}?")


def _rail(draft: Draft, path: str) -> None:
    rated, rails = draft.number(path), draft.numbers("supply.no_load")
    if rated is None or not rails:
        return
    single = draft.word("supply.rails") == "single"
    least = max(rails) / 2 if single else max(rails)
    if rated < least:
        what = "half the rail" if single else "one rail"
        text = f"{show(rated, VOLTAGE)} is less than {what}, {show(least, VOLTAGE)}"
        draft.complain(path, f"{text}; read V_CEO or V_DSS in the data sheet, and the rail, again")
