"""A ramp that hangs on magnets needs force in reserve, and must let go in time."""

from __future__ import annotations

from collections.abc import Iterator

from circuitlint.authoring import RATIO, TIME, CircuitStudy, Limits, LimitSpec, Outcome, Rule, ask, at_least, at_most


class HoldingReserve(Rule):
    """Force of the weakest magnet at the lowest current, and the time that the strongest holds on, hot and cold."""

    name = "holding-reserve"
    title = "Force in reserve, and letting go in time"
    purpose = "A hot magnet on a low supply drops what hangs on it; a cold one on a high supply does not let go."
    applies_to = "circuits with holding magnets on direct current"
    figures = ("holding-force-share", "fall-off-time")
    states = ("cold", "steady")
    needs = ("rated_current", "release_current", "inductance", "temperature", "cable")
    helps = "fewer magnets in a string, a thicker cable, or magnets with more force"
    limits = {
        "force": LimitSpec(RATIO, "least holding force as a share of the rated one"),
        "fall_off": LimitSpec(TIME, "longest time that a magnet holds on after switching off"),
    }

    def applies(self, circuit: CircuitStudy) -> bool:
        """Where there are such magnets."""
        return circuit.system == "dc" and bool(circuit.parts("magnet-current", "cold"))

    def check(self, circuit: CircuitStudy, limits: Limits) -> Iterator[Outcome]:
        """Each bank, cold and hot."""
        for state in self.states:
            for part in circuit.parts("magnet-current", state):
                yield at_least(ask(circuit, "holding-force-share", state, part), limits.get("force"))
                yield at_most(ask(circuit, "fall-off-time", state, part), limits.get("fall_off"))
