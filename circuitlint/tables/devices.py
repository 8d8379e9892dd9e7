"""Circuit-breakers and fuses, and the times a fault must be disconnected in."""

from __future__ import annotations

from circuitlint.errors import OutOfTable
from circuitlint.sources import Source
from circuitlint.tables.files import data, listed, noted, pick, place_of, source


def instantaneous_band(curve: str) -> tuple[float, float, Source]:
    """Lower and upper end of the instantaneous band of curve B, C or D, in multiples of the rated current.

    Below the lower end it does not trip at once, above the upper end it does. Raises OutOfTable. Source: IEC 60898-1.
    """
    table = data("devices")["instantaneous"]
    low, high = pick({one: table[one] for one in ("B", "C", "D")}, curve, "curve")
    known = "read" if curve in table["read"] else table["source"]["known"]
    return float(low), float(high), source(table["source"], known=known)


def breaker_conventional() -> tuple[float, float, Source]:
    """Conventional currents of a circuit-breaker, not tripping and tripping, in multiples of the rated current.

    Source: IEC 60898-1, table 7.
    """
    table = data("devices")["breaker-conventional"]
    return table["not_tripping"], table["tripping"], source(table["source"])


def breaker_ratings() -> tuple[tuple[float, ...], Source]:
    """Preferred rated currents of circuit-breakers, in A. Source: IEC 60898-1."""
    table = data("devices")["breaker-ratings"]
    return tuple(float(one) for one in table["ampere"]), source(table["source"])


def fuse_ratings() -> tuple[tuple[float, ...], Source]:
    """Preferred rated currents of gG fuses, in A. Source: IEC 60269-1."""
    table = data("devices")["fuse-ratings"]
    return tuple(float(one) for one in table["ampere"]), source(table["source"])


def fuse_conventional(rating: float) -> tuple[float, float, Source]:
    """Conventional currents of a gG fuse, not melting and melting, in multiples of the rated current.

    Raises OutOfTable unless `rating` is a preferred one. Source: IEC 60269-1, table 2.
    """
    ratings, _ = fuse_ratings()
    preferred = ratings[place_of(rating, ratings, "a gG fuse", "A")]
    table = data("devices")["fuse-conventional"]
    for lowest, highest, holding, melting, _hours in table["rows"]:
        if lowest <= preferred <= highest:
            return float(holding), float(melting), source(table["source"])
    raise OutOfTable(f"a gG fuse of {rating:g} A is not tabled")


def fuse_gate(rating: float, gate: str) -> tuple[float, Source]:
    """A gate of the time-current band of a gG fuse, in A. Raises OutOfTable. Source: IEC 60269-1, table 3.

    `gate`: smallest_10s and smallest_100ms do not melt the fuse in that time, largest_5s and largest_100ms do.
    """
    table = data("devices")["fuse-gates"]
    column = pick({one: place for place, one in enumerate(table["columns"]) if place}, gate, "gate")
    row = place_of(rating, [one[0] for one in table["rows"]], "the gates of a gG fuse", "A")
    return float(table["rows"][row][column]), source(table["source"])


def disconnection_time(voltage: float, earthing: str, kind: str) -> tuple[float, Source]:
    """Longest time to disconnect a fault in a final circuit, in s. Raises OutOfTable. Source: IEC 60364-4-41.

    `voltage` to earth in V, `earthing` TN or TT, `kind` ac or dc. The upper end of a band belongs to it. Where no time is
    demanded, and below the lowest voltage, OutOfTable says so.
    """
    table = data("devices")["disconnection"]
    column = pick({key: one for key, one in table.items() if key[:3] in ("TN-", "TT-")}, f"{earthing}-{kind}", "system")
    for (low, high), time in zip(table["bands_V"], column, strict=True):
        if low < voltage and (high is None or voltage <= high):
            if time is None:
                raise OutOfTable(f"table 41.1 demands no time at {voltage:g} V, {earthing}, {kind}")
            where = source(table["source"])
            for name, lowest, doubt in table["doubts"]:
                if (name, lowest) == (f"{earthing}-{kind}", low):
                    where = noted(where, doubt)
            return float(time), where
    raise OutOfTable(f"{voltage:g} V is not tabled for disconnection times; tabled are voltages above 50 V")


def distribution_disconnection_time(earthing: str) -> tuple[float, Source]:
    """Longest time to disconnect a fault in a distribution circuit, in s, for TN or TT. Raises OutOfTable."""
    table = data("devices")["disconnection-distribution"]
    return float(pick({one: table[one] for one in ("TN", "TT")}, earthing, "system")), source(table["source"])


def constant(name: str) -> tuple[float, Source]:
    """A single factor: voltage-factor (smallest fault current), cold-share (cold reading of a loop that will be hot) or
    tripping-over-ampacity (overload protection). Raises OutOfTable."""
    places = {
        "voltage-factor": ("voltage-factor", "value"),
        "cold-share": ("cold-share", "value"),
        "tripping-over-ampacity": ("overload", "tripping_over_ampacity"),
    }
    if name not in places:
        raise OutOfTable(f"factor {name} is not tabled; tabled are {listed(places)}")
    entry, key = places[name]
    table = data("devices")[entry]
    return float(table[key]), source(table["source"])
