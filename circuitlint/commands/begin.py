"""`circuitlint begin`: a small working project to start from."""

from __future__ import annotations

import argparse
from pathlib import Path
from typing import Any

from circuitlint.commands.output import put
from circuitlint.commands.settings import NAME
from circuitlint.errors import InputError
from circuitlint.starting import project, to_be_run


def add(commands: Any) -> None:
    """Add the command to the parser."""
    one = commands.add_parser("begin", help="a small working project to start from", description=_begin.__doc__)
    one.add_argument("folder", metavar="FOLDER", help="a new or empty folder")
    one.set_defaults(command=_begin)


def _begin(arguments: argparse.Namespace) -> int:
    """Write a small project that works as it stands: a definition, a rule of the house with its limit and its test, settings."""
    folder = Path(arguments.folder)
    try:
        if folder.exists() and (not folder.is_dir() or any(folder.iterdir())):
            raise InputError(f"{folder}: something is there already; accepted: a new or an empty folder")
        for name, text in project().items():
            target = folder / name
            target.parent.mkdir(parents=True, exist_ok=True)
            target.write_text(text, encoding="utf-8")
            if to_be_run(name):
                target.chmod(target.stat().st_mode | 0o111)
    except (OSError, ValueError) as error:
        raise InputError(f"{folder}: the project cannot be written: {getattr(error, 'strerror', None) or error}") from None
    put("\n".join([*(str(folder / name) for name in project()), "", "Next:", f"  pytest {folder}",
                   f"  circuitlint review --settings {folder / NAME}"]) + "\n", "")
    return 0
