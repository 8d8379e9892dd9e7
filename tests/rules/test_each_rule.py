"""Every rule holds, breaks and cannot be assessed where it should, and what breaks one rule breaks that rule alone."""

from __future__ import annotations

import pytest

from circuitlint.definition.reading import read_text
from circuitlint.engine import Review, review
from circuitlint.limits.reading import resolve
from circuitlint.plugins import gather
from circuitlint.review.record import Circuit
from tests.rules.definitions import CABLE, LAMP, SUPPLIES, circuit, coil
from tests.rules.definitions import DEFINITIONS as FIRST
from tests.rules.more_definitions import MORE, read_with

GATHERED = gather()
DEFINITIONS = FIRST | MORE
# A conductor beyond its ampacity is beyond its insulation's temperature too: the ampacity is defined by it.
COMPANIONS = {"conductor-current": {"conductor-heating"}}
RULESETS = ("low-voltage-50hz", "low-voltage-60hz", "control-cabinet", "bench-measurement")


def reviewed(text: str, ruleset: str = "low-voltage-50hz") -> Circuit:
    installation = read_text(SUPPLIES + text, "rule.yaml", GATHERED.models())
    return review(installation, resolve(ruleset, GATHERED.rulesets), GATHERED, Review("major", "2026-12-01", False)).circuits[0]


def test_every_rule_of_every_shipped_ruleset_has_its_three_definitions() -> None:
    for name in RULESETS:
        assert set(resolve(name, GATHERED.rulesets).rules) == set(DEFINITIONS)
    assert {name for name, (_, plugin) in GATHERED.rules.items() if plugin.name == "circuitlint_rules"} == set(DEFINITIONS)


@pytest.mark.parametrize("rule", list(DEFINITIONS))
def test_a_rule_holds_for_the_smallest_definition_it_is_made_for(rule: str) -> None:
    found = reviewed(DEFINITIONS[rule][0])
    assert found.coverage[rule] == "conforms", [check.what for check in found.checks if check.rule == rule]


@pytest.mark.parametrize("rule", list(DEFINITIONS))
def test_a_breaking_definition_breaks_its_rule_alone(rule: str) -> None:
    found = reviewed(DEFINITIONS[rule][1])
    broken = {check.rule for check in found.checks if check.result == "nonconforming"}
    assert broken == {rule} | COMPANIONS.get(rule, set()), [check.what for check in found.checks if check.result == "nonconforming"]


@pytest.mark.parametrize("rule", list(DEFINITIONS))
def test_a_rule_without_its_data_is_not_assessed_and_says_what_is_needed(rule: str) -> None:
    found = reviewed(DEFINITIONS[rule][2])
    assert found.coverage[rule] == "not assessed", [check.what for check in found.checks if check.rule == rule]
    assert any(check.needs for check in found.checks if check.rule == rule and check.result == "not assessed")


def test_a_contradiction_names_both_numbers_and_within_tolerance_there_is_none() -> None:
    """A coil of 21 ohm and 0.36 H has 115.04 ohm at 50 Hz (by hand: √(21² + 113.1²))."""
    for stated, contradiction in (("115 ohm", False), ("118 ohm ± 3 %", False), ("118 ohm ± 1 %", True), ("118 ohm", True)):
        found = reviewed(circuit(coil(f"resistance: 21 ohm, inductance: 0.36 H, impedance: {stated}")))
        facts = [check for check in found.checks if check.rule == "nameplate-contradiction" and check.result == "nonconforming"]
        assert bool(facts) == contradiction, stated
        if facts:
            assert stated in facts[0].what and "115.0" in facts[0].what


def test_a_sixty_hertz_coil_on_fifty_hertz_is_found() -> None:
    """Volts per hertz are up by a fifth (common practice); the coil's rated frequency and voltage stand on its plate."""
    load = coil("resistance: 400 ohm, inductance: 0.05 H, rated_voltage: 230 V, rated_frequency: 60 Hz")
    checks = [check for check in reviewed(circuit(load)).checks if check.rule == "supply-match"]
    assert any(check.result == "nonconforming" and check.nominal == pytest.approx(1.2) for check in checks)


def test_a_control_cabinet_bears_thinner_wires_and_takes_a_jammed_armature_for_a_major_matter() -> None:
    thin = CABLE.replace("2.5 mm2", "1 mm2")
    for name, result in (("low-voltage-50hz", "nonconforming"), ("control-cabinet", "conforms")):
        assert reviewed(circuit(LAMP, thin), name).coverage["minimum-section"] == result
    jammed = reviewed(DEFINITIONS["stuck-open"][1], "control-cabinet").checks
    assert {check.severity for check in jammed if check.rule == "stuck-open"} == {"major"}


def test_on_the_bench_a_reading_wants_a_thousand_counts() -> None:
    """A lamp of 100 ohm on 230 V draws 2.3 A, which are 230 counts of 10 mA."""
    text = read_with(", resolution: 10 mA")
    assert reviewed(text).coverage["meter-resolution"] == "conforms"
    assert reviewed(text, "bench-measurement").coverage["meter-resolution"] == "nonconforming"


def test_no_remembered_limit_is_graded_major_without_a_second_source() -> None:
    for name in RULESETS:
        for rule, terms in resolve(name, GATHERED.rulesets).rules.items():
            grades = {terms.severities[one] for one in ("nominal", "worst_case")}
            remembered = [raw for raw in terms.limits.values() if raw.source.known == "value from memory"]
            if "major" in grades:
                assert all("Confirmed by" in raw.source.note or "at a supply 10 % low" in raw.source.note for raw in remembered), rule
