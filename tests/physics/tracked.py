"""Numbers that carry their dimension through NumPy, and refuse to add volts to ohms."""

from __future__ import annotations

from typing import Any

import numpy as np
import pint
from numpy.lib.mixins import NDArrayOperatorsMixin

UNITS: pint.UnitRegistry[float] = pint.UnitRegistry()
if "var" not in UNITS:
    UNITS.define("var = watt")

Powers = dict[str, float]
TWENTY_DEGREES = 20.0

SAME = {"add", "subtract", "maximum", "minimum", "hypot", "arctan2", "greater", "less", "greater_equal", "less_equal",
        "equal", "not_equal"}  # fmt: skip
PURE = {"exp", "expm1", "log", "log1p", "sin", "cos", "tan", "tanh", "sinh", "cosh", "arccos", "arctan"}
KEPT = {"absolute", "negative", "positive", "conjugate", "real", "imag"}
JUDGED = {"greater", "less", "greater_equal", "less_equal", "equal", "not_equal"}


class WrongDimension(AssertionError):
    """Magnitudes of different dimensions met where only like ones may."""


def powers_of(unit: str) -> Powers:
    """Exponents of the base dimensions of a unit; the Celsius scale counts as kelvin, an angle as a number."""
    dimensionality = UNITS.parse_units("kelvin" if unit == "degC" else unit).dimensionality
    return {name: float(str(power)) for name, power in dimensionality.items() if power}


class Tracked(NDArrayOperatorsMixin):
    """A magnitude with its dimension. What has no dimension becomes a plain number again."""

    def __init__(self, value: Any, powers: Powers) -> None:
        self.value = value
        self.powers = powers

    def __array_ufunc__(self, ufunc: np.ufunc, method: str, *inputs: Any, **options: Any) -> Any:
        if method != "__call__" or options:
            raise WrongDimension(f"{ufunc.__name__} with {method} {options} is not followed")
        value = ufunc(*(bare(one) for one in inputs))
        return made(value, self._powers(ufunc.__name__, inputs))

    @staticmethod
    def _powers(name: str, inputs: tuple[Any, ...]) -> Powers:
        powers = [powers_in(one) for one in inputs]
        if name in SAME:
            _alike(name, inputs)
            return {} if name in (*JUDGED, "arctan2") else _common(inputs)
        if name in PURE:
            if powers[0]:
                raise WrongDimension(f"{name} of {powers[0]}")
            return {}
        if name in ("multiply", "divide", "true_divide"):
            sign = 1.0 if name == "multiply" else -1.0
            return summed(powers[0], powers[1], sign)
        if name == "power":
            if powers[1] or (powers[0] and np.ndim(bare(inputs[1]))):
                raise WrongDimension(f"an exponent of {powers[1]}")
            return {key: one * float(bare(inputs[1])) for key, one in powers[0].items()}
        if name in ("sqrt", "square"):
            return {key: one * (0.5 if name == "sqrt" else 2.0) for key, one in powers[0].items()}
        if name in KEPT:
            return powers[0]
        raise WrongDimension(f"{name} is not followed")

    def __array_function__(self, function: Any, types: Any, args: Any, kwargs: Any) -> Any:
        name = function.__name__
        if name == "where":
            _alike(name, args[1:])
            return made(function(bare(args[0]), bare(args[1]), bare(args[2])), _common(args[1:]))
        if name in ("real", "imag"):
            return made(function(self.value), self.powers)
        if name == "angle":
            return function(self.value)
        if name in ("shape", "ndim"):
            return function(self.value)
        raise WrongDimension(f"{name} is not followed")


def bare(one: Any) -> Any:
    """The number without its dimension."""
    return one.value if isinstance(one, Tracked) else one


def powers_in(one: Any) -> Powers:
    return one.powers if isinstance(one, Tracked) else {}


def made(value: Any, powers: Powers) -> Any:
    powers = {key: one for key, one in powers.items() if abs(one) > 1e-12}
    return Tracked(value, powers) if powers else value


def summed(one: Powers, other: Powers, sign: float) -> Powers:
    return {key: one.get(key, 0.0) + sign * other.get(key, 0.0) for key in {*one, *other}}


def _free(one: Any) -> bool:
    """Whether a bare number fits any dimension: nothing, without bound, or missing."""
    value = np.asarray(bare(one))
    return not isinstance(one, Tracked) and bool(np.all((value == 0.0) | ~np.isfinite(value)))


def _common(inputs: tuple[Any, ...]) -> Powers:
    return next((one.powers for one in inputs if isinstance(one, Tracked)), {})


def _alike(name: str, inputs: tuple[Any, ...]) -> None:
    wanted = _common(inputs)
    for one in inputs:
        if powers_in(one) == wanted or _free(one):
            continue
        # The reference of tabled resistances is 20 °C, and says so in the equations.
        if wanted == {"[temperature]": 1.0} and np.all(bare(one) == TWENTY_DEGREES):
            continue
        # A guarded division puts 1 where the divisor is never used.
        if name == "where" and not isinstance(one, Tracked) and np.all(np.asarray(one) == 1.0):
            continue
        raise WrongDimension(f"{name} of {[powers_in(each) or bare(each) for each in inputs]}")
