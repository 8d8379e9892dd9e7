"""The calculation sheet: every figure with its range, its equation in symbols and in numbers, and its source."""

from __future__ import annotations

import re
from collections.abc import Mapping

from circuitlint.reports.page.text import MINUS, count, escape, quantity, sentence, words
from circuitlint.review.record import Circuit, Element, Figure, FormulaRecord, Input

_ARGUMENT = re.compile(r"\{([^{}]*)\}")
_POWERS = "²³⁴"


class References:
    """Numbers under which equations and sources are listed at the end of the page."""

    def __init__(self, formulas: Mapping[str, FormulaRecord], sources: Mapping[str, object]) -> None:
        self.formula = {key: number for number, key in enumerate(formulas, 1)}
        self.source = {key: number for number, key in enumerate(sources, 1)}

    def to_formula(self, key: str) -> str:
        """A link to an equation in the list; empty for a key that is not in it."""
        number = self.formula.get(key)
        return f'<a href="#e{number}">{number}</a>' if number else ""

    def to_source(self, key: str) -> str:
        """A link to a source in the list; the key itself where it is not in it."""
        number = self.source.get(key)
        return f'<a href="#s{number}">source {number}</a>' if number else escape(key)


def symbolic(formula: FormulaRecord) -> str:
    """`Z = √(R² + X²)`, escaped."""
    return escape(f"{formula.result} = {_ARGUMENT.sub(lambda found: found[1], formula.equation)}")


def with_numbers(formula: FormulaRecord, inputs: tuple[Input, ...]) -> str:
    """The equation with numbers in place of its symbols, escaped; a list where a symbol takes several."""
    shown: dict[str, list[str]] = {}
    for one in inputs:
        shown.setdefault(one.symbol, []).append(_number(one))

    def put(found: re.Match[str]) -> str:
        numbers = shown.get(found[1])
        if not numbers:
            return escape(found[1])
        if len(numbers) > 1:
            return f"({'; '.join(numbers)})"
        text = numbers[0]
        follows = found.string[found.end() : found.end() + 1]
        compound = (follows in _POWERS and follows) or text.startswith(MINUS) or "∠" in text
        return f"({text})" if compound and follows != "|" else text

    pieces, last = [], 0
    for found in _ARGUMENT.finditer(formula.equation):
        pieces += [escape(formula.equation[last : found.start()]), put(found)]
        last = found.end()
    return "".join([*pieces, escape(formula.equation[last:])])


def _number(one: Input) -> str:
    size = quantity(one.value, one.dimension)
    return size if one.angle is None else f"{size} ∠ {quantity(one.angle, 'angle')}"


def calculation_sheet(circuit: Circuit, formulas: Mapping[str, FormulaRecord], references: References, number: int) -> str:
    """One table for each state, its figures grouped by part."""
    if not circuit.figures:
        return "<p>There are no figures.</p>"
    names = dict(_names(circuit.tree))
    made = []
    states: dict[str, dict[str, list[Figure]]] = {}
    for one in circuit.figures:
        states.setdefault(one.state, {}).setdefault(one.of, []).append(one)
    for index, (state, parts) in enumerate(states.items()):
        groups = "".join(_group(of, members, names, formulas, references) for of, members in parts.items())
        number_of = sum(map(len, parts.values()))
        heading = f"c{number}f{index}"
        made.append(
            f'<details class="state"><summary id="{heading}">{escape(sentence(state))}: {count(number_of, "figure")}'
            f'</summary><table class="calc" aria-labelledby="{heading}"><thead><tr><th scope="col">Figure'
            '<th scope="col">Nominal<th scope="col">Lowest<th scope="col">Highest'
            '<th scope="col">Equation, numbers put in, what they are'
            f'<th scope="col">Equation no.</thead>{groups}</table></details>'
        )
    return "".join(made)


def _names(element: Element) -> list[tuple[str, str]]:
    own = f"{element.kind}, {element.label}" if element.label not in ("", element.kind) else element.kind
    found = [(element.of, own)] if element.of else []
    for part in element.parts:
        found += _names(part)
    return found


def _group(
    of: str,
    figures: list[Figure],
    names: Mapping[str, str],
    formulas: Mapping[str, FormulaRecord],
    references: References,
) -> str:
    title = f"{escape(sentence(names.get(of, '')))} <code>{escape(of)}</code>" if of else "Whole circuit"
    rows = "".join(_row(one, formulas, references) for one in figures)
    return f'<tbody><tr class="part"><th scope="rowgroup" colspan="6">{title}{rows}</tbody>'


def _row(one: Figure, formulas: Mapping[str, FormulaRecord], references: References) -> str:
    name = words(one.name) + (f" <i>{escape(one.note)}</i>" if one.note else "")
    formula = formulas.get(one.formula)
    remarks = []
    if formula is None:
        equation = escape(one.formula) or "stated"
    else:
        equation = symbolic(formula)
        if one.inputs:
            equation += f" = {with_numbers(formula, one.inputs)}"
            remarks += list(dict.fromkeys(f"{escape(each.symbol)}: {escape(each.what)}" for each in one.inputs))
    if one.moved_by and one.lowest != one.highest:
        remarks.append(f"moved most by {escape(one.moved_by)}")
    if remarks:
        equation += f"<small>{'; '.join(remarks)}</small>"
    size, low, high = (quantity(value, one.dimension) for value in (one.nominal, one.lowest, one.highest))
    return f'<tr><th scope="row">{name}<td>{size}<td>{low}<td>{high}<td>{equation}<td>{references.to_formula(one.formula)}'
