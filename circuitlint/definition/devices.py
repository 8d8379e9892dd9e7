"""Loads known by what they take as a whole: a transformer with what hangs on it, a lamp on its choke."""

from __future__ import annotations

from pydantic import Field, model_validator
from pydantic_core import PydanticCustomError

from circuitlint.definition import fields as f
from circuitlint.definition.fields import Entry


class Transformer(Entry):
    """A single-phase transformer with its load, as the line sees it: the demand while coils hold, and while they pull in."""

    rated_apparent_power: f.ApparentPower | None = Field(default=None, description="What the transformer is rated for.")
    apparent_power: f.ApparentPower = Field(description="Demand at rated voltage with the coils holding (sealed).")
    power_factor: f.Share = Field(description="Power factor of that demand, lagging.")
    inrush_apparent_power: f.ApparentPower | None = Field(
        default=None, description="Demand at rated voltage while the coils that pull in together do so."
    )
    inrush_power_factor: f.Share | None = Field(default=None, description="Power factor of that demand, lagging.")
    rated_voltage: f.Voltage | None = Field(default=None, description="Primary voltage the demand is stated at.")
    rated_frequency: f.Frequency | None = None

    @model_validator(mode="after")
    def _possible_factors(self) -> Transformer:
        for factor in (self.power_factor, self.inrush_power_factor):
            if factor is not None and factor.high > 1.0:
                raise _fault("a power factor above 1", "up to 1, with its tolerance")
        if (self.inrush_apparent_power is None) != (self.inrush_power_factor is None):
            raise _fault("half of the inrush demand", "inrush_apparent_power and inrush_power_factor together")
        return self


class Ballast(Entry):
    """A discharge lamp on its choke, by the plate; the lamp stands for a resistance at its running current."""

    current: f.Current = Field(description="Current of lamp and choke, running.")
    loss: f.ActivePower = Field(description="Power lost in the choke at that current.")
    choke_voltage: f.Voltage | None = Field(default=None, description="Voltage across the choke at that current.")
    rated_voltage: f.Voltage | None = Field(default=None, description="Voltage of the supply at that current.")
    lamp_power: f.ActivePower | None = Field(default=None, description="Power of the lamp at that current.")
    lamp_voltage: f.Voltage | None = Field(default=None, description="Voltage across the lamp at that current.")
    rated_frequency: f.Frequency | None = None

    @model_validator(mode="after")
    def _a_sufficient_set(self) -> Ballast:
        lamp = (self.lamp_power is not None) + (self.lamp_voltage is not None)
        choke = (self.choke_voltage is not None) + (self.rated_voltage is not None)
        if lamp != 1 or choke != 1:
            raise _fault("a plate that does not tell the lamp and the choke once each",
                         "lamp_power or lamp_voltage; and choke_voltage or rated_voltage")
        return self


def _fault(what: str, accepted: str) -> PydanticCustomError:
    return PydanticCustomError("nameplate", "{what}", {"what": what, "accepted": accepted})
