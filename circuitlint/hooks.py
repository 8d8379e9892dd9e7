"""What a plugin may offer. Specifications only: the tool asks each plugin once, and a plugin answers what it likes.

Every specification says the same four things: what it offers; when it is asked; what it gives; what happens when it fails.
"""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from typing import Any, Protocol, TypeAlias

import pluggy

from circuitlint.readings.rule import ReadingRule
from circuitlint.review.record import Record
from circuitlint.review.rule import Rule
from circuitlint.study.extras import ExtraFigures
from circuitlint.study.plan import LoadKind

PROJECT = "circuitlint"

offers = pluggy.HookimplMarker(PROJECT)
"""Decorator for a plugin's function that answers one of the hooks below."""
_specification = pluggy.HookspecMarker(PROJECT)


class RenderRecord(Protocol):
    """A report kind: one function from the record to text."""

    def __call__(self, record: Record) -> str: ...


NamedFiles: TypeAlias = Iterable[tuple[str, bytes]]
RuleClasses: TypeAlias = Iterable[type[Rule]]
ReadingRules: TypeAlias = Iterable[type[ReadingRule]]
LoadKinds: TypeAlias = Iterable[LoadKind[Any]]
AddedFigures: TypeAlias = Iterable[ExtraFigures]
ReportKinds: TypeAlias = Mapping[str, RenderRecord]


@_specification
def circuitlint_rules() -> RuleClasses:
    """Offer rules.

    When: once, when plugins are gathered.
    Gives: Rule classes, each with a name no other rule has; each is made once, without arguments.
    When it fails: the plugin's rules are lost, the review says so, and is held where the ruleset requires one of them.
    """
    raise AssertionError("a specification is never called")


@_specification
def circuitlint_rulesets() -> NamedFiles:
    """Offer rulesets.

    When: once, when plugins are gathered.
    Gives: file names and contents in the ruleset format, each with a name no other ruleset has.
    When it fails: the plugin's rulesets are lost, and the review says so.
    """
    raise AssertionError("a specification is never called")


@_specification
def circuitlint_parts() -> NamedFiles:
    """Offer parts: catalogues of coils, cables, devices and meters that a definition may name.

    When: once, when plugins are gathered, after load kinds.
    Gives: file names and contents in the definition format, with nothing but `format:` and `parts:`.
    When it fails: the plugin's parts are lost, and the review says so; a definition that names one is refused.
    """
    raise AssertionError("a specification is never called")


@_specification
def circuitlint_load_kinds() -> LoadKinds:
    """Offer load kinds.

    When: once, when plugins are gathered, before everything else.
    Gives: objects of LoadKind classes, each with a name no other kind has.
    When it fails: the plugin's load kinds are lost, and the review says so; a definition that uses one is refused.
    """
    raise AssertionError("a specification is never called")


@_specification
def circuitlint_figures() -> AddedFigures:
    """Offer extra figures of circuits, or of the parts of a load kind.

    When: once, when plugins are gathered, after load kinds.
    Gives: objects of ExtraFigures classes; the names of their figures are taken by nobody else.
    When it fails: the figures are lacking, the review says so, and is held where a required rule asks for one of them.
    """
    raise AssertionError("a specification is never called")


@_specification
def circuitlint_reports() -> ReportKinds:
    """Offer report kinds.

    When: once, when plugins are gathered.
    Gives: a function from the record to text, by the name given to `--report`.
    When it fails: the report is not made, the call says so, and the other reports are.
    """
    raise AssertionError("a specification is never called")


@_specification
def circuitlint_reading_rules() -> ReadingRules:
    """Offer rules on readings.

    When: once, when plugins are gathered.
    Gives: ReadingRule classes, each with a name no other rule on readings has; each is made once, without arguments.
    When it fails: the plugin's rules on readings are lost, and every account of readings says so and is held.
    """
    raise AssertionError("a specification is never called")
