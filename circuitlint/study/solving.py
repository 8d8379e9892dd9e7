"""One state of circuits of one shape: the worksheet run over all cases, extremes sought, the balance proved."""

from __future__ import annotations

from collections.abc import Collection, Mapping, Sequence
from dataclasses import dataclass
from typing import Any

import numpy as np

from circuitlint.si import RealArray
from circuitlint.study import cases
from circuitlint.study.balance import BOUND, imbalance
from circuitlint.study.data import Datum
from circuitlint.study.plan import Node
from circuitlint.study.states import State
from circuitlint.study.worksheet import Key, Line, Worksheet

UNSETTLED = "in some case within the tolerances no working point settles (thermal runaway, or a motor that stalls)"
OUT_OF_RANGE = "in some case within the tolerances the data leave the range of a formula"
MOST_NUMBERS = 4_000_000
"""Numbers held at once while a worst case is refined, so that a wide circuit needs time, not memory."""
UNBALANCED = "the solution does not balance to 1e-9, so no figure is given"


@dataclass(slots=True)
class Solution:
    """One state of one group of circuits: values at every point studied, and what was made of them.

    Arrays in `lowest`, `highest` have shape (circuits,); arrays in `values` broadcast to (circuits, points).
    """

    state: State
    sheet: Worksheet
    inputs: tuple[str, ...]
    values: dict[Key, Any]
    circuits: int
    points: int
    lines: list[Line]
    row: dict[Key, int]
    nominal: RealArray
    lowest: RealArray
    highest: RealArray
    moved_by: list[list[str]]
    faulty: list[str]
    studied: int
    refined: bool
    broken: frozenset[tuple[int, int]] = frozenset()
    """Row and circuit of each figure that stands apart and is not a finite number in every case."""


def solve(
    state: State, sheet: Worksheet, data: Mapping[str, Datum], table: Mapping[str, RealArray], circuits: int, tree: Node,
    along: Sequence[str], sought: Collection[str] | None, phases: int = 1,
) -> Solution:
    """One state of a group: run the worksheet over the opening points, then refine what is sought."""
    used = {key.of for line in sheet.lines for argument in line.arguments.values()
            for key in ((argument,) if isinstance(argument, Key) else argument) if not key.name}
    used |= {one.start.of for one in sheet.feedback}
    inputs = tuple(path for path in data if path in used and not data[path].exact)
    lines = [line for line in sheet.lines if line.figure]
    row = {line.key: number for number, line in enumerate(lines)}

    def run(points: RealArray) -> dict[Key, Any]:
        return sheet.run(_put_in(table, used, inputs, points))

    def figures(values: Mapping[Key, Any], wanted: Sequence[Line], points: int) -> RealArray:
        made = np.empty((len(wanted), circuits, points))
        for number, line in enumerate(wanted):
            made[number] = values[line.key]
        return made

    few = cases.FEW_WITH_CAPACITOR if has_capacitor(tree) else cases.FEW
    opening = cases.opening_points(len(inputs), few)
    values = run(opening)
    found = figures(values, lines, opening.shape[1])
    wanted = [line for line in lines if _is_sought(line.key, sought, row)]
    points = opening
    if len(inputs) > few:
        picked = found[[row[line.key] for line in wanted if line.key not in sheet.apart]]
        vertices = np.clip(cases.vertices_by_sensitivity(picked, len(inputs), few), -1.0, 1.0)
        points = np.concatenate([np.broadcast_to(opening, (circuits, *opening.shape[1:])), vertices], axis=1)
        found = np.concatenate([found, figures(run(vertices), lines, vertices.shape[1])], axis=2)
    apart = [number for key, number in row.items() if key in sheet.apart]
    solid = np.delete(found, apart, axis=0) if apart else found
    faulty = _faulty(sheet, values, solid, tree, along, circuits, opening.shape[1], phases)
    broken = frozenset((one, int(at)) for one in apart for at in np.flatnonzero(~np.all(np.isfinite(found[one]), axis=1)))
    lowest = np.min(found, axis=2) if lines else np.zeros((0, circuits))
    highest = np.max(found, axis=2) if lines else np.zeros((0, circuits))
    studied = points.shape[1]
    if wanted and inputs:
        rows = [row[line.key] for line in wanted]
        slim = sheet.only(line.key for line in wanted)

        def evaluate(trial: RealArray) -> RealArray:
            size = max(32, MOST_NUMBERS // (len(slim.lines) * circuits + 1))
            pieces = [trial[:, at : at + size] for at in range(0, trial.shape[1], size)]
            found = [figures(slim.run(_put_in(table, used, inputs, one)), wanted, one.shape[1]) for one in pieces]
            return found[0] if len(found) == 1 else np.concatenate(found, axis=2)

        lowest[rows], highest[rows], further = cases.refine(evaluate, points, found[rows])
        studied += further
    moved_by = cases.dominant(found, len(inputs), inputs)
    return Solution(state, sheet, inputs, values, circuits, opening.shape[1], lines, row, found[:, :, 0], lowest, highest,
                    moved_by, faulty, studied, bool(wanted and inputs), broken)


def has_capacitor(node: Node) -> bool:
    """Whether a capacitor stands anywhere in a load tree."""
    return node.kind == "capacitor" or any(has_capacitor(one) for one in node.nodes)


def _is_sought(key: Key, sought: Collection[str] | None, row: Mapping[Key, int]) -> bool:
    """A name means the circuit's own figure where it has one, else every part's; `name@part` means parts that begin so."""
    if sought is None:
        return True
    if key.name in sought and (not key.of or Key(key.name, "") not in row):
        return True
    return any(one.startswith(f"{key.name}@") and key.of.startswith(one.partition("@")[2]) for one in sought)


def _put_in(
    table: Mapping[str, RealArray], used: Collection[str], inputs: tuple[str, ...], points: RealArray
) -> dict[Key, Any]:
    number = {path: index for index, path in enumerate(inputs)}
    values: dict[Key, Any] = {}
    for path in used:
        if path not in table:
            continue
        low, nominal, high = (table[path][:, end : end + 1] for end in range(3))
        if path in number:
            place = points[:, :, number[path]]
            values[Key("", path)] = nominal + np.where(place > 0.0, place * (high - nominal), place * (nominal - low))
        else:
            values[Key("", path)] = nominal
    return values


def _faulty(
    sheet: Worksheet, values: Mapping[Key, Any], found: RealArray, tree: Node, along: Sequence[str], circuits: int, points: int,
    phases: int,
) -> list[str]:
    """Why a circuit has no figures in this state, or an empty text; in the order of the circuits."""
    apart = np.broadcast_to(imbalance(values, tree, along, phases), (circuits, points))
    unbalanced = np.any(~(apart <= BOUND), axis=1)
    astray = np.any(~np.isfinite(found), axis=(0, 2)) if found.size else np.zeros(circuits, dtype=bool)
    reasons = [UNBALANCED if one else "" for one in unbalanced]
    for at in np.flatnonzero(astray):
        reasons[at] = _first_fault(sheet, values, int(at), circuits, points)
    return reasons


def _first_fault(sheet: Worksheet, values: Mapping[Key, Any], at: int, circuits: int, points: int) -> str:
    """The first line that gives no finite number, in words."""
    for guess in (one.guess for one in sheet.feedback):
        if not np.all(np.isfinite(np.broadcast_to(values[guess], (circuits, points))[at])):
            return UNSETTLED
    for line in sheet.lines:
        if not np.all(np.isfinite(np.broadcast_to(np.asarray(values[line.key]), (circuits, points))[at])):
            of = f" of {line.key.of}" if line.key.of else ""
            return f"{OUT_OF_RANGE}: {line.key.name.replace('-', ' ')}{of}, {line.formula.symbolic}"
    return OUT_OF_RANGE
