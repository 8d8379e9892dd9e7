"""Active, reactive and apparent power, power factor, and what a capacitor does to it."""

from __future__ import annotations

import math

import numpy as np

from circuitlint.physics.formula import formula
from circuitlint.si import (
    Ampere,
    ComplexAmpere,
    ComplexVolt,
    ComplexVoltAmpere,
    Farad,
    Hertz,
    Ohm,
    Radian,
    Ratio,
    Var,
    Volt,
    VoltAmpere,
    Watt,
)
from circuitlint.sources import Source

CHAPTER_11 = Source("T. R. Kuphaldt, Lessons in Electric Circuits vol. II (AC)", "ch. 11")
GUIDE = Source("Electrical Installation Guide", "ch. L, power-factor correction", "2018", known="value from memory")


@formula("P", "{I}² · {R}", source=CHAPTER_11, validity="rms current", current="I", resistance="R")
def active_power(*, current: Ampere, resistance: Ohm) -> Watt:
    """P = I² · R"""
    return current**2 * resistance


@formula("P", "{U} · {I} · cos {φ}", source=CHAPTER_11, validity="sinusoidal rms quantities", voltage="U", current="I", angle="φ")
def active_power_from_angle(*, voltage: Volt, current: Ampere, angle: Radian) -> Watt:
    """P = U · I · cos φ"""
    return voltage * current * np.cos(angle)


@formula("Q", "{I}² · {X}", source=CHAPTER_11, validity="positive where the current lags", current="I", reactance="X")
def reactive_power(*, current: Ampere, reactance: Ohm) -> Var:
    """Q = I² · X"""
    return current**2 * reactance


@formula("S", "{U} · {I}", source=CHAPTER_11, validity="rms quantities", voltage="U", current="I")
def apparent_power(*, voltage: Volt, current: Ampere) -> VoltAmpere:
    """S = U · I"""
    return voltage * current


@formula("cosφ", "{P} / {S}", source=CHAPTER_11, validity="sinusoidal quantities", active="P", apparent="S")
def power_factor(*, active: Watt, apparent: VoltAmpere) -> Ratio:
    """cosφ = P / S"""
    return active / apparent


@formula("S", "{U} · conj {I}", source=CHAPTER_11, validity="rms phasors; P is its real, Q its imaginary part", voltage="U",
         current="I")
def complex_power(*, voltage: ComplexVolt, current: ComplexAmpere) -> ComplexVoltAmpere:
    """S = U · conj I"""
    return voltage * np.conj(current)


@formula("Qc", "{P} · (tan {φ1} − tan {φ2})", source=CHAPTER_11, validity="sinusoidal quantities, active power unchanged",
         active_power="P", angle_before="φ1", angle_after="φ2")
def correction_reactive_power(*, active_power: Watt, angle_before: Radian, angle_after: Radian) -> Var:
    """Qc = P · (tan φ1 − tan φ2)"""
    return active_power * (np.tan(angle_before) - np.tan(angle_after))


@formula("C", "{Qc} / (2π · {f} · {U}²)", source=CHAPTER_11, validity="voltage across the one capacitor", reactive_power="Qc",
         voltage="U", frequency="f")
def correction_capacitance(*, reactive_power: Var, voltage: Volt, frequency: Hertz) -> Farad:
    """C = Qc / (2π · f · U²)"""
    return reactive_power / (2.0 * np.pi * frequency * voltage**2)


@formula("C", "{Qc} / (3 · 2π · {f} · {U}²)", source=GUIDE, validity="three equal capacitors in delta, voltage between lines",
         reactive_power="Qc", voltage="U", frequency="f")
def correction_capacitance_delta(*, reactive_power: Var, voltage: Volt, frequency: Hertz) -> Farad:
    """C = Qc / (3 · 2π · f · U²)"""
    return reactive_power / (6.0 * np.pi * frequency * voltage**2)


@formula("C", "{Qc} / (2π · {f} · {U}²)", source=GUIDE, validity="each of three equal capacitors in star, voltage between lines",
         reactive_power="Qc", voltage="U", frequency="f")
def correction_capacitance_star(*, reactive_power: Var, voltage: Volt, frequency: Hertz) -> Farad:
    """C = Qc / (2π · f · U²)"""
    return reactive_power / (2.0 * np.pi * frequency * voltage**2)


@formula("φ", "acos({cosφ})", source=CHAPTER_11, validity="a current that lags", power_factor="cosφ")
def angle_of_power_factor(*, power_factor: Ratio) -> Radian:
    """φ = acos(cosφ)"""
    return np.arccos(power_factor)


@formula("S", "√3 · {U} · {I}", source=Source("T. R. Kuphaldt, Lessons in Electric Circuits vol. II (AC)", "ch. 10"),
         validity="balanced three-phase, voltage between lines, line current", voltage="U", current="I")
def three_phase_apparent_power(*, voltage: Volt, current: Ampere) -> VoltAmpere:
    """S = √3 · U · I"""
    return math.sqrt(3.0) * voltage * current
