"""The kit finds what a rule finds, says what there is where it finds something else, and catches a rule that breaks a promise."""

from __future__ import annotations

import types
from collections.abc import Iterator
from typing import Any

import pytest

from circuitlint.authoring import (
    CURRENT,
    RATIO,
    Fact,
    Holds,
    Lack,
    LimitSpec,
    Outcome,
    Rule,
    Unknown,
    ask,
    at_least,
    at_most,
    offers,
)
from circuitlint.errors import InputError
from circuitlint.testing import examine, hold_to_promises

CHOKE = """\
format: 1
supplies:
  shore: {system: single-phase, voltage: 230 V ± 10 %, frequency: 50 Hz}
parts:
  choke: {coil: {resistance: 3 ohm ± 5 %, inductance: 0.3 H ± 10 %, armature: none}}
circuits:
  - tag: =A-L1
    fed_from: shore
    ambient: 20 degC
    cable: []
    load: {part: choke}
    meter: {connection: in-line, range: 2 A, fuse: 3 A}
  - tag: =A-L2
    fed_from: shore
    ambient: 20 degC
    cable: []
    load: {resistor: {resistance: 230 ohm}}
    meter: {connection: clamp, range: 20 A}
"""


class Base(Rule):
    name = "largest-current"
    title = "Current"
    purpose = "A test."
    applies_to = "every circuit"
    figures = ("current",)
    states = ("cold",)
    needs = ("the load's data",)
    helps = "less current"
    limits = {"most": LimitSpec(CURRENT, "largest current")}

    def check(self, circuit: Any, limits: Any) -> Iterator[Outcome]:
        yield at_most(ask(circuit, "current", "cold"), limits.get("most"))


def test_results_severities_margins_and_bases_are_asserted() -> None:
    # 230 V over √((3 Ω)² + (2π · 50 Hz · 0.3 H)²) = 94.3 Ω.
    amperes = 230.0 / (3.0**2 + (2 * 3.141592653589793 * 50 * 0.3) ** 2) ** 0.5
    found = examine(CHOKE, Base, limits={"most": "2.5 A"})
    check = found.expect("nonconforming", tag="=A-L1", severity="minor", basis="worst case", nominal=pytest.approx(amperes))
    assert check.margin is not None and check.margin < 0 < (check.nominal_margin or 0)
    found.expect("conforms", tag="=A-L2", severity="none", margin=pytest.approx(1 - 1.1 / 2.5))
    assert found.result("largest-current", "=A-L1") == "nonconforming"
    assert len(found.checks()) == 2 and len(found.checks(tag="=A-L2", state="cold")) == 1
    examine(CHOKE, Base, limits={"most": "2 A"}).expect("nonconforming", tag="=A-L1", severity="major", basis="nominal")
    examine(CHOKE, Base, limits={"most": "1.12 A"}).expect("conforms", tag="=A-L2", severity="observation", basis="near the limit")


def test_severities_and_closeness_can_be_given() -> None:
    found = examine(CHOKE, Base, limits={"most": "2 A"}, severities={"nominal": "observation"}, near_the_limit="60 %")
    found.expect("nonconforming", tag="=A-L1", severity="observation")
    found.expect("conforms", tag="=A-L2", basis="near the limit")


def test_missing_data_lead_to_not_assessed_and_the_needs_are_asserted() -> None:
    found = examine(CHOKE.replace("cable: []", "serves: nothing known of the cable"), Base, limits={"most": "2 A"})
    found.expect("not assessed", tag="=A-L1", severity="observation", needs=["cable, or `cable: []` where there is none"])
    with pytest.raises(AssertionError, match="needs cable"):
        found.expect("not assessed", tag="=A-L1", needs=["colour"])


def test_what_does_not_fit_is_told_with_what_is_there() -> None:
    found = examine(CHOKE, Base, limits={"most": "2 A"})
    with pytest.raises(AssertionError, match=r"no check is conforms as expected; there are\n  largest-current.*nominal.*major"):
        found.expect("conforms", tag="=A-L1")
    for words in ({"severity": "minor"}, {"basis": "worst case"}, {"margin": 0.5}, {"says": "no such words"}, {"worst": 1.0}):
        with pytest.raises(AssertionError, match="there are"):
            found.expect("nonconforming", tag="=A-L1", **words)  # type: ignore[arg-type]
    with pytest.raises(AssertionError, match="no check fits the words given"):
        found.expect("conforms", tag="=A-L1", state="steady")
    with pytest.raises(AssertionError, match="no rule 'meter' was run; there are largest-current"):
        found.result("meter", "=A-L1")
    with pytest.raises(AssertionError, match="no circuit has the tag '=B'"):
        found.result("largest-current", "=B")


def test_a_ruleset_can_be_given_as_text_and_is_laid_over_a_shipped_one() -> None:
    text = (
        "format: 1\nname: mine\ntitle: mine\nedition: 2026-12-01\nbuilt_on: low-voltage-50hz\njurisdiction: here\n"
        "sources: {me: {known: firm's own}}\nrules:\n  largest-current:\n    required: true\n"
        "    severities: {nominal: minor, worst_case: minor, near_limit: observation, kind: minor, not_assessed: observation}\n"
        "    limits: {most: {value: 2 A, source: me}}\n"
    )
    found = examine(CHOKE, Base, ruleset=text)
    found.expect("nonconforming", rule="largest-current", severity="minor")
    assert found.result("voltage-drop", "=A-L2") == "conforms"
    with pytest.raises(TypeError, match="not both"):
        examine(CHOKE, Base, ruleset=text, limits={"most": "2 A"})


def test_a_plugin_takes_part_whole() -> None:
    plugin = types.ModuleType("mine")

    @offers
    def circuitlint_rules() -> list[type[Rule]]:
        return [Base]

    plugin.circuitlint_rules = circuitlint_rules  # type: ignore[attr-defined]
    examine(CHOKE, limits={"most": "2 A"}, plugin=plugin).expect("nonconforming", tag="=A-L1")
    hold_to_promises(CHOKE, limits={"most": "2 A"}, plugin=plugin)
    with pytest.raises(AssertionError, match="the plugin empty failed"):
        examine(CHOKE, Base, plugin=types.ModuleType("empty"))


@pytest.mark.parametrize(
    ("limits", "told"),
    [({"least": "2 A"}, "no rule has a limit 'least'"), ({"other": {"most": "2 A"}}, "no rule 'other' is given")],
)
def test_limits_that_no_rule_has_are_refused(limits: Any, told: str) -> None:
    with pytest.raises(TypeError, match=told):
        examine(CHOKE, Base, limits=limits)


def test_a_definition_and_a_limit_with_faults_are_refused_with_their_places() -> None:
    with pytest.raises(InputError, match=r"definition.yaml:\d+:\d+"):
        examine(CHOKE.replace("3 ohm", "3 kg"), Base, limits={"most": "2 A"})
    with pytest.raises(InputError, match="2 V"):
        examine(CHOKE, Base, limits={"most": "2 V"})


def test_a_rule_that_fails_fails_its_test_unless_that_is_what_is_looked_at() -> None:
    class Failing(Base):
        def check(self, circuit: Any, limits: Any) -> Iterator[Outcome]:
            raise LookupError("no current today")

    with pytest.raises(AssertionError, match="largest-current failed on =A-L1, =A-L2: LookupError: no current today"):
        examine(CHOKE, Failing)
    examine(CHOKE, Failing, contain=True).expect("not assessed", tag="=A-L1", basis="rule failed")


def test_a_rule_that_is_none_is_refused() -> None:
    class Bare(Rule):
        name = "bare"

        def check(self, circuit: Any, limits: Any) -> Iterator[Outcome]:
            yield Fact("nothing", "nothing")

    with pytest.raises(AssertionError, match="the rule Bare has no `title`"):
        examine(CHOKE, Bare)


def test_a_sound_rule_keeps_its_promises() -> None:
    hold_to_promises(CHOKE, Base, limits={"most": "2 A"})


class Silent(Base):
    """Passes where the range is not stated."""

    def check(self, circuit: Any, limits: Any) -> Iterator[Outcome]:
        if circuit.entry.meter.range is None:
            yield Holds("range", "no range, no trouble")
        else:
            yield Fact("range", "a range is stated")


class Shy(Base):
    """Does not apply where the range is not stated."""

    def applies(self, circuit: Any) -> bool:
        return circuit.entry.meter is not None and circuit.entry.meter.range is not None


class Lax(Base):
    """Passes where the ruleset gives no limit."""

    def check(self, circuit: Any, limits: Any) -> Iterator[Outcome]:
        if "most" in limits:
            yield at_most(ask(circuit, "current", "cold"), limits.get("most"))
        else:
            yield Holds("limit", "no limit, no trouble")


class Fickle(Base):
    """Says something else each time."""

    said = 0

    def check(self, circuit: Any, limits: Any) -> Iterator[Outcome]:
        type(self).said += 1
        yield Fact("count", f"said {type(self).said} times")


class Companion(Base):
    """Says what it says because of the states that others study."""

    def check(self, circuit: Any, limits: Any) -> Iterator[Outcome]:
        yield Fact("states", f"{len(circuit.states())} states")


class Meddling(Base):
    """Changes what the others read."""

    def check(self, circuit: Any, limits: Any) -> Iterator[Outcome]:
        circuit.entry.cable.append("one more")
        yield Fact("cable", "one more")


class Talkative(Base):
    """Prints."""

    def check(self, circuit: Any, limits: Any) -> Iterator[Outcome]:
        print("current")
        yield at_most(ask(circuit, "current", "cold"), limits.get("most"))


class Kind(Base):
    """Looks at the wrong end: what a tolerance makes worse, it passes."""

    def check(self, circuit: Any, limits: Any) -> Iterator[Outcome]:
        current = circuit.figure("current", "cold")
        if isinstance(current, Lack) or "most" not in limits:
            yield Unknown("current", ())
        elif current.lowest > limits["most"].value:
            yield Fact("current", "beyond")
        else:
            yield Holds("current", "within")


class Fragile(Base):
    """Raises where the fuse is not stated."""

    def check(self, circuit: Any, limits: Any) -> Iterator[Outcome]:
        if circuit.tag == "=A-L1":
            yield Fact("fuse", f"{circuit.entry.meter.fuse.nominal} A")
        else:
            yield Unknown("fuse", ("meter.fuse",))


BROKEN = {
    Silent: r"largest-current\|=A-L1\|range conforms when circuits\[0\].meter.range is left out",
    Shy: r"largest-current.*not applicable.*when circuits\[0\].meter.range is left out",
    Lax: r"largest-current on =A-L1 is conforms.*when the limit most is left out",
    Fickle: "does not say the same when run twice",
    Companion: "does not say the same when run with only its own states studied",
    Meddling: "changes the study",
    Talkative: "prints to standard output",
    Kind: "is nonconforming without tolerances, and conforms with them",
    Fragile: r"failed on =A-L1 when circuits\[0\].meter.fuse is left out: AttributeError",
}


@pytest.mark.parametrize("rule", BROKEN, ids=lambda rule: rule.__name__)
def test_a_rule_that_breaks_a_promise_is_caught_and_the_promise_named(rule: type[Rule]) -> None:
    limits = {"most": "2.3 A"} if rule is Kind else {"most": "2 A"}
    with pytest.raises(AssertionError, match=BROKEN[rule]):
        hold_to_promises(CHOKE, rule, limits=limits)


def test_promises_are_not_held_on_nothing() -> None:
    with pytest.raises(AssertionError, match="at least one rule"):
        hold_to_promises(CHOKE)


def test_the_sense_of_a_comparison_decides_which_end_is_the_worst() -> None:
    class Least(Base):
        figures = ("power-factor",)
        limits = {"least": LimitSpec(RATIO, "least power factor")}

        def check(self, circuit: Any, limits: Any) -> Iterator[Outcome]:
            yield at_least(ask(circuit, "power-factor", "cold"), limits.get("least"))

    low = examine(CHOKE, Least, limits={"least": "0.5"}).expect("nonconforming", tag="=A-L1")
    assert low.worst is not None and low.nominal is not None and low.worst < low.nominal
    hold_to_promises(CHOKE, Least, limits={"least": "0.5"})
