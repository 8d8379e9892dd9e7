"""Constants of conductor and winding metals."""

from __future__ import annotations

from circuitlint.sources import Source
from circuitlint.tables.files import data, pick, place_of, source

METALS = ("copper", "aluminium", "lead", "steel")


def _of(material: str, what: str) -> tuple[float, Source]:
    table = data("materials")
    metal = pick({one: table[one] for one in METALS}, material, "metal")
    return float(metal[what]), source(table["source"])


def inferred_zero(material: str) -> tuple[float, Source]:
    """B of R(t) = R20 · (B + t) / (B + 20), in kelvin, for copper, aluminium, lead or steel. Raises OutOfTable."""
    return _of(material, "inferred_zero")


def resistivity(material: str) -> tuple[float, Source]:
    """Resistivity at 20 °C in ohm metre. Raises OutOfTable."""
    value, where = _of(material, "resistivity_20_ohm_mm2_per_m")
    return value * 1e-6, where


def volumetric_heat(material: str) -> tuple[float, Source]:
    """Heat taken up by volume in J/(K·m³). Raises OutOfTable."""
    value, where = _of(material, "heat_J_per_K_mm3")
    return value * 1e9, where


def winding_zero(material: str) -> tuple[float, Source]:
    """The constant k of a winding's resistance as test texts have it, in kelvin: copper or aluminium. Raises OutOfTable.

    For aluminium it differs from the constant of conductors.
    """
    table = data("materials")["winding"]
    return float(pick({one: table[one] for one in ("copper", "aluminium")}, material, "winding of")), source(table["source"])


def temperature_coefficient(material: str) -> tuple[float, Source]:
    """Temperature coefficient of resistance in 1/K; it belongs to 20 °C and no other temperature. Raises OutOfTable."""
    entry = pick(data("materials")["coefficient_20"], material, "metal")
    return float(entry["value"]), source(entry["source"])


def rounded_temperature_factor(temperature: float) -> tuple[float, Source]:
    """Factor of IEC 60228, rounded form, from a resistance at `temperature` (°C) to 20 °C. Raises OutOfTable."""
    table = data("materials")["rounded-factor"]
    return float(table["values"][place_of(temperature, table["temperature"], "the factor", "°C")]), source(table["source"])
