"""What readings that depart from the prediction may mean: explanations ranked by how well each tells all readings.

Each explanation has an amount (how much warmer, how many turns) that is averaged over evenly; so one that could tell anything
earns less than one that tells just this. All are given the same weight beforehand. None is more than the best of those
considered, and where none tells the readings that is said.
"""

from __future__ import annotations

import math
from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass

import numpy as np

from circuitlint.readings import record as r
from circuitlint.readings.evaluation import DIMENSION_OF, Evaluated
from circuitlint.readings.ideas import Idea, ideas
from circuitlint.readings.prediction import Prediction
from circuitlint.readings.seeing import observed, winding_of
from circuitlint.readings.winding import Fit, Observed, Winding, chance, fit

RARE = 0.01
"""Chance below which readings are said to depart from the prediction, and below which an explanation does not tell them."""
FAR, NEAR = 20.0, 3.0
"""Ratios of weight: an explanation that much behind the best is set aside, or is behind."""
MOST = 5
NOT_LOOKED = "what the readings mean was not looked into"

@dataclass(frozen=True, slots=True)
class Verdict:
    """Whether readings depart from the prediction, and what that may mean."""

    departs: bool | None
    misfit: float | None
    explanations: tuple[r.Explanation, ...]
    told: str


def explain(found: Sequence[Evaluated], predictions: Mapping[str, Prediction], tag: str, place: str) -> Verdict:
    """What the readings of one coil mean together. Nothing is explained where nothing departs."""
    prediction = predictions[tag]
    winding = winding_of(prediction, place)
    if winding is None:
        return Verdict(None, None, (), f"{NOT_LOOKED}: the part is no coil whose resistance and inductance are both stated")
    seen = observed(found, prediction)
    if seen is None:
        return Verdict(None, None, (), f"{NOT_LOOKED}: no reading whose accuracy is known bears on it")
    plain = fit(seen, winding)
    misfit = chance(plain.distance, len(seen.values))
    forced = _beyond_band(found)
    if misfit >= RARE and not forced:
        told = f"the readings together are as predicted: chance alone brings them so far off in {_share(misfit)}"
        return Verdict(False, misfit, (), told)
    tried = ideas(found, prediction, seen, winding, predictions, tag, place)
    ranked = sorted((_weigh(idea, seen, winding) for idea in tried), key=lambda one: -one[1])
    made = tuple(_explanations(ranked, seen, plain))
    if not made:
        told = "the readings depart from the prediction, and none of the explanations considered tells them all"
    else:
        told = (f"the readings depart from the prediction: chance alone brings them so far off in {_share(misfit)}. "
                "What stands first is the likeliest of the explanations considered, not a proof")
    return Verdict(True, misfit, made, told)


def _share(chance_: float) -> str:
    return f"{100.0 * chance_:.2g} % of cases" if chance_ >= 1e-4 else "fewer than 1 in 10,000 cases"


def _beyond_band(found: Sequence[Evaluated]) -> bool:
    return any(one.agreement == "outside" and one.name in ("voltage", "frequency")
               for each in found for one in each.result.results)


def _weigh(idea: Idea, seen: Observed, winding: Winding) -> tuple[Idea, float, Fit, str]:
    """Log of the evidence averaged over the idea's amounts, and the amount that fits best, looked for between them too."""
    winding, seen = idea.stands_for or (winding, seen)
    fits = [fit(seen, winding, idea.cause(one)) for one in idea.amounts]
    logs = np.array([one.log_evidence for one in fits])
    at = int(np.argmax(logs))
    average = float(logs[at] + math.log(float(np.mean(np.exp(logs - logs[at])))))
    best, amount = fits[at], idea.amounts[at]
    if not idea.whole:
        low, high = idea.amounts[max(at - 1, 0)], idea.amounts[min(at + 1, len(fits) - 1)]
        for _ in range(3):
            tried = [float(one) for one in np.linspace(low, high, 9)]
            found = [fit(seen, winding, idea.cause(one)) for one in tried]
            here = int(np.argmax([one.log_evidence for one in found]))
            if found[here].log_evidence > best.log_evidence:
                best, amount = found[here], tried[here]
            low, high = tried[max(here - 1, 0)], tried[min(here + 1, 8)]
    return idea, average, best, idea.tell(amount)


def _explanations(ranked: Sequence[tuple[Idea, float, Fit, str]], seen: Observed, plain: Fit) -> Iterator[r.Explanation]:
    telling = [one for one in ranked if chance(one[2].distance, len(seen.values)) >= RARE]
    kept = [one for one in telling if one[1] >= telling[0][1] - math.log(FAR)][:MOST]
    for number, (idea, log, best, told) in enumerate(kept):
        alone = len(kept) == 1
        ahead = number == 0 and not alone and log - kept[1][1] > math.log(NEAR)
        yield r.Explanation(
            name=idea.name, what=idea.what, weight=math.exp(log - kept[0][1]), amount=told, check=idea.check,
            certainty="explains it alone" if alone else "explains it best" if ahead else "explains it too",
            evidence=tuple(_evidence(seen, plain, best)),
        )


def _evidence(seen: Observed, plain: Fit, best: Fit) -> Iterator[r.Evidence]:
    for number, name in enumerate(seen.names):
        away = float((seen.values[number] - best.expected[number]) / best.spread[number])
        without = float((seen.values[number] - plain.expected[number]) / plain.spread[number])
        standing: r.Standing = "neither"
        if abs(away) > 2.0 and abs(away) > abs(without):
            standing = "against"
        elif abs(without) - abs(away) > 1.0 and abs(away) <= 2.0:
            standing = "for"
        yield r.Evidence(what=name, dimension=DIMENSION_OF[name.partition(",")[0]].name, read=float(seen.values[number]),
                         expected=float(best.expected[number]), without=float(plain.expected[number]), away=away,
                         away_without=without, standing=standing)
