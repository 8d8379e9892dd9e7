"""Which points of the tolerance box are studied, and the search for each figure's lowest and highest value there.

A point is a vector with one entry per toleranced input, from -1 (lowest) over 0 (nominal) to 1 (highest). Extremes need not
lie in corners: a correction capacitor can put the least current inside the box, and a winding's loss is largest where its
resistance equals its reactance. So corners (or the vertices the sensitivities point to) are joined by interior points, and
the best point of each figure that is asked for is then moved until no neighbour is better.
"""

from __future__ import annotations

from collections.abc import Callable, Sequence
from itertools import product
from typing import TypeAlias

import numpy as np

from circuitlint.si import RealArray

FEW = 4
FEW_WITH_CAPACITOR = 8
"""So many inputs have all their corners studied. A capacitor makes several hills and valleys, so more are taken then."""
INTERIOR = 16
SMALLEST_STEP = 1e-3
PROBE = 0.05
"""First step of the search. Where no neighbour at this distance is better, the best point studied is kept."""
MOST_MOVES = 60
GAIN = 1e-9
"""Relative improvement below which a move is not worth another look."""

Evaluate: TypeAlias = Callable[[RealArray], RealArray]
"""Points of shape (circuits, points, inputs) or (1, points, inputs) to figures of shape (figures, circuits, points)."""


def opening_points(inputs: int, few: int = FEW_WITH_CAPACITOR) -> RealArray:
    """Nominal, one input at a time, corners while the inputs are few, seeded interior points; shape (1, points, inputs)."""
    if inputs == 0:
        return np.zeros((1, 1, 0))
    alone = np.concatenate([np.eye(inputs), -np.eye(inputs)])
    blocks = [np.zeros((1, inputs)), alone]
    if 1 < inputs <= few:
        blocks.append(np.array(list(product((-1.0, 1.0), repeat=inputs))))
    blocks.append(interior_points(inputs, INTERIOR))
    return np.concatenate(blocks)[np.newaxis]


def interior_points(inputs: int, count: int) -> RealArray:
    """An additive recurrence of low discrepancy over the box, always the same; shape (count, inputs).

    The generator is the generalised golden ratio, the root of x^(d+1) = x + 1.
    """
    ratio = 1.5
    for _ in range(60):
        ratio = (1.0 + ratio) ** (1.0 / (inputs + 1))
    steps = ratio ** -np.arange(1.0, inputs + 1)
    sequence: RealArray = 2.0 * ((0.5 + np.outer(np.arange(1.0, count + 1), steps)) % 1.0) - 1.0
    return sequence


def vertices_by_sensitivity(figures: RealArray, inputs: int, few: int) -> RealArray:
    """The corners that one-at-a-time sensitivities point to; shape (circuits, vertices, inputs).

    `figures` holds the opening points' figures, shape (figures, circuits, points). First come the two corners each figure points
    to, then every corner of the few inputs that matter most, the others nominal.
    """
    circuits = figures.shape[1]
    nominal = figures[:, :, :1]
    up = figures[:, :, 1 : 1 + inputs]
    down = figures[:, :, 1 + inputs : 1 + 2 * inputs]
    signs = np.where(np.nan_to_num(up - down) >= 0.0, 1.0, -1.0)
    both = np.moveaxis(np.concatenate([signs, -signs]), 0, 1)
    apart = np.nan_to_num(np.maximum(np.abs(up - nominal), np.abs(down - nominal)))
    reach = np.divide(apart, np.abs(nominal), out=np.zeros_like(apart), where=np.abs(nominal) > 0.0)
    most = np.argsort(-np.sum(reach, axis=(0, 1)), kind="stable")[:few]
    corners = np.zeros((2**few, inputs))
    corners[:, most] = list(product((-1.0, 1.0), repeat=few))
    vertices: RealArray = np.concatenate([both, np.broadcast_to(corners, (circuits, *corners.shape))], axis=1)
    return vertices


def refine(evaluate: Evaluate, points: RealArray, figures: RealArray) -> tuple[RealArray, RealArray, int]:
    """Move each figure's best lowest and highest point until no neighbour is better.

    `points` has shape (circuits or 1, points, inputs), `figures` (figures, circuits, points). Gives lowest and highest, each of
    shape (figures, circuits), and the number of further points studied per circuit.
    """
    count, circuits, _ = figures.shape
    inputs = points.shape[2]
    signed = np.concatenate([-figures, figures])
    signed = np.where(np.isnan(signed), -np.inf, signed)
    best_at = np.argmax(signed, axis=2)
    best = np.take_along_axis(signed, best_at[:, :, np.newaxis], axis=2)[:, :, 0]
    where = points[0][best_at] if points.shape[0] == 1 else points[np.arange(circuits)[np.newaxis], best_at]
    studied = 0
    active = np.arange(2 * count)
    step = np.full((2 * count, circuits), PROBE)
    compass = np.concatenate([np.eye(inputs), -np.eye(inputs)])
    probing = True
    moves = 0
    while active.size and inputs and moves < MOST_MOVES:
        moves += 1
        reach = step[active][:, :, np.newaxis, np.newaxis] * compass
        trial = np.clip(where[active][:, :, np.newaxis, :] + reach, -1.0, 1.0)
        flat = np.moveaxis(trial, 0, 1).reshape(circuits, -1, inputs)
        studied += flat.shape[1]
        found = evaluate(flat).reshape(count, circuits, active.size, trial.shape[2])
        rows = active % count
        own = np.stack([found[row, :, place] for place, row in enumerate(rows)])
        own = np.where((active < count)[:, np.newaxis, np.newaxis], -own, own)
        own = np.where(np.isnan(own), -np.inf, own)
        at = np.argmax(own, axis=2)
        value = np.take_along_axis(own, at[:, :, np.newaxis], axis=2)[:, :, 0]
        old = np.where(np.isfinite(best[active]), best[active], np.inf)
        better = value > old + GAIN * np.abs(old)
        best[active] = np.where(better, value, best[active])
        moved = np.take_along_axis(trial, at[:, :, np.newaxis, np.newaxis], axis=2)[:, :, 0]
        where[active] = np.where(better[:, :, np.newaxis], moved, where[active])
        if probing:
            active = active[np.any(better, axis=1)]
            step[active] = 0.2
            probing = False
            continue
        step[active] = np.where(better, np.minimum(step[active] * 2.0, 1.0), step[active] / 4.0)
        active = active[np.any(step[active] > SMALLEST_STEP, axis=1)]
    return -best[:count], best[count:], studied


def dominant(figures: RealArray, inputs: int, names: Sequence[str]) -> list[list[str]]:
    """The input whose tolerance alone moves each figure most, for each figure and circuit; empty where none moves it."""
    count, circuits, _ = figures.shape
    if inputs == 0:
        return [[""] * circuits for _ in range(count)]
    nominal = figures[:, :, :1]
    up = np.abs(figures[:, :, 1 : 1 + inputs] - nominal)
    down = np.abs(figures[:, :, 1 + inputs : 1 + 2 * inputs] - nominal)
    reach = np.nan_to_num(np.maximum(up, down))
    most = np.argmax(reach, axis=2)
    moves = np.max(reach, axis=2) > 1e-9 * np.abs(nominal[:, :, 0]) + 1e-12
    return [
        [names[most[row, column]] if moves[row, column] else "" for column in range(circuits)] for row in range(count)
    ]


def in_words(inputs: int, few: int, circuits_refined: bool) -> str:
    """How the worst case was looked for, for the record."""
    if inputs == 0:
        return "no tolerances are stated: the nominal case is the only one"
    corners = "all corners"
    if inputs > few:
        corners = f"the corners the sensitivities point to, all corners of the {few} inputs that matter most"
    refined = ", then local refinement of each figure a check depends on" if circuits_refined else ""
    return f"nominal, one input at a time, {corners}, {INTERIOR} seeded interior points{refined}"
