"""A resistor and a capacitor in series as suppressor across a coil or a contact."""

from __future__ import annotations

import math

import numpy as np

from circuitlint.physics.formula import formula
from circuitlint.si import Ampere, Farad, Henry, Hertz, Ohm, Volt, Watt
from circuitlint.sources import Source

BALANCE = Source("energy of inductance and capacitance at opening goes into the capacitance", known="derived")
FIRST_STEP = Source("the current at opening commutes into the resistor", known="derived")
CLOSING = Source("an empty capacitor is a short circuit at closing", known="derived")
STEADY = Source("alternating current through a capacitor", known="derived")


@formula(
    "Up",
    "√({U0}² + {I0}² · {L} / {C})",
    source=BALANCE,
    validity="a bound: losses are left out",
    initial_voltage="U0",
    current="I0",
    inductance="L",
    capacitance="C",
)
def capacitor_peak(*, initial_voltage: Volt, current: Ampere, inductance: Henry, capacitance: Farad) -> Volt:
    """Up = √(U0² + I0² · L / C)"""
    return np.sqrt(initial_voltage**2 + current**2 * inductance / capacitance)


@formula("U", "{I0} · {Rs}", source=FIRST_STEP, validity="at the instant of opening", current="I0", series_resistance="Rs")
def opening_step(*, current: Ampere, series_resistance: Ohm) -> Volt:
    """U = I0 · Rs"""
    return current * series_resistance


@formula(
    "ip",
    "√2 · {U} / {Rs}",
    source=CLOSING,
    validity="closed at the crest of an rms voltage",
    voltage="U",
    series_resistance="Rs",
)
def closing_peak(*, voltage: Volt, series_resistance: Ohm) -> Ampere:
    """ip = √2 · U / Rs"""
    return math.sqrt(2.0) * voltage / series_resistance


@formula(
    "I",
    "2π · {f} · {C} · {U}",
    source=STEADY,
    validity="series resistance far below the reactance",
    frequency="f",
    capacitance="C",
    voltage="U",
)
def leakage_current(*, frequency: Hertz, capacitance: Farad, voltage: Volt) -> Ampere:
    """I = 2π · f · C · U"""
    return 2.0 * np.pi * frequency * capacitance * voltage


@formula(
    "P",
    "(2π · {f} · {C} · {U})² · {Rs}",
    source=STEADY,
    validity="series resistance far below the reactance",
    frequency="f",
    capacitance="C",
    voltage="U",
    series_resistance="Rs",
)
def series_resistor_loss(*, frequency: Hertz, capacitance: Farad, voltage: Volt, series_resistance: Ohm) -> Watt:
    """P = (2π · f · C · U)² · Rs"""
    return (2.0 * np.pi * frequency * capacitance * voltage) ** 2 * series_resistance
