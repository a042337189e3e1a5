"""What the documents hold: headings, fenced blocks, tables, links."""

import re
from dataclasses import dataclass
from pathlib import Path

TREE = Path(__file__).resolve().parents[2]
README = TREE / "README.md"
DEVELOPERS = TREE / "DEVELOPERS.md"


@dataclass(frozen=True)
class Block:
    """A fenced block: the word behind the fence, the name behind that word, and what it holds."""

    language: str
    name: str
    text: str
    line: int


def read(path: Path) -> str:
    return path.read_text(encoding="utf-8")


def blocks(text: str, language: str | None = None) -> list[Block]:
    """Return the fenced blocks in their order, of one language or of all."""
    found, inside, start, head = [], None, 0, ("", "")
    for number, line in enumerate(text.splitlines(), 1):
        if not line.startswith("```"):
            if inside is not None:
                inside.append(line)
        elif inside is None:
            word, _, name = line[3:].strip().partition(" ")
            inside, start, head = [], number, (word, name.strip())
        else:
            found.append(Block(*head, "\n".join(inside) + "\n", start))
            inside = None
    assert inside is None, f"the block of line {start} is not closed"
    return [block for block in found if language in (None, block.language)]


def prose(text: str) -> str:
    """Return the text without its fenced blocks."""
    return re.sub(r"(?ms)^```.*?^```$", "", text)


def headings(text: str) -> list[tuple[int, str]]:
    """Return level and words of each heading."""
    return [(len(mark), words) for mark, words in re.findall(r"(?m)^(#+) (.*)$", prose(text))]


def section(text: str, title: str) -> str:
    """Return what stands under a heading, up to the next one of its level or above."""
    lines, level, found = text.splitlines(), 0, []
    fenced = False
    for line in lines:
        fenced ^= line.startswith("```")
        heading = None if fenced else re.match(r"(#+) (.*)", line)
        if heading and level and len(heading[1]) <= level:
            break
        if heading and heading[2] == title:
            level = len(heading[1])
        elif level:
            found.append(line)
    assert level, f"there is no heading {title!r}"
    return "\n".join(found)


def rows(text: str) -> list[list[str]]:
    """Return the cells of the one table in a text, without its head."""
    lines = [line for line in text.splitlines() if line.startswith("|")]
    cells = [[cell.strip() for cell in re.split(r"(?<!\\)\|", line)[1:-1]] for line in lines]
    rules = [row for row in cells if set("".join(row)) <= {"-", ":"}]
    assert len(rules) == 1, "a text with one table is wanted"
    assert cells[1] == rules[0]
    return cells[2:]


def anchor(heading: str) -> str:
    """Return the anchor that a heading gets."""
    return re.sub(r"[^\w\- ]", "", heading.lower()).replace(" ", "-")


def links(text: str) -> list[str]:
    """Return the targets of all links outside of fenced blocks."""
    return re.findall(r"\]\(([^)\s]+)\)", prose(text))
