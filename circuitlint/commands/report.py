"""`circuitlint report`: any report from a stored record, the same bytes as at review time."""

from __future__ import annotations

import argparse
from typing import Any

from circuitlint.commands.output import colour, columns, put
from circuitlint.commands.stored import record_of
from circuitlint.plugins import gather
from circuitlint.reports import kinds as reports


def add(commands: Any) -> None:
    """Add the command to the parser."""
    one = commands.add_parser("report", help="any report from a stored record", description=_report.__doc__)
    one.add_argument("record", metavar="RECORD", help="a record, as `review --report json=RECORD` writes it, or -")
    one.add_argument("--as", dest="kind", metavar="KIND[=FILE]", default="text", help="a report kind")
    one.add_argument("--plugin", action="append", default=[], metavar="PATH")
    one.add_argument("--width", type=int, default=0, help="columns of the text report")
    one.set_defaults(command=_report)


def _report(arguments: argparse.Namespace) -> int:
    """Print a stored review record as another report."""
    added = gather(arguments.plugin).reports
    kind, _, file = arguments.kind.partition("=")
    reports.check(kind, added)
    made = record_of(arguments.record)
    put(reports.render(kind, made, added, width=arguments.width or columns(), colour=not file and colour()), file)
    return 0
