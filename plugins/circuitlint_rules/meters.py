"""Whether the test meter fits the place, the current and the winding it is used on."""

from __future__ import annotations

from collections.abc import Iterator

from circuitlint.authoring import (
    ENERGY,
    RATIO,
    VOLTAGE,
    CircuitStudy,
    Fact,
    Holds,
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
)

RANK = {"II": 2, "III": 3, "IV": 4}


class _OfMeter(Rule):
    """Rules that look at circuits with a test meter."""

    def applies(self, circuit: CircuitStudy) -> bool:
        """Where a meter is named."""
        return circuit.entry.meter is not None


class MeterCategory(_OfMeter):
    """Measurement category and voltage of the meter against the place it is used in."""

    name = "meter-category"
    title = "Meter's category fits the place"
    purpose = "A transient at the place of use flashes over in a meter of too low a category, in somebody's hand."
    applies_to = "alternating-current circuits above 50 V with a meter"
    figures = ("voltage",)
    states = ("cold",)
    needs = ("meter.category, as marked", "supply.measurement_category")
    helps = "a meter marked for the category and voltage of the place"
    limits = {"share_of_voltage": LimitSpec(RATIO, "largest voltage as a share of the voltage the category is marked with")}

    def applies(self, circuit: CircuitStudy) -> bool:
        """On alternating current above extra-low voltage."""
        return super().applies(circuit) and circuit.system != "dc" and circuit.data.data["voltage to earth"].nominal > 50.0

    def check(self, circuit: CircuitStudy, limits: Limits) -> Iterator[Outcome]:
        """The category's rank, and its voltage."""
        meter, place = circuit.entry.meter, circuit.supply.measurement_category
        assert meter is not None
        at = ("meter", "category")
        told = {"meter.category": meter.category, "supply.measurement_category": place}
        lacking = tuple(path for path, one in told.items() if not one)
        if lacking:
            yield Unknown("measurement category", lacking, "the category of meter or place is not stated", at=("meter",))
        if meter.category is None:
            return
        _, mark, volts, _ = meter.category.split()
        if place is not None and RANK[mark] < RANK[place]:
            what = f"a meter of CAT {mark} is used where CAT {place} is wanted"
            yield Fact("measurement category", what, why="IEC 61010-1, measurement categories", at=at)
        elif place is not None:
            yield Holds("measurement category", f"a meter of CAT {mark} is used where CAT {place} is wanted", at=at)
        marked = Quantity.of(float(volts), VOLTAGE)
        yield at_most(ask(circuit, "voltage", "cold"), share_of(limits.get("share_of_voltage"), marked, "meter.category"), at=at)


class MeterBurden(_OfMeter):
    """Voltage lost in the meter's input against the voltage of the circuit."""

    name = "meter-burden"
    title = "Meter leaves the current as it is"
    purpose = "In a loop of low voltage the meter's own burden lowers the current that is to be read."
    applies_to = "circuits with a meter in the loop whose burden is stated"
    figures = ("burden-voltage",)
    states = ("cold",)
    needs = ("meter.burden_voltage at full range", "meter.range")
    helps = "a larger range, or a clamp"
    limits = {"share_of_voltage": LimitSpec(RATIO, "largest burden voltage as a share of the circuit's nominal voltage")}

    def applies(self, circuit: CircuitStudy) -> bool:
        """Where a meter in the loop states its burden."""
        return circuit.stated("meter.burden_voltage") is not None

    def check(self, circuit: CircuitStudy, limits: Limits) -> Iterator[Outcome]:
        """Cold, where the current is largest."""
        nominal = circuit.data.data["supply.nominal_voltage"]
        limit = share_of(limits.get("share_of_voltage"), nominal, "supply.voltage")
        yield at_most(ask(circuit, "burden-voltage", "cold"), limit, at=("meter",))


class MeterResolution(_OfMeter):
    """The smallest current to be read against one count of the last place."""

    name = "meter-resolution"
    title = "Meter resolves the current"
    purpose = "A current of few counts is read with an uncertainty that hides what the reading is for."
    applies_to = "circuits with a meter whose resolution is stated"
    figures = ("current",)
    states = ("steady",)
    needs = ("meter.resolution", "the load's data")
    helps = "a smaller range, or a meter of finer resolution"
    limits = {"counts": LimitSpec(RATIO, "smallest current in counts of the last place")}

    def applies(self, circuit: CircuitStudy) -> bool:
        """Where a meter states its resolution."""
        return circuit.stated("meter.resolution") is not None

    def check(self, circuit: CircuitStudy, limits: Limits) -> Iterator[Outcome]:
        """Hot, where the current is smallest."""
        limit = share_of(limits.get("counts"), circuit.stated("meter.resolution"), "meter.resolution", highest=True)
        yield at_least(ask(circuit, "current", "steady"), limit, at=("meter",))


class MeterWaveform(_OfMeter):
    """What the meter makes of a current that is not a sine wave."""

    name = "meter-waveform"
    title = "Meter reads the current's true rms"
    purpose = "An average-responding meter reads low on the distorted current of a coil with an iron core."
    applies_to = "alternating-current circuits with a coil and a meter"
    figures = ()
    states = ()
    needs = ("meter.responds",)
    helps = "a meter that reads true rms"

    def applies(self, circuit: CircuitStudy) -> bool:
        """On alternating current, where there is a coil and the meter says how it responds."""
        return super().applies(circuit) and circuit.system != "dc" and bool(circuit.leaves("coil"))

    def check(self, circuit: CircuitStudy, limits: Limits) -> Iterator[Outcome]:
        """A matter of kind."""
        meter = circuit.entry.meter
        assert meter is not None
        at = ("meter",)
        if meter.responds is None:
            yield Unknown("waveform", ("meter.responds",), "whether it reads true rms is not stated", at=at)
        elif meter.responds == "average":
            yield Fact("waveform", "the meter responds to the average, and a coil's current may be distorted", at=at)
        else:
            yield Holds("waveform", "the meter reads true rms", at=at)


class OhmmeterOnACoil(_OfMeter):
    """Energy that the meter's own test current stores in a winding."""

    name = "ohmmeter-on-a-coil"
    title = "Energy in a winding under resistance test"
    purpose = "When the leads come off a large winding its stored energy breaks the meter and shocks the person who holds it."
    applies_to = "circuits with a coil and a meter whose test current is stated"
    figures = ("test-energy",)
    states = ("cold",)
    needs = ("meter.test_current", "the coil's inductance")
    helps = "a smaller test current, and the winding short-circuited before the leads come off"
    limits = {"largest_energy": LimitSpec(ENERGY, "largest energy stored by the test current")}

    def applies(self, circuit: CircuitStudy) -> bool:
        """Where a meter states its test current, and there is a coil."""
        return circuit.stated("meter.test_current") is not None and bool(circuit.leaves("coil"))

    def check(self, circuit: CircuitStudy, limits: Limits) -> Iterator[Outcome]:
        """Each coil, armature closed."""
        for place in circuit.leaves("coil"):
            yield at_most(ask(circuit, "test-energy", "cold", place), limits.get("largest_energy"))
