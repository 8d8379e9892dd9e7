"""What a readings file may say: instruments with their accuracy, and readings by tag and state."""

from __future__ import annotations

from datetime import date
from typing import Annotated, Any, Literal, TypeAlias

from pydantic import AfterValidator, BeforeValidator, Field, create_model, model_validator
from pydantic_core import PydanticCustomError

from circuitlint import si
from circuitlint.definition import fields as f
from circuitlint.definition.fields import Entry, OneOrMany, Read
from circuitlint.readings.accuracy import Accuracy, ReadAccuracy
from circuitlint.si import Dimension

QUANTITIES: dict[str, Dimension] = {
    "resistance": si.RESISTANCE,
    "temperature": si.TEMPERATURE,
    "voltage": si.VOLTAGE,
    "current": si.CURRENT,
    "power": si.ACTIVE_POWER,
    "power_factor": si.RATIO,
    "phase_angle": si.ANGLE,
    "frequency": si.FREQUENCY,
    "inductance": si.INDUCTANCE,
    "loop_impedance": si.RESISTANCE,
    "total_voltage": si.VOLTAGE,
    "resistor_voltage": si.VOLTAGE,
    "coil_voltage": si.VOLTAGE,
}
"""Everything that can be read off an instrument."""
VOLTAGES = ("total_voltage", "resistor_voltage", "coil_voltage")
"""Read with an instrument's voltage input."""


def input_of(quantity: str) -> str:
    """The instrument input that a quantity is read with."""
    return "voltage" if quantity in VOLTAGES else quantity


def _a_date(text: str) -> str:
    try:
        return date.fromisoformat(text).isoformat()
    except ValueError:
        raise PydanticCustomError("date", "{what}", {"what": f"{text[:40]!r} is not a date",
                                                     "accepted": "a day, such as 2027-06-30"}) from None


def _yes_or_no(value: Any) -> Any:
    known = {"yes": True, "no": False, "true": True, "false": False}
    if isinstance(value, str) and value.lower() in known:
        return known[value.lower()]
    if value is None or isinstance(value, bool):
        return value
    raise PydanticCustomError("yes or no", "{what}", {"what": f"{str(value)[:40]!r} is neither yes nor no",
                                                      "accepted": "`yes` or `no`"})


def _one_word(value: Any) -> Any:
    return {"": value} if isinstance(value, str) else value


Day: TypeAlias = Annotated[str, AfterValidator(_a_date)]
YesOrNo: TypeAlias = Annotated[bool, BeforeValidator(_yes_or_no)]


class InputEntry(Entry):
    """One input of an instrument: what its data sheet says of it. `range` and `resolution` are added by dimension."""

    accuracy: Annotated[Accuracy, ReadAccuracy()]
    range: Any = None
    resolution: Any = None
    burden: f.Voltage | None = Field(default=None, description="Of a current input: voltage across it at full scale.")
    resistance: f.Resistance | None = Field(default=None, description="Of a voltage input: its own resistance.")
    lead_resistance: f.Resistance | None = Field(
        default=None, description="Of a resistance input: leads and contacts, to be taken off; not with four wires."
    )
    frequencies: f.Frequency | None = Field(default=None, description="Band of frequency the accuracy holds in.")
    test_frequency: f.Frequency | None = Field(default=None, description="Of a bridge: the frequency it measures at.")

    @model_validator(mode="after")
    def _digits_need_a_resolution(self) -> InputEntry:
        if self.accuracy.digits > 0.0 and self.resolution is None:
            raise PydanticCustomError("accuracy", "{what}", {
                "what": f"the accuracy {self.accuracy.text!r} counts digits, and no resolution says what one digit is",
                "accepted": "`resolution: 0.1 V` or as the data sheet has it"})
        return self


def _input_model(name: str, dimension: Dimension) -> type[InputEntry]:
    # The resolution of a temperature is a difference, for which no zero of a scale counts.
    step = si.TEMPERATURE_RISE if dimension is si.TEMPERATURE else dimension
    fields: dict[str, Any] = {
        "range": (Annotated[Any, Read(dimension)] | None, Field(default=None, description="Full scale.")),
        "resolution": (Annotated[Any, Read(step)] | None, Field(default=None, description="What one digit is worth.")),
    }
    return create_model(f"InputOf{name.title().replace('_', '')}", __base__=InputEntry, **fields)


_INPUTS: dict[str, Any] = {
    name: (_input_model(name, dimension) | None, None) for name, dimension in QUANTITIES.items() if name not in VOLTAGES
}
Inputs: Any = create_model("Inputs", __base__=Entry, **_INPUTS)


class Instrument(Entry):
    """A measuring instrument, as its data sheet and its calibration label have it."""

    name: str = Field(default="", max_length=80, description="What a person calls it.")
    serial: str = Field(default="", max_length=80)
    category: str = Field(default="", max_length=40, description="Such as CAT III 600 V, after IEC 61010.")
    true_rms: YesOrNo | None = Field(default=None, description="Whether it reads the rms value of any wave shape.")
    calibrated: Day | None = None
    calibration_due: Day | None = None
    inputs: Inputs


_VALUES: dict[str, Any] = {
    name: (Annotated[Any, Read(dimension)] | None, None) for name, dimension in QUANTITIES.items()
}
Observed: Any = create_model("Observed", __base__=Entry, **_VALUES)
"""Quantities read at one and the same moment."""


class ReadingEntry(Observed):  # type: ignore[misc]
    """Readings of one circuit in one state."""

    tag: str = Field(min_length=1, max_length=120)
    state: str = Field(default="steady", description="State of the study that it belongs to, such as `cold` or `steady`.")
    of: str = Field(default="", description="Part that was measured, such as `load.coil`; the whole load if not given.")
    instrument: Annotated[dict[str, str], BeforeValidator(_one_word)] = Field(
        default_factory=dict, description="Name of the instrument used, for all quantities or by quantity."
    )
    voltmeter: Literal["at the load", "ahead of the ammeter"] = "at the load"
    four_wire: YesOrNo = Field(default=False, description="Resistance read with four wires: nothing to take off for leads.")
    series_resistor: f.Resistance | None = Field(default=None, description="Known resistor of the three-voltage method.")
    armature: Literal["open", "closed"] | None = None
    repeats: Annotated[list[Observed], OneOrMany] = Field(
        default_factory=list, max_length=1000, description="Simultaneous sets, each with the same quantities."
    )
    taken_on: Day | None = None
    by: str = Field(default="", max_length=120)
    note: str = Field(default="", max_length=400)

    @model_validator(mode="after")
    def _something_and_alike(self) -> ReadingEntry:
        alone = {name for name in QUANTITIES if getattr(self, name) is not None}
        sets = [{name for name in QUANTITIES if getattr(one, name) is not None} for one in self.repeats]
        wrong = ""
        if not alone and not any(sets):
            wrong, accepted = "nothing was read", f"at least one of {', '.join(QUANTITIES)}"
        elif any(one != sets[0] for one in sets):
            wrong, accepted = "the simultaneous sets do not hold the same quantities", "each set with the same quantities"
        elif sets and alone & sets[0]:
            wrong, accepted = f"{min(alone & sets[0])!r} stands both in the sets and beside them", "each quantity in one place"
        elif self.four_wire and self.resistance is None and not (sets and "resistance" in sets[0]):
            wrong, accepted = "four wires, and no resistance was read", "`resistance: ...`, or no `four_wire`"
        if wrong:
            raise PydanticCustomError("reading", "{what}", {"what": wrong, "accepted": accepted})
        return self


class ReadingsFile(Entry):
    """A readings file."""

    format: Literal["1"] = Field(description="Version of the file format.")
    title: str = Field(default="", max_length=200)
    taken_on: Day | None = None
    by: str = Field(default="", max_length=120, description="Who took the readings.")
    witness: str = Field(default="", max_length=120)
    instruments: dict[str, Instrument] = Field(default_factory=dict)
    readings: Annotated[list[ReadingEntry], OneOrMany] = Field(default_factory=list)
