"""`circuitlint review`: the main job."""

from __future__ import annotations

import argparse
import datetime
import sys
from typing import Any

from circuitlint.commands.job import Job, input_arguments, job_of
from circuitlint.commands.output import colour, columns, progress, put
from circuitlint.engine import Review, review
from circuitlint.errors import InputError, PluginError
from circuitlint.reports import kinds as reports
from circuitlint.review.record import Record

NOTHING_HELD, HELD, FAILED = 0, 1, 3
HOLD_LEVELS = ("major", "minor", "observation", "never")


def add(commands: Any) -> None:
    """Add the command to the parser."""
    one = commands.add_parser("review", help="review every circuit of a definition", description=_review.__doc__)
    input_arguments(one)
    one.add_argument("--report", action="append", default=[], metavar="KIND[=FILE]",
                     help="text, json, sarif, html or a plugin's kind; to standard output without FILE; repeatable")
    one.add_argument("--hold-at", choices=HOLD_LEVELS, default="", help="least severity that holds a circuit; major if not given")
    one.add_argument("--on", dest="on_date", metavar="DATE", default="",
                     help="date for concessions, YYYY-MM-DD; today if not given")
    one.add_argument("--width", type=int, default=0, help="columns of the text report")
    one.set_defaults(command=_review)


def _review(arguments: argparse.Namespace) -> int:
    """Review every circuit against every rule of the ruleset and print findings, worst first."""
    wanted = [_kind_and_file(text) for text in arguments.report] or [("text", "")]
    files = [file for _, file in wanted if file]
    if len(set(files)) < len(files):
        raise InputError("two reports go to one file; accepted: a file for each")
    job = job_of(arguments)
    hold_at = arguments.hold_at or "major"
    if not job.ruleset.rules:
        raise InputError(f"the ruleset {job.ruleset.name!r} names no rule, so nothing could be checked")
    for kind, _ in wanted:
        reports.check(kind, job.gathered.reports)
    on_date = arguments.on_date or datetime.date.today().isoformat()
    try:
        datetime.date.fromisoformat(on_date)
    except ValueError:
        raise InputError(f"--on reads {on_date!r}; accepted: a date such as 2027-06-30") from None
    whole = any(kind != "text" for kind, _ in wanted)
    made = review(job.installation, job.ruleset, job.gathered,
                  Review(hold_at, on_date, figures=whole, tell=progress(len(job.installation.circuits))))
    lost = [kind for kind, file in wanted if not _put(kind, file, made, job, arguments.width or columns())]
    for problem in made.problems:
        print(f"circuitlint: {' '.join(filter(None, (problem.plugin, problem.rule)))}: {problem.what}", file=sys.stderr)
    for name, (_, plugin) in job.gathered.rules.items():
        if name not in job.ruleset.rules:
            print(f"circuitlint: the rule {name} of {plugin.name} is not in the ruleset {job.ruleset.name}, so nothing is held "
                  "against it", file=sys.stderr)
    if made.held and hold_at != "never":
        return HELD
    return FAILED if made.problems or lost else NOTHING_HELD


def _put(kind: str, file: str, made: Record, job: Job, width: int) -> bool:
    """Write one report; a report kind of a plugin that fails is told, and the other reports are written all the same."""
    try:
        text = reports.render(kind, made, job.gathered.reports, width=width, colour=not file and colour())
    except PluginError as error:
        print(f"circuitlint: {error}", file=sys.stderr)
        return False
    put(text, file)
    return True


def _kind_and_file(text: str) -> tuple[str, str]:
    kind, _, file = text.partition("=")
    return kind, file
