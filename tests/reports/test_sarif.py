"""SARIF: what a CI system needs to annotate a change, by the letter of the standard.

Clauses are those of SARIF 2.1.0 (OASIS, 2020; errata 01, 2023). Three readers hold the log against the standard: the
checks below, an independent object model from PyPI, and the OASIS schema itself where a copy is at hand.
"""

from __future__ import annotations

import json
import os
import re
from collections.abc import Iterator
from pathlib import Path
from typing import Any
from urllib.parse import unquote

import jsonschema
import pytest
from hypothesis import given, settings
from pydantic import BaseModel
from sarif_pydantic import Sarif  # type: ignore[import-untyped]

from circuitlint.errors import RecordError
from circuitlint.reports.sarif import FINGERPRINT, fingerprint, render
from circuitlint.reports.sarif_parts import uri
from circuitlint.review import record as r
from tests.reports.arbitrary import records as any_record
from tests.reports.arbitrary import steers
from tests.reports.building import check, circuit, record
from tests.reports.records import clear, hostile, mixed

RECORDS = {"mixed": mixed(), "clear": clear(3), "hostile": hostile(), "empty": record(())}
LOGS: dict[str, Any] = {name: json.loads(render(one)) for name, one in RECORDS.items()}
RUN: Any = LOGS["mixed"]["runs"][0]
# The OASIS schema is not ours to ship: a copy is used where SARIF_SCHEMA names one, or a folder beside the project.
COPY = "reference/sarif-schema-2.1.0.json"
SCHEMAS = [Path(os.environ.get("SARIF_SCHEMA", "nowhere")), *Path(__file__).parents[3].glob(f"*/{COPY}")]


@pytest.mark.parametrize("name", LOGS)
def test_the_log_is_valid_against_every_copy_of_the_schema_at_hand(name: str) -> None:
    for path in SCHEMAS:
        if path.is_file():
            checker = jsonschema.Draft4Validator(json.loads(path.read_text(encoding="utf-8")))
            assert [error.message for error in checker.iter_errors(LOGS[name])] == []
    assert LOGS[name]["version"] == "2.1.0"
    assert LOGS[name]["$schema"].startswith("https://docs.oasis-open.org/sarif/sarif/v2.1.0/")


# What the independent model has no field for; of everything else it must know the name.
UNMODELLED = {"columnKind", "toolExecutionNotifications", "toolConfigurationNotifications", "suppressions"}


def _unknown(value: Any) -> Iterator[str]:
    if isinstance(value, BaseModel):
        yield from value.model_extra or {}
        for name in type(value).model_fields:
            yield from _unknown(getattr(value, name))
    elif isinstance(value, list):
        for each in value:
            yield from _unknown(each)


@pytest.mark.parametrize("name", RECORDS)
def test_an_independent_package_reads_the_log_and_finds_the_same_in_it(name: str) -> None:
    log = Sarif.model_validate_json(render(RECORDS[name]))
    assert set(_unknown(log)) <= UNMODELLED
    run = log.runs[0]
    told = [check for each in RECORDS[name].circuits for check in each.checks if check.severity or check.result != "conforms"]
    assert [result.rule_id for result in run.results or ()] == [check.rule for check in told]
    for result, one in zip(run.results or (), told, strict=True):
        place = (result.locations or [])[0].physical_location
        assert place is not None
        assert place.region is not None
        assert (place.region.start_line, place.region.start_column) == (one.place.line, one.place.column)


def result_of(rule: str, **wanted: str) -> Any:
    found = [one for one in RUN["results"] if one["ruleId"] == rule
             and all(one["properties"].get(name) == value for name, value in wanted.items())]  # fmt: skip
    assert len(found) == 1
    return found[0]


def test_severity_becomes_level_and_what_was_not_assessed_is_open() -> None:
    levels = {(one["properties"]["severity"], one["kind"], one["level"]) for one in RUN["results"]}
    assert levels == {
        ("major", "fail", "error"), ("minor", "fail", "warning"), ("observation", "fail", "note"),
        ("observation", "open", "none"), ("minor", "open", "none"),
    }  # fmt: skip


def test_no_kind_but_fail_has_a_level() -> None:
    """3.27.10: where kind is not `fail`, level is `none`."""
    for log in LOGS.values():
        for one in log["runs"][0]["results"]:
            assert (one["level"] == "none") == (one["kind"] != "fail")


def test_checks_that_conform_with_room_to_spare_are_left_out() -> None:
    assert LOGS["clear"]["runs"][0]["results"] == []
    assert "=R3-Y6" not in {one["properties"]["tag"] for one in RUN["results"]}


def test_rules_have_help_and_each_result_points_to_its_own() -> None:
    rules = RUN["tool"]["driver"]["rules"]
    assert [rule["id"] for rule in rules] == [rule.name for rule in mixed().rules]
    for rule in rules:
        assert "What usually helps" in rule["help"]["text"]
        assert rule["shortDescription"]["text"]
        assert rule["defaultConfiguration"]["level"] == "error"
    for one in RUN["results"]:
        assert rules[one["ruleIndex"]]["id"] == one["ruleId"]


def test_a_result_stands_at_line_and_column_of_the_part_and_knows_its_file() -> None:
    one = result_of("minimum-power-factor", tag="=R3-Y1")
    place = one["locations"][0]["physicalLocation"]
    assert place["region"] == {"startLine": 24, "startColumn": 5}
    artifact = RUN["artifacts"][place["artifactLocation"]["index"]]
    assert artifact["location"]["uri"] == place["artifactLocation"]["uri"] == "slip-3.yaml"
    assert artifact["hashes"] == {"sha-256": "3f" * 32}
    assert RUN["columnKind"] == "unicodeCodePoints"


def test_a_result_carries_figure_limit_and_margin() -> None:
    properties = result_of("meter-range", tag="=R3-Y1", severity="major")["properties"]
    assert properties["nominal"] == 10.95
    assert properties["worst"] == 11.52
    assert properties["limit"] == 10.0
    assert properties["unit"] == "A"
    assert properties["sense"] == "at most"
    assert properties["margin"] == pytest.approx((10.0 - 11.52) / 10.0)


def prints(one: r.Record) -> list[str]:
    return [result["partialFingerprints"][FINGERPRINT] for result in json.loads(render(one))["runs"][0]["results"]]


def test_fingerprints_stay_when_lines_are_inserted_above_and_tell_results_apart() -> None:
    def lower(place: r.Place) -> r.Place:
        return place.model_copy(update={"line": place.line + 20, "path": place.path.replace("circuits[", "circuits[1")})

    moved = mixed().model_copy(update={"circuits": tuple(
        each.model_copy(update={"place": lower(each.place), "checks": tuple(
            one.model_copy(update={"place": lower(one.place)}) for one in each.checks)})
        for each in mixed().circuits)})  # fmt: skip
    assert render(moved) != render(mixed())
    assert prints(moved) == prints(mixed())
    assert len(set(prints(mixed()))) == len(prints(mixed()))


@pytest.mark.parametrize("change", [
    {"rule": "meter-range"}, {"of": "cable[1]"}, {"state": "cold"}, {"id": "voltage-drop|=F1|another"},
])  # fmt: skip
def test_a_fingerprint_changes_with_what_the_result_is_about(change: dict[str, str]) -> None:
    one = check("=F1", "voltage-drop", "voltage-drop-share", "running", 0.06, 0.07, 3, of="cable[0]")
    assert fingerprint("=F1", one) != fingerprint("=F1", one.model_copy(update=change))
    assert fingerprint("=F1", one) != fingerprint("=F2", one)
    assert one.limit is not None
    other = one.limit.model_copy(update={"name": "switch_on"})
    assert fingerprint("=F1", one) != fingerprint("=F1", one.model_copy(update={"limit": other}))
    assert fingerprint("=F1", one) == fingerprint("=F1", one.model_copy(update={"worst": 0.09, "severity": "minor"}))


def test_a_concession_in_force_suppresses_and_says_by_whom_and_why() -> None:
    suppressed = [one for one in RUN["results"] if one["suppressions"]]
    assert [one["properties"]["tag"] for one in suppressed] == ["=R3-Y5"]
    assert suppressed[0]["suppressions"] == [{
        "kind": "external", "status": "accepted",
        "justification": "concession by A. Competent Person until 2027-06-30: short duty",
    }]  # fmt: skip
    # 3.27.23: either every result of a run has the property or none has.
    assert all("suppressions" in one for one in RUN["results"])


def test_an_expired_concession_suppresses_nothing_and_is_notified() -> None:
    expired = mixed().concessions[0].model_copy(update={"state": "expired"})
    run = json.loads(render(mixed().model_copy(update={"concessions": (expired, mixed().concessions[1])})))["runs"][0]
    assert [one for one in run["results"] if one["suppressions"]] == []
    told = [one["message"]["text"] for one in run["invocations"][0]["toolConfigurationNotifications"]]
    assert told == ["concession for =R3-Y5, minimum-power-factor: expired",
                    "concession for =R3-Z9, voltage-drop: matches nothing"]  # fmt: skip


def test_failures_and_gaps_are_notified_and_a_failure_is_no_success() -> None:
    invocation = RUN["invocations"][0]
    assert invocation["executionSuccessful"] is False
    told = [(one["level"], one["message"]["text"]) for one in invocation["toolExecutionNotifications"]]
    assert any(level == "error" and "ZeroDivisionError" in text and "=R3-Y7" in text for level, text in told)
    assert any(level == "error" and "yard_rules" in text for level, text in told)
    assert any(level == "error" and "=R3-Y7: not solved" in text for level, text in told)
    assert any(level == "note" and "cable[0].ambient, cable[0].grouped_circuits" in text for level, text in told)
    assert any(level == "warning" and "=R3-Y2" in text and "cable[0].ambient" in text for level, text in told)
    gaps = [check for each in mixed().circuits for check in each.checks if check.result == "not assessed"]
    assert sum("could not be assessed" in text for _, text in told) == len(gaps)
    assert LOGS["clear"]["runs"][0]["invocations"][0]["executionSuccessful"] is True


def test_the_run_says_who_prevails_and_which_cautions_apply() -> None:
    properties = RUN["properties"]
    assert "prevail" in properties["statement"]
    assert properties["cautions"] == list(mixed().cautions.values())
    assert properties["circuitsHeld"] == ["=R3-Y1", "=R3-Y2"]


def _messages(node: Any) -> Iterator[str]:
    if isinstance(node, dict):
        for name, value in node.items():
            if name == "text" and isinstance(value, str):
                yield value
            yield from _messages(value)
    elif isinstance(node, list):
        for each in node:
            yield from _messages(each)


def test_hostile_text_makes_no_link_no_placeholder_and_no_control_character() -> None:
    text = render(hostile())
    assert not any(map(steers, text))
    messages = list(_messages(LOGS["hostile"]))
    assert any("evil" in message for message in messages)
    for message in messages:
        assert message.isprintable()
        assert "](" not in message, "3.11.6: that would be a link"
        assert re.search(r"(?<!\{)\{\d+\}", message) is None, "3.11.5: that would be a placeholder"


@pytest.mark.parametrize(("file", "wanted"), [
    # RFC 3986: what is reserved is percent-encoded, a colon in a first segment would read as a scheme.
    ("slip-3.yaml", "slip-3.yaml"), ("a folder/b#1.yaml", "a%20folder/b%231.yaml"), ("=R3:1.yaml", "%3DR3%3A1.yaml"),
    ("/srv/slip.yaml", "file:///srv/slip.yaml"), ("größe.yaml", "gr%C3%B6%C3%9Fe.yaml"), ("a\\b.yaml", "a/b.yaml"),
    ("-", "-"), ("", "."),
])  # fmt: skip
def test_a_file_name_becomes_a_uri(file: str, wanted: str) -> None:
    assert uri(file) == wanted
    if file and "\\" not in file:
        assert unquote(uri(file)).removeprefix("file://") == file


def test_a_windows_path_becomes_a_uri_with_its_scheme() -> None:
    # RFC 8089, appendix E.2.
    assert uri("C:\\plant\\slip 3.yaml") == "file:///C:/plant/slip%203.yaml"


def test_a_number_that_is_not_finite_is_refused() -> None:
    one = check("=F1", "voltage-drop", "voltage-drop-share", "running", 0.06, 0.07, 3).model_copy(update={"worst": float("nan")})
    with pytest.raises(RecordError, match="SARIF"):
        render(record((circuit("=F1", "valve", (one,)),)))


@settings(max_examples=60)
@given(any_record())
def test_any_record_makes_a_log_that_the_independent_package_reads(one: r.Record) -> None:
    text = render(one)
    assert not any(map(steers, text))
    log = Sarif.model_validate_json(text)
    assert set(_unknown(log)) <= UNMODELLED
    told = [check for each in one.circuits for check in each.checks if check.severity or check.result != "conforms"]
    assert len(log.runs[0].results or ()) == len(told)
