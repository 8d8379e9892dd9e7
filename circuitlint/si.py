"""Dimensions used by the trade, and types that name the SI unit of a magnitude.

Inside the package every magnitude is a plain float or a float array in the coherent SI unit named here.
Temperatures on the Celsius scale stay in degree Celsius (a coherent SI unit by name); differences are in kelvin.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import Annotated, TypeAlias

import numpy as np
from numpy.typing import NDArray

RealArray: TypeAlias = NDArray[np.float64]
ComplexArray: TypeAlias = NDArray[np.complex128]
Real: TypeAlias = float | RealArray
Complex: TypeAlias = complex | ComplexArray


@dataclass(frozen=True, slots=True)
class Dimension:
    """A physical dimension as the trade names it.

    `unit` is the coherent SI unit as pint spells it, `symbol` how it is printed, `examples` what a definition may say.
    `smallest` and `largest` bound the magnitudes (in `unit`) that are believed to be meant. `letter` is the IEC 60062 letter
    that may stand for the decimal point. `signed` admits zero and negative values. `prefixed` lets printing choose a
    decimal prefix.
    """

    name: str
    unit: str
    symbol: str
    examples: tuple[str, ...]
    smallest: float = 1e-15
    largest: float = 1e15
    letter: str = ""
    signed: bool = False
    prefixed: bool = True


RESISTANCE = Dimension("resistance", "ohm", "Ω", ("21 ohm", "4.7 kohm ± 5 %", "4k7", "18..22 ohm"), 1e-9, 1e12, "R")
REACTANCE = Dimension("reactance", "ohm", "Ω", ("113 ohm", "0.08 mohm"), 1e-9, 1e12)
INDUCTANCE = Dimension("inductance", "henry", "H", ("0.36 H ± 10 %", "75 mH", "4m7"), 1e-12, 1e6, "H")
CAPACITANCE = Dimension("capacitance", "farad", "F", ("15 uF ± 10 %", "100n", "4n7"), 1e-15, 1e3, "F")
VOLTAGE = Dimension("voltage", "volt", "V", ("230 V +10/-6 %", "24 V ± 10 %"), 1e-6, 1e6)
CURRENT = Dimension("current", "ampere", "A", ("10 A", "500 mA"), 1e-9, 1e6)
FREQUENCY = Dimension("frequency", "hertz", "Hz", ("50 Hz ± 1 %", "60 Hz"), 1e-3, 1e9)
ACTIVE_POWER = Dimension("active power", "watt", "W", ("60 W", "1.5 kW"), 1e-9, 1e9)
REACTIVE_POWER = Dimension("reactive power", "var", "var", ("250 var", "5 kvar"), 1e-9, 1e9)
APPARENT_POWER = Dimension("apparent power", "volt_ampere", "VA", ("72 VA", "1.2 kVA"), 1e-9, 1e9)
ENERGY = Dimension("energy", "joule", "J", ("0.5 J", "20 mJ"), 1e-12, 1e9)
LENGTH = Dimension("length", "meter", "m", ("42 m", "350 mm"), 1e-6, 1e6)
AREA = Dimension("cross-section", "meter ** 2", "m²", ("1.5 mm2", "6 mm²"), 1e-12, 1.0, prefixed=False)
TIME = Dimension("time", "second", "s", ("15 s", "30 ms"), 1e-9, 1e9)
TEMPERATURE = Dimension("temperature", "degC", "°C", ("40 degC", "-10..40 degC"), -273.15, 2000.0, signed=True,
                        prefixed=False)
TEMPERATURE_RISE = Dimension("temperature rise", "kelvin", "K", ("55 K",), 1e-6, 2000.0, prefixed=False)
THERMAL_RESISTANCE = Dimension("thermal resistance", "kelvin / watt", "K/W", ("1.8 K/W",), 1e-9, 1e6, prefixed=False)
ANGLE = Dimension("angle", "radian", "rad", ("53 deg", "0.9 rad"), -7.0, 7.0, signed=True, prefixed=False)
RATIO = Dimension("ratio", "dimensionless", "", ("0.85", "85 %"), 1e-9, 1e9, prefixed=False)
RESISTANCE_PER_LENGTH = Dimension("resistance per length", "ohm / meter", "Ω/m", ("12.1 ohm/km",), 1e-12, 1e6)
LOSS_PER_LENGTH = Dimension("loss per length", "watt / meter", "W/m", ("2.1 W/m",), 1e-12, 1e6)
CAPACITANCE_PER_LENGTH = Dimension("capacitance per length", "farad / meter", "F/m", ("0.26 uF/km",), 1e-18, 1e-3)
LET_THROUGH = Dimension("let-through", "ampere ** 2 * second", "A²s", ("20000 A2s",), 1e-9, 1e15)
CONDUCTANCE = Dimension("conductance", "siemens", "S", ("2 mS",), 1e-15, 1e9)
FLUX_RATIO = Dimension("volts per hertz", "volt / hertz", "V/Hz", ("4.6 V/Hz",), 1e-9, 1e9)

DIMENSIONS: dict[str, Dimension] = {
    value.name: value for value in list(globals().values()) if isinstance(value, Dimension)
}

# Constants of tables, which a definition never states: they are printed on calculation sheets, and not read.
WITHSTAND = Dimension("adiabatic constant", "ampere * second ** 0.5 / meter ** 2", "A·√s/m²", ("115e6 A√s/m2",))
TIME_PER_POWER = Dimension("time by power", "second / watt", "s/W", ("6 ms/W",))
OF_TABLES: dict[str, Dimension] = {one.name: one for one in (WITHSTAND, TIME_PER_POWER)}

Ohm: TypeAlias = Annotated[Real, RESISTANCE]
Henry: TypeAlias = Annotated[Real, INDUCTANCE]
Farad: TypeAlias = Annotated[Real, CAPACITANCE]
Volt: TypeAlias = Annotated[Real, VOLTAGE]
Ampere: TypeAlias = Annotated[Real, CURRENT]
Hertz: TypeAlias = Annotated[Real, FREQUENCY]
Watt: TypeAlias = Annotated[Real, ACTIVE_POWER]
Var: TypeAlias = Annotated[Real, REACTIVE_POWER]
VoltAmpere: TypeAlias = Annotated[Real, APPARENT_POWER]
Joule: TypeAlias = Annotated[Real, ENERGY]
Metre: TypeAlias = Annotated[Real, LENGTH]
SquareMetre: TypeAlias = Annotated[Real, AREA]
Second: TypeAlias = Annotated[Real, TIME]
Celsius: TypeAlias = Annotated[Real, TEMPERATURE]
Kelvin: TypeAlias = Annotated[Real, TEMPERATURE_RISE]
KelvinPerWatt: TypeAlias = Annotated[Real, THERMAL_RESISTANCE]
Radian: TypeAlias = Annotated[Real, ANGLE]
Ratio: TypeAlias = Annotated[Real, RATIO]
OhmPerMetre: TypeAlias = Annotated[Real, RESISTANCE_PER_LENGTH]
WattPerMetre: TypeAlias = Annotated[Real, LOSS_PER_LENGTH]
FaradPerMetre: TypeAlias = Annotated[Real, CAPACITANCE_PER_LENGTH]
AmpereSquaredSecond: TypeAlias = Annotated[Real, LET_THROUGH]
VoltPerHertz: TypeAlias = Annotated[Real, FLUX_RATIO]
ComplexOhm: TypeAlias = Annotated[Complex, RESISTANCE]
ComplexVolt: TypeAlias = Annotated[Complex, VOLTAGE]
ComplexAmpere: TypeAlias = Annotated[Complex, CURRENT]
ComplexVoltAmpere: TypeAlias = Annotated[Complex, APPARENT_POWER]
