"""The grammar of numbers with tolerances: text in, exact decimals and unit texts out. It knows no units.

A number has an optional sign, digits, an optional point with digits, an optional exponent. There is no arithmetic, no digit
grouping, no decimal comma, and a zero stands before the point (as the SI brochure, 9th edition, 5.4.4 prints numbers).

    number unit                        24 V
    number unit ± number unit          24 V ± 5 %, 21 ohm +- 0.2 ohm
    number unit +number/-number unit   230 V +10/-6 %, 24 V -15/+10 %
    number .. number unit              18..22 ohm, 500 mA..2 A
    number (number .. number) unit     20 (18..24) ohm
    4k7, 2R2, 100n                     IEC 60062, with or without a tolerance
"""

from __future__ import annotations

import re
import unicodedata
from dataclasses import dataclass
from decimal import Context, Decimal

LONGEST = 200
EXACT = Context(prec=240, Emin=-99999, Emax=99999)
"""Sums of written numbers are exact in this context: no text is long enough to need more digits."""

LETTERS: dict[str, dict[str, int]] = {
    "R": {"m": -3, "R": 0, "k": 3, "K": 3, "M": 6, "G": 9, "T": 12},
    "F": {"p": -12, "n": -9, "u": -6, "\u00b5": -6, "\u03bc": -6, "m": -3, "F": 0},
    "H": {"n": -9, "u": -6, "\u00b5": -6, "\u03bc": -6, "m": -3, "H": 0},
}
"""Letters that stand in place of the point, as powers of ten: IEC 60062 for R and F, the same habit for H."""

_S = "[ \u00a0\u2009\u202f]*"
_N = r"[0-9]+(?:\.[0-9]+)?(?:[eE][+-]?[0-9]+)?"
_NAME = "(?:[A-Za-z\u00b5\u03bc\u03a9\u2126\u00b0\u2103][A-Za-z0-9\u00b5\u03bc\u03a9\u2126\u00b0\u2103\u00b2\u00b3^]*|%)"
_U = f"{_NAME}(?:[/\u00b7\u22c5]{_NAME})*"
_TO = f"{_S}(?:\\.\\.\\.?|\u2026){_S}"

UNIT = re.compile(_U)
_VALUE = re.compile(f"{_S}(?P<n>[+-]?{_N}){_S}(?P<u>{_U})?{_S}")
_RANGE = re.compile(f"{_S}(?P<n1>[+-]?{_N}){_S}(?P<u1>{_U})?{_TO}(?P<n2>[+-]?{_N}){_S}(?P<u2>{_U})?{_S}")
_WITHIN = re.compile(f"{_S}(?P<n>[+-]?{_N}){_S}\\({_S}(?P<n1>[+-]?{_N}){_TO}(?P<n2>[+-]?{_N}){_S}\\){_S}(?P<u>{_U})?{_S}")
_LETTERED = re.compile(f"{_S}(?P<whole>[0-9]*)(?P<letter>[A-Za-z\u00b5\u03bc])(?P<rest>[0-9]*){_S}(?=[±+-]|$)")
_TOLERANCES = (
    re.compile(f"(?:±|\\+-|\\+/-){_S}(?P<up>{_N}){_S}(?P<u>{_U})?{_S}"),
    re.compile(f"\\+{_S}(?P<up>{_N}){_S}(?P<u1>{_U})?{_S}/{_S}-{_S}(?P<down>{_N}){_S}(?P<u>{_U})?{_S}"),
    re.compile(f"-{_S}(?P<down>{_N}){_S}(?P<u1>{_U})?{_S}/{_S}\\+{_S}(?P<up>{_N}){_S}(?P<u>{_U})?{_S}"),
)


@dataclass(frozen=True, slots=True)
class Term:
    """A written number and the unit text behind it, which may be empty."""

    number: Decimal
    unit: str


@dataclass(frozen=True, slots=True)
class Stated:
    """What a text states: a nominal term (None for a bare range), with both ends, or both tolerances, or neither.

    `lettered`: the nominal number stands in IEC 60062 notation and is already in the coherent unit.
    """

    nominal: Term | None
    ends: tuple[Term, Term] | None = None
    down: Term | None = None
    up: Term | None = None
    lettered: bool = False


class NotANumber(Exception):
    """The text follows no form of the grammar: `why`, and `instead` the texts that may have been meant."""

    def __init__(self, why: str, instead: tuple[str, ...] = ()) -> None:
        self.why = why
        self.instead = instead
        super().__init__(why)


def parse(text: str, letter: str = "") -> Stated:
    """Take a text apart by the grammar above. `letter` is the IEC 60062 letter of the wanted dimension, if it has one.

    Raises NotANumber.
    """
    if len(text) > LONGEST:
        raise NotANumber(f"it has {len(text)} characters, more than {LONGEST}")
    plain = text.replace("\u2212", "-")
    if letter and (found := _LETTERED.match(plain)) and (number := _lettered(found, letter)) is not None:
        stated = _with_tolerance(Term(number, ""), plain[found.end():], lettered=True)
    elif (ranged := ".." in plain or "…" in plain) and (found := _RANGE.fullmatch(plain)):
        unit = found["u2"] or ""
        stated = Stated(None, (_term(found["n1"], found["u1"] or unit), _term(found["n2"], unit)))
    elif ranged and (found := _WITHIN.fullmatch(plain)):
        nominal, low, high = (_term(found[name], found["u"] or "") for name in ("n", "n1", "n2"))
        stated = Stated(nominal, (low, high))
    elif found := _VALUE.match(plain):
        stated = _with_tolerance(_term(found["n"], found["u"] or ""), plain[found.end():])
    else:
        raise _refusal(text)
    if stated is None:
        raise _refusal(text)
    return stated


def _term(number: str, unit: str) -> Term:
    exponent = number.lower().partition("e")[2].lstrip("+-")
    if len(exponent) > 4:
        raise NotANumber("its exponent is beyond every magnitude")
    return Term(Decimal(number), unit)


def _lettered(found: re.Match[str], letter: str) -> Decimal | None:
    power = LETTERS[letter].get(found["letter"])
    if power is None or not (found["whole"] or found["rest"]):
        return None
    return Decimal(f"{found['whole'] or '0'}.{found['rest'] or '0'}e{power}")


def _with_tolerance(nominal: Term, rest: str, lettered: bool = False) -> Stated | None:
    if not rest:
        return Stated(nominal, lettered=lettered)
    for form in _TOLERANCES:
        if found := form.fullmatch(rest):
            groups = found.groupdict()
            last = groups["u"] or ""
            first = groups.get("u1") or last
            if "down" not in groups:
                both = _term(groups["up"], last)
                return Stated(nominal, None, both, both, lettered)
            leads = found.start("up") < found.start("down")
            up = _term(groups["up"], first if leads else last)
            down = _term(groups["down"], last if leads else first)
            return Stated(nominal, None, down, up, lettered)
    return None


def _refusal(text: str) -> NotANumber:
    """Why a text is not taken, in the order in which a person would look for it."""
    if not text.strip():
        return NotANumber("the text is empty")
    if any(unicodedata.category(one) in ("Cc", "Cf", "Cs", "Co", "Cn", "Zl", "Zp") for one in text):
        return NotANumber("it holds a character that does not print")
    if any(one.isnumeric() and not one.isascii() and one not in "²³" for one in text):
        return NotANumber("it holds digits other than 0 to 9")
    if re.match(r"\s*[+-]?\s*(?:nan|inf|infinity)\b", text, re.IGNORECASE):
        return NotANumber("the number is not finite")
    if re.search(r"[0-9],[0-9]", text):
        comma = re.compile(r"(?<=[0-9]),(?=[0-9])")
        grouping = re.search(r"(?<![0-9])[1-9][0-9]{0,2},[0-9]{3}(?![0-9])", text)
        grouped = (comma.sub("", text),) if grouping else ()
        return NotANumber("a decimal comma; the decimal sign is a point", (comma.sub(".", text), *grouped))
    if re.search("[0-9][_'’ \u00a0\u2009\u202f][0-9]", text):
        return NotANumber("digits are not grouped", (re.sub("(?<=[0-9])[_'’ \u00a0\u2009\u202f](?=[0-9])", "", text),))
    if re.search(r"(?:^|[^0-9.])\.[0-9]", text):
        return NotANumber("no digit before the point", (re.sub(r"(^|[^0-9.])\.(?=[0-9])", r"\g<1>0.", text),))
    if re.search(r"[0-9]\s*(?:[*/^+-]|\*\*)\s*[0-9]", text):
        return NotANumber("nothing is calculated; it does not follow number, unit, tolerance")
    return NotANumber("it does not follow number, unit, tolerance")


def shown(value: float, digits: int) -> str:
    """A number to so many significant digits, without an exponent where a person would write none; never minus zero."""
    if abs(value) < 1e-12:
        return "0"
    size = magnitude(value, digits)
    if -4 <= size < 7:
        return f"{value:.{max(0, digits - 1 - size)}f}"
    return f"{value:.{digits - 1}e}"


def magnitude(value: float, digits: int) -> int:
    """The power of ten of the first digit, after rounding to so many significant digits; 0 for zero."""
    return int(f"{value:.{digits - 1}e}".partition("e")[2])


def written(value: float, power: int) -> str:
    """Every digit of a float divided by a power of ten, so that reading it back with that power gives the same float."""
    number = Decimal(repr(value)).scaleb(-power).normalize()
    if not number:
        return "0"
    return f"{number:f}" if -5 <= number.adjusted() < 9 else str(number)
