"""The phasor diagram: supply voltage, the voltages that add up to it, and the current, to scale.

Lengths are written to six digits with the scale beside them, so that the drawing can be measured back.
"""

from __future__ import annotations

import cmath
import itertools
import math
from collections.abc import Iterator
from typing import Literal, NamedTuple

from circuitlint.reports.page import svg
from circuitlint.reports.page.axes import round_below
from circuitlint.reports.page.labels import Box, Label, Placer, Segment, width_of
from circuitlint.reports.page.text import MINUS, plain, quantity, stated
from circuitlint.review.record import Circuit, Element

Reference = Literal["current", "voltage"]
Table = dict[tuple[str, str], complex]

KINDS = {"parallel": "p", "resistor": "R", "capacitor": "C"}
WIDE, HIGH = 210.0, 210.0
MOST_ARROWS = 24
CLOSES = 1e-6
PARTS = (("resistive-voltage", "R"), ("inductive-voltage", "L"), ("capacitive-voltage", "C"))
SCALE_BAR = 64.0


class Arrow(NamedTuple):
    """One phasor to draw: its name and part, its letter and subscript, where it starts, what it is, how it looks."""

    name: str
    of: str
    lead: str
    sub: str
    tail: complex
    value: complex
    look: str

    @property
    def dimension(self) -> str:
        """`current` or `voltage`."""
        return "current" if self.lead == "I" else "voltage"

    @property
    def size(self) -> str:
        """Magnitude with unit."""
        return quantity(abs(self.value), self.dimension)


def table_of(circuit: Circuit, state: str) -> Table:
    """The phasors of one state by name and part; those that are not finite are left out."""
    found = {(one.name, one.of): complex(one.real, one.imaginary) for one in circuit.phasors if one.state == state}
    return {key: value for key, value in found.items() if cmath.isfinite(value)}


def arrows_of(circuit: Circuit, state: str) -> tuple[list[Arrow], bool]:
    """What to draw, and whether the parts add up to the supply voltage. Empty where a voltage or current is missing."""
    table = table_of(circuit, state)
    supply, current = table.get(("voltage", "")), table.get(("current", ""))
    if supply is None or current is None or supply == 0:
        return [], False
    keys = [key for part in circuit.tree.parts for key in _chain(part, table, True)]
    if len(keys) > MOST_ARROWS:
        keys = [key for part in circuit.tree.parts for key in _chain(part, table, False)]
    if len(keys) > MOST_ARROWS:
        keys = []
    closes = bool(keys) and abs(sum(table[key] for key in keys) - supply) <= CLOSES * abs(supply)
    made = [Arrow("voltage", "", "U", "", 0j, supply, "ph u"), Arrow("current", "", "I", "", 0j, current, "ph i")]
    tail = 0j
    if len(keys) > 1:
        for key, sub, look in _named(keys):
            made.append(Arrow(*key, "U", sub, tail, table[key], look))
            tail = tail + table[key] if closes else 0j
    made += _branches(circuit.tree, table, current)
    return made, closes


def _chain(element: Element, table: Table, deep: bool) -> Iterator[tuple[str, str]]:
    """The voltages met on the way through an element, in order."""
    if element.kind == "series" and element.parts and (deep or ("voltage", element.of) not in table):
        for part in element.parts:
            yield from _chain(part, table, deep)
        return
    found = [(name, element.of) for name, _ in PARTS if (name, element.of) in table]
    if element.of and deep and len(found) > 0:
        yield from found
    elif element.of and ("voltage", element.of) in table:
        yield "voltage", element.of
    if element.kind not in ("series", "parallel"):
        for part in element.parts:
            yield from _chain(part, table, deep)


def _named(keys: list[tuple[str, str]]) -> Iterator[tuple[tuple[str, str], str, str]]:
    """Each voltage with its subscript, numbered where there are several of a kind, and its look."""
    letters = [_letter(key) for key in keys]
    seen: dict[str, int] = {}
    for key, letter in zip(keys, letters, strict=True):
        seen[letter] = seen.get(letter, 0) + 1
        number = str(seen[letter]) if letters.count(letter) > 1 else ""
        yield key, letter + number, f"ph u{letter.lower() if letter in 'RLC' else 'w'}"


def _letter(key: tuple[str, str]) -> str:
    letter = dict(PARTS).get(key[0])
    if letter:
        return letter
    kind = key[1].rpartition(".")[2]
    return "cable" if key[1].startswith("cable") else KINDS.get(kind, "v")


def _branches(tree: Element, table: Table, current: complex) -> list[Arrow]:
    """The currents of the first parallel group that together are the circuit's current."""
    stack = list(tree.parts)
    while stack:
        element = stack.pop(0)
        if element.kind == "parallel":
            found = [(part.of, table[("current", part.of)]) for part in element.parts if ("current", part.of) in table]
            whole = sum(value for _, value in found)
            if 2 <= len(found) <= 6 and abs(whole - current) <= CLOSES * abs(current):
                made, tail = [], 0j
                for number, (of, value) in enumerate(found, 1):
                    made.append(Arrow("current", of, "I", str(number), tail, value, "ph ib"))
                    tail += value
                return made
        elif element.kind == "series":
            stack = [*element.parts, *stack]
    return []


def phasor_diagram(circuit: Circuit, state: str, reference: Reference = "current") -> str:
    """The diagram as SVG; empty where the record has no supply voltage and current for the state."""
    arrows, closes = arrows_of(circuit, state)
    if not arrows:
        return ""
    supply, current = arrows[0].value, arrows[1].value
    turn = -cmath.phase(current) if reference == "current" and current != 0 else -cmath.phase(supply)
    turned = [one._replace(tail=one.tail * cmath.exp(1j * turn), value=one.value * cmath.exp(1j * turn)) for one in arrows]
    volts, amperes = _scales(turned)
    drawn = [(one, *_pixels(one, volts, amperes)) for one in turned]
    placer = Placer([Segment(x, y, x + dx, y + dy) for _, (x, y), (dx, dy) in drawn])
    corners = Box(0.0, 0.0, 0.0, 0.0)
    for one in placer.lines:
        corners = corners.around(Box(min(one.x1, one.x2), min(one.y1, one.y2), max(one.x1, one.x2), max(one.y1, one.y2)))
    placer.bounds = Box(corners.left - 104.0, corners.top - 30.0, corners.right + 104.0, corners.bottom + 30.0)
    angle = cmath.phase(turned[0].value) - (cmath.phase(turned[1].value) if current != 0 else 0.0)
    side = 1.0 if math.sin(angle) >= 0.0 else -1.0
    wanted = [_label(one, tail, step, side) for one, tail, step in drawn]
    first, rest = wanted[:2], sorted(zip(wanted[2:], drawn[2:], strict=True), key=lambda pair: -math.hypot(*pair[1][2]))
    wedge, mark = _wedge(turned[0].value, turned[1].value, placer)
    placed = placer.place([*first, *mark, *(label for label, _ in rest)])
    extent = corners
    for box in placer.taken:
        extent = extent.around(box)
    bars, extent = _bars(extent, volts, amperes)
    body = "".join(svg.arrow(tail, step, one.look, f"{one.name}|{one.of}") for one, tail, step in reversed(drawn))
    scale = (
        f'<g data-volt="{svg.exact(volts)}" data-ampere="{svg.exact(amperes)}" data-turned="{turn:.9g}"'
        f' data-closes="{int(closes)}">{wedge}{body}</g>'
    )
    title = f"Phasor diagram of {circuit.tag}, {state}"
    return svg.drawing("phasor", extent.grown(5.0), title, describe(arrows), f"{scale}{svg.labels(placed)}{bars}")


def describe(arrows: list[Arrow]) -> str:
    """The diagram in words: each phasor with magnitude and angle against the supply voltage. Not escaped."""
    base = cmath.phase(arrows[0].value)
    said = []
    for one in arrows:
        what = f"{one.lead}{' ' + one.sub if one.sub else ''}: {plain(one.name)} of {one.of or 'the circuit'}"
        said.append(f"{what} {one.size} at {math.degrees(_wrapped(cmath.phase(one.value) - base)):.1f}°")
    return "; ".join(said) + "."


def _wrapped(angle: float) -> float:
    return math.remainder(angle, 2.0 * math.pi)


def _scales(turned: list[Arrow]) -> tuple[float, float]:
    """Volts and amperes to the pixel: the voltages fill the field, the current keeps clear of what lies along it."""
    ends = [end for one in turned if one.dimension == "voltage" for end in (one.tail, one.tail + one.value)]
    across, up = _extent(ends)
    volts = max(across / WIDE, up / HIGH)
    current = abs(turned[1].value)
    if current == 0.0:
        return volts, 1.0
    flows = [end for one in turned if one.dimension == "current" for end in (one.tail, one.tail + one.value)]
    across, up = _extent(flows)
    unit = turned[1].value / current
    along = max((one.real * unit.real + one.imag * unit.imag) / volts for one in ends)
    length = max(0.45 * abs(turned[0].value) / volts, 60.0)
    if along > 0.6 * length:
        length = max(length, min(along + 30.0, WIDE + 20.0))
        length = along - 30.0 if abs(length - along) < 18.0 and along > 90.0 else length
    return volts, max(current / length, across / (WIDE + 20.0), up / HIGH)


def _extent(ends: list[complex]) -> tuple[float, float]:
    reals, imaginaries = [one.real for one in ends], [one.imag for one in ends]
    return max(reals) - min(reals), max(imaginaries) - min(imaginaries)


def _pixels(one: Arrow, volts: float, amperes: float) -> tuple[svg.Point, svg.Point]:
    scale = amperes if one.dimension == "current" else volts
    return (one.tail.real / scale, -one.tail.imag / scale), (one.value.real / scale, -one.value.imag / scale)


def _label(one: Arrow, tail: svg.Point, step: svg.Point, side: float) -> Label:
    """A label beside the middle of its arrow, on the outer side; the current's at its tip."""
    along = math.atan2(-step[1], step[0])
    outward = along + math.copysign(math.pi / 2.0, side if one.look == "ph u" else -side)
    spots = []
    for share in (0.5, 0.7, 0.3):
        spots.append((tail[0] + share * step[0], tail[1] + share * step[1], outward))
    tip = (tail[0] + step[0], tail[1] + step[1], along)
    if one.lead == "I":
        spots.insert(0, tip)
    else:
        spots.append(tip)
    return Label(one.lead, one.sub, f" {one.size}", tuple(spots))


def _wedge(voltage: complex, current: complex, placer: Placer) -> tuple[str, list[Label]]:
    """The angle between current and supply voltage, where it is wide enough to draw."""
    if current == 0 or voltage == 0:
        return "", []
    start = cmath.phase(current)
    angle = _wrapped(cmath.phase(voltage) - start)
    if abs(angle) < math.radians(4.0):
        return "", []
    radius = 30.0
    points = [(radius * math.cos(start + angle * k / 6.0), -radius * math.sin(start + angle * k / 6.0)) for k in range(7)]
    placer.lines += [Segment(*a, *b) for a, b in itertools.pairwise(points)]
    turns = [start + angle * share for share in (0.5, 0.7, 0.3)]
    spots = tuple((radius * math.cos(turn), -radius * math.sin(turn), turn) for turn in turns)
    mark = Label("φ", "", f" {math.degrees(angle):.1f}°".replace("-", MINUS), spots)
    return svg.arc((0.0, 0.0), radius, start, start + angle, "fine"), [mark]


def _bars(extent: Box, volts: float, amperes: float) -> tuple[str, Box]:
    """Bars that show the scales, below everything else."""
    made, top = [], extent.bottom + 20.0
    left = extent.left
    for scale, dimension in ((volts, "voltage"), (amperes, "current")):
        size = round_below(scale * SCALE_BAR)
        length, words = size / scale, stated(size, dimension)
        made.append(svg.path([(left, top - 4.0), (left, top), (left + length, top), (left + length, top - 4.0)], "bar"))
        made.append(svg.text(left + length + 5.0, top, words))
        right = left + length + 5.0 + width_of(words)
        extent = extent.around(Box(left, top - 12.0, right, top + 3.0))
        left = right + 16.0
    return "".join(made), extent
