"""The choke whose inductance falls with current: the current agrees with its inductance, or nothing is told."""

from __future__ import annotations

import math
from collections.abc import Callable

import numpy as np
import pytest
from scipy.integrate import quad
from scipy.optimize import brentq

from circuitlint.definition.reading import read_text
from circuitlint.errors import DefinitionError
from circuitlint.study.installation import study
from circuitlint.study.loads import CORE
from circuitlint.study.study import CircuitStudy, Figure
from circuitlint.study.worksheet import Lack

OMEGA = 100 * math.pi
TABLE = ((0.5, 0.36), (1.0, 0.33), (2.0, 0.21), (4.0, 0.12))


def points(table: tuple[tuple[float, float], ...] = TABLE) -> str:
    return "table: [" + ", ".join(f"{{current: {i!r} A, inductance: {h!r} H}}" for i, h in table) + "]"


def choke(saturation: str, volts: float = 230.0, plate: str = "resistance: 21 ohm, inductance: 0.36 H, armature: none",
          system: str = "single-phase", more: str = "") -> CircuitStudy:
    supply = f"system: {system}, voltage: {volts!r} V" + (", frequency: 50 Hz" if system != "dc" else "")
    text = f"""
format: 1
supplies: {{s: {{{supply}}}}}
circuits:
  tag: A
  fed_from: s
  ambient: 20 degC
  cable: []
  load: {{coil: {{{plate}, saturation: {{{saturation}, source: a test certificate}}{more}}}}}
"""
    return study(read_text(text), CORE, ("current", "inductance"))[0]


def value(circuit: CircuitStudy, name: str, of: str = "load.coil", state: str = "cold") -> float:
    found = circuit.figure(name, state, of)
    assert isinstance(found, Figure), found
    return found.nominal


def agreeing(inductance: Callable[[float], float], volts: float, high: float) -> float:
    """The current whose own inductance draws it, by SciPy's bracketing root."""
    return float(brentq(lambda i: i * math.hypot(21.0, OMEGA * inductance(i)) - volts, 1e-6, high, xtol=1e-13, rtol=1e-13))


@pytest.mark.parametrize(("exponent", "volts"), [(1.0, 230.0), (2.0, 100.0), (0.7, 400.0), (3.5, 230.0)])
def test_by_the_chord_law_the_current_agrees_with_its_inductance(exponent: float, volts: float) -> None:
    circuit = choke(f"inductance_is: chord, current: 5 A, exponent: {exponent}", volts)
    wanted = agreeing(lambda i: 0.36 / (1 + (i / 5) ** exponent), volts, 5.0 * (1 / max(exponent - 1, 1e-3)) ** (1 / exponent))
    assert value(circuit, "current", "") == pytest.approx(wanted, rel=1e-10)
    assert value(circuit, "inductance") == pytest.approx(0.36 / (1 + (wanted / 5) ** exponent), rel=1e-10)


@pytest.mark.parametrize("volts", [60.0, 230.0, 700.0])
def test_by_the_differential_law_the_chord_at_the_crest_is_the_mean_of_the_slopes(volts: float) -> None:
    def chord(current: float) -> float:
        crest = math.sqrt(2) * current
        return quad(lambda i: 0.36 / (1 + (i / 2) ** 3), 0, crest, epsabs=1e-13, epsrel=1e-13, points=[2.0])[0] / crest

    wanted = agreeing(chord, volts, 200.0)
    circuit = choke("inductance_is: differential, current: 2 A, exponent: 3", volts)
    assert value(circuit, "current", "") == pytest.approx(wanted, rel=1e-9)
    assert value(circuit, "inductance") == pytest.approx(chord(wanted), rel=1e-9)


def test_by_a_table_the_inductance_lies_straight_between_its_points() -> None:
    plate = "resistance: 21 ohm, armature: none"
    wanted = agreeing(lambda i: float(np.interp(i, *zip(*TABLE, strict=True))), 150.0, 4.0)
    circuit = choke(f"inductance_is: chord, {points()}", 150.0, plate)
    assert value(circuit, "current", "") == pytest.approx(wanted, rel=1e-10)
    assert 2.0 < wanted < 4.0


def test_by_a_differential_table_the_flux_linkage_is_its_area() -> None:
    def chord(current: float) -> float:
        crest = math.sqrt(2) * current
        return quad(lambda i: float(np.interp(i, *zip(*TABLE, strict=True))), 0, crest, points=[0.5, 1.0, 2.0], limit=200)[0] / crest

    wanted = agreeing(chord, 200.0, 4.0)
    circuit = choke(f"inductance_is: differential, {points()}", 200.0, "resistance: 21 ohm, armature: none")
    assert value(circuit, "current", "") == pytest.approx(wanted, rel=1e-8)


@pytest.mark.parametrize(("saturation", "volts", "plate"), [
    (f"inductance_is: chord, {points()}", 10.0, "resistance: 21 ohm, armature: none"),
    (f"inductance_is: chord, {points()}", 400.0, "resistance: 21 ohm, armature: none"),
    (f"inductance_is: differential, {points()}", 400.0, "resistance: 21 ohm, armature: none"),
    ("inductance_is: chord, current: 1 A, exponent: 3", 230.0, "resistance: 21 ohm, inductance: 0.36 H, armature: none"),
])  # fmt: skip
def test_beyond_the_table_or_the_law_nothing_is_told(saturation: str, volts: float, plate: str) -> None:
    found = choke(saturation, volts, plate).figure("current", "cold")
    assert isinstance(found, Lack) and "range of a formula" in found.why and "inductance" in found.why


def test_a_tolerance_that_reaches_beyond_the_table_is_not_assessed_either() -> None:
    plate = "resistance: 21 ohm ± 60 %, armature: none"
    assert isinstance(choke(f"inductance_is: chord, {points()}", 189.0, plate).figure("current", "cold"), Lack)
    assert isinstance(choke(f"inductance_is: chord, {points()}", 150.0, plate).figure("current", "cold"), Figure)


def test_little_current_leaves_the_inductance_as_it_is_unsaturated() -> None:
    circuit = choke("inductance_is: chord, current: 5000 A, exponent: 2")
    assert value(circuit, "current", "") == pytest.approx(230 / math.hypot(21, OMEGA * 0.36), rel=1e-6)


def test_hot_the_temperature_and_the_current_settle_together() -> None:
    """By hand: R follows the winding's temperature, L the current, I both; a plain fixed point, 500 rounds."""
    circuit = choke("inductance_is: chord, current: 4 A, exponent: 1.5", more=", thermal_resistance: 0.8 K/W")
    current, rise = 2.0, 0.0
    for _ in range(500):
        resistance = 21 * (234.5 + 20 + rise) / (234.5 + 20)
        current = 230 / math.hypot(resistance, OMEGA * 0.36 / (1 + (current / 4) ** 1.5))
        rise = 0.8 * current**2 * resistance
    assert value(circuit, "current", "", "steady") == pytest.approx(current, rel=1e-9)
    assert value(circuit, "winding-temperature", state="steady") == pytest.approx(20 + rise, rel=1e-9)


def test_on_direct_current_the_inductance_is_told_at_the_current_and_lacks_alone_beyond_the_table() -> None:
    plate = "resistance: 21 ohm, armature: none"
    within = choke(f"inductance_is: chord, {points()}", 42.0, plate, "dc")
    assert value(within, "inductance") == pytest.approx(0.21, rel=1e-12), "2 A: a point of the table"
    beyond = choke(f"inductance_is: chord, {points()}", 210.0, plate, "dc")
    assert value(beyond, "current", "") == pytest.approx(10.0)
    assert isinstance(beyond.figure("inductance", "cold", "load.coil"), Lack)


def test_what_needs_a_constant_inductance_is_lacking_with_the_reason() -> None:
    circuit = choke("inductance_is: chord, current: 5 A, exponent: 1")
    for name, state, of in (("time-constant", "cold", "load.coil"), ("stored-energy", "cold", "load.coil"),
                            ("switch-on-peak", "switch-on", "")):
        found = circuit.figure(name, state, of)
        assert isinstance(found, Lack) and "with current" in found.why, (name, found)


def test_chord_and_differential_readings_of_one_table_differ() -> None:
    plate = "resistance: 21 ohm, armature: none"
    chord, slope = (choke(f"inductance_is: {one}, {points()}", 150.0, plate) for one in ("chord", "differential"))
    assert value(slope, "inductance") > value(chord, "inductance")


@pytest.mark.parametrize(("saturation", "plate", "words"), [
    ("inductance_is: chord, current: 5 A", "resistance: 21 ohm, inductance: 0.36 H, armature: none", "neither a whole law"),
    ("current: 5 A, exponent: 2", "resistance: 21 ohm, inductance: 0.36 H, armature: none", "inductance_is"),
    (f"inductance_is: chord, {points(((1.0, 0.3), (0.5, 0.2)))}", "resistance: 21 ohm, armature: none", "rise from point to point"),
    (f"inductance_is: chord, {points(((1.0, 0.3), (2.0, 0.4)))}", "resistance: 21 ohm, armature: none", "do not rise"),
    (f"inductance_is: chord, {points(((1.0, 0.3), (2.0, 0.1)))}", "resistance: 21 ohm, armature: none", "flux linkage"),
    (f"inductance_is: chord, {points()}", "resistance: 21 ohm, inductance: 0.36 H, armature: none", "one of them"),
    ("inductance_is: chord, current: 5 A, exponent: 2", "resistance: 21 ohm, armature: none", "inductance or reactance"),
    ("inductance_is: chord, current: 5 A, exponent: 2", "resistance: 21 ohm, inductance: 0.36 H", "armature: none"),
    ("inductance_is: chord, current: 5 A, exponent: 2", "resistance: 21 ohm, inductance: 0.36 H, current: 2 A, armature: none",
     "current beside saturation"),
])  # fmt: skip
def test_a_curve_that_cannot_be_is_refused_with_what_is_accepted(saturation: str, plate: str, words: str) -> None:
    with pytest.raises(DefinitionError) as caught:
        choke(saturation, 230.0, plate)
    assert words in str(caught.value)
