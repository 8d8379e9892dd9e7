"""How warm a winding runs, and what that does to its resistance."""

from __future__ import annotations

import numpy as np

from circuitlint.physics.formula import formula
from circuitlint.si import Ampere, Celsius, Kelvin, KelvinPerWatt, Ohm, Ratio, Volt, Watt
from circuitlint.sources import Source

BY_RESISTANCE = Source("IEC 60034-1", "temperature rise by the resistance method", known="value from memory",
                       note="the same form stands in relay makers' technical pages, read")
THERMAL_OHM = Source("a winding's mean rise is proportional to its loss", known="common practice")


@formula("Rϑ", "{R} · ({k} + {ϑ}) / ({k} + {ϑ1})", source=BY_RESISTANCE, validity="copper and aluminium, up to about 200 °C",
         resistance="R", temperature="ϑ", reference_temperature="ϑ1", inferred_zero="k")
def winding_resistance_at(
    *, resistance: Ohm, temperature: Celsius, reference_temperature: Celsius, inferred_zero: Kelvin
) -> Ohm:
    """Rϑ = R · (k + ϑ) / (k + ϑ1)"""
    return resistance * (inferred_zero + temperature) / (inferred_zero + reference_temperature)


@formula("ϑ2", "{R2} / {R1} · ({k} + {ϑ1}) − {k}", source=BY_RESISTANCE, validity="a mean over the winding; hot spots lie above",
         hot_resistance="R2", cold_resistance="R1", cold_temperature="ϑ1", inferred_zero="k")
def winding_temperature_from_resistance(
    *, hot_resistance: Ohm, cold_resistance: Ohm, cold_temperature: Celsius, inferred_zero: Kelvin
) -> Celsius:
    """ϑ2 = R2 / R1 · (k + ϑ1) − k"""
    return hot_resistance / cold_resistance * (inferred_zero + cold_temperature) - inferred_zero


@formula("Δϑ", "{Rth} · {P}", source=THERMAL_OHM, validity="steady state", loss="P", thermal_resistance="Rth")
def winding_rise(*, loss: Watt, thermal_resistance: KelvinPerWatt) -> Kelvin:
    """Δϑ = Rth · P"""
    return thermal_resistance * loss


@formula("Rth", "{Δϑ} / {P}", source=THERMAL_OHM, validity="rise and loss of one steady state", rise="Δϑ", loss="P")
def thermal_resistance(*, rise: Kelvin, loss: Watt) -> KelvinPerWatt:
    """Rth = Δϑ / P"""
    return rise / loss


@formula(
    "Δϑ", "(√(a² + 4 · {Rth} · {U}² · ({k} + 20) / {R20}) − a) / 2 with a = {k} + {ϑa}",
    source=Source("I = U / R(ϑ) and Δϑ = Rth · U · I solved for Δϑ", known="derived"),
    validity="a winding on a stiff voltage, without reactance", thermal_resistance="Rth", voltage="U", resistance_20="R20",
    ambient="ϑa", inferred_zero="k",
)
def rise_on_voltage(
    *, thermal_resistance: KelvinPerWatt, voltage: Volt, resistance_20: Ohm, ambient: Celsius, inferred_zero: Kelvin
) -> Kelvin:
    """Δϑ = (√(a² + 4 · Rth · U² · (k + 20) / R20) − a) / 2 with a = k + ϑa"""
    start = inferred_zero + ambient
    drive = thermal_resistance * voltage**2 * (inferred_zero + 20.0) / resistance_20
    return (np.sqrt(start**2 + 4.0 * drive) - start) / 2.0


@formula(
    "G", "{Rth} · {I}² · {R20} / ({k} + 20)",
    source=Source("gain of the loop rise, resistance, loss, rise of a winding on a stiff current", known="derived"),
    validity="the winding runs away where G is 1 or more", thermal_resistance="Rth", current="I", resistance_20="R20",
    inferred_zero="k",
)
def runaway_gain(
    *, thermal_resistance: KelvinPerWatt, current: Ampere, resistance_20: Ohm, inferred_zero: Kelvin
) -> Ratio:
    """G = Rth · I² · R20 / (k + 20)"""
    return thermal_resistance * current**2 * resistance_20 / (inferred_zero + 20.0)


@formula("Δϑ", "{G} · ({k} + {ϑa}) / (1 − {G})",
         source=Source("Δϑ = G · (k + ϑa + Δϑ) solved for Δϑ", known="derived"), validity="G below 1", gain="G", ambient="ϑa",
         inferred_zero="k")
def rise_on_current(*, gain: Ratio, ambient: Celsius, inferred_zero: Kelvin) -> Kelvin:
    """Δϑ = G · (k + ϑa) / (1 − G)

    NaN where the winding runs away.
    """
    left = 1.0 - gain
    return np.where(left > 0.0, gain * (inferred_zero + ambient) / np.where(left > 0.0, left, 1.0), np.nan)
