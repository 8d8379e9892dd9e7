"""The calculation sheet: every figure can be followed from what was put in to its source."""

from __future__ import annotations

from hypothesis import given, settings
from hypothesis import strategies as st

from circuitlint.reports.sheet import render_figures
from circuitlint.reports.terminal import columns
from circuitlint.review import record as r
from tests.reports.arbitrary import records as any_record
from tests.reports.records import hostile, mixed

SHEET = render_figures(mixed(), ("=R3-Y1",))


def flowing(text: str) -> str:
    return " ".join(text.split())


def test_a_figure_shows_equation_numbers_result_range_and_source() -> None:
    text = flowing(SHEET)
    # 21 Ω and 113.1 Ω at right angles: sqrt(441 + 12791.61) = 115.03 by the theorem of Pythagoras, four digits printed.
    assert "Z = √(R² + X²) [1] = √((21.00 Ω)² + (113.1 Ω)²) = 115.0 Ω" in text
    assert "from 103.5 Ω to 126.5 Ω, moved most by its inductance" in text
    assert "with R: its resistance; X: reactance" in text
    assert "[1] Z = √(R² + X²) Ohm's law for rms magnitudes (derived) validity: steady sinusoidal state" in text


def test_a_stated_datum_and_a_noted_figure_read_as_such() -> None:
    assert "resistance 21.00 Ω from 19.95 Ω to 22.05 Ω" in flowing(SHEET)
    assert "= 90.10 W / 498.2 VA = 0.1809 lagging" in flowing(SHEET)


def test_phasors_put_in_show_magnitude_and_angle() -> None:
    # 1.387 rad is 79.47 degrees (180 / π).
    assert "Σ [1.210 Ω ∠ 0°; 115.0 Ω ∠ 79.47°] = 116.4 Ω" in flowing(SHEET)


def test_figures_stand_by_state_and_part() -> None:
    order = [SHEET.index(word) for word in ("STEADY", "  load.coil", "  circuit", "SWITCH-ON")]
    assert order == sorted(order)


def test_only_the_tags_asked_for_are_told_and_all_without_a_tag() -> None:
    assert "=R3-Y2" not in SHEET
    assert all(one.tag in render_figures(mixed()) for one in mixed().circuits)


def test_a_circuit_that_was_not_solved_says_so() -> None:
    assert "not solved: temperatures do not settle" in render_figures(mixed(), ("=R3-Y7",))


def test_hostile_text_is_shown_and_does_nothing() -> None:
    text = render_figures(hostile())
    assert all(line.isprintable() for line in text.splitlines())
    assert "\\x1b[2J" in text


@settings(max_examples=40)
@given(any_record(2), st.integers(60, 140))
def test_no_line_leaves_the_page(one: r.Record, width: int) -> None:
    for line in render_figures(one, (), width).splitlines():
        assert columns(line) <= width
        assert line.isprintable()
