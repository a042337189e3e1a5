"""What a quick command answers."""

from __future__ import annotations

from dataclasses import dataclass
from typing import TYPE_CHECKING, NamedTuple

from safeamp.findings import Finding, Verdict
from safeamp.quantities import Kind

if TYPE_CHECKING:
    from safeamp.answers.plane import Plane


class PutIn(NamedTuple):
    """A value that a quick answer was computed with; `why` is empty for one that the user gave."""

    option: str
    text: str
    why: str = ""


@dataclass(frozen=True)
class Amount:
    """One result of a quick answer, SI unit of its kind, with its ends when an input had a tolerance; or a word.

    `unknown` is what the text says where there is no value.
    """

    name: str
    value: float | str | None
    kind: Kind | None = None
    low: float | None = None
    high: float | None = None
    unknown: str = "none"


class Formula(NamedTuple):
    """A formula in words, and with the numbers put in."""

    words: str
    numbers: str


@dataclass(frozen=True, kw_only=True)
class Bass:
    """An output capacitor into a load, with the ends of its tolerance: F, ohm; the cutoff aimed at, Hz, or None."""

    capacitance: float
    low: float
    high: float
    load: float
    target: float | None = None


@dataclass(frozen=True, kw_only=True)
class QuickAnswer:
    """What a quick answer without a sheet says.

    Parameters
    ----------
    holds_for : str
        For what a verdict holds: never more than what was put in.
    judged : tuple of Finding
        Everything among the results that has a limit; empty where nothing has.
    cautions : tuple of str
        What the numbers do not say.
    plane : Plane or None
    bass : Bass or None
        What can be drawn of it.
    """

    command: str
    title: str
    put_in: tuple[PutIn, ...]
    results: tuple[Amount, ...]
    formulas: tuple[Formula, ...]
    holds_for: str = ""
    judged: tuple[Finding, ...] = ()
    cautions: tuple[str, ...] = ()
    plane: Plane | None = None
    bass: Bass | None = None

    @property
    def verdict(self) -> Verdict | None:
        """The worst word; None where nothing was judged."""
        return max((finding.verdict for finding in self.judged), default=None)

    @property
    def exit_status(self) -> int:
        """0 go or nothing to judge, 3 caution, 4 unverified, 5 stop."""
        return 0 if self.verdict is None else self.verdict.exit_status
