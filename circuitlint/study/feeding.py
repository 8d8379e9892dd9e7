"""How each circuit is fed: its supply, the boards on its way, and what the others on those boards do to its voltage.

The boards of an installation are one linear network of line and neutral conductors. It is solved once at nominal values, every
circuit in place: that gives the currents in each feeder, the neutral among them, and the voltage at each board. A circuit's own
study then has the feeders in its path, and what the others' currents drop along them as a voltage of its own, which may or may
not be there (they may run or not).
"""

from __future__ import annotations

import cmath
import math
from collections.abc import Sequence
from dataclasses import dataclass, field

import numpy as np

from circuitlint.definition.models import Board, Cable, CircuitEntry, Supply
from circuitlint.definition.reading import Installation
from circuitlint.errors import OutOfTable
from circuitlint.si import ComplexArray
from circuitlint.tables import conductors as conductor_table

LINES = ("L1", "L2", "L3")
TURN = cmath.exp(-2j * math.pi / 3)


@dataclass(frozen=True, slots=True)
class Feed:
    """How one circuit is fed. `kind` is `dc`, `single-phase`, `line-neutral`, `line-line` or `balanced`."""

    supply: Supply
    supply_name: str
    boards: tuple[str, ...]
    """From the origin to the circuit."""
    runs: tuple[tuple[str, Cable], ...]
    """Place and cable of every feeder run on the way, from the origin."""
    kind: str
    missing: tuple[str, ...] = ()

    @property
    def balanced(self) -> bool:
        """Whether the circuit loads three phases alike."""
        return self.kind == "balanced"

    @property
    def scale(self) -> float:
        """Loop voltage over the supply's stated voltage."""
        return 1.0 / math.sqrt(3.0) if self.kind in ("line-neutral", "balanced") else 1.0


def feed_of(entry: CircuitEntry, installation: Installation) -> Feed:
    """The way from the origin to a circuit."""
    names: list[str] = []
    origin = entry.fed_from
    while origin in installation.boards:
        names.append(origin)
        origin = installation.boards[origin].fed_from
    supply = installation.supplies[origin]
    names.reverse()
    runs: list[tuple[str, Cable]] = []
    missing: list[str] = []
    for name in names:
        cable = installation.boards[name].cable
        if cable is None:
            missing.append(f"boards.{name}.cable, or `cable: []` where there is none")
        runs += [(f"feeder[{name}][{index}]", run) for index, run in enumerate(cable or ())]
    kind: str = supply.system if supply.system != "three-phase" else "balanced"
    if supply.system == "three-phase" and entry.phase is not None:
        kind = "line-line" if "-" in entry.phase else "line-neutral"
    return Feed(supply, origin, tuple(names), tuple(runs), kind, tuple(missing))


def source_voltage(feed: Feed, phase: str | None) -> complex:
    """Nominal phasor of the loop a circuit is fed from, against line 1 to neutral."""
    nominal = feed.supply.voltage.nominal
    if feed.supply.system != "three-phase":
        return complex(nominal)
    volts = {line: nominal / math.sqrt(3.0) * TURN**number for number, line in enumerate(LINES)}
    if phase is None:
        return volts["L1"]
    start, _, end = phase.partition("-")
    return volts[start] - (volts[end] if end else 0.0)


@dataclass(slots=True)
class BoardState:
    """A board at nominal values, everything running: phasors by conductor, against line 1 to neutral of its supply."""

    name: str
    supply: str
    system: str
    voltages: dict[str, complex] = field(default_factory=dict)
    """Line to neutral; the one loop voltage under `L1` where the supply is not three-phase."""
    currents: dict[str, complex] = field(default_factory=dict)
    """In the feeder, by conductor, `N` among them on three phases."""
    power: complex = 0.0
    """Complex power that the board takes, its own capacitor included."""
    correction: complex = 0.0
    """Complex power of the board's own capacitor."""
    circuits: tuple[str, ...] = ()
    drops: dict[str, complex] = field(default_factory=dict)
    """What the others drop for each circuit on the board, over its nominal loop voltage."""


@dataclass(slots=True)
class Loading:
    """One circuit as an admittance between conductors of the board it hangs on."""

    tag: str
    board: str
    ends: tuple[tuple[str, str], ...]
    admittance: complex


class Boards:
    """The linear network of all boards of one supply."""

    def __init__(self, installation: Installation, supply_name: str) -> None:
        self.supply_name = supply_name
        self.supply = installation.supplies[supply_name]
        self.three = self.supply.system == "three-phase"
        self.boards: dict[str, Board] = {}
        waiting = [supply_name]
        while waiting:
            origin = waiting.pop(0)
            for name, board in installation.boards.items():
                if board.fed_from == origin:
                    self.boards[name] = board
                    waiting.append(name)
        self.conductors = (*LINES, "N") if self.three else ("L1",)
        self.index = {(name, line): number for number, (name, line) in enumerate(
            (name, line) for name in self.boards for line in self.conductors)}

    def feeder(self, name: str) -> complex:
        """Nominal impedance of one conductor of a board's feeder; of the whole loop where there is no neutral of its own."""
        frequency = self.supply.frequency.nominal if self.supply.frequency else 0.0
        total = sum((_per_run(run, frequency) for run in self.boards[name].cable or ()), 0j)
        total = total if self.three else 2.0 * total
        return total if abs(total) > 0.0 else complex(1e-9)

    def solve(self, loads: Sequence[Loading]) -> dict[str, BoardState]:
        """Voltages and currents of every board with these loads on."""
        size = len(self.index)
        if not size:
            return {}
        matrix: ComplexArray = np.zeros((size, size), dtype=np.complex128)
        injected: ComplexArray = np.zeros(size, dtype=np.complex128)
        nominal = self.supply.voltage.nominal
        origin = {line: nominal / math.sqrt(3.0) * TURN**number for number, line in enumerate(LINES)} | {"N": 0j}
        if not self.three:
            origin = {"L1": complex(nominal)}
        for name, board in self.boards.items():
            admittance = 1.0 / self.feeder(name)
            for line in self.conductors:
                at = self.index[name, line]
                matrix[at, at] += admittance
                above = self.index.get((board.fed_from, line))
                if above is None:
                    injected[at] += admittance * origin[line]
                else:
                    matrix[above, above] += admittance
                    matrix[at, above] -= admittance
                    matrix[above, at] -= admittance
        for load in loads:
            for start, end in load.ends:
                a, b = self.index[load.board, start], self.index.get((load.board, end))
                matrix[a, a] += load.admittance
                if b is not None:
                    matrix[b, b] += load.admittance
                    matrix[a, b] -= load.admittance
                    matrix[b, a] -= load.admittance
        solved: ComplexArray = np.linalg.solve(matrix, injected).astype(np.complex128)
        flows = self._flows(solved, loads)
        return {name: self._state(name, solved, flows[name], loads) for name in self.boards}

    def _flows(self, solved: ComplexArray, loads: Sequence[Loading]) -> dict[str, dict[str, complex]]:
        """Current in each feeder by conductor: the phasor sum of all that hangs below it."""
        flows = {name: dict.fromkeys(self.conductors, 0j) for name in self.boards}
        for load in loads:
            for start, end in load.ends:
                back = complex(solved[self.index[load.board, end]]) if end else 0j
                current = load.admittance * (complex(solved[self.index[load.board, start]]) - back)
                name = load.board
                while name in self.boards:
                    flows[name][start] += current
                    if end:
                        flows[name][end] -= current
                    name = self.boards[name].fed_from
        return flows

    def _state(
        self, name: str, solved: ComplexArray, currents: dict[str, complex], loads: Sequence[Loading]
    ) -> BoardState:
        here = {line: complex(solved[self.index[name, line]]) for line in self.conductors}
        neutral = here.get("N", 0j)
        voltages = {line: here[line] - neutral for line in self.conductors if line != "N"}
        power = sum(voltages[line] * currents[line].conjugate() for line in voltages)
        below = tuple(load.tag for load in loads if load.board == name and load.tag)
        admittance = self.correction(name)
        corrected = sum((abs(volts) ** 2 * admittance.conjugate() for volts in voltages.values()), 0j)
        return BoardState(name, self.supply_name, self.supply.system, voltages, currents, power, corrected, below)

    def correction(self, name: str) -> complex:
        """Admittance of the board's own capacitor, of one phase of a star on three phases; zero where there is none."""
        given = self.boards[name].correction
        if given is None or self.supply.frequency is None:
            return 0j
        return 2j * math.pi * self.supply.frequency.nominal * given.capacitance.nominal

    def corrections(self) -> list[Loading]:
        """The boards' own capacitors as loads without a tag."""
        kind = "balanced" if self.three else "single-phase"
        return [Loading("", name, ends_of(kind, None), self.correction(name)) for name in self.boards if self.correction(name)]


def ends_of(kind: str, phase: str | None) -> tuple[tuple[str, str], ...]:
    """The conductors between which a circuit's admittance stands; an end that a board does not have is the return."""
    if kind == "balanced":
        return tuple((line, "N") for line in LINES)
    if phase is None:
        return (("L1", ""),)
    start, _, end = phase.partition("-")
    return ((start, end or "N"),)


def drop_by_others(state: BoardState, feed: Feed, phase: str | None, own_current: complex, own_path: complex) -> complex:
    """What the others' currents drop on the way to a board, in a circuit's loop: all of the drop less the circuit's own part."""
    if feed.kind == "balanced":
        turned = [state.voltages[line] / TURN**number for number, line in enumerate(LINES)]
        arriving = sum(turned) / 3.0
    elif phase is None:
        arriving = state.voltages["L1"]
    else:
        start, _, end = phase.partition("-")
        arriving = state.voltages[start] - (state.voltages[end] if end else 0.0)
    return source_voltage(feed, phase) - arriving - own_current * own_path


def _per_run(run: Cable, frequency: float) -> complex:
    """Nominal impedance of one conductor of a run, at 20 °C."""
    try:
        resistance = conductor_table.resistance_per_metre(run.section.nominal, run.conductor, int(run.conductor_class or 2))[0]
    except OutOfTable:
        return 0j
    reactance = run.reactance.nominal if run.reactance is not None else 1e-4 * frequency / 50.0
    return complex(resistance, reactance if frequency else 0.0) * run.length.nominal
