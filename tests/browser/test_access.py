"""The page for people who hear it, use a keyboard, or see little contrast."""

from __future__ import annotations

from collections import Counter
from typing import Any

import pytest
from axe_playwright_python.sync_playwright import Axe
from playwright.sync_api import Page

pytestmark = pytest.mark.xdist_group("chromium")

UNFOLD = "document.querySelectorAll('details').forEach(one => { one.open = true })"


def broken(page: Page) -> list[str]:
    """Rules of accessibility that the page breaks, with the first place of each."""
    found: dict[str, Any] = Axe().run(page).response
    return [f"{one['impact']} {one['id']}: {one['nodes'][0]['html'][:200]}" for one in found["violations"]]


@pytest.mark.parametrize("folded", [True, False], ids=["folded", "unfolded"])
def test_no_rule_of_accessibility_is_broken(page: Page, folded: bool) -> None:
    if not folded:
        page.evaluate(UNFOLD)
    assert broken(page) == []


def test_the_rules_do_find_what_is_broken(page: Page) -> None:
    page.evaluate("document.querySelector('#words').closest('label').replaceWith(document.querySelector('#words'))")
    assert any("label" in one for one in broken(page))


def told(page: Page) -> list[tuple[str, str]]:
    """Role and name of everything in the tree that a screen reader is given."""
    session = page.context.new_cdp_session(page)
    nodes = session.send("Accessibility.getFullAXTree")["nodes"]
    return [(one["role"]["value"], one.get("name", {}).get("value", "")) for one in nodes if not one.get("ignored")]


def roles(page: Page) -> dict[str, int]:
    """How often each role is told."""
    return dict(Counter(role for role, _ in told(page)))


def in_sight(page: Page) -> None:
    """Unfold everything and make the window so high that all of it is in sight."""
    page.evaluate(UNFOLD)
    page.set_viewport_size({"width": page.viewport_size["width"] if page.viewport_size else 1400, "height": 60_000})
    page.wait_for_timeout(300)


def count(page: Page, selector: str) -> int:
    """How many elements a selector finds."""
    return int(page.evaluate("what => document.querySelectorAll(what).length", selector))


def test_tables_stay_tables_and_headings_headings_at_both_widths(page: Page) -> None:
    in_sight(page)
    counted = roles(page)
    assert counted["table"] == count(page, "table")
    assert counted["rowheader"] == count(page, "th[scope=row], th[scope=rowgroup]")
    assert counted["columnheader"] == count(page, "th[scope=col]")
    assert counted["heading"] == count(page, "h1, h2, h3, h4")


def test_headings_and_findings_are_told_though_they_are_out_of_sight(page: Page) -> None:
    found = told(page)
    assert sum(role == "heading" for role, _ in found) == count(page, "h1, h2, h3")
    for where in page.locator(".finding .is").all_text_contents():
        assert any(where in name for _, name in found)


def test_landmarks_are_told(page: Page) -> None:
    counted = roles(page)
    for role in ("banner", "navigation", "main", "contentinfo", "search"):
        assert counted.get(role) == 1, role


def test_every_drawing_is_told_by_name(page: Page) -> None:
    in_sight(page)
    names = [name for role, name in told(page) if role == "image"]
    assert len(names) == count(page, "svg[role=img]")
    assert all(names)


FILLS = """() => [...document.querySelectorAll('svg text')].map(one => getComputedStyle(one).fill)"""


def luminance(parts: list[float]) -> float:
    """Relative luminance (WCAG 2.2)."""
    linear = [one / 12.92 if one <= 0.04045 else ((one + 0.055) / 1.055) ** 2.4 for one in (p / 255.0 for p in parts)]
    return 0.2126 * linear[0] + 0.7152 * linear[1] + 0.0722 * linear[2]


def test_the_rendered_words_of_drawings_stand_out_from_the_paper(page: Page) -> None:
    page.evaluate(UNFOLD)
    fills = set(page.evaluate(FILLS))
    assert fills
    for fill in fills:
        parts = [float(part) for part in fill.removeprefix("rgb(").removesuffix(")").split(",")]
        assert 1.05 / (luminance(parts) + 0.05) >= 4.5, fill


def test_whatever_can_be_pressed_on_a_phone_is_large_enough_to_hit(page: Page) -> None:
    if page.viewport_size and page.viewport_size["width"] < 500:
        sizes = page.evaluate(
            "[...document.querySelectorAll('.controls button, .controls select, .controls label, .circuit > summary')]"
            ".map(one => one.getBoundingClientRect().height)"
        )
        assert min(sizes) >= 44.0
    else:
        assert page.evaluate("document.querySelector('#unfold').getBoundingClientRect().height") >= 24.0
