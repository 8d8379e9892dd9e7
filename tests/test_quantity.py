"""Text to SI numbers: what is read, what is refused, and what the refusal says.

Expected values follow from the definitions of the units: decimal prefixes, minute, hour, degree of angle and degree Celsius
from the SI brochure, 9th edition (tables 7 and 8, 2.3.1); inch and foot from NIST SP 811, 2008, appendix B.8. The letters in
place of a point are those of IEC 60062 (value from memory). What a person writes for a tolerance is common practice.
"""

from __future__ import annotations

import math
import subprocess
import sys
import time

import pytest

from circuitlint import numbers, si
from circuitlint.errors import QuantityError
from circuitlint.quantity import read, read_unit

READ = [
    ("24 V", si.VOLTAGE, 24.0, 24.0, 24.0),
    ("24V", si.VOLTAGE, 24.0, 24.0, 24.0),
    ("  24 \u00a0V ", si.VOLTAGE, 24.0, 24.0, 24.0),
    ("24\u202fV", si.VOLTAGE, 24.0, 24.0, 24.0),
    ("+24 V", si.VOLTAGE, 24.0, 24.0, 24.0),
    ("2.4e1 V", si.VOLTAGE, 24.0, 24.0, 24.0),
    ("24 volts", si.VOLTAGE, 24.0, 24.0, 24.0),
    ("24 V ± 10 %", si.VOLTAGE, 24.0, 21.6, 26.4),
    ("24V±10%", si.VOLTAGE, 24.0, 21.6, 26.4),
    ("24 V +- 10 %", si.VOLTAGE, 24.0, 21.6, 26.4),
    ("24 V +/- 10 %", si.VOLTAGE, 24.0, 21.6, 26.4),
    ("24 V ± 0 %", si.VOLTAGE, 24.0, 24.0, 24.0),
    ("230 V +10/-6 %", si.VOLTAGE, 230.0, 216.2, 253.0),
    ("230 V +10 %/-6 %", si.VOLTAGE, 230.0, 216.2, 253.0),
    ("24 V -15/+10 %", si.VOLTAGE, 24.0, 20.4, 26.4),
    ("24 V +2/-1 V", si.VOLTAGE, 24.0, 23.0, 26.0),
    ("24 V -1/+2 V", si.VOLTAGE, 24.0, 23.0, 26.0),
    ("24 V +2 V/-500 mV", si.VOLTAGE, 24.0, 23.5, 26.0),
    ("24 V -500 mV/+2 V", si.VOLTAGE, 24.0, 23.5, 26.0),
    ("24 V -500 mV/+10 %", si.VOLTAGE, 24.0, 23.5, 26.4),
    ("10 uF +100/-20 %", si.CAPACITANCE, 1e-5, 8e-6, 2e-5),
    ("21 ohm ± 0.2 ohm", si.RESISTANCE, 21.0, 20.8, 21.2),
    ("21 ohm ± 200 mohm", si.RESISTANCE, 21.0, 20.8, 21.2),
    ("18..22 ohm", si.RESISTANCE, 20.0, 18.0, 22.0),
    ("18 .. 22 ohm", si.RESISTANCE, 20.0, 18.0, 22.0),
    ("18...22 ohm", si.RESISTANCE, 20.0, 18.0, 22.0),
    ("18…22 ohm", si.RESISTANCE, 20.0, 18.0, 22.0),
    ("18 ohm..22 ohm", si.RESISTANCE, 20.0, 18.0, 22.0),
    ("500 mA..2 A", si.CURRENT, 1.25, 0.5, 2.0),
    ("20 (18..24) ohm", si.RESISTANCE, 20.0, 18.0, 24.0),
    ("5 ohm", si.REACTANCE, 5.0, 5.0, 5.0),
    ("3 k\u03a9", si.RESISTANCE, 3000.0, 3000.0, 3000.0),
    ("3 \u2126", si.RESISTANCE, 3.0, 3.0, 3.0),
    ("3 \u00b5ohm", si.RESISTANCE, 3e-6, 3e-6, 3e-6),
    ("15 uF", si.CAPACITANCE, 1.5e-5, 1.5e-5, 1.5e-5),
    ("15 \u00b5F", si.CAPACITANCE, 1.5e-5, 1.5e-5, 1.5e-5),
    ("15 \u03bcF", si.CAPACITANCE, 1.5e-5, 1.5e-5, 1.5e-5),
    ("75 mH", si.INDUCTANCE, 0.075, 0.075, 0.075),
    ("4k7", si.RESISTANCE, 4700.0, 4700.0, 4700.0),
    ("4K7", si.RESISTANCE, 4700.0, 4700.0, 4700.0),
    ("4k7 ± 5 %", si.RESISTANCE, 4700.0, 4465.0, 4935.0),
    ("4k7 ± 100 ohm", si.RESISTANCE, 4700.0, 4600.0, 4800.0),
    ("2R2", si.RESISTANCE, 2.2, 2.2, 2.2),
    ("10R", si.RESISTANCE, 10.0, 10.0, 10.0),
    ("R47 ± 5 %", si.RESISTANCE, 0.47, 0.4465, 0.4935),
    ("1M5", si.RESISTANCE, 1.5e6, 1.5e6, 1.5e6),
    ("1m5", si.RESISTANCE, 1.5e-3, 1.5e-3, 1.5e-3),
    ("3G3", si.RESISTANCE, 3.3e9, 3.3e9, 3.3e9),
    ("1T", si.RESISTANCE, 1e12, 1e12, 1e12),
    ("100n", si.CAPACITANCE, 1e-7, 1e-7, 1e-7),
    ("100n ± 10 %", si.CAPACITANCE, 1e-7, 9e-8, 1.1e-7),
    ("4n7±10%", si.CAPACITANCE, 4.7e-9, 4.23e-9, 5.17e-9),
    ("4\u00b57", si.CAPACITANCE, 4.7e-6, 4.7e-6, 4.7e-6),
    ("p33", si.CAPACITANCE, 3.3e-13, 3.3e-13, 3.3e-13),
    ("1F5", si.CAPACITANCE, 1.5, 1.5, 1.5),
    ("4m7", si.INDUCTANCE, 4.7e-3, 4.7e-3, 4.7e-3),
    ("10u", si.INDUCTANCE, 1e-5, 1e-5, 1e-5),
    ("1H2", si.INDUCTANCE, 1.2, 1.2, 1.2),
    ("1.5 mm2", si.AREA, 1.5e-6, 1.5e-6, 1.5e-6),
    ("6 mm²", si.AREA, 6e-6, 6e-6, 6e-6),
    ("6 mm^2", si.AREA, 6e-6, 6e-6, 6e-6),
    ("0.01 m2", si.AREA, 0.01, 0.01, 0.01),
    ("5 kvar", si.REACTIVE_POWER, 5000.0, 5000.0, 5000.0),
    ("250 var", si.REACTIVE_POWER, 250.0, 250.0, 250.0),
    ("1.2 kVA", si.APPARENT_POWER, 1200.0, 1200.0, 1200.0),
    ("72 V·A", si.APPARENT_POWER, 72.0, 72.0, 72.0),
    ("60 J/s", si.ACTIVE_POWER, 60.0, 60.0, 60.0),
    ("1 kWh", si.ENERGY, 3.6e6, 3.6e6, 3.6e6),
    ("2 W·s", si.ENERGY, 2.0, 2.0, 2.0),
    ("5 min", si.TIME, 300.0, 300.0, 300.0),
    ("2 h", si.TIME, 7200.0, 7200.0, 7200.0),
    ("2 in", si.LENGTH, 0.0508, 0.0508, 0.0508),
    ("100 ft", si.LENGTH, 30.48, 30.48, 30.48),
    ("53 deg", si.ANGLE, math.radians(53), math.radians(53), math.radians(53)),
    ("180°", si.ANGLE, math.pi, math.pi, math.pi),
    ("-0.9 rad", si.ANGLE, -0.9, -0.9, -0.9),
    ("-10 deg ± 10 %", si.ANGLE, -math.radians(10), -math.radians(11), -math.radians(9)),
    ("40 degC ± 5 K", si.TEMPERATURE, 40.0, 35.0, 45.0),
    ("40 degC ± 5 degC", si.TEMPERATURE, 40.0, 35.0, 45.0),
    ("40 °C ± 5 °C", si.TEMPERATURE, 40.0, 35.0, 45.0),
    ("40 \u2103 +5/-10 K", si.TEMPERATURE, 40.0, 30.0, 45.0),
    ("-10..40 degC", si.TEMPERATURE, 15.0, -10.0, 40.0),
    ("-10..-5 °C", si.TEMPERATURE, -7.5, -10.0, -5.0),
    ("\u221210..40 °C", si.TEMPERATURE, 15.0, -10.0, 40.0),
    ("0 degC", si.TEMPERATURE, 0.0, 0.0, 0.0),
    ("300 K", si.TEMPERATURE, 26.85, 26.85, 26.85),
    ("300 K ± 5 K", si.TEMPERATURE, 26.85, 21.85, 31.85),
    ("0 K", si.TEMPERATURE, -273.15, -273.15, -273.15),
    ("104 degF", si.TEMPERATURE, 40.0, 40.0, 40.0),
    ("104 degF ± 9 degF", si.TEMPERATURE, 40.0, 35.0, 45.0),
    ("55 K", si.TEMPERATURE_RISE, 55.0, 55.0, 55.0),
    ("1.8 K/W", si.THERMAL_RESISTANCE, 1.8, 1.8, 1.8),
    ("1.8 °C/W", si.THERMAL_RESISTANCE, 1.8, 1.8, 1.8),
    ("0.85", si.RATIO, 0.85, 0.85, 0.85),
    ("85 %", si.RATIO, 0.85, 0.85, 0.85),
    ("0.85 ± 0.05", si.RATIO, 0.85, 0.8, 0.9),
    ("0.8 ± 5 %", si.RATIO, 0.8, 0.76, 0.84),
    ("0.8..0.9", si.RATIO, 0.85, 0.8, 0.9),
    ("80..90 %", si.RATIO, 0.85, 0.8, 0.9),
    ("12.1 ohm/km", si.RESISTANCE_PER_LENGTH, 0.0121, 0.0121, 0.0121),
    ("12.1 Ω/km", si.RESISTANCE_PER_LENGTH, 0.0121, 0.0121, 0.0121),
    ("3 ohm/ft", si.RESISTANCE_PER_LENGTH, 3 / 0.3048, 3 / 0.3048, 3 / 0.3048),
    ("2.1 W/m", si.LOSS_PER_LENGTH, 2.1, 2.1, 2.1),
    ("0.26 uF/km", si.CAPACITANCE_PER_LENGTH, 2.6e-10, 2.6e-10, 2.6e-10),
    ("20000 A2s", si.LET_THROUGH, 20000.0, 20000.0, 20000.0),
    ("20000 A²s", si.LET_THROUGH, 20000.0, 20000.0, 20000.0),
    ("20000 A²·s", si.LET_THROUGH, 20000.0, 20000.0, 20000.0),
    ("2 mS", si.CONDUCTANCE, 0.002, 0.002, 0.002),
    ("4.6 V/Hz", si.FLUX_RATIO, 4.6, 4.6, 4.6),
]


@pytest.mark.parametrize(("text", "dimension", "nominal", "low", "high"), READ, ids=[row[0] for row in READ])
def test_a_stated_quantity_is_read_in_si(
    text: str, dimension: si.Dimension, nominal: float, low: float, high: float
) -> None:
    quantity = read(text, dimension)
    assert quantity.nominal == pytest.approx(nominal, rel=1e-14, abs=1e-18)
    assert quantity.low == pytest.approx(low, rel=1e-14, abs=1e-18)
    assert quantity.high == pytest.approx(high, rel=1e-14, abs=1e-18)
    assert quantity.exact == (low == high)
    assert quantity.dimension is dimension


def test_decimal_units_and_tolerances_are_rounded_once_so_that_equal_amounts_are_equal_floats() -> None:
    assert read("4.7 uF", si.CAPACITANCE).nominal == 4.7e-6
    assert read("0.07 mm2", si.AREA).nominal == 7e-8
    assert read("0.26 uF/km", si.CAPACITANCE_PER_LENGTH).nominal == 2.6e-10
    assert read("85 %", si.RATIO).nominal == 0.85
    assert read("0.85 ± 0.05", si.RATIO).low == 0.8
    assert read("0.3 H ± 10 %", si.INDUCTANCE).high == 0.33
    assert read("300 K", si.TEMPERATURE).nominal == 26.85


def test_the_text_is_kept_as_it_was_written() -> None:
    assert read("  0.36 H  ±  10 % ", si.INDUCTANCE).text == "0.36 H ± 10 %"


def test_what_was_read_once_is_remembered_by_text_and_dimension() -> None:
    first = read("5.01 ohm", si.RESISTANCE)
    assert read("5.01 ohm", si.RESISTANCE) is first
    assert read("5.01 ohm", si.REACTANCE).dimension is si.REACTANCE


def test_every_example_that_an_error_offers_is_accepted() -> None:
    for dimension in si.DIMENSIONS.values():
        for example in dimension.examples:
            assert read(example, dimension).nominal is not None


REFUSED = [
    # no unit, or another dimension's
    ("21", si.RESISTANCE, "'21' has no unit"),
    ("18..22", si.RESISTANCE, "no unit"),
    ("5 V", si.CURRENT, "'5 V' is a voltage, not a current"),
    ("3 VA", si.ACTIVE_POWER, "is an apparent power, not an active power"),
    ("3 V·A", si.ACTIVE_POWER, "is an apparent power, not an active power"),
    ("3 var", si.APPARENT_POWER, "is a reactive power, not an apparent power"),
    ("3 W", si.REACTIVE_POWER, "is an active power, not a reactive power"),
    ("5 S", si.RESISTANCE, "is a conductance, not a resistance"),
    ("6 mm2", si.LENGTH, "is a cross-section, not a length"),
    ("5 degC", si.TEMPERATURE_RISE, "is a temperature, not a temperature rise"),
    ("5 V", si.TEMPERATURE, "is a voltage, not a temperature"),
    ("85 %", si.VOLTAGE, "is a ratio, not a voltage"),
    ("5 V", si.RATIO, "is a voltage, not a ratio"),
    ("5 V..6 A", si.CURRENT, "is a voltage, not a current"),
    ("5 h", si.INDUCTANCE, "is a time, not an inductance (did you mean `H`?)"),
    ("4.6 Hz", si.FLUX_RATIO, "is a frequency, not volts per hertz"),
    # unknown units
    ("10 a", si.CURRENT, "unknown unit 'a' (did you mean `A`?)"),
    ("5 mh", si.INDUCTANCE, "unknown unit 'mh' (did you mean `mH`?)"),
    ("5 kVAr", si.REACTIVE_POWER, "unknown unit 'kVAr' (did you mean `kvar`?)"),
    ("4 kg", si.LENGTH, "unknown unit 'kg'"),
    ("10 AWG", si.AREA, "unknown unit 'AWG'"),
    ("5 dB", si.RATIO, "unknown unit"),
    ("5 percent", si.ANGLE, "unknown unit"),
    ("5 c", si.LENGTH, "unknown unit"),
    ("5 kdegC", si.TEMPERATURE, "unknown unit"),
    ("5 mdeg", si.ANGLE, "unknown unit"),
    ("5 Kiohm", si.RESISTANCE, "unknown unit"),
    ("5 Hzs", si.FREQUENCY, "unknown unit"),
    ("5 m9", si.LENGTH, "unknown unit"),
    ("5 °", si.RESISTANCE, "is an angle"),
    ("5 V/Hz/s", si.FLUX_RATIO, "unknown unit"),
    # names that share their dimensions with what is wanted, and mean something else
    ("5 rpm", si.FREQUENCY, "unknown unit"),
    ("5 rad/s", si.FREQUENCY, "unknown unit"),
    ("5 Bq", si.FREQUENCY, "unknown unit"),
    ("5 W/J", si.FREQUENCY, "unknown unit"),
    ("5 Wb", si.FLUX_RATIO, "unknown unit"),
    ("5 V·s", si.FLUX_RATIO, "unknown unit"),
    ("5 N·m", si.ENERGY, "unknown unit"),
    ("5 V·deg", si.VOLTAGE, "unknown unit"),
    ("5 m·rad", si.LENGTH, "unknown unit"),
    ("5 kvar·h", si.ENERGY, "unknown unit"),
    ("5 kA2s", si.LET_THROUGH, "'kA2s', which is read as a prefix of the ampere or of the whole"),
    ("5 kA²·s", si.LET_THROUGH, "(did you mean `A2s`?)"),
    ("5 s·kA²", si.LET_THROUGH, "unknown unit"),
    # numbers
    ("nan V", si.VOLTAGE, "not finite"),
    ("NaN", si.RATIO, "not finite"),
    ("inf V", si.VOLTAGE, "not finite"),
    ("-Infinity V", si.VOLTAGE, "not finite"),
    ("1e400 V", si.VOLTAGE, "not a believable voltage"),
    ("1e-400 V", si.VOLTAGE, "not a believable voltage"),
    ("1e99999999999 V", si.VOLTAGE, "exponent"),
    ("1e30 V", si.VOLTAGE, "not a believable voltage"),
    ("5 MH", si.INDUCTANCE, "not a believable inductance (did you mean `mH`?)"),
    ("-300 degC", si.TEMPERATURE, "not a believable temperature"),
    ("0 ohm", si.RESISTANCE, "is zero or below"),
    ("-3 ohm", si.RESISTANCE, "is zero or below"),
    ("0..5 ohm", si.RESISTANCE, "reaches zero or below"),
    ("9**9**9 V", si.VOLTAGE, "nothing is calculated"),
    ("2+2 V", si.VOLTAGE, "nothing is calculated"),
    ("1/0 V", si.VOLTAGE, "nothing is calculated"),
    ("0x10 V", si.VOLTAGE, "does not follow"),
    ("1.2.3 V", si.VOLTAGE, "does not follow"),
    ("5. V", si.VOLTAGE, "does not follow"),
    ("\uff15 V", si.VOLTAGE, "digits other than 0 to 9"),
    ("\u0661\u0662 V", si.VOLTAGE, "digits other than 0 to 9"),
    ("½ V", si.VOLTAGE, "digits other than 0 to 9"),
    ("9" * 400 + " V", si.VOLTAGE, "402 characters"),
    # IEC 60062 where it does not fit
    ("4k7", si.REACTANCE, "unknown unit"),
    ("100n", si.RESISTANCE, "unknown unit"),
    ("4k7", si.CAPACITANCE, "unknown unit"),
    ("4k7..5k1", si.RESISTANCE, "unknown unit 'k7'"),
    ("R", si.RESISTANCE, "does not follow"),
    ("0R", si.RESISTANCE, "is zero or below"),
    # tolerances
    ("5 ohm ± 100 %", si.RESISTANCE, "100 % or more"),
    ("5 ohm ± 250 %", si.RESISTANCE, "100 % or more"),
    ("5 ohm +5/-100 %", si.RESISTANCE, "100 % or more"),
    ("5 ohm +101/-5 %", si.RESISTANCE, "100 % or more"),
    ("5 ohm ± 5 ohm", si.RESISTANCE, "reaches zero or below"),
    ("22..18 ohm", si.RESISTANCE, "from high to low"),
    ("25 (18..22) ohm", si.RESISTANCE, "outside its own range"),
    ("5 V ± 10", si.VOLTAGE, "tolerance without a unit"),
    ("5 V +10/-6", si.VOLTAGE, "tolerance without a unit"),
    ("5 V ± 1 A", si.VOLTAGE, "is a current, not a voltage"),
    ("40 degC ± 5 V", si.TEMPERATURE, "is a voltage, not a temperature"),
    ("40 degC ± 5", si.TEMPERATURE, "tolerance without a unit"),
    ("40 degC ± 5 %", si.TEMPERATURE, "share of a temperature"),
    ("85 % ± 5 %", si.RATIO, "share or percentage points"),
    ("85 % ± 5", si.RATIO, "tolerance without a unit"),
    ("5 V ± -5 %", si.VOLTAGE, "does not follow"),
    ("5 V +5 %", si.VOLTAGE, "does not follow"),
    ("5 V +5/+6 %", si.VOLTAGE, "does not follow"),
    ("5 V ± 5 % ± 3 %", si.VOLTAGE, "does not follow"),
    ("5 V %", si.VOLTAGE, "does not follow"),
    ("5 %V", si.VOLTAGE, "does not follow"),
    ("18..22 ohm ± 5 %", si.RESISTANCE, "does not follow"),
    # texts
    ("", si.VOLTAGE, "empty"),
    ("  ", si.VOLTAGE, "empty"),
    ("V", si.VOLTAGE, "does not follow"),
    ("yes", si.VOLTAGE, "does not follow"),
    ("5 V/", si.VOLTAGE, "does not follow"),
    ("5 V^", si.VOLTAGE, "unknown unit"),
    ("5 m^^2", si.AREA, "unknown unit"),
    ("5 V°", si.VOLTAGE, "unknown unit"),
    ("5 ohm ohm", si.RESISTANCE, "does not follow"),
    ("5 mm**2", si.AREA, "does not follow"),
    ("5 ohms_", si.RESISTANCE, "does not follow"),
    ("5 __import__", si.VOLTAGE, "does not follow"),
    ("5 V.real", si.VOLTAGE, "does not follow"),
    ("5 V\x00", si.VOLTAGE, "does not print"),
    ("5 V\n", si.VOLTAGE, "does not print"),
    ("5\tV", si.VOLTAGE, "does not print"),
    ("5 \u200bV", si.VOLTAGE, "does not print"),
    ("\u202e5 V", si.VOLTAGE, "does not print"),
    ("5 \ud800", si.VOLTAGE, "does not print"),
]


@pytest.mark.parametrize(("text", "dimension", "told"), REFUSED, ids=[ascii(row[0])[:24] for row in REFUSED])
def test_a_faulty_quantity_is_refused_with_what_was_read_and_what_is_accepted(
    text: str, dimension: si.Dimension, told: str
) -> None:
    with pytest.raises(QuantityError) as caught:
        read(text, dimension)
    assert told in caught.value.what
    assert repr(text)[1:9] in caught.value.what
    assert "`" in caught.value.accepted
    assert caught.value.what.isprintable()


MEANT = [
    ("0,36 H", si.INDUCTANCE, "`0.36 H`"),
    ("0,360 H", si.INDUCTANCE, "`0.360 H`"),
    ("5 V ± 0,5 V", si.VOLTAGE, "`5 V ± 0.5 V`"),
    ("1,000 V", si.VOLTAGE, "`1.000 V` or `1000 V`"),
    ("1_000 V", si.VOLTAGE, "`1000 V`"),
    ("1 000 V", si.VOLTAGE, "`1000 V`"),
    ("1'000 V", si.VOLTAGE, "`1000 V`"),
    (".5 V", si.VOLTAGE, "`0.5 V`"),
    ("0...10 V ± .5 V", si.VOLTAGE, "`230 V +10/-6 %`, `24 V ± 10 %`"),
]


@pytest.mark.parametrize(("text", "dimension", "accepted"), MEANT, ids=[row[0] for row in MEANT])
def test_a_decimal_comma_or_grouped_digits_are_refused_with_the_accepted_form(
    text: str, dimension: si.Dimension, accepted: str
) -> None:
    with pytest.raises(QuantityError) as caught:
        read(text, dimension)
    assert caught.value.accepted == accepted


@pytest.mark.parametrize("value", [None, True, 21, 2.5, math.nan, [], {}, b"24 V", 10**5000, object()], ids=type)
def test_what_is_not_text_is_refused(value: object) -> None:
    with pytest.raises(QuantityError, match="where a resistance is wanted as text"):
        read(value, si.RESISTANCE)


@pytest.mark.parametrize(
    "text",
    ["9" * 200, "9 " * 100, "1e" * 100, "1.." * 66, "1 V" + "/V" * 98, "1 " + "·".join("V" * 99), "±" * 200, "1 V" + "^" * 197,
     "1 A" + "2" * 197, "1," * 100, "1_" * 100, "1 " + "Ω" * 198, "x" * 10_000_000, "1" + " " * 199, "9**9**9**9**9 V"],
    ids=lambda text: ascii(text[:12]),
)  # fmt: skip
def test_no_text_takes_long_to_refuse(text: str) -> None:
    start = time.perf_counter()
    with pytest.raises(QuantityError) as caught:
        read(text, si.VOLTAGE)
    assert time.perf_counter() - start < 5.0, "a hang, not a slow machine"
    assert len(caught.value.what) < 400


def test_a_small_file_with_everyday_units_never_loads_pint() -> None:
    texts = [(text, dimension.name) for text, dimension, *_ in READ if "volts" not in text]
    everyday = [row for row in texts if not any(odd in row[0] for odd in ("/ft", "V·A", "W·s", "J/s", "A²·s"))]
    code = (
        "import sys\nfrom circuitlint.quantity import read\nfrom circuitlint.si import DIMENSIONS\n"
        f"for text, name in {everyday!r}: read(text, DIMENSIONS[name])\n"
        "assert 'pint' not in sys.modules\nread('24 volts', DIMENSIONS['voltage'])\nassert 'pint' in sys.modules\n"
    )
    assert len(everyday) > 80
    done = subprocess.run([sys.executable, "-X", "utf8", "-c", code], capture_output=True, text=True)
    assert done.returncode == 0, done.stderr


def test_a_unit_is_read_as_factor_and_offset() -> None:
    assert read_unit("mH", si.INDUCTANCE) == (1e-3, 0.0)
    assert read_unit("mm²", si.AREA) == (1e-6, 0.0)
    assert read_unit("degC", si.TEMPERATURE) == (1.0, 0.0)
    assert read_unit("K", si.TEMPERATURE) == (1.0, -273.15)
    assert read_unit("K", si.TEMPERATURE_RISE) == (1.0, 0.0)
    assert read_unit("degF", si.TEMPERATURE) == pytest.approx((5 / 9, -160 / 9), rel=1e-15)
    assert read_unit("%", si.RATIO) == (0.01, 0.0)
    assert read_unit("", si.RATIO) == (1.0, 0.0)


@pytest.mark.parametrize("text", ["", "A", "V V", "V+V", "V**2", "__import__", "V\n", "1 V", "V" * 300])
def test_what_is_no_unit_of_the_dimension_is_refused(text: str) -> None:
    with pytest.raises(QuantityError) as caught:
        read_unit(text, si.VOLTAGE)
    assert caught.value.accepted


def test_letters_of_iec_60062_are_known_for_every_dimension_that_names_one() -> None:
    assert {one.letter for one in si.DIMENSIONS.values() if one.letter} == set(numbers.LETTERS)
