"""The same coil and the same motor, each entered through every sufficient set of its nameplate, give the same figures."""

from __future__ import annotations

import math

import pytest

from circuitlint.definition.reading import read_text
from circuitlint.errors import DefinitionError
from circuitlint.study.installation import study
from circuitlint.study.loads import CORE
from circuitlint.study.study import CircuitStudy, Figure

RESISTANCE, INDUCTANCE, VOLTS, HERTZ = 21.0, 0.36, 230.0, 50.0
REACTANCE = 2 * math.pi * HERTZ * INDUCTANCE
IMPEDANCE = math.hypot(RESISTANCE, REACTANCE)
CURRENT = VOLTS / IMPEDANCE
FACTOR = RESISTANCE / IMPEDANCE
WATTS = CURRENT**2 * RESISTANCE
DEMAND = VOLTS * CURRENT

PLATES = {
    "R and L": {"resistance": f"{RESISTANCE!r} ohm", "inductance": f"{INDUCTANCE!r} H"},
    "R and X": {"resistance": f"{RESISTANCE!r} ohm", "reactance": f"{REACTANCE!r} ohm"},
    "R and Z": {"resistance": f"{RESISTANCE!r} ohm", "impedance": f"{IMPEDANCE!r} ohm"},
    "R and Q": {"resistance": f"{RESISTANCE!r} ohm", "quality_factor": f"{REACTANCE / RESISTANCE!r}"},
    "R and V, I": {"resistance": f"{RESISTANCE!r} ohm", "current": f"{CURRENT!r} A"},
    "R and VA": {"resistance": f"{RESISTANCE!r} ohm", "apparent_power": f"{DEMAND!r} VA"},
    "Z and power factor": {"impedance": f"{IMPEDANCE!r} ohm", "power_factor": f"{FACTOR!r}"},
    "V, I and power factor": {"current": f"{CURRENT!r} A", "power_factor": f"{FACTOR!r}"},
    "V, I and W": {"current": f"{CURRENT!r} A", "active_power": f"{WATTS!r} W"},
    "VA and power factor": {"apparent_power": f"{DEMAND!r} VA", "power_factor": f"{FACTOR!r}"},
    "VA and W": {"apparent_power": f"{DEMAND!r} VA", "active_power": f"{WATTS!r} W"},
}
COMPARED = ("resistance", "reactance", "impedance", "current", "active-power", "power-factor", "winding-temperature",
            "time-constant", "switch-on-peak", "inductive-voltage", "stored-energy")


def coil(plate: dict[str, str], more: str = "", supply: str = "voltage: 230 V, frequency: 50 Hz") -> CircuitStudy:
    lines = ", ".join(f"{key}: {value}" for key, value in plate.items())
    text = f"""
format: 1
supplies: {{s: {{system: single-phase, {supply}}}}}
circuits:
  tag: A
  fed_from: s
  ambient: 25 degC
  cable: []
  load:
    coil: {{{lines}, armature: none, rated_voltage: 230 V, rated_frequency: 50 Hz, temperature_rise: 55 K{more}}}
"""
    return study(read_text(text), CORE)[0]


def figures(circuit: CircuitStudy) -> dict[tuple[str, str, str], float]:
    return {(f.name, f.of, f.state): f.nominal for f in circuit.figures() if f.name in COMPARED}


@pytest.mark.parametrize("name", list(PLATES))
def test_every_sufficient_plate_gives_the_same_coil(name: str) -> None:
    expected, found = figures(coil(PLATES["R and L"])), figures(coil(PLATES[name]))
    assert set(found) == set(expected) and len(expected) > 30
    for key, value in expected.items():
        assert found[key] == pytest.approx(value, rel=1e-9), key


def test_resistance_with_voltage_current_and_power_separates_winding_loss_from_core_loss() -> None:
    """A coil with a known core resistance is measured on paper, and the measurement taken apart again."""
    core = 900.0
    total = RESISTANCE + 1.0 / (1.0 / core + 1.0 / (1j * REACTANCE))
    current = VOLTS / total
    plate = {"resistance": f"{RESISTANCE!r} ohm", "current": f"{abs(current)!r} A",
             "active_power": f"{(VOLTS * current.conjugate()).real!r} W"}
    circuit = coil(plate)
    found = circuit.figure("core-resistance", "cold", "load.coil")
    assert isinstance(found, Figure) and found.nominal == pytest.approx(core, rel=1e-9)
    # The circuit runs at 25 °C; loss in the winding and in the core are taken from there by the definition of each.
    warm = RESISTANCE * (234.5 + 25.0) / (234.5 + 20.0)
    at_25 = VOLTS / (total - RESISTANCE + warm)
    winding, loss = (circuit.figure(name, "cold", "load.coil") for name in ("winding-loss", "core-loss"))
    assert isinstance(winding, Figure) and winding.nominal == pytest.approx(abs(at_25) ** 2 * warm, rel=1e-9)
    across = at_25 * (total - RESISTANCE)
    assert isinstance(loss, Figure) and loss.nominal == pytest.approx(abs(across) ** 2 / core, rel=1e-9)


@pytest.mark.parametrize("gap", [
    "inductance: 0.075 H", f"reactance: {0.075 * 100 * math.pi!r} ohm",
    f"impedance: {math.hypot(RESISTANCE, 7.5 * math.pi)!r} ohm", f"current: {230 / math.hypot(RESISTANCE, 7.5 * math.pi)!r} A",
    f"apparent_power: {230**2 / math.hypot(RESISTANCE, 7.5 * math.pi)!r} VA",
    f"apparent_power: {230**2 / math.hypot(RESISTANCE, 7.5 * math.pi)!r} VA, "
    f"power_factor: {RESISTANCE / math.hypot(RESISTANCE, 7.5 * math.pi)!r}",
])  # fmt: skip
def test_the_open_gap_may_be_given_by_any_magnitude(gap: str) -> None:
    circuit = coil({"resistance": f"{RESISTANCE!r} ohm", "inductance": "0.36 H"}, f", open_gap: {{{gap}}}")
    circuit_moving = read_text_moving(gap)
    found = circuit_moving.figure("reactance", "switch-on", "load.coil")
    assert isinstance(found, Figure) and found.nominal == pytest.approx(0.075 * 100 * math.pi, rel=1e-9)
    steady = circuit.figure("reactance", "switch-on", "load.coil")
    assert isinstance(steady, Figure) and steady.nominal == pytest.approx(REACTANCE, rel=1e-9), "armature: none"


def read_text_moving(gap: str) -> CircuitStudy:
    text = f"""
format: 1
supplies: {{s: {{system: single-phase, voltage: 230 V, frequency: 50 Hz}}}}
circuits:
  tag: A
  fed_from: s
  ambient: 20 degC
  cable: []
  load: {{coil: {{resistance: {RESISTANCE!r} ohm, inductance: 0.36 H, rated_voltage: 230 V, open_gap: {{{gap}}}}}}}
"""
    return study(read_text(text), CORE)[0]


def test_a_motor_is_the_same_by_shaft_power_and_by_current() -> None:
    power, efficiency, factor = 750.0, 0.74, 0.86
    current = power / (efficiency * factor * 230.0)
    found = []
    for plate in (f"shaft_power: {power!r} W, efficiency: {efficiency!r}", f"current: {current!r} A"):
        text = f"""
format: 1
supplies: {{s: {{system: single-phase, voltage: 225 V, frequency: 50 Hz}}}}
circuits:
  tag: A
  fed_from: s
  ambient: 20 degC
  cable: {{section: 1.5 mm2, length: 40 m, conductor: copper, conductor_class: 2, reactance: 0.1 ohm/km}}
  load:
    motor: {{{plate}, power_factor: {factor}, rated_voltage: 230 V, starting_ratio: 5.5, starting_power_factor: 0.4}}
"""
        circuit = study(read_text(text), CORE)[0]
        found.append({(f.name, f.of, f.state): f.nominal for f in circuit.figures() if not f.name.startswith(("rated", "elec"))})
    assert set(found[0]) == set(found[1])
    for key, value in found[0].items():
        assert found[1][key] == pytest.approx(value, rel=1e-9), key
    running = found[0]["active-power", "load.motor", "cold"]
    assert running == pytest.approx(power / efficiency, rel=1e-9), "constant power at whatever voltage it gets"
    assert found[0]["current", "", "cold"] > current, "less voltage, more current"
    start = found[0]["current", "load.motor", "switch-on"]
    assert start == pytest.approx(5.5 * current * found[0]["voltage", "load.motor", "switch-on"] / 230.0, rel=1e-9)


def test_a_ballast_is_the_same_in_series_with_its_lamp_and_as_one_impedance() -> None:
    texts = ("series: [{coil: {resistance: 4.5 ohm, inductance: 0.26 H, armature: none}}, {resistor: {resistance: 62 ohm}}]",
             f"impedance: {{resistance: 66.5 ohm, reactance: {0.26 * 100 * math.pi!r} ohm}}")
    currents = []
    for load in texts:
        text = f"""
format: 1
supplies: {{s: {{system: single-phase, voltage: 230 V, frequency: 50 Hz}}}}
circuits: {{tag: A, fed_from: s, ambient: 20 degC, cable: [], load: {{{load}}}}}
"""
        figure = study(read_text(text), CORE)[0].figure("current", "cold")
        assert isinstance(figure, Figure)
        currents.append(figure.nominal)
    assert currents[0] == pytest.approx(currents[1], rel=1e-9)


def test_several_equal_loads_take_that_many_times_the_current_and_each_its_own() -> None:
    text = """
format: 1
supplies: {s: {system: single-phase, voltage: 230 V, frequency: 50 Hz}}
circuits: {tag: A, fed_from: s, ambient: 20 degC, cable: [], load: {count: 6, coil: {resistance: 21 ohm, inductance: 0.36 H}}}
"""
    circuit = study(read_text(text), CORE)[0]
    whole, one = circuit.figure("current", "cold"), circuit.figure("current", "cold", "load.coil")
    assert isinstance(whole, Figure) and isinstance(one, Figure)
    assert whole.nominal == pytest.approx(6 * one.nominal, rel=1e-12)
    assert one.nominal == pytest.approx(CURRENT, rel=1e-12)


def test_a_plate_that_tells_too_little_is_refused_with_the_sets_that_would_do() -> None:
    with pytest.raises(DefinitionError) as caught:
        coil({"inductance": "0.36 H"})
    assert "inductance is not enough" in str(caught.value)
    assert "impedance, power_factor" in str(caught.value)
