"""SI numbers to text: how magnitudes are shown to a person, and how they are written to be read back.

Prefixes follow the SI brochure, 9th edition, chapter 3; which units a magnitude is shown in is common practice.
"""

from __future__ import annotations

import math

import pytest

from circuitlint import si
from circuitlint.errors import QuantityError
from circuitlint.quantity import Quantity, read, show, show_range, write


def test_magnitudes_are_shown_as_the_trade_writes_them() -> None:
    assert show(4700.0, si.RESISTANCE) == "4.700 kΩ"
    assert show(1.5e-6, si.AREA) == "1.5 mm²"
    assert show(2.4e-4, si.AREA) == "240 mm²"
    assert show(0.0121, si.RESISTANCE_PER_LENGTH) == "12.10 Ω/km"
    assert show(2.6e-10, si.CAPACITANCE_PER_LENGTH) == "0.2600 µF/km"
    assert show(71.3, si.TEMPERATURE) == "71.30 °C"
    assert show(-5.0, si.TEMPERATURE) == "-5.000 °C"
    assert show(0.923, si.RATIO, 3) == "0.923"
    assert show(math.radians(53), si.ANGLE) == "53.00°"
    assert show(1.5e-5, si.CAPACITANCE) == "15.00 µF"
    assert show(3600.0, si.TIME) == "3600 s"
    assert show(0.03, si.TIME) == "30.00 ms"
    assert show(2.5e6, si.LENGTH) == "2500 km"
    assert show_range(4.612, 5.103, si.CURRENT) == "4.612 .. 5.103 A"
    assert show_range(4.612, 5.103, si.CURRENT, 3) == "4.61 .. 5.10 A"
    assert show_range(0.9, 1.2, si.CURRENT) == "0.9000 .. 1.200 A"
    assert show_range(-10.0, 40.0, si.TEMPERATURE, 3) == "-10.0 .. 40.0 °C"


def test_a_let_through_carries_no_prefix_since_that_would_be_squared_with_the_ampere() -> None:
    assert show(20000.0, si.LET_THROUGH) == "20000 A²s"  # 1 kA²s is 1e6 A²s: SI brochure, 9th edition, chapter 3


def test_a_prefix_is_chosen_after_rounding() -> None:
    assert show(999.96, si.RESISTANCE) == "1.000 kΩ"
    assert show(999.6, si.RESISTANCE, 3) == "1.00 kΩ"
    assert show(999.96, si.RESISTANCE, 5) == "999.96 Ω"
    assert show(9.99996, si.CURRENT) == "10.00 A"


def test_what_a_prefix_would_carry_beyond_every_float_is_shown_in_the_coherent_unit() -> None:
    assert show(1.5e306, si.RESISTANCE_PER_LENGTH) == "1.500e+306 Ω/m"
    assert show(1.5e306, si.AREA) == "1.500e+306 m²"


def test_minus_zero_and_what_is_not_finite_are_never_shown_as_numbers() -> None:
    assert show(-0.0, si.CURRENT) == "0 A"
    assert show(-1e-20, si.TEMPERATURE) == "0 °C"
    assert show_range(-0.0, 1.0, si.CURRENT) == "0 .. 1.000 A"
    for value in (math.nan, math.inf, -math.inf):
        assert show(value, si.CURRENT) == "-"
        assert show_range(1.0, value, si.CURRENT) == "-"


def test_quantities_are_written_in_units_that_a_person_reads() -> None:
    assert write(4.7e-6, si.CAPACITANCE) == "4.7 uF"
    assert write(4700.0, si.RESISTANCE) == "4.7 kohm"
    assert write(1.5e-6, si.AREA) == "1.5 mm2"
    assert write(0.0121, si.RESISTANCE_PER_LENGTH) == "12.1 ohm/km"
    assert write(20000.0, si.LET_THROUGH) == "20000 A2s"
    assert write(5000.0, si.REACTIVE_POWER) == "5 kvar"
    assert write(0.85, si.RATIO) == "0.85"
    assert write(-10.0, si.TEMPERATURE) == "-10 degC"
    assert write(100.0, si.VOLTAGE) == "100 V"
    assert write(read("18..22 ohm", si.RESISTANCE), si.RESISTANCE) == "18..22 ohm"
    assert write(read("230 V +10/-6 %", si.VOLTAGE), si.VOLTAGE) == "230 (216.2..253) V"


def test_a_quantity_made_by_code_carries_a_text_that_reads_back_to_it() -> None:
    for made in (
        Quantity.of(21.0, si.RESISTANCE),
        Quantity.of(21.0, si.RESISTANCE, low=20.0),
        Quantity.of(21.0, si.RESISTANCE, high=23.0),
        Quantity.of(21.0, si.RESISTANCE, 18.0, 23.0),
        Quantity.of(0.36, si.INDUCTANCE, 0.36 * 0.9, 0.36 * 1.1),
        Quantity.of(0.9, si.RATIO, 0.8, 0.95),
        Quantity.of(15.0, si.TEMPERATURE, -10.0, 40.0),
    ):
        assert read(made.text, made.dimension) == made
    assert Quantity.of(0.0, si.CURRENT).text == "0 A"


@pytest.mark.parametrize(("value", "low", "high"), [(math.nan, None, None), (math.inf, None, None), (1.0, 2.0, 3.0),
                                                    (1.0, 0.5, 0.9), (1.0, math.nan, 2.0), (1.0, 0.5, math.inf)])
def test_a_quantity_made_by_code_must_be_finite_and_in_order(value: float, low: float | None, high: float | None) -> None:
    with pytest.raises(QuantityError):
        Quantity.of(value, si.CURRENT, low, high)
