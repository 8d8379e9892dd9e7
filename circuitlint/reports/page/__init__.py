"""The parts of the HTML page: words, drawings, sections."""

from __future__ import annotations
