"""The record as JSON: whole, the same bytes every time, back again unchanged; nothing else is taken for a record."""

from __future__ import annotations

import json
import math
from collections.abc import Iterator
from typing import Any

import jsonschema
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from circuitlint.errors import RecordError
from circuitlint.reports import kinds
from circuitlint.reports.json_record import load, render, schema
from circuitlint.review import record as r
from tests.reports.arbitrary import records as any_record
from tests.reports.arbitrary import steers
from tests.reports.building import circuit, figures, record
from tests.reports.records import clear, hostile, mixed

RECORDS = {"mixed": mixed(), "clear": clear(3), "hostile": hostile(), "empty": record(())}


def refuse(word: str) -> float:
    raise AssertionError(f"{word} is no word of JSON")


def strictly(text: str) -> Any:
    """Read by the letter of RFC 8259: no NaN, no Infinity, no key twice."""

    def once(pairs: list[tuple[str, Any]]) -> dict[str, Any]:
        assert len({key for key, _ in pairs}) == len(pairs)
        return dict(pairs)

    return json.loads(text, parse_constant=refuse, object_pairs_hook=once)


@pytest.mark.parametrize("name", RECORDS)
def test_a_record_is_valid_against_its_own_schema(name: str) -> None:
    jsonschema.validate(strictly(render(RECORDS[name])), schema(), cls=jsonschema.Draft202012Validator)


@pytest.mark.parametrize("kind", kinds.KINDS)
@pytest.mark.parametrize("name", RECORDS)
def test_every_report_of_a_stored_record_is_the_report_of_the_review_byte_for_byte(name: str, kind: str) -> None:
    again = load(render(RECORDS[name]))
    assert again == RECORDS[name]
    assert kinds.render(kind, again) == kinds.render(kind, RECORDS[name])


@settings(max_examples=100)
@given(any_record())
def test_any_record_survives_the_way_there_and_back(one: r.Record) -> None:
    # Findings name checks by tag and id, which arbitrary circuits may share; that alone is mended here.
    text = render(one)
    strictly(text)
    again = load(text)
    assert again == one
    assert render(again) == text
    assert kinds.render("sarif", again) == kinds.render("sarif", one)
    assert kinds.render("text", again) == kinds.render("text", one)


@given(st.floats(allow_nan=False, allow_infinity=False))
def test_a_number_reads_back_as_the_same_number_to_the_last_bit(value: float) -> None:
    made = record((circuit("=F1", "valve", (), figures=(figures()[0].model_copy(update={"nominal": value}),)),))
    again = load(render(made)).circuits[0].figures[0].nominal
    assert again == value
    assert math.copysign(1.0, again) == math.copysign(1.0, value)


@pytest.mark.parametrize("value", [math.nan, math.inf, -math.inf])
def test_a_number_that_is_not_finite_is_refused_with_its_place(value: float) -> None:
    astray = figures()[1].model_copy(update={"highest": value})
    made = record((circuit("=F1", "valve", (), figures=(figures()[0], astray)),))
    for kind in ("json",):
        with pytest.raises(RecordError, match=r"circuits\[0\]\.figures\[1\]\.highest is not a finite number"):
            kinds.render(kind, made)
    point = r.Region(of="", state="", across="a", up="b", points=((0.0, value),))
    with pytest.raises(RecordError, match=r"regions\[0\]\.points\[0\]\[1\]"):
        render(record((circuit("=F1", "valve", (), regions=(point,)),)))


def test_a_change_of_one_circuit_touches_one_line() -> None:
    one, other = clear(50), clear(50)
    changed = other.circuits[7].model_copy(update={"serves": "something else"})
    other = other.model_copy(update={"circuits": (*other.circuits[:7], changed, *other.circuits[8:])})
    before, after = render(one).splitlines(), render(other).splitlines()
    assert len(before) == len(after)
    assert sum(a != b for a, b in zip(before, after, strict=True)) == 1


def test_hostile_text_reads_back_and_steers_no_terminal_on_the_way() -> None:
    text = render(hostile())
    assert not any(map(steers, text))
    assert load(text).title == hostile().title


def _fields(node: Any, at: str = "record") -> Iterator[tuple[str, dict[str, Any]]]:
    for name, field in node.get("properties", {}).items():
        yield f"{at}.{name}", field


def test_the_schema_describes_every_field_and_names_its_dialect() -> None:
    made = schema()
    assert made["$schema"] == "https://json-schema.org/draft/2020-12/schema"
    jsonschema.Draft202012Validator.check_schema(made)
    fields = dict(_fields(made))
    for name, definition in made["$defs"].items():
        fields |= dict(_fields(definition, name))
    assert len(fields) > 100
    assert [at for at, field in fields.items() if not field.get("description", "").strip()] == []


def altered(path: str, value: Any) -> str:
    """The mixed record's JSON with one thing put in; `...` takes it out."""
    read = json.loads(render(RECORDS["mixed"]))
    *steps, last = [int(step) if step.isdigit() else step for step in path.split("/")]
    node = read
    for step in steps:
        node = node[step]
    if value is ...:
        del node[last]
    else:
        node[last] = value
    return json.dumps(read)


BAD: dict[str, tuple[str | bytes, str]] = {
    "nothing": ("", r"not a review record: .*accepted: the JSON report of a review"),
    "another text": ("format: 1\ntitle: x\n", r"not a review record"),
    "half a record": (render(mixed())[:5000], r"not a review record"),
    "bytes of another encoding": (render(mixed()).encode("utf-16"), r"not a review record"),
    "another JSON": ('{"circuits": []}', r"it names no `format`"),
    "a list": ("[1, 2]", r"it names no `format`"),
    "a later format": (altered("format", 2), r"a record of format 2; accepted: format 1"),
    "a field missing": (altered("ruleset/sha256", ...), r"ruleset\.sha256: is missing"),
    "a field nobody knows": (altered("circuits/1/colour", "red"), r"circuits\[1\]\.colour: is no part of a record"),
    "a number in quotes": (altered("circuits/1/checks/0/worst", "0.2"), r"checks\[0\]\.worst: .*number.*not '0.2'"),
    "a word that is none of the results": (altered("circuits/1/checks/0/result", "ok"), r"conforming'.*not 'ok'"),
    "not a number": (altered("circuits/1/checks/0/worst", math.nan), r"checks\[0\]\.worst: is not a finite number"),
    "too large a number": (render(mixed()).replace("0.1654", "1e999"), r"worst: is not a finite number"),
    "a formula nobody gives": (altered("circuits/1/figures/2/formula", "Ohm"), r"formula: 'Ohm' is nowhere"),
    "a dimension nobody knows": (altered("circuits/1/figures/2/dimension", "length of a furlong"), r"is nowhere"),
    "a source nobody gives": (altered("ruleset/limits/0/source", "hearsay"), r"source: 'hearsay' is nowhere"),
    "a caution nobody words": (altered("circuits/1/cautions", ["beware"]), r"cautions: 'beware' is nowhere"),
    "a finding of no check": (altered("findings/0/check", "none"), r"findings\[0\]\.check: 'none' is nowhere"),
    "a concession beyond the list": (altered("circuits/1/checks/0/concession", 7), r"there is no concession 7, only 2"),
    "deep nesting": ("[" * 200_000, r"not a review record"),
    "deep nesting inside": ('{"format":1,"circuits":' + "[" * 200_000, r"not a review record"),
}  # fmt: skip


@pytest.mark.parametrize("what", BAD)
def test_what_is_no_record_is_refused_in_words(what: str) -> None:
    text, told = BAD[what]
    with pytest.raises(RecordError, match=f"(?s){told}") as caught:
        load(text)
    message = str(caught.value)
    assert "pydantic" not in message
    assert "Traceback" not in message
    assert len(message) < 3000
    assert all(character.isprintable() or character == "\n" for character in message)


def test_many_faults_are_told_together_and_the_rest_counted() -> None:
    read = json.loads(render(RECORDS["mixed"]))
    for one in read["circuits"]:
        for check in one["checks"]:
            del check["what"]
    with pytest.raises(RecordError, match=r"(?s)checks\[0\]\.what: is missing.*and \d+ more"):
        load(json.dumps(read))


def test_a_tree_as_deep_as_a_definition_may_be_survives() -> None:
    element = r.Element(of="load", kind="coil")
    for _ in range(40):
        element = r.Element(of="load", kind="series", parts=(element,))
    made = record((circuit("=F1", "valve", (), tree=element),))
    assert load(render(made)) == made
