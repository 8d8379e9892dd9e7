"""The numbers a circuit is studied with: what the definition states, what tables add, what has to be assumed.

A datum has a path within the circuit, a nominal value and a range. Data that are not stated and have no safe default are
assumed as a range that covers every case of the trade, so that leaving a datum out can widen a figure, never narrow it.
"""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field
from typing import Any, Literal

from circuitlint.quantity import Quantity
from circuitlint.si import Dimension
from circuitlint.sources import Source
from circuitlint.study.worksheet import Lack

Origin = Literal["stated", "table", "assumed"]


@dataclass(frozen=True, slots=True)
class Datum:
    """One number put into the study: value and range in the SI unit of its dimension, and where it comes from."""

    path: str
    dimension: Dimension
    nominal: float
    low: float
    high: float
    origin: Origin = "stated"
    source: Source | None = None
    text: str = ""

    @property
    def exact(self) -> bool:
        """Whether the datum has no tolerance."""
        return self.low == self.high


@dataclass(slots=True)
class DataSheet:
    """All data of one circuit, and the tokens that decide which lines a worksheet has."""

    data: dict[str, Datum] = field(default_factory=dict)
    tokens: dict[str, str] = field(default_factory=dict)
    lacks: dict[str, Lack] = field(default_factory=dict)

    def state(self, path: str, quantity: Quantity | None) -> bool:
        """Note a stated quantity; True where it is given."""
        if quantity is None:
            return False
        self.data[path] = Datum(
            path, quantity.dimension, quantity.nominal, quantity.low, quantity.high, text=quantity.text
        )
        return True

    def table(self, path: str, dimension: Dimension, value: float, source: Source, low: float | None = None,
              high: float | None = None) -> None:
        """Note a value from a published table, with a range where the definition leaves the choice open."""
        self.data[path] = Datum(
            path, dimension, value, value if low is None else low, value if high is None else high, "table", source
        )

    def assume(self, path: str, dimension: Dimension, nominal: float, low: float, high: float, source: Source) -> None:
        """Note an assumption that covers the cases of the trade."""
        self.data[path] = Datum(path, dimension, nominal, low, high, "assumed", source)

    def token(self, path: str, word: str) -> None:
        """Note a choice that decides which lines are written."""
        self.tokens[path] = word

    def lack(self, path: str, *needs: str, why: str = "") -> None:
        """Note a datum that is not to be had, and what would be needed."""
        self.lacks[path] = Lack(needs, why)

    def has(self, path: str) -> bool:
        """Whether a datum is at hand."""
        return path in self.data

    def signature(self) -> tuple[Any, ...]:
        """What decides the lines of the worksheets: circuits with equal signatures are studied together."""
        return (
            tuple((path, datum.exact) for path, datum in self.data.items()),
            tuple(self.tokens.items()),
            tuple(self.lacks.items()),
        )

    def toleranced(self) -> tuple[str, ...]:
        """Paths of the data that have a range."""
        return tuple(path for path, datum in self.data.items() if not datum.exact)


def nominal_values(sheet: DataSheet) -> Mapping[str, float]:
    """Nominal values by path."""
    return {path: datum.nominal for path, datum in sheet.data.items()}
