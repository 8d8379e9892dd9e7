"""The coil: a winding whose resistance follows its temperature, in series with an inductance that follows its gap."""

from __future__ import annotations

from circuitlint import si
from circuitlint.definition.loads import COIL_NAMEPLATE, Coil, Gap
from circuitlint.physics import coil_closing, coil_heating, phasors, power_factor, steps, switching_on
from circuitlint.physics.one_ports import NetworkKind
from circuitlint.sources import Source
from circuitlint.study import nameplate, saturating
from circuitlint.study.data import DataSheet
from circuitlint.study.plan import LoadKind, Plan
from circuitlint.study.worksheet import Key
from circuitlint.tables import materials

REFERENCE = 20.0
SERVICE = (
    "rated_duty", "lowest_voltage", "highest_voltage", "pull_in_voltage", "drop_out_voltage", "drop_out_current",
    "saturation_current",
)
"""What the plate says of service, beside what the winding is known from."""
RATED_AMBIENT = Source("IEC 60947-1", "6.1.1, upper ambient temperature in service", known="value from memory")
CONVENTION = Source("winding resistances are stated at 20 °C unless said otherwise", known="common practice")
RATED_AS_SUPPLIED = Source("rated for the supply it is fed from, where the plate says nothing else", known="common practice")
PLATE = Source("the coil's plate")
HEAT_NOT_KNOWN = "how warm the winding runs is not known"


class CoilKind(LoadKind[Coil]):
    """A winding on a core, with or without an armature."""

    name = "coil"
    model = Coil
    resistance_and_inductance = True

    def data(self, part: Coil, place: str, into: DataSheet) -> None:
        """The nameplate as it stands, the winding's material, and what its heating needs."""
        for word in (*COIL_NAMEPLATE, "core_resistance", "thermal_resistance", "temperature_rise", *SERVICE):
            into.state(f"{place}.{word}", getattr(part, word))
        if not into.state(f"{place}.resistance_at", part.resistance_at):
            into.assume(f"{place}.resistance_at", si.TEMPERATURE, REFERENCE, REFERENCE, REFERENCE, CONVENTION)
        zero, source = materials.winding_zero(part.winding)
        into.table(f"{place}.inferred_zero", si.TEMPERATURE_RISE, zero, source)
        into.token(f"{place}.armature", part.armature or "")
        into.token(f"{place}.made_for", part.made_for or "")
        into.token(f"{place}.thermal_class", part.thermal_class or "")
        self._rated(part, place, into)
        saturating.collect(part.saturation, place, into)
        if part.open_gap is not None:
            for word in Gap.model_fields:
                into.state(f"{place}.open_gap.{word}", getattr(part.open_gap, word))

    def _rated(self, part: Coil, place: str, into: DataSheet) -> None:
        for word, dimension in (("voltage", si.VOLTAGE), ("frequency", si.FREQUENCY)):
            path = f"{place}.rated_{word}"
            stated = getattr(part, f"rated_{word}")
            supply = into.data.get(f"supply.nominal_{word}")
            if stated is not None:
                into.token(path, "stated")
                into.assume(path, dimension, stated.nominal, stated.nominal, stated.nominal, PLATE)
            elif supply is not None and (word == "frequency" or place.count(".") == 1):
                into.assume(path, dimension, supply.nominal, supply.nominal, supply.nominal, RATED_AS_SUPPLIED)
        if part.temperature_rise is not None and part.thermal_resistance is None:
            into.assume(f"{place}.rated_ambient", si.TEMPERATURE, 40.0, 40.0, 40.0, RATED_AMBIENT)

    def impedance(self, plan: Plan, place: str) -> Key:
        """Winding at the state's temperature, inductance of the state's gap, core loss where the plate tells it."""
        put = plan.sheet.put
        resistance = self._resistance(plan, place)
        if plan.direct:
            return put("impedance phasor", place, steps.resistive_impedance, figure=False, resistance=resistance)
        reactance = put("reactance", place, phasors.reactance_of_inductance, inductance=self._working(plan, place),
                        frequency=plan.frequency())
        if nameplate.has_core(plan, place):
            return put("impedance phasor", place, steps.impedance_with_core, figure=False, resistance=resistance,
                       core_resistance=nameplate.core_resistance(plan, place), reactance=reactance)
        return put("impedance phasor", place, phasors.impedance_phasor, figure=False, resistance=resistance, reactance=reactance)

    def _at(self, plan: Plan, place: str, temperature: Key, name: str) -> Key:
        return plan.sheet.put(name, place, coil_heating.winding_resistance_at,
                              resistance=nameplate.reference_resistance(plan, place), temperature=temperature,
                              reference_temperature=plan.datum(f"{place}.resistance_at"),
                              inferred_zero=plan.datum(f"{place}.inferred_zero"))

    def _resistance(self, plan: Plan, place: str) -> Key:
        if not plan.state.hot:
            return self._at(plan, place, plan.surroundings(""), "resistance")
        thermal = self._thermal_resistance(plan, place)
        ambient = plan.datum("ambient")
        lacking = [plan.sheet.lacks[key] for key in (thermal, ambient) if key in plan.sheet.lacks]
        if lacking:
            needs = tuple(dict.fromkeys(need for lack in lacking for need in lack.needs))
            plan.sheet.lack("winding-temperature", place, *needs, why=HEAT_NOT_KNOWN)
            return plan.sheet.lack("resistance", place, *needs, why=HEAT_NOT_KNOWN)
        guess = plan.sheet.guess("settled winding temperature", place, si.TEMPERATURE)
        return self._at(plan, place, guess, "resistance")

    def _thermal_resistance(self, plan: Plan, place: str) -> Key:
        if plan.has(f"{place}.thermal_resistance"):
            return plan.datum(f"{place}.thermal_resistance")
        if saturating.saturates(plan, place):
            return plan.sheet.lack("thermal-resistance", place, f"{place}.thermal_resistance", why=HEAT_NOT_KNOWN)
        needs = [f"{place}.temperature_rise"] if not plan.has(f"{place}.temperature_rise") else []
        if not plan.has(f"{place}.rated_voltage"):
            needs.append(f"{place}.rated_voltage")
        if needs:
            return plan.sheet.lack("thermal-resistance", place, *needs, why=HEAT_NOT_KNOWN)
        return self._rated_rise_over_loss(plan, place)

    def _rated_rise_over_loss(self, plan: Plan, place: str) -> Key:
        put = plan.sheet.put
        rise = plan.datum(f"{place}.temperature_rise")
        warm = put("rated-temperature", place, steps.warmed_temperature, ambient=plan.datum(f"{place}.rated_ambient"), rise=rise)
        resistance = self._at(plan, place, warm, "rated-resistance")
        if plan.system == "dc":
            phasor = put("rated impedance phasor", place, steps.resistive_impedance, figure=False, resistance=resistance)
        else:
            reactance = put("rated-reactance", place, phasors.reactance_of_inductance,
                            inductance=nameplate.closed_inductance(plan, place),
                            frequency=plan.datum(f"{place}.rated_frequency"))
            if nameplate.has_core(plan, place):
                phasor = put("rated impedance phasor", place, steps.impedance_with_core, figure=False, resistance=resistance,
                             core_resistance=nameplate.core_resistance(plan, place), reactance=reactance)
            else:
                phasor = put("rated impedance phasor", place, phasors.impedance_phasor, figure=False, resistance=resistance,
                             reactance=reactance)
        impedance = put("rated-impedance", place, steps.magnitude_of_impedance, impedance=phasor)
        current = put("rated-current", place, steps.current_through, voltage=plan.datum(f"{place}.rated_voltage"),
                      impedance=impedance)
        loss = put("rated-loss", place, power_factor.active_power, current=current,
                   resistance=put("rated-loss-resistance", place, steps.resistance_part, impedance=phasor))
        return put("thermal-resistance", place, coil_heating.thermal_resistance, rise=rise, loss=loss)

    def _inductance(self, plan: Plan, place: str) -> Key:
        if not plan.state.open_gap or plan.token(f"{place}.armature") == "none":
            return nameplate.closed_inductance(plan, place)
        return nameplate.open_inductance(plan, place)

    def _unsaturated(self, plan: Plan, place: str) -> Key | None:
        return None if plan.token(f"{place}.saturation.table") != "0" else nameplate.closed_inductance(plan, place)

    def _working(self, plan: Plan, place: str) -> Key:
        if saturating.saturates(plan, place):
            return saturating.working_inductance(plan, place, self._unsaturated(plan, place))
        return self._inductance(plan, place)

    def network(self, plan: Plan, place: str) -> tuple[NetworkKind, tuple[Key, ...]] | None:
        """Resistance and inductance in series, the core's resistance across the inductance where the plate tells it."""
        if saturating.saturates(plan, place):
            return None
        if not nameplate.has_core(plan, place):
            return "coil", (plan.phasor("impedance", place),)
        return "core", (Key("resistance", place), Key("reactance", place), nameplate.core_resistance(plan, place))

    def figures(self, plan: Plan, place: str) -> None:
        """Voltages across its resistance and inductance, losses, temperature, time constant, stored energy, flux."""
        put = plan.sheet.put
        current, resistance = Key("current", place), Key("resistance", place)
        put("resistive-voltage", place, phasors.resistive_voltage, current=current, resistance=resistance)
        put("winding-loss", place, power_factor.active_power, current=current, resistance=resistance)
        if saturating.saturates(plan, place):
            saturating.tell(plan, place, self._unsaturated(plan, place))
            for name in ("time-constant", "stored-energy"):
                plan.sheet.lack(name, place, why=saturating.NOT_CONSTANT)
        else:
            inductance = self._inductance(plan, place)
            put("time-constant", place, switching_on.time_constant, inductance=inductance, resistance=resistance)
            if plan.direct:
                put("stored-energy", place, switching_on.stored_energy, inductance=inductance, current=current)
            else:
                put("stored-energy", place, steps.stored_energy_at_crest, note="at the current's crest", inductance=inductance,
                    current=current)
        if not plan.direct:
            self._alternating(plan, place)
        if plan.token(f"{place}.rated_voltage") == "stated":
            put("voltage-share", place, steps.share_of_rated_voltage, voltage=Key("voltage", place),
                rated_voltage=plan.datum(f"{place}.rated_voltage"))
        if plan.state.name == "cold" and not saturating.saturates(plan, place):
            nameplate.derived_again(plan, place)
        if plan.state.hot and plan.sheet.has(resistance):
            rise = put("winding-rise", place, coil_heating.winding_rise, loss=Key("active-power", place),
                       thermal_resistance=self._thermal_resistance(plan, place))
            warm = put("winding-temperature", place, steps.warmed_temperature, ambient=plan.datum("ambient"), rise=rise)
            plan.sheet.settle(Key("settled winding temperature", place), warm, plan.datum("ambient"))

    def _alternating(self, plan: Plan, place: str) -> None:
        put = plan.sheet.put
        current = Key("current", place)
        if nameplate.has_core(plan, place):
            put("core-loss", place, steps.core_loss, active_power=Key("active-power", place), current=current,
                resistance=Key("resistance", place))
        else:
            put("inductive-voltage", place, phasors.inductive_voltage, current=current, reactance=Key("reactance", place))
        if plan.has(f"{place}.rated_voltage") and plan.has(f"{place}.rated_frequency"):
            put("flux-ratio", place, coil_closing.flux_ratio, voltage=Key("voltage", place), frequency=plan.frequency(),
                rated_voltage=plan.datum(f"{place}.rated_voltage"), rated_frequency=plan.datum(f"{place}.rated_frequency"))
