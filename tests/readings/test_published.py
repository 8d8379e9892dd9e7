"""Readings held against published examples. What a source prints is held to half its last printed digit."""

from __future__ import annotations

import math

import numpy as np
import pytest

from circuitlint.readings.accuracy import Accuracy
from circuitlint.readings.holding import Options
from circuitlint.readings.propagation import Contribution, Group, InputSet, evaluate
from circuitlint.reports.readings_words import with_uncertainty
from tests.readings.held import held, result

# JCGM 100:2008, annex H.2, table H.2: five sets read at one moment each.
H2 = """
format: 1
title: simultaneous resistance and reactance
readings:
  - tag: AC
    repeats:
      - {voltage: 5.007 V, current: 19.663 mA, phase_angle: 1.0456 rad}
      - {voltage: 4.994 V, current: 19.639 mA, phase_angle: 1.0438 rad}
      - {voltage: 5.005 V, current: 19.640 mA, phase_angle: 1.0468 rad}
      - {voltage: 4.990 V, current: 19.685 mA, phase_angle: 1.0428 rad}
      - {voltage: 4.999 V, current: 19.678 mA, phase_angle: 1.0433 rad}
"""


@pytest.fixture(scope="module")
def h2():
    return held(H2, options=Options(trials=2000))


@pytest.mark.parametrize(("name", "value", "uncertainty", "told"), [
    # JCGM 100:2008, tables H.3 and H.4; of X both 0.295 and 0.296 are printed, by the two approaches.
    ("resistance", 127.732, (0.071, 0.0005), "127.732(71) Ω"),
    ("reactance", 219.847, (0.2955, 0.001), "219.85(30) Ω"),
    ("impedance", 254.260, (0.236, 0.0005), "254.26(24) Ω"),
])
def test_the_guides_own_example_comes_out_as_printed(h2, name, value, uncertainty, told) -> None:
    found = result(h2, name)
    assert found.value == pytest.approx(value, abs=0.0005)
    assert found.uncertainty == pytest.approx(uncertainty[0], abs=uncertainty[1])
    assert with_uncertainty(found.value, found.uncertainty, found.dimension) == told
    assert found.degrees == pytest.approx(4.0), "five simultaneous sets leave four degrees of freedom"


@pytest.mark.parametrize(("pair", "printed"), [
    ("resistance, reactance", -0.588), ("resistance, impedance", -0.485), ("reactance, impedance", 0.993),
])
def test_the_guides_correlations_come_out_as_printed(h2, pair, printed) -> None:
    # JCGM 100:2008, table H.4.
    assert h2.readings[0].correlation[pair] == pytest.approx(printed, abs=0.0005)


def test_the_guides_inputs_come_out_as_printed(h2) -> None:
    # JCGM 100:2008, table H.2: means and standard uncertainties of the means.
    printed = {"voltage": (4.999, 0.0032), "current": (19.661e-3, 0.0095e-3), "phase_angle": (1.04446, 0.00075)}
    for one in h2.readings[0].inputs:
        value, uncertainty = printed[one.quantity]
        assert one.value == pytest.approx(value, rel=3e-5)
        assert one.uncertainty == pytest.approx(uncertainty, rel=0.007)
        assert one.sets == 5
    correlation = h2.readings[0].correlation
    assert correlation["voltage, current"] == pytest.approx(-0.36, abs=0.005)
    assert correlation["voltage, impedance-angle"] == pytest.approx(0.86, abs=0.005)
    assert correlation["current, impedance-angle"] == pytest.approx(-0.65, abs=0.005)


def test_only_spread_is_known_where_no_instrument_is_stated_and_that_is_said(h2) -> None:
    # The guide says of H.2 that it covers random variation only.
    assert any("no instrument is stated for the voltage: only the spread" in note for note in h2.readings[0].notes)


def test_a_sum_of_four_normal_inputs_has_the_printed_interval() -> None:
    # JCGM 101:2008, 9.2.2, table 2: u = 2.0, interval of 95 % from -3.92 to 3.92.
    inputs = InputSet(dict.fromkeys("abcd", 0.0))
    inputs.contributions = [Contribution(name, 1.0, "normal", normal=True) for name in "abcd"]
    out = evaluate(lambda v: {"sum": v["a"] + v["b"] + v["c"] + v["d"]}, inputs, trials=200_000).results["sum"]
    assert out.uncertainty == pytest.approx(2.0, rel=1e-6)
    assert (out.low, out.high) == pytest.approx((-3.92, 3.92), abs=0.03)
    assert out.agree


def test_a_sum_of_four_rectangular_inputs_has_the_printed_interval() -> None:
    # JCGM 101:2008, 9.2.3, table 3: u = 2.0, interval of 95 % from -3.88 to 3.88.
    inputs = InputSet(dict.fromkeys("abcd", 0.0))
    inputs.contributions = [Contribution(name, math.sqrt(3.0), "rectangular") for name in "abcd"]
    out = evaluate(lambda v: {"sum": v["a"] + v["b"] + v["c"] + v["d"]}, inputs, trials=200_000).results["sum"]
    assert out.uncertainty == pytest.approx(2.0, rel=1e-6)
    assert (out.low, out.high) == pytest.approx((-3.88, 3.88), abs=0.03)


def test_a_logarithm_of_a_wide_rectangular_input_is_told_apart_from_first_order() -> None:
    # NPL report DEM-ES-011, table 9.2: first order -0.511 with u = 0.481; by Monte Carlo u = 0.606.
    inputs = InputSet({"x": 0.6}, contributions=[Contribution("x", 0.5, "rectangular")])
    out = evaluate(lambda v: {"y": np.log(v["x"])}, inputs, trials=200_000).results["y"]
    assert out.value == pytest.approx(-0.511, abs=0.0005)
    assert out.uncertainty == pytest.approx(0.481, abs=0.0005)
    assert out.sampled_uncertainty == pytest.approx(0.606, abs=0.003)
    assert not out.agree and out.degrees is None


def test_the_three_voltage_method_gives_the_printed_coil() -> None:
    # Electric Circuits, ch. 7, fig. 7-15: R = 4.92 ohm, L = 26.7 mH (recomputed 4.928 and 26.68).
    out = held("format: 1\nreadings:\n  - {tag: AC, total_voltage: 36 V ± 0.01 V, resistor_voltage: 20 V ± 0.01 V,"
               " coil_voltage: 22.4 V ± 0.01 V, series_resistor: 10 ohm, frequency: 60 Hz}", options=Options(trials=2000))
    assert result(out, "resistance").value == pytest.approx(4.92, abs=0.01)
    assert result(out, "inductance").value == pytest.approx(26.7e-3, abs=0.05e-3)
    assert out.readings[0].method == "three voltages"


def test_a_wattmeter_with_volts_and_amperes_gives_the_printed_powers() -> None:
    # Kuphaldt, Lessons in Electric Circuits vol. II, ch. 11: 240 V, 9.615 A, 1.5 kW give 2.308 kVA and 1.754 kvar.
    out = held("format: 1\nreadings:\n  - {tag: AC, voltage: 240 V ± 1 V, current: 9.615 A ± 0.01 A, power: 1.5 kW ± 10 W}",
               options=Options(trials=2000))
    assert result(out, "apparent-power").value == pytest.approx(2308.0, abs=0.5)
    assert result(out, "reactive-power").value == pytest.approx(1754.0, abs=0.5)
    assert any("taken as lagging" in note for note in out.readings[0].notes)


def test_volts_amperes_and_direct_current_resistance_give_the_printed_reactance() -> None:
    # Kuphaldt, Lessons in Electric Circuits vol. II, ch. 3: R = 40 ohm and X = 30 ohm make Z = 50 ohm at 36.87 degrees.
    out = held("format: 1\nreadings:\n  - {tag: AC, state: cold, four_wire: yes, voltage: 100 V ± 0.1 V, current: 2 A ± 1 mA,"
               " resistance: 40 ohm ± 0.01 ohm}", options=Options(trials=2000))
    assert result(out, "reactance").value == pytest.approx(30.0, abs=0.005)
    assert math.degrees(result(out, "impedance-angle").value) == pytest.approx(36.87, abs=0.005)
    assert any("core loss is taken as nothing" in note for note in out.readings[0].notes)


def test_a_warm_winding_tells_its_temperature_as_printed() -> None:
    # A relay maker's technical page: 320 ohm at 25 degC are 443.3 ohm at 125 degC, with 234.5 for copper.
    out = held("format: 1\nreadings:\n"
               "  - {tag: DC, state: cold, four_wire: yes, resistance: 320 ohm ± 0.1 ohm, temperature: 25 degC ± 0.1 K}\n"
               "  - {tag: DC, state: steady, four_wire: yes, resistance: 443.3 ohm ± 0.1 ohm}\n", options=Options(trials=2000))
    assert result(out, "winding-temperature", 1).value == pytest.approx(125.0, abs=0.05)


def test_accuracy_of_share_and_digits_is_as_the_primer_has_it() -> None:
    # A meter specification primer: 100.0 V with ± (1 % + 2) lies from 98.8 V to 101.2 V.
    assert Accuracy.read("± (1 % + 2)").half_width(100.0, 0.1) == pytest.approx(1.2)


def test_leaving_out_correlation_would_nearly_treble_the_uncertainty() -> None:
    # JCGM 100:2008, H.2: the sets are simultaneous, and their correlation counts; without it u(R) is 0.194 ohm.
    inputs = InputSet({"voltage": 4.999, "current": 19.661e-3, "phase_angle": 1.04446})
    spreads = {"voltage": 0.0032094, "current": 9.4710e-6, "phase_angle": 7.5206e-4}
    inputs.groups = [Group((name,), np.array([[spread**2]]), 4) for name, spread in spreads.items()]
    out = evaluate(lambda v: {"resistance": v["voltage"] / v["current"] * np.cos(v["phase_angle"])}, inputs, trials=1000)
    assert out.results["resistance"].uncertainty == pytest.approx(0.194, abs=0.0007)
