"""A coil with an iron core: winding resistance in series, core loss as a resistance beside the inductance."""

from __future__ import annotations

from typing import cast

import numpy as np

from circuitlint.physics.formula import formula
from circuitlint.si import Ampere, ComplexAmpere, ComplexOhm, ComplexVolt, Ohm, Ratio, Volt, Watt
from circuitlint.sources import Source

SEPARATION = Source("wattmeter reading less winding loss is core loss", known="common practice")
MODEL = Source("winding resistance in series with inductance and core resistance in parallel", known="derived")
CONVERSION = Source("equal impedance of series and parallel form", known="derived")


@formula(
    "Pc",
    "{P} − {I}² · {R}",
    source=SEPARATION,
    validity="resistance at the winding's temperature",
    power="P",
    current="I",
    resistance="R",
)
def core_power(*, power: Watt, current: Ampere, resistance: Ohm) -> Watt:
    """Pc = P − I² · R"""
    return power - current**2 * resistance


@formula("Uc", "|{U} − {I} · {R}|", source=SEPARATION, validity="rms phasors", voltage="U", current="I", resistance="R")
def core_voltage(*, voltage: ComplexVolt, current: ComplexAmpere, resistance: Ohm) -> Volt:
    """Uc = |U − I · R|"""
    return np.abs(voltage - current * resistance)


@formula("Rp", "{Uc}² / {Pc}", source=SEPARATION, validity="one voltage and frequency", core_voltage="Uc", core_power="Pc")
def core_resistance(*, core_voltage: Volt, core_power: Watt) -> Ohm:
    """Rp = Uc² / Pc"""
    return core_voltage**2 / core_power


@formula(
    "Z",
    "{R} + 1 / (1 / {Rp} + 1 / (j · {X}))",
    source=MODEL,
    validity="one voltage and frequency",
    resistance="R",
    core_resistance="Rp",
    reactance="X",
)
def impedance_with_core(*, resistance: Ohm, core_resistance: Ohm, reactance: Ohm) -> ComplexOhm:
    """Z = R + 1 / (1 / Rp + 1 / (j · X))

    An infinite core resistance is a coil without core loss.
    """
    return cast("ComplexOhm", resistance + 1.0 / (1.0 / core_resistance - 1j / reactance))


@formula("Rp", "{Rs} · (1 + {Q}²)", source=CONVERSION, validity="one frequency", series_resistance="Rs", quality="Q")
def parallel_resistance_of(*, series_resistance: Ohm, quality: Ratio) -> Ohm:
    """Rp = Rs · (1 + Q²)"""
    return series_resistance * (1.0 + quality**2)


@formula("Xs", "{Xp} · {Q}² / (1 + {Q}²)", source=CONVERSION, validity="one frequency", parallel_reactance="Xp", quality="Q")
def series_reactance_of(*, parallel_reactance: Ohm, quality: Ratio) -> Ohm:
    """Xs = Xp · Q² / (1 + Q²)"""
    return parallel_reactance * quality**2 / (1.0 + quality**2)
