"""The load kinds that need little: resistor, capacitor, impedance. The coil has a module of its own."""

from __future__ import annotations

from types import MappingProxyType

from circuitlint.definition.loads import Capacitor, Impedance, Resistor
from circuitlint.physics import phasors, steps
from circuitlint.physics.one_ports import NetworkKind
from circuitlint.study.coil import CoilKind
from circuitlint.study.data import DataSheet
from circuitlint.study.devices import BallastKind, TransformerKind
from circuitlint.study.motor import MotorKind
from circuitlint.study.plan import Kinds, LoadKind, Plan
from circuitlint.study.worksheet import Key


class ResistorKind(LoadKind[Resistor]):
    """A resistance that does not change with temperature."""

    name = "resistor"
    model = Resistor
    resistance_and_inductance = True

    def data(self, part: Resistor, place: str, into: DataSheet) -> None:
        """Its resistance."""
        into.state(f"{place}.resistance", part.resistance)

    def impedance(self, plan: Plan, place: str) -> Key:
        """The resistance itself."""
        return plan.sheet.put("impedance phasor", place, steps.resistive_impedance, figure=False,
                              resistance=plan.datum(f"{place}.resistance"))

    def network(self, plan: Plan, place: str) -> tuple[NetworkKind, tuple[Key, ...]]:
        """A resistance alone."""
        return "resistor", (plan.phasor("impedance", place),)


class CapacitorKind(LoadKind[Capacitor]):
    """A capacitance without loss."""

    name = "capacitor"
    model = Capacitor

    def data(self, part: Capacitor, place: str, into: DataSheet) -> None:
        """Its capacitance, its rated voltage and the resistor across it."""
        into.state(f"{place}.capacitance", part.capacitance)
        into.state(f"{place}.rated_voltage", part.rated_voltage)
        into.state(f"{place}.discharge_resistance", part.discharge_resistance)

    def impedance(self, plan: Plan, place: str) -> Key | None:
        """Its reactance, leading; no direct current passes."""
        if plan.direct:
            return None
        reactance = plan.sheet.put("reactance", place, phasors.reactance_of_capacitance,
                                   capacitance=plan.datum(f"{place}.capacitance"), frequency=plan.frequency())
        return plan.sheet.put("impedance phasor", place, steps.capacitive_impedance, figure=False, reactance=reactance)

    def figures(self, plan: Plan, place: str) -> None:
        """The voltage across it, under its own name."""
        if not plan.direct:
            plan.sheet.put("capacitive-voltage", place, phasors.inductive_voltage, current=Key("current", place),
                           reactance=Key("reactance", place))

    def network(self, plan: Plan, place: str) -> tuple[NetworkKind, tuple[Key, ...]]:
        """A capacitance alone; a resistor that drains it is left out, as in its impedance."""
        return "capacitor", (plan.phasor("impedance", place),)


class ImpedanceKind(LoadKind[Impedance]):
    """A resistance and an inductive reactance in series; the reactance follows the frequency."""

    name = "impedance"
    model = Impedance
    resistance_and_inductance = True

    def data(self, part: Impedance, place: str, into: DataSheet) -> None:
        """Resistance and reactance, and the frequency they hold at."""
        into.state(f"{place}.resistance", part.resistance)
        into.state(f"{place}.reactance", part.reactance)

    def impedance(self, plan: Plan, place: str) -> Key:
        """Series impedance at the supply's frequency."""
        resistance = plan.datum(f"{place}.resistance")
        if plan.direct:
            return plan.sheet.put("impedance phasor", place, steps.resistive_impedance, figure=False, resistance=resistance)
        inductance = plan.sheet.put("inductance", place, phasors.inductance_of_reactance,
                                    reactance=plan.datum(f"{place}.reactance"),
                                    frequency=plan.datum("supply.nominal_frequency"))
        reactance = plan.sheet.put("reactance", place, phasors.reactance_of_inductance, inductance=inductance,
                                   frequency=plan.frequency())
        return plan.sheet.put("impedance phasor", place, phasors.impedance_phasor, figure=False, resistance=resistance,
                              reactance=reactance)


_MADE = (CoilKind(), ResistorKind(), CapacitorKind(), ImpedanceKind(), MotorKind(), TransformerKind(), BallastKind())
CORE: Kinds = MappingProxyType({kind.name: kind for kind in _MADE})
"""The load kinds every definition knows."""
