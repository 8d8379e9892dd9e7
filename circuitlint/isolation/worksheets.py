"""A worksheet that a plugin has written on: what is not its to write is taken back, and its formulas are made fast."""

from __future__ import annotations

from collections.abc import Callable, Iterator
from dataclasses import replace
from typing import Any

import numpy as np

from circuitlint.errors import PluginError
from circuitlint.isolation.containment import is_the_persons_wish
from circuitlint.physics.formula import FORMULAS, Formula
from circuitlint.si import DIMENSIONS
from circuitlint.study.plan import Plan
from circuitlint.study.worksheet import Key, Line, Worksheet


class Before:
    """A worksheet as it was before a plugin wrote on it."""

    def __init__(self, plan: Plan) -> None:
        sheet = plan.sheet
        self.plan = plan
        self.lines, self.feedback = list(sheet.lines), list(sheet.feedback)
        self.lacks, self.index = dict(sheet.lacks), dict(sheet.index)
        self.data, self.assumed = set(sheet.data), dict(sheet.assumed)
        self.count = len(sheet.lines)

    def trespass(self, place: str, figures: tuple[str, ...] | None) -> str:
        """What was written that is not the plugin's to write, or an empty text.

        `place` is the part it writes for; `figures` are the names of the figures allowed, None for any.
        """
        sheet = self.plan.sheet
        if len(sheet.lines) < self.count or any(a is not b for a, b in zip(self.lines, sheet.lines, strict=False)):
            return "it changes lines that others wrote"
        if any(sheet.lacks.get(key) is not lack for key, lack in self.lacks.items()):
            return "it changes what others wrote of lacking figures"
        new = sheet.lines[self.count :]
        wrong = next((told for told in (self._wrong(line, figures) for line in new) if told), "")
        if wrong:
            return wrong
        keys = [line.key for line in new] + [key for key in sheet.lacks if key not in self.lacks]
        if len(set(keys)) != len(keys):
            return "it writes the same figure twice"
        astray = next((key for key in keys if key.name and not inside(key.of, place)), None)
        if astray is not None:
            return f"it writes {astray.name!r} of {astray.of or 'the circuit'!r}, which is not its part"
        return self._wrong_feedback(place, figures)

    def _wrong(self, line: object, figures: tuple[str, ...] | None) -> str:
        if not isinstance(line, Line) or not isinstance(line.key, Key) or not isinstance(line.formula, Formula):
            return f"it writes {line!r:.80}, which is not a line with a formula"
        name = line.key.name
        if line.key in self.index or line.key in self.lacks:
            return f"it writes {name!r} of {line.key.of or 'the circuit'!r}, which is written already"
        if figures is not None and line.figure and name not in figures:
            return f"it writes the figure {name!r}, which is not among those it gives"
        if set(line.arguments) != set(line.formula.symbols):
            return f"it puts {', '.join(line.arguments)} into {line.formula.name}, which takes {', '.join(line.formula.symbols)}"
        if DIMENSIONS.get(line.formula.dimension.name) is not line.formula.dimension:
            return f"{line.formula.name} gives a dimension of its own; accepted: one of circuitlint.authoring.si"
        unknown = next((key for key in _keys(line) if not self._known(key)), None)
        return f"it puts {unknown!r:.80} into {name!r}, and nobody wrote that before" if unknown is not None else ""

    def _wrong_feedback(self, place: str, figures: tuple[str, ...] | None) -> str:
        sheet = self.plan.sheet
        if sheet.feedback[: len(self.feedback)] != self.feedback:
            return "it changes what others feed back"
        new = sheet.feedback[len(self.feedback) :]
        guesses = [key for key in sheet.assumed if key not in self.assumed]
        if figures is not None and (new or guesses):
            return "it feeds figures back into the study, which only a load kind may"
        for one in new:
            if not inside(one.guess.of, place) or one.guess not in sheet.assumed:
                return f"it settles {one.guess.name!r}, which it did not guess"
            if not (self._known(one.start) and (self._known(one.settles_at) or one.settles_at in sheet.lacks)):
                return f"it settles {one.guess.name!r} at a figure that nobody wrote"
        return ""

    def _known(self, key: object) -> bool:
        sheet = self.plan.sheet
        if not isinstance(key, Key):
            return False
        return key in sheet.index or key in sheet.assumed or (not key.name and key.of in self.plan.present.data)

    def put_back(self) -> None:
        """Make the worksheet as it was."""
        sheet = self.plan.sheet
        sheet.lines[:], sheet.feedback[:] = self.lines, self.feedback
        sheet.lacks = dict(self.lacks)
        sheet.index = dict(self.index)
        sheet.assumed = dict(self.assumed)
        sheet.data = set(self.data)

    def adopt(self, plugin: str, failed: Callable[[BaseException | str], str]) -> None:
        """Make the lines written since fast against failing formulas; formulas of the plugin's own get its name in front."""
        sheet: Worksheet = self.plan.sheet
        for number in range(self.count, len(sheet.lines)):
            line = sheet.lines[number]
            own = FORMULAS.get(line.formula.name) is not line.formula
            name = f"{plugin}/{line.formula.name}" if own else line.formula.name
            made = replace(line, formula=fast(line.formula, name, line.figure, failed))
            sheet.lines[number] = sheet.index[line.key] = made


def _keys(line: Line) -> Iterator[object]:
    for argument in line.arguments.values():
        yield from (argument,) if isinstance(argument, Key) or not isinstance(argument, tuple) else argument


def inside(of: str, place: str) -> bool:
    """Whether a path is the place itself or lies in it."""
    return of == place or (bool(place) and of.startswith((f"{place}.", f"{place}[")))


def fast(formula: Formula[..., Any], name: str, real: bool, failed: Callable[[BaseException | str], str]) -> Formula[..., Any]:
    """The formula, so made that it gives NaN in the cases in which it fails, and cannot change what is put in."""
    inner = formula.function

    def function(**numbers: Any) -> Any:
        given = {key: _only_to_read(number) for key, number in numbers.items()}
        flat = [one for number in given.values() for one in (number if isinstance(number, tuple) else (number,))]
        shape = np.broadcast_shapes(*(np.shape(one) for one in flat))
        try:
            found = np.asarray(inner(**given))
            if found.dtype.kind not in ("fiu" if real else "fiuc") or not _fits(found.shape, shape):
                raise PluginError(f"the formula {formula.name} gives {found.dtype} of shape {found.shape} for {shape}")
        except BaseException as error:
            if is_the_persons_wish(error):
                raise
            failed(error)
            return np.full(shape, np.nan)
        put_in = np.ones(shape, dtype=bool)
        for one in flat:
            put_in &= np.isfinite(one)
        finite = np.isfinite(found)
        if not np.all(finite | ~put_in):
            failed(f"the formula {formula.name} gives no finite number in some cases")
        return np.where(put_in & finite, found, np.nan)

    return replace(formula, name=name, function=function)


def _fits(found: tuple[int, ...], shape: tuple[int, ...]) -> bool:
    try:
        return np.broadcast_shapes(found, shape) == shape
    except ValueError:
        return False


def _only_to_read(number: Any) -> Any:
    if isinstance(number, tuple):
        return tuple(map(_only_to_read, number))
    if isinstance(number, np.ndarray):
        number = number.view()
        number.flags.writeable = False
    return number
