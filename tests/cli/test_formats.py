"""Each format from the command line: whole, self-contained, and as the others say it."""

import csv
import io
import json
import re
from pathlib import Path

import jsonschema
import pytest

from safeamp.cli.output import WRONG
from safeamp.report.schema import SCHEMAS
from tests.cli.test_commands import HEALTHY, run
from tests.cli.test_processes import imported_by

SPLIT = HEALTHY.with_name("split_rail.toml")


@pytest.fixture(scope="module")
def printed():
    return {
        name: run("check", SPLIT, "--format", name) for name in ("text", "json", "markdown", "html", "csv")
    }


def test_every_format_ends_with_the_same_status(printed):
    assert {done.exit_code for done in printed.values()} == {3}
    assert {done.stderr for done in printed.values()} == {""}


def test_every_format_has_the_same_findings_with_the_same_words(printed):
    result = json.loads(printed["json"].stdout)
    expected = [(one["id"], one["verdict"]) for one in result["findings"]]
    rows = list(csv.DictReader(io.StringIO(printed["csv"].stdout, newline="")))
    assert [(row["id"], row["verdict"]) for row in rows] == expected
    heads = re.findall(r"^### (\w+): (\S+)$", printed["markdown"].stdout, re.MULTILINE)
    assert [(id.replace("\\", ""), word) for word, id in heads] == expected
    found = re.findall(r'<article class="finding (\w+)" id="([^"]+)"', printed["html"].stdout)
    assert [(id, word) for word, id in found] == expected
    assert re.findall(r"^  (go|caution) +(\w+\.\w+):", printed["text"].stdout, re.MULTILINE) == [
        (word, id) for id, word in expected
    ]


def test_html_has_two_figures_inside_and_says_how_to_have_the_others(printed):
    text = printed["html"].stdout
    assert text.startswith("<!doctype html>")
    assert text.endswith("</html>\n")
    assert text.count("<figure>") == text.count('role="img"') == 2
    further = "temperatures, heat, low-notes, coil, impedance, cone-travel"
    assert f"Further figures, with --all-figures: {further}." in text
    assert "Left out" not in text


def test_html_has_all_figures_inside_and_says_what_is_left_out():
    text = run("check", SPLIT, "--format", "html", "--all-figures").stdout
    assert text.count("<figure>") == text.count('role="img"') == 4
    assert "low-notes: " in text
    assert "--all-figures" not in text
    assert run("demo", "--format", "html", "--all-figures").stdout.count("<figure>") > 2


@pytest.mark.parametrize("command", [("check", SPLIT), ("demo",)])
def test_only_a_page_has_room_for_figures(command):
    done = run(*command, "--all-figures")
    assert done.exit_code == WRONG
    assert "--all-figures draws into a page: add --format html" in done.stderr


def test_html_is_written_whole_into_a_file_and_never_over_the_sheet(tmp_path):
    page, sheet = tmp_path / "amp.html", tmp_path / "amp.toml"
    sheet.write_text(SPLIT.read_text(encoding="utf-8"), encoding="utf-8")
    assert run("check", sheet, "--format", "html", "--output", page).exit_code == 3
    assert page.read_text(encoding="utf-8").endswith("</html>\n")
    refused = run("check", sheet, "--format", "html", "--output", sheet)
    assert refused.exit_code == WRONG
    assert "is a file that is read" in refused.stderr
    assert {path.name for path in tmp_path.iterdir()} == {"amp.html", "amp.toml"}


def test_the_demonstration_has_every_format():
    for name in ("markdown", "html", "csv"):
        done = run("demo", "--format", name)
        assert done.exit_code == 0
        assert "heat.junction" in done.stdout.replace("\\", "")
    assert "invented" in run("demo", "--format", "html").stdout


@pytest.mark.parametrize("name", ["markdown", "csv", "json"])
def test_only_html_imports_templates_and_figures(name):
    found = imported_by("check", SPLIT, "--format", name)
    assert "safeamp.report.page" in found or name == "json"
    assert found.isdisjoint({"jinja2", "matplotlib", "scipy", "pandas"})


def test_html_imports_what_it_draws_with():
    assert imported_by("check", SPLIT, "--format", "html") >= {"jinja2", "matplotlib"}


@pytest.mark.parametrize("what", ["sheet", "result"])
def test_a_schema_is_printed(what):
    done = run("schema", what)
    assert (done.exit_code, done.stderr) == (0, "")
    assert json.loads(done.stdout) == SCHEMAS[what]()


def test_a_schema_goes_into_a_file(tmp_path):
    path = tmp_path / "sheet.json"
    assert run("schema", "sheet", "--output", path).exit_code == 0
    jsonschema.Draft202012Validator.check_schema(json.loads(path.read_text(encoding="utf-8")))


def test_another_schema_is_refused_with_the_nearest():
    done = run("schema", "results")
    assert done.exit_code == WRONG
    assert "results has no schema; did you mean result" in done.stderr


def test_a_printed_result_is_as_its_schema_says(printed):
    jsonschema.Draft202012Validator(SCHEMAS["result"]()).validate(json.loads(printed["json"].stdout))


def test_templates_are_part_of_the_package():
    folder = Path(__file__).parents[2] / "safeamp" / "report" / "templates"
    assert {path.name for path in folder.iterdir()} >= {
        "base.html.j2",
        "report.html.j2",
        "style.css",
        "shapes.svg",
    }


def test_explain_shows_the_calculation_and_changes_nothing_else(printed):
    done = run("check", SPLIT, "--explain", "soa.loudspeaker", "--explain", "heat.heatsink")
    assert done.exit_code == 3
    assert re.findall(r"^How (\S+) comes about$", done.stdout, re.MULTILINE) == [
        "heat.heatsink",
        "soa.loudspeaker",
    ]
    start, end = done.stdout.index("\nHow "), done.stdout.index("\nDoes not apply")
    assert done.stdout[:start] + done.stdout[end:] == printed["text"].stdout
    assert max(map(len, done.stdout.splitlines())) <= 80


def test_explain_adds_to_json_and_markdown(printed):
    done = run("check", SPLIT, "--format", "json", "--explain", "touch.voltage")
    explained = [one["id"] for one in json.loads(done.stdout)["findings"] if "working" in one]
    assert explained == ["touch.voltage"]
    assert "line by line" in run("check", SPLIT, "--format", "markdown", "--explain", "touch.voltage").stdout
    assert printed["html"].stdout.count("line by line") == printed["html"].stdout.count("<article")


@pytest.mark.parametrize(
    ("words", "said"),
    [
        (("--explain", "soa.loudspaeker"), "soa.loudspaeker is not a finding; did you mean soa.loudspeaker?"),
        (("--explain", "capacitor.wear"), "does not apply"),
        (("--explain", "touch.voltage", "--format", "csv"), "a row of csv has no room"),
    ],
)
def test_what_cannot_be_explained_is_wrong_input(words, said):
    done = run("check", SPLIT, *words)
    assert (done.exit_code, done.stdout) == (WRONG, "")
    assert said in done.stderr


def test_a_plain_check_imports_no_calculations():
    found = imported_by("check", SPLIT)
    assert not {name for name in found if name.startswith("safeamp.checks.working")}
    assert "safeamp.studies.explain" not in found
