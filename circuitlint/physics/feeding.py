"""Three phases alike, star and delta, and what the others on a board do to a circuit's voltage."""

from __future__ import annotations

from typing import Any

import numpy as np

from circuitlint.physics.formula import formula
from circuitlint.si import ComplexOhm, ComplexVolt, ComplexVoltAmpere, Ratio, Volt, VoltAmpere
from circuitlint.sources import Source

CHAPTER_10 = Source("T. R. Kuphaldt, Lessons in Electric Circuits vol. II (AC)", "ch. 10")
SUPERPOSITION = Source("superposition of currents in a linear network", known="derived")
DELTA_STEP = float(np.sqrt(3.0)) * complex(np.exp(1j * np.pi / 6.0))


@formula("S", "3 · {S}", source=CHAPTER_10, validity="three phases loaded alike", power="S")
def power_of_three_phases(*, power: ComplexVoltAmpere) -> ComplexVoltAmpere:
    """S = 3 · S"""
    return 3.0 * power


@formula("S", "{S} / 3", source=CHAPTER_10, validity="three phases loaded alike", power="S")
def power_of_one_phase(*, power: VoltAmpere) -> VoltAmpere:
    """S = S / 3"""
    return power / 3.0


@formula("Z", "{Z} / 3", source=CHAPTER_10, validity="equal impedances in delta, as one phase of a star", impedance="Z")
def star_of_delta(*, impedance: ComplexOhm) -> ComplexOhm:
    """Z = Z / 3"""
    star: Any = impedance
    third: ComplexOhm = star / 3.0
    return third


@formula("U", "√3 ∠ 30° · {U}", source=CHAPTER_10, validity="balanced voltages", voltage="U")
def delta_voltage(*, voltage: ComplexVolt) -> ComplexVolt:
    """U = √3 ∠ 30° · U"""
    line: Any = voltage
    across: ComplexVolt = line * DELTA_STEP
    return across


@formula("U", "√3 · {U}", source=CHAPTER_10, validity="balanced voltages", voltage="U")
def line_voltage(*, voltage: Volt) -> Volt:
    """U = √3 · U"""
    return float(np.sqrt(3.0)) * voltage


@formula("U", "{U} · {s} · ({d} + j {q})", source=SUPERPOSITION, validity="the others draw what they draw at nominal values",
         voltage="U", share="s", in_phase="d", across="q")
def drop_of_the_others(*, voltage: ComplexVolt, share: Ratio, in_phase: Ratio, across: Ratio) -> ComplexVolt:
    """U = U · s · (d + j q)"""
    turn: Any = in_phase + 1j * np.asarray(across)
    drop: ComplexVolt = voltage * share * turn
    return drop


@formula("U", "{U1} − {U2}", source=SUPERPOSITION, sending="U1", dropped="U2")
def arriving_voltage(*, sending: ComplexVolt, dropped: ComplexVolt) -> ComplexVolt:
    """U = U1 − U2"""
    return sending - dropped
