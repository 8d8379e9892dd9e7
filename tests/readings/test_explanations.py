"""What readings may mean: planted faults are found first, and where nothing is wrong nothing is raised."""

from __future__ import annotations

import math

import numpy as np
import pytest
from scipy.stats import chi2

from circuitlint.readings.holding import Options
from circuitlint.readings.winding import chance, impedance
from tests.readings import synthetic
from tests.readings.held import held

QUICK = Options(trials=500)


def explained(text: str):
    return held(text, synthetic.DEFINITION, QUICK).circuits[0]


@pytest.mark.parametrize("fault", synthetic.FAULTS)
def test_a_planted_fault_stands_first_among_the_explanations(fault: str) -> None:
    for seed in range(4):
        random = np.random.default_rng([seed, synthetic.FAULTS.index(fault)])
        coil, how = synthetic.planted(random, fault)
        out = explained(synthetic.readings(random, coil, **how))
        assert out.departs
        assert out.explanations, out.told
        assert out.explanations[0].name == fault, [(one.name, one.weight) for one in out.explanations]


def test_nothing_is_raised_in_95_per_cent_of_runs_where_nothing_is_wrong() -> None:
    raised = 0
    for seed in range(200):
        random = np.random.default_rng(seed)
        raised += bool(explained(synthetic.readings(random, synthetic.sound(random))).departs)
    assert raised <= 10


def test_evidence_for_and_against_is_told_with_its_numbers() -> None:
    random = np.random.default_rng(5)
    coil, how = synthetic.planted(random, "open-gap")
    first = explained(synthetic.readings(random, coil, **how)).explanations[0]
    speaking = {one.what: one for one in first.evidence if one.standing == "for"}
    assert "reactance, steady" in speaking
    one = speaking["reactance, steady"]
    assert abs(one.away) < 2.0 < abs(one.away_without)
    assert abs(one.read - one.expected) < abs(one.read - one.without)


def test_causes_that_the_figures_cannot_part_are_both_told_and_neither_is_certain() -> None:
    """Without a bridge, a hot resistance or a frequency, too little reactance may be a gap, a frequency or a meter."""
    text = ("format: 1\ninstruments:\n  m:\n    true_rms: no\n    inputs:\n      voltage: {accuracy: ± 0.5 %}\n"
            "      current: {accuracy: ± 0.5 %}\nreadings:\n"
            "  - {tag: A, state: steady, instrument: m, voltage: 230 V, current: 1.6 A}\n")
    out = explained(text)
    assert out.departs and len(out.explanations) >= 2
    assert {one.certainty for one in out.explanations} <= {"explains it best", "explains it too"}


def test_no_cause_is_raised_from_readings_whose_accuracy_nobody_states() -> None:
    out = explained("format: 1\nreadings:\n  - {tag: A, state: steady, voltage: 230 V, current: 5 A, power: 100 W}\n")
    assert out.departs is None and not out.explanations
    assert "not looked into" in out.told


def test_a_misfit_that_no_cause_tells_is_said_to_be_unexplained() -> None:
    text = ("format: 1\nreadings:\n  - {tag: A, state: cold, four_wire: yes, resistance: 3 ohm ± 0.01 ohm,\n"
            "     temperature: 20 degC ± 0.1 K}\n"
            "  - {tag: A, state: steady, voltage: 230 V ± 1 V, current: 0.2 A ± 1 mA, power: 40 W ± 0.1 W,\n"
            "     frequency: 50 Hz ± 0.01 Hz}\n")
    out = explained(text)
    assert out.departs and not out.explanations
    assert "none of the explanations considered tells them all" in out.told


@pytest.mark.parametrize(("distance", "count"), [(0.5, 1), (3.84, 1), (5.99, 2), (20.0, 5), (9.0, 8), (60.0, 3)])
def test_the_chance_of_a_distance_is_as_scipy_has_it(distance: float, count: int) -> None:
    assert chance(distance, count) == pytest.approx(float(chi2.sf(distance, count)), rel=1e-10)


@pytest.mark.parametrize("share", [0.01, 0.05, 0.3])
def test_shorted_turns_are_as_two_coupled_meshes_have_them(share: float) -> None:
    coil = synthetic.Coil(21.0, 0.36, 20.0, 20.0, 230.0, 50.0, shorted=share)
    made = complex(impedance(21.0, 0.36, math.inf, 2 * math.pi * 50.0, share))
    assert made == pytest.approx(synthetic.impedance(coil, 20.0, 50.0), rel=1e-9)
