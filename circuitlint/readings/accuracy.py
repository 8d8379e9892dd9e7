"""`± (0.8 % + 3)`: an instrument's accuracy as its data sheet states it."""

from __future__ import annotations

import re
from dataclasses import dataclass
from typing import Any

from pydantic import GetCoreSchemaHandler, GetJsonSchemaHandler
from pydantic_core import CoreSchema, PydanticCustomError, core_schema

from circuitlint.sources import Source

ACCURACY = Source("meter specification primer", "accuracy as share of the reading plus digits")
ACCEPTED = "`± (0.8 % + 3)` with 3 digits of the last place, `± 0.5 %`, or `± 2 digits`"
_NUMBER = r"(?:\d+(?:\.\d*)?|\.\d+)"
_FORM = re.compile(
    rf"(?:±|\+/-)\s*(?P<open>\()?\s*(?:(?P<share>{_NUMBER})\s*%)?\s*(?P<plus>\+)?\s*"
    rf"(?:(?P<digits>{_NUMBER})\s*(?P<word>digits?|d|counts?)?)?\s*(?P<close>\))?"
)


@dataclass(frozen=True, slots=True)
class Accuracy:
    """Largest error an instrument states: a share of the reading and a number of last-place digits."""

    share: float
    digits: float
    text: str

    def half_width(self, reading: float, resolution: float) -> float:
        """Half-width of the interval about a reading, in the unit of the reading: p · |reading| + n · resolution."""
        return self.share * abs(reading) + self.digits * resolution

    @classmethod
    def read(cls, text: str) -> Accuracy:
        """Read an accuracy as text. Raises ValueError with what is wrong."""
        found = _FORM.fullmatch(" ".join(text.split()))
        if found is None:
            why = ": a decimal comma is not accepted" if re.search(r"\d,\d", text) else ""
            raise ValueError(f"{text[:60]!r} is not an accuracy{why}")
        share, digits = found["share"], found["digits"]
        if bool(found["open"]) != bool(found["close"]) or (share is None and digits is None):
            raise ValueError(f"{text[:60]!r} is not an accuracy")
        both = share is not None and digits is not None
        if bool(found["plus"]) != both or (share is None and not found["word"]):
            raise ValueError(f"{text[:60]!r} does not say what is a share and what are digits")
        stated = cls(float(share or 0.0) / 100.0, float(digits or 0.0), " ".join(text.split()))
        if stated.share >= 1.0 or stated.digits > 1e5:
            raise ValueError(f"{text[:60]!r} is not a believable accuracy")
        if stated.share == 0.0 and stated.digits == 0.0:
            raise ValueError(f"{text[:60]!r} states an instrument without any error")
        return stated


class ReadAccuracy:
    """Pydantic marker: the text is read as an accuracy."""

    def __get_pydantic_core_schema__(self, source: Any, handler: GetCoreSchemaHandler) -> CoreSchema:
        def validate(value: Any) -> Accuracy:
            if isinstance(value, Accuracy):
                return value
            if not isinstance(value, str):
                raise PydanticCustomError("accuracy", "{what}", {"what": "an accuracy must be text", "accepted": ACCEPTED})
            try:
                return Accuracy.read(value)
            except ValueError as error:
                raise PydanticCustomError("accuracy", "{what}", {"what": str(error), "accepted": ACCEPTED}) from None

        return core_schema.no_info_plain_validator_function(
            validate, serialization=core_schema.plain_serializer_function_ser_schema(lambda one: one.text)
        )

    def __get_pydantic_json_schema__(self, schema: CoreSchema, handler: GetJsonSchemaHandler) -> dict[str, Any]:
        return {"type": "string", "description": "Accuracy as the data sheet states it.",
                "examples": ["± (0.8 % + 3)", "± 0.5 %", "± 2 digits"]}
