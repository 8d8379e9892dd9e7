"""`circuitlint compare`: what a change did."""

from __future__ import annotations

import argparse
from typing import Any

from circuitlint.commands.job import ruleset_arguments
from circuitlint.commands.output import colour, columns, put
from circuitlint.commands.settings import apply_settings
from circuitlint.commands.stored import record_or_review
from circuitlint.reports import comparison as reports
from circuitlint.review.comparison import compare

NOTHING_NEW_HELD, NEW_HELD = 0, 1


def add(commands: Any) -> None:
    """Add the command to the parser."""
    one = commands.add_parser("compare", help="what a change did: findings gone and new, figures moved",
                              description=_compare.__doc__)
    one.add_argument("before", metavar="BEFORE", help="a definition (file or folder), or a record (.json)")
    one.add_argument("after", metavar="AFTER", help="the same, after the change")
    ruleset_arguments(one)
    one.add_argument("--as", dest="form", metavar="FORM[=FILE]", default="text", help="text, json or html")
    one.add_argument("--hold-at", choices=("major", "minor", "observation", "never"), default="major")
    one.add_argument("--on", dest="on_date", metavar="DATE", default="", help="date for concessions; today if not given")
    one.add_argument("--width", type=int, default=0, help="columns of the text")
    one.set_defaults(command=_compare)


def _compare(arguments: argparse.Namespace) -> int:
    """Tell what a change did. Ends with status 1 where it brought a finding that holds, else with 0."""
    apply_settings(arguments)
    before, after = (record_or_review(name, arguments) for name in (arguments.before, arguments.after))
    found = compare(before, after)
    form, _, file = arguments.form.partition("=")
    put(reports.render(form, found, width=arguments.width or columns(), colour=not file and colour()), file)
    return NEW_HELD if found.new_held else NOTHING_NEW_HELD
