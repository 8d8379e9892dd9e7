"""What a supply may be, and the voltage an installation may lose."""

from __future__ import annotations

from circuitlint.errors import OutOfTable
from circuitlint.sources import Source
from circuitlint.tables.files import data, listed, pick, source


def nominal_voltages(frequency: str) -> tuple[tuple[str, ...], Source]:
    """Nominal voltages as text for 50, 60 (Hz) or dc. Raises OutOfTable. Source: IEC 60038."""
    table = data("supply")["nominal"]
    found = pick({one: table[one] for one in ("50", "60", "dc")}, frequency, "frequency")
    return tuple(str(one) for one in found), source(table["source"])


def voltage_band() -> tuple[float, Source]:
    """Deviation of the voltage at the supply terminals either way, as a share. Source: IEC 60038."""
    table = data("supply")["band"]
    return float(table["share"]), source(table["source"])


def harmonic_limit(order: int) -> tuple[float, Source]:
    """Share of the fundamental a harmonic voltage keeps to for 95 % of a week. Raises OutOfTable. Source: EN 50160."""
    table = data("supply")["harmonics"]
    if order not in table["shares"]:
        raise OutOfTable(f"harmonic {order} is not tabled; tabled are {listed(table['shares'])}")
    return float(table["shares"][order]), source(table["source"])


def total_distortion_limit() -> tuple[float, Source]:
    """Total harmonic distortion of the voltage, as a share. Source: EN 50160."""
    table = data("supply")["harmonics"]
    return float(table["thd"]), source(table["source"])


def frequency_band(network: str) -> tuple[float, float, Source]:
    """Usual deviation of the frequency as a share, and the share of time it holds: interconnected or island network.

    Raises OutOfTable. Source: EN 50160.
    """
    table = data("supply")["frequency"]
    entry = pick({one: table[one] for one in ("interconnected", "island")}, network, "network")
    return float(entry["share"]), float(entry["of_time"]), source(table["source"])


def machine_window(quantity: str) -> tuple[float, float, Source]:
    """Lowest and highest share of rating a machine's supply keeps to. Raises OutOfTable. Source: IEC 60204-1.

    `quantity`: ac-voltage, ac-frequency, dc-battery or dc-converter.
    """
    table = data("supply")["machine"]
    choices = {one: table[one] for one in ("ac-voltage", "ac-frequency", "dc-battery", "dc-converter")}
    low, high = pick(choices, quantity, "quantity")
    return float(low), float(high), source(table["source"])


def drop_limit(supply: str, use: str, length: float = 0.0) -> tuple[float, Source]:
    """Voltage drop from the origin to the load, as a share. Raises OutOfTable. Source: IEC 60364-5-52, annex G.

    `supply`: public or private; `use`: lighting or other. Beyond 100 m of `length` (m) it grows by 0.005 % a metre,
    by at most 0.5 %.
    """
    table = data("supply")["drop-limits"]
    kinds = pick({one: table[one] for one in ("public", "private")}, supply, "supply")
    extra = min(max(length - table["beyond"], 0.0) * table["per_metre"], table["cap"])
    return float(pick(kinds, use, "use")) + extra, source(table["source"])


def drop_resistivity(material: str) -> tuple[float, Source]:
    """Resistivity annex G takes for voltage drop, in Ω·m: a hot design value. Raises OutOfTable."""
    table = data("supply")["drop-resistivity"]
    value = pick({one: table[one] for one in ("copper", "aluminium")}, material, "conductor of")
    return float(value) * 1e-6, source(table["source"])


def drop_reactance() -> tuple[float, Source]:
    """Reactance annex G takes where nothing is known, in Ω/m."""
    table = data("supply")["drop-reactance"]
    return float(table["milliohm_per_metre"]) * 1e-3, source(table["source"])


def smallest_section(use: str, make: str) -> tuple[float, Source]:
    """Smallest section on a machine in m². Raises OutOfTable. Source: IEC 60204-1, table 5.

    `use`: power-fixed-outside, power-moving-outside, control-outside, data-outside, power-inside, control-inside or
    data-inside; `make`: single_flexible_class5_6, single_class1_2, two_core_screened, two_core_unscreened or
    three_core_or_more.
    """
    table = data("supply")["smallest-section"]
    row = pick({key: one for key, one in table.items() if key not in ("source", "columns")}, use, "use")
    value = pick(dict(zip(table["columns"], row, strict=True)), make, f"{use}, make")
    return float(value) * 1e-6, source(table["source"])
