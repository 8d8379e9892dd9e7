"""Ruleset files to resolved rulesets. A limit without a source is refused, and so is a severity nobody gave."""

from __future__ import annotations

import difflib
import hashlib
from collections.abc import Mapping
from dataclasses import dataclass
from typing import Literal

import yaml
from pydantic import ValidationError

from circuitlint import si
from circuitlint.definition.faults import faults_of
from circuitlint.definition.text import Builder, Step, Text, fault_at, follow, key_node, parse
from circuitlint.errors import Fault, QuantityError, RulesetError
from circuitlint.limits.models import OCCASIONS, Limit, LimitSpec, RawLimit, Ruleset, RulesetFile, RuleTerms
from circuitlint.quantity import read
from circuitlint.sources import Source


@dataclass(frozen=True, slots=True)
class RulesetText:
    """A ruleset as read from one file, not yet laid over the one it is built on."""

    file: str
    sha256: str
    root: yaml.Node | None
    content: RulesetFile


def read_ruleset(content: bytes, file: str) -> RulesetText:
    """Read one ruleset file. Raises RulesetError with every fault."""
    text = parse(content, file)
    data = Builder(text).build(text.root)
    if text.faults or not isinstance(data, dict):
        if not text.faults:
            text.fault(text.root, "the file is not a mapping", "a ruleset that begins with `format: 1`")
        raise RulesetError(faults=sorted(set(text.faults)))
    try:
        made = RulesetFile.model_validate(data)
    except ValidationError as error:
        raise RulesetError(faults=sorted(set(faults_of(error, RulesetFile, text.root, file)))) from None
    _check(made, text)
    if text.faults:
        raise RulesetError(faults=sorted(set(text.faults)))
    return RulesetText(file, text.sha256, text.root, made)


def _check(made: RulesetFile, text: Text) -> None:
    for name, source in made.sources.items():
        if not source.work and source.known not in ("common practice", "firm's own"):
            text.fault(follow(text.root, ("sources", name)), f"the source {name!r} names no work", "`work: ...`")
    for rule, terms in made.rules.items():
        for name, limit in terms.limits.items():
            if limit.source not in made.sources:
                path: tuple[Step, ...] = ("rules", rule, "limits", name, "source")
                close = difflib.get_close_matches(limit.source, made.sources, 1)
                accepted = f"did you mean {close[0]!r}?" if close else f"one of {', '.join(made.sources) or 'no sources yet'}"
                text.fault(follow(text.root, path), f"no source is named {limit.source!r}", accepted)
    if made.near_the_limit:
        try:
            read(made.near_the_limit, si.RATIO)
        except QuantityError as error:
            text.fault(follow(text.root, ("near_the_limit",)), error.what, error.accepted)


def resolve(name: str, rulesets: Mapping[str, RulesetText]) -> Ruleset:
    """Lay a ruleset over those it is built on. Raises RulesetError for an unknown name or a circle."""
    chain: list[RulesetText] = []
    wanted = name
    while wanted:
        found = rulesets.get(wanted)
        if found is None:
            close = difflib.get_close_matches(wanted, rulesets, 1)
            accepted = f"did you mean {close[0]!r}?" if close else f"one of {', '.join(sorted(rulesets)) or 'none at hand'}"
            what = f"no ruleset is named {wanted!r}"
            if not chain:
                raise RulesetError(f"{what}; accepted: {accepted}")
            raise RulesetError(faults=[fault_at(follow(chain[-1].root, ("built_on",)), chain[-1].file, what, accepted)])
        if found in chain:
            circle = " -> ".join([*(one.content.name for one in chain), wanted])
            raise RulesetError(f"rulesets are built on each other in a circle: {circle}")
        chain.append(found)
        wanted = found.content.built_on
    return _lay(chain)


def _lay(chain: list[RulesetText]) -> Ruleset:
    rules: dict[str, RuleTerms] = {}
    faults: list[Fault] = []
    statement, near = "", ""
    decision: Literal["simple", "guarded"] = "guarded"
    for one in reversed(chain):
        content = one.content
        statement = content.statement or statement
        near = content.near_the_limit or near
        decision = content.decision_rule or decision
        for rule, setting in content.rules.items():
            if setting.left_out:
                rules.pop(rule, None)
                continue
            spot = fault_at(key_node(follow(one.root, ("rules",)), rule), one.file, "")
            terms = rules.setdefault(rule, RuleTerms())
            terms.place = (spot.file, spot.line, spot.column)
            if setting.required is not None:
                terms.required = setting.required
            for occasion in OCCASIONS:
                severity = getattr(setting.severities, occasion)
                if severity is not None:
                    terms.severities[occasion] = severity
            for name, limit in setting.limits.items():
                source = content.sources[limit.source]
                place = fault_at(follow(one.root, ("rules", rule, "limits", name, "value")), one.file, "")
                terms.limits[name] = RawLimit(
                    limit.value, Source(**source.model_dump()), f"{content.name}/{limit.source}", content.name, one.file,
                    place.line, place.column,
                )
    for rule, terms in rules.items():
        absent = [occasion for occasion in OCCASIONS if occasion not in terms.severities]
        if absent:
            what = f"the rule {rule!r} has no severity for {', '.join(absent)}"
            faults.append(Fault(*terms.place, what, "`severities: {nominal: major, worst_case: minor, ...}`"))
    if not statement:
        what = "the ruleset does not say that local codes and the responsible person prevail"
        faults.append(Fault(chain[0].file, 1, 1, what, "`statement: ...`"))
    if faults:
        raise RulesetError(faults=sorted(faults))
    digest = hashlib.sha256("".join(one.sha256 for one in chain).encode()).hexdigest()
    top = chain[0].content
    return Ruleset(
        top.name, top.title, top.edition, top.jurisdiction, statement, read(near or "5 %", si.RATIO).nominal,
        tuple(one.content.name for one in chain[1:]), digest, rules, tuple((one.file, one.sha256) for one in chain),
        decision,
    )


def bind(rule: str, specs: Mapping[str, LimitSpec], terms: RuleTerms) -> dict[str, Limit]:
    """The limits of a rule, read in the dimensions the rule wants. Raises RulesetError with every fault."""
    faults: list[Fault] = []
    limits: dict[str, Limit] = {}
    for name, raw in terms.limits.items():
        spec = specs.get(name)
        if spec is None:
            close = difflib.get_close_matches(name, specs, 1)
            accepted = f"did you mean {close[0]!r}?" if close else f"one of {', '.join(specs) or 'no limits at all'}"
            faults.append(Fault(raw.file, raw.line, raw.column, f"the rule {rule!r} has no limit {name!r}", accepted))
            continue
        try:
            quantity = read(raw.text, spec.dimension)
        except QuantityError as error:
            faults.append(Fault(raw.file, raw.line, raw.column, error.what, error.accepted))
            continue
        limits[name] = Limit(name, quantity, raw.source, f"rules.{rule}.limits.{name}", raw.set_by)
    if faults:
        raise RulesetError(faults=faults)
    return limits
