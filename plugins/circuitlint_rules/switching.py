"""Contacts and outputs that switch coils: duty, switch-off, release, coils that are held in."""

from __future__ import annotations

from collections.abc import Iterator

from circuitlint.authoring import (
    RATIO,
    CircuitStudy,
    Fact,
    Holds,
    Limits,
    LimitSpec,
    Outcome,
    Rule,
    Unknown,
    ask,
    at_least,
    at_most,
    share_of,
    stated,
)

FOR_RESISTANCE = ("AC-1", "AC-12", "DC-12")


class _OfSwitching(Rule):
    """Rules that look at circuits whose contact or output is stated."""

    def applies(self, circuit: CircuitStudy) -> bool:
        """Where a contact or an output is stated."""
        return circuit.entry.switching is not None


class ContactDuty(_OfSwitching):
    """Current made and broken, voltage and slowness against the contact's category or pilot-duty code."""

    name = "contact-duty"
    title = "Contact made for the load it switches"
    purpose = "An inductive load on a contact rated for resistance, or beyond its rating, welds it or burns it away."
    applies_to = "circuits with a contact or an output"
    figures = ("current", "voltage", "rise-time-share")
    states = ("cold", "switch-on")
    needs = ("switching.category", "switching.rated_current, for a category", "switching.rated_voltage", "open_gap")
    helps = "a contact of a higher rating or the right category, contacts in series, or an interposing contactor"
    limits = {
        "break_share": LimitSpec(RATIO, "largest current as a share of what the contact breaks"),
        "make_share": LimitSpec(RATIO, "largest switch-on current as a share of what the contact makes"),
        "voltage_share": LimitSpec(RATIO, "largest voltage as a share of the contact's rated voltage"),
        "rise_time_share": LimitSpec(RATIO, "largest time to 95 % of the current as a share of the time proven with"),
    }

    def check(self, circuit: CircuitStudy, limits: Limits) -> Iterator[Outcome]:
        """Category and current, voltage, and on direct current each coil's slowness."""
        switching = circuit.entry.switching
        assert switching is not None
        at = ("switching",)
        category = switching.category
        if category is not None and circuit.leaves("coil"):
            if category in FOR_RESISTANCE:
                what = f"the contact's category {category} is for resistive load, and it switches a coil"
                yield Fact("category", what, why="IEC 60947-4-1 and IEC 60947-5-1, use of the categories", at=at)
            elif "-" in category:
                wrong = category.startswith("AC" if circuit.system == "dc" else "DC")
                kind = "direct" if circuit.system == "dc" else "alternating"
                if wrong:
                    yield Fact("category", f"the contact's category {category} is not for {kind} current", at=at)
                else:
                    yield Holds("category", f"the contact's category {category} is for inductive load", at=at)
        for word, state in (("break", "cold"), ("make", "switch-on")):
            path = f"switching.{word}_current"
            rating = circuit.data.data.get(path)
            if rating is None:
                lack = circuit.data.lacks.get(path)
                yield Unknown(f"current to {word}", lack.needs if lack else (), lack.why if lack else "", state, at)
                continue
            limit = share_of(limits.get(f"{word}_share"), rating, f"switching, current to {word}")
            yield at_most(ask(circuit, "current", state), limit, at=at)
        # A pilot-duty code has a highest voltage, above which its currents are not tabled.
        if switching.rated_voltage is None and (category is None or "-" in category):
            yield Unknown("voltage", ("switching.rated_voltage",), "the contact's rated voltage is not stated", "cold", at)
        elif switching.rated_voltage is not None:
            limit = share_of(limits.get("voltage_share"), switching.rated_voltage, "switching.rated_voltage")
            yield at_most(ask(circuit, "voltage", "cold"), limit, at=at)
        if circuit.system == "dc" and category == "DC-13":
            for place in circuit.leaves("coil"):
                yield at_most(ask(circuit, "rise-time-share", "cold", place), limits.get("rise_time_share"))


class SwitchOffVoltage(Rule):
    """A suppressor that is there and fits the supply, and the peak it leaves against what the contact bears."""

    name = "switch-off-voltage"
    title = "Switch-off voltage held down"
    purpose = "An inductive load that is opened without a suppressor drives its current into the contact or the output."
    applies_to = "circuits with a coil, where a suppressor or the contact's withstand is stated"
    figures = ("switch-off-peak",)
    states = ("cold",)
    needs = ("suppressor.kind", "suppressor.clamp_voltage or resistance", "switching.withstand")
    helps = "a suppressor across the coil: a diode or a Zener diode on direct current, a varistor on either"
    limits = {"share_of_withstand": LimitSpec(RATIO, "largest peak as a share of what the contact or output bears")}

    def applies(self, circuit: CircuitStudy) -> bool:
        """Where there is a coil, and a suppressor or a withstand is stated."""
        switching, suppressor = circuit.entry.switching, circuit.entry.suppressor
        told = suppressor is not None or (switching is not None and switching.withstand is not None)
        return told and bool(circuit.leaves("coil"))

    def check(self, circuit: CircuitStudy, limits: Limits) -> Iterator[Outcome]:
        """Kind first, then the peak."""
        kind, at = circuit.choice("suppressor"), ("suppressor",)
        withstand = circuit.stated("switching.withstand")
        if not kind:
            yield Unknown("suppressor", ("suppressor",), "what holds the switch-off voltage down is not stated", "cold")
            return
        if kind == "none":
            what = "nothing holds the switch-off voltage down: it rises until the contact arcs or the output breaks down"
            yield Fact("suppressor", what, why="without a suppressor the peak is bounded by stray capacitance only", at=at)
            return
        if kind in ("diode", "zener") and circuit.system != "dc":
            part = "diode" if kind == "diode" else "Zener diode with its diode"
            why = "a varistor, or resistor and capacitor in series, bears both half-waves"
            yield Fact("suppressor", f"a {part} stands across a coil on alternating current", why=why, at=at)
            return
        yield Holds("suppressor", f"a {kind} stands across the load", at=at)
        if withstand is None:
            yield Unknown("switch-off-peak", ("switching.withstand",), "what the contact bears is not stated", "cold", at)
            return
        yield at_most(ask(circuit, "switch-off-peak", "cold"),
                      share_of(limits.get("share_of_withstand"), withstand, "switching.withstand"), at=at)


class ReleaseTime(Rule):
    """Time from opening to the drop-out current, through the suppressor."""

    name = "release-time"
    title = "Armature lets go in time"
    purpose = "A freewheel diode stretches the decay of the current: the brake grips late, the valve closes late."
    applies_to = "direct-current circuits with a coil and a demanded release time"
    figures = ("release-time",)
    states = ("cold",)
    needs = ("switching.release_within", "suppressor", "drop_out_current", "inductance")
    helps = "a suppressor of a higher clamp voltage: a diode with a Zener diode, or a varistor"
    limits = {"share_of_time": LimitSpec(RATIO, "largest release time as a share of the time demanded")}

    def applies(self, circuit: CircuitStudy) -> bool:
        """On direct current, where a time is demanded."""
        switching = circuit.entry.switching
        return circuit.system == "dc" and switching is not None and switching.release_within is not None

    def check(self, circuit: CircuitStudy, limits: Limits) -> Iterator[Outcome]:
        """The decay of the electrical current only; movement takes its time beyond it."""
        demanded = circuit.stated("switching.release_within")
        limit = share_of(limits.get("share_of_time"), demanded, "switching.release_within")
        yield at_most(ask(circuit, "release-time", "cold"), limit, at=("suppressor",))


class StoredEnergy(Rule):
    """Energy and mean power that switching off leaves in the suppressor, against its rating."""

    name = "stored-energy"
    title = "Suppressor bears the stored energy"
    purpose = "A varistor or Zener diode that takes more than its rating, or takes it too often, fails as a short circuit."
    applies_to = "circuits with a coil and a suppressor that clamps"
    figures = ("suppressor-energy", "suppressor-power", "stored-energy")
    states = ("cold",)
    needs = ("suppressor.energy", "suppressor.power and switching.operations", "inductance")
    helps = "a larger suppressor, or fewer operations"
    limits = {
        "share_of_energy": LimitSpec(RATIO, "largest energy of one operation as a share of the rating"),
        "share_of_power": LimitSpec(RATIO, "largest mean power as a share of the rating"),
    }

    def applies(self, circuit: CircuitStudy) -> bool:
        """Where a clamp takes the energy of a coil; a freewheel diode leaves it to the winding."""
        return circuit.choice("suppressor") in ("zener", "varistor") and bool(circuit.leaves("coil"))

    def check(self, circuit: CircuitStudy, limits: Limits) -> Iterator[Outcome]:
        """On direct current what the clamp takes; on alternating current all that is stored, which is not less."""
        at = ("suppressor",)
        rating = circuit.stated("suppressor.energy")
        if rating is None:
            yield Unknown("suppressor-energy", ("suppressor.energy",), "what it bears is not stated", "cold", at)
        else:
            limit = share_of(limits.get("share_of_energy"), rating, "suppressor.energy")
            if circuit.system == "dc":
                yield at_most(ask(circuit, "suppressor-energy", "cold"), limit, at=at)
            else:
                for place in circuit.leaves("coil"):
                    yield at_most(ask(circuit, "stored-energy", "cold", place), limit, at=at)
        power = circuit.stated("suppressor.power")
        if power is not None and circuit.system == "dc":
            limit = share_of(limits.get("share_of_power"), power, "suppressor.power")
            yield at_most(ask(circuit, "suppressor-power", "cold"), limit, at=at)


class HeldIn(Rule):
    """Current that flows on when the contact is open, against the current at which the coil has let go."""

    name = "held-in"
    title = "Coil lets go when the contact opens"
    purpose = "The capacitance of a long control cable, or a leaking output, keeps a coil closed after it was switched off."
    applies_to = "circuits with a coil, where a leakage current or the control cable's capacitance is stated"
    figures = ("held-in-share",)
    states = ("cold",)
    needs = ("drop_out_voltage and cable capacitance", "drop_out_current and switching.leakage_current")
    helps = "a burden across the coil, direct current, a shorter control cable, or an output without leakage"
    limits = {
        "share_of_capacitance": LimitSpec(RATIO, "largest cable capacitance as a share of what still lets the coil go"),
        "share_of_current": LimitSpec(RATIO, "largest leakage current as a share of the drop-out current"),
    }

    def applies(self, circuit: CircuitStudy) -> bool:
        """Where something is stated that flows on when the contact is open."""
        return bool(circuit.leaves("coil")) and (self._leaks(circuit) or self._couples(circuit))

    def _leaks(self, circuit: CircuitStudy) -> bool:
        return circuit.stated("switching.leakage_current") is not None

    def _couples(self, circuit: CircuitStudy) -> bool:
        return circuit.system != "dc" and any(run.capacitance is not None for run in circuit.entry.cable or ())

    def check(self, circuit: CircuitStudy, limits: Limits) -> Iterator[Outcome]:
        """Leakage against each coil's drop-out current, capacitance against what each coil permits."""
        if self._leaks(circuit):
            yield self._leakage(circuit, limits)
        for place in circuit.leaves("coil") if self._couples(circuit) else ():
            yield at_most(ask(circuit, "held-in-share", "cold", place), limits.get("share_of_capacitance"))

    def _leakage(self, circuit: CircuitStudy, limits: Limits) -> Outcome:
        """Against the coil that lets go at the smallest current: the leakage may flow through any of them alone."""
        paths = [f"{place}.drop_out_current" for place in circuit.leaves("coil")]
        held = {path: datum for path in paths if (datum := circuit.stated(path)) is not None}
        if len(held) < len(paths):
            needs = tuple(path for path in paths if path not in held)
            return Unknown("leakage current", needs, "the current it lets go at is not stated", at=("switching",))
        path = min(held, key=lambda one: held[one].low)
        limit = share_of(limits.get("share_of_current"), held[path], path)
        return at_most(stated(circuit, "switching.leakage_current"), limit, at=("switching",))


class MinimumContactLoad(_OfSwitching):
    """The smallest running current against the smallest the contact switches dependably."""

    name = "minimum-contact-load"
    title = "Enough current for the contact"
    purpose = "A contact that carries too little current does not clean itself, and its signal comes and goes."
    applies_to = "circuits with a contact whose smallest current is stated"
    figures = ("current",)
    states = ("cold", "steady")
    needs = ("switching.smallest_current", "the load's data")
    helps = "a contact with gilded faces, contacts in parallel, or a burden beside the load"
    limits = {"share_of_smallest": LimitSpec(RATIO, "smallest current as a share of what the contact needs")}

    def applies(self, circuit: CircuitStudy) -> bool:
        """Where the contact states it."""
        return circuit.stated("switching.smallest_current") is not None

    def check(self, circuit: CircuitStudy, limits: Limits) -> Iterator[Outcome]:
        """The running current, cold and hot."""
        needed = circuit.stated("switching.smallest_current")
        limit = share_of(limits.get("share_of_smallest"), needed, "switching.smallest_current", highest=True)
        for state in self.states:
            yield at_least(ask(circuit, "current", state), limit, at=("switching",))
