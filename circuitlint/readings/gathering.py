"""From one entry of a readings file to inputs with their uncertainties: spread, instrument, burden, leads, supply band."""

from __future__ import annotations

from dataclasses import dataclass, field

import numpy as np

from circuitlint.definition.models import Supply
from circuitlint.quantity import Quantity
from circuitlint.readings.models import QUANTITIES, Instrument, ReadingEntry, input_of
from circuitlint.readings.propagation import Contribution, InputSet

SPAN = "span stated beside the value"


@dataclass(slots=True)
class Gathered:
    """Inputs of one entry, and what a reader must know of them."""

    inputs: InputSet = field(default_factory=InputSet)
    notes: list[str] = field(default_factory=list)
    used: dict[str, tuple[str, float | None]] = field(default_factory=dict)
    """Instrument and its range, by quantity."""


def gather(one: ReadingEntry, instruments: dict[str, Instrument], supply: Supply | None, direct: bool) -> Gathered:
    """Inputs of one entry: quantities under their own names, and `burden`, `voltmeter`, `leads`, `series_resistor`."""
    made = Gathered()
    sets = {name: np.array([getattr(each, name).nominal for each in one.repeats])
            for name in QUANTITIES if one.repeats and getattr(one.repeats[0], name) is not None}
    if sets:
        made.inputs.repeat(sets)
    for name in QUANTITIES:
        alone: Quantity | None = getattr(one, name)
        if alone is not None:
            made.inputs.values[name] = alone.nominal
        stated = [alone] if alone is not None else [getattr(each, name) for each in one.repeats if name in sets]
        if stated:
            _accuracy(one, name, stated, len(one.repeats) > 1 and name in sets, instruments, made)
    if one.series_resistor is not None:
        _stated("series_resistor", one.series_resistor, "the resistor's tolerance", made.inputs)
    _corrections(one, instruments, made)
    if not direct and "frequency" not in made.inputs.values and supply is not None and supply.frequency is not None:
        _stated("frequency", supply.frequency, "band of the supply, not read", made.inputs)
        if {"voltage", "current"} <= set(made.inputs.values) or "total_voltage" in made.inputs.values:
            made.notes.append(f"the frequency was not read: taken as {supply.frequency.text}")
    return made


def instrument_for(one: ReadingEntry, quantity: str, instruments: dict[str, Instrument]) -> tuple[str, Instrument | None]:
    """Name and data of the instrument a quantity was read with; None where none with such an input is stated."""
    name = one.instrument.get(quantity, one.instrument.get(input_of(quantity), one.instrument.get("", "")))
    found = instruments.get(name)
    return (name, found) if found is not None and getattr(found.inputs, input_of(quantity)) is not None else ("", None)


def _accuracy(one: ReadingEntry, name: str, stated: list[Quantity], repeated: bool, instruments: dict[str, Instrument],
              made: Gathered) -> None:
    inputs, value = made.inputs, made.inputs.values[name]
    span = max((quantity.high - quantity.low) / 2.0 for quantity in stated)
    if span > 0.0:
        inputs.contributions.append(Contribution(name, span, SPAN))
    label, instrument = instrument_for(one, name, instruments)
    spoken = name.replace("_", " ")
    if instrument is not None:
        entry = getattr(instrument.inputs, input_of(name))
        full = entry.range.nominal if entry.range is not None else None
        made.used[name] = (label, full)
        half = entry.accuracy.half_width(value, entry.resolution.nominal if entry.resolution is not None else 0.0)
        inputs.contributions.append(Contribution(name, half, f"{label} {entry.accuracy.text}"))
        if full is not None and abs(value) > full * (1.0 + 1e-9):
            made.notes.append(f"the {spoken} lies beyond the range of {label}: its accuracy is not stated there")
    elif span == 0.0 and repeated:
        made.notes.append(f"no instrument is stated for the {spoken}: only the spread of the sets counts")
    elif span == 0.0:
        inputs.unknown.add(name)
        made.notes.append(f"nothing says how accurate the {spoken} is: state the instrument, or `value ± span`")


def _stated(name: str, quantity: Quantity, why: str, inputs: InputSet) -> None:
    inputs.values[name] = (quantity.low + quantity.high) / 2.0 if not quantity.exact else quantity.nominal
    if not quantity.exact:
        inputs.contributions.append(Contribution(name, (quantity.high - quantity.low) / 2.0, why))


def _corrections(one: ReadingEntry, instruments: dict[str, Instrument], made: Gathered) -> None:
    values = made.inputs.values
    _, ammeter = instrument_for(one, "current", instruments)
    if "current" in values and ammeter is not None and one.voltmeter == "ahead of the ammeter":
        entry = ammeter.inputs.current
        if entry.burden is not None and entry.range is not None:
            full = entry.range.nominal
            low, high = entry.burden.low / full, entry.burden.high / full
            values["burden"] = (low + high) / 2.0
            if high > low:
                made.inputs.contributions.append(Contribution("burden", (high - low) / 2.0, "span of the ammeter's burden"))
            made.notes.append(f"the ammeter's burden of {1000.0 * values['burden']:.4g} mΩ was taken off")
        else:
            made.notes.append("the ammeter's burden is part of the reading and is not stated: not taken off")
    _, voltmeter = instrument_for(one, "voltage", instruments)
    if {"voltage", "current"} <= set(values) and voltmeter is not None and one.voltmeter == "at the load":
        own = voltmeter.inputs.voltage.resistance
        if own is not None:
            _stated("voltmeter", own, "span of the voltmeter's resistance", made.inputs)
    _, ohmmeter = instrument_for(one, "resistance", instruments)
    if "resistance" in values and not one.four_wire:
        leads = ohmmeter.inputs.resistance.lead_resistance if ohmmeter is not None else None
        if leads is not None:
            _stated("leads", leads, "span of the leads' resistance", made.inputs)
            made.notes.append(f"leads of {leads.text} were taken off")
        else:
            made.notes.append("two wires, and the leads' resistance is not stated: it is still part of the resistance")
