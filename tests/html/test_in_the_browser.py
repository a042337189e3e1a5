"""What only a browser can show: nothing is fetched, nothing is clipped, the verdict stands on page one of the print."""

import io
import unicodedata

import pytest
from pypdf import PdfReader

from safeamp.report.page import page_of
from tests.html.browser import A4, LETTER
from tests.html.pages import HOSTILE, gallery, report, written

NAMES = ("healthy", "split_rail", "single_rail", "old_mains", "bench_mockup")

CONTRAST = """
(() => {
  const part = c => { c /= 255; return c <= 0.03928 ? c / 12.92 : ((c + 0.055) / 1.055) ** 2.4; };
  const lum = rgb => 0.2126 * part(rgb[0]) + 0.7152 * part(rgb[1]) + 0.0722 * part(rgb[2]);
  const read = text => text.match(/[\\d.]+/g).map(Number);
  const behind = node => {
    for (; node; node = node.parentElement) {
      const rgb = read(getComputedStyle(node).backgroundColor);
      if (rgb.length < 4 || rgb[3] > 0) return rgb;
    }
    return [255, 255, 255];
  };
  const found = [];
  const walker = document.createTreeWalker(document.body, NodeFilter.SHOW_TEXT);
  while (walker.nextNode()) {
    const node = walker.currentNode.parentElement;
    if (!walker.currentNode.data.trim() || node.closest('svg, style')) continue;
    const [one, other] = [lum(read(getComputedStyle(node).color)), lum(behind(node))].sort((a, b) => b - a);
    found.push([(one + 0.05) / (other + 0.05), walker.currentNode.data.trim().slice(0, 40)]);
  }
  return found.sort((a, b) => a[0] - b[0])[0];
})()
"""
WIDER = """
[...document.body.querySelectorAll('*')].filter(
  one => !one.closest('.drawing, thead') && one.getBoundingClientRect().right > document.documentElement.clientWidth + 1
).map(one => one.tagName + '.' + one.className)
"""
UNDRAWN = """
[...document.querySelectorAll('figure svg')].filter(one => {
  const box = one.getBoundingClientRect();
  return box.width < 200 || box.height < 100 || one.querySelectorAll('path').length < 5 || !one.querySelector('title');
}).map(one => one.id)
"""


def bare(text):
    """Return a text without blanks and ligatures, which print where they please."""
    return "".join(unicodedata.normalize("NFKC", text).split())


@pytest.fixture
def opened(chromium, tmp_path):
    def open_(name, width=1200):
        chromium.open(written(name, tmp_path), width)
        return chromium

    return open_


@pytest.mark.parametrize("name", NAMES)
def test_nothing_is_fetched_and_nothing_goes_wrong(opened, name):
    page = opened(name)
    assert [url for url in page.asked if not url.startswith(("file:", "data:"))] == []
    assert len([url for url in page.asked if url.startswith("file:")]) == 1
    assert page.troubles == []


@pytest.mark.parametrize("name", NAMES)
def test_every_figure_is_drawn(opened, name):
    page = opened(name)
    assert page.ask("document.querySelectorAll('figure svg').length") == len(gallery(name).pictures) > 0
    assert page.ask(UNDRAWN) == []


@pytest.mark.parametrize("name", NAMES)
@pytest.mark.parametrize("width", [360, 700, 1200])
def test_no_page_scrolls_sideways(opened, name, width):
    page = opened(name, width)
    page.ask("document.querySelectorAll('details').forEach(one => { one.open = true; })")
    assert page.ask("document.documentElement.clientWidth") == width
    assert page.ask("document.documentElement.scrollWidth") == width
    assert page.ask(WIDER) == []


@pytest.mark.parametrize("size", [A4, LETTER], ids=["A4", "Letter"])
@pytest.mark.parametrize("name", NAMES)
def test_the_verdict_is_on_page_one_of_the_print(opened, name, size):
    found = report(name)
    first, *others = PdfReader(io.BytesIO(opened(name).pdf(size))).pages
    text = bare(first.extract_text())
    assert bare(f"{found.verdict.word.upper()} for {page_of(found).scope}") in text
    for step in found.steps:
        assert bare(step.step.value) in text
    assert bare(found.title) in text
    assert others
    assert (round(float(first.mediabox.width) / 72, 1), round(float(first.mediabox.height) / 72, 1)) == (
        round(size[0], 1),
        round(size[1], 1),
    )


@pytest.mark.parametrize("name", NAMES)
def test_the_print_keeps_every_finding_every_value_and_every_limit(opened, name):
    found = report(name)
    pages = PdfReader(io.BytesIO(opened(name).pdf(A4))).pages
    text = bare("".join(page.extract_text() for page in pages))
    for entry in page_of(found).entries:
        for said in (entry.finding.id, entry.number, entry.limit, *(one.key for one in entry.inputs)):
            assert bare(said) in text
    assert found.digest in text


@pytest.mark.parametrize("name", NAMES)
def test_all_text_stands_out_from_what_is_behind_it(opened, name):
    page = opened(name)
    page.ask("document.querySelectorAll('details').forEach(one => { one.open = true; })")
    ratio, where = page.ask(CONTRAST)
    assert ratio >= 4.5, where


def test_a_hostile_title_is_shown_and_not_obeyed(opened):
    page = opened("hostile")
    assert page.ask("document.querySelector('h1').textContent") == HOSTILE
    assert page.ask("document.scripts.length + document.images.length") == 0
    assert page.ask("document.title").endswith(HOSTILE)
    assert page.troubles == []
    assert page.ask(UNDRAWN) == []


def test_too_little_contrast_is_noticed(opened):
    page = opened("healthy")
    page.ask("document.querySelector('h1').style.color = '#888'")
    assert page.ask(CONTRAST)[0] < 4.5


def test_a_page_that_is_too_wide_is_noticed(opened):
    page = opened("healthy", 360)
    page.ask("document.querySelector('h1').style.width = '500px'")
    assert page.ask(WIDER)


def test_what_is_fetched_is_noticed(chromium, tmp_path):
    path = tmp_path / "page.html"
    path.write_text('<!doctype html><img src="missing.png"><p>text', encoding="utf-8")
    chromium.open(path)
    assert any(url.endswith("missing.png") for url in chromium.asked)
    assert chromium.troubles
