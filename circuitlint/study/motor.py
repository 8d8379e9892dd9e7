"""The motor: constant power while it runs, constant impedance while it starts."""

from __future__ import annotations

import math

from circuitlint import si
from circuitlint.definition.loads import Motor
from circuitlint.physics import feeding, power_factor, steps
from circuitlint.sources import Source
from circuitlint.study.data import DataSheet
from circuitlint.study.plan import LoadKind, Plan
from circuitlint.study.worksheet import Key

PLATE_WORDS = ("shaft_power", "efficiency", "current", "power_factor", "starting_ratio", "starting_power_factor")
AS_SUPPLIED = Source("rated for the supply it is fed from, where the plate says nothing else", known="common practice")


class MotorKind(LoadKind[Motor]):
    """An induction motor by its plate, on one phase or on three; one phase of a star stands for three."""

    name = "motor"
    model = Motor

    def data(self, part: Motor, place: str, into: DataSheet) -> None:
        """The plate."""
        for word in PLATE_WORDS:
            into.state(f"{place}.{word}", getattr(part, word))
        supply = into.data.get("supply.nominal_voltage")
        stated = supply.nominal if supply else 0.0
        if part.rated_voltage:
            alike = into.tokens.get("feed") == "balanced"
            stated = part.rated_voltage.nominal / (math.sqrt(3.0) if alike else 1.0)
        into.assume(f"{place}.rated_voltage", si.VOLTAGE, stated, stated, stated,
                    Source("the motor's plate") if part.rated_voltage else AS_SUPPLIED)

    def impedance(self, plan: Plan, place: str) -> Key:
        """What the motor looks like at the voltage it settles at; locked rotor at switch-on."""
        put = plan.sheet.put
        if plan.direct:
            return plan.sheet.lack("impedance phasor", place, why="a motor's plate says nothing of direct current")
        demand = self._demand(plan, place)
        if plan.state.name == "switch-on":
            wanted = (f"{place}.starting_ratio", f"{place}.starting_power_factor")
            absent = [path for path in wanted if not plan.has(path)]
            if absent:
                return plan.sheet.lack("impedance phasor", place, *absent, why="what it takes while it starts is not stated")
            start = put("starting-demand", place, steps.starting_demand, apparent_power=demand,
                        ratio=plan.datum(f"{place}.starting_ratio"))
            return put("impedance phasor", place, steps.impedance_of_demand, figure=False,
                       voltage=plan.datum(f"{place}.rated_voltage"), apparent_power=start,
                       power_factor=plan.datum(f"{place}.starting_power_factor"))
        guess = plan.sheet.guess("settled terminal voltage", place, si.VOLTAGE)
        return put("impedance phasor", place, steps.impedance_of_running_motor, figure=False, voltage=guess,
                   rated_voltage=plan.datum(f"{place}.rated_voltage"), apparent_power=demand,
                   power_factor=plan.datum(f"{place}.power_factor"))

    def _demand(self, plan: Plan, place: str) -> Key:
        put = plan.sheet.put
        if plan.has(f"{place}.shaft_power"):
            taken = put("electrical-input", place, steps.electrical_input, shaft_power=plan.datum(f"{place}.shaft_power"),
                        efficiency=plan.datum(f"{place}.efficiency"))
            whole = put("rated-demand", place, steps.apparent_of_active, active_power=taken,
                        power_factor=plan.datum(f"{place}.power_factor"))
            return put("rated-demand-of-one-phase", place, feeding.power_of_one_phase, power=whole) if plan.alike else whole
        return put("rated-demand", place, power_factor.apparent_power, voltage=plan.datum(f"{place}.rated_voltage"),
                   current=plan.datum(f"{place}.current"))

    def figures(self, plan: Plan, place: str) -> None:
        """Nothing beyond voltage, current and power; running, its voltage settles the guess."""
        if not plan.direct and plan.state.name != "switch-on":
            plan.sheet.settle(Key("settled terminal voltage", place), Key("voltage", place), plan.datum("supply.voltage"))
