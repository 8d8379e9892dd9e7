"""Unit texts to factors. pint knows the units; this module never shows it anything but single unit names.

Everyday units stand in a table, so that an ordinary definition never has to build pint's registry; a test holds each entry
against pint. Everything else is taken apart here, by a grammar of names, powers, products and one quotient, and each name
is looked up on its own. No text of a user ever reaches pint's expression parser.

Dimensions alone do not tell what is meant: rad/s and Hz, N·m and J, V·s and V/Hz, W and VA and var share theirs. So only
names that the trade writes are let through (`_ROOTS`), and a magnitude must be made of names that mean it.
"""

from __future__ import annotations

import difflib
import importlib
import re
from collections.abc import Iterable
from dataclasses import dataclass
from decimal import Decimal
from functools import lru_cache
from typing import Any

from circuitlint.si import DIMENSIONS

PREFIXES = {"p": -12, "n": -9, "u": -6, "m": -3, "": 0, "k": 3, "M": 6, "G": 9, "T": 12}
"""Decimal prefixes in plain letters, as powers of ten (SI brochure, 9th edition, table 7)."""

BASES: dict[str, tuple[str, str]] = {
    "ohm": ("ohm", "n u m k M G T"), "henry": ("H", "p n u m k"), "farad": ("F", "p n u m"),
    "volt": ("V", "u m k M"), "ampere": ("A", "n u m k"), "hertz": ("Hz", "m k M G"), "watt": ("W", "n u m k M G"),
    "var": ("var", "m k M G"), "volt_ampere": ("VA", "m k M G"), "joule": ("J", "p n u m k M G"),
    "meter": ("m", "u m k"), "second": ("s", "n u m"), "kelvin": ("K", "m"), "kelvin / watt": ("K/W", ""),
    "radian": ("rad", "m"), "watt / meter": ("W/m", "m k"), "siemens": ("S", "p n u m k"), "volt / hertz": ("V/Hz", "m"),
    "ampere ** 2 * second": ("A2s", ""),
}
"""Coherent units: the text for each, and the prefixes it is seen with in the trade."""


@dataclass(frozen=True, slots=True)
class Unit:
    """A unit: the coherent one as `circuitlint.si` spells it, and `value * factor + offset` to get there."""

    coherent: str
    factor: Decimal
    offset: Decimal = Decimal(0)


_DEGREE = Decimal("0.0174532925199432957692369076848861")
_OTHERS = {
    "cm": ("meter", "1e-2"), "in": ("meter", "0.0254"), "ft": ("meter", "0.3048"),
    "mm2": ("meter ** 2", "1e-6"), "cm2": ("meter ** 2", "1e-4"), "m2": ("meter ** 2", "1"),
    "min": ("second", "60"), "h": ("second", "3600"), "Wh": ("joule", "3600"), "kWh": ("joule", "3.6e6"),
    "ohm/m": ("ohm / meter", "1"), "mohm/m": ("ohm / meter", "1e-3"), "ohm/km": ("ohm / meter", "1e-3"),
    "mohm/km": ("ohm / meter", "1e-6"), "F/m": ("farad / meter", "1"), "pF/m": ("farad / meter", "1e-12"),
    "nF/m": ("farad / meter", "1e-9"), "uF/km": ("farad / meter", "1e-9"), "nF/km": ("farad / meter", "1e-12"),
    "W/km": ("watt / meter", "1e-3"), "degC/W": ("kelvin / watt", "1"),
    "degC": ("degC", "1"), "%": ("dimensionless", "0.01"),
}  # fmt: skip
EVERYDAY: dict[str, Unit] = {
    **{
        prefix + text: Unit(coherent, Decimal(f"1e{PREFIXES[prefix]}"))
        for coherent, (text, prefixes) in BASES.items()
        for prefix in ("", *prefixes.split())
    },
    **{text: Unit(coherent, Decimal(factor)) for text, (coherent, factor) in _OTHERS.items()},
    "deg": Unit("radian", _DEGREE),
    # t/°C = (t/°F - 32) / 1.8: NIST SP 811, 2008, appendix B.8.
    "degF": Unit("degC", 1 / Decimal("1.8"), -32 / Decimal("1.8")),
}
"""Everyday unit texts in plain letters."""

_SPELLINGS = str.maketrans({
    "\u2126": "ohm", "\u03a9": "ohm", "\u00b5": "u", "\u03bc": "u", "\u2103": "degC", "\u00b2": "2", "\u00b3": "3",
    "\u22c5": "*", "\u00b7": "*",
})  # fmt: skip
_FACTOR = re.compile(r"([A-Za-z]{1,24})([2-4])?")
_SCALES = ("", "femto", "pico", "nano", "micro", "milli", "centi", "kilo", "mega", "giga", "tera")
_ROOTS: dict[str, tuple[str, ...]] = {
    "ohm": _SCALES, "henry": _SCALES, "farad": _SCALES, "volt": _SCALES, "ampere": _SCALES, "hertz": _SCALES,
    "watt": _SCALES, "volt_ampere": _SCALES, "joule": _SCALES, "watt_hour": _SCALES, "siemens": _SCALES,
    "meter": _SCALES, "second": _SCALES, "kelvin": _SCALES, "radian": _SCALES, "circular_mil": ("", "kilo"),
    "minute": ("",), "hour": ("",), "day": ("",), "inch": ("",), "foot": ("",), "yard": ("",), "mile": ("",),
    "horsepower": ("",), "metric_horsepower": ("",), "degree": ("",), "arcminute": ("",), "arcsecond": ("",),
    "grade": ("",), "degree_Celsius": ("",), "degree_Fahrenheit": ("",),
}  # fmt: skip
"""Names, as pint spells them, that are let through, and the prefixes they may carry; minutes and the like carry none."""

_WRITTEN_IN = {
    "meter ** 2": ("mm2", -6), "ohm / meter": ("ohm/km", -3), "farad / meter": ("uF/km", -9),
    "degC": ("degC", 0), "dimensionless": ("", 0),
}  # fmt: skip
_ANGLES = ("radian", "degree", "arcminute", "arcsecond", "grade")
_MADE_OF = {"hertz": {"hertz"}, "volt / hertz": {"volt", "hertz"}}
"""Coherent units that share their dimensions with something else, and the names they must be made of."""


class UnknownUnit(Exception):
    """The text names no unit of the trade; `nearest` is the nearest everyday one or empty, `why` what is unclear about it."""

    def __init__(self, text: str, nearest: str, why: str = "") -> None:
        self.nearest = nearest
        self.why = why
        super().__init__(text)


def plain(text: str) -> str:
    """A unit text in plain letters: `µF`, `Ω/km`, `mm²`, `°C` to `uF`, `ohm/km`, `mm2`, `degC`."""
    if text == "\u00b0":
        return "deg"
    text = text.replace("\u00b0C", "degC").replace("\u00b0F", "degF").translate(_SPELLINGS)
    return re.sub(r"\^(?=[0-9])", "", text)


@lru_cache(maxsize=4096)
def resolve(text: str, wanted: str = "") -> Unit:
    """The unit that a text names. `wanted`, a coherent unit, only helps to find the nearest one. Raises UnknownUnit."""
    name = plain(text)
    if re.fullmatch(r"[A-Za-z]A2\*?s", name):
        # (kA)²s by the SI brochure, 10³ A²s on many a maker's sheet: a factor of a thousand that nobody would see.
        raise UnknownUnit(name, "A2s", "which is read as a prefix of the ampere or of the whole")
    found = EVERYDAY.get(name) or through_pint(name)
    if found is None:
        raise UnknownUnit(name, nearest(name, wanted))
    return found


@lru_cache(maxsize=4096)
def through_pint(name: str) -> Unit | None:
    """A unit text in plain letters, by pint alone, name by name; None where it means nothing in the trade."""
    if name == "%":
        return _unit("dimensionless", float(_registry().Quantity(1.0, "percent").to_base_units().magnitude))
    if name.endswith("var") and (power := _identifier(f"{name[:-3]}VA")):
        return _unit("var", _in(power[0], "volt_ampere"))
    parts = name.replace("A2s", "A2*s").split("/")
    if len(parts) > 2 or name.count("*") > 3:
        return None
    if single := _identifier(name):
        if single[1] in _ANGLES:
            return _unit("radian", _in(single[0], "radian"))
        if single[1] == "volt_ampere":
            return _unit("volt_ampere", _in(single[0], "volt_ampere"))
        if single[1].startswith("degree_"):
            zero, one = (float(_registry().Quantity(at, single[1]).to("degC").magnitude) for at in (0.0, 1.0))
            return _unit("degC", one - zero, zero)
    return _compound(parts)


def _compound(parts: list[str]) -> Unit | None:
    quantity = _registry().Quantity(1.0, "")
    roots = set()
    for sign, part in zip((1, -1), parts, strict=False):
        for factor in part.split("*"):
            found = _FACTOR.fullmatch(factor)
            named = _identifier(found[1]) if found else None
            if found is None or named is None or named[1] in (*_ANGLES, "volt_ampere", "degree_Fahrenheit"):
                return None
            # Of a difference, a degree Celsius is a kelvin (SI brochure, 9th edition, 2.3.1).
            spelled, root = ("kelvin", "kelvin") if named[1] == "degree_Celsius" else named
            if root == "ampere" != spelled and found[2]:
                return None
            roots.add(root)
            quantity = quantity * _registry().Quantity(1.0, spelled) ** (sign * int(found[2] or 1))
    for coherent in dict.fromkeys(dimension.unit for dimension in DIMENSIONS.values()):
        if coherent in ("degC", "var", "volt_ampere", "radian", "dimensionless"):
            continue
        if quantity.dimensionality == _one(coherent).dimensionality:
            if not roots <= _MADE_OF.get(coherent, roots):
                return None
            meant = "volt_ampere" if coherent == "watt" and roots == {"volt", "ampere"} else coherent
            return _unit(meant, float((quantity / _one(coherent)).to_base_units().magnitude))
    return None


def _identifier(name: str) -> tuple[str, str] | None:
    """A single unit name as pint spells it, with and without its prefix; None where it is not one of the trade's."""
    parse = _registry().parse_unit_name
    for prefix, root, _ in parse(name) if re.fullmatch("[A-Za-z]{1,24}", name) else ():
        plural_of_a_symbol = name.endswith("s") and not name.endswith(root + "s") and parse(name[:-1]) == parse(name)
        if prefix in _ROOTS.get(root, ()) and not plural_of_a_symbol:
            return prefix + root, root
    return None


def _in(spelled: str, coherent: str) -> float:
    return float(_registry().Quantity(1.0, spelled).to(coherent).magnitude)


def _unit(coherent: str, factor: float, offset: float = 0.0) -> Unit:
    return Unit(coherent, _decimal(factor), _decimal(offset))


def _decimal(value: float) -> Decimal:
    """A factor without the last-digit noise that a product of floats picks up."""
    clean = f"{value:.14g}"
    return Decimal(clean) if abs(float(clean) - value) <= 1e-15 * abs(value) else Decimal(repr(value))


@lru_cache(maxsize=64)
def _one(unit: str) -> Any:
    """One of a unit written by this package, not by a user."""
    return _registry().Quantity(1.0, unit)


@lru_cache(maxsize=1)
def _registry() -> Any:
    """pint's registry, built when a unit is not an everyday one. Loading it by name keeps it off the usual way in."""
    return importlib.import_module("pint").UnitRegistry(cache_folder=None)


@lru_cache(maxsize=1024)
def nearest(text: str, wanted: str = "") -> str:
    """The nearest everyday unit, of the wanted coherent one if any comes near; else an empty text."""
    name = plain(text)
    for known in ([one for one, unit in EVERYDAY.items() if unit.coherent == wanted], list(EVERYDAY)):
        if found := in_other_case(name, known) or next(iter(difflib.get_close_matches(name, known, 1, 0.6)), ""):
            return found
    return ""


def in_other_case(name: str, known: Iterable[str]) -> str:
    """The first of the known units that has the same letters, small or capital; else an empty text."""
    return next((one for one in known if one.lower() == name.lower()), "")


def writing(coherent: str, size: int) -> tuple[str, int]:
    """The unit text, and its power of ten, in which a magnitude is written whose first digit has the power of ten `size`."""
    if coherent in _WRITTEN_IN:
        return _WRITTEN_IN[coherent]
    text, letters = BASES[coherent]
    powers = {PREFIXES[letter]: letter for letter in ("", *letters.split())}
    power = max((one for one in powers if one <= size), default=min(powers))
    return powers[power] + text, power
