"""Every exception of the package.

    CircuitlintError
    ├── InputError            the input or the call is at fault (exit status 2)
    │   ├── QuantityError     a text is not a quantity of the wanted dimension
    │   ├── DefinitionError   a definition has faults; carries all of them, in file order
    │   ├── RulesetError      a ruleset has faults
    │   ├── ReadingsError     a readings file has faults
    │   └── RecordError       a stored review record cannot be read
    ├── OutOfTable            a published table has no entry for what was asked
    ├── StudyError            a circuit cannot be solved
    │   ├── NotConverged      a fixed-point sweep did not settle
    │   └── Unbalanced        power or Kirchhoff balance fails
    └── PluginError           a plugin does not load or misbehaves (exit status 3)
"""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass


class CircuitlintError(Exception):
    """Root of every error this package raises on purpose."""


@dataclass(frozen=True, slots=True, order=True)
class Fault:
    """One thing wrong in one place of an input file: what is, and what would be accepted."""

    file: str
    line: int
    column: int
    what: str
    accepted: str = ""

    def __str__(self) -> str:
        place = f"{self.file}:{self.line}:{self.column}: {self.what}"
        return f"{place}\n    accepted: {self.accepted}" if self.accepted else place


class InputError(CircuitlintError):
    """The input or the call is at fault; `faults` lists every fault found, in file order."""

    def __init__(self, message: str = "", faults: Iterable[Fault] = ()) -> None:
        self.faults: tuple[Fault, ...] = tuple(faults)
        super().__init__(message or "\n".join(str(fault) for fault in self.faults))


class QuantityError(InputError):
    """A text is not a quantity of the wanted dimension.

    `what` says what was read and why it is refused, `accepted` gives examples of what would be taken.
    """

    def __init__(self, what: str, accepted: str) -> None:
        self.what = what
        self.accepted = accepted
        super().__init__(f"{what}; accepted: {accepted}")


class DefinitionError(InputError):
    """A definition has faults."""


class RulesetError(InputError):
    """A ruleset has faults."""


class ReadingsError(InputError):
    """A readings file has faults."""


class RecordError(InputError):
    """A stored review record cannot be read."""


class OutOfTable(CircuitlintError):
    """A published table has no entry for what was asked; it is never extrapolated."""


class StudyError(CircuitlintError):
    """A circuit cannot be solved."""


class NotConverged(StudyError):
    """A fixed-point sweep did not settle, so there is no figure to give."""


class Unbalanced(StudyError):
    """Complex power or Kirchhoff's laws do not balance, so there is no figure to give."""


class PluginError(CircuitlintError):
    """A plugin does not load or misbehaves."""
