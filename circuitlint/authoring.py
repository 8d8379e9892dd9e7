"""Everything a rule author imports."""

from circuitlint.definition.fields import Entry
from circuitlint.hooks import offers
from circuitlint.limits.models import Limit, Limits, LimitSpec
from circuitlint.physics.formula import Formula, formula
from circuitlint.quantity import Quantity, read, show
from circuitlint.review.rule import (
    Asked,
    Comparison,
    Fact,
    Holds,
    Outcome,
    Rule,
    Unknown,
    ask,
    at_least,
    at_most,
    share_of,
)
from circuitlint.si import (
    ACTIVE_POWER,
    ANGLE,
    APPARENT_POWER,
    CAPACITANCE,
    CURRENT,
    ENERGY,
    FREQUENCY,
    INDUCTANCE,
    LENGTH,
    LOSS_PER_LENGTH,
    RATIO,
    REACTANCE,
    REACTIVE_POWER,
    RESISTANCE,
    TEMPERATURE,
    TEMPERATURE_RISE,
    TIME,
    VOLTAGE,
    Dimension,
)
from circuitlint.sources import Source
from circuitlint.study.data import DataSheet
from circuitlint.study.plan import LoadKind, Plan
from circuitlint.study.study import CircuitStudy, Figure
from circuitlint.study.worksheet import Key, Lack

__all__ = [
    "ACTIVE_POWER",
    "ANGLE",
    "APPARENT_POWER",
    "CAPACITANCE",
    "CURRENT",
    "ENERGY",
    "FREQUENCY",
    "INDUCTANCE",
    "LENGTH",
    "LOSS_PER_LENGTH",
    "RATIO",
    "REACTANCE",
    "REACTIVE_POWER",
    "RESISTANCE",
    "TEMPERATURE",
    "TEMPERATURE_RISE",
    "TIME",
    "VOLTAGE",
    "Asked",
    "CircuitStudy",
    "Comparison",
    "DataSheet",
    "Dimension",
    "Entry",
    "Fact",
    "Figure",
    "Formula",
    "Holds",
    "Key",
    "Lack",
    "Limit",
    "LimitSpec",
    "Limits",
    "LoadKind",
    "Outcome",
    "Plan",
    "Quantity",
    "Rule",
    "Source",
    "Unknown",
    "ask",
    "at_least",
    "at_most",
    "formula",
    "offers",
    "read",
    "share_of",
    "show",
]
