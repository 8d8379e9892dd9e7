"""The states a circuit is studied in."""

from __future__ import annotations

from dataclasses import dataclass


@dataclass(frozen=True, slots=True)
class State:
    """One state: what runs, how warm it is, which gap and which source.

    `hot` lets windings and conductors settle at their own temperatures. `open_gap` takes the coil with its armature open.
    `source` is `as supplied` or `direct current` at the supply's nominal voltage.
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

STATES: dict[str, State] = {state.name: state for state in (STEADY, COLD, SWITCH_ON, DIRECT_CURRENT)}


def states_of(system: str) -> tuple[State, ...]:
    """The states that make sense on a supply: the mistake of direct current only where alternating current is meant."""
    return (COLD, STEADY, SWITCH_ON) if system == "dc" else (COLD, STEADY, SWITCH_ON, DIRECT_CURRENT)
