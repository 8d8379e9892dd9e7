"""Readings held against a review: the main job of this layer on one page."""

from __future__ import annotations

import contextlib
import sys
from collections.abc import Mapping, Sequence
from dataclasses import dataclass, field

import circuitlint
from circuitlint.definition.reading import Installation
from circuitlint.readings import record as r
from circuitlint.readings.evaluation import DIMENSION_OF, Evaluated, Lent, evaluate_one, lent_by
from circuitlint.readings.explanations import NOT_LOOKED, Verdict, explain
from circuitlint.readings.judgement import DECISION, PROBABILITY, agreement, deviation, judge
from circuitlint.readings.models import InputEntry
from circuitlint.readings.prediction import Prediction, predictions
from circuitlint.readings.propagation import FIRST_ORDER, MONTE_CARLO, SEED, SHARE, TRIALS, InputSet, evaluate
from circuitlint.readings.reading import Reading, Readings
from circuitlint.readings.rule import ReadingRule
from circuitlint.review.record import Place, Problem, Record


@dataclass(slots=True)
class Options:
    """How readings are held: decision rule, seed and trials of the Monte Carlo runs, rules on readings with their plugins."""

    decision_rule: r.DecisionRule = "guarded"
    seed: int = SEED
    trials: int = TRIALS
    rules: Sequence[tuple[ReadingRule, str]] = field(default_factory=tuple)
    failed: Sequence[tuple[str, str]] = field(default_factory=tuple)
    """Plugins that failed, with why: what they would have noticed is not known."""


def hold(readings: Readings, installation: Installation, record: Record, options: Options | None = None) -> r.ReadingsRecord:
    """Hold readings against the review of the same definition. A rule on readings that fails is contained and recorded."""
    options = options or Options()
    known = predictions(installation, record)
    found = [_evaluate(one, known, readings, options) for one in readings.readings]
    circuits = []
    for tag in (one.tag for one in record.circuits):
        own = [one for one in found if one.reading.entry.tag == tag]
        if own:
            circuits.append(_circuit(tag, own, known, options))
    remarks, problems = _remarks(found, readings, options)
    read = {one.tag for one in circuits}
    held = any(not limit.accepted for one in circuits for limit in one.limits) or any(one.severity == "major" for one in remarks)
    return r.ReadingsRecord(
        title=readings.title or record.title, tool="circuitlint", version=circuitlint.__version__, taken_on=readings.taken_on,
        by=readings.by, witness=readings.witness, ruleset=record.ruleset.name, decision_rule=options.decision_rule,
        coverage=SHARE, seed=options.seed, trials=options.trials, definition=record.documents,
        documents=tuple(readings.documents), instruments=_instruments(readings), readings=tuple(one.result for one in found),
        circuits=tuple(circuits), remarks=tuple(remarks), problems=tuple(problems),
        not_read=tuple(one.tag for one in record.circuits if one.tag not in read), unfilled=readings.unfilled,
        sources=tuple(str(one) for one in (FIRST_ORDER, MONTE_CARLO, DECISION, PROBABILITY)),
        held=held or bool(problems) or any(one.departs for one in circuits), statement=record.statement,
    )


def _evaluate(one: Reading, known: Mapping[str, Prediction], readings: Readings, options: Options) -> Evaluated:
    prediction = known[one.entry.tag]
    lent: dict[str, Lent] = {}
    for other in readings.readings:
        place = prediction.place(other.entry.of)
        if other.entry.tag == one.entry.tag and place not in lent:
            cold = lent_by(other, prediction, readings.instruments)
            if cold is not None:
                lent[place] = cold
    return evaluate_one(one, prediction, readings.instruments, lent, options.seed, options.trials)


def _circuit(tag: str, found: Sequence[Evaluated], known: Mapping[str, Prediction], options: Options) -> r.CircuitReadings:
    prediction = known[tag]
    measured = {(each.name, one.place, one.result.state): each for one in found for each in one.result.results}
    if prediction.circuit.system != "three-phase":
        # The current of the whole load is that of the circuit: there is no other way for it.
        for (name, place, state), each in list(measured.items()):
            if name == "current" and place == prediction.root:
                measured.setdefault((name, "", state), each)
    measured.update(_drops(found, prediction, options))
    limits, missed = [], 0
    for check in prediction.circuit.checks:
        if check.limit is None or not check.sense:
            continue
        own = measured.get((check.figure, check.of, check.state))
        if own is None:
            missed += 1
        else:
            limits.append(judge(check, own, options.decision_rule))
    verdict = _verdict(tag, found, known)
    return r.CircuitReadings(tag=tag, limits=tuple(limits), not_measured=missed, departs=verdict.departs, misfit=verdict.misfit,
                             explanations=verdict.explanations, told=verdict.told)


def _verdict(tag: str, found: Sequence[Evaluated], known: Mapping[str, Prediction]) -> Verdict:
    """Of the coils read, the verdict of the one that departs furthest."""
    places = dict.fromkeys(one.place for one in found if one.place in known[tag].coils)
    if not places:
        return Verdict(None, None, (), f"{NOT_LOOKED}: no reading is of a coil alone")
    verdicts = [explain([one for one in found if one.place == place], known, tag, place) for place in places]
    return min(verdicts, key=lambda one: 2.0 if one.misfit is None else one.misfit - len(one.explanations))


def _drops(found: Sequence[Evaluated], prediction: Prediction, options: Options) -> dict[tuple[str, str, str], r.Measured]:
    """Share of voltage lost on the way, where the voltage was read at both ends in one state."""
    made = {}
    for one in found:
        for other in found:
            ends = (one.outcomes.results.get("voltage"), other.outcomes.results.get("voltage"))
            if one.place or other.place != prediction.root or one.result.state != other.result.state or None in ends:
                continue
            inputs = InputSet()
            sure = True
            for name, each in (("origin", one), ("load", other)):
                result = next((each_one for each_one in each.result.results if each_one.name == "voltage"), None)
                sure = sure and result is not None and result.low is not None
                inputs.values[name] = each.outcomes.results["voltage"].value
                inputs.contributions += [type(c)(name, c.half, c.why, c.normal) for c in each.inputs.contributions
                                         if c.name == "voltage"]
            out = evaluate(lambda v: {"voltage-drop-share": 1.0 - v["load"] / v["origin"]}, inputs, options.seed, options.trials)
            drop = out.results["voltage-drop-share"]
            predicted = prediction.range("voltage-drop-share", "", one.result.state)
            ends_of = predicted[0] if predicted else None
            low, high = (drop.low, drop.high) if sure else (None, None)
            made["voltage-drop-share", "", one.result.state] = r.Measured(
                name="voltage-drop-share", dimension=DIMENSION_OF["voltage-drop-share"].name, value=drop.value,
                uncertainty=drop.uncertainty if sure else None, degrees=None, low=low, high=high, coverage=SHARE, by=drop.by,
                predicted=ends_of, predicted_from=predicted[1] if predicted else "",
                agreement=agreement(low, high, drop.value, ends_of),
                deviation=deviation(drop.value, drop.uncertainty, ends_of) if ends_of and sure else None,
                why="" if sure else "nothing says how accurate a voltage is",
            )
    return made


def _remarks(found: Sequence[Evaluated], readings: Readings, options: Options) -> tuple[list[r.Remark], list[Problem]]:
    remarks: list[r.Remark] = []
    problems: dict[tuple[str, str, str], list[str]] = {}
    for rule, plugin in options.rules:
        for one in found:
            try:
                with contextlib.redirect_stdout(sys.stderr):
                    noticed = list(rule.notice(one.result, dict(readings.instruments)))
                remarks += [r.Remark(rule=rule.name, what=f"{one.result.tag}: {each.what}", help=each.help,
                                     severity=each.severity, place=_place(one.result, each.quantity)) for each in noticed]
            except KeyboardInterrupt:
                raise
            except BaseException as error:
                what = f"{type(error).__name__}: {error}"
                problems.setdefault((plugin, rule.name, what), []).append(one.result.tag)
    made = [Problem(plugin=plugin, rule="", what=f"the plugin failed: {what}") for plugin, what in options.failed]
    made += [Problem(plugin=plugin, rule=name, what=what, circuits=tuple(dict.fromkeys(tags)))
             for (plugin, name, what), tags in problems.items()]
    return remarks, made


def _place(reading: r.ReadingResult, quantity: str) -> Place:
    return next((one.place for one in reading.inputs if one.quantity == quantity), reading.place)


def _instruments(readings: Readings) -> tuple[r.InstrumentUsed, ...]:
    return tuple(
        r.InstrumentUsed(
            name=name, called=one.name, serial=one.serial, category=one.category, true_rms=one.true_rms,
            calibrated=one.calibrated or "", calibration_due=one.calibration_due or "",
            inputs={key: _input(entry) for key in type(one.inputs).model_fields
                    if (entry := getattr(one.inputs, key)) is not None},
        )
        for name, one in readings.instruments.items()
    )


def _input(entry: InputEntry) -> str:
    words = [entry.accuracy.text]
    words += [f"range {entry.range.text}"] if entry.range is not None else []
    words += [f"one digit {entry.resolution.text}"] if entry.resolution is not None else []
    return ", ".join(words)
