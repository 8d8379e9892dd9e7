"""A study that rules may read and not change: arrays and mappings are closed, and what could still be changed is watched.

Rules share one study. Closing costs a little once for each shape of circuit; watching costs a few comparisons for each
circuit. Where something was changed, it is put back.
"""

from __future__ import annotations

from collections.abc import Callable, Iterable, Mapping
from operator import attrgetter, is_
from types import MappingProxyType
from typing import Any

import numpy as np
from pydantic import BaseModel

from circuitlint.quantity import Quantity
from circuitlint.study.data import DataSheet
from circuitlint.study.feeding import BoardState
from circuitlint.study.solving import Solution
from circuitlint.study.study import CircuitStudy
from circuitlint.study.worksheet import Worksheet

_OF_QUANTITY = tuple(name for name in Quantity.__slots__ if name != "__weakref__")
_quantity = attrgetter(*_OF_QUANTITY)


def _names_of(kind: type[Any], *but: str) -> tuple[tuple[str, ...], Callable[[Any], tuple[Any, ...]]]:
    names = tuple(name for name in kind.__slots__ if name not in but)
    return names, attrgetter(*names)


_NAMES: dict[type[Any], tuple[tuple[str, ...], Callable[[Any], tuple[Any, ...]]]] = {
    CircuitStudy: _names_of(CircuitStudy, "places"),
    DataSheet: _names_of(DataSheet),
    Solution: _names_of(Solution),
    Worksheet: _names_of(Worksheet, "slims"),
    BoardState: _names_of(BoardState),
}
"""What the names of a study's objects stand for; left out are the caches that the tool itself fills on the way."""


def seal(circuits: Iterable[CircuitStudy]) -> None:
    """Close the arrays and mappings of finished studies against writing."""
    done: set[int] = set()
    for circuit in circuits:
        if id(circuit.boards) not in done:
            done.add(id(circuit.boards))
            _seal_boards(circuit.boards)
        for name in ("solutions", "boards"):
            _close(circuit, name)
        for name in ("data", "tokens", "lacks"):
            _close(circuit.data, name)
        for solution in circuit.solutions.values():
            if id(solution) not in done:
                done.add(id(solution))
                _seal_solution(solution)


def _seal_boards(boards: Mapping[str, BoardState]) -> None:
    for board in boards.values():
        for name in ("voltages", "currents", "drops"):
            _close(board, name)


def _seal_solution(solution: Solution) -> None:
    for array in (solution.nominal, solution.lowest, solution.highest, *solution.values.values()):
        while isinstance(array, np.ndarray):
            array.flags.writeable = False
            array = array.base
    for name in ("values", "row"):
        _close(solution, name)
    for name in ("lines", "faulty"):
        setattr(solution, name, tuple(getattr(solution, name)))
    solution.moved_by = tuple(map(tuple, solution.moved_by))  # type: ignore[assignment]
    sheet: Worksheet = solution.sheet
    for name in ("lacks", "index", "assumed"):
        _close(sheet, name)
    for name in ("lines", "feedback", "before", "sweep", "rest"):
        setattr(sheet, name, tuple(getattr(sheet, name)))


def _close(owner: object, name: str) -> None:
    mapping = getattr(owner, name)
    if not isinstance(mapping, MappingProxyType):
        setattr(owner, name, MappingProxyType(mapping))


class Watch:
    """What one circuit's rules could still change, as it was: entries, lists and what the study's own names stand for."""

    __slots__ = ("dicts", "lists", "objects", "quantities")

    def __init__(self, circuit: CircuitStudy) -> None:
        objects: list[Any] = [circuit, circuit.data]
        objects += (circuit.boards[name] for name in circuit.feed.boards if name in circuit.boards)
        for one in circuit.solutions.values():
            objects += (one, one.sheet)
        self.objects = [(one, *_NAMES[type(one)], _NAMES[type(one)][1](one)) for one in objects]
        self.dicts: list[tuple[dict[str, Any], dict[str, Any]]] = []
        self.lists: list[tuple[list[Any], list[Any]]] = []
        self.quantities: list[tuple[Quantity, tuple[Any, ...]]] = []
        self._walk(circuit.definition.entry)
        self._walk(circuit.supply)
        for _, run in circuit.feed.runs:
            self._walk(run)

    def _walk(self, value: object) -> None:
        if isinstance(value, Quantity):
            self.quantities.append((value, _quantity(value)))
        elif isinstance(value, BaseModel):
            inside = value.__dict__
            self.dicts.append((inside, inside.copy()))
            for one in inside.values():
                if one is not None and not isinstance(one, str):
                    self._walk(one)
        elif isinstance(value, list):
            self.lists.append((value, value.copy()))
            for one in value:
                self._walk(one)
        elif isinstance(value, dict):
            self.dicts.append((value, value.copy()))
            for one in value.values():
                self._walk(one)

    def untouched(self) -> bool:
        """Whether everything is as it was."""
        for now, then in self.dicts:
            if now != then:
                return False
        for items, kept in self.lists:
            if items != kept:
                return False
        for quantity, given in self.quantities:
            if _quantity(quantity) != given:
                return False
        return all(_same(given(one), then) for one, _, given, then in self.objects)

    def put_back(self) -> None:
        """Make everything as it was."""
        for names, owner, values in (
            *((names, one, then) for one, names, _, then in self.objects),
            *((_OF_QUANTITY, one, given) for one, given in self.quantities),
        ):
            for name, value in zip(names, values, strict=True):
                object.__setattr__(owner, name, value)
        for now, then in self.dicts:
            now.clear()
            now.update(then)
        for items, kept in self.lists:
            items[:] = kept


def _same(one: tuple[Any, ...], other: tuple[Any, ...]) -> bool:
    return all(map(is_, one, other))


def closed(limits: Mapping[str, Any]) -> Mapping[str, Any]:
    """A mapping that can only be read."""
    return MappingProxyType(dict(limits))
