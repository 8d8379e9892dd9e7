"""A bank of equal holding magnets: strings of magnets in series, the strings in parallel."""

from __future__ import annotations

import numpy as np

from circuitlint.authoring import (
    RATIO,
    DataSheet,
    Entry,
    Key,
    LoadKind,
    Plan,
    Source,
    fields,
    formula,
    shipped_formula,
    si,
)

OHM = Source("equal parts in series add, equal branches in parallel share", known="derived")
FLUX = Source("force of a holding magnet goes with the square of its flux, and flux with current below saturation",
              known="common practice", note="above its rated current a magnet holds less than this says")
DECAY = Source("L · di/dt + R · i = 0 solved from the current at opening, diode drop left out", known="derived")
COUNTED = Source("the definition")


class MagnetBank(Entry):
    """A bank of equal holding magnets. What stands here is of one magnet."""

    in_series: fields.Count
    """Magnets in each string."""
    strings: fields.Count
    """Strings in parallel."""
    resistance: fields.Resistance
    inductance: fields.Inductance | None = None
    temperature: fields.Temperature | None = None
    """Of the winding in service."""
    rated_current: fields.Current | None = None
    """At which the magnet holds its rated force."""
    release_current: fields.Current | None = None
    """At which the armature falls off."""


@formula("Z", "{m} / {n} · {R}", source=OHM, validity="direct current", in_series="m", strings="n", resistance="R")
def bank_resistance(*, in_series: si.Ratio, strings: si.Ratio, resistance: si.Ohm) -> si.ComplexOhm:
    """Z = m / n · R"""
    return np.asarray(in_series / strings * resistance, dtype=np.complex128)


@formula("Z", "{m} / {n} · ({R} + j · 2π · {f} · {L})", source=OHM, validity="alternating current, linear inductance",
         in_series="m", strings="n", resistance="R", frequency="f", inductance="L")
def bank_impedance(
    *, in_series: si.Ratio, strings: si.Ratio, resistance: si.Ohm, frequency: si.Hertz, inductance: si.Henry
) -> si.ComplexOhm:
    """Z = m / n · (R + j · 2π · f · L)"""
    return np.asarray(in_series / strings * (resistance + 2j * np.pi * frequency * inductance), dtype=np.complex128)


@formula("I1", "{I} / {n}", source=OHM, validity="equal strings", current="I", strings="n")
def current_of_one_magnet(*, current: si.Ampere, strings: si.Ratio) -> si.Ampere:
    """I1 = I / n"""
    return current / strings


@formula("F/Fr", "({I1} / {Ir})²", source=FLUX, validity="armature closed, below saturation", current="I1", rated_current="Ir")
def holding_force_share(*, current: si.Ampere, rated_current: si.Ampere) -> si.Ratio:
    """F/Fr = (I1 / Ir)²"""
    return (current / rated_current) ** 2


@formula("t", "{L} / {R} · ln(max({I1} / {Ib}, 1))", source=DECAY, validity="diode across the bank, armature closed",
         inductance="L", resistance="R", current="I1", release_current="Ib")
def fall_off_time(*, inductance: si.Henry, resistance: si.Ohm, current: si.Ampere, release_current: si.Ampere) -> si.Second:
    """t = L / R · ln(max(I1 / Ib, 1))"""
    return inductance / resistance * np.log(np.maximum(current / release_current, 1.0))


class HoldingMagnetsKind(LoadKind[MagnetBank]):
    """The bank in each state, with the current, the force and the fall-off time of one magnet."""

    name = "holding_magnets"
    model = MagnetBank
    resistance_and_inductance = True

    def data(self, part: MagnetBank, place: str, into: DataSheet) -> None:
        """The plate of one magnet, and how many there are."""
        for word in ("resistance", "inductance", "temperature", "rated_current", "release_current"):
            into.state(f"{place}.{word}", getattr(part, word))
        for word, number in (("in_series", part.in_series), ("strings", part.strings)):
            into.assume(f"{place}.{word}", RATIO, float(number), float(number), float(number), COUNTED)
        into.assume(f"{place}.stated_at", si.TEMPERATURE, 20.0, 20.0, 20.0,
                    Source("resistances are stated at 20 °C unless said otherwise", known="common practice"))
        into.assume(f"{place}.inferred_zero", si.TEMPERATURE_RISE, 234.5, 234.5, 234.5,
                    Source("copper, resistance method", known="common practice"))

    def impedance(self, plan: Plan, place: str) -> Key:
        """Strings of magnets, at the temperature of the state."""
        temperature = plan.datum(f"{place}.temperature") if plan.state.hot else plan.surroundings("")
        resistance = plan.sheet.put(
            "magnet-resistance", place, shipped_formula("winding-resistance-at"), resistance=plan.datum(f"{place}.resistance"),
            temperature=temperature, reference_temperature=plan.datum(f"{place}.stated_at"),
            inferred_zero=plan.datum(f"{place}.inferred_zero"))
        in_series, strings = plan.datum(f"{place}.in_series"), plan.datum(f"{place}.strings")
        if plan.direct:
            return plan.sheet.put("impedance phasor", place, bank_resistance, figure=False, in_series=in_series,
                                  strings=strings, resistance=resistance)
        return plan.sheet.put("impedance phasor", place, bank_impedance, figure=False, in_series=in_series, strings=strings,
                              resistance=resistance, frequency=plan.frequency(), inductance=plan.datum(f"{place}.inductance"))

    def figures(self, plan: Plan, place: str) -> None:
        """Of one magnet: current, force, and how long it holds on after the bank is switched off."""
        current = plan.sheet.put("magnet-current", place, current_of_one_magnet, current=Key("current", place),
                                 strings=plan.datum(f"{place}.strings"))
        if plan.direct:
            plan.sheet.put("holding-force-share", place, holding_force_share, current=current,
                           rated_current=plan.datum(f"{place}.rated_current"))
            plan.sheet.put("fall-off-time", place, fall_off_time, current=current, resistance=Key("magnet-resistance", place),
                           inductance=plan.datum(f"{place}.inductance"), release_current=plan.datum(f"{place}.release_current"))
