"""Whole reports as they were last read; `python -m tests.report.record` writes them anew, to be read before use."""

import csv
import io
import sys
from functools import cache
from pathlib import Path

import safeamp
from safeamp.report.csv_ import as_csv
from safeamp.report.html import as_html
from safeamp.report.markdown import as_markdown
from safeamp.report.text import render
from safeamp.studies.verdict import verdict

FOLDER = Path(__file__).parent / "recorded"
SCENARIOS = Path(__file__).parents[1] / "scenarios"
NAMES = ("healthy", "split_rail", "single_rail")
#: Columns that hold more digits than are shown: the last of them are those of a machine.
IN_FULL = ("nominal", "worst", "limit_go", "limit_stop")


@cache
def report(name):
    """Return the report on a scenario, read from its file."""
    limits = safeamp.load_limits()
    return verdict(safeamp.load_sheet(SCENARIOS / f"{name}.toml", limits=limits), limits)


def _csv(one):
    rows = list(csv.DictReader(io.StringIO(as_csv(one), newline="")))
    text = io.StringIO()
    names = [name for name in rows[0] if name not in IN_FULL]
    writer = csv.DictWriter(text, names, lineterminator="\n", extrasaction="ignore")
    writer.writeheader()
    writer.writerows(rows)
    return text.getvalue()


def _body(one):
    return as_html(one, {}).partition("</style>")[2]


FORMS = {"txt": render, "md": as_markdown, "csv": _csv, "html": _body}


def path(name, form):
    """Return where a report is kept."""
    return FOLDER / f"{name}.{form}"


def main():
    """Write every report."""
    for name in NAMES:
        for form, printed in FORMS.items():
            path(name, form).write_text(printed(report(name)), encoding="utf-8", newline="\n")
            sys.stdout.write(f"{path(name, form)}\n")


if __name__ == "__main__":
    main()
