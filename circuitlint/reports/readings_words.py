"""Words and numbers of a record of readings, alike in every report."""

from __future__ import annotations

import math

from circuitlint.quantity import show, show_range
from circuitlint.readings.record import Agreement, CircuitReadings, Evidence, LimitJudged, Measured, ReadingsRecord
from circuitlint.reports.words import MINUS, amount, bound, counted, minus
from circuitlint.si import DIMENSIONS

NAMES = {
    "impedance-angle": "phase angle", "direct-current-resistance": "resistance, direct current",
    "reference-resistance": "resistance at 20 °C", "bridge-inductance": "inductance, bridge",
    "magnetising-reactance": "reactance beside the core loss", "core-conductance": "core conductance",
    "voltage-drop-share": "share of voltage lost on the way",
}
STANDS: dict[Agreement, str] = {
    "inside": "as predicted", "inside, with doubt": "as predicted, with doubt", "outside, with doubt": "beside it, with doubt",
    "outside": "beside the prediction", "not assessed": "not assessed",
}
RULES = {
    "simple": "by the value alone; up to half of the values at a limit are then accepted wrongly",
    "guarded": "with the uncertainty as guard band; only what conforms beyond doubt is accepted",
}


def spoken(name: str) -> str:
    """A result's name as running text."""
    return NAMES.get(name, name.replace("-", " ").replace("_", " "))


def with_uncertainty(value: float, uncertainty: float | None, dimension: str) -> str:
    """`127.732(71) Ω`: the value with its standard uncertainty in units of its last digits (JCGM 100:2008, 7.2.2).

    Without an uncertainty to four digits, and an uncertainty beyond the value is told in full.
    """
    known = DIMENSIONS[dimension]
    plain = show(value, known)
    if uncertainty is None or not math.isfinite(uncertainty) or uncertainty <= 0.0 or value == 0.0:
        return minus(plain)
    number, gap, unit = plain.partition(" ")
    if not gap and plain.endswith("°"):
        number, gap, unit = plain[:-1], "", "°"
    scale = _scale_of(value, number)
    if scale is None or uncertainty >= abs(value):
        return f"{minus(plain)}, u = {minus(show(uncertainty, known, 2))}"
    shown, spread = value / scale, uncertainty / scale
    places = max(0, 1 - math.floor(math.log10(spread)))
    digits = round(spread * 10**places)
    if digits >= 100:
        places, digits = max(places - 1, 0), round(spread * 10 ** max(places - 1, 0))
    return minus(f"{shown:.{places}f}({digits}){gap}{unit}")


def _scale_of(value: float, number: str) -> float | None:
    """What one unit of the printed number is worth: a power of ten, or the factor of an everyday unit."""
    try:
        printed = float(number)
    except ValueError:
        return None
    ratio = value / printed if printed else 0.0
    power = 10.0 ** round(math.log10(ratio)) if ratio > 0.0 else 0.0
    if power and abs(ratio / power - 1.0) < 0.01:
        return power
    angle = math.pi / 180.0
    return angle if abs(ratio / angle - 1.0) < 0.01 else None


def interval(one: Measured | LimitJudged) -> str:
    """The coverage interval, or a dash."""
    if one.low is None or one.high is None:
        return "—"
    return _span(one.low, one.high, one.dimension, one.name if isinstance(one, Measured) else one.figure)


def _span(low: float, high: float, dimension: str, name: str) -> str:
    if "share" in name:
        return minus(f"{100.0 * low:.3g} to {100.0 * high:.3g} %")
    return minus(show_range(low, high, DIMENSIONS[dimension])).replace("..", "to")


def predicted(one: Measured) -> str:
    """The predicted range, or a dash."""
    if one.predicted is None:
        return "—"
    return _span(one.predicted[1], one.predicted[2], one.dimension, one.name)


def limit_of(one: LimitJudged) -> str:
    """`≤ 10 A`."""
    return bound(one.sense, one.limit, one.dimension, one.figure)


def evidence(one: Evidence) -> str:
    """`reactance, steady: read 95.8 Ω; 96.0 Ω if so, 113 Ω as defined`."""
    name, _, state = one.what.partition(", ")
    return (f"{spoken(name)}, {state}: read {amount(one.read, one.dimension)}; {amount(one.expected, one.dimension)} if so, "
            f"{amount(one.without, one.dimension)} as defined ({sigmas(one.away)} against {sigmas(one.away_without)})")


def sigmas(away: float) -> str:
    """A distance in standard uncertainties: `+0.3 u`."""
    return f"{away:+.1f} u".replace("-", MINUS) if abs(away) < 999.5 else f"{'+' if away > 0 else MINUS}{abs(away):.0e} u"


def result(record: ReadingsRecord) -> str:
    """The whole in a sentence."""
    judged = [limit for one in record.circuits for limit in one.limits]
    refused = sum(not one.accepted for one in judged)
    doubt = sum(one.departs is None for one in record.circuits)
    departing = sum(one.departs is True for one in record.circuits)
    parts = [f"{counted(len(record.readings), 'reading')} of {counted(len(record.circuits), 'circuit')}",
             f"{counted(len(judged), 'limit')} judged again" + (f", {refused} not accepted" if refused else "")]
    if departing:
        parts.append(f"{counted(departing, 'circuit departs', 'circuits depart')} from the prediction")
    if doubt:
        parts.append(f"{counted(doubt, 'circuit')} not looked into")
    if record.not_read:
        parts.append(f"{counted(len(record.not_read), 'circuit')} not read")
    return f"{'Held' if record.held else 'Not held'}: {'; '.join(parts)}."


def certainty(one: CircuitReadings) -> str:
    """What the first explanation is worth, in words."""
    first = one.explanations[0]
    return {
        "explains it alone": "Of the explanations considered only this one tells all the readings.",
        "explains it best": "This one tells the readings best; the others listed cannot be set aside.",
        "explains it too": "Several explanations tell the readings about as well; more must be read to part them.",
        "directly read": "This was read directly.",
    }[first.certainty]
