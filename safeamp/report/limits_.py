"""Which limits hold and where each comes from."""

from __future__ import annotations

from collections.abc import Iterator

from safeamp.limits import Default, Level, Limit, Limits
from safeamp.quantities import Kind, show
from safeamp.report.layout import paragraph

_INTRODUCTION = (
    "The maker's data and local codes outrank every limit here. Evidence: seen (read in the source), "
    "transcript, quoted (read in another text that quotes it), memory (nobody looked it up), derived, "
    "common practice, this project; stated means your own limits file."
)


def render_limits(limits: Limits, *, width: int = 80) -> str:
    """Return every limit, default and interface with its source."""
    lines = paragraph(_INTRODUCTION, width)
    for limit in limits.entries.values():
        lines += ["", *_entry(limit.id, _limit(limit), width)]
    lines += ["", "Defaults and their spread"]
    for default in limits.defaults.values():
        lines += ["", *_entry(default.id, _default(default), width)]
    lines += ["", "Case to heatsink, by package and insulator", ""]
    for interface in limits.interfaces.values():
        text = f"{interface.nominal:g} K/W ({interface.low:g} to {interface.high:g}); {interface.source}"
        lines += paragraph(f"{interface.name}: {text}; {interface.evidence}", width, "  ", "      ")
    return "\n".join(lines) + "\n"


def _entry(name: str, texts: Iterator[str], width: int) -> list[str]:
    return [name, *(line for text in texts for line in paragraph(text, width, "    "))]


def _limit(limit: Limit) -> Iterator[str]:
    if limit.overridden:
        yield "changed by your own file"
    yield f"go {_level(limit.go, limit)}; stop {_level(limit.stop, limit, stop=True)}"
    if limit.extra:
        shown = (
            f"{name.replace('_', ' ')} {show(value, limit.extra_kinds[name])}"
            if name in limit.extra_kinds
            else f"{name.replace('_', ' ')} {value:g}"
            for name, value in limit.extra.items()
        )
        yield f"also: {', '.join(shown)}"
    yield f"when not given: {limit.not_given or 'unverified'}"
    yield f"source: {limit.source} (evidence: {limit.evidence})"
    yield limit.says


def _level(level: Level | None, limit: Limit, *, stop: bool = False) -> str:
    if level is None:
        return "none by this number" if stop else "no fixed level"
    if isinstance(level, tuple):
        low, high = (show(end, limit.kind) for end in level)
        return f"{'outside' if stop else 'between'} {low} and {high}"
    least = limit.sense == "at least"
    if stop:
        return f"{'below' if least else 'above'} {show(level, limit.kind)}"
    return f"{'at least' if least else 'at most'} {show(level, limit.kind)}"


def _default(default: Default) -> Iterator[str]:
    yield _spread(default.nominal, default.low, default.high, default.kind)
    yield f"source: {default.source} (evidence: {default.evidence})"
    yield default.says


def _spread(nominal: float, low: float, high: float, kind: Kind) -> str:
    text = show(nominal, kind)
    return text if low == high else f"{text}, from {show(low, kind)} to {show(high, kind)}"
