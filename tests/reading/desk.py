"""Sheets for the tests: a sound one, changed key by key, written as a file and read again."""

import copy
import json
import tomllib
from pathlib import Path

from safeamp.complaints import ReadingError
from safeamp.reading import load_sheet

SCENARIOS = Path(__file__).parent.parent / "scenarios"
GONE = object()


def scenario(name):
    return tomllib.loads((SCENARIOS / f"{name}.toml").read_text(encoding="utf-8"))


def change(data, changes):
    """Return the tables with each key path set to a value, or taken away with GONE."""
    data = copy.deepcopy(data)
    for path, value in changes.items():
        *outer, last = path.split(".")
        table = data
        for name in outer:
            table = table.setdefault(name, {})
        if value is GONE:
            del table[last]
        else:
            table[last] = value
    return data


def toml(table, path=()):
    """Return nested tables as a TOML text; what JSON and TOML share is written by json."""
    plain = {key: value for key, value in table.items() if not isinstance(value, dict)}
    lines = [f"{key} = {json.dumps(value, ensure_ascii=False)}" for key, value in plain.items()]
    text = (f"[{'.'.join(path)}]\n" if path else "") + "\n".join(lines) + "\n\n"
    return text + "".join(
        toml(value, (*path, key)) for key, value in table.items() if isinstance(value, dict)
    )


def load(folder, changes=None, *, base="healthy", **options):
    file = folder / "sheet.toml"
    file.write_text(toml(change(scenario(base), changes or {})), encoding="utf-8")
    return load_sheet(file, **options)


def complaints(folder, changes, *, base="healthy", **options):
    """Return the complaints about a changed sheet, each as ``key: text``."""
    try:
        load(folder, changes, base=base, **options)
    except ReadingError as trouble:
        return [f"{complaint.key}: {complaint.text}" for complaint in trouble.complaints]
    return []
