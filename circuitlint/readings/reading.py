"""Readings files to one validated set of readings; every fault of every file in one go, in file order."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass, field

import yaml
from pydantic import ValidationError

from circuitlint.definition.faults import faults_of
from circuitlint.definition.parts import nearest
from circuitlint.definition.text import Builder, Path, Text, child, fault_at, follow, key_node, parse
from circuitlint.errors import Fault, ReadingsError
from circuitlint.readings import csv_sheet
from circuitlint.readings.models import QUANTITIES, Instrument, ReadingEntry, ReadingsFile, input_of

STATES = ("cold", "steady", "switch-on", "stuck-open", "direct-current", "other-frequency", "alternating-current")


@dataclass(frozen=True, slots=True)
class Reading:
    """One entry of a readings file with where it stands."""

    entry: ReadingEntry
    file: str
    index: int
    node: yaml.Node | None

    def spot(self, path: Path = ()) -> Fault:
        """Place of a part of the entry, as a fault with nothing to say."""
        return fault_at(follow(self.node, path), self.file, "")


@dataclass(slots=True)
class Readings:
    """All that a set of readings files holds."""

    title: str = ""
    taken_on: str = ""
    by: str = ""
    witness: str = ""
    instruments: dict[str, Instrument] = field(default_factory=dict)
    readings: list[Reading] = field(default_factory=list)
    documents: list[tuple[str, str]] = field(default_factory=list)
    unfilled: int = 0
    """Lines of test sheets with no value."""


def read_readings(contents: Sequence[tuple[str, bytes]], parts: Mapping[str, Sequence[str]] | None = None) -> Readings:
    """Read named byte strings, YAML or (name ending in .csv) filled-in test sheets, as one set of readings.

    `parts` lists, for each tag of the definition, the parts that can be measured; with it, unknown tags and parts are faults.
    Raises ReadingsError with every fault, in file order.
    """
    made = Readings()
    texts: list[Text] = []
    read: list[tuple[Text, ReadingsFile]] = []
    places: dict[str, str] = {}
    for name, content in contents:
        if name.lower().endswith(".csv"):
            sheet = csv_sheet.read(content, name)
            text = sheet.text
            made.unfilled += sheet.unfilled
        else:
            text = parse(content, name)
        texts.append(text)
        entry = _read_one(text)
        if entry is not None:
            read.append((text, entry))
            _take_instruments(text, entry, made, places)
    for text, entry in read:
        for index, one in enumerate(entry.readings):
            _check(text, index, one, made.instruments, parts)
    faults = {fault for text in texts for fault in text.faults}
    if faults:
        order = {text.file: number for number, text in enumerate(texts)}
        raise ReadingsError(faults=sorted(faults, key=lambda one: (order.get(one.file, len(order)), one)))
    for text, entry in read:
        made.documents.append((text.file, text.sha256))
        for word in ("title", "taken_on", "by", "witness"):
            setattr(made, word, getattr(made, word) or getattr(entry, word) or "")
        nodes = child(text.root, "readings")
        for index, one in enumerate(entry.readings):
            one = one.model_copy(update={"taken_on": one.taken_on or entry.taken_on, "by": one.by or entry.by})
            node = child(nodes, index) if isinstance(nodes, yaml.SequenceNode) else nodes
            made.readings.append(Reading(one, text.file, index, node))
    if not made.readings:
        where = texts[0].file if texts else "readings"
        what, accepted = "no readings", "`readings:` with at least one entry"
        if made.unfilled:
            what, accepted = f"a test sheet with {made.unfilled} lines, none filled in", "a value in at least one line"
        raise ReadingsError(faults=[Fault(where, 1, 1, what, accepted)])
    return made


def _read_one(text: Text) -> ReadingsFile | None:
    if text.root is None:
        if not text.faults:
            text.faults.append(Fault(text.file, 1, 1, "the file is empty", "a readings file that begins with `format: 1`"))
        return None
    data = Builder(text).build(text.root)
    if not isinstance(data, dict):
        text.fault(text.root, "the file is not a mapping", "a readings file that begins with `format: 1`")
        return None
    try:
        return ReadingsFile.model_validate(data)
    except ValidationError as error:
        text.faults.extend(faults_of(error, ReadingsFile, text.root, text.file))
        return None


def _take_instruments(text: Text, entry: ReadingsFile, made: Readings, places: dict[str, str]) -> None:
    for name, one in entry.instruments.items():
        node = key_node(child(text.root, "instruments"), name)
        if name in places:
            text.fault(node, f"the instrument {name!r} is named twice; first in {places[name]}", "each name once over all files")
            continue
        spot = fault_at(node, text.file, "")
        places[name] = f"{spot.file}:{spot.line}"
        made.instruments[name] = one
        if one.calibrated and one.calibration_due and one.calibration_due < one.calibrated:
            text.fault(follow(text.root, ("instruments", name, "calibration_due")), "calibration falls due before it was done",
                       "a day after `calibrated`")


def _check(
    text: Text, index: int, one: ReadingEntry, instruments: Mapping[str, Instrument], parts: Mapping[str, Sequence[str]] | None
) -> None:
    here: Path = ("readings", index)
    if parts is not None and one.tag not in parts:
        close = nearest(one.tag, list(parts))
        text.fault(follow(text.root, (*here, "tag")), f"no circuit has the tag {one.tag!r}",
                   f"did you mean {close!r}?" if close else f"one of {', '.join(parts)}")
    elif parts is not None and one.of and one.of not in parts[one.tag]:
        text.fault(follow(text.root, (*here, "of")), f"{one.tag} has no part {one.of!r}", f"one of {', '.join(parts[one.tag])}")
    if one.state not in STATES:
        close = nearest(one.state, list(STATES))
        text.fault(follow(text.root, (*here, "state")), f"there is no state {one.state!r}",
                   f"did you mean {close!r}?" if close else f"one of {', '.join(STATES)}")
    if _has(one, "temperature") and one.of and not one.of.startswith("load"):
        text.fault(follow(text.root, (*here, "temperature")), "a temperature of what is not the load", "`of: load...`")
    three = [name for name in ("total_voltage", "resistor_voltage", "coil_voltage") if _has(one, name)]
    if three and (len(three) < 3 or one.series_resistor is None):
        text.fault(follow(text.root, (*here, three[0])), "the three-voltage method lacks a part of its data",
                   "total_voltage, resistor_voltage, coil_voltage and series_resistor")
    for quantity, name in one.instrument.items():
        node = follow(text.root, (*here, "instrument", *((quantity,) if quantity else ())))
        if quantity and quantity not in QUANTITIES:
            close = nearest(quantity, list(QUANTITIES))
            text.fault(key_node(follow(text.root, (*here, "instrument")), quantity), f"{quantity!r} is no quantity that is read",
                       f"did you mean {close!r}?" if close else f"one of {', '.join(QUANTITIES)}")
        elif name not in instruments:
            close = nearest(name, list(instruments))
            known = f"one of {', '.join(instruments)}" if instruments else "`instruments:` with the instrument's data"
            text.fault(node, f"no instrument is named {name!r}", f"did you mean {close!r}?" if close else known)
        elif quantity and getattr(instruments[name].inputs, input_of(quantity)) is None:
            text.fault(node, f"the instrument {name!r} has no input for {input_of(quantity)!r}",
                       f"`inputs: {{{input_of(quantity)}: ...}}` in the instrument")


def _has(one: ReadingEntry, quantity: str) -> bool:
    return getattr(one, quantity) is not None or (bool(one.repeats) and getattr(one.repeats[0], quantity) is not None)
