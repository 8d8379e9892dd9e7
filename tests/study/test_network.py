"""Solved trees against an independent nodal solution, and the balance that every study proves."""

from __future__ import annotations

import math
from typing import Any

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from circuitlint.definition.reading import read_text
from circuitlint.study.balance import imbalance
from circuitlint.study.installation import study
from circuitlint.study.loads import CORE
from circuitlint.study.study import CircuitStudy
from circuitlint.study.worksheet import Key

OMEGA = 2 * math.pi * 50
SIZES = st.floats(1.0, 1000.0).map(lambda value: float(f"{value:.6g}"))
LEAVES = st.one_of(
    st.tuples(st.just("resistor"), SIZES, SIZES),
    st.tuples(st.just("coil"), SIZES, SIZES),
    st.tuples(st.just("capacitor"), SIZES, SIZES),
    st.tuples(st.just("impedance"), SIZES, SIZES),
)
TREES = st.recursive(
    LEAVES,
    lambda below: st.tuples(st.sampled_from(["series", "parallel"]), st.lists(below, min_size=1, max_size=3)),
    max_leaves=12,
)


def as_yaml(tree: Any) -> str:
    kind = tree[0]
    if kind in ("series", "parallel"):
        return f"{{{kind}: [{', '.join(as_yaml(one) for one in tree[1])}]}}"
    first, second = tree[1], tree[2]
    return {
        "resistor": f"{{resistor: {{resistance: {first!r} ohm}}}}",
        "coil": f"{{coil: {{resistance: {first!r} ohm, inductance: {second * 1e-3!r} H}}}}",
        "capacitor": f"{{capacitor: {{capacitance: {first * 1e-6!r} F}}}}",
        "impedance": f"{{impedance: {{resistance: {first!r} ohm, reactance: {second!r} ohm}}}}",
    }[kind]


def impedance(tree: Any) -> complex:
    first, second = tree[1], tree[2]
    return {
        "resistor": complex(first),
        "coil": first + 1j * OMEGA * second * 1e-3,
        "capacitor": 1 / (1j * OMEGA * first * 1e-6),
        "impedance": first + 1j * second,
    }[tree[0]]


def branches(tree: Any, place: str, start: int, end: int, fresh: list[int]) -> list[tuple[str, int, int, complex]]:
    """Branches between numbered nodes: the tree as a nodal problem."""
    kind = tree[0]
    if kind == "parallel":
        return [b for i, one in enumerate(tree[1]) for b in branches(one, f"{place}.parallel[{i}]", start, end, fresh)]
    if kind == "series":
        found, at = [], start
        for i, one in enumerate(tree[1]):
            to = end
            if i < len(tree[1]) - 1:
                fresh[0] += 1
                to = fresh[0]
            found += branches(one, f"{place}.series[{i}]", at, to, fresh)
            at = to
        return found
    return [(f"{place}.{kind}", start, end, impedance(tree))]


def nodal(tree: Any, source: float, line: complex) -> dict[str, tuple[complex, complex]]:
    """Voltage and current of every leaf by nodal admittances: node 0 is the return, 1 the terminal, a source behind `line`."""
    fresh = [1]
    found = branches(tree, "load", 1, 0, fresh)
    size = fresh[0]
    matrix = np.zeros((size, size), dtype=complex)
    injected = np.zeros(size, dtype=complex)
    for _, start, end, z in [*found, ("", 1, 0, line)]:
        for a, b in ((start, end), (end, start)):
            if a:
                matrix[a - 1, a - 1] += 1 / z
                if b:
                    matrix[a - 1, b - 1] -= 1 / z
    injected[0] = source / line
    volts = np.concatenate([[0], np.linalg.solve(matrix, injected)])
    return {place: (volts[a] - volts[b], (volts[a] - volts[b]) / z) for place, a, b, z in found}


def solved(tree: Any) -> CircuitStudy:
    text = f"""
format: 1
supplies: {{s: {{system: single-phase, voltage: 230 V, frequency: 50 Hz}}}}
circuits:
  tag: A
  fed_from: s
  ambient: 20 degC
  cable: {{section: 1.5 mm2, length: 30 m ± 1 %, conductor: copper, conductor_class: 2, reactance: 0.1 ohm/km}}
  load: {as_yaml(tree)}
"""
    return study(read_text(text), CORE, (), ("cold",))[0]


@settings(max_examples=500, deadline=None)
@given(TREES)
def test_every_leaf_has_the_voltage_and_current_of_the_nodal_solution(tree: Any) -> None:
    circuit = solved(tree)
    line = 2 * 30 * (12.1e-3 + 0.1e-3j)
    for place, (voltage, current) in nodal(tree, 230.0, line).items():
        for name, wanted in (("voltage phasor", voltage), ("current phasor", current)):
            found = complex(circuit.nominal("cold", Key(name, place)))
            assert abs(found - wanted) <= 1e-9 * max(abs(wanted), 1e-3), (name, place)


@settings(max_examples=60, deadline=None)
@given(TREES)
def test_power_and_kirchhoff_balance_in_every_case(tree: Any) -> None:
    circuit = solved(tree)
    solution = circuit.solutions["cold"]
    assert np.max(imbalance(solution.values, circuit.tree, circuit.way)) < 1e-9


def test_an_imbalance_is_noticed() -> None:
    """The proof must be able to fail: one leaf's power is changed by a millionth."""
    circuit = solved(("series", [("coil", 20.0, 300.0), ("resistor", 5.0, 5.0)]))
    solution = circuit.solutions["cold"]
    values = dict(solution.values)
    values[Key("power phasor", "load.series[0].coil")] = values[Key("power phasor", "load.series[0].coil")] * (1 + 1e-6)
    assert np.max(imbalance(values, circuit.tree, circuit.way)) > 1e-9
    assert np.max(imbalance(solution.values, circuit.tree, circuit.way)) == pytest.approx(0.0, abs=1e-12)
