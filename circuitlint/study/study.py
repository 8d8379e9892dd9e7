"""What a rule may ask of a circuit: figures by name, state and part.

It gets a `Figure` with nominal, lowest and highest value, or a `Lack` that says what is needed.
"""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from dataclasses import dataclass, field
from typing import Any

import numpy as np

from circuitlint.definition.models import CircuitEntry, Supply
from circuitlint.definition.reading import CircuitDefinition
from circuitlint.definition.text import Path
from circuitlint.physics.formula import Formula
from circuitlint.si import Dimension, RealArray
from circuitlint.study.data import DataSheet, Datum
from circuitlint.study.feeding import BoardState, Feed
from circuitlint.study.plan import Node
from circuitlint.study.solving import Solution
from circuitlint.study.worksheet import Key, Lack

SEED = 60364
DRAWS = 2000


@dataclass(frozen=True, slots=True)
class Figure:
    """One derived quantity of one part in one state: nominal, lowest and highest in the SI unit of its dimension."""

    name: str
    of: str
    state: str
    dimension: Dimension
    nominal: float
    lowest: float
    highest: float
    formula: Formula[..., Any] | None = None
    inputs: tuple[tuple[str, Key], ...] = ()
    moved_by: str = ""
    note: str = ""


@dataclass(slots=True)
class CircuitStudy:
    """One circuit with everything a rule may ask of it."""

    definition: CircuitDefinition
    supply: Supply
    tree: Node
    data: DataSheet
    feed: Feed
    way: tuple[str, ...]
    """Places of every feeder and cable run from the origin to the load."""
    position: int = 0
    solutions: dict[str, Solution] = field(default_factory=dict)
    boards: Mapping[str, BoardState] = field(default_factory=dict)
    """Every board of the installation at nominal values."""
    places: dict[Path, object] = field(default_factory=dict)
    """Places already looked up in the definition."""

    @property
    def tag(self) -> str:
        """The circuit's tag."""
        return self.definition.entry.tag

    @property
    def entry(self) -> CircuitEntry:
        """The circuit as defined."""
        return self.definition.entry

    @property
    def system(self) -> str:
        """`dc`, `single-phase` or, where three phases are loaded alike, `three-phase`."""
        return {"dc": "dc", "balanced": "three-phase"}.get(self.feed.kind, "single-phase")

    def states(self) -> tuple[str, ...]:
        """Names of the states studied."""
        return tuple(self.solutions)

    def figure(self, name: str, state: str, of: str = "") -> Figure | Lack:
        """A figure by name, state and part; a Lack where it cannot be given, with what is needed."""
        solution = self.solutions.get(state)
        if solution is None:
            return Lack((), f"the state {state!r} is not studied on a {self.system} supply")
        key = Key(name, of)
        if key in solution.sheet.lacks:
            return solution.sheet.lacks[key]
        row = solution.row.get(key)
        if row is None:
            return Lack((), f"there is no figure {name!r} of {of or 'the circuit'!r} in the state {state!r}")
        if solution.faulty[self.position]:
            return Lack((), solution.faulty[self.position])
        if (row, self.position) in solution.broken:
            return Lack((), f"{name.replace('-', ' ')} does not come out as a finite number in every case")
        return self._figure(solution, row)

    def leaves(self, kind: str) -> tuple[str, ...]:
        """Places of every load of a kind, in the order of the tree."""
        return tuple(_leaves(self.tree, kind))

    def choice(self, path: str) -> str:
        """A choice the definition makes under a path, such as `made_for` of a coil; empty where it makes none."""
        return self.data.tokens.get(path, "")

    def stated(self, path: str) -> Datum | None:
        """A quantity that the definition states under a path within the circuit; None where it does not."""
        datum = self.data.data.get(path)
        return datum if datum is not None and datum.origin == "stated" else None

    def made_from(self, place: str, state: str = "cold") -> frozenset[str]:
        """Paths of the data that a part's impedance was made from in a state."""
        solution = self.solutions.get(state)
        if solution is None:
            return frozenset()
        waiting, seen = [Key("impedance phasor", place)], set()
        while waiting:
            key = waiting.pop()
            if key in seen:
                continue
            seen.add(key)
            line = solution.sheet.index.get(key)
            for argument in line.arguments.values() if line is not None else ():
                waiting += [argument] if isinstance(argument, Key) else argument
        return frozenset(key.of for key in seen if not key.name)

    def parts(self, name: str, state: str) -> tuple[str, ...]:
        """Parts that have a figure of that name in that state, given or lacking, in the order of the calculation."""
        solution = self.solutions.get(state)
        if solution is None:
            return ()
        found = [key.of for key in solution.row if key.name == name]
        found += [key.of for key in solution.sheet.lacks if key.name == name and key.of not in found]
        return tuple(found)

    def figures(self) -> Iterable[Figure]:
        """Every figure that can be given, state by state, in the order of the calculation."""
        for solution in self.solutions.values():
            if not solution.faulty[self.position]:
                for row in range(len(solution.lines)):
                    if (row, self.position) in solution.broken:
                        continue
                    yield self._figure(solution, row)

    def lacks(self) -> Iterable[tuple[str, Key, Lack]]:
        """Every figure that cannot be given, with its state."""
        for name, solution in self.solutions.items():
            for key, lack in solution.sheet.lacks.items():
                if key.name and not key.name.endswith("phasor"):
                    yield name, key, lack

    def _figure(self, solution: Solution, row: int) -> Figure:
        line, at = solution.lines[row], self.position
        inputs = tuple(
            (line.formula.symbols[name], key)
            for name, argument in line.arguments.items()
            for key in ((argument,) if isinstance(argument, Key) else argument)
        )
        note = line.note
        if line.key.name == "power-factor":
            reactive = solution.row.get(Key("reactive-power", line.key.of))
            apparent = solution.row.get(Key("apparent-power", line.key.of))
            if reactive is not None and apparent is not None:
                note = leads_or_lags(float(solution.nominal[reactive, at]), float(solution.nominal[apparent, at]))
        return Figure(
            line.key.name, line.key.of, solution.state.name, line.formula.dimension, float(solution.nominal[row, at]),
            float(solution.lowest[row, at]), float(solution.highest[row, at]), line.formula, inputs,
            solution.moved_by[row][at], note,
        )

    def nominal(self, state: str, key: Key) -> complex | float:
        """The nominal value put in or found under a key; complex where the key is a phasor."""
        solution = self.solutions[state]
        value = solution.values[key] if key in solution.values else self.data.data[key.of].nominal
        at = np.broadcast_to(np.asarray(value), (solution.circuits, solution.points))[self.position, 0]
        return complex(at) if np.iscomplexobj(at) else float(at)

    def share_beyond(self, state: str, key: Key, limit: float, least: bool) -> tuple[float, float]:
        """The share of the tolerance box in which a figure is beyond a limit, and the standard uncertainty of that share.

        Every toleranced input is drawn alike over its whole range and apart from the others (JCGM 101:2008, 6.4.2), with a fixed
        seed, so that the same definition gives the same share.
        """
        solution = self.solutions[state]
        drawn = np.random.default_rng(SEED).uniform(-1.0, 1.0, (len(solution.inputs), DRAWS))
        values: dict[Key, Any] = {Key("", path): datum.nominal for path, datum in self.data.data.items()}
        for row, path in enumerate(solution.inputs):
            datum = self.data.data[path]
            up, down = datum.high - datum.nominal, datum.nominal - datum.low
            values[Key("", path)] = datum.nominal + np.where(drawn[row] > 0.0, drawn[row] * up, drawn[row] * down)
        found = np.broadcast_to(np.asarray(solution.sheet.only([key]).run(values)[key], dtype=float), (DRAWS,))
        share = float(np.mean(~(found >= limit if least else found <= limit)))
        return share, float(np.sqrt(max(share * (1.0 - share), 1.0 / DRAWS) / DRAWS))

    def spread(self, state: str, key: Key) -> RealArray:
        """A figure at every opening point of the tolerance box; shape (points,)."""
        solution = self.solutions[state]
        row: RealArray = np.broadcast_to(np.asarray(solution.values[key]), (solution.circuits, solution.points))[self.position]
        return row


def _leaves(node: Node, kind: str) -> Iterable[str]:
    if node.kind == kind:
        yield node.place
    for one in node.nodes:
        yield from _leaves(one, kind)


def leads_or_lags(reactive: float, apparent: float) -> str:
    """`lagging` where reactive power is taken, `leading` where it is given back, empty at unity."""
    if abs(reactive) <= 1e-9 * apparent:
        return ""
    return "lagging" if reactive > 0.0 else "leading" if reactive < 0.0 else ""
