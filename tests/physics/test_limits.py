"""What formulas do at their limits: no reactance, no resistance, open branches, runaway, tiny differences."""

from __future__ import annotations

import math

import mpmath  # type: ignore[import-untyped]
import numpy as np
import pytest
from hypothesis import assume, example, given
from hypothesis import strategies as st
from scipy.special import jv

from circuitlint.physics.capacitors import discharge_resistance, discharge_time
from circuitlint.physics.coil_closing import hold_in_capacitance, hold_in_capacitance_with_resistance
from circuitlint.physics.coil_heating import (
    rise_on_current,
    rise_on_voltage,
    runaway_gain,
    winding_resistance_at,
    winding_temperature_from_resistance,
)
from circuitlint.physics.coil_saturation import chord_inductance, saturated_energy
from circuitlint.physics.conductor_heating import ambient_factor, conductor_temperature
from circuitlint.physics.conductors import conductor_resistance_at, first_order_drop
from circuitlint.physics.core_loss import parallel_resistance_of, series_reactance_of
from circuitlint.physics.phasors import (
    current_phasor,
    impedance_of,
    impedance_phasor,
    parallel_impedance,
    reactance_from_impedance,
    resistance_from_impedance,
    series_impedance,
)
from circuitlint.physics.power_factor import active_power, complex_power, reactive_power
from circuitlint.physics.steps import impedance_of_running_motor, impedance_with_core
from circuitlint.physics.switching_off import clamp_energy, release_time
from circuitlint.physics.three_phases import neutral_current
from circuitlint.physics.wires import skin_effect

OHMS = st.floats(1e-6, 1e9)
COPPER = 234.5


@given(OHMS, OHMS)
def test_impedance_is_longer_than_either_side_and_shorter_than_both(resistance: float, reactance: float) -> None:
    impedance = float(impedance_of(resistance=resistance, reactance=reactance))
    assert max(resistance, reactance) <= impedance * (1.0 + 1e-15)
    assert impedance <= (resistance + reactance) * (1.0 + 1e-15)


@given(OHMS)
def test_without_reactance_or_resistance_the_other_is_left(size: float) -> None:
    assert float(impedance_of(resistance=size, reactance=0.0)) == size
    assert float(impedance_of(resistance=0.0, reactance=size)) == size
    assert float(resistance_from_impedance(impedance=size, power_factor=1.0)) == size
    assert float(reactance_from_impedance(impedance=size, power_factor=1.0)) == 0.0


@given(OHMS, st.floats(-1e6, 1e6))
def test_an_open_branch_leaves_the_others_as_they_are(resistance: float, reactance: float) -> None:
    branch = complex(resistance, reactance)
    alone = parallel_impedance(impedances=(branch, complex(math.inf, 0.0)))
    assert complex(alone) == pytest.approx(branch, rel=1e-12)


def test_an_open_branch_among_arrays_leaves_the_others_as_they_are() -> None:
    several = np.array([complex(math.inf, 0.0), 20.0 + 10.0j])
    together = parallel_impedance(impedances=(np.array([30.0 + 40.0j, 20.0 + 10.0j]), several))
    assert together == pytest.approx(np.array([30.0 + 40.0j, 10.0 + 5.0j]))


@given(st.lists(st.tuples(OHMS, OHMS), min_size=2, max_size=6))
def test_series_is_above_and_parallel_below_every_resistance(parts: list[tuple[float, float]]) -> None:
    resistances = tuple(complex(one, 0.0) for one, _ in parts)
    lengths = [one for one, _ in parts]
    assert abs(complex(series_impedance(impedances=resistances))) >= max(lengths) * (1.0 - 1e-12)
    assert abs(complex(parallel_impedance(impedances=resistances))) <= min(lengths) * (1.0 + 1e-12)


@given(st.floats(1.0, 1e3), st.floats(1e-3, 1e4), st.floats(1e-3, 1e4))
def test_power_delivered_is_power_absorbed(voltage: float, resistance: float, reactance: float) -> None:
    impedance = impedance_phasor(resistance=resistance, reactance=reactance)
    current = complex(current_phasor(voltage=voltage, impedance=impedance))
    delivered = complex(complex_power(voltage=voltage, current=current))
    assert delivered.real == pytest.approx(float(active_power(current=abs(current), resistance=resistance)), rel=1e-9)
    assert delivered.imag == pytest.approx(float(reactive_power(current=abs(current), reactance=reactance)), rel=1e-9)


@given(st.floats(20.0, 240.0), st.floats(0.0, 1.0), st.floats(0.0, 0.3), st.floats(0.0, 0.3))
def test_first_order_drop_errs_by_the_square_it_leaves_out(
    voltage: float, sine: float, resistance: float, reactance: float
) -> None:
    """Error of annex G: about (I · (X cos φ − R sin φ))² / (2 U), here held as a bound a little above."""
    angle = math.asin(sine)
    receiving = voltage - 10.0 * complex(resistance, reactance) * complex(math.cos(angle), -sine)
    across = 10.0 * (reactance * math.cos(angle) - resistance * sine)
    exact = voltage - abs(receiving)
    drop = float(first_order_drop(current=10.0, resistance=resistance, reactance=reactance, angle=angle))
    assert drop - exact == pytest.approx(across**2 / (2.0 * voltage), rel=0.6, abs=1e-9)


@given(st.floats(1.0, 1e5), st.floats(-40.0, 200.0))
def test_resistance_and_temperature_go_back_to_where_they_came_from(resistance: float, temperature: float) -> None:
    hot = winding_resistance_at(resistance=resistance, temperature=temperature, reference_temperature=20.0, inferred_zero=COPPER)
    back = winding_temperature_from_resistance(
        hot_resistance=hot, cold_resistance=resistance, cold_temperature=20.0, inferred_zero=COPPER
    )
    assert float(back) == pytest.approx(temperature, abs=1e-9)


@given(st.floats(0.1, 100.0), st.floats(1.0, 400.0), st.floats(1.0, 1e4), st.floats(-40.0, 80.0))
def test_a_winding_on_voltage_settles_where_loss_and_rise_agree(
    thermal: float, voltage: float, resistance: float, ambient: float
) -> None:
    rise = float(rise_on_voltage(
        thermal_resistance=thermal, voltage=voltage, resistance_20=resistance, ambient=ambient, inferred_zero=COPPER
    ))  # fmt: skip
    hot = resistance * (COPPER + ambient + rise) / (COPPER + 20.0)
    assert rise == pytest.approx(thermal * voltage**2 / hot, rel=1e-7)


@given(st.floats(0.0, 0.999), st.floats(-40.0, 80.0))
def test_a_winding_on_current_settles_where_loss_and_rise_agree(gain: float, ambient: float) -> None:
    rise = float(rise_on_current(gain=gain, ambient=ambient, inferred_zero=COPPER))
    assert rise == pytest.approx(gain * (COPPER + ambient + rise), rel=1e-9)


def test_a_winding_that_runs_away_has_no_temperature() -> None:
    gain = float(runaway_gain(thermal_resistance=10.0, current=2.0, resistance_20=20.0, inferred_zero=COPPER))
    assert gain > 1.0
    assert np.isnan(rise_on_current(gain=gain, ambient=40.0, inferred_zero=COPPER))


CABLE = {"highest_temperature": 70.0, "reference_ambient": 30.0, "inferred_zero": COPPER}


@given(st.floats(0.0, 2.0), st.floats(-20.0, 60.0))
def test_a_conductor_settles_where_loss_and_rise_agree(share: float, ambient: float) -> None:
    warm = float(conductor_temperature(current=share * 16.0, ampacity=16.0, ambient=ambient, **CABLE))
    loss = share**2 * (COPPER + warm) / (COPPER + 70.0)
    assert warm == pytest.approx(ambient + 40.0 * loss, abs=1e-7)


def test_a_conductor_beyond_runaway_has_no_temperature() -> None:
    assert np.isnan(conductor_temperature(current=50.0, ampacity=16.0, ambient=30.0, **CABLE))
    several = conductor_temperature(current=np.array([0.0, 16.0, 50.0]), ampacity=16.0, ambient=30.0, **CABLE)
    assert np.array_equal(np.isnan(several), [False, False, True])


@given(st.floats(30.0, 69.9))
def test_at_the_factored_current_a_conductor_reaches_its_limit_and_no_more(ambient: float) -> None:
    """The ambient factor and the heat balance are two ways to say the same."""
    factor = float(ambient_factor(ambient=ambient, highest_temperature=70.0, reference_ambient=30.0))
    assert float(conductor_temperature(current=16.0 * factor, ampacity=16.0, ambient=ambient, **CABLE)) == pytest.approx(70.0)


def test_no_current_is_left_at_or_above_the_highest_temperature() -> None:
    for ambient in (70.0, 90.0):
        assert float(ambient_factor(ambient=ambient, highest_temperature=70.0, reference_ambient=30.0)) == 0.0


# IEC 60228 rounds the factor to 250 / (230 + t) (read); with the exact constants it differs by less than 0.5 %.
@given(st.floats(0.0, 100.0))
def test_temperature_correction_lies_near_the_rounded_form_of_the_conductor_standard(temperature: float) -> None:
    exact = float(conductor_resistance_at(resistance_per_length_20=1.0, temperature=temperature, inferred_zero=COPPER))
    assert exact == pytest.approx((230.0 + temperature) / 250.0, rel=0.005)


@given(st.floats(1e-3, 10.0), st.floats(0.1, 1e3), st.floats(1e-3, 10.0), st.floats(1e-12, 1e4))
@example(0.5, 25.0, 0.5, 0.0)
@example(0.5, 25.0, 0.5, 1e-12)
@example(0.5, 25.0, 0.5, 1.0)
def test_clamp_energy_keeps_its_digits(inductance: float, clamp: float, current: float, resistance: float) -> None:
    got = float(clamp_energy(clamp_voltage=clamp, inductance=inductance, resistance=resistance, current=current))
    assert got <= 0.5 * inductance * current**2 * (1.0 + 1e-12)
    with mpmath.workdps(60):
        x = mpmath.mpf(current) * resistance / clamp
        share = (x - mpmath.log1p(x)) / x**2 if x else mpmath.mpf(1) / 2
        exact = float(inductance * mpmath.mpf(current) ** 2 * share)
    assert got == pytest.approx(exact, rel=1e-10)


def test_without_resistance_a_clamp_brings_the_current_down_evenly() -> None:
    time = release_time(current=0.5, drop_out_current=0.1, clamp_voltage=25.0, inductance=0.5, resistance=0.0)
    assert float(time) == pytest.approx(0.5 * 0.4 / 25.0, rel=1e-12)


def test_with_nothing_to_bring_it_down_the_current_never_falls() -> None:
    assert release_time(current=0.5, drop_out_current=0.1, clamp_voltage=0.0, inductance=0.5, resistance=0.0) == math.inf
    assert release_time(current=0.5, drop_out_current=0.0, clamp_voltage=0.0, inductance=0.5, resistance=9.0) == math.inf


@given(st.floats(0.05, 0.9), st.floats(10.0, 1e4))
def test_without_resistance_both_forms_of_the_hold_in_capacitance_agree(share: float, impedance: float) -> None:
    simple = hold_in_capacitance(drop_out_share=share, hold_power=230.0**2 / impedance, frequency=50.0, voltage=230.0)
    exact = hold_in_capacitance_with_resistance(drop_out_share=share, impedance=impedance, resistance=0.0, frequency=50.0)
    assert float(simple) == pytest.approx(float(exact), rel=1e-9)


@given(st.floats(0.05, 0.9), st.floats(10.0, 1e4), st.floats(0.0, 0.95))
def test_leaving_resistance_out_of_the_hold_in_capacitance_is_cautious(share: float, impedance: float, part: float) -> None:
    simple = hold_in_capacitance_with_resistance(drop_out_share=share, impedance=impedance, resistance=0.0, frequency=50.0)
    exact = hold_in_capacitance_with_resistance(
        drop_out_share=share, impedance=impedance, resistance=part * impedance, frequency=50.0
    )
    assert float(simple) <= float(exact) * (1.0 + 1e-12)
    reactance = math.sqrt(impedance**2 - (part * impedance) ** 2)
    series = complex(part * impedance, reactance - 1.0 / (100.0 * math.pi * float(exact)))
    assert impedance / abs(series) == pytest.approx(share, rel=1e-9)


@given(st.floats(1.0, 600.0), st.floats(1e-7, 1e-3))
def test_discharge_time_and_resistance_belong_together(time: float, capacitance: float) -> None:
    resistance = discharge_resistance(time=time, connection=1.0, capacitance=capacitance, voltage=400.0, residual_voltage=75.0)
    back = discharge_time(connection=1.0, resistance=resistance, capacitance=capacitance, voltage=400.0, residual_voltage=75.0)
    assert float(back) == pytest.approx(time, rel=1e-12)


@given(st.floats(0.01, 1e3), st.floats(0.01, 100.0))
def test_series_and_parallel_form_of_a_coil_have_one_impedance(resistance: float, quality: float) -> None:
    parallel = float(parallel_resistance_of(series_resistance=resistance, quality=quality))
    across = resistance * quality * (1.0 + quality**2) / quality**2
    made = complex(impedance_with_core(resistance=0.0, core_resistance=parallel, reactance=across))
    assert made == pytest.approx(complex(resistance, resistance * quality), rel=1e-9)
    assert float(series_reactance_of(parallel_reactance=across, quality=quality)) == pytest.approx(resistance * quality)


@given(st.floats(0.0, 100.0), st.floats(0.0, 100.0), st.floats(0.0, 100.0), st.floats(-1.5, 1.5))
def test_neutral_current_is_what_the_three_magnitudes_leave(first: float, second: float, third: float, angle: float) -> None:
    """At one power factor the square is that of the sum less three times the products in pairs; any angle may be shared."""
    turns = [np.exp(1j * (angle + step * 2.0 * math.pi / 3.0)) for step in (0, -1, 1)]
    left = neutral_current(currents=(first * turns[0], second * turns[1], third * turns[2]))
    squares = first**2 + second**2 + third**2 - first * second - second * third - third * first
    assert abs(complex(left)) == pytest.approx(math.sqrt(max(squares, 0.0)), abs=1e-5)


def test_a_motor_below_half_its_voltage_has_no_running_point() -> None:
    voltages = np.array([230.0, 115.1, 115.0, 60.0, math.nan])
    found = impedance_of_running_motor(voltage=voltages, rated_voltage=230.0, apparent_power=1000.0, power_factor=0.8)
    assert np.array_equal(np.isnan(found), [False, False, True, True, True])


@given(st.floats(1e-6, 2.8))
def test_skin_effect_lies_near_the_exact_solution_below_the_first_bend(argument: float) -> None:
    assert float(skin_effect(argument=argument)) == pytest.approx(exact_skin_effect(argument), rel=0.0012)


@given(st.floats(2.8, 30.0))
@example(3.8000001)
def test_skin_effect_lies_near_the_exact_solution_above_it(argument: float) -> None:
    assert float(skin_effect(argument=argument)) == pytest.approx(exact_skin_effect(argument), rel=0.006)


def exact_skin_effect(argument: float) -> float:
    """Resistance of a solid round wire over that on direct current, by Bessel functions."""
    assume(argument > 1e-3)
    turned = argument * np.exp(-1j * math.pi / 4.0)
    return float((turned / 2.0 * jv(0, turned) / jv(1, turned)).real)


@given(st.floats(1e-9, 1e4))
def test_saturation_only_takes_away(current: float) -> None:
    chord = chord_inductance(unsaturated_inductance=0.4, current=current, saturation_current=2.0, exponent=2.0)
    assert 0.0 < float(chord) <= 0.4
    energy = saturated_energy(current=current, unsaturated_inductance=0.4, saturated_inductance=0.05, saturation_flux=0.3)
    assert 0.025 * current**2 * (1.0 - 1e-12) <= float(energy) <= 0.2 * current**2 * (1.0 + 1e-9)
