"""How hypothesis draws its examples: the same ones every time, unless one goes looking for new ones.

`pytest --hypothesis-profile searching` draws fresh examples, ten times as many.
"""

from __future__ import annotations

from hypothesis import settings

from tests.browser.machine import pytest_report_header, pytest_terminal_summary

__all__ = ["pytest_report_header", "pytest_terminal_summary"]
"""Said by the process that prints, so that a machine without a browser says which tests it leaves out."""

settings.register_profile("steady", derandomize=True, deadline=None)
settings.register_profile("searching", derandomize=False, deadline=None, max_examples=1000)
settings.load_profile("steady")
