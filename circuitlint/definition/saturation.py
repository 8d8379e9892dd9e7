"""How the inductance of a choke falls with its current, as a definition states it."""

from __future__ import annotations

from itertools import pairwise
from typing import Literal

from pydantic import Field, model_validator
from pydantic_core import PydanticCustomError

from circuitlint.definition import fields as f
from circuitlint.definition.fields import Entry

ACCEPTED = "`current` and `exponent`, or `table` with two points or more"


class Point(Entry):
    """A point of a choke's curve."""

    current: f.Current
    inductance: f.Inductance


class Saturation(Entry):
    """Inductance against current: L0 / (1 + (I / current)^exponent) from the coil's inductance L0, or a table of points.

    On alternating current, a chord inductance and its current are rms values as measured on alternating current; currents of
    a differential inductance are direct currents.
    """

    inductance_is: Literal["chord", "differential"] = Field(
        description="`chord` is flux linkage over current, `differential` its slope at a direct current."
    )
    current: f.Current | None = Field(default=None, description="Current at which the inductance has fallen to half.")
    exponent: f.Share | None = Field(default=None, description="How sharply it falls.")
    table: list[Point] | None = Field(default=None, min_length=2, max_length=100, description="Points, currents rising.")
    source: str = Field(min_length=1, max_length=200, description="Where the law or the table comes from.")

    @model_validator(mode="after")
    def _a_law_or_a_table(self) -> Saturation:
        law = (self.current is not None) + (self.exponent is not None)
        if (law, self.table is None) not in ((2, True), (0, False)):
            raise _fault("neither a whole law nor a table alone" if law or self.table is None else "nothing", ACCEPTED)
        for one, other in pairwise(self.table or ()):
            where = f"after {one.current.text}, {one.inductance.text} the point {other.current.text}, {other.inductance.text}"
            if other.current.low <= one.current.high:
                raise _fault(where, "currents that rise from point to point, clear of their tolerances")
            if other.inductance.nominal > one.inductance.nominal:
                raise _fault(where, "inductances that do not rise with current")
            linked = (one.current.nominal * one.inductance.nominal, other.current.nominal * other.inductance.nominal)
            if self.inductance_is == "chord" and linked[1] <= linked[0]:
                raise _fault(where, "a flux linkage (current by chord inductance) that rises with current")
        return self


def _fault(what: str, accepted: str) -> PydanticCustomError:
    return PydanticCustomError("saturation", "{what}", {"what": what, "accepted": accepted})


def refusal(given: set[str], saturation: Saturation, armature: str | None) -> tuple[str, str] | None:
    """What of a coil's plate does not go with saturation, and what is accepted; None where all does."""
    surplus = sorted(given & {"impedance", "quality_factor", "current", "active_power", "apparent_power", "power_factor",
                              "core_resistance", "open_gap"})
    if surplus:
        return f"{', '.join(surplus)} beside saturation", "resistance, and inductance or reactance where a law is stated"
    if "resistance" not in given:
        return "saturation without the winding's resistance", "resistance"
    if armature != "none":
        return "saturation of a coil whose armature may move", "`armature: none`"
    if saturation.table is None and not given & {"inductance", "reactance"}:
        return "a law of saturation without the inductance it starts from", "inductance or reactance at small current"
    if saturation.table is not None and given & {"inductance", "reactance"}:
        return "an inductance beside a table of them", "one of them"
    return None
