"""Reads the equation of a formula as a person would, and works it out with numbers put in.

The equations are printed on calculation sheets; this shows that what is printed is what is calculated.
"""

from __future__ import annotations

import re
from collections.abc import Mapping
from typing import Any

import numpy as np

TOKEN = re.compile(
    r"\s*(?:(?P<symbol>\{[^}]*\})|(?P<number>\d+(?:\.\d+)?(?:e-?\d+)?)|(?P<raised>[²³⁴°])|(?P<word>[^\W\d_²³⁴Σ]+[0-9]*)"
    r"|(?P<mark>[-−+·/^()|√Σ,∠]))"
)
RAISED = {"²": 2, "³": 3, "⁴": 4}
FUNCTIONS: dict[str, Any] = {
    "exp": np.exp, "ln": np.log, "sin": np.sin, "cos": np.cos, "tan": np.tan, "tanh": np.tanh, "cosh": np.cosh,
    "acos": np.arccos, "atan": np.arctan, "arg": np.angle, "Re": np.real, "Im": np.imag, "conj": np.conj, "√": np.sqrt,
    "Σ": np.sum,
}  # fmt: skip


class NotAnEquation(ValueError):
    """A text that this grammar does not cover."""


def worked_out(equation: str, symbols: Mapping[str, Any]) -> Any:
    """The value of an equation. `symbols` gives what stands for each symbol in braces."""
    main, _, extra = equation.partition(" with ")
    names: dict[str, Any] = {"π": np.pi, "j": 1j}
    definitions = [one.partition(" = ") for one in re.split(r", (?=\S+ = )", extra)] if extra else []
    for name, equals, text in definitions:
        if not equals:
            raise NotAnEquation(equation)
        names[name] = _Reader(text, symbols, names).whole()
        if name == "cosφ":
            names["sinφ"] = np.sqrt(1.0 - names[name] ** 2)
    return _Reader(main, symbols, names).whole()


class _Reader:
    def __init__(self, text: str, symbols: Mapping[str, Any], names: Mapping[str, Any]) -> None:
        self.text, self.symbols, self.names = text, symbols, names
        self.tokens: list[tuple[str, str]] = []
        at = 0
        while at < len(text.rstrip()):
            found = TOKEN.match(text, at)
            if not found or found.lastgroup is None:
                raise NotAnEquation(text)
            self.tokens.append((found.lastgroup, found.group(found.lastgroup)))
            at = found.end()
        self.place = 0

    def whole(self) -> Any:
        value = self._sum()
        if self.place != len(self.tokens):
            raise NotAnEquation(self.text)
        return value

    def _next(self) -> str:
        return self.tokens[self.place][1] if self.place < len(self.tokens) else ""

    def _take(self, *marks: str) -> str:
        if self.place < len(self.tokens) and self.tokens[self.place][1] in marks:
            self.place += 1
            return self.tokens[self.place - 1][1]
        return ""

    def _want(self, mark: str) -> None:
        if not self._take(mark):
            raise NotAnEquation(self.text)

    def _sum(self) -> Any:
        value = -self._product() if self._take("−") else self._product()
        while mark := self._take("+", "−"):
            value = value + self._product() if mark == "+" else value - self._product()
        return value

    def _product(self) -> Any:
        value = self._beside()
        while mark := self._take("·", "/", "∠"):
            other = self._beside()
            value = value * other if mark == "·" else value / other if mark == "/" else value * np.exp(1j * other)
        return value

    def _beside(self) -> Any:
        """Factors that stand side by side, as in 2π or j X."""
        value = self._power()
        while self.place < len(self.tokens) and (
            self.tokens[self.place][0] in ("symbol", "word", "number") or self._next() in ("(", "√")
        ):
            value = value * self._power()
        return value

    def _power(self) -> Any:
        value = self._factor()
        while self.place < len(self.tokens):
            if self.tokens[self.place][0] == "raised":
                mark = self._next()
                value = np.deg2rad(value) if mark == "°" else value ** RAISED[mark]
                self.place += 1
            elif self._take("^"):
                value = value ** self._factor()
            else:
                break
        return value

    def _factor(self) -> Any:
        if self.place >= len(self.tokens):
            raise NotAnEquation(self.text)
        kind, word = self.tokens[self.place]
        self.place += 1
        if kind == "number":
            return float(word)
        if kind == "symbol":
            value = self.symbols[word[1:-1]]
            return np.array(value) if isinstance(value, tuple) else value
        if word in ("max", "min"):
            self._want("(")
            one = self._sum()
            self._want(",")
            other = self._sum()
            self._want(")")
            return np.maximum(one, other) if word == "max" else np.minimum(one, other)
        if word == "Σ":
            return np.sum(self._power())
        if word in FUNCTIONS:
            return FUNCTIONS[word](self._factor())
        if word == "(":
            value = self._sum()
            self._want(")")
            return value
        if word == "|":
            value = self._sum()
            self._want("|")
            return np.abs(value)
        if word in self.names:
            return self.names[word]
        if word.startswith("j") and word[1:] in self.names:
            return 1j * self.names[word[1:]]
        raise NotAnEquation(self.text)
