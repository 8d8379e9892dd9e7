"""From readings to resistance, reactance, power factor and loss: one model for each set of quantities at hand.

Every model takes arrays by name and gives arrays by name, so that it serves one value, its differences and its draws alike.
A draw that is not physical, such as a power above volts times amperes, comes out as NaN and is counted as lost.
"""

from __future__ import annotations

from collections.abc import Callable, Mapping, Set
from dataclasses import dataclass
from typing import TypeAlias

import numpy as np

from circuitlint.physics.metering import power_factor_of_three_voltages
from circuitlint.si import RealArray
from circuitlint.sources import Source

Values: TypeAlias = Mapping[str, RealArray]
Model: TypeAlias = Callable[[Values], dict[str, RealArray]]

SIMULTANEOUS = Source("JCGM 100", "H.2, simultaneous resistance and reactance", "2008")
SEPARATION = Source("impedance, wattmeter and direct-current resistance of a coil with core loss", known="derived")
REFERENCE = 20.0


@dataclass(frozen=True, slots=True)
class Method:
    """How results follow from readings: name, what is put in, and what the reader must know."""

    name: str
    notes: tuple[str, ...]
    model: Model


AS_READ = {"frequency": "frequency", "bridge_inductance": "bridge-inductance", "loop_impedance": "loop-impedance",
           "temperature": "temperature", "voltage": "voltage", "current": "current", "power": "active-power",
           "power_factor": "power-factor", "phase_angle": "impedance-angle"}
"""Quantities that are results themselves where no fuller method takes them in, and the name of the result."""


def method_for(given: Set[str], direct: bool, ahead: bool) -> Method:
    """The fullest method that the quantities at hand allow; what no method takes in is given as read.

    `given` holds names of inputs: quantities read, and corrections (`burden`, `voltmeter`, `leads`). `direct` is direct
    current; `ahead` has the voltmeter ahead of the ammeter.
    """
    notes: list[str] = []
    models: list[Model] = []
    names: list[str] = []
    if "resistance" in given:
        models.append(_winding(given))
        names.append("direct-current resistance")
    if {"total_voltage", "resistor_voltage", "coil_voltage", "series_resistor"} <= given:
        models.append(_three_voltages)
        names.append("three voltages")
    elif {"voltage", "current"} <= given:
        name, model, told = _volts_and_amperes(given, direct, ahead)
        models.append(model)
        names.append(name)
        notes += told

    def joined(values: Values) -> dict[str, RealArray]:
        made: dict[str, RealArray] = {}
        for model in models:
            made.update(model({**values, **{name: one for name, one in made.items() if name not in values}}))
        _finish(made, values, direct)
        for name, result in AS_READ.items():
            if name in values and result not in made:
                made[result] = values[name]
        return made

    return Method("; ".join(names) or "as read", tuple(notes), joined)


def _winding(given: Set[str]) -> Model:
    def model(v: Values) -> dict[str, RealArray]:
        resistance = v["resistance"] - v["leads"] if "leads" in v else v["resistance"]
        made = {"direct-current-resistance": resistance}
        if "winding_temperature" in v and "inferred_zero" in v:
            zero = v["inferred_zero"]
            made["reference-resistance"] = resistance * (zero + REFERENCE) / (zero + v["winding_temperature"])
        return made

    return model


def _three_voltages(v: Values) -> dict[str, RealArray]:
    current = v["resistor_voltage"] / v["series_resistor"]
    cosine = np.asarray(power_factor_of_three_voltages(
        total_voltage=v["total_voltage"], resistor_voltage=v["resistor_voltage"], coil_voltage=v["coil_voltage"]))
    return {"voltage": v["coil_voltage"], "current": current, **_of_impedance(v["coil_voltage"] / current, np.arccos(cosine))}


def _volts_and_amperes(given: Set[str], direct: bool, ahead: bool) -> tuple[str, Model, list[str]]:
    if direct:
        return "voltage and current", _direct(ahead), []
    if "phase_angle" in given:
        return "voltage, current, phase angle", _phasor(lambda v: v["phase_angle"], ahead), []
    lag = ["the power factor does not say which way it goes: taken as lagging"]
    if "power" in given:
        return ("voltage, current, power",
                _phasor(lambda v: np.arccos(v["power"] / (v["voltage"] * v["current"])), ahead), lag)
    if "power_factor" in given:
        return "voltage, current, power factor", _phasor(lambda v: np.arccos(v["power_factor"]), ahead), lag
    if "resistance" in given or "known_resistance" in given:
        notes = ["no power was read: core loss is taken as nothing, so that reactance comes out too high where there is some"]
        return "voltage, current, direct-current resistance", _by_resistance(ahead), notes
    return "voltage and current", _magnitude(ahead), ["neither power, angle nor resistance was read: impedance only"]


def _phasor(angle: Callable[[Values], RealArray], ahead: bool) -> Model:
    def model(v: Values) -> dict[str, RealArray]:
        impedance = v["voltage"] / v["current"] * np.exp(1j * angle(v))
        if ahead and "burden" in v:
            impedance = impedance - v["burden"]
        if not ahead and "voltmeter" in v:
            impedance = 1.0 / (1.0 / impedance - 1.0 / v["voltmeter"])
        current = v["current"]
        voltage = v["voltage"]
        if ahead and "burden" in v:
            voltage = current * np.abs(impedance)
        if not ahead and "voltmeter" in v:
            current = voltage / np.abs(impedance)
        return {"voltage": voltage, "current": current, **_of_impedance(np.abs(impedance), np.angle(impedance))}

    return model


def _of_impedance(size: RealArray, angle: RealArray) -> dict[str, RealArray]:
    return {"resistance": size * np.cos(angle), "reactance": size * np.sin(angle), "impedance": size,
            "impedance-angle": angle, "power-factor": np.cos(angle)}


def _by_resistance(ahead: bool) -> Model:
    def model(v: Values) -> dict[str, RealArray]:
        own = v["known_resistance"] if "known_resistance" in v else v["direct-current-resistance"]
        burden = v["burden"] if ahead and "burden" in v else 0.0
        size = v["voltage"] / v["current"]
        reactance = np.sqrt(size**2 - (own + burden) ** 2)
        impedance = np.hypot(own, reactance)
        return {"voltage": v["current"] * impedance if ahead and "burden" in v else v["voltage"], "current": v["current"],
                **_of_impedance(impedance, np.arctan2(reactance, own))}

    return model


def _magnitude(ahead: bool) -> Model:
    def model(v: Values) -> dict[str, RealArray]:
        return {"voltage": v["voltage"], "current": v["current"], "impedance": v["voltage"] / v["current"]}

    return model


def _direct(ahead: bool) -> Model:
    def model(v: Values) -> dict[str, RealArray]:
        voltage, current = v["voltage"], v["current"]
        if ahead and "burden" in v:
            voltage = voltage - current * v["burden"]
        if not ahead and "voltmeter" in v:
            current = current - voltage / v["voltmeter"]
        return {"voltage": voltage, "current": current, "resistance": voltage / current, "impedance": voltage / current,
                "active-power": voltage * current}

    return model


def _finish(made: dict[str, RealArray], values: Values, direct: bool) -> None:
    """Powers, inductance, core loss and winding temperature, each where its data are there."""
    if {"voltage", "current"} <= set(made) and not direct:
        made["apparent-power"] = made["voltage"] * made["current"]
        if "power-factor" in made:
            made["active-power"] = made["apparent-power"] * made["power-factor"]
            made["reactive-power"] = made["apparent-power"] * np.sin(made["impedance-angle"])
    if "reactance" in made and "frequency" in values:
        made["inductance"] = made["reactance"] / (2.0 * np.pi * values["frequency"])
    if "core_split" in values and {"resistance", "reactance"} <= set(made):
        _split_core(made, values["known_resistance"] if "known_resistance" in values else made["direct-current-resistance"],
                    values)
    if "cold_resistance" in values and "inferred_zero" in values:
        hot = made.get("direct-current-resistance", made.get("resistance"))
        if hot is not None:
            zero = values["inferred_zero"]
            made["winding-temperature"] = (zero + values["cold_temperature"]) * hot / values["cold_resistance"] - zero


def _split_core(made: dict[str, RealArray], winding: RealArray, values: Values) -> None:
    """Z = R + 1 / (1/Rc + 1/jX): what is left of the impedance beyond the winding, as a core resistance across an inductance."""
    rest = (made["resistance"] - winding) + 1j * made["reactance"]
    admittance = 1.0 / rest
    made["core-loss"] = made["current"] ** 2 * (made["resistance"] - winding)
    made["core-conductance"] = admittance.real
    made["magnetising-reactance"] = -1.0 / admittance.imag
    if "frequency" in values:
        made["inductance"] = made["magnetising-reactance"] / (2.0 * np.pi * values["frequency"])
