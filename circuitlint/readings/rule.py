"""What a rule on readings is: a name, and one method that yields what is to be remarked."""

from __future__ import annotations

from abc import ABC, abstractmethod
from collections.abc import Iterator
from dataclasses import dataclass
from typing import ClassVar, Literal

from circuitlint.readings.models import Instrument
from circuitlint.readings.record import ReadingResult


@dataclass(frozen=True, slots=True)
class Noticed:
    """One thing a rule on readings has to say of one reading."""

    what: str
    help: str = ""
    severity: Literal["major", "minor", "observation"] = "observation"
    quantity: str = ""
    """The quantity it is about, for its place in the file; the reading as a whole where empty."""


class ReadingRule(ABC):
    """Base of every rule on readings. It never compares silently: what it cannot tell, it yields as something noticed."""

    name: ClassVar[str]
    """The trade's word for it, in lower case with hyphens."""
    title: ClassVar[str]
    """One line, as in a table of contents."""

    @abstractmethod
    def notice(self, reading: ReadingResult, instruments: dict[str, Instrument]) -> Iterator[Noticed]:
        """Yield everything noticed of one evaluated reading. `instruments` holds those of the readings file by name."""
