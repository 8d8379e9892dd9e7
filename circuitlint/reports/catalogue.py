"""What is checked: each rule of a ruleset with its limits, their sources, and the data it needs."""

from __future__ import annotations

from collections.abc import Iterator, Mapping

from circuitlint.reports.terminal import NARROW, WIDE, hung, printable, prose, wrapped
from circuitlint.reports.text import PREVAIL
from circuitlint.reports.words import bound, citation, spoken
from circuitlint.review.record import LimitRecord, Record, RuleRecord

_LABEL = 10


def render_rules(record: Record, meanings: Mapping[str, Mapping[str, str]], name: str = "", width: int = 80) -> str:
    """The rules of a record's ruleset, or the one of that name, in at most `width` columns (60 to 400).

    `meanings` says what each limit of each rule is, in words. A single rule is told whole; several are told in brief.
    """
    width = min(WIDE, max(NARROW, width))
    ruleset = record.ruleset
    rules = [rule for rule in record.rules if not name or rule.name == name]
    known = f"{printable(ruleset.name)}, edition {printable(ruleset.edition)}"
    lines = wrapped(f"{prose(ruleset.title) or 'Ruleset'} ({known})", width)
    if not name and ruleset.jurisdiction:
        lines += wrapped(prose(ruleset.jurisdiction), width)
    for rule in rules:
        lines += ["", *_rule(record, rule, meanings.get(rule.name, {}), bool(name), width)]
    if not rules:
        lines += ["", "The ruleset names no rule."]
    return "\n".join([*lines, "", *wrapped(prose(ruleset.statement) or PREVAIL, width)]) + "\n"


def _rule(record: Record, rule: RuleRecord, meanings: Mapping[str, str], whole: bool, width: int) -> Iterator[str]:
    required = "" if rule.required else " (a review may go without it)"
    yield from wrapped(f"{printable(rule.name)}: {prose(rule.title)}{required}", width)
    room = width - _LABEL - 2
    told = [("why", rule.purpose), ("looks at", rule.applies_to)]
    if whole:
        told += [("needs", "; ".join(rule.needs)), ("helps", rule.helps), ("plugin", rule.plugin)]
    for label, text in told:
        if text:
            yield from hung(label, wrapped(prose(text), room), 2, _LABEL)
    limits = [limit for limit in record.ruleset.limits if limit.path.startswith(f"rules.{rule.name}.")]
    given = {limit.name: limit for limit in limits}
    rows = [(meaning, given.pop(limit, None)) for limit, meaning in meanings.items()]
    rows += [(spoken(limit.name), limit) for limit in given.values()]
    for meaning, limit in rows:
        yield from hung("limit", wrapped(_limit(record, meaning, limit), room), 2, _LABEL)
    severities = record.ruleset.severities.get(rule.name, {})
    if whole and severities:
        shown = ", ".join(f"{spoken(occasion)} {severity}" for occasion, severity in severities.items())
        yield from hung("severity", wrapped(shown, room), 2, _LABEL)


def _limit(record: Record, meaning: str, limit: LimitRecord | None) -> str:
    if limit is None:
        return f"{prose(meaning)}: the ruleset gives none, so what depends on it is not assessed"
    source = record.sources.get(limit.source)
    cited = citation(source) if source is not None else prose(limit.source)
    setter = f", set by {printable(limit.set_by)}" if limit.set_by != record.ruleset.name else ""
    # A share is a percentage; the meaning says it where the limit's own name does not.
    named = "share" if "share" in meaning else limit.name
    value = bound("", limit.value, limit.dimension, named)
    return f"{prose(meaning)}: {value}; {cited}{setter}"
