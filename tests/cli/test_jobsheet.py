import re

import pytest

from safeamp.cli.output import WRONG
from tests.cli.test_commands import HEALTHY, OLD_MAINS, run
from tests.cli.test_processes import imported_by

SPLIT = HEALTHY.with_name("split_rail.toml")


@pytest.mark.parametrize(("sheet", "status"), [(HEALTHY, 0), (SPLIT, 3), (OLD_MAINS, 5)])
def test_the_status_is_that_of_the_check(sheet, status):
    done = run("jobsheet", sheet)
    assert (done.exit_code, done.stderr) == (status, "")
    assert done.stdout.startswith("JOB SHEET\n")
    assert done.stdout.count("\f") == 1


def test_a_starter_is_refused_and_every_example_is_listed(tmp_path):
    path = tmp_path / "amp.toml"
    assert run("new", "single-rail", "--output", path).exit_code == 0
    done = run("jobsheet", path, "--output", tmp_path / "job.txt")
    assert (done.exit_code, done.stdout) == (WRONG, "")
    lines = path.read_text(encoding="utf-8").splitlines()
    found = re.findall(r"^  line (\d+) +([\w.]+): is still an example", done.stderr, re.MULTILINE)
    assert len(found) > 30
    for line, key in found:
        assert lines[int(line) - 1].startswith(key.rpartition(".")[2])
        assert "example" in lines[int(line) - 1]
    written = {line.partition(" = ")[0] for line in lines if re.match(r"\w+ = .*example\"", line)}
    assert written == {key.rpartition(".")[2] for key in re.findall(r"([\w.]+): is still", done.stderr)}
    assert not (tmp_path / "job.txt").exists()


def test_the_page_has_every_figure_and_goes_into_a_file(tmp_path):
    page = tmp_path / "job.html"
    assert run("jobsheet", SPLIT, "--format", "html", "--output", page).exit_code == 3
    text = page.read_text(encoding="utf-8")
    assert text.endswith("</html>\n")
    assert text.count("<figure>") > 2
    assert text.count("line by line") == text.count("<article") > 20
    assert "SHA-256 " in text


def test_markdown_has_every_calculation():
    done = run("jobsheet", SPLIT, "--format", "markdown")
    assert done.stdout.startswith("# Job sheet\n")
    assert done.stdout.count("line by line") > 20


def test_a_job_sheet_is_never_written_over_the_sheet(tmp_path):
    sheet = tmp_path / "amp.toml"
    sheet.write_text(SPLIT.read_text(encoding="utf-8"), encoding="utf-8")
    done = run("jobsheet", sheet, "--output", sheet)
    assert done.exit_code == WRONG
    assert sheet.read_text(encoding="utf-8") == SPLIT.read_text(encoding="utf-8")


def test_text_needs_neither_figures_nor_templates_of_others():
    assert imported_by("jobsheet", SPLIT).isdisjoint({"matplotlib", "scipy", "pandas"})
