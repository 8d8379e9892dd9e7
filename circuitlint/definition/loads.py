"""Load kinds every definition knows, and the model of a file, which plugins widen with kinds of their own."""

from __future__ import annotations

from collections.abc import Mapping
from functools import lru_cache
from typing import Annotated, Any, Literal

from pydantic import BaseModel, Field, create_model, field_validator, model_validator
from pydantic_core import PydanticCustomError

from circuitlint.definition import fields as f
from circuitlint.definition.devices import Ballast, Transformer
from circuitlint.definition.fields import Entry, OneOrMany
from circuitlint.definition.models import Board, CircuitEntry, Concession, Material, Supply
from circuitlint.definition.saturation import Saturation, refusal


class Gap(Entry):
    """A coil with its armature held open: what changes against the closed gap. One of the magnitudes will do."""

    inductance: f.Inductance | None = None
    reactance: f.Reactance | None = None
    impedance: f.Resistance | None = None
    current: f.Current | None = Field(default=None, description="Current at rated voltage, armature open (inrush, closing).")
    apparent_power: f.ApparentPower | None = Field(default=None, description="Demand at rated voltage, armature open.")
    power_factor: f.Share | None = Field(default=None, description="Power factor with the armature open.")


class Coil(Entry):
    """A winding on a core. Any sufficient set of its nameplate will do; more than enough is cross-checked."""

    made_for: Literal["alternating current", "direct current"] | None = Field(
        default=None, description="The kind of current on the coil's plate."
    )
    resistance: f.Resistance | None = Field(default=None, description="Direct-current resistance of the winding.")
    resistance_at: f.Temperature | None = Field(default=None, description="Temperature of that resistance, else 20 degC.")
    inductance: f.Inductance | None = None
    reactance: f.Reactance | None = Field(default=None, description="Reactance at the rated frequency.")
    impedance: f.Resistance | None = Field(default=None, description="Impedance at the rated frequency.")
    quality_factor: f.Share | None = Field(default=None, description="Reactance over resistance at the rated frequency.")
    current: f.Current | None = Field(default=None, description="Current at rated voltage, armature closed (sealed, holding).")
    active_power: f.ActivePower | None = Field(default=None, description="Power taken at rated voltage, armature closed.")
    apparent_power: f.ApparentPower | None = Field(default=None, description="Demand at rated voltage, armature closed.")
    power_factor: f.Share | None = Field(default=None, description="Power factor of the coil alone, lagging.")
    core_resistance: f.Resistance | None = Field(
        default=None, description="Resistance across the inductance that stands for core loss."
    )
    armature: Literal["none", "moving"] | None = Field(
        default=None, description="`none` for a choke whose inductance is the same at switch-on."
    )
    open_gap: Gap | None = Field(default=None, description="The coil with its armature open, as at switch-on.")
    winding: Material = "copper"
    rated_voltage: f.Voltage | None = None
    rated_frequency: f.Frequency | None = None
    temperature_rise: f.TemperatureRise | None = Field(default=None, description="Mean winding rise at rated conditions.")
    thermal_resistance: f.ThermalResistance | None = Field(default=None, description="Mean winding rise per watt of loss.")
    thermal_class: Literal["105", "120", "130", "155", "180", "200"] | None = Field(
        default=None, description="Thermal class of the insulation, IEC 60085."
    )
    rated_duty: f.Share | None = Field(default=None, description="Share of the time it may be on, where not continuously.")
    lowest_voltage: f.Share | None = Field(default=None, description="Share of the rated voltage from which it closes: `85 %`.")
    highest_voltage: f.Share | None = Field(default=None, description="Share of the rated voltage it may run at: `110 %`.")
    pull_in_voltage: f.Voltage | None = Field(default=None, description="Voltage at which it pulls in, winding at 20 degC.")
    drop_out_voltage: f.Voltage | None = Field(default=None, description="Voltage below which it must have let go.")
    drop_out_current: f.Current | None = Field(default=None, description="Current below which it must have let go.")
    saturation_current: f.Current | None = Field(default=None, description="Peak current up to which its inductance holds.")
    saturation: Saturation | None = Field(default=None, description="How its inductance falls with current.")

    @field_validator("thermal_class", mode="before")
    @classmethod
    def _number_as_text(cls, value: object) -> object:
        return str(value) if isinstance(value, int) and not isinstance(value, bool) else value

    @model_validator(mode="after")
    def _a_sufficient_set(self) -> Coil:
        given = {name for name in type(self).model_fields if getattr(self, name) is not None}
        if not any(set(wanted) <= given for wanted in SUFFICIENT):
            sets = "; ".join(", ".join(wanted) for wanted in SUFFICIENT)
            told = ", ".join(name for name in COIL_NAMEPLATE if name in given) or "nothing"
            raise PydanticCustomError(
                "nameplate", "{what}", {"what": f"{told} is not enough to know the winding", "accepted": sets}
            )
        if self.power_factor is not None and self.power_factor.high > 1.0:
            raise PydanticCustomError(
                "nameplate", "{what}", {"what": "a power factor above 1", "accepted": "up to 1, with its tolerance"}
            )
        refused = refusal(given, self.saturation, self.armature) if self.saturation is not None else None
        if refused is not None:
            raise PydanticCustomError("nameplate", "{what}", {"what": refused[0], "accepted": refused[1]})
        return self


COIL_NAMEPLATE = (
    "resistance", "inductance", "reactance", "impedance", "quality_factor", "current", "active_power", "apparent_power",
    "power_factor",
)
SUFFICIENT: tuple[tuple[str, ...], ...] = (
    ("resistance",),
    ("impedance", "power_factor"),
    ("rated_voltage", "current", "power_factor"),
    ("rated_voltage", "current", "active_power"),
    ("rated_voltage", "apparent_power", "power_factor"),
    ("rated_voltage", "apparent_power", "active_power"),
    ("rated_voltage", "active_power"),
)
"""Sets of data that tell a winding's resistance. What its inductance needs beyond them is told where it is needed."""


class Resistor(Entry):
    """A resistance that does not change with temperature."""

    resistance: f.Resistance


class Capacitor(Entry):
    """A capacitance without loss."""

    capacitance: f.Capacitance
    rated_voltage: f.Voltage | None = None
    discharge_resistance: f.Resistance | None = Field(default=None, description="Resistor that stays across the capacitor.")


class Impedance(Entry):
    """A resistance and a reactance in series, given at the supply's nominal frequency."""

    resistance: f.Resistance
    reactance: f.Reactance


class Motor(Entry):
    """A motor by its plate: constant power while it runs, constant impedance while it starts."""

    shaft_power: f.ActivePower | None = None
    efficiency: f.Share | None = None
    current: f.Current | None = Field(default=None, description="Rated current; of a line, on three phases.")
    power_factor: f.Share | None = Field(default=None, description="At rated load, lagging.")
    rated_voltage: f.Voltage | None = Field(default=None, description="Between lines, on three phases.")
    starting_ratio: f.Share | None = Field(default=None, description="Locked-rotor over rated current at rated voltage.")
    starting_power_factor: f.Share | None = None

    @model_validator(mode="after")
    def _a_sufficient_set(self) -> Motor:
        for name in ("efficiency", "power_factor", "starting_power_factor"):
            share = getattr(self, name)
            if share is not None and share.high > 1.0:
                raise PydanticCustomError(
                    "nameplate", "{what}", {"what": f"{name} reads {share.text}, above 1", "accepted": "up to 1, or up to 100 %"}
                )
        given = {name for name in type(self).model_fields if getattr(self, name) is not None}
        sets = (("shaft_power", "efficiency", "power_factor"), ("rated_voltage", "current", "power_factor"))
        if not any(set(wanted) <= given for wanted in sets):
            raise PydanticCustomError(
                "nameplate", "{what}", {"what": "the plate does not tell what the motor takes",
                                        "accepted": "; ".join(", ".join(wanted) for wanted in sets)},
            )
        return self


CORE_KINDS: Mapping[str, type[BaseModel]] = {
    "coil": Coil,
    "resistor": Resistor,
    "capacitor": Capacitor,
    "impedance": Impedance,
    "motor": Motor,
    "transformer": Transformer,
    "ballast": Ballast,
}

COMPOSED = ("series", "parallel")


class LoadEntry(Entry):
    """Exactly one kind of load, or a list of loads in `series` or in `parallel`."""

    name: str = Field(default="", max_length=80, description="What a person calls this part.")
    count: int = Field(default=1, ge=1, le=1000, description="How many of it stand in parallel.")

    @model_validator(mode="after")
    def _exactly_one_kind(self) -> LoadEntry:
        kinds = [name for name in type(self).model_fields if name not in ("name", "count")]
        given = [name for name in kinds if getattr(self, name) is not None]
        if len(given) != 1:
            what = f"a load of {len(given)} kinds ({', '.join(given)})" if given else "a load of no kind"
            raise PydanticCustomError("kind", "{what}", {"what": what, "accepted": f"one of {', '.join(kinds)}"})
        return self

    @property
    def kind(self) -> str:
        """The one kind that is given."""
        for name in type(self).model_fields:
            if name not in ("name", "count") and getattr(self, name) is not None:
                return name
        raise AssertionError("a validated load has a kind")

    @property
    def part(self) -> Any:
        """What stands under the kind: a model, or a list of loads."""
        return getattr(self, self.kind)


class DocumentEntry(Entry):
    """A file of a definition."""

    format: Literal["1"] = Field(description="Version of the file format.")
    title: str = ""
    ruleset: str | None = Field(default=None, description="Name of the ruleset the definition is written for.")
    supplies: dict[str, Supply] = Field(default_factory=dict)
    boards: dict[str, Board] = Field(default_factory=dict)
    concessions: list[Concession] = Field(default_factory=list)


def document_model(kinds: Mapping[str, type[BaseModel]]) -> type[DocumentEntry]:
    """The model of a file that knows the given load kinds beside `series` and `parallel`."""
    return _document_model(tuple(sorted(kinds.items(), key=lambda item: item[0])))


@lru_cache(maxsize=16)
def _document_model(kinds: tuple[tuple[str, type[BaseModel]], ...]) -> type[DocumentEntry]:
    parts: dict[str, Any] = {name: (model | None, None) for name, model in kinds}
    several: Any = ("list[Load] | None", Field(default=None, min_length=1, max_length=200))
    load = create_model("Load", __base__=LoadEntry, **parts, series=several, parallel=several)
    load.model_rebuild(_types_namespace={"Load": load})
    circuit = create_model("Circuit", __base__=CircuitEntry, load=(load, Field(description="What the circuit serves.")))
    circuits = Annotated[list[circuit], OneOrMany]  # type: ignore[valid-type]
    return create_model("Document", __base__=DocumentEntry, circuits=(circuits, Field(default_factory=list)))
