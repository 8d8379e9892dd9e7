"""What moved between two records: margins, figures, stated data, limits, and the other terms of a review."""

from __future__ import annotations

import math
from collections.abc import Iterator, Mapping, Sequence
from typing import Any

from circuitlint.review import changes as c
from circuitlint.review.record import Check, Circuit, Element, Figure, LimitRecord, Record
from circuitlint.si import ANGLE, DIMENSIONS, TEMPERATURE

# What is less than this, in the SI unit, is nothing: an offset scale and an angle have a zero that means no smallness.
_FLOOR = {TEMPERATURE.name: 0.05, ANGLE.name: 1e-4}
Key = tuple[str, str, int]
"""A check by its rule, its id without the circuit's tag, and a number among those alike."""


def keyed(circuit: Circuit | None) -> dict[Key, Check]:
    """Checks by what they are, the circuit's tag left out."""
    found: dict[Key, Check] = {}
    if circuit is None:
        return found
    for check in circuit.checks:
        rest = check.id.removeprefix(f"{check.rule}|{circuit.tag}")
        number = 0
        while (check.rule, rest, number) in found:
            number += 1
        found[check.rule, rest, number] = check
    return found


def subject(circuit: Circuit, was: Check | None, now: Check | None) -> dict[str, Any]:
    """The fields of a `Subject`, from the check on either side; one of the two is given."""
    told = now or was
    assert told is not None
    return {
        "tag": circuit.tag,
        "serves": circuit.serves,
        "rule": told.rule,
        "check": told.id,
        "state": told.state,
        "figure": told.figure,
        "of": told.of,
        "sense": told.sense or (was.sense if was else ""),
        "dimension": told.dimension or (was.dimension if was else ""),
        "worst_before": was.worst if was else None,
        "worst_after": now.worst if now else None,
        "limit_before": _value(was),
        "limit_after": _value(now),
        "margin_before": was.margin if was else None,
        "margin_after": now.margin if now else None,
    }


def _value(check: Check | None) -> float | None:
    return check.limit.value if check is not None and check.limit is not None else None


def margins(old: Circuit, new: Circuit) -> Iterator[c.MarginMove]:
    """Checks made on both sides whose worst end or limit moved."""
    later = keyed(new)
    for key, was in keyed(old).items():
        now = later.get(key)
        if now is None or was.worst is None or now.worst is None or was.limit is None or now.limit is None:
            continue
        by_limit = moved(was.limit.value, now.limit.value, now.limit.dimension)
        if not by_limit and not moved(was.worst, now.worst, now.dimension):
            continue
        within, still = was.result == "conforms", now.result == "conforms"
        crossed: c.Crossed = "" if within == still else "beyond" if within else "back within"
        yield c.MarginMove(**subject(new, was, now), crossed=crossed)


def weight(move: c.MarginMove) -> tuple[int, float]:
    """Crossings beyond a limit, crossings back, then the farthest moves."""
    rank = {"beyond": 0, "back within": 1, "": 2}[move.crossed]
    if move.margin_before is None or move.margin_after is None:
        return rank, 0.0
    return rank, -abs(move.margin_after - move.margin_before)


def change_of(before: float, after: float, dimension: str) -> float:
    """Relative change as a share of the larger magnitude, 0 to 2; zero where both are too small to mean anything."""
    if not (math.isfinite(before) and math.isfinite(after)):
        return 0.0 if before == after or (math.isnan(before) and math.isnan(after)) else 1.0
    known = DIMENSIONS.get(dimension)
    floor = _FLOOR.get(dimension, max(0.0, known.smallest) if known is not None else 0.0)
    larger = max(abs(before), abs(after))
    if larger == 0.0 or (larger < floor or (dimension in _FLOOR and abs(after - before) < floor)):
        return 0.0
    return abs(after / larger - before / larger)


def moved(before: float, after: float, dimension: str) -> bool:
    """Whether a quantity moved by more than `SILENT` of itself."""
    return change_of(before, after, dimension) > c.SILENT


def figures(old: Circuit, new: Circuit) -> Iterator[c.FigureMove]:
    """Figures given on both sides of which an end or the nominal value moved."""
    earlier = {(one.name, one.of, one.state): one for one in reversed(old.figures)}
    told: set[tuple[str, str, str]] = set()
    for now in new.figures:
        key = now.name, now.of, now.state
        was = earlier.get(key) if key not in told else None
        told.add(key)
        if was is None or was.dimension != now.dimension:
            continue
        ends_before, ends_after = _ends(was), _ends(now)
        change = max(change_of(a, b, now.dimension) for a, b in zip(ends_before, ends_after, strict=True))
        if change > c.SILENT:
            yield c.FigureMove(
                tag=new.tag,
                name=now.name,
                of=now.of,
                state=now.state,
                dimension=now.dimension,
                before=ends_before,
                after=ends_after,
                change=change,
            )


def _ends(figure: Figure) -> tuple[float, float, float]:
    return figure.lowest, figure.nominal, figure.highest


def data(old: Circuit, new: Circuit) -> Iterator[c.DatumChange]:
    """Parts of which the definition states something else."""
    earlier, later = _parts(old.tree), _parts(new.tree)
    if old.fed_from != new.fed_from:
        yield c.DatumChange(tag=new.tag, of="", kind="fed from", before=(old.fed_from,), after=(new.fed_from,))
    for of in dict.fromkeys((*earlier, *later)):
        was, now = earlier.get(of), later.get(of)
        told = now or was
        assert told is not None
        before, after = _stated(was), _stated(now)
        if before != after:
            yield c.DatumChange(tag=new.tag, of=of, kind=told.kind, before=_without(before, after), after=_without(after, before))


def _without(some: tuple[str, ...], others: tuple[str, ...]) -> tuple[str, ...]:
    kept = tuple(one for one in some if one not in others)
    return kept if kept or set(some) != set(others) else some


def _stated(element: Element | None) -> tuple[str, ...]:
    if element is None:
        return ()
    return element.values if element.values else (element.kind,)


def _parts(element: Element) -> dict[str, Element]:
    found = {element.of: element}
    for part in element.parts:
        found.update(_parts(part))
    return found


def limits(before: Sequence[LimitRecord], after: Sequence[LimitRecord]) -> Iterator[c.LimitChange]:
    """Limits that came, went or have another value."""
    earlier, later = {one.path: one for one in before}, {one.path: one for one in after}
    for path in dict.fromkeys((*earlier, *later)):
        was, now = earlier.get(path), later.get(path)
        told = now or was
        assert told is not None
        if was is not None and now is not None and (was.value, was.dimension) == (now.value, now.dimension):
            continue
        yield c.LimitChange(
            path=path,
            name=told.name,
            dimension=told.dimension,
            set_by=told.set_by,
            before=was.value if was else None,
            after=now.value if now else None,
        )


def terms(before: Record, after: Record) -> Iterator[c.TermChange]:
    """Ruleset, rules, severities, closeness, hold, and the versions of what did the work."""
    one, other = before.ruleset, after.ruleset
    yield from _term("ruleset", f"{one.name}, edition {one.edition}", f"{other.name}, edition {other.edition}")
    yield from _term("hold at", before.hold_at, after.hold_at)
    yield from _term("room that counts as close to a limit", f"{one.near_the_limit:.3g}", f"{other.near_the_limit:.3g}")
    taken = "in the ruleset"
    yield from _terms_of("rule", {rule.name: taken for rule in before.rules}, {rule.name: taken for rule in after.rules})
    for rule in dict.fromkeys((*one.severities, *other.severities)):
        was, now = one.severities.get(rule, {}), other.severities.get(rule, {})
        if was and now:
            for occasion in dict.fromkeys((*was, *now)):
                what = f"severity of {rule}, {occasion.replace('_', ' ')}"
                yield from _term(what, was.get(occasion, ""), now.get(occasion, ""))
    yield from _term("tool", f"{before.tool} {before.version}", f"{after.tool} {after.version}")
    yield from _terms_of(
        "plugin",
        {each.name: each.version for each in before.plugins},
        {each.name: each.version for each in after.plugins},
    )


def _terms_of(what: str, before: Mapping[str, str], after: Mapping[str, str]) -> Iterator[c.TermChange]:
    """Named things that came, went, or, where both sides have them, read differently."""
    for name in dict.fromkeys((*before, *after)):
        yield from _term(f"{what} {name}", before.get(name, ""), after.get(name, ""))


def _term(what: str, before: str, after: str) -> Iterator[c.TermChange]:
    if before != after:
        yield c.TermChange(what=what, before=before, after=after)
