"""What a report needs to draw a circuit: its tree, phasors, the switch-on current over time, the worst case as a region."""

from __future__ import annotations

from collections.abc import Iterable
from typing import Any

import numpy as np

from circuitlint.definition.loads import LoadEntry
from circuitlint.physics import switching_on
from circuitlint.review.record import Curve, Element, Phasor, Region
from circuitlint.si import CURRENT, RealArray
from circuitlint.study.plan import Kinds
from circuitlint.study.study import CircuitStudy, Figure
from circuitlint.study.worksheet import Key

CURVE_POINTS = 121


def tree(circuit: CircuitStudy, kinds: Kinds) -> Element:
    """Supply, cables, meter and load tree, with what the definition states of each."""
    entry, supply = circuit.entry, circuit.supply
    stated = [supply.voltage.text, supply.frequency.text if supply.frequency else "dc"]
    parts: list[Element] = [
        Element(of=place, kind="cable", label=f"feeder {place.partition('[')[2].partition(']')[0]}",
                values=(f"{run.section.text}, {run.length.text}", run.conductor))
        for place, run in circuit.feed.runs
    ]
    parts += [
        Element(of=f"cable[{index}]", kind="cable", label="cable",
                values=(f"{run.section.text}, {run.length.text}", run.conductor))
        for index, run in enumerate(entry.cable or ())
    ]
    if entry.meter is not None:
        values = tuple(text for text in (entry.meter.connection, entry.meter.range.text if entry.meter.range else None) if text)
        parts.append(Element(of="meter", kind="meter", label="meter", values=values))
    load = _load(entry.load, "load", kinds)  # type: ignore[attr-defined]
    if entry.correction is not None:
        given = (entry.correction.capacitance, entry.correction.rated_voltage)
        beside = Element(of="correction", kind="capacitor", label="correction", values=tuple(one.text for one in given if one))
        load = Element(of="terminals", kind="parallel", parts=(load, beside))
    parts.append(load)
    return Element(of="", kind="supply", label=circuit.feed.supply_name, values=tuple(stated), parts=tuple(parts))


def _load(load: LoadEntry, place: str, kinds: Kinds) -> Element:
    kind = load.kind
    of = f"{place}.{kind}"
    if load.count != 1:
        one = load.model_copy(update={"count": 1})
        return Element(of=place, kind="several", label=f"{load.count} of", parts=(_load(one, place, kinds),))
    if kind in ("series", "parallel"):
        below = tuple(_load(one, f"{of}[{index}]", kinds) for index, one in enumerate(load.part))
        return Element(of=of, kind=kind, label=load.name, parts=below)
    return Element(of=of, kind=kind, label=load.name or kind, values=kinds[kind].label(load.part))


def phasors(circuit: CircuitStudy) -> Iterable[Phasor]:
    """Complex quantities of every part at nominal values, in the running states."""
    for state in ("cold", "steady"):
        solution = circuit.solutions.get(state)
        if solution is None or solution.faulty[circuit.position]:
            continue
        for key in solution.values:
            word = key.name.removesuffix(" phasor")
            if word == key.name or word not in ("voltage", "current", "impedance", "power", "supply"):
                continue
            value = complex(circuit.nominal(state, key))
            name: Any = "voltage" if word == "supply" else word
            yield Phasor(name=name, of=key.of, state=state, real=value.real, imaginary=value.imag)
        yield from _inner_voltages(circuit, state)


def _inner_voltages(circuit: CircuitStudy, state: str) -> Iterable[Phasor]:
    """Voltages across the resistance and the reactance inside a part, along and across its current."""
    solution = circuit.solutions[state]
    names = {"resistive-voltage": 1.0 + 0j, "inductive-voltage": 1j, "capacitive-voltage": -1j}
    for key in list(solution.row):
        turn = names.get(key.name)
        if turn is None:
            continue
        current = complex(circuit.nominal(state, Key("current phasor", key.of)))
        if abs(current) == 0.0:
            continue
        value = float(circuit.nominal(state, key).real) * turn * current / abs(current)
        name: Any = key.name
        yield Phasor(name=name, of=key.of, state=state, real=value.real, imaginary=value.imag)


def curves(circuit: CircuitStudy) -> Iterable[Curve]:
    """The current after closing: at the worst angle on alternating current, the build-up on direct current."""
    peak = circuit.figure("switch-on-peak", "switch-on")
    resistance = circuit.figure("resistance", "switch-on")
    if not isinstance(peak, Figure) or not isinstance(resistance, Figure):
        return
    if circuit.system == "dc":
        constants = [circuit.figure("time-constant", "switch-on", of) for of in circuit.parts("time-constant", "switch-on")]
        slow = max((one.nominal for one in constants if isinstance(one, Figure)), default=0.0)
        if slow > 0.0:
            times = np.linspace(0.0, 5.0 * slow, CURVE_POINTS)
            values = switching_on.current_build_up(time=times, final=peak.nominal, time_constant=slow)
            yield _curve(circuit, times, values, "build-up with the longest time constant of the load")
        return
    reactance = circuit.figure("reactance", "switch-on")
    if not isinstance(reactance, Figure) or reactance.nominal <= 0.0:
        return
    frequency = circuit.data.data["supply.frequency"].nominal
    times = np.linspace(0.0, 4.0 / frequency, CURVE_POINTS)
    values = switching_on.switch_on_current(
        time=times, voltage_rms=circuit.data.data["supply.voltage"].nominal, frequency=frequency,
        resistance=resistance.nominal, inductance=reactance.nominal / (2.0 * np.pi * frequency), closing_angle=0.0,
    )
    yield _curve(circuit, times, values, "closed at voltage zero, the angle of the highest peak; linear, without remanence")


def _curve(circuit: CircuitStudy, times: RealArray, values: Any, note: str) -> Curve:
    return Curve(name="current", of="", state="switch-on", dimension=CURRENT.name, times=tuple(map(float, times)),
                 values=tuple(map(float, values)), note=note)


def regions(circuit: CircuitStudy) -> Iterable[Region]:
    """The hulls of resistance and reactance, and of active and reactive power, over the tolerance box."""
    pairs = (("resistance", "reactance"), ("active-power", "reactive-power"))
    for state in ("cold", "steady"):
        solution = circuit.solutions.get(state)
        if solution is None or solution.faulty[circuit.position] or not solution.inputs:
            continue
        for across, up in pairs:
            if Key(across, "") in solution.row and Key(up, "") in solution.row:
                points = np.stack([circuit.spread(state, Key(across, "")), circuit.spread(state, Key(up, ""))], axis=1)
                yield Region(of="", state=state, across=across, up=up, points=tuple((x, y) for x, y in hull(points)))


def hull(points: RealArray) -> list[list[float]]:
    """Convex hull of points of shape (n, 2), counter-clockwise, by the monotone chain."""
    ordered = sorted({(float(x), float(y)) for x, y in points})
    if len(ordered) < 3:
        return [list(point) for point in ordered]

    def half(chain: list[tuple[float, float]]) -> list[tuple[float, float]]:
        kept: list[tuple[float, float]] = []
        for x, y in chain:
            while len(kept) > 1:
                (ax, ay), (bx, by) = kept[-2], kept[-1]
                if (bx - ax) * (y - ay) - (by - ay) * (x - ax) > 0.0:
                    break
                kept.pop()
            kept.append((x, y))
        return kept

    return [list(point) for point in half(ordered)[:-1] + half(ordered[::-1])[:-1]]
