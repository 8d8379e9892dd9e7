"""The phasor diagram measured back from its own lines gives the phasors of the record."""

from __future__ import annotations

import cmath
import math
import re
from html import unescape

import pytest

from circuitlint.reports.page.phasor import arrows_of, describe, phasor_diagram
from circuitlint.review import record as r
from tests.reports.sample_record import circuits

THREE_DIGITS = 5e-4
CIRCUITS = {one.tag: one for one in circuits() if one.phasors}
_ARROW = re.compile(r'data-phasor="([^"]*)" d="M(\S+) (\S+?)l(\S+) (\S+?)"')


def attribute(drawing: str, name: str) -> float:
    """A scale written on the drawing."""
    found = re.search(rf'data-{name}="([^"]+)"', drawing)
    assert found is not None
    return float(found[1])


def measured(drawing: str) -> dict[tuple[str, str], tuple[complex, complex]]:
    """Tail and phasor of every arrow, in volts or amperes, turned back against the supply voltage."""
    scale = {"voltage": attribute(drawing, "volt"), "current": attribute(drawing, "ampere")}
    turned = attribute(drawing, "turned")
    found = {}
    for name, *numbers in _ARROW.findall(drawing):
        quantity, of = unescape(name).split("|")
        x, y, dx, dy = map(float, numbers)
        unit = scale["current" if quantity == "current" else "voltage"] * cmath.exp(-1j * turned)
        found[quantity, of] = (complex(x, -y) * unit, complex(dx, -dy) * unit)
    return found


def close(got: complex, wanted: complex) -> bool:
    return abs(got - wanted) <= THREE_DIGITS * abs(wanted)


@pytest.mark.parametrize("reference", ["current", "voltage"])
@pytest.mark.parametrize("tag", CIRCUITS)
def test_every_arrow_gives_its_phasor_to_three_digits(tag: str, reference: str) -> None:
    circuit = CIRCUITS[tag]
    drawing = phasor_diagram(circuit, "steady", "current" if reference == "current" else "voltage")
    found = measured(drawing)
    assert len(found) >= 4
    wanted = {(one.name, one.of): complex(one.real, one.imaginary) for one in circuit.phasors}
    for (name, of), (_, got) in found.items():
        assert close(got, wanted[name, of]), (name, of)


def test_the_measured_voltages_obey_ohms_law_and_kirchhoffs_voltage_law() -> None:
    """Series circuit of cable and coil: U = U_cable + I·R + j·I·X (Kirchhoff's voltage law; common practice)."""
    found = {key: value for key, (_, value) in measured(phasor_diagram(CIRCUITS["=R3-Y1"], "steady")).items()}
    parts = found["voltage", "cable[0]"], found["resistive-voltage", "load.coil"], found["inductive-voltage", "load.coil"]
    assert close(sum(parts), found["voltage", ""])
    current = found["current", ""]
    assert close(parts[1], 21.0 * current)
    assert close(parts[2], 2j * math.pi * 50.0 * 0.36 * current)


def test_the_parts_stand_tip_to_tail_from_the_origin_to_the_tip_of_the_supply() -> None:
    found = measured(phasor_diagram(CIRCUITS["=R3-L7"], "steady"))
    supply = found["voltage", ""][1]
    chain = [(tail, value) for (name, of), (tail, value) in found.items() if of and name != "current"]
    ends = {0j}
    for tail, value in sorted(chain, key=lambda pair: abs(pair[0])):
        assert min(abs(tail - end) for end in ends) <= THREE_DIGITS * abs(supply)
        ends.add(tail + value)
    assert min(abs(supply - end) for end in ends) <= THREE_DIGITS * abs(supply)


def test_branch_currents_add_up_to_the_current() -> None:
    found = measured(phasor_diagram(CIRCUITS["=R3-L7"], "steady"))
    branches = [value for (name, of), (_, value) in found.items() if name == "current" and of]
    assert len(branches) == 3
    assert close(sum(branches), found["current", ""][1])


def test_the_reference_lies_to_the_right() -> None:
    circuit = CIRCUITS["=R3-Y1"]
    for reference, key in (("current", ("current", "")), ("voltage", ("voltage", ""))):
        drawing = phasor_diagram(circuit, "steady", "current" if reference == "current" else "voltage")
        _, _, dx, dy = next(map(float, numbers) for name, *numbers in _ARROW.findall(drawing)
                            if name == f"{key[0]}|")  # fmt: skip
        assert dx > 0.0
        assert abs(dy) < 1e-6 * dx


def test_parts_that_do_not_add_up_are_drawn_from_the_origin_and_it_is_said() -> None:
    circuit = CIRCUITS["=R3-Y1"]
    lacking = tuple(one for one in circuit.phasors if one.name != "inductive-voltage")
    drawing = phasor_diagram(circuit.model_copy(update={"phasors": lacking}), "steady")
    assert attribute(drawing, "closes") == 0.0
    assert all(tail == 0.0 for (name, _), (tail, _) in measured(drawing).items() if name != "current")
    assert attribute(phasor_diagram(circuit, "steady"), "closes") == 1.0


def test_the_description_gives_every_phasor_with_its_angle_against_the_supply() -> None:
    arrows, _ = arrows_of(CIRCUITS["=R3-Y1"], "steady")
    said = describe(arrows)
    assert "U: voltage of the circuit 230.0 V at 0.0°" in said
    angle = math.degrees(math.atan2(2.0 * math.pi * 50.0 * 0.36 + 0.008, 21.0 + 1.21))
    assert f"I: current of the circuit 1.995 A at {-angle:.1f}°" in said


@pytest.mark.parametrize("value", [math.nan, math.inf, 0.0])
def test_no_diagram_is_drawn_of_what_is_no_number_or_nothing(value: float) -> None:
    circuit = CIRCUITS["=R3-Y1"]
    broken = tuple(
        one.model_copy(update={"real": value, "imaginary": 0.0}) if (one.name, one.of) == ("voltage", "") else one
        for one in circuit.phasors
    )
    assert phasor_diagram(circuit.model_copy(update={"phasors": broken}), "steady") == ""
    assert phasor_diagram(circuit, "a state that was not studied") == ""


def test_a_circuit_without_current_is_drawn_with_its_voltage_alone() -> None:
    still = r.Phasor(name="current", of="", state="steady", real=0.0, imaginary=0.0)
    supply = r.Phasor(name="voltage", of="", state="steady", real=230.0, imaginary=0.0)
    drawing = phasor_diagram(CIRCUITS["=R3-Y1"].model_copy(update={"phasors": (supply, still)}), "steady")
    assert close(measured(drawing)["voltage", ""][1], 230.0)
