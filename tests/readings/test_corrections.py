"""What the meters themselves do to a reading is taken off, and what cannot be taken off is said."""

from __future__ import annotations

import pytest

from circuitlint.readings.holding import Options
from tests.readings.held import held, result

METERS = """
format: 1
instruments:
  ohms: {inputs: {resistance: {accuracy: ± 0.1 %, lead_resistance: 0.3 ohm ± 0.1 ohm}}}
  amps: {inputs: {current: {accuracy: ± 0.1 %, range: 2 A, burden: 0.4 V}}}
  volts: {inputs: {voltage: {accuracy: ± 0.1 %, resistance: 10 kohm}}}
readings:
"""
QUICK = Options(trials=2000)


def test_lead_resistance_is_taken_off_a_two_wire_reading_and_adds_its_uncertainty() -> None:
    out = held(METERS + "  - {tag: AC, state: cold, instrument: ohms, resistance: 21.3 ohm}\n", options=QUICK)
    found = result(out, "direct-current-resistance")
    assert found.value == pytest.approx(21.0)
    # Rectangular contributions, JCGM 100:2008, 4.3.7: 0.1 % of 21.3 ohm, and 0.1 ohm.
    assert found.uncertainty == pytest.approx(((0.0213**2 + 0.1**2) / 3.0) ** 0.5, rel=1e-6)


def test_four_wires_have_no_leads_to_take_off() -> None:
    out = held(METERS + "  - {tag: AC, state: cold, four_wire: yes, instrument: ohms, resistance: 21.3 ohm}\n", options=QUICK)
    assert result(out, "direct-current-resistance").value == pytest.approx(21.3)


def test_leads_nobody_states_stay_in_the_reading_and_that_is_said() -> None:
    out = held("format: 1\nreadings: [{tag: AC, state: cold, resistance: 21.3 ohm ± 0.1 ohm}]", options=QUICK)
    assert any("still part of the resistance" in note for note in out.readings[0].notes)


def test_the_ammeters_burden_is_taken_off_where_the_voltmeter_stands_ahead_of_it() -> None:
    # 0.4 V at 2 A is 0.2 ohm: of Z = 30 + j40 ohm with 0.2 ohm before it, 30 + j40 is left.
    size, cosine = abs(30.2 + 40j), 30.2 / abs(30.2 + 40j)
    text = (f"  - {{tag: AC, state: cold, voltmeter: ahead of the ammeter, instrument: {{voltage: volts, current: amps}}, "
            f"voltage: {size:.9f} V, current: 1 A, power_factor: {cosine:.12f} ± 0.0001}}\n")
    out = held(METERS + text, options=QUICK)
    assert result(out, "resistance").value == pytest.approx(30.0, rel=1e-6)
    assert result(out, "reactance").value == pytest.approx(40.0, rel=1e-6)
    assert result(out, "voltage").value == pytest.approx(50.0, rel=1e-6)


def test_the_voltmeters_own_current_is_taken_off_where_it_stands_at_the_load() -> None:
    # 10 kohm across 300 + j400 ohm.
    both = 1.0 / (1.0 / (300 + 400j) + 1.0 / 10_000)
    current = 100.0 / abs(both)
    text = (f"  - {{tag: AC, state: cold, instrument: {{voltage: volts, current: amps}}, voltage: 100 V, "
            f"current: {current:.12f} A, power_factor: {both.real / abs(both):.12f} ± 0.0001}}\n")
    out = held(METERS + text, options=QUICK)
    assert result(out, "resistance").value == pytest.approx(300.0, rel=1e-6)
    assert result(out, "reactance").value == pytest.approx(400.0, rel=1e-6)
    assert result(out, "current").value == pytest.approx(0.2, rel=1e-6)


def test_direct_current_readings_are_corrected_alike() -> None:
    text = ("  - {tag: DC, state: cold, voltmeter: ahead of the ammeter, instrument: {voltage: volts, current: amps},"
            " voltage: 24.1 V, current: 0.5 A}\n"
            "  - {tag: DC, state: cold, instrument: {voltage: volts, current: amps}, voltage: 24 V, current: 0.5024 A}\n")
    out = held(METERS + text, options=QUICK)
    assert [result(out, "resistance", number).value for number in (0, 1)] == pytest.approx([48.0, 48.0])


def test_a_resistance_is_brought_to_the_reference_temperature() -> None:
    # IEC 60034-1 form with 234.5 for copper: 320 ohm at 25 degC and 443.3 ohm at 125 degC are of one winding.
    line = "  - {{tag: DC, state: cold, four_wire: yes, instrument: ohms, resistance: {} ohm, temperature: {} degC ± 0.1 K}}\n"
    text = line.format(320, 25) + line.format(443.3, 125)
    out = held(METERS + text, options=QUICK)
    assert {one.name for one in out.readings[0].results} == {"direct-current-resistance", "reference-resistance"}
    both = [result(out, "reference-resistance", number).value for number in (0, 1)]
    assert both[0] == pytest.approx(both[1], rel=2e-4)


def test_core_loss_is_told_apart_where_winding_temperature_and_cold_resistance_are_read() -> None:
    # A winding of 21 ohm at 20 degC has 21 * (234.5 + 70) / 254.5 ohm at 70 degC; of 130 W at 2 A the rest is lost in the core.
    text = ("  - {tag: AC, state: cold, four_wire: yes, instrument: ohms, resistance: 21 ohm, temperature: 20 degC ± 0.1 K}\n"
            "  - {tag: AC, state: steady, instrument: {current: amps}, voltage: 230 V ± 0.1 V, current: 2 A,"
            " power: 130 W ± 0.1 W, temperature: 70 degC ± 1 K}\n")
    out = held(METERS + text, options=QUICK)
    assert result(out, "core-loss", 1).value == pytest.approx(130.0 - 4.0 * 21.0 * 304.5 / 254.5, rel=1e-6)
    assert out.readings[1].correlation["resistance, reactance"] != 0.0
