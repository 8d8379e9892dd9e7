"""A comparison tells what a colleague would want to know of a change, and keeps silent of what stayed."""

from __future__ import annotations

from typing import Any

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from circuitlint.review import record as r
from circuitlint.review.changes import SILENT, Comparison, FindingChange
from circuitlint.review.comparison import compare
from circuitlint.review.moves import change_of, moved
from tests.reports.arbitrary import records as any_record
from tests.reports.building import LIMITS, RULESET, check, circuit, kind, place, record, unknown
from tests.reports.records import mixed

TAG = "=R3-Y1"


def drop(worst: float, nominal: float = 0.01, tag: str = TAG, **more: Any) -> r.Check:
    """A voltage drop held against 5 %: beyond it at nominal values major, in the worst case minor."""
    return check(tag, "voltage-drop", "voltage-drop-share", "running", nominal, worst, 10, **more)


def of(*checks: r.Check, tag: str = TAG, serves: str = "brake magnet", **more: Any) -> r.Circuit:
    return circuit(tag, serves, checks, **more)


def after(before: tuple[r.Circuit, ...], later: tuple[r.Circuit, ...], **more: Any) -> Comparison:
    return compare(record(before), record(later, **more))


def brief(changes: tuple[FindingChange, ...]) -> list[tuple[str, str | None, str | None, str]]:
    return [(one.tag, one.before, one.after, one.how) for one in changes]


def test_two_equal_reviews_differ_in_nothing() -> None:
    made = compare(mixed(), mixed())
    assert made.empty
    assert not made.new_held


@settings(max_examples=50)
@given(any_record())
def test_any_record_compared_with_itself_differs_in_nothing(one: r.Record) -> None:
    assert compare(one, one).empty


@settings(max_examples=50)
@given(any_record(2), any_record(2))
def test_what_is_new_one_way_is_gone_the_other_way(one: r.Record, other: r.Record) -> None:
    there, back = compare(one, other), compare(other, one)
    assert sorted(change.check for change in there.new) == sorted(change.check for change in back.gone)
    assert len(there.changed) == len(back.changed)
    assert len(there.margins) == len(back.margins)
    assert len(there.figures) == len(back.figures)
    assert [each.tag for each in there.added] == [each.tag for each in back.removed]


def test_a_new_finding_tells_what_it_was_before() -> None:
    made = after((of(drop(0.02)),), (of(drop(0.07, 0.06)),))
    assert brief(made.new) == [(TAG, None, "major", "new")]
    one = made.new[0]
    assert (one.result_before, one.result_after) == ("conforms", "nonconforming")
    assert (one.worst_before, one.worst_after, one.limit_after) == (0.02, 0.07, 0.05)
    assert one.margin_before == pytest.approx(0.6)
    assert one.margin_after == pytest.approx(-0.4)
    assert made.new_held
    assert made.newly_held == (TAG,)
    assert made.gone == made.changed == ()


def test_a_finding_that_now_conforms_is_gone() -> None:
    made = after((of(drop(0.07, 0.06)),), (of(drop(0.02)),))
    assert brief(made.gone) == [(TAG, "major", None, "now conforms")]
    assert not made.new_held
    assert made.no_longer_held == (TAG,)


def test_a_finding_that_is_no_longer_checked_is_not_said_to_conform() -> None:
    made = after((of(drop(0.07, 0.06)),), (of(),))
    assert brief(made.gone) == [(TAG, "major", None, "no longer checked")]


def test_checks_that_conformed_and_are_not_made_any_more_are_told() -> None:
    made = after((of(drop(0.02), drop(0.03, state="cold")),), (of(),))
    assert [(one.tag, one.rule, one.checks, one.now) for one in made.lost] == [(TAG, "voltage-drop", 2, "not applicable")]


def test_a_check_that_moved_to_another_part_is_not_lost() -> None:
    made = after((of(drop(0.02, of="load.coil")),), (of(drop(0.02, of="load.parallel[0].coil")),))
    assert made.lost == ()


def test_a_severity_that_changed_is_told_both_ways() -> None:
    worse = after((of(drop(0.06, 0.04)),), (of(drop(0.07, 0.06)),))
    assert brief(worse.changed) == [(TAG, "minor", "major", "changed")]
    assert worse.new_held
    better = after((of(drop(0.07, 0.06)),), (of(drop(0.06, 0.04)),))
    assert brief(better.changed) == [(TAG, "major", "minor", "changed")]
    assert not better.new_held


def test_what_could_be_assessed_and_no_longer_can_is_a_new_finding() -> None:
    heat = unknown(TAG, "conductor-heating", ("cable[0].ambient",), 9)
    conforming = heat.model_copy(update={"result": "conforms", "severity": None, "basis": None})
    made = after((of(conforming),), (of(heat),))
    assert [(one.result_before, one.result_after) for one in made.new] == [("conforms", "not assessed")]


def test_only_new_findings_at_or_above_the_hold_count_for_the_exit() -> None:
    old, new = of(drop(0.07, 0.06)), of(drop(0.07, 0.06), drop(0.06, 0.04, state="cold"))
    assert not after((old,), (new,)).new_held, "the major one is not new, the new one is minor"
    assert after((old,), (new,), hold_at="minor").new_held
    assert not after((old,), (new,), hold_at="never").new_held
    assert not after((old,), (old,), hold_at="minor").new_held, "a stricter hold makes no finding new"


def test_a_finding_that_held_already_and_got_worse_is_told_and_is_not_new() -> None:
    made = after((of(drop(0.06, 0.04)),), (of(drop(0.07, 0.06)),), hold_at="minor")
    assert brief(made.changed) == [(TAG, "minor", "major", "changed")]
    assert not made.new_held


def test_a_concession_that_came_or_ended_is_told_and_its_end_counts() -> None:
    bare, covered = of(drop(0.07, 0.06)), of(drop(0.07, 0.06, concession=0))
    ended = after((covered,), (bare,))
    assert [(one.conceded_before, one.conceded_after) for one in ended.changed] == [(True, False)]
    assert ended.new_held
    given_leave = after((bare,), (covered,))
    assert [(one.conceded_before, one.conceded_after) for one in given_leave.changed] == [(False, True)]
    assert not given_leave.new_held


def test_margins_come_crossings_first_then_the_farthest() -> None:
    before = (of(drop(0.010), drop(0.020, state="cold"), drop(0.045, state="switch-on"), drop(0.06, 0.04, of="cable[0]")),)
    later = (of(drop(0.030), drop(0.021, state="cold"), drop(0.055, state="switch-on"), drop(0.01, of="cable[0]")),)
    moves = after(before, later).margins
    assert [(one.state, one.of, one.crossed) for one in moves] == [
        ("switch-on", "", "beyond"), ("steady", "cable[0]", "back within"), ("steady", "", ""), ("cold", "", ""),
    ]  # fmt: skip


@pytest.mark.parametrize(("share", "told"), [(0.0009, False), (-0.0009, False), (0.0012, True), (-0.0012, True)])
def test_moves_below_a_thousandth_are_silent(share: float, told: bool) -> None:
    made = after((of(drop(0.02)),), (of(drop(0.02 * (1 + share)), scale=1 + share),))
    assert bool(made.margins) == told
    assert bool(made.figures) == told
    assert made.empty != told


def test_figures_that_moved_are_told_with_both_ends_farthest_first() -> None:
    made = after((of(drop(0.02)),), (of(drop(0.02), scale=1.1),))
    assert {(one.name, one.state) for one in made.figures} == {
        ("reactance", "steady"), ("impedance", "steady"), ("power-factor", "steady"), ("impedance", "switch-on"),
    }  # fmt: skip
    changes = [one.change for one in made.figures]
    assert changes == sorted(changes, reverse=True)
    # A tenth more, as a share of the larger of the two: 0.1 / 1.1.
    assert changes[-1] == pytest.approx(0.1 / 1.1)


@pytest.mark.parametrize(
    ("before", "later", "dimension", "wanted"),
    [
        (100.0, 100.05, "current", False), (100.0, 100.2, "current", True), (0.0, 0.0, "current", False),
        (0.0, 1.0, "current", True), (-1.0, 1.0, "reactance", True), (1e-12, 5e-12, "current", False),
        (0.01, 0.03, "temperature", False), (20.0, 20.04, "temperature", False), (20.0, 20.1, "temperature", True),
        (1e-9, 3e-9, "angle", False), (1.0, 1.01, "angle", True), (-1.7e308, 1.7e308, "current", True),
    ],
)  # fmt: skip
def test_a_move_is_judged_by_its_share_and_nothing_is_nothing(before: float, later: float, dimension: str, wanted: bool) -> None:
    assert moved(before, later, dimension) is wanted
    assert moved(later, before, dimension) is wanted


@given(st.floats(allow_nan=False, allow_infinity=False), st.floats(allow_nan=False, allow_infinity=False))
def test_a_change_is_the_same_both_ways_and_never_more_than_double(before: float, later: float) -> None:
    assert change_of(before, later, "current") == change_of(later, before, "current")
    assert 0.0 <= change_of(before, later, "current") <= 2.0
    assert change_of(before, before, "current") == 0.0
    assert SILENT == 0.001


def test_circuits_added_and_removed_are_told_with_their_findings() -> None:
    other = of(drop(0.07, 0.06, tag="=F9"), tag="=F9", serves="fender valve")
    made = after((of(drop(0.02)),), (of(drop(0.02)), other))
    assert [(one.tag, one.serves, one.held) for one in made.added] == [("=F9", "fender valve", True)]
    assert brief(made.new) == [("=F9", None, "major", "circuit added")]
    assert made.new_held
    back = after((of(drop(0.02)), other), (of(drop(0.02)),))
    assert [one.tag for one in back.removed] == ["=F9"]
    assert brief(back.gone) == [("=F9", "major", None, "circuit removed")]


def test_a_circuit_under_another_tag_is_the_same_circuit() -> None:
    made = after((of(drop(0.07, 0.06)),), (of(drop(0.07, 0.06, tag="=R4-Y1"), tag="=R4-Y1"),))
    assert [(one.was, one.tag) for one in made.renamed] == [(TAG, "=R4-Y1")]
    assert [made.new, made.gone, made.added, made.removed] == [(), (), (), ()]
    assert made.newly_held == ()


def test_two_circuits_alike_are_not_guessed_to_be_renamed() -> None:
    made = after((of(drop(0.02)),), (of(drop(0.02, tag="=A"), tag="=A"), of(drop(0.02, tag="=B"), tag="=B")))
    assert made.renamed == ()
    assert [one.tag for one in made.added] == ["=A", "=B"]


def test_what_the_definition_states_differently_is_told_by_part() -> None:
    old = of()
    cable, coil = old.tree.parts
    longer = cable.model_copy(update={"values": ("1.5 mm2, 60 m",)})
    beside = r.Element(of="load.capacitor", kind="capacitor", values=("25 uF ± 5 %",))
    new = of(tree=old.tree.model_copy(update={"parts": (longer, coil, beside)}), fed_from="DB1")
    told = [(one.of, one.before, one.after) for one in after((old,), (new,)).data]
    assert told == [
        ("", ("shore",), ("DB1",)), ("cable[0]", ("1.5 mm2, 42 m",), ("1.5 mm2, 60 m",)),
        ("load.capacitor", (), ("25 uF ± 5 %",)),
    ]  # fmt: skip


def test_limits_and_terms_that_changed_are_told() -> None:
    dearer = RULESET.severities["voltage-drop"] | {"worst_case": "major"}
    ruleset = RULESET.model_copy(update={
        "edition": "2027-06-01", "limits": (LIMITS["circuit"].model_copy(update={"value": 0.95}), LIMITS["running"]),
        "severities": {**RULESET.severities, "voltage-drop": dearer},
    })  # fmt: skip
    made = after((), (), ruleset=ruleset, hold_at="minor", version="0.2.0")
    assert [(one.path, one.before, one.after) for one in made.limits] == [
        ("rules.minimum-power-factor.limits.circuit", 0.9, 0.95),
        ("rules.meter-range.limits.share_of_range", 10.0, None),
    ]  # fmt: skip
    assert {(one.what, one.before, one.after) for one in made.terms} == {
        ("ruleset", "low-voltage-50hz, edition 2026-12-01", "low-voltage-50hz, edition 2027-06-01"),
        ("hold at", "major", "minor"), ("severity of voltage-drop, worst case", "minor", "major"),
        ("tool", "circuitlint 0.1.0", "circuitlint 0.2.0"),
    }  # fmt: skip


def test_a_limit_of_a_circuit_that_moved_moves_the_margin_though_the_figure_stayed() -> None:
    stricter = drop(0.02).model_copy(update={"limit": LIMITS["running"].model_copy(update={"value": 0.04}), "margin": 0.5})
    made = after((of(drop(0.02)),), (of(stricter),))
    assert [(one.limit_before, one.limit_after) for one in made.margins] == [(0.05, 0.04)]


@pytest.mark.parametrize(("rule", "held"), [("voltage-drop", True), ("a rule nobody knows any more", True)])
def test_a_required_rule_that_was_lost_counts_for_the_exit(rule: str, held: bool) -> None:
    problem = r.Problem(plugin="circuitlint_rules", rule=rule, what="ValueError: x", circuits=(TAG,))
    made = after((of(),), (of(),), problems=(problem,), held=True)
    assert made.problems == (problem,)
    assert made.new_held is held
    same = compare(record((of(),), problems=(problem,), held=True), record((of(),), problems=(problem,), held=True))
    assert not same.new_held


def test_moving_circuits_within_the_file_changes_nothing() -> None:
    lower = tuple(
        each.model_copy(update={
            "place": place(each.place.line + 20),
            "checks": tuple(one.model_copy(update={"place": place(one.place.line + 20)}) for one in each.checks),
        })
        for each in mixed().circuits
    )  # fmt: skip
    assert compare(mixed(), mixed().model_copy(update={"circuits": lower[::-1]})).empty


def test_a_matter_of_kind_is_followed_like_a_figure() -> None:
    made = after((of(),), (of(kind(TAG, 4)),))
    assert brief(made.new) == [(TAG, None, "major", "checked for the first time")]
    assert made.new[0].worst_after is None
