"""Promises that a second look at the study found broken once: unknown neighbours, stalled motors, delta motors, wide circuits."""

from __future__ import annotations

import math

import pytest

from circuitlint.definition.reading import read_text
from circuitlint.study.installation import study
from circuitlint.study.loads import CORE
from circuitlint.study.study import CircuitStudy, Figure
from circuitlint.study.worksheet import Lack


def circuits(supply: str, body: str, boards: str = "") -> list[CircuitStudy]:
    return study(read_text(f"format: 1\nsupplies: {{s: {supply}}}\n{boards}circuits:\n{body}"), CORE)


MAINS = "{system: single-phase, voltage: 230 V, frequency: 50 Hz}"
THREE = "{system: three-phase, voltage: 400 V, frequency: 50 Hz}"


def test_a_neighbour_nobody_knows_leaves_the_voltage_on_the_board_unknown() -> None:
    run = "{section: 2.5 mm2, length: 20 m, conductor: copper}"
    boards = f"boards: {{B: {{fed_from: s, cable: {run}}}}}\n"
    known = "  - {tag: A, fed_from: B, ambient: 20 degC, cable: [], load: {resistor: {resistance: 50 ohm}}}\n"
    other = "  - {tag: N, fed_from: B, ambient: 20 degC, cable: [], load: {resistor: {resistance: 5 ohm}}}\n"
    assert isinstance(circuits(MAINS, known + other, boards)[0].figure("voltage-drop-share", "cold"), Figure)
    found = circuits(MAINS, known + other.replace(" cable: [],", ""), boards)[0].figure("voltage-drop-share", "cold")
    assert isinstance(found, Lack) and any("N" in need for need in found.needs)


def test_a_motor_that_cannot_run_at_the_voltage_it_would_get_has_no_figures() -> None:
    body = ("  - {tag: M, fed_from: s, ambient: 20 degC, cable: {section: 1.5 mm2, length: 900 m, conductor: copper}, "
            "load: {motor: {shaft_power: 5 kW, efficiency: 0.85, power_factor: 0.85}}}\n")
    found = circuits(MAINS, body)[0].figure("current", "cold")
    assert isinstance(found, Lack) and "stalls" in found.why


@pytest.mark.parametrize("connection", ["star", "delta"])
def test_a_motor_starts_with_its_ratio_whichever_way_it_is_joined(connection: str) -> None:
    body = (f"  - {{tag: M, fed_from: s, connection: {connection}, ambient: 20 degC, cable: [], load: {{motor: {{current: 14.5 A, "
            "power_factor: 0.86, rated_voltage: 400 V, starting_ratio: 7, starting_power_factor: 0.4}}}\n")
    one = circuits(THREE, body.replace("}}}\n", "}}}\n"))[0]
    running, starting = one.figure("current", "cold"), one.figure("current", "switch-on")
    assert isinstance(running, Figure) and isinstance(starting, Figure)
    assert starting.nominal == pytest.approx(7 * 14.5, rel=1e-9)


def test_a_capacitor_on_direct_current_is_studied_and_only_its_charging_is_not_known() -> None:
    one = circuits("{system: dc, voltage: 24 V}", "  - {tag: C, fed_from: s, cable: [], load: {capacitor: {capacitance: 1 uF}}}\n")[0]
    current, peak = one.figure("current", "cold"), one.figure("switch-on-peak", "switch-on")
    assert isinstance(current, Figure) and current.nominal == 0.0
    assert isinstance(peak, Lack) and peak.why


def test_a_resistive_circuit_neither_leads_nor_lags() -> None:
    one = circuits(MAINS, "  - {tag: R, fed_from: s, cable: [], load: {resistor: {resistance: 50 ohm}}}\n")[0]
    figure = one.figure("power-factor", "cold")
    assert isinstance(figure, Figure) and figure.note == ""


def test_a_circuit_of_many_parallel_coils_is_studied_in_bounded_memory() -> None:
    coils = ", ".join(["{coil: {resistance: 100 ohm ± 5 %, inductance: 1 H ± 5 %, armature: none}}"] * 20)
    one = study(read_text(f"format: 1\nsupplies: {{s: {MAINS}}}\ncircuits: [{{tag: W, fed_from: s, cable: [], "
                          f"load: {{parallel: [{coils}]}}}}]"), CORE, ("current",), ("cold",))[0]
    figure = one.figure("current", "cold")
    assert isinstance(figure, Figure)
    assert figure.nominal == pytest.approx(20 * 230 / math.hypot(100, 100 * math.pi), rel=1e-9)
    assert figure.highest == pytest.approx(figure.nominal / 0.95, rel=1e-6)
