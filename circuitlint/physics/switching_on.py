"""The first moments after closing: build-up, the crest of the first wave, stored energy."""

from __future__ import annotations

import numpy as np

from circuitlint.physics.formula import formula
from circuitlint.si import Ampere, Henry, Hertz, Joule, Ohm, Radian, Ratio, Real, Second, Volt
from circuitlint.sources import Source

BUILD_UP = Source("OpenStax University Physics vol. 2", "14.4 RL Circuits")
ENERGY = Source("OpenStax University Physics vol. 2", "14.3 Energy in a Magnetic Field")
CLOSING = Source("Handbook of Electrical Engineering (Sheldrake, Wiley 2003)", "ch. 11, eq. 11.5")
EXACT_PEAK = Source("largest value of that current over all closing angles, at voltage zero", known="derived",
                    note="checked by brute force over all angles; the fitted factor of IEC 60909-0 lies within 2 % of it")


@formula("T", "{L} / {R}", source=BUILD_UP, validity="one resistance and one inductance in series", inductance="L",
         resistance="R")
def time_constant(*, inductance: Henry, resistance: Ohm) -> Second:
    """T = L / R"""
    return inductance / resistance


@formula("E", "{L} · {I}² / 2", source=ENERGY, validity="inductance that does not fall with current", inductance="L", current="I")
def stored_energy(*, inductance: Henry, current: Ampere) -> Joule:
    """E = L · I² / 2"""
    return inductance * current**2 / 2.0


@formula("I", "{U} / {R}", source=BUILD_UP, validity="direct current, settled", voltage="U", resistance="R")
def direct_current(*, voltage: Volt, resistance: Ohm) -> Ampere:
    """I = U / R"""
    return voltage / resistance


@formula("i", "{I} · (1 − exp(−{t} / {T}))", source=BUILD_UP, validity="one resistance and one inductance in series, from zero",
         time="t", final="I", time_constant="T")
def current_build_up(*, time: Second, final: Ampere, time_constant: Second) -> Ampere:
    """i = I · (1 − exp(−t / T))"""
    return -final * np.expm1(-time / time_constant)


@formula("i", "{I} · exp(−{t} / {T})", source=BUILD_UP, validity="one resistance and one inductance, no source", time="t",
         initial="I", time_constant="T")
def current_decay(*, time: Second, initial: Ampere, time_constant: Second) -> Ampere:
    """i = I · exp(−t / T)"""
    return initial * np.exp(-time / time_constant)


@formula(
    "i", "√2 · {U} / Z · (sin(ω · {t} + {θ} − φ) − exp(−{R} · {t} / {L}) · sin({θ} − φ)) with ω = 2π · {f}, Z = |{R} + jω{L}|, "
    "φ = arg({R} + jω{L})",
    source=CLOSING, validity="linear resistance and inductance in series, from zero current", time="t", voltage_rms="U",
    frequency="f", resistance="R", inductance="L", closing_angle="θ",
)
def switch_on_current(
    *, time: Second, voltage_rms: Volt, frequency: Hertz, resistance: Ohm, inductance: Henry, closing_angle: Radian
) -> Ampere:
    """i = √2 · U / Z · (sin(ωt + θ − φ) − exp(−R t / L) · sin(θ − φ))"""
    omega = 2.0 * np.pi * frequency
    impedance = resistance + 1j * omega * inductance
    shift = closing_angle - np.angle(impedance)
    fading = np.exp(-resistance * time / inductance) * np.sin(shift)
    crest: Ampere = np.sqrt(2.0) * voltage_rms / np.abs(impedance) * (np.sin(omega * time + shift) - fading)
    return crest


SQRT_2 = float(np.sqrt(2.0))


def _factor(resistance: Real, reactance: Real) -> Real:
    """Peak over the crest of the settled current, from the exact root of its time of occurrence.

    With x = ωt the current peaks where cos(x − φ) = cos φ · exp(−x R / X); the first root beyond π/2 lies below π/2 + φ.
    Bisection brings the bracket close enough for Newton's steps to converge. NaN where the reactance is capacitive.
    """
    inductive = np.greater(reactance, 0.0)
    ratio = np.divide(resistance, np.where(inductive, reactance, 1.0))
    angle = np.arctan2(reactance, resistance)
    low = np.full(np.shape(angle), np.pi / 2.0)
    high = np.pi / 2.0 + angle
    for _ in range(8):
        middle = (low + high) / 2.0
        rising = np.cos(middle - angle) > np.cos(angle) * np.exp(-middle * ratio)
        low, high = np.where(rising, middle, low), np.where(rising, high, middle)
    at = (low + high) / 2.0
    for _ in range(4):
        fading = np.cos(angle) * np.exp(-at * ratio)
        slope = ratio * fading - np.sin(at - angle)
        step = (np.cos(at - angle) - fading) / np.where(slope != 0.0, slope, 1.0)
        at = np.clip(at - step, low, high)
    factor = np.sin(at - angle) + np.exp(-at * ratio) * np.sin(angle)
    return np.where(inductive, np.maximum(factor, 1.0), np.where(np.equal(reactance, 0.0), 1.0, np.nan))


@formula(
    "κ", "sin(x − φ) + exp(−x · {R} / {X}) · sin φ, cos(x − φ) = cos φ · exp(−x · {R} / {X}), tan φ = {X} / {R}",
    source=EXACT_PEAK, validity="linear: an iron core with remanence can exceed it several times", resistance="R", reactance="X",
)
def switch_on_factor(*, resistance: Ohm, reactance: Ohm) -> Ratio:
    """κ = sin(x − φ) + exp(−x R / X) · sin φ at the first root x of cos(x − φ) = cos φ · exp(−x R / X) beyond π/2"""
    return _factor(resistance, reactance)


@formula(
    "ip", "√2 · κ · {I}, κ from R / X = {R} / {X} at the exact root", source=EXACT_PEAK,
    validity="linear: an iron core with remanence can exceed it several times", current_rms="I", resistance="R", reactance="X",
)
def switch_on_peak(*, current_rms: Ampere, resistance: Ohm, reactance: Ohm) -> Ampere:
    """ip = √2 · κ · I"""
    return SQRT_2 * _factor(resistance, reactance) * current_rms
