"""The study of an installation: its boards first, then circuits of one shape together, all cases at once."""

from __future__ import annotations

from collections.abc import Collection, Sequence
from typing import Any

import numpy as np

from circuitlint.definition.reading import CircuitDefinition, Installation
from circuitlint.study.feeding import Boards, BoardState, Loading, drop_by_others, ends_of, feed_of, source_voltage
from circuitlint.study.network import circuit_tree, collect, way_of, worksheet
from circuitlint.study.plan import Kinds, shape_of
from circuitlint.study.solving import solve
from circuitlint.study.states import states_of
from circuitlint.study.study import CircuitStudy
from circuitlint.study.worksheet import Key


def study(
    installation: Installation, kinds: Kinds, sought: Collection[str] | None = None, wanted: Collection[str] | None = None
) -> list[CircuitStudy]:
    """Study every circuit of an installation in every state that its supply allows, or in the states wanted by name.

    `sought` names the figures whose extremes are refined; None refines all. The order of the circuits is kept.
    """
    studies: list[CircuitStudy] = []
    groups: dict[Any, list[CircuitStudy]] = {}
    boards = study_boards(installation, kinds) if installation.boards else {}
    others = {tag: drop for state in boards.values() for tag, drop in state.drops.items()}
    unknown = _unknown(installation, others) if installation.boards else {}
    for definition in installation.circuits:
        tag = definition.entry.tag
        one = prepare(definition, installation, kinds, others.get(tag), unknown.get(tag, ()))
        one.boards = boards
        studies.append(one)
        key = (one.system, shape_of(one.tree), one.way, one.data.signature())
        groups.setdefault(key, []).append(one)
    for group in groups.values():
        _study_group(group, kinds, sought, wanted)
    return studies


def _has_armature(one: CircuitStudy) -> bool:
    """Whether any coil of the circuit has an armature that could stick, or does not say that it has none."""
    return any(one.choice(f"{place}.armature") != "none" for place in one.leaves("coil"))


def _study_group(
    group: list[CircuitStudy], kinds: Kinds, sought: Collection[str] | None, wanted: Collection[str] | None
) -> None:
    first = group[0]
    ends = np.array([[(one.low, one.nominal, one.high) for one in study.data.data.values()] for study in group])
    table = {path: ends[:, number] for number, path in enumerate(first.data.data)}
    for position, one in enumerate(group):
        one.position = position
    for state in states_of(first.system, wanted):
        if state.name == "stuck-open" and not _has_armature(first):
            continue
        sheet = worksheet(state, first.system, first.data, first.tree, first.way, kinds)
        along = (*first.way, *(("others",) if first.data.tokens.get("others") == "known" else ()))
        phases = 3 if first.feed.balanced else 1
        solution = solve(state, sheet, first.data.data, table, len(group), first.tree, along, sought, phases)
        for one in group:
            one.solutions[state.name] = solution


def prepare(
    definition: CircuitDefinition, installation: Installation, kinds: Kinds, others: complex | None = None,
    unknown: Sequence[str] = (),
) -> CircuitStudy:
    """A circuit with its data and its tree, not yet solved."""
    entry = definition.entry
    load = entry.load  # type: ignore[attr-defined]
    feed = feed_of(entry, installation)
    data = collect(entry, feed, load, kinds, others, unknown)
    return CircuitStudy(definition, feed.supply, circuit_tree(entry, load, feed), data, feed, way_of(feed, entry))


def study_boards(installation: Installation, kinds: Kinds) -> dict[str, BoardState]:
    """Every board at nominal values with everything running, by name.

    Each circuit is solved alone, cold and at nominal values, and taken as the admittance that this gives; two rounds, so that
    loads of constant power see the voltage they get.
    """
    found: dict[str, BoardState] = {}
    for name in installation.supplies:
        boards = Boards(installation, name)
        on_boards = [one for one in installation.circuits if one.entry.fed_from in boards.boards]
        if not on_boards:
            continue
        drops: dict[str, complex] = {}
        for _ in range(2):
            alone = [prepare(one, installation, kinds, drops.get(one.entry.tag, 0j)) for one in on_boards]
            loadings, currents = _loadings(alone, kinds)
            states = boards.solve([*loadings, *boards.corrections()])
            for one in alone:
                if one.tag in currents:
                    own_path = _own_path(one, boards)
                    state = states[one.entry.fed_from]
                    drop = drop_by_others(state, one.feed, one.entry.phase, currents[one.tag], own_path)
                    drops[one.tag] = drop / source_voltage(one.feed, one.entry.phase)
        for state in states.values():
            state.drops = {tag: drops[tag] for tag in state.circuits if tag in drops}
        found |= states
    return found


def _unknown(installation: Installation, known: Collection[str]) -> dict[str, tuple[str, ...]]:
    """For each circuit on a board, the tags of others on boards of the same supply whose current cannot be known."""
    unknown: dict[str, list[str]] = {}
    fed: dict[str, str] = {}
    for definition in installation.circuits:
        entry = definition.entry
        feed = feed_of(entry, installation)
        if not feed.boards:
            continue
        fed[entry.tag] = feed.supply_name
        if entry.tag not in known:
            unknown.setdefault(feed.supply_name, []).append(entry.tag)
    return {tag: tuple(other for other in unknown.get(supply, ()) if other != tag) for tag, supply in fed.items()}


def _own_path(one: CircuitStudy, boards: Boards) -> complex:
    """Impedance of the feeders in a circuit's own loop."""
    total = sum((boards.feeder(name) for name in one.feed.boards), 0j)
    return total * (2.0 if boards.three and not one.feed.balanced else 1.0)


def _loadings(alone: Sequence[CircuitStudy], kinds: Kinds) -> tuple[list[Loading], dict[str, complex]]:
    """Each circuit as an admittance at its board, and the current it draws, both nominal, cold and with its diversity."""
    loadings: list[Loading] = []
    currents: dict[str, complex] = {}
    for one in alone:
        state = states_of(one.system, ("cold",))[0]
        sheet = worksheet(state, one.system, one.data, one.tree, one.way, kinds)
        current, source = Key("current phasor", ""), source_voltage(one.feed, one.entry.phase)
        if current in sheet.lacks:
            continue
        values = sheet.only([current, *(Key("voltage phasor", place) for place in one.way)]).run(
            {Key("", path): datum.nominal for path, datum in one.data.data.items()})
        if not np.isfinite(values[current]):
            continue
        turned = complex(values[current]) * source / abs(source)
        upstream = sum((complex(values[Key("voltage phasor", place)]) for place in one.way if place.startswith("feeder")), 0j)
        arriving = source - upstream * source / abs(source) - one.data.data["others' drop in phase"].nominal * source \
            - 1j * one.data.data["others' drop across"].nominal * source
        share = one.entry.diversity.nominal if one.entry.diversity else 1.0
        loadings.append(Loading(one.tag, one.entry.fed_from, ends_of(one.feed.kind, one.entry.phase), share * turned / arriving))
        currents[one.tag] = share * turned
    return loadings, currents
