"""Recorded leave to accept a named nonconformity; an expired, unmatched or over-broad concession is itself told."""

from __future__ import annotations

from collections.abc import Sequence

from circuitlint.definition.reading import ConcessionDefinition
from circuitlint.review.record import Check, ConcessionRecord, Place

EVERYTHING = frozenset({"*", "all", "any", "every"})


def state_of(
    one: ConcessionDefinition, on_date: str, checks: Sequence[tuple[str, Check]]
) -> tuple[str, tuple[str, ...]]:
    """The state of a concession and the ids of the checks it covers while in force."""
    entry = one.entry
    if entry.tag in EVERYTHING or entry.rule in EVERYTHING:
        return "too broad", ()
    matching = tuple(
        check.id
        for tag, check in checks
        if tag == entry.tag and check.rule == entry.rule and check.result == "nonconforming"
    )
    if not matching:
        return "matches nothing", ()
    if entry.until < on_date:
        return "expired", ()
    return "in force", matching


def record_of(one: ConcessionDefinition, state: str) -> ConcessionRecord:
    """The concession as recorded."""
    entry, spot = one.entry, one.spot
    place = Place(file=spot.file, line=spot.line, column=spot.column, path=spot.path)
    return ConcessionRecord.model_validate(
        {"tag": entry.tag, "rule": entry.rule, "by": entry.by, "reason": entry.reason, "until": entry.until,
         "state": state, "place": place}
    )
