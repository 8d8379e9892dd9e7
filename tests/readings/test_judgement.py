"""Four-way statements and decision rules; each limit of the review judged again."""

from __future__ import annotations

import math

import pytest

from circuitlint.engine import Review, review
from circuitlint.limits.reading import read_ruleset, resolve
from circuitlint.plugins import gather
from circuitlint.readings.holding import Options
from circuitlint.readings.judgement import accepted, agreement, statement
from tests.readings.held import BENCH, held, reviewed

# ILAC-G8:09/2019: four statements about an upper limit of 10 with an interval of half-width 1; mirrored for a lower limit.
STATEMENTS = {8.9: "conforms", 9.5: "conforms, with doubt", 10.0: "conforms, with doubt", 10.5: "nonconforming, with doubt",
              11.1: "nonconforming"}


@pytest.mark.parametrize("value", STATEMENTS)
def test_a_value_earns_the_statement_its_interval_allows(value: float) -> None:
    assert statement(value, value - 1.0, value + 1.0, 10.0, "at most") == STATEMENTS[value]
    assert statement(20.0 - value, 19.0 - value, 21.0 - value, 10.0, "at least") == STATEMENTS[value]


@pytest.mark.parametrize(("made", "simple", "guarded"), [
    ("conforms", True, True), ("conforms, with doubt", True, False), ("nonconforming, with doubt", False, False),
    ("nonconforming", False, False), ("not assessed", False, False),
])
def test_the_decision_rule_says_what_is_accepted(made, simple: bool, guarded: bool) -> None:
    assert accepted(made, "simple") is simple
    assert accepted(made, "guarded") is guarded


@pytest.mark.parametrize("odd", [math.nan, math.inf])
def test_what_is_not_a_number_is_never_accepted(odd: float) -> None:
    assert statement(odd, odd, odd, 10.0, "at most") == "not assessed"
    assert statement(1.0, 0.5, 1.5, odd, "at most") == "not assessed"
    assert agreement(odd, odd, odd, (1.0, 0.0, 2.0)) == "not assessed"


@pytest.mark.parametrize(("value", "half", "wanted"), [
    (5.0, 1.0, "inside"), (9.5, 1.0, "inside, with doubt"), (10.5, 1.0, "outside, with doubt"),
    (-0.5, 1.0, "outside, with doubt"), (12.0, 1.0, "outside"), (-2.0, 1.0, "outside"),
])
def test_a_reading_lies_to_the_predicted_range_as_its_interval_allows(value: float, half: float, wanted: str) -> None:
    assert agreement(value - half, value + half, value, (5.0, 0.0, 10.0)) == wanted


CURRENT = "format: 1\nreadings: [{{tag: AC, state: steady, current: {} A ± 0.05 A}}]"


def judged(current: float, rule="guarded"):
    """The meter's range of 2 A as a limit on a measured current."""
    out = held(CURRENT.format(current), options=Options(rule, trials=2000))
    (limit,) = [one for one in out.circuits[0].limits if one.figure == "current" and one.limit == 2.0]
    return limit, out


@pytest.mark.parametrize(("current", "made"), [
    (1.90, "conforms"), (1.97, "conforms, with doubt"), (2.03, "nonconforming, with doubt"), (2.2, "nonconforming"),
])
def test_a_limit_of_the_review_is_judged_again_with_the_measured_value(current: float, made: str) -> None:
    limit, _ = judged(current)
    assert limit.statement == made
    assert limit.rule == "meter-range"


def test_a_doubtful_value_holds_under_the_guarded_rule_and_not_under_the_simple_one() -> None:
    assert judged(1.97, "guarded")[1].held
    assert not judged(1.97, "simple")[1].held


def test_a_value_whose_accuracy_nobody_states_is_judged_by_no_limit_and_holds() -> None:
    out = held("format: 1\nreadings: [{tag: AC, state: steady, current: 0.5 A}]")
    limits = out.circuits[0].limits
    assert limits and all(one.statement == "not assessed" and not one.accepted for one in limits)
    assert out.held
    assert any("nothing says how accurate the current is" in note for note in out.readings[0].notes)


def test_limits_no_reading_speaks_of_are_counted() -> None:
    _, out = judged(1.9)
    checks = [one for one in reviewed()[1].circuits[0].checks if one.limit is not None and one.sense]
    assert out.circuits[0].not_measured == len(checks) - len(out.circuits[0].limits) > 0
    assert out.not_read == ("DC",)


def test_voltages_at_both_ends_give_the_share_lost_on_the_way() -> None:
    out = held("format: 1\nreadings:\n  - {tag: AC, state: steady, of: circuit, voltage: 230 V ± 0.1 V}\n"
               "  - {tag: AC, state: steady, voltage: 207 V ± 0.1 V}\n", options=Options(trials=2000))
    (limit,) = [one for one in out.circuits[0].limits if one.figure == "voltage-drop-share"]
    assert limit.value == pytest.approx(0.1)
    assert limit.statement == "nonconforming"


RULESET = """
format: 1
name: bench-rules
title: for a bench
edition: 2027-01-01
jurisdiction: none
built_on: low-voltage-50hz
decision_rule: {}
"""


@pytest.mark.parametrize("rule", ["simple", "guarded"])
def test_the_ruleset_chooses_the_decision_rule(rule: str) -> None:
    gathered = gather()
    own = read_ruleset(RULESET.format(rule).encode(), "bench.yaml")
    made = resolve("bench-rules", {**gathered.rulesets, "bench-rules": own})
    assert made.decision_rule == rule
    assert resolve("low-voltage-50hz", gathered.rulesets).decision_rule == "guarded"
    installation, _ = reviewed(BENCH)
    assert review(installation, made, gathered, Review("never", "2027-01-01")).ruleset.name == "bench-rules"
