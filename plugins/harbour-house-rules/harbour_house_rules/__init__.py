"""House rules of an invented harbour workshop: what its people have learnt, beside the common rules."""

from __future__ import annotations

from importlib.resources import files

from circuitlint.authoring import Rule, offers

from .clamp_first import ClampFirst
from .pier_cable import PierCable

__version__ = "1.0.0"


@offers
def circuitlint_rules() -> list[type[Rule]]:
    """The house's rules."""
    return [ClampFirst, PierCable]


@offers
def circuitlint_rulesets() -> list[tuple[str, bytes]]:
    """The house's ruleset, laid over the 50 Hz set."""
    return [("harbour-house.yaml", (files(__name__) / "harbour-house.yaml").read_bytes())]


@offers
def circuitlint_parts() -> list[tuple[str, bytes]]:
    """What the store keeps."""
    return [("harbour-store.yaml", (files(__name__) / "harbour-store.yaml").read_bytes())]
