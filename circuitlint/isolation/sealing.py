"""A study that rules may read and not change: arrays and mappings are closed, and what could still be changed is watched.

Rules share one study. Closing costs a little once for each shape of circuit; watching costs a few comparisons for each
circuit. Where something was changed, it is put back.
"""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from operator import attrgetter
from types import MappingProxyType
from typing import Any

import numpy as np
from pydantic import BaseModel

from circuitlint.quantity import Quantity
from circuitlint.study.solving import Solution
from circuitlint.study.study import CircuitStudy
from circuitlint.study.worksheet import Worksheet

_OF_QUANTITY = tuple(name for name in Quantity.__slots__ if name != "__weakref__")
_quantity = attrgetter(*_OF_QUANTITY)
_OF_SOLUTION = tuple(Solution.__slots__)
_solution = attrgetter(*_OF_SOLUTION)
_OF_STUDY = tuple(name for name in CircuitStudy.__slots__ if name != "places")
_study = attrgetter(*_OF_STUDY)


def seal(circuits: Iterable[CircuitStudy]) -> None:
    """Close the arrays and mappings of finished studies against writing."""
    done: set[int] = set()
    for circuit in circuits:
        _close(circuit, "solutions")
        for name in ("data", "tokens", "lacks"):
            _close(circuit.data, name)
        for solution in circuit.solutions.values():
            if id(solution) not in done:
                done.add(id(solution))
                _seal_solution(solution)


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

    __slots__ = ("circuit", "dicts", "lists", "quantities", "solutions", "study")

    def __init__(self, circuit: CircuitStudy) -> None:
        self.circuit = circuit
        self.study = _study(circuit)
        self.solutions = [(one, _solution(one)) for one in circuit.solutions.values()]
        self.dicts: list[tuple[dict[str, Any], dict[str, Any]]] = []
        self.lists: list[tuple[list[Any], list[Any]]] = []
        self.quantities: list[tuple[Quantity, tuple[Any, ...]]] = []
        self._walk(circuit.definition.entry)
        self._walk(circuit.supply)

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
        if not _same(_study(self.circuit), self.study):
            return False
        for now, then in self.dicts:
            if now != then:
                return False
        for items, kept in self.lists:
            if items != kept:
                return False
        for quantity, given in self.quantities:
            if _quantity(quantity) != given:
                return False
        return all(_same(_solution(one), then) for one, then in self.solutions)

    def put_back(self) -> None:
        """Make everything as it was."""
        for names, owner, values in (
            (_OF_STUDY, self.circuit, self.study),
            *((_OF_SOLUTION, one, then) for one, then in self.solutions),
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
    return all(map(lambda a, b: a is b, one, other))


def closed(limits: Mapping[str, Any]) -> Mapping[str, Any]:
    """A mapping that can only be read."""
    return MappingProxyType(dict(limits))
