"""Capacitors beside inductive loads: too much of them, what they bear, what they leave behind, resonance."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import replace

from circuitlint.authoring import (
    RATIO,
    TIME,
    CircuitStudy,
    Fact,
    Figure,
    Holds,
    Lack,
    Limit,
    Limits,
    LimitSpec,
    Outcome,
    Quantity,
    Rule,
    Unknown,
    ask,
    at_least,
    at_most,
    path_of,
    share_of,
    show,
)

ORDERS = (5.0, 7.0, 11.0, 13.0)
"""Harmonics commonly present on supplies with rectifiers; common practice."""


class _OfCapacitors(Rule):
    """Rules that look at alternating-current circuits with a capacitor."""

    def applies(self, circuit: CircuitStudy) -> bool:
        """On alternating current, where there is a capacitor."""
        return circuit.system != "dc" and bool(circuit.leaves("capacitor"))


class OverCorrection(_OfCapacitors):
    """What the capacitors give against what the load takes without them."""

    name = "over-correction"
    title = "No more correction than the load takes"
    purpose = "A circuit that leads raises the voltage at light load, and a motor excites itself when it is disconnected."
    applies_to = "alternating-current circuits with a capacitor"
    figures = ("correction-share",)
    states = ("cold", "steady")
    needs = ("the load's resistance and reactance", "capacitance", "ambient and temperature rise for the hot state")
    helps = "a smaller capacitor"
    limits = {"share": LimitSpec(RATIO, "largest reactive power of the capacitors as a share of what the load takes")}

    def check(self, circuit: CircuitStudy, limits: Limits) -> Iterator[Outcome]:
        """Cold and hot."""
        for state in self.states:
            asked, left = ask(circuit, "correction-share", state), ask(circuit, "reactive-power", state).found
            if isinstance(asked.found, Lack) and isinstance(left, Figure) and left.nominal < 0.0:
                given = show(-left.nominal, left.dimension)
                what = f"the load takes no reactive power ({state}), and its capacitors give {given}"
                yield Fact("correction share", what, state=state, at=("load",))
            else:
                yield at_most(asked, limits.get("share"))


class CapacitorStress(_OfCapacitors):
    """Voltage across each capacitor against its rating."""

    name = "capacitor-stress"
    title = "Voltage across the capacitor"
    purpose = "A capacitor above its rated voltage swells, fails, and may burn."
    applies_to = "alternating-current circuits with a capacitor"
    figures = ("voltage@load", "voltage@correction")
    states = ("cold", "steady")
    needs = ("the capacitor's rated_voltage", "the circuit's data")
    helps = "a capacitor of a higher rated voltage"
    limits = {"share_of_voltage": LimitSpec(RATIO, "largest voltage as a share of the capacitor's rated voltage")}

    def check(self, circuit: CircuitStudy, limits: Limits) -> Iterator[Outcome]:
        """Each capacitor, cold and hot."""
        for place in circuit.leaves("capacitor"):
            path = f"{place}.rated_voltage"
            rated = circuit.stated(path)
            if rated is None:
                yield Unknown(f"voltage of {place}", (path,), "the voltage it is rated for is not stated", at=path_of(place))
                continue
            for state in self.states:
                yield at_most(ask(circuit, "voltage", state, place), share_of(limits.get("share_of_voltage"), rated, path))


class CapacitorDischarge(_OfCapacitors):
    """Time in which a capacitor falls to a voltage that may be touched, after switching off."""

    name = "capacitor-discharge"
    title = "Capacitor discharges after switching off"
    purpose = "A capacitor without a way to discharge gives a shock long after its circuit was switched off."
    applies_to = "alternating-current circuits with a capacitor"
    figures = ("time-to-75-volts", "time-to-50-volts")
    states = ("cold",)
    needs = ("discharge_resistance, or a winding that stays beside the capacitor",)
    helps = "a discharge resistor across the capacitor"
    limits = {
        "to_75_volts": LimitSpec(TIME, "longest time to 75 V"),
        "to_50_volts": LimitSpec(TIME, "longest time to 50 V"),
    }

    def check(self, circuit: CircuitStudy, limits: Limits) -> Iterator[Outcome]:
        """Through a winding that stays beside it, else through its resistor."""
        for place in circuit.leaves("capacitor"):
            path, at = f"{place}.discharge_resistance", path_of(place)
            beside = self._winding_beside(circuit, place)
            if beside:
                yield Holds(f"discharge of {place}", f"{place} discharges through {beside}, which stays beside it", at=at)
            elif circuit.stated(path) is None:
                yield Unknown(f"discharge of {place}", (path,), "no way to discharge is stated", at=at)
            else:
                # Jurisdictions demand one or the other; a ruleset that gives neither leaves the check open.
                demanded = [volt for volt in ("75", "50") if limits.get(f"to_{volt}_volts") is not None] or ["75"]
                for volt in demanded:
                    yield at_most(ask(circuit, f"time-to-{volt}-volts", "cold", place), limits.get(f"to_{volt}_volts"))

    def _winding_beside(self, circuit: CircuitStudy, place: str) -> str:
        """A coil that stands straight across a capacitor; empty where there is none."""
        if place == "correction":
            return next((one for one in circuit.leaves("coil") if one == "load.coil"), "")
        stem = place.rpartition("[")[0]
        inner = (one for one in circuit.leaves("coil") if one.rpartition("[")[0] == stem)
        return next(inner, "") if stem.endswith("parallel") else ""


class Resonance(_OfCapacitors):
    """The order at which capacitors and source resonate, against the harmonics commonly present."""

    name = "resonance"
    title = "Resonance away from harmonics"
    purpose = "Near a harmonic that is present, capacitor and source drive each other until the capacitor fails."
    applies_to = "alternating-current circuits with a capacitor"
    figures = ("resonance-order",)
    states = ("cold",)
    needs = ("supply.fault_current",)
    helps = "another size of capacitor, or a reactor in series with it"
    limits = {
        "above_order": LimitSpec(RATIO, "smallest distance above a harmonic, in orders"),
        "below_order": LimitSpec(RATIO, "smallest distance below a harmonic, in orders"),
    }

    def check(self, circuit: CircuitStudy, limits: Limits) -> Iterator[Outcome]:
        """Between the harmonics next to the nominal order; a worst case that reaches either is beyond."""
        asked = ask(circuit, "resonance-order", "cold")
        if circuit.stated("supply.fault_current") is None:
            yield Unknown("resonance-order", ("supply.fault_current",), "how stiff the source is is not stated", "cold")
            return
        nominal = getattr(asked.found, "nominal", 0.0)
        below = [one for one in ORDERS if one <= nominal]
        above = [one for one in ORDERS if one > nominal]
        if below:
            yield at_least(asked, moved(limits.get("above_order"), below[-1], 1.0))
        if above:
            yield at_most(asked, moved(limits.get("below_order"), above[0], -1.0))


def moved(limit: Limit | None, order: float, sign: float) -> Limit | None:
    """A distance as the order that it leads to."""
    if limit is None:
        return None
    value = order + sign * limit.value
    text = f"{limit.quantity.text} {'above' if sign > 0.0 else 'below'} order {order:g}"
    return replace(limit, quantity=Quantity(value, value, value, limit.quantity.dimension, text))
