"""Print how long the commands take: `python -m tests.bench [rounds]`.

Every number is a ratio to `import numpy` in the same run, because seconds depend on the machine and its mood. The
rounds are interleaved, so that a slow minute slows all of them alike; the median of the processor time is printed,
which waiting for a busy machine does not lengthen. Below that the work of
one sample is a ratio to two bare logarithms of 256 phases, in one process.
"""

from __future__ import annotations

import compileall
import os
import subprocess
import sys
from collections.abc import Sequence
from pathlib import Path
from resource import RUSAGE_CHILDREN, getrusage
from statistics import median

from tests.bench import samples

TESTS = Path(__file__).parents[1]
ROUNDS = 11
UNIT = "import numpy"
MAIN = "from safeamp.cli import main; main()"
HEATSINK = ("heatsink", "--fins", "150x75x35 mm", "--thickness", "2 mm", "--count", "14", "--power", "20 W")
HEATSINK += ("--air", "40 degC")
SOA = ("soa", "--split-rail", "35 V", "--load", "8 ohm", "--case-temperature", "60 degC")
SOA += ("--device", "to3-npn-140v-150w")

#: What is run -> (arguments of the interpreter, goal as a ratio or None).
RUNS: dict[str, tuple[tuple[str, ...], float | None]] = {
    "pass": (("-c", "pass"), None),
    UNIT: (("-c", "import numpy"), None),
    "import pint": (("-c", "import pint"), None),
    "import typer": (("-c", "import typer"), None),
    "import safeamp": (("-c", "import safeamp"), None),
    "import safeamp.quantities": (("-c", "import safeamp.quantities"), None),
    "import reading": (("-c", "import safeamp.reading.sheets"), None),
    "import checks and studies": (("-c", "import safeamp.studies.verdict"), None),
    "safeamp offset": (("-c", MAIN, "offset", "--reading", "30 mV", "--dc-resistance", "6 ohm"), 3.5),
    "safeamp capacitor": (("-c", MAIN, "capacitor", "--cutoff", "20 Hz", "--load", "8 ohm"), 3.5),
    "safeamp heatsink by ruler": (("-c", MAIN, *HEATSINK), 3.5),
    "safeamp soa": (("-c", MAIN, *SOA), 3.5),
    "safeamp loudspeaker": (("-c", MAIN, "loudspeaker", "--split-rail", "35 V", "--load", "8 ohm"), 3.5),
    "safeamp --help": (("-c", MAIN, "--help"), 1.2),
    "safeamp check, split rail": (("-c", MAIN, "check", str(TESTS / "scenarios" / "split_rail.toml")), 4.5),
    "safeamp check, 4096 corners": (("-c", MAIN, "check", str(TESTS / "bench" / "twelve.toml")), 5.5),
    "safeamp check, 200 points": (("-c", MAIN, "check", str(TESTS / "bench" / "richest.toml")), 8.0),
    "safeamp check, html": (
        ("-c", MAIN, "check", str(TESTS / "scenarios" / "split_rail.toml"), "--format", "html"),
        12.0,
    ),
}


def environment() -> dict[str, str]:
    """Return the environment of every run: byte code is kept, matrix threads are off for all alike."""
    kept = {name: value for name, value in os.environ.items() if name != "PYTHONDONTWRITEBYTECODE"}
    paths = [str(TESTS.parent), *filter(None, [os.environ.get("PYTHONPATH")])]
    return {**kept, "OPENBLAS_NUM_THREADS": "1", "PYTHONPATH": os.pathsep.join(paths)}


def seconds(arguments: Sequence[str], variables: dict[str, str]) -> float:
    """Return the processor time of one interpreter, its own and that of the system for it, s.

    Raises
    ------
    RuntimeError
        If it ended in a crash (1) or a refusal (2): the time of a failure says nothing.
    """
    before = getrusage(RUSAGE_CHILDREN)
    done = subprocess.run([sys.executable, *arguments], env=variables, capture_output=True, check=False)
    after = getrusage(RUSAGE_CHILDREN)
    taken = after.ru_utime + after.ru_stime - before.ru_utime - before.ru_stime
    if done.returncode in (1, 2):
        raise RuntimeError(done.stderr.decode(errors="replace"))
    return taken


def measured(rounds: int) -> dict[str, float]:
    """Return the median of each run over interleaved rounds, s; the first round warms up and is dropped."""
    compileall.compile_dir(str(TESTS.parent / "safeamp"), quiet=1)
    variables = environment()
    found: dict[str, list[float]] = {name: [] for name in RUNS}
    for number in range(rounds + 1):
        for name, (arguments, _) in RUNS.items():
            taken = seconds(arguments, variables)
            if number:
                found[name].append(taken)
    return {name: median(times) for name, times in found.items()}


def lines(times: dict[str, float]) -> list[str]:
    """Return one line a run: ratio, milliseconds, goal."""
    unit = times[UNIT]
    found = [f"{'run':30} {'ratio':>6} {'ms':>6}  goal"]
    for name, taken in times.items():
        goal = RUNS[name][1]
        said = "" if goal is None else f"{goal:g} {'kept' if taken / unit <= goal else 'MISSED'}"
        found.append(f"{name:30} {taken / unit:6.2f} {taken * 1e3:6.0f}  {said}".rstrip())
    return found


if __name__ == "__main__":
    rounds = int(sys.argv[1]) if len(sys.argv) > 1 else ROUNDS
    sys.stdout.write("\n".join([*lines(measured(rounds)), "", *samples.lines(rounds)]) + "\n")
