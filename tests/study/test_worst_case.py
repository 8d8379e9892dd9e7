"""The worst case is the real worst case: held against a brute-force optimiser on random circuits."""

from __future__ import annotations

from itertools import product

import numpy as np
import pytest

from circuitlint.definition.reading import read_text
from circuitlint.study.installation import study
from circuitlint.study.loads import CORE
from circuitlint.study.study import Figure
from circuitlint.study.worksheet import Key
from tests.study.worst_cases import HEAD, SOUGHT, compensated, rows


@pytest.mark.parametrize("seed", range(12))
def test_no_optimiser_finds_a_worse_case_than_the_one_given(seed: int) -> None:
    print(HEAD)
    for row in rows(seed):
        print(row)
        assert row.reached >= 0.995, row
        assert row.lowest >= row.least - 1e-6 * abs(row.least), row
        assert row.highest <= row.most + 1e-6 * abs(row.most), row


def test_the_least_current_of_a_compensated_circuit_lies_inside_the_box() -> None:
    """Corners alone would miss it: with a capacitor the least current is where it cancels the coil's."""
    inside = 0
    for seed in range(12):
        circuit = study(read_text(compensated(seed)), CORE, SOUGHT)[0]
        figure = circuit.figure("current", "cold")
        assert isinstance(figure, Figure)
        solution, data = circuit.solutions["cold"], circuit.data.data
        ends = [(data[path].low, data[path].high) for path in solution.inputs]
        put_in = {Key("", path): datum.nominal for path, datum in data.items()}
        put_in |= dict(zip((Key("", path) for path in solution.inputs), np.array(list(product(*ends))).T, strict=True))
        inside += figure.lowest < float(np.min(solution.sheet.run(put_in)[Key("current", "")])) * (1 - 1e-6)
    assert inside >= 3


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
