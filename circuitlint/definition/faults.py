"""What pydantic found wrong, told as faults with a place in the file and what would be accepted."""

from __future__ import annotations

import types
from collections.abc import Mapping, Sequence
from typing import Annotated, Any, Literal, Union, get_args, get_origin

import yaml
from pydantic import BaseModel, ValidationError

from circuitlint.definition.parts import nearest
from circuitlint.definition.text import Step, fault_at, follow, key_node
from circuitlint.errors import Fault


def faults_of(error: ValidationError, model: type[BaseModel], root: yaml.Node | None, file: str) -> list[Fault]:
    """Every fault of one validation, each at its own entry."""
    return [_fault(dict(one), model, root, file) for one in error.errors(include_url=False)]


def _fault(one: Mapping[str, Any], model: type[BaseModel], root: yaml.Node | None, file: str) -> Fault:
    path: Sequence[Step] = one["loc"]
    kind = one["type"]
    context = one.get("ctx") or {}
    last = path[-1] if path else ""
    if kind == "extra_forbidden":
        known = _known_keys(model, path[:-1])
        close = nearest(str(last), known)
        accepted = f"did you mean {close!r}?" if close else f"one of {', '.join(known)}"
        parent = follow(root, path[:-1])
        return fault_at(key_node(parent, last) or parent, file, f"unknown key {last!r}", accepted)
    node = follow(root, path)
    if kind == "missing":
        return fault_at(follow(root, path[:-1]), file, f"the key {last!r} is missing", f"`{last}: ...`")
    if "accepted" in context:
        return fault_at(node, file, str(context["what"]), str(context["accepted"]))
    read = _told(one.get("input"))
    if kind == "literal_error":
        choices = _choices(model, path) or [str(context.get("expected", ""))]
        close = nearest(read.strip("'"), choices)
        accepted = " | ".join(choices) + (f" (did you mean {close!r}?)" if close else "")
        return fault_at(node, file, f"{last!r} reads {read}", accepted)
    if kind in ("model_type", "dict_type", "model_attributes_type"):
        return fault_at(node, file, f"{_label(path)} reads {read}, not a mapping", "`key: value` lines")
    if kind == "list_type":
        return fault_at(node, file, f"{_label(path)} reads {read}, not a list", "a list, one `- ` a line")
    return fault_at(node, file, f"{_label(path)} reads {read}", str(one["msg"]).removeprefix("Input should be "))


def _label(path: Sequence[Step]) -> str:
    words = [step for step in path if isinstance(step, str)]
    return repr(words[-1]) if words else "the file"


def _told(value: Any) -> str:
    if isinstance(value, str):
        return repr(value if len(value) <= 60 else value[:57] + "...")
    if value is None:
        return "nothing"
    return "a mapping" if isinstance(value, dict) else "a list" if isinstance(value, list) else repr(value)[:60]


def _walk(model: Any, path: Sequence[Step]) -> Any:
    """The type that stands at a path of a model; None where the path leaves it."""
    current: Any = model
    for step in path:
        current = _bare(current)
        if isinstance(current, type) and issubclass(current, BaseModel):
            field = current.model_fields.get(str(step))
            current = field.annotation if field else None
        elif get_origin(current) in (list, dict):
            current = get_args(current)[-1]
        else:
            return None
    return _bare(current)


def _bare(hint: Any) -> Any:
    """A type without Annotated and Optional."""
    while True:
        if get_origin(hint) is Annotated:
            hint = get_args(hint)[0]
        elif get_origin(hint) in (Union, types.UnionType):
            kept = [arg for arg in get_args(hint) if arg is not type(None)]
            if len(kept) != 1:
                return hint
            hint = kept[0]
        else:
            return hint


def _known_keys(model: type[BaseModel], path: Sequence[Step]) -> list[str]:
    found = _walk(model, path)
    return list(found.model_fields) if isinstance(found, type) and issubclass(found, BaseModel) else []


def _choices(model: type[BaseModel], path: Sequence[Step]) -> list[str]:
    found = _walk(model, path)
    return [str(choice) for choice in get_args(found)] if get_origin(found) is Literal else []
