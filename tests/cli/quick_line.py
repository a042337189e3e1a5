"""Run a quick command in this process and read what it answers."""

import json

from typer.testing import CliRunner, Result

from safeamp.cli.app import app


def words(line: dict[str, str]) -> list[str]:
    return [word for name, text in line.items() for word in (f"--{name.replace('_', '-')}", text)]


def run(command: str, **options: str) -> Result:
    result = CliRunner().invoke(app, [command, *words(options)])
    assert result.exception is None or isinstance(result.exception, SystemExit), result.exception
    return result


def answer(command: str, **options: str) -> dict:
    result = run(command, **options, format="json")
    assert result.exit_code != 2, result.stderr
    return json.loads(result.stdout) | {"status": result.exit_code}


def value(command: str, name: str, **options: str) -> float:
    return answer(command, **options)["results"][name]["value"]


def refusal(command: str, **options: str) -> str:
    result = run(command, **options)
    assert result.exit_code == 2
    assert result.stdout == ""
    assert "Traceback" not in result.stderr
    return result.stderr
