"""`24 V ± 10 %` to SI numbers and back: the door through which every magnitude comes in and goes out."""

from __future__ import annotations

import math
from dataclasses import dataclass
from decimal import Decimal
from functools import lru_cache
from typing import Any

from circuitlint import numbers, units
from circuitlint.errors import QuantityError
from circuitlint.numbers import EXACT, NotANumber, Stated, Term
from circuitlint.si import AREA, DIMENSIONS, RATIO, TEMPERATURE, Dimension

_KELVIN_AT_ZERO_CELSIUS = Decimal("273.15")
_HUNDRED = Decimal(100)


@dataclass(frozen=True, slots=True)
class Quantity:
    """A stated magnitude: nominal, lowest and highest value in the SI unit of its dimension, and its text as written."""

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
        """A quantity made by code, with a text that `read` takes back to it; an end left out is the value itself.

        The bounds of the dimension are not applied. Raises QuantityError for values out of order or not finite.
        """
        low, high = value if low is None else low, value if high is None else high
        return cls(value, low, high, dimension, _written(value, low, high, dimension))


def read(text: Any, dimension: Dimension) -> Quantity:
    """Read a text as a quantity of a dimension. Remembers what it has read.

    Raises QuantityError, which says what was read and why it is refused, and what would be accepted.
    """
    if not isinstance(text, str):
        raise QuantityError(f"{_told(text)} where {_a(dimension)} is wanted as text", _accepted(dimension))
    return _read(text, dimension)


def read_unit(text: str, dimension: Dimension) -> tuple[float, float]:
    """Factor and offset of a unit text: `value * factor + offset` is in the SI unit of the dimension.

    Raises QuantityError for a text that is not a unit of the dimension.
    """
    shown = _echo(text)
    if text and not numbers.UNIT.fullmatch(text):
        raise QuantityError(f"{shown} is not a unit of {_a(dimension)}", _accepted(dimension))
    factor, offset = _unit(text, dimension, shown)
    return float(factor), float(offset)


@lru_cache(maxsize=32768)
def _read(text: str, dimension: Dimension) -> Quantity:
    shown = _echo(text)
    try:
        stated = numbers.parse(text, dimension.letter)
    except NotANumber as error:
        meant = [f"`{one.strip()}`" for one in error.instead if _readable(one, dimension)]
        accepted = " or ".join(meant) or _accepted(dimension)
        raise QuantityError(f"{shown} is not {_a(dimension)}: {error.why}", accepted) from None
    ends = _ends(stated, dimension, shown)
    if not ends[1] <= ends[0] <= ends[2]:
        turned = ends[1] > ends[2]
        what = "has a range that runs from high to low" if turned else "has a nominal value outside its own range"
        raise QuantityError(f"{shown} {what}", _accepted(dimension))
    _refuse_unbelievable(stated, ends, dimension, shown)
    nominal, low, high = map(float, ends)
    return Quantity(nominal, low, high, dimension, " ".join(text.split()))


def _readable(text: str, dimension: Dimension) -> bool:
    try:
        _read(text, dimension)
    except QuantityError:
        return False
    return True


def _unit(unit: str, dimension: Dimension, shown: str) -> tuple[Decimal, Decimal]:
    """Factor and offset of a unit text that must be of the dimension."""
    if not unit:
        if dimension is RATIO:
            return Decimal(1), Decimal(0)
        raise QuantityError(f"{shown} has no unit", _accepted(dimension))
    try:
        found = units.resolve(unit, dimension.unit)
    except units.UnknownUnit as error:
        hint = f" (did you mean `{error.nearest}`?)" if error.nearest else ""
        why = f"the unit {_echo(unit, 24)}, {error.why}" if error.why else f"the unknown unit {_echo(unit, 24)}"
        raise QuantityError(f"{shown} has {why}{hint}", _accepted(dimension)) from None
    if found.coherent == dimension.unit:
        return found.factor, found.offset
    if dimension is TEMPERATURE and found.coherent == "kelvin":
        return found.factor, -_KELVIN_AT_ZERO_CELSIUS
    other = next(one for one in DIMENSIONS.values() if one.unit == found.coherent)
    near = units.in_other_case(units.plain(unit), _everyday(dimension))
    hint = f" (did you mean `{near}`?)" if near else ""
    raise QuantityError(f"{shown} is {_a(other)}, not {_a(dimension)}{hint}", _accepted(dimension))


def _everyday(dimension: Dimension) -> list[str]:
    return [text for text, unit in units.EVERYDAY.items() if unit.coherent == dimension.unit]


def _si(term: Term, dimension: Dimension, shown: str) -> Decimal:
    factor, offset = _unit(term.unit, dimension, shown)
    return EXACT.add(EXACT.multiply(term.number, factor), offset)


def _ends(stated: Stated, dimension: Dimension, shown: str) -> tuple[Decimal, Decimal, Decimal]:
    """Nominal, lowest and highest value in the SI unit, still exact."""
    if stated.ends is not None:
        low, high = (_si(end, dimension, shown) for end in stated.ends)
        middle = EXACT.divide(EXACT.add(low, high), Decimal(2))
        return middle if stated.nominal is None else _si(stated.nominal, dimension, shown), low, high
    assert stated.nominal is not None
    nominal = stated.nominal.number if stated.lettered else _si(stated.nominal, dimension, shown)
    if stated.down is None or stated.up is None:
        return nominal, nominal, nominal
    down = _distance(stated.down, stated.nominal, nominal, dimension, shown)
    up = down if stated.up is stated.down else _distance(stated.up, stated.nominal, nominal, dimension, shown)
    if "%" in (stated.down.unit, stated.up.unit) and (
        (stated.down.unit == "%" and stated.down.number >= 100) or (stated.up.unit == "%" and stated.up.number > 100)
    ):
        raise QuantityError(f"{shown} has a tolerance of 100 % or more", _accepted(dimension))
    return nominal, EXACT.subtract(nominal, down), EXACT.add(nominal, up)


def _distance(tolerance: Term, stated: Term, nominal: Decimal, dimension: Dimension, shown: str) -> Decimal:
    """How far a tolerance reaches from the nominal value, in the SI unit."""
    if tolerance.unit == "%":
        if dimension is TEMPERATURE:
            raise QuantityError(f"{shown} gives a share of a temperature", "a difference, such as `40 degC ± 5 K`")
        if stated.unit == "%":
            what = "has a tolerance that may be a share or percentage points"
            raise QuantityError(f"{shown} {what}", "a range, such as `80..90 %`, or plain numbers, such as `0.85 ± 0.05`")
        return EXACT.divide(EXACT.multiply(abs(nominal), tolerance.number), _HUNDRED)
    if not tolerance.unit and (dimension is not RATIO or stated.unit):
        raise QuantityError(f"{shown} has a tolerance without a unit", _accepted(dimension))
    # Of a difference the offset does not count: ± 5 °C is ± 5 K.
    return EXACT.multiply(tolerance.number, _unit(tolerance.unit, dimension, shown)[0])


def _refuse_unbelievable(
    stated: Stated, ends: tuple[Decimal, Decimal, Decimal], dimension: Dimension, shown: str
) -> None:
    nominal, low, high = ends
    if not dimension.signed and low <= 0:
        what = "is zero or below" if nominal <= 0 else "reaches zero or below"
        raise QuantityError(f"{shown} {what}", f"{_a(dimension)} above zero, such as {_accepted(dimension)}")
    if float(low) < dimension.smallest or float(high) > dimension.largest:
        span = f"{write(dimension.smallest, dimension)} to {write(dimension.largest, dimension)}"
        unit = units.plain(stated.nominal.unit) if stated.nominal else ""
        meant = unit.replace("M", "m", 1)
        hint = f" (did you mean `{meant}`?)" if meant != unit and meant in _everyday(dimension) else ""
        raise QuantityError(f"{shown} is not a believable {dimension.name}{hint}", f"{span}, such as {_accepted(dimension)}")


def _echo(text: str, longest: int = 60) -> str:
    return repr(text if len(text) <= longest else text[: longest - 3] + "...")


def _told(value: Any) -> str:
    if value is None:
        return "nothing"
    if isinstance(value, bool):
        return "yes or no"
    if isinstance(value, int | float):
        return "a number without a unit"
    if isinstance(value, dict | list):
        return "a mapping" if isinstance(value, dict) else "a list"
    return "something else than text"


def _a(dimension: Dimension) -> str:
    name = dimension.name
    return name if name.startswith("volts") else f"{'an' if name[0] in 'aeiou' else 'a'} {name}"


def _accepted(dimension: Dimension) -> str:
    return ", ".join(f"`{example}`" for example in dimension.examples)


_SHOWN_IN = {
    "meter ** 2": (1e-6, "mm²"),
    "ohm / meter": (1e-3, "Ω/km"),
    "farad / meter": (1e-9, "µF/km"),
    "radian": (math.pi / 180.0, "°"),
    # A prefix would be squared with the ampere (SI brochure, 9th edition, chapter 3).
    "ampere ** 2 * second": (1.0, "A²s"),
}
"""Units in which a magnitude is printed where the trade does not use the coherent one: factor and symbol."""
_LARGEST_PREFIX = {"second": 0, "meter": 3}
_PREFIXES = {power: (float(f"1e{power}"), letter.replace("u", "µ")) for letter, power in units.PREFIXES.items()}
_LARGEST = 1e290
"""Beyond this a division by the factor of a smaller unit could leave the floats."""


def show(value: float, dimension: Dimension, digits: int = 4) -> str:
    """A magnitude as a person reads it, rounded to so many significant digits: `4.700 kΩ`, `1.5 mm²`, `71.30 °C`.

    `-` where it is not finite.
    """
    return _shown((value,), dimension, digits)


def show_range(low: float, high: float, dimension: Dimension, digits: int = 4) -> str:
    """Both ends of a range under one prefix: `4.612 .. 5.103 A`; `-` where one is not finite."""
    return _shown((low, high), dimension, digits)


def _shown(values: tuple[float, ...], dimension: Dimension, digits: int) -> str:
    if not all(map(math.isfinite, values)):
        return "-"
    size = max(map(abs, values))
    factor, symbol = _scale(size, dimension, digits) if size < _LARGEST else (1.0, dimension.symbol)
    told = [numbers.shown(value / factor, digits) for value in values]
    if dimension is AREA:
        told = [one.rstrip("0").rstrip(".") if "." in one and "e" not in one else one for one in told]
    return f"{' .. '.join(told)}{'' if symbol == '°' else ' '}{symbol}".rstrip()


def _scale(size: float, dimension: Dimension, digits: int) -> tuple[float, str]:
    if dimension.unit in _SHOWN_IN:
        return _SHOWN_IN[dimension.unit]
    if not dimension.prefixed or size == 0.0:
        return 1.0, dimension.symbol
    power = min(max(numbers.magnitude(size, digits) // 3 * 3, -12), _LARGEST_PREFIX.get(dimension.unit, 12))
    factor, prefix = _PREFIXES[power]
    return factor, prefix + dimension.symbol


def write(value: float | Quantity, dimension: Dimension) -> str:
    """A text that `read` takes back to the very same floats, in a readable unit: `4.7 uF`, `1.5 mm2`, `18..22 ohm`.

    Raises QuantityError for what is not finite or out of order.
    """
    if isinstance(value, Quantity):
        return _written(value.nominal, value.low, value.high, dimension)
    return _written(value, value, value, dimension)


def _written(nominal: float, low: float, high: float, dimension: Dimension) -> str:
    if not (math.isfinite(low) and math.isfinite(high) and low <= nominal <= high):
        raise QuantityError(f"{nominal} between {low} and {high} is not {_a(dimension)}", _accepted(dimension))
    unit, power = units.writing(dimension.unit, numbers.magnitude(max(abs(low), abs(high)), 17))
    one, least, most = (numbers.written(value, power) for value in (nominal, low, high))
    if low == high:
        return f"{one} {unit}".rstrip()
    middle = float(EXACT.divide(EXACT.add(Decimal(repr(low)), Decimal(repr(high))), Decimal(2)))
    return f"{least}..{most} {unit}".rstrip() if middle == nominal else f"{one} ({least}..{most}) {unit}".rstrip()
