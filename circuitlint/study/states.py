"""The states a circuit is studied in."""

from __future__ import annotations

from collections.abc import Collection
from dataclasses import dataclass


@dataclass(frozen=True, slots=True)
class State:
    """One state: what runs, how warm it is, which gap and which source.

    `hot` lets windings and conductors settle at their own temperatures. `open_gap` takes the coil with its armature open.
    `source` is `as supplied`, `direct current` at the supply's nominal voltage, `alternating current` likewise at mains
    frequency, or `other frequency`: 60 Hz where 50 Hz is meant and the other way round.
    """

    name: str
    title: str
    hot: bool = False
    open_gap: bool = False
    source: str = "as supplied"
    mistake: bool = False


STEADY = State("steady", "running, windings and conductors at their own temperatures", hot=True)
COLD = State("cold", "running, everything still at its surroundings' temperature")
SWITCH_ON = State("switch-on", "the moment after closing: armature open, winding cold, conductors cold or warm", open_gap=True)
DIRECT_CURRENT = State(
    "direct-current", "mistake: the same voltage as direct current, winding cold", source="direct current", mistake=True
)

STUCK_OPEN = State(
    "stuck-open", "mistake: running with the armature held open, everything at the temperature that brings", hot=True,
    open_gap=True, mistake=True,
)
OTHER_FREQUENCY = State(
    "other-frequency", "mistake: 60 Hz where 50 Hz is meant, or 50 Hz where 60 Hz is meant, hot", hot=True,
    source="other frequency", mistake=True,
)
ALTERNATING_CURRENT = State(
    "alternating-current", "mistake: the same voltage as alternating current of 50 Hz, winding cold",
    source="alternating current", mistake=True,
)

ON_ALTERNATING = (COLD, STEADY, SWITCH_ON, STUCK_OPEN, DIRECT_CURRENT, OTHER_FREQUENCY)
ON_DIRECT = (COLD, STEADY, SWITCH_ON, ALTERNATING_CURRENT)
STATES: dict[str, State] = {state.name: state for state in (*ON_ALTERNATING, ALTERNATING_CURRENT)}


def states_of(system: str, wanted: Collection[str] | None = None) -> tuple[State, ...]:
    """The states that make sense on a supply, or those of them that are wanted by name."""
    states = ON_DIRECT if system == "dc" else ON_ALTERNATING
    return tuple(state for state in states if wanted is None or state.name in wanted)
