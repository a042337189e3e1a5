"""Print the oldest declared dependencies as constraints of pip, to make an environment of them."""

import re
import sys
import tomllib
from pathlib import Path

PROJECT = Path(__file__).resolve().parents[2] / "pyproject.toml"


def oldest() -> list[str]:
    """Return ``name==version`` of every runtime dependency; fails for one without a lower bound."""
    declared = tomllib.loads(PROJECT.read_text(encoding="utf-8"))["project"]["dependencies"]
    found = [re.fullmatch(r"([a-z0-9-]+)>=([0-9.]+)", text) for text in declared]
    assert all(found), declared
    return [f"{match[1]}=={match[2]}" for match in found if match]


if __name__ == "__main__":
    sys.stdout.write("\n".join(oldest()) + "\n")
