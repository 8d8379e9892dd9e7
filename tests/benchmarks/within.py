"""A program of its own, so that nothing else is in its memory: times plain loading against a whole review of one file.

`python -P tests/benchmarks/within.py FILE REPEATS` prints JSON: seconds of each run of both, and how many circuits,
checks and cases the review had to do with. The two alternate, so that a busy moment meets both.
"""

from __future__ import annotations

import gc
import json
import sys
import time
from collections.abc import Callable
from pathlib import Path
from typing import Any

import yaml

from circuitlint.definition.reading import read_paths
from circuitlint.engine import review
from circuitlint.limits.reading import resolve
from circuitlint.plugins import gather
from circuitlint.review.record import Record


def seconds(work: Callable[[], Any]) -> tuple[float, Any]:
    """How long a piece of work takes, and what it gives."""
    gc.collect()
    start = time.perf_counter()
    made = work()
    return time.perf_counter() - start, made


def main(file: str, repeats: int) -> dict[str, Any]:
    """Time both, alternating."""
    if not yaml.__with_libyaml__:
        sys.exit("this PyYAML has no C loader to compare with")
    gathered = gather()

    def load() -> Any:
        return yaml.load(Path(file).read_bytes(), Loader=yaml.CSafeLoader)

    def whole() -> Record:
        installation = read_paths([file], gathered.models())
        return review(installation, resolve(installation.ruleset or "", gathered.rulesets), gathered)

    times: dict[str, list[float]] = {"load": [], "review": []}
    told: dict[str, int] = {}
    for _ in range(repeats):
        spent, made = seconds(load)
        times["load"].append(spent)
        del made
        spent, record = seconds(whole)
        times["review"].append(spent)
        told = {
            "circuits": len(record.circuits),
            "checks": sum(len(circuit.checks) for circuit in record.circuits),
            "cases": sum(circuit.cases.count for circuit in record.circuits),
        }
        del record
    return {**times, **told}


if __name__ == "__main__":
    json.dump(main(sys.argv[1], int(sys.argv[2])), sys.stdout)
