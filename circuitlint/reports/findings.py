"""Findings as blocks of text: circuit by circuit, worst first, figures aligned over the whole report."""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Sequence
from dataclasses import dataclass, replace

from circuitlint.reports.terminal import (
    Paint,
    clipped,
    columns,
    equation,
    hung,
    left,
    para,
    printable,
    prose,
    right,
    wrapped,
)
from circuitlint.reports.words import amount, limit_of, percent, place_of, standing, subject
from circuitlint.review.record import SEVERITIES, Check, Circuit, ConcessionRecord, Record

ROOMY = 120
"""From this width on, a finding's rule, subject and figures share one line."""

_RANK = {severity: rank for rank, severity in enumerate(SEVERITIES)}
_LABEL = 7
DETAIL = 6
"""Where the explanation of a finding begins."""
_HEADINGS = ("nominal", "worst", "limit", "margin")


def findings_of(circuit: Circuit) -> list[Check]:
    """The circuit's findings, worst first; what could not be assessed is told elsewhere."""
    found = [check for check in circuit.checks if check.severity is not None and check.result != "not assessed"]
    return sorted(found, key=_badness)


def _badness(check: Check) -> tuple[int, bool, float]:
    rank = _RANK[check.severity] if check.severity is not None else len(_RANK)
    return rank, check.concession is not None, check.margin if check.margin is not None else -1e300


def worst_first(circuits: Iterable[Circuit]) -> list[tuple[Circuit, list[Check]]]:
    """Circuits with findings, or not solved, each with its findings: held before clear, then by the worst finding."""
    found = [(circuit, findings_of(circuit)) for circuit in circuits]
    told = [(circuit, checks) for circuit, checks in found if checks or circuit.not_solved]

    def order(pair: tuple[Circuit, list[Check]]) -> tuple[bool, bool, tuple[int, bool, float]]:
        circuit, checks = pair
        return not circuit.held, bool(checks), _badness(checks[0]) if checks else (-1, False, 0.0)

    return sorted(told, key=order)


@dataclass(frozen=True, slots=True)
class Table:
    """Widths of the columns that all findings of a report share."""

    width: int
    severity: int
    rule: int
    name: int
    """Room for the words before the figures: the rule, and on a roomy page the subject."""
    cells: tuple[int, ...]

    @property
    def tight(self) -> bool:
        """Whether the figures are too long to stand in columns on this page."""
        return self.name < 8

    @property
    def roomy(self) -> bool:
        """Whether the subject of a finding has room beside its rule."""
        return self.width >= ROOMY

    def words(self, check: Check) -> str:
        """What stands before the figures of a check, as long as it happens to be."""
        rule, told = printable(check.rule), subject(check)
        return f"{left(rule, self.rule)}  {told}" if self.roomy and told else rule


def table_for(checks: Sequence[Check], width: int) -> Table:
    """Columns wide enough for every figure of these findings, and for their words as far as the page allows."""
    compared = [check for check in checks if check.limit is not None]
    rows = [_HEADINGS, *map(_cells, compared)]
    cells = tuple(max(map(columns, column)) for column in zip(*rows, strict=True))
    severity = max((len(check.severity) for check in checks if check.severity is not None), default=5)
    rule = max((columns(printable(check.rule)) for check in checks), default=0)
    table = Table(width, severity, min(rule, 40), 0, cells)
    words = max((columns(table.words(check)) for check in compared), default=0)
    room = width - severity - 4 - sum(cells) - 2 * len(cells)
    return replace(table, name=min(words if table.roomy else room, room))


def _cells(check: Check) -> tuple[str, ...]:
    values = [
        amount(value, check.dimension, check.figure) if value is not None else "—" for value in (check.nominal, check.worst)
    ]
    return *values, limit_of(check), percent(check.margin)


def result_of(record: Record, circuit: Circuit) -> str:
    """The circuit's result in a word or two. Only a circuit that could have been held is called clear."""
    if circuit.held:
        return "held"
    if circuit.not_solved:
        return "not solved"
    if all(check.result == "not assessed" for check in circuit.checks):
        return "not assessed"
    unheld = record.hold_at == "never" and any(check.result == "nonconforming" for check in circuit.checks)
    return "not held" if unheld else "clear"


def block(record: Record, circuit: Circuit, checks: Sequence[Check], table: Table, paint: Paint) -> Iterator[str]:
    """The lines of one circuit: heading, then its findings."""
    result = result_of(record, circuit)
    room = table.width - len(result) - 2
    tag = clipped(printable(circuit.tag), room)
    serves = clipped(prose(circuit.serves), max(0, room - columns(tag) - 2))
    title = f"{tag}  {serves}" if columns(serves) > 1 else tag
    yield f"{paint.word(result)}  {paint.strong(title)}"
    if circuit.not_solved:
        yield from para(prose(circuit.not_solved), table.width, DETAIL)
    if any(check.limit is not None for check in checks) and not table.tight:
        yield paint.faint(" " * (table.severity + 4 + table.name) + _row(_HEADINGS, table))
    told = ""
    for check in checks:
        yield from finding(record, check, table, paint, told)
        told = check.help


def _row(cells: Sequence[str], table: Table) -> str:
    return "".join("  " + right(cell, width) for cell, width in zip(cells, table.cells, strict=True))


def finding(record: Record, check: Check, table: Table, paint: Paint, help_above: str = "") -> Iterator[str]:
    """The lines of one finding: rule and figures, how it stands, why, what would help, where.

    `help_above` is what the finding above it said would help; the same words are not printed twice in a row.
    """
    severity = check.severity or ""
    head = f"  {paint.word(severity, left(severity, table.severity))}  "
    room = table.width - table.severity - 4
    words, told = table.words(check), subject(check)
    if check.limit is None:
        yield head + clipped(printable(check.rule), room)
        sentence = prose(check.what)
    else:
        row = _row(_cells(check), table)
        if columns(words) > table.name:
            words = printable(check.rule)
        if table.tight:
            yield head + clipped(words, room)
            told_row = ", ".join(f"{name} {cell}" for name, cell in zip(_HEADINGS, _cells(check), strict=True))
            yield from para(told_row, table.width, DETAIL)
        elif columns(words) <= table.name:
            yield head + left(words, table.name) + row
        else:
            yield head + clipped(words, room)
            yield " " * (table.severity + 4 + table.name) + row
        sentence = _how(check)
        if told and told not in words:
            sentence = f"{told}: {sentence}"
    width = table.width - DETAIL
    yield from para(sentence, table.width, DETAIL)
    for label, lines in _reasons(record, check, width - _LABEL, help_above):
        yield from hung(label, lines, DETAIL, _LABEL)
    where = f"{place_of(check.place)}  {printable(check.place.path)}".rstrip()
    for line in hung("where", wrapped(where, width - _LABEL), DETAIL, _LABEL):
        yield paint.faint(line)


def _how(check: Check) -> str:
    told = standing(check)
    if check.share_beyond is not None:
        told += f", beyond it in {share_of_box(check)} of the tolerance box"
    if check.moved_by:
        told += f"; {printable(check.moved_by)} moves it most"
    return told


def share_of_box(check: Check) -> str:
    """How much of the tolerance box lies beyond the limit, with its standard uncertainty: `31.0 ± 0.5 %`."""
    share = 100.0 * (check.share_beyond or 0.0)
    if not check.share_beyond_uncertainty:
        return f"{share:.2g} %"
    return f"{share:.1f} ± {100.0 * check.share_beyond_uncertainty:.1f} %"


def _reasons(record: Record, check: Check, width: int, help_above: str) -> Iterator[tuple[str, list[str]]]:
    if check.why:
        yield "why", equation(prose(check.why), width)
    if check.help:
        yield "help", ["as above"] if check.help == help_above else wrapped(prose(check.help), width)
    if check.concession is not None and check.concession < len(record.concessions):
        yield "leave", wrapped(leave(record.concessions[check.concession]), width)


def leave(concession: ConcessionRecord) -> str:
    """A concession in words."""
    return prose(f"by {concession.by} until {concession.until}: {concession.reason}")
