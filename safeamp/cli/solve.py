"""The command `solve`: at which values of one key the findings hold."""

from __future__ import annotations

from enum import StrEnum
from pathlib import Path
from typing import TYPE_CHECKING, Annotated

import typer

from safeamp.cli.files import FilesRead
from safeamp.cli.options import DeviceFolderOption, LimitsOption, OutputOption, SheetArgument
from safeamp.cli.output import check_output, columns, complaining, emit, fail

if TYPE_CHECKING:
    from safeamp.answers import Solution
    from safeamp.reading import Source
    from safeamp.reading.movable import Movable


class Form(StrEnum):
    """How the answer is printed."""

    TEXT = "text"
    JSON = "json"


class Until(StrEnum):
    """The worst word that counts as holding."""

    GO = "go"
    CAUTION = "caution"


def solve(
    sheet: SheetArgument,
    key: Annotated[str, typer.Argument(help="The key, such as supply.no_load or device.fitted.power.")],
    finding: Annotated[
        list[str] | None, typer.Option("--finding", help="Only this finding; may be given several times.")
    ] = None,
    until: Annotated[Until, typer.Option("--until", help="The worst word that will do.")] = Until.GO,
    on_paper: Annotated[
        bool, typer.Option("--on-paper", help="Leave out what is read at the bench.")
    ] = False,
    format_: Annotated[Form, typer.Option("--format", help="How the answer is printed.")] = Form.TEXT,
    output: OutputOption = None,
    limits: LimitsOption = None,
    device_folder: DeviceFolderOption = None,
) -> None:
    """Say at which values of one key the findings that read it stay go; what ends them; what can be bought."""
    from safeamp.report.solution import render_solution, solution_json

    never = FilesRead(sheet, limits=limits, device_folder=device_folder)
    if output is not None:
        check_output(output, never)
    found = _solve(sheet, key, tuple(finding or ()), until, on_paper, limits, device_folder)
    width = columns() if output is None else 80
    text = solution_json(found) if format_ is Form.JSON else render_solution(found, width=width)
    emit(text, output, never=never)


def _solve(
    path: Path,
    key: str,
    findings: tuple[str, ...],
    until: Until,
    on_paper: bool,
    limits: Path | None,
    device_folder: Path | None,
) -> Solution:
    from safeamp.findings import Verdict
    from safeamp.reading import open_sheet
    from safeamp.reading.limits import load_limits
    from safeamp.studies.solve import QuestionError
    from safeamp.studies.solve import solve as answer

    _check_ids(findings, on_paper=on_paper)
    with complaining():
        rules = load_limits(limits)
        number = _number(open_sheet(path, device_folder=device_folder, limits=rules), key)
        word = Verdict.from_word(until.value)
        try:
            return answer(number, rules, findings=findings, until=word, on_paper=on_paper)
        except QuestionError as trouble:
            fail(str(trouble))


def _check_ids(findings: tuple[str, ...], *, on_paper: bool) -> None:
    from safeamp.checks import CHECKS
    from safeamp.limits import nearest

    for id in findings:
        if id not in CHECKS:
            fail(f"--finding {id} is not a finding{nearest(id, CHECKS)}")
        if on_paper and CHECKS[id].at_bench:
            fail(f"--finding {id} is read at the bench, which --on-paper leaves out")


def _number(source: Source, key: str) -> Movable:
    from safeamp.reading.movable import movable

    try:
        return movable(source, key)
    except (KeyError, ValueError) as trouble:
        fail(str(trouble.args[0]))
