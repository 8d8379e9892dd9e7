"""Inductance at a working current, from a law or a table that the definition states for one core.

These laws are fits to one core, stated by the definition with their source, so they stand beside the formulas of the trade,
not among them. Each comes twice: bounded, for the search of the current that agrees with its own inductance, and told, which
is NaN where the law or the table does not reach. On alternating current a chord inductance belongs to the rms current; a
differential one is averaged from zero to the crest.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any, Literal

import numpy as np

from circuitlint.physics.formula import Formula
from circuitlint.si import INDUCTANCE, RealArray
from circuitlint.sources import Source

Measured = Literal["chord", "differential"]
NODES, WEIGHTS = (np.asarray(one) for one in np.polynomial.legendre.leggauss(24))
STATED = Source("inductance against current as the definition states it for this core", known="derived")
CREST = float(np.sqrt(2.0))


def bent_chord(unsaturated: Any, share: Any, exponent: Any, told: bool) -> RealArray:
    """L0 / (1 + xⁿ) with x = I / Is, up to where the flux linkage L · I is largest; beyond, held there or NaN."""
    power = share**exponent
    most = np.where(exponent > 1.0, 1.0 / np.where(exponent > 1.0, exponent - 1.0, 1.0), np.inf)
    held = np.where(power < most, power, np.nan) if told else np.minimum(power, most)
    inductance: RealArray = unsaturated / (1.0 + held)
    return inductance


def bent_mean(unsaturated: Any, share: Any, exponent: Any) -> RealArray:
    """Mean of L0 / (1 + xⁿ) over x from 0 to the share: the chord of a differential inductance of that form.

    Gauss-Legendre on both sides of x = 1, beyond it over ln x, where the law falls as a power.
    """
    share = np.asarray(share, dtype=float)
    below = np.minimum(share, 1.0)
    beyond = np.log(np.maximum(share, 1.0))
    area: Any = 0.0
    for node, weight in zip((NODES + 1.0) / 2.0, WEIGHTS / 2.0, strict=True):
        area = area + weight * below / (1.0 + (below * node) ** exponent)
        x = np.exp(beyond * node)
        area = area + weight * beyond * x / (1.0 + x**exponent)
    mean: RealArray = unsaturated * np.where(share > 0.0, area / np.where(share > 0.0, share, 1.0), 1.0)
    return mean


def tabled_chord(current: Any, currents: tuple[Any, ...], inductances: tuple[Any, ...]) -> RealArray:
    """Straight between the points of a table, its ends held beyond them."""
    found = np.asarray(inductances[0] + 0.0 * current)
    for at in range(len(currents) - 1):
        share = np.clip((current - currents[at]) / (currents[at + 1] - currents[at]), 0.0, 1.0)
        found = found + share * (inductances[at + 1] - inductances[at])
    return found


def tabled_mean(current: Any, currents: tuple[Any, ...], inductances: tuple[Any, ...]) -> RealArray:
    """Mean from zero to a current of a table drawn straight between its points, its ends held before and beyond them."""
    area: Any = np.minimum(current, currents[0]) * inductances[0]
    for at in range(len(currents) - 1):
        width = currents[at + 1] - currents[at]
        share = np.clip((current - currents[at]) / width, 0.0, 1.0)
        area = area + width * share * (inductances[at] + share / 2.0 * (inductances[at + 1] - inductances[at]))
    area = area + np.maximum(current - currents[-1], 0.0) * inductances[-1]
    mean: RealArray = np.where(current > 0.0, area / np.where(current > 0.0, current, 1.0), inductances[0])
    return mean


@dataclass(frozen=True, slots=True)
class BentLaw:
    """Inductance by the two-parameter law."""

    measured: Measured
    alternating: bool
    told: bool

    def __call__(self, *, unsaturated_inductance: Any, current: Any, saturation_current: Any, exponent: Any) -> RealArray:
        """L = L0 / (1 + (I / Is)^n), or its mean from zero to the crest"""
        share = current / saturation_current
        if self.measured == "chord":
            return bent_chord(unsaturated_inductance, share, exponent, self.told)
        return bent_mean(unsaturated_inductance, share * (CREST if self.alternating else 1.0), exponent)


@dataclass(frozen=True, slots=True)
class TabledLaw:
    """Inductance by a table."""

    measured: Measured
    alternating: bool
    told: bool

    def __call__(self, *, current: Any, currents: tuple[Any, ...], inductances: tuple[Any, ...]) -> RealArray:
        """L = the table at I, or its mean from zero to the crest"""
        at = current * (CREST if self.measured == "differential" and self.alternating else 1.0)
        mean = self.measured == "differential"
        found = tabled_mean(at, currents, inductances) if mean else tabled_chord(at, currents, inductances)
        if not self.told:
            return found
        reached = at <= currents[-1] if mean else (at >= currents[0]) & (at <= currents[-1])
        inductance: RealArray = np.where(reached, found, np.nan)
        return inductance


def by_law(measured: Measured, alternating: bool, told: bool) -> Formula[..., Any]:
    """The formula of the two-parameter law: `unsaturated_inductance`, `current`, `saturation_current`, `exponent`."""
    if measured == "chord":
        equation = "{L0} / (1 + ({I} / {Is})^{n})"
        where = "up to where the flux linkage is largest, (I / Is)^n below 1 / (n − 1)"
    else:
        crest = "√2 · " if alternating else ""
        equation = f"mean over i of {{L0}} / (1 + (i / {{Is}})^{{n}}), i from 0 to {crest}{{I}}"
        where = "no hysteresis"
    return Formula(
        "inductance-by-law", "L", equation,
        {"unsaturated_inductance": "L0", "current": "I", "saturation_current": "Is", "exponent": "n"}, STATED,
        f"fitted to this core; {where}", BentLaw(measured, alternating, told), INDUCTANCE,
    )


def by_table(measured: Measured, alternating: bool, told: bool) -> Formula[..., Any]:
    """The formula of a table: `current`, and the tuples `currents` (rising) and `inductances` (not rising)."""
    if measured == "chord":
        equation, where = "{Lk} at {I}, straight between the currents {Ik}", "within the table's currents"
    else:
        crest = "√2 · " if alternating else ""
        equation = f"mean of {{Lk}} from 0 to {crest}{{I}}, straight between the currents {{Ik}}"
        where = "up to the table's last current; below its first the first inductance"
    return Formula("inductance-by-table", "L", equation, {"current": "I", "currents": "Ik", "inductances": "Lk"}, STATED, where,
                   TabledLaw(measured, alternating, told), INDUCTANCE)
