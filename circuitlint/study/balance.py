"""Every study proves itself: complex power delivered equals complex power absorbed, and Kirchhoff's laws hold."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from typing import Any

import numpy as np

from circuitlint.si import RealArray
from circuitlint.study.plan import Node
from circuitlint.study.worksheet import Key

BOUND = 1e-9


def imbalance(values: Mapping[Key, Any], tree: Node, places: Sequence[str], phases: int = 1) -> RealArray:
    """The largest relative imbalance of any node, per case; zero where there is nothing to compare.

    Compared are: source power against the sum over cables and leaves, source voltage against the sum of voltages along the
    way (`places` are its cables and feeders), and at each `series` or `parallel` its own voltage or current against the sum
    over its parts.
    """
    worst: Any = 0.0
    leaves = list(_leaves(tree))
    power = [values.get(Key("power phasor", ""))]
    parts = [values.get(Key("power phasor", place)) for place in leaves]
    parts += [_product(values, place, phases) for place in places]
    worst = np.maximum(worst, _apart(power, parts))
    along = [values.get(Key("voltage phasor", place)) for place in (*places, tree.place)]
    worst = np.maximum(worst, _apart([values.get(Key("supply phasor", ""))], along))
    for node in _inner(tree):
        if node.kind == "delta":
            continue
        word = "current phasor" if node.kind == "parallel" else "voltage phasor"
        below = [values.get(Key(word, one.place)) for one in node.nodes]
        worst = np.maximum(worst, _apart([values.get(Key(word, node.place))], below))
    return np.asarray(worst, dtype=float)


def _product(values: Mapping[Key, Any], place: str, phases: int) -> Any:
    voltage, line = values.get(Key("voltage phasor", place)), values.get(Key("current phasor", ""))
    return None if voltage is None or line is None else phases * voltage * np.conj(line)


def _apart(whole: list[Any], parts: list[Any]) -> Any:
    """Relative distance of a whole from the sum of its parts; zero where one of them is not known."""
    if any(one is None for one in (*whole, *parts)):
        return 0.0
    total = sum(parts)
    scale = np.abs(whole[0]) + sum(np.abs(one) for one in parts)
    with np.errstate(all="ignore"):
        return np.where(scale > 0.0, np.abs(whole[0] - total) / np.where(scale > 0.0, scale, 1.0), 0.0)


def _leaves(node: Node) -> list[str]:
    """Places whose power adds up to the load's; of several equal loads, the place of all of them together."""
    if node.kind in ("several", "delta"):
        return [node.place]
    return [place for one in node.nodes for place in _leaves(one)] if node.nodes else [node.place]


def _inner(node: Node) -> list[Node]:
    return [node, *(deeper for one in node.nodes for deeper in _inner(one))] if node.nodes else []
