"""The common rules, through the same hooks and imports as anybody's."""

from __future__ import annotations

from importlib.resources import files

from circuitlint.authoring import Rule, offers
from circuitlint_rules.conductor import ConductorHeating
from circuitlint_rules.measurement import MeterRange
from circuitlint_rules.supply import MinimumPowerFactor, VoltageDrop


@offers
def circuitlint_rules() -> list[type[Rule]]:
    """The common rules."""
    return [MinimumPowerFactor, MeterRange, ConductorHeating, VoltageDrop]


@offers
def circuitlint_rulesets() -> list[tuple[str, bytes]]:
    """The shipped rulesets."""
    found = [one for one in files("circuitlint_rulesets").iterdir() if one.name.endswith(".yaml")]
    return [(one.name, one.read_bytes()) for one in sorted(found, key=lambda one: one.name)]
