"""Uncertainty of measured and derived values, and decisions with it.

Plain functions over arrays: they hold for quantities of any dimension. Sources: JCGM 100:2008 (propagation, type A),
JCGM 101:2008 (Monte Carlo), ILAC-G8:09/2019 (decision rules).
"""

from __future__ import annotations

import math
from collections.abc import Callable, Sequence
from dataclasses import dataclass
from statistics import NormalDist
from typing import Literal

import numpy as np
from numpy.typing import ArrayLike

from circuitlint.si import RealArray

Decision = Literal["pass", "conditional pass", "conditional fail", "fail"]


@dataclass(frozen=True, slots=True)
class Estimates:
    """Values, their standard uncertainties, and the correlation of each with each."""

    values: RealArray
    uncertainties: RealArray
    correlation: RealArray

    @property
    def covariance(self) -> RealArray:
        """Covariance matrix of the values."""
        return self.correlation * np.outer(self.uncertainties, self.uncertainties)


def type_a(observations: ArrayLike) -> Estimates:
    """Means of repeated simultaneous observations, one row an observation, one column a quantity.

    The uncertainties are the standard deviations of the means. Raises ValueError with fewer than two observations.
    Source: JCGM 100:2008.
    """
    table = np.atleast_2d(np.asarray(observations, dtype=float))
    count = table.shape[0]
    if count < 2:
        raise ValueError("a spread needs at least two observations")
    covariance = np.atleast_2d(np.cov(table, rowvar=False)) / count
    return _estimates(table.mean(axis=0), covariance)


def _estimates(values: RealArray, covariance: RealArray) -> Estimates:
    spread = np.sqrt(np.diag(covariance))
    scale = np.outer(spread, spread)
    correlation = np.divide(covariance, scale, out=np.eye(len(spread)), where=scale > 0.0)
    return Estimates(values, spread, correlation)


def rectangular(half_width: float) -> float:
    """Standard uncertainty of a value anywhere within ± `half_width` alike. Source: JCGM 100:2008."""
    return half_width / math.sqrt(3.0)


def triangular(half_width: float) -> float:
    """Standard uncertainty of a value most likely in the middle of ± `half_width`. Source: JCGM 100:2008."""
    return half_width / math.sqrt(6.0)


def propagate(model: Callable[[RealArray], ArrayLike], inputs: Estimates) -> Estimates:
    """Results of a model and their covariance J · S · Jᵀ. `model` takes the values as one array and gives one or more.

    The sensitivities are central differences at a cube-root step, good to about ten digits for smooth models.
    Source: JCGM 100:2008.
    """
    at = np.asarray(inputs.values, dtype=float)
    results = np.atleast_1d(np.asarray(model(at), dtype=float))
    steps = np.cbrt(np.finfo(float).eps) * np.maximum(np.abs(at), inputs.uncertainties)
    columns = []
    for index, step in enumerate(steps):
        if step == 0.0:
            columns.append(np.zeros_like(results))
            continue
        above, below = at.copy(), at.copy()
        above[index] += step
        below[index] -= step
        rise = np.atleast_1d(np.asarray(model(above), dtype=float)) - np.atleast_1d(np.asarray(model(below), dtype=float))
        columns.append(rise / (above[index] - below[index]))
    sensitivities = np.column_stack(columns)
    return _estimates(results, sensitivities @ inputs.covariance @ sensitivities.T)


def effective_degrees_of_freedom(contributions: Sequence[float], degrees: Sequence[float]) -> float:
    """Degrees of freedom of a combined uncertainty from those of its uncorrelated contributions (each c · u).

    Infinite degrees of freedom are allowed. Source: JCGM 100:2008.
    """
    total = math.fsum(one**2 for one in contributions) ** 2
    weighted = math.fsum(one**4 / degree for one, degree in zip(contributions, degrees, strict=True))
    return total / weighted if weighted > 0.0 else math.inf


def coverage_factor(degrees: float, share: float = 0.95) -> float:
    """Student's factor that widens a standard uncertainty to hold `share` of the possible values.

    Degrees of freedom that are not whole are cut to the whole number below, as JCGM 100:2008, G.4.1 has it. Raises
    ValueError for less than one degree of freedom, and for a share that is not between 0 and 1.
    """
    if not 0.0 < share < 1.0 or not degrees >= 1.0:
        raise ValueError("a coverage factor needs a share between 0 and 1 and at least one degree of freedom")
    if degrees > 1000.0:  # the sum grows long; two terms of Fisher's expansion leave less than 1e-8
        normal = NormalDist().inv_cdf((1.0 + share) / 2.0)
        first = (normal**3 + normal) / 4.0
        second = (5.0 * normal**5 + 16.0 * normal**3 + 3.0 * normal) / 96.0
        return normal + first / degrees + second / degrees**2
    whole = math.floor(degrees)
    low, high = 0.0, math.pi / 2.0
    for _ in range(60):
        middle = (low + high) / 2.0
        low, high = (middle, high) if _within(middle, whole) < share else (low, middle)
    return math.tan(high) * math.sqrt(whole)


def _within(angle: float, degrees: int) -> float:
    """Share of Student's distribution within ± √degrees · tan(angle): a finite sum for whole degrees of freedom."""
    square = math.cos(angle) ** 2
    odd = degrees % 2
    term, total = (math.cos(angle), 0.0) if odd else (1.0, 0.0)
    for power in range(2 + odd, degrees + 1, 2):
        total += term
        term *= square * (power - 1.0) / power
    return 2.0 / math.pi * (angle + math.sin(angle) * total) if odd else math.sin(angle) * total


def expanded(uncertainty: float, degrees: float = math.inf, share: float = 0.95) -> float:
    """Half-width that holds `share` of the possible values. Raises as `coverage_factor`. Source: JCGM 100:2008, G.6.4."""
    return coverage_factor(degrees, share) * uncertainty


@dataclass(frozen=True, slots=True)
class Sampled:
    """Outcome of a Monte Carlo run: mean, standard uncertainty, and the values in rising order."""

    mean: float
    uncertainty: float
    values: RealArray

    def interval(self, share: float = 0.95) -> tuple[float, float]:
        """Interval that leaves equal shares on both sides."""
        low, high = np.quantile(self.values, [(1.0 - share) / 2.0, (1.0 + share) / 2.0])
        return float(low), float(high)

    def shortest_interval(self, share: float = 0.95) -> tuple[float, float]:
        """Shortest interval that holds the share; for skewed results. Source: JCGM 101:2008."""
        inside = min(int(share * len(self.values) + 0.5), len(self.values) - 1)
        widths = self.values[inside:] - self.values[: len(self.values) - inside]
        start = int(np.argmin(widths))
        return float(self.values[start]), float(self.values[start + inside])


def monte_carlo(
    model: Callable[..., ArrayLike],
    draw: Callable[[np.random.Generator, int], Sequence[RealArray]],
    seed: int,
    trials: int = 200_000,
) -> Sampled:
    """Distribution of a model's result. `draw` gives one array of `trials` values for each argument of `model`.

    The same seed gives the same result. Source: JCGM 101:2008.
    """
    values = np.sort(np.asarray(model(*draw(np.random.default_rng(seed), trials)), dtype=float))
    return Sampled(float(values.mean()), float(values.std(ddof=1)), values)


def acceptance_limit(limit: float, guard_band: float) -> float:
    """Limit a measured value is held against for an upper limit: `limit` less the guard band.

    With no guard band up to half of the values at the limit are accepted wrongly, with the expanded uncertainty below
    2.5 %. Source: ILAC-G8:09/2019.
    """
    return limit - guard_band


def decide(value: float, limit: float, expanded_uncertainty: float) -> Decision:
    """Which of four statements a measured value earns against an upper limit. Source: ILAC-G8:09/2019.

    Raises ValueError where a number is missing (NaN): no statement can be made.
    """
    if math.isnan(value) or math.isnan(limit) or not expanded_uncertainty >= 0.0:
        raise ValueError("a decision needs a value, a limit and an uncertainty that is not negative")
    if value <= limit:
        return "pass" if value <= limit - expanded_uncertainty else "conditional pass"
    return "conditional fail" if value <= limit + expanded_uncertainty else "fail"
