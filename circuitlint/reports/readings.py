"""The account of readings for a person at a terminal: circuit by circuit, measured beside predicted, and what it may mean."""

from __future__ import annotations

from collections.abc import Iterator

from circuitlint.readings.record import CircuitReadings, Measured, ReadingResult, ReadingsRecord
from circuitlint.reports.readings_words import (
    RULES,
    STANDS,
    certainty,
    evidence,
    interval,
    limit_of,
    predicted,
    result,
    spoken,
    with_uncertainty,
)
from circuitlint.reports.terminal import NARROW, WIDE, hung, left, para, printable, prose, right, wrapped
from circuitlint.reports.words import amount, place_of

PREVAIL = "Local codes and the responsible person prevail over this account."


def render(record: ReadingsRecord, *, width: int = 80) -> str:
    """The account as text of at most `width` columns (60 to 400), each line ended."""
    width = min(WIDE, max(NARROW, width))
    sections = [list(_heading(record, width))]
    for circuit in record.circuits:
        own = [one for one in record.readings if one.tag == circuit.tag]
        sections.append(list(_circuit(circuit, own, width)))
    sections += [list(_remarks(record, width)), list(_closing(record, width))]
    return "\n\n".join("\n".join(lines) for lines in sections if lines) + "\n"


def _heading(record: ReadingsRecord, width: int) -> Iterator[str]:
    yield from wrapped(prose(record.title) or "Readings", width)
    pairs = (("on", record.taken_on), ("by", record.by), ("seen by", record.witness))
    said = ", ".join(f"{word} {value}" for word, value in pairs if value)
    if said:
        yield from hung("read", wrapped(prose(said), width - 12), 2, 10)
    yield from hung("against", wrapped(prose(", ".join(one.file for one in record.definition)), width - 12), 2, 10)
    yield from hung("decided", wrapped(f"{record.decision_rule}: {RULES[record.decision_rule]}", width - 12), 2, 10)
    covered = (f"each interval holds {100 * record.coverage:.0f} % of the values that may be meant; value(u) has the standard "
               "uncertainty in units of the last digits")
    yield from hung("covered", wrapped(covered, width - 12), 2, 10)
    yield ""
    yield from wrapped(result(record), width)


def _circuit(circuit: CircuitReadings, readings: list[ReadingResult], width: int) -> Iterator[str]:
    yield "─" * width
    yield from wrapped(prose(f"{circuit.tag}  {readings[0].serves}"), width)
    for one in readings:
        yield ""
        where = printable(one.of) or "circuit at its origin"
        yield from wrapped(prose(f"{where}, {one.state}: {one.method}; {place_of(one.place)}"), width)
        yield from _table(one.results, width)
        for note in (*one.notes, *((f"as written: {one.note}",) if one.note else ())):
            yield from hung("", wrapped(prose(note), width - 4), 4, 0)
    if circuit.limits:
        yield ""
        yield "Limits judged again"
        for limit in circuit.limits:
            what = f"{spoken(limit.figure)}, {limit.state}: {amount(limit.value, limit.dimension, limit.figure)} " \
                   f"({interval(limit)}), limit {limit_of(limit)}: {limit.statement}"
            why = f"; {limit.why}" if limit.why else ""
            told = f"{what}{why}{'' if limit.accepted else '; not accepted'}; the review said {limit.reviewed}"
            yield from hung("", wrapped(prose(f"{limit.rule}: {told}"), width - 2), 2, 0)
    if circuit.not_measured:
        yield from para(f"{circuit.not_measured} further limits of the review are not touched by these readings.", width, 2)
    yield ""
    yield from wrapped(prose(circuit.told[:1].upper() + circuit.told[1:]) + ".", width)
    if circuit.explanations:
        yield from wrapped(certainty(circuit), width)
        for number, idea in enumerate(circuit.explanations, 1):
            told = f"{idea.name.replace('-', ' ')}: {idea.what}; {idea.amount} fits best (weight {idea.weight:.2g} of the best)"
            yield from hung(f"{number}", wrapped(prose(told), width - 5), 2, 3)
            for each in idea.evidence:
                if each.standing != "neither":
                    yield from hung(each.standing, wrapped(prose(evidence(each)), width - 14), 5, 9)
            yield from hung("to settle", wrapped(prose(idea.check), width - 16), 5, 11)


def _table(results: tuple[Measured, ...], width: int) -> Iterator[str]:
    lines = [(spoken(one.name), with_uncertainty(one.value, one.uncertainty, one.dimension), interval(one), predicted(one),
              STANDS[one.agreement] if one.predicted is not None or one.low is None else "nothing predicted") for one in results]
    head = ("", "value(u)", "interval", "predicted", "")
    if width >= 110:
        fields = [max(len(row[at]) for row in (head, *lines)) for at in range(4)]
        for row in (head, *lines):
            cells = [left(row[0], fields[0]), *(right(row[at], fields[at]) for at in (1, 2, 3)), row[4]]
            yield "  " + "  ".join(cells).rstrip()
        return
    field = max((len(row[0]) for row in lines), default=0) + 2
    for row in lines:
        text = f"{row[1]}; {row[2]}; predicted {row[3]}; {row[4]}" if row[3] != "—" else f"{row[1]}; {row[2]}; {row[4]}"
        yield from hung(row[0], wrapped(text, width - 2 - field), 2, field)


def _remarks(record: ReadingsRecord, width: int) -> Iterator[str]:
    if record.problems:
        yield "Failed"
        for problem in record.problems:
            yield from hung("", wrapped(prose(f"{problem.plugin} {problem.rule}: {problem.what}"), width - 2), 2, 0)
    if record.remarks:
        yield "Remarks on the readings"
    for one in record.remarks:
        told = f"{one.what} ({one.rule}, {one.severity}; {place_of(one.place)}){f': {one.help}' if one.help else ''}"
        yield from hung("", wrapped(prose(told), width - 2), 2, 0)


def _closing(record: ReadingsRecord, width: int) -> Iterator[str]:
    if record.not_read:
        yield from wrapped(prose(f"Not read: {', '.join(record.not_read)}."), width)
    if record.unfilled:
        yield from wrapped(f"{record.unfilled} lines of test sheets were left empty.", width)
    followed = f"Evaluated after {'; '.join(record.sources)}; seed {record.seed}, {record.trials:,} trials."
    yield from wrapped(prose(followed), width)
    yield ""
    yield from wrapped(prose(record.statement) or PREVAIL, width)
