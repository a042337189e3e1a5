"""Compare a built wheel and source archive with the tree: ``python archives.py FOLDER``."""

import sys
import tarfile
import zipfile
from pathlib import Path

TREE = Path(__file__).resolve().parents[2]


def main(folder: Path) -> None:
    """Fail when a data file of the tree is in one of the two archives not or not the same."""
    [wheel], [source] = folder.glob("*.whl"), folder.glob("*.tar.gz")
    data = sorted((TREE / "limits").rglob("*.toml"))
    assert data
    with zipfile.ZipFile(wheel) as inside:
        for path in data:
            name = f"safeamp/_data/{path.relative_to(TREE).as_posix()}"
            assert inside.read(name) == path.read_bytes(), name
    with tarfile.open(source) as inside:
        names = {name.partition("/")[2] for name in inside.getnames()}
    missing = [path for path in data if path.relative_to(TREE).as_posix() not in names]
    assert not missing, missing
    sys.stdout.write(f"{len(data)} data files in {wheel.name} and {source.name}\n")


if __name__ == "__main__":
    main(Path(sys.argv[1]))
