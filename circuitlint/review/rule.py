"""What a rule is: a name, what it needs, and one method that yields what is to be checked.

A rule never decides a result or a severity. It asks for figures and names limits; the framework compares, so that all rules
behave alike and a figure that cannot be given never passes.
"""

from __future__ import annotations

from abc import ABC, abstractmethod
from collections.abc import Iterator, Mapping
from dataclasses import dataclass, replace
from typing import ClassVar, Literal, TypeAlias

from circuitlint.definition.text import Path
from circuitlint.limits.models import Limit, LimitSpec
from circuitlint.quantity import Quantity, show
from circuitlint.study.data import Datum
from circuitlint.study.solving import UNSETTLED
from circuitlint.study.study import CircuitStudy, Figure
from circuitlint.study.worksheet import Lack

Sense: TypeAlias = Literal["at least", "at most"]


@dataclass(frozen=True, slots=True)
class Asked:
    """A figure a rule asked for, given or lacking."""

    name: str
    state: str
    of: str
    found: Figure | Lack
    tag: str = ""
    """Tag of the circuit that was asked."""


@dataclass(frozen=True, slots=True)
class Comparison:
    """A figure to be held against a limit."""

    asked: Asked
    sense: Sense
    limit: Limit | None
    help: str = ""
    at: Path | None = None


@dataclass(frozen=True, slots=True)
class Fact:
    """A matter of kind: a plain statement that is a finding in itself. `aspect` names it among the rule's facts."""

    aspect: str
    what: str
    why: str = ""
    help: str = ""
    state: str = ""
    at: Path = ()


@dataclass(frozen=True, slots=True)
class Holds:
    """A matter of kind that was looked at and is in order."""

    aspect: str
    what: str
    state: str = ""
    at: Path = ()


@dataclass(frozen=True, slots=True)
class Unknown:
    """A check that cannot be made, and the data that would let it be made."""

    aspect: str
    needs: tuple[str, ...]
    why: str = ""
    state: str = ""
    at: Path = ()


Outcome: TypeAlias = Comparison | Fact | Holds | Unknown


def ask(circuit: CircuitStudy, figure: str, state: str, of: str = "") -> Asked:
    """Ask a circuit for a figure; what comes back goes into `at_least` or `at_most`."""
    return Asked(figure, state, of, circuit.figure(figure, state, of), circuit.tag)


def stated(circuit: CircuitStudy, path: str) -> Asked:
    """Ask for a datum as the definition states it, such as `protection.breaking_capacity`, to hold it against a limit."""
    place, _, word = path.rpartition(".")
    datum = circuit.stated(path)
    if datum is None:
        return Asked(word.replace("_", "-"), "", place, Lack((path,), "it is not stated"), circuit.tag)
    found = Figure(word.replace("_", "-"), place, "", datum.dimension, datum.nominal, datum.low, datum.high)
    return Asked(found.name, "", place, found, circuit.tag)


def runs_away(asked: Asked) -> bool:
    """Whether a figure is lacking because temperatures do not settle within the tolerances: worse than any figure."""
    return isinstance(asked.found, Lack) and asked.found.why == UNSETTLED


def at_least(asked: Asked, limit: Limit | None, *, help: str = "", at: Path | None = None) -> Comparison:
    """The figure must not be below the limit. `at` is the path of the part at fault within the circuit."""
    return Comparison(asked, "at least", limit, help, at)


def at_most(asked: Asked, limit: Limit | None, *, help: str = "", at: Path | None = None) -> Comparison:
    """The figure must not be above the limit. `at` is the path of the part at fault within the circuit."""
    return Comparison(asked, "at most", limit, help, at)


def share_of(limit: Limit | None, quantity: Quantity | Datum | None, set_by: str, *, highest: bool = False) -> Limit | None:
    """A limit that the ruleset states as a share of a datum, such as a meter's range; None where either is not given.

    The datum's lowest value is taken, so that its own tolerance counts against it; for a figure that must be at least the
    share, say `highest`.
    """
    if limit is None or quantity is None:
        return None
    end = quantity.high if highest else quantity.low
    value, of = limit.value * end, quantity.text or show(end, quantity.dimension)
    made = Quantity(value, value, value, quantity.dimension, f"{limit.quantity.text} of {of}")
    return replace(limit, quantity=made, set_by=f"{limit.set_by}, {set_by}")


def path_of(of: str) -> Path:
    """A part's place as path steps: `load.series[0].coil` to ("load", "series", 0, "coil")."""
    steps: list[str | int] = []
    for word in of.split(".") if of else ():
        name, _, index = word.partition("[")
        steps.append(name)
        if index:
            steps.append(int(index.rstrip("]")))
    return tuple(steps)


class Rule(ABC):
    """Base of every rule. Class attributes say what the rule is; `check` yields what is to be compared.

    Raises nothing on purpose: what cannot be checked is yielded as `Unknown`, or comes back as such from a lacking figure.
    """

    name: ClassVar[str]
    """The trade's word for it, in lower case with hyphens."""
    title: ClassVar[str]
    """One line, as in a table of contents."""
    purpose: ClassVar[str]
    """What goes wrong where the rule is not kept."""
    applies_to: ClassVar[str]
    """In words, which circuits it looks at."""
    figures: ClassVar[tuple[str, ...]]
    """Names of the figures it asks for; their worst cases are refined."""
    states: ClassVar[tuple[str, ...]]
    """Names of the states it looks at."""
    needs: ClassVar[tuple[str, ...]]
    """Data of the definition without which it cannot be assessed."""
    helps: ClassVar[str]
    """What usually helps."""
    limits: ClassVar[Mapping[str, LimitSpec]] = {}
    """Its limits: dimension and meaning by name."""

    def applies(self, circuit: CircuitStudy) -> bool:
        """Whether the rule has anything to say of the circuit."""
        return True

    @abstractmethod
    def check(self, circuit: CircuitStudy, limits: Mapping[str, Limit]) -> Iterator[Outcome]:
        """Yield every comparison, fact or gap. `limits` holds those the ruleset gives; use `limits.get`."""
