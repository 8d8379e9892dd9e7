"""What goes wrong with inductive circuits in low-voltage practice is caught: a definition of each, and the rule that finds it.

The modes are common practice. Not caught by a rule on a definition: a control transformer too small for several coils that close
together, a start that makes the other coils of its board let go, shorted turns (readings tell of them), an inductance measured at
another frequency. Flexible or aluminium conductors taken for solid copper are told apart by the tables of conductors.
"""

from __future__ import annotations

import pytest

from circuitlint.definition.reading import read_text
from circuitlint.engine import Review, review
from circuitlint.errors import InputError
from circuitlint.limits.reading import resolve
from circuitlint.review.record import Check
from tests.rules.definitions import CABLE, DEFINITIONS, LAMP, RATED, SUPPLIES, circuit, coil
from tests.rules.more_definitions import MORE, dc_coil, guarded, magnet, switched
from tests.rules.test_each_rule import GATHERED

MORE_SUPPLIES = SUPPLIES.replace("circuits:", "  sixty: {system: single-phase, voltage: 230 V ± 10 %, frequency: 60 Hz}\ncircuits:")
_AC = "resistance: 400 ohm, inductance: 0.05 H"
_RELAY = "{coil: {made_for: alternating current, impedance: 20 kohm, power_factor: 0.3, armature: none, drop_out_voltage: 70 V}}"
_LONG = CABLE.replace("10 m", "400 m").replace("section", "capacitance: 0.3 nF/m, section", 1)

MODES: dict[str, tuple[str, str]] = {
    "armature-held-open": ("stuck-open", MORE["stuck-open"][1]),
    "ac-coil-on-direct-current": ("supply-match", circuit(coil(_AC), supply="dc")),
    "dc-coil-on-alternating-current": ("supply-match", DEFINITIONS["supply-match"][1]),
    "sixty-hertz-coil-on-fifty": ("supply-match", circuit(coil(f"{_AC}, {RATED.replace('50 Hz', '60 Hz')}"))),
    "fifty-hertz-coil-on-sixty": ("supply-match", circuit(coil(f"{_AC}, {RATED}"), supply="sixty")),
    "chatter-on-a-long-control-cable": (
        "operating-voltage",
        magnet(", rated_voltage: 24 V, lowest_voltage: 85 %, highest_voltage: 110 %")
        .replace("480 ohm", "24 ohm").replace("cable: []", f"cable: {CABLE.replace('10 m', '400 m')}"),
    ),
    "closed-but-low-voltage": (
        "supply-match",
        magnet(", rated_voltage: 24 V").replace("480 ohm", "24 ohm").replace("cable: []", f"cable: {CABLE.replace('10 m', '600 m')}"),
    ),
    "held-in-by-cable-capacitance": ("held-in", circuit(_RELAY, _LONG)),
    "held-in-by-leakage": ("held-in", MORE["held-in"][1]),
    "contact-welded-or-eroded": ("contact-duty", switched("category: AC-12, rated_current: 5 A, rated_voltage: 240 V", coil(_AC))),
    "no-suppressor": ("switch-off-voltage", dc_coil(after=", suppressor: {kind: none}, switching: {withstand: 50 V}")),
    "diode-on-alternating-current": ("switch-off-voltage", circuit(coil(_AC), more=", suppressor: {kind: diode}")),
    "release-too-slow": ("release-time", MORE["release-time"][1]),
    "suppressor-overheated": ("stored-energy", MORE["stored-energy"][1]),
    "nuisance-trip": ("nuisance-trip", MORE["nuisance-trip"][1]),
    "no-overload-protection": ("overload-coordination", MORE["overload-coordination"][1]),
    "device-cannot-break": ("breaking-capacity", MORE["breaking-capacity"][1]),
    "loop-impedance-too-high": ("fault-loop", MORE["fault-loop"][1]),
    "fault-heating": ("fault-heating", MORE["fault-heating"][1]),
    "derating-forgotten": (
        "conductor-heating",
        circuit("{resistor: {resistance: 12 ohm}}", CABLE.replace("circuits: 1", "circuits: 9").replace("25 degC", "45 degC")),
    ),
    "drop-without-power-factor": ("voltage-drop", DEFINITIONS["voltage-drop"][1]),
    "pull-in-lost-when-hot": ("pull-in-when-hot", MORE["pull-in-when-hot"][1]),
    "winding-too-hot": ("winding-temperature", MORE["winding-temperature"][1]),
    "duty-exceeded": ("winding-temperature", dc_coil(", rated_duty: 40 %", ", duty: 60 %")),
    "contact-load-too-small": ("minimum-contact-load", MORE["minimum-contact-load"][1]),
    "saturation": ("saturation-current", MORE["saturation-current"][1]),
    "nameplate-contradiction": ("nameplate-contradiction", DEFINITIONS["nameplate-contradiction"][1]),
    "low-power-factor": ("minimum-power-factor", DEFINITIONS["minimum-power-factor"][1]),
    "over-correction": ("over-correction", MORE["over-correction"][1]),
    "correction-of-a-resistance": (
        "over-correction", circuit(f"{{parallel: [{LAMP}, {{capacitor: {{capacitance: 1 uF}}}}]}}"),
    ),
    "capacitor-resonance": ("resonance", MORE["resonance"][1]),
    "capacitor-overstressed": ("capacitor-stress", MORE["capacitor-stress"][1]),
    "capacitor-not-discharged": ("capacitor-discharge", MORE["capacitor-discharge"][1]),
    "meter-on-a-too-small-range": ("meter-range", DEFINITIONS["meter-range"][1]),
    "meter-category-too-low": ("meter-category", MORE["meter-category"][1]),
    "burden-changes-the-circuit": ("meter-burden", MORE["meter-burden"][1]),
    "average-responding-meter": ("meter-waveform", MORE["meter-waveform"][1]),
    "ohmmeter-opened-on-a-winding": ("ohmmeter-on-a-coil", MORE["ohmmeter-on-a-coil"][1]),
}


def checks_of(text: str, ruleset: str = "low-voltage-50hz") -> tuple[Check, ...]:
    installation = read_text(MORE_SUPPLIES + text, "mode.yaml", GATHERED.models())
    made = review(installation, resolve(ruleset, GATHERED.rulesets), GATHERED, Review("major", "2026-12-01", False))
    return tuple(made.circuits[0].checks)


@pytest.mark.parametrize("mode", list(MODES))
def test_what_goes_wrong_in_practice_is_found_by_its_rule(mode: str) -> None:
    rule, text = MODES[mode]
    assert any(check.rule == rule and check.result == "nonconforming" for check in checks_of(text)), mode


def worst(text: str, rule: str, figure: str) -> Check:
    return next(check for check in checks_of(text) if check.rule == rule and check.figure == figure)


def test_the_fault_loop_of_a_run_is_worked_by_hand() -> None:
    """0.3 Ω outside and 60 m out and back of 2.5 mm² at 7.41 Ω/km (IEC 60228) are 1.19 Ω cold; 0.95 · 230 V over it 183.6 A."""
    check = worst(MORE["fault-loop"][1], "fault-loop", "smallest-fault-current")
    assert check.nominal == pytest.approx(183.6, rel=0.03)
    assert check.nominal is not None and check.nominal < 183.6, "the conductor is warmer than 20 °C"
    assert check.limit is not None and check.limit.value == pytest.approx(320.0), "curve D of 16 A, 20 times (IEC 60898-1)"


def test_a_conductor_withstands_what_the_adiabatic_equation_says() -> None:
    """115² · 2.5² is 82 656 A²s (IEC 60364-4-43, table 43A, k of copper in PVC)."""
    check = worst(MORE["fault-heating"][0], "fault-heating", "withstand-energy")
    assert check.nominal == pytest.approx(82656.25)


def test_a_capacitor_discharges_as_the_technical_note_has_it() -> None:
    """1 GΩ · 1 µF · ln(√2 · 230 V / 75 V) is 1467 s by hand."""
    check = worst(MORE["capacitor-discharge"][1], "capacitor-discharge", "time-to-75-volts")
    assert check.nominal == pytest.approx(1467.0, abs=1.0)


def test_sixty_hertz_practice_demands_fifty_volts_within_a_minute_beside_it() -> None:
    checks = [check for check in checks_of(MORE["capacitor-discharge"][1], "low-voltage-60hz") if check.figure == "time-to-50-volts"]
    assert len(checks) == 1 and checks[0].limit is not None and checks[0].limit.value == 60.0


def test_a_breaker_is_held_behind_its_feeder_at_no_less_than_the_true_current() -> None:
    """1 kA at 230 V is 0.23 Ω; a feeder of 40 m out and back of 16 mm² at 1.15 Ω/km adds 0.092 Ω: 714 A in phase, 928 A across."""
    text = guarded("curve: C, rating: 16 A, breaking_capacity: 500 A", supply="B1")
    board = "boards:\n  B1: {fed_from: site, cable: " + CABLE.replace("2.5 mm2", "16 mm2").replace("10 m", "40 m") + "}\ncircuits:"
    made = read_text(SUPPLIES.replace("circuits:", board) + text, "mode.yaml", GATHERED.models())
    record = review(made, resolve("low-voltage-50hz", GATHERED.rulesets), GATHERED, Review("major", "2026-12-01", False))
    check = next(one for one in record.circuits[0].checks if one.rule == "breaking-capacity")
    assert check.nominal is not None and 714.0 < check.nominal < 932.0


@pytest.mark.parametrize("rule", ["guarded by a fuse with curve C", "diode with a clamp voltage"])
def test_what_contradicts_itself_is_refused_with_what_would_be_accepted(rule: str) -> None:
    bad = {"guarded by a fuse with curve C": circuit(LAMP, more=", protection: {device: fuse, curve: C, rating: 10 A}"),
           "diode with a clamp voltage": dc_coil(after=", suppressor: {kind: diode, clamp_voltage: 30 V}")}[rule]
    with pytest.raises(InputError, match=r"gG|varistor"):
        read_text(SUPPLIES + bad, "mode.yaml", GATHERED.models())
