"""Axes: round steps, and the unit a magnitude is read in."""

from __future__ import annotations

import math

from circuitlint.reports.page.text import MINUS
from circuitlint.si import DIMENSIONS

_PREFIXES = ((1e9, "G"), (1e6, "M"), (1e3, "k"), (1.0, ""), (1e-3, "m"), (1e-6, "µ"), (1e-9, "n"), (1e-12, "p"))


def unit_of(largest: float, dimension: str) -> tuple[float, str]:
    """What one step of the printed number is worth in the SI unit, and the unit's symbol, up to `largest`."""
    known = DIMENSIONS.get(dimension)
    if known is None:
        return 1.0, dimension
    if known.name == "angle":
        return math.pi / 180.0, "°"
    if known.name == "cross-section":
        return 1e-6, "mm²"
    if not known.prefixed or not math.isfinite(largest) or largest <= 0.0:
        return 1.0, known.symbol
    for factor, prefix in _PREFIXES:
        if largest >= factor:
            return factor, prefix + known.symbol
    return 1.0, known.symbol


def step_of(span: float, most: int) -> float:
    """The round step (1, 2 or 5 with a power of ten) that divides a span into at most `most` parts."""
    if not math.isfinite(span) or span <= 0.0 or most < 1:
        return 1.0
    ten = 10.0 ** math.floor(math.log10(span / most))
    for times in (1.0, 2.0, 5.0, 10.0, 20.0):
        if ten * times * most >= span * (1.0 - 1e-9):
            return ten * times
    return ten * 50.0


def round_below(value: float) -> float:
    """The largest round number (1, 2 or 5 with a power of ten) that is not above a positive value."""
    ten = 10.0 ** math.floor(math.log10(value) + 1e-9)
    return next((ten * times for times in (5.0, 2.0) if ten * times <= value), ten)


def ticks(low: float, high: float, most: int) -> list[float]:
    """Round values between two ends, both included where they are round."""
    step = step_of(high - low, most)
    first, last = math.ceil(low / step - 1e-9), math.floor(high / step + 1e-9)
    return [index * step for index in range(first, min(last, first + 50) + 1)]


def tick_text(value: float, step: float) -> str:
    """A round value with as many digits after the point as its step has."""
    digits = max(0, -math.floor(math.log10(step) + 1e-9)) if step > 0.0 else 0
    text = f"{value:.{min(digits, 12)}f}"
    return "0" if float(text) == 0.0 else text.replace("-", MINUS)
