"""Current-carrying capacities and their factors, IEC 60364-5-52. Nothing is interpolated or extrapolated."""

from __future__ import annotations

from bisect import bisect_left

from circuitlint.errors import OutOfTable
from circuitlint.sources import Source
from circuitlint.tables.conductors import row_of
from circuitlint.tables.files import data, figures, noted, pick, place_of, source


def ampacity(
    section: float, method: str, insulation: str, material: str, loaded_conductors: int
) -> tuple[float, Source]:
    """Ampere of a run at its reference ambient, not grouped. Raises OutOfTable. Source: tables B.52.2 to B.52.5.

    `section` in m²; `method` A1, A2, B1, B2, C, D1 or D2; `insulation` pvc-70 or xlpe-90; `material` copper or aluminium;
    `loaded_conductors` 2 (single-phase, direct current) or 3. The source says of each figure whether it was read.
    """
    file = data("ampacity")
    table = pick(file["tables"], f"{insulation}-{loaded_conductors}", "insulation and number of loaded conductors")
    metal = pick({one: table[one] for one in ("copper", "aluminium")}, material, "conductor")
    column = _column(file["methods"], method)
    rows = [row for row in metal["rows"] if row[column] is not None]
    row = rows[row_of(section, [one[0] for one in rows], f"{material}, {insulation}, method {method}")]
    seen = metal["read"].get(method)
    known = "read" if seen and seen[0] <= row[0] <= seen[1] else "value from memory"
    where = source(file["source"], place=table["place"], known=known)
    for doubted, way, size, doubt in table.get("doubts", ()):
        if (doubted, way, size) == (material, method, row[0]):
            where = noted(where, doubt)
    return float(row[column]), where


def open_laying_ampacity(section: float, laying: str) -> tuple[float, Source]:
    """Ampere of copper, PVC, three loaded conductors in free air or on a tray. Raises OutOfTable. Source: table B.52.10.

    `section` in m²; `laying`: E, F-trefoil, F-flat-touching, G-horizontal or G-vertical.
    """
    table = data("ampacity")["open-laying"]
    column = _column(table["layings"], laying)
    rows = [row for row in table["rows"] if row[column] is not None]
    row = rows[row_of(section, [one[0] for one in rows], f"laying {laying}")]
    return float(row[column]), source(table["source"])


def _column(methods: list[str], method: str) -> int:
    return int(pick({one: number for number, one in enumerate(methods, 1)}, method, "method"))


def grouping_factor(circuits: int, arrangement: str = "bunched", method: str | None = None) -> tuple[float, Source]:
    """Factor for circuits that are alike, equally loaded and laid together. Raises OutOfTable. Source: table B.52.17.

    `arrangement`: bunched, wall, ceiling, perforated-tray or ladder. Between tabled numbers the next higher one is taken,
    and the source says so. Buried cables have tables of their own: with `method` D1 or D2 a group is refused.
    """
    table = data("derating")["grouping"]
    if method in ("D1", "D2") and circuits > 1:
        raise OutOfTable(f"{circuits} circuits in method {method} are not tabled; the table is for cables in air")
    columns = {key: one for key, one in table.items() if key not in ("source", "note", "circuits", "remembered")}
    column = pick(columns, arrangement, "arrangement")
    pairs = [(n, one) for n, one in zip(table["circuits"], column, strict=True) if one is not None]
    at = bisect_left([n for n, _ in pairs], circuits)
    if circuits < 1 or at == len(pairs):
        raise OutOfTable(f"{circuits} circuits, {arrangement}, are not tabled; tabled are 1 to {pairs[-1][0]}")
    tabled, factor = pairs[at]
    place = table["source"]["place"]
    if tabled != circuits:
        place = f"{place}, the column for {tabled} circuits"
    known = "value from memory" if tabled in table["remembered"].get(arrangement, ()) else "read"
    return float(factor), source(table["source"], place=place, known=known)


def highest_temperature(insulation: str) -> tuple[float, Source]:
    """Highest conductor temperature in service, in °C. Raises OutOfTable."""
    table = data("derating")["highest-temperature"]
    return float(pick(figures(table), insulation, "insulation")), source(table["source"])


def reference_ambient(method: str) -> tuple[float, Source]:
    """Ambient the tabled ampacities hold at, in °C: 30 in air, 20 in the ground. Raises OutOfTable."""
    table = data("derating")["reference-ambient"]
    return float(table[_around(method)]), source(table["source"])


def ambient_factor(ambient: float, insulation: str, method: str) -> tuple[float, Source]:
    """Tabled factor for a tabled ambient temperature. Raises OutOfTable. Source: tables B.52.14 and B.52.15.

    The formula of the same name gives every tabled factor, and those between.
    """
    table = data("derating")[f"ambient-{_around(method)}"]
    column = pick({one: table[one] for one in ("pvc-70", "xlpe-90")}, insulation, "insulation")
    present = [(at, factor) for at, factor in zip(table["ambient"], column, strict=True) if factor is not None]
    row = place_of(ambient, [at for at, _ in present], f"{insulation}, method {method}", "°C")
    low, high = table["read"][insulation]
    known = "read" if low <= present[row][0] <= high else "value from memory"
    return float(present[row][1]), source(table["source"], known=known)


def soil_factor(thermal_resistivity: float, method: str) -> tuple[float, Source]:
    """Factor for soil of another thermal resistivity (K·m/W) than 2.5, method D1 or D2. Raises OutOfTable."""
    table = data("ampacity")["soil"]
    column = pick({one: table[one] for one in ("D1", "D2")}, method, "method")
    row = place_of(thermal_resistivity, table["thermal_resistivity"], "soil", "K·m/W")
    return float(column[row]), source(table["source"])


def _around(method: str) -> str:
    return str(pick({**dict.fromkeys(("A1", "A2", "B1", "B2", "C", "E", "F", "G"), "air"), "D1": "ground", "D2": "ground"},
                    method, "method"))
