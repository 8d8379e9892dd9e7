"""What protection, contacts, cables and capacitors are held against: fault loops, shares of what is permitted."""

from __future__ import annotations

import numpy as np

from circuitlint.physics.formula import formula
from circuitlint.si import (
    Ampere,
    ComplexOhm,
    Farad,
    FaradPerMetre,
    Metre,
    Ohm,
    Ratio,
    Second,
    SquareMetre,
    Var,
    Volt,
)
from circuitlint.sources import Source

SQRT_2 = float(np.sqrt(2.0))
LOOP = Source("impedances of source, live and protective conductor in series", known="derived")
BEHIND = Source("magnitudes of impedances in the first quadrant add to at least the root of their squares", known="derived")
SHARE = Source("a figure over what is permitted", known="derived")
CORRECTION = Source("reactive power of the capacitors over what the load takes without them", known="derived")
CONTROL_CABLE = Source("capacitance between the two wires of a control cable goes with its length", known="common practice")
SUPPRESSED = Source("suppressors across inductive loads, opened at the crest of the supply", known="common practice")


@formula("Zr", "|{Z}| / {n} · (1 + {S} / {Sp})", source=LOOP, validity="both conductors of one metal at one temperature",
         impedance="Z", conductors="n", section="S", protective_section="Sp")
def loop_impedance_of_run(
    *, impedance: ComplexOhm, conductors: Ratio, section: SquareMetre, protective_section: SquareMetre
) -> Ohm:
    """Zr = |Z| / n · (1 + S / Sp)"""
    return np.abs(impedance) / conductors * (1.0 + section / protective_section)


@formula("Zs", "{Ze} + Σ {Zr}", source=LOOP, validity="magnitudes added: not below the true loop impedance",
         external="Ze", runs="Zr")
def fault_loop_impedance(*, external: Ohm, runs: tuple[Ohm, ...]) -> Ohm:
    """Zs = Ze + Σ Zr"""
    total = external
    for one in runs:
        total = total + one
    return total


@formula("Ik", "{U} / √(({U} / {I0})² + |{Z}|²)", source=BEHIND, validity="not below the true current behind the feeders",
         voltage="U", fault_current="I0", feeders="Z")
def fault_current_behind(*, voltage: Volt, fault_current: Ampere, feeders: ComplexOhm) -> Ampere:
    """Ik = U / √((U / I0)² + |Z|²)"""
    return voltage / np.sqrt((voltage / fault_current) ** 2 + np.abs(feeders) ** 2)


@formula("Qc", "−Σ {Q}", source=CORRECTION, validity="reactive power of each capacitor, negative where it gives", powers="Q")
def given_reactive_power(*, powers: tuple[Var, ...]) -> Var:
    """Qc = −Σ Q"""
    total = powers[0]
    for one in powers[1:]:
        total = total + one
    return -total


@formula("s", "{Qc} / ({Q} + {Qc})", source=CORRECTION, validity="above 1 the circuit leads", given="Qc", remaining="Q")
def correction_share(*, given: Var, remaining: Var) -> Ratio:
    """s = Qc / (Q + Qc)"""
    return given / (remaining + given)


@formula("C", "Σ ({c} · {l})", source=CONTROL_CABLE, validity="contact at one end, coil at the other", per_length="c",
         lengths="l")
def cable_capacitance(*, per_length: tuple[FaradPerMetre, ...], lengths: tuple[Metre, ...]) -> Farad:
    """C = Σ (c · l)"""
    total = per_length[0] * lengths[0]
    for one, length in zip(per_length[1:], lengths[1:], strict=True):
        total = total + one * length
    return total


@formula("C/Cm", "{C} / {Cm}", source=SHARE, validity="permitted capacitance above zero", capacitance="C", permitted="Cm")
def share_of_capacitance(*, capacitance: Farad, permitted: Farad) -> Ratio:
    """C/Cm = C / Cm"""
    return capacitance / permitted


@formula("Uh/U", "{Uh} / {U}", source=SHARE, validity="voltage at the coil's own terminals", pull_in_voltage="Uh", voltage="U")
def share_of_pull_in(*, pull_in_voltage: Volt, voltage: Volt) -> Ratio:
    """Uh/U = Uh / U"""
    return pull_in_voltage / voltage


@formula("t/Tm", "{t} / {Tm}", source=SHARE, validity="both to the same share of the settled current", time="t", proven="Tm")
def share_of_time(*, time: Second, proven: Second) -> Ratio:
    """t/Tm = t / Tm"""
    return time / proven


@formula("Up", "√2 · {U} + {Uc}", source=SUPPRESSED, validity="across the contact; the supply at its crest", supply="U",
         clamp_voltage="Uc")
def clamped_peak_alternating(*, supply: Volt, clamp_voltage: Volt) -> Volt:
    """Up = √2 · U + Uc"""
    return SQRT_2 * supply + clamp_voltage
