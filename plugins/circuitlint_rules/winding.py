"""What a winding bears: heat in service and with its armature held open, pulling in while hot, saturation."""

from __future__ import annotations

from collections.abc import Iterator

from circuitlint.authoring import (
    RATIO,
    TEMPERATURE,
    CircuitStudy,
    Fact,
    Limits,
    LimitSpec,
    Outcome,
    Rule,
    Unknown,
    ask,
    at_most,
    path_of,
    runs_away,
    share_of,
    stated,
)

CLASSES = ("105", "120", "130", "155", "180", "200")
CLASS_LIMITS = {f"class_{one}": LimitSpec(TEMPERATURE, f"highest winding temperature of class {one}") for one in CLASSES}


def against_its_class(circuit: CircuitStudy, limits: Limits, place: str, state: str) -> Outcome:
    """A winding's temperature in a state against its thermal class; a winding that does not settle is a finding."""
    asked = ask(circuit, "winding-temperature", state, place)
    at = (*path_of(place), "thermal_class")
    thermal_class = circuit.choice(f"{place}.thermal_class")
    if runs_away(asked):
        what = f"the winding temperature of {place} ({state}) does not settle within the tolerances: the winding runs away"
        return Fact(f"winding temperature of {place}", what, state=state, at=at)
    if not thermal_class:
        why = "which temperature its insulation bears is not stated"
        return Unknown(f"winding temperature of {place}", (f"{place}.thermal_class",), why, state=state, at=at)
    return at_most(asked, limits.get(f"class_{thermal_class}"), at=at)


class WindingTemperature(Rule):
    """Self-consistent winding temperature against the thermal class, and the time on against the rated duty."""

    name = "winding-temperature"
    title = "Temperature of the winding"
    purpose = "A winding above its insulation's class ages within months; a coil made for short times burns when left on."
    applies_to = "circuits with a coil"
    figures = ("winding-temperature",)
    states = ("steady",)
    needs = ("thermal_class", "temperature_rise or thermal_resistance", "ambient", "duty, where the coil has a rated_duty")
    helps = "a cooler place, a coil of a higher class or a longer duty, or a lower supply voltage"
    limits = {**CLASS_LIMITS, "share_of_duty": LimitSpec(RATIO, "largest time on as a share of the rated duty")}

    def applies(self, circuit: CircuitStudy) -> bool:
        """Where there is a coil."""
        return bool(circuit.leaves("coil"))

    def check(self, circuit: CircuitStudy, limits: Limits) -> Iterator[Outcome]:
        """Each coil by itself; a mean over the winding, with hot spots above it."""
        for place in circuit.leaves("coil"):
            yield against_its_class(circuit, limits, place, "steady")
            rated = circuit.stated(f"{place}.rated_duty")
            if rated is not None:
                limit = share_of(limits.get("share_of_duty"), rated, f"{place}.rated_duty")
                yield at_most(stated(circuit, "duty"), limit, at=("duty",))


class StuckOpen(Rule):
    """Winding temperature with the armature held open, as dirt, a jam or a low voltage hold it."""

    name = "stuck-open"
    title = "Armature held open"
    purpose = "On alternating current an open gap lets the closing current flow on, and the coil burns within minutes."
    applies_to = "alternating-current circuits with a coil that has an armature"
    figures = ("winding-temperature",)
    states = ("stuck-open",)
    needs = ("open_gap, or `armature: none`", "thermal_class", "temperature_rise or thermal_resistance", "ambient")
    helps = "a travel switch or a thermal cut-out that opens the circuit, a direct-current coil, or a free linkage"
    limits = CLASS_LIMITS

    def applies(self, circuit: CircuitStudy) -> bool:
        """On alternating current, where a coil may have an armature."""
        return circuit.system != "dc" and bool(self._armatures(circuit))

    def _armatures(self, circuit: CircuitStudy) -> list[str]:
        return [place for place in circuit.leaves("coil") if circuit.choice(f"{place}.armature") != "none"]

    def check(self, circuit: CircuitStudy, limits: Limits) -> Iterator[Outcome]:
        """Each coil that may have an armature."""
        for place in self._armatures(circuit):
            yield against_its_class(circuit, limits, place, "stuck-open")


class PullInWhenHot(Rule):
    """Hot pull-in voltage of a direct-current coil against the voltage that reaches it."""

    name = "pull-in-when-hot"
    title = "Pull-in with a hot winding"
    purpose = "A hot winding draws less current from the same voltage; a valve or relay that ran warm fails to close again."
    applies_to = "direct-current circuits with a coil that has an armature"
    figures = ("pull-in-share",)
    states = ("steady",)
    needs = ("pull_in_voltage at 20 °C", "temperature_rise or thermal_resistance", "ambient", "cable")
    helps = "a coil with a lower pull-in voltage, a cooler place, a larger section, or a higher supply voltage"
    limits = {"share_of_voltage": LimitSpec(RATIO, "largest hot pull-in voltage as a share of the voltage at the coil")}

    def applies(self, circuit: CircuitStudy) -> bool:
        """On direct current, where a coil may have an armature."""
        return circuit.system == "dc" and any(circuit.choice(f"{one}.armature") != "none" for one in circuit.leaves("coil"))

    def check(self, circuit: CircuitStudy, limits: Limits) -> Iterator[Outcome]:
        """Each coil that may have an armature."""
        for place in circuit.leaves("coil"):
            if circuit.choice(f"{place}.armature") == "none":
                continue
            path = f"{place}.pull_in_voltage"
            if circuit.stated(path) is None:
                yield Unknown("pull-in-share", (path,), "the voltage it pulls in at is not stated", "steady", path_of(place))
            else:
                yield at_most(ask(circuit, "pull-in-share", "steady", place), limits.get("share_of_voltage"))


class SaturationCurrent(Rule):
    """The current through a coil against the current up to which its inductance holds."""

    name = "saturation-current"
    title = "Current below saturation"
    purpose = "Above saturation the inductance falls, and a choke draws far more than its nominal inductance suggests."
    applies_to = "circuits with a coil whose saturation current is stated"
    figures = ("current@load",)
    states = ("cold",)
    needs = ("saturation_current, a peak value", "the coil's data")
    helps = "a choke with a larger gap or core, or a smaller current"
    limits = {
        "direct": LimitSpec(RATIO, "largest direct current as a share of the saturation current"),
        "alternating": LimitSpec(RATIO, "largest rms current as a share of the saturation current, which is a peak"),
    }

    def applies(self, circuit: CircuitStudy) -> bool:
        """Where a coil states it."""
        return any(circuit.stated(f"{one}.saturation_current") is not None for one in circuit.leaves("coil"))

    def check(self, circuit: CircuitStudy, limits: Limits) -> Iterator[Outcome]:
        """Each coil that states it; the current is largest while the winding is cold."""
        limit = limits.get("direct" if circuit.system == "dc" else "alternating")
        for place in circuit.leaves("coil"):
            path = f"{place}.saturation_current"
            datum = circuit.stated(path)
            if datum is not None:
                yield at_most(ask(circuit, "current", "cold", place), share_of(limit, datum, path))
