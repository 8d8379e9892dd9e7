"""Limits and rules for correction capacitors."""

from __future__ import annotations

from circuitlint.sources import Source
from circuitlint.tables.files import data, pick, place_of, source


def largest_stress(what: str) -> tuple[float, Source]:
    """Permitted voltage, current or current_with_tolerance, as a share of the rating. Raises OutOfTable."""
    table = data("capacitors")["stress"]
    choices = {one: table[one] for one in ("voltage", "current", "current_with_tolerance")}
    return float(pick(choices, what, "stress")), source(table["source"])


def capacitance_tolerance() -> tuple[float, float, Source]:
    """Lowest and highest deviation of capacitance, as shares. Source: IEC 60831-1."""
    table = data("capacitors")["tolerance"]
    return float(table["lowest"]), float(table["highest"]), source(table["source"])


def discharge_limit(rule: str) -> tuple[float, float, Source]:
    """Voltage in V a capacitor must have fallen to, and the time in s, by rule: they differ by jurisdiction.

    `rule`: IEC 60831-1, IEC 60070, IS 13340, NEC 460.6 or California 2893. Raises OutOfTable.
    """
    entry = pick(data("capacitors")["discharge"], rule, "rule")
    return float(entry["volt"]), float(entry["second"]), source(entry["source"])


def over_rated_current(part: str) -> tuple[float, Source]:
    """Current rating of the disconnect or the conductor over that of the capacitor. Raises OutOfTable."""
    tables = data("capacitors")
    entry = pick({one: tables[one] for one in ("disconnect", "conductor")}, part, "part")
    return float(entry["over_rated_current"]), source(entry["source"])


def terminal_share() -> tuple[float, Source]:
    """Correction at a motor's terminals over its no-load demand; sources disagree, the source's note says how."""
    table = data("capacitors")["terminal"]
    return float(table["share"]), source(table["source"])


def motor_correction(power: float, speed: float) -> tuple[float, Source]:
    """Largest correction at the terminals of a 50 Hz motor, in var, by shaft power (W) and speed (1/min).

    Indicative; 0.9 of the measured no-load demand prevails. Raises OutOfTable.
    """
    table = data("capacitors")["motor-kvar"]
    column = place_of(speed, table["speeds"], "motor correction", "1/min") + 1
    row = place_of(power * 1e-3, [one[0] for one in table["rows"]], "motor correction", "kW")
    return float(table["rows"][row][column]) * 1e3, source(table["source"])


def resonance_distance() -> tuple[float, tuple[float, ...], Source]:
    """Distance in orders a resonance keeps from the orders commonly present, and those orders."""
    table = data("capacitors")["resonance-distance"]
    return float(table["distance"]), tuple(float(one) for one in table["orders"]), source(table["source"])
