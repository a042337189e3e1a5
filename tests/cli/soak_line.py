"""Write the log of a soak, run the command on it and read what it answers."""

import json
from pathlib import Path

import numpy as np
from typer.testing import CliRunner, Result

from safeamp.cli.app import app
from tests.cli.quick_line import words

HEAD = "time [min], heatsink [degC]"
TIME = np.array([0.0, 10.0, 20.0, 30.0, 40.0, 50.0, 60.0])


def warm(
    end: float = 62.0, start: float = 24.0, constant: float = 20.0, time: np.ndarray = TIME
) -> np.ndarray:
    """Return the readings of an ideal warm-up, degC; times in minutes."""
    return end - (end - start) * np.exp(-time / constant)


def write(folder: Path, *columns: object, head: str = HEAD) -> Path:
    """Write a log; a single column is that of the heatsink, every ten minutes."""
    rows = list(zip(*([TIME, *columns] if len(columns) == 1 else columns), strict=False))
    file = folder / "soak.csv"
    file.write_text(
        "\n".join([head, *(", ".join(f"{cell:.9g}" for cell in row) for row in rows)]), encoding="utf-8"
    )
    return file


def run(file: Path, **options: str) -> Result:
    result = CliRunner().invoke(app, ["soak", str(file), *words(options)])
    assert result.exception is None or isinstance(result.exception, SystemExit), result.exception
    return result


def answer(file: Path, **options: str) -> dict:
    result = run(file, **options, format="json")
    assert result.exit_code != 2, result.stderr
    return json.loads(result.stdout) | {"status": result.exit_code}


def values(found: dict) -> dict:
    return {name: item["value"] for name, item in found["results"].items()}


def refusal(file: Path, **options: str) -> str:
    result = run(file, **options)
    assert (result.exit_code, result.stdout) == (2, "")
    assert "Traceback" not in result.stderr
    return result.stderr
