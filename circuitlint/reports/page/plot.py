"""The frame of a plot: axes, round ticks, and where a pair of magnitudes lies."""

from __future__ import annotations

import itertools
from dataclasses import dataclass

from circuitlint.reports.page import svg
from circuitlint.reports.page.axes import step_of, tick_text, ticks, unit_of
from circuitlint.reports.page.labels import SIZE, Box, width_of


@dataclass(frozen=True, slots=True)
class Axis:
    """One axis: ends in the SI unit, what it shows, and in which dimension."""

    low: float
    high: float
    name: str
    dimension: str

    @property
    def worth(self) -> tuple[float, str]:
        """What one step of the printed number is worth, and the unit's symbol."""
        return unit_of(max(abs(self.low), abs(self.high)), self.dimension)

    def marks(self, most: int) -> list[tuple[float, str]]:
        """Magnitude and text of each tick."""
        factor, _ = self.worth
        low, high = self.low / factor, self.high / factor
        step = step_of(high - low, most)
        return [(value * factor, tick_text(value, step)) for value in ticks(low, high, most)]

    @property
    def title(self) -> str:
        """Name and unit. Not escaped."""
        unit = self.worth[1]
        return f"{self.name} in {unit}" if unit else self.name


@dataclass(frozen=True, slots=True)
class Frame:
    """A plot of `wide` by `high` pixels, its lower left corner at the origin of the drawing."""

    across: Axis
    up: Axis
    wide: float = 250.0
    high: float = 150.0

    def x(self, value: float) -> float:
        """Pixels to the right for a magnitude."""
        return self.wide * (value - self.across.low) / (self.across.high - self.across.low)

    def y(self, value: float) -> float:
        """Pixels downward for a magnitude, negative within the frame."""
        return -self.high * (value - self.up.low) / (self.up.high - self.up.low)

    def point(self, across: float, up: float) -> svg.Point:
        """Where a pair lies."""
        return self.x(across), self.y(up)

    @property
    def box(self) -> Box:
        """The frame itself."""
        return Box(0.0, -self.high, self.wide, 0.0)

    def draw(self) -> tuple[str, list[Box]]:
        """Frame, ticks and titles as markup, and the boxes of their words."""
        made = [svg.path([(0.0, -self.high), (0.0, 0.0), (self.wide, 0.0)], "axis")]
        boxes = []
        left = 0.0
        for value, words in self.up.marks(5):
            y = self.y(value)
            made.append(svg.line(-4.0, y, 0.0, y, "axis"))
            made.append(svg.text(-7.0, y + 0.35 * SIZE, words, anchor="end"))
            left = max(left, width_of(words))
            boxes.append(Box(-7.0 - width_of(words), y - 0.6 * SIZE, -7.0, y + 0.6 * SIZE))
        most = 6
        marks = self.across.marks(most)
        while most > 1 and _crowded([(self.x(value), words) for value, words in marks]):
            most -= 1
            marks = self.across.marks(most)
        for value, words in marks:
            x = self.x(value)
            made.append(svg.line(x, 0.0, x, 4.0, "axis"))
            made.append(svg.text(x, 6.0 + SIZE, words, anchor="middle"))
            half = width_of(words) / 2.0
            boxes.append(Box(x - half, 6.0, x + half, 9.0 + SIZE))
        top, bottom = -self.high - 12.0, 10.0 + 2.3 * SIZE
        made.append(svg.text(-left - 7.0, top, self.up.title, "name"))
        made.append(svg.text(self.wide, bottom, self.across.title, "name", "end"))
        boxes.append(Box(-left - 7.0, top - SIZE, width_of(self.up.title) - left - 7.0, top + 3.0))
        boxes.append(Box(self.wide - width_of(self.across.title), bottom - SIZE, self.wide, bottom + 3.0))
        return "".join(made), boxes


def _crowded(marks: list[tuple[float, str]]) -> bool:
    ends = [(x - width_of(words) / 2.0, x + width_of(words) / 2.0) for x, words in marks]
    return any(second[0] < first[1] + 6.0 for first, second in itertools.pairwise(ends))


def spread(values: list[float], rim: float = 0.08, from_zero: bool = False) -> tuple[float, float]:
    """Ends of an axis that holds the values with a rim on both sides, never of no length."""
    low, high = min(values), max(values)
    if from_zero:
        low, high = min(low, 0.0), max(high, 0.0)
    room = (high - low) * rim or abs(high) * 0.1 or 1.0
    low_rim = 0.0 if from_zero and low == 0.0 else room
    return low - low_rim, high + room
