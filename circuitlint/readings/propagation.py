"""Uncertainty of results that follow from several readings: first order, and by seeded Monte Carlo.

What is read at one moment in repeated sets forms a group, whose means vary together (type A). Everything an instrument's
statement adds (type B) is a contribution of its own. Groups and contributions are independent of each other.
"""

from __future__ import annotations

import math
from collections.abc import Callable, Mapping
from dataclasses import dataclass, field

import numpy as np

from circuitlint.physics.uncertainty import coverage_factor, rectangular, type_a
from circuitlint.si import RealArray
from circuitlint.sources import Source

FIRST_ORDER = Source("JCGM 100", "5.2.2 and H.2, sensitivities and covariances; G.4, effective degrees of freedom", "2008")
MONTE_CARLO = Source("JCGM 101", "6.4.2, 6.4.9 and 7, distributions drawn and quantiles taken; 8, comparison", "2008")
SEED = 101
TRIALS = 40_000
SHARE = 0.95
NEAR = 0.1
"""Share of the standard uncertainty by which ends of intervals may differ and still agree."""
MANY = 1e5
"""Degrees of freedom that are as good as infinite."""
MOST_LOST = 0.01
"""Share of Monte Carlo trials without a result beyond which no interval is stated."""

Model = Callable[[Mapping[str, RealArray]], Mapping[str, RealArray]]


@dataclass(frozen=True, slots=True)
class Group:
    """Means of quantities read together, with the covariance of the means and its degrees of freedom."""

    names: tuple[str, ...]
    covariance: RealArray
    degrees: int


@dataclass(frozen=True, slots=True)
class Contribution:
    """A contribution to one input and where it comes from: rectangular of half-width `half`, or normal of that deviation."""

    name: str
    half: float
    why: str
    normal: bool = False

    @property
    def uncertainty(self) -> float:
        """Standard uncertainty."""
        return self.half if self.normal else rectangular(self.half)


@dataclass(slots=True)
class InputSet:
    """Input values by name with everything that is known of their uncertainty."""

    values: dict[str, float] = field(default_factory=dict)
    groups: list[Group] = field(default_factory=list)
    contributions: list[Contribution] = field(default_factory=list)
    unknown: set[str] = field(default_factory=set)
    """Inputs whose accuracy is not stated."""

    def repeat(self, sets: Mapping[str, RealArray]) -> None:
        """Take in simultaneous sets: one array of n observations for each quantity. One observation has no spread."""
        names = tuple(sets)
        table = np.column_stack([sets[name] for name in names])
        self.values.update(zip(names, map(float, table.mean(axis=0)), strict=True))
        if len(table) > 1:
            self.groups.append(Group(names, type_a(table).covariance, len(table) - 1))

    def spread(self, name: str) -> float:
        """Standard uncertainty of one input from all that is known."""
        square = sum(one.covariance[one.names.index(name), one.names.index(name)] for one in self.groups if name in one.names)
        return math.sqrt(float(square) + sum(one.uncertainty**2 for one in self.contributions if one.name == name))

    def covariance(self) -> RealArray:
        """Covariance of all inputs in their order."""
        order = {name: at for at, name in enumerate(self.values)}
        whole = np.zeros((len(order), len(order)))
        for group in self.groups:
            rows = [order[name] for name in group.names]
            whole[np.ix_(rows, rows)] += group.covariance
        for one in self.contributions:
            whole[order[one.name], order[one.name]] += one.uncertainty**2
        return whole


@dataclass(frozen=True, slots=True)
class Outcome:
    """One result: value, standard uncertainty, and the interval that holds it with the stated share.

    `degrees` is None where effective degrees of freedom are not valid; `by` says what the interval rests on.
    """

    value: float
    uncertainty: float
    degrees: float | None
    low: float
    high: float
    by: str
    sampled_uncertainty: float | None
    agree: bool
    lost: float
    budget: tuple[tuple[str, float], ...]
    """Share of each input in the variance, largest first."""


@dataclass(frozen=True, slots=True)
class Outcomes:
    """Results by name, and the correlation of each with each."""

    results: dict[str, Outcome]
    correlation: dict[tuple[str, str], float]


def evaluate(model: Model, inputs: InputSet, seed: int = SEED, trials: int = TRIALS, share: float = SHARE) -> Outcomes:
    """Results of a model with their uncertainties. `model` takes and gives arrays by name and must hold for arrays.

    The interval stated is that of Monte Carlo (probabilistically symmetric), since rectangular contributions and curved
    models are then treated as they are; where sampling lost trials no interval is stated. Effective degrees of freedom are
    given where the sampled interval lies evenly about the value, since only a result that is nearly linear in independent
    contributions has them.
    Sources: JCGM 100:2008; JCGM 101:2008.
    """
    at = {name: np.asarray([value]) for name, value in inputs.values.items()}
    with np.errstate(all="ignore"):
        middle = {name: float(value[0]) for name, value in model(at).items()}
        columns = _sensitivities(model, inputs, middle)
        sampled = model(_draws(inputs, seed, trials))
        names = list(middle)
        whole = columns @ inputs.covariance() @ columns.T
        results = {
            name: _outcome(name, row, middle[name], columns[row], float(whole[row, row]), inputs,
                           np.broadcast_to(np.asarray(sampled[name], dtype=float), (trials,)), share)
            for row, name in enumerate(names)
        }
    spread = np.sqrt(np.maximum(np.diag(whole), 0.0))
    correlation = {
        (one, other): float(whole[i, j] / (spread[i] * spread[j]))
        for i, one in enumerate(names) for j, other in enumerate(names)
        if i < j and spread[i] > 0.0 and spread[j] > 0.0 and math.isfinite(whole[i, j])
    }
    return Outcomes(results, correlation)


def _sensitivities(model: Model, inputs: InputSet, middle: Mapping[str, float]) -> RealArray:
    """Central differences, all inputs at once: shape (results, inputs)."""
    names = list(inputs.values)
    values = np.array([inputs.values[name] for name in names])
    steps = np.cbrt(np.finfo(float).eps) * np.maximum(np.abs(values), [inputs.spread(name) for name in names])
    steps[steps == 0.0] = 1e-9
    both = np.column_stack([values[:, None] + np.diag(steps), values[:, None] - np.diag(steps)])
    found = model({name: both[row] for row, name in enumerate(names)})
    count = len(names)
    table = [np.broadcast_to(np.asarray(found[name], dtype=float), (2 * count,)) for name in middle]
    return np.array([(one[:count] - one[count:]) / (2.0 * steps) for one in table])


def _draws(inputs: InputSet, seed: int, trials: int) -> dict[str, RealArray]:
    random = np.random.default_rng(seed)
    drawn = {name: np.full(trials, value) for name, value in inputs.values.items()}
    for group in inputs.groups:
        # A mean of n sets is drawn from the scaled t of n - 1 degrees of freedom (JCGM 101, 6.4.9.2), one scale for the group.
        scale = np.sqrt(group.degrees / random.chisquare(group.degrees, trials))
        values, vectors = np.linalg.eigh(group.covariance)
        root = vectors * np.sqrt(np.maximum(values, 0.0))
        moved = (root @ random.standard_normal((len(group.names), trials))) * scale
        for row, name in enumerate(group.names):
            drawn[name] = drawn[name] + moved[row]
    for one in inputs.contributions:
        error = random.normal(0.0, one.half, trials) if one.normal else random.uniform(-one.half, one.half, trials)
        drawn[one.name] = drawn[one.name] + error
    return drawn


def _outcome(
    name: str, row: int, value: float, column: RealArray, variance: float, inputs: InputSet, sampled: RealArray, share: float
) -> Outcome:
    uncertainty = math.sqrt(max(variance, 0.0))
    kept = sampled[np.isfinite(sampled)]
    lost = 1.0 - len(kept) / len(sampled)
    parts = _parts(column, inputs)
    degrees = _degrees(uncertainty, parts)
    budget: dict[str, float] = {}
    for label, part, _ in parts:
        budget[label] = budget.get(label, 0.0) + (part**2 / variance if variance > 0.0 else 0.0)
    ranked = tuple(sorted(budget.items(), key=lambda pair: -pair[1]))
    finite = math.isfinite(value) and math.isfinite(uncertainty)
    half = coverage_factor(max(degrees, 1.0), share) * uncertainty if finite else math.nan
    if not finite or lost > MOST_LOST:
        return Outcome(value, uncertainty, None, math.nan, math.nan, "", None, False, lost, ranked)
    low, high = (float(one) for one in np.quantile(kept, [(1.0 - share) / 2.0, (1.0 + share) / 2.0]))
    # JCGM 101, 8.1: ends that differ by no more than one digit of a standard uncertainty told with one; and what chance adds.
    near = NEAR * uncertainty + 3.0 * _scatter(kept, share)
    agree = abs(value - half - low) <= near and abs(value + half - high) <= near
    linear = abs((low + high) / 2.0 - value) <= near
    heavy = any(group.degrees <= 2 for group in inputs.groups)
    spread = None if heavy else float(kept.std(ddof=1))
    return Outcome(value, uncertainty, degrees if linear and degrees < MANY else None, low, high,
                   "Monte Carlo, probabilistically symmetric", spread, agree, lost, ranked)


def _scatter(kept: RealArray, share: float) -> float:
    """Standard error of the ends of the interval, from the density of the draws about them."""
    tail = (1.0 - share) / 2.0
    step = tail / 5.0
    inner, outer, first, last = np.quantile(kept, [tail + step, tail - step, 1.0 - tail - step, 1.0 - tail + step])
    width = max(float(inner - outer), float(last - first)) / (2.0 * step)
    return width * math.sqrt(tail * (1.0 - tail) / len(kept))


def _parts(column: RealArray, inputs: InputSet) -> list[tuple[str, float, float]]:
    """Contributions c · u to a result: label, size, degrees of freedom. A group counts as one."""
    order = {name: at for at, name in enumerate(inputs.values)}
    parts = []
    for group in inputs.groups:
        own = column[[order[name] for name in group.names]]
        parts.append(("spread of the sets", math.sqrt(max(float(own @ group.covariance @ own), 0.0)), float(group.degrees)))
    for one in inputs.contributions:
        parts.append((f"{one.name}: {one.why}", abs(float(column[order[one.name]])) * one.uncertainty, math.inf))
    return parts


def _degrees(uncertainty: float, parts: list[tuple[str, float, float]]) -> float:
    weighted = sum(size**4 / degrees for _, size, degrees in parts)
    return uncertainty**4 / weighted if weighted > 0.0 else math.inf
