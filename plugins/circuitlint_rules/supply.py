"""What the supply sees and what reaches the load: power factor, voltage drop."""

from __future__ import annotations

from collections.abc import Iterator

from circuitlint.authoring import RATIO, CircuitStudy, Figure, Limits, LimitSpec, Outcome, Rule, ask, at_least, at_most


class MinimumPowerFactor(Rule):
    """Power factor at the origin of a circuit, cold and hot."""

    name = "minimum-power-factor"
    title = "Power factor at the origin"
    purpose = "Magnetising current that is not compensated heats feeders, costs reactive energy and takes up ratings."
    applies_to = "circuits on alternating current"
    figures = ("power-factor",)
    states = ("cold", "steady")
    needs = ("the load's resistance and reactance", "cable", "ambient and temperature rise for the hot state")
    helps = "a correction capacitor at the load, or a coil with a smaller magnetising current"
    limits = {"circuit": LimitSpec(RATIO, "least power factor at the origin of a circuit")}

    def applies(self, circuit: CircuitStudy) -> bool:
        """On alternating current only."""
        return circuit.system != "dc"

    def check(self, circuit: CircuitStudy, limits: Limits) -> Iterator[Outcome]:
        """The power factor in each running state."""
        for state in self.states:
            asked = ask(circuit, "power-factor", state)
            leading = isinstance(asked.found, Figure) and asked.found.note == "leading"
            help = "a smaller capacitor: the current leads" if leading else ""
            yield at_least(asked, limits.get("circuit"), at=("load",), help=help)


class VoltageDrop(Rule):
    """Drop from the origin to the load's terminals, running and at switch-on."""

    name = "voltage-drop"
    title = "Voltage drop from the origin to the terminals"
    purpose = "A coil that gets too little voltage pulls in weakly, chatters, or drops out; a motor runs hot."
    applies_to = "every circuit"
    figures = ("voltage-drop-share",)
    states = ("cold", "steady", "switch-on")
    needs = ("cable with section, length and conductor", "the load's data", "for switch-on, the coil's open gap")
    helps = "a larger section, a shorter run, or a higher supply voltage"
    limits = {
        "running": LimitSpec(RATIO, "largest drop while running, as a share of the nominal voltage"),
        "switch_on": LimitSpec(RATIO, "largest drop at switch-on, as a share of the nominal voltage"),
    }

    def check(self, circuit: CircuitStudy, limits: Limits) -> Iterator[Outcome]:
        """The share of the nominal voltage lost on the way, state by state."""
        for state in self.states:
            limit = limits.get("switch_on" if state == "switch-on" else "running")
            yield at_most(ask(circuit, "voltage-drop-share", state), limit, at=("cable",))
