"""The names an author imports stay, and each says what it is."""

from __future__ import annotations

import ast
import inspect
import re
from pathlib import Path

import pytest

from circuitlint import authoring, hooks, testing
from circuitlint.definition import fields
from circuitlint.study.extras import ExtraFigures
from circuitlint.study.plan import LoadKind, Plan

ROOT = Path(__file__).parents[2]
# What plugins in the field import. A name may come; none may go.
AUTHORING = {
    "ACTIVE_POWER", "ANGLE", "APPARENT_POWER", "CAPACITANCE", "CURRENT", "ENERGY", "FREQUENCY", "INDUCTANCE", "LENGTH",
    "LOSS_PER_LENGTH", "RATIO", "REACTANCE", "REACTIVE_POWER", "RESISTANCE", "TEMPERATURE", "TEMPERATURE_RISE", "TIME",
    "VOLTAGE", "Asked", "CircuitStudy", "Comparison", "DataSheet", "Dimension", "Entry", "ExtraFigures", "Fact", "Figure",
    "Formula", "Holds", "Key", "Lack", "Limit", "LimitSpec", "Limits", "LoadKind", "Outcome", "Plan", "Quantity", "Record",
    "Rule", "Source", "Unknown", "ask", "at_least", "at_most", "fields", "formula", "offers", "read", "share_of",
    "shipped_formula", "show", "si",
}  # fmt: skip
TESTING = {"DEFAULT_SEVERITIES", "Examination", "examine", "hold_to_promises"}
FIELDS = {
    "Resistance", "Reactance", "Inductance", "Capacitance", "Voltage", "Current", "Frequency", "ActivePower", "ReactivePower",
    "ApparentPower", "Energy", "Length", "Section", "Time", "Temperature", "TemperatureRise", "ThermalResistance", "Angle",
    "Share", "ResistancePerLength", "CapacitancePerLength", "LetThrough", "Count",
}  # fmt: skip
MAGNITUDES = {
    "Ohm", "Henry", "Farad", "Volt", "Ampere", "Hertz", "Watt", "Var", "VoltAmpere", "Joule", "Metre", "SquareMetre", "Second",
    "Celsius", "Kelvin", "KelvinPerWatt", "Radian", "Ratio", "OhmPerMetre", "WattPerMetre", "ComplexOhm", "ComplexVolt",
    "ComplexAmpere", "ComplexVoltAmpere",
}  # fmt: skip
HOOKS = {
    "circuitlint_rules", "circuitlint_rulesets", "circuitlint_parts", "circuitlint_load_kinds", "circuitlint_figures",
    "circuitlint_reports",
}  # fmt: skip
METHODS = {
    "circuit": (authoring.CircuitStudy, {"tag", "entry", "system", "states", "figure", "parts", "supply"}),
    "rule": (authoring.Rule, {"applies", "check"}),
    "load kind": (LoadKind, {"data", "impedance", "figures", "label"}),
    "figures": (ExtraFigures, {"figures"}),
    "plan": (Plan, {"direct", "frequency", "datum", "has", "surroundings", "token", "phasor"}),
    "data": (authoring.DataSheet, {"state", "table", "assume", "token", "lack", "has"}),
    "examination": (testing.Examination, {"result", "checks", "expect", "record"}),
}


def test_no_name_that_authors_import_has_gone() -> None:
    assert set(authoring.__all__) >= AUTHORING
    assert set(testing.__all__) >= TESTING
    assert set(vars(fields)) >= FIELDS
    assert set(vars(authoring.si)) >= MAGNITUDES
    assert {name for name in vars(hooks) if name.startswith("circuitlint_")} >= HOOKS


@pytest.mark.parametrize("surface", [authoring, testing])
def test_every_listed_name_is_there_and_listed_once(surface: object) -> None:
    listed = surface.__all__  # type: ignore[attr-defined]
    assert len(listed) == len(set(listed))
    assert [name for name in listed if not hasattr(surface, name)] == []


@pytest.mark.parametrize("what", METHODS)
def test_what_an_author_calls_on_an_object_is_there(what: str) -> None:
    owner, names = METHODS[what]
    offered = {*dir(owner), *getattr(owner, "__annotations__", {})}
    assert offered >= names


def test_every_class_and_function_says_what_it_is() -> None:
    for surface in (authoring, testing):
        for name in surface.__all__:
            value = getattr(surface, name)
            if inspect.isclass(value) or inspect.isfunction(value):
                told = inspect.getdoc(value) or ""
                assert told and told.splitlines()[0].endswith((".", ":")), name


def test_every_hook_keeps_to_the_one_template() -> None:
    template = re.compile(
        r"Offer [a-z][^\n]*\.\n\nWhen: once, when plugins are gathered[^\n]*\.\nGives: [^\n]+\.\nWhen it fails: [^\n]+\.")
    found = [name for name in vars(hooks) if name.startswith("circuitlint_")]
    assert len(found) >= len(HOOKS)
    for name in found:
        assert template.fullmatch(inspect.getdoc(getattr(hooks, name)) or ""), name


def test_the_common_rules_use_the_authors_surface_and_nothing_past_it() -> None:
    used = set()
    for path in sorted((ROOT / "plugins" / "circuitlint_rules").glob("*.py")):
        for node in ast.walk(ast.parse(path.read_text(encoding="utf-8"))):
            if isinstance(node, ast.ImportFrom) and (node.module or "").startswith("circuitlint."):
                assert node.module == "circuitlint.authoring", path.name
                used |= {alias.name for alias in node.names}
            elif isinstance(node, ast.Import):
                assert not any(alias.name.startswith("circuitlint.") for alias in node.names), path.name
    assert used
    assert used <= set(authoring.__all__)
