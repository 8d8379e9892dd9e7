"""Contrast of the page's colours, by the formula of WCAG 2.2, and marks that do not lean on colour."""

from __future__ import annotations

import re
from importlib import resources

import pytest

from circuitlint.reports.html import render
from circuitlint.reports.page.marks import mark, shapes
from tests.reports.sample_record import sample_record

STYLE = resources.files("circuitlint.reports.page").joinpath("page.css").read_text(encoding="utf-8")
COLOURS = dict(re.findall(r"--(\w[\w-]*): (#[0-9a-f]{3,6});", STYLE))
TEXT, GRAPHIC = 4.5, 3.0


def luminance(colour: str) -> float:
    """Relative luminance of an sRGB colour (WCAG 2.2, definition of relative luminance)."""
    digits = colour[1:] if len(colour) == 7 else "".join(one * 2 for one in colour[1:])
    parts = [int(digits[at : at + 2], 16) / 255.0 for at in (0, 2, 4)]
    red, green, blue = (part / 12.92 if part <= 0.04045 else ((part + 0.055) / 1.055) ** 2.4 for part in parts)
    return 0.2126 * red + 0.7152 * green + 0.0722 * blue


def contrast(one: str, other: str) -> float:
    """Contrast ratio (WCAG 2.2, definition of contrast ratio)."""
    light, dark = sorted((luminance(one), luminance(other)), reverse=True)
    return (light + 0.05) / (dark + 0.05)


@pytest.mark.parametrize(
    ("one", "other", "ratio"), [("#000", "#fff", 21.0), ("#767676", "#ffffff", 4.54), ("#777", "#fff", 4.48)]
)
def test_the_formula_gives_known_ratios(one: str, other: str, ratio: float) -> None:
    """Black on white by definition; the greys on either side of 4.5:1 are value from memory."""
    assert contrast(one, other) == pytest.approx(ratio, abs=0.005)


@pytest.mark.parametrize("back", ["paper", "shade", "ground", "accent-shade"])
@pytest.mark.parametrize("text", ["ink", "soft", "accent"])
def test_every_colour_of_text_stands_out_from_every_ground(text: str, back: str) -> None:
    assert contrast(COLOURS[text], COLOURS[back]) >= TEXT


@pytest.mark.parametrize("line", ["line", "ink", "accent"])
def test_every_line_that_means_something_stands_out(line: str) -> None:
    assert contrast(COLOURS[line], COLOURS["paper"]) >= GRAPHIC


def test_text_takes_no_colour_beside_the_tested_ones() -> None:
    used = set(re.findall(r"(?<![-\w])(?:color|fill): ([^;}]+)", STYLE))
    tokens = {f"var(--{name})" for name in ("ink", "soft", "accent", "paper", "line", "hair")}
    allowed = {"inherit", "none", "currentColor", COLOURS["soft"], "url(#hatch)", "url(#hatch-beyond)"}
    assert used <= tokens | allowed


def test_every_mark_has_its_word_and_a_shape_of_its_own() -> None:
    drawn = re.findall(r'<symbol id="m-([\w-]+)"[^>]*>(.*?)</symbol>', shapes())
    assert len({shape for _, shape in drawn}) == len(drawn) == 10
    for name, _ in drawn:
        assert mark(name.replace("-", " ")).endswith(f"</svg>{name.replace('-', ' ')}</span>")


def test_every_mark_on_the_page_is_drawn_and_hidden_from_readers_who_hear_the_word() -> None:
    page = render(sample_record())
    used = set(re.findall(r'<use href="#(m-[\w-]+)"', page))
    assert used <= set(re.findall(r'<symbol id="([\w-]+)"', page))
    assert page.count('<svg class="m" aria-hidden="true">') == page.count('<use href="#m-')
