"""`circuitlint readings`: measured against predicted."""

from __future__ import annotations

import argparse
import datetime
import sys
from typing import Any

from circuitlint import demo
from circuitlint.commands.job import job_of, ruleset_arguments
from circuitlint.commands.output import columns, put
from circuitlint.definition.reading import read_contents_of
from circuitlint.engine import Review, review
from circuitlint.errors import InputError
from circuitlint.readings.holding import Options, hold
from circuitlint.readings.prediction import parts_of, predictions
from circuitlint.readings.reading import read_readings
from circuitlint.reports import readings as text
from circuitlint.reports import readings_json, readings_page

NOTHING_HELD, HELD, FAILED = 0, 1, 3
KINDS = ("text", "json", "html")


def add(commands: Any) -> None:
    """Add the command to the parser."""
    one = commands.add_parser("readings", help="what was measured, held against what was predicted",
                              description=_readings.__doc__)
    one.add_argument("path", nargs="?", metavar="PATH", help="definition file or folder, or - for standard input")
    one.add_argument("readings", nargs="*", metavar="READINGS",
                     help="readings files: YAML, or filled-in test sheets ending in .csv")
    one.add_argument("--demo", action="store_true", help="the shipped demo with its invented readings")
    ruleset_arguments(one)
    one.add_argument("--report", action="append", default=[], metavar="KIND[=FILE]",
                     help="text, json or html; to standard output without FILE; repeatable")
    one.add_argument("--decision-rule", choices=("simple", "guarded"), default="",
                     help="in place of the ruleset's: by the value alone, or with its uncertainty as a guard band")
    one.add_argument("--width", type=int, default=0, help="columns of the text report")
    one.set_defaults(command=_readings)


def _readings(arguments: argparse.Namespace) -> int:
    """Evaluate readings with their uncertainties, hold them against the prediction, and say what a difference may mean."""
    wanted = [text_.partition("=")[::2] for text_ in arguments.report] or [("text", "")]
    for kind, _ in wanted:
        if kind not in KINDS:
            raise InputError(f"no report on readings is named {kind!r}; accepted: one of {', '.join(KINDS)}")
    if arguments.demo and arguments.path:
        raise InputError("both PATH and --demo; accepted: one of them")
    if not arguments.demo and not (arguments.path and arguments.readings):
        raise InputError("nothing to hold; accepted: PATH READINGS..., or --demo")
    job = job_of(argparse.Namespace(**{**vars(arguments), "path": [arguments.path] if arguments.path else []}))
    contents = [demo.readings()] if arguments.demo else read_contents_of(arguments.readings, None)
    made = review(job.installation, job.ruleset, job.gathered, Review("never", datetime.date.today().isoformat()))
    known = predictions(job.installation, made)
    readings = read_readings(contents, {tag: parts_of(one) for tag, one in known.items()})
    rules = [(rule, plugin.name) for rule, plugin in job.gathered.reading_rules.values()]
    failed = [(plugin.name, plugin.failed) for plugin in job.gathered.plugins if plugin.failed]
    decision = arguments.decision_rule or job.ruleset.decision_rule
    held = hold(readings, job.installation, made, Options(decision, rules=rules, failed=failed))
    for kind, file in wanted:
        if kind == "text":
            put(text.render(held, width=arguments.width or columns()), file)
        else:
            put((readings_json if kind == "json" else readings_page).render(held), file)
    for problem in held.problems:
        print(f"circuitlint: {problem.plugin} {problem.rule}: {problem.what}", file=sys.stderr)
    if held.problems:
        return FAILED
    return HELD if held.held else NOTHING_HELD
