"""Words and numbers that several reports print alike: amounts with units, margins, places, counts, standing."""

from __future__ import annotations

import math
import re
from collections.abc import Sequence

from circuitlint.quantity import show
from circuitlint.reports.terminal import printable, prose
from circuitlint.review.record import Check, FormulaRecord, Input, Place, SourceRecord
from circuitlint.si import ANGLE, DIMENSIONS, RATIO

MINUS = "−"
SENSE = {"at least": "≥", "at most": "≤", "": ""}
_SYMBOL = re.compile(r"\{([^{}]*)\}")


def amount(value: float, dimension: str, name: str = "", digits: int = 4) -> str:
    """A magnitude with its unit: `14.2 V`. A ratio whose figure is called a share is a percentage: `5.2 %`."""
    if not math.isfinite(value):
        return "no number"
    known = DIMENSIONS.get(dimension)
    if known is None:
        return minus(f"{value:.{digits}g} {printable(dimension)}")
    if known is RATIO and "share" in name:
        return minus(f"{rounded(100.0 * value, digits)} %")
    if value != 0.0 and not 1e-30 < abs(value) < 1e30:
        return minus(f"{value:.{digits - 1}e} {known.symbol}".rstrip())
    return minus(show(value, known, digits))


def rounded(value: float, digits: int) -> str:
    """A number to so many significant digits, without an exponent where that reads well."""
    if value == 0.0:
        return "0"
    if not 1e-4 <= abs(value) < 1e7:
        return f"{value:.{digits - 1}e}"
    places = max(0, digits - 1 - math.floor(math.log10(abs(value))))
    return f"{value:.{places}f}"


def minus(text: str) -> str:
    """The sign the trade prints for less, in the place of a hyphen before a digit."""
    return re.sub(r"(?<![\w])-(?=\d)", MINUS, text)


def percent(share: float | None) -> str:
    """A margin or a change with its sign: `+12.5 %`, `−81.7 %`; a dash where there is none."""
    if share is None or not math.isfinite(share):
        return "—"
    hundred = 100.0 * share
    if abs(hundred) >= 1e6:
        text = f"{hundred:+.0e}" if math.isfinite(hundred) else f"{share:+.0e} ×100"
    else:
        text = f"{hundred:+.{0 if abs(hundred) >= 999.5 else 1}f}"
    return f"{text.replace('-', MINUS)} %"


def spoken(name: str) -> str:
    """A name of the record as running text: `power-factor` to `power factor`."""
    return printable(name).replace("_", " ").replace("-", " ").replace("switch on", "switch-on")


def place_of(place: Place) -> str:
    """`file:line:column`, as editors and terminals know it."""
    return printable(f"{place.file}:{place.line}:{place.column}")


def counted(number: int, one: str, many: str = "") -> str:
    """`1 circuit`, `2,000 circuits`."""
    return f"{number:,} {one if number == 1 else many or one + 's'}"


def subject(check: Check) -> str:
    """What a check looks at: `voltage drop share of cable[0], steady`."""
    figure = spoken(check.figure) if check.figure else ""
    of = printable(check.of)
    named = f"{figure} of {of}" if figure and of else figure or of
    return f"{named}, {printable(check.state)}" if named and check.state else named or printable(check.state)


def standing(check: Check) -> str:
    """How a check stands, in words: `below the limit (circuit) at nominal values`."""
    side = "below" if check.sense == "at least" else "above"
    limit = f"the limit ({spoken(check.limit.name)})" if check.limit is not None else "the limit"
    if check.result == "not assessed":
        return "could not be assessed"
    if check.basis == "nominal":
        return f"{side} {limit} at nominal values"
    if check.basis == "worst case":
        return f"{side} {limit} in the worst case"
    if check.basis == "near the limit":
        return f"within {limit}, close to it in the worst case"
    return "nonconforming" if check.result == "nonconforming" else f"within {limit}"


def limit_of(check: Check) -> str:
    """`≤ 11.5 V`; empty where the check has no limit."""
    return bound(check.sense, check.limit.value, check.limit.dimension, check.figure) if check.limit is not None else ""


def bound(sense: str, value: float, dimension: str, name: str = "") -> str:
    """A limit with its sense: `≥ 0.9`, `≤ 5 %`. It was stated, not measured, so that no noughts stand at its end."""
    text = re.sub(r"(\.\d*?)0+(?=\D|$)", r"\1", amount(value, dimension, name))
    return f"{SENSE.get(sense, '')} {re.sub(r'[.](?=[^0-9]|$)', '', text)}".strip()


def symbolic(formula: FormulaRecord) -> str:
    """The equation as a person writes it: `Z = √(R² + X²)`."""
    return printable(f"{formula.result} = {_SYMBOL.sub(lambda match: match[1], formula.equation)}")


def numbers_in(formula: FormulaRecord, inputs: Sequence[Input]) -> str:
    """The right-hand side with numbers in the places of its symbols: `√((21 Ω)² + (113.1 Ω)²)`.

    A list of numbers stands where a symbol takes several. A symbol nothing was put into stays as it is.
    """
    values: dict[str, list[str]] = {}
    for one in inputs:
        values.setdefault(one.symbol, []).append(number_of(one))

    def put(match: re.Match[str]) -> str:
        found = values.get(match[1])
        if found is None:
            return match[1]
        if len(found) > 1:
            return f"[{'; '.join(found)}]"
        powered = formula.equation[match.end() : match.end() + 1] in ("²", "³", "^")
        return f"({found[0]})" if powered or " ∠ " in found[0] or found[0].startswith(MINUS) else found[0]

    return printable(_SYMBOL.sub(put, formula.equation))


def number_of(one: Input) -> str:
    """An input's number; a phasor as magnitude and angle, `2 A ∠ 79.1°`."""
    shown = amount(one.value, one.dimension, one.what)
    return shown if one.angle is None else f"{shown} ∠ {amount(one.angle, ANGLE.name)}"


def citation(source: SourceRecord) -> str:
    """A source as a person cites it, with how the value is known where it was not read."""
    work = f"{source.work}:{source.edition}" if source.edition else source.work
    known = f"({source.known})" if source.known != "read" else ""
    named = ", ".join(part for part in (work, source.place) if part)
    return prose(f"{named} {known}{f'; {source.note}' if source.note else ''}")
