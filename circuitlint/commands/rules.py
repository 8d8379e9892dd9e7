"""`circuitlint rules`: what is checked, with limits, sources and needs."""

from __future__ import annotations

import argparse
from typing import Any

from circuitlint.commands.job import ruleset_arguments, ruleset_of, tell_failures
from circuitlint.commands.output import columns, put
from circuitlint.commands.settings import apply_settings
from circuitlint.definition.reading import Installation
from circuitlint.engine import Review, review
from circuitlint.errors import InputError
from circuitlint.plugins import Gathered, gather
from circuitlint.reports import kinds as reports


def add(commands: Any) -> None:
    """Add the command to the parser."""
    one = commands.add_parser("rules", help="what is checked, with limits, sources and needs", description=_rules.__doc__)
    one.add_argument("name", nargs="?", help="one rule, whole")
    ruleset_arguments(one)
    one.set_defaults(command=_rules)


def _rules(arguments: argparse.Namespace) -> int:
    """Print what is checked: each rule of the ruleset with its limits, their sources, and the data it needs."""
    apply_settings(arguments)
    gathered = gather(arguments.plugin)
    tell_failures(gathered)
    ruleset = ruleset_of(arguments, gathered)
    made = review(Installation(title=""), ruleset, gathered, Review("never"))
    if arguments.name and arguments.name not in {rule.name for rule in made.rules}:
        raise InputError(f"no rule is named {arguments.name!r}; accepted: one of {', '.join(r.name for r in made.rules)}")
    put(reports.catalogue(made, meanings_of(gathered), arguments.name or "", columns()), "")
    return 0


def meanings_of(gathered: Gathered) -> dict[str, dict[str, str]]:
    """What each limit of each rule means, for the catalogue."""
    return {name: {limit: spec.meaning for limit, spec in rule.limits.items()} for name, (rule, _) in gathered.rules.items()}
