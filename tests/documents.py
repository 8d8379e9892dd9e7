"""The fenced blocks of README.md and DEVELOPERS.md, each with what the comment line above it says it is.

    <!-- command: NAME -->   command lines; the test suite runs those that start with `circuitlint`, .ci/run the others
    <!-- output: NAME -->    what the command of that name prints; a line of three dots stands for lines left out
    <!-- file: PATH -->      a file that later commands find in their folder
    <!-- run: NAME -->       a Python program

A block of language `text`, or of none, may stand without a comment. Standard library only: `.ci/run` takes its commands
from here before anything is installed, with `python3 tests/documents.py README.md NAME`.
"""

from __future__ import annotations

import re
import sys
from pathlib import Path
from typing import NamedTuple

ROOT = Path(__file__).parents[1]
KINDS = ("command", "output", "file", "run")
FREE_LANGUAGES = ("", "text")
LEFT_OUT = "..."

_MARKER = re.compile(r"<!-- (\w+): (\S+) -->")
_FENCE = re.compile(r"(`{3,}|~{3,})\s*(\S*)")


class DocumentError(Exception):
    """A document does not keep to the comments above."""


class Block(NamedTuple):
    """One fenced block: kind and name from its comment (both empty where it has none), language, text, first line."""

    kind: str
    name: str
    language: str
    text: str
    line: int


def blocks(document: str) -> list[Block]:
    """Every fenced block of a document of the root folder, in order.

    Raises DocumentError for a missing document, an unknown kind, a comment without a block and an open fence.
    """
    path = ROOT / document
    if not path.is_file():
        raise DocumentError(f"{document} is missing")
    lines = path.read_text(encoding="utf-8").splitlines()
    found: list[Block] = []
    marker: re.Match[str] | None = None
    number = 0
    while number < len(lines):
        line = lines[number]
        number += 1
        fence = _FENCE.fullmatch(line.strip())
        if fence is None:
            if marker is not None and line.strip():
                raise DocumentError(f"{document}, line {number}: no block follows {marker.group()}")
            marker = _MARKER.fullmatch(line.strip()) or marker
            if marker is not None and marker[1] not in KINDS:
                raise DocumentError(f"{document}, line {number}: {marker.group()} is none of {', '.join(KINDS)}")
            continue
        indent = len(line) - len(line.lstrip())
        first, body = number + 1, []
        while number < len(lines) and lines[number].strip() != fence[1]:
            body.append(lines[number][indent:])
            number += 1
        if number == len(lines):
            raise DocumentError(f"{document}, line {first - 1}: this fence is not closed")
        number += 1
        kind, name = (marker[1], marker[2]) if marker else ("", "")
        found.append(Block(kind, name, fence[2], "\n".join(body) + "\n", first))
        marker = None
    if marker is not None:
        raise DocumentError(f"{document}: no block follows {marker.group()}")
    return found


def block(document: str, kind: str, name: str) -> Block:
    """The one block of a kind and name. Raises DocumentError where there is none, or more than one."""
    found = [each for each in blocks(document) if (each.kind, each.name) == (kind, name)]
    if len(found) != 1:
        raise DocumentError(f"{document} has {len(found)} blocks under <!-- {kind}: {name} -->; exactly one is wanted")
    return found[0]


def commands(text: Block) -> list[str]:
    """The command lines of a block: no comments, no empty lines, no prompt."""
    lines = (line.strip().removeprefix("$ ") for line in text.text.splitlines())
    return [line for line in lines if line and not line.startswith("#")]


def command(document: str, name: str) -> str:
    """The one command line under a name. Raises DocumentError where the block holds another number of lines."""
    found = commands(block(document, "command", name))
    if len(found) != 1:
        raise DocumentError(f"{document}: <!-- command: {name} --> holds {len(found)} command lines; one is wanted")
    return found[0]


def agrees(written: str, printed: str) -> bool:
    """Whether a block shows what was printed: the same lines in the same order, but for lines left out."""
    wanted, got = [_lines(text) for text in (written, printed)]
    if LEFT_OUT not in wanted:
        return wanted == got
    pieces: list[list[str]] = [[]]
    for line in wanted:
        if line == LEFT_OUT:
            pieces.append([])
        else:
            pieces[-1].append(line)
    head, *middle, tail = pieces
    if got[: len(head)] != head or got[len(got) - len(tail) :] != tail:
        return False
    at, end = len(head), len(got) - len(tail)
    for piece in middle:
        starts = (start for start in range(at, end - len(piece) + 1) if got[start : start + len(piece)] == piece)
        start = next(starts, None)
        if start is None:
            return False
        at = start + len(piece)
    return at <= end


def _lines(text: str) -> list[str]:
    return [line.rstrip() for line in text.strip("\n").splitlines()]


if __name__ == "__main__":
    try:
        print(command(sys.argv[1], sys.argv[2]))
    except (DocumentError, IndexError) as error:
        sys.exit(f"python3 tests/documents.py DOCUMENT NAME: {error}")
