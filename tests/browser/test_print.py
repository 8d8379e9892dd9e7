"""The page on paper: A4, whole without its script, a circuit on a sheet of its own."""

from __future__ import annotations

import re
from pathlib import Path

import pytest
from playwright.sync_api import Browser, Page

pytestmark = pytest.mark.xdist_group("chromium")

A4 = (595.0, 842.0)


def sheets(printed: bytes) -> list[tuple[float, float]]:
    """Width and height of every sheet of a printed file, in points."""
    boxes = re.findall(rb"/MediaBox\s*\[\s*0 0 ([\d.]+) ([\d.]+)\s*\]", printed)
    return [(float(wide), float(high)) for wide, high in boxes]


def test_it_prints_to_a4(wide: Page, pictures: Path) -> None:
    file = pictures / "page.pdf"
    printed = wide.pdf(path=str(file), prefer_css_page_size=True)
    found = sheets(printed)
    assert len(found) > 6
    assert all(abs(w - A4[0]) < 1.5 and abs(h - A4[1]) < 1.5 for w, h in found)


def test_it_prints_whole_without_its_script(browser: Browser, small: Path) -> None:
    counts = []
    for script in (True, False):
        context = browser.new_context(java_script_enabled=script)
        opened = context.new_page()
        opened.goto(small.as_uri())
        counts.append(len(sheets(opened.pdf(prefer_css_page_size=True))))
        context.close()
    assert counts[0] == counts[1]


def test_only_circuits_that_are_shown_are_printed(wide: Page) -> None:
    before = len(sheets(wide.pdf(prefer_css_page_size=True)))
    wide.select_option("#which", "held")
    after = len(sheets(wide.pdf(prefer_css_page_size=True)))
    assert after <= before - 5


def test_the_calculation_sheets_can_be_left_out_of_the_print(wide: Page) -> None:
    before = len(sheets(wide.pdf(prefer_css_page_size=True)))
    wide.uncheck("#sheets")
    assert len(sheets(wide.pdf(prefer_css_page_size=True))) < before


def test_controls_and_contents_stay_off_paper_and_everything_folded_is_unfolded(wide: Page) -> None:
    wide.emulate_media(media="print")
    for hidden in ("nav", "#find", "#severities"):
        assert not wide.locator(hidden).first.is_visible()
    seen = wide.evaluate(
        "[...document.querySelectorAll('.circuit .checks, .state .calc, .more table')]"
        ".map(one => one.getBoundingClientRect().height)"
    )
    assert len(seen) > 10
    assert min(seen) > 10.0


def test_nothing_is_cut_off_at_the_right_edge_of_the_paper(wide: Page) -> None:
    """A4 less the margins of the page style is 184 mm, 695 pixels at 96 to the inch."""
    wide.emulate_media(media="print")
    wide.set_viewport_size({"width": 695, "height": 1000})
    assert wide.evaluate("document.documentElement.scrollWidth") <= 695
