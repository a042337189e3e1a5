"""The card for the first power-up as text, Markdown and JSON."""

from __future__ import annotations

import json
from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from typing import Any

from safeamp._version import __version__
from safeamp.answers import Choice, Expected, Extent, PowerUp, State
from safeamp.findings import Finding
from safeamp.quantities import PERCENT, POWER, show
from safeamp.report.cells import markdown
from safeamp.report.json_ import finding_mapping, plain
from safeamp.report.layout import Ink, block, paragraph, points
from safeamp.report.safety import SAFETY

CARD = "FIRST POWER-UP CARD"
CLEARS_NOTHING = "The card clears nothing."
NOT_YET = "Do not power yet"
LATER = "for later: not cleared yet"
BLANK = "_______"


@dataclass(frozen=True)
class Section:
    """One part of the card: a head, and points with their further lines."""

    head: str
    points: tuple[tuple[str, tuple[str, ...]], ...]


def standing(card: PowerUp) -> str:
    """Return what the cold checks say, and that the card says no more."""
    word = card.verdict.word.upper()
    if not card.verdict.clears:
        return f"{word} for the cold checks. {NOT_YET}. {CLEARS_NOTHING}"
    if not card.steps:
        return f"{word} for the cold checks, but no step: no limiter can be reckoned with. {CLEARS_NOTHING}"
    return f"{word} for the cold checks: power may be applied through the limiter. {CLEARS_NOTHING}"


def sections(card: PowerUp) -> tuple[Section, ...]:
    """Return the parts of the card in their order."""
    later = "" if card.verdict.clears else f" ({LATER})"
    if card.verdict.clears and not card.steps:
        later = " (no step: limiter not known)"
    found = (
        Section("0 Before anything", _plain(card.cautions)),
        Section("1 Cold checks", tuple(_cold(card))),
        Section(f"2 Limiter{later}", tuple(_limiter(card))),
        Section("3 Step by step", _numbered(card.steps)),
        Section(f"What is expected{later}", tuple(map(_state, card.states))),
        Section(f"4 When to switch off at once{later}", tuple(_switch_off(card))),
        Section(f"5 What is seen, what it means, what to do{later}", tuple(_patterns(card))),
        Section("6 When the limiter may come out", _plain(card.afterwards)),
        Section("Missing: what would settle what is unverified", _plain(card.missing)),
        Section("Assumed", _plain(f"{one.key} = {one.value}: {one.why}" for one in card.assumptions)),
        Section("Limits changed by your own file", _plain(card.overridden)),
        Section("Remarks", _plain(card.remarks)),
        Section("Safety", _plain(SAFETY)),
    )
    return tuple(one for one in found if one.points)


def _plain(texts: Any) -> tuple[tuple[str, tuple[str, ...]], ...]:
    return tuple((text, ()) for text in texts)


def _numbered(texts: Sequence[str]) -> tuple[tuple[str, tuple[str, ...]], ...]:
    return tuple((f"{number}. {text}", ()) for number, text in enumerate(texts, 1))


def _cold(card: PowerUp) -> Iterator[tuple[str, tuple[str, ...]]]:
    """Yield what holds the cold checks up, then their cautions; what is go is only counted."""
    blocking = [one for one in card.cold if not one.verdict.clears]
    cautions = [one for one in card.cold if one.verdict.clears and one.verdict.exit_status]
    if not card.verdict.clears:
        yield f"{NOT_YET}: first clear {', '.join(one.id for one in blocking) or 'the cold checks'}.", ()
    for one in (*blocking, *cautions):
        yield f"{one.verdict.word} {one.id}: {one.says}", tuple(_help(one))
    good = len(card.cold) - len(blocking) - len(cautions)
    if good:
        yield f"{good} of {len(card.cold)} findings are go; `safeamp check` lists them", ()


def _help(finding: Finding) -> Iterator[str]:
    yield from finding.because
    if finding.needs:
        yield f"to settle it, give: {', '.join(finding.needs)}"
    if finding.next:
        yield f"next: {finding.next}"


def _limiter(card: PowerUp) -> Iterator[tuple[str, tuple[str, ...]]]:
    yield f"{card.limiter.text}{', recommended' if card.limiter.recommended else ''}", card.limiter.why
    if card.limiter.choices:
        yield (
            "healthy idle behind it: rails left (look); most heat for a fault",
            tuple(map(_choice, card.limiter.choices)),
        )


def _choice(one: Choice) -> str:
    mark = " <- recommended" if one.recommended else ""
    left = f"{one.rails_left.text(PERCENT)}, about {show(one.rails_left.nominal, PERCENT, 2)}"
    look = f" ({one.looks})" if one.looks else ""
    return f"{one.text}: {left}{look}; {show(one.most_heat, POWER)}{mark}"


def _state(state: State) -> tuple[str, tuple[str, ...]]:
    if state.unverified:
        return f"{state.name}: unverified", tuple(_why(state))
    return state.name, tuple(f"{one.what}: {one.text}{_pencil(state, one)}" for one in state.readings)


def _pencil(state: State, one: Expected) -> str:
    """Return a blank for the pencil behind what is read of a healthy one; heat is computed."""
    return f"; read: {BLANK}" if state.healthy and one.kind != POWER else ""


def _why(state: State) -> Iterator[str]:
    yield from state.because
    if state.needs:
        yield f"to settle it, give: {', '.join(state.needs)}"


def _switch_off(card: PowerUp) -> Iterator[tuple[str, tuple[str, ...]]]:
    for one in card.switch_off:
        by = f"{one.id}, {one.source}" if one.id else one.source
        yield one.when, (one.says, f"by: {by}")


def _patterns(card: PowerUp) -> Iterator[tuple[str, tuple[str, ...]]]:
    for one in card.patterns:
        yield one.seen, (f"means: {one.means}", f"do: {one.do}")


def render_power_up(card: PowerUp, *, width: int = 80, colour: bool = False) -> str:
    """Return the card as text, no line longer than the width."""
    lines = [f"safeamp {__version__}", CARD, *paragraph(card.title, width)]
    if card.source:
        lines += paragraph(f"sheet {card.source}, SHA-256 {card.digest[:16]}", width)
    word = card.verdict.word.upper()
    head = paragraph(standing(card), width, "", "  ")
    head[0] = Ink(colour=colour).verdict(word, card.verdict) + head[0][len(word) :]
    lines += ["", *head]
    for section in sections(card):
        lines += block(section.head, list(_section(section, width)))
    return "\n".join(lines) + "\n"


def _section(section: Section, width: int) -> Iterator[str]:
    for text, further in section.points:
        yield from points((text,), width)
        for one in further:
            yield from paragraph(one, width, "      ", "        ")


def power_up_markdown(card: PowerUp) -> str:
    """Return the card in Markdown."""
    lines = [f"# {CARD.capitalize()}", "", markdown(card.title), "", f"**{markdown(standing(card))}**"]
    for section in sections(card):
        lines += ["", f"## {markdown(section.head)}", ""]
        for text, further in section.points:
            lines += [f"- {markdown(text)}", *(f"    - {markdown(one)}" for one in further)]
    source = f"From {card.source}, SHA-256 {card.digest}, by safeamp {__version__}."
    return "\n".join([*lines, "", markdown(source)]) + "\n"


def power_up_json(card: PowerUp) -> str:
    """Return the card as JSON text that ends with a line feed; never nan or infinity."""
    return json.dumps(power_up_mapping(card), indent=2, allow_nan=False) + "\n"


def power_up_mapping(card: PowerUp) -> dict[str, Any]:
    """Return the card as nested dicts and lists; an unknown number is None."""
    return {
        "safeamp": __version__,
        "command": "powerup",
        "title": card.title,
        "verdict": card.verdict.word,
        "of": "cold checks",
        "says": standing(card),
        "cautions": list(card.cautions),
        "cold_checks": [finding_mapping(one) for one in card.cold],
        "limiter": _limiter_mapping(card),
        "steps": list(card.steps),
        "states": [_state_mapping(one) for one in card.states],
        "switch_off": [
            {"when": one.when, "says": one.says, "limit": one.id or None, "source": one.source}
            for one in card.switch_off
        ],
        "patterns": [{"seen": one.seen, "means": one.means, "do": one.do} for one in card.patterns],
        "afterwards": list(card.afterwards),
        "missing": list(card.missing),
        "assumptions": [{"key": one.key, "value": one.value, "why": one.why} for one in card.assumptions],
        "overridden": list(card.overridden),
        "remarks": list(card.remarks),
        "safety": list(SAFETY),
        "sheet": {"source": card.source, "sha256": card.digest},
    }


def _limiter_mapping(card: PowerUp) -> dict[str, Any]:
    one = card.limiter
    choices = [
        {
            "limiter": choice.text,
            "rails_left": _extent(choice.rails_left, "1"),
            "looks": choice.looks or None,
            "looks_at_lowest": choice.looks_at_lowest or None,
            "most_heat": {"value": plain(choice.most_heat), "unit": "W"},
            "recommended": choice.recommended,
        }
        for choice in one.choices
    ]
    return {
        "kind": one.kind or None,
        "limiter": one.text,
        "recommended": one.recommended,
        "why": list(one.why),
        "choices": choices,
    }


def _extent(extent: Extent | None, unit: str) -> dict[str, Any] | None:
    if extent is None:
        return None
    ends = {"nominal": plain(extent.nominal), "low": plain(extent.low), "high": plain(extent.high)}
    return {**ends, "unit": unit}


def _state_mapping(state: State) -> dict[str, Any]:
    return {
        "state": state.name,
        "healthy": state.healthy,
        "unverified": state.unverified,
        "needs": list(state.needs),
        "because": list(state.because),
        "readings": [_reading_mapping(one) for one in state.readings],
    }


def _reading_mapping(one: Expected) -> dict[str, Any]:
    unit = "" if one.kind is None else one.kind.unit
    return {"what": one.what, "expected": _extent(one.extent, unit), "says": one.says}
