"""Text of the page. Everything that comes from a record passes `escape` on its way into the page.

`escape` takes markup and quotes out of the language, turns line ends and tabs into spaces, and shows whatever would
steer a reader's eye or a program (control characters, marks of writing direction, characters of no width) by its code
point.
"""

from __future__ import annotations

import math
import re
import unicodedata
from functools import lru_cache

from circuitlint.quantity import show
from circuitlint.si import DIMENSIONS

MINUS = "−"
NOT_A_NUMBER = "not a number"

_STEERING = ("Cc", "Cf", "Cs", "Zl", "Zp")


class _Characters(dict[int, str | int]):
    """What stands for each character, found out once."""

    def __missing__(self, code: int) -> str | int:
        made: str | int = code
        if unicodedata.category(chr(code)) in _STEERING:
            made = f"‹U+{code:04X}›"
        self[code] = made
        return made


_CHARACTERS = _Characters({
    ord("&"): "&amp;", ord("<"): "&lt;", ord(">"): "&gt;", ord('"'): "&quot;", ord("'"): "&#39;",
    ord("\n"): " ", ord("\r"): " ", ord("\t"): " ",
})  # fmt: skip


def escape(text: str) -> str:
    """Text of a record as text of the page, for element content and for attributes in double quotes."""
    return text.translate(_CHARACTERS)


def shortened(text: str, longest: int) -> str:
    """Text cut to a number of characters, the cut shown by an ellipsis. Not escaped."""
    return text if len(text) <= longest else text[: longest - 1].rstrip() + "…"


@lru_cache(maxsize=100_000)
def quantity(value: float | None, dimension: str, digits: int = 4) -> str:
    """A magnitude with its unit, escaped; `not a number` where it is not finite, empty where there is none."""
    if value is None:
        return ""
    if not math.isfinite(value):
        return NOT_A_NUMBER
    known = DIMENSIONS.get(dimension)
    if known is None:
        return escape(f"{value:.{digits}g} {dimension}").replace("-", MINUS)
    return escape(show(value, known, digits)).replace("-", MINUS)


_IDLE_ZEROS = re.compile(r"(\.\d*?)0+(?!\d)")


def stated(value: float, dimension: str) -> str:
    """A round magnitude that somebody set, such as a limit, without idle zeros: `0.85`, `11.5 V`. Escaped."""
    return _IDLE_ZEROS.sub(lambda found: found[1].rstrip("."), quantity(value, dimension, 6))


def percent(share: float, signed: bool = True) -> str:
    """A share as per cent: `+12.5 %`, `−3.0 %`; one digit after the point, none from a hundred on."""
    if not math.isfinite(share):
        return NOT_A_NUMBER
    hundred = 100.0 * share
    text = f"{hundred:+.0f}" if abs(hundred) >= 99.95 else f"{hundred:+.1f}"
    return (text if signed else text.lstrip("+")).replace("-", MINUS) + " %"


def count(number: int, one: str, many: str = "") -> str:
    """`1 finding`, `3 findings`."""
    return f"{number} {one if number == 1 else many or one + 's'}"


_HYPHENATED = re.compile(r"\b(switch|stuck|in|full|half|worst|one)[-_](on|off|open|line|load|scale|case)\b")


def plain(name: str) -> str:
    """A trade word of the record as running text: `minimum-power-factor` to `minimum power factor`. Not escaped.

    Words that the trade itself writes with a hyphen keep it: `switch-on-peak` to `switch-on peak`.
    """
    return _HYPHENATED.sub("\\1\x00\\2", name).replace("-", " ").replace("_", " ").replace("\x00", "-")


def words(name: str) -> str:
    """The same, escaped."""
    return escape(plain(name))


def sentence(text: str) -> str:
    """Text with a capital first; nothing else is changed. Not escaped."""
    return text[:1].upper() + text[1:]


def isolated(text: str) -> str:
    """Text of a record inside a line of ours: escaped, and kept from turning the writing direction of what follows."""
    return f"<bdi>{escape(text)}</bdi>"
