"""Resistance and reactance of conductors by American sizes, NEC chapter 9, tables 8 and 9, at 75 °C."""

from __future__ import annotations

from typing import Any

from circuitlint.sources import Source
from circuitlint.tables.files import data, noted, pick, source

PER_THOUSAND_FEET = 1.0 / 304.8
"""Ω per 1000 ft in Ω/m: a foot is 0.3048 m by definition."""


def direct_resistance_per_metre(size: str, material: str, make: str) -> tuple[float, Source]:
    """Direct-current resistance at 75 °C in Ω/m. Raises OutOfTable. Source: NEC chapter 9, table 8.

    `size`: 14 to 1, 1/0 to 4/0, 250 to 1000 (thousands of circular mils), as text; `material` copper or aluminium;
    `make` stranded or solid.
    """
    table = data("us_conductors")["direct"]
    columns = {key: one for key, one in table.items() if key not in ("source", "size")}
    column = pick(columns, f"{material}-{make}", "conductor")
    return _beside(table["size"], size, column, f"{material} {make}"), source(table["source"])


def alternating_resistance_per_metre(size: str, material: str, conduit: str) -> tuple[float, Source]:
    """Alternating-current resistance to neutral at 75 °C and 60 Hz, in Ω/m. Raises OutOfTable. Source: table 9.

    `conduit`: pvc, aluminium or steel.
    """
    table = data("us_conductors")["alternating"]
    column = pick(pick(table["resistance"], material, "conductor"), conduit, "conduit")
    where = source(table["source"])
    for doubted, metal, way, doubt in table["doubts"]:
        if (doubted, metal, way) == (size, material, conduit):
            where = noted(where, doubt)
    return _beside(table["size"], size, column, f"{material} in {conduit} conduit"), where


def reactance_per_metre(size: str, conduit: str) -> tuple[float, Source]:
    """Reactance to neutral at 60 Hz in Ω/m, in pvc, aluminium or steel conduit. Raises OutOfTable. Source: table 9."""
    table = data("us_conductors")["alternating"]
    column = pick(table["reactance"], conduit, "conduit")
    return _beside(table["size"], size, column, f"reactance in {conduit} conduit"), source(table["source"])


def effective_impedance_per_metre(size: str, conduit: str) -> tuple[float, Source]:
    """Effective impedance of copper at power factor 0.85, in Ω/m; for voltage drop, not for fault currents.

    Raises OutOfTable. Source: table 9.
    """
    table = data("us_conductors")["effective"]
    column = pick(table["copper"], conduit, "conduit")
    known = "value from memory" if size in table["remembered"].get(conduit, ()) else "read"
    return _beside(table["size"], size, column, f"copper in {conduit} conduit"), source(table["source"], known=known)


def _beside(sizes: list[str], size: str, column: list[Any], what: str) -> float:
    return float(pick(dict(zip(sizes, column, strict=True)), size, f"{what}, size")) * PER_THOUSAND_FEET
