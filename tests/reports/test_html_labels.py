"""No label of a drawing covers another, a line, or a leader: computed on many drawings."""

from __future__ import annotations

import itertools
import math
import random
import re

import pytest

from circuitlint.reports.page.curve import curve_plot
from circuitlint.reports.page.labels import HEIGHT, SIZE, SUBSCRIPT, Box, Label, Placed, Placer, Segment, width_of
from circuitlint.reports.page.oneline import one_line, word_boxes
from circuitlint.reports.page.phasor import phasor_diagram
from circuitlint.reports.page.ranges import region_plot
from circuitlint.reports.page.triangles import impedance_triangle, power_triangle
from circuitlint.review import record as r
from tests.reports import sample_circuits as s
from tests.reports.sample_circuits import switch_on
from tests.reports.sample_parts import BATTERY, FEED, circuit
from tests.reports.sample_record import circuits

_TEXT = re.compile(r'<text(?: class="\w+")? x="(\S+)" y="(\S+)"(?: text-anchor="(\w+)")?>(.*?)</text>')
_PATH = re.compile(r'<path class="([^"]*)"[^>]* d="([^"]*)"/>')
_STEP = re.compile(r"([MLl])(\S+?) ([^MLlZ\s]+)")


def text_boxes(drawing: str) -> list[tuple[str, Box]]:
    """Every text of a drawing with the box it takes, measured as the placer measures."""
    found = []
    for x, y, anchor, inner in _TEXT.findall(drawing):
        words = re.sub(r"<.*?>", "", inner)
        small = "".join(re.findall(r"<tspan[^>]*font-size[^>]*>(.*?)</tspan>", inner))
        wide = width_of(words) - width_of(small) * (1.0 - SUBSCRIPT)
        left = float(x) - (wide if anchor == "end" else wide / 2.0 if anchor == "middle" else 0.0)
        found.append((words, Box(left, float(y) - SIZE * 0.98, left + wide, float(y) - SIZE * 0.98 + HEIGHT)))
    return found


def lines(drawing: str) -> list[Segment]:
    """Every straight line of a drawing that is a phasor, a side, an axis or a leader."""
    found = []
    for kind, path in _PATH.findall(drawing):
        if kind.split()[0] not in ("ph", "side", "leader", "axis") or "tip" in kind:
            continue
        points: list[tuple[float, float]] = []
        for step, x, y in _STEP.findall(path):
            start = points[-1] if step == "l" else (0.0, 0.0)
            points.append((start[0] + float(x), start[1] + float(y)))
        found += [Segment(*one, *other) for one, other in itertools.pairwise(points)]
    return found


def overlaps(boxes: list[tuple[str, Box]]) -> list[tuple[str, str]]:
    """Pairs of texts whose boxes share area."""
    return [
        (one[0], other[0]) for index, one in enumerate(boxes) for other in boxes[index + 1 :] if one[1].overlaps(other[1], -0.2)
    ]


def crossed(drawing: str) -> list[tuple[str, Segment]]:
    """Texts that a phasor, a side or a leader runs through; the rim by which a leader touches its own label left out."""
    return [(words, line) for words, box in text_boxes(drawing) for line in lines(drawing) if line.crosses(box.grown(-1.0))]


def random_load(chance: random.Random, depth: int = 0) -> s.Load:
    """A load tree of random shape and values."""
    if depth < 3 and chance.random() < (0.9, 0.5, 0.25)[depth]:
        kind = chance.choice(("series", "parallel"))
        return s.Group(kind, tuple(random_load(chance, depth + 1) for _ in range(chance.randint(2, 4))))
    kind = chance.choice(("coil", "coil", "resistor", "capacitor"))
    size = 10.0 ** chance.uniform(-1.0, 3.0)
    words = (f"{size:.3g} of something",) * chance.randint(0, 4)
    if kind == "coil":
        return s.Leaf(kind, "brake magnet", words, size, size * 10.0 ** chance.uniform(-4.0, -1.0), spread=0.1)
    if kind == "resistor":
        return s.Leaf(kind, "", words, size)
    return s.Leaf(kind, "correction", words, capacitance=10.0 ** chance.uniform(-7.0, -4.0))


def random_circuit(seed: int) -> r.Circuit:
    """A circuit of random shape; no figures or checks, which take long to make and are not drawn here."""
    chance = random.Random(seed)
    load = random_load(chance)
    cable = complex(10.0 ** chance.uniform(-4.0, 1.0), 10.0 ** chance.uniform(-5.0, 0.0))
    case = s.solve(load, 230.0, 50.0, cable, {})
    parts = (r.Element(of="cable[0]", kind="cable", values=("1.5 mm2, 42 m",)), s.tree(load, "load"))
    return circuits()[0].model_copy(
        update={
            "tree": r.Element(of="", kind="supply", label="shore", values=("230 V",), parts=parts),
            "phasors": s.phasors(case, load, "steady"),
            "regions": (),
        }
    )


@pytest.mark.parametrize("block", range(10))
def test_no_label_of_a_random_phasor_diagram_covers_anything(block: int) -> None:
    for seed in range(block * 30, block * 30 + 30):
        drawing = phasor_diagram(random_circuit(seed), "steady", "current" if seed % 2 else "voltage")
        assert drawing
        assert overlaps(text_boxes(drawing)) == [], seed
        assert crossed(drawing) == [], seed


@pytest.mark.parametrize("block", range(5))
def test_no_label_of_a_random_triangle_covers_anything(block: int) -> None:
    for seed in range(block * 40, block * 40 + 40):
        one = random_circuit(seed)
        for drawing in (impedance_triangle(one, "steady"), power_triangle(one, "steady")):
            assert drawing
            assert overlaps(text_boxes(drawing)) == [], seed
            assert crossed(drawing) == [], seed


@pytest.mark.parametrize("seed", range(60))
def test_no_words_of_a_random_one_line_diagram_cover_others(seed: int) -> None:
    one = random_circuit(seed)
    boxes = word_boxes(one)
    assert overlaps([(str(index), box) for index, box in enumerate(boxes)]) == []
    assert len(boxes) == len(re.findall("<text", one_line(one))) - len(re.findall('<text class="in"', one_line(one)))


@pytest.mark.parametrize("seed", range(40))
def test_no_label_of_a_random_region_or_curve_covers_another(seed: int) -> None:
    chance = random.Random(seed)
    spread = 10.0 ** chance.uniform(-4.0, -0.3)
    coil = s.Leaf("coil", "", (), 10.0 ** chance.uniform(0.0, 3.0), 10.0 ** chance.uniform(-3.0, 0.5), spread=spread)
    feed = FEED if seed % 2 else BATTERY
    curve = switch_on(feed.voltage, feed.frequency, coil.resistance, coil.inductance)
    limits = tuple(
        (rule, name, sense, r.LimitRecord(name="l", value=value, dimension=dimension, path="", set_by="", source="practice"))
        for rule, name, sense, value, dimension in (
            ("meter-range", "current", "at most", feed.voltage / coil.resistance * chance.uniform(0.2, 1.5), "current"),
            ("minimum-power-factor", "power-factor", "at least", chance.uniform(0.05, 0.95), "ratio"),
        )
        if name == "current" or feed.frequency
    )
    one = circuit("=X1", "", coil, feed, 3, "single-phase" if feed.frequency else "dc", curve, limits)
    drawn = [region_plot(one, region) for region in one.regions] + [curve_plot(one, curve)]
    assert all(drawn)
    for drawing in drawn:
        assert overlaps(text_boxes(drawing)) == []
    assert crossed(drawn[-1]) == []


def test_labels_find_a_place_even_where_there_is_none_nearby() -> None:
    """A hundred labels wanted at one point all stand, apart from each other."""
    placer = Placer([Segment(-50.0, 0.0, 50.0, 0.0)], bounds=Box(-60.0, -60.0, 60.0, 60.0))
    placed = placer.place([Label("U", "R", f" {number} V", ((0.0, 0.0, 0.0),)) for number in range(100)])
    boxes = [(str(index), one.box) for index, one in enumerate(placed)]
    assert overlaps(boxes) == []
    assert not any(line.crosses(box) for line in placer.lines[:1] for _, box in boxes)


def test_a_label_stands_beside_its_point_and_far_ones_have_a_leader() -> None:
    near = Placer().place([Label("U", at=((10.0, 20.0, 0.0),))])[0]
    assert near.leader is None
    assert near.anchor == "start"
    assert near.box.left == pytest.approx(14.0)
    wall = [Segment(x, -60.0, x, 60.0) for x in range(-30, 31, 3)]
    far = Placer(list(wall)).place([Label("U", at=((0.0, 0.0, 0.0),))])[0]
    assert isinstance(far, Placed)
    assert far.leader is not None


@pytest.mark.parametrize(
    ("segment", "expected"),
    [
        (Segment(0.0, 5.0, 10.0, 5.0), True),
        (Segment(0.0, 0.0, 10.0, 10.0), True),
        (Segment(5.0, 5.0, 6.0, 6.0), True),
        (Segment(0.0, 0.0, 10.0, 1.0), False),
        (Segment(0.0, 12.0, 10.0, 2.0), True),
        (Segment(0.0, 3.9, 2.1, 0.0), False),
        (Segment(0.0, 2.0, 10.0, 2.0), False),
    ],
)  # fmt: skip
def test_a_line_crosses_a_box_only_where_some_of_it_lies_inside(segment: Segment, expected: bool) -> None:
    assert segment.crosses(Box(2.0, 2.0, 8.0, 8.0)) is expected


def test_widths_are_on_the_wide_side_of_common_faces() -> None:
    """Advance widths of a wide sans-serif face in thousandths of an em: digit 636, m 974, W 989, i 278 (value from memory)."""
    for character, thousandths in (("0", 636), ("m", 974), ("W", 989), ("i", 278), ("Ω", 764), ("U", 732)):
        assert width_of(character, 1.0) >= thousandths / 1000.0
    assert width_of("漢", 1.0) >= 1.0
    assert math.isclose(width_of("0" * 10, SIZE), 10.0 * width_of("0", SIZE))
