"""`--settings FILE`: a project's own settings, so that everybody who works on it calls the tool alike.

A settings file names definitions, a ruleset, plugins and the severity that holds. It is read only where the call names it,
never because it lies beside a definition: naming a plugin is letting its code run.
"""

from __future__ import annotations

import argparse
import os
import sys
from typing import Annotated, Literal

from pydantic import BaseModel, ConfigDict, Field, ValidationError

from circuitlint.definition.faults import faults_of
from circuitlint.definition.text import Builder, parse
from circuitlint.errors import InputError

NAME = "circuitlint.settings"
"""What the file is usually called; no definition, so that a folder can be reviewed with the file in it."""

Given = Annotated[str, Field(min_length=1)]


class Settings(BaseModel):
    """A settings file. Paths are meant from the folder that the file lies in."""

    model_config = ConfigDict(frozen=True, extra="forbid")

    format: Literal["1"] = Field(description="Version of the file format.")
    definitions: list[Given] = Field(default=[], description="What is reviewed where the call names no PATH.")
    ruleset: str = Field(default="", description="A ruleset by name, or a ruleset file.")
    plugins: list[Given] = Field(default=[], description="Plugin files and folders, beside those that are installed.")
    hold_at: Literal["major", "minor", "observation", "never"] | None = Field(
        default=None, description="Least severity that holds a circuit."
    )


def settings_argument(parser: argparse.ArgumentParser) -> None:
    """`--settings`."""
    parser.add_argument("--settings", metavar="FILE", default="",
                        help=f"the project's own settings, usually {NAME}; what the call says goes over them")


def read_settings(file: str) -> Settings:
    """Read a settings file. Raises InputError with every fault."""
    try:
        with open(file, "rb") as opened:
            content = opened.read()
    except (OSError, ValueError) as error:
        told = getattr(error, "strerror", None) or error
        raise InputError(f"{file}: the settings cannot be read: {told}") from None
    text = parse(content, file.replace(os.sep, "/"))
    data = Builder(text).build(text.root)
    if not text.faults and not isinstance(data, dict):
        text.fault(text.root, "the file is not a mapping", "settings that begin with `format: 1`")
    if text.faults:
        raise InputError(faults=sorted(set(text.faults)))
    try:
        return Settings.model_validate(data)
    except ValidationError as error:
        raise InputError(faults=sorted(set(faults_of(error, Settings, text.root, text.file)))) from None


def apply_settings(arguments: argparse.Namespace) -> None:
    """Fill in what the call leaves open from the settings it names. Raises InputError."""
    if not getattr(arguments, "settings", ""):
        for path in getattr(arguments, "path", ()):
            beside = os.path.join(path, NAME)
            if os.path.isfile(beside):
                print(f"circuitlint: {beside} is not read; accepted: --settings {beside}", file=sys.stderr)
        return
    settings, folder = read_settings(arguments.settings), os.path.dirname(arguments.settings)
    arguments.settings = ""
    arguments.plugin = [*(os.path.join(folder, one) for one in settings.plugins), *arguments.plugin]
    if not arguments.ruleset and settings.ruleset:
        beside = os.path.join(folder, settings.ruleset)
        arguments.ruleset = beside if os.path.isfile(beside) else settings.ruleset
    if hasattr(arguments, "path") and not arguments.path and not arguments.demo:
        arguments.path = [os.path.join(folder, one) for one in settings.definitions]
    if hasattr(arguments, "hold_at") and not arguments.hold_at:
        arguments.hold_at = settings.hold_at or ""
