"""An extra figure of every circuit on alternating current: what each watt takes from the supply."""

from __future__ import annotations

from circuitlint.authoring import ExtraFigures, Key, Plan, Source, formula, si

WATCH = Source("what the ramp's people note on the drawing of a feeder", known="firm's own")


@formula("S/P", "{S} / {P}", source=WATCH, validity="the reciprocal of the power factor", apparent="S", active="P")
def volt_amperes_per_watt(*, apparent: si.VoltAmpere, active: si.Watt) -> si.Ratio:
    """S/P = S / P"""
    return apparent / active


class PerWatt(ExtraFigures):
    """Volt-amperes taken from the supply for each watt, on alternating current."""

    name = "volt-amperes-per-watt"
    gives = ("volt-amperes-per-watt",)

    def figures(self, plan: Plan, place: str) -> None:
        """One line."""
        if not plan.direct:
            plan.sheet.put("volt-amperes-per-watt", place, volt_amperes_per_watt, apparent=Key("apparent-power", place),
                           active=Key("active-power", place))
