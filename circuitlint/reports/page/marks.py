"""Marks for severity and result. A mark never stands without its word, and no two differ by colour alone."""

from __future__ import annotations

from collections.abc import Iterable

from circuitlint.review.record import Check, Circuit, Record

_SHAPES = {
    "major": '<path class="fill" d="M6 .8L11.6 11H.4Z"/>',
    "minor": '<path d="M6 1.6L11 10.6H1Z"/><path class="fill" d="M6 5.8L8.7 10.6H3.3Z"/>',
    "observation": '<circle cx="6" cy="6" r="4.6"/><path d="M6 5.2V9M6 3v1"/>',
    "not-assessed": '<path stroke-dasharray="2 1.4" d="M1.2 1.2H10.8V10.8H1.2Z"/><path d="M4 4.4a2 2 0 1 1 2 2.2v1M6 8.6v1"/>',
    "conforms": '<path d="M1.5 6.5L4.8 9.8L10.6 2.6"/>',
    "nonconforming": '<path d="M2 2L10 10M10 2L2 10"/>',
    "held": '<path class="fill" d="M3.6.6H8.4L11.4 3.6V8.4L8.4 11.4H3.6L.6 8.4V3.6Z"/><path class="bar" d="M3 6H9"/>',
    "clear": '<circle cx="6" cy="6" r="5"/>',
    "not-held": '<circle cx="6" cy="6" r="5" stroke-dasharray="2 1.4"/><path d="M3 6H9"/>',
    "not-applicable": '<path d="M2.5 6H9.5"/>',
}


def shapes() -> str:
    """The marks, for the page to refer to."""
    return "".join(f'<symbol id="m-{name}" viewBox="0 0 12 12">{drawn}</symbol>' for name, drawn in _SHAPES.items())


def mark(name: str, capital: bool = False) -> str:
    """A mark followed by its word, with a capital first where asked."""
    word = name.capitalize() if capital else name
    kind = name.replace(" ", "-")
    return f'<span class="mark {kind}"><svg class="m" aria-hidden="true"><use href="#m-{kind}"/></svg>{word}</span>'


def result_of(check: Check) -> str:
    """Result of a check in marks and words: the severity where there is one, and what it rests on."""
    said = mark(check.result)
    if check.severity is not None:
        said += f" {mark(check.severity)}"
    if check.basis in ("worst case", "near the limit", "matter of kind", "rule failed"):
        said += f' <span class="basis">{check.basis}</span>'
    if check.concession is not None:
        said += ' <span class="basis">under a concession</span>'
    return said


def held_or_not(record: Record, circuits: Iterable[Circuit]) -> str:
    """`held`, `clear`, or `not held` where nothing could be held and something does not conform."""
    some = tuple(circuits)
    if any(one.held for one in some):
        return "held"
    unheld = record.hold_at == "never" and any(check.result == "nonconforming" for one in some for check in one.checks)
    return "not held" if unheld else "clear"


def standing(record: Record, circuit: Circuit) -> str:
    """Whether a circuit is held or clear, and whether something about it was not assessed."""
    said = mark(held_or_not(record, [circuit]))
    if not_assessed(circuit):
        said += f" {mark('not assessed')}"
    return said


def not_assessed(circuit: Circuit) -> bool:
    """Whether anything about a circuit could not be assessed."""
    return (
        bool(circuit.not_solved)
        or any(one.result == "not assessed" for one in circuit.checks)
        or ("not assessed" in circuit.coverage.values())
    )
