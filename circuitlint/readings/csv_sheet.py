"""A filled-in test sheet (CSV) as the same tree of nodes a YAML file gives, so that both are read and told off alike."""

from __future__ import annotations

import hashlib
from dataclasses import dataclass

import yaml

from circuitlint.definition.text import LARGEST_FILE, Text
from circuitlint.errors import Fault
from circuitlint.readings.models import QUANTITIES

COLUMNS = ("tag", "state", "of", "set", "quantity", "value", "unit", "instrument", "taken_on", "by", "note")
NEEDED = ("tag", "quantity", "value")
PRINTED_ONLY = ("expected", "range", "category", "stop")
"""Columns of a printed test sheet that tell the person something and are not read back."""


@dataclass(slots=True)
class Sheet:
    """A test sheet as nodes, and how many of its lines were left empty."""

    text: Text
    unfilled: int = 0


@dataclass(frozen=True, slots=True)
class Cell:
    """One cell and where its first character stands."""

    value: str
    line: int
    column: int

    def node(self, file: str, value: str | None = None) -> yaml.ScalarNode:
        """The cell as a scalar node."""
        mark = yaml.Mark(file, 0, self.line - 1, self.column - 1, None, 0)
        return yaml.ScalarNode("tag:yaml.org,2002:str", self.value if value is None else value, mark, mark, '"')


def read(content: bytes, file: str) -> Sheet:
    """Read a test sheet. Never raises for bad content: faults are collected in the text."""
    text = Text(file, hashlib.sha256(content).hexdigest(), len(content), None)
    sheet = Sheet(text)
    try:
        decoded = content.decode("utf-8-sig")
    except UnicodeDecodeError as error:
        text.faults.append(Fault(file, 1 + content.count(b"\n", 0, error.start), 1, "the text is not UTF-8", "text in UTF-8"))
        return sheet
    if len(content) > LARGEST_FILE or "\0" in decoded:
        text.faults.append(Fault(file, 1, 1, "the file is not a test sheet", "lines of text, cells apart by commas"))
        return sheet
    separator = ";" if decoded.split("\n", 1)[0].count(";") > decoded.split("\n", 1)[0].count(",") else ","
    rows = [row for row in _rows(decoded, separator, text) if any(cell.value for cell in row) and row[0].value[:1] != "#"]
    if text.faults:
        return sheet
    if not rows:
        text.faults.append(Fault(file, 1, 1, "the file is empty", f"a first line with {', '.join(NEEDED)}"))
        return sheet
    head = [cell.value.lower().replace(" ", "_") for cell in rows[0]]
    if not _head_is_known(rows[0], head, text):
        return sheet
    sheet.text.root = _tree(rows, head, sheet)
    return sheet


def _rows(decoded: str, separator: str, text: Text) -> list[list[Cell]]:
    """Cells with their places. Quotes as in RFC 4180: doubled inside quotes, line breaks allowed inside them."""
    rows: list[list[Cell]] = []
    row: list[Cell] = []
    line, column, at = 1, 1, 0
    while at < len(decoded):
        start_line, start_column = line, column
        quoted = decoded[at] == '"'
        value = ""
        if quoted:
            at, column = at + 1, column + 1
            while at < len(decoded):
                letter = decoded[at]
                if letter == '"' and decoded[at + 1 : at + 2] == '"':
                    value, at, column = value + '"', at + 2, column + 2
                    continue
                at, column = at + 1, column + 1
                if letter == '"':
                    break
                value += letter
                if letter == "\n":
                    line, column = line + 1, 1
            else:
                text.faults.append(Fault(text.file, start_line, start_column, "a quoted cell does not end", 'a closing "'))
        end = at
        while end < len(decoded) and decoded[end] not in (separator, "\n"):
            end += 1
        value = f"{value}{decoded[at:end]}".strip()
        column += end - at
        row.append(Cell(value, start_line, start_column))
        at = end
        if at >= len(decoded) or decoded[at] == "\n":
            rows.append(row)
            row = []
            line, column = line + 1, 1
        else:
            column += 1
        at += 1
        if row and at >= len(decoded):
            rows.append([*row, Cell("", line, column)])
    return rows


def _head_is_known(cells: list[Cell], head: list[str], text: Text) -> bool:
    before = len(text.faults)
    for cell, name in zip(cells, head, strict=True):
        if name and name not in COLUMNS and name not in PRINTED_ONLY:
            text.faults.append(Fault(text.file, cell.line, cell.column, f"unknown column {cell.value!r}",
                                     f"one of {', '.join((*COLUMNS, *PRINTED_ONLY))}"))
        elif name and head.count(name) > 1:
            text.faults.append(Fault(text.file, cell.line, cell.column, f"the column {cell.value!r} stands twice", "each once"))
    for name in NEEDED:
        if name not in head:
            text.faults.append(Fault(text.file, cells[0].line, 1, f"the column {name!r} is missing", f"`{','.join(COLUMNS)}`"))
    return len(text.faults) == before


def _tree(rows: list[list[Cell]], head: list[str], sheet: Sheet) -> yaml.MappingNode:
    text, file = sheet.text, sheet.text.file
    readings: dict[tuple[str, str, str], dict[str, yaml.Node]] = {}
    sets: dict[tuple[str, str, str], dict[str, dict[str, yaml.Node]]] = {}
    starts: dict[tuple[str, str, str], Cell] = {}
    for row in rows[1:]:
        if len(row) > len(head) and any(cell.value for cell in row[len(head):]):
            extra = row[len(head)]
            text.faults.append(Fault(file, extra.line, extra.column, f"a line of {len(row)} cells under {len(head)} columns",
                                     "a comma inside a cell stands in quotes; decimals have a point"))
            continue
        cells = dict(zip(head, row, strict=False))
        if not (cells.get("value") and cells["value"].value):
            sheet.unfilled += 1
            continue
        quantity = cells["quantity"]
        name = quantity.value.lower().replace(" ", "_").replace("-", "_")
        if name not in QUANTITIES and name != "series_resistor":
            text.faults.append(Fault(file, quantity.line, quantity.column, f"unknown quantity {quantity.value!r}",
                                     f"one of {', '.join(QUANTITIES)}"))
            continue
        key = (cells["tag"].value, _of(cells, "state") or "steady", _of(cells, "of"))
        starts.setdefault(key, row[0])
        entry = readings.setdefault(key, {})
        for word in ("tag", "state", "of", "taken_on", "by", "note"):
            if word in cells and cells[word].value and word not in entry:
                entry[word] = cells[word].node(file)
        value = cells["value"]
        node = value.node(file, f"{value.value} {_of(cells, 'unit')}".strip())
        group = sets.setdefault(key, {}).setdefault(_of(cells, "set"), {})
        if name in group:
            text.faults.append(Fault(file, value.line, value.column, f"{name!r} of {key[0]} stands twice in one set",
                                     "repeats with a number in the column `set`"))
            continue
        group[name] = node
        if _of(cells, "instrument"):
            used = entry.setdefault("instrument", _mapping({}, row[0], file))
            if isinstance(used, yaml.MappingNode) and all(one[0].value != name for one in used.value):
                used.value.append((quantity.node(file, name), cells["instrument"].node(file)))
    items: list[yaml.Node] = []
    for key, entry in readings.items():
        entry.update(sets[key].pop("", {}))
        if sets[key]:
            made: list[yaml.Node] = [_mapping(group, starts[key], file) for group in sets[key].values()]
            entry["repeats"] = _sequence(made, starts[key], file)
        items.append(_mapping(entry, starts[key], file))
    top = Cell("1", 1, 1)
    return _mapping({"format": top.node(file), "readings": _sequence(items, top, file)}, top, file)


def _of(cells: dict[str, Cell], name: str) -> str:
    return cells[name].value if name in cells else ""


def _mapping(entries: dict[str, yaml.Node], at: Cell, file: str) -> yaml.MappingNode:
    pairs = [(at.node(file, name), node) for name, node in entries.items()]
    mark = at.node(file).start_mark
    return yaml.MappingNode("tag:yaml.org,2002:map", pairs, mark, mark)


def _sequence(items: list[yaml.Node], at: Cell, file: str) -> yaml.SequenceNode:
    mark = at.node(file).start_mark
    return yaml.SequenceNode("tag:yaml.org,2002:seq", items, mark, mark)
