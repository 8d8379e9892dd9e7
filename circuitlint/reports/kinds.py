"""Report kinds by name: text, json, sarif, html, and whatever plugins add."""

from __future__ import annotations

import importlib
from collections.abc import Callable, Mapping

from circuitlint.errors import CircuitlintError, InputError, PluginError
from circuitlint.reports import json_record, sarif, text
from circuitlint.reports.catalogue import render_rules
from circuitlint.reports.sheet import render_figures
from circuitlint.review.record import Record

Renderer = Callable[[Record], str]


def _html(record: Record) -> str:
    # Loaded when asked for: the page and its drawings are the largest part of the package, and text is asked for most.
    return str(importlib.import_module("circuitlint.reports.html").render(record))


KINDS: dict[str, Renderer] = {"text": text.render, "json": json_record.render, "sarif": sarif.render, "html": _html}
"""The kinds that come with the package; each gives the whole report as text."""


def check(kind: str, added: Mapping[str, Renderer] | None = None) -> None:
    """Raise InputError where no report is of this kind. `added` are the kinds that plugins offer."""
    known = [*KINDS, *(added or {})]
    if kind not in known:
        raise InputError(f"no report is of kind {kind!r}; accepted: one of {', '.join(dict.fromkeys(known))}")


def render(
    kind: str, record: Record, added: Mapping[str, Renderer] | None = None, *, width: int = 80, colour: bool = False
) -> str:
    """A record as a report. `width` and `colour` are for `text` only; a plugin cannot take the name of a shipped kind.

    Raises InputError for an unknown kind and PluginError where a plugin's kind fails or gives something else than text.
    """
    check(kind, added)
    if kind == "text":
        return text.render(record, width=width, colour=colour)
    if kind in KINDS:
        return KINDS[kind](record)
    try:
        made: object = (added or {})[kind](record)
    except CircuitlintError:
        raise
    except Exception as error:
        raise PluginError(f"the report kind {kind!r} of a plugin failed: {type(error).__name__}: {error}") from error
    if not isinstance(made, str):
        raise PluginError(f"the report kind {kind!r} of a plugin gave {type(made).__name__}, not text")
    return made


def sheet(record: Record, width: int = 100) -> str:
    """The calculation sheets of every circuit of a record."""
    return render_figures(record, (), width)


def catalogue(record: Record, meanings: Mapping[str, Mapping[str, str]], name: str = "", width: int = 80) -> str:
    """What is checked: the rules of a record's ruleset, or the one named."""
    return render_rules(record, meanings, name, width)
