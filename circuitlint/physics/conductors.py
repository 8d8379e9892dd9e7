"""Resistance and reactance of a run of cable, and the voltage lost along it."""

from __future__ import annotations

import numpy as np

from circuitlint.physics.formula import formula
from circuitlint.si import Ampere, Celsius, Hertz, Kelvin, Metre, Ohm, OhmPerMetre, Radian, Ratio, Volt
from circuitlint.sources import Source

RESISTANCE_METHOD = Source("IEC 60287-1-1", "2.1, R at temperature from R at 20 °C", known="value from memory")
ANNEX_G = Source("IEC 60364-5-52", "annex G", "2009")
GEOMETRY = Source("a run has as many conductors in series as the current flows through", known="common practice")


@formula("R'", "{R20} · ({B} + {ϑ}) / ({B} + 20)", source=RESISTANCE_METHOD, validity="copper and aluminium, 0 to 200 °C",
         resistance_per_length_20="R20", temperature="ϑ", inferred_zero="B")
def conductor_resistance_at(
    *, resistance_per_length_20: OhmPerMetre, temperature: Celsius, inferred_zero: Kelvin
) -> OhmPerMetre:
    """R' = R20 · (B + ϑ) / (B + 20)"""
    return resistance_per_length_20 * (inferred_zero + temperature) / (inferred_zero + 20.0)


@formula("R", "{b} · {l} · {R'}", source=GEOMETRY, validity="conductors of one section", resistance_per_length="R'", length="l",
         conductors="b")
def run_resistance(*, resistance_per_length: OhmPerMetre, length: Metre, conductors: Ratio) -> Ohm:
    """R = b · l · R'"""
    return conductors * length * resistance_per_length


@formula("X", "{b} · {l} · {X'}", source=GEOMETRY, validity="conductors laid together", reactance_per_length="X'", length="l",
         conductors="b")
def run_reactance(*, reactance_per_length: OhmPerMetre, length: Metre, conductors: Ratio) -> Ohm:
    """X = b · l · X'"""
    return conductors * length * reactance_per_length


@formula("X'", "{X'0} · {f} / {f0}", source=Source("X = 2π · f · L", known="derived"), validity="no iron around the conductors",
         reactance_per_length="X'0", frequency="f", tabled_frequency="f0")
def reactance_at_frequency(*, reactance_per_length: OhmPerMetre, frequency: Hertz, tabled_frequency: Hertz) -> OhmPerMetre:
    """X' = X'0 · f / f0"""
    return reactance_per_length * frequency / tabled_frequency


@formula("ΔU", "{U1} − {U2}", source=ANNEX_G, validity="difference of magnitudes, not the phasor along the cable", sending="U1",
         receiving="U2")
def voltage_drop(*, sending: Volt, receiving: Volt) -> Volt:
    """ΔU = U1 − U2"""
    return sending - receiving


@formula("ΔU/Un", "{ΔU} / {Un}", source=ANNEX_G, drop="ΔU", nominal="Un")
def drop_share(*, drop: Volt, nominal: Volt) -> Ratio:
    """ΔU/Un = ΔU / Un"""
    return drop / nominal


@formula("ΔU", "{I} · ({R} · cos {φ} + {X} · sin {φ})", source=ANNEX_G, validity="first order; drops below about 5 %",
         current="I", resistance="R", reactance="X", angle="φ")
def first_order_drop(*, current: Ampere, resistance: Ohm, reactance: Ohm, angle: Radian) -> Volt:
    """ΔU = I · (R · cos φ + X · sin φ)"""
    return current * (resistance * np.cos(angle) + reactance * np.sin(angle))
