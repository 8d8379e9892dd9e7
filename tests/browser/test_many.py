"""Five hundred circuits: the page shows before it has been read to its end."""

from __future__ import annotations

from collections.abc import Callable
from pathlib import Path

import pytest
from playwright.sync_api import Browser

pytestmark = pytest.mark.xdist_group("chromium")

TIMES = """() => {
  const times = performance.getEntriesByType('navigation')[0];
  const paint = performance.getEntriesByName('first-contentful-paint')[0];
  return {paint: paint.startTime, read: times.domInteractive, whole: times.loadEventEnd,
          elements: document.getElementsByTagName('*').length};
}"""


def test_a_page_of_500_circuits_shows_before_it_is_read(
    browser: Browser, large: Path, record_property: Callable[[str, object], None]
) -> None:
    context = browser.new_context(viewport={"width": 1400, "height": 900})
    opened = context.new_page()
    opened.goto(large.as_uri())
    times = opened.evaluate(TIMES)
    size = large.stat().st_size
    for name, value in {**times, "bytes": size}.items():
        record_property(name, value)
    print(f"500 circuits: {size / 1e6:.1f} MB, {times['elements']} elements; first shown after {times['paint']:.0f} ms, "
          f"read after {times['read']:.0f} ms, whole after {times['whole']:.0f} ms")  # fmt: skip
    assert times["paint"] < times["read"]
    assert opened.locator(".circuit").count() == 500
    opened.fill("#words", "=R3-Y1.7")
    assert opened.inner_text("#shown").startswith("11 of 500 circuits shown")
    context.close()


def test_what_is_unfolded_but_out_of_sight_is_not_laid_out(browser: Browser, large: Path) -> None:
    context = browser.new_context(viewport={"width": 1400, "height": 900})
    opened = context.new_page()
    opened.goto(large.as_uri())
    opened.click("#unfold")
    assert opened.locator(".circuit[open]").count() == 500
    seen = "one => one.checkVisibility({contentVisibilityAuto: true})"
    shown = opened.evaluate(f"[...document.querySelectorAll('.sheet > h4:first-of-type')].filter({seen}).length")
    assert shown < 60
    context.close()
