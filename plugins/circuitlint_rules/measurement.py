"""What the test meter has to carry."""

from __future__ import annotations

from collections.abc import Iterator

from circuitlint.authoring import (
    RATIO,
    CircuitStudy,
    Holds,
    Limits,
    LimitSpec,
    Outcome,
    Rule,
    Unknown,
    ask,
    at_most,
    share_of,
)

LOOP_STATES = ("cold", "steady", "direct-current")


class MeterRange(Rule):
    """Every current the meter's loop can carry, foreseeable mistakes included, against its input, its fuse and its duty."""

    name = "meter-range"
    title = "Current through the test meter"
    purpose = "A meter beyond its input blows its fuse, burns, or opens the loop of an inductive circuit under current."
    applies_to = "circuits with a meter"
    figures = ("current", "switch-on-peak")
    states = (*LOOP_STATES, "switch-on")
    needs = ("meter range, fuse, connection, continuous current, longest and reading time", "open gap", "the coil's data")
    helps = "a clamp instead of an input in the loop, a larger range, or a shunt made for the current"
    limits = {
        "share_of_range": LimitSpec(RATIO, "largest running current as a share of the range"),
        "share_of_fuse": LimitSpec(RATIO, "largest running current as a share of the fuse's rating"),
        "peak_share_of_range": LimitSpec(RATIO, "largest switch-on peak as a share of the range"),
        "peak_share_of_fuse": LimitSpec(RATIO, "largest switch-on peak as a share of the fuse's rating"),
        "share_of_continuous": LimitSpec(RATIO, "largest running current without a time limit, as a share of what is allowed"),
        "share_of_longest": LimitSpec(RATIO, "longest reading as a share of the time the input may carry its range"),
    }

    def applies(self, circuit: CircuitStudy) -> bool:
        """Where a meter is named."""
        return circuit.entry.meter is not None

    def check(self, circuit: CircuitStudy, limits: Limits) -> Iterator[Outcome]:
        """Range and fuse in every state; duty in the running states."""
        meter = circuit.entry.meter
        assert meter is not None
        if meter.connection is None:
            yield Unknown("connection", ("meter.connection",), "in the loop or around it is not stated", at=("meter",))
        states = [state for state in LOOP_STATES if state in circuit.states()]
        if meter.connection == "clamp":
            states.remove("direct-current") if "direct-current" in states else None
        yield from self._against(circuit, limits, states, "range")
        if meter.connection == "clamp":
            return
        if meter.range is not None and meter.fuse is not None and meter.fuse.low >= meter.range.low:
            told = f"the fuse of {meter.fuse.text} is no smaller than the range, so the range decides"
            yield Holds("fuse", told, at=("meter", "fuse"))
        else:
            yield from self._against(circuit, limits, states, "fuse")
        yield from self._duty(circuit, limits)

    def _against(self, circuit: CircuitStudy, limits: Limits, states: list[str], word: str) -> Iterator[Outcome]:
        meter = circuit.entry.meter
        assert meter is not None
        rating = getattr(meter, word)
        at = ("meter", word)
        if rating is None:
            yield Unknown(f"current against {word}", (f"meter.{word}",), f"the meter's {word} is not stated", at=("meter",))
            return
        for state in states:
            limit = share_of(limits.get(f"share_of_{word}"), rating, f"meter.{word}")
            yield at_most(ask(circuit, "current", state), limit, at=at)
        if meter.connection != "clamp":
            limit = share_of(limits.get(f"peak_share_of_{word}"), rating, f"meter.{word}")
            yield at_most(ask(circuit, "switch-on-peak", "switch-on"), limit, at=at)

    def _duty(self, circuit: CircuitStudy, limits: Limits) -> Iterator[Outcome]:
        """Either the input carries the current without a time limit, or the reading is short enough."""
        meter = circuit.entry.meter
        assert meter is not None
        if meter.longest is not None and meter.reading_time is not None:
            limit = limits.get("share_of_longest")
            if limit is None:
                yield Unknown("reading time", (), "the ruleset gives no limit", at=("meter",))
            elif meter.reading_time.high <= limit.value * meter.longest.low:
                told = f"a reading of {meter.reading_time.text} is within the {meter.longest.text} the input may carry its range"
                yield Holds("duty time", told, at=("meter", "reading_time"))
                return
        if meter.continuous is None:
            needs = tuple(f"meter.{word}" for word in ("longest", "reading_time") if getattr(meter, word) is None)
            why = "how long the input may carry the current is not stated"
            yield Unknown("duty time", needs or ("meter.continuous",), why, at=("meter",))
            return
        limit = share_of(limits.get("share_of_continuous"), meter.continuous, "meter.continuous")
        help = "a shorter reading, with a rest, as the meter's sheet allows"
        for state in ("cold", "steady"):
            yield at_most(ask(circuit, "current", state), limit, at=("meter", "continuous"), help=help)
