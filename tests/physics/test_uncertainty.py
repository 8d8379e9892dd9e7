"""Uncertainty against the GUM's own worked example, its supplement, and a general-purpose library."""

from __future__ import annotations

import math
import statistics

import numpy as np
import pytest
import uncertainties  # type: ignore[import-untyped]
from hypothesis import given
from hypothesis import strategies as st
from scipy.stats import t as student
from uncertainties import umath

from circuitlint.physics.uncertainty import (
    Estimates,
    Sampled,
    acceptance_limit,
    coverage_factor,
    decide,
    effective_degrees_of_freedom,
    expanded,
    monte_carlo,
    propagate,
    rectangular,
    triangular,
    type_a,
)
from circuitlint.si import RealArray

# JCGM 100:2008, annex H.2, table H.2 (read): volt, milliampere, radian.
OBSERVED = [
    [5.007, 19.663, 1.0456],
    [4.994, 19.639, 1.0438],
    [5.005, 19.640, 1.0468],
    [4.990, 19.685, 1.0428],
    [4.999, 19.678, 1.0433],
]


def resistance_reactance_impedance(at: RealArray) -> RealArray:
    voltage, milliampere, angle = at
    impedance = voltage / (milliampere * 1e-3)
    return np.array([impedance * math.cos(angle), impedance * math.sin(angle), impedance])


def test_means_and_correlations_of_the_gum_come_out_as_printed() -> None:
    found = type_a(OBSERVED)
    # Table H.2 as printed.
    assert found.values == pytest.approx([4.9990, 19.6610, 1.04446], abs=0.5e-4)
    assert found.uncertainties[0] == pytest.approx(0.0032, abs=0.5e-4)
    assert found.uncertainties[1] == pytest.approx(0.0095, abs=0.5e-4)
    assert found.uncertainties[2] == pytest.approx(0.00075, abs=0.5e-5)
    assert found.correlation[0, 1] == pytest.approx(-0.36, abs=0.005)
    assert found.correlation[0, 2] == pytest.approx(0.86, abs=0.005)
    assert found.correlation[1, 2] == pytest.approx(-0.65, abs=0.005)


def test_resistance_reactance_and_impedance_of_the_gum_come_out_as_printed() -> None:
    found = propagate(resistance_reactance_impedance, type_a(OBSERVED))
    # Tables H.3 and H.4 as printed; the uncertainty of the reactance is printed 0.295 and 0.296.
    assert found.values == pytest.approx([127.732, 219.847, 254.260], abs=0.0006)
    assert found.uncertainties == pytest.approx([0.071, 0.2955, 0.236], abs=0.0006)
    assert found.correlation[0, 1] == pytest.approx(-0.588, abs=0.0006)
    assert found.correlation[0, 2] == pytest.approx(-0.485, abs=0.0006)
    assert found.correlation[1, 2] == pytest.approx(0.993, abs=0.0006)


def test_the_second_approach_of_the_gum_agrees_with_the_first() -> None:
    sets = [resistance_reactance_impedance(np.array(row)) for row in OBSERVED]
    found = type_a(sets)
    assert found.values == pytest.approx([127.732, 219.847, 254.260], abs=0.0006)
    assert found.uncertainties == pytest.approx([0.071, 0.295, 0.236], abs=0.0006)


def test_leaving_correlation_out_overstates_the_resistance_of_the_gum() -> None:
    full = type_a(OBSERVED)
    without = Estimates(full.values, full.uncertainties, np.eye(3))
    overstated = propagate(resistance_reactance_impedance, without).uncertainties[0]
    assert overstated == pytest.approx(0.194, abs=0.0006)  # recomputed from the printed table


def test_propagation_agrees_with_the_uncertainties_library() -> None:
    full = type_a(OBSERVED)
    voltage, milliampere, angle = uncertainties.correlated_values(full.values, full.covariance)
    impedance = voltage / (milliampere * 1e-3)
    theirs = [impedance * umath.cos(angle), impedance * umath.sin(angle), impedance]
    found = propagate(resistance_reactance_impedance, full)
    assert found.uncertainties == pytest.approx([one.std_dev for one in theirs], rel=1e-6)
    assert found.covariance == pytest.approx(np.array(uncertainties.covariance_matrix(theirs)), rel=1e-6)


def test_one_quantity_and_an_input_without_doubt_are_taken() -> None:
    alone = type_a([[1.0], [2.0], [3.0]])
    assert alone.values == pytest.approx([2.0])
    assert alone.uncertainties == pytest.approx([1.0 / math.sqrt(3.0)])
    exact = Estimates(np.array([2.0, 0.0]), np.array([0.1, 0.0]), np.eye(2))
    assert propagate(lambda at: at[0] + 5.0 * at[1], exact).uncertainties == pytest.approx([0.1])
    assert type_a([[1.0], [2.0]]).uncertainties == pytest.approx([0.5])
    with pytest.raises(ValueError, match="at least two"):
        type_a([[1.0, 2.0]])


def test_half_widths_become_standard_uncertainties() -> None:
    assert rectangular(math.sqrt(3.0)) == pytest.approx(1.0)
    assert triangular(math.sqrt(6.0)) == pytest.approx(1.0)


def test_effective_degrees_of_freedom_follow_the_smallest_and_the_largest_case() -> None:
    assert effective_degrees_of_freedom([1.0], [4.0]) == pytest.approx(4.0)
    assert effective_degrees_of_freedom([1.0, 1.0], [4.0, 4.0]) == pytest.approx(8.0)
    assert effective_degrees_of_freedom([1.0, 1.0], [4.0, math.inf]) == pytest.approx(16.0)
    assert effective_degrees_of_freedom([1.0], [math.inf]) == math.inf
    assert effective_degrees_of_freedom([1e-4, 1e-4], [4.0, 4.0]) == pytest.approx(8.0)


def test_the_end_gauge_of_the_gum_has_sixteen_degrees_of_freedom() -> None:
    # JCGM 100:2008, annex H.1 (value from memory): contributions in nm 25, 9.7, 2.9, 16.6 with 18, 25.6, 50, 2 degrees.
    assert effective_degrees_of_freedom([25.0, 9.7, 2.9, 16.6], [18.0, 25.6, 50.0, 2.0]) == pytest.approx(16.7, abs=0.5)


# JCGM 100:2008, table G.2 (value from memory): Student's factors for 90, 95, 95.45 and 99 %.
@pytest.mark.parametrize(
    ("degrees", "factors"),
    [
        (1.0, [6.31, 12.71, 13.97, 63.66]),
        (4.0, [2.13, 2.78, 2.87, 4.60]),
        (10.0, [1.81, 2.23, 2.28, 3.17]),
        (16.0, [1.75, 2.12, 2.17, 2.92]),
        (50.0, [1.68, 2.01, 2.05, 2.68]),
        (math.inf, [1.645, 1.960, 2.000, 2.576]),
    ],
)
def test_coverage_factors_are_those_of_the_gum(degrees: float, factors: list[float]) -> None:
    found = [coverage_factor(degrees, share) for share in (0.90, 0.95, 0.9545, 0.99)]
    assert found == pytest.approx(factors, abs=0.00501)


@given(st.integers(1, 100_000), st.floats(0.01, 0.9999))
def test_coverage_factors_agree_with_scipy(degrees: int, share: float) -> None:
    theirs = float(student.ppf((1.0 + share) / 2.0, degrees))
    assert coverage_factor(float(degrees), share) == pytest.approx(theirs, rel=1e-6)


@pytest.mark.parametrize("degrees", [1001, 1500, 20_000])
@pytest.mark.parametrize("share", [0.5, 0.9, 0.95, 0.9545, 0.99])
def test_coverage_factors_keep_their_digits_with_many_degrees_of_freedom(degrees: int, share: float) -> None:
    theirs = float(student.ppf((1.0 + share) / 2.0, degrees))
    assert coverage_factor(float(degrees), share) == pytest.approx(theirs, rel=1e-8)


def test_degrees_of_freedom_are_cut_to_whole_ones() -> None:
    assert coverage_factor(16.7) == coverage_factor(16.0) > coverage_factor(17.0)


def test_the_expanded_uncertainty_of_the_end_gauge_is_the_one_printed() -> None:
    # JCGM 100:2008, annex H.1 (value from memory): 32 nm with 16 degrees of freedom make 93 nm at 99 %.
    assert expanded(32.0, 16.0, 0.99) == pytest.approx(93.0, abs=0.5)
    assert expanded(1.0) == pytest.approx(1.96, abs=0.005)


@pytest.mark.parametrize(("degrees", "share"), [(0.5, 0.95), (math.nan, 0.95), (4.0, 0.0), (4.0, 1.0), (4.0, math.nan)])
def test_a_coverage_that_cannot_be_is_refused(degrees: float, share: float) -> None:
    with pytest.raises(ValueError, match="at least one degree of freedom"):
        coverage_factor(degrees, share)


def four(shape: str, trials: int = 400_000) -> tuple[float, tuple[float, float]]:
    def draw(random: np.random.Generator, count: int) -> list[RealArray]:
        half = math.sqrt(3.0)
        return [random.normal(size=count) if shape == "normal" else random.uniform(-half, half, count) for _ in range(4)]

    found = monte_carlo(lambda *parts: sum(parts), draw, seed=7, trials=trials)
    return found.uncertainty, found.interval()


# JCGM 101:2008, 9.2, tables 2 and 3 (read): standard uncertainty 2.0, ends of the 95 % interval ±3.92 and ±3.88.
@pytest.mark.parametrize(("shape", "end"), [("normal", 3.92), ("rectangular", 3.88)])
def test_the_additive_model_of_the_supplement_comes_out_as_printed(shape: str, end: float) -> None:
    uncertainty, (low, high) = four(shape)
    assert uncertainty == pytest.approx(2.0, abs=0.02)
    assert [low, high] == pytest.approx([-end, end], abs=0.03)


def test_a_skewed_result_gets_the_shortest_interval_printed_for_it() -> None:
    # NPL DEM-ES-011, table 9.2 (read): logarithm of a rectangular input from 0.1 to 1.1.
    found = monte_carlo(np.log, lambda random, count: [random.uniform(0.1, 1.1, count)], seed=3, trials=400_000)
    assert found.mean == pytest.approx(-0.665, abs=0.005)
    assert found.uncertainty == pytest.approx(0.606, abs=0.005)
    low, high = found.shortest_interval()
    assert low == pytest.approx(-1.895, abs=0.01)
    assert high == pytest.approx(0.095, abs=0.002)
    plain_low, plain_high = found.interval()
    assert high - low < plain_high - plain_low


def test_the_shortest_interval_of_a_few_values_is_the_one_counted_by_hand() -> None:
    few = Sampled(3.2, 3.9, np.array([0.0, 1.0, 2.0, 3.0, 10.0]))
    # JCGM 101:2008, 7.7: whole part of 0.6 · 5 + 1/2 is 3, so the ends lie three values apart.
    assert few.shortest_interval(0.6) == (0.0, 3.0)
    assert few.shortest_interval(0.75) == (0.0, 10.0)
    assert few.shortest_interval(0.999) == (0.0, 10.0)


def test_the_spread_of_a_few_trials_is_that_of_a_sample() -> None:
    found = monte_carlo(lambda one: one, lambda random, count: [np.array([1.0, 2.0, 4.0])], seed=1, trials=3)
    assert found.mean == pytest.approx(7.0 / 3.0)
    assert found.uncertainty == pytest.approx(statistics.stdev([1.0, 2.0, 4.0]))


def test_the_same_seed_gives_the_same_figures() -> None:
    assert four("normal", 1000) == four("normal", 1000)


def test_a_guard_band_moves_the_limit_and_four_statements_are_told_apart() -> None:
    assert acceptance_limit(10.0, 1.0) == 9.0
    verdicts = [decide(value, 10.0, 1.0) for value in (8.9, 9.5, 10.0, 10.5, 11.5)]
    assert verdicts == ["pass", "conditional pass", "conditional pass", "conditional fail", "fail"]
    assert [decide(value, 10.0, 0.0) for value in (10.0, 10.001)] == ["pass", "fail"]


@pytest.mark.parametrize("numbers", [(math.nan, 10.0, 1.0), (9.0, math.nan, 1.0), (9.0, 10.0, math.nan), (9.0, 10.0, -1.0)])
def test_a_missing_number_never_passes(numbers: tuple[float, float, float]) -> None:
    with pytest.raises(ValueError, match="a decision needs"):
        decide(*numbers)
