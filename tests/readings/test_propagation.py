"""Propagation held against the `uncertainties` package, closed forms and Student's table."""

from __future__ import annotations

import math

import numpy as np
import pytest
import uncertainties
from uncertainties import umath

from circuitlint.readings.methods import method_for
from circuitlint.readings.propagation import Contribution, Group, InputSet, evaluate

SETS = {"voltage": np.array([229.6, 229.9, 229.5, 229.7]), "current": np.array([1.962, 1.966, 1.961, 1.963]),
        "power": np.array([96.8, 97.1, 96.7, 96.9])}


def test_correlated_readings_propagate_as_an_independent_package_has_it() -> None:
    inputs = InputSet()
    inputs.repeat(SETS)
    inputs.values["frequency"] = 50.0
    inputs.contributions = [Contribution("voltage", 2.0, "meter"), Contribution("frequency", 0.1, "meter")]
    out = evaluate(method_for(set(inputs.values), False, False).model, inputs, trials=1000)
    covariance = np.zeros((4, 4))
    covariance[:3, :3] = np.cov(np.vstack([SETS["voltage"], SETS["current"], SETS["power"]])) / 4
    covariance[0, 0] += 2.0**2 / 3
    covariance[3, 3] = 0.1**2 / 3
    means = [float(one.mean()) for one in SETS.values()] + [50.0]
    u, i, p, f = uncertainties.correlated_values(means, covariance)
    angle = umath.acos(p / (u * i))
    wanted = {"resistance": p / i**2, "reactance": u / i * umath.sin(angle), "power-factor": p / (u * i),
              "inductance": u / i * umath.sin(angle) / (2 * math.pi * f), "reactive-power": u * i * umath.sin(angle)}
    for name, value in wanted.items():
        assert out.results[name].value == pytest.approx(value.nominal_value, rel=1e-9)
        assert out.results[name].uncertainty == pytest.approx(value.std_dev, rel=1e-6)
    joint = uncertainties.correlation_matrix([wanted["resistance"], wanted["reactance"]])[0][1]
    assert out.correlation["resistance", "reactance"] == pytest.approx(joint, rel=1e-5)


def test_core_loss_told_apart_propagates_as_an_independent_package_has_it() -> None:
    inputs = InputSet({"voltage": 100.0, "current": 2.0, "power": 60.0, "resistance": 9.0, "core_split": 1.0})
    halves = {"voltage": 0.5, "current": 0.01, "power": 0.5, "resistance": 0.05}
    inputs.contributions = [Contribution(name, half, "meter") for name, half in halves.items()]
    out = evaluate(method_for(set(inputs.values), False, False).model, inputs, trials=1000)
    i, p, r = (uncertainties.ufloat(inputs.values[n], halves[n] / math.sqrt(3)) for n in ("current", "power", "resistance"))
    wanted = p - i**2 * r
    assert out.results["core-loss"].value == pytest.approx(wanted.nominal_value, rel=1e-9)
    assert out.results["core-loss"].uncertainty == pytest.approx(wanted.std_dev, rel=1e-6)
    # Z = R + Rc in parallel with jX: put together again from what was told apart.
    conductance, reactance = out.results["core-conductance"].value, out.results["magnetising-reactance"].value
    whole = 9.0 + 1.0 / (conductance + 1.0 / (1j * reactance))
    assert abs(whole) == pytest.approx(50.0, rel=1e-9)
    assert whole.real == pytest.approx(15.0, rel=1e-9)


def test_one_rectangular_contribution_is_covered_as_the_closed_form_has_it() -> None:
    # The middle 95 % of a rectangle is 0.95 of its half-width; the normal factor would give 1.13.
    inputs = InputSet({"x": 10.0}, contributions=[Contribution("x", 1.0, "meter")])
    out = evaluate(lambda v: {"y": 3.0 * v["x"]}, inputs, trials=200_000).results["y"]
    assert (out.low, out.high) == pytest.approx((30.0 - 2.85, 30.0 + 2.85), abs=0.02)
    assert not out.agree and out.degrees is None


@pytest.mark.parametrize(("count", "factor"), [(3, 4.303), (5, 2.776), (11, 2.228)])
def test_few_sets_widen_the_interval_as_students_table_has_it(count: int, factor: float) -> None:
    # Student's t for 95 %, printed in JCGM 100:2008, table G.2.
    random = np.random.default_rng(1)
    inputs = InputSet()
    inputs.repeat({"x": random.normal(10.0, 0.1, count)})
    out = evaluate(lambda v: {"y": 2.0 * v["x"]}, inputs, trials=200_000).results["y"]
    assert (out.high - out.low) / 2.0 / out.uncertainty == pytest.approx(factor, rel=0.03)
    if out.degrees is not None:
        assert out.degrees == pytest.approx(count - 1)


def test_effective_degrees_of_freedom_follow_the_guides_formula_where_groups_are_independent() -> None:
    # JCGM 100:2008, G.4.1: u^4 / sum(u_i^4 / v_i), here with 4 and infinitely many degrees of freedom.
    inputs = InputSet({"a": 1.0, "b": 2.0}, groups=[Group(("a",), np.array([[0.04]]), 4)],
                      contributions=[Contribution("b", 0.2, "certificate", normal=True)])
    out = evaluate(lambda v: {"y": v["a"] + v["b"]}, inputs, trials=200_000).results["y"]
    assert out.degrees == pytest.approx(0.08**2 / (0.04**2 / 4))


def test_draws_that_are_not_physical_are_counted_and_leave_no_interval() -> None:
    # A power factor of nearly one with a wide power: a part of the draws lies above volts times amperes.
    inputs = InputSet({"voltage": 230.0, "current": 1.0, "power": 229.0})
    inputs.contributions = [Contribution("power", 5.0, "meter")]
    out = evaluate(method_for(set(inputs.values), False, False).model, inputs, trials=10_000).results["reactance"]
    assert out.lost == pytest.approx(0.4, abs=0.03)
    assert math.isnan(out.low) and out.degrees is None


def test_the_same_seed_gives_the_same_interval() -> None:
    inputs = InputSet()
    inputs.repeat(SETS)
    model = method_for(set(inputs.values), False, False).model
    assert evaluate(model, inputs, 7, 1000) == evaluate(model, inputs, 7, 1000)
    assert evaluate(model, inputs, 7, 1000) != evaluate(model, inputs, 8, 1000)
