"""Every table file names its sources, and what a table is held against by physics, algebra or another table."""

from __future__ import annotations

import math
from collections.abc import Iterator, Mapping
from importlib import resources
from typing import Any, get_args

import pytest
import yaml

from circuitlint.physics.fault_loop import withstand_constant
from circuitlint.sources import Known
from circuitlint.tables import ampacity, materials, short_circuit, us_conductors
from circuitlint.tables.files import data

FILES = sorted(one.name.removesuffix(".yaml") for one in resources.files("circuitlint.tables").joinpath("data").iterdir())


def sources_in(entry: Any) -> Iterator[Mapping[str, str]]:
    """Every source of a data file, at any depth."""
    if isinstance(entry, dict):
        if isinstance(entry.get("source"), dict):
            yield entry["source"]
        for one in entry.values():
            yield from sources_in(one)


def figures_without_source(entry: Any, path: str = "") -> Iterator[str]:
    """Places of numbers that no source stands above."""
    if isinstance(entry, dict):
        if "source" not in entry:
            for key, one in entry.items():
                yield from figures_without_source(one, f"{path}.{key}")
    elif isinstance(entry, list):
        for one in entry:
            yield from figures_without_source(one, path)
    elif isinstance(entry, (int, float)):
        yield path


@pytest.mark.parametrize("name", FILES)
def test_every_figure_stands_under_a_source_that_says_how_it_is_known(name: str) -> None:
    found = list(sources_in(data(name)))
    assert found
    for one in found:
        assert one["work"]
        assert one.get("known", "read") in get_args(Known)
        assert set(one) <= {"work", "place", "edition", "known", "note"}
        assert all(isinstance(word, str) for word in one.values())
    assert sorted(set(figures_without_source(data(name)))) == []


def test_a_file_is_read_once_and_only_when_asked_for() -> None:
    assert data("meters") is data("meters")


@pytest.mark.parametrize("name", FILES)
def test_the_files_hold_plain_data_that_any_safe_reader_reads(name: str) -> None:
    text = resources.files("circuitlint.tables").joinpath("data", f"{name}.yaml").read_text(encoding="utf-8")
    assert yaml.load(text, Loader=yaml.SafeLoader) == data(name)


# IEC 60364-5-52, annex D (value from memory): ampacity = A · section^m, by table, metal and method, up to a section in mm².
# The figures are a checksum for the tables, which are read cell by cell; sections of nominal 50 mm² are really 47.5 mm².
SMOOTH: dict[str, dict[str, dict[str, list[tuple[float, float, float]]]]] = {
    "pvc-70-2": {
        "copper": {
            "A1": [(300, 11.2, 0.6118)], "A2": [(120, 10.8, 0.6015), (300, 10.19, 0.6118)], "B1": [(300, 13.5, 0.625)],
            "B2": [(300, 13.1, 0.6)], "C": [(300, 15, 0.625)], "D1": [(300, 17.42, 0.54)],
        },
        "aluminium": {
            "A1": [(300, 8.61, 0.616)], "A2": [(120, 8.361, 0.6025), (300, 7.84, 0.616)], "B1": [(300, 10.51, 0.6254)],
            "B2": [(300, 10.24, 0.5994)], "C": [(16, 11.6, 0.625), (300, 10.55, 0.64)], "D1": [(300, 13.6, 0.54)],
        },
    },
    "xlpe-90-2": {
        "copper": {
            "A1": [(300, 14.9, 0.611)], "A2": [(120, 14.46, 0.598), (300, 13.56, 0.611)], "B1": [(300, 17.76, 0.625)],
            "B2": [(300, 17.25, 0.6)], "C": [(16, 18.77, 0.628), (300, 17, 0.65)], "D1": [(300, 20.25, 0.542)],
        },
        "aluminium": {
            "A1": [(300, 11.6, 0.615)], "A2": [(120, 11.26, 0.602), (300, 10.56, 0.615)], "B1": [(300, 13.95, 0.627)],
            "B2": [(300, 13.5, 0.603)], "C": [(16, 14.8, 0.625), (300, 12.6, 0.648)], "D1": [(300, 15.82, 0.541)],
        },
    },
    "pvc-70-3": {
        "copper": {
            "A1": [(300, 10.4, 0.605)], "A2": [(120, 10.1, 0.592), (300, 9.462, 0.605)], "B1": [(300, 11.84, 0.628)],
            "B2": [(300, 11.65, 0.6005)], "C": [(16, 13.5, 0.625), (300, 12.4, 0.635)], "D1": [(300, 14.34, 0.542)],
        },
        "aluminium": {
            "A1": [(300, 7.94, 0.612)], "A2": [(120, 7.712, 0.5984), (300, 7.225, 0.612)], "B1": [(300, 9.265, 0.627)],
            "B2": [(300, 9.03, 0.601)], "C": [(16, 10.5, 0.625), (300, 9.536, 0.6324)], "D1": [(300, 11.2, 0.542)],
        },
    },
    "xlpe-90-3": {
        "copper": {
            "A1": [(300, 13.34, 0.611)], "A2": [(120, 12.95, 0.598), (300, 12.14, 0.611)], "B1": [(300, 15.62, 0.6252)],
            "B2": [(300, 15.17, 0.6)], "C": [(16, 17, 0.623), (300, 15.4, 0.635)], "D1": [(300, 16.88, 0.539)],
        },
        "aluminium": {
            "A1": [(300, 10.9, 0.605)], "A2": [(120, 10.58, 0.592), (300, 9.92, 0.605)], "B1": [(300, 12.3, 0.63)],
            "B2": [(300, 11.95, 0.605)], "C": [(16, 13.5, 0.625), (300, 11.5, 0.639)], "D1": [(300, 13.2, 0.539)],
        },
    },
}  # fmt: skip


def smooth(section: float, pieces: list[tuple[float, float, float]]) -> float:
    real = 47.5 if section == 50 else section
    _, factor, exponent = next(one for one in pieces if section <= one[0])
    return factor * real**exponent


@pytest.mark.parametrize("name", SMOOTH)
@pytest.mark.parametrize("metal", ["copper", "aluminium"])
def test_ampacities_lie_on_the_smooth_curve_of_their_column(name: str, metal: str) -> None:
    """Within 4 %. Above 120 mm² the tables of methods B1 and B2 lie up to a tenth below the curve, and never above it."""
    insulation, _, loaded = name.rpartition("-")
    for method, pieces in SMOOTH[name][metal].items():
        for row in data("ampacity")["tables"][name][metal]["rows"]:
            tabled, _ = ampacity.ampacity(row[0] * 1e-6, method, insulation, metal, int(loaded))
            ratio = tabled / smooth(row[0], pieces)
            low = 0.89 if method in ("B1", "B2") and row[0] >= 150 else 0.96
            assert low <= ratio <= 1.04, f"{method} {row[0]} mm²: {tabled} A, {ratio:.3f} of the curve"


def test_the_better_insulation_and_the_fewer_loaded_conductors_carry_more() -> None:
    for metal in ("copper", "aluminium"):
        for row in data("ampacity")["tables"]["pvc-70-3"][metal]["rows"]:
            for method in ("A1", "A2", "B1", "B2", "C", "D1"):
                section = row[0] * 1e-6
                three = ampacity.ampacity(section, method, "pvc-70", metal, 3)[0]
                assert three < ampacity.ampacity(section, method, "pvc-70", metal, 2)[0]
                assert three < ampacity.ampacity(section, method, "xlpe-90", metal, 3)[0]


def test_aluminium_carries_less_than_copper() -> None:
    for name, table in data("ampacity")["tables"].items():
        insulation, _, loaded = name.rpartition("-")
        for row in table["aluminium"]["rows"]:
            for method in ("A1", "A2", "B1", "B2", "C", "D1"):
                copper = ampacity.ampacity(row[0] * 1e-6, method, insulation, "copper", int(loaded))[0]
                assert 0.7 * copper < ampacity.ampacity(row[0] * 1e-6, method, insulation, "aluminium", int(loaded))[0] < copper


WITHSTANDS = [
    (kind, insulation, metal)
    for kind in ("live", "separate")
    for insulation, entry in data("short_circuit")[kind]["insulation"].items()
    for metal in ("copper", "aluminium", "steel")
    if entry.get(metal)
]


@pytest.mark.parametrize(("kind", "insulation", "metal"), WITHSTANDS)
def test_every_k_follows_from_the_constants_of_its_metal(kind: str, insulation: str, metal: str) -> None:
    look_up = short_circuit.live_conductor if kind == "live" else short_circuit.separate_protective_conductor
    tabled = look_up(insulation, metal)
    made = withstand_constant(
        volumetric_heat=materials.volumetric_heat(metal)[0], resistivity_20=materials.resistivity(metal)[0],
        inferred_zero=materials.inferred_zero(metal)[0], initial=tabled.initial, final=tabled.final,
    )  # fmt: skip
    assert float(made) == pytest.approx(tabled.constant, rel=0.012)


@pytest.mark.parametrize("place", ["visible", "normal", "fire-risk"])
@pytest.mark.parametrize("metal", ["copper", "aluminium", "steel"])
def test_every_k_of_a_bare_conductor_follows_too(place: str, metal: str) -> None:
    tabled = short_circuit.bare_protective_conductor(place, metal)
    made = withstand_constant(
        volumetric_heat=materials.volumetric_heat(metal)[0], resistivity_20=materials.resistivity(metal)[0],
        inferred_zero=materials.inferred_zero(metal)[0], initial=tabled.initial, final=tabled.final,
    )  # fmt: skip
    assert float(made) == pytest.approx(tabled.constant, rel=0.012)


def test_conductor_resistance_is_never_below_that_of_its_nominal_metal() -> None:
    """The section is a label: the resistance allowed is 2 to 20 % above resistivity over section."""
    table = data("conductors")
    for name, column in table["columns"].items():
        resistivity = materials.resistivity("aluminium" if name.startswith("aluminium") else "copper")[0] * 1e9
        for section, value in zip(table["section_mm2"], column, strict=True):
            if value is not None:
                assert 1.02 < value * section / resistivity < 1.2, f"{name} {section} mm²"


def test_classes_stand_in_order_of_resistance() -> None:
    columns = data("conductors")["columns"]
    for solid, stranded, coated in zip(columns["copper-1"], columns["copper-2"], columns["copper-coated-2"], strict=True):
        assert stranded <= solid
        assert coated > stranded


def test_warm_resistances_of_the_handbook_follow_the_conductor_standard() -> None:
    """Up to 95 mm² the handbook's values at 90 °C are those of IEC 60228 times 324.5 / 254.5; beyond, skin effect adds."""
    table = data("conductors")
    cold = dict(zip(table["section_mm2"], table["columns"]["copper-2"], strict=True))
    for section, warm in zip(table["warm"]["section_mm2"], table["warm"]["values"], strict=True):
        ratio = warm / (cold[section] * 324.5 / 254.5)
        assert 0.995 < ratio < (1.01 if section <= 95 else 1.05), f"{section} mm²"


def test_the_effective_impedances_of_the_nec_follow_from_its_resistances_and_reactances() -> None:
    """Within rounding of two printed digits; 10 AWG and 1 AWG in PVC are printed 5 % higher."""
    sine = math.sin(math.acos(0.85))
    for conduit in ("pvc", "aluminium", "steel"):
        for size in data("us_conductors")["effective"]["size"]:
            resistance, _ = us_conductors.alternating_resistance_per_metre(size, "copper", conduit)
            reactance, _ = us_conductors.reactance_per_metre(size, conduit)
            printed, _ = us_conductors.effective_impedance_per_metre(size, conduit)
            allowed = 0.06 if size in ("10", "1") else 0.05
            assert 0.85 * resistance + sine * reactance == pytest.approx(printed, rel=allowed), f"{size} {conduit}"


def test_solid_american_conductors_follow_from_the_gauge_formula() -> None:
    for size in ("14", "12", "10", "8"):
        diameter = 0.127e-3 * 92.0 ** ((36 - int(size)) / 39.0)
        made = 1.7241e-8 / (math.pi / 4.0 * diameter**2) * (234.5 + 75.0) / 254.5
        solid, _ = us_conductors.direct_resistance_per_metre(size, "copper", "solid")
        stranded, _ = us_conductors.direct_resistance_per_metre(size, "copper", "stranded")
        assert made == pytest.approx(solid, rel=0.004)
        assert stranded == pytest.approx(1.02 * solid, rel=0.01)


def test_rounded_temperature_factors_follow_their_rule() -> None:
    for temperature in (30, 40, 50, 60, 70, 80, 90):
        factor, _ = materials.rounded_temperature_factor(temperature)
        assert factor == pytest.approx(250.0 / (230.0 + temperature), abs=0.0005001)
