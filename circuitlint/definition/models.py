"""What a definition may say: supplies, boards, cables, meters, circuits.

The load kinds stand in `loads`; the model of a whole file is made by `document_model`, since plugins add load kinds.
"""

from __future__ import annotations

from datetime import date
from typing import Annotated, Literal, TypeAlias

from pydantic import Field, field_validator, model_validator
from pydantic_core import PydanticCustomError

from circuitlint.definition import fields as f
from circuitlint.definition.fields import Entry, OneOrMany

System: TypeAlias = Literal["dc", "single-phase", "three-phase"]
Material: TypeAlias = Literal["copper", "aluminium"]
Insulation: TypeAlias = Literal["pvc-70", "xlpe-90"]
Method: TypeAlias = Literal["A1", "A2", "B1", "B2", "C", "D1", "D2"]

Phase: TypeAlias = Literal["L1", "L2", "L3", "L1-L2", "L2-L3", "L3-L1"]


class Supply(Entry):
    """Origin of energy. Voltage and frequency hold at the origin, in service."""

    system: System
    voltage: f.Voltage = Field(
        description="Voltage at the origin with its band; rms on alternating current, between lines on three phases."
    )
    frequency: f.Frequency | None = Field(default=None, description="Frequency with its band; not on direct current.")

    @model_validator(mode="after")
    def _frequency_where_it_belongs(self) -> Supply:
        if self.system == "dc" and self.frequency is not None:
            raise PydanticCustomError(
                "contradiction", "{what}",
                {"what": "a dc supply has no frequency", "accepted": "`system: single-phase`, or no `frequency`"},
            )
        if self.system != "dc" and self.frequency is None:
            raise PydanticCustomError(
                "contradiction", "{what}",
                {"what": f"a {self.system} supply needs its frequency", "accepted": "`frequency: 50 Hz ± 1 %`"},
            )
        return self


class Cable(Entry):
    """A run of cable: the way out and the way back have the same length and section."""

    section: f.Section = Field(description="Nominal cross-section of one conductor.")
    length: f.Length = Field(description="Length of the run, one way.")
    conductor: Material
    conductor_class: Literal["1", "2", "5"] | None = Field(
        default=None, description="IEC 60228 class; both class 2 and class 5 are covered where it is not stated."
    )
    insulation: Insulation | None = None
    method: Method | None = Field(default=None, description="Installation method, IEC 60364-5-52.")
    ambient: f.Temperature | None = Field(default=None, description="Air or ground temperature along the run.")
    grouped_circuits: int | None = Field(default=None, ge=1, le=200, description="Circuits bunched, this one counted.")
    reactance: f.ResistancePerLength | None = Field(
        default=None, description="Reactance of one conductor per length at the supply's frequency."
    )

    @field_validator("conductor_class", mode="before")
    @classmethod
    def _number_as_text(cls, value: object) -> object:
        return str(value) if isinstance(value, int) and not isinstance(value, bool) else value


class Correction(Entry):
    """A capacitor beside the load or on the board, for the power factor; on three phases, of each phase of a star."""

    capacitance: f.Capacitance
    rated_voltage: f.Voltage | None = None
    discharge_resistance: f.Resistance | None = Field(default=None, description="Resistor that stays across the capacitor.")


class Board(Entry):
    """A distribution board: fed from a supply or another board, through a feeder that all its circuits share."""

    fed_from: str = Field(min_length=1, description="Name of a supply or of another board.")
    cable: Annotated[list[Cable] | None, OneOrMany] = Field(
        default=None, description="The feeder's runs, in order; `[]` where there is none."
    )
    correction: Correction | None = Field(default=None, description="A capacitor on the board.")


class Meter(Entry):
    """The test meter that will carry or embrace the circuit's current at commissioning."""

    connection: Literal["in-line", "clamp"] | None = None
    range: f.Current | None = Field(default=None, description="Full scale of the input used, rms.")
    fuse: f.Current | None = Field(default=None, description="Rating of the fuse in the input.")
    continuous: f.Current | None = Field(default=None, description="Current the input carries without a time limit.")
    longest: f.Time | None = Field(default=None, description="How long the input may carry more than that, up to its range.")
    reading_time: f.Time | None = Field(default=None, description="How long the current will be carried for a reading.")


class Concession(Entry):
    """Recorded leave to accept a named nonconformity: by whom, why, until when."""

    tag: str = Field(min_length=1)
    rule: str = Field(min_length=1)
    by: str = Field(min_length=1)
    reason: str = Field(min_length=1)
    @field_validator("until")
    @classmethod
    def _a_day(cls, value: str) -> str:
        try:
            date.fromisoformat(value)
        except ValueError:
            raise PydanticCustomError(
                "date", "{what}", {"what": f"'until' reads {value!r}, which is no day", "accepted": "a day such as 2027-06-30"}
            ) from None
        return value

    until: Annotated[str, Field(pattern=r"^\d{4}-\d{2}-\d{2}$", description="Last day, as YYYY-MM-DD.")]


class CircuitEntry(Entry):
    """One outgoing way. `load` is added by `document_model`."""

    tag: str = Field(min_length=1, max_length=120, description="Reference designation, often after IEC 81346.")
    serves: str = ""
    fed_from: str = Field(min_length=1, description="Name of a supply or a board.")
    phase: Phase | None = Field(
        default=None, description="Where a two-wire circuit is connected on a three-phase supply; balanced where not stated."
    )
    connection: Literal["star", "delta"] | None = Field(
        default=None, description="How a balanced three-phase load is connected; star where not stated."
    )
    diversity: f.Share | None = Field(default=None, description="Share of the circuit that runs when the board is loaded.")
    ambient: f.Temperature | None = Field(default=None, description="Air temperature at the load.")
    cable: Annotated[list[Cable] | None, OneOrMany] = Field(
        default=None, description="Runs from the origin to the load, in order; `[]` where there is none."
    )
    correction: Correction | None = Field(default=None, description="A capacitor at the load's terminals.")
    meter: Meter | None = None
