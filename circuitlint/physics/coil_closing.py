"""Whether a coil pulls in, holds and lets go: voltage per hertz, hot pull-in, long control cables."""

from __future__ import annotations

import numpy as np

from circuitlint.physics.formula import formula
from circuitlint.si import (
    Celsius,
    Farad,
    FaradPerMetre,
    Hertz,
    Kelvin,
    Metre,
    Ohm,
    OhmPerMetre,
    Ratio,
    Volt,
    VoltAmpere,
    VoltPerHertz,
)
from circuitlint.sources import Source

HOT_PULL_IN = Source("relay makers' technical pages", "coil temperature and pull-in voltage")
EQUAL_FLUX = Source("peak flux goes with voltage over frequency", known="derived")
FORCE = Source("magnetic force goes with the square of the flux", known="derived")
HOLD_IN = Source("control cable note", "longest control cable that still lets a contactor drop out")
HOLD_IN_EXACT = Source("winding resistance kept in the series circuit of cable and coil", known="derived")
CLOSING_CABLE = Source("contactor manual", "longest control cable for closing")
TRANSFORMER = Source("control-transformer selection guides", "sealed and inrush demand")


@formula(
    "Uh",
    "{U1} · ({k} + {ϑ}) / ({k} + {ϑ1})",
    source=HOT_PULL_IN,
    validity="direct current: the ampere-turns of pull-in stay the same",
    pull_in_voltage="U1",
    temperature="ϑ",
    reference_temperature="ϑ1",
    inferred_zero="k",
)
def hot_pull_in_voltage(
    *, pull_in_voltage: Volt, temperature: Celsius, reference_temperature: Celsius, inferred_zero: Kelvin
) -> Volt:
    """Uh = U1 · (k + ϑ) / (k + ϑ1)"""
    return pull_in_voltage * (inferred_zero + temperature) / (inferred_zero + reference_temperature)


@formula(
    "U/f",
    "{U} / {f}",
    source=EQUAL_FLUX,
    validity="sinusoidal voltage, winding resistance small",
    voltage="U",
    frequency="f",
)
def volts_per_hertz(*, voltage: Volt, frequency: Hertz) -> VoltPerHertz:
    """U/f = U / f"""
    return voltage / frequency


@formula(
    "b",
    "({U} / {f}) / ({Ur} / {fr})",
    source=EQUAL_FLUX,
    validity="sinusoidal voltage, winding resistance small",
    voltage="U",
    frequency="f",
    rated_voltage="Ur",
    rated_frequency="fr",
)
def flux_ratio(*, voltage: Volt, frequency: Hertz, rated_voltage: Volt, rated_frequency: Hertz) -> Ratio:
    """b = (U / f) / (Ur / fr)"""
    return (voltage / frequency) / (rated_voltage / rated_frequency)


@formula("F/Fr", "{b}²", source=FORCE, validity="unsaturated core, same gap", flux="b")
def force_ratio(*, flux: Ratio) -> Ratio:
    """F/Fr = b²"""
    return flux**2


@formula(
    "C",
    "{m} / (1 + {m}) · {S} / (2π · {f} · {U}²)",
    source=HOLD_IN,
    validity="coil taken as pure reactance, one capacitance across the open contact, below resonance",
    drop_out_share="m",
    hold_power="S",
    frequency="f",
    voltage="U",
)
def hold_in_capacitance(*, drop_out_share: Ratio, hold_power: VoltAmpere, frequency: Hertz, voltage: Volt) -> Farad:
    """C = m / (1 + m) · S / (2π · f · U²)"""
    return drop_out_share / (1.0 + drop_out_share) * hold_power / (2.0 * np.pi * frequency * voltage**2)


@formula(
    "C",
    "1 / (2π · {f} · (√({Z}² − {R}²) + √({Z}² / {m}² − {R}²)))",
    source=HOLD_IN_EXACT,
    validity="coil of steady resistance and reactance, below resonance",
    drop_out_share="m",
    impedance="Z",
    resistance="R",
    frequency="f",
)
def hold_in_capacitance_with_resistance(*, drop_out_share: Ratio, impedance: Ohm, resistance: Ohm, frequency: Hertz) -> Farad:
    """C = 1 / (2π · f · (√(Z² − R²) + √(Z² / m² − R²)))"""
    reactance = np.sqrt(impedance**2 - resistance**2)
    needed = reactance + np.sqrt((impedance / drop_out_share) ** 2 - resistance**2)
    return 1.0 / (2.0 * np.pi * frequency * needed)


@formula(
    "l",
    "{C} / {C'}",
    source=HOLD_IN,
    validity="capacitance that goes with length",
    capacitance="C",
    capacitance_per_length="C'",
)
def hold_in_length(*, capacitance: Farad, capacitance_per_length: FaradPerMetre) -> Metre:
    """l = C / C'"""
    return capacitance / capacitance_per_length


@formula("m", "{Ud} / {U}", source=HOLD_IN, validity="at the highest supply voltage", drop_out_voltage="Ud", voltage="U")
def drop_out_share(*, drop_out_voltage: Volt, voltage: Volt) -> Ratio:
    """m = Ud / U"""
    return drop_out_voltage / voltage


@formula(
    "l",
    "{u} · {U}² / (2 · {R'} · {S} · {cosφ})",
    source=CLOSING_CABLE,
    validity="two conductors, reactance of the cable left out",
    share="u",
    voltage="U",
    resistance_per_length="R'",
    closing_power="S",
    power_factor="cosφ",
)
def closing_length(
    *, share: Ratio, voltage: Volt, resistance_per_length: OhmPerMetre, closing_power: VoltAmpere, power_factor: Ratio
) -> Metre:
    """l = u · U² / (2 · R' · S · cosφ)"""
    return share * voltage**2 / (2.0 * resistance_per_length * closing_power * power_factor)


@formula(
    "S",
    "√({Sh}² + {Si}²)",
    source=TRANSFORMER,
    validity="the plain sum is the cautious form",
    sealed_power="Sh",
    inrush_power="Si",
)
def transformer_demand(*, sealed_power: VoltAmpere, inrush_power: VoltAmpere) -> VoltAmpere:
    """S = √(Sh² + Si²)"""
    return np.hypot(sealed_power, inrush_power)
