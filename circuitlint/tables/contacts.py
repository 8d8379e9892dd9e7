"""What contacts may switch: utilization categories, pilot-duty codes, smallest loads."""

from __future__ import annotations

from dataclasses import dataclass

from circuitlint.errors import OutOfTable
from circuitlint.sources import Source
from circuitlint.tables.files import data, pick, source


@dataclass(frozen=True, slots=True)
class Duty:
    """Making and breaking in multiples of the rated current, with the power factors they hold at (None for direct)."""

    make: float
    breaking: float
    make_power_factor: float | None
    breaking_power_factor: float | None
    source: Source


def category_duty(category: str) -> Duty:
    """Duty of AC-12 to AC-15, DC-12 to DC-14, and AC-1 to AC-4 (those without power factor). Raises OutOfTable."""
    tables = data("contacts")
    for name in ("category-ac", "category-dc", "category-motor"):
        entry = tables[name]["categories"].get(category)
        if entry is not None:
            known = "read" if category in tables[name].get("read", ()) else tables[name]["source"]["known"]
            if name == "category-motor":
                return Duty(entry["make"], entry["break"], None, None, source(tables[name]["source"], known=known))
            return Duty(
                entry["make"],
                entry["break"],
                entry.get("make_power_factor"),
                entry.get("break_power_factor"),
                source(tables[name]["source"], known=known),
            )
    present = [one for name in ("category-ac", "category-dc", "category-motor") for one in tables[name]["categories"]]
    raise OutOfTable(f"category {category} is not tabled; tabled are {', '.join(present)}")


def category_use(category: str) -> tuple[str, Source]:
    """What a utilization category is for, in words. Raises OutOfTable."""
    tables = data("contacts")
    for name in ("use", "use-remembered"):
        if category in tables[name]["words"]:
            return str(tables[name]["words"][category]), source(tables[name]["source"])
    raise OutOfTable(f"category {category} is not tabled; tabled are {', '.join((*tables['use']['words'], 'DC-14'))}")


def time_to_95_percent(power: float) -> tuple[float, Source]:
    """Time in s to 95 % of the settled current that DC-13 contacts are tested with, for a load of `power` in W.

    Three time constants of a linear coil. Source: IEC 60947-5-1.
    """
    table = data("contacts")["dc-13-time"]
    return min(table["ms_per_watt"] * power, table["largest_ms"]) * 1e-3, source(table["source"])


@dataclass(frozen=True, slots=True)
class PilotDuty:
    """Thermal current, and what may be made and broken at a voltage, in A."""

    thermal: float
    make: float
    breaking: float
    source: Source


def pilot_duty_ac(code: str, voltage: float) -> PilotDuty:
    """Duty of an alternating-current pilot-duty code at a voltage (V). Raises OutOfTable above the code's highest voltage.

    At a tabled voltage the printed amperes; between them volt-amperes over voltage, below them those of the lowest.
    """
    table = data("contacts")["pilot-duty-ac"]
    entry = pick(table["codes"], code, "code")
    highest, lowest = max(entry["make"]), min(entry["make"])
    rated = int(code[1:])
    if not 0.0 < voltage <= rated:
        raise OutOfTable(f"{voltage:g} V is not tabled for code {code}; tabled are voltages up to {rated} V")
    if voltage in entry["make"]:
        make, breaking = entry["make"][voltage], entry["break"][voltage]
    else:
        make = min(entry["make_VA"] / voltage, entry["make"][lowest])
        breaking = min(entry["break_VA"] / voltage, entry["break"][lowest])
        if voltage > highest:
            make, breaking = min(make, entry["make"][highest]), min(breaking, entry["break"][highest])
    return PilotDuty(float(entry["thermal"]), float(make), float(breaking), source(table["source"]))


def pilot_duty_dc(code: str, voltage: float) -> PilotDuty:
    """Duty of a direct-current pilot-duty code at a voltage (V). Raises OutOfTable above the code's highest voltage.

    At a tabled voltage the printed amperes; else up to 300 V the volt-amperes over voltage; never above the thermal
    current. Above 300 V the amperes tabled for 301 to 600 V.
    """
    table = data("contacts")["pilot-duty-dc"]
    entry = pick(table["codes"], code, "code")
    rated = int(code[1:])
    if not 0.0 < voltage <= rated:
        raise OutOfTable(f"{voltage:g} V is not tabled for code {code}; tabled are voltages up to {rated} V")
    if voltage in entry["amperes"]:
        amperes = entry["amperes"][voltage]
    elif voltage > 300.0:
        amperes = entry["amperes"][600]
    else:
        amperes = min(entry["VA"] / voltage, entry["thermal"])
    return PilotDuty(float(entry["thermal"]), float(amperes), float(amperes), source(table["source"]))


def smallest_load(contact: str) -> tuple[float, float | None, Source]:
    """Smallest current in A, and voltage in V where one is stated, a contact switches dependably. Raises OutOfTable.

    `contact`: silver-nickel, gold-5um or contactor-auxiliary.
    """
    table = data("contacts")["smallest-load"]
    entry = pick(table["contacts"], contact, "contact")
    volts = entry.get("V")
    return entry["mA"] * 1e-3, None if volts is None else float(volts), source(table["source"])
