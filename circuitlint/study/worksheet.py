"""A worksheet: the lines of one state's calculation, written once for a shape of circuit and run over all cases.

A line names a figure of a part, the formula, and what is put in. The same lines serve as the calculation sheet that a
person reads and as the program that NumPy runs, so that what is shown is what was done. Feedback (a hot winding draws less
current and so heats less) is a pair of keys: a guess and the value that must come to equal it.
"""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from dataclasses import dataclass, field
from typing import Any, NamedTuple, TypeAlias

import numpy as np

from circuitlint.errors import NotConverged
from circuitlint.physics.formula import Formula
from circuitlint.si import Dimension


class Key(NamedTuple):
    """A figure by name and part, or a datum: name empty, part its path."""

    name: str
    of: str


Argument: TypeAlias = Key | tuple[Key, ...]


@dataclass(frozen=True, slots=True)
class Line:
    """One line: a figure, its formula, and the keys put in. `note` is a word printed beside the figure."""

    key: Key
    formula: Formula[..., Any]
    arguments: Mapping[str, Argument]
    note: str = ""
    figure: bool = True


@dataclass(frozen=True, slots=True)
class Lack:
    """Why a figure cannot be given, and the data that would let it be given."""

    needs: tuple[str, ...]
    why: str = ""


@dataclass(frozen=True, slots=True)
class Feedback:
    """A guess, the figure it must come to equal, where it starts, and the magnitude below which it need not agree."""

    guess: Key
    settles_at: Key
    start: Key
    scale: float = 300.0


TOLERANCE = 1e-12
MOST_SWEEPS = 200


@dataclass(slots=True)
class Worksheet:
    """Lines, feedback and gaps of one state of one shape of circuit."""

    lines: list[Line] = field(default_factory=list)
    feedback: list[Feedback] = field(default_factory=list)
    lacks: dict[Key, Lack] = field(default_factory=dict)
    index: dict[Key, Line] = field(default_factory=dict)
    data: set[Key] = field(default_factory=set)
    assumed: dict[Key, Dimension] = field(default_factory=dict)
    before: list[Line] = field(default_factory=list)
    sweep: list[Line] = field(default_factory=list)
    rest: list[Line] = field(default_factory=list)
    slims: dict[frozenset[Key], Worksheet] = field(default_factory=dict)
    apart: set[Key] = field(default_factory=set)
    """Figures nothing else rests on: where one is not a finite number, it alone is lacking."""

    def datum(self, path: str) -> Key:
        """The key of a stated datum."""
        key = Key("", path)
        self.data.add(key)
        return key

    def put(
        self, name: str, of: str, formula: Formula[..., Any], note: str = "", figure: bool = True, **arguments: Argument
    ) -> Key:
        """Write a line and give its key. Where something put in is lacking, the figure is lacking for the same reason."""
        key = Key(name, of)
        gaps = [self.lacks[one] for argument in arguments.values() for one in _flat(argument) if one in self.lacks]
        if gaps:
            needs = tuple(dict.fromkeys(need for gap in gaps for need in gap.needs))
            why = next((gap.why for gap in gaps if gap.why), "")
            return self.lack(name, of, *needs, why=why)
        line = Line(key, formula, arguments, note, figure)
        self.lines.append(line)
        self.index[key] = line
        return key

    def lack(self, name: str, of: str, *needs: str, why: str = "") -> Key:
        """Say that a figure cannot be given, and what is needed for it."""
        key = Key(name, of)
        self.lacks[key] = Lack(needs, why)
        return key

    def guess(self, name: str, of: str, dimension: Dimension) -> Key:
        """A figure that is guessed and then settled by `settle`."""
        key = Key(name, of)
        self.assumed[key] = dimension
        return key

    def settle(self, guess: Key, at: Key, start: Key, scale: float = 300.0) -> None:
        """Bind a guess to the figure it must come to equal, to 1e-12 of its magnitude and of `scale` together.

        A lacking figure makes the guess's own figures lacking too.
        """
        self.feedback.append(Feedback(guess, at, start, scale))

    def has(self, key: Key) -> bool:
        """Whether the figure can be given."""
        return key not in self.lacks

    def finish(self) -> Worksheet:
        """Sort the lines into those that feedback must sweep and the rest. Call once, when all lines are written."""
        self._drop_unsettled()
        if not self.feedback:
            return self
        moved: set[Key] = {one.guess for one in self.feedback}
        touched: list[Line] = []
        for line in self.lines:
            if any(key in moved for argument in line.arguments.values() for key in _flat(argument)):
                moved.add(line.key)
                touched.append(line)
        wanted = {one.settles_at for one in self.feedback}
        sweep: list[Line] = []
        for line in reversed(touched):
            if line.key in wanted:
                sweep.append(line)
                wanted |= {key for argument in line.arguments.values() for key in _flat(argument)}
        self.sweep = sweep[::-1]
        late = {line.key for line in touched}
        self.before = [line for line in self.lines if line.key not in late]
        swept = {line.key for line in self.sweep}
        self.rest = [line for line in touched if line.key not in swept]
        return self

    def _drop_unsettled(self) -> None:
        """A guess that nothing settles is lacking, and so is every figure built on it."""
        open_ends = [one for one in self.feedback if one.settles_at in self.lacks]
        if not open_ends:
            return
        self.feedback = [one for one in self.feedback if one.settles_at not in self.lacks]
        for one in open_ends:
            self.lacks[one.guess] = self.lacks[one.settles_at]
        kept = []
        for line in self.lines:
            gap = next((self.lacks[key] for argument in line.arguments.values() for key in _flat(argument)
                        if key in self.lacks), None)
            if gap is None:
                kept.append(line)
            else:
                self.lacks[line.key] = gap
                del self.index[line.key]
        self.lines = kept
        self._drop_unsettled()

    def only(self, wanted: Iterable[Key]) -> Worksheet:
        """The same worksheet with no more lines than the wanted figures need; made once for the same figures."""
        needed: set[Key] = set(wanted)
        asked = frozenset(needed)
        if asked in self.slims:
            return self.slims[asked]
        while True:
            before = len(needed)
            needed |= {one.settles_at for one in self.feedback if one.guess in needed}
            for line in reversed(self.lines):
                if line.key in needed:
                    needed |= {key for argument in line.arguments.values() for key in _flat(argument)}
            if len(needed) == before:
                break
        kept = [line for line in self.lines if line.key in needed]
        feedback = [one for one in self.feedback if one.guess in needed]
        slim = Worksheet(kept, feedback, self.lacks, self.index, self.data, self.assumed, apart=self.apart)
        self.slims[asked] = slim
        return slim.finish()

    def run(self, data: Mapping[Key, Any]) -> dict[Key, Any]:
        """Evaluate every line. `data` maps data keys to floats or arrays that broadcast together.

        Cases whose feedback does not settle (thermal runaway, for one) come out as NaN in every figure. Raises
        NotConverged when a line settles in no case at all.
        """
        values: dict[Key, Any] = dict(data)
        with np.errstate(all="ignore"):
            if self.feedback:
                self._settle(values)
                for line in self.rest:
                    values[line.key] = _evaluate(line, values)
            else:
                for line in self.lines:
                    values[line.key] = _evaluate(line, values)
        return values

    def _settle(self, values: dict[Key, Any]) -> None:
        for line in self.before:
            values[line.key] = _evaluate(line, values)
        for one in self.feedback:
            values[one.guess] = np.array(values[one.start], dtype=float)
        error: Any = np.inf
        before: list[Any] = []
        for number in range(MOST_SWEEPS):
            for line in self.sweep:
                values[line.key] = _evaluate(line, values)
            guesses = [values[one.guess] for one in self.feedback]
            found = [values[one.settles_at] for one in self.feedback]
            error = 0.0
            for one, old, new in zip(self.feedback, guesses, found, strict=True):
                error = np.maximum(error, np.abs(new - old) / (np.abs(new) + one.scale))
            if not np.any(error > TOLERANCE):
                break
            if number % 3 == 2:
                found = [_extrapolated(*three) for three in zip(before, guesses, found, strict=True)]
            before = guesses
            for one, new in zip(self.feedback, found, strict=True):
                values[one.guess] = new
        astray = ~(error <= TOLERANCE * 100)
        if np.any(astray):
            if np.all(astray) and np.ndim(astray) == 0:
                raise NotConverged("temperatures do not settle: the winding or the conductor runs away")
            for one in self.feedback:
                values[one.guess] = np.where(astray, np.nan, values[one.guess])
        for line in self.sweep:
            values[line.key] = _evaluate(line, values)


def _extrapolated(first: Any, second: Any, third: Any) -> Any:
    """Where three steps of a fixed-point sweep point to (Aitken); the last of them where they point nowhere."""
    bend = third - 2.0 * second + first
    leap = np.where(np.abs(bend) > 0.0, (third - second) ** 2 / np.where(np.abs(bend) > 0.0, bend, 1.0), 0.0)
    return np.where(np.abs(leap) < 0.5 * np.abs(third - second) + 1.0, third - leap, third)


def _flat(argument: Argument) -> tuple[Key, ...]:
    return (argument,) if isinstance(argument, Key) else argument


def _evaluate(line: Line, values: Mapping[Key, Any]) -> Any:
    numbers = {
        name: values[argument] if isinstance(argument, Key) else tuple(values[key] for key in argument)
        for name, argument in line.arguments.items()
    }
    return line.formula.function(**numbers)
