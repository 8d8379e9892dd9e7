"""Dimensions that only the formulas need: constants of metals and contacts, flux linkage, withstand of conductors."""

from __future__ import annotations

from typing import Annotated, TypeAlias

from circuitlint.si import Dimension, Real

RESISTIVITY = Dimension("resistivity", "ohm * meter", "Ω·m", ("1.7241e-8 ohm m",))
VOLUMETRIC_HEAT = Dimension("heat by volume", "joule / kelvin / meter ** 3", "J/(K·m³)", ("3.45e6 J/(K m3)",))
WITHSTAND = Dimension("adiabatic constant", "ampere * second ** 0.5 / meter ** 2", "A·√s/m²", ("115e6 A√s/m2",))
TIME_PER_POWER = Dimension("time by power", "second / watt", "s/W", ("6 ms/W",))
FLUX_LINKAGE = Dimension("flux linkage", "weber", "Wb", ("0.2 Wb",), signed=True)

OhmMetre: TypeAlias = Annotated[Real, RESISTIVITY]
JoulePerKelvinCubicMetre: TypeAlias = Annotated[Real, VOLUMETRIC_HEAT]
AmpereRootSecondPerSquareMetre: TypeAlias = Annotated[Real, WITHSTAND]
SecondPerWatt: TypeAlias = Annotated[Real, TIME_PER_POWER]
Weber: TypeAlias = Annotated[Real, FLUX_LINKAGE]
