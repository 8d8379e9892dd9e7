"""A figure as a worked line: equation, numbers put in, result."""

from __future__ import annotations

import cmath
from collections.abc import Callable

from circuitlint.physics.formula import Formula
from circuitlint.quantity import show
from circuitlint.review.record import Input
from circuitlint.si import ANGLE, DIMENSIONS, OF_TABLES, Dimension
from circuitlint.study.study import CircuitStudy, Figure
from circuitlint.study.worksheet import Key


def dimension_of(circuit: CircuitStudy, state: str, key: Key) -> Dimension:
    """The dimension of a datum or of a line's result."""
    if not key.name:
        return circuit.data.data[key.of].dimension
    sheet = circuit.solutions[state].sheet
    line = sheet.index.get(key)
    return line.formula.dimension if line is not None else sheet.assumed[key]


def what_of(key: Key) -> str:
    """A key in words: `impedance of load.coil`, or the path of a datum."""
    if not key.name:
        return key.of
    name = key.name.removesuffix(" phasor").replace("-", " ")
    return f"{name} of {key.of}" if key.of else name


def told_of(circuit: CircuitStudy, key: Key) -> str:
    """A key in words, with its source where the definition does not state it: a table, or what has to be assumed."""
    datum = circuit.data.data.get(key.of) if not key.name else None
    if datum is None or datum.source is None:
        return what_of(key)
    return f"{key.of} ({'assumed: ' if datum.origin == 'assumed' and not datum.exact else ''}{datum.source})"


def inputs_of(circuit: CircuitStudy, figure: Figure) -> tuple[Input, ...]:
    """The numbers put into a figure's formula, at nominal values."""
    made = []
    for symbol, key in figure.inputs:
        value = circuit.nominal(figure.state, key)
        dimension = dimension_of(circuit, figure.state, key).name
        if isinstance(value, complex):
            made.append(Input(symbol=symbol, value=abs(value), angle=cmath.phase(value), dimension=dimension,
                              what=told_of(circuit, key)))
        else:
            made.append(Input(symbol=symbol, value=value, dimension=dimension, what=told_of(circuit, key)))
    return tuple(made)


def put_in(formula: Formula[..., object], inputs: tuple[Input, ...]) -> str:
    """The equation with numbers in the places of its symbols; a list of numbers stands where a symbol takes several."""
    text = formula.equation
    for symbol in dict.fromkeys(one.symbol for one in inputs):
        numbers = [_number(one) for one in inputs if one.symbol == symbol]
        text = text.replace("{" + symbol + "}", numbers[0] if len(numbers) == 1 else "[" + "; ".join(numbers) + "]")
    return text


def _number(one: Input) -> str:
    shown = show(one.value, DIMENSIONS.get(one.dimension) or OF_TABLES[one.dimension])
    return shown if one.angle is None else f"{shown} ∠ {show(one.angle, ANGLE)}".replace("∠ -", "∠ −")


def worked_line(circuit: CircuitStudy, figure: Figure, shown: Callable[[float, Dimension], str] = show) -> str:
    """`Z = √(R² + X²) = √((21 Ω)² + (113 Ω)²) = 115 Ω` at nominal values."""
    result = shown(figure.nominal, figure.dimension)
    if figure.formula is None:
        return result
    return f"{figure.formula.symbolic} = {put_in(figure.formula, inputs_of(circuit, figure))} = {result}"
