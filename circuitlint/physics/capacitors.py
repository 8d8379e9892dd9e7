"""Correction capacitors: current, stress, discharge, resonance, limits at motor terminals."""

from __future__ import annotations

import math

import numpy as np

from circuitlint.physics.formula import formula
from circuitlint.si import Ampere, Farad, Henry, Hertz, Ohm, Ratio, Second, Var, Volt, VoltAmpere
from circuitlint.sources import Source

CHAPTER_11 = Source("T. R. Kuphaldt, Lessons in Electric Circuits vol. II (AC)", "ch. 11")
RESONANCE = Source("OpenStax University Physics vol. 2", "15.5 Resonance in an AC Circuit")
ORDER = Source("power-quality formula pages", "resonance of a capacitor with the supply")
DISCHARGE = Source("technical note TS 03-010I", "discharge resistors")
SCALING = Source("reactive power of a capacitor goes with voltage squared and frequency", known="derived")
STRESS = Source("sum of the squares of the harmonic currents", known="derived")
DETUNED = Source("series reactor and capacitor share the voltage with opposite sign", known="derived")
TERMINALS = Source(
    "capacitor catalogue, general information",
    "motors corrected at their terminals",
    note="sources disagree: 0.85, 0.90 and 1.0",
)
OVERLOAD = Source("Electrical Installation Guide", "setting of an overload relay upstream of the capacitor")


@formula(
    "I",
    "2π · {f} · {C} · {U}",
    source=CHAPTER_11,
    validity="sinusoidal voltage",
    frequency="f",
    capacitance="C",
    voltage="U",
)
def capacitor_current(*, frequency: Hertz, capacitance: Farad, voltage: Volt) -> Ampere:
    """I = 2π · f · C · U"""
    return 2.0 * np.pi * frequency * capacitance * voltage


@formula(
    "Qc",
    "2π · {f} · {C} · {U}²",
    source=CHAPTER_11,
    validity="sinusoidal voltage; one capacitor",
    frequency="f",
    capacitance="C",
    voltage="U",
)
def capacitor_reactive_power(*, frequency: Hertz, capacitance: Farad, voltage: Volt) -> Var:
    """Qc = 2π · f · C · U²"""
    return 2.0 * np.pi * frequency * capacitance * voltage**2


@formula(
    "Qc",
    "{Qn} · ({U} / {Un})² · {f} / {fn}",
    source=SCALING,
    validity="sinusoidal voltage",
    rated_power="Qn",
    voltage="U",
    rated_voltage="Un",
    frequency="f",
    rated_frequency="fn",
)
def capacitor_power_elsewhere(
    *, rated_power: Var, voltage: Volt, rated_voltage: Volt, frequency: Hertz, rated_frequency: Hertz
) -> Var:
    """Qc = Qn · (U / Un)² · f / fn"""
    return rated_power * (voltage / rated_voltage) ** 2 * frequency / rated_frequency


@formula(
    "I",
    "{I1} · √(Σ ({h} · {u})²)",
    source=STRESS,
    validity="orders and their voltages as shares of the fundamental, 1 included",
    fundamental_current="I1",
    orders="h",
    voltage_shares="u",
)
def capacitor_harmonic_current(
    *, fundamental_current: Ampere, orders: tuple[Ratio, ...], voltage_shares: tuple[Ratio, ...]
) -> Ampere:
    """I = I1 · √(Σ (h · u)²)"""
    squares = sum((order * share) ** 2 for order, share in zip(orders, voltage_shares, strict=True))
    return fundamental_current * np.sqrt(squares)


@formula(
    "Uc",
    "{U} / (1 − {p})",
    source=DETUNED,
    validity="at the fundamental; p is reactor over capacitor reactance",
    voltage="U",
    detuning="p",
)
def detuned_capacitor_voltage(*, voltage: Volt, detuning: Ratio) -> Volt:
    """Uc = U / (1 − p)"""
    return voltage / (1.0 - detuning)


@formula(
    "h",
    "1 / √({p})",
    source=DETUNED,
    validity="multiple of the fundamental at which reactor and capacitor in series resonate",
    detuning="p",
)
def tuning_order(*, detuning: Ratio) -> Ratio:
    """h = 1 / √p"""
    return 1.0 / np.sqrt(detuning)


@formula(
    "f0",
    "1 / (2π · √({L} · {C}))",
    source=RESONANCE,
    validity="series circuit, or parallel with little loss",
    inductance="L",
    capacitance="C",
)
def resonance_frequency(*, inductance: Henry, capacitance: Farad) -> Hertz:
    """f0 = 1 / (2π · √(L · C))"""
    return 1.0 / (2.0 * np.pi * np.sqrt(inductance * capacitance))


@formula(
    "h",
    "√({Ss} / {Qc})",
    source=ORDER,
    validity="supply purely inductive, no damping by load",
    short_circuit_power="Ss",
    reactive_power="Qc",
)
def resonance_order(*, short_circuit_power: VoltAmpere, reactive_power: Var) -> Ratio:
    """h = √(Ss / Qc)"""
    return np.sqrt(short_circuit_power / reactive_power)


@formula(
    "R",
    "{t} / ({k} · {C} · ln(√2 · {Un} / {Ur}))",
    source=DISCHARGE,
    validity="k is 1 for three resistors in delta, 3 for two resistors in open delta",
    time="t",
    connection="k",
    capacitance="C",
    voltage="Un",
    residual_voltage="Ur",
)
def discharge_resistance(*, time: Second, connection: Ratio, capacitance: Farad, voltage: Volt, residual_voltage: Volt) -> Ohm:
    """R = t / (k · C · ln(√2 · Un / Ur))"""
    return time / (connection * capacitance * np.log(math.sqrt(2.0) * voltage / residual_voltage))


@formula(
    "t",
    "{k} · {R} · {C} · ln(√2 · {Un} / {Ur})",
    source=DISCHARGE,
    validity="k is 1 for three resistors in delta, 3 for two resistors in open delta",
    connection="k",
    resistance="R",
    capacitance="C",
    voltage="Un",
    residual_voltage="Ur",
)
def discharge_time(*, connection: Ratio, resistance: Ohm, capacitance: Farad, voltage: Volt, residual_voltage: Volt) -> Second:
    """t = k · R · C · ln(√2 · Un / Ur)"""
    return connection * resistance * capacitance * np.log(math.sqrt(2.0) * voltage / residual_voltage)


@formula(
    "Qc",
    "{s} · √3 · {U} · {I0}",
    source=TERMINALS,
    validity="three-phase motor, voltage between lines, measured no-load current",
    share="s",
    voltage="U",
    no_load_current="I0",
)
def largest_terminal_correction(*, share: Ratio, voltage: Volt, no_load_current: Ampere) -> Var:
    """Qc = s · √3 · U · I0"""
    return share * math.sqrt(3.0) * voltage * no_load_current


@formula(
    "Is",
    "{I} · {cosφ1} / {cosφ2}",
    source=OVERLOAD,
    validity="relay upstream of a capacitor at the motor terminals",
    setting="I",
    power_factor_before="cosφ1",
    power_factor_after="cosφ2",
)
def overload_setting(*, setting: Ampere, power_factor_before: Ratio, power_factor_after: Ratio) -> Ampere:
    """Is = I · cosφ1 / cosφ2"""
    return setting * power_factor_before / power_factor_after
