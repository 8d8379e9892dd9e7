"""Triangles, regions, curves, one-line diagrams and margins are drawn to scale and say what they show."""

from __future__ import annotations

import math
import re

import pytest

from circuitlint.reports.page import margins
from circuitlint.reports.page.axes import round_below, step_of, tick_text, ticks, unit_of
from circuitlint.reports.page.curve import MOST_POINTS, curve_plot, thinned
from circuitlint.reports.page.oneline import MOST_PARTS, one_line
from circuitlint.reports.page.ranges import region_plot
from circuitlint.reports.page.triangles import impedance_triangle, power_triangle
from circuitlint.review import record as r
from tests.reports.page_reading import titles
from tests.reports.sample_record import circuits

BRAKE, PAIR, HOLDING, MIXED = circuits()[:4]
_SIDE = re.compile(r'data-side="(\w)" d="M(\S+) (\S+?)l(\S+) (\S+?)"')


def sides(drawing: str) -> dict[str, complex]:
    """The sides of a triangle in the unit of its quantity."""
    found = re.search(r'data-unit="([^"]+)"', drawing)
    assert found is not None
    unit = float(found[1])
    return {name: complex(float(dx), -float(dy)) * unit for name, _, _, dx, dy in _SIDE.findall(drawing)}


@pytest.mark.parametrize("circuit", [BRAKE, PAIR, MIXED], ids=lambda one: one.tag)
def test_the_triangles_measured_back_give_impedance_and_power(circuit: r.Circuit) -> None:
    known = {one.name: complex(one.real, one.imaginary) for one in circuit.phasors if not one.of}
    for drawing, whole, letters in (
        (impedance_triangle(circuit, "steady"), known["impedance"], "RXZ"),
        (power_triangle(circuit, "steady"), known["power"], "PQS"),
    ):
        found = sides(drawing)
        assert found[letters[0]] == pytest.approx(whole.real, rel=5e-4)
        assert found[letters[1]] == pytest.approx(1j * whole.imag, rel=5e-4)
        assert found[letters[2]] == pytest.approx(whole, rel=5e-4)


def test_power_and_impedance_triangles_are_similar() -> None:
    """S = I² · Z, so both triangles have the same angle (IEC 60050-131; value from memory)."""
    impedance, power = sides(impedance_triangle(MIXED, "steady")), sides(power_triangle(MIXED, "steady"))
    assert power["Q"].imag / power["P"].real == pytest.approx(impedance["X"].imag / impedance["R"].real, rel=1e-3)


def test_direct_current_has_no_triangle() -> None:
    assert impedance_triangle(HOLDING, "steady") == ""
    assert power_triangle(HOLDING, "steady") == ""


def region_of(circuit: r.Circuit, across: str) -> r.Region:
    return next(one for one in circuit.regions if one.across == across and one.state == "steady")


def test_a_region_shows_nominal_range_and_limits_in_words() -> None:
    drawing = region_plot(BRAKE, region_of(BRAKE, "current"))
    (name, told), = titles(drawing)  # fmt: skip
    assert name == "Worst-case region of =R3-Y1, steady: power factor over current"
    figures = {one.name: one for one in BRAKE.figures if not one.of and one.state == "steady"}
    assert f"current from {figures['current'].lowest:.4g} A to {figures['current'].highest:.4g} A" in told
    assert "limit current at most 2.35 A" in told
    assert "limit power factor at least 0.85, outside the picture" in told


def test_the_part_of_a_region_beyond_a_limit_is_marked() -> None:
    assert 'class="outside"' in region_plot(BRAKE, region_of(BRAKE, "current"))
    roomy = BRAKE.model_copy(update={"checks": ()})
    assert 'class="outside"' not in region_plot(roomy, region_of(roomy, "current"))


def test_the_corners_of_a_region_keep_their_ratios() -> None:
    """An affine map: differences of drawn corners stand in the ratios of the differences of the figures."""
    region = region_of(BRAKE, "current")
    found = re.search(r'class="region" d="M([^"]+)Z"', region_plot(BRAKE, region))
    assert found is not None
    drawn = [tuple(map(float, pair.split(" "))) for pair in found[1].split("L")]
    assert len(drawn) == len(region.points)
    for axis in (0, 1):
        figures, places = [point[axis] for point in region.points], [point[axis] for point in drawn]
        whole, spread = max(figures) - min(figures), max(places) - min(places)
        for figure, place in zip(figures, places, strict=True):
            share = (figure - min(figures)) / whole
            along = (place - min(places)) / spread
            assert (1.0 - along if axis else along) == pytest.approx(share, abs=2e-3)


@pytest.mark.parametrize("points", [(), ((2.0, 0.2),), ((2.0, 0.2), (2.1, 0.21)), ((math.nan, 1.0),)])
def test_a_region_of_few_points_is_drawn_or_left_out_but_never_fails(points: tuple[tuple[float, float], ...]) -> None:
    region = region_of(BRAKE, "current").model_copy(update={"points": points})
    drawn = region_plot(BRAKE, region)
    assert bool(drawn) is any(math.isfinite(x) for x, _ in points)


def test_the_curve_marks_its_farthest_point() -> None:
    curve = BRAKE.curves[0]
    peak = max(curve.values)
    (name, told), = titles(curve_plot(BRAKE, curve))  # fmt: skip
    assert name == "Switch-on current of =R3-Y1, switch-on"
    assert f"farthest {peak:.4g} A at 9.00 ms" in told


def test_thinning_keeps_ends_and_extremes() -> None:
    points = [(float(index), math.sin(index * 0.37) * (2.0 if index == 1234 else 1.0)) for index in range(5000)]
    kept = thinned(points)
    assert len(kept) <= MOST_POINTS
    assert kept[0] == points[0]
    assert kept[-1] == points[-1]
    assert max(kept, key=lambda one: abs(one[1])) == max(points, key=lambda one: abs(one[1]))
    assert kept == sorted(kept)


def test_the_one_line_diagram_tells_its_tree() -> None:
    (name, told), = titles(one_line(MIXED))  # fmt: skip
    assert name == "One-line diagram of =R3-L7"
    for word in ("supply, shore, 230 V +10/-6 %", "cable", "meter, in-line, range 10 A", "coil, choke, 9 ohm, 0.11 H"):
        assert word in told
    assert "parallel (resistor, heater, 150 ohm; series (resistor, 47 ohm; capacitor, 10 uF); coil, valve" in told


def test_a_tree_too_large_to_draw_is_listed_whole() -> None:
    leaves = tuple(r.Element(of=f"p{index}", kind="coil", label=f"coil {index}") for index in range(MOST_PARTS + 1))
    listed = one_line(BRAKE.model_copy(update={"tree": r.Element(of="", kind="parallel", parts=leaves)}))
    assert listed.startswith("<ul")
    assert all(f"coil {index}<" in listed for index in range(MOST_PARTS + 1))


def test_a_kind_that_a_plugin_brought_gets_a_plain_box_with_its_words() -> None:
    tree = r.Element(of="load.soft-starter", kind="soft-starter", label="ramp", values=("12 s",))
    drawn = one_line(BRAKE.model_copy(update={"tree": tree}))
    assert ">soft starter, ramp</text>" in drawn
    assert ">12 s</text>" in drawn


def test_margins_stand_on_one_scale() -> None:
    """The limit in the middle; a margin twice as large stands twice as far from it."""
    middle = margins.x_of(0.0)
    assert middle == pytest.approx(margins.WIDE / 2.0)
    assert margins.x_of(0.5) - middle == pytest.approx(2.0 * (margins.x_of(0.25) - middle))
    assert margins.x_of(-0.5) == pytest.approx(2.0 * middle - margins.x_of(0.5))
    found = re.search(r'class="dot bad" cx="(\S+)"', margins.bar(-0.4, 0.1, True))
    assert found is not None
    assert float(found[1]) == pytest.approx(margins.x_of(-0.4, margins.SMALL_WIDE), abs=0.05)


def test_a_margin_off_the_scale_ends_in_an_arrowhead() -> None:
    for value, head in ((-3.0, 'd="M0 8l6'), (5.0, f'd="M{margins.SMALL_WIDE:.0f} 8l-6')):
        assert head in margins.bar(value, None, value < 0.0)
        assert "dot" not in margins.bar(value, None, value < 0.0)
    assert 'd="M0 8l6' in margins.strip([0.1], [-4.0])


def test_every_margin_of_a_rule_has_its_stroke() -> None:
    drawn = margins.strip([0.05, 0.5, 0.9], [-0.2])
    assert len(re.findall(r"M[\d.]+ 3v10", drawn)) == 4
    assert drawn.count('class="stroke bad"') == 1


@pytest.mark.parametrize(
    ("span", "most", "step"),
    [(10.0, 5, 2.0), (1.0, 4, 0.5), (0.03, 3, 0.01), (7.0, 7, 1.0), (95.0, 5, 20.0), (0.0, 5, 1.0), (math.inf, 5, 1.0)],
)
def test_steps_are_round_and_few(span: float, most: int, step: float) -> None:
    assert step_of(span, most) == pytest.approx(step)


@pytest.mark.parametrize(("value", "below"), [(1.0, 1.0), (1.9, 1.0), (2.0, 2.0), (4.99, 2.0), (73.0, 50.0), (0.3, 0.2)])
def test_scale_bars_are_round(value: float, below: float) -> None:
    assert round_below(value) == pytest.approx(below)


def test_ticks_lie_between_the_ends_and_print_with_the_digits_of_their_step() -> None:
    assert ticks(0.91, 1.04, 5) == pytest.approx([0.95, 1.0])
    assert [tick_text(value, 0.05) for value in (0.95, 1.0, -0.05, 0.0)] == ["0.95", "1.00", "−0.05", "0"]


@pytest.mark.parametrize(
    ("largest", "dimension", "expected"),
    [
        (0.5, "current", (1e-3, "mA")),
        (1500.0, "active power", (1e3, "kW")),
        (0.02, "time", (1e-3, "ms")),
        (0.9, "ratio", (1.0, "")),
        (90.0, "temperature", (1.0, "°C")),
        (1.0, "angle", (math.pi / 180.0, "°")),
        (3.0, "a dimension of a plugin", (1.0, "a dimension of a plugin")),
    ],
)
def test_an_axis_is_read_in_a_unit_that_suits_it(largest: float, dimension: str, expected: tuple[float, str]) -> None:
    factor, symbol = unit_of(largest, dimension)
    assert factor == pytest.approx(expected[0])
    assert symbol == expected[1]
