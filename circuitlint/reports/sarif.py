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
from collections.abc import Sequence
from typing import Any

from circuitlint.errors import RecordError
from circuitlint.reports.json_record import unseen_escaped
from circuitlint.reports.sarif_notices import invocation
from circuitlint.reports.sarif_parts import LEVELS, location, message, told, unit, uri
from circuitlint.reports.terminal import printable, prose
from circuitlint.reports.words import amount, citation, limit_of, subject
from circuitlint.review.record import Check, Circuit, ConcessionRecord, Record, RuleRecord

SCHEMA = "https://docs.oasis-open.org/sarif/sarif/v2.1.0/errata01/os/schemas/sarif-schema-2.1.0.json"
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
        "invocations": [invocation(record, rules, files)],
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
        "shortDescription": message(rule.title),
        "fullDescription": message(rule.purpose),
        "help": message(" ".join(help_text)),
        "defaultConfiguration": {"level": LEVELS[usual]},
        "properties": {
            "plugin": rule.plugin,
            "required": rule.required,
            "severities": dict(severities),
            "limits": {
                limit.name: {
                    "value": limit.value,
                    **unit(limit.dimension),
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


def _result(record: Record, circuit: Circuit, check: Check, rules: dict[str, int], files: dict[str, int]) -> dict[str, Any]:
    open_question = check.result == "not assessed"
    level = LEVELS[check.severity] if check.severity is not None else "note"
    result: dict[str, Any] = {
        "ruleId": check.rule,
        "kind": "open" if open_question else "fail",
        # Any kind but `fail` has the level `none` (3.27.10).
        "level": "none" if open_question else level,
        "message": message(told(circuit, check)),
        "locations": [location(check.place, files, circuit.tag, check.of)],
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
        properties |= unit(check.dimension)
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
    values = [amount(value, check.dimension, check.figure) for value in (check.nominal, check.worst) if value is not None]
    return f"{subject(check)}: {' to '.join(values)}, limit {limit_of(check)}"
