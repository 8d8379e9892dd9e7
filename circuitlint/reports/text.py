"""The review for a person at a terminal: findings worst first, what could not be assessed, each circuit's result.

Quiet when clear: circuits with nothing to report are counted, not listed.
"""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Sequence
from dataclasses import dataclass, field

from circuitlint.reports.findings import block, leave, result_of, table_for, worst_first
from circuitlint.reports.terminal import (
    NARROW,
    WIDE,
    Paint,
    clipped,
    columns,
    hung,
    left,
    listed,
    printable,
    prose,
    right,
    wrapped,
)
from circuitlint.reports.words import counted, place_of, spoken
from circuitlint.review.record import SEVERITIES, Check, Circuit, Record, Severity

PREVAIL = "Local codes and the responsible person prevail over this review."
MOST_FILES = 3
MOST_TAG_LINES = 2


def render(record: Record, *, width: int = 80, colour: bool = False) -> str:
    """The review as text of at most `width` columns (60 to 400), each line ended. `colour` adds escape sequences."""
    width = min(WIDE, max(NARROW, width))
    paint = Paint(colour)
    sections = [
        _heading(record, width, paint),
        _problems(record, width, paint),
        *_findings(record, width, paint),
        _not_assessed(record, width, paint),
        _concessions(record, width, paint),
        _circuits(record, width, paint),
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
    against = (
        [printable(ruleset.name), f"edition {printable(ruleset.edition)}"]
        if ruleset.edition
        else [printable(ruleset.name)]
    )
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
        parts = [
            f"{counted(len(checks), 'check')} made, {'each' if len(checks) > 1 else 'it'} conforms with room to spare"
        ]
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
        who = " of ".join(printable(name) for name in (problem.rule, problem.plugin) if name)
        lines += hung("", wrapped(f"{who}: {prose(problem.what)}", width - 4), 2, 0)
        if problem.circuits:
            lines += hung("", _tags(problem.circuits, width - 6, "not assessed: "), 4, 0)
    told = {problem.plugin for problem in record.problems}
    for plugin in record.plugins:
        if plugin.failed and plugin.name not in told:
            lines += hung("", wrapped(f"plugin {printable(plugin.name)}: {prose(plugin.failed)}", width - 4), 2, 0)
    return [paint.strong("Failed"), *lines] if lines else []


def _findings(record: Record, width: int, paint: Paint) -> Iterator[list[str]]:
    told = worst_first(record.circuits)
    table = table_for([check for _, checks in told for check in checks], width)
    for circuit, checks in told:
        yield list(block(record, circuit, checks, table, paint))


@dataclass(slots=True)
class _Gap:
    """Checks that lack the same data, by severity and rule."""

    rows: dict[tuple[Severity, str], dict[str, None]] = field(default_factory=dict)
    checks: int = 0


def _not_assessed(record: Record, width: int, paint: Paint) -> list[str]:
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
        lines += hung("", wrapped(lacking, width - 2), 2, 0)
        for (severity, rule), tags in sorted(gap.rows.items(), key=lambda row: SEVERITIES.index(row[0][0])):
            first, *rest = _tags(list(tags), width - field_width - 6, f"{printable(rule)}: ")
            lines.append(f"    {paint.word(severity, left(severity, field_width))}  {first}")
            lines += hung("", rest, field_width + 6, 0)
    return lines


def _lacking(check: Check) -> str:
    if check.needs:
        return f"needs {', '.join(map(printable, check.needs))}"
    return prose(check.why) or prose(check.what)


def _tags(tags: Sequence[str], width: int, before: str) -> list[str]:
    """Tags on a few lines; how many more there are is said."""
    lines = listed([before + printable(tags[0]), *map(printable, tags[1:])], width)
    if len(lines) <= MOST_TAG_LINES:
        return [piece for line in lines for piece in wrapped(line, width)]
    kept = " ".join(lines[:MOST_TAG_LINES])
    shown = kept.removesuffix(",").count(", ") + 1
    return wrapped(f"{kept.removesuffix(',')} and {counted(len(tags) - shown, 'more circuit')}", width)


def _concessions(record: Record, width: int, paint: Paint) -> list[str]:
    lines: list[str] = []
    field_width = max((len(one.state) for one in record.concessions), default=0) + 2
    for one in record.concessions:
        what = f"{printable(one.tag)}, {printable(one.rule)}; {leave(one)}; {place_of(one.place)}"
        lines += hung(one.state, wrapped(what, width - field_width - 2), 2, field_width)
    return [paint.strong("Concessions"), *lines] if lines else []


_COLUMNS = (*SEVERITIES, "not assessed", "conforms")
_HEADS = {"observation": ("obser-", "vation"), "not assessed": ("not", "assessed")}


def _circuits(record: Record, width: int, paint: Paint) -> list[str]:
    """Circuit by result, for circuits with something to tell; how many have nothing."""
    told = [(circuit, counts) for circuit in record.circuits if _eventful(circuit, counts := _counts(circuit))]
    unchecked = [circuit.tag for circuit in record.circuits if not circuit.checks]
    quiet = len(record.circuits) - len(told) - len(unchecked)
    lines: list[str] = []
    if told:
        names = [name for name in _COLUMNS if any(counts[name] for _, counts in told)]
        heads = [_HEADS.get(name, ("", name)) for name in names]
        cells = [
            max(*map(len, head), *(len(f"{counts[name]:,}") for _, counts in told))
            for head, name in zip(heads, names, strict=True)
        ]
        result = max(len(result_of(circuit)) for circuit, _ in told) + 2
        room = width - sum(cells) - 2 * len(cells) - result - 2
        titles = [_title(circuit, room) for circuit, _ in told]
        room = min(room, max(map(columns, titles)))
        upper, lower = [
            "".join("  " + right(head[row], cell) for head, cell in zip(heads, cells, strict=True)) for row in (0, 1)
        ]
        margin = " " * (result + 2 + room)
        lines += [paint.faint((margin + upper).rstrip())] if upper.strip() else []
        lines.append(paint.strong("Circuits") + paint.faint(margin[8:] + lower))
        for (circuit, counts), title in zip(told, titles, strict=True):
            numbers = "".join(
                "  " + right(f"{counts[name]:,}" if counts[name] else "·", cell)
                for name, cell in zip(names, cells, strict=True)
            )
            word = result_of(circuit)
            lines.append(f"  {paint.word(word, left(word, result))}{left(title, room)}{numbers}")
    if quiet and told:
        lines += hung(
            "",
            wrapped(f"{counted(quiet, 'more circuit')}, clear: every check conforms with room to spare", width - 2),
            2,
            0,
        )
    if unchecked and record.circuits:
        lines += hung("", _tags(unchecked, width - 2, "no rule applies to: "), 2, 0)
    return lines


def _title(circuit: Circuit, room: int) -> str:
    tag = clipped(printable(circuit.tag), room)
    rest = room - columns(tag) - 2
    return f"{tag}  {clipped(prose(circuit.serves), rest)}".rstrip() if rest >= 8 else tag


def _counts(circuit: Circuit) -> dict[str, int]:
    counts = dict.fromkeys(_COLUMNS, 0)
    for check in circuit.checks:
        if check.result != "nonconforming":
            counts[check.result] += 1
        if check.severity is not None and check.result != "not assessed":
            counts[check.severity] += 1
    return counts


def _eventful(circuit: Circuit, counts: dict[str, int]) -> bool:
    return circuit.held or bool(circuit.not_solved) or any(counts[name] for name in _COLUMNS[:-1])


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
    return not any(_eventful(circuit, _counts(circuit)) for circuit in circuits)
