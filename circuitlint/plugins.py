"""Gathers what plugins offer, each behind a guard of its own, so that a broken plugin is named and loses only itself.

Plugins come from installed entry points (group `circuitlint`) and from files or folders named by the caller, never from a
definition or a ruleset.
"""

from __future__ import annotations

import contextlib
import hashlib
import importlib.metadata
import importlib.util
import inspect
import os
import sys
from collections.abc import Callable, Iterable, Iterator
from dataclasses import dataclass, field
from pathlib import Path
from types import ModuleType
from typing import Any

import pluggy
from pydantic import BaseModel

from circuitlint import hooks
from circuitlint.errors import InputError, PluginError, RulesetError
from circuitlint.limits.reading import RulesetText, read_ruleset
from circuitlint.review.rule import Rule
from circuitlint.study.loads import CORE
from circuitlint.study.plan import LoadKind

GROUP = "circuitlint"


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


@dataclass(slots=True)
class Gathered:
    """Everything the plugins offer, by name."""

    plugins: list[Plugin] = field(default_factory=list)
    rules: dict[str, tuple[Rule, Plugin]] = field(default_factory=dict)
    rulesets: dict[str, RulesetText] = field(default_factory=dict)
    parts: list[tuple[str, bytes]] = field(default_factory=list)
    kinds: dict[str, LoadKind[Any]] = field(default_factory=lambda: dict(CORE))
    reports: dict[str, hooks.RenderRecord] = field(default_factory=dict)

    def models(self) -> dict[str, type[BaseModel]]:
        """The models of all load kinds, for reading a definition."""
        return {name: kind.model for name, kind in self.kinds.items()}


@contextlib.contextmanager
def guarded(plugin: Plugin) -> Iterator[None]:
    """Whatever a plugin raises, exits with or prints stays here: the failure is noted, prints go to standard error."""
    try:
        with contextlib.redirect_stdout(sys.stderr):
            yield
    except BaseException as error:
        plugin.failed = plugin.failed or describe(error)


def describe(error: BaseException) -> str:
    """An exception in one line: kind, message, and the place in the plugin's own file."""
    text = " ".join(str(error).split()) or "no message"
    trace = error.__traceback__
    place = ""
    while trace is not None:
        name = os.path.basename(trace.tb_frame.f_code.co_filename)
        place = f" ({name}, line {trace.tb_lineno})"
        trace = trace.tb_next
    return f"{type(error).__name__}: {text[:300]}{place}"


def gather(paths: Iterable[str] = (), *, installed: bool = True) -> Gathered:
    """Load installed plugins and those at the given paths, and ask each what it offers.

    Raises InputError where a path is not there. A plugin that fails is noted in `plugins`, never raised.
    """
    gathered = Gathered()
    for plugin, load in [*(_installed() if installed else ()), *map(_from_path, paths)]:
        gathered.plugins.append(plugin)
        module: list[Any] = []
        with guarded(plugin):
            module.append(load())
        if module:
            with guarded(plugin):
                _ask(plugin, module[0], gathered)
    return gathered


def _installed() -> Iterator[tuple[Plugin, Callable[[], Any]]]:
    found = sorted(importlib.metadata.entry_points(group=GROUP), key=lambda one: (one.name != "circuitlint_rules", one.name))
    for entry in found:
        version = entry.dist.version if entry.dist is not None else ""
        yield Plugin(entry.name, version, "installed"), entry.load


def _from_path(path: str) -> tuple[Plugin, Callable[[], ModuleType]]:
    place = Path(path)
    file = place / "__init__.py" if place.is_dir() else place
    if place.is_dir() and not file.is_file():
        inner = sorted(place.glob("*/__init__.py"))
        modules = sorted(one for one in place.glob("*.py") if not one.name.startswith(("test_", "conftest", "setup")))
        if len(inner) == 1:
            file = inner[0]
        elif len(modules) == 1:
            file = modules[0]
        else:
            raise InputError(f"{path}: the folder holds no plugin; accepted: one module, or one package with __init__.py")
    if not file.is_file():
        raise InputError(f"{path}: there is no such plugin file or folder")
    name = file.parent.name if file.name == "__init__.py" else file.stem
    digest = hashlib.sha256(file.read_bytes()).hexdigest()[:12]

    def load() -> ModuleType:
        return _load_file(name, file)

    return Plugin(name, f"sha256 {digest}", file.name if file.name != "__init__.py" else name, place=str(file)), load


def _load_file(name: str, file: Path) -> ModuleType:
    package = file.name == "__init__.py"
    unique = f"circuitlint_plugin_{hashlib.sha256(str(file.resolve()).encode()).hexdigest()[:12]}"
    places = [str(file.parent)] if package else None
    spec = importlib.util.spec_from_file_location(unique, file, submodule_search_locations=places)
    if spec is None or spec.loader is None:
        raise PluginError(f"{name} is not a Python module")
    module = importlib.util.module_from_spec(spec)
    sys.modules[unique] = module
    try:
        spec.loader.exec_module(module)
    except BaseException:
        del sys.modules[unique]
        raise
    return module


def _ask(plugin: Plugin, module: Any, gathered: Gathered) -> None:
    manager = pluggy.PluginManager(hooks.PROJECT)
    manager.add_hookspecs(hooks)
    manager.register(module, plugin.name)
    manager.check_pending()
    callers = manager.get_hookcallers(module) or []
    if not callers:
        raise PluginError("it answers none of circuitlint's hooks; decorate a function with `offers`")
    takers: dict[str, Callable[[Plugin, Any, Gathered], None]] = {
        "circuitlint_load_kinds": _take_kinds,
        "circuitlint_rules": _take_rules,
        "circuitlint_rulesets": _take_rulesets,
        "circuitlint_parts": _take_parts,
        "circuitlint_reports": _take_reports,
    }
    by_name = {caller.name: caller for caller in callers}
    for name, take in takers.items():
        caller = by_name.get(name)
        if caller is None:
            continue
        with guarded(plugin):
            for implementation in caller.get_hookimpls():
                take(plugin, implementation.function(), gathered)


def _take_rules(plugin: Plugin, offered: Iterable[type[Rule]], gathered: Gathered) -> None:
    for made in offered:
        if not (inspect.isclass(made) and issubclass(made, Rule)):
            raise PluginError(f"circuitlint_rules offers {made!r}, which is not a Rule class")
        rule = made()
        for word in ("name", "title", "purpose", "applies_to", "figures", "states", "needs", "helps"):
            if not hasattr(rule, word):
                raise PluginError(f"the rule {made.__name__} has no `{word}`")
        if rule.name in gathered.rules:
            taken = gathered.rules[rule.name][1].name
            raise PluginError(f"the rule name {rule.name!r} is taken by {taken}")
        gathered.rules[rule.name] = (rule, plugin)
        plugin.offers.append(f"rule {rule.name}")


def _take_rulesets(plugin: Plugin, offered: Iterable[tuple[str, bytes]], gathered: Gathered) -> None:
    for file, content in offered:
        try:
            ruleset = read_ruleset(content, file)
        except RulesetError as error:
            raise PluginError(str(error)) from None
        if ruleset.content.name in gathered.rulesets:
            raise PluginError(f"the ruleset name {ruleset.content.name!r} is taken")
        gathered.rulesets[ruleset.content.name] = ruleset
        plugin.offers.append(f"ruleset {ruleset.content.name}")


def _take_parts(plugin: Plugin, offered: Iterable[tuple[str, bytes]], gathered: Gathered) -> None:
    for file, content in offered:
        gathered.parts.append((file, bytes(content)))
        plugin.offers.append(f"parts {file}")


def _take_kinds(plugin: Plugin, offered: Iterable[LoadKind[Any]], gathered: Gathered) -> None:
    for kind in offered:
        if not isinstance(kind, LoadKind):
            raise PluginError(f"circuitlint_load_kinds offers {kind!r}, which is not a LoadKind")
        if kind.name in gathered.kinds or kind.name in ("series", "parallel", "name", "part"):
            raise PluginError(f"the load kind {kind.name!r} is taken")
        gathered.kinds[kind.name] = kind
        plugin.offers.append(f"load kind {kind.name}")


def _take_reports(plugin: Plugin, offered: Any, gathered: Gathered) -> None:
    for name, render in dict(offered).items():
        if name in gathered.reports or not callable(render):
            raise PluginError(f"the report kind {name!r} is taken or cannot be called")
        gathered.reports[name] = render
        plugin.offers.append(f"report {name}")
