"""Cables on the pier move with the tide and the traffic, so they are of fine strands."""

from __future__ import annotations

from collections.abc import Iterator

from circuitlint.authoring import CircuitStudy, Fact, Holds, Limits, Outcome, Rule, Unknown

ON_THE_PIER = "=F"


class PierCable(Rule):
    """The conductor class of each run of a circuit on the pier: a matter of kind, with no figure to it."""

    name = "pier-cable"
    title = "Flexible conductors on the pier"
    purpose = "Solid and coarse-stranded conductors break where the pier works in the swell."
    applies_to = "circuits whose tag begins with =F, the fender pier, and which are not stated to have no cable"
    figures = ()
    states = ()
    needs = ("cable", "conductor_class")
    helps = "a cable of IEC 60228 class 5"

    def applies(self, circuit: CircuitStudy) -> bool:
        """On the pier."""
        return circuit.tag.startswith(ON_THE_PIER) and circuit.entry.cable != []

    def check(self, circuit: CircuitStudy, limits: Limits) -> Iterator[Outcome]:
        """The class of each run."""
        if circuit.entry.cable is None:
            yield Unknown("conductor class", ("cable",), "the way to the load is not stated")
            return
        for number, run in enumerate(circuit.entry.cable):
            at, name = ("cable", number), f"conductor class of run {number + 1}"
            if run.conductor_class is None:
                yield Unknown(name, (f"cable[{number}].conductor_class",), at=at)
            elif run.conductor_class == "5":
                yield Holds(name, "the conductors are of class 5", at=at)
            else:
                yield Fact(name, f"run {number + 1} has conductors of class {run.conductor_class}, not 5", at=at)
