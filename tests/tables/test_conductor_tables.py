"""Conductor and ampacity tables hold what the standards print, and nothing between."""

from __future__ import annotations

import math

import pytest

from circuitlint.errors import OutOfTable
from circuitlint.physics.conductor_heating import ambient_factor as by_formula
from circuitlint.tables import ampacity, conductors, materials
from circuitlint.tables.files import data

# IEC 60228:2004, tables 1 to 3, largest resistance at 20 °C in Ω/km (read).
RESISTANCES = [
    (0.5, "copper", 1, 36.0), (1.5, "copper", 1, 12.1), (1.5, "copper", 2, 12.1), (1.5, "copper", 5, 13.3),
    (2.5, "copper", 5, 7.98), (50, "copper", 2, 0.387), (50, "copper", 5, 0.386), (185, "copper", 1, 0.101),
    (185, "copper", 2, 0.0991), (300, "copper", 2, 0.0601), (16, "aluminium", 2, 1.91), (240, "aluminium", 1, 0.125),
]

# IEC 60364-5-52:2009, tables B.52.2 to B.52.4 (cells read in national documents that carry the same figures).
AMPACITIES = [
    (1.5, "B2", "pvc-70", "copper", 2, 16.5), (2.5, "C", "pvc-70", "copper", 2, 27), (16, "A1", "pvc-70", "copper", 2, 61),
    (1.5, "C", "xlpe-90", "copper", 2, 24), (25, "B1", "xlpe-90", "copper", 2, 133), (1.5, "B1", "pvc-70", "copper", 3, 15.5),
    (16, "C", "pvc-70", "aluminium", 3, 59),
]


@pytest.mark.parametrize(("section", "material", "grade", "printed"), RESISTANCES)
def test_a_resistance_is_the_one_printed(section: float, material: str, grade: int, printed: float) -> None:
    value, source = conductors.resistance_per_metre(section * 1e-6, material, grade)
    assert value * 1e3 == pytest.approx(printed, rel=1e-12)
    assert source.work == "IEC 60228" and source.known == "read"


@pytest.mark.parametrize(("section", "method", "insulation", "material", "loaded", "printed"), AMPACITIES)
def test_an_ampacity_is_the_one_printed(
    section: float, method: str, insulation: str, material: str, loaded: int, printed: float
) -> None:
    value, source = ampacity.ampacity(section * 1e-6, method, insulation, material, loaded)
    assert value == printed
    assert source.known == "read"


def test_a_cell_that_nobody_has_seen_says_so() -> None:
    assert ampacity.ampacity(1.5e-6, "D1", "pvc-70", "copper", 2)[1].known == "value from memory"


def test_nothing_is_given_between_or_beyond_the_tabled_sections() -> None:
    for section in (0.3, 1.6, 400.0):
        with pytest.raises(OutOfTable, match="tabled are"):
            conductors.resistance_per_metre(section * 1e-6, "copper", 2)
    with pytest.raises(OutOfTable):
        ampacity.ampacity(0.75e-6, "B2", "pvc-70", "copper", 2)
    with pytest.raises(OutOfTable):
        conductors.resistance_per_metre(1.5e-6, "aluminium", 5)


def test_resistance_falls_and_ampacity_grows_with_the_section() -> None:
    table = data("conductors")
    for column in table["columns"].values():
        present = [one for one in column if one is not None]
        assert present == sorted(present, reverse=True) and len(set(present)) == len(present)
    for table in data("ampacity")["tables"].values():
        for material in ("copper", "aluminium"):
            for column in range(1, 8):
                values = [row[column] for row in table[material]["rows"] if row[column] is not None]
                assert values == sorted(values) and len(set(values)) == len(values)


def test_the_ambient_table_follows_the_square_root_that_physics_gives() -> None:
    for name, reference in (("ambient-air", 30.0), ("ambient-ground", 20.0)):
        table = data("derating")[name]
        for insulation, highest in (("pvc-70", 70.0), ("xlpe-90", 90.0)):
            for ambient, factor in zip(table["ambient"], table[insulation], strict=True):
                if factor is not None:
                    made = by_formula(ambient=ambient, highest_temperature=highest, reference_ambient=reference)
                    assert math.isclose(float(made), factor, abs_tol=0.0101)


def test_between_tabled_numbers_of_circuits_the_worse_factor_is_taken_and_said() -> None:
    assert ampacity.grouping_factor(3)[0] == 0.7  # IEC 60364-5-52:2009, table B.52.17 (read)
    factor, source = ampacity.grouping_factor(10)
    assert factor == 0.45 and "12 circuits" in source.place
    with pytest.raises(OutOfTable):
        ampacity.grouping_factor(21)
    with pytest.raises(OutOfTable):
        ampacity.grouping_factor(0)


def test_metals_have_the_constants_of_their_standards() -> None:
    assert materials.inferred_zero("copper")[0] == 234.5  # IEC 60287-1-1 (read)
    assert materials.inferred_zero("aluminium")[0] == 228.0
