"""Gathers what plugins offer, each behind a guard of its own, so that a broken plugin is named and loses only itself.

Plugins come from installed entry points (group `circuitlint`) and from files or folders named by the caller, never from a
definition or a ruleset.
"""

from __future__ import annotations

import contextlib
import difflib
import hashlib
import importlib.metadata
import importlib.util
import sys
from collections.abc import Callable, Iterable, Iterator, Mapping
from dataclasses import dataclass, field
from pathlib import Path
from types import ModuleType
from typing import Any, TypeVar

import pluggy
from pydantic import BaseModel

from circuitlint import hooks
from circuitlint.errors import InputError, PluginError
from circuitlint.isolation import taking
from circuitlint.isolation.containment import PRINTED, describe, is_the_persons_wish, keyboard_heeded, overheard
from circuitlint.isolation.kinds import GuardedFigures, GuardedKind, Troubles
from circuitlint.isolation.reports import GuardedReport
from circuitlint.isolation.rules import GuardedRule
from circuitlint.limits.reading import RulesetText
from circuitlint.readings.rule import ReadingRule
from circuitlint.review.rule import Rule
from circuitlint.study.extras import KnownKinds
from circuitlint.study.loads import CORE

GROUP = "circuitlint"
COMMON = "circuitlint_rules"
"""The entry point of the common rules, which come first and which nobody replaces."""

T = TypeVar("T")


@dataclass(slots=True)
class Plugin:
    """One plugin: its name, version, where it came from, what it offers, and why it failed if it did."""

    name: str
    version: str
    origin: str
    offers: list[str] = field(default_factory=list)
    failed: str = ""
    place: str = ""
    """Where it lies on this machine; never part of a record."""
    printed: bool = False
    """Whether it printed to standard output while it was loaded or asked."""

    def fail(self, what: str) -> None:
        """Note a failure; several stand beside each other."""
        self.failed = f"{self.failed}; {what}" if self.failed else what


@dataclass(slots=True)
class Gathered:
    """Everything the plugins offer, by name."""

    plugins: list[Plugin] = field(default_factory=list)
    rules: dict[str, tuple[Rule, Plugin]] = field(default_factory=dict)
    reading_rules: dict[str, tuple[ReadingRule, Plugin]] = field(default_factory=dict)
    rulesets: dict[str, RulesetText] = field(default_factory=dict)
    parts: list[tuple[str, bytes]] = field(default_factory=list)
    kinds: KnownKinds = field(default_factory=lambda: KnownKinds(CORE))
    reports: dict[str, hooks.RenderRecord] = field(default_factory=dict)
    troubles: Troubles = field(default_factory=Troubles)
    """What load kinds and extra figures did wrong since somebody last asked."""
    taken: dict[str, str] = field(default_factory=dict)
    """Which plugin a name belongs to."""

    def models(self) -> dict[str, type[BaseModel]]:
        """The models of all load kinds, for reading a definition."""
        return {name: kind.model for name, kind in self.kinds.items()}

    def take(self, what: str, found: Mapping[str, T], plugin: Plugin) -> Mapping[str, T]:
        """Claim names for a plugin. Raises PluginError, and claims none, where one is taken."""
        for name in found:
            if f"{what} {name}" in self.taken:
                raise PluginError(f"the {what} name {name!r} is taken by {self.taken[f'{what} {name}']}")
        self.taken.update(dict.fromkeys((f"{what} {name}" for name in found), plugin.name))
        return found


@contextlib.contextmanager
def guarded(plugin: Plugin) -> Iterator[None]:
    """Whatever a plugin raises, exits with or prints stays here: the failure is noted, prints go to standard error."""
    with overheard() as ear:
        try:
            yield
        except BaseException as error:
            if is_the_persons_wish(error):
                raise
            plugin.fail(describe(error))
    if ear.heard and not plugin.printed:
        plugin.printed = True
        plugin.fail(PRINTED)


def gather(paths: Iterable[str] = (), *, installed: bool = True, modules: Iterable[Any] = ()) -> Gathered:
    """Load installed plugins and those at the given paths, and ask each what it offers; `modules` are loaded already.

    A plugin at a path stands in for an installed one of the same name. Raises InputError where a path is not there. A plugin
    that fails is noted in `plugins`, never raised.
    """
    gathered = Gathered()
    given = [*map(_from_path, paths), *map(_from_module, modules)]
    replaced = {_plain(plugin.name) for plugin, _ in given} - {_plain(COMMON)}
    with keyboard_heeded():
        for plugin, load in [*(_installed(replaced) if installed else ()), *given]:
            gathered.plugins.append(plugin)
            loaded: list[Any] = []
            with guarded(plugin):
                loaded.append(load())
            if loaded:
                _ask(plugin, loaded[0], gathered)
    return gathered


def _plain(name: str) -> str:
    return name.replace("-", "_").lower()


def _installed(replaced: Iterable[str]) -> Iterator[tuple[Plugin, Callable[[], Any]]]:
    for entry in sorted(importlib.metadata.entry_points(group=GROUP), key=lambda one: (one.name != COMMON, one.name)):
        if _plain(entry.name) in replaced or _plain(entry.module) in replaced:
            continue
        version = entry.dist.version if entry.dist is not None else ""
        plugin = Plugin(entry.name, version, "installed")

        def load(entry: importlib.metadata.EntryPoint = entry, plugin: Plugin = plugin) -> Any:
            loaded = entry.load()
            plugin.place = str(getattr(loaded, "__file__", "") or "")
            return loaded

        yield plugin, load


def _from_module(module: Any) -> tuple[Plugin, Callable[[], Any]]:
    name = str(getattr(module, "__name__", type(module).__name__)).rpartition(".")[2]
    version, place = (str(getattr(module, word, "")) for word in ("__version__", "__file__"))
    return Plugin(name, version, "given", place=place), lambda: module


def _from_path(path: str) -> tuple[Plugin, Callable[[], ModuleType]]:
    file = _file_of(path)
    package = file.name == "__init__.py"
    name = file.resolve().parent.name if package else file.stem
    plugin = Plugin(name, "", name if package else file.name, place=str(file))

    def load() -> ModuleType:
        plugin.version = f"sha256 {_digest(file)}"
        module = _load_file(name, file)
        stated = getattr(module, "__version__", None)
        plugin.version = f"{stated}, {plugin.version}" if isinstance(stated, str) else plugin.version
        return module

    return plugin, load


def _file_of(path: str) -> Path:
    """The file to load: the one named, a package's first file, or the only plugin in a folder. Raises InputError."""
    place = Path(path)
    try:
        if not place.exists():
            raise InputError(f"{path}: there is no such plugin file or folder")
        if not place.is_dir():
            if place.suffix != ".py":
                raise InputError(f"{path}: this is not a plugin; accepted: a Python file, or a folder that holds a plugin")
            return place
        if (place / "__init__.py").is_file():
            return place / "__init__.py"
        packages = sorted(one for one in place.glob("*/__init__.py") if one.parent.name not in ("tests", "test"))
        single = sorted(one for one in place.glob("*.py") if not one.name.startswith(("test_", "conftest", "setup")))
    except (OSError, ValueError) as error:
        raise InputError(f"{path}: the plugin cannot be read: {error}") from None
    if len(packages + single) != 1:
        found = ", ".join(one.parent.name if one.name == "__init__.py" else one.name for one in packages + single)
        told = f"the folder holds more than one ({found})" if found else "the folder holds no plugin"
        raise InputError(f"{path}: {told}; accepted: a Python file, or a folder with one module or one package")
    return (packages + single)[0]


def _digest(file: Path) -> str:
    """A digest over the plugin's files, by name and content."""
    files = [file] if file.name != "__init__.py" else sorted(
        one for one in file.parent.rglob("*") if one.is_file() and one.suffix in (".py", ".yaml", ".yml"))
    whole = hashlib.sha256()
    for one in files:
        whole.update(one.relative_to(file.parent).as_posix().encode() + b"\0" + one.read_bytes() + b"\0")
    return whole.hexdigest()[:12]


def _load_file(name: str, file: Path) -> ModuleType:
    package = file.name == "__init__.py"
    unique = f"circuitlint_plugin_{hashlib.sha256(str(file.resolve()).encode()).hexdigest()[:12]}"
    places = [str(file.parent)] if package else None
    spec = importlib.util.spec_from_file_location(unique, file, submodule_search_locations=places)
    if spec is None or spec.loader is None:
        raise PluginError(f"{name} is not a Python module")
    module = importlib.util.module_from_spec(spec)
    for old in [one for one in sys.modules if one == unique or one.startswith(f"{unique}.")]:
        del sys.modules[old]
    sys.modules[unique] = module
    try:
        spec.loader.exec_module(module)
    except ModuleNotFoundError as error:
        sys.modules.pop(unique, None)
        if error.name == name or str(error.name).startswith(f"{name}."):
            raise PluginError(f"{name} imports itself by name, and is not installed; accepted: `from . import ...`") from None
        raise
    except BaseException:
        sys.modules.pop(unique, None)
        raise
    return module


def _ask(plugin: Plugin, module: Any, gathered: Gathered) -> None:
    """Ask a loaded plugin what it offers: load kinds before what rests on them; each hook fails alone."""
    manager = pluggy.PluginManager(hooks.PROJECT)
    manager.add_hookspecs(hooks)
    callers: dict[str, Any] = {}
    with guarded(plugin):
        _check_names(module)
        manager.register(module, plugin.name)
        manager.check_pending()
        callers = {caller.name: caller for caller in manager.get_hookcallers(module) or ()}
    if not callers and not plugin.failed:
        plugin.fail("it answers none of circuitlint's hooks; decorate a function with `offers`")
    takers: dict[str, Callable[[Plugin, Any, Gathered], None]] = {
        "circuitlint_load_kinds": _take_kinds,
        "circuitlint_figures": _take_figures,
        "circuitlint_rules": _take_rules,
        "circuitlint_reading_rules": _take_reading_rules,
        "circuitlint_rulesets": _take_rulesets,
        "circuitlint_parts": _take_parts,
        "circuitlint_reports": _take_reports,
    }
    for name, take in takers.items():
        for implementation in callers[name].get_hookimpls() if name in callers else ():
            with guarded(plugin):
                take(plugin, implementation.function(), gathered)


def _check_names(module: Any) -> None:
    """A hook that is misspelt or not decorated would never be asked, so it is refused. Raises PluginError."""
    known = sorted(name for name in vars(hooks) if name.startswith("circuitlint_"))
    for name, value in sorted(vars(module).items()) if hasattr(module, "__dict__") else ():
        if not name.startswith("circuitlint_") or not callable(value) or isinstance(value, (type, ModuleType)):
            continue
        if name not in known:
            close = difflib.get_close_matches(name, known, 1)
            told = f"did you mean {close[0]!r}?" if close else f"one of {', '.join(known)}"
            raise PluginError(f"there is no hook {name!r}; accepted: {told}")
        if not hasattr(value, f"{hooks.PROJECT}_impl"):
            raise PluginError(f"{name} is not decorated, so nobody would ask it; accepted: `@offers` above it")


def _take_rules(plugin: Plugin, offered: object, gathered: Gathered) -> None:
    found = gathered.take("rule", {one.name: one for one in taking.rules(offered)}, plugin)
    gathered.rules.update({name: (GuardedRule(rule), plugin) for name, rule in found.items()})
    plugin.offers += [f"rule {name}" for name in found]


def _take_reading_rules(plugin: Plugin, offered: object, gathered: Gathered) -> None:
    found = gathered.take("rule on readings", {one.name: one for one in taking.reading_rules(offered)}, plugin)
    gathered.reading_rules.update({name: (rule, plugin) for name, rule in found.items()})
    plugin.offers += [f"rule on readings {name}" for name in found]


def _take_rulesets(plugin: Plugin, offered: object, gathered: Gathered) -> None:
    read = taking.rulesets(offered)
    names = [one.content.name for one in read]
    if len(set(names)) < len(names):
        raise PluginError("circuitlint_rulesets offers two rulesets of one name")
    gathered.rulesets.update(gathered.take("ruleset", dict(zip(names, read, strict=True)), plugin))
    plugin.offers += [f"ruleset {name}" for name in names]


def _take_parts(plugin: Plugin, offered: object, gathered: Gathered) -> None:
    read = taking.parts(offered, gathered.models())
    gathered.take("part", {name: file for file, _, names in read for name in names}, plugin)
    gathered.parts += [(file, content) for file, content, _ in read]
    plugin.offers += [f"part {name}" for _, _, names in read for name in names]


def _take_kinds(plugin: Plugin, offered: object, gathered: Gathered) -> None:
    kinds = {one.name: one for one in taking.load_kinds(offered)}
    clash = [name for name in kinds if name in CORE]
    if clash:
        raise PluginError(f"the load kind name {clash[0]!r} is taken by circuitlint itself")
    found = gathered.take("load kind", kinds, plugin)
    gathered.kinds.update({name: GuardedKind(kind, plugin.name, gathered.troubles) for name, kind in found.items()})
    plugin.offers += [f"load kind {name}" for name in found]


def _take_figures(plugin: Plugin, offered: object, gathered: Gathered) -> None:
    added = taking.figures(offered, gathered.kinds)
    gathered.take("figure", {f"{figure} of {one.of or 'the circuit'}": one for one in added for figure in one.gives}, plugin)
    gathered.kinds.extras += [GuardedFigures(one, plugin.name, gathered.troubles) for one in added]
    plugin.offers += [f"figures {one.name}" for one in added]


def _take_reports(plugin: Plugin, offered: object, gathered: Gathered) -> None:
    found = gathered.take("report kind", taking.reports(offered), plugin)
    gathered.reports.update({name: GuardedReport(name, render, plugin.name) for name, render in found.items()})
    plugin.offers += [f"report kind {name}" for name in found]
