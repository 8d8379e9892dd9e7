"""What the promises of every rule are tried with: definitions with one datum left out, and definitions without tolerances."""

from __future__ import annotations

import json
from collections.abc import Iterator, Sequence
from dataclasses import replace
from typing import Any, TypeVar

from pydantic import BaseModel

from circuitlint.definition.reading import Installation
from circuitlint.definition.text import Builder, Path, parse
from circuitlint.quantity import Quantity

DELETIONS_NEEDED = 1
M = TypeVar("M", bound=BaseModel)

NOT_DATA = frozenset({
    "format", "title", "ruleset", "tag", "serves", "name", "part", "fed_from", "system", "count", "phase", "connection",
    "winding",
})
"""Keys that say which circuit it is, or which circuit it would be without them, and not what is known of it."""
LEFT_OUT_WHOLE = frozenset({"cable", "open_gap"})


def without_each_datum(definition: str, catalogues: Sequence[tuple[str, bytes]] = ()) -> Iterator[tuple[str, str]]:
    """The definition as often as it has data, each time without one: the datum's path, and the text."""
    parts: dict[str, Any] = {}
    for _, content in catalogues:
        parts |= _plain(content).get("parts") or {}
    tree = _plain(definition.encode())
    parts |= tree.pop("parts", None) or {}
    tree = _expanded(tree, parts)
    for group in ("supplies", "boards", "circuits"):
        for path in _data_of(tree.get(group) or {}, (group,)):
            yield spelt(path), json.dumps(_without(*_alone(tree, path)), ensure_ascii=False, indent=1)


def _alone(tree: dict[str, Any], path: Path) -> tuple[dict[str, Any], Path]:
    """The definition with no other circuits where no board joins them, and the path in it: what is left out there is enough."""
    circuits = tree.get("circuits")
    if path[0] != "circuits" or tree.get("boards") or not isinstance(circuits, list):
        return tree, path
    return {**tree, "circuits": [circuits[int(path[1])]]}, ("circuits", 0, *path[2:])


def _plain(content: bytes) -> dict[str, Any]:
    text = parse(content, "definition.yaml")
    made: Any = Builder(text).build(text.root)
    return dict(made) if isinstance(made, dict) else {}


def _expanded(tree: Any, parts: dict[str, Any], inside: tuple[str, ...] = ()) -> Any:
    """The tree with its parts written out, so that leaving out a datum leaves none behind it."""
    if isinstance(tree, list):
        return [_expanded(one, parts, inside) for one in tree]
    if not isinstance(tree, dict):
        return tree
    name = tree.get("part")
    own = {key: _expanded(value, parts, inside) for key, value in tree.items() if key != "part"}
    if not isinstance(name, str) or name not in parts or name in inside:
        return own
    return _over(_expanded(parts[name], parts, (*inside, name)), own)


def _over(base: Any, own: Any) -> Any:
    if not (isinstance(base, dict) and isinstance(own, dict)):
        return own
    return base | {key: _over(base[key], value) if key in base else value for key, value in own.items()}


def _data_of(tree: Any, path: Path) -> Iterator[Path]:
    pairs = tree.items() if isinstance(tree, dict) else enumerate(tree) if isinstance(tree, list) else ()
    for key, value in pairs:
        here = (*path, key)
        datum = isinstance(key, str) and key not in NOT_DATA and (isinstance(value, str) or key in LEFT_OUT_WHOLE)
        if datum:
            yield here
        if isinstance(value, (dict, list)):
            yield from _data_of(value, here)


def _without(tree: Any, path: Sequence[str | int]) -> Any:
    step, *rest = path
    if isinstance(tree, list):
        return [_without(one, rest) if number == step else one for number, one in enumerate(tree)]
    if not rest:
        return {key: value for key, value in tree.items() if key != step}
    return {key: _without(value, rest) if key == step else value for key, value in tree.items()}


def spelt(path: Sequence[str | int]) -> str:
    """A path as a person writes it: `circuits[0].load.coil.resistance`."""
    text = "".join(f"[{step}]" if isinstance(step, int) else f".{step}" for step in path)
    return text.removeprefix(".")


def narrowed(installation: Installation) -> Installation:
    """The same installation with every quantity at its nominal value."""
    return replace(
        installation,
        supplies={name: _narrow(one) for name, one in installation.supplies.items()},
        boards={name: _narrow(one) for name, one in installation.boards.items()},
        circuits=[replace(one, entry=_narrow(one.entry)) for one in installation.circuits],
    )


def _narrow(entry: M) -> M:
    return entry.model_copy(update={name: _nominal(value) for name, value in entry.__dict__.items()})


def _nominal(value: Any) -> Any:
    if isinstance(value, Quantity):
        return replace(value, low=value.nominal, high=value.nominal)
    if isinstance(value, BaseModel):
        return _narrow(value)
    if isinstance(value, list):
        return [_nominal(one) for one in value]
    return value
