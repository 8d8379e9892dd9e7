"""A large current is measured around the wire, not through the meter."""

from __future__ import annotations

from collections.abc import Iterator

from circuitlint.authoring import CURRENT, CircuitStudy, Limits, LimitSpec, Outcome, Rule, Unknown, ask, at_most


class ClampFirst(Rule):
    """Current through a meter in the loop, against what the house lets anybody carry through a hand-held meter."""

    name = "clamp-first"
    title = "A clamp where the current is large"
    purpose = "A loop that is opened to put a meter in is a loop that is opened under current some day."
    applies_to = "circuits with a meter that is no clamp"
    figures = ("current",)
    states = ("cold", "steady")
    needs = ("meter.connection", "the load's data")
    helps = "a clamp around one conductor"
    limits = {"in_loop": LimitSpec(CURRENT, "largest running current that is measured in the loop")}

    def applies(self, circuit: CircuitStudy) -> bool:
        """Where a meter is named that is no clamp, or not known to be one."""
        return circuit.entry.meter is not None and circuit.entry.meter.connection != "clamp"

    def check(self, circuit: CircuitStudy, limits: Limits) -> Iterator[Outcome]:
        """The current in each running state."""
        if circuit.entry.meter is not None and circuit.entry.meter.connection is None:
            yield Unknown("connection", ("meter.connection",), "in the loop or around it is not stated", at=("meter",))
        for state in self.states:
            yield at_most(ask(circuit, "current", state), limits.get("in_loop"), at=("meter",))
