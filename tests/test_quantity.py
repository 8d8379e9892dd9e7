"""Text to SI numbers and back: what is read, what is refused, and what the refusal says."""

from __future__ import annotations

import math
import time

import pint
import pytest
from hypothesis import given
from hypothesis import strategies as st

from circuitlint import si, units
from circuitlint.errors import QuantityError
from circuitlint.quantity import read, show, show_range, write

READ = [
    ("24 V ± 10 %", si.VOLTAGE, 24.0, 21.6, 26.4),
    ("24 V +- 10 %", si.VOLTAGE, 24.0, 21.6, 26.4),
    ("230 V +10/-6 %", si.VOLTAGE, 230.0, 216.2, 253.0),
    ("24 V -15/+10 %", si.VOLTAGE, 24.0, 20.4, 26.4),
    ("24 V +2/-1 V", si.VOLTAGE, 24.0, 23.0, 26.0),
    ("21 ohm ± 0.2 ohm", si.RESISTANCE, 21.0, 20.8, 21.2),
    ("18..22 ohm", si.RESISTANCE, 20.0, 18.0, 22.0),
    ("4k7", si.RESISTANCE, 4700.0, 4700.0, 4700.0),
    ("2R2", si.RESISTANCE, 2.2, 2.2, 2.2),
    ("R47 ± 5 %", si.RESISTANCE, 0.47, 0.4465, 0.4935),
    ("1M5", si.RESISTANCE, 1.5e6, 1.5e6, 1.5e6),
    ("100n", si.CAPACITANCE, 1e-7, 1e-7, 1e-7),
    ("4n7 ± 10 %", si.CAPACITANCE, 4.7e-9, 4.23e-9, 5.17e-9),
    ("4m7", si.INDUCTANCE, 4.7e-3, 4.7e-3, 4.7e-3),
    ("1.5 mm2", si.AREA, 1.5e-6, 1.5e-6, 1.5e-6),
    ("6 mm²", si.AREA, 6e-6, 6e-6, 6e-6),
    ("5 kvar", si.REACTIVE_POWER, 5000.0, 5000.0, 5000.0),
    ("40 degC ± 5 K", si.TEMPERATURE, 40.0, 35.0, 45.0),
    ("-10..40 °C", si.TEMPERATURE, 15.0, -10.0, 40.0),
    ("300 K", si.TEMPERATURE, 26.85, 26.85, 26.85),
    ("15 \u00b5F", si.CAPACITANCE, 1.5e-5, 1.5e-5, 1.5e-5),
    ("15 \u03bcF", si.CAPACITANCE, 1.5e-5, 1.5e-5, 1.5e-5),
    ("3 k\u03a9", si.RESISTANCE, 3000.0, 3000.0, 3000.0),
    ("3 \u2126", si.RESISTANCE, 3.0, 3.0, 3.0),
    ("0.85", si.RATIO, 0.85, 0.85, 0.85),
    ("85 %", si.RATIO, 0.85, 0.85, 0.85),
    ("12.1 ohm/km", si.RESISTANCE_PER_LENGTH, 0.0121, 0.0121, 0.0121),
    ("0.26 uF/km", si.CAPACITANCE_PER_LENGTH, 2.6e-10, 2.6e-10, 2.6e-10),
    ("2 inch", si.LENGTH, 0.0508, 0.0508, 0.0508),
    ("53 deg", si.ANGLE, math.radians(53), math.radians(53), math.radians(53)),
]


@pytest.mark.parametrize(("text", "dimension", "nominal", "low", "high"), READ, ids=[row[0] for row in READ])
def test_a_stated_quantity_is_read_in_si(text: str, dimension: si.Dimension, nominal: float, low: float, high: float) -> None:
    quantity = read(text, dimension)
    assert quantity.nominal == pytest.approx(nominal, rel=1e-12)
    assert quantity.low == pytest.approx(low, rel=1e-12)
    assert quantity.high == pytest.approx(high, rel=1e-12)


REFUSED = [
    ("21", si.RESISTANCE, "no unit"),
    ("0,36 H", si.INDUCTANCE, "decimal comma"),
    ("nan V", si.VOLTAGE, "not finite"),
    ("inf V", si.VOLTAGE, "not finite"),
    ("1e400 V", si.VOLTAGE, "not finite"),
    ("9**9**9 V", si.VOLTAGE, "9**9**9"),
    ("2+2 V", si.VOLTAGE, "does not follow"),
    ("10 a", si.CURRENT, "not a current"),
    ("5 V", si.CURRENT, "is a voltage, not a current"),
    ("3 VA", si.ACTIVE_POWER, "is an apparent power"),
    ("3 var", si.APPARENT_POWER, "is a reactive power"),
    ("3 W", si.REACTIVE_POWER, "is an active power"),
    ("5 S", si.RESISTANCE, "conductance"),
    ("4 kg", si.LENGTH, "kg"),
    ("0 ohm", si.RESISTANCE, "zero or below"),
    ("-3 ohm", si.RESISTANCE, "zero or below"),
    ("5 ohm ± 100 %", si.RESISTANCE, "100 % or more"),
    ("5 ohm ± 6 ohm", si.RESISTANCE, "reaches zero or below"),
    ("22..18 ohm", si.RESISTANCE, "from high to low"),
    ("1_000 V", si.VOLTAGE, "does not follow"),
    ("\uff15 V", si.VOLTAGE, "does not follow"),
    ("1e30 V", si.VOLTAGE, "not a believable voltage"),
    ("", si.VOLTAGE, "empty"),
    ("5 V ± 10", si.VOLTAGE, "tolerance without a unit"),
    ("5 V ± 1 A", si.VOLTAGE, "is a current"),
    ("40 degC ± 5 %", si.TEMPERATURE, "share of a temperature"),
    ("100n", si.RESISTANCE, "unknown unit"),
    ("5 dB", si.RATIO, "unknown unit"),
    ("5 ohms_", si.RESISTANCE, "does not follow"),
    ("5 __import__", si.VOLTAGE, "does not follow"),
    ("5 V\x00", si.VOLTAGE, "V"),
    ("9" * 400 + " V", si.VOLTAGE, "characters"),
]


@pytest.mark.parametrize(("text", "dimension", "told"), REFUSED, ids=[row[0][:20] for row in REFUSED])
def test_a_faulty_quantity_is_refused_with_what_was_read_and_what_is_accepted(
    text: str, dimension: si.Dimension, told: str
) -> None:
    with pytest.raises(QuantityError) as caught:
        read(text, dimension)
    assert told in caught.value.what
    assert caught.value.accepted


@pytest.mark.parametrize("value", [None, True, 21, 2.5, [], {}])
def test_what_is_not_text_is_refused(value: object) -> None:
    with pytest.raises(QuantityError):
        read(value, si.RESISTANCE)


@pytest.mark.parametrize("name", [name for name in units.EVERYDAY if name != "A2s"])
def test_each_everyday_unit_is_what_pint_says_it_is(name: str) -> None:
    unit, factor = units.EVERYDAY[name]
    by_pint = units.through_pint(name)
    assert by_pint[0] == unit
    assert by_pint[1] == pytest.approx(factor, rel=1e-12)


def test_everyday_units_agree_with_pints_own_parser() -> None:
    registry = pint.UnitRegistry()
    for text in ("kohm", "mH", "nF", "kW", "degree", "ohm/km", "uF/km", "mm**2", "ampere**2*second"):
        ours = {"degree": "deg", "mm**2": "mm2", "ampere**2*second": "A2s"}.get(text, text)
        unit, factor = units.EVERYDAY[ours]
        assert (registry.Quantity(1.0, text) / registry.Quantity(factor, unit)).to_base_units().magnitude == pytest.approx(1.0)


@given(st.text(max_size=40), st.sampled_from(list(si.DIMENSIONS.values())))
def test_any_text_at_all_is_read_or_refused_and_at_once(text: str, dimension: si.Dimension) -> None:
    start = time.perf_counter()
    try:
        quantity = read(text, dimension)
    except QuantityError:
        pass
    else:
        assert math.isfinite(quantity.nominal)
        assert quantity.low <= quantity.nominal <= quantity.high
    assert time.perf_counter() - start < 2.0


PIECES = st.sampled_from(["5", "2.5", "1e3", "4k7", " ", "V", "ohm", "±", "%", "+", "-", "/", "..", "10", "degC", "K", ",", "**", "mm2"])


@given(st.lists(PIECES, max_size=9).map("".join), st.sampled_from(list(si.DIMENSIONS.values())))
def test_scraps_of_the_grammar_never_do_worse_than_a_refusal(text: str, dimension: si.Dimension) -> None:
    try:
        quantity = read(text, dimension)
    except QuantityError:
        return
    assert quantity.low <= quantity.nominal <= quantity.high
    assert dimension.signed or quantity.low > 0.0


@given(st.sampled_from(list(si.DIMENSIONS.values())), st.floats(0.0, 1.0))
def test_what_is_written_reads_back_to_the_same_float(dimension: si.Dimension, share: float) -> None:
    low, high = max(dimension.smallest, 1e-6), min(dimension.largest, 1e6)
    value = low + share * (high - low)
    assert read(write(value, dimension), dimension).nominal == value


def test_magnitudes_are_shown_as_the_trade_writes_them() -> None:
    assert show(4700.0, si.RESISTANCE) == "4.700 kΩ"
    assert show(1.5e-6, si.AREA) == "1.5 mm²"
    assert show(0.0121, si.RESISTANCE_PER_LENGTH) == "12.10 Ω/km"
    assert show(71.3, si.TEMPERATURE) == "71.30 °C"
    assert show(-0.0, si.CURRENT) == "0 A"
    assert show(float("nan"), si.CURRENT) == "–"
    assert show_range(4.612, 5.103, si.CURRENT) == "4.612 .. 5.103 A"
    assert show_range(0.9, 1.2, si.CURRENT) == "0.9000 .. 1.200 A"


@given(st.floats(1e-11, 1e9), st.sampled_from([si.RESISTANCE, si.CURRENT, si.INDUCTANCE]))
def test_what_is_shown_is_right_to_its_last_digit(value: float, dimension: si.Dimension) -> None:
    number, unit = show(value, dimension, 4).split()
    scale = {"p": 1e-12, "n": 1e-9, "µ": 1e-6, "m": 1e-3, "k": 1e3, "M": 1e6, "G": 1e9}.get(unit[0], 1.0)
    if len(unit) == 1:
        scale = 1.0
    assert float(number) * scale == pytest.approx(value, rel=6e-4)
