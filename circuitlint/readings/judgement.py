"""How a measured value stands to a predicted range and to a limit, with its uncertainty.

Four-way statements and guard bands after ILAC-G8:09/2019 and JCGM 106:2012: the interval of the value decides whether a
statement is beyond doubt. The decision rule says what is accepted: `simple` by the value alone, `guarded` only where the
whole interval conforms.
"""

from __future__ import annotations

import math
from typing import Literal, TypeAlias

from circuitlint.readings.record import Agreement, DecisionRule, LimitJudged, Measured, Statement
from circuitlint.review.record import Check
from circuitlint.sources import Source

DECISION = Source("ILAC-G8", "4, decision rules; binary and non-binary statements", "09/2019")
Sense: TypeAlias = Literal["at least", "at most"]
PROBABILITY = Source("JCGM 106", "conformity assessment with measurement uncertainty", "2012", known="value from memory")


def agreement(low: float | None, high: float | None, value: float, predicted: tuple[float, float, float] | None) -> Agreement:
    """How a value with its interval lies to a predicted range; `not assessed` where one of them is missing."""
    if predicted is None or low is None or high is None or not all(map(math.isfinite, (value, low, high, *predicted))):
        return "not assessed"
    _, least, most = predicted
    if least <= value <= most:
        return "inside" if least <= low and high <= most else "inside, with doubt"
    return "outside" if high < least or low > most else "outside, with doubt"


def deviation(value: float, uncertainty: float, predicted: tuple[float, float, float]) -> float | None:
    """Distance from the middle of the prediction, whose range is taken as rectangular, over both standard uncertainties."""
    _, low, high = predicted
    both = math.hypot(uncertainty, (high - low) / math.sqrt(12.0))
    return (value - (low + high) / 2.0) / both if both > 0.0 and math.isfinite(both) else None


def statement(value: float, low: float | None, high: float | None, limit: float, sense: Sense) -> Statement:
    """Which of four statements a value earns against a limit; `not assessed` where its interval is not known."""
    if low is None or high is None or not all(map(math.isfinite, (value, low, high, limit))):
        return "not assessed"
    least = sense == "at least"
    if (value >= limit) if least else (value <= limit):
        return "conforms" if ((low >= limit) if least else (high <= limit)) else "conforms, with doubt"
    return "nonconforming" if ((high < limit) if least else (low > limit)) else "nonconforming, with doubt"


def accepted(made: Statement, rule: DecisionRule) -> bool:
    """Whether the decision rule accepts a statement."""
    return made == "conforms" or (rule == "simple" and made == "conforms, with doubt")


def judge(check: Check, measured: Measured, rule: DecisionRule) -> LimitJudged:
    """A review check judged again with a measured value. The check must have a limit and a sense."""
    assert check.limit is not None and check.sense != ""
    made = statement(measured.value, measured.low, measured.high, check.limit.value, check.sense)
    return LimitJudged(
        check=check.id, rule=check.rule, figure=check.figure, of=check.of, state=check.state, sense=check.sense,
        dimension=check.dimension, limit=check.limit.value, value=measured.value, low=measured.low, high=measured.high,
        statement=made, accepted=accepted(made, rule), reviewed=check.result,
        why=measured.why if made == "not assessed" else "",
    )
