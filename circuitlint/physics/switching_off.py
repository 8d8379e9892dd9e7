"""What a coil does to the contact that opens it, and how a suppressor holds it down."""

from __future__ import annotations

import numpy as np

from circuitlint.physics.formula import formula
from circuitlint.si import Ampere, Farad, Henry, Hertz, Joule, Ohm, Real, Second, Volt, Watt
from circuitlint.sources import Source

INDUCED = Source("OpenStax College Physics 2e", "23.9 Inductance")
LOOP = Source("loop equation L · di/dt + R · i + Uc = 0 solved from the current at opening", known="derived")
ENERGY_BALANCE = Source("energy stored in inductance and stray capacitance", known="derived")
SUPPRESSORS = Source("suppressors across inductive loads", known="common practice")
LINEAR = "inductance that does not fall with current"


@formula(
    "U",
    "{L} · {I} / {t}",
    source=INDUCED,
    validity="current falling evenly to zero",
    inductance="L",
    current="I",
    time="t",
)
def induced_voltage(*, inductance: Henry, current: Ampere, time: Second) -> Volt:
    """U = L · I / t"""
    return inductance * current / time


@formula(
    "Up",
    "{I0} · √({L} / {C})",
    source=ENERGY_BALANCE,
    validity="no suppressor, no arc, no loss: a bound; contacts arc before it is reached",
    current="I0",
    inductance="L",
    stray_capacitance="C",
)
def unsuppressed_peak(*, current: Ampere, inductance: Henry, stray_capacitance: Farad) -> Volt:
    """Up = I0 · √(L / C)"""
    return current * np.sqrt(inductance / stray_capacitance)


@formula(
    "Up",
    "{U} + {Uc}",
    source=SUPPRESSORS,
    validity="across the contact; diode, diode with Zener diode, or varistor at the current of opening",
    supply="U",
    clamp_voltage="Uc",
)
def clamped_peak(*, supply: Volt, clamp_voltage: Volt) -> Volt:
    """Up = U + Uc"""
    return supply + clamp_voltage


@formula(
    "Up",
    "{U} + {I0} · {Rp}",
    source=SUPPRESSORS,
    validity="across the contact; resistor across the coil",
    supply="U",
    current="I0",
    parallel_resistance="Rp",
)
def peak_with_resistor(*, supply: Volt, current: Ampere, parallel_resistance: Ohm) -> Volt:
    """Up = U + I0 · Rp"""
    return supply + current * parallel_resistance


@formula("T", "{L} / ({R} + {Rp})", source=LOOP, validity=LINEAR, inductance="L", resistance="R", parallel_resistance="Rp")
def time_constant_with_resistor(*, inductance: Henry, resistance: Ohm, parallel_resistance: Ohm) -> Second:
    """T = L / (R + Rp)"""
    return inductance / (resistance + parallel_resistance)


def _shape(x: Real) -> Real:
    """ln(1 + x) / x, which is 1 at zero."""
    flat = np.abs(x) < 1e-300
    return np.where(flat, 1.0, np.log1p(x) / np.where(flat, 1.0, x))


@formula(
    "t",
    "{L} / {R} · ln(({I0} + {Uc} / {R}) / ({Id} + {Uc} / {R}))",
    source=LOOP,
    validity=f"{LINEAR}; a clamp of steady voltage; drop-out current below that at opening",
    current="I0",
    drop_out_current="Id",
    clamp_voltage="Uc",
    inductance="L",
    resistance="R",
)
def release_time(*, current: Ampere, drop_out_current: Ampere, clamp_voltage: Volt, inductance: Henry, resistance: Ohm) -> Second:
    """t = L / R · ln((I0 + Uc / R) / (Id + Uc / R))

    Infinite where nothing brings the current down: no clamp voltage, and no resistance or no drop-out current.
    """
    fall = current - drop_out_current
    against = clamp_voltage + resistance * drop_out_current
    driven = against > 0.0
    slowness = fall / np.where(driven, against, 1.0)
    return np.where(driven, inductance * slowness * _shape(resistance * slowness), np.inf)


@formula(
    "i",
    "max(0 · {I0}, ({I0} + {Uc} / {R}) · exp(−{R} · {t} / {L}) − {Uc} / {R})",
    source=LOOP,
    validity=f"{LINEAR}; a clamp of steady voltage; a resistance above zero",
    time="t",
    current="I0",
    clamp_voltage="Uc",
    inductance="L",
    resistance="R",
)
def clamped_decay(*, time: Second, current: Ampere, clamp_voltage: Volt, inductance: Henry, resistance: Ohm) -> Ampere:
    """i = max(0 · I0, (I0 + Uc / R) · exp(−R · t / L) − Uc / R)"""
    held = clamp_voltage / resistance
    return np.maximum(0.0 * current, current + (current + held) * np.expm1(-resistance * time / inductance))


_SERIES = 0.02


def _share(x: Real) -> Real:
    """(x − ln(1 + x)) / x², which is 1/2 at zero; a series where the difference would lose digits."""
    small = np.abs(x) < _SERIES
    near = np.where(small, x, 0.0)
    far = np.where(small, 1.0, x)
    series = sum((-near) ** n / (n + 2.0) for n in range(9))
    return np.where(small, series, (far - np.log1p(far)) / far**2)


@formula(
    "E",
    "{Uc} · {L} / {R} · ({I0} − {Uc} / {R} · ln(1 + {I0} · {R} / {Uc}))",
    source=LOOP,
    validity=f"{LINEAR}; energy in the clamp, the rest heats the winding",
    clamp_voltage="Uc",
    inductance="L",
    resistance="R",
    current="I0",
)
def clamp_energy(*, clamp_voltage: Volt, inductance: Henry, resistance: Ohm, current: Ampere) -> Joule:
    """E = Uc · L / R · (I0 − Uc / R · ln(1 + I0 · R / Uc))

    Half L · I0² where the resistance is zero.
    """
    return inductance * current**2 * _share(current * resistance / clamp_voltage)


@formula("P", "{E} · {f}", source=SUPPRESSORS, validity="operations at an even rate", energy="E", rate="f")
def mean_clamp_power(*, energy: Joule, rate: Hertz) -> Watt:
    """P = E · f"""
    return energy * rate


@formula(
    "P",
    "{U}² / {Rp}",
    source=Source("Joule's law", known="derived"),
    validity="rms or direct voltage, while energised",
    voltage="U",
    parallel_resistance="Rp",
)
def suppressor_resistor_loss(*, voltage: Volt, parallel_resistance: Ohm) -> Watt:
    """P = U² / Rp"""
    return voltage**2 / parallel_resistance
