"""The page as text: nothing from outside, nothing of the sheet obeyed, one order of heads, every id once."""

import itertools
import re
from collections import Counter
from dataclasses import replace
from html.parser import HTMLParser

import pytest

from safeamp.findings import Verdict
from safeamp.report.html import Drawing, as_html
from safeamp.report.page import page_of
from tests.report.hand_made import DEVICES, OFFSET, SAFE_AREA, report_of
from tests.scenarios import sheets

HOSTILE = "<script>alert(1)</script>\"'><img src=http://a.b/c onerror=alert(1)>{{ 7 * 7 }}\u202e\x1b"
NAMES = ("healthy", "split_rail", "single_rail", "bench_mockup")
VOID = {"meta", "link", "br", "img", "path", "circle", "use", "input"}


class Page(HTMLParser):
    """Tags, attributes and texts of a page; every tag that is opened must be closed."""

    def __init__(self, text):
        super().__init__(convert_charrefs=True)
        self.tags, self.attributes, self.texts, self._open = Counter(), [], [], []
        self.heads = []
        self.feed(text)
        self.close()
        assert self._open == []

    def handle_starttag(self, tag, attrs):
        self.tags[tag] += 1
        self.attributes += [(tag, *pair) for pair in attrs]
        if tag not in VOID:
            self._open.append(tag)

    def handle_startendtag(self, tag, attrs):
        self.tags[tag] += 1
        self.attributes += [(tag, *pair) for pair in attrs]

    def handle_endtag(self, tag):
        assert self._open.pop() == tag

    def handle_data(self, data):
        if "style" not in self._open:
            self.texts.append(data)
            self.heads += [(tag, data) for tag in self._open[-1:] if re.fullmatch("h[1-6]", tag)]

    @property
    def text(self):
        return " ".join("".join(self.texts).split())


def values(page, name):
    return [value for _, key, value in page.attributes if key == name]


@pytest.mark.parametrize("name", NAMES)
def test_every_number_and_sentence_of_the_report_is_there(name):
    report = sheets.report(name)
    words, page = page_of(report), Page(as_html(report, {}))
    for entry in words.entries:
        limit = f" ({entry.limit})" if entry.limit else ""
        assert squeezed(f"{entry.number}{limit}") in page.text
        for said in (entry.finding.says, entry.finding.explanation, entry.source, entry.finding.method):
            assert squeezed(said) in page.text
        for _, detail in entry.details:
            assert squeezed(detail) in page.text
        for given in entry.inputs:
            assert squeezed(f"{given.key} = {given.value} ({given.origin})") in page.text
    for note in (*words.notes, *([words.way_on] if words.way_on else [])):
        assert all(squeezed(text) in page.text for text in note.texts)
    assert all(squeezed(text) in page.text for text in words.safety)
    assert squeezed(words.last.replace("cautions above", "cautions below")) in page.text
    assert report.digest in page.text


def squeezed(text):
    return " ".join(text.split())


@pytest.mark.parametrize("name", NAMES)
def test_nothing_stands_outside_the_page(name):
    text = as_html(sheets.report(name), {})
    page = Page(text)
    assert page.tags["script"] == page.tags["img"] == page.tags["iframe"] == page.tags["form"] == 0
    assert "http" not in re.sub(r'http-equiv="Content-Security-Policy"', "", text)
    assert all(link.startswith(("#", "data:")) for link in values(page, "href"))
    assert "@import" not in text
    assert "default-src 'none'" in text


@pytest.mark.parametrize("name", NAMES)
def test_every_link_leads_somewhere_and_every_id_is_one(name):
    page = Page(as_html(sheets.report(name), {}))
    ids = Counter(values(page, "id"))
    assert max(ids.values()) == 1
    assert {link[1:] for link in values(page, "href") if link.startswith("#")} <= set(ids)
    for label in values(page, "aria-labelledby"):
        assert set(label.split()) <= set(ids)


@pytest.mark.parametrize("name", NAMES)
def test_heads_are_one_order_and_the_title_says_the_verdict(name):
    report = sheets.report(name)
    text = as_html(report, {})
    levels = [int(level) for level in re.findall(r"<h([1-6])", text)]
    assert levels[0] == 1
    assert levels.count(1) == 1
    assert all(after <= before + 1 for before, after in itertools.pairwise(levels))
    assert f"<title>{report.verdict.word.upper()}: " in text
    assert '<html lang="en">' in text


@pytest.mark.parametrize("verdict", Verdict)
def test_a_verdict_is_a_word_and_a_shape_of_its_own(verdict):
    text = as_html(report_of(replace(DEVICES, verdict=verdict)), {})
    assert f'<use href="#shape-{verdict.word}"/></svg>{verdict.word}</span>' in text
    shapes = dict(re.findall(r'<symbol id="shape-(\w+)"[^>]*>(.*?)</symbol>', text))
    assert len(set(shapes.values())) == len(Verdict) + 1


def test_a_hostile_text_stays_text():
    finding = replace(
        SAFE_AREA, says=HOSTILE, because=(HOSTILE,), next=HOSTILE, method=HOSTILE, overturned_by=HOSTILE
    )
    report = report_of(DEVICES, finding, title=HOSTILE, scope=HOSTILE, source=HOSTILE, remarks=(HOSTILE,))
    text = as_html(report, {}, [Drawing(HOSTILE, HOSTILE, "<svg></svg>")], [HOSTILE])
    page = Page(text)
    assert page.tags["script"] == page.tags["img"] == 0
    assert "onerror" not in [key for _, key, _ in page.attributes]
    assert text.count("{{ 7 * 7 }}") > 8
    assert "\x1b" not in text
    assert "\u202e" not in text


def test_what_decides_is_linked_and_what_is_not_reached_is_said():
    page = Page(as_html(report_of(DEVICES, OFFSET, SAFE_AREA), {}))
    assert "#soa.loudspeaker" in values(page, "href")
    assert "not reached loudspeaker" in page.text
    assert "First step not cleared: bias (unverified); to clear: offset.output" in page.text


def test_a_number_stays_with_its_unit():
    assert "180\u00a0kohm" in as_html(report_of(DEVICES), {})


def test_a_share_says_of_what_it_is_one_and_an_origin_stands_once():
    given = {one.key: one for section in page_of(sheets.report("healthy")).sections for entry in section.entries
             for one in entry.inputs}  # fmt: skip
    assert given["loudspeaker.power_word"].value == "100 % of loudspeaker.rated_power"
    assert given["supply.rail_fuse"].value == "T 2 A"
    assumed = sheets.report(
        "healthy", {"supply.full_load": sheets.GONE, "loudspeaker.minimum_impedance": sheets.GONE}
    )
    given = {one.key: one for section in page_of(assumed).sections for entry in section.entries
             for one in entry.inputs}  # fmt: skip
    assert given["supply.full_load"].value == "87.5 % of supply.no_load"
    assert given["loudspeaker.minimum_impedance"].value == "80 % of loudspeaker.nominal_impedance"


def test_figures_and_what_is_left_out_stand_in_the_page():
    page = Page(
        as_html(report_of(DEVICES), {}, [Drawing("A plane", "What it shows.", "<svg></svg>")], ["heat: no"])
    )
    assert "A plane: What it shows." in page.text
    assert "heat: no" in page.text
    assert Page(as_html(report_of(DEVICES), {})).tags["figure"] == 0
