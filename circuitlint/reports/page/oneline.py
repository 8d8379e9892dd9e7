"""The one-line diagram of a circuit's tree, from the supply at the top down to the load and back to a terminal.

Parts in series stand below each other, branches in parallel beside each other, each with its words on its right. Every
part has a box of its own, so that no word can cover another or a line.
"""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass
from textwrap import wrap

from circuitlint.reports.page import svg
from circuitlint.reports.page.labels import SIZE, Box, width_of
from circuitlint.reports.page.symbols import symbol
from circuitlint.reports.page.text import escape, plain
from circuitlint.review.record import Circuit, Element

MOST_PARTS = 80
LINE = 14.0
WIRE = 9.0
GAP = 16.0
LEFT = 17.0
LONG, SHORT = 34, 24
MOST_LINES = 10


@dataclass(frozen=True, slots=True)
class Block:
    """Drawn parts, the wire entering at (0, 0) and leaving at (0, height); room to the left and right of the wire."""

    markup: str
    height: float
    left: float
    right: float
    boxes: tuple[Box, ...] = ()


def one_line(circuit: Circuit) -> str:
    """The diagram as SVG, or as a list in words where the tree has more than `MOST_PARTS` parts."""
    if sum(1 for _ in _walk(circuit.tree)) > MOST_PARTS:
        return f'<ul class="tree">{_listed(circuit.tree)}</ul>'
    block = _block(circuit.tree, circuit.system, LONG)
    end = f'<circle class="sym" cx="0" cy="{svg.num(block.height + 3.0)}" r="3"/>'
    box = Box(-block.left - 3.0, -3.0, block.right + 3.0, block.height + 9.0)
    return svg.drawing("oneline", box, f"One-line diagram of {circuit.tag}", _spoken(circuit.tree), block.markup + end)


def word_boxes(circuit: Circuit) -> list[Box]:
    """The boxes of every line of words, where they are drawn."""
    return list(_block(circuit.tree, circuit.system, LONG).boxes)


def _walk(element: Element) -> Iterator[Element]:
    yield element
    for part in element.parts:
        yield from _walk(part)


def _block(element: Element, system: str, longest: int) -> Block:
    if element.kind == "parallel" and element.parts:
        return _side_by_side([_block(part, system, SHORT) for part in element.parts])
    blocks = [] if element.kind == "series" and element.parts else [_part(element, system, longest)]
    blocks += [_block(part, system, longest) for part in element.parts]
    return _stacked(blocks)


def _part(element: Element, system: str, longest: int) -> Block:
    """One symbol on its wire, with its words."""
    drawn = symbol(element.kind, system)
    lines = _words(element, longest)
    tall = max(drawn.height + 2.0 * WIRE, LINE * len(lines) + 8.0)
    top = 0.0 if element.kind == "supply" else (tall - drawn.height) / 2.0
    wires = (svg.line(0.0, 0.0, 0.0, top, "sym") if top else "") + svg.line(0.0, top + drawn.height, 0.0, tall, "sym")
    made = [f'{wires}<g transform="translate(0 {svg.num(top)})">{drawn.markup}</g>']
    x = max(drawn.reach + 7.0, LEFT)
    baseline = top + drawn.height / 2.0 - LINE * len(lines) / 2.0 + SIZE
    baseline = max(baseline, SIZE)
    boxes = []
    for index, words in enumerate(lines):
        y = baseline + index * LINE
        made.append(svg.text(x, y, words, "name" if index == 0 else ""))
        boxes.append(Box(x, y - SIZE * 0.95, x + width_of(words), y + SIZE * 0.3))
    right = max([drawn.reach, *(box.right for box in boxes)])
    return Block("".join(made), tall, LEFT, right, tuple(boxes))


def _words(element: Element, longest: int) -> list[str]:
    kind = plain(element.kind)
    first = f"{kind}, {element.label}" if element.label not in ("", element.kind) else kind
    kept = (words.replace("± ", "±\u00a0").replace(" %", "\u00a0%") for words in (first, *element.values))
    lines = [line for words in kept for line in wrap(words, longest)]
    return lines if len(lines) <= MOST_LINES else [*lines[: MOST_LINES - 1], "…"]


def _stacked(blocks: list[Block]) -> Block:
    made, boxes, y = [], [], 0.0
    for block in blocks:
        made.append(f'<g transform="translate(0 {svg.num(y)})">{block.markup}</g>' if y else block.markup)
        boxes += [Box(box.left, box.top + y, box.right, box.bottom + y) for box in block.boxes]
        y += block.height
    return Block("".join(made), y, max(block.left for block in blocks), max(block.right for block in blocks), tuple(boxes))


def _side_by_side(blocks: list[Block]) -> Block:
    """Branches between two bars; the wire enters and leaves in line with the first."""
    tall = max(block.height for block in blocks)
    made, boxes, x = [], [], 0.0
    for index, block in enumerate(blocks):
        if index:
            x += blocks[index - 1].right + GAP + block.left
        rest = svg.line(0.0, block.height, 0.0, tall, "sym") if block.height < tall else ""
        made.append(f'<g transform="translate({svg.num(x)} {svg.num(WIRE)})">{block.markup}{rest}</g>')
        boxes += [Box(box.left + x, box.top + WIRE, box.right + x, box.bottom + WIRE) for box in block.boxes]
    bars = "".join(svg.line(0.0, y, x, y, "sym") for y in (WIRE, WIRE + tall))
    ends = svg.line(0.0, 0.0, 0.0, WIRE, "sym") + svg.line(0.0, WIRE + tall, 0.0, tall + 2.0 * WIRE, "sym")
    dots = "".join(f'<circle class="node" cx="0" cy="{svg.num(y)}" r="2.2"/>' for y in (WIRE, WIRE + tall))
    return Block("".join(made) + bars + ends + dots, tall + 2.0 * WIRE, blocks[0].left, x + blocks[-1].right, tuple(boxes))


def _spoken(element: Element) -> str:
    """The tree in words, nesting shown by brackets. Not escaped."""
    own = ", ".join(_named(element))
    if not element.parts:
        return own
    inside = "; ".join(_spoken(part) for part in element.parts)
    return f"{own} ({inside})" if element.kind in ("series", "parallel") else f"{own}; {inside}"


def _named(element: Element) -> list[str]:
    return [word for word in dict.fromkeys((element.kind, element.label, *element.values)) if word]


def _listed(element: Element) -> str:
    own = ", ".join(map(escape, _named(element)))
    below = "".join(_listed(part) for part in element.parts)
    return f"<li>{own}{f'<ul>{below}</ul>' if below else ''}</li>"
