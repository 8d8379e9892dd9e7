"""What could not be assessed, as text: grouped by the data that would let it be."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, field

from circuitlint.reports.terminal import Paint, hung, left, listed, para, printable, prose, wrapped
from circuitlint.reports.words import counted
from circuitlint.review.record import SEVERITIES, Check, Record, Severity

MOST_TAG_LINES = 2


@dataclass(slots=True)
class _Gap:
    """Checks that lack the same data, by severity and rule."""

    rows: dict[tuple[Severity, str], dict[str, None]] = field(default_factory=dict)
    checks: int = 0


def not_assessed(record: Record, width: int, paint: Paint) -> list[str]:
    """What could not be assessed, grouped by the data that would let it be."""
    gaps: dict[str, _Gap] = {}
    for circuit in record.circuits:
        for check in circuit.checks:
            if check.result == "not assessed":
                gap = gaps.setdefault(_lacking(check), _Gap())
                gap.rows.setdefault((check.severity or "observation", check.rule), {})[circuit.tag] = None
                gap.checks += 1
    if not gaps:
        return []
    total = sum(gap.checks for gap in gaps.values())
    lines = [paint.strong(f"Not assessed: {counted(total, 'check')}")]
    ordered = sorted(gaps.items(), key=lambda pair: min(SEVERITIES.index(severity) for severity, _ in pair[1].rows))
    field_width = max(len(severity) for gap in gaps.values() for severity, _ in gap.rows)
    for lacking, gap in ordered:
        lines += para(lacking, width, 2)
        for severity, rules, tags in _merged(gap):
            first, *rest = tags_on_lines(tags, width - field_width - 6, f"{', '.join(map(printable, rules))}: ")
            lines.append(f"    {paint.word(severity, left(severity, field_width))}  {first}")
            lines += hung("", rest, field_width + 6, 0)
    return lines


def _merged(gap: _Gap) -> list[tuple[Severity, list[str], list[str]]]:
    """Rows of a gap, worst first; rules of one severity that concern the same circuits share a row."""
    rows: dict[tuple[Severity, tuple[str, ...]], list[str]] = {}
    for (severity, rule), tags in gap.rows.items():
        rows.setdefault((severity, tuple(tags)), []).append(rule)
    merged = [(severity, rules, list(tags)) for (severity, tags), rules in rows.items()]
    return sorted(merged, key=lambda row: SEVERITIES.index(row[0]))


def _lacking(check: Check) -> str:
    if check.needs:
        return f"needs {'; '.join(map(prose, check.needs))}"
    return prose(check.why) or prose(check.what)


def tags_on_lines(tags: Sequence[str], width: int, before: str) -> list[str]:
    """Tags on a few lines; how many more there are is said."""
    lines = listed([before + printable(tags[0]), *map(printable, tags[1:])], width)
    if len(lines) <= MOST_TAG_LINES:
        return [piece for line in lines for piece in wrapped(line, width)]
    kept = " ".join(lines[:MOST_TAG_LINES])
    shown = kept.removesuffix(",").count(", ") + 1
    return wrapped(f"{kept.removesuffix(',')} and {counted(len(tags) - shown, 'more circuit')}", width)
