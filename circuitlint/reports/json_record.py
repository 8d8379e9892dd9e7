"""The record as JSON, whole, and back; and the schema of that JSON.

One line for each entry of a top-level list: quick to write and to read, small, and a change under version control shows
as the lines of the circuits it touched. Numbers are written in the fewest digits that read back as the same number.
"""

from __future__ import annotations

import json
import math
import re
from collections.abc import Iterable, Iterator, Mapping
from typing import Any

from pydantic import BaseModel, ValidationError
from pydantic_core import from_json, to_json

from circuitlint.errors import RecordError
from circuitlint.reports.terminal import printable
from circuitlint.review.record import RECORD_FORMAT, Check, Record
from circuitlint.si import DIMENSIONS

DIALECT = "https://json-schema.org/draft/2020-12/schema"
TITLE = "Review record of inductive circuits"
MOST_FAULTS = 10

# Unicode categories Cc, Cf, Zl and Zp beyond the characters that JSON escapes of itself.
_UNSEEN = re.compile(
    "[\x7f-\x9f\xad\u0600-\u0605\u061c\u06dd\u070f\u0890\u0891\u08e2\u180e\u200b-\u200f\u2028-\u202e\u2060-\u206f\ufeff"
    "\ufff9-\ufffb\U000110bd\U000110cd\U00013430-\U00013438\U0001bca0-\U0001bca3\U0001d173-\U0001d17a"
    "\U000e0000-\U000e007f]"
)


def render(record: Record) -> str:
    """The record as JSON text ending in a newline.

    Raises RecordError where a number is not finite: JSON has no word for it, and null would read as `nothing to tell`.
    """
    astray = next(_not_finite(record), None)
    if astray is not None:
        raise RecordError(f"the record cannot be written as JSON: {astray} is not a finite number")
    entries = (f"{_compact(name)}:{_entry(getattr(record, name))}" for name in type(record).model_fields)
    return "{" + ",\n".join(entries) + "}\n"


def unseen_escaped(text: str) -> str:
    """JSON text with characters that steer a terminal or a reader written as escapes; it reads back as the same."""
    return _UNSEEN.sub(lambda match: json.dumps(match[0])[1:-1], text)


def _entry(value: Any) -> str:
    if isinstance(value, tuple) and value and isinstance(value[0], BaseModel):
        return "[\n" + ",\n".join(map(_compact, value)) + "\n]"
    if isinstance(value, Mapping) and value:
        return "{\n" + ",\n".join(f"{_compact(key)}:{_compact(each)}" for key, each in value.items()) + "\n}"
    return _compact(value)


def _compact(value: Any) -> str:
    made = to_json(value).decode("utf-8")
    return made if made.isprintable() else unseen_escaped(made)


def load(text: str | bytes) -> Record:
    """The record in a JSON text. Raises RecordError that says what was read and what would be accepted."""
    try:
        record = Record.model_validate_json(text, strict=True)
    except ValidationError as error:
        raise RecordError(_complaint(text, error)) from None
    except (UnicodeError, RecursionError, ValueError) as error:
        raise RecordError(f"not a review record: {error}; accepted: the JSON report of a review") from None
    faults = [*_not_finite_told(record), *_loose_ends(record)]
    if faults:
        raise RecordError(_several(faults))
    return record


def _complaint(text: str | bytes, error: ValidationError) -> str:
    details = error.errors(include_url=False, include_context=False, include_input=True)
    if details[0]["type"] == "json_invalid":
        return f"not a review record: {details[0]['msg']}; accepted: the JSON report of a review"
    read = from_json(text)
    if not isinstance(read, dict) or "format" not in read:
        return "not a review record: it names no `format`; accepted: the JSON report of a review"
    if read["format"] != RECORD_FORMAT:
        return f"a record of format {_brief(read['format'])}; accepted: format {RECORD_FORMAT}"
    return _several([f"{_path(one['loc'])}: {_what(one['type'], one['msg'], one['input'])}" for one in details])


def _what(kind: str, message: str, given: Any) -> str:
    if kind == "missing":
        return "is missing"
    if kind == "extra_forbidden":
        return "is no part of a record"
    return f"{message[:1].lower()}{message[1:].replace('Input', 'it')}, not {_brief(given)}"


def _brief(value: Any) -> str:
    shown = printable(repr(value))
    return shown if len(shown) <= 60 else shown[:59] + "…"


def _path(steps: Iterable[int | str]) -> str:
    path = ""
    for step in steps:
        path += f"[{step}]" if isinstance(step, int) else f".{printable(step)}" if path else printable(step)
    return path


def _several(faults: list[str]) -> str:
    shown = faults[:MOST_FAULTS]
    if len(faults) > MOST_FAULTS:
        shown.append(f"and {len(faults) - MOST_FAULTS} more")
    return "the review record has faults\n" + "\n".join(f"    {fault}" for fault in shown)


def _not_finite_told(record: Record) -> Iterator[str]:
    return (f"{path}: is not a finite number" for path in _not_finite(record))


def _not_finite(value: Any, path: str = "") -> Iterator[str]:
    """Paths of numbers that are not finite, below a part of the record."""
    kind = type(value)
    if kind is float:
        if not math.isfinite(value):
            yield path
    elif kind is tuple:
        for index, each in enumerate(value):
            if type(each) is not str:
                yield from _not_finite(each, f"{path}[{index}]")
    elif issubclass(kind, BaseModel):
        for name in _numeric(kind):
            each = getattr(value, name)
            if type(each) is float:
                if not math.isfinite(each):
                    yield f"{path}.{name}".lstrip(".")
            elif each is not None and each != ():
                yield from _not_finite(each, f"{path}.{name}".lstrip("."))


_NUMERIC: dict[type[BaseModel], tuple[str, ...]] = {}


def _numeric(kind: type[BaseModel]) -> tuple[str, ...]:
    """Names of the fields of a model that hold numbers, themselves or further down."""
    found = _NUMERIC.get(kind)
    if found is None:
        _NUMERIC[kind] = ()
        found = tuple(name for name, field in kind.model_fields.items() if _holds_numbers(field.annotation))
        _NUMERIC[kind] = found
    return found


def _holds_numbers(annotation: Any) -> bool:
    if annotation is float:
        return True
    if isinstance(annotation, type) and issubclass(annotation, BaseModel):
        return bool(_numeric(annotation))
    return any(map(_holds_numbers, getattr(annotation, "__args__", ())))


def _loose_ends(record: Record) -> Iterator[str]:
    """Names a part of the record refers to and no other part gives."""
    checks: dict[str, set[str]] = {}
    for number, circuit in enumerate(record.circuits):
        at = f"circuits[{number}]"
        checks.setdefault(circuit.tag, set()).update(check.id for check in circuit.checks)
        for index, figure in enumerate(circuit.figures):
            if figure.formula:
                yield from _known(f"{at}.figures[{index}].formula", figure.formula, record.formulas)
            yield from _known(f"{at}.figures[{index}].dimension", figure.dimension, DIMENSIONS)
            for each, put_in in enumerate(figure.inputs):
                yield from _known(f"{at}.figures[{index}].inputs[{each}].dimension", put_in.dimension, DIMENSIONS)
        for key in circuit.cautions:
            yield from _known(f"{at}.cautions", key, record.cautions)
        for index, check in enumerate(circuit.checks):
            yield from _loose_check(record, check, f"{at}.checks[{index}]")
    for key, formula in record.formulas.items():
        yield from _known(f"formulas.{printable(key)}.source", formula.source, record.sources)
        yield from _known(f"formulas.{printable(key)}.dimension", formula.dimension, DIMENSIONS)
    for index, limit in enumerate(record.ruleset.limits):
        yield from _known(f"ruleset.limits[{index}].source", limit.source, record.sources)
        yield from _known(f"ruleset.limits[{index}].dimension", limit.dimension, DIMENSIONS)
    for index, finding in enumerate(record.findings):
        yield from _known(f"findings[{index}].check", finding.check, checks.get(finding.tag, ()))


def _loose_check(record: Record, check: Check, at: str) -> Iterator[str]:
    if check.dimension:
        yield from _known(f"{at}.dimension", check.dimension, DIMENSIONS)
    if check.limit is not None:
        yield from _known(f"{at}.limit.source", check.limit.source, record.sources)
        yield from _known(f"{at}.limit.dimension", check.limit.dimension, DIMENSIONS)
    if check.concession is not None and not 0 <= check.concession < len(record.concessions):
        yield f"{at}.concession: there is no concession {check.concession}, only {len(record.concessions)}"


def _known(at: str, name: str, names: Iterable[str]) -> Iterator[str]:
    if name not in names:
        yield f"{at}: {_brief(name)} is nowhere in the record"


def schema() -> dict[str, Any]:
    """The JSON Schema (draft 2020-12) of what `render` writes, with a description of every field."""
    made: dict[str, Any] = Record.model_json_schema(mode="serialization")
    return {"$schema": DIALECT, **made, "title": TITLE}
