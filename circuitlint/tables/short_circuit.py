"""Constants k of the adiabatic equation, with the temperatures they hold between."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

from circuitlint.sources import Source
from circuitlint.tables.files import data, pick, source

METALS = ("copper", "aluminium", "steel")
PER_SQUARE_MILLIMETRE = 1e6


@dataclass(frozen=True, slots=True)
class Withstand:
    """A constant k in A·√s/m², the temperatures it holds between in °C, and its source."""

    constant: float
    initial: float
    final: float
    source: Source


def live_conductor(insulation: str, material: str) -> Withstand:
    """k of a live conductor. Raises OutOfTable. Source: IEC 60364-4-43, table 43A.

    `insulation`: pvc-70, pvc-70-thick (above 300 mm²), pvc-90, pvc-90-thick, xlpe-90, rubber-60 or butyl-85.
    """
    table = data("short_circuit")["live"]
    entry = pick(table["insulation"], insulation, "insulation")
    return _withstand(entry, material, source(table["source"], known=entry["known"]))


def separate_protective_conductor(insulation: str, material: str) -> Withstand:
    """k of a protective conductor that is not in a cable: pvc, butyl or xlpe. Raises OutOfTable."""
    table = data("short_circuit")["separate"]
    entry = pick(table["insulation"], insulation, "insulation")
    return _withstand(entry, material, source(table["source"], known=entry["known"]))


def bare_protective_conductor(place: str, material: str) -> Withstand:
    """k of a bare protective conductor: visible (and in restricted areas), normal or fire-risk. Raises OutOfTable."""
    table = data("short_circuit")["bare"]
    entry = pick(pick(table["place"], place, "place"), material, "conductor of")
    return Withstand(entry["k"] * PER_SQUARE_MILLIMETRE, float(entry["initial"]), float(entry["final"]), source(table["source"]))


def _withstand(entry: dict[str, Any], material: str, where: Source) -> Withstand:
    value = pick({one: entry.get(one) for one in METALS}, material, "conductor of")
    return Withstand(value * PER_SQUARE_MILLIMETRE, float(entry["initial"]), float(entry["final"]), where)
