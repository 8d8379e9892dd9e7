"""Loads entered by what they take as a whole: a control transformer, and a lamp on its choke."""

from __future__ import annotations

import cmath
import math

import pytest

from circuitlint.definition.reading import read_text
from circuitlint.errors import DefinitionError
from circuitlint.study.installation import study
from circuitlint.study.loads import CORE
from circuitlint.study.study import CircuitStudy, Figure
from circuitlint.study.worksheet import Lack

LINE = 60 * (12.1e-3 + 0.1e-3j)
"""Loop of 30 m of 1.5 mm²: 12.1 Ω/km at 20 °C (IEC 60228, class 2), 0.1 Ω/km."""
TRANSFORMER = ("transformer: {rated_apparent_power: 250 VA, apparent_power: 90 VA, power_factor: 0.35, "
               "inrush_apparent_power: 640 VA, inrush_power_factor: 0.6}")


def circuit(load: str) -> CircuitStudy:
    text = f"""
format: 1
supplies: {{s: {{system: single-phase, voltage: 230 V, frequency: 50 Hz}}}}
circuits:
  tag: A
  fed_from: s
  ambient: 20 degC
  cable: {{section: 1.5 mm2, length: 30 m, conductor: copper, conductor_class: 2, reactance: 0.1 ohm/km}}
  load: {{{load}}}
"""
    return study(read_text(text), CORE)[0]


def value(one: CircuitStudy, name: str, state: str = "cold", of: str = "") -> float:
    found = one.figure(name, state, of)
    assert isinstance(found, Figure), found
    return found.nominal


def demand(volts: float, power: float, factor: float) -> complex:
    return volts**2 / power * cmath.exp(1j * math.acos(factor))


@pytest.mark.parametrize(("state", "power", "factor"), [("cold", 90.0, 0.35), ("switch-on", 640.0, 0.6)])
def test_a_transformer_draws_its_stated_demand_as_a_constant_impedance(state: str, power: float, factor: float) -> None:
    one = circuit(TRANSFORMER)
    wanted = 230 / abs(LINE + demand(230, power, factor))
    assert value(one, "current", state) == pytest.approx(wanted, rel=1e-9)
    assert value(one, "power-factor", state, "load.transformer") == pytest.approx(factor, rel=1e-9)


def test_at_the_voltage_it_is_stated_for_the_demand_is_the_stated_one() -> None:
    one = circuit(TRANSFORMER)
    at = value(one, "voltage", of="load.transformer")
    assert value(one, "apparent-power", of="load.transformer") == pytest.approx(90 * (at / 230) ** 2, rel=1e-9)


def test_at_another_frequency_only_the_reactance_follows() -> None:
    one = circuit(TRANSFORMER)
    at_50 = demand(230, 90, 0.35)
    assert value(one, "reactance", "other-frequency", "load.transformer") == pytest.approx(at_50.imag * 1.2, rel=1e-9)
    assert value(one, "resistance", "other-frequency", "load.transformer") == pytest.approx(at_50.real, rel=1e-9)


def test_a_transformer_is_chosen_for_the_root_of_the_sum_of_both_squares() -> None:
    """Root of the sum of squares: common practice of selection guides for control transformers."""
    assert value(circuit(TRANSFORMER), "selection-demand", "switch-on", "load.transformer") == pytest.approx(math.hypot(90, 640))


def test_without_the_inrush_demand_switch_on_is_not_assessed_and_the_rest_is() -> None:
    one = circuit("transformer: {apparent_power: 90 VA, power_factor: 0.35}")
    found = one.figure("current", "switch-on")
    assert isinstance(found, Lack) and "load.transformer.inrush_apparent_power" in found.needs
    assert value(one, "current") > 0
    assert isinstance(one.figure("current", "direct-current"), Lack)
    peak = circuit(TRANSFORMER).figure("switch-on-peak", "switch-on")
    assert isinstance(peak, Lack), "a transformer's own inrush is not known from its plate"


CURRENT, LOSS, LAMP, CHOKE = 0.67, 9.0, 58.0, 178.0
"""A choke of 0.67 A with 9 W and 178 V, and a lamp of 58 W (values of the trade's order, chosen here)."""
RESISTANCE = LOSS / CURRENT**2
REACTANCE = math.sqrt((CHOKE / CURRENT) ** 2 - RESISTANCE**2)
WHOLE = complex(RESISTANCE + LAMP / CURRENT**2, REACTANCE)
PLATES = {
    "choke voltage and lamp power": f"choke_voltage: {CHOKE!r} V, lamp_power: {LAMP!r} W",
    "choke voltage and lamp voltage": f"choke_voltage: {CHOKE!r} V, lamp_voltage: {LAMP / CURRENT!r} V",
    "supply voltage and lamp power": f"rated_voltage: {CURRENT * abs(WHOLE)!r} V, lamp_power: {LAMP!r} W",
    "supply voltage and lamp voltage": f"rated_voltage: {CURRENT * abs(WHOLE)!r} V, lamp_voltage: {LAMP / CURRENT!r} V",
}


@pytest.mark.parametrize("plate", PLATES.values(), ids=list(PLATES))
def test_a_lamp_on_its_choke_is_the_same_by_every_plate(plate: str) -> None:
    one = circuit(f"ballast: {{current: {CURRENT!r} A, loss: {LOSS!r} W, {plate}}}")
    current = 230 / abs(LINE + WHOLE)
    assert value(one, "current") == pytest.approx(current, rel=1e-9)
    assert value(one, "lamp-power", of="load.ballast") == pytest.approx(current**2 * LAMP / CURRENT**2, rel=1e-9)
    assert value(one, "choke-loss", of="load.ballast") == pytest.approx(current**2 * RESISTANCE, rel=1e-9)
    assert value(one, "reactance", of="load.ballast") == pytest.approx(REACTANCE, rel=1e-9)


def test_a_lamp_on_its_choke_is_the_same_as_a_coil_and_a_resistor_in_series() -> None:
    plate = PLATES["choke voltage and lamp power"]
    one = circuit(f"ballast: {{current: {CURRENT!r} A, loss: {LOSS!r} W, {plate}}}")
    other = circuit(f"series: [{{coil: {{resistance: {RESISTANCE!r} ohm, reactance: {REACTANCE!r} ohm, armature: none}}}}, "
                    f"{{resistor: {{resistance: {LAMP / CURRENT**2!r} ohm}}}}]")
    for name in ("current", "active-power", "reactive-power", "power-factor", "voltage-drop"):
        assert value(one, name) == pytest.approx(value(other, name), rel=1e-9), name


def test_before_the_lamp_has_struck_nothing_is_told() -> None:
    one = circuit(f"ballast: {{current: 0.67 A, loss: 9 W, {PLATES['choke voltage and lamp power']}}}")
    found = one.figure("current", "switch-on")
    assert isinstance(found, Lack) and "struck" in found.why


def test_a_plate_that_contradicts_itself_beyond_what_can_be_is_not_assessed() -> None:
    one = circuit("ballast: {current: 0.67 A, loss: 150 W, choke_voltage: 178 V, lamp_power: 58 W}")
    found = one.figure("current", "cold")
    assert isinstance(found, Lack) and "range of a formula" in found.why


@pytest.mark.parametrize(("load", "words"), [
    ("ballast: {current: 0.67 A, loss: 9 W, lamp_power: 58 W}", "choke_voltage or rated_voltage"),
    ("ballast: {current: 0.67 A, loss: 9 W, choke_voltage: 178 V}", "lamp_power or lamp_voltage"),
    ("transformer: {apparent_power: 90 VA, power_factor: 1.4}", "up to 1"),
    ("transformer: {apparent_power: 90 VA, power_factor: 0.4, inrush_apparent_power: 640 VA}", "together"),
])  # fmt: skip
def test_half_a_plate_is_refused_with_what_is_accepted(load: str, words: str) -> None:
    with pytest.raises(DefinitionError) as caught:
        circuit(load)
    assert words in str(caught.value)
