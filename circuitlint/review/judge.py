"""From what a rule yields to checks with result, basis, severity and margin: alike for every rule."""

from __future__ import annotations

import math
from collections.abc import Mapping
from dataclasses import dataclass, field

from circuitlint.definition.text import Path
from circuitlint.limits.models import Limit, Occasion, Severity
from circuitlint.quantity import show, show_range
from circuitlint.review import record
from circuitlint.review.rule import Comparison, Fact, Holds, Outcome, Rule, Unknown, path_of
from circuitlint.review.worked import worked_line
from circuitlint.si import RATIO, Dimension
from circuitlint.study.study import CircuitStudy, Figure
from circuitlint.study.worksheet import Key, Lack


@dataclass(slots=True)
class Judge:
    """Makes checks of one rule's outcomes. `near` is the room that counts as close to a limit, as a share of it."""

    rule: Rule
    severities: Mapping[Occasion, Severity]
    near: float
    source_key: dict[str, str]
    """Limit name to key into the record's sources."""
    limit_records: dict[tuple[str, float, str], record.LimitRecord] = field(default_factory=dict)

    def check(self, circuit: CircuitStudy, outcome: Outcome) -> record.Check:
        """One check. Raises TypeError where the rule yielded something else, or a limit of another dimension."""
        if isinstance(outcome, Comparison):
            return self._compare(circuit, outcome)
        if isinstance(outcome, Fact):
            return record.Check(
                id=self._id(circuit, outcome.aspect, outcome.state), rule=self.rule.name, state=outcome.state,
                result="nonconforming", basis="matter of kind", severity=self.severities["kind"], what=outcome.what,
                why=outcome.why, help=outcome.help or self.rule.helps, place=place_of(circuit, outcome.at),
            )
        if isinstance(outcome, Holds):
            return record.Check(
                id=self._id(circuit, outcome.aspect, outcome.state), rule=self.rule.name, state=outcome.state,
                result="conforms", what=outcome.what, place=place_of(circuit, outcome.at),
            )
        if isinstance(outcome, Unknown):
            return self._unknown(circuit, outcome.aspect, outcome.state, "", outcome.needs, outcome.why, outcome.at)
        raise TypeError(f"the rule yielded {type(outcome).__name__}, not a comparison, a fact or a gap")

    def failed(self, circuit: CircuitStudy, what: str) -> record.Check:
        """The check that stands for a rule that failed on a circuit."""
        return record.Check(
            id=f"{self.rule.name}|{circuit.tag}|rule failed", rule=self.rule.name, result="not assessed",
            basis="rule failed", severity=self.severities["not_assessed"], what="the rule failed on this circuit",
            why=what, help="mend the rule, or take it out of the ruleset", place=place_of(circuit, ()),
        )

    def _id(self, circuit: CircuitStudy, aspect: str, state: str, of: str = "", limit: str = "") -> str:
        return "|".join(part for part in (self.rule.name, circuit.tag, of, state, aspect, limit) if part)

    def _unknown(
        self, circuit: CircuitStudy, aspect: str, state: str, of: str, needs: tuple[str, ...], why: str, at: Path,
        limit: str = "",
    ) -> record.Check:
        words = aspect.replace("-", " ")
        return record.Check(
            id=self._id(circuit, aspect, state, of, limit), rule=self.rule.name, state=state, figure=aspect, of=of,
            result="not assessed", basis="missing data", severity=self.severities["not_assessed"],
            needs=needs, what=f"{words}{_in(state)} could not be assessed", why=why,
            help=f"state {', '.join(needs)}" if needs else "", place=place_of(circuit, at),
        )

    def _limit(self, limit: Limit) -> record.LimitRecord:
        """The limit as recorded; made once for each limit and value."""
        key = (limit.name, limit.value, limit.set_by)
        made = self.limit_records.get(key)
        if made is None:
            made = self.limit_records[key] = record.LimitRecord(
                name=limit.name, value=limit.value, dimension=limit.quantity.dimension.name, path=limit.path,
                set_by=limit.set_by, source=self.source_key[limit.name],
            )
        return made

    def _compare(self, circuit: CircuitStudy, outcome: Comparison) -> record.Check:
        asked, limit = outcome.asked, outcome.limit
        at = outcome.at if outcome.at is not None else path_of(asked.of)
        if isinstance(asked.found, Lack):
            return self._unknown(circuit, asked.name, asked.state, asked.of, asked.found.needs, asked.found.why, at,
                                 limit.name if limit else "")
        if limit is None:
            return self._unknown(circuit, asked.name, asked.state, asked.of, (), "the ruleset or the definition gives no limit",
                                 at)
        figure = asked.found
        if figure.dimension.unit != limit.quantity.dimension.unit:
            what = f"{figure.name} in {figure.dimension.unit} is held against {limit.name} in {limit.quantity.dimension.unit}"
            raise TypeError(what)
        least = outcome.sense == "at least"
        worst = figure.lowest if least else figure.highest
        if not all(map(math.isfinite, (figure.nominal, worst, limit.value))):
            return self._unknown(circuit, figure.name, figure.state, figure.of, (), "the figure is not a finite number", at,
                                 limit.name)
        margin, nominal_margin = room(worst, limit.value, least), room(figure.nominal, limit.value, least)
        result: record.Result = "conforms"
        basis: record.Basis | None = None
        severity: Severity | None = None
        if beyond(figure.nominal, limit.value, least):
            result, basis, severity = "nonconforming", "nominal", self.severities["nominal"]
        elif beyond(worst, limit.value, least):
            result, basis, severity = "nonconforming", "worst case", self.severities["worst_case"]
        elif margin is not None and margin < self.near and figure.formula is not None:
            # A datum held as it is stated, such as a section, may be what the limit asks for and no more.
            basis, severity = "near the limit", self.severities["near_limit"]
        share = uncertainty = None
        if basis == "worst case" and figure.formula is not None:
            share, uncertainty = circuit.share_beyond(figure.state, Key(figure.name, figure.of), limit.value, least)
        return record.Check(
            id=self._id(circuit, figure.name, figure.state, figure.of, limit.name), rule=self.rule.name,
            state=figure.state, figure=figure.name, of=figure.of, sense=outcome.sense,
            dimension=figure.dimension.name, nominal=figure.nominal, worst=worst,
            limit=self._limit(limit),
            result=result, basis=basis, severity=severity, margin=margin, nominal_margin=nominal_margin,
            moved_by=figure.moved_by, share_beyond=share, share_beyond_uncertainty=uncertainty,
            what=sentence(figure, worst, limit, least, basis) if basis is not None else plain_sentence(figure, least),
            why=worked_line(circuit, figure) if severity is not None else "",
            help=(outcome.help or self.rule.helps) if severity is not None else "", place=place_of(circuit, at),
        )


def beyond(value: float, limit: float, least: bool) -> bool:
    """Whether a value is beyond a limit; anything that is not a number is beyond every limit."""
    return not (value >= limit if least else value <= limit)


def room(value: float, limit: float, least: bool) -> float | None:
    """Room left as a share of the limit, negative beyond it; None where the limit is zero."""
    if limit == 0.0:
        return None
    return (value - limit if least else limit - value) / abs(limit)


def sentence(figure: Figure, worst: float, limit: Limit, least: bool, basis: record.Basis | None) -> str:
    """What is, in one sentence."""
    name = figure.name.replace("-", " ")
    of = f" of {figure.of}" if figure.of else ""
    value = _shown(figure.nominal, figure.dimension, limit)
    end = "lowest" if least else "highest"
    spread = f" ({end} {_shown(worst, figure.dimension, limit)})" if figure.lowest != figure.highest else ""
    relation = {
        "nominal": "is below" if least else "is above",
        "worst case": "falls below" if least else "rises above",
        "near the limit": "is close to",
    }.get(basis or "", "is at least" if least else "is at most")
    note = f" {figure.note}" if figure.note else ""
    limit_text = _shown(limit.value, figure.dimension, limit)
    tail = " in the worst case" if basis == "worst case" else ""
    return f"{name}{of}{_in(figure.state)} {value}{note}{spread} {relation} {limit_text}{tail}"


def plain_sentence(figure: Figure, least: bool) -> str:
    """What is, where there is nothing to report; the numbers stand beside it in the record."""
    of = f" of {figure.of}" if figure.of else ""
    return f"{figure.name.replace('-', ' ')}{of}{_in(figure.state)} is {'at least' if least else 'at most'} its limit"


def _shown(value: float, dimension: Dimension, limit: Limit) -> str:
    if dimension is RATIO and "%" in limit.quantity.text:
        return f"{value * 100:.2f} %"
    return show(value, dimension)


def _in(state: str) -> str:
    return f" ({state})" if state else ""


def place_of(circuit: CircuitStudy, at: Path) -> record.Place:
    """Where in the definition a part stands."""
    made = circuit.places.get(at)
    if not isinstance(made, record.Place):
        spot = circuit.definition.spot(at)
        made = circuit.places[at] = record.Place(file=spot.file, line=spot.line, column=spot.column, path=spot.path)
    return made


def range_text(figure: Figure) -> str:
    """Lowest to highest, for a label."""
    return show_range(figure.lowest, figure.highest, figure.dimension)
