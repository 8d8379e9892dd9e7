"""The calculation sheet an engineer would file: every figure with equation, numbers put in, result and source."""

from __future__ import annotations

from collections.abc import Iterator, Mapping, Sequence
from itertools import groupby

from circuitlint.reports.terminal import (
    NARROW,
    WIDE,
    clipped,
    columns,
    equation,
    hung,
    left,
    para,
    printable,
    prose,
    wrapped,
)
from circuitlint.reports.words import amount, citation, counted, number_of, numbers_in, place_of, spoken, symbolic
from circuitlint.review.record import Circuit, Figure, Input, Record

NAME = 26
"""Room for a figure's name before its equation."""


def render_figures(record: Record, tags: Sequence[str] = (), width: int = 100) -> str:
    """The sheets of the circuits with these tags, of all where none is named, in at most `width` columns (60 to 400).

    Formulas are numbered in the order they are first used, and listed with their sources at the end.
    """
    width = min(WIDE, max(NARROW, width))
    numbers: dict[str, int] = {}
    chosen = [circuit for circuit in record.circuits if not tags or circuit.tag in tags]
    lines = [*wrapped(prose(record.title) or "Untitled definition", width)]
    lines += wrapped(
        f"Calculation sheet of {counted(len(chosen), 'circuit')}, {printable(record.tool)} {printable(record.version)}",
        width,
    )
    for circuit in chosen:
        lines += ["", *_circuit(record, circuit, numbers, width)]
    if numbers:
        lines += ["", *_formulas(record, numbers, width)]
    return "\n".join(line.rstrip() for line in lines) + "\n"


def _circuit(record: Record, circuit: Circuit, numbers: dict[str, int], width: int) -> Iterator[str]:
    title = f"{printable(circuit.tag)}  {prose(circuit.serves)}".rstrip()
    yield "─" * width
    yield from wrapped(title, width)
    fed = f", fed from {printable(circuit.fed_from)}" if circuit.fed_from else ""
    yield from wrapped(f"{circuit.system.replace('dc', 'direct current')}{fed}; {place_of(circuit.place)}", width)
    if circuit.cases.method:
        yield from wrapped(f"{counted(circuit.cases.count, 'case')}: {prose(circuit.cases.method)}", width)
    if circuit.not_solved:
        yield from wrapped(f"not solved: {prose(circuit.not_solved)}", width)
    for state, of_state in _grouped(circuit.figures, "state").items():
        yield from ("", clipped(printable(state).upper() if state.isascii() else printable(state), width))
        for of, figures in _grouped(of_state, "of").items():
            yield from ("", *para(printable(of) or "circuit", width, 2))
            for figure in figures:
                yield from _figure(record, figure, numbers, width)
    if not circuit.figures and not circuit.not_solved:
        yield "no figure could be given"


def _grouped(figures: Sequence[Figure], by: str) -> dict[str, list[Figure]]:
    groups: dict[str, list[Figure]] = {}
    for key, some in groupby(figures, key=lambda figure: str(getattr(figure, by))):
        groups.setdefault(key, []).extend(some)
    return groups


def _figure(record: Record, figure: Figure, numbers: dict[str, int], width: int) -> Iterator[str]:
    indent = 4
    name = clipped(spoken(figure.name), NAME - 2)
    room = width - indent - NAME
    result = amount(figure.nominal, figure.dimension, figure.name)
    note = f" {prose(figure.note)}" if figure.note else ""
    formula = record.formulas.get(figure.formula)
    if formula is None:
        steps = wrapped(f"{result}{note}", room)
    else:
        number = f"  [{numbers.setdefault(figure.formula, len(numbers) + 1)}]"
        first, *rest = equation(symbolic(formula), room - len(number))
        put_in = numbers_in(formula, figure.inputs)
        steps = [left(first, room - len(number)) + number, *rest]
        steps += equation(f"= {put_in} = {result}{note}" if put_in != result else f"= {result}{note}", room)
    if figure.lowest != figure.highest:
        steps += wrapped(_range(figure), room)
    if formula is not None and (where := _where(figure)):
        steps += wrapped(where, room)
    yield from hung(name, steps, indent, NAME)


def _own(text: str, of: str) -> str:
    """A figure or datum as it is called beside the part it belongs to: `its inductance`."""
    if of and text.startswith(f"{of}."):
        return prose(f"its {text.removeprefix(f'{of}.')}")
    return prose(text.removesuffix(f" of {of}") if of else text)


def _where(figure: Figure) -> str:
    """What each symbol stands for, with its numbers where it takes several: `with R: its resistance`."""
    several: dict[str, list[Input]] = {}
    for one in figure.inputs:
        if one.what:
            several.setdefault(one.symbol, []).append(one)
    shown = []
    for symbol, inputs in several.items():
        told = [_own(one.what, figure.of) for one in inputs]
        if len(inputs) > 1:
            told = [f"{what} {number_of(one)}" for what, one in zip(told, inputs, strict=True)]
        shown.append(f"{printable(symbol)}: {' and '.join(told)}")
    return f"with {'; '.join(shown)}" if shown else ""


def _range(figure: Figure) -> str:
    low, high = (amount(value, figure.dimension, figure.name) for value in (figure.lowest, figure.highest))
    moved = f", moved most by {_own(figure.moved_by, figure.of)}" if figure.moved_by else ""
    return f"from {low} to {high}{moved}"


def _formulas(record: Record, numbers: Mapping[str, int], width: int) -> Iterator[str]:
    yield "─" * width
    yield "Formulas and their sources"
    field = columns(f"[{len(numbers)}]") + 2
    for key, number in numbers.items():
        formula = record.formulas[key]
        source = record.sources.get(formula.source)
        steps = equation(symbolic(formula), width - field - 2)
        steps += wrapped(citation(source) if source is not None else prose(formula.source), width - field - 2)
        if formula.validity:
            steps += wrapped(f"validity: {prose(formula.validity)}", width - field - 2)
        yield from hung(f"[{number}]", steps, 2, field)
