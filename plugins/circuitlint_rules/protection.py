"""The protective device: against load, cable, switch-on and fault, and what a fault does to the conductors."""

from __future__ import annotations

import math
from collections.abc import Iterator
from dataclasses import replace

from circuitlint.authoring import (
    RATIO,
    CircuitStudy,
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
    share_of,
    stated,
)

EXTRA_LOW = 50.0
"""Voltage to earth up to which no disconnection in time is demanded (IEC 60364-4-41)."""


def crest_of(limit: Limit | None) -> Limit | None:
    """A limit stated in rms, for the crest of a sine wave."""
    if limit is None:
        return None
    value = math.sqrt(2.0) * limit.value
    return replace(limit, quantity=Quantity(value, value, value, limit.quantity.dimension, f"crest of {limit.quantity.text}"))


class _OfProtection(Rule):
    """Rules that look at circuits whose protective device is stated."""

    def applies(self, circuit: CircuitStudy) -> bool:
        """Where a protective device is stated."""
        return circuit.entry.protection is not None


class OverloadCoordination(_OfProtection):
    """Load current, rating and ampacity in their order, and the conventional tripping current."""

    name = "overload-coordination"
    title = "Rating between load current and ampacity"
    purpose = "A rating above the ampacity lets the cable overheat unnoticed; one below the load current opens in service."
    applies_to = "circuits with a protective device"
    figures = ("current", "ampacity")
    states = ("steady",)
    needs = ("protection.rating", "cable with method, insulation, ambient and grouped_circuits", "the load's heat data")
    helps = "a rating between the load current and the ampacity, a larger section, or fewer circuits bunched together"
    limits = {
        "load_over_rating": LimitSpec(RATIO, "largest load current as a share of the rating"),
        "ampacity_over_rating": LimitSpec(RATIO, "smallest ampacity as a share of the rating"),
        "ampacity_over_tripping": LimitSpec(RATIO, "smallest ampacity as a share of the conventional tripping current"),
    }

    def check(self, circuit: CircuitStudy, limits: Limits) -> Iterator[Outcome]:
        """The load against the rating, the rating against each run."""
        rating = circuit.stated("protection.rating")
        tripping = circuit.data.data.get("protection.tripping_current")
        limit = share_of(limits.get("load_over_rating"), rating, "protection.rating")
        yield at_most(ask(circuit, "current", "steady"), limit, at=("protection",))
        if circuit.entry.cable is None:
            yield Unknown("ampacity", ("cable, or `cable: []` where there is none",), state="steady")
        for index in range(len(circuit.entry.cable or ())):
            asked = ask(circuit, "ampacity", "steady", f"cable[{index}]")
            yield at_least(asked, share_of(limits.get("ampacity_over_rating"), rating, "protection.rating", highest=True))
            limit = share_of(limits.get("ampacity_over_tripping"), tripping, "protection, conventional tripping current")
            yield at_least(asked, limit)


class NuisanceTrip(_OfProtection):
    """Switch-on peak and starting current against the current below which the device does not open at once."""

    name = "nuisance-trip"
    title = "Switch-on below the instantaneous band"
    purpose = "A device whose instantaneous band begins below the switch-on current opens on closing."
    applies_to = "circuits with a protective device"
    figures = ("current", "switch-on-peak")
    states = ("switch-on",)
    needs = ("protection.curve", "open_gap, or `armature: none`", "a load of coils, resistors and impedances in series")
    helps = "a device of a slower curve or a larger rating, as far as the cable and the fault loop allow"
    limits = {
        "share_of_band": LimitSpec(RATIO, "largest switch-on current as a share of the lower end of the instantaneous band"),
    }

    def check(self, circuit: CircuitStudy, limits: Limits) -> Iterator[Outcome]:
        """Rms against rms, and the first peak against the crest of the band's lower end."""
        holds = circuit.data.data.get("protection.holds_below")
        if holds is None:
            lack = circuit.data.lacks.get("protection.holds_below")
            yield Unknown("switch-on current", lack.needs if lack else (), lack.why if lack else "", "switch-on", ("protection",))
            return
        limit = share_of(limits.get("share_of_band"), holds, "protection, lower end of the instantaneous band")
        yield at_most(ask(circuit, "current", "switch-on"), limit, at=("protection",))
        peak = limit if circuit.system == "dc" else crest_of(limit)
        yield at_most(ask(circuit, "switch-on-peak", "switch-on"), peak, at=("protection",))


class BreakingCapacity(_OfProtection):
    """Prospective fault current at the device against what it can break."""

    name = "breaking-capacity"
    title = "Fault current within the breaking capacity"
    purpose = "A device that meets a fault current beyond its breaking capacity bursts."
    applies_to = "circuits with a protective device"
    figures = ("fault-current",)
    states = ("cold",)
    needs = ("protection.breaking_capacity", "supply.fault_current", "the feeders' cables")
    helps = "a device of a higher breaking capacity, or one ahead of it that limits the current"
    limits = {"share_of_capacity": LimitSpec(RATIO, "largest fault current as a share of the breaking capacity")}

    def check(self, circuit: CircuitStudy, limits: Limits) -> Iterator[Outcome]:
        """The fault current at the origin, or behind the feeders."""
        capacity = circuit.stated("protection.breaking_capacity")
        behind = circuit.feed.runs and circuit.stated("supply.fault_current") is not None
        asked = ask(circuit, "fault-current", "cold") if behind else stated(circuit, "supply.fault_current")
        if capacity is None:
            why = "what the device can break is not stated"
            yield Unknown("breaking capacity", ("protection.breaking_capacity",), why, at=("protection",))
            return
        limit = share_of(limits.get("share_of_capacity"), capacity, "protection.breaking_capacity")
        yield at_most(asked, limit, at=("protection",))


class FaultLoop(_OfProtection):
    """Smallest current of an earth fault at the far end against the current that opens the device in time."""

    name = "fault-loop"
    title = "Earth fault disconnected in time"
    purpose = "At the end of a long thin run an earth fault draws too little, and metal parts stay live."
    applies_to = "alternating-current circuits above 50 V to earth with a protective device"
    figures = ("smallest-fault-current",)
    states = ("steady",)
    needs = ("supply.earthing", "supply.loop_impedance", "protection.curve or residual_current", "cable protective_section")
    helps = "a larger section, a shorter run, a device of a faster curve, or a residual-current device"
    limits = {
        "over_operating": LimitSpec(RATIO, "smallest fault current as a share of the current that opens the device in time"),
    }

    def applies(self, circuit: CircuitStudy) -> bool:
        """On alternating current above extra-low voltage, where a device is stated."""
        to_earth = circuit.data.data["voltage to earth"].nominal
        return super().applies(circuit) and circuit.system != "dc" and to_earth > EXTRA_LOW

    def check(self, circuit: CircuitStudy, limits: Limits) -> Iterator[Outcome]:
        """The loop hot, all magnitudes added."""
        path = "protection.operating_current"
        operating = circuit.data.data.get(path)
        if operating is None:
            lack = circuit.data.lacks.get(path)
            yield Unknown("operating current", lack.needs if lack else (), lack.why if lack else "", at=("protection",))
            return
        limit = share_of(limits.get("over_operating"), operating, "protection, operating current", highest=True)
        yield at_least(ask(circuit, "smallest-fault-current", "steady"), limit, at=("protection",))


class FaultHeating(_OfProtection):
    """Let-through of the device against what the conductor's insulation withstands."""

    name = "fault-heating"
    title = "Conductor survives the fault"
    purpose = "A fault that is cleared too late for the conductor leaves its insulation damaged and the fire to come."
    applies_to = "circuits with a protective device and a cable"
    figures = ("withstand-energy",)
    states = ("cold",)
    needs = ("protection.let_through, from the maker's sheet at the fault current", "cable section and insulation")
    helps = "a larger section, or a device that limits the let-through"
    limits = {"over_let_through": LimitSpec(RATIO, "smallest k²S² of a conductor as a share of the let-through")}

    def applies(self, circuit: CircuitStudy) -> bool:
        """Where a device is stated, unless it is stated that there is no cable."""
        return super().applies(circuit) and circuit.entry.cable != []

    def check(self, circuit: CircuitStudy, limits: Limits) -> Iterator[Outcome]:
        """Each run from the device on."""
        let_through = circuit.stated("protection.let_through")
        if let_through is None:
            why = "what the device lets through is not stated"
            yield Unknown("let-through", ("protection.let_through",), why, at=("protection",))
            return
        if circuit.entry.cable is None:
            yield Unknown("withstand-energy", ("cable, or `cable: []` where there is none",))
        limit = share_of(limits.get("over_let_through"), let_through, "protection.let_through", highest=True)
        for index in range(len(circuit.entry.cable or ())):
            yield at_least(ask(circuit, "withstand-energy", "cold", f"cable[{index}]"), limit)
