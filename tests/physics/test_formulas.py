"""Every formula gives what is printed outside, has the dimension it says, and prints the equation it calculates."""

from __future__ import annotations

import inspect
import re
from typing import Any, get_args, get_type_hints

import numpy as np
import pytest

from circuitlint.physics.formula import FORMULAS, Formula, formula
from circuitlint.si import Ampere, Dimension, Ohm, Volt
from circuitlint.sources import Source

from .cases import CASES, Case
from .equations import NotAnEquation, worked_out
from .tracked import Tracked, WrongDimension, made, powers_of, summed

# Told in words, as no closed equation is there to print; tests of their own hold them.
IN_WORDS = {"switch-on-factor", "switch-on-peak", "skin-effect", "impedance-of-running-motor"}

# Equations with a constant that has a unit, and the unit it leaves in the result: 0.127 mm, a square mil, µ0, ε0.
CONSTANTS = {
    "gauge-diameter": ("meter", 1.0),
    "area-of-circular-mils": ("meter ** 2", 1.0),
    "reactance-of-spacing": ("henry / meter", 1.0),
    "capacitance-of-screened-core": ("farad / meter", 1.0),
    "skin-argument": ("henry / meter", 0.5),
}


def uses_of(name: str) -> list[dict[str, Any]]:
    """The numbers put into a formula by every case that uses it."""
    return [inputs for case in CASES for made_of, inputs, _ in case.run() if made_of.name == name]


@pytest.mark.parametrize("case", CASES, ids=lambda case: case.name.replace(" ", "-"))
def test_the_result_is_the_one_printed_elsewhere(case: Case) -> None:
    assert case.outcome() == pytest.approx(case.result, rel=0.0, abs=case.allowed)


@pytest.mark.parametrize("name", FORMULAS)
def test_every_formula_is_held_against_a_figure_from_outside(name: str) -> None:
    assert uses_of(name), f"{name}: add a case under tests/published"


def test_every_case_names_its_source_and_says_how_a_derived_figure_was_found() -> None:
    known = {"read", "value from memory", "derived"}
    assert [case.name for case in CASES if case.source["known"] not in known or not case.source["work"]] == []
    assert [case.name for case in CASES if case.source["known"] == "derived" and not case.how] == []
    assert [case.name for case in CASES if case.slack and not case.why] == []
    names = [case.name for case in CASES]
    assert len(names) == len(set(names))


def test_most_cases_are_printed_ones() -> None:
    assert sum(case.source["known"] == "read" for case in CASES) >= 70


def dimensions_of(made_of: Formula[..., Any]) -> dict[str, Dimension]:
    """The dimension of each argument; of each member where an argument is a list."""
    found = {}
    for name, hint in get_type_hints(made_of.function, include_extras=True).items():
        inner = get_args(hint)[0] if getattr(hint, "__origin__", None) is tuple else hint
        found[name] = next(one for one in inner.__metadata__ if isinstance(one, Dimension))
    return found


def tracked(value: Any, dimension: Dimension) -> Any:
    if isinstance(value, tuple):
        return tuple(tracked(one, dimension) for one in value)
    return made(value, powers_of(dimension.unit))


@pytest.mark.parametrize("name", FORMULAS)
def test_the_dimension_of_the_result_is_the_one_stated(name: str) -> None:
    made_of = FORMULAS[name]
    dimensions = dimensions_of(made_of)
    wanted = powers_of(made_of.dimension.unit)
    for inputs in uses_of(name):
        outcome = made_of(**{key: tracked(one, dimensions[key]) for key, one in inputs.items()})
        # An array of one object is what a guarded array step leaves of a number with a dimension.
        outcome = outcome.item() if isinstance(outcome, np.ndarray) and outcome.dtype == object else outcome
        if made_of.name in ("blocked-current", "no-voltage"):
            continue  # nothing at all, whatever its unit
        unit, power = CONSTANTS.get(name, ("dimensionless", 0.0))
        found = summed(outcome.powers if isinstance(outcome, Tracked) else {}, powers_of(unit), power)
        assert {key: one for key, one in found.items() if abs(one) > 1e-9} == pytest.approx(wanted), f"{name} gives {found}"


def test_numbers_with_dimensions_notice_a_wrong_formula() -> None:
    volt: Any = Tracked(2.0, powers_of("volt"))
    ohm: Any = Tracked(3.0, powers_of("ohm"))
    kelvin: Any = Tracked(40.0, powers_of("degC"))
    with pytest.raises(WrongDimension):
        volt + ohm
    with pytest.raises(WrongDimension):
        np.hypot(volt, ohm)
    with pytest.raises(WrongDimension):
        np.exp(volt)
    with pytest.raises(WrongDimension):
        kelvin + 21.0
    with pytest.raises(WrongDimension):
        np.where(True, volt, ohm)
    assert (kelvin + 20.0).value == 60.0
    assert (volt / ohm).powers == powers_of("ampere")
    assert np.sqrt(ohm * ohm).powers == powers_of("ohm")


@pytest.mark.parametrize("name", sorted(set(FORMULAS) - IN_WORDS))
def test_the_equation_printed_is_the_one_calculated(name: str) -> None:
    made_of = FORMULAS[name]
    for inputs in uses_of(name):
        by_hand = worked_out(made_of.equation, {made_of.symbols[key]: one for key, one in inputs.items()})
        # A determinate limit stands where the equation as printed divides nothing by nothing.
        if not np.all(np.isfinite(by_hand)):
            assert any(one == 0.0 for one in inputs.values()), f"{name}: {by_hand}"
            continue
        assert np.allclose(by_hand, made_of(**inputs), rtol=1e-9, atol=0.0), f"{name}: {by_hand}"


@pytest.mark.parametrize("name", sorted(IN_WORDS))
def test_what_is_told_in_words_has_no_closed_equation(name: str) -> None:
    inputs = uses_of(name)[0]
    with pytest.raises(NotAnEquation):
        worked_out(FORMULAS[name].equation, {FORMULAS[name].symbols[key]: one for key, one in inputs.items()})


@pytest.mark.parametrize("name", FORMULAS)
def test_a_formula_says_its_equation_its_source_and_takes_named_arguments_only(name: str) -> None:
    made_of = FORMULAS[name]
    first_line = inspect.getdoc(made_of.function).partition("\n")[0]  # type: ignore[union-attr]
    assert first_line.startswith(f"{made_of.result.split(',')[0]} = ")
    assert made_of.source.work
    kinds = {one.kind for one in inspect.signature(made_of.function).parameters.values()}
    assert kinds == {inspect.Parameter.KEYWORD_ONLY}
    assert set(re.findall(r"\{([^}]*)\}", made_of.equation)) == set(made_of.symbols.values())


@pytest.mark.parametrize("name", FORMULAS)
def test_a_formula_gives_for_arrays_what_it_gives_for_each_number(name: str) -> None:
    made_of = FORMULAS[name]
    for inputs in uses_of(name):
        alone = made_of(**inputs)
        several = {
            key: tuple(np.array([each, each]) for each in one) if isinstance(one, tuple) else np.array([one, one])
            for key, one in inputs.items()
        }
        together = np.broadcast_to(made_of(**several), (2,))
        assert np.allclose(together, alone, rtol=1e-12, atol=0.0)


def _sum_of_unlike(*, voltage: Volt, resistance: Ohm) -> Ampere:
    """I = U + R"""
    return voltage + resistance


def test_a_formula_with_a_wrong_symbol_list_or_a_name_taken_is_refused() -> None:
    source = Source("nothing")
    with pytest.raises(TypeError, match="do not match"):
        formula("I", "{U}", source=source, voltage="U")(_sum_of_unlike)
    taken = next(iter(FORMULAS.values()))
    with pytest.raises(TypeError, match="defined twice"):
        formula(taken.result, taken.equation, source=source, **taken.symbols)(taken.function)
