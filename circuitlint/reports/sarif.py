"""The review as SARIF 2.1.0 (OASIS), so that a CI system can annotate the change that brought a finding.

A finding is a result of kind `fail`, its severity the level; what could not be assessed is a result of kind `open` and
a notification, since such results have no level of their own and some readers pass over them. Checks that conform with
room to spare are left out. Fingerprints name rule, tag, part, state and limit, never a line, so they outlive a move
within the file. Clause numbers below are those of the standard.
"""

from __future__ import annotations

import hashlib
import json
import re
from collections.abc import Iterator, Sequence
from typing import Any
from urllib.parse import quote

from circuitlint.errors import RecordError
from circuitlint.reports.json_record import unseen_escaped
from circuitlint.reports.terminal import printable, prose
from circuitlint.reports.words import amount, citation, limit_of, percent, subject
from circuitlint.review.record import Check, Circuit, ConcessionRecord, Place, Record, RuleRecord, Severity
from circuitlint.si import DIMENSIONS

SCHEMA = "https://docs.oasis-open.org/sarif/sarif/v2.1.0/errata01/os/schemas/sarif-schema-2.1.0.json"
LEVELS: dict[Severity, str] = {"major": "error", "minor": "warning", "observation": "note"}
FINGERPRINT = "circuitCheck/v1"
_ROLES = {"definition": "analysisTarget", "ruleset": "userSpecifiedConfiguration"}


def render(record: Record) -> str:
    """The record's findings as a SARIF log, indented, ending in a newline.

    Raises RecordError where a number is not finite, for which JSON has no word.
    """
    log = {"$schema": SCHEMA, "version": "2.1.0", "runs": [_run(record)]}
    try:
        return unseen_escaped(json.dumps(log, indent=2, ensure_ascii=False, allow_nan=False)) + "\n"
    except ValueError as error:
        raise RecordError(f"the record cannot be written as SARIF: {error}") from None


def _run(record: Record) -> dict[str, Any]:
    rules = {rule.name: number for number, rule in enumerate(record.rules)}
    files = {one.file: number for number, one in enumerate(record.documents)}
    run: dict[str, Any] = {
        "tool": {"driver": _driver(record)},
        # Columns are counted as the definition's reader counts them (3.14.27).
        "columnKind": "unicodeCodePoints",
        "invocations": [_invocation(record, rules, files)],
        "artifacts": [
            {
                "location": {"uri": uri(one.file)},
                "roles": [_ROLES[one.kind]],
                "mimeType": "application/yaml",
                "hashes": {"sha-256": one.sha256},
            }
            for one in record.documents
        ],
        "results": [
            _result(record, circuit, check, rules, files)
            for circuit in record.circuits
            for check in circuit.checks
            if check.severity is not None or check.result != "conforms"
        ],
        "properties": {
            "title": record.title,
            "ruleset": record.ruleset.name,
            "rulesetEdition": record.ruleset.edition,
            "rulesetDigest": record.ruleset.sha256,
            "holdAt": record.hold_at,
            "held": record.held,
            "circuitsHeld": [one.tag for one in record.circuits if one.held],
            "counts": dict(record.counts),
            "statement": record.statement,
            "cautions": list(record.cautions.values()),
        },
    }
    if record.reviewed_on:
        run["properties"]["reviewedOn"] = record.reviewed_on
    return run


def _driver(record: Record) -> dict[str, Any]:
    driver: dict[str, Any] = {"name": record.tool, "version": record.version}
    if re.fullmatch(r"\d+\.\d+\.\d+(-[0-9A-Za-z.-]+)?(\+[0-9A-Za-z.-]+)?", record.version):
        driver["semanticVersion"] = record.version
    driver["rules"] = [_rule(record, rule) for rule in record.rules]
    return driver


def _rule(record: Record, rule: RuleRecord) -> dict[str, Any]:
    """A reportingDescriptor (3.49), at the level of the usual case: a figure beyond its limit at nominal values."""
    help_text = [f"{rule.purpose.rstrip('.')}.", f"Applies to {rule.applies_to}."]
    if rule.needs:
        help_text.append(f"Needs {'; '.join(rule.needs)}.")
    if rule.helps:
        help_text.append(f"What usually helps: {rule.helps}.")
    severities = record.ruleset.severities.get(rule.name, {})
    usual = severities.get("nominal", "minor")
    prefix = f"rules.{rule.name}."
    return {
        "id": rule.name,
        "shortDescription": _message(rule.title),
        "fullDescription": _message(rule.purpose),
        "help": _message(" ".join(help_text)),
        "defaultConfiguration": {"level": LEVELS[usual]},
        "properties": {
            "plugin": rule.plugin,
            "required": rule.required,
            "severities": dict(severities),
            "limits": {
                limit.name: {
                    "value": limit.value,
                    **_unit(limit.dimension),
                    "setBy": limit.set_by,
                    "source": _cited(record, limit.source),
                }
                for limit in record.ruleset.limits
                if limit.path.startswith(prefix)
            },
        },
    }


def _cited(record: Record, key: str) -> str:
    source = record.sources.get(key)
    return citation(source) if source is not None else printable(key)


def _result(
    record: Record, circuit: Circuit, check: Check, rules: dict[str, int], files: dict[str, int]
) -> dict[str, Any]:
    open_question = check.result == "not assessed"
    level = LEVELS[check.severity] if check.severity is not None else "note"
    result: dict[str, Any] = {
        "ruleId": check.rule,
        "kind": "open" if open_question else "fail",
        # Any kind but `fail` has the level `none` (3.27.10).
        "level": "none" if open_question else level,
        "message": _message(_told(circuit, check)),
        "locations": [_location(check.place, files, circuit.tag, check.of)],
        "partialFingerprints": {FINGERPRINT: fingerprint(circuit.tag, check)},
        # Either every result of a run has the property or none has (3.27.23).
        "suppressions": _suppressions(record.concessions, check),
        "properties": _figures(circuit, check),
    }
    if check.rule in rules:
        result["ruleIndex"] = rules[check.rule]
    return result


def fingerprint(tag: str, check: Check) -> str:
    """What stays the same of a check when lines are inserted above it: rule, tag, part, state and limit, hashed."""
    limit = check.limit.name if check.limit is not None else ""
    named = json.dumps([check.rule, tag, check.of, check.state, check.figure, limit, check.id])
    return hashlib.sha256(named.encode("utf-8", "surrogatepass")).hexdigest()


def _told(circuit: Circuit, check: Check) -> str:
    serves = f" ({circuit.serves})" if circuit.serves else ""
    sentences = [f"{circuit.tag}{serves}: {check.what}"]
    if check.margin is not None:
        sentences.append(f"margin {percent(check.margin)} in the worst case")
    if check.result == "not assessed" and check.why:
        sentences.append(check.why)
    if check.help:
        sentences.append(f"what would help: {check.help}")
    return "; ".join(sentences)


def _suppressions(concessions: Sequence[ConcessionRecord], check: Check) -> list[dict[str, Any]]:
    if check.concession is None or not 0 <= check.concession < len(concessions):
        return []
    one = concessions[check.concession]
    if one.state != "in force":
        return []
    justification = prose(f"concession by {one.by} until {one.until}: {one.reason}")
    return [{"kind": "external", "status": "accepted", "justification": justification}]


def _figures(circuit: Circuit, check: Check) -> dict[str, Any]:
    properties: dict[str, Any] = {"tag": circuit.tag, "result": check.result, "held": circuit.held}
    for name, value in (
        ("severity", check.severity),
        ("basis", check.basis),
        ("state", check.state),
        ("part", check.of),
        ("figure", check.figure),
        ("why", check.why),
        ("movedMostBy", check.moved_by),
    ):
        if value:
            properties[name] = value
    for name, number in (
        ("nominal", check.nominal),
        ("worst", check.worst),
        ("margin", check.margin),
        ("nominalMargin", check.nominal_margin),
        ("shareBeyond", check.share_beyond),
    ):
        if number is not None:
            properties[name] = number
    if check.nominal is not None:
        properties |= _unit(check.dimension)
    if check.limit is not None:
        properties |= {
            "limit": check.limit.value,
            "sense": check.sense,
            "limitSetBy": check.limit.set_by,
            "shown": _shown(check),
        }
    if check.needs:
        properties["needs"] = list(check.needs)
    return properties


def _shown(check: Check) -> str:
    values = [
        amount(value, check.dimension, check.figure) for value in (check.nominal, check.worst) if value is not None
    ]
    return f"{subject(check)}: {' to '.join(values)}, limit {limit_of(check)}"


def _unit(dimension: str) -> dict[str, str]:
    known = DIMENSIONS.get(dimension)
    return {"unit": known.symbol or "1"} if known is not None else {}


def _location(place: Place, files: dict[str, int], tag: str = "", of: str = "") -> dict[str, Any]:
    artifact: dict[str, Any] = {"uri": uri(place.file)}
    if place.file in files:
        artifact["index"] = files[place.file]
    region = {"startLine": max(1, place.line), "startColumn": max(1, place.column)}
    location: dict[str, Any] = {"physicalLocation": {"artifactLocation": artifact, "region": region}}
    if tag:
        path = f"{tag}/{of}" if of else tag
        location["logicalLocations"] = [
            {"name": printable(tag), "fullyQualifiedName": printable(path), "kind": "object"}
        ]
    return location


def uri(file: str) -> str:
    """A file name as a URI reference: relative names stay relative, absolute ones get their scheme."""
    name = file.replace("\\", "/")
    quoted = quote(name, safe="/", errors="surrogatepass")
    if name.startswith("/"):
        return f"file://{quoted}" if not name.startswith("//") else f"file:{quoted}"
    if re.match(r"[A-Za-z]:/", name):
        return f"file:///{quoted}"
    return quoted or "."


def _invocation(record: Record, rules: dict[str, int], files: dict[str, int]) -> dict[str, Any]:
    failed = [plugin for plugin in record.plugins if plugin.failed]
    return {
        "executionSuccessful": not record.problems and not failed,
        "toolExecutionNotifications": [*_failures(record, rules), *_gaps(record, rules, files)],
        "toolConfigurationNotifications": [
            {
                "level": "warning",
                "message": _message(f"concession for {one.tag}, {one.rule}: {one.state}"),
                "locations": [_location(one.place, files)],
                **_about(one.rule, rules),
            }
            for one in record.concessions
            if one.state != "in force"
        ],
    }


def _failures(record: Record, rules: dict[str, int]) -> Iterator[dict[str, Any]]:
    """Rules and plugins that failed."""
    for problem in record.problems:
        who = f"rule {problem.rule} of plugin {problem.plugin}" if problem.rule else f"plugin {problem.plugin}"
        lost = f"; not assessed: {', '.join(problem.circuits)}" if problem.circuits else ""
        yield {"level": "error", "message": _message(f"{who}: {problem.what}{lost}"), **_about(problem.rule, rules)}
    told = {problem.plugin for problem in record.problems}
    for plugin in record.plugins:
        if plugin.failed and plugin.name not in told:
            yield {"level": "error", "message": _message(f"plugin {plugin.name}: {plugin.failed}")}


def _gaps(record: Record, rules: dict[str, int], files: dict[str, int]) -> Iterator[dict[str, Any]]:
    """What could not be assessed, and circuits that could not be solved."""
    for circuit in record.circuits:
        if circuit.not_solved:
            yield {
                "level": "error",
                "message": _message(f"{circuit.tag}: not solved: {circuit.not_solved}"),
                "locations": [_location(circuit.place, files, circuit.tag)],
            }
        for check in circuit.checks:
            if check.result == "not assessed":
                level = LEVELS[check.severity] if check.severity is not None else "note"
                yield {
                    "level": level,
                    "message": _message(_told(circuit, check)),
                    "locations": [_location(check.place, files, circuit.tag, check.of)],
                    **_about(check.rule, rules),
                }


def _about(rule: str, rules: dict[str, int]) -> dict[str, Any]:
    return {"associatedRule": {"id": rule, "index": rules[rule]}} if rule in rules else {}


def _message(text: str) -> dict[str, str]:
    """Plain text as a message: braces doubled (3.11.5), and nothing that a reader would take for a link (3.11.6)."""
    plain = prose(text).replace("{", "{{").replace("}", "}}").replace("](", "] (")
    return {"text": plain or "no text"}
