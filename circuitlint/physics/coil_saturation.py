"""Inductance that falls with current: chord for currents and energy bounds, slope for transients."""

from __future__ import annotations

import numpy as np

from circuitlint.physics.dimensions import Weber
from circuitlint.physics.formula import formula
from circuitlint.si import Ampere, Henry, Joule, Ratio
from circuitlint.sources import Source

CURVE = Source(
    "flux linkage that bends over at a saturation current",
    known="common practice",
    note="a curve fitted to a core, not a law",
)
SLOPE = Source("slope of that flux linkage", known="derived")
ENERGY = Source("integral of current over flux linkage", known="derived")
BEND = "no hysteresis; the curve fitted to the core"


@formula(
    "L",
    "{L0} / (1 + ({I} / {Is})^{n})",
    source=CURVE,
    validity="chord inductance, flux linkage over current; fitted to the core",
    unsaturated_inductance="L0",
    current="I",
    saturation_current="Is",
    exponent="n",
)
def chord_inductance(*, unsaturated_inductance: Henry, current: Ampere, saturation_current: Ampere, exponent: Ratio) -> Henry:
    """L = L0 / (1 + (I / Is)^n)"""
    return unsaturated_inductance / (1.0 + (current / saturation_current) ** exponent)


@formula(
    "ψ",
    "{Le} · {I} + {ψs} · tanh({I} · ({L0} − {Le}) / {ψs})",
    source=CURVE,
    validity=BEND,
    current="I",
    unsaturated_inductance="L0",
    saturated_inductance="Le",
    saturation_flux="ψs",
)
def flux_linkage(*, current: Ampere, unsaturated_inductance: Henry, saturated_inductance: Henry, saturation_flux: Weber) -> Weber:
    """ψ = Le · I + ψs · tanh(I · (L0 − Le) / ψs)"""
    bend = current * (unsaturated_inductance - saturated_inductance) / saturation_flux
    return saturated_inductance * current + saturation_flux * np.tanh(bend)


@formula(
    "Ld",
    "{Le} + ({L0} − {Le}) / cosh({I} · ({L0} − {Le}) / {ψs})²",
    source=SLOPE,
    validity=BEND,
    current="I",
    unsaturated_inductance="L0",
    saturated_inductance="Le",
    saturation_flux="ψs",
)
def slope_inductance(
    *, current: Ampere, unsaturated_inductance: Henry, saturated_inductance: Henry, saturation_flux: Weber
) -> Henry:
    """Ld = Le + (L0 − Le) / cosh(I · (L0 − Le) / ψs)²"""
    excess = unsaturated_inductance - saturated_inductance
    return saturated_inductance + excess * (1.0 - np.tanh(current * excess / saturation_flux) ** 2)


@formula(
    "E",
    "{Le} · {I}² / 2 + {ψs} · {I} · tanh(b) − {ψs}² / ({L0} − {Le}) · ln(cosh(b)) with b = {I} · ({L0} − {Le}) / {ψs}",
    source=ENERGY,
    validity=f"{BEND}; some saturation",
    current="I",
    unsaturated_inductance="L0",
    saturated_inductance="Le",
    saturation_flux="ψs",
)
def saturated_energy(
    *, current: Ampere, unsaturated_inductance: Henry, saturated_inductance: Henry, saturation_flux: Weber
) -> Joule:
    """E = Le · I² / 2 + ψs · I · tanh(b) − ψs² / (L0 − Le) · ln(cosh(b))"""
    excess = unsaturated_inductance - saturated_inductance
    bend = np.abs(current * excess / saturation_flux)
    # ln(cosh b) without overflow and without losing digits near zero
    log_cosh = np.where(
        bend < 1.0,
        np.log1p(2.0 * np.sinh(np.minimum(bend, 1.0) / 2.0) ** 2),
        bend + np.log1p(np.exp(-2.0 * bend)) - np.log(2.0),
    )
    linear = saturated_inductance * current**2 / 2.0
    return linear + saturation_flux**2 / excess * (bend * np.tanh(bend) - log_cosh)
