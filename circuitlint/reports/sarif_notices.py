"""What a SARIF log tells of the run itself: failures, circuits not solved, gaps, concessions that do not hold."""

from __future__ import annotations

from collections.abc import Iterator
from typing import Any

from circuitlint.reports.sarif_parts import LEVELS, about, location, message, told
from circuitlint.review.record import Record


def invocation(record: Record, rules: dict[str, int], files: dict[str, int]) -> dict[str, Any]:
    """The invocation (3.20). `rules` and `files` give the index of each rule and file in the log."""
    failed = [plugin for plugin in record.plugins if plugin.failed]
    return {
        "executionSuccessful": not record.problems and not failed,
        "toolExecutionNotifications": [*_failures(record, rules), *_gaps(record, rules, files)],
        "toolConfigurationNotifications": [
            {
                "level": "warning",
                "message": message(f"concession for {one.tag}, {one.rule}: {one.state}"),
                "locations": [location(one.place, files)],
                **about(one.rule, rules),
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
        yield {"level": "error", "message": message(f"{who}: {problem.what}{lost}"), **about(problem.rule, rules)}
    told = {problem.plugin for problem in record.problems}
    for plugin in record.plugins:
        if plugin.failed and plugin.name not in told:
            yield {"level": "error", "message": message(f"plugin {plugin.name}: {plugin.failed}")}


def _gaps(record: Record, rules: dict[str, int], files: dict[str, int]) -> Iterator[dict[str, Any]]:
    """What could not be assessed, and circuits that could not be solved."""
    for circuit in record.circuits:
        if circuit.not_solved:
            yield {
                "level": "error",
                "message": message(f"{circuit.tag}: not solved: {circuit.not_solved}"),
                "locations": [location(circuit.place, files, circuit.tag)],
            }
        for check in circuit.checks:
            if check.result == "not assessed":
                level = LEVELS[check.severity] if check.severity is not None else "note"
                yield {
                    "level": level,
                    "message": message(told(circuit, check)),
                    "locations": [location(check.place, files, circuit.tag, check.of)],
                    **about(check.rule, rules),
                }
