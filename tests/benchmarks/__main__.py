"""Prints how long reviewing takes as a multiple of something everybody knows, measured in the same run.

`python -m tests.benchmarks [--circuits N] [--repeats N]`. Nothing is asserted: the least of the runs is taken, since a
busy machine can only make a run longer. What is measured is the circuitlint that is installed.
"""

from __future__ import annotations

import argparse
import json
import subprocess
import sys
import tempfile
import time
from collections.abc import Sequence
from pathlib import Path
from typing import Any, NamedTuple

from tests.benchmarks.definitions import definition

# What any such tool must load before it can begin.
BARE = "import numpy, pint, pluggy, pydantic, yaml; pint.UnitRegistry()"
WITHIN = Path(__file__).with_name("within.py")


class Ratio(NamedTuple):
    """A time, the time it is held against, and what is aimed at."""

    what: str
    spent: float
    against: str
    base: float
    aim: str

    def __str__(self) -> str:
        told = f"{self.what}: {self.spent / self.base:.2f} times {self.against}"
        return f"{told}\n    {self.spent:.3f} s against {self.base:.3f} s; aim: {self.aim}"


def run(arguments: Sequence[str], folder: Path) -> bytes:
    """What a Python program prints, run in a folder that holds nothing of the project. A failure ends the benchmark."""
    done = subprocess.run([sys.executable, "-P", *arguments], cwd=folder, capture_output=True)
    if done.returncode:
        sys.exit(f"{' '.join(arguments)} ended with status {done.returncode}:\n{done.stderr.decode()}")
    return done.stdout


def one_large_file(circuits: int, repeats: int, folder: Path) -> Ratio:
    """Reviewing one file of many circuits against loading its YAML."""
    file = folder / "large.yaml"
    file.write_text(definition(circuits), encoding="utf-8")
    told: dict[str, Any] = json.loads(run([str(WITHIN), str(file), str(repeats)], folder))
    what = f"reviewing {told['circuits']} circuits in one file ({told['checks']} checks, {told['cases']} cases)"
    against = "loading the same file with yaml's C loader"
    return Ratio(what, min(told["review"]), against, min(told["load"]), "at most 4 times, then at most 2.5")


def one_small_file(repeats: int, folder: Path) -> Ratio:
    """The whole process of reviewing one small file against one that only imports the dependencies."""
    file = folder / "small.yaml"
    file.write_text(definition(3), encoding="utf-8")
    reviewing = ["-m", "circuitlint", "review", str(file), "--hold-at", "never"]
    times: dict[str, list[float]] = {"bare": [], "review": []}
    for _ in range(repeats + 1):  # the first of each warms the disk's cache, and is never the least
        for name, arguments in (("bare", ["-c", BARE]), ("review", reviewing)):
            start = time.perf_counter()
            run(arguments, folder)
            times[name].append(time.perf_counter() - start)
    against = "a process that only imports numpy, pint with its registry, pluggy, pydantic and yaml"
    aim = "at most 1.3 times, then below 1"
    return Ratio("reviewing one small file, whole process", min(times["review"]), against, min(times["bare"]), aim)


def main(arguments: Sequence[str] | None = None) -> None:
    """Measure and print."""
    parser = argparse.ArgumentParser(
        prog="python -m tests.benchmarks", description="Ratios of times; nothing is asserted."
    )
    parser.add_argument("--circuits", type=int, default=2000, help="circuits in the large file (2000)")
    parser.add_argument("--repeats", type=int, default=3, help="runs of each measurement (3)")
    given = parser.parse_args(arguments)
    with tempfile.TemporaryDirectory() as scratch:
        print(one_large_file(given.circuits, given.repeats, Path(scratch)), flush=True)
        print(one_small_file(given.repeats, Path(scratch)), flush=True)


if __name__ == "__main__":
    main()
