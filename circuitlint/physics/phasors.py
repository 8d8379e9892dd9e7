"""Reactance, impedance and phasors of rms quantities."""

from __future__ import annotations

from typing import cast

import numpy as np

from circuitlint.physics.formula import formula
from circuitlint.si import Ampere, ComplexAmpere, ComplexOhm, ComplexVolt, Farad, Henry, Hertz, Ohm, Radian, Ratio, Volt
from circuitlint.sources import Source

CHAPTER_3 = Source("T. R. Kuphaldt, Lessons in Electric Circuits vol. II (AC)", "ch. 3")
CHAPTER_4 = Source("T. R. Kuphaldt, Lessons in Electric Circuits vol. II (AC)", "ch. 4")
CHAPTER_5 = Source("T. R. Kuphaldt, Lessons in Electric Circuits vol. II (AC)", "ch. 5")


@formula("X", "2π · {f} · {L}", source=CHAPTER_3, validity="sinusoidal current, inductance that does not change with it",
         inductance="L", frequency="f")
def reactance_of_inductance(*, inductance: Henry, frequency: Hertz) -> Ohm:
    """X = 2π · f · L"""
    return 2.0 * np.pi * frequency * inductance


@formula("X", "1 / (2π · {f} · {C})", source=CHAPTER_4, validity="a capacitor without loss; the magnitude, current leading",
         capacitance="C", frequency="f")
def reactance_of_capacitance(*, capacitance: Farad, frequency: Hertz) -> Ohm:
    """X = 1 / (2π · f · C)"""
    return 1.0 / (2.0 * np.pi * frequency * capacitance)


@formula("L", "{X} / (2π · {f})", source=CHAPTER_3, validity="as for the reactance", reactance="X", frequency="f")
def inductance_of_reactance(*, reactance: Ohm, frequency: Hertz) -> Henry:
    """L = X / (2π · f)"""
    return reactance / (2.0 * np.pi * frequency)


@formula("Z", "√({R}² + {X}²)", source=CHAPTER_3, validity="resistance and reactance in series", resistance="R", reactance="X")
def impedance_of(*, resistance: Ohm, reactance: Ohm) -> Ohm:
    """Z = √(R² + X²)"""
    return np.hypot(resistance, reactance)


@formula("φ", "atan({X} / {R})", source=CHAPTER_3, validity="positive where the current lags", resistance="R", reactance="X")
def impedance_angle(*, resistance: Ohm, reactance: Ohm) -> Radian:
    """φ = atan(X / R)"""
    return np.arctan2(reactance, resistance)


@formula("Z", "{R} + j {X}", source=CHAPTER_3, validity="resistance and reactance in series", resistance="R", reactance="X")
def impedance_phasor(*, resistance: Ohm, reactance: Ohm) -> ComplexOhm:
    """Z = R + j X"""
    return cast("ComplexOhm", resistance + 1j * reactance)


@formula("Z", "Σ {Zk}", source=CHAPTER_5, validity="parts that carry one current", impedances="Zk")
def series_impedance(*, impedances: tuple[ComplexOhm, ...]) -> ComplexOhm:
    """Z = Σ Zk"""
    total = impedances[0]
    for one in impedances[1:]:
        total = total + one
    return total


@formula("Z", "1 / Σ (1 / {Zk})", source=CHAPTER_5, validity="branches at one voltage", impedances="Zk")
def parallel_impedance(*, impedances: tuple[ComplexOhm, ...]) -> ComplexOhm:
    """Z = 1 / Σ (1 / Zk)"""
    if len(impedances) == 1:
        return impedances[0]
    total = 1.0 / impedances[0]
    for one in impedances[1:]:
        total = total + 1.0 / one
    return 1.0 / total


@formula("I", "{U} / {Z}", source=CHAPTER_3, validity="rms phasors", voltage="U", impedance="Z")
def current_phasor(*, voltage: ComplexVolt, impedance: ComplexOhm) -> ComplexAmpere:
    """I = U / Z"""
    return voltage / impedance


@formula("U", "{I} · {Z}", source=CHAPTER_3, validity="rms phasors", current="I", impedance="Z")
def voltage_phasor(*, current: ComplexAmpere, impedance: ComplexOhm) -> ComplexVolt:
    """U = I · Z"""
    return current * impedance


@formula("I", "|{I}|", source=CHAPTER_3, validity="rms", current="I")
def magnitude_of_current(*, current: ComplexAmpere) -> Ampere:
    """I = |I|"""
    return np.abs(current)


@formula("U", "|{U}|", source=CHAPTER_3, validity="rms", voltage="U")
def magnitude_of_voltage(*, voltage: ComplexVolt) -> Volt:
    """U = |U|"""
    return np.abs(voltage)


@formula("UR", "{I} · {R}", source=CHAPTER_3, validity="in phase with the current", current="I", resistance="R")
def resistive_voltage(*, current: Ampere, resistance: Ohm) -> Volt:
    """UR = I · R"""
    return current * resistance


@formula("UX", "{I} · {X}", source=CHAPTER_3, validity="a quarter period from the current", current="I", reactance="X")
def inductive_voltage(*, current: Ampere, reactance: Ohm) -> Volt:
    """UX = I · X"""
    return current * reactance


@formula("R", "{Z} · {cosφ}", source=CHAPTER_3, validity="resistance and reactance in series", impedance="Z",
         power_factor="cosφ")
def resistance_from_impedance(*, impedance: Ohm, power_factor: Ratio) -> Ohm:
    """R = Z · cosφ"""
    return impedance * power_factor


@formula("X", "{Z} · √(1 − {cosφ}²)", source=CHAPTER_3, validity="resistance and reactance in series", impedance="Z",
         power_factor="cosφ")
def reactance_from_impedance(*, impedance: Ohm, power_factor: Ratio) -> Ohm:
    """X = Z · √(1 − cosφ²)"""
    return impedance * np.sqrt(1.0 - power_factor**2)


@formula("X", "√({Z}² − {R}²)", source=CHAPTER_3, validity="resistance and reactance in series, no core loss", impedance="Z",
         resistance="R")
def reactance_from_resistance(*, impedance: Ohm, resistance: Ohm) -> Ohm:
    """X = √(Z² − R²)"""
    return np.sqrt(impedance**2 - resistance**2)


@formula("Q", "{X} / {R}", source=Source("T. R. Kuphaldt, Lessons in Electric Circuits vol. II (AC)", "ch. 3 and 6"),
         validity="resistance and reactance in series", reactance="X", resistance="R")
def quality_factor(*, reactance: Ohm, resistance: Ohm) -> Ratio:
    """Q = X / R"""
    return reactance / resistance
