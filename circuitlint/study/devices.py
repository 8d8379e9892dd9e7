"""Loads known by what they take as a whole: the control transformer, and the lamp on its choke."""

from __future__ import annotations

from circuitlint import si
from circuitlint.definition.devices import Ballast, Transformer
from circuitlint.physics import coil_closing, phasors, power_factor, steps
from circuitlint.physics.core_loss import series_resistance_of_loss
from circuitlint.quantity import Quantity
from circuitlint.sources import Source
from circuitlint.study.data import DataSheet
from circuitlint.study.plan import LoadKind, Plan
from circuitlint.study.worksheet import Key

AS_SUPPLIED = Source("rated for the supply it is fed from, where the plate says nothing else", known="common practice")
PLATE = Source("the plate")
NO_DIRECT = "the plate says nothing of direct current"


def _rated(word: str, dimension: si.Dimension, stated: Quantity | None, place: str, into: DataSheet) -> None:
    supply = into.data.get(f"supply.nominal_{word}")
    if stated is not None:
        into.assume(f"{place}.rated_{word}", dimension, stated.nominal, stated.nominal, stated.nominal, PLATE)
    elif supply is not None and (word == "frequency" or place.count(".") == 1):
        into.assume(f"{place}.rated_{word}", dimension, supply.nominal, supply.nominal, supply.nominal, AS_SUPPLIED)


def _at_frequency(plan: Plan, place: str, resistance: Key, rated_reactance: Key) -> Key:
    """R + jX at the state's frequency, from the reactance at the rated one."""
    put = plan.sheet.put
    inductance = put("inductance", place, phasors.inductance_of_reactance, reactance=rated_reactance,
                     frequency=plan.datum(f"{place}.rated_frequency"))
    reactance = put("reactance", place, phasors.reactance_of_inductance, inductance=inductance, frequency=plan.frequency())
    return put("impedance phasor", place, phasors.impedance_phasor, figure=False, resistance=resistance, reactance=reactance)


class TransformerKind(LoadKind[Transformer]):
    """A transformer with its load as a constant impedance; where three phases are loaded alike, one in each.

    Its own magnetising inrush is not part of the demand that a plate states, and no figure tells it.
    """

    name = "transformer"
    model = Transformer

    def data(self, part: Transformer, place: str, into: DataSheet) -> None:
        """The demand, and what it is stated at."""
        for word in ("rated_apparent_power", "apparent_power", "power_factor", "inrush_apparent_power", "inrush_power_factor"):
            into.state(f"{place}.{word}", getattr(part, word))
        _rated("voltage", si.VOLTAGE, part.rated_voltage, place, into)
        _rated("frequency", si.FREQUENCY, part.rated_frequency, place, into)

    def impedance(self, plan: Plan, place: str) -> Key:
        """The impedance of the demand: holding, or with the coils' gaps open."""
        if plan.direct:
            return plan.sheet.lack("impedance phasor", place, why=NO_DIRECT)
        start = "inrush_" if plan.state.open_gap else ""
        if start and not plan.has(f"{place}.inrush_apparent_power"):
            return plan.sheet.lack("impedance phasor", place, f"{place}.inrush_apparent_power", f"{place}.inrush_power_factor",
                                   why="the demand while coils pull in is not stated")
        rated = plan.sheet.put("rated impedance phasor", place, steps.impedance_of_demand, figure=False,
                               voltage=plan.datum(f"{place}.rated_voltage"),
                               apparent_power=plan.datum(f"{place}.{start}apparent_power"),
                               power_factor=plan.datum(f"{place}.{start}power_factor"))
        resistance = plan.sheet.put("resistance", place, steps.resistance_part, impedance=rated)
        reactance = plan.sheet.put("rated-reactance", place, steps.reactance_part, impedance=rated)
        return _at_frequency(plan, place, resistance, reactance)

    def figures(self, plan: Plan, place: str) -> None:
        """At switch-on, what a transformer has to be chosen for: the root of the sum of both demands' squares."""
        if plan.state.name == "switch-on" and plan.has(f"{place}.inrush_apparent_power"):
            plan.sheet.put("selection-demand", place, coil_closing.transformer_demand,
                           sealed_power=plan.datum(f"{place}.apparent_power"),
                           inrush_power=plan.datum(f"{place}.inrush_apparent_power"))


class BallastKind(LoadKind[Ballast]):
    """A lamp as a resistance in series with its choke. Before the lamp has struck it is not a resistance, and nothing is told."""

    name = "ballast"
    model = Ballast

    def data(self, part: Ballast, place: str, into: DataSheet) -> None:
        """The plate."""
        for word in ("current", "loss", "choke_voltage", "rated_voltage", "lamp_power", "lamp_voltage"):
            into.state(f"{place}.{word}", getattr(part, word))
        _rated("frequency", si.FREQUENCY, part.rated_frequency, place, into)

    def impedance(self, plan: Plan, place: str) -> Key:
        """Resistance of lamp and choke, reactance of the choke."""
        put, current = plan.sheet.put, plan.datum(f"{place}.current")
        if plan.direct:
            return plan.sheet.lack("impedance phasor", place, why=NO_DIRECT)
        if plan.state.name == "switch-on":
            return plan.sheet.lack("impedance phasor", place, why="a lamp that has not struck is no resistance")
        choke = put("choke-resistance", place, series_resistance_of_loss, active_power=plan.datum(f"{place}.loss"),
                    current=current)
        if plan.has(f"{place}.lamp_power"):
            lamp = put("lamp-resistance", place, series_resistance_of_loss, active_power=plan.datum(f"{place}.lamp_power"),
                       current=current)
        else:
            lamp = put("lamp-resistance", place, steps.impedance_from_current, voltage=plan.datum(f"{place}.lamp_voltage"),
                       current=current)
        both = put("rated resistance phasor", place, phasors.series_impedance, figure=False, impedances=(choke, lamp))
        resistance = put("resistance", place, steps.resistance_part, impedance=both)
        whole = f"{place}.choke_voltage" if plan.has(f"{place}.choke_voltage") else f"{place}.rated_voltage"
        size = put("plate-impedance", place, steps.impedance_from_current, voltage=plan.datum(whole), current=current)
        reactance = put("rated-reactance", place, phasors.reactance_from_resistance, impedance=size,
                        resistance=choke if plan.has(f"{place}.choke_voltage") else resistance)
        return _at_frequency(plan, place, resistance, reactance)

    def figures(self, plan: Plan, place: str) -> None:
        """Power of the lamp and loss of the choke at the current that flows."""
        for name in ("lamp", "choke"):
            plan.sheet.put("lamp-power" if name == "lamp" else "choke-loss", place, power_factor.active_power,
                           current=Key("current", place), resistance=Key(f"{name}-resistance", place))
