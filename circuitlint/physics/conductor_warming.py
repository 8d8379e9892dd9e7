"""How fast a conductor warms: a lower bound from the metal alone."""

from __future__ import annotations

import numpy as np

from circuitlint.physics.dimensions import JoulePerKelvinCubicMetre, OhmMetre
from circuitlint.physics.formula import formula
from circuitlint.si import Ampere, Celsius, Second, SquareMetre
from circuitlint.sources import Source

BARE = Source(
    "heat of the metal over heat given off at the tabled current",
    known="derived",
    note="insulation makes it 1.5 to 6 times longer for small wires: common practice",
)
EXPONENTIAL = Source("one heat capacity behind one thermal resistance", known="derived")


@formula(
    "T",
    "({ϑm} − {ϑ0}) · {Q} · {S}² / ({ρ} · {Iz}²)",
    source=BARE,
    validity="a lower bound: the metal alone",
    highest_temperature="ϑm",
    reference_ambient="ϑ0",
    volumetric_heat="Q",
    section="S",
    hot_resistivity="ρ",
    ampacity="Iz",
)
def shortest_time_constant(
    *,
    highest_temperature: Celsius,
    reference_ambient: Celsius,
    volumetric_heat: JoulePerKelvinCubicMetre,
    section: SquareMetre,
    hot_resistivity: OhmMetre,
    ampacity: Ampere,
) -> Second:
    """T = (ϑm − ϑ0) · Q · S² / (ρ · Iz²)"""
    span = highest_temperature - reference_ambient
    return span * volumetric_heat * section**2 / (hot_resistivity * ampacity**2)


@formula(
    "ϑ",
    "{ϑe} − ({ϑe} − {ϑi}) · exp(−{t} / {T})",
    source=EXPONENTIAL,
    validity="one time constant",
    time="t",
    initial="ϑi",
    final="ϑe",
    time_constant="T",
)
def temperature_after(*, time: Second, initial: Celsius, final: Celsius, time_constant: Second) -> Celsius:
    """ϑ = ϑe − (ϑe − ϑi) · exp(−t / T)"""
    return final - (final - initial) * np.exp(-time / time_constant)
