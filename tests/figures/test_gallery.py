"""What holds for every picture: units, nothing cut off, the same bytes, and a reason where one is left out."""

import re
import xml.etree.ElementTree as ET
from dataclasses import replace

import matplotlib as mpl
import pytest

from safeamp.amplifier import with_values
from safeamp.figures import FIRST, FURTHER, pictures_of, rendered, svg_text
from safeamp.studies.verdict import verdict
from tests.figures.drawing import DRIVER, NAMES, UNIT, full, gallery, picture, why, within
from tests.scenarios.sheets import GONE, limits, sheet
from tests.scenarios.sheets import NAMES as SCENARIOS


def test_everything_is_drawn_where_everything_is_given():
    assert tuple(one.name for one in full().pictures) == NAMES
    assert full().left_out == ()


@pytest.mark.parametrize("name", NAMES)
def test_every_axis_has_its_unit(name):
    for plane in picture(name).figure.axes:
        scales = [plane.get_ylabel()] if plane.get_ylabel() else []
        scales += [plane.get_xlabel()] if plane.get_xlabel() else []
        assert scales
        assert all(UNIT.search(label) for label in scales), scales


@pytest.mark.parametrize("scenario", ["single_rail", *(name for name in SCENARIOS if name != "single_rail")])
def test_no_word_is_cut_off_and_no_two_pictures_say_the_same(scenario):
    found = full() if scenario == "single_rail" else gallery(scenario, {})
    assert len({one.says for one in found.pictures}) == len(found.pictures) >= 4
    for one in found.pictures:
        within(one)


def test_only_what_is_asked_for_is_drawn():
    read = sheet("split_rail")
    report = verdict(read, limits())
    found = pictures_of(read, report, limits(), FIRST)
    assert {one.name for one in found.pictures} == set(FIRST)
    assert found.left_out == ()
    assert (*FIRST, *FURTHER) == NAMES


def test_the_same_sheet_gives_the_same_bytes_whatever_the_user_has_set():
    read = sheet("split_rail", DRIVER)
    report = verdict(read, limits())
    plain = pictures_of(read, report, limits()).pictures
    with mpl.rc_context({"font.size": 20.0, "axes.facecolor": "red", "svg.fonttype": "path"}):
        styled = pictures_of(read, report, limits()).pictures
        assert len(styled) == len(plain) == len(NAMES) - 1
        for one, other in zip(plain, styled, strict=True):
            assert rendered(one.figure) == rendered(other.figure), one.name


@pytest.mark.parametrize("name", NAMES)
def test_a_file_says_nothing_of_the_day_and_its_words_are_words(name):
    text = rendered(picture(name).figure).decode()
    assert "<dc:date>" not in text
    assert f">{picture(name).title}</text>" in text


@pytest.mark.parametrize(
    ("name", "scenario", "changes", "reason"),
    [
        ("low-notes", "split_rail", {}, 'stage.coupling = "direct": there is no output capacitor'),
        ("coil", "split_rail", {}, "not given: loudspeaker.coil_to_magnet, loudspeaker.coil_time_constant"),
        ("impedance", "split_rail", {}, "not given: loudspeaker.resonance, loudspeaker.q_mechanical"),
        ("cone-travel", "split_rail", {**DRIVER, "loudspeaker.force_factor": GONE}, "loudspeaker.force_factor"),
        (
            "coil", "split_rail",
            {**DRIVER, "protection.trip_delay": GONE, "protection.loudspeaker_fuse": GONE},
            "not given: protection.trip_delay, protection.loudspeaker_fuse",
        ),
        ("safe-area", "split_rail", {"stage.idle": GONE}, "not given: stage.idle"),
        ("heat", "split_rail", {"stage.idle": GONE}, "not given: stage.idle"),
        ("temperatures", "split_rail", {"stage.idle": GONE}, "not given: stage.idle"),
        (
            "coil", "single_rail", {**DRIVER, "output_capacitor.rated_voltage": "100 V"},
            "the output capacitor blocks the whole rail",
        ),
    ],
)  # fmt: skip
def test_a_picture_without_its_inputs_is_left_out_and_says_what_is_missing(name, scenario, changes, reason):
    found = gallery(scenario, changes)
    assert reason in why(name, found)
    assert name not in {one.name for one in found.pictures}


@pytest.mark.parametrize("name", NAMES)
def test_a_part_of_a_page_shares_no_name_with_another(name):
    figure = picture(name).figure
    one, two = (svg_text(figure, prefix, title="<&>", description="so") for prefix in ("first", "second"))
    root = ET.fromstring(one)
    assert root.tag.endswith("svg")
    assert root.get("role") == "img"
    assert root.get("aria-labelledby") == "first-title first-desc"
    assert next(part.text for part in root if part.tag.endswith("title")) == "<&>"
    ids = [part.get("id") for part in root.iter() if part.get("id")]
    assert len(ids) == len(set(ids))
    assert set(ids).isdisjoint(part.get("id") for part in ET.fromstring(two).iter())
    named = set(re.findall(r'href="#([^"]+)"|url\(#([^)]+)\)', one))
    assert {first or second for first, second in named} <= set(ids)
    styles = [part.text for part in root.iter() if part.tag.endswith("style")]
    assert [re.findall(r"([^{}]+)\{", style) for style in styles] == [["#first *"]]
    assert not re.search(r"<script|<image|https?://(?!www\.w3\.org/)", one)


@pytest.mark.parametrize("prefix", ["", "1st", 'a"b', "a b", "ä"])
def test_a_prefix_that_cannot_stand_in_a_name_is_refused(prefix):
    with pytest.raises(ValueError, match=f"not {re.escape(repr(prefix))}"):
        svg_text(picture("heat").figure, prefix)


def test_values_that_no_amplifier_can_have_leave_a_picture_out_in_words():
    read = sheet("split_rail")
    report = verdict(read, limits())
    broken = replace(read, amplifier=with_values(read.amplifier, {"stage.emitter_resistor": -1.0}))
    found = pictures_of(broken, report, limits())
    assert [one.name for one in found.pictures] == ["overview"]
    assert "emitter_resistor must be " in why("safe-area", found)
