"""Load kinds every definition knows, and the model of a file, which plugins widen with kinds of their own."""

from __future__ import annotations

from collections.abc import Mapping
from functools import lru_cache
from typing import Annotated, Any, Literal

from pydantic import BaseModel, Field, create_model, model_validator
from pydantic_core import PydanticCustomError

from circuitlint.definition import fields as f
from circuitlint.definition.fields import Entry, OneOrMany
from circuitlint.definition.models import CircuitEntry, Concession, Material, Supply


class Gap(Entry):
    """A coil with its armature held open: what changes against the closed gap."""

    inductance: f.Inductance | None = None
    reactance: f.Reactance | None = None
    impedance: f.Resistance | None = None
    current: f.Current | None = None
    apparent_power: f.ApparentPower | None = None


class Coil(Entry):
    """A winding: resistance and inductance in series. Any sufficient set of its nameplate will do.

    Sufficient sets: resistance with inductance, reactance or impedance; impedance with power factor.
    """

    resistance: f.Resistance | None = Field(default=None, description="Direct-current resistance of the winding.")
    resistance_at: f.Temperature | None = Field(default=None, description="Temperature of that resistance; 20 degC if not said.")
    inductance: f.Inductance | None = None
    reactance: f.Reactance | None = Field(default=None, description="Reactance at the rated frequency.")
    impedance: f.Resistance | None = Field(default=None, description="Impedance at the rated frequency.")
    power_factor: f.Share | None = Field(default=None, description="Power factor of the coil alone, lagging.")
    armature: Literal["none", "moving"] | None = Field(
        default=None, description="`none` for a choke whose inductance is the same at switch-on."
    )
    open_gap: Gap | None = Field(default=None, description="The coil with its armature open, as at switch-on.")
    winding: Material = "copper"
    rated_voltage: f.Voltage | None = None
    rated_frequency: f.Frequency | None = None
    temperature_rise: f.TemperatureRise | None = Field(default=None, description="Mean winding rise at rated conditions.")
    thermal_resistance: f.ThermalResistance | None = Field(default=None, description="Mean winding rise per watt of loss.")

    @model_validator(mode="after")
    def _a_sufficient_set(self) -> Coil:
        given = {name for name in COIL_NAMEPLATE if getattr(self, name) is not None}
        if not any(set(wanted) <= given for wanted in SUFFICIENT):
            sets = "; ".join(" and ".join(wanted) for wanted in SUFFICIENT)
            told = ", ".join(sorted(given)) or "nothing"
            raise PydanticCustomError(
                "nameplate", "{what}", {"what": f"{told} is not enough to know the winding", "accepted": sets}
            )
        return self


COIL_NAMEPLATE = ("resistance", "inductance", "reactance", "impedance", "power_factor")
SUFFICIENT: tuple[tuple[str, ...], ...] = (
    ("resistance", "inductance"),
    ("resistance", "reactance"),
    ("resistance", "impedance"),
    ("impedance", "power_factor"),
)


class Resistor(Entry):
    """A resistance that does not change with temperature."""

    resistance: f.Resistance


class Capacitor(Entry):
    """A capacitance without loss."""

    capacitance: f.Capacitance
    rated_voltage: f.Voltage | None = None


class Impedance(Entry):
    """A resistance and a reactance in series, given at the supply's nominal frequency."""

    resistance: f.Resistance
    reactance: f.Reactance


CORE_KINDS: Mapping[str, type[BaseModel]] = {
    "coil": Coil,
    "resistor": Resistor,
    "capacitor": Capacitor,
    "impedance": Impedance,
}

COMPOSED = ("series", "parallel")


class LoadEntry(Entry):
    """Exactly one kind of load, or a list of loads in `series` or in `parallel`."""

    name: str = Field(default="", max_length=80, description="What a person calls this part.")

    @model_validator(mode="after")
    def _exactly_one_kind(self) -> LoadEntry:
        kinds = [name for name in type(self).model_fields if name != "name"]
        given = [name for name in kinds if getattr(self, name) is not None]
        if len(given) != 1:
            what = f"a load of {len(given)} kinds ({', '.join(given)})" if given else "a load of no kind"
            raise PydanticCustomError("kind", "{what}", {"what": what, "accepted": f"one of {', '.join(kinds)}"})
        return self

    @property
    def kind(self) -> str:
        """The one kind that is given."""
        for name in type(self).model_fields:
            if name != "name" and getattr(self, name) is not None:
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
