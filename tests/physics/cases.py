"""Cases from outside: chains of formulas with the results that are printed elsewhere."""

from __future__ import annotations

import importlib
import math
import pkgutil
from collections.abc import Mapping
from dataclasses import dataclass
from pathlib import Path
from typing import Any

import yaml

import circuitlint.physics
from circuitlint.physics.formula import FORMULAS, Formula

PUBLISHED = Path(__file__).parents[1] / "published"

for _module in pkgutil.iter_modules(circuitlint.physics.__path__):
    importlib.import_module(f"circuitlint.physics.{_module.name}")


@dataclass(frozen=True)
class Case:
    """A chain of formulas, and what stands beside it in print."""

    name: str
    steps: tuple[Mapping[str, Any], ...]
    result: float
    digit: float
    slack: float
    in_degrees: bool
    source: Mapping[str, str]
    how: str
    why: str

    def run(self) -> list[tuple[Formula[..., Any], dict[str, Any], Any]]:
        """Each step with the numbers put in and what came out."""
        named: dict[str, Any] = {}
        done = []
        for step in self.steps:
            made = FORMULAS[step["formula"]]
            inputs = {name: _value(one, named) for name, one in step["inputs"].items()}
            outcome = made(**inputs)
            if "as" in step:
                named["=" + step["as"]] = outcome
            done.append((made, inputs, outcome))
        return done

    def outcome(self) -> float:
        """The last result, in the unit it is printed in."""
        value = self.run()[-1][2]
        return math.degrees(value) if self.in_degrees else value

    @property
    def allowed(self) -> float:
        """Half the last printed digit, and what the print itself rounded away."""
        return (self.digit / 2.0 + self.slack) * (1.0 + 1e-9)


def _value(one: Any, named: Mapping[str, Any]) -> Any:
    if isinstance(one, str):
        return named[one]
    if isinstance(one, dict):
        return complex(*one["complex"])
    if isinstance(one, list):
        return tuple(_value(each, named) for each in one)
    return float(one)


def read_cases() -> list[Case]:
    """Every case of every file, in order."""
    made = []
    for path in sorted(PUBLISHED.glob("*.yaml")):
        for entry in yaml.safe_load(path.read_text(encoding="utf-8")):
            made.append(
                Case(
                    entry["name"],
                    tuple(entry["steps"]),
                    float(entry["result"]),
                    float(entry["digit"]),
                    float(entry.get("slack", 0.0)),
                    entry.get("unit") == "degree",
                    entry["source"],
                    entry.get("how", ""),
                    entry.get("why", ""),
                )
            )
    return made


CASES = read_cases()
