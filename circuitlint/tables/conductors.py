"""Largest resistance of a conductor of a nominal section, IEC 60228."""

from __future__ import annotations

from collections.abc import Sequence

from circuitlint.sources import Source
from circuitlint.tables.files import data, pick, place_of, source


def row_of(section: float, sections: Sequence[float], what: str) -> int:
    """The row of a section given in m² among sections in mm². Raises OutOfTable, naming those that are tabled."""
    return place_of(section * 1e6, sections, what, "mm²")


def resistance_per_metre(section: float, material: str, conductor_class: int) -> tuple[float, Source]:
    """Largest direct-current resistance allowed at 20 °C, in Ω/m of one conductor. Raises OutOfTable.

    `section` in m²; `material`: copper, copper-coated or aluminium; class 1 (solid), 2 (stranded) or 5 (flexible).
    """
    table = data("conductors")
    name = f"{material}-{conductor_class}"
    column = pick(table["columns"], name, "conductor")
    present = [one for one, value in zip(table["section_mm2"], column, strict=True) if value is not None]
    values = [value for value in column if value is not None]
    row = row_of(section, present, f"{material} of class {conductor_class}")
    known = "value from memory" if present[row] in table["remembered"].get(name, ()) else "read"
    return float(values[row]) * 1e-3, source(table["source"], known=known)


def typical_reactance_per_metre(section: float, make: str) -> tuple[float, Source]:
    """Typical reactance of one conductor at 50 Hz, in Ω/m. Raises OutOfTable.

    `section` in m²; `make`: multicore-armoured, multicore or single-core. Two makes differ by 5 to 15 %.
    """
    table = data("conductors")["reactance"]
    column = pick({key: one for key, one in table.items() if key != "section_mm2"}, make, "cable")
    row = row_of(section, table["section_mm2"], "a typical reactance")
    return float(column["values"][row]) * 1e-3, source(column["source"])


def warm_resistance_per_metre(section: float) -> tuple[float, Source]:
    """Alternating-current resistance of copper at 90 °C and 50 Hz, in Ω/m, skin and proximity effect included.

    `section` in m². Raises OutOfTable.
    """
    table = data("conductors")["warm"]
    row = row_of(section, table["section_mm2"], "a warm resistance")
    return float(table["values"][row]) * 1e-3, source(table["source"])
