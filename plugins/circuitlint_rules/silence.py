"""What a definition is silent of, so that rules which look only at what is stated are not taken for passed."""

from __future__ import annotations

from collections.abc import Iterator

from circuitlint.authoring import CircuitStudy, Fact, Holds, Limits, Outcome, Rule, Unknown


class MissingData(Rule):
    """Whether anything is stated beyond the load; and whether what protects and what switches it is."""

    name = "missing-data"
    title = "Protection and switching are stated"
    purpose = "Rules on protection and on contacts look at what is stated; where nothing is, their silence means nothing."
    applies_to = "every circuit"
    figures = ()
    states = ()
    needs = ("protection", "switching, where there is a coil")
    helps = "state what protects the circuit and what switches it"

    def check(self, circuit: CircuitStudy, limits: Limits) -> Iterator[Outcome]:
        """One line for all that is missing."""
        entry = circuit.entry
        lacking = ["protection"] if entry.protection is None else []
        if entry.switching is None and circuit.leaves("coil"):
            lacking.append("switching")
        if entry.cable is None and entry.ambient is None and entry.protection is None and entry.switching is None:
            why = "cable, ambient, protection and switching are all silent, so that next to nothing can be assessed"
            yield Fact("what is stated", "nothing is stated of the circuit beyond its load", why=why)
        elif lacking:
            what = " and ".join(lacking)
            yield Unknown(f"{what} of the circuit", tuple(lacking), f"nothing is stated of {what}, so its rules do not apply")
        else:
            yield Holds("what is stated", "what protects the circuit and what switches its coils is stated")
