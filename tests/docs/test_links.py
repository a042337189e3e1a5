"""Every link leads somewhere, and every file that is named is there."""

import re

import pytest

from tests.docs.documents import DEVELOPERS, README, TREE, anchor, headings, links, prose, read

DOCUMENTS = [README, DEVELOPERS]
ROOTS = ("safeamp/", "tests/", "limits/", ".ci/")


@pytest.mark.parametrize("document", DOCUMENTS, ids=lambda path: path.name)
def test_links(document) -> None:
    found = links(read(document))
    assert found
    for target in found:
        name, _, place = target.partition("#")
        path = document.parent / name if name else document
        assert "://" not in target, f"{target}: what stands elsewhere may vanish"
        assert path.is_file(), target
        if place:
            assert place in {anchor(words) for _, words in headings(read(path))}, target


@pytest.mark.parametrize("document", DOCUMENTS, ids=lambda path: path.name)
def test_paths_in_code_words(document) -> None:
    words = re.findall(r"`([^`\n]+)`", prose(read(document)))
    for word in words:
        name = word.split()[-1].rstrip("/")
        if name.startswith(ROOTS) and not re.search(r"[*<]", name) and "_data" not in name:
            assert (TREE / name).exists(), word


@pytest.mark.parametrize("document", DOCUMENTS, ids=lambda path: path.name)
def test_one_heading_a_name(document) -> None:
    found = [anchor(words) for _, words in headings(read(document))]
    assert len(set(found)) == len(found)
