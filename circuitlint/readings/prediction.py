"""What the review predicts of a circuit, as readings ask for it: figures, stated data of coils, the supply's band."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass, field
from typing import Any

from circuitlint.definition.loads import Coil
from circuitlint.definition.models import Supply
from circuitlint.definition.reading import Installation
from circuitlint.quantity import Quantity
from circuitlint.review.record import Circuit, Element, Record

CIRCUIT = "circuit"
"""What a readings file calls the circuit at its origin."""
LIKE_FIGURES = ("voltage", "current", "impedance", "impedance-angle", "power-factor", "active-power", "reactive-power",
                "apparent-power", "resistance", "reactance", "voltage-drop-share", "winding-temperature", "core-loss")


@dataclass(slots=True)
class Prediction:
    """One circuit's prediction."""

    circuit: Circuit
    supply: Supply | None
    root: str
    """Place of the whole load."""
    coils: dict[str, Coil] = field(default_factory=dict)
    ambient: Quantity | None = None

    @property
    def direct(self) -> bool:
        """Whether the circuit is fed with direct current."""
        return self.circuit.system == "dc"

    def place(self, of: str) -> str:
        """The record's name of a part as a readings file names it."""
        return self.root if of in ("", "load") else "" if of == CIRCUIT else of

    def range(self, name: str, of: str, state: str) -> tuple[tuple[float, float, float], str] | None:
        """Nominal, lowest and highest value predicted for a result, and where they come from; None where there is none."""
        coil = self.coils.get(of)
        if name == "frequency":
            band = self.supply.frequency if self.supply is not None else None
            return (_ends(band), "band of the supply's frequency") if band is not None else None
        if name == "reference-resistance":
            at_reference = coil is not None and (coil.resistance_at is None or coil.resistance_at.nominal == 20.0)
            stated = coil.resistance if coil is not None and at_reference else None
            return (_ends(stated), "resistance on the plate") if stated is not None else None
        if name in ("inductance", "bridge-inductance"):
            return self._inductance(coil, state)
        wanted = "resistance" if name == "direct-current-resistance" else name
        if wanted not in LIKE_FIGURES:
            return None
        if name in ("resistance", "reactance") and self._figure("core-loss", of, state) is not None:
            return None
        return self._figure(wanted, of, state)

    def _figure(self, name: str, of: str, state: str) -> tuple[tuple[float, float, float], str] | None:
        for one in self.circuit.figures:
            if one.name == name and one.of == of and one.state == state:
                return (one.nominal, one.lowest, one.highest), f"figure {name} of {of or 'the circuit'}, {state}"
        return None

    def _inductance(self, coil: Coil | None, state: str) -> tuple[tuple[float, float, float], str] | None:
        if coil is None:
            return None
        open_gap = state in ("switch-on", "stuck-open") and coil.armature != "none"
        stated = (coil.open_gap.inductance if coil.open_gap is not None else None) if open_gap else coil.inductance
        return (_ends(stated), f"inductance on the plate, armature {'open' if open_gap else 'closed'}") if stated else None


def predictions(installation: Installation, record: Record) -> dict[str, Prediction]:
    """Predictions of every circuit by tag."""
    entries = {one.entry.tag: one.entry for one in installation.circuits}
    made = {}
    for circuit in record.circuits:
        entry = entries[circuit.tag]
        coils = dict(_coils(getattr(entry, "load", None), "load"))
        made[circuit.tag] = Prediction(circuit, _supply_of(entry.fed_from, installation), _root(circuit.tree), coils,
                                        entry.ambient)
    return made


def parts_of(prediction: Prediction) -> list[str]:
    """Every name a readings file may give under `of`."""
    return [CIRCUIT, "load", *dict.fromkeys(one.of for one in prediction.circuit.figures if one.of and one.of != "load")]


def _ends(quantity: Quantity) -> tuple[float, float, float]:
    return quantity.nominal, quantity.low, quantity.high


def _supply_of(origin: str, installation: Installation) -> Supply | None:
    seen: set[str] = set()
    while origin in installation.boards and origin not in seen:
        seen.add(origin)
        origin = installation.boards[origin].fed_from
    return installation.supplies.get(origin)


def _root(tree: Element) -> str:
    return next((one.of for one in _elements(tree) if one.of.startswith("load")), "load")


def _elements(element: Element) -> Iterator[Element]:
    yield element
    for one in element.parts:
        yield from _elements(one)


def _coils(load: Any, place: str) -> Iterator[tuple[str, Coil]]:
    if load is None:
        return
    where = f"{place}.{load.kind}"
    if isinstance(load.part, Coil):
        yield where, load.part
    elif isinstance(load.part, list):
        for number, one in enumerate(load.part):
            yield from _coils(one, f"{where}[{number}]")
