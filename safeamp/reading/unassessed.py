"""Keys that a sheet may set and this version does not use, with the findings that they would change."""

from __future__ import annotations

from safeamp.reading.draft import Draft

#: Key of the sheet (a device's without its name) -> ids of the findings that it would change.
#: Every key is used now; one that is added to the nouns before its checks are belongs here.
WOULD_CHANGE: dict[str, tuple[str, ...]] = {}


def unassessed(draft: Draft) -> dict[str, tuple[str, ...]]:
    """Return each such key that this sheet sets and the findings, if any, that it would change here."""
    found = {}
    for key, ids in WOULD_CHANGE.items():
        for path in _written(draft, key):
            found[path] = ids
    return found


def _written(draft: Draft, key: str) -> list[str]:
    table, _, name = key.partition(".")
    devices = [f"device.{device}.{name}" for device in draft.outputs()]
    paths = devices if table == "device" else [key]
    return [path for path in paths if path in draft.written and path not in draft.absent]
