"""What a plugin may offer. Specifications only: the engine asks, plugins answer, and nobody else is asked twice."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from typing import Any, Protocol, TypeAlias

import pluggy

from circuitlint.review.record import Record
from circuitlint.review.rule import Rule
from circuitlint.study.plan import LoadKind

PROJECT = "circuitlint"

offers = pluggy.HookimplMarker(PROJECT)
"""Decorator for a plugin's function that answers one of the hooks below."""
_specification = pluggy.HookspecMarker(PROJECT)


class RenderRecord(Protocol):
    """A report kind: one function from the record to text."""

    def __call__(self, record: Record) -> str: ...


RuleClasses: TypeAlias = Iterable[type[Rule]]
RulesetFiles: TypeAlias = Iterable[tuple[str, bytes]]
LoadKinds: TypeAlias = Iterable[LoadKind[Any]]
ReportKinds: TypeAlias = Mapping[str, RenderRecord]


@_specification
def circuitlint_rules() -> RuleClasses:
    """Offer rules.

    When: once, when plugins are gathered.
    Gives: rule classes; each is made once, without arguments.
    When it fails: the plugin's rules are lost, and the review says so.
    """
    raise AssertionError("a specification is never called")


@_specification
def circuitlint_rulesets() -> RulesetFiles:
    """Offer rulesets.

    When: once, when plugins are gathered.
    Gives: file names and contents, in the ruleset format.
    When it fails: the plugin's rulesets are lost, and the review says so.
    """
    raise AssertionError("a specification is never called")


@_specification
def circuitlint_parts() -> RulesetFiles:
    """Offer parts: catalogues of coils, cables and meters that a definition may name.

    When: once, before the definition is read.
    Gives: file names and contents, in the definition format, with nothing but `parts:`.
    When it fails: the plugin's parts are lost, and the review says so.
    """
    raise AssertionError("a specification is never called")


@_specification
def circuitlint_load_kinds() -> LoadKinds:
    """Offer load kinds.

    When: once, before the definition is read.
    Gives: objects of LoadKind classes, each with a name no other kind has.
    When it fails: the plugin's load kinds are lost, and the review says so.
    """
    raise AssertionError("a specification is never called")


@_specification
def circuitlint_reports() -> ReportKinds:
    """Offer report kinds.

    When: once, when plugins are gathered.
    Gives: a function from the record to text, by the name given to `--report`.
    When it fails: the plugin's report kinds are lost, and the review says so.
    """
    raise AssertionError("a specification is never called")
