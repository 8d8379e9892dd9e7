"""The impedance triangle and the power triangle, to scale."""

from __future__ import annotations

import cmath
import math

from circuitlint.reports.page import svg
from circuitlint.reports.page.labels import Box, Label, Placer, Segment
from circuitlint.reports.page.phasor import table_of
from circuitlint.reports.page.text import MINUS, quantity
from circuitlint.review.record import Circuit

WIDE, HIGH = 180.0, 120.0
RIGHT_ANGLE = 9.0


def impedance_triangle(circuit: Circuit, state: str) -> str:
    """Resistance, reactance and impedance of the whole circuit; empty where the record has none for the state."""
    found = table_of(circuit, state).get(("impedance", ""))
    region = _region(circuit, state, "resistance", "reactance")
    letters = ("R", "X", "Z")
    kinds = ("resistance", "reactance", "resistance")
    return _triangle("impedance", f"Impedance triangle of {circuit.tag}, {state}", found, region, letters, kinds)


def power_triangle(circuit: Circuit, state: str) -> str:
    """Active, reactive and apparent power of the whole circuit; empty where the record has none for the state."""
    found = table_of(circuit, state).get(("power", ""))
    region = _region(circuit, state, "active-power", "reactive-power")
    letters = ("P", "Q", "S")
    kinds = ("active power", "reactive power", "apparent power")
    return _triangle("power", f"Power triangle of {circuit.tag}, {state}", found, region, letters, kinds)


def _region(circuit: Circuit, state: str, across: str, up: str) -> list[complex]:
    """The hull over which the tip can lie, where the record holds it."""
    for one in circuit.regions:
        if (one.of, one.state, one.across, one.up) == ("", state, across, up):
            return [complex(*point) for point in one.points if all(map(math.isfinite, point))]
    return []


def _triangle(
    name: str,
    title: str,
    found: complex | None,
    region: list[complex],
    letters: tuple[str, str, str],
    kinds: tuple[str, str, str],
) -> str:
    if found is None or found == 0 or not cmath.isfinite(found):
        return ""
    ends = [0j, found, *region]
    wide = max(one.real for one in ends) - min(one.real for one in ends)
    high = max(one.imag for one in ends) - min(one.imag for one in ends)
    scale = max(wide / WIDE, high / HIGH)
    across, up = found.real / scale, found.imag / scale
    corner, top = (across, 0.0), (across, -up)
    sides = [Segment(0.0, 0.0, *corner), Segment(*corner, *top), Segment(0.0, 0.0, *top)]
    corners = [(one.real / scale, -one.imag / scale) for one in region]
    edges = [Segment(*a, *b) for a, b in zip(corners, [*corners[1:], *corners[:1]], strict=True)]
    placer = Placer(sides + edges)
    sizes = (found.real, found.imag, abs(found))
    texts = [f" {quantity(size, kind)}" for size, kind in zip(sizes, kinds, strict=True)]
    turned = math.copysign(1.0, up) * math.copysign(1.0, across)
    below, beyond = math.copysign(math.pi / 2.0, -up), 0.0 if across >= 0.0 else math.pi
    slope = math.atan2(up, across)
    wanted = [
        Label(letters[2], "", texts[2], _along(sides[2], slope + math.copysign(math.pi / 2.0, turned))),
        Label(letters[0], "", texts[0], _along(sides[0], below)),
        Label(letters[1], "", texts[1], _along(sides[1], beyond)),
    ]
    marks = []
    if min(abs(across), abs(up)) > 2.5 * RIGHT_ANGLE:
        inward, upward = -math.copysign(RIGHT_ANGLE, across), -math.copysign(RIGHT_ANGLE, up)
        marks.append(svg.path([(across + inward, 0.0), (across + inward, upward), (across, upward)], "fine"))
    if abs(up) > 14.0 and abs(across) > 14.0:
        radius = min(28.0, 0.5 * abs(across))
        marks.append(svg.arc((0.0, 0.0), radius, beyond, beyond + _between(beyond, slope), "fine"))
        middle = beyond + _between(beyond, slope) / 2.0
        spot = (radius * math.cos(middle), -radius * math.sin(middle), middle)
        words = f" {math.degrees(cmath.phase(found)):.1f}°".replace("-", MINUS)
        wanted.append(Label("φ", "", words, (spot,)))
        placer.lines.append(Segment(radius * math.cos(beyond), 0.0, radius * math.cos(slope), -radius * math.sin(slope)))
    placed = placer.place(wanted)
    xs, ys = [0.0, across, *(x for x, _ in corners)], [0.0, -up, *(y for _, y in corners)]
    extent = Box(min(xs), min(ys), max(xs), max(ys))
    for box in placer.taken:
        extent = extent.around(box)
    body = "".join(
        f'<path class="side{" hyp" if index == 2 else ""}" data-side="{letters[index]}"'
        f' d="M{svg.exact(one.x1)} {svg.exact(one.y1)}l{svg.exact(one.x2 - one.x1)} {svg.exact(one.y2 - one.y1)}"/>'
        for index, one in enumerate(sides)
    )
    spoken = ", ".join(letter + words for letter, words in zip(letters, texts, strict=True))
    shaded = "; shaded: where the tip can lie over all tolerances" if len(corners) > 2 else ""
    desc = f"{spoken}; angle {math.degrees(cmath.phase(found)):.1f}°{shaded}."
    area = svg.path(corners, "region", closed=True) if len(corners) > 2 else ""
    drawn = f'<g data-unit="{svg.exact(scale)}">{area}{body}{"".join(marks)}</g>{svg.labels(placed)}'
    return svg.drawing(name, extent.grown(5.0), title, desc, drawn)


def _between(start: float, end: float) -> float:
    return math.remainder(end - start, 2.0 * math.pi)


def _along(side: Segment, outward: float) -> tuple[tuple[float, float, float], ...]:
    return tuple(
        (side.x1 + share * (side.x2 - side.x1), side.y1 + share * (side.y2 - side.y1), outward)
        for share in (0.5, 0.65, 0.35, 0.9)
    )
