"""Boards: phase and neutral currents, what the others do to a circuit's voltage, star and delta, feeding in a circle."""

from __future__ import annotations

import cmath
import math

import pytest

from circuitlint.definition.reading import read_text
from circuitlint.errors import DefinitionError
from circuitlint.study.installation import study, study_boards
from circuitlint.study.loads import CORE
from circuitlint.study.study import CircuitStudy, Figure
from circuitlint.study.worksheet import Key

TURN = cmath.exp(-2j * math.pi / 3)
PHASES = ("L1", "L2", "L3")


def installation(feeder: str, circuits: str, more: str = "") -> str:
    return f"""
format: 1
supplies: {{s: {{system: three-phase, voltage: 400 V, frequency: 50 Hz}}}}
boards:
  DB1: {{fed_from: s, cable: {feeder}}}
{more}
circuits:
{circuits}
"""


def twelve() -> tuple[str, list[tuple[str, complex]]]:
    """Twelve circuits, four on each phase, each another coil; with the admittance of each by hand."""
    lines, loads = "", []
    for number in range(12):
        resistance, inductance = 20.0 + 7.0 * number, 0.1 + 0.05 * number
        phase = PHASES[number % 3]
        lines += (f"  - {{tag: A{number}, fed_from: DB1, phase: {phase}, ambient: 20 degC, cable: [], "
                  f"load: {{coil: {{resistance: {resistance} ohm, inductance: {inductance} H}}}}}}\n")
        loads.append((phase, 1.0 / (resistance + 1j * 2 * math.pi * 50 * inductance)))
    return lines, loads


def test_phase_and_neutral_currents_of_a_board_of_twelve_are_the_phasor_sums() -> None:
    circuits, loads = twelve()
    state = study_boards(read_text(installation("[]", circuits)), CORE)["DB1"]
    volts = {line: 400 / math.sqrt(3) * TURN**number for number, line in enumerate(PHASES)}
    by_hand = {line: sum(volts[line] * admittance for phase, admittance in loads if phase == line) for line in PHASES}
    for line in PHASES:
        assert abs(state.currents[line] - by_hand[line]) < 1e-6 * abs(by_hand[line])
    assert abs(state.currents["N"] + sum(by_hand.values())) < 1e-6 * abs(sum(by_hand.values()))
    assert abs(sum(by_hand.values())) > 0.1, "the board is not balanced, so the neutral carries current"
    assert abs(state.power - sum(volts[line] * by_hand[line].conjugate() for line in PHASES)) < 1e-5 * abs(state.power)


def test_each_circuit_sees_the_voltage_that_the_network_of_all_gives_it() -> None:
    """The study of one circuit, with the others' drop as a datum, meets the solution of the whole board."""
    circuits, _ = twelve()
    feeder = "{section: 2.5 mm2, length: 60 m, conductor: copper, conductor_class: 2, reactance: 0.1 ohm/km}"
    whole = read_text(installation(feeder, circuits))
    state = study_boards(whole, CORE)["DB1"]
    impedance = 60 * (7.41e-3 + 0.1e-3j)
    volts = {line: 400 / math.sqrt(3) * TURN**number for number, line in enumerate(PHASES)}
    for line in PHASES:
        dropped = impedance * state.currents[line] - impedance * state.currents["N"]
        assert abs(state.voltages[line] - (volts[line] - dropped)) < 1e-9 * 230, "Kirchhoff along the feeder and its neutral"
    raised = 0
    for number, one in enumerate(study(whole, CORE, (), ("cold",))):
        line = PHASES[number % 3]
        found = complex(one.nominal("cold", Key("voltage phasor", "load.coil")))
        assert abs(abs(found) - abs(state.voltages[line])) < 2e-4 * 230, one.tag
        alone = one.figure("terminal-voltage", "cold")
        assert isinstance(alone, Figure)
        assert alone.highest >= alone.nominal
        raised += alone.highest > alone.nominal
    assert raised >= 8, "with the others switched off the voltage is higher, but where the neutral's drop helps"


def one_circuit(load: str, more: str = "", cable: str = "[]") -> CircuitStudy:
    text = f"""
format: 1
supplies: {{s: {{system: three-phase, voltage: 120 V, frequency: 60 Hz}}}}
circuits: [{{tag: A, fed_from: s, ambient: 20 degC, cable: {cable}, load: {load}{more}}}]
"""
    return study(read_text(text), CORE)[0]


def test_a_delta_load_draws_the_line_current_that_the_book_prints() -> None:
    """T. R. Kuphaldt, Lessons in Electric Circuits vol. II (AC), ch. 10: 120 V, 83.33 A a phase, 144.34 A a line (read)."""
    circuit = one_circuit("{resistor: {resistance: 1.44 ohm}}", ", connection: delta")
    line, phase = circuit.figure("current", "cold"), circuit.figure("current", "cold", "load.resistor")
    across = circuit.figure("voltage", "cold", "load.resistor")
    assert isinstance(line, Figure) and isinstance(phase, Figure) and isinstance(across, Figure)
    assert phase.nominal == pytest.approx(83.33, abs=0.005)
    assert line.nominal == pytest.approx(144.34, abs=0.005)
    assert across.nominal == pytest.approx(120.0, rel=1e-12)
    power = circuit.figure("active-power", "cold")
    assert isinstance(power, Figure) and power.nominal == pytest.approx(3 * 120 * phase.nominal, rel=1e-9)


def test_a_star_load_and_the_delta_of_three_times_its_impedance_are_the_same_to_the_lines() -> None:
    star = one_circuit("{impedance: {resistance: 10 ohm, reactance: 7 ohm}}")
    delta = one_circuit("{impedance: {resistance: 30 ohm, reactance: 21 ohm}}", ", connection: delta")
    for name in ("current", "active-power", "reactive-power", "power-factor", "line-voltage"):
        one, other = star.figure(name, "cold"), delta.figure(name, "cold")
        assert isinstance(one, Figure) and isinstance(other, Figure)
        assert one.nominal == pytest.approx(other.nominal, rel=1e-12), name
    volts = star.figure("voltage", "cold")
    assert isinstance(volts, Figure) and volts.nominal == pytest.approx(120 / math.sqrt(3), rel=1e-12)


def test_a_three_phase_motor_takes_the_current_of_its_plate() -> None:
    """P = √3 · U · I · cosφ · η (common practice): 1.5 kW, 0.79, 0.81 at 400 V."""
    text = """
format: 1
supplies: {s: {system: three-phase, voltage: 400 V, frequency: 50 Hz}}
circuits:
  - tag: M1
    fed_from: s
    ambient: 20 degC
    cable: []
    load: {motor: {shaft_power: 1.5 kW, efficiency: 0.79, power_factor: 0.81, rated_voltage: 400 V}}
"""
    figure = study(read_text(text), CORE)[0].figure("current", "cold")
    assert isinstance(figure, Figure)
    assert figure.nominal == pytest.approx(1500 / (math.sqrt(3) * 400 * 0.79 * 0.81), rel=1e-9)


def test_a_two_wire_circuit_between_lines_gets_the_line_voltage() -> None:
    circuit = one_circuit("{resistor: {resistance: 12 ohm}}", ", phase: L1-L2")
    figure = circuit.figure("voltage", "cold")
    assert isinstance(figure, Figure) and figure.nominal == pytest.approx(120.0, rel=1e-12)


def test_feeding_in_a_circle_and_unknown_boards_are_told() -> None:
    text = """
format: 1
supplies: {s: {system: single-phase, voltage: 230 V, frequency: 50 Hz}}
boards:
  DB1: {fed_from: DB2, cable: []}
  DB2: {fed_from: DB1, cable: []}
  DB3: {fed_from: DB9, cable: []}
circuits: [{tag: A, fed_from: DB1, phase: L1, cable: [], load: {resistor: {resistance: 5 ohm}}}]
"""
    with pytest.raises(DefinitionError) as caught:
        read_text(text)
    told = str(caught.value)
    assert "runs in a circle: DB1 from DB2 from DB1" in told
    assert "no supply or board is named 'DB9'" in told


def test_a_board_below_a_board_adds_its_feeder_to_the_way() -> None:
    run = "{section: 6 mm2, length: 20 m, conductor: copper, conductor_class: 2, reactance: 0.1 ohm/km}"
    text = installation(run, "  - {tag: A, fed_from: DB2, phase: L2, ambient: 20 degC, cable: [], "
                             "load: {resistor: {resistance: 20 ohm}}}",
                        f"  DB2: {{fed_from: DB1, cable: {run}}}")
    circuit = study(read_text(text), CORE)[0]
    figure = circuit.figure("current", "cold")
    assert isinstance(figure, Figure)
    assert figure.nominal == pytest.approx(400 / math.sqrt(3) / abs(20 + 2 * 40 * (3.08e-3 + 0.1e-3j)), rel=1e-6)
    assert circuit.way == ("feeder[DB1][0]", "feeder[DB2][0]")


def test_a_capacitor_beside_the_load_mends_the_power_factor_before_and_after_as_the_book_prints() -> None:
    """T. R. Kuphaldt, Lessons in Electric Circuits vol. II (AC), ch. 11: 0.705 before, 0.9947 A after 22 uF (read)."""
    text = """
format: 1
supplies: {s: {system: single-phase, voltage: 120 V, frequency: 60 Hz}}
circuits:
  - tag: A
    fed_from: s
    ambient: 20 degC
    cable: []
    correction: {capacitance: 22 uF}
    load: {coil: {resistance: 60 ohm, inductance: 160 mH}}
"""
    circuit = study(read_text(text), CORE)[0]
    before, after = circuit.figure("power-factor", "cold", "load.coil"), circuit.figure("power-factor", "cold")
    current = circuit.figure("current", "cold")
    assert isinstance(before, Figure) and isinstance(after, Figure) and isinstance(current, Figure)
    assert before.nominal == pytest.approx(0.705, abs=0.0005)
    assert current.nominal == pytest.approx(0.9947, abs=0.00005)
    assert after.nominal > 0.9999


def test_a_capacitor_on_the_board_mends_the_boards_power_factor_and_leaves_the_circuits() -> None:
    resistance, inductance, capacitance = 30.0, 0.12, 40e-6
    text = f"""
format: 1
supplies: {{s: {{system: single-phase, voltage: 230 V, frequency: 50 Hz}}}}
boards: {{DB1: {{fed_from: s, cable: [], correction: {{capacitance: 40 uF}}}}}}
circuits:
  - tag: A
    fed_from: DB1
    ambient: 20 degC
    cable: []
    load: {{coil: {{resistance: {resistance} ohm, inductance: {inductance} H}}}}
"""
    state = study_boards(read_text(text), CORE)["DB1"]
    omega = 2 * math.pi * 50
    coil = 230.0**2 / (resistance - 1j * omega * inductance)
    by_hand = coil - 1j * omega * capacitance * 230.0**2
    assert abs(state.power - by_hand) < 1e-5 * abs(by_hand)
    assert abs(state.power - state.correction - coil) < 1e-5 * abs(coil)
    found = study(read_text(text), CORE)[0].figure("power-factor", "cold")
    assert isinstance(found, Figure) and found.nominal == pytest.approx(coil.real / abs(coil), rel=1e-5)
