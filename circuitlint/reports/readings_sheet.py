"""The test sheet as text, CSV and JSON. The CSV one is filled in and read back."""

from __future__ import annotations

import csv
import io
import json
from collections.abc import Iterator

from circuitlint.quantity import show, show_range
from circuitlint.readings.csv_sheet import COLUMNS
from circuitlint.readings.test_sheet import SheetLine, TestSheet
from circuitlint.reports.readings_words import spoken
from circuitlint.reports.terminal import NARROW, WIDE, hung, para, printable, prose, wrapped
from circuitlint.reports.words import minus
from circuitlint.si import DIMENSIONS

HEAD = (*COLUMNS[:8], "expected", "range", "category", "stop", *COLUMNS[8:])


def expected(line: SheetLine) -> str:
    """`20.7 to 23.8 Ω`, or why nothing is expected."""
    if line.lowest is None or line.highest is None:
        return line.needs
    dimension = DIMENSIONS[line.dimension]
    if line.lowest == line.highest:
        return minus(show(line.lowest, dimension))
    return minus(show_range(line.lowest, line.highest, dimension)).replace("..", "to")


def range_of(line: SheetLine) -> str:
    """The range to choose."""
    return show(line.full_scale, DIMENSIONS[line.dimension], 1 if line.full_scale >= 1.0 else 2) if line.full_scale else "—"


def unit_of(line: SheetLine) -> str:
    """The unit the expected reading is printed in, as a readings file takes it."""
    dimension = DIMENSIONS[line.dimension]
    if line.highest is None:
        return dimension.symbol.replace("Ω", "ohm").replace("°C", "degC")
    return show(line.highest, dimension).partition(" ")[2].replace("Ω", "ohm").replace("°C", "degC").replace("µ", "u")


def where(line: SheetLine) -> str:
    """Where to read it."""
    return {"": "at the load", "circuit": "at the origin"}.get(line.of, f"at {printable(line.of)}")


def as_csv(sheet: TestSheet) -> str:
    """One line for each reading, its `value` empty. What stands under expected, range, category and stop is not read back."""
    out = io.StringIO()
    table = csv.writer(out, lineterminator="\n")
    table.writerow(HEAD)
    for circuit in sheet.circuits:
        for line in circuit.lines:
            cells = {"tag": circuit.tag, "state": line.state, "of": line.of, "quantity": line.quantity, "unit": unit_of(line),
                     "expected": expected(line), "range": range_of(line), "category": line.category, "stop": line.stop}
            table.writerow([cells.get(name, "") for name in HEAD])
    return out.getvalue()


def as_json(sheet: TestSheet) -> str:
    """The sheet as JSON."""
    return json.dumps(sheet.model_dump(mode="json"), indent=2, ensure_ascii=False, allow_nan=False) + "\n"


def as_text(sheet: TestSheet, *, width: int = 80) -> str:
    """The sheet as text of at most `width` columns."""
    width = min(WIDE, max(NARROW, width))
    return "\n".join(_text(sheet, width)) + "\n"


def _text(sheet: TestSheet, width: int) -> Iterator[str]:
    yield from wrapped(prose(f"Test sheet: {sheet.title}"), width)
    for circuit in sheet.circuits:
        yield ""
        yield "─" * width
        yield from wrapped(prose(f"{circuit.tag}  {circuit.serves}; fed from {circuit.fed_from}"), width)
        for line in circuit.lines:
            yield ""
            yield from wrapped(prose(f"{spoken(line.quantity)} {where(line)}, {line.state}; {line.circuit}"), width)
            yield from hung("expect", wrapped(prose(expected(line)), width - 12), 2, 10)
            if line.full_scale:
                yield from hung("range", wrapped(f"{range_of(line)}; {line.category}", width - 12), 2, 10)
            yield from hung("stop", wrapped(prose(line.stop), width - 12), 2, 10)
            yield "  read      ______________ with ______________"
        for caution in circuit.cautions:
            yield from para(prose(caution), width, 2)
    yield ""
    yield from wrapped(prose(sheet.statement), width)
