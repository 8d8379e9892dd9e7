"""Motor tables of the NEC: full-load currents, locked-rotor code letters; and starting figures."""

from __future__ import annotations

from circuitlint.sources import Source
from circuitlint.tables.files import data, pick, place_of, source


def three_phase_current(horsepower: float) -> tuple[float, Source]:
    """Full-load current at 460 V in A. Raises OutOfTable. Source: NEC, table 430.250."""
    table = data("motors")["three-phase-460"]
    row = place_of(horsepower, [one[0] for one in table["rows"]], "a three-phase motor", "hp")
    return float(table["rows"][row][1]), source(table["source"])


def single_phase_current(horsepower: str, voltage: float) -> tuple[float, Source]:
    """Full-load current in A at 115 V or 230 V; the horsepower as text, 1/6 to 10. Raises OutOfTable."""
    table = data("motors")["single-phase"]
    column = place_of(voltage, table["voltages"], "a single-phase motor", "V") + 1
    rows = {f"{row[0]:g}" if isinstance(row[0], (int, float)) else row[0]: row for row in table["rows"]}
    return float(pick(rows, horsepower, "single-phase motor of horsepower")[column]), source(table["source"])


def locked_rotor_band(letter: str) -> tuple[float, float, Source]:
    """Lower and upper end of a code letter's band in VA per horsepower, locked rotor. Raises OutOfTable.

    The upper end of the last letter is infinite. Source: NEC, table 430.7(B).
    """
    table = data("motors")["code-letter"]
    low, high = pick({row[0]: (row[1], row[2]) for row in table["rows"]}, letter, "code letter")
    known = "value from memory" if letter in table["remembered"] else "read"
    return low * 1e3, float("inf") if high is None else high * 1e3, source(table["source"], known=known)


def start_over_rated() -> tuple[float, float, Source]:
    """Lowest and highest starting current seen, in multiples of the rated current."""
    table = data("motors")["start"]
    return float(table["over_rated"][0]), float(table["over_rated"][1]), source(table["source"])


def first_half_wave() -> tuple[float, float, Source]:
    """Lowest and highest crest of the first half-wave over the rms locked-rotor current. Source: IEC 60034-12."""
    table = data("motors")["first-half-wave"]
    return float(table["over_rms"][0]), float(table["over_rms"][1]), source(table["source"])


def start_power_factor() -> tuple[float, float, Source]:
    """Lowest and highest power factor while starting."""
    table = data("motors")["start-power-factor"]
    return float(table["range"][0]), float(table["range"][1]), source(table["source"])
