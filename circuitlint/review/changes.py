"""What lies between two review records: findings gone, new, changed; figures and margins that moved; what caused it.

Only what differs is in a comparison. A figure that moved by less than `SILENT` of itself counts as unmoved.
"""

from __future__ import annotations

from typing import Literal

from pydantic import Field

from circuitlint.review.record import Part, Place, Problem, Result, Severity

SILENT = 1e-3
"""Relative change up to which a figure, a margin or a limit counts as unmoved."""

How = Literal[
    "new",
    "circuit added",
    "checked for the first time",
    "now conforms",
    "circuit removed",
    "no longer checked",
    "changed",
]
Crossed = Literal["beyond", "back within", ""]


class Side(Part):
    """One of the two records, in brief."""

    title: str = Field(description="Title of the definition.")
    files: tuple[str, ...] = Field(description="Files of the definition.")
    ruleset: str = Field(description="Name of the ruleset.")
    edition: str = Field(description="Date of the ruleset's edition.")
    circuits: int = Field(description="Number of circuits.")
    held: bool = Field(description="Whether anything is held.")


class Subject(Part):
    """The check a change is about, with its numbers on both sides; null where a side has none."""

    tag: str = Field(description="Reference designation of the circuit.")
    serves: str = Field(description="What the circuit serves.")
    rule: str = Field(description="Name of the rule.")
    check: str = Field(description="The check's `id`.")
    state: str = Field(description="State the check belongs to.")
    figure: str = Field(description="Name of the figure; empty for a matter of kind.")
    of: str = Field(description="Part inside the circuit.")
    sense: str = Field(description="`at least`, `at most`, or empty for a matter of kind.")
    dimension: str = Field(description="Name of the dimension of figure and limit.")
    worst_before: float | None = Field(description="The figure's worst end before.")
    worst_after: float | None = Field(description="The figure's worst end after.")
    limit_before: float | None = Field(description="The limit before.")
    limit_after: float | None = Field(description="The limit after.")
    margin_before: float | None = Field(description="Margin in the worst case before.")
    margin_after: float | None = Field(description="Margin in the worst case after.")


class FindingChange(Subject):
    """A finding that is new, gone, or changed in severity, result or concession."""

    how: How = Field(description="What became of it.")
    before: Severity | None = Field(description="Severity before; null for a new finding.")
    after: Severity | None = Field(description="Severity after; null for a finding that is gone.")
    result_before: Result | None = Field(description="Result before; null where the check was not there.")
    result_after: Result | None = Field(description="Result after; null where the check is not there.")
    conceded_before: bool = Field(description="Whether a concession covered it before.")
    conceded_after: bool = Field(description="Whether a concession covers it after.")
    newly_holds: bool = Field(description="Whether it holds its circuit now and did not before.")
    what: str = Field(description="What is, in one sentence.")
    help: str = Field(description="What would help.")
    place: Place = Field(description="Where in the definition the part stands; for a finding that is gone, where it stood.")


class MarginMove(Subject):
    """A check whose figure or limit moved."""

    crossed: Crossed = Field(description="Whether the worst case crossed the limit, and which way.")


class FigureMove(Part):
    """A figure that moved at nominal values or at an end of its range."""

    tag: str = Field(description="Reference designation of the circuit.")
    name: str = Field(description="Trade word of the quantity.")
    of: str = Field(description="Part inside the circuit; empty for the circuit.")
    state: str = Field(description="State the figure belongs to.")
    dimension: str = Field(description="Name of the dimension.")
    before: tuple[float, float, float] = Field(description="Lowest, nominal, highest before.")
    after: tuple[float, float, float] = Field(description="Lowest, nominal, highest after.")
    change: float = Field(description="Largest relative change of the three, as a share of the larger magnitude.")


class DatumChange(Part):
    """What the definition states of a part, where that differs."""

    tag: str = Field(description="Reference designation of the circuit.")
    of: str = Field(description="Part inside the circuit; empty for its supply.")
    kind: str = Field(description="Kind of the part.")
    before: tuple[str, ...] = Field(description="Stated only before.")
    after: tuple[str, ...] = Field(description="Stated only after.")


class CircuitChange(Part):
    """A circuit that was added, removed, or goes under another tag."""

    tag: str = Field(description="Reference designation; the later one where it changed.")
    was: str = Field(default="", description="The earlier designation where it changed.")
    serves: str = Field(description="What the circuit serves.")
    held: bool = Field(description="Whether it is held, or was when it was removed.")


class Lost(Part):
    """Checks that conformed and are not made any more."""

    tag: str = Field(description="Reference designation of the circuit.")
    rule: str = Field(description="Name of the rule.")
    checks: int = Field(description="How many fewer checks the rule makes of the circuit.")
    now: str = Field(description="What the rule says of the circuit now.")


class LimitChange(Part):
    """A limit that differs; null on the side that does not have it."""

    path: str = Field(description="Path inside the ruleset.")
    name: str = Field(description="Name of the limit within its rule.")
    dimension: str = Field(description="Name of the dimension.")
    before: float | None = Field(description="Magnitude before.")
    after: float | None = Field(description="Magnitude after.")
    set_by: str = Field(description="Who set it, on the later side that has it.")


class TermChange(Part):
    """Something else a review rests on that differs: ruleset, severities, versions, hold."""

    what: str = Field(description="What it is, in words.")
    before: str = Field(description="Before; empty where there was none.")
    after: str = Field(description="After; empty where there is none.")


class Comparison(Part):
    """Everything that differs between two reviews."""

    before: Side = Field(description="The earlier review.")
    after: Side = Field(description="The later review.")
    new_held: bool = Field(description="Whether a finding holds a circuit, or a lost rule the review, that did not before.")
    newly_held: tuple[str, ...] = Field(description="Tags of circuits held now and not before.")
    no_longer_held: tuple[str, ...] = Field(description="Tags of circuits held before and not now.")
    problems: tuple[Problem, ...] = Field(description="Failures of rules and plugins that were not there before.")
    new: tuple[FindingChange, ...] = Field(description="New findings, worst first.")
    changed: tuple[FindingChange, ...] = Field(description="Findings whose severity, result or concession changed.")
    gone: tuple[FindingChange, ...] = Field(description="Findings that are gone, worst first.")
    lost: tuple[Lost, ...] = Field(description="Checks that conformed and are not made any more.")
    margins: tuple[MarginMove, ...] = Field(description="Margins that moved: crossings first, then by how far.")
    figures: tuple[FigureMove, ...] = Field(description="Figures that moved, by how far.")
    data: tuple[DatumChange, ...] = Field(description="What the definition states differently.")
    added: tuple[CircuitChange, ...] = Field(description="Circuits only in the later review.")
    removed: tuple[CircuitChange, ...] = Field(description="Circuits only in the earlier review.")
    renamed: tuple[CircuitChange, ...] = Field(description="Circuits that are the same but for their tag.")
    limits: tuple[LimitChange, ...] = Field(description="Limits that differ.")
    terms: tuple[TermChange, ...] = Field(description="What else the reviews rest on, where it differs.")

    @property
    def empty(self) -> bool:
        """Whether nothing differs."""
        return not any(getattr(self, name) for name in type(self).model_fields if name not in ("before", "after", "new_held"))
