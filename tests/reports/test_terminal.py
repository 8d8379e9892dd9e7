"""Text on a terminal stays in its place, whatever a definition says."""

from __future__ import annotations

import pytest
from hypothesis import given
from hypothesis import strategies as st

from circuitlint.reports.terminal import Paint, clipped, columns, equation, listed, printable, prose, rows, wrapped
from tests.reports.arbitrary import TEXTS

# ECMA-48 (1991), 5.3 and 5.4: the C0 set, delete, and the C1 set. Unicode Standard Annex 9, table 3: characters that
# steer the direction of writing.
CONTROLS = [chr(code) for code in (*range(0x20), *range(0x7F, 0xA0))]
DIRECTION = list("\u061c\u200e\u200f\u202a\u202b\u202c\u202d\u202e\u2066\u2067\u2068\u2069")


@pytest.mark.parametrize("character", [*CONTROLS, *DIRECTION, "\u2028", "\u2029", "\ufeff", "\u00ad", "\u200b"])
def test_a_character_that_steers_is_shown_by_its_escape(character: str) -> None:
    shown = printable(f"a{character}b")
    assert character not in shown
    assert shown.startswith("a\\")
    assert shown.isprintable()
    assert shown != printable("ab"), "what was there can be seen"


def test_ordinary_text_stays_as_it_is() -> None:
    for text in ("=R3-Y1", "Größe ≤ 5 %", "線圈", "√(R² + X²)", "e\u0301"):
        assert printable(text) == text


def test_running_text_has_no_line_of_its_own_making() -> None:
    assert prose(" two\nlines\tand a\r\ntab \x1b[0m") == "two lines and a tab \\x1b[0m"


def test_wide_characters_take_two_columns_and_combining_ones_none() -> None:
    # Unicode Standard Annex 11: W and F are two columns wide; U+7DDA is W, U+FF21 is F, U+0301 combines.
    assert columns("線") == 2
    assert columns("\uff21") == 2
    assert columns("e\u0301") == 1
    assert clipped("線圈線圈", 5) == "線圈…"
    assert clipped("線圈", 4) == "線圈"


@given(TEXTS, st.integers(8, 120))
def test_a_wrapped_line_never_leaves_the_page_and_loses_nothing(text: str, width: int) -> None:
    shown = printable(text)
    lines = wrapped(shown, width)
    assert all(columns(line) <= width for line in lines)
    assert "".join("".join(lines).split(" ")) == "".join(shown.split(" "))


@given(TEXTS, st.integers(0, 60))
def test_clipped_text_fits_and_shows_that_it_was_clipped(text: str, width: int) -> None:
    shown = clipped(printable(text), width)
    assert columns(shown) <= max(width, 1)
    assert shown == printable(text) or shown.endswith("…")


def test_a_number_keeps_its_unit_and_its_uncertainty_on_the_line() -> None:
    assert wrapped("the voltage is 230 V", 18) == ["the voltage is", "230 V"]
    assert wrapped("in a share of 31.0 ± 0.5 % of it", 20) == ["in a share of", "31.0 ± 0.5 % of it"]


def test_an_equation_breaks_before_an_equals_sign() -> None:
    text = "Z = √(R² + X²) = √((21.00 Ω)² + (113.1 Ω)²) = 115.0 Ω"
    assert equation(text, 60) == [text]
    assert equation(text, 45) == ["Z = √(R² + X²) = √((21.00 Ω)² + (113.1 Ω)²)", "= 115.0 Ω"]
    assert equation(text, 34) == ["Z = √(R² + X²)", "= √((21.00 Ω)² + (113.1 Ω)²)", "= 115.0 Ω"]


@given(st.lists(TEXTS, max_size=6), st.integers(10, 60))
def test_a_list_breaks_between_its_items_and_stays_on_the_page(items: list[str], width: int) -> None:
    assert all(columns(line) <= width + 1 for line in listed(map(printable, items), width))
    assert listed(["=R3-Y1", "=R3-Y2", "=R3-Y3"], 16) == ["=R3-Y1, =R3-Y2,", "=R3-Y3"]


def test_rows_align_at_the_right_and_a_long_name_gets_its_own_line() -> None:
    assert rows([("a", "1.0", "x"), ("bb", "22.0", "yy")], 40, 2) == ["  a    1.0   x", "  bb  22.0  yy"]
    assert rows([("a long name of a part", "1.0"), ("b", "22.0")], 16, 0) == [
        "a long name of", "  a part", "             1.0", "b           22.0",
    ]  # fmt: skip


def test_colour_is_an_extra_and_never_the_only_sign() -> None:
    on, off = Paint(True), Paint(False)
    for word in ("major", "minor", "observation", "held", "clear"):
        assert off.word(word) == word
        assert on.word(word) != word
        assert word in on.word(word)
