"""Boards as recorded: currents by conductor, the neutral's among them, power and power factor."""

from __future__ import annotations

import cmath
from collections.abc import Mapping

from circuitlint.definition.models import Board
from circuitlint.review.record import BoardRecord, Conductor
from circuitlint.study.feeding import BoardState


def records_of(states: Mapping[str, BoardState], boards: Mapping[str, Board]) -> tuple[BoardRecord, ...]:
    """The records of all boards that were solved, in the order of the definition."""
    return tuple(_record(states[name], board) for name, board in boards.items() if name in states)


def _record(state: BoardState, board: Board) -> BoardRecord:
    conductors = tuple(
        Conductor(name=name, voltage=abs(state.voltages[name]) if name in state.voltages else None, current=abs(current),
                  angle=cmath.phase(current) if abs(current) > 0.0 else 0.0)
        for name, current in state.currents.items()
    )
    alternating = state.system != "dc"
    return BoardRecord.model_validate({
        "name": state.name, "fed_from": board.fed_from, "system": state.system, "circuits": state.circuits,
        "conductors": conductors, "active_power": state.power.real, "reactive_power": state.power.imag,
        "power_factor": _factor(state.power) if alternating else None,
        "power_factor_uncorrected": _factor(state.power - state.correction) if alternating else None,
    })  # fmt: skip


def _factor(power: complex) -> float | None:
    return abs(power.real) / abs(power) if abs(power) > 0.0 else None
