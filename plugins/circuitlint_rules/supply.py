"""What the supply sees and what reaches the load: power factor, voltage drop, the coil's band."""

from __future__ import annotations

from collections.abc import Iterator

from circuitlint.authoring import (
    RATIO,
    VOLTAGE,
    CircuitStudy,
    Datum,
    Figure,
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
)


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


class OperatingVoltage(Rule):
    """Voltage at the coil's own terminals against the band it works in."""

    name = "operating-voltage"
    title = "Coil voltage within its band"
    purpose = "Below its band a coil chatters or does not close, and a contactor's contacts weld; above it the coil overheats."
    applies_to = "circuits with a coil that has an armature"
    figures = ("voltage@load",)
    states = ("switch-on", "cold", "steady")
    needs = ("rated_voltage", "lowest_voltage and highest_voltage, as shares of it", "open_gap", "cable")
    helps = "a larger section, a shorter run, a coil of another rated voltage or a wider band, or a steadier supply"
    limits = {
        "share_of_lower": LimitSpec(RATIO, "smallest voltage at switch-on as a share of the lower end of the coil's band"),
        "share_of_upper": LimitSpec(RATIO, "largest voltage in service as a share of the upper end of the coil's band"),
    }

    def applies(self, circuit: CircuitStudy) -> bool:
        """Where a coil may have an armature."""
        return any(circuit.choice(f"{place}.armature") != "none" for place in circuit.leaves("coil"))

    def check(self, circuit: CircuitStudy, limits: Limits) -> Iterator[Outcome]:
        """At switch-on against the lower end, running against the upper end."""
        for place in circuit.leaves("coil"):
            if circuit.choice(f"{place}.armature") == "none":
                continue
            path = f"{place}.rated_voltage"
            rated = circuit.data.data.get(path) if circuit.choice(path) else None
            if rated is None:
                yield Unknown(f"voltage of {place}", (path,), "the voltage it is made for is not stated", at=path_of(place))
                continue
            yield from self._end(circuit, limits, place, rated, "lowest_voltage")
            yield from self._end(circuit, limits, place, rated, "highest_voltage")

    def _end(self, circuit: CircuitStudy, limits: Limits, place: str, rated: Datum, word: str) -> Iterator[Outcome]:
        """One end of the band, a share of the rated voltage."""
        path, least = f"{place}.{word}", word == "lowest_voltage"
        stated = circuit.stated(path)
        if stated is None:
            why = "between which shares of its rated voltage it works is not stated; 85 % and 110 % are usual (IEC 60947-4-1)"
            yield Unknown(f"{word.replace('_', ' ')} of {place}", (path,), why, at=path_of(place))
            return
        share = stated.high if least else stated.low
        end = Quantity.of(share * rated.nominal, VOLTAGE)
        if least:
            limit = share_of(limits.get("share_of_lower"), end, path, highest=True)
            yield at_least(ask(circuit, "voltage", "switch-on", place), limit)
            return
        for state in ("cold", "steady"):
            yield at_most(ask(circuit, "voltage", state, place), share_of(limits.get("share_of_upper"), end, path))
