"""The worst case as a region: where two figures can lie together over all tolerances, with their limits."""

from __future__ import annotations

import math

from circuitlint.reports.page import svg
from circuitlint.reports.page.labels import Box, Label, Placer, Segment
from circuitlint.reports.page.plot import Axis, Frame, spread
from circuitlint.reports.page.text import plain, quantity, stated
from circuitlint.review.record import Check, Circuit, Figure, Region

FAR = 1.5


def region_plot(circuit: Circuit, region: Region) -> str:
    """The region as SVG; empty where it has no finite point or no dimension is known for its figures."""
    figures = {(one.name, one.of, one.state): one for one in circuit.figures}
    across = figures.get((region.across, region.of, region.state))
    up = figures.get((region.up, region.of, region.state))
    points = [point for point in region.points if all(map(math.isfinite, point))]
    if across is None or up is None or not points:
        return ""
    if not all(map(math.isfinite, (across.nominal, up.nominal))):
        return ""
    limits = [
        check
        for check in circuit.checks
        if check.limit is not None
        and check.figure in (region.across, region.up)
        and check.of == region.of
        and check.state == region.state
    ]
    xs, ys = [x for x, _ in points] + [across.nominal], [y for _, y in points] + [up.nominal]
    shown = [check for check in limits if _near(check, xs if check.figure == region.across else ys)]
    frame = Frame(_axis(across, xs, shown), _axis(up, ys, shown))
    axes, words = frame.draw()
    corners = [frame.point(x, y) for x, y in points]
    edges = zip(corners, [*corners[1:], corners[0]], strict=True)
    placer = Placer([Segment(*a, *b) for a, b in edges], bounds=frame.box.grown(1.0))
    back, front, wanted = [], [], []
    for check in shown:
        hatch, border, label = _limit(frame, check, check.figure == region.across)
        back.append(hatch)
        front += [_part_beyond(frame, points, check, check.figure == region.across), svg.segment(border, "limit")]
        placer.lines.append(border)
        wanted.append(label)
    spot = frame.point(across.nominal, up.nominal)
    x, y = spot
    placer.taken += [*words, Box(x - 3.0, y - 3.0, x + 3.0, y + 3.0)]
    wanted.append(Label("nominal", at=((x, y, math.pi / 2.0), (x, y, -math.pi / 2.0))))
    placed = placer.place(wanted)
    extent = frame.box
    for box in placer.taken:
        extent = extent.around(box)
    shape = svg.path(corners, "region", closed=True)
    nominal = f'<circle class="dot" cx="{svg.num(x)}" cy="{svg.num(y)}" r="2.6"/>'
    title = f"Worst-case region of {circuit.tag}, {region.state}: {plain(region.up)} over {plain(region.across)}"
    return svg.drawing(
        "range",
        extent.grown(4.0),
        title,
        _describe(across, up, limits, shown),
        f"{''.join(back)}{axes}{shape}{''.join(front)}{nominal}{svg.labels(placed)}",
    )


def _near(check: Check, values: list[float]) -> bool:
    """Whether a limit lies close enough to the region to be drawn with it."""
    if check.limit is None or not math.isfinite(check.limit.value):
        return False
    low, high = min(values), max(values)
    room = FAR * max(high - low, 0.05 * max(abs(low), abs(high)))
    return low - room <= check.limit.value <= high + room


def _axis(figure: Figure, values: list[float], shown: list[Check]) -> Axis:
    extra = [check.limit.value for check in shown if check.figure == figure.name and check.limit is not None]
    low, high = spread([*values, *extra], 0.12)
    if min([*values, *extra]) >= 0.0:
        low = max(low, 0.0)
    return Axis(low, high, plain(figure.name), figure.dimension)


def _limit(frame: Frame, check: Check, upright: bool) -> tuple[str, Segment, Label]:
    """Hatching on the far side of a limit, its border, and its label."""
    assert check.limit is not None
    value = check.limit.value
    words = stated(value, check.limit.dimension)
    least = check.sense == "at least"
    if upright:
        x = frame.x(value)
        left, right = (0.0, x) if least else (x, frame.wide)
        hatch = _hatched(left, -frame.high, right, 0.0)
        border = Segment(x, -frame.high, x, 0.0)
        side = 0.0 if least else math.pi
        spots = tuple((x, -frame.high * share, side) for share in (0.93, 0.07, 0.5, 0.3, 0.7))
    else:
        y = frame.y(value)
        top, bottom = (y, 0.0) if least else (-frame.high, y)
        hatch = _hatched(0.0, top, frame.wide, bottom)
        border = Segment(0.0, y, frame.wide, y)
        side = math.pi / 2.0 if least else -math.pi / 2.0
        spots = tuple((frame.wide * share, y, side) for share in (0.8, 0.2, 0.5))
    return hatch, border, Label("limit", "", f" {words}", spots)


def _part_beyond(frame: Frame, points: list[svg.Point], check: Check, upright: bool) -> str:
    """The part of the region that lies beyond a limit."""
    assert check.limit is not None
    at, axis = check.limit.value, 0 if upright else 1
    sign = -1.0 if check.sense == "at least" else 1.0
    kept: list[svg.Point] = []
    for one, other in zip(points, [*points[1:], points[0]], strict=True):
        here, there = sign * (one[axis] - at), sign * (other[axis] - at)
        if here > 0.0:
            kept.append(one)
        if here * there < 0.0:
            share = here / (here - there)
            kept.append((one[0] + share * (other[0] - one[0]), one[1] + share * (other[1] - one[1])))
    return svg.path([frame.point(x, y) for x, y in kept], "outside", closed=True) if len(kept) > 1 else ""


def _hatched(left: float, top: float, right: float, bottom: float) -> str:
    wide, high = max(right - left, 0.0), max(bottom - top, 0.0)
    return f'<rect class="beyond" x="{svg.num(left)}" y="{svg.num(top)}" width="{svg.num(wide)}" height="{svg.num(high)}"/>'


def _describe(across: Figure, up: Figure, limits: list[Check], shown: list[Check]) -> str:
    said = []
    for one in (across, up):
        said.append(
            f"{plain(one.name)} from {quantity(one.lowest, one.dimension)} to {quantity(one.highest, one.dimension)},"
            f" nominal {quantity(one.nominal, one.dimension)}"
        )
    for check in limits:
        if check.limit is not None:
            where = "" if check in shown else ", outside the picture"
            said.append(f"limit {plain(check.figure)} {check.sense} {stated(check.limit.value, check.limit.dimension)}{where}")
    return "; ".join(said) + "."
