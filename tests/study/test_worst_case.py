"""The worst case is the real worst case: held against a brute-force optimiser on random circuits."""

from __future__ import annotations

import random
from itertools import product
from typing import Any

import numpy as np
import pytest
from scipy.optimize import differential_evolution

from circuitlint.definition.reading import read_text
from circuitlint.study.installation import study
from circuitlint.study.loads import CORE
from circuitlint.study.states import COLD
from circuitlint.study.study import CircuitStudy, Figure
from circuitlint.study.worksheet import Key

SOUGHT = ("current", "power-factor", "voltage-drop-share")


def compensated(seed: int) -> str:
    """A random compensated circuit with toleranced voltage, frequency, resistance, inductance and capacitance."""
    draw = random.Random(seed)
    inductance = draw.uniform(0.05, 1.0)
    resistance = draw.uniform(0.05, 1.0) * 314.0 * inductance
    capacitance = draw.uniform(0.8, 1.2) * inductance / (resistance**2 + (314.0 * inductance) ** 2)
    return f"""
format: 1
supplies: {{s: {{system: single-phase, voltage: "230 V +10/-6 %", frequency: "50 Hz ± {draw.choice((1, 2, 5))} %"}}}}
circuits:
  - tag: random
    fed_from: s
    ambient: 20 degC
    cable: {{section: 1.5 mm2, length: "{draw.uniform(5, 80):.3f} m ± 5 %", conductor: copper, conductor_class: 2,
            reactance: 0.1 ohm/km}}
    load:
      parallel:
        - coil: {{resistance: "{resistance:.6g} ohm ± {draw.choice((2, 5, 10))} %",
                  inductance: "{inductance:.6g} H ± {draw.choice((5, 10, 20))} %"}}
        - capacitor: {{capacitance: "{capacitance:.6g} F ± {draw.choice((5, 10))} %"}}
"""


def brute_force(circuit: CircuitStudy, key: Key, sign: float) -> float:
    """The extreme of a figure over the tolerance box, by an optimiser that knows nothing of corners."""
    solution = circuit.solutions["cold"]
    data = circuit.data.data

    def value(points: Any) -> Any:
        put_in: dict[Key, Any] = {Key("", path): datum.nominal for path, datum in data.items()}
        for path, at in zip(solution.inputs, points, strict=True):
            put_in[Key("", path)] = at
        return sign * solution.sheet.run(put_in)[key]

    bounds = [(data[path].low, data[path].high) for path in solution.inputs]
    found = [
        float(differential_evolution(value, bounds, seed=seed, maxiter=250, popsize=20, tol=1e-12, atol=0.0, vectorized=True,
                                     updating="deferred", polish=False).fun)
        for seed in (1, 2)
    ]
    corners = float(np.min(value(np.array(list(product(*bounds))).T)))
    return sign * min(corners, *found)


@pytest.mark.parametrize("seed", range(12))
def test_no_optimiser_finds_a_worse_case_than_the_one_given(seed: int) -> None:
    circuit = study(read_text(compensated(seed)), CORE, SOUGHT)[0]
    for name in SOUGHT:
        figure = circuit.figure(name, "cold")
        assert isinstance(figure, Figure)
        least, most = (brute_force(circuit, Key(name, ""), sign) for sign in (1.0, -1.0))
        reach = most - least
        assert figure.lowest <= least + 0.005 * reach, (name, figure.lowest, least)
        assert figure.highest >= most - 0.005 * reach, (name, figure.highest, most)
        assert figure.lowest >= least - 1e-6 * abs(least)
        assert figure.highest <= most + 1e-6 * abs(most)


def test_the_least_current_of_a_compensated_circuit_lies_inside_the_box() -> None:
    """Corners alone would miss it: with a capacitor the least current is where it cancels the coil's."""
    inside = 0
    for seed in range(12):
        circuit = study(read_text(compensated(seed)), CORE, SOUGHT)[0]
        figure = circuit.figure("current", "cold")
        assert isinstance(figure, Figure)
        solution = circuit.solutions["cold"]
        corners = slice(1 + 2 * len(solution.inputs), 1 + 2 * len(solution.inputs) + 2 ** len(solution.inputs))
        at_corners = circuit.spread("cold", Key("current", ""))[corners]
        inside += figure.lowest < float(np.min(at_corners)) * (1 - 1e-6)
    assert inside >= 3
    assert COLD.name == "cold"


def test_the_share_of_the_box_beyond_a_limit_agrees_with_the_exact_one() -> None:
    """A resistor of ± 10 % on 230 V ± 10 %: the current is above 12.0 A on a part of the box that integrates in closed form."""
    text = """
format: 1
supplies: {s: {system: dc, voltage: 230 V ± 10 %}}
circuits: {tag: A, fed_from: s, ambient: 20 degC, cable: [], load: {resistor: {resistance: 20 ohm ± 10 %}}}
"""
    circuit = study(read_text(text), CORE)[0]
    share, uncertainty = circuit.share_beyond("cold", Key("current", ""), 12.0, False)
    # U / R > 12 over U in 207..253, R in 18..22: the mean over R of the part of U above 12 R.
    above = np.clip((253.0 - 12.0 * np.linspace(18.0, 22.0, 100001)) / 46.0, 0.0, 1.0)
    exact = float(np.mean(above))
    assert uncertainty == pytest.approx(np.sqrt(exact * (1 - exact) / 2000), rel=0.1)
    assert abs(share - exact) < 3 * uncertainty
