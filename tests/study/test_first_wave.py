"""The first current wave of whole circuits: several paths, core loss, capacitors, and where it is not known."""

from __future__ import annotations

import math
from typing import Any

import numpy as np
import pytest
from scipy.integrate import solve_ivp

from circuitlint.definition.reading import read_text
from circuitlint.physics.switching_on import switch_on_peak
from circuitlint.study.installation import study
from circuitlint.study.loads import CORE
from circuitlint.study.study import CircuitStudy, Figure
from circuitlint.study.worksheet import Lack

CABLE = "{section: 1.5 mm2, length: 20 m, conductor: copper, conductor_class: 2, reactance: 0.1 ohm/km}"
LINE = 40 * (12.1e-3 + 0.1e-3j)
"""Loop of 20 m of 1.5 mm²: 12.1 Ω/km at 20 °C (IEC 60228, table of class 2), 0.1 Ω/km."""
OMEGA = 100 * math.pi


SUPPLY = "system: single-phase, voltage: 230 V, frequency: 50 Hz"


def circuit(load: str, cable: str = CABLE, more: str = "", supply: str = SUPPLY) -> CircuitStudy:
    text = f"""
format: 1
supplies: {{s: {{{supply}}}}}
circuits: {{tag: A, fed_from: s, ambient: 20 degC, cable: {cable}, load: {{{load}}}{more}}}
"""
    return study(read_text(text), CORE, ("switch-on-peak",), ("switch-on",))[0]


def peak(load: str, **more: Any) -> Figure:
    found = circuit(load, **more).figure("switch-on-peak", "switch-on")
    assert isinstance(found, Figure), found
    return found


def coil(resistance: float, reactance: float) -> str:
    return f"{{coil: {{resistance: {resistance!r} ohm, inductance: {reactance / OMEGA!r} H, armature: none}}}}"


def closed(total: complex, volts: float = 230.0) -> float:
    return float(switch_on_peak(current_rms=volts / abs(total), resistance=total.real, reactance=total.imag))


def test_two_coils_side_by_side_peak_where_their_equations_do() -> None:
    """The two branch currents behind the cable, integrated by SciPy; largest over 1,800 closing angles."""
    first, second = 21 + 113j, 3 + 45j
    found = peak(f"parallel: [{coil(21, 113)}, {coil(3, 45)}]")
    inductance = np.array([[(LINE + first).imag, LINE.imag], [LINE.imag, (LINE + second).imag]]) / OMEGA
    resistance = np.array([[(LINE + first).real, LINE.real], [LINE.real, (LINE + second).real]])
    inverse = np.linalg.inv(inductance)
    times = np.linspace(0.0, 0.03, 12001)
    waves = [
        solve_ivp(lambda t, i, wave=wave: inverse @ (wave(OMEGA * t) - resistance @ i), (0, 0.03), [0, 0], "LSODA", times,
                  rtol=1e-10, atol=1e-12).y.sum(axis=0)
        for wave in (math.sin, math.cos)
    ]
    crest = max(float(np.max(np.abs(math.cos(a) * waves[0] + math.sin(a) * waves[1])))
                for a in np.linspace(0, math.pi, 1800, endpoint=False))
    assert found.nominal == pytest.approx(math.sqrt(2) * 230 * crest, rel=3e-6)
    assert found.lowest <= found.nominal <= found.highest


def test_alike_coils_side_by_side_give_the_closed_form_of_their_joint_impedance() -> None:
    wanted = closed(LINE + (21 + 113j) / 2)
    assert peak(f"parallel: [{coil(21, 113)}, {coil(21, 113)}]").nominal == pytest.approx(wanted, rel=1e-9)
    assert peak(f"count: 2, {coil(21, 113)[1:-1]}").nominal == pytest.approx(wanted, rel=1e-9)


def test_several_of_a_group_of_paths_are_that_many_groups_side_by_side() -> None:
    pair = f"parallel: [{coil(21, 113)}, {coil(3, 45)}]"
    twice = peak(f"parallel: [{{{pair}}}, {{{pair}}}]").nominal
    assert peak(f"count: 2, {pair}").nominal == pytest.approx(twice, rel=1e-9)


def test_core_loss_adds_a_path_of_its_own() -> None:
    """A core resistance of 1 GΩ changes nothing; one as small as the reactance raises the first crest."""
    plain = "coil: {resistance: 21 ohm, inductance: 0.36 H, armature: none"
    without = peak(plain + "}").nominal
    assert peak(plain + ", core_resistance: 1e9 ohm}").nominal == pytest.approx(without, rel=1e-6)
    assert peak(plain + ", core_resistance: 113 ohm}").nominal > without


def test_resistors_side_by_side_take_their_crest_at_the_voltage_s() -> None:
    """With the cable's small inductance only, the peak is the settled crest of the sum (Ohm's law)."""
    found = peak("parallel: [{resistor: {resistance: 50 ohm}}, {resistor: {resistance: 25 ohm}}]")
    assert found.nominal == pytest.approx(math.sqrt(2) * 230 / (50 / 3 + LINE.real), rel=1e-6)


def test_a_capacitor_behind_a_cable_rings_up_to_the_voltage_over_its_surge_impedance() -> None:
    """Damped series R-L-C at voltage crest: i = U / (ω_d L) exp(−α t) sin ω_d t, largest at tan(ω_d t) = ω_d / α."""
    farads, henries, resistance = 20e-6, LINE.imag / OMEGA, LINE.real
    alpha = resistance / (2 * henries)
    ring = math.sqrt(1 / (henries * farads) - alpha**2)
    at = math.atan2(ring, alpha) / ring
    crest = math.sqrt(2) * 230 / (ring * henries) * math.exp(-alpha * at) * math.sin(ring * at)
    found = peak("capacitor: {capacitance: 20 uF}").nominal
    assert found == pytest.approx(crest, rel=0.01)


def test_a_capacitor_at_the_coil_s_terminals_makes_the_first_crest_many_times_the_coil_s() -> None:
    with_it = peak(coil(21, 113)[1:-1], more=", correction: {capacitance: 20 uF}").nominal
    assert with_it > 10 * peak(coil(21, 113)[1:-1]).nominal


def test_three_alike_between_the_lines_are_a_star_of_a_third() -> None:
    supply = "system: three-phase, voltage: 400 V, frequency: 50 Hz"
    pair = f"parallel: [{coil(21, 113)}, {coil(21, 113)}]"
    found = peak(pair, more=", connection: delta", supply=supply).nominal
    line = LINE / 2
    assert found == pytest.approx(closed(line + (21 + 113j) / 6, 400 / math.sqrt(3)), rel=1e-9)


@pytest.mark.parametrize(("load", "cable", "why"), [
    ("capacitor: {capacitance: 20 uF}", "[]", "nothing stated limits"),
    (f"parallel: [{coil(21, 113)}, {{capacitor: {{capacitance: 20 uF}}}}]", "[]", "nothing stated limits"),
    ("motor: {shaft_power: 750 W, efficiency: 0.7, power_factor: 0.8, starting_ratio: 5, starting_power_factor: 0.4}", CABLE,
     "do not change with current"),
])  # fmt: skip
def test_what_is_not_known_is_lacking_with_the_reason(load: str, cable: str, why: str) -> None:
    found = circuit(load, cable).figure("switch-on-peak", "switch-on")
    assert isinstance(found, Lack) and why in found.why
    other = circuit(load, cable).figure("current", "switch-on")
    assert isinstance(other, Figure), "the other figures stand"


def test_with_tolerances_the_highest_peak_is_that_of_the_least_impedance() -> None:
    found = peak("parallel: [{coil: {resistance: 21 ohm ± 5 %, inductance: 0.36 H ± 10 %, armature: none}}, "
                 "{impedance: {resistance: 4 ohm ± 5 %, reactance: 40 ohm ± 10 %}}]")
    least = peak("parallel: [{coil: {resistance: 19.95 ohm, inductance: 0.324 H, armature: none}}, "
                 "{impedance: {resistance: 3.8 ohm, reactance: 36 ohm}}]")
    assert found.highest == pytest.approx(least.highest, rel=1e-6)
