"""What the current does to the conductor."""

from __future__ import annotations

from collections.abc import Iterator

from circuitlint.authoring import (
    AREA,
    LOSS_PER_LENGTH,
    RATIO,
    TEMPERATURE,
    CircuitStudy,
    Limits,
    LimitSpec,
    Outcome,
    Rule,
    Unknown,
    ask,
    at_least,
    at_most,
    stated,
)


class ConductorHeating(Rule):
    """Heat per metre and conductor temperature of each run, against what its insulation bears."""

    name = "conductor-heating"
    title = "Heat in the conductor"
    purpose = "A conductor above its insulation's temperature ages the insulation and ends in a fault or a fire."
    applies_to = "every circuit with a cable"
    figures = ("conductor-temperature", "loss-per-metre")
    states = ("steady",)
    needs = ("insulation", "method", "ambient", "grouped_circuits", "section", "the load's heat data")
    helps = "a larger section, fewer circuits bunched together, a cooler way, or insulation of a higher class"
    limits = {
        "pvc_70": LimitSpec(TEMPERATURE, "highest conductor temperature of pvc-70 insulation"),
        "xlpe_90": LimitSpec(TEMPERATURE, "highest conductor temperature of xlpe-90 insulation"),
        "loss_per_metre": LimitSpec(LOSS_PER_LENGTH, "largest loss per metre of run, out and back together halved"),
    }

    def applies(self, circuit: CircuitStudy) -> bool:
        """Where there is a cable, or where nothing is said of one."""
        return circuit.entry.cable is None or len(circuit.entry.cable) > 0

    def check(self, circuit: CircuitStudy, limits: Limits) -> Iterator[Outcome]:
        """Temperature and loss of each run."""
        if circuit.entry.cable is None:
            yield Unknown("conductor-temperature", ("cable, or `cable: []` where there is none",), state="steady")
            return
        for index, run in enumerate(circuit.entry.cable):
            place = f"cable[{index}]"
            if run.insulation is None:
                yield Unknown("conductor-temperature", (f"{place}.insulation",), state="steady", at=("cable", index))
            else:
                limit = limits.get(run.insulation.replace("-", "_"))
                yield at_most(ask(circuit, "conductor-temperature", "steady", place), limit)
            yield at_most(ask(circuit, "loss-per-metre", "steady", place), limits.get("loss_per_metre"))


class ConductorCurrent(Rule):
    """The steady current of each run against its ampacity, corrected for ambient and grouping."""

    name = "conductor-current"
    title = "Current within the ampacity"
    purpose = "A conductor that carries more than its corrected ampacity runs hotter than its insulation is made for."
    applies_to = "every circuit with a cable"
    figures = ("ampacity-share",)
    states = ("steady",)
    needs = ("insulation", "method", "ambient", "grouped_circuits", "section", "the load's heat data")
    helps = "a larger section, fewer circuits bunched together, or a cooler way"
    limits = {"share_of_ampacity": LimitSpec(RATIO, "largest steady current as a share of the corrected ampacity")}

    def applies(self, circuit: CircuitStudy) -> bool:
        """Where there is a cable, or where nothing is said of one."""
        return circuit.entry.cable is None or len(circuit.entry.cable) > 0

    def check(self, circuit: CircuitStudy, limits: Limits) -> Iterator[Outcome]:
        """Each run."""
        if circuit.entry.cable is None:
            yield Unknown("ampacity-share", ("cable, or `cable: []` where there is none",), state="steady")
            return
        for index in range(len(circuit.entry.cable)):
            yield at_most(ask(circuit, "ampacity-share", "steady", f"cable[{index}]"), limits.get("share_of_ampacity"))


class MinimumSection(Rule):
    """The section of each run against the smallest that is laid for its use."""

    name = "minimum-section"
    title = "Smallest section"
    purpose = "A conductor thinner than its use allows breaks in handling and at its terminals, whatever current it carries."
    applies_to = "every circuit with a cable"
    figures = ()
    states = ()
    needs = ("cable with section",)
    helps = "a larger section"
    limits = {
        "power": LimitSpec(AREA, "smallest section of copper above extra-low voltage"),
        "control": LimitSpec(AREA, "smallest section of copper at extra-low voltage"),
        "aluminium": LimitSpec(AREA, "smallest section of aluminium"),
    }

    def applies(self, circuit: CircuitStudy) -> bool:
        """Where there is a cable, or where nothing is said of one."""
        return circuit.entry.cable is None or len(circuit.entry.cable) > 0

    def check(self, circuit: CircuitStudy, limits: Limits) -> Iterator[Outcome]:
        """Each run."""
        if circuit.entry.cable is None:
            yield Unknown("section", ("cable, or `cable: []` where there is none",))
            return
        extra_low = circuit.data.data["voltage to earth"].nominal <= (120.0 if circuit.system == "dc" else 50.0)
        for index, run in enumerate(circuit.entry.cable):
            use = "aluminium" if run.conductor == "aluminium" else "control" if extra_low else "power"
            yield at_least(stated(circuit, f"cable[{index}].section"), limits.get(use))
