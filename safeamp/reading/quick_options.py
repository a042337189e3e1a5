"""Options of the quick answers: the same text quantities as in a sheet, every complaint at once."""

from __future__ import annotations

import re
from collections.abc import Callable, Mapping
from typing import Any, TypeVar

from safeamp.amplifier import Device as DeviceNoun
from safeamp.amplifier import (
    Entry,
    Fins,
    Fuse,
    Heatsink,
    Key,
    Loudspeaker,
    OutputCapacitor,
    Readings,
    Stage,
    Supply,
    keys_of,
)
from safeamp.complaints import Complaint, ReadingError
from safeamp.limits import plain
from safeamp.quantities import (
    CAPACITANCE,
    CURRENT,
    LENGTH,
    PERCENT,
    POWER,
    RATIO,
    RESISTANCE,
    TEMPERATURE,
    TEMPERATURE_DIFFERENCE,
    Origin,
    QuantityError,
    Reading,
    Sign,
    read,
)

#: Options that are keys of the sheet: read by the same rule.
SHEET_KEYS: Mapping[str, tuple[type[Any], str]] = {
    "split_rail": (Supply, "no_load"),
    "single_rail": (Supply, "no_load"),
    "emitter_resistor": (Stage, "emitter_resistor"),
    "pairs": (Stage, "pairs"),
    "swing_loss": (Stage, "swing_loss"),
    "air": (Heatsink, "air"),
    "sink_to_air": (Heatsink, "sink_to_air"),
    "case_to_sink": (Heatsink, "case_to_sink"),
    "junction_to_case": (DeviceNoun, "junction_to_case"),
    "junction_limit": (DeviceNoun, "junction_limit"),
    "thickness": (Fins, "thickness"),
    "count": (Fins, "count"),
    "plate": (Fins, "plate"),
    "emissivity": (Fins, "emissivity"),
    "dc_resistance": (Loudspeaker, "dc_resistance"),
    "rated_power": (Loudspeaker, "rated_power"),
    "force_factor": (Loudspeaker, "force_factor"),
    "compliance": (Loudspeaker, "compliance"),
    "linear_excursion": (Loudspeaker, "linear_excursion"),
    "coil_limit": (Loudspeaker, "coil_limit"),
    "phase_angle": (Loudspeaker, "phase_angle"),
    "cutoff": (OutputCapacitor, "target_cutoff"),
    "reading": (Readings, "offset_warm"),
}
#: All other options.
OWN_KEYS: Mapping[str, Key] = {
    "load": Key("load", (RESISTANCE,), believable=(0.5, 1e6)),
    "capacitance": Key("capacitance", (CAPACITANCE,)),
    "tolerance": Key("tolerance", (PERCENT,), sign=Sign.NON_NEGATIVE, believable=(0.0, 0.95)),
    "highest": Key("highest over actual mains", (RATIO,), believable=(1.0, 1.5)),
    "power": Key("power", (POWER,), believable=(1e-3, 20e3)),
    "idle": Key("idle current of each device", (CURRENT,), sign=Sign.NON_NEGATIVE, believable=(0.0, 10.0)),
    "case_temperature": Key("case temperature", (TEMPERATURE,), believable=(-10.0, 250.0)),
    "junction": Key("junction temperature", (TEMPERATURE,), believable=(0.0, 400.0)),
    "sink_temperature": Key("heatsink temperature", (TEMPERATURE,), believable=(-10.0, 300.0)),
    "reading_error": Key(
        "reading error", (TEMPERATURE_DIFFERENCE,), sign=Sign.MAGNITUDE, believable=(0.01, 20.0)
    ),
    "share": Key("share of the linear excursion", (PERCENT,), believable=(1e-4, 1.0)),
}
_FIN_NAMES = ("width", "height", "depth")
_FIN_FORM = 'write width x height x depth, height upright, such as "150x75x35 mm"'
_UNEVEN = r"\s*-\s*([\d.]+)\s*/\s*\+\s*[\d.]+\s*%\s*"


def read_options(command: str, texts: Mapping[str, str | None]) -> dict[str, Entry]:
    """Return the quantities among the options by name, ``--fins`` as three.

    Parameters
    ----------
    command : str
        For the complaints.
    texts : mapping of str to str or None
        Option name with underscores -> what was typed; None when left out.

    Raises
    ------
    ReadingError
        With every option that is not read.
    """
    found: dict[str, Entry] = {}
    troubles: list[Complaint] = []
    for name, text in texts.items():
        if text is None:
            continue
        try:
            found |= _fins(text) if name == "fins" else {name: _entry(name, text)}
        except QuantityError as trouble:
            troubles.append(complaint(command, name, str(trouble)))
    if troubles:
        raise ReadingError(tuple(troubles))
    return found


_Read = TypeVar("_Read")


def read_beside(
    entries: Callable[[], dict[str, Entry]], file: Callable[[], _Read]
) -> tuple[dict[str, Entry], _Read]:
    """Return options and the file that they go with.

    Raises
    ------
    ReadingError
        With every complaint about either: nobody wants to hear of the second trouble after the first is mended.
    """
    try:
        found = entries()
    except ReadingError as trouble:
        try:
            file()
        except ReadingError as another:
            raise ReadingError((*trouble.complaints, *another.complaints)) from None
        raise
    return found, file()


def complaint(command: str, name: str, text: str) -> Complaint:
    """Return a complaint of one option."""
    return Complaint(command, None, f"--{name.replace('_', '-')}", text)


def _key(name: str) -> Key:
    if name in OWN_KEYS:
        return OWN_KEYS[name]
    noun, key = SHEET_KEYS[name]
    return keys_of(noun)[key]


def _entry(name: str, text: str) -> Entry:
    key = _key(name)
    kind = key.kinds[0]
    if key.none == "zero" and text.strip().lower() == "none":
        return Entry(name, 0.0, 0.0, 0.0, Origin.STATED, kind, "none")
    sign = None if key.sign is Sign.POSITIVE else key.sign
    value = _bare(text) if name in ("tolerance", "reading_error") else text
    try:
        reading = read(value, kind, sign=sign, believable=key.believable)
    except QuantityError as trouble:
        if not key.whole:
            raise
        from safeamp.reading.values import whole_number

        raise whole_number(trouble) from trouble
    if key.whole and (reading.toleranced or not reading.nominal.is_integer()):
        raise QuantityError(f'"{text}" is not a whole number', "write a bare whole number, such as 1")
    return _of(name, reading)


def _of(name: str, reading: Reading) -> Entry:
    return Entry.of(name, reading)


def _bare(text: str) -> str:
    """Return a span without its sign, of a tolerance the low end: ``±20 %``, ``-20 %`` and ``-20/+50 %`` are 20 %."""
    uneven = re.fullmatch(_UNEVEN, text.replace("\u2212", "-"))
    return f"{uneven[1]} %" if uneven else text.strip().removeprefix("+/-").lstrip("±-\u2212 ")


def _fins(text: str) -> dict[str, Entry]:
    parts = [part.strip() for part in re.split(r"[x×*]", text)]
    if len(parts) != len(_FIN_NAMES):
        raise QuantityError(f'"{text}" is not three lengths', _FIN_FORM)
    unit = re.sub(r"^[\d.\s]*", "", parts[-1])
    try:
        return {
            name: Entry.of(
                name, read(_with_unit(part, unit), LENGTH, believable=keys_of(Fins)[name].believable)
            )
            for name, part in zip(_FIN_NAMES, parts, strict=True)
        }
    except QuantityError as trouble:
        raise QuantityError(trouble.found, _FIN_FORM) from trouble


def _with_unit(part: str, unit: str) -> str:
    return f"{part} {unit}" if re.fullmatch(r"[\d.]+", part) else part


def read_fuse(command: str, text: str | None) -> Fuse | None:
    """Return a fuse by letter and rating; None when left out or "none".

    Raises
    ------
    ReadingError
        If the text is not read.
    """
    from safeamp.reading.draft import Draft
    from safeamp.reading.special import fuse

    if text is None or text.strip().lower() == "none":
        return None
    try:
        return fuse(text, Draft(_Nowhere()))[0]
    except QuantityError as trouble:
        raise ReadingError((complaint(command, "fuse", str(trouble)),)) from trouble


def read_power_word(command: str, text: str | None) -> str | None:
    """Return the word beside a loudspeaker's power.

    Raises
    ------
    ReadingError
        If the word is not one of those that are used.
    """
    from safeamp.reading.defaults import POWER_WORDS

    if text is None or plain(text) in POWER_WORDS:
        return None if text is None else plain(text)
    known = " or ".join(f'"{word}"' for word in POWER_WORDS)
    raise ReadingError((complaint(command, "power_word", f'"{text}" is not known here; write {known}'),))


class _Nowhere:
    """Places of what stands in no file."""

    path = ""

    def line(self, *_: str | int) -> int | None:
        return None
