"""Strokes of a drawing as SVG text. Coordinates are pixels at the page's own size, downward."""

from __future__ import annotations

import math
from collections.abc import Iterable, Sequence

from circuitlint.reports.page.labels import SIZE, SUBSCRIPT, Box, Placed, Segment
from circuitlint.reports.page.text import escape

Point = tuple[float, float]


def num(value: float, digits: int = 2) -> str:
    """A coordinate, without needless zeros."""
    text = f"{value:.{digits}f}"
    if "." in text:
        text = text.rstrip("0").rstrip(".")
    return "0" if text in ("-0", "") else text


def exact(value: float) -> str:
    """A length to six digits, whatever its size, so that a drawing can be measured back."""
    return f"{value:.6g}"


def drawing(name: str, box: Box, title: str, desc: str, body: str, scales: str = "") -> str:
    """A drawing with its accessible name and description. `title` and `desc` are escaped here, `body` is markup.

    `scales` are further attributes that say how the drawing is scaled.
    """
    wide, high = box.right - box.left, box.bottom - box.top
    view = " ".join(num(one, 1) for one in (box.left, box.top, wide, high))
    return (
        f'<svg class="draw {name}" role="img" viewBox="{view}" width="{num(wide, 1)}" height="{num(high, 1)}"{scales}>'
        f"<title>{escape(title)}</title><desc>{escape(desc)}</desc>{body}</svg>"
    )


def path(points: Sequence[Point], kind: str = "", closed: bool = False) -> str:
    """A line through points."""
    if not points:
        return ""
    first, *rest = points
    steps = "".join(f"L{num(x)} {num(y)}" for x, y in rest)
    return f'<path{_kind(kind)} d="M{num(first[0])} {num(first[1])}{steps}{"Z" if closed else ""}"/>'


def line(x1: float, y1: float, x2: float, y2: float, kind: str = "") -> str:
    """A straight line."""
    return f'<path{_kind(kind)} d="M{num(x1)} {num(y1)}L{num(x2)} {num(y2)}"/>'


def segment(one: Segment, kind: str = "") -> str:
    """A straight line."""
    return line(*one, kind)


def arrow(tail: Point, step: Point, kind: str, name: str = "", head: float = 9.0, slim: float = 0.3) -> str:
    """An arrow from a point along a step, the step kept to six digits; `name` lets a program find it."""
    length = math.hypot(*step)
    x, y = tail[0] + step[0], tail[1] + step[1]
    named = f' data-phasor="{escape(name)}"' if name else ""
    shaft = f'<path class="{kind}"{named} d="M{exact(tail[0])} {exact(tail[1])}l{exact(step[0])} {exact(step[1])}"/>'
    if length < 0.5:
        return shaft + f'<circle class="{kind} tip" cx="{num(x)}" cy="{num(y)}" r="1.6"/>'
    size = min(head, 0.6 * length)
    ux, uy = step[0] / length, step[1] / length
    bx, by = x - ux * size, y - uy * size
    half = max(size, 2.0) * slim
    tip = f"M{num(x)} {num(y)}L{num(bx - uy * half)} {num(by + ux * half)}L{num(bx + uy * half)} {num(by - ux * half)}Z"
    return shaft + f'<path class="{kind} tip" d="{tip}"/>'


def arc(centre: Point, radius: float, start: float, end: float, kind: str = "") -> str:
    """Part of a circle between two angles (radian, counter-clockwise from the right)."""
    x1, y1 = centre[0] + radius * math.cos(start), centre[1] - radius * math.sin(start)
    x2, y2 = centre[0] + radius * math.cos(end), centre[1] - radius * math.sin(end)
    large, sweep = int(abs(end - start) > math.pi), int(end < start)
    curve = f"A{num(radius)} {num(radius)} 0 {large} {sweep} {num(x2)} {num(y2)}"
    return f'<path{_kind(kind)} d="M{num(x1)} {num(y1)}{curve}"/>'


def text(x: float, y: float, words: str, kind: str = "", anchor: str = "start") -> str:
    """A line of text; `words` are escaped here."""
    where = "" if anchor == "start" else f' text-anchor="{anchor}"'
    return f'<text{_kind(kind)} x="{num(x, 1)}" y="{num(y, 1)}"{where}>{escape(words)}</text>'


def labels(placed: Iterable[Placed]) -> str:
    """Placed labels with their leaders. A box is noted where a test wants to hold the rendered text against it."""
    made = []
    for one in placed:
        if one.leader is not None:
            made.append(segment(one.leader, "leader"))
        label = one.label
        sub = ""
        if label.sub:
            drop = SIZE * 0.22
            sub = f'<tspan dy="{num(drop, 1)}" font-size="{num(SIZE * SUBSCRIPT, 1)}">{escape(label.sub)}</tspan>'
        rest = escape(label.rest)
        if sub and rest:
            rest = f'<tspan dy="{num(-SIZE * 0.22, 1)}">{rest}</tspan>'
        where = "" if one.anchor == "start" else f' text-anchor="{one.anchor}"'
        made.append(f'<text x="{num(one.x, 1)}" y="{num(one.baseline, 1)}"{where}>{escape(label.lead)}{sub}{rest}</text>')
    return "".join(made)


def _kind(kind: str) -> str:
    return f' class="{kind}"' if kind else ""
