"""Figures that a plugin adds to every circuit, or to every part of one load kind, beside those that are there already."""

from __future__ import annotations

from abc import ABC, abstractmethod
from collections.abc import Iterable, Mapping
from typing import Any, ClassVar

from circuitlint.study.plan import Kinds, LoadKind, Plan


class ExtraFigures(ABC):
    """Figures added to the worksheet, once for each state and each part they belong to.

    What is written is run over all circuits of one shape and over all cases, like every other line. A figure that does not
    come out as a finite number is lacking, and it alone.
    """

    name: ClassVar[str]
    """What a person calls the addition, in lower case with hyphens."""
    of: ClassVar[str] = ""
    """The load kind whose parts get the figures; empty where the circuit itself gets them."""
    gives: ClassVar[tuple[str, ...]]
    """Names of the figures, so that they are known to be lacking where the addition fails."""

    @abstractmethod
    def figures(self, plan: Plan, place: str) -> None:
        """Write the lines. `place` is the part's place, empty for the circuit; its other figures are there by now."""


class KnownKinds(dict[str, LoadKind[Any]]):
    """Load kinds by name, together with the figures that plugins add."""

    def __init__(self, kinds: Mapping[str, LoadKind[Any]], extras: Iterable[ExtraFigures] = ()) -> None:
        super().__init__(kinds)
        self.extras: list[ExtraFigures] = list(extras)


def write_extras(plan: Plan, kinds: Kinds) -> None:
    """Write the added figures of a state, when everything else is written."""
    for extra in kinds.extras if isinstance(kinds, KnownKinds) else ():
        places = [""] if not extra.of else [place for place, kind in plan.leaves if kind.name == extra.of]
        for place in places:
            before = len(plan.sheet.lines)
            extra.figures(plan, place)
            plan.sheet.apart |= {line.key for line in plan.sheet.lines[before:]}
