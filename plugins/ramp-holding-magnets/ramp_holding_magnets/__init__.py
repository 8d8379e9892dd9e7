"""Banks of holding magnets, as an invented ferry ramp has them: a load kind, its figures, a rule on them, a ruleset, parts."""

from __future__ import annotations

from importlib.resources import files

from circuitlint.authoring import ExtraFigures, LoadKind, Rule, offers

from .bank import HoldingMagnetsKind, MagnetBank
from .per_watt import PerWatt
from .reserve import HoldingReserve

__version__ = "1.0.0"


@offers
def circuitlint_load_kinds() -> list[LoadKind[MagnetBank]]:
    """The bank."""
    return [HoldingMagnetsKind()]


@offers
def circuitlint_figures() -> list[ExtraFigures]:
    """What each watt takes from the supply."""
    return [PerWatt()]


@offers
def circuitlint_rules() -> list[type[Rule]]:
    """The rule on the bank's figures."""
    return [HoldingReserve]


@offers
def circuitlint_rulesets() -> list[tuple[str, bytes]]:
    """The ramp's ruleset, laid over the 50 Hz set."""
    return [("ferry-ramp.yaml", (files(__name__) / "ferry-ramp.yaml").read_bytes())]


@offers
def circuitlint_parts() -> list[tuple[str, bytes]]:
    """The ramp's magnets."""
    return [("ramp-magnets.yaml", (files(__name__) / "ramp-magnets.yaml").read_bytes())]
