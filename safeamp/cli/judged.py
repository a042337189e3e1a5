"""A sheet read and judged: what several commands start from."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass
from functools import cached_property
from pathlib import Path
from typing import TYPE_CHECKING

from safeamp.cli.output import complaining, fail

if TYPE_CHECKING:
    from safeamp.amplifier import Sheet
    from safeamp.answers import Report, Working
    from safeamp.figures import Gallery
    from safeamp.findings import Step
    from safeamp.limits import Limits
    from safeamp.report.html import Drawing


@dataclass(frozen=True, eq=False)
class Judged:
    """A report with what it was made from."""

    sheet: Sheet
    limits: Limits
    report: Report

    def workings(self, ids: Iterable[str] | None = None) -> dict[str, Working]:
        """Return how some of its findings come about, or all; ends with the status for wrong input for no finding."""
        from safeamp.studies.explain import explained

        try:
            return explained(self.sheet, self.limits, self.report, ids)
        except KeyError as trouble:
            fail(f"--explain: {trouble.args[0]}")

    @cached_property
    def gallery(self) -> Gallery:
        """All its figures, drawn once."""
        from safeamp.figures import pictures_of

        return pictures_of(self.sheet, self.report, self.limits)

    def first_figures(self) -> Gallery:
        """Return the figures of a page when no more are asked for."""
        from safeamp.figures import FIRST, pictures_of

        return pictures_of(self.sheet, self.report, self.limits, FIRST)


def drawings(gallery: Gallery) -> list[Drawing]:
    """Return figures as parts of a page."""
    from safeamp.figures import svg_text
    from safeamp.report.html import Drawing

    return [
        Drawing(one.title, one.says, svg_text(one.figure, f"figure-{one.name}", one.title, one.says))
        for one in gallery.pictures
    ]


def left_out(gallery: Gallery) -> list[str]:
    """Return which figures are not drawn, and why."""
    return [f"{one.name}: {one.because}" for one in gallery.left_out]


def judged(
    path: Path,
    *,
    limits: Path | None = None,
    device_folder: Path | None = None,
    on_paper: bool = False,
    up_to: Step | None = None,
    demo: bool = False,
) -> Judged:
    """Return a sheet with its report; ends with the status for wrong input where it cannot be read."""
    from safeamp.reading import load_sheet
    from safeamp.reading.limits import load_limits
    from safeamp.studies.verdict import verdict

    with complaining():
        rules = load_limits(limits)
        sheet = load_sheet(path, device_folder=device_folder, limits=rules)
        report = verdict(sheet, rules, on_paper=on_paper, up_to=up_to, demo=demo)
    return Judged(sheet, rules, report)


def step_of(word: str) -> Step:
    """Return the step that a user names, with hyphens or blanks."""
    from safeamp.findings import Step
    from safeamp.limits import nearest, plain

    steps = {plain(step.value): step for step in Step}
    found = steps.get(plain(word))
    if found is None:
        words = ", ".join(step.value for step in Step)
        fail(f"--step {word} is not a step{nearest(plain(word), steps)}; the steps are {words}")
    return found
