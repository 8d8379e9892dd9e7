"""The command line: arguments in, exit status out. It knows nothing electrical.

Exit status: 0 nothing held, 1 something held, 2 the input or the call is at fault, 3 the tool or a plugin failed.
"""

from __future__ import annotations

import argparse
import gc
import sys
from collections.abc import Callable, Sequence

import circuitlint
from circuitlint.commands import begin, compare, figures, plugins, readings, report, review, rules, schema, test_sheet
from circuitlint.errors import CircuitlintError, InputError
from circuitlint.isolation.containment import keyboard_heeded

AT_FAULT, FAILED = 2, 3
COMMANDS = (begin, review, figures, rules, compare, test_sheet, readings, report, plugins, schema)
"""In the order of the help."""


def main(argv: Sequence[str] | None = None) -> int:
    """Run one command and give its exit status. Errors go to standard error in words, never as a traceback."""
    parser = _parser()
    try:
        arguments = parser.parse_args(argv)
    except SystemExit as stop:
        return int(stop.code or 0)
    command: Callable[[argparse.Namespace], int] = arguments.command
    # A study makes many small objects and no circles: at its usual pace the collector takes a fifth of a large review.
    gc.set_threshold(200_000, 20, 50)
    try:
        with keyboard_heeded():
            return command(arguments)
    except InputError as error:
        print(f"circuitlint: {_complaint(error)}", file=sys.stderr)
        return AT_FAULT
    except CircuitlintError as error:
        print(f"circuitlint: {error}", file=sys.stderr)
        return FAILED
    except KeyboardInterrupt:
        print("circuitlint: stopped", file=sys.stderr)
        return FAILED
    except Exception as error:
        print(f"circuitlint: the tool failed, please report it: {type(error).__name__}: {error}", file=sys.stderr)
        return FAILED


def _complaint(error: InputError) -> str:
    if not error.faults:
        return str(error)
    count = len(error.faults)
    return f"{count} {'fault' if count == 1 else 'faults'} in the input\n" + "\n".join(map(str, error.faults))


def _parser() -> argparse.ArgumentParser:
    parser = argparse.ArgumentParser(
        prog="circuitlint",
        description="Hold definitions of inductive circuits against stated limits, before anything is installed.",
        epilog="Exit status: 0 nothing held, 1 something held, 2 the input or the call is at fault, 3 the tool failed.",
    )
    parser.add_argument("--version", action="version", version=f"circuitlint {circuitlint.__version__}")
    commands = parser.add_subparsers(required=True, metavar="COMMAND")
    for one in COMMANDS:
        one.add(commands)
    return parser
