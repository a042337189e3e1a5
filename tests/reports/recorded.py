"""A sheet for each way of building an output stage, and the report on it as the program prints it."""

from pathlib import Path

import safeamp
from safeamp.report.text import render

HERE = Path(__file__).parent
TESTS = HERE.parent
HEALTHY, SCENARIOS = TESTS / "amplifiers" / "healthy", TESTS / "scenarios"
#: Name of the recorded report -> sheet.
SHEETS = {
    "split_rail": SCENARIOS / "split_rail.toml",
    "single_rail": SCENARIOS / "single_rail.toml",
    "quasi_complementary": HEALTHY / "30w_single_rail_to3.toml",
    "three_pairs": HEALTHY / "120w_three_pairs.toml",
    "bridged": HERE / "bridged.toml",
    "lateral_mosfet": HEALTHY / "100w_lateral_mosfet.toml",
    "vertical_mosfet": SCENARIOS / "mosfet_substitute.toml",
    "darlington": HEALTHY / "25w_split_rail_darlington.toml",
    "class_a": HERE / "class_a.toml",
    "headphones": HERE / "headphones.toml",
    "bench_mockup": SCENARIOS / "bench_mockup.toml",
}
#: What every report has alike, held by tests of its own.
ALIKE = ("safeamp ", "sheet ")


def recording(name: str) -> Path:
    """Return the file of a recorded report."""
    return HERE / f"{name}.txt"


def printed(name: str) -> str:
    """Return the report on a sheet as text, without the program's version and the hash of the sheet."""
    lines = render(safeamp.check(SHEETS[name])).splitlines()
    return "\n".join(line for line in lines if not line.startswith(ALIKE)).lstrip() + "\n"
