"""`circuitlint figures`: the calculation sheet."""

from __future__ import annotations

import argparse
import datetime
import json
from typing import Any

from circuitlint.commands.job import input_arguments, job_of
from circuitlint.commands.output import columns, put
from circuitlint.engine import Review, review
from circuitlint.errors import InputError
from circuitlint.reports import kinds as reports


def add(commands: Any) -> None:
    """Add the command to the parser."""
    one = commands.add_parser("figures", help="the calculation sheet of each circuit", description=_figures.__doc__)
    input_arguments(one)
    one.add_argument("--tag", action="append", default=[], metavar="TAG", help="this circuit only; repeatable")
    one.add_argument("--as", dest="form", choices=("text", "json"), default="text")
    one.add_argument("--width", type=int, default=0, help="columns of the sheet")
    one.set_defaults(command=_figures)


def _figures(arguments: argparse.Namespace) -> int:
    """Print the calculation sheet: each figure with its formula, the numbers put in, the result and the source."""
    job = job_of(arguments)
    tags = {circuit.entry.tag for circuit in job.installation.circuits}
    for tag in arguments.tag:
        if tag not in tags:
            raise InputError(f"no circuit has the tag {tag!r}; accepted: one of {', '.join(sorted(tags))}")
    if arguments.tag:
        job.installation.circuits = [one for one in job.installation.circuits if one.entry.tag in arguments.tag]
    made = review(job.installation, job.ruleset, job.gathered, Review("never", datetime.date.today().isoformat()))
    if arguments.form == "json":
        sheets = {one.tag: [figure.model_dump(mode="json") for figure in one.figures] for one in made.circuits}
        formulas = {key: value.model_dump(mode="json") for key, value in made.formulas.items()}
        put(json.dumps({"circuits": sheets, "formulas": formulas}, indent=2, ensure_ascii=False, allow_nan=False) + "\n", "")
    else:
        put(reports.sheet(made, arguments.width or columns()), "")
    return 0
