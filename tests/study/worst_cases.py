"""Worst cases of random compensated circuits against an optimiser that knows nothing of corners.

`python -m tests.study.worst_cases [--circuits N]` prints the table: for each circuit and figure what the study gives, what the
optimiser finds, and how much of its excursion is reached.
"""

from __future__ import annotations

import argparse
import random
from collections.abc import Iterator
from itertools import product
from typing import Any, NamedTuple

import numpy as np
from scipy.optimize import differential_evolution

from circuitlint.definition.reading import read_text
from circuitlint.study.installation import study
from circuitlint.study.loads import CORE
from circuitlint.study.study import CircuitStudy, Figure
from circuitlint.study.worksheet import Key

SOUGHT = ("current", "power-factor", "voltage-drop-share")


def compensated(seed: int) -> str:
    """A random compensated circuit with seven toleranced inputs: voltage, frequency, length, reactance, and the three parts."""
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
            reactance: "0.1 ohm/km ± 30 %"}}
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


class Row(NamedTuple):
    """One figure of one circuit: the study's ends, the optimiser's, and the share of the excursion that is reached."""

    seed: int
    figure: str
    lowest: float
    highest: float
    least: float
    most: float

    @property
    def reached(self) -> float:
        """The smaller share of the optimiser's excursion that either end reaches; above 1 where the study found more."""
        reach = self.most - self.least
        return min((self.highest - self.least) / reach, (self.most - self.lowest) / reach) if reach > 0.0 else 1.0

    def __str__(self) -> str:
        ends = f"{self.lowest:12.6g} {self.least:12.6g}   {self.highest:12.6g} {self.most:12.6g}"
        return f"{self.seed:4d}  {self.figure:20s} {ends}   {self.reached:9.5f}"


HEAD = f"seed  {'figure':20s} {'lowest':>12s} {'optimiser':>12s}   {'highest':>12s} {'optimiser':>12s}   {'reached':>9s}"


def rows(seed: int) -> Iterator[Row]:
    """The rows of one random circuit."""
    circuit = study(read_text(compensated(seed)), CORE, SOUGHT, ("cold",))[0]
    assert len(circuit.solutions["cold"].inputs) == 7
    for name in SOUGHT:
        figure = circuit.figure(name, "cold")
        assert isinstance(figure, Figure)
        least, most = (brute_force(circuit, Key(name, ""), sign) for sign in (1.0, -1.0))
        yield Row(seed, name, figure.lowest, figure.highest, least, most)


def main() -> None:
    """Print the table."""
    parser = argparse.ArgumentParser(description=__doc__)
    parser.add_argument("--circuits", type=int, default=100)
    found = []
    print(HEAD)
    for seed in range(parser.parse_args().circuits):
        for row in rows(seed):
            found.append(row)
            print(row, flush=True)
    print(f"least share of the excursion reached: {min(row.reached for row in found):.5f} over {len(found)} figures")


if __name__ == "__main__":
    main()
