"""The job sheet in a browser: the page for the customer is one sheet of paper, the record starts on the next."""

import io

import pytest
from pypdf import PdfReader

from safeamp.report.jobsheet import RECORD, jobsheet_html
from safeamp.report.jobsheet_page import job_page
from tests.html.browser import A4, LETTER
from tests.html.pages import drawings
from tests.html.test_in_the_browser import CONTRAST, WIDER, bare
from tests.scenarios import sheets

NAMES = ("healthy", "split_rail", "single_rail", "old_mains", "bench_mockup", "mosfet_substitute")
AMPLIFIERS = ("30w_single_rail_to3", "40w_split_rail_to3", "120w_three_pairs")


@pytest.fixture
def opened(chromium, tmp_path):
    def open_(name, width=1200):
        path = tmp_path / f"{name}.html"
        text = jobsheet_html(sheets.sheet(name), sheets.report(name), {}, drawings(name))
        path.write_text(text, encoding="utf-8", newline="\n")
        chromium.open(path, width)
        return chromium

    return open_


@pytest.mark.parametrize("size", [A4, LETTER], ids=["A4", "Letter"])
@pytest.mark.parametrize("name", [*NAMES, *AMPLIFIERS])
def test_the_first_sheet_of_paper_is_the_page_and_nothing_else(opened, name, size):
    first, second, *_ = (
        bare(one.extract_text()) for one in PdfReader(io.BytesIO(opened(name).pdf(size))).pages
    )
    page = job_page(sheets.sheet(name), sheets.report(name))
    for said in (page.title, page.standing, *(text for note in page.notes for text in note.texts)):
        assert bare(said) in first
    assert "Whatwaswrong" in first
    assert bare(RECORD) not in first
    assert bare(RECORD) in second


@pytest.mark.parametrize("name", NAMES)
def test_it_asks_for_nothing_and_fits_a_phone(opened, name):
    page = opened(name, 360)
    assert [url for url in page.asked if not url.startswith(("file:", "data:"))] == []
    assert page.troubles == []
    assert page.ask("document.documentElement.scrollWidth") == 360
    assert page.ask(WIDER) == []
    assert page.ask(CONTRAST)[0] >= 4.5
