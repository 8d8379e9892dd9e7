"""The bank is what its magnets make it, its figures follow from theory, and its rule keeps its promises."""

from __future__ import annotations

import math

import pytest
import ramp_holding_magnets
from ramp_holding_magnets.reserve import HoldingReserve

from circuitlint.testing import Examination, examine, hold_to_promises

RAMP = """\
format: 1
title: Ferry ramp latch (invented)
supplies:
  battery: {system: dc, voltage: 24 V -10/+20 %}
  shore: {system: single-phase, voltage: 24 V, frequency: 50 Hz}
circuits:
  - tag: =L1-Y1
    serves: ramp latch
    fed_from: battery
    ambient: 20 degC
    cable: []
    load: {part: ramp-latch-bank}
"""
LIMITS = {"force": "60 %", "fall_off": "150 ms"}


def ramp(text: str = RAMP, **limits: str) -> Examination:
    return examine(text, limits={**LIMITS, **limits}, plugin=ramp_holding_magnets)


def figure(found: Examination, name: str, state: str, of: str = "load.holding_magnets") -> float:
    (value,) = [
        one.nominal for one in found.record.circuits[0].figures if (one.name, one.state, one.of) == (name, state, of)]
    return value


def test_the_bank_cold_is_as_ohm_has_it() -> None:
    """Two magnets of 11 Ω in series, three strings: 22 Ω / 3; each string takes 24 V / 22 Ω."""
    found = ramp()
    assert figure(found, "current", "cold", "") == pytest.approx(24.0 / (22.0 / 3.0), rel=1e-12)
    assert figure(found, "magnet-current", "cold") == pytest.approx(24.0 / 22.0, rel=1e-12)
    assert figure(found, "holding-force-share", "cold") == pytest.approx((24.0 / 22.0 / 0.9) ** 2, rel=1e-12)


def test_the_fall_off_time_is_the_decay_of_one_magnet() -> None:
    """t = L / R · ln(I / Ib) of a current that decays as exp(−t R / L)."""
    time = figure(ramp(), "fall-off-time", "cold")
    assert 24.0 / 22.0 * math.exp(-time * 11.0 / 0.28) == pytest.approx(0.25, rel=1e-12)


def test_the_weakest_hot_magnet_on_the_lowest_supply_decides() -> None:
    """At 85 °C copper of 11 Ω + 5 % has 11.55 · (234.5 + 85) / (234.5 + 20) Ω, on 24 V less 10 %."""
    lowest = (24.0 * 0.9 / (2 * 11.0 * 1.05 * (234.5 + 85.0) / (234.5 + 20.0)) / 0.9) ** 2
    found = ramp()
    check = found.expect("conforms", figure="holding-force-share", state="steady", worst=pytest.approx(lowest, rel=1e-6))
    assert check.margin == pytest.approx(lowest / 0.6 - 1.0, rel=1e-4)
    ramp(force="80 %").expect("nonconforming", figure="holding-force-share", state="steady", basis="worst case")


def test_what_the_plate_does_not_tell_is_asked_for() -> None:
    bare = RAMP.replace("{part: ramp-latch-bank}", "{holding_magnets: {in_series: 2, strings: 3, resistance: 11 ohm}}")
    found = ramp(bare)
    found.expect("not assessed", state="cold", figure="holding-force-share", needs=["load.holding_magnets.rated_current"])
    found.expect("not assessed", state="steady", figure="holding-force-share", needs=["load.holding_magnets.temperature"])


def test_on_alternating_current_the_bank_is_resistance_and_reactance() -> None:
    found = ramp(RAMP.replace("fed_from: battery", "fed_from: shore"))
    assert found.result("holding-reserve", "=L1-Y1") == "not applicable"
    impedance = 2.0 / 3.0 * math.hypot(11.0, 2.0 * math.pi * 50.0 * 0.28)
    assert figure(found, "current", "cold", "") == pytest.approx(24.0 / impedance, rel=1e-12)
    assert figure(found, "volt-amperes-per-watt", "cold", "") == pytest.approx(
        math.hypot(11.0, 2.0 * math.pi * 50.0 * 0.28) / 11.0, rel=1e-12)


def test_a_bank_of_no_magnets_is_refused() -> None:
    with pytest.raises(Exception, match="in_series"):
        ramp(RAMP.replace("{part: ramp-latch-bank}", "{holding_magnets: {in_series: 0, strings: 3, resistance: 11 ohm}}"))


def test_the_rule_keeps_what_every_rule_promises() -> None:
    hold_to_promises(RAMP, HoldingReserve, limits={"force": "80 %", "fall_off": "50 ms"}, plugin=ramp_holding_magnets)


def test_the_ramps_ruleset_runs_the_common_rules_too() -> None:
    found = examine(RAMP, plugin=ramp_holding_magnets, ruleset="ferry-ramp")
    assert {"holding-reserve", "voltage-drop"} <= set(found.record.circuits[0].coverage)
