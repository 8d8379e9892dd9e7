"""The main job on one page: definition, ruleset and rules go in, a review record comes out."""

from __future__ import annotations

import difflib
from collections.abc import Callable, Iterable
from dataclasses import dataclass, field

from circuitlint.definition.reading import Installation
from circuitlint.errors import Fault, RulesetError
from circuitlint.isolation.containment import keyboard_heeded, overheard
from circuitlint.isolation.judging import Bound, judge_all, note_trouble
from circuitlint.isolation.sealing import closed, seal
from circuitlint.limits.models import Ruleset
from circuitlint.limits.reading import bind
from circuitlint.plugins import Gathered
from circuitlint.review import record as r
from circuitlint.review.assembly import Assembly
from circuitlint.review.judge import Judge
from circuitlint.study.installation import study


@dataclass(slots=True)
class Review:
    """What a review needs beside its input: how strict, how much to put down, whom to tell of progress."""

    hold_at: r.Severity | str = "major"
    on_date: str = ""
    figures: bool = True
    tell: Callable[[int, int], None] = field(default=lambda done, total: None)


def review(installation: Installation, ruleset: Ruleset, gathered: Gathered, options: Review | None = None) -> r.Record:
    """Review every circuit against every rule of the ruleset.

    Raises RulesetError where the ruleset names a rule or limit nobody knows. A rule that fails is contained and recorded.
    """
    options = options or Review()
    assembly = Assembly(installation, ruleset, gathered.kinds, options.hold_at, options.on_date, options.figures)
    bound = bind_rules(ruleset, gathered, assembly)
    sought = {name for one in bound for name in one.rule.figures}
    states = None if options.figures else {state for one in bound for state in one.rule.states}
    gathered.troubles.drain()
    with keyboard_heeded(), overheard() as ear:
        circuits = study(installation, gathered.kinds, sought, states)
        seal(circuits)
        ear.drain()
        for number, circuit in enumerate(circuits):
            assembly.add(circuit, judge_all(bound, circuit, assembly, ear))
            options.tell(number + 1, len(circuits))
        for trouble in gathered.troubles.drain():
            note_trouble(trouble, circuits, bound, assembly)
    return assembly.record(
        [(one.rule, one.plugin, one.required, one.limits) for one in bound],
        [r.PluginRecord(name=one.name, version=one.version, origin=one.origin, offers=tuple(one.offers), failed=one.failed)
         for one in gathered.plugins],
    )


def bind_rules(ruleset: Ruleset, gathered: Gathered, assembly: Assembly) -> list[Bound]:
    """The rules the ruleset names, with their limits. A rule lost with a failed plugin is a problem; else it is refused."""
    faults: list[Fault] = []
    bound: list[Bound] = []
    failed = [plugin for plugin in gathered.plugins if plugin.failed]
    for plugin in failed:
        assembly.problem(plugin.name, "", f"the plugin failed: {plugin.failed}", (), fatal=False)
    for name, terms in ruleset.rules.items():
        if name not in gathered.rules:
            if failed:
                told = "the rule is in the ruleset, but no plugin that loaded offers it"
                assembly.lost(name, ", ".join(plugin.name for plugin in failed), told, terms.required)
                continue
            accepted = nearest_rule(name, gathered.rules)
            faults.append(Fault(*terms.place, f"no plugin offers the rule {name!r}", accepted))
            continue
        rule, plugin = gathered.rules[name]
        try:
            limits = bind(name, rule.limits, terms)
        except RulesetError as error:
            faults.extend(error.faults)
            continue
        keys = {limit: assembly.source(given.source) for limit, given in limits.items()}
        judge = Judge(rule, terms.severities, ruleset.near_the_limit, keys)
        bound.append(Bound(rule, plugin.name, closed(limits), judge, terms.required))
    if faults:
        raise RulesetError(faults=faults)
    return bound


def nearest_rule(name: str, known: Iterable[str]) -> str:
    """What a misspelt rule name may have meant."""
    from_list = sorted(known)
    close = difflib.get_close_matches(name, from_list, 1)
    close = close or [one for one in from_list if set(one.split("-")) & set(name.split("-"))]
    return f"did you mean {close[0]!r}?" if close else f"one of {', '.join(from_list)}"
