"""Test meters: what their current inputs carry, and the categories of places."""

from __future__ import annotations

from circuitlint.sources import Source
from circuitlint.tables.files import data, figures, pick, place_of, source


def in_line_input(meter: str) -> tuple[float, float, Source]:
    """Current in A that a usual in-line input carries, and for how many seconds. Raises OutOfTable.

    `meter`: handheld, handheld-other or bench. The meter's own sheet prevails; without it the shorter time holds.
    """
    table = data("meters")["in-line"]
    entry = pick(figures(table), meter, "meter")
    return float(entry["ampere"]), float(entry["second"]), source(table["source"])


def full_scale_burden(input_kind: str) -> tuple[float, Source]:
    """Burden voltage at full scale in V of the ampere or milliampere input. Raises OutOfTable."""
    table = data("meters")["in-line"]
    entry = table["handheld"]
    choices = {"ampere": entry["burden_ampere_range"], "milliampere": entry["burden_milliampere_range"]}
    return float(pick(choices, input_kind, "input")), source(table["source"])


def category_place(category: str) -> tuple[str, Source]:
    """Where a measurement category (II, III, IV) belongs, in words. Raises OutOfTable. Source: IEC 61010-1."""
    table = data("meters")["category"]
    return str(pick(table["place"], category, "category")), source(table["source"])


def category_impulse(category: str, voltage: float) -> tuple[float, Source]:
    """Impulse in V (peak) a category stands for at a voltage to earth of 300, 600 or 1000 V. Raises OutOfTable."""
    table = data("meters")["impulse"]
    column = pick({one: place for place, one in enumerate(table["columns"]) if place}, category, "category")
    row = place_of(voltage, [one[0] for one in table["rows"]], "an impulse", "V")
    return float(table["rows"][row][column]), source(table["source"])
