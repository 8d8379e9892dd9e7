"""The review for a person at a terminal: findings worst first, what could not be assessed, each circuit's result.

Quiet when clear: circuits with nothing to report are counted, not listed.
"""

from __future__ import annotations

from collections.abc import Iterable, Iterator

from circuitlint.reports.boards import boards
from circuitlint.reports.circuit_table import circuit_table, counts_of, eventful
from circuitlint.reports.findings import block, leave, table_for, worst_first
from circuitlint.reports.gaps import not_assessed, tags_on_lines
from circuitlint.reports.terminal import (
    NARROW,
    WIDE,
    Paint,
    clipped,
    columns,
    hung,
    listed,
    para,
    printable,
    prose,
    wrapped,
)
from circuitlint.reports.words import counted, place_of, spoken
from circuitlint.review.record import SEVERITIES, Circuit, Record

PREVAIL = "Local codes and the responsible person prevail over this review."
MOST_FILES = 3


def render(record: Record, *, width: int = 80, colour: bool = False) -> str:
    """The review as text of at most `width` columns (60 to 400), each line ended. `colour` adds escape sequences."""
    width = min(WIDE, max(NARROW, width))
    paint = Paint(colour)
    sections = [
        _heading(record, width, paint),
        _problems(record, width, paint),
        *_findings(record, width, paint),
        not_assessed(record, width, paint),
        _concessions(record, width, paint),
        circuit_table(record, width, paint),
        boards(record, width),
        _cautions(record, width, paint),
    ]
    return "\n\n".join("\n".join(lines) for lines in sections if lines) + "\n"


def _heading(record: Record, width: int, paint: Paint) -> list[str]:
    lines = [paint.strong(line) for line in wrapped(prose(record.title) or "Untitled definition", width)]
    files = [printable(one.file) for one in record.documents if one.kind == "definition"]
    shown = files[:MOST_FILES]
    if len(files) > MOST_FILES:
        shown[-1] += f" and {counted(len(files) - MOST_FILES, 'more file')}"
    ruleset = record.ruleset
    against = [printable(ruleset.name), f"edition {printable(ruleset.edition)}"] if ruleset.edition else [printable(ruleset.name)]
    if ruleset.built_on:
        against.append(f"built on {', '.join(map(printable, ruleset.built_on))}")
    against.append("nothing is held" if record.hold_at == "never" else f"hold at {record.hold_at}")
    lines += hung("reviewed", listed(shown or ["no file"], width - 12), 2, 10)
    lines += hung("against", listed(against, width - 12), 2, 10)
    if record.reviewed_on and record.concessions:
        lines += hung("as of", [printable(record.reviewed_on)], 2, 10)
    return [*lines, "", *_result(record, width, paint)]


def _result(record: Record, width: int, paint: Paint) -> list[str]:
    """The whole review in a sentence."""
    held = [circuit for circuit in record.circuits if circuit.held]
    checks = [check for circuit in record.circuits for check in circuit.checks]
    unassessed = sum(check.result == "not assessed" for check in checks)
    found = [check for check in checks if check.severity is not None and check.result != "not assessed"]
    total = counted(len(record.circuits), "circuit")
    if held:
        word, rest = "held", f"{len(held):,} of {total}"
    elif record.held:
        word, rest = "held", f"a rule that is required was lost; {total}"
    else:
        word, rest = "clear" if checks and not found and not unassessed else "not held", total
    if not checks:
        parts = ["no check could be made"]
    elif not found and not unassessed:
        parts = [f"{counted(len(checks), 'check')} made, {'each' if len(checks) > 1 else 'it'} conforms with room to spare"]
    else:
        parts = [f"{n:,} {s}" for s in SEVERITIES if (n := sum(check.severity == s for check in found))]
        parts += [f"{counted(unassessed, 'check')} not assessed"] if unassessed else []
        conform = sum(check.result == "conforms" for check in checks)
        parts += [f"{conform:,} {'conforms' if conform == 1 else 'conform'}"]
    if unsolved := sum(bool(circuit.not_solved) for circuit in record.circuits):
        parts.append(f"{counted(unsolved, 'circuit')} not solved")
    lines = wrapped(f"{word.capitalize()}: {rest}; {', '.join(parts)}.", width)
    return [paint.word(word, lines[0][: len(word)]) + lines[0][len(word) :], *lines[1:]]


def _problems(record: Record, width: int, paint: Paint) -> list[str]:
    """Rules and plugins that failed: without them a review is not what it looks like, so they come first."""
    lines: list[str] = []
    for problem in record.problems:
        who = " of ".join(name for name in (problem.rule, problem.plugin) if name)
        lines += para(prose(f"{who}: {problem.what}"), width, 2)
        if problem.circuits:
            lines += hung("", tags_on_lines(problem.circuits, width - 6, "not assessed: "), 4, 0)
    told = {problem.plugin for problem in record.problems}
    for plugin in record.plugins:
        if plugin.failed and plugin.name not in told:
            lines += para(prose(f"plugin {plugin.name}: {plugin.failed}"), width, 2)
    return [paint.strong("Failed"), *lines] if lines else []


def _findings(record: Record, width: int, paint: Paint) -> Iterator[list[str]]:
    told = worst_first(record.circuits)
    table = table_for([check for _, checks in told for check in checks], width)
    for circuit, checks in told:
        yield list(block(record, circuit, checks, table, paint))


def _concessions(record: Record, width: int, paint: Paint) -> list[str]:
    lines: list[str] = []
    field_width = max((len(one.state) for one in record.concessions), default=0) + 2
    for one in record.concessions:
        what = f"{printable(one.tag)}, {printable(one.rule)}; {leave(one)}; {place_of(one.place)}"
        lines += hung(one.state, wrapped(what, width - field_width - 2), 2, field_width)
    return [paint.strong("Concessions"), *lines] if lines else []


def _cautions(record: Record, width: int, paint: Paint) -> list[str]:
    """The cautions in full beside findings, by name where all is clear; and who prevails."""
    lines: list[str] = []
    if record.cautions and _quiet(record.circuits) and not record.problems:
        names = ", ".join(spoken(key) for key in record.cautions)
        lines += wrapped(f"Cautions that apply, worded in every other report: {names}.", width)
    elif record.cautions:
        lines.append(paint.strong("Cautions"))
        field_width = min(24, max(columns(spoken(key)) for key in record.cautions)) + 2
        for key, text in record.cautions.items():
            lines += hung(clipped(spoken(key), 24), wrapped(prose(text), width - field_width - 2), 2, field_width)
        lines.append("")
    return [*lines, *wrapped(prose(record.statement) or PREVAIL, width)]


def _quiet(circuits: Iterable[Circuit]) -> bool:
    return not any(eventful(circuit, counts_of(circuit)) for circuit in circuits)
