"""The shipped demo: an invented ferry slip. Nothing in it is a real place, plant or product."""

from __future__ import annotations

from importlib.resources import files

NAME = "ferry-slip.yaml"


def content() -> tuple[str, bytes]:
    """File name and bytes of the demo definition."""
    return NAME, (files(__name__) / NAME).read_bytes()


READINGS = "ferry-slip-readings.yaml"


def readings() -> tuple[str, bytes]:
    """File name and bytes of the demo readings."""
    return READINGS, (files(__name__) / READINGS).read_bytes()
