"""A comparison as one self-contained page: no scripts, prints well, reads at any width."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from html import escape

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
from circuitlint.reports.terminal import printable, prose
from circuitlint.reports.words import bound, counted, place_of
from circuitlint.review.changes import Comparison, FigureMove, FindingChange

_STYLE = """
:root { color-scheme: light; }
body { margin: 2rem auto; max-width: 62rem; padding: 0 1rem; color: #1b2329; background: #fff;
  font: 1rem/1.45 system-ui, sans-serif; overflow-wrap: anywhere; }
h1 { font-size: 1.4rem; font-weight: 600; }
h2 { font-size: 1.1rem; margin: 2rem 0 .4rem; border-bottom: 1px solid #1b2329; }
dl { display: grid; grid-template-columns: max-content 1fr; gap: .1rem 1rem; margin: 0; } dd { margin: 0; }
table { border-collapse: collapse; width: 100%; }
th, td { text-align: left; vertical-align: top; padding: .25rem .8rem .25rem 0;
  border-bottom: 1px solid #c9d1d6; }
td.n { font-variant-numeric: tabular-nums; text-align: right; padding-right: 0; padding-left: .8rem;
  overflow-wrap: normal; }
.s { white-space: nowrap; font-weight: 600; } .m { color: #8c1d18; } .i { color: #6b4a00; } .o { color: #1d4f73; }
p.held { font-weight: 600; border-left: .3rem solid #8c1d18; padding-left: .7rem; }
footer { margin-top: 2.5rem; color: #46535c; }
@media (max-width: 40rem) { .f thead { display: none; } .f tr, .f td { display: block; }
  .f td { border: 0; padding: 0; }
  .f tr { border-bottom: 1px solid #c9d1d6; padding: .4rem 0; } }
@media print { body { margin: 0; max-width: none; font-size: 10pt; }
  tr { break-inside: avoid; } h2 { break-after: avoid; } }
""".strip()
PREVAIL = "Local codes and the responsible person prevail over both reviews."
_MARK = {"major": "m", "minor": "i", "observation": "o"}


def render(comparison: Comparison) -> str:
    """The page as text ending in a newline."""
    title = prose(comparison.after.title) or "Untitled definition"
    told = headline(comparison) or UNCHANGED
    body = [
        f"<h1>{_text(title)}: what changed</h1>",
        f"<dl>{''.join(f'<dt>{label}</dt><dd>{_text(words)}</dd>' for label, words in sides(comparison).items())}</dl>",
        f'<p class="{"held" if comparison.new_held else "told"}">{_text(told)}</p>',
        _listing("Failed", (prose(f"{one.rule or one.plugin}: {one.what}") for one in comparison.problems)),
        _findings("New findings", comparison.new),
        _findings("Changed findings", comparison.changed),
        _findings("Findings gone", comparison.gone),
        _listing("Checks no longer made", map(lost, comparison.lost)),
        _listing(
            "Circuits",
            (
                *(f"added: {printable(one.tag)} {prose(one.serves)}{', held' if one.held else ''}" for one in comparison.added),
                *(
                    f"removed: {printable(one.tag)} {prose(one.serves)}{', held' if one.held else ''}"
                    for one in comparison.removed
                ),
                *(f"now under another tag: {becoming(printable(one.was), printable(one.tag))}" for one in comparison.renamed),
            ),
        ),
        _listing("Data changed", map(datum, comparison.data)),
        _table(
            "Limits changed",
            ("Limit", "Before", "After", "Set by"),
            (
                (
                    printable(one.path),
                    *(
                        bound("", value, one.dimension, one.name) if value is not None else "none"
                        for value in (one.before, one.after)
                    ),
                    printable(one.set_by),
                )
                for one in comparison.limits
            ),
        ),
        _listing(
            "Terms changed",
            (f"{prose(one.what)}: {becoming(prose(one.before), prose(one.after))}" for one in comparison.terms),
        ),
        _table("Margins moved", ("Check", "Worst", "Margin"), margin_rows(comparison.margins), numeric=(1, 2)),
        *_figures(comparison.figures),
    ]
    return (
        '<!DOCTYPE html>\n<html lang="en">\n<head>\n<meta charset="utf-8">\n'
        '<meta name="viewport" content="width=device-width, initial-scale=1">\n'
        f"<title>{_text(title)}: what changed</title>\n<style>\n{_STYLE}\n</style>\n</head>\n<body>\n<main>\n"
        + "\n".join(part for part in body if part)
        + f"\n</main>\n<footer>{PREVAIL}</footer>\n</body>\n</html>\n"
    )


def _text(text: str) -> str:
    return escape(text, quote=True)


def _listing(title: str, items: Iterable[str]) -> str:
    lines = "".join(f"<li>{_text(item)}</li>\n" for item in items)
    return f"<section><h2>{_text(title)}</h2>\n<ul>\n{lines}</ul></section>" if lines else ""


def _table(title: str, heads: Sequence[str], rows: Iterable[Sequence[str]], numeric: Sequence[int] = (), level: int = 2) -> str:
    cells = "".join(
        "<tr>"
        + "".join(
            f'<td class="n">{_unbroken(cell)}</td>' if index in numeric else f"<td>{_text(cell)}</td>"
            for index, cell in enumerate(row)
        )
        + "</tr>\n"
        for row in rows
    )
    return _section(title, heads, cells, level) if cells else ""


def _unbroken(cell: str) -> str:
    """A cell of numbers, in which a line may break at an arrow only."""
    return _text(cell).replace(" ", "\u00a0").replace(f"{ARROW}\u00a0", f"{ARROW} ")


def _section(title: str, heads: Sequence[str], cells: str, level: int = 2, mark: str = "") -> str:
    head = "".join(f'<th scope="col">{_text(each)}</th>' for each in heads)
    return (
        f"<section><h{level}>{_text(title)}</h{level}>\n<table{mark}><thead><tr>{head}</tr></thead>\n"
        f"<tbody>\n{cells}</tbody></table></section>"
    )


def _findings(title: str, changes: Sequence[FindingChange]) -> str:
    rows = []
    for one in changes:
        severity = one.after or one.before or ""
        word = severities(one)
        told = [f"<strong>{_text(name_of(one))}</strong>", _text(told_apart(one)), _text(numbers(one))]
        told += [_text(f"what would help: {prose(one.help)}")] if one.help else []
        told += [_text(f"{place_of(one.place)}")] if one.after else []
        holds = "<br>holds the circuit now" if one.newly_holds else ""
        tag = f"<strong>{_text(printable(one.tag))}</strong><br>{_text(prose(one.serves))}{holds}"
        rows.append(
            f'<tr><td class="s {_MARK.get(severity, "o")}">{_text(word)}</td><td>{tag}</td>'
            f"<td>{'<br>'.join(part for part in told if part)}</td></tr>\n"
        )
    heads = ("Severity", "Circuit", "Finding")
    return _section(title, heads, "".join(rows), mark=' class="f"') if rows else ""


def _figures(moves: Sequence[FigureMove]) -> Iterable[str]:
    circuits: dict[str, list[FigureMove]] = {}
    for move in moves:
        circuits.setdefault(move.tag, []).append(move)
    if circuits:
        yield "<h2>Figures moved</h2>"
    for tag, some in circuits.items():
        table = _table(printable(tag), ("Figure", "Value", "Change"), map(figure_row, some), numeric=(1, 2), level=3)
        yield f"<details><summary>{_text(printable(tag))}: {counted(len(some), 'figure')}</summary>\n{table}</details>"
