"""What makes a function a formula: an equation, symbols for its arguments, a source."""

from __future__ import annotations

from collections.abc import Callable, Mapping
from dataclasses import dataclass, field
from typing import Any, Generic, ParamSpec, TypeVar, get_type_hints

from circuitlint.si import Dimension
from circuitlint.sources import Source

P = ParamSpec("P")
R = TypeVar("R")

FORMULAS: dict[str, Formula[..., Any]] = {}
"""Every formula by name, in the order of import."""


@dataclass(frozen=True, slots=True)
class Formula(Generic[P, R]):
    """A callable equation of the trade.

    `equation` is written with the argument symbols in braces, `{R}² + {X}²`, so that one text serves as the symbolic
    form and, numbers put in, as the worked line of a calculation sheet. `symbols` maps argument names to symbols.
    `result` is the symbol of the result, `validity` where the equation holds, in words.
    """

    name: str
    result: str
    equation: str
    symbols: Mapping[str, str]
    source: Source
    validity: str
    function: Callable[P, R] = field(repr=False)
    dimension: Dimension

    def __call__(self, *args: P.args, **kwargs: P.kwargs) -> R:
        return self.function(*args, **kwargs)

    @property
    def symbolic(self) -> str:
        """The equation as a person writes it: `Z = √(R² + X²)`."""
        return f"{self.result} = {self.equation.replace('{', '').replace('}', '')}"


def formula(
    result: str, equation: str, *, source: Source, validity: str = "", **symbols: str
) -> Callable[[Callable[P, R]], Formula[P, R]]:
    """Make a keyword-only function a formula.

    `symbols` names the symbol of each argument. Raises TypeError at import when an argument has no symbol, a symbol has no
    argument, the return type names no dimension, or the name is taken.
    """

    def wrap(function: Callable[P, R]) -> Formula[P, R]:
        made = make(function, result, equation, source, validity, symbols)
        if made.name in FORMULAS:
            raise TypeError(f"formula {made.name} is defined twice")
        FORMULAS[made.name] = made
        return made

    return wrap


def formula_of_a_plugin(
    result: str, equation: str, *, source: Source, validity: str = "", **symbols: str
) -> Callable[[Callable[P, R]], Formula[P, R]]:
    """Make a keyword-only function a formula of one's own; two plugins may each have one of the same name.

    `result` is the symbol of the result, `equation` the right-hand side with the symbols in braces, and each argument is
    given its symbol by name. Raises TypeError when an argument has no symbol, a symbol has no argument, or the return type
    names no dimension.
    """

    def wrap(function: Callable[P, R]) -> Formula[P, R]:
        return make(function, result, equation, source, validity, symbols)

    return wrap


def make(
    function: Callable[P, R], result: str, equation: str, source: Source, validity: str, symbols: Mapping[str, str]
) -> Formula[P, R]:
    """A formula of a keyword-only function. Raises TypeError where symbols, arguments and dimension do not fit."""
    hints = function.__annotations__
    arguments = {name for name in hints if name != "return"}
    if arguments != set(symbols):
        raise TypeError(f"{function.__name__}: symbols {sorted(symbols)} do not match arguments {sorted(arguments)}")
    name = function.__name__.replace("_", "-")
    return Formula(name, result, equation, dict(symbols), source, validity, function, _dimension_of(function))


def _dimension_of(function: Callable[..., Any]) -> Dimension:
    hint = get_type_hints(function, include_extras=True)["return"]
    for extra in getattr(hint, "__metadata__", ()):
        if isinstance(extra, Dimension):
            return extra
    raise TypeError(f"{function.__name__}: the return type names no dimension of circuitlint.si")
