"""Voltage windows, inrush and stray capacitance of electromagnet coils."""

from __future__ import annotations

from circuitlint.sources import Source
from circuitlint.tables.files import data, pick, source

WINDOWS = {
    "contactor": "window",
    "release": "window-release",
    "relay": "window-relay",
    "solenoid-ac": "window-solenoid-ac",
}


def voltage_window(part: str, operation: str) -> tuple[float, float, Source]:
    """Lowest and highest share of the rated voltage. Raises OutOfTable.

    `part`: contactor, release, relay or solenoid-ac; `operation`: close (must close between the two), open-ac, open-dc
    (may open from the upper one down, must have opened at the lower one).
    """
    table = data("coils")[pick(WINDOWS, part, "coil of a")]
    low, high = pick({key: one for key, one in table.items() if key != "source"}, operation, "operation")
    return float(low), float(high), source(table["source"])


def inrush_over_sealed() -> tuple[float, float, Source]:
    """Lowest and highest ratio seen of inrush to sealed volt-amperes; no single figure is to be inferred."""
    table = data("coils")["inrush"]
    return float(table["lowest"]), float(table["highest"]), source(table["source"])


def inrush_power_factor() -> tuple[float, Source]:
    """Power factor of inrush that control-transformer guides assume."""
    table = data("coils")["inrush-power-factor"]
    return float(table["assumed"]), source(table["source"])


def resistance_tolerance() -> tuple[float, Source]:
    """Usual tolerance of a coil's resistance at 20 °C, as a share either way."""
    table = data("coils")["resistance-tolerance"]
    return float(table["share"]), source(table["source"])


def cable_capacitance_per_metre(kind: str) -> tuple[float, Source]:
    """Capacitance of a control cable in F/m: seven-core (seen), two-wire or three-wire (assumed). Raises OutOfTable."""
    tables = data("coils")
    if kind == "seven-core":
        table = tables["cable-capacitance"]
        return table["uF_per_km"] * 1e-9, source(table["source"])
    table = tables["cable-capacitance-default"]
    choices = {"seven-core": None, **{one: table[one] for one in ("two-wire", "three-wire")}}
    return float(pick(choices, kind, "control cable")) * 1e-9, source(table["source"])


def varistor_added_release() -> tuple[float, float, Source]:
    """Shortest and longest release time a varistor adds, in s."""
    table = data("coils")["suppressors"]
    low, high = table["varistor"]["added_release_ms"]
    return low * 1e-3, high * 1e-3, source(table["source"])
