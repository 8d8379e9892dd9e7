"""`24 V ± 10 %` to SI numbers and back: the door through which every magnitude comes in and goes out."""

from __future__ import annotations

import math
from dataclasses import dataclass
from functools import lru_cache
from typing import Any

from circuitlint import numbers, units
from circuitlint.errors import QuantityError
from circuitlint.numbers import NotANumber, Stated
from circuitlint.si import AREA, DIMENSIONS, RATIO, TEMPERATURE, Dimension

KELVIN_AT_ZERO_CELSIUS = 273.15
_PREFIXES = ((1e9, "G"), (1e6, "M"), (1e3, "k"), (1.0, ""), (1e-3, "m"), (1e-6, "µ"), (1e-9, "n"), (1e-12, "p"))
_SCALED = {
    "meter ** 2": (1e-6, "mm²"),
    "ohm / meter": (1e-3, "Ω/km"),
    "farad / meter": (1e-9, "µF/km"),
    "radian": (math.pi / 180.0, "°"),
}
"""Units in which a magnitude is printed where the trade does not use the coherent one: factor and symbol."""


@dataclass(frozen=True, slots=True)
class Quantity:
    """A stated magnitude: nominal, lowest and highest value in the SI unit of its dimension, and the text it was read from."""

    nominal: float
    low: float
    high: float
    dimension: Dimension
    text: str

    @property
    def exact(self) -> bool:
        """Whether no tolerance is stated."""
        return self.low == self.high

    @classmethod
    def of(cls, value: float, dimension: Dimension, low: float | None = None, high: float | None = None) -> Quantity:
        """A quantity made by code, with a text that reads back to it."""
        text = write(value, dimension)
        if low is not None and high is not None:
            text = f"{write(low, dimension).partition(' ')[0]}..{write(high, dimension)}"
        return cls(value, value if low is None else low, value if high is None else high, dimension, text)


def read(text: Any, dimension: Dimension) -> Quantity:
    """Read a text as a quantity of a dimension. Raises QuantityError, which says what was read and what would be accepted."""
    if not isinstance(text, str):
        told = {type(None): "nothing", dict: "a mapping", list: "a list", bool: "yes or no"}.get(type(text), repr(text)[:40])
        raise QuantityError(f"{told} where {_a(dimension.name)} is wanted", _accepted(dimension))
    return _read(text, dimension)


@lru_cache(maxsize=65536)
def _read(text: str, dimension: Dimension) -> Quantity:
    shown = repr(text if len(text) <= 60 else text[:57] + "...")
    try:
        stated = numbers.parse(text, dimension.letter)
    except NotANumber as error:
        raise QuantityError(f"{shown} is not {_a(dimension.name)}: {_told(error, text)}", _accepted(dimension)) from None
    nominal = stated.number if stated.lettered else _si(stated.number, stated.unit, dimension, shown)
    low, high = _ends(stated, nominal, dimension, shown)
    _bounded(nominal, low, high, dimension, shown)
    return Quantity(nominal, low, high, dimension, " ".join(text.split()))


def _told(error: NotANumber, text: str) -> str:
    return {
        "empty": "the text is empty",
        "long": f"the text has {len(text)} characters",
        "comma": "a decimal comma; the decimal sign is a point",
        "not finite": "the number is not finite",
        "reversed": "the range runs from high to low",
        "grammar": "it does not follow number, unit, tolerance",
    }[error.why]


def _a(name: str) -> str:
    return f"{'an' if name[0] in 'aeiou' else 'a'} {name}"


def _accepted(dimension: Dimension) -> str:
    return ", ".join(f"`{example}`" for example in dimension.examples)


def _si(number: float, unit: str, dimension: Dimension, shown: str) -> float:
    if not unit:
        if dimension is RATIO:
            return number
        raise QuantityError(f"{shown} has no unit", _accepted(dimension))
    if dimension is RATIO and unit == "%":
        return number / 100.0
    if dimension is TEMPERATURE:
        if unit in units.CELSIUS:
            return number
        if unit == "K":
            return number - KELVIN_AT_ZERO_CELSIUS
    found, factor = _resolved(unit, dimension, shown)
    if found != dimension.unit:
        other = _dimension_name(found, unit, dimension, shown)
        raise QuantityError(f"{shown} is {other}, not {_a(dimension.name)}", _accepted(dimension))
    inverse = round(1.0 / factor) if factor < 1.0 else 0
    # Dividing by a power of ten rounds once; multiplying by its rounded inverse rounds twice.
    return number / inverse if inverse and 1.0 / inverse == factor else number * factor


def _resolved(unit: str, dimension: Dimension, shown: str) -> tuple[str, float]:
    if unit in units.CELSIUS or unit == "%":
        other = "a temperature" if unit in units.CELSIUS else "a share in per cent"
        raise QuantityError(f"{shown} is {other}, not {_a(dimension.name)}", _accepted(dimension))
    try:
        return units.resolve(unit)
    except units.UnknownUnit as error:
        hint = f" (did you mean {error.nearest!r}?)" if error.nearest else ""
        raise QuantityError(f"{shown} has the unknown unit {unit[:24]!r}{hint}", _accepted(dimension)) from None


def _dimension_name(found: str, unit: str, dimension: Dimension, shown: str) -> str:
    name = next((one.name for one in DIMENSIONS.values() if one.unit == found), "")
    if not name:
        raise QuantityError(f"{shown} has the unit {unit[:24]!r}, which is none of the trade's here", _accepted(dimension))
    return _a(name)


def _ends(stated: Stated, nominal: float, dimension: Dimension, shown: str) -> tuple[float, float]:
    if stated.ends is not None:
        low, high = (_si(end, stated.unit, dimension, shown) for end in stated.ends)
        return low, high
    if not stated.up and not stated.down:
        return nominal, nominal
    if stated.percent:
        if dimension is TEMPERATURE:
            raise QuantityError(f"{shown} gives a share of a temperature", "`40 degC ± 5 K`")
        if stated.down >= 100.0 and not dimension.signed:
            raise QuantityError(f"{shown} has a tolerance of 100 % or more", _accepted(dimension))
        return nominal - abs(nominal) * stated.down / 100.0, nominal + abs(nominal) * stated.up / 100.0
    if dimension is TEMPERATURE:
        if stated.tolerance_unit not in ("K", *units.CELSIUS):
            raise QuantityError(f"{shown} has a tolerance without kelvin", "`40 degC ± 5 K`")
        return nominal - stated.down, nominal + stated.up
    if not stated.tolerance_unit and dimension is not RATIO:
        raise QuantityError(f"{shown} has a tolerance without a unit", _accepted(dimension))
    up = _si(stated.up, stated.tolerance_unit, dimension, shown)
    down = _si(stated.down, stated.tolerance_unit, dimension, shown)
    return nominal - down, nominal + up


def _bounded(nominal: float, low: float, high: float, dimension: Dimension, shown: str) -> None:
    if not all(map(math.isfinite, (nominal, low, high))):
        raise QuantityError(f"{shown} is not a finite {dimension.name}", _accepted(dimension))
    if not dimension.signed and low <= 0.0:
        what = "is zero or below" if nominal <= 0.0 else "reaches zero or below with its tolerance"
        raise QuantityError(f"{shown} {what}", f"{_a(dimension.name)} above zero, such as {_accepted(dimension)}")
    if low < dimension.smallest or high > dimension.largest:
        span = f"{show(dimension.smallest, dimension)} to {show(dimension.largest, dimension)}"
        raise QuantityError(f"{shown} is not a believable {dimension.name}", f"{span}, such as {_accepted(dimension)}")


def show(value: float, dimension: Dimension, digits: int = 4) -> str:
    """A magnitude as a person reads it, rounded to a number of significant digits: `4.70 kΩ`, `1.5 mm²`, `71.30 °C`."""
    if not math.isfinite(value):
        return "–"
    factor, symbol = _scale(abs(value), dimension)
    shown = _digits(value / factor, digits)
    if dimension is AREA and "." in shown:
        shown = shown.rstrip("0").rstrip(".")
    return f"{shown}{symbol}" if symbol == "°" else f"{shown} {symbol}".rstrip()


def show_range(low: float, high: float, dimension: Dimension, digits: int = 4) -> str:
    """Both ends of a range under one prefix: `4.612 .. 5.103 A`."""
    if not (math.isfinite(low) and math.isfinite(high)):
        return "–"
    factor, symbol = _scale(max(abs(low), abs(high)), dimension)
    return f"{_digits(low / factor, digits)} .. {_digits(high / factor, digits)} {symbol}".rstrip()


def _scale(size: float, dimension: Dimension) -> tuple[float, str]:
    if dimension.unit in _SCALED:
        return _SCALED[dimension.unit]
    if not dimension.prefixed or size == 0.0:
        return 1.0, dimension.symbol
    for factor, prefix in _PREFIXES:
        if size >= factor * 0.99995:
            return factor, prefix + dimension.symbol
    return _PREFIXES[-1][0], _PREFIXES[-1][1] + dimension.symbol


def _digits(value: float, digits: int) -> str:
    """Significant digits without an exponent where a person would write none; never minus zero."""
    if value == 0.0 or abs(value) < 1e-12:
        return "0"
    size = math.floor(math.log10(abs(value)))
    if -4 <= size < 7:
        return f"{value:.{max(0, digits - 1 - size)}f}"
    return f"{value:.{digits - 1}e}"


_WRITTEN = {
    "ohm": "ohm", "henry": "H", "farad": "F", "volt": "V", "ampere": "A", "hertz": "Hz", "watt": "W", "var": "var",
    "volt_ampere": "VA", "joule": "J", "meter": "m", "second": "s", "degC": "degC", "kelvin": "K", "kelvin / watt": "K/W",
    "radian": "rad", "dimensionless": "", "ohm / meter": "ohm/m", "watt / meter": "W/m", "farad / meter": "F/m",
    "ampere ** 2 * second": "A2s", "siemens": "S", "volt / hertz": "V/Hz", "meter ** 2": "m2",
}


def write(value: float, dimension: Dimension) -> str:
    """A text that `read` takes back to the very same float. Areas come in mm² where that loses nothing."""
    if dimension.unit == "meter ** 2":
        millimetres = f"{value * 1e6:.12g} mm2"
        if _read(millimetres, dimension).nominal == value:
            return millimetres
    return f"{value!r} {_WRITTEN[dimension.unit]}".rstrip()
