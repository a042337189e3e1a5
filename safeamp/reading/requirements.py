"""What must be there: required keys and tables, and keys that only some amplifiers need."""

from __future__ import annotations

from safeamp.amplifier import TABLES, keys_of
from safeamp.reading.draft import Draft
from safeamp.reading.values import example
from safeamp.reading.walk import require, tables_of

REQUIRED_TABLES = ("supply", "stage", "heatsink", "loudspeaker")


def ask_for_missing(draft: Draft) -> None:
    """Complain of everything that is missing, and set aside what does not belong to this amplifier."""
    for table in REQUIRED_TABLES:
        _table(draft, table)
    for table, noun in TABLES.items():
        for name, inner in tables_of(noun).items():
            if f"{table}.{name}" in draft.written:
                require(draft, f"{table}.{name}", inner)
    _output_capacitor(draft)
    _shared_by(draft)


def _table(draft: Draft, table: str) -> None:
    if table in draft.written:
        require(draft, table, TABLES[table])
    elif table not in draft.seats:
        keys = [f"{name} = {example(key)}" for name, key in keys_of(TABLES[table]).items() if key.required]
        draft.complain(table, f"the table is missing; write [{table}] with {'; '.join(keys)}")


def _output_capacitor(draft: Draft) -> None:
    table = "output_capacitor"
    if draft.word("stage.coupling") == "capacitor":
        _table(draft, table)
    elif table in draft.written and draft.word("stage.coupling") == "direct":
        draft.remarks.append('[output_capacitor] is not used: stage.coupling is "direct"')
        draft.drop(table)


def _shared_by(draft: Draft) -> None:
    path = "heatsink.shared_by"
    given = path in draft.written
    data = "heatsink.sink_to_air" in draft.written or "heatsink.fins" in draft.written
    if data and not given:
        draft.complain(
            path, "is missing: channels or bridged sides on the whole heatsink; write shared_by = 1"
        )
    elif given and not data and _free_air(draft):
        text = "nothing is shared in free air: junction_to_ambient is given, and no sink_to_air"
        draft.complain(path, f"{text}; write sink_to_air, or leave shared_by out")


def _free_air(draft: Draft) -> bool:
    """Whether each output device has what free air needs."""
    names = draft.outputs()
    return bool(names) and all(draft.has(f"device.{name}.junction_to_ambient") for name in names)


def say_signs(draft: Draft) -> None:
    """Say once which signs were dropped."""
    if draft.dropped:
        keys = dict.fromkeys(
            ".".join(part for part in path.split(".") if not part.isdigit()) for path in draft.dropped
        )
        draft.remarks.append(f"signs of {', '.join(keys)} dropped: magnitudes are meant")
