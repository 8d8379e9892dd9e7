"""The study of an installation: circuits of one shape are solved together, all cases at once.

A rule asks a `CircuitStudy` for figures by name, state and part. It gets a `Figure` with nominal, lowest and highest value,
or a `Lack` that says what is needed.
"""

from __future__ import annotations

from collections.abc import Collection, Iterable, Mapping, Sequence
from dataclasses import dataclass, field
from typing import Any

import numpy as np

from circuitlint.definition.models import CircuitEntry, Supply
from circuitlint.definition.reading import CircuitDefinition, Installation
from circuitlint.definition.text import Path
from circuitlint.physics.formula import Formula
from circuitlint.si import Dimension, RealArray
from circuitlint.study import cases
from circuitlint.study.balance import BOUND, imbalance
from circuitlint.study.data import DataSheet, Datum
from circuitlint.study.feeding import Boards, BoardState, Feed, Loading, drop_by_others, ends_of, feed_of, source_voltage
from circuitlint.study.network import circuit_tree, collect, way_of, worksheet
from circuitlint.study.plan import Kinds, Node, shape_of
from circuitlint.study.states import State, states_of
from circuitlint.study.worksheet import Key, Lack, Line, Worksheet

UNSETTLED = "in some case within the tolerances the temperatures do not settle (thermal runaway)"
OUT_OF_RANGE = "in some case within the tolerances the data leave the range of a formula"
SEED = 60364
DRAWS = 2000
UNBALANCED = "the solution does not balance to 1e-9, so no figure is given"


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
class Solution:
    """One state of one group of circuits: values at every point studied, and what was made of them.

    Arrays in `lowest`, `highest` have shape (circuits,); arrays in `values` broadcast to (circuits, points).
    """

    state: State
    sheet: Worksheet
    inputs: tuple[str, ...]
    values: dict[Key, Any]
    circuits: int
    points: int
    lines: list[Line]
    row: dict[Key, int]
    nominal: RealArray
    lowest: RealArray
    highest: RealArray
    moved_by: list[list[str]]
    faulty: list[str]
    studied: int
    refined: bool


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
        return self._figure(solution, row)

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
            if reactive is not None:
                note = leads_or_lags(float(solution.nominal[reactive, at]))
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


def leads_or_lags(reactive: float) -> str:
    """`lagging` where reactive power is taken, `leading` where it is given back, empty at unity."""
    return "lagging" if reactive > 0.0 else "leading" if reactive < 0.0 else ""


def study(
    installation: Installation, kinds: Kinds, sought: Collection[str] | None = None, wanted: Collection[str] | None = None
) -> list[CircuitStudy]:
    """Study every circuit of an installation in every state that its supply allows, or in the states wanted by name.

    `sought` names the figures whose extremes are refined; None refines all. The order of the circuits is kept.
    """
    studies: list[CircuitStudy] = []
    groups: dict[Any, list[CircuitStudy]] = {}
    boards = study_boards(installation, kinds) if installation.boards else {}
    others = {tag: drop for state in boards.values() for tag, drop in state.drops.items()}
    for definition in installation.circuits:
        one = prepare(definition, installation, kinds, others.get(definition.entry.tag))
        studies.append(one)
        key = (one.system, shape_of(one.tree), one.way, one.data.signature())
        groups.setdefault(key, []).append(one)
    for group in groups.values():
        _study_group(group, kinds, sought, wanted)
    return studies


def prepare(
    definition: CircuitDefinition, installation: Installation, kinds: Kinds, others: complex | None = None
) -> CircuitStudy:
    """A circuit with its data and its tree, not yet solved."""
    entry = definition.entry
    load = entry.load  # type: ignore[attr-defined]
    feed = feed_of(entry, installation)
    data = collect(entry, feed, load, kinds, others)
    return CircuitStudy(definition, feed.supply, circuit_tree(entry, load, feed), data, feed, way_of(feed, entry))


def study_boards(installation: Installation, kinds: Kinds) -> dict[str, BoardState]:
    """Every board at nominal values with everything running, by name.

    Each circuit is solved alone, cold and at nominal values, and taken as the admittance that this gives; two rounds, so that
    loads of constant power see the voltage they get.
    """
    found: dict[str, BoardState] = {}
    for name in installation.supplies:
        boards = Boards(installation, name)
        on_boards = [one for one in installation.circuits if one.entry.fed_from in boards.boards]
        if not on_boards:
            continue
        drops: dict[str, complex] = {}
        for _ in range(2):
            alone = [prepare(one, installation, kinds, drops.get(one.entry.tag, 0j)) for one in on_boards]
            loadings, currents = _loadings(alone, kinds)
            states = boards.solve(loadings)
            for one in alone:
                if one.tag in currents:
                    own_path = _own_path(one, boards)
                    state = states[one.entry.fed_from]
                    drop = drop_by_others(state, one.feed, one.entry.phase, currents[one.tag], own_path)
                    drops[one.tag] = drop / source_voltage(one.feed, one.entry.phase)
        for state in states.values():
            state.drops = {tag: drops[tag] for tag in state.circuits if tag in drops}
        found |= states
    return found


def _own_path(one: CircuitStudy, boards: Boards) -> complex:
    """Impedance of the feeders in a circuit's own loop."""
    total = sum((boards.feeder(name) for name in one.feed.boards), 0j)
    return total * (2.0 if boards.three and not one.feed.balanced else 1.0)


def _loadings(alone: Sequence[CircuitStudy], kinds: Kinds) -> tuple[list[Loading], dict[str, complex]]:
    """Each circuit as an admittance at its board, and the current it draws, both nominal, cold and with its diversity."""
    loadings: list[Loading] = []
    currents: dict[str, complex] = {}
    for one in alone:
        state = states_of(one.system, ("cold",))[0]
        sheet = worksheet(state, one.system, one.data, one.tree, one.way, kinds)
        current, source = Key("current phasor", ""), source_voltage(one.feed, one.entry.phase)
        if current in sheet.lacks:
            continue
        values = sheet.only([current, *(Key("voltage phasor", place) for place in one.way)]).run(
            {Key("", path): datum.nominal for path, datum in one.data.data.items()})
        turned = complex(values[current]) * source / abs(source)
        upstream = sum((complex(values[Key("voltage phasor", place)]) for place in one.way if place.startswith("feeder")), 0j)
        arriving = source - upstream * source / abs(source) - one.data.data["others' drop in phase"].nominal * source \
            - 1j * one.data.data["others' drop across"].nominal * source
        share = one.entry.diversity.nominal if one.entry.diversity else 1.0
        loadings.append(Loading(one.tag, one.entry.fed_from, ends_of(one.feed.kind, one.entry.phase), share * turned / arriving))
        currents[one.tag] = share * turned
    return loadings, currents


def _study_group(
    group: list[CircuitStudy], kinds: Kinds, sought: Collection[str] | None, wanted: Collection[str] | None
) -> None:
    first = group[0]
    ends = np.array([[(one.low, one.nominal, one.high) for one in study.data.data.values()] for study in group])
    table = {path: ends[:, number] for number, path in enumerate(first.data.data)}
    for position, one in enumerate(group):
        one.position = position
    for state in states_of(first.system, wanted):
        sheet = worksheet(state, first.system, first.data, first.tree, first.way, kinds)
        along = (*first.way, *(("others",) if first.data.tokens.get("others") == "known" else ()))
        phases = 3 if first.feed.balanced else 1
        solution = solve(state, sheet, first.data.data, table, len(group), first.tree, along, sought, phases)
        for one in group:
            one.solutions[state.name] = solution


def solve(
    state: State, sheet: Worksheet, data: Mapping[str, Datum], table: Mapping[str, RealArray], circuits: int, tree: Node,
    along: Sequence[str], sought: Collection[str] | None, phases: int = 1,
) -> Solution:
    """One state of a group: run the worksheet over the opening points, then refine what is sought."""
    used = {key.of for line in sheet.lines for argument in line.arguments.values()
            for key in ((argument,) if isinstance(argument, Key) else argument) if not key.name}
    used |= {one.start.of for one in sheet.feedback}
    inputs = tuple(path for path in data if path in used and not data[path].exact)
    lines = [line for line in sheet.lines if line.figure]
    row = {line.key: number for number, line in enumerate(lines)}

    def run(points: RealArray) -> dict[Key, Any]:
        return sheet.run(_put_in(table, used, inputs, points))

    def figures(values: Mapping[Key, Any], wanted: Sequence[Line], points: int) -> RealArray:
        made = np.empty((len(wanted), circuits, points))
        for number, line in enumerate(wanted):
            made[number] = values[line.key]
        return made

    opening = cases.opening_points(len(inputs))
    values = run(opening)
    found = figures(values, lines, opening.shape[1])
    wanted = [line for line in lines if _is_sought(line.key, sought, row)]
    points = opening
    if len(inputs) > cases.FULL_FACTORIAL:
        picked = found[[row[line.key] for line in wanted]]
        vertices = np.clip(cases.vertices_by_sensitivity(picked, len(inputs)), -1.0, 1.0)
        points = np.concatenate([np.broadcast_to(opening, (circuits, *opening.shape[1:])), vertices], axis=1)
        found = np.concatenate([found, figures(run(vertices), lines, vertices.shape[1])], axis=2)
    faulty = _faulty(sheet, values, found, tree, along, circuits, opening.shape[1], phases)
    lowest = np.min(found, axis=2) if lines else np.zeros((0, circuits))
    highest = np.max(found, axis=2) if lines else np.zeros((0, circuits))
    studied = points.shape[1]
    if wanted and inputs:
        rows = [row[line.key] for line in wanted]
        slim = sheet.only(line.key for line in wanted)

        def evaluate(trial: RealArray) -> RealArray:
            return figures(slim.run(_put_in(table, used, inputs, trial)), wanted, trial.shape[1])

        lowest[rows], highest[rows], further = cases.refine(evaluate, points, found[rows])
        studied += further
    moved_by = cases.dominant(found, len(inputs), inputs)
    return Solution(state, sheet, inputs, values, circuits, opening.shape[1], lines, row, found[:, :, 0], lowest, highest,
                    moved_by, faulty, studied, bool(wanted and inputs))


def _is_sought(key: Key, sought: Collection[str] | None, row: Mapping[Key, int]) -> bool:
    """A name means the circuit's own figure where it has one, else every part's; `name@part` means parts that begin so."""
    if sought is None:
        return True
    if key.name in sought and (not key.of or Key(key.name, "") not in row):
        return True
    return any(one.startswith(f"{key.name}@") and key.of.startswith(one.partition("@")[2]) for one in sought)


def _put_in(
    table: Mapping[str, RealArray], used: Collection[str], inputs: tuple[str, ...], points: RealArray
) -> dict[Key, Any]:
    number = {path: index for index, path in enumerate(inputs)}
    values: dict[Key, Any] = {}
    for path in used:
        if path not in table:
            continue
        low, nominal, high = (table[path][:, end : end + 1] for end in range(3))
        if path in number:
            place = points[:, :, number[path]]
            values[Key("", path)] = nominal + np.where(place > 0.0, place * (high - nominal), place * (nominal - low))
        else:
            values[Key("", path)] = nominal
    return values


def _faulty(
    sheet: Worksheet, values: Mapping[Key, Any], found: RealArray, tree: Node, along: Sequence[str], circuits: int, points: int,
    phases: int,
) -> list[str]:
    """Why a circuit has no figures in this state, or an empty text; in the order of the circuits."""
    apart = np.broadcast_to(imbalance(values, tree, along, phases), (circuits, points))
    unbalanced = np.any(~(apart <= BOUND), axis=1)
    astray = np.any(~np.isfinite(found), axis=(0, 2)) if found.size else np.zeros(circuits, dtype=bool)
    reasons = [UNBALANCED if one else "" for one in unbalanced]
    for at in np.flatnonzero(astray):
        reasons[at] = _first_fault(sheet, values, int(at), circuits, points)
    return reasons


def _first_fault(sheet: Worksheet, values: Mapping[Key, Any], at: int, circuits: int, points: int) -> str:
    """The first line that gives no finite number, in words."""
    for guess in (one.guess for one in sheet.feedback):
        if not np.all(np.isfinite(np.broadcast_to(values[guess], (circuits, points))[at])):
            return UNSETTLED
    for line in sheet.lines:
        if not np.all(np.isfinite(np.broadcast_to(np.asarray(values[line.key]), (circuits, points))[at])):
            of = f" of {line.key.of}" if line.key.of else ""
            return f"{OUT_OF_RANGE}: {line.key.name.replace('-', ' ')}{of}, {line.formula.symbolic}"
    return OUT_OF_RANGE
