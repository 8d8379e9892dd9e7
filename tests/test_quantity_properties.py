"""What holds for every quantity and every text, and every unit held against pint."""

from __future__ import annotations

import math
import time
from decimal import Decimal

import pint
import pytest
from hypothesis import example, given
from hypothesis import strategies as st

from circuitlint import si, units
from circuitlint.errors import QuantityError
from circuitlint.quantity import Quantity, read, read_unit, show, show_range, write

DIMENSIONS = st.sampled_from(list(si.DIMENSIONS.values()))
UREG: pint.UnitRegistry[float] = pint.UnitRegistry(cache_folder=None)
SPELLED = {"%": "percent", "var": "volt_ampere", "A2s": "ampere**2*second", "degC/W": "kelvin/watt",
           "mm2": "mm**2", "cm2": "cm**2", "m2": "m**2"}  # fmt: skip
"""Everyday units that pint's own parser wants spelled otherwise."""


def believable(dimension: si.Dimension) -> st.SearchStrategy[float]:
    return st.floats(dimension.smallest, dimension.largest)


def printable() -> st.SearchStrategy[float]:
    return st.floats(-1e280, 1e280)


# Units.


@pytest.mark.parametrize("name", units.EVERYDAY)
def test_each_everyday_unit_is_what_pints_own_parser_says(name: str) -> None:
    known = units.EVERYDAY[name]
    text = f"{name[:-3]}VA" if name.endswith("var") else SPELLED.get(name, name)
    coherent = {"var": "volt_ampere", "dimensionless": ""}.get(known.coherent, known.coherent)
    zero, one = (UREG.Quantity(at, text).to(coherent).magnitude for at in (0.0, 1.0))
    # pint passes through kelvin, which costs the offset of °F its last digits
    assert zero == pytest.approx(float(known.offset), rel=1e-12)
    assert one - zero == pytest.approx(float(known.factor), rel=1e-12)


@pytest.mark.parametrize("name", units.EVERYDAY)
def test_each_everyday_unit_is_found_alike_without_the_table(name: str) -> None:
    found = units.through_pint(name)
    assert found is not None
    assert found.coherent == units.EVERYDAY[name].coherent
    assert float(found.factor) == pytest.approx(float(units.EVERYDAY[name].factor), rel=1e-12)
    assert float(found.offset) == pytest.approx(float(units.EVERYDAY[name].offset), rel=1e-12)


# Prefixes, minute, hour and degree: SI brochure, 9th edition, tables 7 and 8. Inch, foot, yard, mile: NIST SP 811, 2008, B.8.
BROCHURE = [
    ("GHz", si.FREQUENCY, 1e9), ("MW", si.ACTIVE_POWER, 1e6), ("kV", si.VOLTAGE, 1e3), ("cm", si.LENGTH, 1e-2),
    ("mH", si.INDUCTANCE, 1e-3), ("µA", si.CURRENT, 1e-6), ("nF", si.CAPACITANCE, 1e-9), ("pF", si.CAPACITANCE, 1e-12),
    ("TΩ", si.RESISTANCE, 1e12), ("min", si.TIME, 60.0), ("h", si.TIME, 3600.0), ("d", si.TIME, 86400.0),
    ("deg", si.ANGLE, math.pi / 180), ("°", si.ANGLE, math.pi / 180), ("arcmin", si.ANGLE, math.pi / 10800),
    ("in", si.LENGTH, 0.0254), ("inch", si.LENGTH, 0.0254), ("ft", si.LENGTH, 0.3048), ("yd", si.LENGTH, 0.9144),
    ("mi", si.LENGTH, 1609.344), ("Wh", si.ENERGY, 3600.0), ("mm²", si.AREA, 1e-6), ("cm²", si.AREA, 1e-4),
    ("kilovolts", si.VOLTAGE, 1e3), ("ohms", si.RESISTANCE, 1.0), ("V/A", si.RESISTANCE, 1.0), ("A/V", si.CONDUCTANCE, 1.0),
    ("A·s/V", si.CAPACITANCE, 1.0), ("V·s/A", si.INDUCTANCE, 1.0), ("W·h", si.ENERGY, 3600.0), ("mV/Hz", si.FLUX_RATIO, 1e-3),
    ("kilovolt·A", si.APPARENT_POWER, 1e3), ("mW/cm", si.LOSS_PER_LENGTH, 0.1), ("mA2s", si.LET_THROUGH, None),
]  # fmt: skip


@pytest.mark.parametrize(("text", "dimension", "factor"), BROCHURE, ids=[row[0] for row in BROCHURE])
def test_units_have_the_factors_that_the_standards_give_them(
    text: str, dimension: si.Dimension, factor: float | None
) -> None:
    if factor is None:
        with pytest.raises(QuantityError):
            read_unit(text, dimension)
    else:
        assert read_unit(text, dimension) == pytest.approx((factor, 0.0), rel=1e-14)


@given(st.sampled_from(sorted(units.EVERYDAY)), DIMENSIONS)
def test_a_unit_is_taken_for_its_own_dimension_and_for_no_other(name: str, dimension: si.Dimension) -> None:
    kelvin_as_temperature = dimension is si.TEMPERATURE and name in ("K", "mK")
    if units.EVERYDAY[name].coherent == dimension.unit or kelvin_as_temperature:
        offset = -273.15 if kelvin_as_temperature else -160 / 9 if name == "degF" else 0.0
        assert read_unit(name, dimension)[1] == offset
    else:
        with pytest.raises(QuantityError, match=" not "):
            read_unit(name, dimension)


WORDS = st.sampled_from([*units.EVERYDAY, "volt", "meter", "degF", "Wb", "Pa", "year", "c", "e", "k", "turn", "delta", "kA2"])


@given(st.lists(st.tuples(WORDS, st.sampled_from(["", "2", "3", "²"])), min_size=1, max_size=4), st.sampled_from("/·"),
       DIMENSIONS)
def test_a_compound_unit_has_pints_factor_or_is_refused(
    words: list[tuple[str, str]], joint: str, dimension: si.Dimension
) -> None:
    text = joint.join(word + power for word, power in words)
    try:
        factor, offset = read_unit(text, dimension)
    except QuantityError:
        return
    spelled = [(SPELLED.get(word, word).replace("degC", "kelvin"), power.replace("²", "2")) for word, power in words]
    if len(words) == 1 or offset or any("var" in word or "deg" in word for word, _ in words):
        return
    pinted = "1"
    for index, (word, power) in enumerate(spelled):
        pinted += f"{'/' if index and joint == '/' else '*'}({word}){'**' + power if power else ''}"
    coherent = {"var": "volt_ampere", "dimensionless": ""}.get(dimension.unit, dimension.unit)
    assert (UREG.Quantity(1.0, pinted).to(coherent)).magnitude == pytest.approx(factor, rel=1e-12)


# Reading.


def checked(text: str, dimension: si.Dimension) -> None:
    start = time.perf_counter()
    quantity = refused = None
    try:
        quantity = read(text, dimension)
    except QuantityError as error:
        refused = error
    if refused is not None:
        assert refused.what.isprintable()
        assert 0 < len(refused.what) < 400
        assert refused.accepted
    if quantity is not None:
        assert -math.inf < dimension.smallest <= quantity.low <= quantity.nominal <= quantity.high <= dimension.largest
        assert dimension.signed or quantity.low > 0.0
        assert read(text, dimension) is quantity, "what was read is remembered"
    assert time.perf_counter() - start < 2.0, "a hang, not a slow machine"


@given(st.text(max_size=40), DIMENSIONS)
@example("5 \ud800", si.VOLTAGE)
def test_any_text_at_all_is_read_or_refused_and_at_once(text: str, dimension: si.Dimension) -> None:
    checked(text, dimension)


@given(st.text(st.characters(), min_size=1, max_size=12), DIMENSIONS)
def test_any_unit_text_at_all_is_read_or_refused(text: str, dimension: si.Dimension) -> None:
    checked(f"5 {text}", dimension)


PIECES = st.sampled_from(
    ["5", "2.5", "1e3", "e9999", "4k7", " ", "V", "ohm", "±", "%", "+", "-", "/", "..", "(", ")", "10", "degC", "degF", "K", ",",
     "**", "mm2", "·", "^", "_", ".", "1e-9999", "mH", "rad", "kdegC", "\u2212", "…", "0"]
)  # fmt: skip


@given(st.lists(PIECES, max_size=12).map("".join), DIMENSIONS)
def test_scraps_of_the_grammar_never_do_worse_than_a_refusal(text: str, dimension: si.Dimension) -> None:
    checked(text, dimension)


NUMBERS = st.sampled_from(["5", "2.5", "0.8", "1e3", "1.5e-3", "21", "100", "-5", "0"])
OWN_UNITS = {
    dimension.name: [name for name, unit in units.EVERYDAY.items() if unit.coherent == dimension.unit]
    for dimension in si.DIMENSIONS.values()
}


@st.composite
def likely(draw: st.DrawFn) -> tuple[str, si.Dimension]:
    """Texts that follow the grammar, with units that mostly fit: many are read, some are not."""
    dimension = draw(DIMENSIONS)
    unit = st.sampled_from([*OWN_UNITS[dimension.name] * 3, "", "%", "K", "V"])
    number, amount = draw(NUMBERS), st.sampled_from(["5", "0.2", "1e-4", "0", "99", "100"])
    form = draw(st.sampled_from(["{n} {u}", "{n} {u} ± {a} {v}", "{n} {u} +{a}/-{b} {v}", "{n} {u} -{a} {v}/+{b} {w}",
                                 "{n}..{m} {u}", "{n} {u}..{m} {v}", "{n} ({m}..{o}) {u}"]))  # fmt: skip
    text = form.format(n=number, m=draw(NUMBERS), o=draw(NUMBERS), u=draw(unit), v=draw(unit), w=draw(unit), a=draw(amount),
                       b=draw(amount))  # fmt: skip
    return text, dimension


@given(likely())
def test_what_follows_the_grammar_is_read_in_order_and_in_bounds_or_refused(drawn: tuple[str, si.Dimension]) -> None:
    checked(*drawn)


@given(st.data(), DIMENSIONS, st.floats(0.0, 99.0), st.floats(0.0, 99.0))
def test_a_share_is_taken_of_the_nominal_value_on_both_sides(
    data: st.DataObject, dimension: si.Dimension, up: float, down: float
) -> None:
    if dimension is si.TEMPERATURE:
        return
    value = data.draw(believable(dimension))
    up, down = round(up, 3), round(down, 3)
    low, high = value - abs(value) * down / 100, value + abs(value) * up / 100
    text = f"{write(value, dimension)} +{up:f}/-{down:f} %"
    if low < dimension.smallest or high > dimension.largest:
        with pytest.raises(QuantityError):
            read(text, dimension)
    else:
        quantity = read(text, dimension)
        assert quantity.nominal == value
        assert quantity.low == pytest.approx(low, rel=1e-12)
        assert quantity.high == pytest.approx(high, rel=1e-12)


# Writing.


@given(st.data(), DIMENSIONS)
def test_what_is_written_reads_back_to_the_same_float(data: st.DataObject, dimension: si.Dimension) -> None:
    value = data.draw(believable(dimension))
    text = write(value, dimension)
    assert read(text, dimension).nominal == value
    assert text.isascii()
    assert not text.startswith("-0 ")


@given(st.data(), DIMENSIONS)
def test_a_quantity_with_tolerance_reads_back_unchanged(data: st.DataObject, dimension: si.Dimension) -> None:
    low, nominal, high = sorted(data.draw(believable(dimension)) for _ in range(3))
    made = Quantity.of(nominal, dimension, low, high)
    again = read(made.text, dimension)
    assert (again.low, again.nominal, again.high) == (low, nominal, high)
    assert write(again, dimension) == made.text


def test_what_is_written_never_needs_pint() -> None:
    for dimension in si.DIMENSIONS.values():
        for power in range(-15, 16):
            unit = write(float(f"1e{power}"), dimension).partition(" ")[2]
            assert unit in units.EVERYDAY or (dimension is si.RATIO and not unit)


# Showing.

FACTORS = {"p": -12, "n": -9, "µ": -6, "m": -3, "": 0, "k": 3, "M": 6, "G": 9, "T": 12}


@given(printable(), st.integers(2, 8), st.sampled_from([one for one in si.DIMENSIONS.values() if one.prefixed]))
def test_what_is_shown_is_right_to_its_last_digit(value: float, digits: int, dimension: si.Dimension) -> None:
    shown = show(value, dimension, digits)
    number, unit = shown.split()
    if dimension.unit in ("ohm / meter", "farad / meter"):
        power = {"Ω/km": -3, "µF/km": -9}[unit]
    else:
        power = FACTORS[unit.removesuffix(dimension.symbol)]
    told = Decimal(number).scaleb(power)
    if number == "0":
        assert abs(value) < 1e-20 or abs(value) < 1e-12 * 10.0**power
    else:
        # half of the last digit asked for, and the float division by the prefix
        assert abs(told - Decimal(value)) <= abs(Decimal(value)) * Decimal(f"5.000001e-{digits}")


@given(st.floats(), st.floats(), DIMENSIONS, st.integers(1, 9))
def test_nothing_is_shown_as_minus_zero_or_not_a_number(
    low: float, high: float, dimension: si.Dimension, digits: int
) -> None:
    for text in (show(low, dimension, digits), show_range(low, high, dimension, digits)):
        assert "nan" not in text
        assert "inf" not in text
        for number in text.removesuffix("°").split(" .. "):
            if number != "-":
                assert not (number.startswith("-") and float(number.split()[0]) == 0.0)


@given(st.floats(1e-9, 1e9), st.floats(1.0, 100.0), st.sampled_from([si.CURRENT, si.RESISTANCE, si.VOLTAGE]))
def test_both_ends_of_a_range_share_one_prefix(low: float, ratio: float, dimension: si.Dimension) -> None:
    shown = show_range(low, low * ratio, dimension)
    assert shown.count(dimension.symbol) == 1
    assert shown.split()[-1] == show(low * ratio, dimension).split()[-1]
