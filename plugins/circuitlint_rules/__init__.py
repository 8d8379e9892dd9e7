"""The common rules, through the same hooks and imports as anybody's."""

from __future__ import annotations

from importlib.resources import files

from circuitlint.authoring import ReadingRule, Rule, offers
from circuitlint_rules.conductor import ConductorCurrent, ConductorHeating
from circuitlint_rules.measurement import MeterRange
from circuitlint_rules.plate import NameplateContradiction, SupplyMatch
from circuitlint_rules.readings import CalibrationInDate, CategoryStated, WithinRange
from circuitlint_rules.supply import MinimumPowerFactor, VoltageDrop


@offers
def circuitlint_rules() -> list[type[Rule]]:
    """The common rules."""
    return [
        MinimumPowerFactor, MeterRange, ConductorHeating, ConductorCurrent, VoltageDrop, SupplyMatch, NameplateContradiction,
    ]


@offers
def circuitlint_reading_rules() -> list[type[ReadingRule]]:
    """The common rules on readings."""
    return [CalibrationInDate, CategoryStated, WithinRange]


@offers
def circuitlint_rulesets() -> list[tuple[str, bytes]]:
    """The shipped rulesets."""
    found = [one for one in files("circuitlint_rulesets").iterdir() if one.name.endswith(".yaml")]
    return [(one.name, one.read_bytes()) for one in sorted(found, key=lambda one: one.name)]
