"""Margins to scale: the room left in the worst case as a share of the limit, on one scale for the whole page.

The limit stands at zero, room to the right, beyond the limit to the left; what lies outside the scale is drawn at its
end with an arrowhead.
"""

from __future__ import annotations

import math
from collections.abc import Iterable

from circuitlint.reports.page.svg import num

WIDE, HIGH = 340.0, 16.0
SMALL_WIDE = 120.0
RIM = 6.0
END = 1.0


def x_of(margin: float, wide: float = WIDE) -> float:
    """Pixels from the left for a margin, held within the ends of the scale."""
    return RIM + (wide - 2.0 * RIM) * (min(max(margin, -END), END) + END) / (2.0 * END)


def scale_head(wide: float = WIDE) -> str:
    """The scale's own marks, for the head of a column."""
    marks = []
    for share, words in ((-1.0, "−100 %"), (0.0, "limit"), (1.0, "+100 %")):
        x = x_of(share, wide)
        anchor = "middle" if share == 0.0 else "start" if share < 0.0 else "end"
        marks.append(
            f'<text x="{num(x if share == 0.0 else 0.0 if share < 0.0 else wide, 1)}" y="10"'
            f' text-anchor="{anchor}">{words}</text>'
        )
    ticks = "".join(f"M{num(x_of(share / 4.0, wide))} {'13' if share % 2 else '12'}V18" for share in range(-4, 5))
    return (
        f'<svg class="strip" viewBox="0 0 {num(wide)} 18" width="{num(wide)}" height="18" aria-hidden="true">'
        f'{"".join(marks)}<path class="axis" d="{ticks}"/></svg>'
    )


def strip(held: Iterable[float], beyond: Iterable[float]) -> str:
    """Every margin of a rule as a stroke: those within their limits and those beyond."""
    marks = _strokes(held, "stroke") + _strokes(beyond, "stroke bad")
    return (
        f'<svg class="strip" viewBox="0 0 {num(WIDE)} {num(HIGH)}" width="{num(WIDE)}" height="{num(HIGH)}"'
        f' aria-hidden="true"><use href="#scale"/>{marks}</svg>'
    )


def _strokes(margins: Iterable[float], kind: str) -> str:
    places = sorted({num(x_of(one), 1) for one in margins if math.isfinite(one) and abs(one) <= END}, key=float)
    steps = "".join(f"M{x} 3v10" for x in places)
    made = f'<path class="{kind}" d="{steps}"/>' if steps else ""
    outside = {one > 0.0 for one in margins if not abs(one) <= END and not math.isnan(one)}
    return made + "".join(_outside(right, WIDE, kind) for right in sorted(outside))


def _outside(right: bool, wide: float, kind: str) -> str:
    x = num(wide) if right else "0"
    return f'<path class="{kind} tip" d="M{x} 8l{"-" if right else ""}6 -4.5v9Z"/>'


def bar(margin: float, nominal: float | None, bad: bool) -> str:
    """One check: a ring at the nominal margin, a dot at the worst case's, and a line between them."""
    kind = " bad" if bad else ""
    worst = x_of(margin, SMALL_WIDE)
    end = (
        _outside(margin > 0.0, SMALL_WIDE, "tip" + kind)
        if abs(margin) > END
        else (f'<circle class="dot{kind}" cx="{num(worst, 1)}" cy="8" r="3.2"/>')
    )
    ring = ""
    if nominal is not None and math.isfinite(nominal):
        at = x_of(nominal, SMALL_WIDE)
        ring = f'<path class="reach{kind}" d="M{num(worst, 1)} 8H{num(at, 1)}"/>'
        if abs(nominal) <= END:
            ring += f'<circle class="ring{kind}" cx="{num(at, 1)}" cy="8" r="3.2"/>'
    return (
        f'<svg class="bar" viewBox="0 0 {num(SMALL_WIDE)} {num(HIGH)}" width="{num(SMALL_WIDE)}"'
        f' height="{num(HIGH)}" aria-hidden="true"><use href="#small"/>{ring}{end}</svg>'
    )


def shared(marks: str = "") -> str:
    """What every drawing of the page refers to: the two scales, the hatching, and further marks given as markup."""
    return (
        '<svg class="shared" width="0" height="0" aria-hidden="true"><defs>'
        '<pattern id="hatch" width="5" height="5" patternUnits="userSpaceOnUse" patternTransform="rotate(45)">'
        '<path class="hatching" d="M0 0V5"/></pattern>'
        '<pattern id="hatch-beyond" width="5" height="5" patternUnits="userSpaceOnUse" patternTransform="rotate(45)">'
        '<path class="hatching bad" d="M0 0V5"/></pattern>'
        f'<g id="scale">{_ground(WIDE)}</g><g id="small">{_ground(SMALL_WIDE)}</g></defs>{marks}</svg>'
    )


def _ground(wide: float) -> str:
    middle = x_of(0.0, wide)
    quarters = "".join(f"M{num(x_of(share / 4.0, wide))} 6.5v3" for share in range(-4, 5))
    return (
        f'<rect class="beyond" x="0" y="1" width="{num(middle)}" height="14"/>'
        f'<path class="ground" d="M0 8H{num(wide)}{quarters}"/><path class="limit" d="M{num(middle)} 0V16"/>'
    )
