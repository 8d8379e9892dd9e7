"""Every reading evaluated: inputs gathered, cold resistances lent, results with uncertainties, held against the prediction."""

from __future__ import annotations

import math
from collections.abc import Mapping
from dataclasses import dataclass, field

import numpy as np

from circuitlint import si
from circuitlint.errors import OutOfTable
from circuitlint.readings import gathering
from circuitlint.readings import record as r
from circuitlint.readings.judgement import agreement, deviation
from circuitlint.readings.methods import Method, method_for
from circuitlint.readings.models import QUANTITIES, Instrument, ReadingEntry
from circuitlint.readings.prediction import Prediction
from circuitlint.readings.propagation import SEED, SHARE, TRIALS, Contribution, InputSet, Outcome, Outcomes, evaluate
from circuitlint.readings.reading import Reading
from circuitlint.review.record import Place
from circuitlint.tables.materials import winding_zero

DIMENSION_OF = {
    "resistance": si.RESISTANCE, "direct-current-resistance": si.RESISTANCE, "reference-resistance": si.RESISTANCE,
    "loop-impedance": si.RESISTANCE, "impedance": si.RESISTANCE, "reactance": si.REACTANCE, "magnetising-reactance": si.REACTANCE,
    "impedance-angle": si.ANGLE, "power-factor": si.RATIO, "voltage": si.VOLTAGE, "current": si.CURRENT,
    "active-power": si.ACTIVE_POWER, "core-loss": si.ACTIVE_POWER, "reactive-power": si.REACTIVE_POWER,
    "apparent-power": si.APPARENT_POWER, "inductance": si.INDUCTANCE, "bridge-inductance": si.INDUCTANCE,
    "frequency": si.FREQUENCY, "temperature": si.TEMPERATURE, "winding-temperature": si.TEMPERATURE,
    "core-conductance": si.CONDUCTANCE, "voltage-drop-share": si.RATIO,
}
"""Dimension of every result."""
ONE_PHASE = "three phases loaded alike: voltage to the star point, current and power of one phase are meant"
HOT = ("steady", "stuck-open", "other-frequency")


@dataclass(slots=True)
class Evaluated:
    """One reading with its inputs and outcomes, for what is built on them."""

    reading: Reading
    place: str
    inputs: InputSet
    method: Method
    outcomes: Outcomes
    notes: list[str]
    result: r.ReadingResult
    used: dict[str, tuple[str, float | None]] = field(default_factory=dict)
    bridge_frequency: float | None = None
    ammeter: Instrument | None = None


@dataclass(frozen=True, slots=True)
class Lent:
    """A winding's resistance known from another reading, at the temperature it was read at."""

    resistance: float
    uncertainty: float
    temperature: float | None
    temperature_uncertainty: float
    reading: Reading


def evaluate_one(
    reading: Reading, prediction: Prediction, instruments: dict[str, Instrument], lent: Mapping[str, Lent],
    seed: int = SEED, trials: int = TRIALS,
) -> Evaluated:
    """One reading's results. `lent` holds cold resistances by part."""
    one = reading.entry
    place = prediction.place(one.of)
    direct = (prediction.direct or one.state == "direct-current") and one.state != "alternating-current"
    made = gathering.gather(one, instruments, prediction.supply, direct)
    values = made.inputs.values
    if "inductance" in values:
        _rename(made.inputs, "inductance", "bridge_inductance")
    zero = _zero(prediction, place)
    if "temperature" in values and "resistance" in values:
        # The temperature a method takes in is no result of its own.
        _rename(made.inputs, "temperature", "winding_temperature")
    if zero is not None:
        values["inferred_zero"] = zero
    _borrow(one, place, zero, lent, made, direct, reading)
    method = method_for(set(values), direct, one.voltmeter == "ahead of the ammeter")
    outcomes = evaluate(method.model, made.inputs, seed, trials)
    notes = [*made.notes, *method.notes]
    if prediction.circuit.system == "three-phase":
        notes.append(ONE_PHASE)
    result = _result(reading, prediction, place, made, method, outcomes, notes)
    return Evaluated(reading, place, made.inputs, method, outcomes, notes, result, made.used,
                     *_meters(one, instruments))


def _meters(one: ReadingEntry, instruments: dict[str, Instrument]) -> tuple[float | None, Instrument | None]:
    """The bridge's test frequency and the ammeter, where they are stated."""
    _, bridge = gathering.instrument_for(one, "inductance", instruments)
    stated = bridge.inputs.inductance.test_frequency if bridge is not None else None
    return (stated.nominal if stated is not None else None), gathering.instrument_for(one, "current", instruments)[1]


def lent_by(reading: Reading, prediction: Prediction, instruments: dict[str, Instrument]) -> Lent | None:
    """The winding's resistance a cold reading can lend to others of the same part; None where it has none."""
    one = reading.entry
    if one.state in HOT:
        return None
    made = gathering.gather(one, instruments, prediction.supply, prediction.direct)
    if "resistance" not in made.inputs.values:
        return None
    values = made.inputs.values
    own = values["resistance"] - values.get("leads", 0.0)
    spread = math.hypot(made.inputs.spread("resistance"), made.inputs.spread("leads") if "leads" in values else 0.0)
    warm = made.inputs.spread("temperature") if "temperature" in values else 0.0
    return Lent(own, spread, values.get("temperature"), warm, reading)


def _borrow(one: ReadingEntry, place: str, zero: float | None, lent: Mapping[str, Lent], made: gathering.Gathered,
            direct: bool, reading: Reading) -> None:
    values, notes = made.inputs.values, made.notes
    cold = lent.get(place)
    known_phase = {"power", "power_factor", "phase_angle"} & set(values)
    if cold is not None and cold.reading is not reading and zero is not None and cold.temperature is not None:
        hot = one.state in HOT and ("resistance" in values or (direct and {"voltage", "current"} <= set(values)))
        if hot:
            _lend(made.inputs, "cold_resistance", cold.resistance, cold.uncertainty)
            _lend(made.inputs, "cold_temperature", cold.temperature, cold.temperature_uncertainty)
    if direct or not {"voltage", "current"} <= set(values):
        return
    if "resistance" in values:
        if known_phase:
            values["core_split"] = 1.0
        return
    if cold is None or cold.reading is reading:
        return
    at = values.get("temperature")
    spread = cold.uncertainty
    if at is not None and cold.temperature is not None and zero is not None:
        ratio = (zero + at) / (zero + cold.temperature)
        known = cold.resistance * ratio
        own = made.inputs.spread("temperature")
        spread = math.sqrt((spread * ratio) ** 2 + (known / (zero + at) * own) ** 2
                           + (known / (zero + cold.temperature) * cold.temperature_uncertainty) ** 2)
        notes.append("direct-current resistance lent from another reading and brought to the winding's temperature")
    elif one.state not in HOT:
        known = cold.resistance
        notes.append("direct-current resistance lent from another reading; the winding is taken as equally warm")
    else:
        notes.append("the winding's temperature is not stated: the cold resistance was not used, and core loss not told apart")
        return
    _lend(made.inputs, "known_resistance", known, spread)
    if known_phase:
        values["core_split"] = 1.0


def _lend(inputs: InputSet, name: str, value: float, uncertainty: float) -> None:
    inputs.values[name] = value
    if uncertainty > 0.0:
        inputs.contributions.append(Contribution(name, uncertainty, "another reading", normal=True))


def _rename(inputs: InputSet, old: str, new: str) -> None:
    renamed = {new if name == old else name: value for name, value in inputs.values.items()}
    inputs.values.clear()
    inputs.values.update(renamed)
    inputs.contributions = [Contribution(new if one.name == old else one.name, one.half, one.why, one.normal)
                            for one in inputs.contributions]
    inputs.groups = [type(one)(tuple(new if name == old else name for name in one.names), one.covariance, one.degrees)
                     for one in inputs.groups]
    inputs.unknown = {new if name == old else name for name in inputs.unknown}


def _zero(prediction: Prediction, place: str) -> float | None:
    coil = prediction.coils.get(place)
    if coil is None:
        return None
    try:
        return winding_zero(coil.winding)[0]
    except OutOfTable:
        return None


def _result(reading: Reading, prediction: Prediction, place: str, made: gathering.Gathered, method: Method,
            outcomes: Outcomes, notes: list[str]) -> r.ReadingResult:
    one, spot = reading.entry, reading.spot()
    unknown = bool(made.inputs.unknown)
    results = tuple(
        _measured(name, outcome, prediction.range(name, place, one.state), unknown and _rests_on_unknown(name, made, method))
        for name, outcome in outcomes.results.items()
        if math.isfinite(outcome.value) and (name != "frequency" or _read(one, name))
    )
    lost = [name for name, outcome in outcomes.results.items() if not math.isfinite(outcome.value)]
    if lost:
        notes.append(f"no physical value comes out for {', '.join(name.replace('-', ' ') for name in lost)}: "
                     "the readings contradict each other, or the method does not hold")
    kept = {f"{a}, {b}": value for (a, b), value in outcomes.correlation.items()}
    return r.ReadingResult(
        tag=one.tag, serves=prediction.circuit.serves, state=one.state, of=place, taken_on=one.taken_on or "", by=one.by,
        note=one.note, place=Place(file=spot.file, line=spot.line, column=spot.column, path=f"readings[{reading.index}]"),
        method=method.name, notes=tuple(notes), inputs=tuple(_inputs(reading, made)), results=results, correlation=kept,
    )


def _read(one: ReadingEntry, name: str) -> bool:
    return getattr(one, name) is not None or (bool(one.repeats) and getattr(one.repeats[0], name) is not None)


def _rests_on_unknown(name: str, made: gathering.Gathered, method: Method) -> bool:
    """Whether moving an input of unknown accuracy moves the result."""
    values = {key: si_array(value) for key, value in made.inputs.values.items()}
    before = float(method.model(values)[name][0])
    for one in made.inputs.unknown:
        moved = {**values, one: values[one] * 1.001 + 1e-12}
        if float(method.model(moved)[name][0]) != before:
            return True
    return False


def si_array(value: float) -> si.RealArray:
    """One value as an array of one."""
    return np.asarray([value], dtype=float)


def _measured(name: str, outcome: Outcome, predicted: tuple[tuple[float, float, float], str] | None, unknown: bool) -> r.Measured:
    ends, source = predicted if predicted is not None else (None, "")
    stated = not unknown and math.isfinite(outcome.low)
    low, high = (outcome.low, outcome.high) if stated else (None, None)
    why = ""
    if unknown:
        why = "nothing says how accurate a reading it rests on is"
    elif not stated:
        why = f"{100.0 * outcome.lost:.0f} % of the trials gave no physical result, so no interval is stated"
    elif ends is None:
        why = "nothing is predicted for it"
    return r.Measured(
        name=name, dimension=DIMENSION_OF[name].name, value=outcome.value,
        uncertainty=outcome.uncertainty if not unknown and math.isfinite(outcome.uncertainty) else None,
        degrees=outcome.degrees if stated else None, low=low, high=high, coverage=SHARE, by=outcome.by if stated else "",
        sampled_uncertainty=outcome.sampled_uncertainty if stated else None, first_order_agrees=outcome.agree and stated,
        lost=outcome.lost, budget=tuple(r.BudgetLine(what=what, share=share) for what, share in outcome.budget if share > 0.0005),
        predicted=ends, predicted_from=source,
        agreement=agreement(low, high, outcome.value, ends), why=why,
        deviation=deviation(outcome.value, outcome.uncertainty, ends) if ends is not None and stated else None,
    )


def _inputs(reading: Reading, made: gathering.Gathered) -> list[r.InputRead]:
    found = []
    one = reading.entry
    for name, dimension in QUANTITIES.items():
        in_sets = bool(one.repeats) and getattr(one.repeats[0], name) is not None
        if getattr(one, name) is None and not in_sets:
            continue
        spot = reading.spot(("repeats", 0, name) if in_sets else (name,))
        key = next((each for each in (name, "bridge_inductance" if name == "inductance" else name,
                                      "winding_temperature" if name == "temperature" else name)
                    if each in made.inputs.values), name)
        spread = made.inputs.spread(key)
        label, full = made.used.get(name, ("", None))
        found.append(r.InputRead(
            quantity=name, dimension=dimension.name, value=made.inputs.values[key], sets=len(one.repeats) if in_sets else 1,
            uncertainty=None if key in made.inputs.unknown else spread, instrument=label, range=full,
            place=Place(file=spot.file, line=spot.line, column=spot.column, path=f"readings[{reading.index}].{name}"),
        ))
    return found
