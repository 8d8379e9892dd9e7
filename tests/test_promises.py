"""What the review promises of any definition, shown on the demo."""

from __future__ import annotations

import copy
import json
from collections.abc import Iterator
from typing import Any

import jsonschema
import pytest
import yaml

from circuitlint import demo
from circuitlint.definition.reading import read_text
from circuitlint.engine import Review, review
from circuitlint.errors import InputError
from circuitlint.limits.reading import resolve
from circuitlint.plugins import gather
from circuitlint.reports import kinds as reports
from circuitlint.review.record import Check, Record

GATHERED = gather()
DEMO = demo.content()[1].decode()


def reviewed(text: str, figures: bool = False) -> Record:
    ruleset = resolve("low-voltage-50hz", GATHERED.rulesets)
    installation = read_text(text, demo.NAME, GATHERED.models())
    return review(installation, ruleset, GATHERED, Review("major", "2026-12-01", figures))


def checks_of(record: Record) -> dict[str, Check]:
    return {check.id: check for circuit in record.circuits for check in circuit.checks}


def test_every_circuit_lists_every_rule_with_one_of_four_words() -> None:
    record = reviewed(DEMO)
    assert len(record.circuits) >= 8
    names = {rule.name for rule in record.rules}
    for circuit in record.circuits:
        assert set(circuit.coverage) == names
        assert set(circuit.coverage.values()) <= {"conforms", "nonconforming", "not assessed", "not applicable"}


def test_the_demo_has_clear_held_and_not_assessable_circuits() -> None:
    record = reviewed(DEMO)
    held = {
        circuit.tag: {c.rule for c in circuit.checks if c.severity == "major"}
        for circuit in record.circuits
        if circuit.held
    }
    assert 2 <= len(held) < len(record.circuits)
    assert len(set(map(frozenset, held.values()))) >= 3, "held for different reasons"
    assert any(all(v in ("not assessed", "not applicable") for v in c.coverage.values()) for c in record.circuits)


def test_two_reviews_give_the_same_bytes_and_the_json_is_valid_against_its_schema() -> None:
    first, second = reviewed(DEMO, figures=True), reviewed(DEMO, figures=True)
    one = reports.render("json", first)
    assert one == reports.render("json", second)
    jsonschema.validate(json.loads(one), Record.model_json_schema(), cls=jsonschema.Draft202012Validator)


def data_of(tree: Any, path: tuple[Any, ...] = ()) -> Iterator[tuple[Any, ...]]:
    """Paths of every datum: every key of every mapping, at any depth."""
    if isinstance(tree, dict):
        for key, value in tree.items():
            yield (*path, key)
            yield from data_of(value, (*path, key))
    elif isinstance(tree, list):
        for index, value in enumerate(tree):
            yield from data_of(value, (*path, index))


def without(tree: Any, path: tuple[Any, ...]) -> Any:
    made = copy.deepcopy(tree)
    at = made
    for step in path[:-1]:
        at = at[step]
    del at[path[-1]]
    return made


def expanded(tree: Any, parts: dict[str, Any]) -> Any:
    """The definition with its parts written out, so that deleting a datum leaves none behind it."""
    if isinstance(tree, list):
        return [expanded(one, parts) for one in tree]
    if not isinstance(tree, dict):
        return tree
    made = {key: expanded(value, parts) for key, value in tree.items() if key != "part"}
    return expanded(parts[tree["part"]], parts) | made if "part" in tree else made


TREE = yaml.safe_load(DEMO)
TREE = expanded(TREE, TREE.pop("parts"))
PATHS = [
    path for path in data_of(TREE) if path[0] in ("circuits", "supplies", "parts") and path not in ((("circuits",),))
]


def test_no_datum_can_be_deleted_to_make_a_check_conform() -> None:
    """Every key of the demo is deleted in turn. What did not conform before may not conform after."""
    before = checks_of(reviewed(DEMO))
    bad = {name for name, check in before.items() if check.result != "conforms"}
    tried = 0
    for path in PATHS:
        text = yaml.safe_dump(without(TREE, path), allow_unicode=True, sort_keys=False)
        try:
            after = checks_of(reviewed(text))
        except InputError:
            continue
        tried += 1
        turned = {name for name in bad if name in after and after[name].result == "conforms"}
        assert not turned, (path, turned)
    assert tried > 60


SIX_MISTAKES = """\
format: 1
supplies:
  shore: {system: single-phase, voltage: 9**9**9 V, frequency: 50 Hz}
circuits:
  - tag: A
    fed_from: shor
    load: {coil: {resistence: 21 ohm, resistance: 21, inductance: 0,36 H}}
  - tag: A
    fed_from: shore
    cable: {section: 1.5 mm2, length: 4 kg, conductor: cupper}
    load: {resistor: {resistance: 5 ohm}}
"""


def test_a_file_with_many_mistakes_names_each_with_line_and_column_in_file_order() -> None:
    with pytest.raises(InputError) as caught:
        read_text(SIX_MISTAKES, "six.yaml")
    faults = caught.value.faults
    assert [fault.line for fault in faults] == sorted(fault.line for fault in faults)
    places = {(fault.line, fault.column) for fault in faults}
    assert len(faults) >= 8 and len(places) == len(faults)
    told = "\n".join(map(str, faults))
    for word in ("9**9**9", "shor", "resistence", "did you mean 'resistance'", "'A' is used twice", "cupper", "4 kg"):
        assert word in told
    assert all(fault.accepted for fault in faults)


def plate(load: str) -> dict[tuple[str, str, str], float]:
    text = f"""
format: 1
supplies: {{s: {{system: single-phase, voltage: 120 V, frequency: 60 Hz}}}}
circuits: {{tag: A, fed_from: s, ambient: 20 degC, cable: [], load: {{coil: {load}}}}}
"""
    record = reviewed(text, figures=True)
    return {
        (f.name, f.of, f.state): f.nominal for f in record.circuits[0].figures if not f.name.startswith("reference")
    }


def test_resistance_and_inductance_and_impedance_with_power_factor_give_the_same_figures() -> None:
    resistance, inductance = 60.0, 0.16
    reactance = 2 * 3.141592653589793 * 60 * inductance
    impedance = (resistance**2 + reactance**2) ** 0.5
    heat = "armature: none, temperature_rise: 40 K"
    first = plate(f"{{resistance: {resistance!r} ohm, inductance: {inductance!r} H, {heat}}}")
    second = plate(f"{{impedance: {impedance!r} ohm, power_factor: {resistance / impedance!r}, {heat}}}")
    assert set(first) <= set(second)
    for key, value in first.items():
        assert second[key] == pytest.approx(value, rel=1e-9), key


def test_power_from_current_and_resistance_prints_like_power_from_voltage_current_and_angle() -> None:
    record = reviewed(DEMO, figures=True)
    compared = 0
    for circuit in record.circuits:
        figures = {(f.name, f.of, f.state): f.nominal for f in circuit.figures}
        for name, of, state in figures:
            if name == "winding-loss" and ("active-power", of, state) in figures:
                assert f"{figures[name, of, state]:.10g}" == f"{figures['active-power', of, state]:.10g}"
                compared += 1
    assert compared > 10
