"""The boards of a review at a terminal: what each feeder carries, the neutral among it, and the board's power factor."""

from __future__ import annotations

from circuitlint.reports.terminal import hung, listed, printable
from circuitlint.reports.words import amount, counted
from circuitlint.review.record import BoardRecord, Record


def boards(record: Record, width: int) -> list[str]:
    """The lines of the section; none where there are no boards."""
    if not record.boards:
        return []
    lines = ["Boards, at nominal values with everything running"]
    for one in record.boards:
        lines += hung(printable(one.name), listed(facts_of(one), width - 14), 2, 12)
    return lines


def facts_of(one: BoardRecord) -> list[str]:
    """What is told of a board, in short pieces."""
    facts = [f"fed from {printable(one.fed_from)}", counted(len(one.circuits), "circuit")]
    facts += [f"{conductor.name} {amount(conductor.current, 'current')}" for conductor in one.conductors]
    facts.append(amount(one.active_power, "active power"))
    if one.power_factor is not None:
        side = "lagging" if one.reactive_power > 0.0 else "leading" if one.reactive_power < 0.0 else ""
        facts.append(f"power factor {amount(one.power_factor, 'ratio')} {side}".rstrip())
        if one.power_factor_uncorrected is not None and one.power_factor_uncorrected != one.power_factor:
            facts.append(f"{amount(one.power_factor_uncorrected, 'ratio')} without its capacitor")
    return facts
