"""Thermal classes and permitted temperature rises of coils and windings."""

from __future__ import annotations

from circuitlint.sources import Source
from circuitlint.tables.files import data, pick, source


def class_of_letter(letter: str) -> tuple[str, Source]:
    """Thermal class (as text, in °C) that a letter stands for: A, E, B, F, H or N. Raises OutOfTable."""
    table = data("thermal")["thermal-class"]
    return str(pick(table["letters"], letter, "class")), source(table["source"])


def thermal_class_temperature(thermal_class: str) -> tuple[float, Source]:
    """Highest temperature of a thermal class in °C, 105 to 200 as text. Raises OutOfTable. Source: IEC 60085."""
    table = data("thermal")["thermal-class"]
    return float(pick(table["degC"], thermal_class, "thermal class")), source(table["source"])


def coil_rise(thermal_class: str) -> tuple[float, Source]:
    """Permitted rise of a switchgear coil in air by resistance, in K. Raises OutOfTable. Source: IEC 60947-4-1.

    Higher than that of motor windings: the two tables rest on other ambients and are not to be mixed.
    """
    table = data("thermal")["coil-rise"]
    return float(pick(table["kelvin"], thermal_class, "thermal class")), source(table["source"])


def winding_rise(thermal_class: str) -> tuple[float, Source]:
    """Permitted rise of an air-cooled motor winding by resistance, in K. Raises OutOfTable. Source: IEC 60034-1."""
    table = data("thermal")["winding-rise"]
    known = "value from memory" if thermal_class in table["remembered"] else "read"
    return float(pick(table["kelvin"], thermal_class, "thermal class")), source(table["source"], known=known)


def intermittent_duty(duty_class: str) -> tuple[float, float, Source]:
    """Period and time on of an intermittent duty class (0.1, 0.3, 1, 3, 10, as text), in s. Raises OutOfTable."""
    table = data("thermal")["duty"]
    period, on = pick(table["seconds"], duty_class, "intermittent duty class")
    return float(period), float(on), source(table["source"])
