"""The worst first crest of networks of several paths, against SciPy's integration and a sweep of closing angles."""

from __future__ import annotations

import math

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from scipy.integrate import solve_ivp

from circuitlint.physics.one_ports import Branch, admittance, jumps
from circuitlint.physics.switching_on import switch_on_peak
from circuitlint.physics.transients import switch_on_peak_of

OMEGA = 2 * math.pi * 50
COIL = [Branch("coil", (), (at,)) for at in range(6)]
RESISTANCES = st.floats(0.1, 500.0)
REACTANCES = st.floats(0.1, 500.0)


def series(*parts: Branch) -> Branch:
    return Branch("series", parts)


def parallel(*parts: Branch) -> Branch:
    return Branch("parallel", parts)


def integrated(matrix: np.ndarray, inputs: np.ndarray, outputs: np.ndarray, feed: float, volts: float, periods: float,
               each: int = 4000) -> float:
    """Largest |output| over angles and time of x' = A x + b u, y = c x + d u, u = √2 U sin(ωt + θ): by SciPy, at rest first.

    The answers to a sine and a cosine are integrated; each of 3,600 closing angles is a sum of the two.
    """
    size = len(inputs)

    def slope(time: float, state: np.ndarray) -> np.ndarray:
        first, second = state[:size], state[size:]
        return np.concatenate([matrix @ first + inputs * math.sin(OMEGA * time),
                               matrix @ second + inputs * math.cos(OMEGA * time)])

    times = np.linspace(0.0, periods / 50.0, int(each * periods) + 1)
    found = solve_ivp(slope, (0.0, times[-1]), np.zeros(2 * size), "LSODA", times, rtol=1e-10, atol=1e-13).y
    sine = outputs @ found[:size] + feed * np.sin(OMEGA * times)
    cosine = outputs @ found[size:] + feed * np.cos(OMEGA * times)
    angles = np.linspace(0.0, math.pi, 1800, endpoint=False)
    crest = max(float(np.max(np.abs(math.cos(a) * sine + math.sin(a) * cosine))) for a in angles)
    return math.sqrt(2.0) * volts * crest


def two_coils(line: complex, first: complex, second: complex) -> tuple[np.ndarray, np.ndarray, np.ndarray]:
    """State equations of two R-L branches behind a common R-L line, written by hand: states are the branches' currents."""
    mutual = line.imag / OMEGA
    inductance = np.array([[mutual + first.imag / OMEGA, mutual], [mutual, mutual + second.imag / OMEGA]])
    resistance = np.array([[line.real + first.real, line.real], [line.real, line.real + second.real]])
    inverse = np.linalg.inv(inductance)
    return -inverse @ resistance, inverse @ np.ones(2), np.ones(2)


@pytest.mark.parametrize(("line", "first", "second"), [
    (0.8 + 0.01j, 21 + 113j, 5 + 200j), (2 + 1j, 60 + 3j, 1 + 90j), (10 + 30j, 1 + 40j, 300 + 2j), (0.5 + 0.2j, 3 + 3j, 3 + 3j),
    (0.05 + 0.005j, 400 + 0.5j, 2 + 300j),
])  # fmt: skip
def test_two_coils_behind_a_line_peak_where_numerical_integration_peaks(line: complex, first: complex, second: complex) -> None:
    network = series(COIL[0], parallel(COIL[1], COIL[2]))
    found = switch_on_peak_of(network)(voltage=230.0, frequency=50.0, impedances=(line, first, second))
    wanted = integrated(*two_coils(line, first, second), 0.0, 230.0, 2.0)
    assert found == pytest.approx(wanted, rel=2e-6)


def test_a_coil_with_core_loss_peaks_where_numerical_integration_peaks() -> None:
    """States by hand: current of the magnetising inductance, current of the line; core resistance between them."""
    line, winding, reactance, core = 1 + 0.4j, 9.0, 113.0, 350.0
    small, large = line.imag / OMEGA, reactance / OMEGA
    matrix = np.array([[-core / large, core / large], [core / small, -(core + winding + line.real) / small]])
    network = series(COIL[0], Branch("core", (), (1, 2, 3)))
    found = switch_on_peak_of(network)(voltage=230.0, frequency=50.0, impedances=(line, winding, reactance, core))
    wanted = integrated(matrix, np.array([0.0, 1.0 / small]), np.array([0.0, 1.0]), 0.0, 230.0, 2.0)
    assert found == pytest.approx(wanted, rel=2e-6)


@pytest.mark.parametrize(("line", "coil", "across"), [
    (0.7 + 0.02j, 21 + 113j, 800.0), (0.7 + 0.2j, 21 + 113j, 130.0), (3.0 + 0.5j, 50 + 20j, 20.0), (12.0 + 30j, 21 + 113j, 60.0),
])  # fmt: skip
def test_a_capacitor_beside_a_coil_is_never_told_less_than_numerical_integration_and_hardly_more(
    line: complex, coil: complex, across: float
) -> None:
    small, large, farads = line.imag / OMEGA, coil.imag / OMEGA, 1.0 / (OMEGA * across)
    matrix = np.array([[-line.real / small, 0.0, -1.0 / small], [0.0, -coil.real / large, 1.0 / large],
                       [1.0 / farads, -1.0 / farads, 0.0]])
    network = series(COIL[0], parallel(COIL[1], Branch("capacitor", (), (2,))))
    found = switch_on_peak_of(network)(voltage=230.0, frequency=50.0, impedances=(line, coil, -1j * across))
    wanted = integrated(matrix, np.array([1.0 / small, 0.0, 0.0]), np.array([1.0, 0.0, 0.0]), 0.0, 230.0, 3.0, 20000)
    assert found >= wanted * (1 - 1e-6)
    assert found == pytest.approx(wanted, rel=5e-3)


@pytest.mark.parametrize(("coil", "across", "above"), [(6 + 113j, 150.0, 1.001), (1 + 113j, 98.0, 1.001), (2 + 113j, 120.0, 1.001)])
def test_a_coil_that_rings_with_its_series_capacitor_is_never_told_less(coil: complex, across: float, above: float) -> None:
    """Resonance near the supply's frequency: beats that outlast the search, whose envelope is then taken."""
    line = 0.2 + 0.1j
    whole, farads = (line + coil).imag / OMEGA, 1.0 / (OMEGA * across)
    matrix = np.array([[-(line + coil).real / whole, -1.0 / whole], [1.0 / farads, 0.0]])
    network = series(COIL[0], COIL[1], Branch("capacitor", (), (2,)))
    found = switch_on_peak_of(network)(voltage=230.0, frequency=50.0, impedances=(line, coil, -1j * across))
    wanted = integrated(matrix, np.array([1.0 / whole, 0.0]), np.array([1.0, 0.0]), 0.0, 230.0, 25.0, 800)
    assert wanted * (1 - 1e-6) <= found <= wanted * above


@settings(max_examples=200, deadline=None)
@given(st.tuples(RESISTANCES, REACTANCES), st.tuples(RESISTANCES, REACTANCES))
def test_one_path_gives_the_closed_form(line: tuple[float, float], coil: tuple[float, float]) -> None:
    total = complex(*line) + complex(*coil)
    closed = switch_on_peak(current_rms=230.0 / abs(total), resistance=total.real, reactance=total.imag)
    found = switch_on_peak_of(series(COIL[0], COIL[1]))(
        voltage=230.0, frequency=50.0, impedances=(complex(*line), complex(*coil)))
    assert found == pytest.approx(float(closed), rel=1e-9)


@settings(max_examples=100, deadline=None)
@given(st.lists(st.tuples(RESISTANCES, REACTANCES), min_size=3, max_size=5))
def test_no_time_in_ten_periods_has_more_current_than_the_peak_and_some_time_has_as_much(parts: list[tuple[float, float]]) -> None:
    """The search between a quarter and three quarters of a period, against every time on a fine net; matrix exponential."""
    numbers = tuple(np.asarray(complex(*one)) for one in parts)
    network = series(COIL[0], parallel(*COIL[1 : len(parts)]))
    port = admittance(network, numbers, np.asarray(OMEGA))
    driven = np.linalg.solve(1j * OMEGA * np.eye(len(port.b)) - port.a, port.b)
    modes, vectors = np.linalg.eig(port.a)
    times = np.linspace(0.0, 0.2, 20001)[:, None]
    fading = np.exp(modes * times) * np.linalg.solve(vectors, driven) @ vectors.T
    crest = np.max(np.abs((driven * np.exp(1j * OMEGA * times) - fading) @ port.c))
    found = switch_on_peak_of(network)(voltage=1 / math.sqrt(2), frequency=50.0, impedances=numbers)
    assert float(crest) * (1 - 1e-9) <= found <= float(crest) * (1 + 1e-5)


def test_alike_branches_are_the_same_as_several_and_as_one_of_their_joint_impedance() -> None:
    line, coil = 0.6 + 0.3j, 21 + 113j
    total = line + coil / 3
    closed = float(switch_on_peak(current_rms=230.0 / abs(total), resistance=total.real, reactance=total.imag))
    three = switch_on_peak_of(series(COIL[0], parallel(*[COIL[1]] * 3)))
    several = switch_on_peak_of(series(COIL[0], Branch("several", (COIL[1],), (2,))))
    between = switch_on_peak_of(series(COIL[0], Branch("delta", (COIL[1],))))
    for formula, numbers in ((three, (line, coil)), (several, (line, coil, 3.0)), (between, (line, coil))):
        assert formula(voltage=230.0, frequency=50.0, impedances=numbers) == pytest.approx(closed, rel=1e-9)


def test_the_admittance_of_a_deep_tree_is_that_of_its_impedances_at_any_frequency() -> None:
    capacitor = Branch("capacitor", (), (3,))
    tree = series(COIL[0], parallel(series(COIL[1], capacitor), COIL[2], Branch("resistor", (), (4,)), capacitor))
    z = (1 + 0.5j, 20 + 90j, 5 + 30j, -70j, 45.0 + 0j)
    port = admittance(tree, tuple(np.asarray(one) for one in z), np.asarray(OMEGA))
    for ratio in (0.3, 1.0, 2.0, 7.0):
        a, b, c = (complex(one.real, one.imag * ratio) for one in z[:3])
        cap = z[3] / ratio
        wanted = 1 / (a + 1 / (1 / (b + cap) + 1 / c + 1 / z[4] + 1 / cap))
        s = 1j * OMEGA * ratio
        found = (0 if port.d is None else port.d) + port.c @ np.linalg.solve(s * np.eye(len(port.b)) - port.a, port.b)
        assert abs(found - wanted) < 1e-12 * abs(wanted) + 1e-14


def test_a_capacitor_alone_between_the_terminals_jumps_and_behind_a_coil_does_not() -> None:
    capacitor = Branch("capacitor", (), (1,))
    assert jumps(capacitor) and jumps(parallel(COIL[0], capacitor)) and jumps(Branch("delta", (series(capacitor, capacitor),)))
    assert not jumps(series(COIL[0], capacitor)) and not jumps(parallel(COIL[0], series(capacitor, COIL[0])))


def test_a_case_outside_the_equations_is_not_a_number_and_leaves_the_others_alone() -> None:
    network = series(COIL[0], parallel(COIL[1], COIL[2]))
    line = np.array([0.5 + 0.1j, np.nan + 0.1j])
    found = switch_on_peak_of(network)(voltage=230.0, frequency=50.0, impedances=(line, 21 + 113j, 4 + 9j))
    assert np.isfinite(found[0]) and np.isnan(found[1])
