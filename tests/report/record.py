"""Whole reports in Markdown, CSV and HTML as they were last read; `python -m tests.reports` writes them anew."""

import csv
import io
import sys
from functools import cache
from pathlib import Path

import safeamp
from safeamp.report.csv_ import ABOUT, as_csv
from safeamp.report.html import as_html
from safeamp.report.markdown import as_markdown
from safeamp.studies.verdict import verdict

FOLDER = Path(__file__).parent / "recorded"
SCENARIOS = Path(__file__).parents[1] / "scenarios"
NAMES = ("healthy", "split_rail", "single_rail")
#: Columns that hold more digits than are shown: the last of them are those of a machine.
IN_FULL = ("nominal", "worst", "limit_go", "limit_stop")
#: Columns that are the same on each row and change with every version and every byte of the sheet.
LEFT_OUT = (*IN_FULL, *ABOUT)


@cache
def report(name):
    """Return the report on a scenario, read from its file."""
    limits = safeamp.load_limits()
    return verdict(safeamp.load_sheet(SCENARIOS / f"{name}.toml", limits=limits), limits)


def _csv(one):
    rows = list(csv.DictReader(io.StringIO(as_csv(one), newline="")))
    text = io.StringIO()
    names = [name for name in rows[0] if name not in LEFT_OUT]
    writer = csv.DictWriter(text, names, lineterminator="\n", extrasaction="ignore")
    writer.writeheader()
    writer.writerows(rows)
    return text.getvalue()


def _body(one):
    return as_html(one, {}).partition("</style>")[2]


FORMS = {"md": as_markdown, "csv": _csv, "html": _body}


def path(name, form):
    """Return where a report is kept."""
    return FOLDER / f"{name}.{form}"


def main():
    """Write every report."""
    for name in NAMES:
        for form, printed in FORMS.items():
            kept, text = path(name, form), printed(report(name))
            same = kept.exists() and kept.read_text(encoding="utf-8") == text
            kept.write_text(text, encoding="utf-8", newline="\n")
            sys.stdout.write(f"{kept.name}: {'as before' if same else 'written'}\n")
