"""Field types of a definition: text in, quantities out, and what an editor's schema says of them."""

from __future__ import annotations

from typing import Annotated, Any, TypeAlias

from pydantic import BaseModel, BeforeValidator, ConfigDict, Field, GetCoreSchemaHandler, GetJsonSchemaHandler
from pydantic_core import CoreSchema, PydanticCustomError, core_schema

from circuitlint import si
from circuitlint.errors import QuantityError
from circuitlint.quantity import Quantity, read


class Read:
    """Pydantic marker: the text is read as a quantity of one dimension."""

    def __init__(self, dimension: si.Dimension) -> None:
        self.dimension = dimension

    def __get_pydantic_core_schema__(self, source: Any, handler: GetCoreSchemaHandler) -> CoreSchema:
        dimension = self.dimension

        def validate(value: Any) -> Quantity:
            if isinstance(value, Quantity):
                return value
            try:
                return read(value, dimension)
            except QuantityError as error:
                raise PydanticCustomError("quantity", "{what}", {"what": error.what, "accepted": error.accepted}) from None

        return core_schema.no_info_plain_validator_function(
            validate, serialization=core_schema.plain_serializer_function_ser_schema(lambda quantity: quantity.text)
        )

    def __get_pydantic_json_schema__(self, schema: CoreSchema, handler: GetJsonSchemaHandler) -> dict[str, Any]:
        return {
            "type": "string",
            "description": f"A {self.dimension.name} with its unit, with or without a tolerance.",
            "examples": list(self.dimension.examples),
        }


Resistance: TypeAlias = Annotated[Quantity, Read(si.RESISTANCE)]
Reactance: TypeAlias = Annotated[Quantity, Read(si.REACTANCE)]
Inductance: TypeAlias = Annotated[Quantity, Read(si.INDUCTANCE)]
Capacitance: TypeAlias = Annotated[Quantity, Read(si.CAPACITANCE)]
Voltage: TypeAlias = Annotated[Quantity, Read(si.VOLTAGE)]
Current: TypeAlias = Annotated[Quantity, Read(si.CURRENT)]
Frequency: TypeAlias = Annotated[Quantity, Read(si.FREQUENCY)]
ActivePower: TypeAlias = Annotated[Quantity, Read(si.ACTIVE_POWER)]
ReactivePower: TypeAlias = Annotated[Quantity, Read(si.REACTIVE_POWER)]
ApparentPower: TypeAlias = Annotated[Quantity, Read(si.APPARENT_POWER)]
Energy: TypeAlias = Annotated[Quantity, Read(si.ENERGY)]
Length: TypeAlias = Annotated[Quantity, Read(si.LENGTH)]
Section: TypeAlias = Annotated[Quantity, Read(si.AREA)]
Time: TypeAlias = Annotated[Quantity, Read(si.TIME)]
Temperature: TypeAlias = Annotated[Quantity, Read(si.TEMPERATURE)]
TemperatureRise: TypeAlias = Annotated[Quantity, Read(si.TEMPERATURE_RISE)]
ThermalResistance: TypeAlias = Annotated[Quantity, Read(si.THERMAL_RESISTANCE)]
Angle: TypeAlias = Annotated[Quantity, Read(si.ANGLE)]
Share: TypeAlias = Annotated[Quantity, Read(si.RATIO)]
ResistancePerLength: TypeAlias = Annotated[Quantity, Read(si.RESISTANCE_PER_LENGTH)]
CapacitancePerLength: TypeAlias = Annotated[Quantity, Read(si.CAPACITANCE_PER_LENGTH)]
LetThrough: TypeAlias = Annotated[Quantity, Read(si.LET_THROUGH)]

Count: TypeAlias = Annotated[int, Field(ge=1, le=1000)]


def _one_or_many(value: Any) -> Any:
    return [value] if isinstance(value, dict) else value


OneOrMany = BeforeValidator(_one_or_many)
"""A single mapping may stand where a list of them is wanted."""


class Entry(BaseModel):
    """Base of every entry of a definition: unchangeable, closed to unknown keys."""

    model_config = ConfigDict(frozen=True, extra="forbid", arbitrary_types_allowed=True, protected_namespaces=())
