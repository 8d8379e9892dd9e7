"""What can be bought: preferred values, sections and steps, and the nearest of them."""

from __future__ import annotations

import math
from collections.abc import Sequence
from typing import Literal

from circuitlint.errors import OutOfTable
from circuitlint.sources import Source
from circuitlint.tables.files import data, pick, source

Towards = Literal["down", "up", "nearest"]
SAME = 1e-9


def series(name: str) -> tuple[tuple[float, ...], Source]:
    """Values of one decade of E3, E6, E12 or E24. Raises OutOfTable. Source: IEC 60063."""
    table = data("preferred")["series"]
    found = pick({one: table[one] for one in ("E3", "E6", "E12", "E24")}, name, "series")
    return tuple(float(one) for one in found), source(table["source"])


def preferred_value(value: float, name: str, towards: Towards) -> tuple[float, Source]:
    """Value of an E series next to a positive finite `value`, in the same unit. Raises OutOfTable.

    Nearest means nearest by ratio. A value that is preferred is given back.
    """
    if not (value > 0.0 and math.isfinite(value)):
        raise OutOfTable(f"{value:g} has no preferred value; a number above zero has")
    decade, where = series(name)
    power = math.floor(math.log10(value))
    near = [digit * 10.0**exponent for exponent in range(power - 1, power + 2) for digit in decade]
    return _next_to(value, near, towards, "value"), where


def sections() -> tuple[tuple[float, ...], Source]:
    """Nominal sections in m², rising. Source: IEC 60228."""
    table = data("preferred")["sections"]
    return tuple(float(one) * 1e-6 for one in table["mm2"]), source(table["source"])


def preferred_section(section: float, towards: Towards) -> tuple[float, Source]:
    """Nominal section next to `section`, in m². Raises OutOfTable beyond the last one."""
    present, where = sections()
    return _next_to(section, present, towards, "section"), where


def correction_steps(market: str) -> tuple[tuple[float, ...], Source]:
    """Steps of correction capacitors in var: 60-hz or metric market. Raises OutOfTable."""
    tables = data("preferred")
    table = pick({"60-hz": tables["kvar"], "metric": tables["kvar-metric"]}, market, "market")
    return tuple(float(one) * 1e3 for one in table["steps"]), source(table["source"])


def next_rating(value: float, ratings: Sequence[float], towards: Towards) -> float:
    """Rating next to `value` among `ratings`. Raises OutOfTable where there is none that way."""
    return _next_to(value, ratings, towards, "rating")


def _next_to(value: float, present: Sequence[float], towards: Towards, what: str) -> float:
    below = [one for one in present if one <= value * (1.0 + SAME)]
    above = [one for one in present if one >= value * (1.0 - SAME)]
    if towards == "down" and below:
        return max(below)
    if towards == "up" and above:
        return min(above)
    if towards == "nearest" and value > 0.0 and (below or above):
        return min((*below[-1:], *above[:1]), key=lambda one: abs(math.log(one / value)))
    raise OutOfTable(f"{what} {value:g} has none {towards}; tabled are {min(present):g} to {max(present):g}")
