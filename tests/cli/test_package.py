"""What stands at the front of the package, and nothing more."""

import tomllib

import pytest

import safeamp
from safeamp.amplifier import Sheet
from safeamp.findings import Step
from safeamp.quantities import VOLTAGE
from tests.cli.test_commands import HEALTHY, OLD_MAINS


def test_every_name_is_there() -> None:
    for name in safeamp.__all__:
        assert getattr(safeamp, name) is not None
        assert name in dir(safeamp)


def test_other_names_are_refused() -> None:
    with pytest.raises(AttributeError, match="'safeamp' has no attribute 'chek'"):
        safeamp.chek  # noqa: B018


def test_a_file_a_sheet_and_a_mapping_are_judged_alike() -> None:
    sheet = safeamp.load_sheet(HEALTHY)
    assert isinstance(sheet, Sheet)
    by_file = safeamp.check(str(HEALTHY))
    tables = tomllib.loads(HEALTHY.read_text(encoding="utf-8"))
    for report in (safeamp.check(sheet), safeamp.check(HEALTHY), safeamp.check(tables)):
        assert report.verdict is by_file.verdict
        assert [entry.verdict for entry in report.findings] == [entry.verdict for entry in by_file.findings]


def test_limits_steps_and_paper_are_handed_on(tmp_path) -> None:
    own = tmp_path / "own.toml"
    own.write_text('[cold.devices]\ngo = "400 kohm"\n', encoding="utf-8")
    report = safeamp.check(HEALTHY, limits=safeamp.load_limits(own), up_to=Step.COLD_CHECKS)
    assert report.exit_status == 3
    assert report.overridden == ("cold.devices",)
    assert safeamp.check(HEALTHY, on_paper=True).on_paper
    assert safeamp.check(OLD_MAINS).exit_status == 5


def test_values_are_read_and_shown() -> None:
    assert safeamp.show(safeamp.read("22 mV", VOLTAGE).nominal, VOLTAGE) == "22 mV"
    assert safeamp.quantity(5.0, VOLTAGE).magnitude == 5.0
