"""What the commands that read a definition start from: plugins, the definition, the ruleset."""

from __future__ import annotations

import argparse
import os
import sys
from dataclasses import dataclass

from circuitlint import demo
from circuitlint.commands.settings import apply_settings, settings_argument
from circuitlint.definition.reading import Installation, read_contents, read_contents_of
from circuitlint.errors import InputError
from circuitlint.limits.models import Ruleset
from circuitlint.limits.reading import read_ruleset, resolve
from circuitlint.plugins import Gathered, gather

DEFAULT_RULESET = "low-voltage-50hz"


def ruleset_arguments(parser: argparse.ArgumentParser) -> None:
    """`--ruleset`, `--plugin` and `--settings`."""
    parser.add_argument("--ruleset", metavar="NAME", default="", help="a shipped or offered ruleset, or a ruleset file")
    parser.add_argument("--plugin", action="append", default=[], metavar="PATH", help="a plugin file or folder; repeatable")
    settings_argument(parser)


def input_arguments(parser: argparse.ArgumentParser) -> None:
    """PATH..., `--demo`, `--ruleset`, `--plugin` and `--settings`."""
    parser.add_argument("path", nargs="*", metavar="PATH", help="definition files, folders, or - for standard input")
    parser.add_argument("--demo", action="store_true", help="the shipped demo, an invented ferry slip, as the definition")
    ruleset_arguments(parser)


@dataclass(slots=True)
class Job:
    """What every command that reads a definition starts from."""

    gathered: Gathered
    installation: Installation
    ruleset: Ruleset


def job_of(arguments: argparse.Namespace) -> Job:
    """Gather plugins, read the definition and resolve the ruleset. Raises InputError."""
    apply_settings(arguments)
    gathered = gather(arguments.plugin)
    try:
        return _job_of(arguments, gathered)
    except InputError:
        tell_failures(gathered)
        raise


def _job_of(arguments: argparse.Namespace, gathered: Gathered) -> Job:
    if bool(arguments.path) == arguments.demo:
        raise InputError("nothing to review; accepted: PATH... (a file, a folder or -), or --demo")
    contents = [demo.content()] if arguments.demo else read_contents_of(arguments.path, sys.stdin.buffer)
    installation = read_contents([*contents, *gathered.parts], gathered.models())
    if not installation.circuits:
        raise InputError("the definition holds no circuit; accepted: `circuits:` with at least one entry")
    return Job(gathered, installation, ruleset_of(arguments, gathered, installation.ruleset))


def tell_failures(gathered: Gathered) -> None:
    """Name the plugins that failed on standard error: what they would have offered may be what is missing."""
    for plugin in gathered.plugins:
        if plugin.failed:
            print(f"circuitlint: the plugin {plugin.name} failed: {plugin.failed}", file=sys.stderr)


def ruleset_of(arguments: argparse.Namespace, gathered: Gathered, wanted: str | None = None) -> Ruleset:
    """The ruleset that is asked for, that the definition names, or the usual one. Raises RulesetError."""
    name = arguments.ruleset or wanted or DEFAULT_RULESET
    if os.path.isfile(name):
        with open(name, "rb") as file:
            own = read_ruleset(file.read(), name.replace(os.sep, "/"))
        return resolve(own.content.name, {**gathered.rulesets, own.content.name: own})
    return resolve(name, gathered.rulesets)
