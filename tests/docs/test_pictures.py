"""The pictures of README: small, told in words as well, and of the demonstration as it is today."""

import json
import re
from io import BytesIO

import pytest
from PIL import Image
from typer.testing import CliRunner

from safeamp.cli.app import app
from tests.docs.documents import README, TREE, read
from tests.docs.draw import FOLDER, PAGE, terminal

SHOWN = re.findall(r"!\[([^\]]+)\]\(([^)]+)\)", read(README))


@pytest.fixture(scope="module")
def demonstration():
    done = CliRunner().invoke(app, ["demo", "--format", "json"], catch_exceptions=False)
    return json.loads(done.stdout)


def test_readme_shows_all_pictures_and_says_what_is_on_them():
    assert {(TREE / target).name for _, target in SHOWN} == {path.name for path in FOLDER.iterdir()}
    assert len(SHOWN) == 3
    assert all(len(words.split()) >= 8 for words, _ in SHOWN)


def test_the_pictures_are_small():
    assert sum(path.stat().st_size for path in FOLDER.iterdir()) < 150_000


def test_the_terminal_is_the_one_that_the_program_shows():
    assert (FOLDER / "terminal.svg").read_text(encoding="utf-8") == terminal()


def test_the_safe_area_has_the_worst_point_of_the_demonstration(demonstration):
    [found] = [one for one in demonstration["findings"] if one["id"] == "soa.loudspeaker"]
    said = (
        f"Worst point: {found['value']['nominal']:.0%} used ({found['at']['voltage']:.3g} V, "
        f"{found['at']['current']:.3g} A); {found['value']['worst']:.0%} at the worst corner"
    )
    assert said in (FOLDER / "safe-area.svg").read_text(encoding="utf-8")


def test_the_page_is_a_picture_of_its_size():
    picture = Image.open(BytesIO((FOLDER / "report-page.png").read_bytes()))
    assert picture.size == tuple(side * 4 // 5 for side in PAGE)
    assert len(picture.convert("RGB").getcolors(4096)) > 8
