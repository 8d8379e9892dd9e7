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
    earthing: Literal["TN-S", "TN-C-S", "TT", "IT"] | None = Field(default=None, description="Type of earthing.")
    loop_impedance: f.Resistance | None = Field(default=None, description="Earth-fault loop impedance at the origin.")
    fault_current: f.Current | None = Field(default=None, description="Largest prospective fault current at the origin.")
    measurement_category: Literal["II", "III", "IV"] | None = Field(
        default=None, description="Measurement category, IEC 61010-1, of the places this supply reaches."
    )

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
    protective_section: f.Section | None = Field(default=None, description="Section of the protective conductor.")
    capacitance: f.CapacitancePerLength | None = Field(default=None, description="Capacitance between the two wires per length.")

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
    category: Annotated[str, Field(pattern=r"^CAT (II|III|IV) [1-9][0-9]{0,3} V$")] | None = Field(
        default=None, description="Measurement category with its voltage to earth, as marked: `CAT III 600 V`."
    )
    burden_voltage: f.Voltage | None = Field(default=None, description="Voltage across the input at the full range.")
    resolution: f.Current | None = Field(default=None, description="One count of the last place in the range used.")
    responds: Literal["true rms", "average"] | None = Field(default=None, description="What it makes of an alternating current.")
    test_current: f.Current | None = Field(default=None, description="Current its resistance range drives through a winding.")


class Protection(Entry):
    """The device at the start of the circuit that opens it at overload and fault."""

    device: Literal["circuit-breaker", "fuse"]
    rating: f.Current
    curve: Literal["B", "C", "D", "gG"] | None = Field(default=None, description="B, C or D of a circuit-breaker; gG of a fuse.")
    breaking_capacity: f.Current | None = None
    let_through: f.LetThrough | None = Field(
        default=None, description="Let-through at the prospective fault current, from the maker's sheet."
    )
    residual_current: f.Current | None = Field(default=None, description="Rated residual current, where it has that function.")

    @model_validator(mode="after")
    def _curve_of_its_kind(self) -> Protection:
        if self.curve is not None and (self.curve == "gG") != (self.device == "fuse"):
            accepted = "gG" if self.device == "fuse" else "B, C or D"
            raise PydanticCustomError(
                "contradiction", "{what}", {"what": f"a {self.device} with curve {self.curve}", "accepted": accepted}
            )
        return self


class Switching(Entry):
    """What switches the circuit in service: a contact or an electronic output."""

    contact: str = Field(default="", max_length=80, description="Which contact it is.")
    category: Annotated[str, Field(max_length=20)] | None = Field(
        default=None, description="Utilization category or pilot-duty code, such as AC-15, DC-13 or B300."
    )
    rated_current: f.Current | None = Field(default=None, description="Rated current in that category.")
    rated_voltage: f.Voltage | None = None
    withstand: f.Voltage | None = Field(default=None, description="Peak voltage the open contact or output bears.")
    smallest_current: f.Current | None = Field(default=None, description="Smallest current it switches dependably.")
    leakage_current: f.Current | None = Field(default=None, description="Current that flows on when it is open.")
    release_within: f.Time | None = Field(default=None, description="Time after opening by which the armature must have let go.")
    operations: f.Frequency | None = Field(default=None, description="Operations in time, such as 0.5 Hz.")


class Suppressor(Entry):
    """What stands across the load to hold the switch-off voltage down."""

    kind: Literal["none", "diode", "zener", "varistor", "resistor"] = Field(
        description="`zener` is a diode with a Zener diode in series, `none` says that there is nothing."
    )
    clamp_voltage: f.Voltage | None = Field(default=None, description="Voltage across it at the current of opening.")
    resistance: f.Resistance | None = Field(default=None, description="Of a resistor.")
    energy: f.Energy | None = Field(default=None, description="Energy it bears in one operation.")
    power: f.ActivePower | None = Field(default=None, description="Mean power it bears.")

    @model_validator(mode="after")
    def _clamps_as_its_kind(self) -> Suppressor:
        if self.kind in ("none", "diode", "resistor") and self.clamp_voltage is not None:
            raise PydanticCustomError(
                "contradiction", "{what}",
                {"what": f"a suppressor of kind {self.kind} with a clamp voltage", "accepted": "`zener` or `varistor`"},
            )
        return self


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
    duty: f.Share | None = Field(default=None, description="Longest share of the time the load is on, where it has a rated duty.")
    diversity: f.Share | None = Field(default=None, description="Share of the circuit that runs when the board is loaded.")
    ambient: f.Temperature | None = Field(default=None, description="Air temperature at the load.")
    cable: Annotated[list[Cable] | None, OneOrMany] = Field(
        default=None, description="Runs from the origin to the load, in order; `[]` where there is none."
    )
    correction: Correction | None = Field(default=None, description="A capacitor at the load's terminals.")
    protection: Protection | None = None
    switching: Switching | None = None
    suppressor: Suppressor | None = None
    meter: Meter | None = None
