"""Text on a terminal: widths in columns, wrapping, colour as an extra, and foreign text made harmless.

Whatever a definition says passes `printable` before it is printed, so that it can neither move the cursor, turn the
direction of a line, nor break out of its row.
"""

from __future__ import annotations

import re
import unicodedata
from collections.abc import Iterable, Sequence
from dataclasses import dataclass
from functools import lru_cache

STEERING = frozenset({"Cc", "Cf", "Cs", "Zl", "Zp", "Co", "Cn"})
"""Unicode categories that steer a terminal or a reader, or that nobody knows how to draw."""

NARROW, WIDE = 60, 400
"""Narrowest and widest page; a width beyond is taken as the nearer of the two."""

_NUMBER_AND_UNIT = re.compile(r"(?<=\d) (?=±|[A-Za-zµμΩ°%²/]{1,4}(?:[^A-Za-z]|$))|(?<=±) (?=\d)")
_TIED = "\x00"
"""Stands for a space that no line may break at; it cannot occur in printable text."""


def printable(text: str) -> str:
    """Text with every steering character shown as its escape, such as `\\x1b`, and every other space a plain one."""
    if text.isascii() and text.isprintable():
        return text
    return "".join(_shown(character) for character in text)


@lru_cache(maxsize=4096)
def _shown(character: str) -> str:
    category = unicodedata.category(character)
    if category == "Zs":
        return " "
    if category not in STEERING:
        return character
    known = {"\n": "\\n", "\r": "\\r", "\t": "\\t"}.get(character)
    code = ord(character)
    return known or (f"\\x{code:02x}" if code < 0x100 else f"\\u{code:04x}" if code < 0x10000 else f"\\U{code:08x}")


def prose(text: str) -> str:
    """Running text: line ends and tabs become spaces, the rest is made printable."""
    return printable(" ".join(text.split()))


def columns(text: str) -> int:
    """Columns a terminal gives the text: two for wide East Asian characters, none for combining ones."""
    return len(text) if text.isascii() else sum(map(_columns, text))


@lru_cache(maxsize=4096)
def _columns(character: str) -> int:
    if unicodedata.category(character) in ("Mn", "Me"):
        return 0
    return 2 if unicodedata.east_asian_width(character) in ("W", "F") else 1


def left(text: str, width: int) -> str:
    """Text at the left of a field."""
    return text + " " * max(0, width - columns(text))


def right(text: str, width: int) -> str:
    """Text at the right of a field."""
    return " " * max(0, width - columns(text)) + text


def clipped(text: str, width: int) -> str:
    """Text that fits a field; where something was cut off, an ellipsis says so."""
    if columns(text) <= width:
        return text
    return _head(text, max(0, width - 1)).rstrip() + "…"


def _head(text: str, width: int) -> str:
    used = 0
    for index, character in enumerate(text):
        used += _columns(character)
        if used > width:
            return text[:index]
    return text


def wrapped(text: str, width: int) -> list[str]:
    """Lines of at most `width` columns, at least one; broken at spaces, though not between a number and its unit."""
    width = max(8, width)
    lines: list[str] = []
    line = ""
    for word in _NUMBER_AND_UNIT.sub(_TIED, text).split(" "):
        word = word.replace(_TIED, " ")
        if line and columns(line) + 1 + columns(word) <= width:
            line += " " + word
            continue
        if line:
            lines.append(line.rstrip())
        while columns(word) > width:
            piece = _head(word, width) or word[0]
            lines.append(piece)
            word = word[len(piece) :]
        line = word
    return [*lines, line] if line or not lines else lines


def equation(text: str, width: int) -> list[str]:
    """A chain of equalities over lines that break before an equals sign where they can.

    Where a clause defines a symbol, an equals sign need not be one of the chain, and the lines are simply filled.
    """
    if columns(text) <= width:
        return [text]
    if any(word in text for word in (" with ", " from ", " where ")):
        return wrapped(text.replace(" = ", f" ={_TIED}"), width)
    first, *rest = text.split(" = ")
    steps = [first, *(f"= {step}" for step in rest)]
    lines: list[str] = []
    for step in steps:
        if lines and columns(lines[-1]) + 1 + columns(step) <= width:
            lines[-1] += f" {step}"
        else:
            lines += wrapped(step, width)
    return lines


def hung(label: str, lines: Sequence[str], indent: int, field: int) -> list[str]:
    """Lines behind a label of a fixed field, the later ones below the first."""
    margin = " " * indent
    return [f"{margin}{left(label if not number else '', field)}{line}" for number, line in enumerate(lines)]


def para(text: str, width: int, indent: int) -> list[str]:
    """A paragraph whose later lines stand two columns further in, so that none can pass for a line of its own."""
    first, *rest = wrapped(text, width - indent)
    if rest:
        first, *rest = wrapped(text, width - indent - 2)
    return [" " * indent + first, *(" " * (indent + 2) + line for line in rest)]


def listed(items: Iterable[str], width: int) -> list[str]:
    """Items with commas between, broken over lines between items where they fit on one."""
    lines: list[str] = []
    width -= 1  # room for the comma at the end of a line
    for item in items:
        if columns(item) > width:
            lines += wrapped((f"{lines.pop()}, " if lines else "") + item, width)
            continue
        if lines and columns(lines[-1]) + 2 + columns(item) <= width:
            lines[-1] += f", {item}"
            continue
        if lines:
            lines[-1] += ","
        lines.append(item)
    return lines


def rows(table: Sequence[Sequence[str]], width: int, indent: int) -> list[str]:
    """Rows with the first column at the left and the others at the right of their fields.

    Where a first column is too long for the page, the others stand on the line below it.
    """
    cells = [max(map(columns, column)) for column in zip(*(row[1:] for row in table), strict=True)]
    room = width - indent - sum(cells) - 2 * len(cells)
    name = min(room, max((columns(row[0]) for row in table), default=0))
    lines: list[str] = []
    for first, *rest in table:
        numbers = "".join("  " + right(text, cell) for text, cell in zip(rest, cells, strict=True)).rstrip()
        if columns(first) <= name:
            lines.append(f"{' ' * indent}{left(first, name)}{numbers}".rstrip())
        else:
            lines += para(first, width, indent)
            lines.append(" " * (indent + max(0, name)) + numbers)
    return lines


@dataclass(frozen=True, slots=True)
class Paint:
    """Colour as an extra: off, it gives every text back unchanged. Nothing is told by colour alone."""

    on: bool = False

    def _in(self, codes: str, text: str) -> str:
        return f"\x1b[{codes}m{text}\x1b[0m" if self.on and text else text

    def strong(self, text: str) -> str:
        """A heading."""
        return self._in("1", text)

    def faint(self, text: str) -> str:
        """Where something stands."""
        return self._in("2", text)

    def word(self, word: str, text: str = "") -> str:
        """A severity or a result in its colour. `text` is what is printed, padded perhaps; else the word itself."""
        codes = {
            "major": "1;31",
            "held": "1;31",
            "not solved": "1;31",
            "not held": "33",
            "minor": "33",
            "observation": "36",
            "clear": "32",
        }.get(word)
        return self._in(codes, text or word) if codes else text or word
