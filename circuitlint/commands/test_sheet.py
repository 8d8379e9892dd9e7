"""`circuitlint test-sheet`: what to read on each circuit, before going to site."""

from __future__ import annotations

import argparse
import datetime
from collections.abc import Callable
from typing import Any

from circuitlint.commands.job import input_arguments, job_of
from circuitlint.commands.output import columns, put
from circuitlint.engine import Review, review
from circuitlint.errors import InputError
from circuitlint.readings.test_sheet import TestSheet, make
from circuitlint.reports import readings_sheet, readings_sheet_page

FORMS: dict[str, Callable[[TestSheet], str]] = {
    "csv": readings_sheet.as_csv, "html": readings_sheet_page.render, "json": readings_sheet.as_json,
}


def add(commands: Any) -> None:
    """Add the command to the parser."""
    one = commands.add_parser("test-sheet", help="what to read on each circuit, and what to expect", description=_sheet.__doc__)
    input_arguments(one)
    one.add_argument("--tag", action="append", default=[], metavar="TAG", help="this circuit only; repeatable")
    one.add_argument("--report", action="append", default=[], metavar="KIND[=FILE]",
                     help="text, html to print, csv to fill in and give to `readings`, or json; repeatable")
    one.add_argument("--width", type=int, default=0, help="columns of the text")
    one.set_defaults(command=_sheet)


def _sheet(arguments: argparse.Namespace) -> int:
    """Print a test sheet: what to measure, with which range and category, what reading to expect, when to stop."""
    wanted = [one.partition("=")[::2] for one in arguments.report] or [("text", "")]
    for kind, _ in wanted:
        if kind != "text" and kind not in FORMS:
            raise InputError(f"no test sheet is named {kind!r}; accepted: one of text, {', '.join(FORMS)}")
    job = job_of(arguments)
    tags = [circuit.entry.tag for circuit in job.installation.circuits]
    for tag in arguments.tag:
        if tag not in tags:
            raise InputError(f"no circuit has the tag {tag!r}; accepted: one of {', '.join(tags)}")
    made = review(job.installation, job.ruleset, job.gathered, Review("never", datetime.date.today().isoformat()))
    sheet = make(job.installation, made)
    if arguments.tag:
        sheet = sheet.model_copy(update={"circuits": tuple(one for one in sheet.circuits if one.tag in arguments.tag)})
    for kind, file in wanted:
        put(readings_sheet.as_text(sheet, width=arguments.width or columns()) if kind == "text" else FORMS[kind](sheet), file)
    return 0
