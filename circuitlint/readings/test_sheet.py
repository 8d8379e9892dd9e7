"""The test sheet to take to site: what to read on each circuit, with which range and category, what to expect, when to stop.

Made from the same prediction the readings are held against afterwards.
"""

from __future__ import annotations

import math
from collections.abc import Iterator
from typing import Literal

from pydantic import Field

import circuitlint
from circuitlint import si
from circuitlint.definition.reading import Installation
from circuitlint.quantity import show
from circuitlint.readings.evaluation import ONE_PHASE
from circuitlint.readings.models import QUANTITIES
from circuitlint.readings.prediction import CIRCUIT, Prediction, predictions
from circuitlint.review.record import Document, Part, Record
from circuitlint.sources import Source

CATEGORY = Source("IEC 61010-2-033", "measurement categories by location in the installation", known="common practice")
RANGES = (2.0, 6.0)
"""Full scales of common hand-held meters, times powers of ten; common practice."""
ROOM = 1.1
DEAD = "dead: switched off, locked, proved dead"
LIVE = "energised"


class SheetLine(Part):
    """One thing to read."""

    state: str = Field(description="State to read in.")
    of: str = Field(description="Part to read at, as a readings file names it; empty for the whole load.")
    quantity: str = Field(description="Name in a readings file.")
    circuit: str = Field(description="Dead or energised.")
    dimension: str = Field(description="Name of the dimension.")
    lowest: float | None = Field(description="Lowest value to expect; null where the review has no figure for it.")
    highest: float | None = Field(description="Highest value to expect.")
    needs: str = Field(default="", description="Why nothing is expected.")
    full_scale: float | None = Field(description="Range to choose.")
    category: str = Field(description="Measurement category to use.")
    stop: str = Field(description="When to stop.")


class SheetCircuit(Part):
    """One circuit's part of the sheet."""

    tag: str = Field(description="Circuit.")
    serves: str = Field(description="What it serves.")
    fed_from: str = Field(description="What feeds it.")
    cautions: tuple[str, ...] = Field(description="Before anything is read.")
    lines: tuple[SheetLine, ...] = Field(description="In the order to read them.")


class TestSheet(Part):
    """A test sheet for every circuit of a definition."""

    __test__ = False

    format: Literal[1] = Field(default=1, description="Format of the sheet.")
    title: str = Field(description="Title of the definition.")
    tool: str = Field(description="Name of the tool.")
    version: str = Field(description="Version of the tool.")
    definition: tuple[Document, ...] = Field(description="Files it was made from, with digests.")
    circuits: tuple[SheetCircuit, ...] = Field(description="Every circuit.")
    statement: str = Field(description="Who prevails.")


def make(installation: Installation, record: Record) -> TestSheet:
    """The sheet for every circuit of a review that has its figures."""
    return TestSheet(
        title=record.title, tool="circuitlint", version=circuitlint.__version__, definition=record.documents,
        circuits=tuple(_circuit(one, record) for one in predictions(installation, record).values()), statement=record.statement,
    )


def _circuit(prediction: Prediction, record: Record) -> SheetCircuit:
    circuit = prediction.circuit
    cautions = [record.cautions[key] for key in circuit.cautions if key in record.cautions]
    if circuit.system == "three-phase":
        cautions.append(f"{ONE_PHASE[0].upper()}{ONE_PHASE[1:]}.")
    return SheetCircuit(tag=circuit.tag, serves=circuit.serves, fed_from=circuit.fed_from, cautions=tuple(cautions),
                        lines=tuple(_lines(prediction)))


def _lines(prediction: Prediction) -> Iterator[SheetLine]:
    supply = prediction.supply
    for place in prediction.coils:
        of = "" if place == prediction.root else place
        apart = f"{DEAD}; the part disconnected from what stands beside it" if of else DEAD
        yield _line(prediction, "cold", of, "resistance", "direct-current-resistance", apart,
                    "a voltage shows, or the reading lies outside: do not energise; let no loop be opened while current flows")
        yield _line(prediction, "cold", of, "temperature", "", DEAD, "the winding is warmer than its surroundings: wait")
    stop = _stop(prediction)
    outside = "outside: switch off, and look for why"
    yield _line(prediction, "steady", CIRCUIT, "voltage", "voltage", LIVE, outside)
    yield _line(prediction, "steady", "", "voltage", "voltage", LIVE, outside)
    yield _line(prediction, "steady", "", "current", "current", LIVE, stop)
    if not prediction.direct:
        yield _line(prediction, "steady", "", "power", "active-power", LIVE, stop)
        if supply is not None and supply.frequency is not None:
            yield _line(prediction, "steady", CIRCUIT, "frequency", "frequency", LIVE, outside)
    for place in prediction.coils:
        if place == prediction.root:
            yield _line(prediction, "steady", "", "resistance", "direct-current-resistance", f"{DEAD}, right after running",
                        "a voltage shows; note the time since switching off")


def _stop(prediction: Prediction) -> str:
    """When to switch off again, by the current."""
    running = prediction.range("current", prediction.root, "steady")
    if running is None:
        return "no current is predicted: decide beforehand what current is too much"
    told = f"above {show(running[0][2], si.CURRENT)}: switch off"
    stuck = prediction.range("current", prediction.root, "stuck-open")
    moving = any(coil.armature != "none" for coil in prediction.coils.values())
    if moving and stuck is not None and stuck[0][1] > running[0][2]:
        told += f"; from {show(stuck[0][1], si.CURRENT)} on the armature may be standing open"
    return told


def _line(prediction: Prediction, state: str, of: str, quantity: str, name: str, circuit: str, stop: str) -> SheetLine:
    place = prediction.place(of)
    found = prediction.range(name, place, state) if name else None
    needs = ""
    if quantity == "temperature" and prediction.ambient is not None:
        low, high = prediction.ambient.low, prediction.ambient.high
    elif found is not None:
        _, low, high = found[0]
    else:
        low = high = math.nan
        needs = "the temperature around it is not stated" if quantity == "temperature" else "the review has no such figure"
    known = math.isfinite(high)
    category = "no voltage may be there" if circuit.startswith("dead") else _category(prediction)
    scale = full_scale(max(abs(low), abs(high))) if known and quantity not in ("temperature", "frequency") else None
    return SheetLine(
        state=state, of=of, quantity=quantity, circuit=circuit, dimension=QUANTITIES[quantity].name,
        lowest=low if known else None, highest=high if known else None, needs=needs, full_scale=scale, category=category,
        stop=stop,
    )


def full_scale(value: float) -> float:
    """The smallest common range that holds a value with a tenth to spare."""
    wanted = ROOM * value
    decade = 10.0 ** math.floor(math.log10(wanted)) if wanted > 0.0 else 1.0
    return next(step * power for power in (decade / 10.0, decade, 10.0 * decade) for step in RANGES if step * power >= wanted)


def _category(prediction: Prediction) -> str:
    """The category by location (a fixed installation) and by voltage, taken as standing against earth."""
    if prediction.supply is None:
        return "by the place it is read at"
    highest = prediction.supply.voltage.high
    for rated in (300, 600, 1000):
        if highest <= rated:
            return f"CAT III {rated} V or more"
    return "beyond common categories: a competent person decides"
