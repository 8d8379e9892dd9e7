"""A tree of resistances, inductances and capacitances as differential equations of one port.

A port holds F(s) = e·s + d + c (s·1 − A)⁻¹ b, read as an impedance or as an admittance. Sums of ports stand for parts in
series (impedances) or in parallel (admittances); the reciprocal turns one into the other. Every array may carry leading
axes, one entry for each case.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any, Literal, TypeAlias

import numpy as np

from circuitlint.si import RealArray
from circuitlint.sources import Source

STATE_SPACE = Source("state equations of a linear network; reciprocal of a port in state space", known="derived")

NetworkKind: TypeAlias = Literal["coil", "core", "resistor", "capacitor"]


@dataclass(frozen=True, slots=True)
class Branch:
    """A part of a network: `coil` (R + jX), `core` (R, X, Rc: R in series with X beside Rc), `resistor`, `capacitor`, or parts
    in `series`, in `parallel`, `several` alike in parallel, `delta` (three alike between lines, as seen from one line).

    `takes` are the positions of the numbers the part needs in the list of all of them.
    """

    kind: NetworkKind | Literal["series", "parallel", "several", "delta"]
    parts: tuple[Branch, ...] = ()
    takes: tuple[int, ...] = ()


@dataclass(frozen=True, slots=True)
class Port:
    """F(s) = e·s + d + c (s·1 − A)⁻¹ b. Shapes (..., n, n), (..., n), (..., n), (...), (...); e and d are None where absent."""

    a: RealArray
    b: RealArray
    c: RealArray
    d: RealArray | None
    e: RealArray | None


def holds_capacitor(branch: Branch) -> bool:
    """Whether a capacitor stands anywhere in the network."""
    return branch.kind == "capacitor" or any(holds_capacitor(one) for one in branch.parts)


def jumps(branch: Branch) -> bool:
    """Whether a step of voltage drives an unbounded current: capacitors alone between the terminals."""
    if branch.kind == "series":
        return all(jumps(one) for one in branch.parts)
    if branch.parts:
        return any(jumps(one) for one in branch.parts)
    return branch.kind == "capacitor"


def admittance(branch: Branch, numbers: tuple[Any, ...], omega: RealArray) -> Port:
    """The network's admittance. `numbers` are arrays of one shape; reactances hold at the angular frequency `omega`."""
    if branch.kind == "parallel":
        return _sum(tuple(admittance(one, numbers, omega) for one in branch.parts))
    if branch.kind == "several":
        return _times(admittance(branch.parts[0], numbers, omega), np.real(numbers[branch.takes[0]]))
    if branch.kind == "delta":
        return _times(admittance(branch.parts[0], numbers, omega), np.full(np.shape(omega), 3.0))
    if branch.kind == "capacitor":
        return _element(None, -1.0 / (omega * np.imag(numbers[branch.takes[0]])))
    return reciprocal(_impedance(branch, numbers, omega))


def _impedance(branch: Branch, numbers: tuple[Any, ...], omega: RealArray) -> Port:
    if branch.kind == "series":
        return _sum(tuple(_impedance(one, numbers, omega) for one in branch.parts))
    if branch.kind == "coil":
        value = numbers[branch.takes[0]]
        return _element(np.real(value), np.imag(value) / omega)
    if branch.kind == "resistor":
        return _element(np.real(numbers[branch.takes[0]]), None)
    if branch.kind == "core":
        resistance, reactance, across = (np.real(numbers[one]) for one in branch.takes)
        beside = _sum((_element(1.0 / across, None), reciprocal(_element(None, reactance / omega))))
        return _sum((_element(resistance, None), reciprocal(beside)))
    return reciprocal(admittance(branch, numbers, omega))


def _element(d: RealArray | None, e: RealArray | None) -> Port:
    shape = np.shape(np.asarray(d if d is not None else e))
    return Port(np.zeros((*shape, 0, 0)), np.zeros((*shape, 0)), np.zeros((*shape, 0)), d, e)


def _times(port: Port, factor: RealArray) -> Port:
    return Port(port.a, port.b, port.c * factor[..., None], None if port.d is None else port.d * factor,
                None if port.e is None else port.e * factor)


def _sum(ports: tuple[Port, ...]) -> Port:
    sizes = [one.a.shape[-1] for one in ports]
    a = np.zeros((*ports[0].a.shape[:-2], sum(sizes), sum(sizes)))
    at = 0
    for one, size in zip(ports, sizes, strict=True):
        a[..., at : at + size, at : at + size] = one.a
        at += size
    b, c = (np.concatenate([getattr(one, name) for one in ports], axis=-1) for name in ("b", "c"))
    ds, es = [one.d for one in ports if one.d is not None], [one.e for one in ports if one.e is not None]
    return Port(a, b, c, np.sum(ds, axis=0) if ds else None, np.sum(es, axis=0) if es else None)


def reciprocal(port: Port) -> Port:
    """1 / F(s) in state space. Which of the three forms holds is decided by which of e and d are there, not by numbers."""
    a, b, c = port.a, port.b, port.c
    if port.e is not None:
        d = np.zeros_like(port.e) if port.d is None else port.d
        size = a.shape[-1] + 1
        larger = np.zeros((*a.shape[:-2], size, size))
        larger[..., 0, 0] = -d / port.e
        larger[..., 0, 1:] = -c / port.e[..., None]
        larger[..., 1:, 0] = b
        larger[..., 1:, 1:] = a
        first = np.zeros(larger.shape[:-1])
        first[..., 0] = 1.0
        return Port(larger, first / port.e[..., None], first, None, None)
    if port.d is not None:
        over = 1.0 / port.d
        return Port(a - _outer(b * over[..., None], c), b * over[..., None], -c * over[..., None], over, None)
    return _of_strictly_proper(a, b, c)


def _of_strictly_proper(a: RealArray, b: RealArray, c: RealArray) -> Port:
    """The output is one of the states: it is taken out, the largest share of it as the pivot, and becomes the input."""
    gain = np.sum(c * b, axis=-1)
    pivot = np.argmax(np.abs(c * b), axis=-1)
    order = np.argsort(np.arange(a.shape[-1]) == pivot[..., None], axis=-1, kind="stable")
    a = np.take_along_axis(np.take_along_axis(a, order[..., :, None], axis=-2), order[..., None, :], axis=-1)
    b, c = np.take_along_axis(b, order, axis=-1), np.take_along_axis(c, order, axis=-1)
    kept = a.shape[-1] - 1
    eye = np.broadcast_to(np.eye(kept), (*a.shape[:-2], kept, kept))
    out = np.concatenate([eye, -(c[..., :kept] / c[..., kept:])[..., None, :]], axis=-2)
    share = b / gain[..., None]
    onto = np.concatenate([eye, np.zeros((*eye.shape[:-1], 1))], axis=-1) - _outer(share[..., :kept], c)
    moved = onto @ a
    ca = np.squeeze(c[..., None, :] @ a, axis=-2)
    return Port(
        moved @ out, np.squeeze(moved @ share[..., None], axis=-1),
        -np.squeeze(ca[..., None, :] @ out, axis=-2) / gain[..., None], -np.sum(ca * share, axis=-1) / gain, 1.0 / gain,
    )


def _outer(left: RealArray, right: RealArray) -> RealArray:
    product: RealArray = left[..., :, None] * right[..., None, :]
    return product
