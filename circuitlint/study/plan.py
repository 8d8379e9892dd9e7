"""What a load kind writes on: a worksheet together with the data at hand and the state it is written for."""

from __future__ import annotations

from abc import ABC, abstractmethod
from collections.abc import Mapping
from dataclasses import dataclass, field
from typing import Any, ClassVar, Generic, TypeAlias, TypeVar

from pydantic import BaseModel

from circuitlint.physics import feeding, phasors, power_factor, steps
from circuitlint.physics.one_ports import NetworkKind
from circuitlint.study.data import DataSheet
from circuitlint.study.states import State
from circuitlint.study.worksheet import Key, Worksheet

M = TypeVar("M", bound=BaseModel)


@dataclass(slots=True)
class Plan:
    """One state's worksheet in the making."""

    sheet: Worksheet
    state: State
    system: str
    present: DataSheet
    """Only presence, tokens and lacks may be asked of it: worksheets are shared by circuits of one signature."""
    leaves: list[tuple[str, LoadKind[Any]]] = field(default_factory=list)

    @property
    def alike(self) -> bool:
        """Whether three phases are loaded alike, so that one stands for all."""
        return self.token("feed") == "balanced"

    @property
    def direct(self) -> bool:
        """Whether the state has direct current."""
        if self.state.source == "alternating current":
            return False
        return self.system == "dc" or self.state.source == "direct current"

    def frequency(self) -> Key:
        """The frequency of the state."""
        named = {"other frequency": "other frequency", "alternating current": "mains frequency"}
        return self.datum(named.get(self.state.source, "supply.frequency"))

    def datum(self, path: str) -> Key:
        """The key of a datum; where it is lacking, a key that makes every figure built on it lacking."""
        key = self.sheet.datum(path)
        if path in self.present.lacks:
            self.sheet.lacks[key] = self.present.lacks[path]
        elif not self.present.has(path):
            return self.sheet.lack("", path, path)
        return key

    def has(self, path: str) -> bool:
        """Whether a datum is at hand."""
        return self.present.has(path)

    def surroundings(self, place: str) -> Key:
        """The temperature around a part: as stated, else the 20 °C that cold values are given for."""
        stated = f"{place}.ambient" if place else "ambient"
        return self.datum(stated if self.has(stated) else f"assumed {stated}")

    def token(self, path: str) -> str:
        """A choice noted under a path, or an empty text."""
        return self.present.tokens.get(path, "")

    def phasor(self, name: str, of: str) -> Key:
        """The key of a complex quantity of a part."""
        return Key(f"{name} phasor", of)


class LoadKind(ABC, Generic[M]):
    """A kind of load: its model, the data it brings, its impedance in each state, and its own figures.

    Methods are called once per shape of circuit; what they write is run over all circuits of that shape and all cases.
    """

    name: ClassVar[str]
    """The key in a definition."""
    model: ClassVar[type[BaseModel]]
    """What may stand under the key."""
    resistance_and_inductance: ClassVar[bool] = False
    """Whether the part is a resistance and an inductance in series, so that closed forms of switching hold."""

    @abstractmethod
    def data(self, part: M, place: str, into: DataSheet) -> None:
        """Put the part's numbers into the data sheet, under paths that begin with `place`."""

    @abstractmethod
    def impedance(self, plan: Plan, place: str) -> Key | None:
        """Write the lines that lead to the impedance phasor and give its key; None where no direct current passes."""

    def figures(self, plan: Plan, place: str) -> None:
        """Write the part's own figures; its `current` and `voltage` are there by now."""

    def network(self, plan: Plan, place: str) -> tuple[NetworkKind, tuple[Key, ...]] | None:
        """What the part is to a sudden voltage, and the keys of its numbers; None where it is not linear or not known.

        A `coil` takes its impedance phasor R + jX, a `resistor` and a `capacitor` theirs, a `core` R, X and core resistance.
        """
        return ("coil", (plan.phasor("impedance", place),)) if self.resistance_and_inductance else None

    def label(self, part: M) -> tuple[str, ...]:
        """What a drawing prints beside the part."""
        return tuple(
            f"{name.replace('_', ' ')} {value.text}"
            for name in type(part).model_fields
            if hasattr(value := getattr(part, name), "text")
        )


COMPOSED = ("series", "parallel", "several", "delta")
"""Kinds of node that are not loads themselves: `several` is a number of equal loads in parallel, `delta` three between lines."""

Kinds: TypeAlias = Mapping[str, "LoadKind[Any]"]


@dataclass(frozen=True, slots=True)
class Node:
    """A place in the load tree: a leaf of some kind, or `series` or `parallel` of nodes."""

    kind: str
    place: str
    nodes: tuple[Node, ...] = ()


def shape_of(node: Node) -> tuple[Any, ...]:
    """The tree as a hashable value."""
    return (node.kind, node.place, tuple(shape_of(one) for one in node.nodes))


def impedance_of(plan: Plan, node: Node, kinds: Kinds) -> Key | None:
    """Write the impedance of a node from the leaves upward; None where no direct current passes."""
    if node.kind == "several":
        one = impedance_of(plan, node.nodes[0], kinds)
        if one is None:
            return None
        return plan.sheet.put("impedance phasor", node.place, steps.impedance_of_several, figure=False, impedance=one,
                              count=plan.datum(f"{node.place}.count"))
    if node.kind == "delta":
        branch = impedance_of(plan, node.nodes[0], kinds)
        if branch is None:
            return None
        return plan.sheet.put("impedance phasor", node.place, feeding.star_of_delta, figure=False, impedance=branch)
    if node.kind not in COMPOSED:
        plan.leaves.append((node.place, kinds[node.kind]))
        return kinds[node.kind].impedance(plan, node.place)
    below = [impedance_of(plan, one, kinds) for one in node.nodes]
    passing = tuple(key for key in below if key is not None)
    if not passing or (node.kind == "series" and len(passing) < len(below)):
        return None
    joined = phasors.series_impedance if node.kind == "series" else phasors.parallel_impedance
    return plan.sheet.put("impedance phasor", node.place, joined, figure=False, impedances=passing)


def share_out(
    plan: Plan, node: Node, kinds: Kinds, voltage: Key, current: Key | None, blocked: bool = False, inside_delta: bool = False
) -> None:
    """Write voltages and currents from a node downward; `current` is None where a parallel branch finds its own."""
    put = plan.sheet.put
    own = plan.phasor("impedance", node.place)
    blocked = blocked or not _passes(plan, node)
    if current is None:
        if blocked:
            current = put("current phasor", node.place, steps.blocked_current, figure=False, voltage=voltage)
        else:
            current = put("current phasor", node.place, phasors.current_phasor, figure=False, voltage=voltage, impedance=own)
    put("voltage", node.place, phasors.magnitude_of_voltage, voltage=voltage)
    if blocked:
        put("current", node.place, phasors.magnitude_of_current, current=current)
    else:
        write_impedance_figures(plan, node.place)
        put("current", node.place, steps.current_through, voltage=Key("voltage", node.place),
            impedance=Key("impedance", node.place))
    write_power_figures(plan, node.place, voltage, current, inside_delta)
    if node.kind not in COMPOSED:
        kinds[node.kind].figures(plan, node.place)
        return
    closed = [one for one in node.nodes if not _passes(plan, one)]
    for one in node.nodes:
        if node.kind != "series":
            taken = feeding.delta_voltage if node.kind == "delta" else steps.shared_voltage
            share = put("voltage phasor", one.place, taken, figure=False, voltage=voltage)
            share_out(plan, one, kinds, share, None, inside_delta=inside_delta or node.kind == "delta")
            continue
        flow = put("current phasor", one.place, steps.shared_current, figure=False, current=current)
        if not blocked:
            share = put("voltage phasor", one.place, phasors.voltage_phasor, figure=False, current=flow,
                        impedance=plan.phasor("impedance", one.place))
        elif len(closed) == 1 and one is closed[0]:
            share = put("voltage phasor", one.place, steps.shared_voltage, figure=False, voltage=voltage)
        elif one in closed:
            share = plan.sheet.lack("voltage phasor", one.place, why="direct voltage shared by capacitors in series")
        else:
            share = put("voltage phasor", one.place, steps.no_voltage, figure=False, voltage=voltage)
        share_out(plan, one, kinds, share, flow, blocked, inside_delta)


def write_impedance_figures(plan: Plan, place: str) -> None:
    """Magnitude and angle of a part's impedance."""
    phasor = plan.phasor("impedance", place)
    plan.sheet.put("impedance", place, steps.magnitude_of_impedance, impedance=phasor)
    if not plan.direct:
        plan.sheet.put("impedance-angle", place, steps.angle_of_impedance, impedance=phasor)


def write_power_figures(plan: Plan, place: str, voltage: Key, current: Key, inside_delta: bool = False) -> None:
    """Complex power of a part, and its active, reactive and apparent parts with the power factor.

    Where three phases are loaded alike it is the power of all three; of one part inside a delta, its own.
    """
    put = plan.sheet.put
    if plan.alike and not inside_delta:
        one = put("power of one phase phasor", place, power_factor.complex_power, figure=False, voltage=voltage, current=current)
        power = put("power phasor", place, feeding.power_of_three_phases, figure=False, power=one)
        put("active-power", place, steps.active_part, power=power)
        put("reactive-power", place, steps.reactive_part, power=power)
        put("apparent-power", place, steps.magnitude_of_power, power=power)
        put("power-factor", place, power_factor.power_factor, active=Key("active-power", place),
            apparent=Key("apparent-power", place))
        return
    power = put("power phasor", place, power_factor.complex_power, figure=False, voltage=voltage, current=current)
    active = put("active-power", place, steps.active_part, power=power)
    if plan.direct:
        return
    put("reactive-power", place, steps.reactive_part, power=power)
    apparent = put("apparent-power", place, power_factor.apparent_power, voltage=Key("voltage", place),
                   current=Key("current", place))
    put("power-factor", place, power_factor.power_factor, active=active, apparent=apparent)


def _passes(plan: Plan, node: Node) -> bool:
    """Whether a steady current of the state's kind passes the node."""
    if not plan.direct:
        return True
    if node.kind == "series":
        return all(_passes(plan, one) for one in node.nodes)
    if node.kind in ("parallel", "several", "delta"):
        return any(_passes(plan, one) for one in node.nodes)
    key = plan.phasor("impedance", node.place)
    return key in plan.sheet.index or key in plan.sheet.lacks
