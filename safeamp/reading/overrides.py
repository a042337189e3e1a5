"""The user's own limits file: single levels replaced, each marked, nothing ignored in silence."""

from collections.abc import Iterator
from dataclasses import replace
from types import MappingProxyType
from typing import Any

from safeamp.complaints import Complaint, ReadingError
from safeamp.limits import Limit, Limits, nearest
from safeamp.quantities import QuantityError
from safeamp.reading.document import Document
from safeamp.reading.levels import check_order, level, number

_LEVELS = ("go", "stop")
_TEXTS = ("says", "source")
_Path = tuple[str, ...]


def apply_override(limits: Limits, document: Document) -> Limits:
    """Return the limits with the levels of the user's file in place.

    Parameters
    ----------
    limits : Limits
        As shipped.
    document : Document
        The user's file: tables named by the id of a limit with `go`, `stop`, `says`, `source` or a further
        number of that limit.

    Raises
    ------
    ReadingError
        With every problem: an unknown limit or key, a level that the limit does not have, a value of
        another kind, levels that contradict each other.
    """
    override = _Override(limits, document)
    changed = dict(override.changed())
    if override.complaints:
        raise ReadingError(tuple(override.complaints))
    entries = MappingProxyType({**limits.entries, **changed})
    return replace(limits, entries=entries, replaced=tuple(id for id in entries if id in changed))


class _Override:
    """One pass over the user's file, gathering complaints."""

    def __init__(self, limits: Limits, document: Document) -> None:
        self.limits = limits
        self.document = document
        self.complaints: list[Complaint] = []

    def complain(self, text: str, *path: str) -> None:
        self.complaints.append(self.document.complaint(text, *path))

    def changed(self) -> Iterator[tuple[str, Limit]]:
        if not self.document.data:
            self.complain("sets no limit; write a table such as [offset.output]")
        for key, value in self.document.data.items():
            yield from self.walk((key,), value)

    def walk(self, path: _Path, value: Any) -> Iterator[tuple[str, Limit]]:
        """Yield the limit that a table replaces, then those of the tables inside it."""
        id = ".".join(path)
        entries = self.limits.entries
        if not isinstance(value, dict) or not (id in entries or self.leads_on(id)):
            known = [*entries, *{topic.partition(".")[0]: None for topic in entries}]
            self.complain(f"not a known limit{nearest(id, known)}", *path)
            return
        inner = {key for key in value if id not in entries or self.leads_on(f"{id}.{key}", itself=True)}
        row = {key: value[key] for key in value if key not in inner}
        if id in entries and (row or not inner):
            yield from self.replaced(path, entries[id], row)
        for key in (key for key in value if key in inner):
            yield from self.walk((*path, key), value[key])

    def leads_on(self, id: str, *, itself: bool = False) -> bool:
        """Say whether limits stand below an id (or, with `itself`, at it)."""
        entries = self.limits.entries
        return (itself and id in entries) or any(known.startswith(f"{id}.") for known in entries)

    def replaced(self, path: _Path, limit: Limit, row: dict[str, Any]) -> Iterator[tuple[str, Limit]]:
        found = len(self.complaints)
        if not row:
            self.complain("sets nothing; write go, stop, says or source, or leave the table out", *path)
        values = {key: self.value(path, limit, key, row[key]) for key in row}
        if len(self.complaints) > found:
            return
        changed = _merged(limit, values, self.document.path)
        try:
            check_order(changed.sense, changed.go, changed.stop)
        except QuantityError as trouble:
            self.complain(str(trouble), *path)
        yield limit.id, changed

    def value(self, path: _Path, limit: Limit, key: str, value: Any) -> Any:
        try:
            return _read(limit, key, value)
        except QuantityError as trouble:
            self.complain(str(trouble), *path, key)
            return None


def _read(limit: Limit, key: str, value: Any) -> Any:
    """Read one key of a table; raises QuantityError with what to write instead."""
    if key in _LEVELS:
        if getattr(limit, key) is None:
            # Accepting a level that no check asks for would look obeyed and be ignored.
            others = ", ".join(
                [word for word in _LEVELS if getattr(limit, word) is not None] + [*limit.extra]
            )
            raise QuantityError(
                f"{limit.id} has no {key} level of its own", f"it has {others or 'no numbers'}"
            )
        return level(value, limit.kind, limit.sense)
    if key in limit.extra:
        return number(value, limit.extra_kinds[key])
    if key not in _TEXTS:
        known = (*_LEVELS, *_TEXTS, *limit.extra)
        raise QuantityError("not a known key of this limit", f"write {', '.join(known)}{nearest(key, known)}")
    if not isinstance(value, str) or not value.strip():
        raise QuantityError(f"{value!r} is no sentence", "write it in quotes")
    return value


def _merged(limit: Limit, values: dict[str, Any], path: str) -> Limit:
    """Return the limit with the user's values; numbers without a source have the file for one."""
    numbers = any(key not in _TEXTS for key in values)
    source = f"the user's own limits file {path}" if numbers else limit.source
    return replace(
        limit,
        go=values.get("go", limit.go),
        stop=values.get("stop", limit.stop),
        says=values.get("says", limit.says),
        source=values.get("source", source),
        evidence="stated" if numbers else limit.evidence,
        extra=MappingProxyType({key: values.get(key, shipped) for key, shipped in limit.extra.items()}),
        overridden=True,
    )
