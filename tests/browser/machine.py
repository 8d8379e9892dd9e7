"""Whether this machine can run the browser tests, and the line that says so where it cannot.

The two hooks belong in `tests/conftest.py` as well: the process that prints the summary of a run on several cores reads no
conftest below it.
"""

from __future__ import annotations

import shutil
from importlib.util import find_spec
from typing import Any

import pytest

CHROMIUM = shutil.which("chromium") or shutil.which("chromium-browser")
LACKING = [
    *([] if CHROMIUM else ["Chromium (Debian's package chromium)"]),
    *(name for name in ("playwright", "axe_playwright_python") if find_spec(name) is None),
]
_TOLD = pytest.StashKey[bool]()


def left_out() -> str:
    """The line that says which tests were left out and what they need; empty where none were."""
    return f"left out: tests/browser, which need {', '.join(LACKING)}" if LACKING else ""


def pytest_report_header() -> list[str]:
    """Say it at the start."""
    return [left_out()] if LACKING else []


def pytest_terminal_summary(terminalreporter: Any) -> None:
    """Say it at the end, once."""
    if LACKING and not terminalreporter.config.stash.get(_TOLD, False):
        terminalreporter.config.stash[_TOLD] = True
        terminalreporter.write_line(left_out(), yellow=True)
