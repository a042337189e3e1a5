"""All sheets of a folder at a glance."""

from __future__ import annotations

from dataclasses import dataclass

from safeamp.complaints import Complaint
from safeamp.findings import Step, Verdict


@dataclass(frozen=True, kw_only=True)
class OverviewRow:
    """One sheet of a folder; `complaint` is the first of its `problems` where it could not be read."""

    file: str
    title: str = ""
    scope: str = ""
    verdict: Verdict | None = None
    first_blocked: Step | None = None
    deciding: tuple[str, ...] = ()
    complaint: Complaint | None = None
    problems: int = 0

    def __post_init__(self) -> None:
        if (self.verdict is None) is (self.complaint is None):
            raise ValueError(f"{self.file} has either a verdict or a complaint")


@dataclass(frozen=True)
class Overview:
    """All sheets of a folder.

    Raises
    ------
    ValueError
        If there is none: a folder without sheets is no go.
    """

    rows: tuple[OverviewRow, ...]
    on_paper: bool = False

    def __post_init__(self) -> None:
        if not self.rows:
            raise ValueError("there is no sheet to judge")

    @property
    def worst(self) -> Verdict | None:
        """The worst word of the sheets that could be read."""
        return max((row.verdict for row in self.rows if row.verdict is not None), default=None)

    @property
    def unread(self) -> int:
        """How many sheets could not be read."""
        return sum(row.verdict is None for row in self.rows)

    @property
    def verdict(self) -> Verdict | None:
        """The word of the whole folder; None where a sheet could not be read and none is stop."""
        return None if self.unread and self.worst is not Verdict.STOP else self.worst

    @property
    def exit_status(self) -> int:
        """That of the word of the whole folder; 2 where it has none."""
        return 2 if self.verdict is None else self.verdict.exit_status
