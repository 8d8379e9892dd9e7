"""Unit texts to factors. pint knows the units; this module never shows it anything but single unit names.

Everyday units stand in a table, so that an ordinary definition never has to build pint's registry; a test holds each entry
against pint. Everything else is taken apart here, by a grammar of names, powers, products and one quotient, and each name
is looked up on its own. No text of a user ever reaches pint's expression parser.
"""

from __future__ import annotations

import difflib
import importlib
import re
from functools import lru_cache
from typing import Any

from circuitlint.si import DIMENSIONS

EVERYDAY: dict[str, tuple[str, float]] = {
    "ohm": ("ohm", 1.0), "mohm": ("ohm", 1e-3), "kohm": ("ohm", 1e3), "Mohm": ("ohm", 1e6),
    "H": ("henry", 1.0), "mH": ("henry", 1e-3), "uH": ("henry", 1e-6),
    "F": ("farad", 1.0), "mF": ("farad", 1e-3), "uF": ("farad", 1e-6), "nF": ("farad", 1e-9), "pF": ("farad", 1e-12),
    "V": ("volt", 1.0), "mV": ("volt", 1e-3), "kV": ("volt", 1e3),
    "A": ("ampere", 1.0), "mA": ("ampere", 1e-3), "kA": ("ampere", 1e3), "uA": ("ampere", 1e-6),
    "Hz": ("hertz", 1.0), "kHz": ("hertz", 1e3),
    "W": ("watt", 1.0), "mW": ("watt", 1e-3), "kW": ("watt", 1e3),
    "var": ("var", 1.0), "kvar": ("var", 1e3), "VA": ("volt_ampere", 1.0), "kVA": ("volt_ampere", 1e3),
    "J": ("joule", 1.0), "mJ": ("joule", 1e-3), "m": ("meter", 1.0), "mm": ("meter", 1e-3), "cm": ("meter", 1e-2),
    "km": ("meter", 1e3), "ft": ("meter", 0.3048), "mm2": ("meter ** 2", 1e-6), "s": ("second", 1.0), "ms": ("second", 1e-3),
    "min": ("second", 60.0), "h": ("second", 3600.0), "K": ("kelvin", 1.0), "K/W": ("kelvin / watt", 1.0),
    "ohm/km": ("ohm / meter", 1e-3), "mohm/m": ("ohm / meter", 1e-3), "W/m": ("watt / meter", 1.0),
    "uF/km": ("farad / meter", 1e-9), "nF/km": ("farad / meter", 1e-12), "A2s": ("ampere ** 2 * second", 1.0),
    "V/Hz": ("volt / hertz", 1.0), "deg": ("radian", 0.017453292519943295), "rad": ("radian", 1.0), "S": ("siemens", 1.0),
}
"""Everyday unit texts: the coherent SI unit, as `circuitlint.si` spells it, and the factor to it."""

CELSIUS = ("degC", "°C", "\u2103")
_SPELLINGS = {"\u2126": "ohm", "\u03a9": "ohm", "\u00b5": "u", "\u03bc": "u", "²": "2", "³": "3", "·": "*"}
_FACTOR = re.compile(r"([A-Za-z]{1,24})([1-9])?")
_OWN = {"var": ("var", 1.0), "VA": ("volt_ampere", 1.0)}


class UnknownUnit(Exception):
    """The text names no unit; `nearest` is the nearest known one or empty."""

    def __init__(self, text: str, nearest: str) -> None:
        self.nearest = nearest
        super().__init__(text)


def plain(text: str) -> str:
    """A unit text in plain letters: `µF`, `Ω/km`, `mm²` to `uF`, `ohm/km`, `mm2`."""
    for letter, spelling in _SPELLINGS.items():
        text = text.replace(letter, spelling)
    return "".join(text.split())


@lru_cache(maxsize=4096)
def resolve(text: str) -> tuple[str, float]:
    """The coherent SI unit that a unit text belongs to, and the factor to it. Raises UnknownUnit.

    The unit is one that `circuitlint.si` names, or pint's own spelling of base units where the trade has no name for it.
    """
    name = plain(text)
    if name in EVERYDAY:
        return EVERYDAY[name]
    return through_pint(name)


def through_pint(name: str) -> tuple[str, float]:
    """The same by pint alone, name by name. Raises UnknownUnit."""
    if name.count("/") > 1 or not name.isascii():
        raise UnknownUnit(name, nearest(name))
    above, _, below = name.partition("/")
    quantity = _product(above, name)
    if below:
        quantity = quantity / _product(below, name)
    for dimension in DIMENSIONS.values():
        if dimension.unit == "degC" or (_is_var(name) != (dimension.unit == "var")):
            continue
        unit = _registry().volt * _registry().ampere if dimension.unit in ("var", "volt_ampere") else None
        wanted = unit if unit is not None else _coherent(dimension.unit)
        if dimension.unit == "watt" and name.endswith("VA"):
            continue
        if dimension.unit == "volt_ampere" and not name.endswith("VA"):
            continue
        if quantity.dimensionality == wanted.dimensionality:
            return dimension.unit, float((quantity / wanted).to_base_units().magnitude)
    base = quantity.to_base_units()
    return str(base.units), float(base.magnitude)


def _is_var(name: str) -> bool:
    return name.endswith("var")


def _product(text: str, whole: str) -> Any:
    quantity: Any = None
    for position, factor in enumerate(text.split("*")):
        found = _FACTOR.fullmatch(factor)
        if found is None or position > 3:
            raise UnknownUnit(whole, nearest(whole))
        one = _one(found[1], whole) ** int(found[2] or 1)
        quantity = one if quantity is None else quantity * one
    return quantity


def _one(name: str, whole: str) -> Any:
    registry = _registry()
    for suffix, spelled in (("var", "volt_ampere"), ("VA", "volt_ampere")):
        if name.endswith(suffix) and len(name) <= len(suffix) + 1:
            scale = {"": 1.0, "m": 1e-3, "k": 1e3, "M": 1e6}.get(name[: -len(suffix)])
            if scale is not None:
                return scale * registry.Quantity(1.0, spelled)
    names = registry.parse_unit_name(name)
    if not names:
        raise UnknownUnit(whole, nearest(whole))
    prefix, unit, _ = names[0]
    one = registry.Quantity(1.0, prefix + unit)
    if unit.startswith("delta_") or not one._is_multiplicative:
        raise UnknownUnit(whole, nearest(whole))
    return one


@lru_cache(maxsize=64)
def _coherent(unit: str) -> Any:
    """One of a unit written by this package, not by a user."""
    return _registry().Quantity(1.0, unit)


@lru_cache(maxsize=1)
def _registry() -> Any:
    """pint's registry, built when a unit is not an everyday one. Loading it by name keeps it off the usual way in."""
    return importlib.import_module("pint").UnitRegistry(cache_folder=None)


def nearest(text: str) -> str:
    """The nearest everyday unit, or an empty text."""
    name = plain(text)
    folded = {known.lower(): known for known in EVERYDAY}
    if name.lower() in folded:
        return folded[name.lower()]
    close = difflib.get_close_matches(name, EVERYDAY, 1, 0.6)
    return close[0] if close else ""
