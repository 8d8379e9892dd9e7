"""A comparison of two reviews as text, JSON and HTML: what a colleague would want to know, and nothing else."""

from __future__ import annotations

from collections.abc import Iterator, Sequence

from circuitlint.errors import InputError
from circuitlint.reports import comparison_page
from circuitlint.reports.comparison_words import (
    ARROW,
    UNCHANGED,
    becoming,
    datum,
    figure_row,
    headline,
    lost,
    margin_rows,
    name_of,
    numbers,
    severities,
    sides,
    told_apart,
)
from circuitlint.reports.json_record import unseen_escaped
from circuitlint.reports.terminal import (
    NARROW,
    WIDE,
    Paint,
    clipped,
    hung,
    left,
    listed,
    para,
    printable,
    prose,
    rows,
    wrapped,
)
from circuitlint.reports.words import bound, counted, place_of
from circuitlint.review.changes import Comparison, FigureMove, FindingChange

KINDS = ("text", "json", "html")
MOST_MARGINS = 20
MOST_CIRCUITS = 10
MOST_FIGURES = 5


def render(kind: str, comparison: Comparison, *, width: int = 80, colour: bool = False) -> str:
    """The comparison as one of `KINDS`; `width` and `colour` are for text. Raises InputError for another kind."""
    if kind not in KINDS:
        raise InputError(f"no comparison is of kind {kind!r}; accepted: one of {', '.join(KINDS)}")
    if kind == "text":
        return render_text(comparison, width=width, colour=colour)
    return render_json(comparison) if kind == "json" else comparison_page.render(comparison)


def render_json(comparison: Comparison) -> str:
    """The comparison whole, indented, ending in a newline."""
    return unseen_escaped(comparison.model_dump_json(indent=2)) + "\n"


def render_text(comparison: Comparison, *, width: int = 80, colour: bool = False) -> str:
    """The comparison for a person at a terminal, in at most `width` columns (60 to 400)."""
    width = min(WIDE, max(NARROW, width))
    paint = Paint(colour)
    sections = [_heading(comparison, width, paint)]
    if comparison.empty:
        sections.append(wrapped(UNCHANGED, width))
    for title, lines in _sections(comparison, width, paint):
        if lines:
            sections.append([paint.strong(title), *lines])
    return "\n\n".join("\n".join(lines) for lines in sections) + "\n"


def _heading(comparison: Comparison, width: int, paint: Paint) -> list[str]:
    lines = [paint.strong(line) for line in wrapped(prose(comparison.after.title) or "Untitled definition", width)]
    for label, told in sides(comparison).items():
        lines += hung(label, wrapped(told, width - 10), 2, 8)
    told = headline(comparison)
    return [*lines, "", *wrapped(told, width)] if told else lines


def _sections(comparison: Comparison, width: int, paint: Paint) -> Iterator[tuple[str, list[str]]]:
    yield (
        "Failed",
        [line for one in comparison.problems for line in para(prose(f"{one.rule or one.plugin}: {one.what}"), width, 2)],
    )
    yield "New findings", list(_changes(comparison.new, width, paint))
    yield "Changed findings", list(_changes(comparison.changed, width, paint))
    yield "Findings gone", list(_changes(comparison.gone, width, paint))
    yield "Checks no longer made", _plain(map(lost, comparison.lost), width)
    yield "Circuits", _plain(_circuits(comparison), width)
    yield "Data changed", _plain((datum(one) for one in comparison.data), width)
    yield "Limits changed", _plain(_limits(comparison), width)
    yield (
        "Terms changed",
        _plain((f"{prose(one.what)}: {becoming(prose(one.before), prose(one.after))}" for one in comparison.terms), width),
    )
    yield "Margins moved", _margins(comparison, width)
    yield "Figures moved", _figures(comparison, width)


def _plain(lines: Iterator[str], width: int) -> list[str]:
    return [line for text in lines for line in para(text, width, 2)]


def _changes(changes: Sequence[FindingChange], width: int, paint: Paint) -> Iterator[str]:
    words = [severities(one) for one in changes]
    field = max(map(len, words), default=0)
    for one, word in zip(changes, words, strict=True):
        head = f"{printable(one.tag)}  {prose(one.serves)}".rstrip()
        yield f"  {paint.word(one.after or one.before or '', left(word, field))}  {clipped(head, width - field - 4)}"
        sentence = "; ".join(part for part in (name_of(one), told_apart(one)) if part)
        yield from para(sentence, width, 6)
        if told := numbers(one):
            yield from para(told, width, 6)
        if one.help:
            yield from hung("help", wrapped(prose(one.help), width - 13), 6, 7)
        for line in hung("where", wrapped(place_of(one.place), width - 13), 6, 7) if one.after else ():
            yield paint.faint(line)


def _circuits(comparison: Comparison) -> Iterator[str]:
    for word, circuits in (("added", comparison.added), ("removed", comparison.removed)):
        for one in circuits:
            serves = f"  {prose(one.serves)}" if one.serves else ""
            yield f"{word}: {printable(one.tag)}{serves}{', held' if one.held else ''}"
    for one in comparison.renamed:
        yield f"now under another tag: {becoming(printable(one.was), printable(one.tag))}"


def _limits(comparison: Comparison) -> Iterator[str]:
    for one in comparison.limits:
        before, after = (
            bound("", value, one.dimension, one.name) if value is not None else "" for value in (one.before, one.after)
        )
        yield f"{printable(one.path)}: {becoming(before, after)}, set by {printable(one.set_by)}"


def _margins(comparison: Comparison, width: int) -> list[str]:
    """Margins that moved by what can be seen, of checks that the findings above do not tell of already."""
    told = {one.check for one in (*comparison.new, *comparison.changed, *comparison.gone)}
    table = [row for row in margin_rows(move for move in comparison.margins if move.check not in told) if ARROW in row[2]]
    if not table:
        return []
    lines = rows([("", "worst", "margin"), *table[:MOST_MARGINS]], width, 2)
    if len(table) > MOST_MARGINS:
        lines.append(f"  and {counted(len(table) - MOST_MARGINS, 'margin')} that moved less")
    return lines


def _figures(comparison: Comparison, width: int) -> list[str]:
    """The figures of each circuit that moved farthest and are not told of above."""
    told = {(one.tag, one.figure, one.of, one.state) for one in (*comparison.new, *comparison.changed, *comparison.margins)}
    circuits: dict[str, list[FigureMove]] = {}
    for move in comparison.figures:
        if (move.tag, move.name, move.of, move.state) not in told:
            circuits.setdefault(move.tag, []).append(move)
    lines: list[str] = []
    for tag, moves in list(circuits.items())[:MOST_CIRCUITS]:
        lines += para(printable(tag), width, 2)
        lines += rows([figure_row(move) for move in moves[:MOST_FIGURES]], width, 4)
        if len(moves) > MOST_FIGURES:
            lines.append(f"    and {counted(len(moves) - MOST_FIGURES, 'figure')} that moved less")
    if len(circuits) > MOST_CIRCUITS:
        rest = list(circuits)[MOST_CIRCUITS:]
        lines += hung("", listed((f"moved less too: {printable(rest[0])}", *map(printable, rest[1:20])), width - 2), 2, 0)
        lines += [f"  and {counted(len(rest) - 20, 'more circuit')}"] if len(rest) > 20 else []
    return lines
