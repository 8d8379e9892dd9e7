"""Everything the tests of a rule import: a definition given as text is reviewed, and what was found is asserted.

    found = examine(DEFINITION, ClampFirst, limits={"largest_in_line": "2 A"})
    found.expect("nonconforming", tag="=R3-Y1", severity="major")
    hold_to_promises(DEFINITION, ClampFirst, limits={"largest_in_line": "2 A"})

`examine` reviews, `Examination.expect` asserts, `hold_to_promises` runs what every rule is held to. The names in `__all__` stay.
"""

from __future__ import annotations

import json
from collections.abc import Iterable, Mapping
from dataclasses import dataclass, field, replace
from typing import Any, Literal, TypeAlias

from circuitlint.definition.reading import Installation, read_contents
from circuitlint.engine import Review, review
from circuitlint.errors import InputError, PluginError
from circuitlint.isolation import taking
from circuitlint.isolation.rules import GuardedRule
from circuitlint.limits.models import Ruleset
from circuitlint.limits.reading import read_ruleset, resolve
from circuitlint.plugins import Gathered, Plugin, gather
from circuitlint.promises import DELETIONS_NEEDED, narrowed, without_each_datum
from circuitlint.review.record import Check, Coverage, Record, Result, Severity
from circuitlint.review.rule import Rule

__all__ = ["DEFAULT_SEVERITIES", "Examination", "examine", "hold_to_promises"]

Limits: TypeAlias = Mapping[str, str] | Mapping[str, Mapping[str, str]]
FILE = "definition.yaml"
OWN = "given in the test"
DEFAULT_SEVERITIES: Mapping[str, Severity] = {
    "nominal": "major", "worst_case": "minor", "near_limit": "observation", "kind": "major", "not_assessed": "observation",
}
"""Severities where a test names no ruleset and none of its own."""


@dataclass(frozen=True, slots=True)
class Examination:
    """What a review of a definition found."""

    record: Record
    """The whole review record."""

    def result(self, rule: str, tag: str) -> Coverage:
        """What became of a rule on a circuit: `conforms`, `nonconforming`, `not assessed` or `not applicable`.

        Raises AssertionError where the review knows no such rule or circuit.
        """
        for circuit in self.record.circuits:
            if circuit.tag == tag:
                if rule in circuit.coverage:
                    return circuit.coverage[rule]
                raise AssertionError(f"no rule {rule!r} was run; there are {', '.join(circuit.coverage)}")
        raise AssertionError(f"no circuit has the tag {tag!r}; there are {', '.join(one.tag for one in self.record.circuits)}")

    def checks(
        self, *, rule: str = "", tag: str = "", figure: str = "", state: str = "", of: str = ""
    ) -> tuple[Check, ...]:
        """The checks that fit every word given, in the order of the record."""
        return tuple(
            check
            for circuit in self.record.circuits
            if not tag or circuit.tag == tag
            for check in circuit.checks
            if (not rule or check.rule == rule) and (not figure or check.figure == figure)
            and (not state or check.state == state) and (not of or check.of == of)
        )

    def expect(
        self, result: Result, *, rule: str = "", tag: str = "", figure: str = "", state: str = "", of: str = "",
        severity: Severity | Literal["none"] | None = None, basis: str | None = None, margin: object = None,
        nominal: object = None, worst: object = None, needs: Iterable[str] = (), says: str = "",
    ) -> Check:
        """Assert that a check has this result, and everything else that is given; gives the first such check.

        `margin`, `nominal` and `worst` are compared with `==`, so `pytest.approx(...)` will do. `needs` are data that must be
        among those asked for, `says` a piece of what is said. Raises AssertionError that lists the checks there are.
        """
        fitting = self.checks(rule=rule, tag=tag, figure=figure, state=state, of=of)
        for check in fitting:
            if (
                check.result == result
                and (severity is None or (check.severity or "none") == severity)
                and (basis is None or (check.basis or "") == basis)
                and all(
                    wanted is None or getattr(check, word) == wanted
                    for word, wanted in (("margin", margin), ("nominal", nominal), ("worst", worst))
                )
                and set(needs) <= set(check.needs)
                and says in f"{check.what} {check.why} {check.help}"
            ):
                return check
        there = "\n".join(f"  {_told(check)}" for check in fitting) or "  no check fits the words given"
        raise AssertionError(f"no check is {result} as expected; there are\n{there}")


def _told(check: Check) -> str:
    margin = "" if check.margin is None else f", margin {check.margin:.4g}"
    needs = f", needs {', '.join(check.needs)}" if check.needs else ""
    basis = f", {check.basis}" if check.basis else ""
    severity = check.severity or "none"
    return f"{check.id}: {check.result}{basis}, severity {severity}{margin}{needs}: {check.what} {check.why}".rstrip()


@dataclass(slots=True)
class _Case:
    """A definition with everything a review of it needs."""

    gathered: Gathered
    ruleset: Ruleset
    files: list[tuple[str, bytes]]
    options: Review = field(default_factory=Review)
    contain: bool = False

    def read(self, text: str | None = None) -> Installation:
        first = self.files[0] if text is None else (FILE, text.encode())
        return read_contents([first, *self.files[1:]], self.gathered.models())

    def run(self, installation: Installation, during: str = "") -> Examination:
        made = review(installation, self.ruleset, self.gathered, self.options)
        for problem in made.problems if not self.contain else ():
            who = problem.rule or problem.plugin
            where = f" on {', '.join(problem.circuits)}" if problem.circuits else ""
            raise AssertionError(f"{who} failed{where}{during}: {problem.what}")
        return Examination(made)


def examine(
    definition: str, *rules: type[Rule], limits: Limits | None = None, severities: Mapping[str, Severity] | None = None,
    near_the_limit: str = "5 %", ruleset: str = "", plugin: object = None, hold_at: str = "major", on_date: str = "2026-12-01",
    contain: bool = False,
) -> Examination:
    """Review a definition given as text against rules, and give what was found.

    `rules` are rule classes; `plugin` is a plugin's module, whose rules, load kinds, figures, parts and rulesets all take part.
    Limits come from `limits` (texts by name, or by rule and name) with `severities` by occasion, or from `ruleset`: the text of
    one, or the name of one that is shipped or offered. A rule that fails raises AssertionError, unless `contain` lets the
    review go on as it would in service. Raises InputError where the definition or the ruleset has faults.
    """
    case = _case(definition, rules, limits, severities, near_the_limit, ruleset, plugin)
    case.options, case.contain = Review(hold_at, on_date), contain
    return case.run(case.read())


def _case(
    definition: str, rules: Iterable[type[Rule]], limits: Limits | None, severities: Mapping[str, Severity] | None,
    near: str, ruleset: str, plugin: object,
) -> _Case:
    gathered = gather(installed=bool(ruleset), modules=[] if plugin is None else [plugin])
    for one in gathered.plugins:
        if one.failed:
            raise AssertionError(f"the plugin {one.name} failed: {one.failed}")
    own = Plugin(OWN, "", OWN)
    try:
        made = {rule.name: rule for rule in taking.rules(list(rules))}
    except PluginError as error:
        raise AssertionError(str(error)) from None
    if made:
        gathered.plugins.append(own)
        gathered.rules.update({name: (GuardedRule(rule), own) for name, rule in made.items()})
    if not ruleset:
        asked = made or {name: rule for name, (rule, _) in gathered.rules.items()}
        ruleset = _ruleset_text(asked, limits or {}, {**DEFAULT_SEVERITIES, **(severities or {})}, near)
    elif limits is not None or severities is not None:
        raise TypeError("limits and severities come from `ruleset`, or are given one by one; not both")
    if "\n" in ruleset:
        read = read_ruleset(ruleset.encode(), "ruleset.yaml")
        gathered.rulesets[read.content.name] = read
        ruleset = read.content.name
    return _Case(gathered, resolve(ruleset, gathered.rulesets), [(FILE, definition.encode()), *gathered.parts])


def _ruleset_text(rules: Mapping[str, Rule], limits: Limits, severities: Mapping[str, str], near: str) -> str:
    """A ruleset as text, since every JSON text is YAML."""
    by_rule: dict[str, Any] = {}
    for name, value in limits.items():
        if isinstance(value, str):
            owners = [rule for rule in rules.values() if name in rule.limits]
            if len(owners) != 1:
                told = f"{len(owners)} of the rules have" if owners else "no rule has"
                raise TypeError(f"{told} a limit {name!r}; accepted: limits by rule and name")
            by_rule.setdefault(owners[0].name, {})[name] = value
        else:
            by_rule[name] = dict(value)
    unknown = [name for name in by_rule if name not in rules]
    if unknown:
        raise TypeError(f"no rule {unknown[0]!r} is given; there are {', '.join(rules)}")
    entries = {
        name: {
            "required": True, "severities": dict(severities),
            "limits": {limit: {"value": text, "source": "test"} for limit, text in by_rule.get(name, {}).items()},
        }
        for name in rules
    }
    made = {
        "format": 1, "name": "test", "title": "Limits given in a test", "edition": "2026-12-01", "jurisdiction": "none",
        "statement": "Limits given in a test.", "near_the_limit": near,
        "sources": {"test": {"known": "firm's own", "work": "given in a test"}}, "rules": entries,
    }
    return json.dumps(made, indent=1, ensure_ascii=False) + "\n"


def hold_to_promises(
    definition: str, *rules: type[Rule], limits: Limits | None = None, severities: Mapping[str, Severity] | None = None,
    near_the_limit: str = "5 %", ruleset: str = "", plugin: object = None,
) -> None:
    """Hold rules to what every rule promises, on a definition that gives them something to find.

    Deterministic: twice the same, in any order of the circuits, alone or with every state studied. Never silent: no datum and no
    limit can be left out so that what did not conform now does, or is no longer looked at. Never changing the study. Worst case:
    what does not conform without tolerances does not conform with them. Arguments are those of `examine`. Raises
    AssertionError that names the rule, the promise and what was done.
    """
    given = list(rules)
    case = _case(definition, given, limits, severities, near_the_limit, ruleset, plugin)
    names = [rule.name for rule in given] or [
        name for name, (_, owner) in case.gathered.rules.items() if owner.origin == "given" and name in case.ruleset.rules]
    case.ruleset.rules = {name: terms for name, terms in case.ruleset.rules.items() if name in names}
    whole = case.run(case.read())
    if not names or not whole.record.circuits:
        raise AssertionError("nothing to hold: give at least one rule and one circuit")
    _same_each_time(case, whole, names)
    _never_silent(case, whole, names, definition)
    _never_silent_of_limits(case, whole, names)
    exact = case.run(narrowed(case.read()), " without tolerances")
    for rule in names:
        after = {check.id: check for check in whole.checks(rule=rule)}
        for check in exact.checks(rule=rule):
            if check.result == "nonconforming" and (check.id not in after or after[check.id].result != "nonconforming"):
                found = after[check.id].result if check.id in after else "not there"
                raise AssertionError(f"{check.id} is nonconforming without tolerances, and {found} with them: {check.what}")


def _same_each_time(case: _Case, whole: Examination, names: list[str]) -> None:
    again = case.run(case.read(), " at the second time")
    turned = case.read()
    turned.circuits.reverse()
    backwards = case.run(turned, " with the circuits in reverse order")
    alone = replace(case, options=replace(case.options, figures=False))
    few = alone.run(case.read(), " with only its own states studied")
    for told, other in (("twice", again), ("in reverse order", backwards), ("with only its own states studied", few)):
        for rule in names:
            one, two = ({check.id: check for check in found.checks(rule=rule)} for found in (whole, other))
            if one != two:
                differ = sorted(name for name in {*one, *two} if one.get(name) != two.get(name))
                raise AssertionError(f"{rule} does not say the same when run {told}: {differ[0]}")


def _never_silent(case: _Case, whole: Examination, names: list[str], definition: str) -> None:
    tried = 0
    case = replace(case, options=replace(case.options, figures=False))
    for path, text in without_each_datum(definition, case.files[1:]):
        try:
            installation = case.read(text)
        except InputError:
            continue
        tried += 1
        after = case.run(installation, f" when {path} is left out")
        _compare(whole, after, names, f"{path} is left out")
    if tried < DELETIONS_NEEDED:
        raise AssertionError("the definition holds no datum that could be left out; give one with optional data in it")


def _never_silent_of_limits(case: _Case, whole: Examination, names: list[str]) -> None:
    for rule in names:
        terms = case.ruleset.rules.get(rule)
        for limit in list(terms.limits) if terms else ():
            kept = case.ruleset.rules[rule]
            case.ruleset.rules[rule] = replace(kept, limits={key: one for key, one in kept.limits.items() if key != limit})
            try:
                after = case.run(case.read(), f" when the limit {limit} is left out")
            finally:
                case.ruleset.rules[rule] = kept
            _compare(whole, after, [rule], f"the limit {limit} is left out", whole_rule=False)


def _compare(before: Examination, after: Examination, names: list[str], done: str, whole_rule: bool = True) -> None:
    """What did not conform before may not conform now, nor be passed over."""

    def tell(what: str) -> AssertionError:
        return AssertionError(f"{what} when {done}")

    for rule in names:
        bad = {check.id for check in before.checks(rule=rule) if check.result != "conforms"}
        for check in after.checks(rule=rule):
            if check.id in bad and check.result == "conforms":
                raise tell(f"{check.id} conforms")
        there = {circuit.tag for circuit in after.record.circuits}
        for circuit in (one for one in before.record.circuits if one.tag in there):
            now = after.result(rule, circuit.tag)
            if circuit.coverage[rule] in ("nonconforming", "not assessed") and now in ("conforms", "not applicable"):
                raise tell(f"{rule} on {circuit.tag} is {now}, and was {circuit.coverage[rule]},")
            if whole_rule and circuit.coverage[rule] == "conforms" and now == "not applicable":
                raise tell(f"{rule} no longer looks at {circuit.tag}")
