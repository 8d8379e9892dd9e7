"""Dimensions that only the formulas need: constants of metals and contacts, flux linkage, withstand of conductors."""

from __future__ import annotations

from typing import Annotated, TypeAlias

from circuitlint.si import TIME_PER_POWER, WITHSTAND, Dimension, Real

RESISTIVITY = Dimension("resistivity", "ohm * meter", "Ω·m", ("1.7241e-8 ohm m",))
VOLUMETRIC_HEAT = Dimension("heat by volume", "joule / kelvin / meter ** 3", "J/(K·m³)", ("3.45e6 J/(K m3)",))
FLUX_LINKAGE = Dimension("flux linkage", "weber", "Wb", ("0.2 Wb",), signed=True)

OhmMetre: TypeAlias = Annotated[Real, RESISTIVITY]
JoulePerKelvinCubicMetre: TypeAlias = Annotated[Real, VOLUMETRIC_HEAT]
AmpereRootSecondPerSquareMetre: TypeAlias = Annotated[Real, WITHSTAND]
SecondPerWatt: TypeAlias = Annotated[Real, TIME_PER_POWER]
Weber: TypeAlias = Annotated[Real, FLUX_LINKAGE]
