"""Small steps that join one formula to the next on a calculation sheet."""

from __future__ import annotations

from typing import cast

import numpy as np

from circuitlint.physics.formula import formula
from circuitlint.si import (
    Ampere,
    Celsius,
    ComplexAmpere,
    ComplexOhm,
    ComplexVolt,
    ComplexVoltAmpere,
    Henry,
    Joule,
    Kelvin,
    Ohm,
    Radian,
    Ratio,
    Var,
    Volt,
    VoltAmpere,
    Watt,
)
from circuitlint.sources import Source

_ALGEBRA = Source("definition of the quantity", known="derived")


@formula("R", "Re {Z}", source=_ALGEBRA, impedance="Z")
def resistance_part(*, impedance: ComplexOhm) -> Ohm:
    """R = Re Z"""
    return cast("Ohm", np.real(impedance))


@formula("X", "Im {Z}", source=_ALGEBRA, validity="positive where inductive, negative where capacitive", impedance="Z")
def reactance_part(*, impedance: ComplexOhm) -> Ohm:
    """X = Im Z"""
    return cast("Ohm", np.imag(impedance))


@formula("ϑ", "{ϑa} + {Δϑ}", source=_ALGEBRA, ambient="ϑa", rise="Δϑ")
def warmed_temperature(*, ambient: Celsius, rise: Kelvin) -> Celsius:
    """ϑ = ϑa + Δϑ"""
    return ambient + rise


@formula("I", "{U} / {Z}", source=Source("Ohm's law for rms magnitudes", known="derived"), voltage="U", impedance="Z")
def current_through(*, voltage: Volt, impedance: Ohm) -> Ampere:
    """I = U / Z"""
    return voltage / impedance


@formula(
    "I", "0 · {U}", source=Source("a capacitor passes no steady direct current", known="derived"),
    validity="once charged", voltage="U",
)
def blocked_current(*, voltage: Volt) -> Ampere:
    """I = 0"""
    return voltage * 0.0


@formula("U", "{U}", source=Source("branches in parallel share their voltage", known="derived"), voltage="U")
def shared_voltage(*, voltage: ComplexVolt) -> ComplexVolt:
    """U = U"""
    return voltage


@formula("I", "{I}", source=Source("parts in series share their current", known="derived"), current="I")
def shared_current(*, current: ComplexAmpere) -> ComplexAmpere:
    """I = I"""
    return current


@formula("U", "0 · {U}", source=Source("no current, no voltage across a closed part", known="derived"), voltage="U")
def no_voltage(*, voltage: ComplexVolt) -> ComplexVolt:
    """U = 0"""
    return voltage * 0.0


@formula("Z", "{R}", source=_ALGEBRA, resistance="R")
def resistive_impedance(*, resistance: Ohm) -> ComplexOhm:
    """Z = R"""
    return cast("ComplexOhm", resistance + 0j)


@formula("Z", "−j {X}", source=_ALGEBRA, reactance="X")
def capacitive_impedance(*, reactance: Ohm) -> ComplexOhm:
    """Z = −j X"""
    return cast("ComplexOhm", -1j * reactance)


@formula("Z", "|{Z}|", source=_ALGEBRA, impedance="Z")
def magnitude_of_impedance(*, impedance: ComplexOhm) -> Ohm:
    """Z = |Z|"""
    return np.abs(impedance)


@formula("φ", "arg {Z}", source=_ALGEBRA, validity="positive where the current lags", impedance="Z")
def angle_of_impedance(*, impedance: ComplexOhm) -> Radian:
    """φ = arg Z"""
    return np.angle(impedance)


@formula("Z", "{U} / {I}", source=Source("Ohm's law for rms magnitudes", known="derived"), voltage="U", current="I")
def impedance_from_current(*, voltage: Volt, current: Ampere) -> Ohm:
    """Z = U / I"""
    return voltage / current


@formula("Z", "{U}² / {S}", source=Source("S = U · I with I = U / Z", known="derived"), voltage="U", apparent_power="S")
def impedance_from_apparent_power(*, voltage: Volt, apparent_power: VoltAmpere) -> Ohm:
    """Z = U² / S"""
    return voltage**2 / apparent_power


@formula("P", "Re {S}", source=_ALGEBRA, power="S")
def active_part(*, power: ComplexVoltAmpere) -> Watt:
    """P = Re S"""
    return cast("Watt", np.real(power))


@formula("Q", "Im {S}", source=_ALGEBRA, validity="positive where the current lags", power="S")
def reactive_part(*, power: ComplexVoltAmpere) -> Var:
    """Q = Im S"""
    return cast("Var", np.imag(power))


@formula(
    "E", "{L} · {I}²", source=Source("E = L · i² / 2 at the crest i = √2 · I", known="derived"),
    validity="inductance that does not fall with current", inductance="L", current="I",
)
def stored_energy_at_crest(*, inductance: Henry, current: Ampere) -> Joule:
    """E = L · I²"""
    return inductance * current**2


@formula("U", "{U} ∠ 0", source=Source("the supply voltage is the reference of all angles", known="derived"), voltage="U")
def reference_phasor(*, voltage: Volt) -> ComplexVolt:
    """U = U ∠ 0"""
    return cast("ComplexVolt", voltage + 0j)


@formula(
    "I", "{It} · {kg}", source=Source("IEC 60364-5-52", "523, factors multiply", known="value from memory"),
    validity="at the reference ambient", tabled="It", grouping_factor="kg",
)
def grouped_ampacity(*, tabled: Ampere, grouping_factor: Ratio) -> Ampere:
    """I = It · kg"""
    return tabled * grouping_factor
