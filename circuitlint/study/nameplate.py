"""From whatever stands on a coil's plate to resistance, inductance and core resistance.

Which way is taken depends only on which data are there. What is stated beyond that is derived again from the winding so
found (`derived-...` figures), for the plate to be held against itself.
"""

from __future__ import annotations

from circuitlint.physics import phasors, power_factor, steps
from circuitlint.study.plan import Plan
from circuitlint.study.worksheet import Key

NOT_KNOWN = "the coil's reactance is not stated"
REACTANCE_NEEDS = "inductance, reactance, impedance, quality_factor, current or apparent_power"


def reference_resistance(plan: Plan, place: str) -> Key:
    """Resistance of the winding at its reference temperature."""
    put = plan.sheet.put
    if plan.has(f"{place}.resistance"):
        return plan.datum(f"{place}.resistance")
    impedance, factor = plate_impedance(plan, place), plate_power_factor(plan, place)
    if impedance is not None and factor is not None:
        return put("reference-resistance", place, phasors.resistance_from_impedance, impedance=impedance, power_factor=factor)
    return put("reference-resistance", place, steps.resistance_of_power, voltage=plan.datum(f"{place}.rated_voltage"),
               power=plan.datum(f"{place}.active_power"))


def plate_impedance(plan: Plan, place: str) -> Key | None:
    """Magnitude of the impedance at rated conditions, armature closed; None where the plate does not tell it."""
    put, volts = plan.sheet.put, f"{place}.rated_voltage"
    if plan.has(f"{place}.impedance"):
        return plan.datum(f"{place}.impedance")
    if plan.has(f"{place}.current") and plan.has(volts):
        return put("plate-impedance", place, steps.impedance_from_current, voltage=plan.datum(volts),
                   current=plan.datum(f"{place}.current"))
    if plan.has(f"{place}.apparent_power") and plan.has(volts):
        return put("plate-impedance", place, steps.impedance_from_apparent_power, voltage=plan.datum(volts),
                   apparent_power=plan.datum(f"{place}.apparent_power"))
    return None


def plate_power_factor(plan: Plan, place: str) -> Key | None:
    """Power factor of the coil at rated conditions, armature closed; None where the plate does not tell it."""
    put, watts = plan.sheet.put, f"{place}.active_power"
    if plan.has(f"{place}.power_factor"):
        return plan.datum(f"{place}.power_factor")
    if plan.has(watts) and plan.has(f"{place}.apparent_power"):
        return put("plate-power-factor", place, power_factor.power_factor, active=plan.datum(watts),
                   apparent=plan.datum(f"{place}.apparent_power"))
    if plan.has(watts) and plan.has(f"{place}.current") and plan.has(f"{place}.rated_voltage"):
        return put("plate-power-factor", place, steps.power_factor_of_plate, active_power=plan.datum(watts),
                   voltage=plan.datum(f"{place}.rated_voltage"), current=plan.datum(f"{place}.current"))
    return None


def has_core(plan: Plan, place: str) -> bool:
    """Whether the plate separates core loss from winding loss: stated, or by resistance together with impedance and power."""
    if plan.has(f"{place}.core_resistance"):
        return True
    if not plan.has(f"{place}.resistance") or plan.has(f"{place}.inductance") or plan.has(f"{place}.reactance"):
        return False
    reads_power = plan.has(f"{place}.active_power") or plan.has(f"{place}.power_factor")
    return reads_power and plate_impedance(plan, place) is not None and plate_power_factor(plan, place) is not None


def core_resistance(plan: Plan, place: str) -> Key:
    """Resistance across the inductance that stands for core loss."""
    if plan.has(f"{place}.core_resistance"):
        return plan.datum(f"{place}.core_resistance")
    impedance, factor = plate_impedance(plan, place), plate_power_factor(plan, place)
    assert impedance is not None and factor is not None
    return plan.sheet.put("core-resistance", place, steps.core_resistance_of_plate, impedance=impedance, power_factor=factor,
                          resistance=plan.datum(f"{place}.resistance"))


def closed_inductance(plan: Plan, place: str) -> Key:
    """Inductance with the armature closed."""
    if plan.has(f"{place}.inductance"):
        return plan.datum(f"{place}.inductance")
    reactance = _reactance(plan, place)
    name = "unsaturated-inductance" if plan.token(f"{place}.saturation") else "inductance"
    return plan.sheet.put(name, place, phasors.inductance_of_reactance, reactance=reactance,
                          frequency=plan.datum(f"{place}.rated_frequency"))


def _reactance(plan: Plan, place: str) -> Key:
    put = plan.sheet.put
    if plan.has(f"{place}.reactance"):
        return plan.datum(f"{place}.reactance")
    resistance = reference_resistance(plan, place)
    if plan.has(f"{place}.quality_factor"):
        return put("reference-reactance", place, steps.reactance_of_quality,
                   quality_factor=plan.datum(f"{place}.quality_factor"), resistance=resistance)
    impedance, factor = plate_impedance(plan, place), plate_power_factor(plan, place)
    if impedance is None:
        return plan.sheet.lack("reference-reactance", place, f"{place}: {REACTANCE_NEEDS}", why=NOT_KNOWN)
    if plan.has(f"{place}.resistance"):
        if factor is not None:
            return put("reference-reactance", place, steps.core_reactance_of_plate, impedance=impedance, power_factor=factor,
                       resistance=resistance)
        return put("reference-reactance", place, phasors.reactance_from_resistance, impedance=impedance, resistance=resistance)
    assert factor is not None
    return put("reference-reactance", place, phasors.reactance_from_impedance, impedance=impedance, power_factor=factor)


def open_inductance(plan: Plan, place: str) -> Key:
    """Inductance with the armature held open."""
    put, gap, volts = plan.sheet.put, f"{place}.open_gap", f"{place}.rated_voltage"
    if plan.has(f"{gap}.inductance"):
        return plan.datum(f"{gap}.inductance")
    if plan.has(f"{gap}.reactance"):
        reactance = plan.datum(f"{gap}.reactance")
    else:
        if plan.has(f"{gap}.impedance"):
            impedance = plan.datum(f"{gap}.impedance")
        elif plan.has(f"{gap}.current") and plan.has(volts):
            impedance = put("open-gap-impedance", place, steps.impedance_from_current, voltage=plan.datum(volts),
                            current=plan.datum(f"{gap}.current"))
        elif plan.has(f"{gap}.apparent_power") and plan.has(volts):
            impedance = put("open-gap-impedance", place, steps.impedance_from_apparent_power, voltage=plan.datum(volts),
                            apparent_power=plan.datum(f"{gap}.apparent_power"))
        else:
            return plan.sheet.lack("inductance", place, f"{place}.open_gap, or `armature: none`",
                                   why="the inductance with the armature open is not stated")
        if plan.has(f"{gap}.power_factor"):
            reactance = put("open-gap-reactance", place, phasors.reactance_from_impedance, impedance=impedance,
                            power_factor=plan.datum(f"{gap}.power_factor"))
        else:
            reactance = put("open-gap-reactance", place, phasors.reactance_from_resistance, impedance=impedance,
                            resistance=reference_resistance(plan, place))
    return put("inductance", place, phasors.inductance_of_reactance, reactance=reactance,
               frequency=plan.datum(f"{place}.rated_frequency"))


def derived_again(plan: Plan, place: str) -> None:
    """Stated data that the winding did not need, derived from it: `derived-impedance` against a stated impedance and so on."""
    if plan.direct:
        return
    put = plan.sheet.put
    resistance, inductance = reference_resistance(plan, place), closed_inductance(plan, place)
    if not (plan.sheet.has(resistance) and plan.sheet.has(inductance)):
        return
    reactance = put("plate-reactance", place, phasors.reactance_of_inductance, inductance=inductance,
                    frequency=plan.datum(f"{place}.rated_frequency"))
    if has_core(plan, place):
        phasor = put("plate impedance phasor", place, steps.impedance_with_core, figure=False, resistance=resistance,
                     core_resistance=core_resistance(plan, place), reactance=reactance)
    else:
        phasor = put("plate impedance phasor", place, phasors.impedance_phasor, figure=False, resistance=resistance,
                     reactance=reactance)
    impedance = put("derived-impedance", place, steps.magnitude_of_impedance, impedance=phasor)
    put("derived-resistance", place, steps.resistance_part, impedance=phasor)
    put("derived-reactance", place, steps.reactance_part, impedance=phasor)
    put("derived-quality-factor", place, phasors.quality_factor, reactance=Key("derived-reactance", place),
        resistance=Key("derived-resistance", place))
    if not plan.has(f"{place}.rated_voltage"):
        return
    volts = plan.datum(f"{place}.rated_voltage")
    current = put("derived-current", place, steps.current_through, voltage=volts, impedance=impedance)
    watts = put("derived-active-power", place, power_factor.active_power, current=current,
                resistance=Key("derived-resistance", place))
    demand = put("derived-apparent-power", place, power_factor.apparent_power, voltage=volts, current=current)
    put("derived-power-factor", place, power_factor.power_factor, active=watts, apparent=demand)
