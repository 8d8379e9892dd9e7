"""A coil with an iron core: winding resistance in series, core loss as a resistance beside the inductance."""

from __future__ import annotations

import numpy as np

from circuitlint.physics.formula import formula
from circuitlint.si import Ampere, ComplexAmpere, ComplexVolt, Ohm, Ratio, Volt, Watt
from circuitlint.sources import Source

SEPARATION = Source("wattmeter reading less winding loss is core loss", known="common practice")
CONVERSION = Source("equal impedance of series and parallel form", known="derived")


@formula("Rs", "{P} / {I}²", source=SEPARATION, validity="winding and core together, in series form", active_power="P",
         current="I")
def series_resistance_of_loss(*, active_power: Watt, current: Ampere) -> Ohm:
    """Rs = P / I²"""
    return active_power / current**2


@formula("Uc", "|{U} − {I} · {R}|", source=SEPARATION, validity="rms phasors", voltage="U", current="I", resistance="R")
def core_voltage(*, voltage: ComplexVolt, current: ComplexAmpere, resistance: Ohm) -> Volt:
    """Uc = |U − I · R|"""
    return np.abs(voltage - current * resistance)


@formula("Rp", "{Uc}² / {Pc}", source=SEPARATION, validity="one voltage and frequency", core_voltage="Uc", core_power="Pc")
def core_resistance(*, core_voltage: Volt, core_power: Watt) -> Ohm:
    """Rp = Uc² / Pc"""
    return core_voltage**2 / core_power


@formula("Rp", "{Rs} · (1 + {Q}²)", source=CONVERSION, validity="one frequency", series_resistance="Rs", quality="Q")
def parallel_resistance_of(*, series_resistance: Ohm, quality: Ratio) -> Ohm:
    """Rp = Rs · (1 + Q²)"""
    return series_resistance * (1.0 + quality**2)


@formula("Xs", "{Xp} · {Q}² / (1 + {Q}²)", source=CONVERSION, validity="one frequency", parallel_reactance="Xp", quality="Q")
def series_reactance_of(*, parallel_reactance: Ohm, quality: Ratio) -> Ohm:
    """Xs = Xp · Q² / (1 + Q²)"""
    return parallel_reactance * quality**2 / (1.0 + quality**2)
