"""From evaluated readings of one coil to what the winding model can be held against."""

from __future__ import annotations

import math
from collections.abc import Sequence

import numpy as np

from circuitlint.definition.loads import Coil
from circuitlint.quantity import Quantity
from circuitlint.readings.evaluation import HOT, Evaluated
from circuitlint.readings.prediction import Prediction
from circuitlint.readings.winding import ABSENT, Band, Moment, Observed, Winding
from circuitlint.tables.materials import winding_zero

ANY_WORKSHOP = Band(0.0, 40.0)
"""Winding temperature in °C where nothing is said of it and everything is cold; common practice."""


def winding_of(prediction: Prediction, place: str) -> Winding | None:
    """The coil as the model takes it; None where resistance or inductance is not known."""
    coil = prediction.coils.get(place)
    if coil is None:
        return None
    zero, _ = winding_zero(coil.winding)
    resistance = _resistance(prediction, coil, place, zero)
    inductance = _inductance(prediction, coil, place)
    if resistance is None or inductance is None:
        return None
    core = coil.core_resistance.nominal if coil.core_resistance is not None else ABSENT
    return Winding(resistance, inductance, zero, core)


def _resistance(prediction: Prediction, coil: Coil, place: str, zero: float) -> Band | None:
    if coil.resistance is not None:
        at = coil.resistance_at.nominal if coil.resistance_at is not None else 20.0
        scale = (zero + 20.0) / (zero + at)
        return Band(coil.resistance.low * scale, coil.resistance.high * scale)
    found = prediction.range("direct-current-resistance", place, "cold")
    if found is None:
        return None
    ambient = _ambient(prediction)
    _, low, high = found[0]
    scale = (zero + 20.0) / (zero + (ambient.middle if ambient else 20.0))
    return Band(low * scale, high * scale)


def _inductance(prediction: Prediction, coil: Coil, place: str) -> Band | None:
    if coil.inductance is not None:
        return Band(coil.inductance.low, coil.inductance.high)
    for one in prediction.circuit.figures:
        if one.name == "reactance" and one.of == place and one.state == "cold" and prediction.supply is not None:
            frequency = prediction.supply.frequency
            if frequency is not None:
                return Band(one.lowest / (2.0 * math.pi * frequency.nominal), one.highest / (2.0 * math.pi * frequency.nominal))
    # On direct current the inductance bears on no steady reading.
    return Band(1.0, 1.0) if prediction.direct else None


def _ambient(prediction: Prediction) -> Band | None:
    ambient: Quantity | None = prediction.ambient
    return Band(ambient.low, ambient.high) if ambient is not None else None


def observed(found: Sequence[Evaluated], prediction: Prediction) -> Observed | None:
    """All results of one coil that the model tells; None where no reading has any."""
    moments: list[Moment] = []
    values: list[float] = []
    blocks: list[np.ndarray[tuple[int, int], np.dtype[np.float64]]] = []
    names: list[str] = []
    for number, one in enumerate(found):
        moment = _moment(one, prediction, _results(one), f"reading {number + 1}")
        wanted = moment.results
        if not wanted:
            continue
        moments.append(moment)
        values += [one.outcomes.results[name].value for name in wanted]
        names += [f"{name}, {one.result.state}" for name in wanted]
        size = len(wanted)
        block = np.zeros((size, size))
        for row, a in enumerate(wanted):
            for column, b in enumerate(wanted):
                key = (a, b) if (a, b) in one.outcomes.correlation else (b, a)
                joint = 1.0 if a == b else one.outcomes.correlation.get(key, 0.0)
                block[row, column] = joint * one.outcomes.results[a].uncertainty * one.outcomes.results[b].uncertainty
        blocks.append(block)
    if not moments:
        return None
    whole = np.zeros((len(values), len(values)))
    at = 0
    for block in blocks:
        whole[at : at + len(block), at : at + len(block)] = block
        at += len(block)
    return Observed(moments, np.array(values), whole, names)


def _results(one: Evaluated) -> tuple[str, ...]:
    known = {measured.name for measured in one.result.results if measured.low is not None}
    wanted: list[str] = [name for name in ("voltage", "direct-current-resistance", "bridge-inductance") if name in known]
    if "frequency" in known and any(each.quantity == "frequency" for each in one.result.inputs):
        wanted.append("frequency")
    if {"resistance", "reactance"} <= known and _by_phase(one):
        wanted += ["resistance", "reactance"]
    elif "impedance" in known:
        wanted.append("impedance")
    return tuple(name for name in wanted if one.outcomes.results[name].value > 0.0)


def _by_phase(one: Evaluated) -> bool:
    return bool({"power", "power_factor", "phase_angle", "total_voltage"} & {each.quantity for each in one.result.inputs})


def _moment(one: Evaluated, prediction: Prediction, wanted: tuple[str, ...], label: str) -> Moment:
    entry = one.reading.entry
    read = "temperature" in one.inputs.values or "winding_temperature" in one.inputs.values
    if read:
        name = "temperature" if "temperature" in one.inputs.values else "winding_temperature"
        middle, half = one.inputs.values[name], math.sqrt(3.0) * one.inputs.spread(name)
        temperature = Band(middle - half, middle + half)
    elif entry.state in HOT:
        found = prediction.range("winding-temperature", one.place, entry.state)
        temperature = Band(found[0][1], found[0][2]) if found is not None else Band(20.0, 110.0)
    else:
        temperature = _ambient(prediction) or ANY_WORKSHOP
    supply = prediction.supply.frequency if prediction.supply is not None else None
    frequency = Band(supply.low, supply.high) if supply is not None else Band(50.0, 50.0)
    # Inside a network the voltage follows from what the coil itself does, so that it tells nothing of the supply.
    whole = one.place == prediction.root
    voltage = prediction.range("voltage", one.place, entry.state) if whole and "voltage" in wanted else None
    seen = wanted if voltage is not None else tuple(name for name in wanted if name != "voltage")
    direct = prediction.direct and entry.state != "alternating-current"
    bridge = one.bridge_frequency
    return Moment(entry.state, temperature, read, frequency, Band(voltage[0][1], voltage[0][2]) if voltage else None,
                  direct, "power" in one.inputs.values, seen, bridge, label)
