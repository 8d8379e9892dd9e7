"""The house rules find what they are to find, and say so where they cannot."""

from __future__ import annotations

import harbour_house_rules
import pytest
from harbour_house_rules.clamp_first import ClampFirst
from harbour_house_rules.pier_cable import PierCable

from circuitlint.testing import examine, hold_to_promises

PIER = """\
format: 1
title: Fender pier (invented)
supplies:
  shore: {system: single-phase, voltage: 230 V ± 10 %, frequency: 50 Hz}
circuits:
  - tag: =F2-Y1
    serves: fender winch brake
    fed_from: shore
    ambient: 0..30 degC
    cable: {part: store-pier-cable, length: 60 m}
    load: {coil: {resistance: 40 ohm ± 5 %, inductance: 0.3 H ± 10 %, armature: none, temperature_rise: 50 K}}
    meter: {part: store-loop-meter}
  - tag: =F2-Y2
    serves: fender lamp transformer
    fed_from: shore
    ambient: 0..30 degC
    cable: {part: store-pier-cable, conductor_class: 2, length: 60 m}
    load: {resistor: {resistance: 230 ohm}}
    meter: {part: store-clamp}
"""


def test_a_current_above_the_houses_limit_is_not_measured_in_the_loop() -> None:
    # 230 V over √((40 Ω)² + (2π · 50 Hz · 0.3 H)²) = 102.4 Ω is 2.25 A before the cable, and 10 % more at the highest voltage.
    nominal = examine(PIER, ClampFirst, limits={"in_loop": "2 A"}, plugin=harbour_house_rules)
    nominal.expect("nonconforming", tag="=F2-Y1", state="cold", severity="major", basis="nominal",
                   nominal=pytest.approx(2.25, rel=0.01))
    found = examine(PIER, ClampFirst, limits={"in_loop": "2.4 A"}, plugin=harbour_house_rules)
    found.expect("nonconforming", tag="=F2-Y1", state="cold", severity="minor", basis="worst case")
    assert found.result("clamp-first", "=F2-Y2") == "not applicable"


def test_with_room_to_spare_the_loop_is_allowed() -> None:
    found = examine(PIER, ClampFirst, limits={"in_loop": "5 A"}, plugin=harbour_house_rules)
    found.expect("conforms", tag="=F2-Y1", state="cold", severity="none")


def test_what_is_in_the_loop_must_be_stated() -> None:
    vague = PIER.replace("{part: store-loop-meter}", "{range: 10 A}")
    found = examine(vague, ClampFirst, limits={"in_loop": "5 A"}, plugin=harbour_house_rules)
    found.expect("not assessed", tag="=F2-Y1", needs=["meter.connection"])


def test_a_coarse_conductor_on_the_pier_is_a_finding() -> None:
    found = examine(PIER, PierCable, severities={"kind": "minor"}, plugin=harbour_house_rules)
    found.expect("conforms", tag="=F2-Y1")
    found.expect("nonconforming", tag="=F2-Y2", severity="minor", says="class 2, not 5")


def test_the_ruleset_of_the_house_goes_over_the_common_one() -> None:
    found = examine(PIER, plugin=harbour_house_rules, ruleset="harbour-house")
    limits = {(one.path, one.set_by): one.value for one in found.record.ruleset.limits}
    assert limits["rules.voltage-drop.limits.running", "harbour-house"] == pytest.approx(0.04)
    assert ("rules.voltage-drop.limits.switch_on", "low-voltage-50hz") in limits


@pytest.mark.parametrize("rule", [ClampFirst, PierCable])
def test_the_rules_keep_what_every_rule_promises(rule: type[ClampFirst] | type[PierCable]) -> None:
    hold_to_promises(PIER, rule, limits={"in_loop": "2 A"} if rule is ClampFirst else {}, plugin=harbour_house_rules)
