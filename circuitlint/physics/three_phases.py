"""Lines and phases of star and delta, and what an uneven load leaves for the neutral."""

from __future__ import annotations

import math

from circuitlint.physics.formula import formula
from circuitlint.si import Ampere, ComplexAmpere, Ratio, Volt, Watt
from circuitlint.sources import Source

CHAPTER_10 = Source("T. R. Kuphaldt, Lessons in Electric Circuits vol. II (AC)", "ch. 10")
NODE = Source("sum of the currents at the star point", known="derived")


@formula("Uf", "{U} / √3", source=CHAPTER_10, validity="balanced voltages; star", voltage="U")
def phase_voltage(*, voltage: Volt) -> Volt:
    """Uf = U / √3"""
    return voltage / math.sqrt(3.0)


@formula("If", "{I} / √3", source=CHAPTER_10, validity="balanced delta", line_current="I")
def phase_current_of_delta(*, line_current: Ampere) -> Ampere:
    """If = I / √3"""
    return line_current / math.sqrt(3.0)


@formula(
    "P",
    "√3 · {U} · {I} · {cosφ}",
    source=CHAPTER_10,
    validity="balanced three-phase, voltage between lines, line current",
    voltage="U",
    current="I",
    power_factor="cosφ",
)
def three_phase_active_power(*, voltage: Volt, current: Ampere, power_factor: Ratio) -> Watt:
    """P = √3 · U · I · cosφ"""
    return math.sqrt(3.0) * voltage * current * power_factor


@formula(
    "IN",
    "Σ {Ik}",
    source=NODE,
    validity="fundamental; third harmonics of the phases add up in the neutral besides",
    currents="Ik",
)
def neutral_current(*, currents: tuple[ComplexAmpere, ...]) -> ComplexAmpere:
    """IN = Σ Ik"""
    total = currents[0]
    for one in currents[1:]:
        total = total + one
    return total
