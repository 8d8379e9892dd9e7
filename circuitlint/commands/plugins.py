"""`circuitlint plugins`: what is loaded, from where, and what failed."""

from __future__ import annotations

import argparse
import json
import textwrap
from typing import Any

from circuitlint.commands.output import columns, put
from circuitlint.commands.settings import apply_settings, settings_argument
from circuitlint.plugins import Gathered, Plugin, gather

ALL_LOADED, SOME_FAILED = 0, 3


def add(commands: Any) -> None:
    """Add the command to the parser."""
    one = commands.add_parser("plugins", help="what is loaded, from where, and what failed", description=_plugins.__doc__)
    one.add_argument("--plugin", action="append", default=[], metavar="PATH", help="a plugin file or folder; repeatable")
    settings_argument(one)
    one.add_argument("--as", dest="form", choices=("text", "json"), default="text")
    one.set_defaults(command=_plugins, ruleset="")


def _plugins(arguments: argparse.Namespace) -> int:
    """List every plugin: its version, where it came from, what it offers, and why it failed if it did (status 3)."""
    apply_settings(arguments)
    gathered = gather(arguments.plugin)
    if arguments.form == "json":
        put(json.dumps({"plugins": [_told(one) for one in gathered.plugins]}, indent=2, ensure_ascii=False) + "\n", "")
    else:
        put("\n".join(_lines(gathered, columns())) + "\n", "")
    return SOME_FAILED if any(one.failed for one in gathered.plugins) else ALL_LOADED


def _told(one: Plugin) -> dict[str, Any]:
    return {
        "name": one.name, "version": one.version, "origin": one.origin, "place": one.place, "offers": one.offers,
        "failed": one.failed,
    }


def _lines(gathered: Gathered, width: int) -> list[str]:
    lines: list[str] = []
    for one in gathered.plugins:
        lines.append(f"{one.name}  {one.version}".rstrip())
        lines += _entry("from", f"{one.origin}, {one.place}" if one.place else one.origin, width)
        kinds: dict[str, list[str]] = {}
        for offer in one.offers:
            for kind in ("report kind", "load kind", "rule on readings", "rule", "ruleset", "part", "figures"):
                if offer.startswith(f"{kind} "):
                    kinds.setdefault(kind, []).append(offer.removeprefix(f"{kind} "))
                    break
        for kind, names in kinds.items():
            lines += _entry(_several(kind, len(names)), ", ".join(names), width)
        if one.failed:
            lines += _entry("failed", one.failed, width)
    return lines or ["no plugins"]


def _several(kind: str, number: int) -> str:
    if number == 1 or kind == "figures":
        return kind
    return "rules on readings" if kind == "rule on readings" else f"{kind}s"


def _entry(word: str, text: str, width: int) -> list[str]:
    return textwrap.wrap(text, width, initial_indent=f"  {word:<17} ", subsequent_indent=" " * 20, break_on_hyphens=False,
                         break_long_words=False)
