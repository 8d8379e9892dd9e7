"""Compares two review records. Nothing here reads a clock, a file or the order of hashing."""

from __future__ import annotations

from collections.abc import Hashable, Iterator, Sequence

from circuitlint.review import changes as c
from circuitlint.review import moves
from circuitlint.review.record import SEVERITIES, Check, Circuit, Record, Severity

_RANK = {severity: rank for rank, severity in enumerate(SEVERITIES)}


def compare(before: Record, after: Record) -> c.Comparison:
    """What a change did, from the earlier record to the later one."""
    pairs, added, removed = _paired(before.circuits, after.circuits)
    findings = [one for pair in pairs for one in _findings(pair, after.hold_at)]
    findings += [one for circuit in added for one in _findings((None, circuit), after.hold_at)]
    findings += [one for circuit in removed for one in _findings((circuit, None), after.hold_at)]
    findings.sort(key=_badness)
    problems = tuple(one for one in after.problems if one not in before.problems)
    margins = [move for old, new in pairs for move in moves.margins(old, new)]
    figures = [move for old, new in pairs for move in moves.figures(old, new)]
    was_held = {id(new): old.held for old, new in pairs}
    return c.Comparison(
        before=_side(before),
        after=_side(after),
        new_held=any(one.newly_holds for one in findings) or _newly_lost(before, after),
        newly_held=tuple(one.tag for one in after.circuits if one.held and not was_held.get(id(one), False)),
        no_longer_held=tuple(new.tag for old, new in pairs if old.held and not new.held),
        problems=problems,
        new=tuple(one for one in findings if one.before is None),
        changed=tuple(one for one in findings if one.before is not None and one.after is not None),
        gone=tuple(one for one in findings if one.after is None),
        lost=tuple(one for old, new in pairs for one in _lost(old, new)),
        margins=tuple(sorted(margins, key=moves.weight)),
        figures=tuple(sorted(figures, key=lambda move: -move.change)),
        data=tuple(one for old, new in pairs for one in moves.data(old, new)),
        added=tuple(_circuit(one) for one in added),
        removed=tuple(_circuit(one) for one in removed),
        renamed=tuple(_circuit(new, old.tag) for old, new in pairs if old.tag != new.tag),
        limits=tuple(moves.limits(before.ruleset.limits, after.ruleset.limits)),
        terms=tuple(moves.terms(before, after)),
    )


def _side(record: Record) -> c.Side:
    files = tuple(one.file for one in record.documents if one.kind == "definition")
    return c.Side(
        title=record.title,
        files=files,
        ruleset=record.ruleset.name,
        edition=record.ruleset.edition,
        circuits=len(record.circuits),
        held=record.held,
    )


def _paired(
    before: Sequence[Circuit], after: Sequence[Circuit]
) -> tuple[list[tuple[Circuit, Circuit]], list[Circuit], list[Circuit]]:
    """Circuits of one tag, or of another tag and otherwise alike; those only after; those only before."""
    earlier, later = _numbered(before), _numbered(after)
    loose = _by_likeness(earlier, later)
    strange = _by_likeness(later, earlier)
    pairs: list[tuple[Circuit, Circuit]] = []
    added: list[Circuit] = []
    for key, one in later.items():
        old = earlier.get(key)
        if old is None:
            twins = loose.get(_likeness(one), [])
            if len(twins) != 1 or len(strange[_likeness(one)]) != 1:
                added.append(one)
                continue
            old = twins.pop()
        pairs.append((old, one))
    removed = {id(one) for some in loose.values() for one in some}
    return pairs, added, [one for one in before if id(one) in removed]


_Numbered = dict[tuple[str, int], Circuit]


def _numbered(circuits: Sequence[Circuit]) -> _Numbered:
    """Circuits by tag, and a number among those of one tag: a stored record may have been put together by anybody."""
    found: _Numbered = {}
    for one in circuits:
        number = 0
        while (one.tag, number) in found:
            number += 1
        found[one.tag, number] = one
    return found


def _likeness(circuit: Circuit) -> Hashable:
    """What two circuits share that serve the same thing by the same parts."""
    return circuit.serves, circuit.fed_from, circuit.system, circuit.tree


def _by_likeness(circuits: _Numbered, others: _Numbered) -> dict[Hashable, list[Circuit]]:
    """The circuits that the others do not have by tag, in groups alike."""
    groups: dict[Hashable, list[Circuit]] = {}
    for key, one in circuits.items():
        if key not in others:
            groups.setdefault(_likeness(one), []).append(one)
    return groups


def _findings(pair: tuple[Circuit | None, Circuit | None], hold_at: str) -> Iterator[c.FindingChange]:
    old, new = pair
    earlier, later = moves.keyed(old), moves.keyed(new)
    circuit = new or old
    assert circuit is not None
    for key in dict.fromkeys((*later, *earlier)):
        was, now = earlier.get(key), later.get(key)
        before, after = was.severity if was else None, now.severity if now else None
        if before is None and after is None:
            continue
        told = now if now is not None and after is not None else was
        assert told is not None
        conceded_before, conceded_after = _conceded(was), _conceded(now)
        if before == after and conceded_before == conceded_after and was and now and was.result == now.result:
            continue
        yield c.FindingChange(
            **moves.subject(circuit, was, now),
            how=_how(pair, was, now),
            before=before,
            after=after,
            result_before=was.result if was else None,
            result_after=now.result if now else None,
            conceded_before=conceded_before,
            conceded_after=conceded_after,
            newly_holds=_holds(now, hold_at) and not _holds(was, hold_at),
            what=told.what,
            help=told.help if after is not None else "",
            place=told.place,
        )


def _how(pair: tuple[Circuit | None, Circuit | None], was: Check | None, now: Check | None) -> c.How:
    old, new = pair
    if now is not None and now.severity is not None:
        if old is None:
            return "circuit added"
        if was is None:
            return "checked for the first time"
        return "new" if was.severity is None else "changed"
    if new is None:
        return "circuit removed"
    return "now conforms" if now is not None else "no longer checked"


def _conceded(check: Check | None) -> bool:
    return check is not None and check.concession is not None


def _holds(check: Check | None, hold_at: str) -> bool:
    if check is None or check.severity is None or check.concession is not None or hold_at == "never":
        return False
    return _RANK[check.severity] <= _RANK[_severity(hold_at)]


def _severity(word: str) -> Severity:
    return next(severity for severity in SEVERITIES if severity == word)


def _newly_lost(before: Record, after: Record) -> bool:
    """Whether the later review lost a required rule that the earlier one had."""
    if not after.held:
        return False
    required = {rule.name: rule.required for rule in (*before.rules, *after.rules)}
    lost_before = {problem.rule for problem in before.problems}
    return any(one.rule and one.rule not in lost_before and required.get(one.rule, True) for one in after.problems)


def _badness(one: c.FindingChange) -> tuple[bool, int, float]:
    severity = one.after or one.before
    margin = one.margin_after if one.after is not None else one.margin_before
    return not one.newly_holds, _RANK[severity] if severity is not None else 9, margin if margin is not None else -1e300


def _lost(old: Circuit, new: Circuit) -> Iterator[c.Lost]:
    """Checks that conformed and went, as far as the rule makes no others in their place."""
    earlier, later = moves.keyed(old), moves.keyed(new)
    for rule in dict.fromkeys(check.rule for check in old.checks):
        went = sum(key[0] == rule and check.result == "conforms" and key not in later for key, check in earlier.items())
        fewer = min(went, _made(old, rule) - _made(new, rule))
        if fewer > 0:
            now = new.coverage.get(rule, "not in the ruleset")
            yield c.Lost(tag=new.tag, rule=rule, checks=fewer, now=now)


def _made(circuit: Circuit, rule: str) -> int:
    return sum(check.rule == rule and check.result != "not assessed" for check in circuit.checks)


def _circuit(circuit: Circuit, was: str = "") -> c.CircuitChange:
    return c.CircuitChange(tag=circuit.tag, was=was, serves=circuit.serves, held=circuit.held)
