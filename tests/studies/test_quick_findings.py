"""The findings of the quick answers are those of the register, and only what an answer needs is imported."""

import subprocess
import sys

import pytest

from safeamp.checks import CHECKS
from safeamp.studies.quick.desk import JUDGED

ANSWERS = {
    "capacitor": "--cutoff 20Hz --load 8ohm",
    "offset": "--reading 30mV --dc-resistance 6ohm",
    "heatsink": "--fins 150x75x35mm --thickness 2mm --count 14 --power 20W --air 40degC",
    "loudspeaker": "--split-rail 35V --load 8ohm",
    "soa": "--split-rail 35V --load 8ohm --case-temperature 60degC --device to3-npn-140v-150w",
}
#: Nothing that a quick answer could want: the other topics, what reads sheets, the library of units.
FOREIGN = {"safeamp.checks.power_up", "safeamp.reading.sheets", "safeamp.studies.verdict", "pint", "scipy"}


@pytest.mark.parametrize("identity", JUDGED)
def test_step_and_kind_are_those_of_the_register(identity):
    check = CHECKS[identity]
    assert JUDGED[identity] == (check.step, check.kind)


@pytest.mark.parametrize("command", ANSWERS)
def test_a_quick_answer_imports_nothing_foreign(command):
    code = (
        "import sys\nfrom safeamp.cli import main\n"
        "try: main()\nexcept SystemExit as end: print(end.code, *sys.modules, file=sys.stderr)"
    )
    line = [sys.executable, "-c", code, command, *ANSWERS[command].split()]
    done = subprocess.run(line, capture_output=True, text=True, check=False)
    status, *modules = done.stderr.split()
    assert status in {"0", "3", "4", "5"}
    assert FOREIGN & set(modules) == set()
