"""What a plugin offers, looked at before it is taken: of the right type, complete, well named. Raises PluginError, in words."""

from __future__ import annotations

import difflib
import inspect
import re
from collections.abc import Callable, Iterable, Mapping
from typing import Any

from pydantic import BaseModel

from circuitlint.definition.parts import parts_of
from circuitlint.definition.reading import read_contents
from circuitlint.definition.text import Text, parse
from circuitlint.errors import InputError, PluginError, RulesetError
from circuitlint.limits.models import LimitSpec
from circuitlint.limits.reading import RulesetText, read_ruleset
from circuitlint.readings.rule import ReadingRule
from circuitlint.review.record import Record
from circuitlint.review.rule import Rule
from circuitlint.study.extras import ExtraFigures
from circuitlint.study.plan import LoadKind
from circuitlint.study.states import STATES

NAME = re.compile(r"[a-z0-9]+(-[a-z0-9]+)*")
KEY = re.compile(r"[a-z][a-z0-9]*(_[a-z0-9]+)*")
_ACCEPTED = {NAME: "lower case with hyphens, such as 'coil-heating'", KEY: "lower case with underscores, such as 'lift_magnet'"}
RESERVED_KEYS = ("series", "parallel", "several", "delta", "name", "count", "part", "load")


def each(hook: str, offered: object) -> list[Any]:
    """What a hook gives, as a list."""
    if isinstance(offered, (str, bytes, Mapping)) or not isinstance(offered, Iterable):
        raise PluginError(f"{hook} gives {type(offered).__name__}; accepted: a list")
    return list(offered)


def rules(offered: object) -> list[Rule]:
    """Rule classes, each made once."""
    made: list[Rule] = []
    for one in each("circuitlint_rules", offered):
        if not (inspect.isclass(one) and issubclass(one, Rule)):
            raise PluginError(f"circuitlint_rules offers {one!r:.120}, which is not a Rule class")
        rule: Any = one()
        _name("rule", one.__name__, rule, NAME)
        for word in ("title", "purpose", "applies_to", "helps"):
            _text("rule", one.__name__, rule, word)
        for word in ("figures", "states", "needs"):
            _texts("rule", one.__name__, rule, word)
        for state in rule.states:
            if state not in STATES:
                raise PluginError(f"the rule {rule.name!r} looks at the state {state!r}; accepted: {_nearest(state, STATES)}")
        if not isinstance(rule.limits, Mapping) or not all(isinstance(spec, LimitSpec) for spec in rule.limits.values()):
            raise PluginError(f"the rule {rule.name!r} has `limits` that are not LimitSpec by name")
        made.append(rule)
    return _once("circuitlint_rules", made)


def reading_rules(offered: object) -> list[ReadingRule]:
    """Classes of rules on readings, each made once."""
    made: list[ReadingRule] = []
    for one in each("circuitlint_reading_rules", offered):
        if not (inspect.isclass(one) and issubclass(one, ReadingRule)):
            raise PluginError(f"circuitlint_reading_rules offers {one!r:.120}, which is not a ReadingRule class")
        rule: Any = one()
        _name("rule on readings", one.__name__, rule, NAME)
        _text("rule on readings", one.__name__, rule, "title")
        made.append(rule)
    return _once("circuitlint_reading_rules", made)


def rulesets(offered: object) -> list[RulesetText]:
    """Rulesets, read."""
    made = []
    for file, content in _files("circuitlint_rulesets", offered):
        try:
            made.append(read_ruleset(content, file))
        except RulesetError as error:
            raise PluginError(str(error)) from None
    return made


def parts(offered: object, models: Mapping[str, type[BaseModel]]) -> list[tuple[str, bytes, list[str]]]:
    """Parts files with the names of their parts, each read on its own."""
    made = []
    for file, content in _files("circuitlint_parts", offered):
        text: Text = parse(content, file)
        keys = [key.value for key, _ in text.root.value] if text.root is not None and isinstance(text.root.value, list) else []
        strange = [key for key in keys if key not in ("format", "parts")]
        if strange:
            raise PluginError(f"{file} has {strange[0]!r}; accepted: nothing but `format:` and `parts:`")
        try:
            read_contents([(file, content)], models)
        except InputError as error:
            raise PluginError(str(error)) from None
        made.append((file, content, list(parts_of(text))))
    return made


def load_kinds(offered: object) -> list[LoadKind[Any]]:
    """Load kinds."""
    made = []
    for one in each("circuitlint_load_kinds", offered):
        if not isinstance(one, LoadKind):
            raise PluginError(f"circuitlint_load_kinds offers {one!r:.120}, which is not an object of a LoadKind class")
        _name("load kind", type(one).__name__, one, KEY)
        if one.name in RESERVED_KEYS:
            raise PluginError(f"the load kind name {one.name!r} has a meaning of its own in a definition")
        if not (inspect.isclass(getattr(one, "model", None)) and issubclass(one.model, BaseModel)):
            raise PluginError(f"the load kind {one.name!r} has no `model`; accepted: a class built on Entry")
        made.append(one)
    return _once("circuitlint_load_kinds", made)


def figures(offered: object, kinds: Iterable[str]) -> list[ExtraFigures]:
    """Extra figures; `kinds` are the load kinds there are."""
    known = list(kinds)
    made = []
    for one in each("circuitlint_figures", offered):
        if not isinstance(one, ExtraFigures):
            raise PluginError(f"circuitlint_figures offers {one!r:.120}, which is not an object of an ExtraFigures class")
        _name("extra figures", type(one).__name__, one, NAME)
        _texts("extra figures", type(one).__name__, one, "gives")
        if not one.gives:
            raise PluginError(f"the extra figures {one.name!r} give nothing; accepted: `gives` with at least one name")
        if one.of and one.of not in known:
            raise PluginError(f"the extra figures {one.name!r} are of {one.of!r}; accepted: {_nearest(str(one.of), known)}")
        made.append(one)
    return _once("circuitlint_figures", made)


def reports(offered: object) -> dict[str, Callable[[Record], str]]:
    """Report kinds by name."""
    if not isinstance(offered, Mapping):
        raise PluginError(f"circuitlint_reports gives {type(offered).__name__}; accepted: functions by name")
    for name, render in offered.items():
        if not isinstance(name, str) or not NAME.fullmatch(name):
            raise PluginError(f"the report kind {name!r:.80} is not well named; accepted: lower case with hyphens")
        if not callable(render):
            raise PluginError(f"the report kind {name!r} is {type(render).__name__}; accepted: a function of the record")
    return dict(offered)


def _files(hook: str, offered: object) -> list[tuple[str, bytes]]:
    made = []
    for one in each(hook, offered):
        if not (isinstance(one, tuple) and len(one) == 2 and isinstance(one[0], str) and isinstance(one[1], bytes)):
            raise PluginError(f"{hook} offers {one!r:.80}; accepted: a file name and its content in bytes")
        made.append(one)
    return made


def _name(what: str, made: str, owner: object, pattern: re.Pattern[str]) -> None:
    name = getattr(owner, "name", None)
    if not isinstance(name, str) or not pattern.fullmatch(name):
        raise PluginError(f"the {what} {made} is named {name!r:.80}; accepted: {_ACCEPTED[pattern]}")


def _text(what: str, made: str, owner: object, word: str) -> None:
    value = getattr(owner, word, None)
    if not isinstance(value, str) or not value.strip():
        told = "has no" if value is None else f"has {type(value).__name__} as"
        raise PluginError(f"the {what} {made} {told} `{word}`; accepted: a text")


def _texts(what: str, made: str, owner: object, word: str) -> None:
    value = getattr(owner, word, None)
    if not isinstance(value, tuple) or not all(isinstance(one, str) for one in value):
        told = "has no" if value is None else f"has {type(value).__name__} as"
        raise PluginError(f"the {what} {made} {told} `{word}`; accepted: a tuple of texts, such as (\"current\",)")


def _once(hook: str, made: list[Any]) -> list[Any]:
    names = [one.name for one in made]
    twice = [name for name in names if names.count(name) > 1]
    if twice:
        raise PluginError(f"{hook} offers {twice[0]!r} twice")
    return made


def _nearest(word: str, known: Iterable[str]) -> str:
    names = sorted(known)
    close = difflib.get_close_matches(word, names, 1)
    return f"did you mean {close[0]!r}?" if close else f"one of {', '.join(names)}"
