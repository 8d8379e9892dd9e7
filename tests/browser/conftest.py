"""Tests that look at the page in Debian's Chromium. A machine without it leaves them out and says so."""

from __future__ import annotations

import os
from collections.abc import Iterator
from pathlib import Path

import pytest

from tests.browser.machine import CHROMIUM, LACKING, pytest_terminal_summary

__all__ = ["pytest_terminal_summary"]
collect_ignore_glob = ["test_*.py"] if LACKING else []

FLAGS = [
    "--no-sandbox",
    "--disable-gpu",
    "--disable-quic",
    "--no-first-run",
    "--disable-background-networking",
    "--disable-component-update",
    "--disable-sync",
]
KEPT = "CIRCUITLINT_PICTURES"
"""Names a folder that keeps the pictures the tests make, for a person to look at."""


if not LACKING:
    from playwright.sync_api import Browser, Page, sync_playwright

    from circuitlint.reports.html import render
    from tests.reports.sample_record import record_of, sample_record

    @pytest.fixture(scope="session")
    def browser() -> Iterator[Browser]:
        """One Chromium for all tests of a process."""
        with sync_playwright() as driver:
            started = driver.chromium.launch(executable_path=CHROMIUM, args=FLAGS)
            yield started
            started.close()

    @pytest.fixture(scope="session")
    def small(tmp_path_factory: pytest.TempPathFactory) -> Path:
        """The page of the six circuits."""
        file = tmp_path_factory.mktemp("page") / "six.html"
        file.write_text(render(sample_record()), encoding="utf-8")
        return file

    @pytest.fixture(scope="session")
    def large(tmp_path_factory: pytest.TempPathFactory) -> Path:
        """The page of five hundred circuits."""
        file = tmp_path_factory.mktemp("page") / "many.html"
        file.write_text(render(record_of(500)), encoding="utf-8")
        return file

    @pytest.fixture(params=[1400, 390], ids=["1400", "390"])
    def page(request: pytest.FixtureRequest, browser: Browser, small: Path) -> Iterator[Page]:
        """The small page, open at two widths."""
        context = browser.new_context(viewport={"width": request.param, "height": 900})
        opened = context.new_page()
        opened.goto(small.as_uri())
        yield opened
        context.close()

    @pytest.fixture
    def wide(browser: Browser, small: Path) -> Iterator[Page]:
        """The small page at 1400 pixels."""
        context = browser.new_context(viewport={"width": 1400, "height": 900})
        opened = context.new_page()
        opened.goto(small.as_uri())
        yield opened
        context.close()

    @pytest.fixture
    def pictures(tmp_path: Path) -> Path:
        """Where pictures go: the folder that `CIRCUITLINT_PICTURES` names, else a passing one."""
        folder = Path(os.environ[KEPT]) if os.environ.get(KEPT) else tmp_path
        folder.mkdir(parents=True, exist_ok=True)
        return folder
