"""A study is closed against writing, what could still be written is watched, and what was written is put back."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

import pytest

from circuitlint.definition.reading import read_text
from circuitlint.isolation.sealing import Watch, seal
from circuitlint.study.installation import study
from circuitlint.study.loads import CORE
from circuitlint.study.study import CircuitStudy

TEXT = """\
format: 1
supplies:
  shore: {system: single-phase, voltage: 230 V ± 10 %, frequency: 50 Hz}
boards:
  DB1: {fed_from: shore, cable: {section: 6 mm2, length: 24 m, conductor: copper, insulation: pvc-70, method: C}}
circuits:
  - tag: A
    fed_from: DB1
    ambient: 20 degC
    cable: {section: 1.5 mm2, length: 12 m, conductor: copper}
    load: {parallel: [{coil: {resistance: 50 ohm ± 5 %, inductance: 0.4 H, armature: none}}, {resistor: {resistance: 90 ohm}}]}
  - tag: B
    fed_from: DB1
    cable: []
    load: {resistor: {resistance: 230 ohm}}
"""


@pytest.fixture
def circuit() -> CircuitStudy:
    circuits = study(read_text(TEXT), CORE)
    seal(circuits)
    return circuits[0]


def _first(circuit: Any) -> Any:
    return next(iter(circuit.solutions.values()))


WATCHED: dict[str, Callable[[Any], object]] = {
    "a list emptied": lambda one: one.entry.cable.clear(),
    "a list lengthened": lambda one: one.entry.load.parallel.append(None),
    "an entry exchanged": lambda one: one.entry.__dict__.update(ambient=None),
    "an entry forced": lambda one: object.__setattr__(one.entry.cable[0], "length", None),
    "a quantity forced": lambda one: object.__setattr__(one.entry.cable[0].length, "nominal", 1.0),
    "the supply forced": lambda one: object.__setattr__(one.supply.voltage, "high", 1.0),
    "a feeder's run forced": lambda one: object.__setattr__(one.feed.runs[0][1].length, "nominal", 1.0),
    "the solutions exchanged": lambda one: setattr(one, "solutions", {}),
    "the tree exchanged": lambda one: setattr(one, "tree", None),
    "the data exchanged": lambda one: setattr(one.data, "data", {}),
    "a solution's figures exchanged": lambda one: setattr(_first(one), "nominal", None),
    "a worksheet's gaps exchanged": lambda one: setattr(_first(one).sheet, "lacks", {}),
    "a board's power exchanged": lambda one: setattr(one.boards["DB1"], "power", 0.0),
}
CLOSED: dict[str, Callable[[Any], object]] = {
    "figures": lambda one: _first(one).nominal.fill(0.0),
    "lowest figures": lambda one: _first(one).lowest.__setitem__(0, 0.0),
    "what is the most moving": lambda one: _first(one).moved_by[0].__setitem__(0, ""),
    "faults": lambda one: _first(one).faulty.__setitem__(0, ""),
    "values": lambda one: _first(one).values.clear(),
    "rows": lambda one: _first(one).row.clear(),
    "lines": lambda one: _first(one).sheet.lines.clear(),
    "gaps": lambda one: _first(one).sheet.lacks.clear(),
    "solutions": lambda one: one.solutions.clear(),
    "data": lambda one: one.data.data.clear(),
    "choices": lambda one: one.data.tokens.clear(),
    "boards": lambda one: one.boards.clear(),
    "a board's drops": lambda one: one.boards["DB1"].drops.clear(),
    "an entry": lambda one: setattr(one.entry, "tag", "C"),
    "a quantity": lambda one: setattr(one.supply.voltage, "high", 1.0),
}


def _everything(circuit: CircuitStudy) -> str:
    return repr((circuit.entry, circuit.supply, circuit.feed.runs, list(circuit.figures()), list(circuit.lacks()), circuit.tree,
                 dict(circuit.data.data), circuit.boards["DB1"]))  # fmt: skip


@pytest.mark.parametrize("change", WATCHED)
def test_what_can_be_changed_is_noticed_and_put_back(change: str, circuit: CircuitStudy) -> None:
    before = _everything(circuit)
    watch = Watch(circuit)
    assert watch.untouched()
    WATCHED[change](circuit)
    assert not watch.untouched()
    watch.put_back()
    assert watch.untouched()
    assert _everything(circuit) == before


@pytest.mark.parametrize("what", CLOSED)
def test_what_is_closed_cannot_be_written_to(what: str, circuit: CircuitStudy) -> None:
    before = _everything(circuit)
    with pytest.raises((TypeError, ValueError, AttributeError)):
        CLOSED[what](circuit)
    assert _everything(circuit) == before


def test_asking_changes_nothing_that_is_watched(circuit: CircuitStudy) -> None:
    watch = Watch(circuit)
    for name, state, of in [("current", "cold", ""), ("current", "steady", ""), ("no such figure", "cold", "")]:
        circuit.figure(name, state, of)
    list(circuit.figures())
    circuit.parts("current", "cold")
    assert watch.untouched()
