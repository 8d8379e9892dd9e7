"""The grammar of numbers with tolerances: text in, plain floats and unit texts out. It knows no units.

A number has an optional sign, digits, an optional decimal point with digits, an optional exponent. There is no arithmetic, no
digit grouping and no decimal comma. IEC 60062 writes a letter in place of the point: `4k7`, `2R2`,
`100n`, from milliohm up for resistances, from pico to milli for the others.
"""

from __future__ import annotations

import math
import re
from dataclasses import dataclass
from typing import Literal, TypeAlias

LONGEST = 160
NUMBER = r"(?:[0-9]+(?:\.[0-9]+)?|\.[0-9]+)(?:[eE][+-]?[0-9]{1,3})?"
_UNIT = r"[^0-9\s.,;:±+\-*!?=<>(){}\[\]'\"\\|&@#$~`_][^\s±+\-*!?=<>(){}\[\]'\"\\|&@#$~`_,;:]*"
_VALUE = re.compile(rf"\s*(?P<number>[+-]?{NUMBER})\s*(?P<unit>{_UNIT})?\s*")
_RANGE = re.compile(rf"\s*(?P<low>[+-]?{NUMBER})\s*\.\.\s*(?P<high>[+-]?{NUMBER})\s*(?P<unit>{_UNIT})?\s*")
_EVEN = re.compile(rf"\s*(?:±|\+-|\+/-)\s*(?P<both>{NUMBER})\s*(?P<unit>{_UNIT})?\s*")
_PLUS_MINUS = re.compile(rf"\s*\+\s*(?P<up>{NUMBER})\s*/\s*-\s*(?P<down>{NUMBER})\s*(?P<unit>{_UNIT})?\s*")
_MINUS_PLUS = re.compile(rf"\s*-\s*(?P<down>{NUMBER})\s*/\s*\+\s*(?P<up>{NUMBER})\s*(?P<unit>{_UNIT})?\s*")
_LETTERED = re.compile(r"\s*(?P<whole>[0-9]*)(?P<letter>[A-Za-zµμ])(?P<rest>[0-9]*)\s*")
_COMMA = re.compile(r"[0-9]\s*,\s*[0-9]")

POWERS = {"p": -12, "n": -9, "u": -6, "µ": -6, "μ": -6, "m": -3, "k": 3, "K": 3, "M": 6, "G": 9}
"""IEC 60062 letters as powers of ten; the dimension's own letter stands for one."""

Why: TypeAlias = Literal["empty", "long", "comma", "not finite", "grammar", "reversed"]


@dataclass(frozen=True, slots=True)
class Stated:
    """A number with its tolerance, as written: `up` and `down` are shares where `percent`, else in `tolerance_unit`."""

    number: float
    unit: str
    up: float = 0.0
    down: float = 0.0
    tolerance_unit: str = ""
    percent: bool = False
    ends: tuple[float, float] | None = None
    lettered: bool = False


class NotANumber(Exception):
    """The text follows no form of the grammar; `why` says which way it fails."""

    def __init__(self, why: Why) -> None:
        self.why = why
        super().__init__(why)


def parse(text: str, letter: str = "") -> Stated:
    """Read a number with its unit and tolerance. `letter` is the IEC 60062 letter of the wanted dimension, if it has one.

    Raises NotANumber.
    """
    if not text.strip():
        raise NotANumber("empty")
    if len(text) > LONGEST:
        raise NotANumber("long")
    if found := _RANGE.fullmatch(text):
        low, high = _float(found["low"]), _float(found["high"])
        if low > high:
            raise NotANumber("reversed")
        return Stated((low + high) / 2.0, found["unit"] or "", ends=(low, high))
    if letter and (lettered := _lettered(text, letter)):
        number, rest = lettered
        return _with_tolerance(number, "", rest, text, lettered=True)
    if found := _VALUE.match(text):
        return _with_tolerance(_float(found["number"]), found["unit"] or "", text[found.end():], text)
    raise NotANumber(_why(text))


def _with_tolerance(number: float, unit: str, rest: str, text: str, lettered: bool = False) -> Stated:
    if not rest.strip():
        return Stated(number, unit, lettered=lettered)
    for form in (_EVEN, _PLUS_MINUS, _MINUS_PLUS):
        if found := form.fullmatch(rest):
            groups = found.groupdict()
            up, down = _float(groups.get("both") or groups["up"]), _float(groups.get("both") or groups["down"])
            tolerance_unit = found["unit"] or ""
            return Stated(number, unit, up, down, tolerance_unit, tolerance_unit == "%", lettered=lettered)
    raise NotANumber(_why(text))


def _lettered(text: str, letter: str) -> tuple[float, str] | None:
    """A number in IEC 60062 notation and the text behind it; None where the text is not of that kind."""
    head = re.match(r"\s*[0-9]*[A-Za-zµμ][0-9]*(?=\s|±|\+|-|$)", text)
    if head is None:
        return None
    found = _LETTERED.fullmatch(head[0])
    if found is None or not (found["whole"] or found["rest"]):
        return None
    power = 0 if found["letter"] == letter else POWERS.get(found["letter"])
    if power is None or (letter == "R" and power < -3) or (letter != "R" and power > -3):
        return None
    return _float(f"{found['whole'] or '0'}.{found['rest'] or '0'}e{power}"), text[head.end():]


def _float(digits: str) -> float:
    value = float(digits)
    if not math.isfinite(value):
        raise NotANumber("not finite")
    return value


def _why(text: str) -> Why:
    if _COMMA.search(text):
        return "comma"
    if re.match(r"\s*[+-]?\s*(nan|inf|infinity)\b", text, re.IGNORECASE):
        return "not finite"
    return "grammar"
