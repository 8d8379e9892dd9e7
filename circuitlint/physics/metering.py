"""What a meter shows, what it does to the circuit, and what follows from its readings."""

from __future__ import annotations

import numpy as np

from circuitlint.physics.formula import formula
from circuitlint.si import Ampere, Ohm, Ratio, Volt, Watt
from circuitlint.sources import Source

SPECIFICATION = Source("meter specification primer", "accuracy as share of reading plus digits")
BURDEN = Source("meter manuals", "burden voltage at full scale", note="scaled with the current: common practice")
THREE_VOLTAGES = Source("Electric Circuits", "ch. 7, fig. 7-15, three-voltage method")
CONNECTION = Source("the voltmeter's own current or the ammeter's own drop is part of the reading", known="derived")
DIRECT_PART = Source("rms of a direct and an alternating part", known="derived")


@formula(
    "a",
    "{p} · |{U}| + {n} · {r}",
    source=SPECIFICATION,
    validity="in the temperature and frequency range stated",
    reading="U",
    share="p",
    digits="n",
    resolution="r",
)
def voltage_accuracy(*, reading: Volt, share: Ratio, digits: Ratio, resolution: Volt) -> Volt:
    """a = p · |U| + n · r"""
    return share * np.abs(reading) + digits * resolution


@formula(
    "a",
    "{p} · |{I}| + {n} · {r}",
    source=SPECIFICATION,
    validity="in the temperature and frequency range stated",
    reading="I",
    share="p",
    digits="n",
    resolution="r",
)
def current_accuracy(*, reading: Ampere, share: Ratio, digits: Ratio, resolution: Ampere) -> Ampere:
    """a = p · |I| + n · r"""
    return share * np.abs(reading) + digits * resolution


@formula(
    "a",
    "{p} · |{R}| + {n} · {r}",
    source=SPECIFICATION,
    validity="in the temperature and frequency range stated",
    reading="R",
    share="p",
    digits="n",
    resolution="r",
)
def resistance_accuracy(*, reading: Ohm, share: Ratio, digits: Ratio, resolution: Ohm) -> Ohm:
    """a = p · |R| + n · r"""
    return share * np.abs(reading) + digits * resolution


@formula(
    "Ub",
    "{Uf} · {I} / {Ir}",
    source=BURDEN,
    validity="shunt of steady resistance",
    full_scale_burden="Uf",
    current="I",
    meter_range="Ir",
)
def burden_voltage(*, full_scale_burden: Volt, current: Ampere, meter_range: Ampere) -> Volt:
    """Ub = Uf · I / Ir"""
    return full_scale_burden * current / meter_range


@formula("Rb", "{Uf} / {Ir}", source=BURDEN, validity="shunt of steady resistance", full_scale_burden="Uf", meter_range="Ir")
def burden_resistance(*, full_scale_burden: Volt, meter_range: Ampere) -> Ohm:
    """Rb = Uf / Ir"""
    return full_scale_burden / meter_range


@formula(
    "I0",
    "{I} · ({R} + {Rb}) / {R}",
    source=CONNECTION,
    validity="direct current from a stiff source",
    current="I",
    resistance="R",
    burden="Rb",
)
def current_without_meter(*, current: Ampere, resistance: Ohm, burden: Ohm) -> Ampere:
    """I0 = I · (R + Rb) / R"""
    return current * (resistance + burden) / resistance


@formula(
    "U",
    "{Um} − {I} · {Rb}",
    source=CONNECTION,
    validity="direct voltage taken ahead of the ammeter",
    reading="Um",
    current="I",
    burden="Rb",
)
def voltage_less_burden(*, reading: Volt, current: Ampere, burden: Ohm) -> Volt:
    """U = Um − I · Rb"""
    return reading - current * burden


@formula(
    "P",
    "{Pm} − {U}² / {Rv}",
    source=CONNECTION,
    validity="voltage taken at the load",
    reading="Pm",
    voltage="U",
    voltmeter_resistance="Rv",
)
def power_less_voltmeter(*, reading: Watt, voltage: Volt, voltmeter_resistance: Ohm) -> Watt:
    """P = Pm − U² / Rv"""
    return reading - voltage**2 / voltmeter_resistance


@formula(
    "P",
    "{Pm} − {I}² · {Rb}",
    source=CONNECTION,
    validity="voltage taken at the source",
    reading="Pm",
    current="I",
    burden="Rb",
)
def power_less_ammeter(*, reading: Watt, current: Ampere, burden: Ohm) -> Watt:
    """P = Pm − I² · Rb"""
    return reading - current**2 * burden


@formula(
    "cosφ",
    "({Ut}² − {Us}² − {Ux}²) / (2 · {Us} · {Ux})",
    source=THREE_VOLTAGES,
    validity="known resistor in series; best where the two part voltages are alike",
    total_voltage="Ut",
    resistor_voltage="Us",
    coil_voltage="Ux",
)
def power_factor_of_three_voltages(*, total_voltage: Volt, resistor_voltage: Volt, coil_voltage: Volt) -> Ratio:
    """cosφ = (Ut² − Us² − Ux²) / (2 · Us · Ux)"""
    return (total_voltage**2 - resistor_voltage**2 - coil_voltage**2) / (2.0 * resistor_voltage * coil_voltage)


@formula(
    "I",
    "√({Id}² + {Ia}²)",
    source=DIRECT_PART,
    validity="for meters that show only the alternating part",
    direct_current="Id",
    alternating_current="Ia",
)
def rms_of_mixed_current(*, direct_current: Ampere, alternating_current: Ampere) -> Ampere:
    """I = √(Id² + Ia²)"""
    return np.hypot(direct_current, alternating_current)
