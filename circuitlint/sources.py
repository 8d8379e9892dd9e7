"""Where a formula, a table or a limit comes from, and how the value is known."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

Known = Literal["read", "value from memory", "derived", "common practice", "firm's own"]
"""How a value is known.

`read`: seen in a published copy of the work named. `value from memory`: recalled, not seen.
`derived`: follows by algebra or computation. `common practice`: a fact of the trade, no source.
`firm's own`: set by the firm that wrote the ruleset.
"""


@dataclass(frozen=True, slots=True)
class Source:
    """A published work, the place in it, and how the value taken from it is known."""

    work: str
    place: str = ""
    edition: str = ""
    known: Known = "read"
    note: str = ""

    def __str__(self) -> str:
        work = f"{self.work}:{self.edition}" if self.edition else self.work
        text = ", ".join(part for part in (work, self.place) if part)
        if self.known == "read":
            return text
        return f"{text} ({self.known})" if text else self.known
