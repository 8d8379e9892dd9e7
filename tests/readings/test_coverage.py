"""Intervals hold what they say they hold: readings made up from circuits that are known."""

from __future__ import annotations

import math

import numpy as np
import pytest

from circuitlint.readings.methods import method_for
from circuitlint.readings.propagation import Contribution, InputSet, evaluate

RUNS = 1000


@pytest.mark.parametrize("sets", [1, 6])
def test_an_interval_of_95_per_cent_holds_the_true_value_in_93_to_97_per_cent_of_runs(sets: int) -> None:
    """A meter's error is even within its accuracy and the same for all sets; the sets scatter besides, V and I together."""
    random = np.random.default_rng(2027 + sets)
    true = {"voltage": 230.0, "current": 1.97, "power": 98.0}
    size = true["voltage"] / true["current"]
    resistance = true["power"] / true["current"] ** 2
    wanted = {"resistance": resistance, "reactance": math.sqrt(size**2 - resistance**2), "impedance": size,
              "power-factor": true["power"] / true["voltage"] / true["current"]}
    half = {"voltage": 2.1, "current": 0.02, "power": 1.2}
    inside = dict.fromkeys(wanted, 0)
    for _ in range(RUNS):
        error = {name: random.uniform(-half[name], half[name]) for name in true}
        common = random.normal(0.0, 0.004, sets) if sets > 1 else np.zeros(1)
        own = random.normal(0.0, 0.002, (3, sets)) if sets > 1 else np.zeros((3, 1))
        inputs = InputSet()
        inputs.repeat({name: true[name] * (1.0 + common * (2.0 if name == "power" else 1.0) + own[row]) + error[name]
                       for row, name in enumerate(true)})
        inputs.contributions = [Contribution(name, half[name], "meter") for name in true]
        out = evaluate(method_for(set(true), False, False).model, inputs, trials=600)
        for name, value in wanted.items():
            inside[name] += out.results[name].low <= value <= out.results[name].high
    shares = {name: count / RUNS for name, count in inside.items()}
    assert all(0.93 <= share <= 0.97 for share in shares.values()), shares
