"""Draw the pictures of README anew: `python -m tests.docs.draw`. All show the demonstration, an invented amplifier."""

import re
import tempfile
from functools import cache
from html import escape
from io import BytesIO
from pathlib import Path

from typer.testing import CliRunner

from safeamp.cli import figures
from safeamp.cli.app import app
from safeamp.cli.judged import judged
from safeamp.report.text import render

FOLDER = Path(__file__).with_name("pictures")
DEMO = Path(figures.__file__).with_name("demo.toml")
#: Lines of the terminal that are shown: the head, the steps and the first findings.
ROWS = 25
ROW, COLUMN, EDGE = 17, 7.83, 16
PAGE = (900, 1060)
INKS = {"32": "#86d993", "33": "#f0c35a", "35": "#d7a8f0", "1;31": "#ff8a80", "1": "#ffffff"}
MARKED = re.compile("\x1b\\[([\\d;]+)m(.*?)\x1b\\[0m")


@cache
def demonstration():
    """Return the demonstration as it is judged."""
    return judged(DEMO, demo=True)


def terminal() -> str:
    """Return the first lines that the terminal shows, as SVG."""
    lines = ["$ safeamp demo", *render(demonstration().report, colour=True).splitlines()][:ROWS]
    height = ROW * len(lines) + 2 * EDGE
    width = round(80 * COLUMN + 2 * EDGE)
    rows = "\n".join(
        f'<text x="{EDGE}" y="{EDGE + ROW * (number + 0.75):g}">{_spans(line)}</text>'
        for number, line in enumerate(lines)
    )
    return (
        f'<svg xmlns="http://www.w3.org/2000/svg" width="{width}" height="{height}" viewBox="0 0 {width} {height}" '
        f'role="img">\n<title>safeamp demo on a terminal</title>\n<rect width="100%" height="100%" rx="6" '
        f'fill="#1b1f24"/>\n<g font-family="DejaVu Sans Mono, Menlo, Consolas, monospace" font-size="13" '
        f'fill="#dfe3e8">\n{rows}\n</g>\n</svg>\n'
    )


def _spans(line: str) -> str:
    kept = escape(line, quote=False).replace(" ", "\u00a0")  # blanks at the head of a line would be dropped
    return MARKED.sub(lambda found: f'<tspan fill="{INKS[found[1]]}">{found[2]}</tspan>', kept)


def safe_area() -> str:
    """Return the figure of the safe area as the program writes it."""
    with tempfile.TemporaryDirectory() as folder:
        CliRunner().invoke(app, ["demo", "--figures", folder], catch_exceptions=False)
        return (Path(folder) / "safe-area.svg").read_text(encoding="utf-8")


def report_page() -> bytes:
    """Return the upper part of the page as a browser shows it, in a few shades so that it stays small."""
    from PIL import Image

    from tests.html.browser import browser

    with tempfile.TemporaryDirectory() as folder:
        page = Path(folder) / "demo.html"
        CliRunner().invoke(app, ["demo", "--format", "html", "--output", str(page)], catch_exceptions=False)
        with browser(Path(folder) / "profile") as opened:
            opened.open(page, PAGE[0], PAGE[1])
            shot = Image.open(BytesIO(opened.picture())).convert("RGB").crop((0, 0, *PAGE))
    stream = BytesIO()
    shot.resize((PAGE[0] * 4 // 5, PAGE[1] * 4 // 5)).quantize(24).save(stream, "PNG", optimize=True)
    return stream.getvalue()


def main() -> None:
    """Write all pictures."""
    FOLDER.mkdir(exist_ok=True)
    (FOLDER / "terminal.svg").write_text(terminal(), encoding="utf-8")
    (FOLDER / "safe-area.svg").write_text(safe_area(), encoding="utf-8")
    (FOLDER / "report-page.png").write_bytes(report_page())


if __name__ == "__main__":
    main()
