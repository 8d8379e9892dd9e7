"""The usual cautions, chosen by what is in a circuit."""

from __future__ import annotations

from collections.abc import Iterable

from circuitlint.study.plan import Node
from circuitlint.study.study import CircuitStudy, Figure

STATEMENT = "local codes"

CAUTIONS: dict[str, str] = {
    "isolate": (
        "Isolate every source, lock it off and prove the circuit dead with a tester proven before and after, ahead of any "
        "work on it. Work is for competent or licensed persons under the rules of the site."
    ),
    "stored energy": (
        "Opening the circuit of a coil raises a high voltage at the opening contact: switch with rated and suppressed devices, "
        "never by pulling a lead or a probe."
    ),
    "capacitor": (
        "Capacitors stay charged after switching off: wait the marked time, measure, then short and earth them. A built-in "
        "discharge resistor is no proof."
    ),
    "hot surface": "Parts of this circuit run hot enough to burn: let them cool or wear gloves, and keep them off combustibles.",
    "meter in the loop": (
        "Never open the meter's loop under current; insert and remove the meter with the circuit dead, and check its fuse and "
        "leads first."
    ),
    "moving parts": (
        "When a coil drops or pulls in, brakes, valves and held loads move: support them mechanically before switching."
    ),
}
"""What each caution says, by its key; common practice of the trade."""

HOT_SURFACE = 60.0
"""Celsius temperature above which a winding or conductor is called hot; common practice."""


def cautions_for(circuit: CircuitStudy) -> tuple[str, ...]:
    """Keys of the cautions that fit a circuit, in the order of `CAUTIONS`."""
    kinds = set(_kinds(circuit.tree))
    chosen = {"isolate"}
    if "coil" in kinds:
        chosen.add("stored energy")
        if any(circuit.data.tokens.get(f"{place}.armature") != "none" for place in _places(circuit.tree, "coil")):
            chosen.add("moving parts")
    if "capacitor" in kinds:
        chosen.add("capacitor")
    if circuit.entry.meter is not None and circuit.entry.meter.connection != "clamp":
        chosen.add("meter in the loop")
    if any(temperature > HOT_SURFACE for temperature in _temperatures(circuit)):
        chosen.add("hot surface")
    return tuple(key for key in CAUTIONS if key in chosen)


def _kinds(node: Node) -> Iterable[str]:
    yield node.kind
    for one in node.nodes:
        yield from _kinds(one)


def _places(node: Node, kind: str) -> Iterable[str]:
    if node.kind == kind:
        yield node.place
    for one in node.nodes:
        yield from _places(one, kind)


def _temperatures(circuit: CircuitStudy) -> Iterable[float]:
    for name in ("winding-temperature", "conductor-temperature"):
        for of in circuit.parts(name, "steady"):
            figure = circuit.figure(name, "steady", of)
            if isinstance(figure, Figure):
                yield figure.highest
