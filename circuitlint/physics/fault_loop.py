"""The loop a fault current flows in, how long it may last, and what the conductor withstands."""

from __future__ import annotations

import numpy as np

from circuitlint.physics.dimensions import AmpereRootSecondPerSquareMetre, JoulePerKelvinCubicMetre, OhmMetre
from circuitlint.physics.formula import formula
from circuitlint.si import Ampere, AmpereSquaredSecond, Celsius, Kelvin, Ohm, Ratio, Second, SquareMetre, Volt
from circuitlint.sources import Source

LOOP = Source("IEC 60364-4-41", "411.4.4", note="read in training texts; the voltage factor is a value from memory")
TOUCH = Source("Handbook of Electrical Engineering (Sheldrake, Wiley 2003)", "ch. 9, p. 241")
ADIABATIC = Source(
    "IEC 60364-4-43",
    "434.5.2",
    "2008",
    known="value from memory",
    note="worked in Basic Electrical Installation Work (T. Linsley), p. 250, read",
)
CONSTANT = Source("IEC 60364-5-54", "annex A", known="value from memory", note="its constants read")
COLD = Source("cold measurement of a loop that will be hot", known="common practice")


@formula(
    "I",
    "{c} · {U0} / {Zs}",
    source=LOOP,
    validity="magnitudes; hot loop for the smallest current",
    voltage_factor="c",
    voltage="U0",
    loop_impedance="Zs",
)
def fault_current(*, voltage_factor: Ratio, voltage: Volt, loop_impedance: Ohm) -> Ampere:
    """I = c · U0 / Zs"""
    return voltage_factor * voltage / loop_impedance


@formula(
    "Zs",
    "{c} · {U0} / {Ia}",
    source=LOOP,
    validity="hot loop; current that operates the device in the time demanded",
    voltage_factor="c",
    voltage="U0",
    operating_current="Ia",
)
def largest_loop_impedance(*, voltage_factor: Ratio, voltage: Volt, operating_current: Ampere) -> Ohm:
    """Zs = c · U0 / Ia"""
    return voltage_factor * voltage / operating_current


@formula(
    "Zm",
    "{r} · {Zs}",
    source=COLD,
    validity="not together with another allowance for heating",
    cold_share="r",
    loop_impedance="Zs",
)
def largest_cold_reading(*, cold_share: Ratio, loop_impedance: Ohm) -> Ohm:
    """Zm = r · Zs"""
    return cold_share * loop_impedance


@formula(
    "Ut",
    "{U0} · {Zp} / {Zs}",
    source=TOUCH,
    validity="magnitudes; return path mostly resistive",
    voltage="U0",
    return_impedance="Zp",
    loop_impedance="Zs",
)
def touch_voltage(*, voltage: Volt, return_impedance: Ohm, loop_impedance: Ohm) -> Volt:
    """Ut = U0 · Zp / Zs"""
    return voltage * return_impedance / loop_impedance


@formula(
    "k",
    "√({Q} · ({B} + 20) / {ρ} · ln(({B} + {ϑf}) / ({B} + {ϑi})))",
    source=CONSTANT,
    validity="no heat leaves the metal",
    volumetric_heat="Q",
    resistivity_20="ρ",
    inferred_zero="B",
    initial="ϑi",
    final="ϑf",
)
def withstand_constant(
    *,
    volumetric_heat: JoulePerKelvinCubicMetre,
    resistivity_20: OhmMetre,
    inferred_zero: Kelvin,
    initial: Celsius,
    final: Celsius,
) -> AmpereRootSecondPerSquareMetre:
    """k = √(Q · (B + 20) / ρ · ln((B + ϑf) / (B + ϑi)))"""
    rise = np.log((inferred_zero + final) / (inferred_zero + initial))
    return np.sqrt(volumetric_heat * (inferred_zero + 20.0) / resistivity_20 * rise)


@formula("S", "{I} · √({t}) / {k}", source=ADIABATIC, validity="0.1 s to 5 s", current="I", time="t", constant="k")
def smallest_section(*, current: Ampere, time: Second, constant: AmpereRootSecondPerSquareMetre) -> SquareMetre:
    """S = I · √(t) / k"""
    return current * np.sqrt(time) / constant


@formula("t", "({k} · {S} / {I})²", source=ADIABATIC, validity="0.1 s to 5 s", constant="k", section="S", current="I")
def withstand_time(*, constant: AmpereRootSecondPerSquareMetre, section: SquareMetre, current: Ampere) -> Second:
    """t = (k · S / I)²"""
    return (constant * section / current) ** 2


@formula(
    "k²S²",
    "{k}² · {S}²",
    source=ADIABATIC,
    validity="below 0.1 s, against the let-through of the device",
    constant="k",
    section="S",
)
def withstand_energy(*, constant: AmpereRootSecondPerSquareMetre, section: SquareMetre) -> AmpereSquaredSecond:
    """k²S² = k² · S²"""
    return constant**2 * section**2


@formula("I²t", "{I}² · {t}", source=ADIABATIC, validity="symmetrical current, 0.1 s and more", current="I", time="t")
def let_through(*, current: Ampere, time: Second) -> AmpereSquaredSecond:
    """I²t = I² · t"""
    return current**2 * time
