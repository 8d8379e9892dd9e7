"""Rules run one at a time, each on one circuit behind a guard; what failed is named, and the study is as it was."""

from __future__ import annotations

from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass

from circuitlint.isolation.containment import PRINTED, Ear, describe, is_the_persons_wish
from circuitlint.isolation.kinds import Trouble
from circuitlint.isolation.rules import Endless
from circuitlint.isolation.sealing import Watch
from circuitlint.limits.models import Limit
from circuitlint.review import record as r
from circuitlint.review.assembly import Assembly
from circuitlint.review.judge import Judge
from circuitlint.review.rule import Rule
from circuitlint.study.plan import Node
from circuitlint.study.study import CircuitStudy

CHANGES_THE_STUDY = "it changes the study, which it may only read; what it changed was put back"


@dataclass(slots=True)
class Bound:
    """A rule with the limits and severities of this review."""

    rule: Rule
    plugin: str
    limits: Mapping[str, Limit]
    judge: Judge
    required: bool
    resting: str = ""
    """Why the rule is not run any more, where it did not come to an end."""


def judge_all(
    bound: Sequence[Bound], circuit: CircuitStudy, assembly: Assembly, ear: Ear
) -> dict[str, Sequence[r.Check] | None]:
    """Every rule on one circuit. Where the study was changed, it is put back and every rule looked at again, one by one."""
    watch = Watch(circuit)
    judged = [judge_one(one, circuit, ear) for one in bound]
    if not watch.untouched():
        watch.put_back()
        judged = [judge_one(one, circuit, ear, watch) for one in bound]
    for one, (_, failed, printed) in zip(bound, judged, strict=True):
        if failed:
            assembly.problem(one.plugin, one.rule.name, failed, (circuit.tag,), fatal=one.required)
        if printed:
            assembly.problem(one.plugin, one.rule.name, PRINTED, (), fatal=False)
    return {one.rule.name: checks for one, (checks, _, _) in zip(bound, judged, strict=True)}


def judge_one(
    one: Bound, circuit: CircuitStudy, ear: Ear, watch: Watch | None = None
) -> tuple[Sequence[r.Check] | None, str, bool]:
    """One rule on one circuit: its checks, why it failed, whether it printed. None where it does not apply.

    Whatever the rule raises or exits with stays here.
    """
    checks: list[r.Check] | None = None
    failed = one.resting
    try:
        if not failed and one.rule.applies(circuit):
            checks = [one.judge.check(circuit, outcome) for outcome in one.rule.check(circuit, one.limits)]
            failed = "" if checks else "the rule says it applies, and yields nothing"
    except Endless as error:
        failed = str(error)
        one.resting = f"it did not come to an end on {circuit.tag} and is not run again"
    except BaseException as error:
        if is_the_persons_wish(error):
            raise
        failed = describe(error)
    if watch is not None and not watch.untouched():
        watch.put_back()
        failed = CHANGES_THE_STUDY
    return [one.judge.failed(circuit, failed)] if failed else checks, failed, ear.drain()


def note_trouble(trouble: Trouble, circuits: Sequence[CircuitStudy], bound: Sequence[Bound], assembly: Assembly) -> None:
    """A failed load kind or extra figure becomes a problem that names its circuits; it holds where a required rule suffers."""
    concerned = [one for one in circuits if not trouble.of or trouble.of in kinds_in(one.tree)]
    lacking = [one for one in concerned if trouble.what in reasons_of(one)]
    broken = [one for one in concerned if any(s.faulty[one.position] or s.broken for s in one.solutions.values())]
    asked = {name.partition("@")[0] for one in bound if one.required for name in one.rule.figures}
    fatal = bool(asked & set(trouble.figures)) if trouble.figures else any(one.required for one in bound)
    assembly.problem(trouble.plugin, "", trouble.what, [one.tag for one in lacking or broken or concerned], fatal=fatal)


def kinds_in(node: Node) -> Iterator[str]:
    """Every kind of node in a load tree."""
    yield node.kind
    for one in node.nodes:
        yield from kinds_in(one)


def reasons_of(circuit: CircuitStudy) -> set[str]:
    """Why figures of a circuit are lacking."""
    return {lack.why for solution in circuit.solutions.values() for lack in solution.sheet.lacks.values()}
