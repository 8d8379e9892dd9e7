"""The record of readings as JSON, and back unchanged."""

from __future__ import annotations

import json
from typing import Any

from pydantic import ValidationError

from circuitlint.errors import RecordError
from circuitlint.readings.record import ReadingsRecord


def render(record: ReadingsRecord) -> str:
    """The record as JSON. Raises RecordError where a number in it is not finite."""
    try:
        return json.dumps(record.model_dump(mode="json"), indent=2, ensure_ascii=False, allow_nan=False) + "\n"
    except ValueError:
        raise RecordError("the record holds a number that is not finite") from None


def load(content: bytes) -> ReadingsRecord:
    """The record that `render` wrote. Raises RecordError for anything else."""
    try:
        return ReadingsRecord.model_validate_json(content)
    except (ValidationError, UnicodeDecodeError) as error:
        raise RecordError(f"this is no record of readings: {str(error).splitlines()[0]}") from None


def schema() -> dict[str, Any]:
    """JSON Schema of the record."""
    return ReadingsRecord.model_json_schema()
