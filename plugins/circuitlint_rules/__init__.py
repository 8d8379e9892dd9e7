"""The common rules, through the same hooks and imports as anybody's."""

from __future__ import annotations

from importlib.resources import files

from circuitlint.authoring import ReadingRule, Rule, offers
from circuitlint_rules.compensation import CapacitorDischarge, CapacitorStress, OverCorrection, Resonance
from circuitlint_rules.conductor import ConductorCurrent, ConductorHeating, MinimumSection
from circuitlint_rules.measurement import MeterRange
from circuitlint_rules.meters import MeterBurden, MeterCategory, MeterResolution, MeterWaveform, OhmmeterOnACoil
from circuitlint_rules.plate import NameplateContradiction, SupplyMatch
from circuitlint_rules.protection import (
    BreakingCapacity,
    FaultHeating,
    FaultLoop,
    NuisanceTrip,
    OverloadCoordination,
)
from circuitlint_rules.readings import CalibrationInDate, CategoryStated, WithinRange
from circuitlint_rules.silence import MissingData
from circuitlint_rules.supply import MinimumPowerFactor, OperatingVoltage, VoltageDrop
from circuitlint_rules.switching import (
    ContactDuty,
    HeldIn,
    MinimumContactLoad,
    ReleaseTime,
    StoredEnergy,
    SwitchOffVoltage,
)
from circuitlint_rules.winding import PullInWhenHot, SaturationCurrent, StuckOpen, WindingTemperature


@offers
def circuitlint_rules() -> list[type[Rule]]:
    """The common rules."""
    return [
        MinimumPowerFactor, MeterRange, ConductorHeating, ConductorCurrent, VoltageDrop, SupplyMatch, NameplateContradiction,
        OperatingVoltage, WindingTemperature, StuckOpen, PullInWhenHot, SaturationCurrent,
        MinimumSection, OverloadCoordination, NuisanceTrip, BreakingCapacity, FaultLoop, FaultHeating,
        ContactDuty, SwitchOffVoltage, ReleaseTime, StoredEnergy, HeldIn, MinimumContactLoad,
        OverCorrection, CapacitorStress, CapacitorDischarge, Resonance,
        MeterCategory, MeterBurden, MeterResolution, MeterWaveform, OhmmeterOnACoil, MissingData,
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
