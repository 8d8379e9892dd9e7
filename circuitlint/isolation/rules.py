"""A rule of a plugin behind a guard: its words stay as they were offered, and what it yields is sound and comes to an end."""

from __future__ import annotations

import math
from collections.abc import Iterable, Iterator, Mapping
from types import MappingProxyType

import numpy as np

from circuitlint.errors import PluginError
from circuitlint.limits.models import Limit
from circuitlint.review.rule import Asked, Comparison, Outcome, Rule
from circuitlint.study.study import CircuitStudy, Figure
from circuitlint.study.worksheet import Lack

MOST_OUTCOMES = 5000
"""Of one rule on one circuit; the common rules yield a few dozen at most."""


class Endless(PluginError):
    """A rule yields on and on."""


class GuardedRule(Rule):
    """Yields what the plugin's rule yields. Raises PluginError at the first outcome that is not sound."""

    def __init__(self, inner: Rule) -> None:
        self.inner = inner
        for word in ("name", "title", "purpose", "applies_to", "helps", "figures", "states", "needs"):
            setattr(self, word, getattr(inner, word))
        self.limits = MappingProxyType(dict(inner.limits))  # type: ignore[misc]

    def applies(self, circuit: CircuitStudy) -> bool:
        """What the rule says; nothing but True or False will do."""
        said: object = self.inner.applies(circuit)
        if not isinstance(said, (bool, np.bool_)):
            raise PluginError(f"applies gives {said!r:.40}; accepted: True or False")
        return bool(said)

    def check(self, circuit: CircuitStudy, limits: Mapping[str, Limit]) -> Iterator[Outcome]:
        """What the rule yields, each looked at."""
        given: object = self.inner.check(circuit, limits)
        if not isinstance(given, Iterable):
            raise PluginError(f"check gives {given!r:.40}; accepted: `yield at_most(...)` and the like")
        for number, outcome in enumerate(given):
            if number == MOST_OUTCOMES:
                raise Endless(f"it does not come to an end: more than {MOST_OUTCOMES} outcomes on one circuit")
            if isinstance(outcome, Comparison):
                _sound(outcome, circuit)
            yield outcome


def _sound(outcome: Comparison, circuit: CircuitStudy) -> None:
    asked, limit = outcome.asked, outcome.limit
    if not isinstance(asked, Asked) or not isinstance(asked.found, (Figure, Lack)):
        raise PluginError(f"it compares {asked!r:.80}; accepted: what `ask` gives")
    if asked.tag and asked.tag != circuit.tag:
        raise PluginError(f"it yields for a circuit {asked.tag!r}, which is not the one it was given, {circuit.tag!r}")
    if limit is not None and not isinstance(limit, Limit):
        raise PluginError(f"it compares with {limit!r:.80}; accepted: what `limits.get` or `share_of` gives")
    found = asked.found
    if isinstance(found, Lack):
        return
    if not (math.isfinite(found.nominal) and math.isfinite(found.lowest) and math.isfinite(found.highest)):
        raise PluginError(f"its figure {found.name} is not a finite number")
    if limit is not None and not math.isfinite(limit.quantity.nominal):
        raise PluginError(f"its limit {limit.name} is not a finite number")
