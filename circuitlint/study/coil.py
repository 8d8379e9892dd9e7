"""The coil: a winding whose resistance follows its temperature, in series with an inductance that follows its gap."""

from __future__ import annotations

from circuitlint import si
from circuitlint.definition.loads import Coil, Gap
from circuitlint.physics import coil_heating, phasors, power_factor, steps, switching_on
from circuitlint.sources import Source
from circuitlint.study.data import DataSheet
from circuitlint.study.plan import LoadKind, Plan
from circuitlint.study.worksheet import Key
from circuitlint.tables import materials

REFERENCE = 20.0
RATED_AMBIENT = Source("IEC 60947-1", "6.1.1, upper ambient temperature in service", known="value from memory")
CONVENTION = Source("winding resistances are stated at 20 °C unless said otherwise", known="common practice")
RATED_AS_SUPPLIED = Source("rated for the supply it is fed from, where the plate says nothing else", known="common practice")


class CoilKind(LoadKind[Coil]):
    """A winding on a core, with or without an armature."""

    name = "coil"
    model = Coil
    resistance_and_inductance = True

    def data(self, part: Coil, place: str, into: DataSheet) -> None:
        """The nameplate as it stands, the winding's material, and what its heating needs."""
        for word in ("resistance", "inductance", "reactance", "impedance", "power_factor", "thermal_resistance",
                     "temperature_rise"):
            into.state(f"{place}.{word}", getattr(part, word))
        if not into.state(f"{place}.resistance_at", part.resistance_at):
            into.assume(f"{place}.resistance_at", si.TEMPERATURE, REFERENCE, REFERENCE, REFERENCE, CONVENTION)
        zero, source = materials.inferred_zero(part.winding)
        into.table(f"{place}.inferred_zero", si.TEMPERATURE_RISE, zero, source)
        into.token(f"{place}.armature", part.armature or "")
        into.token(f"{place}.alone", "yes" if place.count(".") == 1 else "")
        self._rated(part, place, into)
        if part.open_gap is not None:
            for word in Gap.model_fields:
                into.state(f"{place}.open_gap.{word}", getattr(part.open_gap, word))

    def _rated(self, part: Coil, place: str, into: DataSheet) -> None:
        for word, dimension in (("voltage", si.VOLTAGE), ("frequency", si.FREQUENCY)):
            path = f"{place}.rated_{word}"
            stated = getattr(part, f"rated_{word}")
            supply = into.data.get(f"supply.nominal_{word}")
            if stated is not None:
                into.assume(path, dimension, stated.nominal, stated.nominal, stated.nominal,
                            Source("the coil's plate", known="read"))
            elif supply is not None and (word == "frequency" or place.count(".") == 1):
                into.assume(path, dimension, supply.nominal, supply.nominal, supply.nominal, RATED_AS_SUPPLIED)
        if part.temperature_rise is not None and part.thermal_resistance is None:
            into.assume(f"{place}.rated_ambient", si.TEMPERATURE, 40.0, 40.0, 40.0, RATED_AMBIENT)

    def impedance(self, plan: Plan, place: str) -> Key:
        """Winding at the state's temperature, inductance of the state's gap."""
        resistance = self._resistance(plan, place)
        if plan.direct:
            return plan.sheet.put("impedance phasor", place, steps.resistive_impedance, figure=False, resistance=resistance)
        reactance = plan.sheet.put("reactance", place, phasors.reactance_of_inductance,
                                   inductance=self._inductance(plan, place), frequency=plan.datum("supply.frequency"))
        return plan.sheet.put("impedance phasor", place, phasors.impedance_phasor, figure=False, resistance=resistance,
                              reactance=reactance)

    def _reference_resistance(self, plan: Plan, place: str) -> Key:
        if plan.has(f"{place}.resistance"):
            return plan.datum(f"{place}.resistance")
        return plan.sheet.put("reference-resistance", place, phasors.resistance_from_impedance,
                              impedance=plan.datum(f"{place}.impedance"), power_factor=plan.datum(f"{place}.power_factor"))

    def _at(self, plan: Plan, place: str, temperature: Key, name: str) -> Key:
        return plan.sheet.put(name, place, coil_heating.winding_resistance_at,
                              resistance=self._reference_resistance(plan, place), temperature=temperature,
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
            plan.sheet.lack("winding-temperature", place, *needs, why="how warm the winding runs is not known")
            return plan.sheet.lack("resistance", place, *needs, why="how warm the winding runs is not known")
        guess = plan.sheet.guess("settled winding temperature", place, si.TEMPERATURE)
        return self._at(plan, place, guess, "resistance")

    def _thermal_resistance(self, plan: Plan, place: str) -> Key:
        if plan.has(f"{place}.thermal_resistance"):
            return plan.datum(f"{place}.thermal_resistance")
        needs = [f"{place}.temperature_rise"] if not plan.has(f"{place}.temperature_rise") else []
        if not plan.has(f"{place}.rated_voltage"):
            needs.append(f"{place}.rated_voltage")
        if needs:
            return plan.sheet.lack("thermal-resistance", place, *needs, why="how warm the winding runs is not known")
        put = plan.sheet.put
        rise = plan.datum(f"{place}.temperature_rise")
        warm = put("rated-temperature", place, steps.warmed_temperature, ambient=plan.datum(f"{place}.rated_ambient"), rise=rise)
        resistance = self._at(plan, place, warm, "rated-resistance")
        if plan.system == "dc":
            impedance = resistance
        else:
            reactance = put("rated-reactance", place, phasors.reactance_of_inductance,
                            inductance=self._closed_inductance(plan, place), frequency=plan.datum(f"{place}.rated_frequency"))
            impedance = put("rated-impedance", place, phasors.impedance_of, resistance=resistance, reactance=reactance)
        current = put("rated-current", place, steps.current_through, voltage=plan.datum(f"{place}.rated_voltage"), impedance=impedance)
        loss = put("rated-loss", place, power_factor.active_power, current=current, resistance=resistance)
        return put("thermal-resistance", place, coil_heating.thermal_resistance, rise=rise, loss=loss)

    def _closed_inductance(self, plan: Plan, place: str) -> Key:
        if plan.has(f"{place}.inductance"):
            return plan.datum(f"{place}.inductance")
        put = plan.sheet.put
        if plan.has(f"{place}.reactance"):
            reactance = plan.datum(f"{place}.reactance")
        elif plan.has(f"{place}.power_factor"):
            reactance = put("reference-reactance", place, phasors.reactance_from_impedance,
                            impedance=plan.datum(f"{place}.impedance"), power_factor=plan.datum(f"{place}.power_factor"))
        else:
            reactance = put("reference-reactance", place, phasors.reactance_from_resistance,
                            impedance=plan.datum(f"{place}.impedance"), resistance=plan.datum(f"{place}.resistance"))
        return put("inductance", place, phasors.inductance_of_reactance, reactance=reactance,
                   frequency=plan.datum(f"{place}.rated_frequency"))

    def _inductance(self, plan: Plan, place: str) -> Key:
        if not plan.state.open_gap or plan.token(f"{place}.armature") == "none":
            return self._closed_inductance(plan, place)
        return self._open_inductance(plan, place)

    def _open_inductance(self, plan: Plan, place: str) -> Key:
        gap = f"{place}.open_gap"
        if plan.has(f"{gap}.inductance"):
            return plan.datum(f"{gap}.inductance")
        put = plan.sheet.put
        resistance = self._reference_resistance(plan, place)
        if plan.has(f"{gap}.reactance"):
            reactance = plan.datum(f"{gap}.reactance")
        elif plan.has(f"{gap}.impedance"):
            reactance = put("open-gap-reactance", place, phasors.reactance_from_resistance,
                            impedance=plan.datum(f"{gap}.impedance"), resistance=resistance)
        elif plan.has(f"{gap}.current") and plan.has(f"{place}.rated_voltage"):
            impedance = put("open-gap-impedance", place, steps.impedance_from_current,
                            voltage=plan.datum(f"{place}.rated_voltage"), current=plan.datum(f"{gap}.current"))
            reactance = put("open-gap-reactance", place, phasors.reactance_from_resistance, impedance=impedance,
                            resistance=resistance)
        elif plan.has(f"{gap}.apparent_power") and plan.has(f"{place}.rated_voltage"):
            impedance = put("open-gap-impedance", place, steps.impedance_from_apparent_power,
                            voltage=plan.datum(f"{place}.rated_voltage"), apparent_power=plan.datum(f"{gap}.apparent_power"))
            reactance = put("open-gap-reactance", place, phasors.reactance_from_resistance, impedance=impedance,
                            resistance=resistance)
        else:
            return plan.sheet.lack("inductance", place, f"{place}.open_gap, or `armature: none`",
                                   why="the inductance with the armature open is not stated")
        return put("inductance", place, phasors.inductance_of_reactance, reactance=reactance,
                   frequency=plan.datum(f"{place}.rated_frequency"))

    def figures(self, plan: Plan, place: str) -> None:
        """Voltages across its resistance and inductance, loss, temperature, time constant, stored energy."""
        put = plan.sheet.put
        current, resistance = Key("current", place), Key("resistance", place)
        put("resistive-voltage", place, phasors.resistive_voltage, current=current, resistance=resistance)
        loss = put("winding-loss", place, power_factor.active_power, current=current, resistance=resistance)
        inductance = self._inductance_of_state(plan, place)
        put("time-constant", place, switching_on.time_constant, inductance=inductance, resistance=resistance)
        if plan.direct:
            put("stored-energy", place, switching_on.stored_energy, inductance=inductance, current=current)
        else:
            put("inductive-voltage", place, phasors.inductive_voltage, current=current, reactance=Key("reactance", place))
            put("stored-energy", place, steps.stored_energy_at_crest, note="at the current's crest",
                inductance=inductance, current=current)
        if plan.state.hot and plan.sheet.has(resistance):
            rise = put("winding-rise", place, coil_heating.winding_rise, loss=loss,
                       thermal_resistance=self._thermal_resistance(plan, place))
            warm = put("winding-temperature", place, steps.warmed_temperature, ambient=plan.datum("ambient"), rise=rise)
            plan.sheet.settle(Key("settled winding temperature", place), warm, plan.datum("ambient"))

    def _inductance_of_state(self, plan: Plan, place: str) -> Key:
        line = plan.sheet.index.get(Key("reactance", place))
        if line is not None:
            key = line.arguments["inductance"]
            assert isinstance(key, Key)
            return key
        return self._inductance(plan, place)
