"""The benchmarks run and measure what they say; how long anything takes is nobody's assertion."""

from __future__ import annotations

import re

import pytest
import yaml

from circuitlint.definition.reading import read_text
from circuitlint.engine import review
from circuitlint.limits.reading import resolve
from circuitlint.plugins import gather
from tests.benchmarks.__main__ import main
from tests.benchmarks.definitions import definition


def test_the_generated_definitions_are_reviewed_with_every_rule_at_work() -> None:
    gathered = gather()
    installation = read_text(definition(60), kinds=gathered.models())
    record = review(installation, resolve("low-voltage-50hz", gathered.rulesets), gathered)
    assert len(record.circuits) == 60
    results: dict[str, set[str]] = {}
    for circuit in record.circuits:
        for check in circuit.checks:
            results.setdefault(check.rule, set()).add(check.result)
    assert set(results) >= {"minimum-power-factor", "meter-range", "conductor-heating", "voltage-drop"}
    results.pop("missing-data", None)  # it speaks of what is absent, and these definitions name no protection
    idle = {rule for rule, found in results.items() if not found & {"conforms", "nonconforming"}}
    assert idle == set(), "a rule that assesses nothing is cheap"
    assert record.problems == ()


def test_the_generated_definitions_are_the_same_every_time_and_no_two_circuits_are_alike() -> None:
    text = definition(200)
    assert text == definition(200)
    assert text != definition(200, seed=2)
    loads = [str(circuit["load"]) for circuit in yaml.safe_load(text)["circuits"]]
    assert len(set(loads)) == len(loads) == 200


def test_both_ratios_are_printed(capsys: pytest.CaptureFixture[str]) -> None:
    main(["--circuits", "20", "--repeats", "1"])
    printed = capsys.readouterr().out
    assert re.search(r"^reviewing 20 circuits in one file .*: \d+\.\d\d times loading", printed, re.MULTILINE)
    assert re.search(r"^reviewing one small file, whole process: \d+\.\d\d times a process", printed, re.MULTILINE)
