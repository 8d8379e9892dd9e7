"""Graphical symbols of the one-line diagram, in the manner of IEC 60617, each on a vertical wire at x = 0."""

from __future__ import annotations

from collections.abc import Callable
from typing import NamedTuple


class Symbol(NamedTuple):
    """Markup drawn from y = 0 downward, its height, and how far it reaches to the right of the wire."""

    markup: str
    height: float
    reach: float


def _path(d: str, kind: str = "sym") -> str:
    return f'<path class="{kind}" d="{d}"/>'


def _circle(letter: str, system: str = "") -> Symbol:
    mark = f'<text class="in" x="0" y="16" text-anchor="middle">{letter}</text>'
    if letter == "~":
        mark = _path("M-6 12c2 -5 4 -5 6 0s4 5 6 0")
    elif letter == "=":
        mark = _path("M-5.5 9.5h11M-5.5 14.5h3M-1.5 14.5h3M2.5 14.5h3")
    return Symbol(f'<circle class="sym" cx="0" cy="12" r="11.2"/>{mark}', 24.0, 12.0)


def _supply(system: str) -> Symbol:
    return _circle("=" if system == "dc" else "~")


def _board(system: str) -> Symbol:
    return Symbol(_path("M-16 3H16", "bus"), 6.0, 16.0)


def _cable(system: str) -> Symbol:
    cores = 3 if system == "three-phase" else 2
    strokes = "".join(f"M-5 {16 - index * 4}l10 -6" for index in range(cores))
    return Symbol(_path(f"M0 0V26{strokes}"), 26.0, 6.0)


def _coil(system: str) -> Symbol:
    return Symbol(_path("M0 0a4.5 3.75 0 0 1 0 7.5a4.5 3.75 0 0 1 0 7.5a4.5 3.75 0 0 1 0 7.5a4.5 3.75 0 0 1 0 7.5"), 30.0, 6.0)


def _resistor(system: str) -> Symbol:
    return Symbol(_path("M-5 0H5V26H-5Z"), 26.0, 6.0)


def _impedance(system: str) -> Symbol:
    return Symbol(_path("M-8 0H8V26H-8Z") + '<text class="in" x="0" y="17" text-anchor="middle">Z</text>', 26.0, 9.0)


def _capacitor(system: str) -> Symbol:
    return Symbol(_path("M-10 0H10M-10 5H10"), 5.0, 11.0)


def _breaker(system: str) -> Symbol:
    return Symbol(_path("M0 0V4M-3 1l6 6M3 1l-6 6M0 26L-8 8M0 26V30"), 30.0, 6.0)


def _fuse(system: str) -> Symbol:
    return Symbol(_path("M-4.5 0H4.5V24H-4.5ZM0 0V24"), 24.0, 6.0)


def _contact(system: str) -> Symbol:
    return Symbol(_path("M0 0V5M0 25L-9 6M0 25V28"), 28.0, 6.0)


def _box(system: str) -> Symbol:
    return Symbol(_path("M-9 0H9V22H-9Z"), 22.0, 10.0)


_DRAWN: dict[str, Callable[[str], Symbol]] = {
    "supply": _supply,
    "board": _board,
    "cable": _cable,
    "meter": lambda system: _circle("A"),
    "motor": lambda system: _circle("M"),
    "coil": _coil,
    "resistor": _resistor,
    "impedance": _impedance,
    "capacitor": _capacitor,
    "correction": _capacitor,
    "circuit-breaker": _breaker,
    "protection": _breaker,
    "fuse": _fuse,
    "contact": _contact,
    "switching": _contact,
}


def symbol(kind: str, system: str) -> Symbol:
    """The symbol of a kind of part; a plain box for a kind that a plugin brought."""
    return _DRAWN.get(kind, _box)(system)
