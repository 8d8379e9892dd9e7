"""Whole circuits of open textbooks come out as printed."""

from __future__ import annotations

import math
from pathlib import Path
from typing import Any

import pytest
import yaml

from circuitlint.definition.reading import read_text
from circuitlint.study.installation import study
from circuitlint.study.loads import CORE
from circuitlint.study.study import CircuitStudy, Figure

CASES: list[dict[str, Any]] = yaml.safe_load(Path(__file__).with_name("textbook_circuits.yaml").read_text("utf-8"))


def circuit(case: dict[str, Any]) -> CircuitStudy:
    definition = {
        "format": 1,
        "supplies": {"book": {"system": "single-phase", **case["supply"]}},
        "circuits": [{"tag": "book", "fed_from": "book", "cable": [], "load": case["load"]}],
    }
    return study(read_text(yaml.safe_dump(definition)), CORE)[0]


@pytest.mark.parametrize("case", CASES, ids=[case["name"] for case in CASES])
def test_the_circuit_comes_out_as_the_book_prints_it(case: dict[str, Any]) -> None:
    solved = circuit(case)
    for wanted in case["expect"]:
        figure = solved.figure(wanted["figure"], "cold", wanted.get("of", ""))
        assert isinstance(figure, Figure), figure
        value = math.degrees(figure.nominal) if wanted.get("unit") == "degree" else figure.nominal
        allowed = wanted["digit"] / 2 + wanted.get("slack", 0.0)
        assert value == pytest.approx(wanted["value"], abs=allowed * 1.0001), wanted


def test_there_are_at_least_twelve_circuits_and_each_names_its_source() -> None:
    assert len(CASES) >= 12
    assert all(case["source"]["work"] and case["source"]["known"] == "read" for case in CASES)
