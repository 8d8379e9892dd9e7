"""The data files of the tables, each read once, when it is first asked for."""

from __future__ import annotations

import math
from collections.abc import Iterable, Mapping, Sequence
from dataclasses import replace
from functools import lru_cache
from importlib.resources import files
from typing import Any

import yaml

from circuitlint.errors import OutOfTable
from circuitlint.sources import Source

_SAFE_LOADER: Any = getattr(yaml, "CSafeLoader", yaml.SafeLoader)


@lru_cache(maxsize=64)
def data(name: str) -> Mapping[str, Any]:
    """One data file of the package, without its ending."""
    text = (files("circuitlint.tables") / "data" / f"{name}.yaml").read_text("utf-8")
    loader = _SAFE_LOADER(text)
    try:
        loaded: Mapping[str, Any] = loader.get_single_data()
    finally:
        loader.dispose()
    return loaded


def source(entry: Mapping[str, Any], **changes: str) -> Source:
    """The source as a data file states it, with changes for one cell."""
    return Source(**{**entry, **changes})


def noted(entry: Source, note: str) -> Source:
    """The same source with a note added to its own."""
    return replace(entry, note="; ".join(part for part in (entry.note, note) if part))


def pick(choices: Mapping[str, Any], key: str, what: str) -> Any:
    """What stands under a key. Raises OutOfTable, naming those that are tabled."""
    if choices.get(key) is None:
        present = [one for one, value in choices.items() if value is not None]
        raise OutOfTable(f"{what} {key} is not tabled; tabled are {listed(present)}")
    return choices[key]


def figures(entry: Mapping[str, Any]) -> dict[str, Any]:
    """An entry without its source."""
    return {key: one for key, one in entry.items() if key != "source"}


def place_of(value: float, tabled: Sequence[float], what: str, unit: str = "") -> int:
    """Where a magnitude stands among the tabled ones, equal to 1e-9 of itself. Raises OutOfTable, naming those tabled."""
    for place, one in enumerate(tabled):
        if math.isclose(value, one, rel_tol=1e-9):
            return place
    ending = f" {unit}" if unit else ""
    raise OutOfTable(f"{value:g}{ending} is not tabled for {what}; tabled are {listed(tabled)}{ending}")


def listed(words: Iterable[object]) -> str:
    """`1.5, 2.5, 4`: numbers in their shortest form."""
    return ", ".join(f"{one:g}" if isinstance(one, (int, float)) else str(one) for one in words)
