"""The test sheet as a page to print and fill in by hand."""

from __future__ import annotations

from circuitlint.readings.test_sheet import SheetCircuit, TestSheet
from circuitlint.reports.page.text import escape
from circuitlint.reports.readings_sheet import expected, range_of, where
from circuitlint.reports.readings_shell import facts, page, signatures, table
from circuitlint.reports.readings_words import spoken

HEAD = (("No.", "n"), ("What and where", ""), ("Circuit", ""), ("Expect", "n"), ("Range", "n"), ("Category", ""),
        ("Read", "blank"), ("Instrument", "blank"), ("Stop", ""))


def render(sheet: TestSheet) -> str:
    """The page as text, to be written as UTF-8."""
    said = [("Made from", ", ".join(one.file for one in sheet.definition)), ("Circuits", str(len(sheet.circuits))),
            ("Tool", f"{sheet.tool} {sheet.version}")]
    rows = "".join(_circuit(one, number == 0) for number, one in enumerate(sheet.circuits))
    closing = f'<p class="statement">{escape(sheet.statement)}</p>'
    return page("Test sheet", sheet.title or "Test sheet", facts(said), rows + closing)


def _circuit(circuit: SheetCircuit, first: bool) -> str:
    rows = [
        f'<tr><td class="n">{number}<th scope="row">{escape(spoken(one.quantity))} {escape(where(one))}, {escape(one.state)}'
        f'<td>{escape(one.circuit)}<td class="n">{escape(expected(one))}<td class="n">{escape(range_of(one))}'
        f'<td>{escape(one.category)}<td class="blank"><td class="blank"><td>{escape(one.stop)}'
        for number, one in enumerate(circuit.lines, 1)
    ]
    cautions = "".join(f"<li>{escape(one)}" for one in circuit.cautions)
    return (
        f'<section class="circuit{" first" if first else ""}"><h2>{escape(circuit.tag)}<small>{escape(circuit.serves)}; fed from '
        f"{escape(circuit.fed_from)}</small></h2>"
        + (f'<ul class="notes before">{cautions}</ul>' if cautions else "")
        + table(f"Readings of {circuit.tag}", HEAD, rows, "sheet")
        + signatures(("Read by", "Seen by")) + "</section>"
    )
