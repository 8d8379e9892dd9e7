"""Labels of a drawing, placed so that none covers another, a line or a leader.

Text is measured with a table of widths at the wide end of common sans-serif faces, since the page brings no face of its
own: a box is never smaller than what a browser draws in it.
"""

from __future__ import annotations

import math
from collections.abc import Iterable, Iterator, Sequence
from dataclasses import dataclass, field
from functools import lru_cache
from typing import NamedTuple

SIZE = 11.0
LINE = 1.3
SUBSCRIPT = 0.72

# Advance widths in em, read off the metrics of wide sans-serif faces and rounded up.
_NARROW = {**dict.fromkeys("iIjl|!'.,:;·", 0.36), **dict.fromkeys(" fr()[]-/\\t", 0.42)}
_WIDE = {**dict.fromkeys("mMW%@∠", 0.99), **dict.fromkeys("wGOQDNHUΩ∆Δ√=+−<>±×", 0.85)}
_DIGIT, _LETTER, _UPPER, _UNKNOWN = 0.64, 0.64, 0.74, 1.05


@lru_cache(maxsize=50_000)
def _ems(text: str) -> float:
    return sum(map(_advance, text))


def width_of(text: str, size: float = SIZE) -> float:
    """Width of a line of text in the drawing's units, on the wide side."""
    return size * _ems(text)


def _advance(character: str) -> float:
    found = _NARROW.get(character) or _WIDE.get(character)
    if found is not None:
        return found
    if character.isascii():
        return _DIGIT if character.isdigit() else _UPPER if character.isupper() else _LETTER
    return _LETTER if "\u00c0" <= character <= "\u03ff" else _UNKNOWN


class Box(NamedTuple):
    """Left, top, right, bottom."""

    left: float
    top: float
    right: float
    bottom: float

    def overlaps(self, other: Box, gap: float = 0.0) -> bool:
        """Whether two boxes share area, or come closer than the gap."""
        return (
            self.left < other.right + gap and other.left < self.right + gap
            and self.top < other.bottom + gap and other.top < self.bottom + gap
        )  # fmt: skip

    def around(self, other: Box) -> Box:
        """The smallest box around two."""
        return Box(
            min(self.left, other.left),
            min(self.top, other.top),
            max(self.right, other.right),
            max(self.bottom, other.bottom),
        )

    def grown(self, by: float) -> Box:
        """The box with a rim."""
        return Box(self.left - by, self.top - by, self.right + by, self.bottom + by)


class Segment(NamedTuple):
    """A straight line that no label may cover."""

    x1: float
    y1: float
    x2: float
    y2: float

    def crosses(self, box: Box) -> bool:
        """Whether any of the line lies inside the box."""
        x1, y1, x2, y2 = self
        left, top, right, bottom = box
        if (x1 <= left and x2 <= left) or (x1 >= right and x2 >= right):
            return False
        if (y1 <= top and y2 <= top) or (y1 >= bottom and y2 >= bottom):
            return False
        enters, leaves = 0.0, 1.0
        for start, step, low, high in ((x1, x2 - x1, left, right), (y1, y2 - y1, top, bottom)):
            if step == 0.0:
                continue
            near, far = sorted(((low - start) / step, (high - start) / step))
            enters, leaves = max(enters, near), min(leaves, far)
        return enters < leaves

    def meets(self, other: Segment) -> bool:
        """Whether two lines cross."""
        dx, dy = self.x2 - self.x1, self.y2 - self.y1
        ox, oy = other.x2 - other.x1, other.y2 - other.y1
        across = dx * oy - dy * ox
        if across == 0.0:
            return False
        own = ((other.x1 - self.x1) * oy - (other.y1 - self.y1) * ox) / across
        its = ((other.x1 - self.x1) * dy - (other.y1 - self.y1) * dx) / across
        return 0.0 <= own <= 1.0 and 0.0 <= its <= 1.0


@dataclass(frozen=True, slots=True)
class Label:
    """A line of text, `lead` with the subscript `sub` and then `rest`, and the points it may stand at."""

    lead: str
    sub: str = ""
    rest: str = ""
    at: tuple[tuple[float, float, float], ...] = ()
    """Point and preferred direction (radian, counter-clockwise from the right), best first."""

    @property
    def width(self) -> float:
        """Width of the line."""
        return width_of(self.lead) + width_of(self.sub, SIZE * SUBSCRIPT) + width_of(self.rest)


@dataclass(frozen=True, slots=True)
class Placed:
    """A label with its box, the leader drawn to it where it stands off, and the end of the box the text hangs on."""

    label: Label
    box: Box
    leader: Segment | None
    anchor: str

    @property
    def x(self) -> float:
        """Where the text hangs, for its anchor."""
        left, _, right, _ = self.box
        return left if self.anchor == "start" else right if self.anchor == "end" else (left + right) / 2.0

    @property
    def baseline(self) -> float:
        """Height of the baseline."""
        return self.box.top + SIZE * 0.98


HEIGHT = SIZE * LINE
DIRECTIONS = 16
DISTANCES = (4.0, 8.0, 13.0, 19.0, 28.0, 40.0, 56.0, 76.0, 100.0, 130.0, 165.0, 210.0, 270.0, 350.0, 460.0, 600.0)
LEADER_FROM = 19.0
RIM = 2.5
LEADER_GAP = 5.0
"""A leader ends this far from the point it leads to, so that it neither touches its line nor a dot."""
WORTH = 60.0
"""How far to look for a place whose leader crosses no line, once a place is known whose leader does."""


class Spot(NamedTuple):
    """A point, a direction from it (right and up) and how far off a label stands."""

    x: float
    y: float
    right: float
    up: float
    distance: float


@dataclass(slots=True)
class Placer:
    """Places labels one after the other, in the order given, around what is drawn already."""

    lines: list[Segment] = field(default_factory=list)
    taken: list[Box] = field(default_factory=list)
    bounds: Box | None = None

    def place(self, labels: Iterable[Label]) -> list[Placed]:
        """Every label where it is nearest to where it wants to be; each one finds a place, far out if need be."""
        return [self._place(label) for label in labels]

    def _place(self, label: Label) -> Placed:
        bounds: Sequence[Box | None] = (self.bounds, None) if self.bounds else (None,)
        wide = label.width
        for bound in bounds:
            second: tuple[Spot, Box] | None = None
            for spot in _spots(label):
                if second is not None and spot.distance > WORTH:
                    break
                box = _box(spot, wide)
                if not self._free(spot, box, bound):
                    continue
                if self._clear(spot, box):
                    return self._take(Placed(label, box, _leader(spot, box), _anchor(spot)))
                second = second or (spot, box)
            if second is not None:
                spot, box = second
                return self._take(Placed(label, box, _leader(spot, box), _anchor(spot)))
        x = max((box.right for box in self.taken), default=0.0) + 8.0
        x = max([x, *(max(line.x1, line.x2) + 8.0 for line in self.lines)])
        return self._take(Placed(label, Box(x, 0.0, x + label.width, HEIGHT), None, "start"))

    def _take(self, placed: Placed) -> Placed:
        self.taken.append(placed.box)
        if placed.leader is not None:
            self.lines.append(placed.leader)
        return placed

    def _clear(self, spot: Spot, box: Box) -> bool:
        """Whether the leader to a place crosses no line."""
        leader = _leader(spot, box)
        return leader is None or not any(leader.meets(line) for line in self.lines)

    def _free(self, spot: Spot, box: Box, bound: Box | None) -> bool:
        """Whether a place is free of labels and lines, and its leader of labels."""
        left, top, right, bottom = box
        if bound is not None and not (
            left >= bound.left and top >= bound.top and right <= bound.right and bottom <= bound.bottom
        ):
            return False
        for other in self.taken:
            if left < other.right + 1.0 and other.left < right + 1.0 and top < other.bottom + 1.0 and (other.top < bottom + 1.0):
                return False
        rim = Box(left - RIM, top - RIM, right + RIM, bottom + RIM)
        for line in self.lines:
            if line.crosses(rim):
                return False
        leader = _leader(spot, box)
        return leader is None or not any(leader.crosses(other) for other in self.taken)


def _spots(label: Label) -> Iterator[Spot]:
    """Places from the nearest outward; within a distance, by how little they turn from the preferred side."""
    aims = []
    for step in range(DIRECTIONS // 2 + 1):
        for x, y, preferred in label.at:
            for sign in (1, -1) if 0 < step < DIRECTIONS // 2 else (1,):
                angle = preferred + sign * step * 2.0 * math.pi / DIRECTIONS
                aims.append((x, y, round(math.cos(angle), 9), round(math.sin(angle), 9)))
    for distance in DISTANCES:
        for x, y, right, up in aims:
            yield Spot(x, y, right, up, distance)


def _box(spot: Spot, wide: float) -> Box:
    cx = spot.x + spot.right * (spot.distance + wide / 2.0)
    cy = spot.y - spot.up * (spot.distance + HEIGHT / 2.0)
    return Box(cx - wide / 2.0, cy - HEIGHT / 2.0, cx + wide / 2.0, cy + HEIGHT / 2.0)


def _leader(spot: Spot, box: Box) -> Segment | None:
    if spot.distance < LEADER_FROM:
        return None
    x, y = min(max(spot.x, box.left), box.right), min(max(spot.y, box.top), box.bottom)
    share = LEADER_GAP / max(math.hypot(x - spot.x, y - spot.y), LEADER_GAP)
    return Segment(spot.x + share * (x - spot.x), spot.y + share * (y - spot.y), x, y)


def _anchor(spot: Spot) -> str:
    return "start" if spot.right > 0.35 else "end" if spot.right < -0.35 else "middle"
