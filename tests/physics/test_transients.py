"""Closed forms of transients against a numerical integrator, and peaks against a sweep of every closing angle."""

from __future__ import annotations

import math
from collections.abc import Callable
from typing import Any

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from scipy.integrate import quad, solve_ivp
from scipy.optimize import brentq

from circuitlint.physics.coil_saturation import flux_linkage, saturated_energy, slope_inductance
from circuitlint.physics.conductor_warming import temperature_after
from circuitlint.physics.resistor_capacitor import capacitor_peak
from circuitlint.physics.switching_off import (
    clamp_energy,
    clamped_decay,
    peak_with_resistor,
    release_time,
    time_constant_with_resistor,
    unsuppressed_peak,
)
from circuitlint.physics.switching_on import (
    current_build_up,
    current_decay,
    switch_on_current,
    switch_on_factor,
    switch_on_peak,
)


def integrated(slope: Callable[[float, Any], Any], start: list[float], times: np.ndarray) -> np.ndarray:
    """A solution by scipy at given times, the first state only."""
    span = (float(times[0]), float(times[-1]))
    solution = solve_ivp(slope, span, start, t_eval=times, method="DOP853", rtol=1e-11, atol=1e-13)
    assert solution.success
    return np.asarray(solution.y[0])


TIMES = np.linspace(0.0, 0.06, 61)
RESISTANCE, INDUCTANCE, VOLTAGE = 21.0, 0.36, 24.0


def test_build_up_on_direct_current_follows_the_integrator() -> None:
    closed = current_build_up(time=TIMES, final=VOLTAGE / RESISTANCE, time_constant=INDUCTANCE / RESISTANCE)
    assert closed == pytest.approx(integrated(lambda t, i: (VOLTAGE - RESISTANCE * i) / INDUCTANCE, [0.0], TIMES), abs=1e-9)


def test_free_decay_follows_the_integrator() -> None:
    closed = current_decay(time=TIMES, initial=1.2, time_constant=INDUCTANCE / RESISTANCE)
    assert closed == pytest.approx(integrated(lambda t, i: -RESISTANCE * i / INDUCTANCE, [1.2], TIMES), abs=1e-9)


@pytest.mark.parametrize("angle", [0.0, 0.4, math.pi / 2.0, 2.9])
def test_switching_on_alternating_current_follows_the_integrator(angle: float) -> None:
    def slope(time: float, current: Any) -> Any:
        return (math.sqrt(2.0) * 230.0 * math.sin(100.0 * math.pi * time + angle) - RESISTANCE * current) / INDUCTANCE

    closed = switch_on_current(
        time=TIMES, voltage_rms=230.0, frequency=50.0, resistance=RESISTANCE, inductance=INDUCTANCE, closing_angle=angle
    )
    assert closed == pytest.approx(integrated(slope, [0.0], TIMES), abs=1e-8)


def swept_peak(ratio: float) -> float:
    """Largest current over the crest of the settled one, over all closing angles and the first two periods."""
    angles = np.linspace(0.0, math.pi, 181)[:, None]
    times = np.linspace(0.0, 0.04, 4001)
    reactance = 100.0
    currents = switch_on_current(
        time=times, voltage_rms=1.0, frequency=50.0, resistance=ratio * reactance,
        inductance=reactance / (100.0 * math.pi), closing_angle=angles,
    )  # fmt: skip
    return float(np.abs(currents).max()) * math.hypot(ratio * reactance, reactance) / math.sqrt(2.0)


# Crest factors found by a search of all closing angles, four decimals (derived).
CRESTS = {
    0.0: 2.0, 0.02: 1.9395, 0.05: 1.8566, 0.1: 1.7368, 0.2: 1.5503, 0.3: 1.4151, 0.5: 1.2418, 0.8: 1.1126, 1.0: 1.0694,
    2.0: 1.0078, 5.0: 1.0,
}  # fmt: skip


@pytest.mark.parametrize("ratio", CRESTS)
def test_crest_factors_are_the_tabled_ones(ratio: float) -> None:
    assert float(switch_on_factor(resistance=ratio, reactance=1.0)) == pytest.approx(CRESTS[ratio], abs=0.5e-4 * (1.0 + 1e-9))


@pytest.mark.parametrize("ratio", [1e-6, 0.02, 0.1, 0.3, 0.66, 1.0, 2.0, 5.0, 20.0])
def test_no_closing_angle_gives_a_higher_crest_and_one_gives_it(ratio: float) -> None:
    factor = float(switch_on_factor(resistance=ratio, reactance=1.0))
    swept = swept_peak(ratio)
    assert swept <= factor * (1.0 + 1e-9)
    assert swept == pytest.approx(factor, rel=2e-5)


# IEC 60909-0, fitted factor (value from memory): 1.02 + 0.98 · exp(−3 R / X), said to hold within 2 %.
@given(st.floats(1e-6, 1e3))
def test_the_crest_factor_lies_near_the_fitted_one_of_short_circuit_standards(ratio: float) -> None:
    fitted = 1.02 + 0.98 * math.exp(-3.0 * ratio)
    assert float(switch_on_factor(resistance=ratio, reactance=1.0)) == pytest.approx(fitted, abs=0.0201)


def test_the_crest_at_its_limits_is_right_and_a_capacitive_circuit_gives_nothing() -> None:
    assert float(switch_on_peak(current_rms=1.0, resistance=0.0, reactance=1.0)) == pytest.approx(2.0 * math.sqrt(2.0))
    assert float(switch_on_peak(current_rms=1.0, resistance=1.0, reactance=0.0)) == pytest.approx(math.sqrt(2.0))
    assert np.isnan(switch_on_factor(resistance=1.0, reactance=-1.0))
    assert np.isnan(switch_on_factor(resistance=1.0, reactance=math.nan))


@given(st.floats(1e-9, 1e6), st.floats(1e-9, 1e6))
def test_the_crest_factor_depends_on_the_ratio_alone_and_lies_between_one_and_two(one: float, other: float) -> None:
    factor = float(switch_on_factor(resistance=one, reactance=other))
    assert 1.0 <= factor <= 2.0 + 1e-12
    assert factor == pytest.approx(float(switch_on_factor(resistance=3.0 * one, reactance=3.0 * other)), rel=1e-9)


CLAMP, OPENING = 25.0, 0.5


# Forward voltage of a diode, a diode with a Zener diode, a varistor at the current of opening.
@pytest.mark.parametrize("clamp", [0.8, CLAMP, 68.0])
def test_decay_against_a_clamp_follows_the_integrator_and_stops_at_zero(clamp: float) -> None:
    end = INDUCTANCE / RESISTANCE * math.log1p(OPENING * RESISTANCE / clamp)
    times = np.linspace(0.0, end, 50)
    closed = clamped_decay(time=times, current=OPENING, clamp_voltage=clamp, inductance=INDUCTANCE, resistance=RESISTANCE)
    numeric = integrated(lambda t, i: (-RESISTANCE * i - clamp) / INDUCTANCE, [OPENING], times)
    assert closed == pytest.approx(numeric, abs=1e-9)
    later = clamped_decay(time=2.0 * end, current=OPENING, clamp_voltage=clamp, inductance=INDUCTANCE, resistance=RESISTANCE)
    assert later == 0.0


def test_decay_through_a_resistor_follows_the_integrator_and_starts_at_the_peak() -> None:
    parallel = 100.0
    constant = time_constant_with_resistor(inductance=INDUCTANCE, resistance=RESISTANCE, parallel_resistance=parallel)
    closed = current_decay(time=TIMES, initial=OPENING, time_constant=constant)
    numeric = integrated(lambda t, i: -(RESISTANCE + parallel) * i / INDUCTANCE, [OPENING], TIMES)
    assert closed == pytest.approx(numeric, abs=1e-9)
    peak = float(peak_with_resistor(supply=VOLTAGE, current=OPENING, parallel_resistance=parallel))
    assert peak == pytest.approx(VOLTAGE + parallel * numeric.max(), rel=1e-9)
    release = release_time(
        current=OPENING, drop_out_current=0.1, clamp_voltage=0.0, inductance=INDUCTANCE, resistance=RESISTANCE + parallel
    )
    assert math.exp(np.interp(float(release), TIMES, np.log(numeric))) == pytest.approx(0.1, rel=1e-6)


def test_without_suppressor_the_stray_capacitance_alone_sets_the_crest() -> None:
    capacitance, count = 2e-9, 4001
    quarter = math.pi / 2.0 * math.sqrt(INDUCTANCE * capacitance)

    def slope(time: float, state: Any) -> Any:
        voltage, current = state
        return [current / capacitance, -voltage / INDUCTANCE]

    crest = integrated(slope, [0.0, OPENING], np.linspace(0.0, 2.0 * quarter, count)).max()
    bound = float(unsuppressed_peak(current=OPENING, inductance=INDUCTANCE, stray_capacitance=capacitance))
    assert crest == pytest.approx(bound, rel=1e-6)


@given(st.floats(0.01, 0.49), st.floats(0.5, 500.0), st.floats(0.001, 5.0), st.floats(0.1, 500.0))
def test_release_time_is_when_the_decay_reaches_the_drop_out_current(
    drop_out: float, clamp: float, inductance: float, resistance: float
) -> None:
    time = float(release_time(
        current=OPENING, drop_out_current=drop_out, clamp_voltage=clamp, inductance=inductance, resistance=resistance
    ))  # fmt: skip
    left = clamped_decay(time=time, current=OPENING, clamp_voltage=clamp, inductance=inductance, resistance=resistance)
    assert float(left) == pytest.approx(drop_out, rel=1e-6, abs=1e-9)


def test_clamp_energy_is_the_integral_of_clamp_voltage_and_current() -> None:
    end = INDUCTANCE / RESISTANCE * math.log1p(OPENING * RESISTANCE / CLAMP)

    def power(time: float) -> float:
        return CLAMP * float(
            clamped_decay(time=time, current=OPENING, clamp_voltage=CLAMP, inductance=INDUCTANCE, resistance=RESISTANCE)
        )

    energy = clamp_energy(clamp_voltage=CLAMP, inductance=INDUCTANCE, resistance=RESISTANCE, current=OPENING)
    assert float(energy) == pytest.approx(quad(power, 0.0, end, epsabs=1e-13)[0], rel=1e-9)


def test_a_capacitor_with_resistance_stays_below_the_bound() -> None:
    """The bound leaves out losses; with the coil's and the suppressor's resistance the crest is lower."""
    capacitance, start = 1e-6, 30.0

    def slope(time: float, state: Any) -> Any:
        voltage, current = state
        return [current / capacitance, (-voltage - (RESISTANCE + 100.0) * current) / INDUCTANCE]

    crest = np.abs(integrated(slope, [start, OPENING], np.linspace(0.0, 0.01, 20001))).max()
    bound = capacitor_peak(initial_voltage=start, current=OPENING, inductance=INDUCTANCE, capacitance=capacitance)
    assert 0.5 * float(bound) < crest < float(bound)


def test_saturated_energy_and_slope_belong_to_the_flux_linkage() -> None:
    core = {"unsaturated_inductance": 0.4, "saturated_inductance": 0.05, "saturation_flux": 0.3}
    for current in (1e-6, 0.1, 0.8, 2.0, 30.0):
        energy, _ = quad(lambda i: i * float(slope_inductance(current=i, **core)), 0.0, current, epsabs=0.0, limit=400)
        assert float(saturated_energy(current=current, **core)) == pytest.approx(energy, rel=1e-7)
        step = 1e-6 * current
        rise = float(flux_linkage(current=current + step, **core)) - float(flux_linkage(current=current - step, **core))
        assert float(slope_inductance(current=current, **core)) == pytest.approx(rise / (2.0 * step), rel=1e-5)


def test_a_conductor_warms_as_one_capacity_behind_one_resistance() -> None:
    closed = temperature_after(time=TIMES, initial=30.0, final=70.0, time_constant=0.02)
    assert closed == pytest.approx(integrated(lambda t, x: (70.0 - x) / 0.02, [30.0], TIMES), abs=1e-7)


def test_the_time_of_the_crest_is_the_root_the_equation_names() -> None:
    ratio = 0.3
    angle = math.atan2(1.0, ratio)
    root = brentq(lambda x: math.cos(x - angle) - math.cos(angle) * math.exp(-x * ratio), math.pi / 2, math.pi / 2 + angle)
    factor = math.sin(root - angle) + math.exp(-root * ratio) * math.sin(angle)
    assert float(switch_on_factor(resistance=ratio, reactance=1.0)) == pytest.approx(factor, rel=1e-12)
