"""Load kinds and extra figures of plugins behind guards: what fails is lacking and says so, and what others wrote stays."""

from __future__ import annotations

import contextlib
from collections.abc import Iterator
from dataclasses import dataclass
from typing import Any, ClassVar

import numpy as np
from pydantic import BaseModel, ModelWrapValidatorHandler, model_validator
from pydantic_core import PydanticCustomError

from circuitlint.errors import PluginError
from circuitlint.isolation.containment import describe, is_the_persons_wish
from circuitlint.isolation.worksheets import Before, inside
from circuitlint.study.data import DataSheet
from circuitlint.study.extras import ExtraFigures
from circuitlint.study.plan import LoadKind, Plan
from circuitlint.study.worksheet import Key

OWN = "own figures"
"""What is said to be lacking where a load kind fails to write its own figures."""


@dataclass(frozen=True, slots=True)
class Trouble:
    """One failure of a plugin's load kind or extra figures. `of` is the load kind whose circuits it concerns, or empty."""

    plugin: str
    what: str
    of: str
    figures: tuple[str, ...] = ()


class Troubles:
    """Failures of load kinds and extra figures, gathered while a study runs; each is kept once."""

    def __init__(self) -> None:
        self._noted: dict[Trouble, None] = {}

    def note(self, trouble: Trouble) -> None:
        """Take one in."""
        self._noted[trouble] = None

    def drain(self) -> list[Trouble]:
        """All since the last time, in the order they came."""
        noted, self._noted = list(self._noted), {}
        return noted


class _Guarded:
    """What guarded load kinds and extra figures have in common."""

    plugin: str
    troubles: Troubles
    title: str
    concerns: str
    figure_names: tuple[str, ...] = ()

    def failed(self, error: BaseException | str) -> str:
        """Note a failure and give its words."""
        told = error if isinstance(error, str) else describe(error)
        what = f"{self.title} of the plugin {self.plugin!r} failed: {told}"
        self.troubles.note(Trouble(self.plugin, what, self.concerns, self.figure_names))
        return what

    @contextlib.contextmanager
    def containing(self) -> Iterator[list[str]]:
        """Contain whatever is raised; the list then holds the words for it."""
        words: list[str] = []
        try:
            yield words
        except BaseException as error:
            if is_the_persons_wish(error):
                raise
            words.append(self.failed(error))

    @contextlib.contextmanager
    def writing(self, plan: Plan, place: str, figures: tuple[str, ...] | None = None) -> Iterator[list[str]]:
        """Let the plugin write on the worksheet, and take back all of it where it fails or trespasses."""
        before = Before(plan)
        with self.containing() as words:
            yield words
        told = "" if words else before.trespass(place, figures)
        if told:
            words.append(self.failed(told))
        if words:
            before.put_back()
        else:
            before.adopt(self.plugin, self.failed)


class GuardedKind(_Guarded, LoadKind[Any]):
    """A plugin's load kind: where it fails, the part's figures are lacking and say why."""

    name: ClassVar[str]
    model: ClassVar[type[BaseModel]]

    def __init__(self, inner: LoadKind[Any], plugin: str, troubles: Troubles) -> None:
        self.inner, self.plugin, self.troubles = inner, plugin, troubles
        self.name, self.model = inner.name, guarded_model(inner, plugin)  # type: ignore[misc]
        self.resistance_and_inductance = inner.resistance_and_inductance is True  # type: ignore[misc]
        self.title, self.concerns = f"the load kind {inner.name!r}", inner.name

    def data(self, part: Any, place: str, into: DataSheet) -> None:
        """The part's data; what it puts in for other places is taken back."""
        kept = [dict(table) for table in _tables(into)]
        with self.containing() as words:
            self.inner.data(part, place, into)
            for now, then in zip(_tables(into), kept, strict=True):
                if any(now.get(path) is not value for path, value in then.items()):
                    raise PluginError("it changes data that others stated")
                if any(path not in then and not inside(path, place) for path in now):
                    raise PluginError(f"it states data that are not under {place}")
            for path in into.data.keys() - kept[0].keys():
                datum = into.data[path]
                if not np.all(np.isfinite([datum.low, datum.nominal, datum.high])):
                    raise PluginError(f"the datum {path} is not a finite number")
            _labels(self.inner.label(part))
        if words:
            into.data, into.tokens, into.lacks = kept
            into.lack(place, why=words[0])

    def impedance(self, plan: Plan, place: str) -> Key | None:
        """The part's impedance; lacking where the kind failed."""
        if place in plan.present.lacks:
            return plan.sheet.lack("impedance phasor", place, why=plan.present.lacks[place].why)
        wanted, found = Key("impedance phasor", place), None
        with self.writing(plan, place) as words:
            found = self.inner.impedance(plan, place)
            if found is not None and found != wanted:
                raise PluginError(f"impedance gives {found!r:.80}; accepted: the key of the part's 'impedance phasor', or None")
            if found is not None and wanted not in plan.sheet.index and wanted not in plan.sheet.lacks:
                raise PluginError("impedance writes no 'impedance phasor' of the part")
        return plan.sheet.lack("impedance phasor", place, why=words[0]) if words else found

    def figures(self, plan: Plan, place: str) -> None:
        """The part's own figures; taken back as a whole where the kind failed."""
        if place in plan.present.lacks:
            return
        sheet, count, fed = plan.sheet, len(plan.sheet.lines), len(plan.sheet.feedback)
        with self.writing(plan, place) as words:
            self.inner.figures(plan, place)
            settled = {one.guess for one in sheet.feedback}
            loose = [key for key in sheet.assumed if inside(key.of, place) and key not in settled]
            if loose:
                raise PluginError(f"it guesses {loose[0].name!r} and never settles it")
        if words:
            sheet.lack(OWN, place, why=words[0])
            settled = {one.guess for one in sheet.feedback}
            for guess in [key for key in sheet.assumed if inside(key.of, place) and key not in settled]:
                sheet.settle(guess, Key(OWN, place), guess)
        elif len(sheet.feedback) == fed:
            sheet.apart |= {line.key for line in sheet.lines[count:]}

    def label(self, part: Any) -> tuple[str, ...]:
        """What a drawing prints beside the part; nothing where the kind fails, which `data` has told of by then."""
        try:
            return _labels(self.inner.label(part))
        except BaseException as error:
            if is_the_persons_wish(error):
                raise
            return ()


def guarded_model(kind: LoadKind[Any], plugin: str) -> type[BaseModel]:
    """The kind's model, whose own checks are contained: where one fails, the entry is refused and the plugin named."""

    def contained(cls: type[BaseModel], value: Any, handler: ModelWrapValidatorHandler[BaseModel]) -> BaseModel:
        try:
            return handler(value)
        except (ValueError, AssertionError, PydanticCustomError):
            raise
        except BaseException as error:
            if is_the_persons_wish(error):
                raise
            what = f"the load kind {kind.name!r} of the plugin {plugin!r} cannot read this: {describe(error)}"
            context = {"what": what, "accepted": "a plugin whose model reads it"}
            raise PydanticCustomError("plugin", "{what}", context) from None

    around: Any = model_validator(mode="wrap")
    metaclass: Any = type(kind.model)
    body = {"__doc__": kind.model.__doc__, "__module__": kind.model.__module__,
            "contained_by_the_guard": around(classmethod(contained))}
    made: type[BaseModel] = metaclass(kind.model.__name__, (kind.model,), body)
    return made


def _tables(sheet: DataSheet) -> tuple[dict[str, Any], dict[str, Any], dict[str, Any]]:
    return sheet.data, sheet.tokens, sheet.lacks


def _labels(given: Any) -> tuple[str, ...]:
    if not isinstance(given, tuple) or not all(isinstance(one, str) for one in given):
        raise PluginError(f"label gives {given!r:.80}; accepted: a tuple of texts")
    return given


class GuardedFigures(_Guarded, ExtraFigures):
    """A plugin's extra figures: where they fail, they are lacking and say why."""

    name: ClassVar[str]
    of: ClassVar[str]
    gives: ClassVar[tuple[str, ...]]

    def __init__(self, inner: ExtraFigures, plugin: str, troubles: Troubles) -> None:
        self.inner, self.plugin, self.troubles = inner, plugin, troubles
        self.name, self.of, self.gives = inner.name, inner.of, tuple(inner.gives)  # type: ignore[misc]
        self.title, self.concerns, self.figure_names = f"the extra figures {inner.name!r}", inner.of, self.gives

    def figures(self, plan: Plan, place: str) -> None:
        """The figures, or their lacks."""
        with self.writing(plan, place, self.gives) as words:
            self.inner.figures(plan, place)
        for name in self.gives if words else ():
            if Key(name, place) not in plan.sheet.index:
                plan.sheet.lack(name, place, why=words[0])
