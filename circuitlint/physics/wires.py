"""Resistance, reactance and capacitance of a wire from its geometry, and the skin effect."""

from __future__ import annotations

import numpy as np

from circuitlint.physics.dimensions import OhmMetre
from circuitlint.physics.formula import formula
from circuitlint.si import FaradPerMetre, Hertz, Metre, OhmPerMetre, Ratio, SquareMetre
from circuitlint.sources import Source

GAUGE = Source(
    "ASTM B258",
    "formula of the American wire gauge",
    known="value from memory",
    note="gives the solid column of NEC chapter 9, table 8, read, within 0.4 %",
)
MIL = Source("circular mil: area of a circle of one mil diameter, one mil being 25.4 µm", known="derived")
RESISTIVITY = Source("definition of resistivity", known="derived")
INDUCTANCE = Source(
    "technical page on cable inductance", "L = K + 0.2 · ln(2s / d) mH/km", note="K is 0.05 for a solid round wire"
)
CAPACITANCE = Source("technical page on cable capacitance", "screened core")
SKIN = Source("IEC 60287-1-1", "skin effect", known="value from memory", note="argument of the formula read")


@formula("d", "0.127e-3 · 92^((36 − {n}) / 39)", source=GAUGE, validity="m; sizes 1/0 to 4/0 are n = 0 to −3", gauge="n")
def gauge_diameter(*, gauge: Ratio) -> Metre:
    """d = 0.127e-3 · 92^((36 − n) / 39)"""
    return 0.127e-3 * 92.0 ** ((36.0 - gauge) / 39.0)


@formula("A", "π / 4 · {d}²", source=Source("area of a circle", known="derived"), validity="solid round wire", diameter="d")
def wire_area(*, diameter: Metre) -> SquareMetre:
    """A = π / 4 · d²"""
    return np.pi / 4.0 * diameter**2


@formula("A", "π / 4 · 25.4e-6² · 1000 · {n}", source=MIL, validity="m²; n in thousands of circular mils", thousands="n")
def area_of_circular_mils(*, thousands: Ratio) -> SquareMetre:
    """A = π / 4 · 25.4e-6² · 1000 · n"""
    return np.pi / 4.0 * 25.4e-6**2 * 1000.0 * thousands


@formula(
    "R'",
    "{ρ} / {A}",
    source=RESISTIVITY,
    validity="direct current; area of metal, not the nominal section",
    resistivity="ρ",
    area="A",
)
def resistance_of_area(*, resistivity: OhmMetre, area: SquareMetre) -> OhmPerMetre:
    """R' = ρ / A"""
    return resistivity / area


@formula(
    "X'",
    "2π · {f} · 2e-7 · (ln(2 · {s} / {d}) + 1 / 4)",
    source=INDUCTANCE,
    validity="one of two or three like round wires, no iron near; spacing between axes",
    frequency="f",
    spacing="s",
    diameter="d",
)
def reactance_of_spacing(*, frequency: Hertz, spacing: Metre, diameter: Metre) -> OhmPerMetre:
    """X' = 2π · f · 2e-7 · (ln(2 · s / d) + 1 / 4)"""
    return 2.0 * np.pi * frequency * 2e-7 * (np.log(2.0 * spacing / diameter) + 0.25)


@formula(
    "C'",
    "1e-9 / 18 · {ε} / ln({D} / {d})",
    source=CAPACITANCE,
    validity="screened core, homogeneous insulation",
    permittivity="ε",
    outer_diameter="D",
    diameter="d",
)
def capacitance_of_screened_core(*, permittivity: Ratio, outer_diameter: Metre, diameter: Metre) -> FaradPerMetre:
    """C' = 1e-9 / 18 · ε / ln(D / d)"""
    return 1e-9 / 18.0 * permittivity / np.log(outer_diameter / diameter)


@formula(
    "x",
    "√(8π · {f} · 1e-7 · {ks} / {R'})",
    source=SKIN,
    validity="R' hot; ks is 1 for round conductors",
    frequency="f",
    shape="ks",
    resistance_per_length="R'",
)
def skin_argument(*, frequency: Hertz, shape: Ratio, resistance_per_length: OhmPerMetre) -> Ratio:
    """x = √(8π · f · 1e-7 · ks / R')"""
    return np.sqrt(8.0 * np.pi * frequency * 1e-7 * shape / resistance_per_length)


@formula(
    "R~/R",
    "1 + {x}⁴ / (192 + 0.8 · {x}⁴) to 2.8, 0.864 − 0.0177 · {x} + 0.0563 · {x}² to 3.8, 0.267 + 0.354 · {x} beyond",
    source=SKIN,
    validity="within 0.6 % of the exact solution for a solid round wire",
    argument="x",
)
def skin_effect(*, argument: Ratio) -> Ratio:
    """R~/R = 1 + x⁴ / (192 + 0.8 · x⁴) to 2.8, 0.864 − 0.0177 · x + 0.0563 · x² to 3.8, 0.267 + 0.354 · x beyond"""
    low = argument**4 / (192.0 + 0.8 * argument**4)
    middle = -0.136 - 0.0177 * argument + 0.0563 * argument**2
    high = 0.354 * argument - 0.733
    return 1.0 + np.where(argument <= 2.8, low, np.where(argument <= 3.8, middle, high))
