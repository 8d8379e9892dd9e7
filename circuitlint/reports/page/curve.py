"""A quantity over time as a curve, its highest and lowest point marked."""

from __future__ import annotations

import itertools
import math

from circuitlint.reports.page import svg
from circuitlint.reports.page.labels import Label, Placer, Segment
from circuitlint.reports.page.plot import Axis, Frame, spread
from circuitlint.reports.page.text import plain, quantity
from circuitlint.review.record import Circuit, Curve

MOST_POINTS = 240


def curve_plot(circuit: Circuit, curve: Curve) -> str:
    """The curve as SVG; empty where it has fewer than two finite points."""
    points = [(t, v) for t, v in zip(curve.times, curve.values, strict=False) if math.isfinite(t) and math.isfinite(v)]
    if len(points) < 2 or points[0][0] == points[-1][0]:
        return ""
    times, values = [t for t, _ in points], [v for _, v in points]
    name = plain(curve.name)
    low, high = spread(values, 0.14, from_zero=True)
    frame = Frame(Axis(min(times), max(times), "time", "time"), Axis(low, high, name, curve.dimension))
    axes, boxes = frame.draw()
    kept = [frame.point(t, v) for t, v in thinned(points)]
    placer = Placer([Segment(*a, *b) for a, b in itertools.pairwise(kept)], bounds=frame.box.grown(16.0))
    placer.taken += boxes
    placer.lines += [Segment(0.0, -frame.high, 0.0, 0.0), Segment(0.0, 0.0, frame.wide, 0.0)]
    peak = max(points, key=lambda point: abs(point[1]))
    x, y = frame.point(*peak)
    words = quantity(peak[1], curve.dimension)
    when = quantity(peak[0], "time", 3)
    side = math.pi / 2.0 if peak[1] >= 0.0 else -math.pi / 2.0
    placed = placer.place([Label(words, "", f" at {when}", ((x, y, side), (x, y, 0.0)))])
    extent = frame.box
    for box in placer.taken:
        extent = extent.around(box)
    zero = svg.line(0.0, frame.y(0.0), frame.wide, frame.y(0.0), "fine") if low < 0.0 else ""
    dot = f'<circle class="dot" cx="{svg.num(x)}" cy="{svg.num(y)}" r="2.6"/>'
    title = f"{name[:1].upper()}{name[1:]} of {circuit.tag}, {curve.state}"
    until = quantity(times[-1], "time", 3)
    desc = (
        f"From {quantity(values[0], curve.dimension)} at the start; farthest {words} at {when}; "
        f"{quantity(values[-1], curve.dimension)} after {until}.{' ' + curve.note if curve.note else ''}"
    )
    return svg.drawing("curve", extent.grown(4.0), title, desc, f"{zero}{axes}{svg.path(kept, 'trace')}{dot}{svg.labels(placed)}")


def thinned(points: list[tuple[float, float]]) -> list[tuple[float, float]]:
    """At most `MOST_POINTS` points that keep the ends and the highest and lowest value of every stretch."""
    if len(points) <= MOST_POINTS:
        return points
    stretches = MOST_POINTS // 2 - 1
    kept = [points[0]]
    for index in range(stretches):
        start, end = 1 + index * (len(points) - 2) // stretches, 1 + (index + 1) * (len(points) - 2) // stretches
        part = points[start:end]
        if part:
            ends = {part.index(min(part, key=lambda one: one[1])), part.index(max(part, key=lambda one: one[1]))}
            kept += [part[at] for at in sorted(ends)]
    return [*kept, points[-1]]
