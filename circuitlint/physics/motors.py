"""Small motors: running current, locked rotor, the dip while starting."""

from __future__ import annotations

import math

from circuitlint.physics.formula import formula
from circuitlint.si import Ampere, ComplexOhm, ComplexVolt, Ohm, Ratio, Volt, VoltAmpere, Watt
from circuitlint.sources import Source

RATED = Source("electrical input = shaft power over efficiency", known="common practice")
CODE_LETTER = Source("NEC", "table 430.7(B)")
DIVIDER = Source("voltage divider of source and motor impedance", known="derived")
TORQUE = Source("torque of an induction motor goes with the square of its voltage", known="common practice")


@formula(
    "I",
    "{P} / ({η} · {cosφ} · {U})",
    source=RATED,
    validity="single-phase",
    shaft_power="P",
    efficiency="η",
    power_factor="cosφ",
    voltage="U",
)
def motor_current(*, shaft_power: Watt, efficiency: Ratio, power_factor: Ratio, voltage: Volt) -> Ampere:
    """I = P / (η · cosφ · U)"""
    return shaft_power / (efficiency * power_factor * voltage)


@formula(
    "I",
    "{P} / (√3 · {η} · {cosφ} · {U})",
    source=RATED,
    validity="three-phase, voltage between lines",
    shaft_power="P",
    efficiency="η",
    power_factor="cosφ",
    voltage="U",
)
def motor_current_three_phase(*, shaft_power: Watt, efficiency: Ratio, power_factor: Ratio, voltage: Volt) -> Ampere:
    """I = P / (√3 · η · cosφ · U)"""
    return shaft_power / (math.sqrt(3.0) * efficiency * power_factor * voltage)


@formula(
    "S",
    "{k} · {n}",
    source=CODE_LETTER,
    validity="upper end of the code letter's band",
    power_per_horsepower="k",
    horsepower="n",
)
def locked_rotor_power(*, power_per_horsepower: VoltAmpere, horsepower: Ratio) -> VoltAmpere:
    """S = k · n"""
    return power_per_horsepower * horsepower


@formula(
    "I",
    "{S} / (√3 · {U})",
    source=CODE_LETTER,
    validity="three-phase, voltage between lines",
    apparent_power="S",
    voltage="U",
)
def three_phase_current(*, apparent_power: VoltAmpere, voltage: Volt) -> Ampere:
    """I = S / (√3 · U)"""
    return apparent_power / (math.sqrt(3.0) * voltage)


@formula("I", "{S} / {U}", source=CODE_LETTER, validity="single-phase", apparent_power="S", voltage="U")
def single_phase_current(*, apparent_power: VoltAmpere, voltage: Volt) -> Ampere:
    """I = S / U"""
    return apparent_power / voltage


@formula(
    "Z",
    "{U} / (√3 · {I})",
    source=DIVIDER,
    validity="three-phase, locked rotor, one phase of a star",
    voltage="U",
    current="I",
)
def locked_rotor_impedance(*, voltage: Volt, current: Ampere) -> Ohm:
    """Z = U / (√3 · I)"""
    return voltage / (math.sqrt(3.0) * current)


@formula(
    "Um",
    "{U} · {Zm} / ({Zm} + {Zs})",
    source=DIVIDER,
    validity="locked-rotor impedance that does not change with voltage",
    voltage="U",
    motor_impedance="Zm",
    source_impedance="Zs",
)
def starting_voltage(*, voltage: ComplexVolt, motor_impedance: ComplexOhm, source_impedance: ComplexOhm) -> ComplexVolt:
    """Um = U · Zm / (Zm + Zs)"""
    return voltage * motor_impedance / (motor_impedance + source_impedance)


@formula("M/Mr", "({U} / {Ur})²", source=TORQUE, validity="same slip and frequency", voltage="U", rated_voltage="Ur")
def torque_ratio(*, voltage: Volt, rated_voltage: Volt) -> Ratio:
    """M/Mr = (U / Ur)²"""
    return (voltage / rated_voltage) ** 2


@formula(
    "I",
    "√3 · {If}",
    source=Source("T. R. Kuphaldt, Lessons in Electric Circuits vol. II (AC)", "ch. 10"),
    validity="balanced delta",
    phase_current="If",
)
def line_current_of_delta(*, phase_current: Ampere) -> Ampere:
    """I = √3 · If"""
    return math.sqrt(3.0) * phase_current
