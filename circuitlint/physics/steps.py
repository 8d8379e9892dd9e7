"""Small steps that join one formula to the next on a calculation sheet."""

from __future__ import annotations

from typing import Any, cast

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


@formula("S", "|{S}|", source=_ALGEBRA, power="S")
def magnitude_of_power(*, power: ComplexVoltAmpere) -> VoltAmpere:
    """S = |S|"""
    return np.abs(power)


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


@formula("cosφ", "{P} / ({U} · {I})", source=Source("definition of the power factor", known="derived"), active_power="P",
         voltage="U", current="I")
def power_factor_of_plate(*, active_power: Watt, voltage: Volt, current: Ampere) -> Ratio:
    """cosφ = P / (U · I)"""
    return active_power / (voltage * current)


@formula("X", "{Q} · {R}", source=Source("definition of the quality factor", known="derived"), quality_factor="Q", resistance="R")
def reactance_of_quality(*, quality_factor: Ratio, resistance: Ohm) -> Ohm:
    """X = Q · R"""
    return quality_factor * resistance


@formula("R", "{U}² / {P}", source=Source("P = U² / R on direct current", known="derived"), voltage="U", power="P")
def resistance_of_power(*, voltage: Volt, power: Watt) -> Ohm:
    """R = U² / P"""
    return voltage**2 / power


def _core(impedance: Ohm, power_factor: Ratio, resistance: Ohm) -> Any:
    """Admittance of the core: what is left of the plate's impedance when the winding's resistance is taken out."""
    return 1.0 / (impedance * power_factor - resistance + 1j * impedance * np.sqrt(1.0 - power_factor**2))


@formula(
    "Rc", "1 / Re (1 / ({Z} · cosφ − {R} + j {Z} · sinφ)) with cosφ = {cosφ}",
    source=Source("series resistance of the winding, core resistance across the inductance", known="derived"),
    validity="plate power above the winding's own loss", impedance="Z", power_factor="cosφ", resistance="R",
)
def core_resistance_of_plate(*, impedance: Ohm, power_factor: Ratio, resistance: Ohm) -> Ohm:
    """Rc = 1 / Re (1 / (Z · cosφ − R + j Z · sinφ))

    NaN where the plate's power is not above the winding's loss.
    """
    conductance = np.real(_core(impedance, power_factor, resistance))
    return np.where(conductance > 0.0, 1.0 / np.where(conductance > 0.0, conductance, 1.0), np.nan)


@formula(
    "X", "−1 / Im (1 / ({Z} · cosφ − {R} + j {Z} · sinφ)) with cosφ = {cosφ}",
    source=Source("series resistance of the winding, core resistance across the inductance", known="derived"),
    validity="plate power above the winding's own loss", impedance="Z", power_factor="cosφ", resistance="R",
)
def core_reactance_of_plate(*, impedance: Ohm, power_factor: Ratio, resistance: Ohm) -> Ohm:
    """X = −1 / Im (1 / (Z · cosφ − R + j Z · sinφ))"""
    reactance: Ohm = -1.0 / np.imag(_core(impedance, power_factor, resistance))
    return reactance


@formula(
    "Z", "{R} + 1 / (1 / {Rc} + 1 / (j {X}))",
    source=Source("T. R. Kuphaldt, Lessons in Electric Circuits vol. II (AC)", "ch. 5"),
    validity="core loss as a resistance across the inductance", resistance="R", core_resistance="Rc", reactance="X",
)
def impedance_with_core(*, resistance: Ohm, core_resistance: Ohm, reactance: Ohm) -> ComplexOhm:
    """Z = R + 1 / (1 / Rc + 1 / (j X))"""
    admittance: Any = 1.0 / core_resistance - 1j / np.asarray(reactance)
    impedance: ComplexOhm = resistance + 1.0 / admittance
    return impedance


@formula("Pc", "{P} − {I}² · {R}", source=Source("what the winding does not lose, the core does", known="derived"),
         active_power="P", current="I", resistance="R")
def core_loss(*, active_power: Watt, current: Ampere, resistance: Ohm) -> Watt:
    """Pc = P − I² · R"""
    return active_power - current**2 * resistance


@formula("Z", "{Z} / {n}", source=Source("equal parts in parallel", known="derived"), impedance="Z", count="n")
def impedance_of_several(*, impedance: ComplexOhm, count: Ratio) -> ComplexOhm:
    """Z = Z / n"""
    one: Any = impedance
    several: ComplexOhm = one / count
    return several


@formula("P", "{P} / {η}", source=Source("electrical input = shaft power over efficiency", known="common practice"),
         shaft_power="P", efficiency="η")
def electrical_input(*, shaft_power: Watt, efficiency: Ratio) -> Watt:
    """P = P / η"""
    return shaft_power / efficiency


@formula("S", "{P} / {cosφ}", source=Source("definition of the power factor", known="derived"), active_power="P",
         power_factor="cosφ")
def apparent_of_active(*, active_power: Watt, power_factor: Ratio) -> VoltAmpere:
    """S = P / cosφ"""
    return active_power / power_factor


@formula(
    "Z", "{U}² / {S} · (cosφ + j sinφ) with cosφ = {cosφ}",
    source=Source("Z = U² / conj S", known="derived"), validity="constant power at the voltage it settles at", voltage="U",
    apparent_power="S", power_factor="cosφ",
)
def impedance_of_demand(*, voltage: Volt, apparent_power: VoltAmpere, power_factor: Ratio) -> ComplexOhm:
    """Z = U² / S · (cosφ + j sinφ)"""
    turn: Any = power_factor + 1j * np.sqrt(1.0 - power_factor**2)
    impedance: ComplexOhm = voltage**2 / apparent_power * turn
    return impedance


@formula("I", "{S} / {U}", source=Source("definition of apparent power", known="derived"), apparent_power="S", voltage="U")
def current_of_demand(*, apparent_power: VoltAmpere, voltage: Volt) -> Ampere:
    """I = S / U"""
    return apparent_power / voltage


@formula("S", "{k} · {S}", source=Source("locked-rotor demand goes with locked-rotor current", known="common practice"),
         apparent_power="S", ratio="k")
def starting_demand(*, apparent_power: VoltAmpere, ratio: Ratio) -> VoltAmpere:
    """S = k · S"""
    return ratio * apparent_power


@formula("I/Iz", "{I} / {Iz}", source=Source("IEC 60364-4-43", "433.1, current within the ampacity", known="value from memory"),
         validity="steady current, ampacity corrected for ambient and grouping", current="I", ampacity="Iz")
def share_of_ampacity(*, current: Ampere, ampacity: Ampere) -> Ratio:
    """I/Iz = I / Iz"""
    return current / ampacity


@formula(
    "Z", "{U}² / {S} · (cosφ + j sinφ) with cosφ = {cosφ}, {U} above {Ur} / 2",
    source=Source("Z = U² / conj S", known="derived"),
    validity="constant power at the voltage it settles at; below half the rated voltage a motor stalls", voltage="U",
    rated_voltage="Ur", apparent_power="S", power_factor="cosφ",
)
def impedance_of_running_motor(
    *, voltage: Volt, rated_voltage: Volt, apparent_power: VoltAmpere, power_factor: Ratio
) -> ComplexOhm:
    """Z = U² / S · (cosφ + j sinφ)

    NaN where the voltage falls below half of the rated one: there is no running point.
    """
    turn: Any = power_factor + 1j * np.sqrt(1.0 - power_factor**2)
    running: Any = np.where(voltage > 0.5 * rated_voltage, voltage, np.nan)
    impedance: ComplexOhm = running**2 / apparent_power * turn
    return impedance


@formula("U/Ur", "{U} / {Ur}", source=Source("voltage over the rated one", known="derived"), voltage="U", rated_voltage="Ur")
def share_of_rated_voltage(*, voltage: Volt, rated_voltage: Volt) -> Ratio:
    """U/Ur = U / Ur"""
    return voltage / rated_voltage
