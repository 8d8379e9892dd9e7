"""Reading a record that was stored, or making one where a definition is named instead."""

from __future__ import annotations

import argparse
import datetime
import sys
from pathlib import Path

from circuitlint.commands.job import job_of
from circuitlint.engine import Review, review
from circuitlint.errors import InputError
from circuitlint.reports import json_record
from circuitlint.review.record import Record


def record_of(name: str) -> Record:
    """The record in a file, or on standard input for `-`. Raises InputError."""
    if name == "-":
        return json_record.load(sys.stdin.buffer.read())
    try:
        content = Path(name).read_bytes()
    except OSError as error:
        raise InputError(f"{name}: the record cannot be read: {error.strerror}") from None
    return json_record.load(content)


def record_or_review(name: str, arguments: argparse.Namespace) -> Record:
    """The record in a `.json` file, else the review of the definition of that name. Raises InputError."""
    if name.endswith(".json"):
        return record_of(name)
    job = job_of(argparse.Namespace(path=[name], demo=False, plugin=arguments.plugin, ruleset=arguments.ruleset))
    on_date = arguments.on_date or datetime.date.today().isoformat()
    return review(job.installation, job.ruleset, job.gathered, Review(arguments.hold_at, on_date))
