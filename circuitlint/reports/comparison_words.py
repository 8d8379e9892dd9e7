"""The words and rows that text and HTML of a comparison share. Everything foreign is made printable here."""

from __future__ import annotations

from collections import Counter
from collections.abc import Iterable

from circuitlint.reports.terminal import printable, prose
from circuitlint.reports.words import amount, bound, counted, percent, spoken
from circuitlint.review.changes import (
    Comparison,
    DatumChange,
    FigureMove,
    FindingChange,
    Lost,
    MarginMove,
    Side,
    Subject,
)

UNCHANGED = "Nothing changed: the same findings and limits, and no figure moved by more than 0.1 % of itself."
ARROW = "→"
_HOW = {
    "new": "was within its limit before",
    "circuit added": "the circuit is new",
    "checked for the first time": "was not checked before",
    "now conforms": "conforms now",
    "circuit removed": "the circuit is gone",
    "no longer checked": "is not checked any more",
    "changed": "",
}


def becoming(before: str, after: str) -> str:
    """`before → after`, in words where there is only one of them."""
    if before and after:
        return f"{before} {ARROW} {after}"
    return f"new, {after}" if after else f"gone, was {before}"


def side(one: Side) -> str:
    """One of the two reviews in a line."""
    files = printable(one.files[0]) if one.files else "no file"
    more = f" and {counted(len(one.files) - 1, 'more file')}" if len(one.files) > 1 else ""
    against = f"{printable(one.ruleset)}, edition {printable(one.edition)}"
    held = "held" if one.held else "nothing held"
    return f"{files}{more}, against {against}; {counted(one.circuits, 'circuit')}, {held}"


def sides(comparison: Comparison) -> dict[str, str]:
    """The two reviews, each in a line by its label; in one line where they read alike."""
    before, after = side(comparison.before), side(comparison.after)
    return {"both": after} if before == after else {"before": before, "after": after}


def headline(comparison: Comparison) -> str:
    """The change in a sentence or two; empty where nothing changed."""
    sentences = []
    for words, tags in (("Newly held", comparison.newly_held), ("No longer held", comparison.no_longer_held)):
        if tags:
            shown = ", ".join(map(printable, tags[:12]))
            more = f" and {counted(len(tags) - 12, 'more circuit')}" if len(tags) > 12 else ""
            sentences.append(f"{words}: {shown}{more}.")
    counts = [(len(comparison.new), "new"), (len(comparison.changed), "changed"), (len(comparison.gone), "gone")]
    told = ", ".join(f"{number} {word}" for number, word in counts if number)
    if told:
        sentences.append(f"Findings: {told}.")
    elif not comparison.empty:
        sentences.append("No finding came, went or changed.")
    return " ".join(sentences)


def subject_of(one: Subject) -> str:
    """What a check looks at: `voltage drop share of cable[0], steady`."""
    figure = spoken(one.figure)
    named = f"{figure} of {printable(one.of)}" if figure and one.of else figure or printable(one.of)
    return ", ".join(part for part in (named, printable(one.state)) if part)


def name_of(one: Subject) -> str:
    """Rule and what it looks at."""
    return ": ".join(part for part in (printable(one.rule), subject_of(one)) if part)


def severities(one: FindingChange) -> str:
    """`minor → major`, or the one severity there is."""
    if one.before and one.after and one.before != one.after:
        return f"{one.before} {ARROW} {one.after}"
    return one.after or one.before or ""


def told_apart(one: FindingChange) -> str:
    """What became of a finding, in words; empty where only its severity changed."""
    if one.how == "changed":
        parts = []
        if one.result_before != one.result_after:
            parts.append(f"{one.result_before} before, {one.result_after} now")
        if one.conceded_before != one.conceded_after:
            parts.append("under a concession now" if one.conceded_after else "no concession covers it any more")
        return "; ".join(parts)
    told = _HOW[one.how]
    if one.how == "new" and one.result_before == "not assessed":
        told = "could not be assessed before"
    if one.result_after == "not assessed":
        told = f"could not be assessed; {'conformed' if one.result_before == 'conforms' else 'was not checked'} before"
        told = "could not be assessed; the circuit is new" if one.how == "circuit added" else told
    if not one.figure:
        told = f"{prose(one.what)}; {told}" if one.after else f"{told} ({prose(one.what)})"
    return f"{told}; under a concession" if one.conceded_after and one.after else told


def numbers(one: Subject) -> str:
    """Figure, limit and margin on both sides, in a line; empty where there is no number."""
    figure, limits, margins = _pairs(one)
    if not any(figure):
        return ""
    limit = f", limit {_change(limits)}" if any(limits) else ""
    return f"worst {_change(figure)}{limit}{f', margin {_change(margins)}' if any(margins) else ''}"


def _pairs(one: Subject) -> tuple[list[str], list[str], list[str]]:
    """Worst end, limit and margin, each before and after; empty where there is none."""
    figures, limits = (one.worst_before, one.worst_after), (one.limit_before, one.limit_after)
    margins = (one.margin_before, one.margin_after)
    return (
        [amount(value, one.dimension, one.figure) if value is not None else "" for value in figures],
        [bound(one.sense, value, one.dimension, one.figure) if value is not None else "" for value in limits],
        [percent(value) if value is not None else "" for value in margins],
    )


def _change(pair: list[str]) -> str:
    before, after = pair
    return f"{before} {ARROW} {after}" if before and after and before != after else after or before


def margin_row(move: MarginMove, alike: bool = False) -> tuple[str, str, str]:
    """What, worst end of the figure, margin; the limit too where it moved, or where another row is `alike` without it."""
    figure, limits, margins = _pairs(move)
    limit = f", limit {_change(limits)}" if alike or limits[0] != limits[1] else ""
    crossed = f" ({move.crossed})" if move.crossed else ""
    return f"{printable(move.tag)}  {subject_of(move)}{limit}{crossed}", _change(figure), _change(margins) or "—"


def margin_rows(moves: Iterable[MarginMove]) -> list[tuple[str, str, str]]:
    """A row for each margin; those that would read alike name their limits."""
    told = list(moves)
    names = Counter(margin_row(move)[0] for move in told)
    return [margin_row(move, names[margin_row(move)[0]] > 1) for move in told]


def figure_row(move: FigureMove) -> tuple[str, str, str]:
    """What, the nominal value, or the end that moved where the nominal one did not, and by how much."""
    pairs = [[amount(value, move.dimension, move.name) for value in pair] for pair in zip(move.before, move.after, strict=True)]
    moves = [0.0 if before == after else abs(after - before) for before, after in zip(move.before, move.after, strict=True)]
    index = 1 if pairs[1][0] != pairs[1][1] else moves.index(max(moves))
    end = ("lowest ", "", "highest ")[index]
    of = f" of {printable(move.of)}" if move.of else ""
    state = f", {printable(move.state)}" if move.state else ""
    before, after = move.before[index], move.after[index]
    share = percent(after / before - 1.0) if before > 0.0 and after > 0.0 else ""
    return f"{end}{spoken(move.name)}{of}{state}", _change(pairs[index]), share


def lost(one: Lost) -> str:
    """Checks that are not made any more."""
    return f"{printable(one.tag)}: {counted(one.checks, 'check')} of {printable(one.rule)}, now {printable(one.now)}"


def datum(one: DatumChange) -> str:
    """What the definition states of a part, before and after."""
    where = " ".join(part for part in (printable(one.tag), printable(one.of) or printable(one.kind)) if part)
    return f"{where}: {becoming(', '.join(map(prose, one.before)), ', '.join(map(prose, one.after)))}"
