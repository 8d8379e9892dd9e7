"""A definition reviewed once, and readings held against it."""

from __future__ import annotations

from functools import cache

from circuitlint.definition.reading import Installation, read_text
from circuitlint.engine import Review, review
from circuitlint.limits.reading import resolve
from circuitlint.plugins import gather
from circuitlint.readings.holding import Options, hold
from circuitlint.readings.prediction import parts_of, predictions
from circuitlint.readings.reading import read_readings
from circuitlint.readings.record import Measured, ReadingsRecord
from circuitlint.review.record import Record

BENCH = """
format: 1
title: a bench
supplies:
  bench: {system: single-phase, voltage: 230 V ± 5 %, frequency: 50 Hz}
  battery: {system: dc, voltage: 24 V ± 5 %}
circuits:
  - tag: AC
    serves: choke
    fed_from: bench
    ambient: 10..30 degC
    cable: []
    load:
      coil: {resistance: 21 ohm ± 5 %, inductance: 0.36 H ± 5 %, armature: none, rated_voltage: 230 V, rated_frequency: 50 Hz,
             temperature_rise: 55 K}
    meter: {connection: in-line, range: 2 A, fuse: 10 A, continuous: 6 A}
  - tag: DC
    fed_from: battery
    ambient: 10..30 degC
    cable: []
    load:
      coil: {resistance: 48 ohm ± 7 %, inductance: 0.9 H ± 20 %, armature: none, rated_voltage: 24 V, temperature_rise: 60 K}
"""


@cache
def reviewed(definition: str = BENCH) -> tuple[Installation, Record]:
    """The definition with its review."""
    gathered = gather()
    installation = read_text(definition)
    ruleset = resolve("low-voltage-50hz", gathered.rulesets)
    return installation, review(installation, ruleset, gathered, Review("never", "2027-01-01"))


def held(text: str, definition: str = BENCH, options: Options | None = None, file: str = "readings.yaml") -> ReadingsRecord:
    """Readings given as text, held against a definition."""
    installation, record = reviewed(definition)
    known = {tag: parts_of(one) for tag, one in predictions(installation, record).items()}
    return hold(read_readings([(file, text.encode())], known), installation, record, options)


def result(record: ReadingsRecord, name: str, number: int = 0) -> Measured:
    """One result of one reading."""
    return next(one for one in record.readings[number].results if one.name == name)
