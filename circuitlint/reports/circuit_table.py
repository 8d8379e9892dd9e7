"""Circuit by result, as text: each circuit with something to tell, and how many have nothing."""

from __future__ import annotations

from circuitlint.reports.findings import result_of
from circuitlint.reports.gaps import tags_on_lines
from circuitlint.reports.terminal import Paint, clipped, columns, hung, left, printable, prose, right, wrapped
from circuitlint.reports.words import counted
from circuitlint.review.record import SEVERITIES, Circuit, Record

_COLUMNS = (*SEVERITIES, "not assessed", "conforms")
_HEADS = {"observation": ("obser-", "vation"), "not assessed": ("not", "assessed")}


def circuit_table(record: Record, width: int, paint: Paint) -> list[str]:
    """Circuit by result, for circuits with something to tell; how many have nothing."""
    told = [(circuit, counts) for circuit in record.circuits if eventful(circuit, counts := counts_of(circuit))]
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
        result = max(len(result_of(record, circuit)) for circuit, _ in told) + 2
        room = width - sum(cells) - 2 * len(cells) - result - 2
        titles = [_title(circuit, room) for circuit, _ in told]
        room = min(room, max(map(columns, titles)))
        upper, lower = ["".join("  " + right(head[row], cell) for head, cell in zip(heads, cells, strict=True)) for row in (0, 1)]
        margin = " " * (result + 2 + room)
        lines += [paint.faint((margin + upper).rstrip())] if upper.strip() else []
        lines.append(paint.strong("Circuits") + paint.faint(margin[8:] + lower))
        for (circuit, counts), title in zip(told, titles, strict=True):
            numbers = "".join(
                "  " + right(f"{counts[name]:,}" if counts[name] else "·", cell) for name, cell in zip(names, cells, strict=True)
            )
            word = result_of(record, circuit)
            lines.append(f"  {paint.word(word, left(word, result))}{left(title, room)}{numbers}")
    if quiet and told:
        lines += hung(
            "",
            wrapped(f"{counted(quiet, 'more circuit')}, clear: every check conforms with room to spare", width - 2),
            2,
            0,
        )
    if unchecked and record.circuits:
        lines += hung("", tags_on_lines(unchecked, width - 2, "no rule applies to: "), 2, 0)
    return lines


def _title(circuit: Circuit, room: int) -> str:
    tag = clipped(printable(circuit.tag), room)
    rest = room - columns(tag) - 2
    return f"{tag}  {clipped(prose(circuit.serves), rest)}".rstrip() if rest >= 8 else tag


def counts_of(circuit: Circuit) -> dict[str, int]:
    counts = dict.fromkeys(_COLUMNS, 0)
    for check in circuit.checks:
        if check.result != "nonconforming":
            counts[check.result] += 1
        if check.severity is not None and check.result != "not assessed":
            counts[check.severity] += 1
    return counts


def eventful(circuit: Circuit, counts: dict[str, int]) -> bool:
    return circuit.held or bool(circuit.not_solved) or any(counts[name] for name in _COLUMNS[:-1])
