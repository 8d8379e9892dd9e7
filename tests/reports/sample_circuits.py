"""Circuits for a hand-made review record: small impedance trees, solved here at every corner of their tolerances.

All data are invented. The numbers are consistent with each other, so that a drawing made from them closes; they are not
an expectation of what the program calculates.
"""

from __future__ import annotations

import cmath
import itertools
import math
from collections.abc import Iterator, Mapping
from dataclasses import dataclass, field

from circuitlint.review import record as r


@dataclass(frozen=True)
class Leaf:
    """A part with resistance, inductance or capacitance; `spread` is its tolerance as a share, up and down."""

    kind: str
    label: str
    values: tuple[str, ...]
    resistance: float = 0.0
    inductance: float = 0.0
    capacitance: float = 0.0
    spread: float = 0.0


@dataclass(frozen=True)
class Group:
    """Loads in `series` or in `parallel`."""

    kind: str
    parts: tuple[Leaf | Group, ...]


Load = Leaf | Group


@dataclass
class Solved:
    """Phasors of every part for one case."""

    impedance: dict[str, complex] = field(default_factory=dict)
    voltage: dict[str, complex] = field(default_factory=dict)
    current: dict[str, complex] = field(default_factory=dict)


def leaves(load: Load, of: str) -> Iterator[tuple[str, Leaf]]:
    """Every leaf with the place it stands at."""
    if isinstance(load, Leaf):
        yield f"{of}.{load.kind}", load
        return
    for index, part in enumerate(load.parts):
        yield from leaves(part, f"{of}.{load.kind}[{index}]")


def tree(load: Load, of: str) -> r.Element:
    """The load as elements to draw."""
    if isinstance(load, Leaf):
        return r.Element(of=f"{of}.{load.kind}", kind=load.kind, label=load.label, values=load.values)
    parts = tuple(tree(part, f"{of}.{load.kind}[{index}]") for index, part in enumerate(load.parts))
    return r.Element(of=f"{of}.{load.kind}", kind=load.kind, parts=parts)


def _impedance(load: Load, of: str, factor: Mapping[str, float], omega: float, into: Solved) -> complex:
    if isinstance(load, Leaf):
        at = f"{of}.{load.kind}"
        z = complex(load.resistance, omega * load.inductance) * factor.get(at, 1.0)
        if load.capacitance:
            z += 1.0 / (1j * omega * load.capacitance * factor.get(at, 1.0))
        into.impedance[at] = z
        return z
    below = [
        _impedance(part, f"{of}.{load.kind}[{index}]", factor, omega, into) for index, part in enumerate(load.parts)
    ]
    z = sum(below) if load.kind == "series" else 1.0 / sum(1.0 / one for one in below)
    into.impedance[f"{of}.{load.kind}"] = z
    return z


def _share(load: Load, of: str, voltage: complex, into: Solved) -> None:
    at = f"{of}.{load.kind}"
    into.voltage[at] = voltage
    into.current[at] = current = voltage / into.impedance[at]
    if isinstance(load, Group):
        for index, part in enumerate(load.parts):
            place = f"{of}.{load.kind}[{index}]"
            below = into.impedance[f"{place}.{part.kind}"]
            _share(part, place, voltage if load.kind == "parallel" else current * below, into)


def solve(load: Load, voltage: float, frequency: float, cable: complex, factor: Mapping[str, float]) -> Solved:
    """One case: supply voltage, frequency (0 for direct current), cable impedance, share of each leaf's value."""
    into = Solved()
    z = _impedance(load, "load", factor, 2.0 * math.pi * frequency, into)
    into.impedance["cable[0]"], into.impedance[""] = cable, cable + z
    current = voltage / (cable + z)
    into.current["cable[0]"], into.current[""] = current, current
    into.voltage["cable[0]"], into.voltage[""] = current * cable, complex(voltage)
    _share(load, "load", voltage - current * cable, into)
    return into


@dataclass(frozen=True)
class Feed:
    """How a circuit is fed: supply voltage with its band, frequency, cable impedance with its tolerance as a share."""

    voltage: float
    low: float
    high: float
    frequency: float
    cable: complex
    cable_spread: float = 0.1


def quantities(case: Solved, load: Load, direct: bool) -> dict[tuple[str, str], float]:
    """Figures of one case by name and part, in the order of the calculation."""
    z, current, supply = case.impedance[""], case.current[""], case.voltage[""]
    power = supply * current.conjugate()
    terminal = supply - case.voltage["cable[0]"]
    found: dict[tuple[str, str], float] = {("resistance", ""): z.real, ("impedance", ""): abs(z)}
    found["voltage", ""], found["current", ""] = abs(supply), abs(current)
    found["active-power", ""] = power.real
    if not direct:
        found["reactance", ""], found["impedance-angle", ""] = z.imag, cmath.phase(z)
        found["reactive-power", ""], found["apparent-power", ""] = power.imag, abs(power)
        found["power-factor", ""] = power.real / abs(power)
    found["terminal-voltage", ""] = abs(terminal)
    found["voltage-drop", ""] = abs(supply) - abs(terminal)
    found["conductor-loss", "cable[0]"] = abs(current) ** 2 * case.impedance["cable[0]"].real
    for at, leaf in leaves(load, "load"):
        found["current", at] = abs(case.current[at])
        found["voltage", at] = abs(case.voltage[at])
        if leaf.resistance:
            found["active-power", at] = abs(case.current[at]) ** 2 * case.impedance[at].real
    return found


def cases(load: Load, feed: Feed) -> list[Solved]:
    """Nominal first, then every corner of the tolerances."""
    spread = {at: leaf.spread for at, leaf in leaves(load, "load") if leaf.spread}
    solved = [solve(load, feed.voltage, feed.frequency, feed.cable, {})]
    ends = [(1.0 - share, 1.0 + share) for share in spread.values()]
    for voltage in (feed.low, feed.high):
        for cable in (1.0 - feed.cable_spread, 1.0 + feed.cable_spread):
            for corner in itertools.product(*ends):
                factor = dict(zip(spread, corner, strict=True))
                solved.append(solve(load, voltage, feed.frequency, feed.cable * cable, factor))
    return solved


def phasors(case: Solved, load: Load, state: str) -> tuple[r.Phasor, ...]:
    """The phasors of one case, circuit first."""
    made: list[r.Phasor] = []

    def put(name: str, of: str, value: complex) -> None:
        made.append(
            r.Phasor.model_validate(
                {"name": name, "of": of, "state": state, "real": value.real, "imaginary": value.imag}
            )
        )

    for at in ("", "cable[0]"):
        put("voltage", at, case.voltage[at])
        put("current", at, case.current[at])
        put("impedance", at, case.impedance[at])
    put("power", "", case.voltage[""] * case.current[""].conjugate())
    for at in case.impedance:
        if at.startswith("load"):
            put("voltage", at, case.voltage[at])
            put("current", at, case.current[at])
            put("impedance", at, case.impedance[at])
    for at, leaf in leaves(load, "load"):
        if leaf.resistance:
            put("resistive-voltage", at, case.current[at] * case.impedance[at].real)
        if leaf.inductance:
            put("inductive-voltage", at, case.current[at] * 1j * case.impedance[at].imag)
        if leaf.capacitance:
            put("capacitive-voltage", at, case.current[at] * 1j * case.impedance[at].imag)
    return tuple(made)


def hull(points: list[tuple[float, float]]) -> tuple[tuple[float, float], ...]:
    """Convex hull, counter-clockwise."""
    ordered = sorted(set(points))
    if len(ordered) < 3:
        return tuple(ordered)

    def half(these: list[tuple[float, float]]) -> list[tuple[float, float]]:
        kept: list[tuple[float, float]] = []
        for p in these:
            while len(kept) > 1 and (kept[-1][0] - kept[-2][0]) * (p[1] - kept[-2][1]) <= (
                kept[-1][1] - kept[-2][1]
            ) * (p[0] - kept[-2][0]):
                kept.pop()
            kept.append(p)
        return kept[:-1]

    return tuple(half(ordered) + half(ordered[::-1]))


def switch_on(voltage: float, frequency: float, resistance: float, inductance: float) -> r.Curve:
    """Current of a resistance and an inductance closed at the voltage's zero (alternating) or on direct current."""
    times = [index * (0.06 if frequency else 5.0 * inductance / resistance) / 240 for index in range(241)]
    tau = inductance / resistance
    if frequency:
        omega = 2.0 * math.pi * frequency
        z = math.hypot(resistance, omega * inductance)
        phi = math.atan2(omega * inductance, resistance)
        crest = math.sqrt(2.0) * voltage / z
        values = [crest * (math.sin(omega * t - phi) + math.sin(phi) * math.exp(-t / tau)) for t in times]
    else:
        values = [voltage / resistance * (1.0 - math.exp(-t / tau)) for t in times]
    note = "closed at the zero of the voltage" if frequency else ""
    return r.Curve(
        name="switch-on-current",
        of="",
        state="switch-on",
        dimension="current",
        times=tuple(times),
        values=tuple(values),
        note=note,
    )
