"""The page in a browser: it looks right at both widths, works without its script, by keyboard, and asks for nothing."""

from __future__ import annotations

from pathlib import Path

import pytest
from playwright.sync_api import Browser, Page

pytestmark = pytest.mark.xdist_group("chromium")

UNFOLD = "document.querySelectorAll('details').forEach(one => { one.open = true })"


def test_nothing_is_wider_than_the_screen_folded_or_unfolded(page: Page) -> None:
    wide = page.viewport_size["width"] if page.viewport_size else 0
    assert page.evaluate("document.documentElement.scrollWidth") <= wide
    page.evaluate(UNFOLD)
    assert page.evaluate("document.documentElement.scrollWidth") <= wide


def test_pictures_of_the_page_are_made(page: Page, pictures: Path) -> None:
    wide = page.viewport_size["width"] if page.viewport_size else 0
    page.evaluate("document.querySelector('.circuit').open = true")
    page.screenshot(path=str(pictures / f"page-{wide}-top.png"))
    high = page.evaluate("document.documentElement.scrollHeight")
    page.set_viewport_size({"width": wide, "height": min(high + 2000, 15_000)})
    page.wait_for_timeout(200)
    page.screenshot(path=str(pictures / f"page-{wide}-whole.png"))
    page.locator(".circuit").first.screenshot(path=str(pictures / f"page-{wide}-circuit.png"))
    for name in ("top", "whole", "circuit"):
        assert (pictures / f"page-{wide}-{name}.png").stat().st_size > 20_000


def test_the_page_asks_for_nothing_but_itself_and_complains_of_nothing(browser: Browser, small: Path) -> None:
    context = browser.new_context()
    opened = context.new_page()
    asked: list[str] = []
    said: list[str] = []
    opened.on("request", lambda request: asked.append(request.url))
    opened.on("console", lambda message: said.append(message.text))
    opened.on("pageerror", lambda error: said.append(str(error)))
    opened.goto(small.as_uri())
    opened.evaluate(UNFOLD)
    opened.wait_for_timeout(200)
    context.close()
    assert asked == [small.as_uri()]
    assert said == []


def test_hostile_words_run_nothing(wide: Page) -> None:
    assert wide.evaluate("document.scripts.length") == 1
    assert wide.evaluate("document.images.length") == 0
    told: list[str] = []
    wide.on("dialog", lambda dialog: told.append(dialog.message))
    wide.evaluate(UNFOLD)
    wide.wait_for_timeout(100)
    assert told == []
    assert wide.locator(".circuit h3").nth(4).text_content() == "=X<1>\"&'‹U+202E›9Y-‹U+2066›‹U+001B›[31m"


def test_the_page_reads_without_its_script(browser: Browser, small: Path) -> None:
    context = browser.new_context(java_script_enabled=False)
    opened = context.new_page()
    opened.goto(small.as_uri())
    assert not opened.locator("#find").is_visible()
    assert not opened.locator("#severities").is_visible()
    assert opened.locator(".finding").count() == 7
    opened.locator(".circuit summary").first.click()
    assert opened.locator(".circuit .phasor").first.is_visible()
    context.close()


def test_a_finding_leads_to_its_circuit_and_unfolds_it(wide: Page) -> None:
    assert wide.locator(".circuit[open]").count() == 0
    wide.locator(".finding a").first.click()
    assert wide.locator(".circuit[open]").count() == 1
    assert wide.locator(".circuit[open] h3").inner_text() == "=R3-Y1"


def test_the_keyboard_reaches_findings_and_circuits(wide: Page) -> None:
    wide.keyboard.press("Tab")
    assert wide.evaluate("document.activeElement.textContent") == "Skip to the findings"
    assert wide.locator(".skip").bounding_box()["width"] > 50  # type: ignore[index]
    wide.keyboard.press("Enter")
    assert wide.evaluate("location.hash") == "#findings"
    wide.locator(".circuit > summary").nth(1).focus()
    wide.keyboard.press("Enter")
    assert wide.locator(".circuit").nth(1).get_attribute("open") is not None


def test_finding_and_choosing_circuits(wide: Page) -> None:
    shown = wide.locator(".circuit:not([hidden]) h3")
    wide.fill("#words", "BRAKE")
    assert shown.all_inner_texts() == ["=R3-Y1", "=R3-Y2"]
    assert "2 of 6 circuits shown" in wide.inner_text("#shown")
    wide.fill("#words", "")
    wide.select_option("#which", "held")
    assert shown.all_inner_texts() == ["=R3-Y1"]
    wide.select_option("#which", "open")
    assert shown.all_inner_texts() == ["=R3-Y1", "=R3-K5", "=R3-M9"]
    wide.select_option("#which", "clear")
    assert len(shown.all_inner_texts()) == 5


def test_putting_circuits_in_order(wide: Page) -> None:
    shown = wide.locator(".circuit h3")
    given = shown.all_inner_texts()
    wide.select_option("#order", "margin")
    assert shown.all_inner_texts()[:3] == ["=R3-Y1", "=R3-Y2", "=R3-L7"]
    assert shown.all_inner_texts()[-1] == "=R3-M9"
    wide.select_option("#order", "findings")
    assert shown.all_inner_texts()[0] == "=R3-Y1"
    wide.select_option("#order", "tag")
    assert shown.all_inner_texts()[:2] == ["=R3-K5", "=R3-L7"]
    wide.select_option("#order", "given")
    assert shown.all_inner_texts() == given


def test_findings_are_shown_by_severity(wide: Page) -> None:
    wide.uncheck("#severities input[value=minor]")
    assert wide.locator(".finding:not([hidden])").count() == 3
    assert "3 of 7 findings shown" in wide.inner_text("#found")
    wide.check("#severities input[value=minor]")
    assert wide.locator(".finding:not([hidden])").count() == 7


def test_unfolding_all_shown(wide: Page) -> None:
    wide.select_option("#which", "held")
    wide.click("#unfold")
    assert wide.locator(".circuit[open]").count() == 1
    wide.click("#unfold")
    assert wide.locator(".circuit[open]").count() == 0


BOXES = """() => [...document.querySelectorAll('svg.draw')].map(svg => {
  const view = svg.viewBox.baseVal, name = svg.querySelector('title').textContent;
  const to = svg.getScreenCTM().inverse();
  const boxes = [...svg.querySelectorAll('text')].map(text => {
    const box = text.getBBox(), m = to.multiply(text.getScreenCTM());
    return [text.textContent, box.x + m.e, box.y + m.f, box.x + m.e + box.width, box.y + m.f + box.height];
  });
  return [name, [view.x, view.y, view.x + view.width, view.y + view.height], boxes];
})"""


def test_the_rendered_words_of_every_drawing_keep_apart_and_within_it(wide: Page) -> None:
    wide.evaluate(UNFOLD)
    drawings = wide.evaluate(BOXES)
    assert len(drawings) > 20
    for name, (left, top, right, bottom), boxes in drawings:
        for words, x1, y1, x2, y2 in boxes:
            assert left <= x1, (name, words)
            assert x2 <= right, (name, words)
            assert top <= y1 + 3.0, (name, words)
            assert y2 <= bottom + 3.0, (name, words)
        for index, (words, x1, y1, x2, y2) in enumerate(boxes):
            for others, a1, b1, a2, b2 in boxes[index + 1 :]:
                # A glyph box holds room for accents above and tails below that no label here uses.
                apart = x2 <= a1 or a2 <= x1 or y2 - 2.5 <= b1 or b2 - 2.5 <= y1
                assert apart, (name, words, others)
