"""What stands on the coil's plate: against the supply it is fed from, and against itself."""

from __future__ import annotations

from collections.abc import Iterator

from circuitlint.authoring import (
    RATIO,
    CircuitStudy,
    Fact,
    Figure,
    Holds,
    Lack,
    Limits,
    LimitSpec,
    Outcome,
    Rule,
    Unknown,
    ask,
    at_least,
    at_most,
    path_of,
    show_range,
)


class SupplyMatch(Rule):
    """Kind of current, and volts per hertz against the plate."""

    name = "supply-match"
    title = "Coil made for the supply it is fed from"
    purpose = (
        "An ac coil on direct current draws U/R and burns; a dc coil on alternating current hums and pulls weakly; too many "
        "volts per hertz saturate the core and heat it, too few let the armature drop."
    )
    applies_to = "circuits with a coil"
    figures = ("flux-ratio", "voltage-share")
    states = ("cold",)
    needs = ("made_for on the coil's plate", "rated_voltage and rated_frequency, for volts per hertz")
    helps = "a coil made for this supply, or the supply the coil is made for"
    limits = {
        "largest_flux": LimitSpec(RATIO, "largest volts per hertz over those of the plate; volts, on direct current"),
        "smallest_flux": LimitSpec(RATIO, "smallest volts per hertz over those of the plate; volts, on direct current"),
    }

    def applies(self, circuit: CircuitStudy) -> bool:
        """Where there is a coil."""
        return bool(circuit.leaves("coil"))

    def check(self, circuit: CircuitStudy, limits: Limits) -> Iterator[Outcome]:
        """Each coil by itself."""
        supplied = "direct current" if circuit.system == "dc" else "alternating current"
        for place in circuit.leaves("coil"):
            made_for = circuit.choice(f"{place}.made_for")
            at = path_of(place)
            aspect = f"kind of current of {place}"
            if not made_for:
                yield Unknown(aspect, (f"{place}.made_for",), "the kind of current the coil is made for is not stated", at=at)
            elif made_for != supplied:
                what = f"{place} is made for {made_for} and fed with {supplied}"
                yield Fact(aspect, what, why="the plate against the supply's system", at=at)
            else:
                yield Holds(aspect, f"{place} is made for {made_for}, as it is fed", at=at)
            yield from self._ratio(circuit, limits, place)

    def _ratio(self, circuit: CircuitStudy, limits: Limits, place: str) -> Iterator[Outcome]:
        """Volts per hertz, or volts on direct current; what the plate does not tell is not taken to fit the supply."""
        direct, at = circuit.system == "dc", path_of(place)
        words = ("rated_voltage",) if direct else ("rated_voltage", "rated_frequency")
        lacking = tuple(f"{place}.{word}" for word in words if not circuit.choice(f"{place}.{word}"))
        if lacking:
            yield Unknown(f"rating of {place}", lacking, "what the coil is made for is not stated in full", "cold", at)
            return
        asked = ask(circuit, "voltage-share" if direct else "flux-ratio", "cold", place)
        yield at_most(asked, limits.get("largest_flux"), at=at)
        yield at_least(asked, limits.get("smallest_flux"), at=at)


DERIVED = ("resistance", "reactance", "impedance", "quality_factor", "current", "active_power", "apparent_power", "power_factor")


class NameplateContradiction(Rule):
    """What is stated beyond need, against what follows from the rest of the plate."""

    name = "nameplate-contradiction"
    title = "Plate that contradicts itself"
    purpose = "Figures of a plate that do not fit each other tell of a wrong tap, a wrong frequency, a misprint or a wrong part."
    applies_to = "circuits with a coil whose plate tells more than enough, on alternating current"
    figures = tuple(f"derived-{word.replace('_', '-')}" for word in DERIVED)
    states = ("cold",)
    needs = ("more of the plate than a sufficient set",)
    helps = "read the plate again, measure the resistance, or ask the maker which figure holds"

    def applies(self, circuit: CircuitStudy) -> bool:
        """Where a coil's plate tells something that follows from the rest of it."""
        return circuit.system != "dc" and any(self._surplus(circuit, place) for place in circuit.leaves("coil"))

    def _surplus(self, circuit: CircuitStudy, place: str) -> list[str]:
        """Stated words that the winding was not made from."""
        used = circuit.made_from(place)
        return [word for word in DERIVED if circuit.stated(f"{place}.{word}") and f"{place}.{word}" not in used]

    def check(self, circuit: CircuitStudy, limits: Limits) -> Iterator[Outcome]:
        """Each surplus figure: the ranges must meet, the last printed digit counted."""
        for place in circuit.leaves("coil"):
            for word in self._surplus(circuit, place):
                stated = circuit.stated(f"{place}.{word}")
                found = circuit.figure(f"derived-{word.replace('_', '-')}", "cold", place)
                aspect, at = f"{word.replace('_', ' ')} of {place}", (*path_of(place), word)
                if stated is None or isinstance(found, Lack):
                    rated = tuple(f"{place}.{one}" for one in ("rated_voltage", "rated_frequency"))
                    needs = found.needs if isinstance(found, Lack) else ()
                    needs = needs or tuple(path for path in rated if not circuit.choice(path))
                    yield Unknown(aspect, needs, "it cannot be derived from the rest of the plate", state="cold", at=at)
                    continue
                yield self._meet(found, stated.low, stated.high, stated.text, aspect, at)

    def _meet(self, found: Figure, low: float, high: float, text: str, aspect: str, at: tuple[str | int, ...]) -> Outcome:
        slack = rounding(text, low, high)
        derived = show_range(found.lowest, found.highest, found.dimension)
        if found.lowest <= high + slack and found.highest >= low - slack:
            return Holds(aspect, f"the {aspect} is stated as {text} and follows as {derived}", state="cold", at=at)
        what = f"the {aspect} is stated as {text}, and follows from the rest of the plate as {derived}"
        return Fact(aspect, what, why="the two ranges do not meet", state="cold", at=at)


def rounding(text: str, low: float, high: float) -> float:
    """Half a unit of the last printed digit of a stated number, in the unit its ends are in."""
    number = "".join(letter for letter in text.partition("±")[0].partition(" ")[0] if letter.isdigit() or letter == ".")
    try:
        value = float(number)
    except ValueError:
        return 0.0
    places = len(number.partition(".")[2])
    return 0.5 * 10.0**-places / value * (low + high) / 2.0 if value else 0.0
