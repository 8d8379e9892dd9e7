"""Everything a plugin imports, its rules, load kinds and figures alike.

To write a rule: `Rule`, `CircuitStudy`, `Limits`, `LimitSpec`, `Outcome`; what it asks, `ask`; what it yields, `at_least`,
`at_most`, `Fact`, `Holds`, `Unknown`; a datum as it stands, `stated`; a limit that is a share of a datum, `share_of`; a
dimension, such as `CURRENT`.
To write a load kind: `LoadKind`, `Entry`, `fields`, `DataSheet`, `Plan`, `Key`; a formula of one's own, `formula` with `si` and
`Source`; a shipped one, `shipped_formula`. To add figures: `ExtraFigures`. To offer any of them: `offers` above one of the
functions that `circuitlint.hooks` describes.

The names listed in `__all__` stay. What is imported past them may change from one version to the next.
"""

from __future__ import annotations

import difflib
import importlib
import pkgutil
from typing import Any

from circuitlint import physics, si
from circuitlint.definition import fields
from circuitlint.definition.fields import Entry
from circuitlint.errors import PluginError
from circuitlint.hooks import offers
from circuitlint.limits.models import Limit, Limits, LimitSpec
from circuitlint.physics.formula import FORMULAS, Formula
from circuitlint.physics.formula import formula_of_a_plugin as formula
from circuitlint.quantity import Quantity, read, show, show_range
from circuitlint.readings.models import Instrument
from circuitlint.readings.record import ReadingResult
from circuitlint.readings.rule import Noticed, ReadingRule
from circuitlint.review.record import Record
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
    path_of,
    runs_away,
    share_of,
    stated,
)
from circuitlint.si import (
    ACTIVE_POWER,
    ANGLE,
    APPARENT_POWER,
    AREA,
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
from circuitlint.study.data import DataSheet, Datum
from circuitlint.study.extras import ExtraFigures
from circuitlint.study.plan import LoadKind, Plan
from circuitlint.study.study import CircuitStudy, Figure
from circuitlint.study.worksheet import Key, Lack

__all__ = [
    "ACTIVE_POWER",
    "ANGLE",
    "APPARENT_POWER",
    "AREA",
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
    "Datum",
    "Dimension",
    "Entry",
    "ExtraFigures",
    "Fact",
    "Figure",
    "Formula",
    "Holds",
    "Instrument",
    "Key",
    "Lack",
    "Limit",
    "LimitSpec",
    "Limits",
    "LoadKind",
    "Noticed",
    "Outcome",
    "Plan",
    "Quantity",
    "ReadingResult",
    "ReadingRule",
    "Record",
    "Rule",
    "Source",
    "Unknown",
    "ask",
    "at_least",
    "at_most",
    "fields",
    "formula",
    "offers",
    "path_of",
    "read",
    "runs_away",
    "share_of",
    "shipped_formula",
    "show",
    "show_range",
    "si",
    "stated",
]


def shipped_formula(name: str) -> Formula[..., Any]:
    """A formula that comes with circuitlint, by the name that stands in a record, such as `winding-resistance-at`.

    Raises PluginError where there is none of that name.
    """
    if name not in FORMULAS:
        # The study loads what it needs; the rest of physics is loaded when somebody asks for a formula by name.
        for module in pkgutil.iter_modules(physics.__path__):
            importlib.import_module(f"{physics.__name__}.{module.name}")
    found = FORMULAS.get(name)
    if found is None:
        close = difflib.get_close_matches(name, FORMULAS, 1)
        told = f"did you mean {close[0]!r}?" if close else f"one of {', '.join(sorted(FORMULAS))}"
        raise PluginError(f"no formula is named {name!r}; accepted: {told}")
    return found
