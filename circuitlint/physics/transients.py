"""The crest of the first current into a network of several paths, at the worst moment of closing.

On a source √2 U sin(ωt + θ) the current from rest is √2 U Im(exp(jθ) g(t)), with g the answer to exp(jωt): the settled part
Y exp(jωt) and one fading part for each natural mode. Over all closing angles the current at the time t reaches at most
√2 U |g(t)|, and reaches it at one of them; so the peak over angle and time is the largest |g(t)|.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

import numpy as np

from circuitlint.physics.formula import Formula
from circuitlint.physics.one_ports import Branch, Port, admittance, holds_capacitor
from circuitlint.si import CURRENT, Ampere, ComplexArray, ComplexOhm, Hertz, RealArray, Volt
from circuitlint.sources import Source

WORST_ANGLE = Source(
    "largest value of the line's current over all closing angles and times, from the network's natural modes", known="derived",
    note="checked against numerical integration of the circuit's equations over many angles",
)
SQRT_2 = float(np.sqrt(2.0))
GRID = 12
DENSE = 64
FINE = 16
FEWEST = 5
LONGER = 12
ROUGH = 1e-8
"""How far the modes may be from reproducing the network's equations."""


@dataclass(frozen=True, slots=True)
class Answer:
    """g(t) = settled · exp(jωt) − Σ shares · exp(modes · t); the modes along the first axis."""

    omega: RealArray
    settled: ComplexArray
    modes: ComplexArray
    shares: ComplexArray

    def at(self, time: RealArray, resolved: Any = True) -> RealArray:
        """|g| at times of the cases' shape; modes that are not resolved count with their whole envelope."""
        fading = self.shares * np.exp(self.modes * time)
        if resolved is True:
            whole: RealArray = np.abs(self.settled * np.exp(1j * self.omega * time) - np.sum(fading, axis=0))
            return whole
        told = self.settled * np.exp(1j * self.omega * time) - np.sum(np.where(resolved, fading, 0.0), axis=0)
        size: RealArray = np.abs(told) + np.sum(np.where(resolved, 0.0, np.abs(fading)), axis=0)
        return size


def answer(port: Port, omega: RealArray) -> Answer:
    """The answer of an admittance without a jump to exp(jωt) from rest; NaN where the modes cannot be told apart."""
    size = port.a.shape[-1]
    d = np.zeros(omega.shape) if port.d is None else port.d
    if size == 0:
        none = np.zeros((0, *omega.shape), dtype=complex)
        return Answer(omega, np.asarray(d, dtype=complex), none, none)
    sound = np.all(np.isfinite(port.a), axis=(-2, -1)) & np.all(np.isfinite(port.b), axis=-1) & np.isfinite(omega)
    a = np.where(sound[..., None, None], port.a, np.diag(np.arange(1.0, size + 1.0)))
    modes, vectors = np.linalg.eig(a)
    modes, vectors = modes.astype(complex), vectors.astype(complex)
    inverse = _inverse(np.where(sound[..., None, None], vectors, np.eye(size)))
    again: Any = vectors @ (modes[..., None] * inverse)
    sound &= np.linalg.norm(again - a, axis=(-2, -1)) <= ROUGH * np.linalg.norm(a, axis=(-2, -1))
    inputs = np.squeeze(inverse @ (port.b + 0j)[..., None], axis=-1)
    shares = np.squeeze((port.c + 0j)[..., None, :] @ vectors, axis=-2) * inputs / (1j * omega[..., None] - modes)
    settled = d + np.sum(shares, axis=-1)
    shares = np.where(sound[..., None], shares, np.nan)
    return Answer(omega, np.where(sound, settled, np.nan), _modes_first(modes), _modes_first(shares))


def _modes_first(values: Any) -> ComplexArray:
    """The last axis moved to the front, in memory too, as sums over few modes of many cases are quick then."""
    return np.ascontiguousarray(np.moveaxis(values, -1, 0))


def _inverse(vectors: ComplexArray) -> ComplexArray:
    """The inverses; NaN for those that have none."""
    try:
        return np.asarray(np.linalg.inv(vectors), dtype=np.complex128)
    except np.linalg.LinAlgError:
        whole: Any = np.linalg.cond(vectors) < 1e15
        inverse = np.linalg.inv(np.where(whole[..., None, None], vectors, np.eye(vectors.shape[-1])))
        found: ComplexArray = np.where(whole[..., None, None], inverse, np.nan).astype(np.complex128)
        return found


def largest_without_capacitors(one: Answer) -> RealArray:
    """The largest |g| of resistances and inductances only: between a quarter and three quarters of the first period.

    exp(−jωt) g(t) = y + ∫ k(τ) exp(−jωτ) dτ with k positive and falling, as all modes of such a network fade and have positive
    shares. Up to a quarter period every step adds to the magnitude; and by three quarters the settled part has once stood
    opposite to the fading part, whose magnitude only falls, so that nothing larger follows.
    """
    period = 2.0 * np.pi / one.omega
    step = period / 2.0 / GRID
    best, at = _best_on_grid(one, period / 4.0, step, GRID, True)
    low, high = np.maximum(at - step, period / 4.0), at + step
    for _ in range(18):
        middle = (low + high) / 2.0
        rising = _rises(one, middle)
        low, high = np.where(rising, middle, low), np.where(rising, high, middle)
    return np.maximum(best, one.at((low + high) / 2.0))


def _rises(one: Answer, time: RealArray) -> Any:
    """Whether |g| rises at a time: the real part of its slope along itself is positive."""
    fading = one.shares * np.exp(one.modes * time)
    turning = one.settled * np.exp(1j * one.omega * time)
    slope = 1j * one.omega * turning - np.sum(one.modes * fading, axis=0)
    return np.real(np.conj(turning - np.sum(fading, axis=0)) * slope) > 0.0


def _best_on_grid(one: Answer, start: RealArray, step: RealArray, points: int, resolved: Any) -> tuple[RealArray, RealArray]:
    fading = one.shares * np.exp(one.modes * start)
    fade = np.exp(one.modes * step)
    around: Any = 0.0
    shrink: Any = 1.0
    if resolved is not True and not np.all(resolved):
        around, shrink = np.where(resolved, 0.0, np.abs(fading)), np.abs(fade)
        fading = np.where(resolved, fading, 0.0)
    turning, turn = one.settled * np.exp(1j * one.omega * start), np.exp(1j * one.omega * step)
    best, at = np.full(start.shape, -1.0), start
    for number in range(points + 1):
        size = np.abs(turning - np.sum(fading, axis=0)) + np.sum(around, axis=0)
        larger = size > best
        best, at = np.where(larger, size, best), np.where(larger, start + number * step, at)
        fading, turning, around = fading * fade, turning * turn, around * shrink
    return best, at


def _refined(one: Answer, best: RealArray, at: RealArray, step: RealArray, resolved: Any) -> RealArray:
    """Parabolas through three points around the largest, each a quarter as wide as the one before."""
    width = step
    for _ in range(5):
        left, right = one.at(at - width, resolved), one.at(at + width, resolved)
        bend = left - 2.0 * best + right
        shift = np.where(bend < 0.0, 0.5 * (left - right) / np.where(bend < 0.0, bend, -1.0), 0.0)
        trial = at + np.clip(shift, -1.0, 1.0) * width
        size = one.at(trial, resolved)
        larger = size > best
        best, at = np.where(larger, size, best), np.where(larger, trial, at)
        width = width / 4.0
    return np.where(np.isfinite(np.abs(one.settled)), best, np.nan)


def largest_with_capacitors(one: Answer) -> RealArray:
    """The largest |g| of a network that can ring: never less than it is, and as it is where every mode has time to fade.

    Each mode is searched over its first four turns at 16 points a turn, and the supply likewise; a time counts on the finest
    of these grids that reaches it. A mode with fewer than five points a turn on a grid counts there with its whole envelope,
    and after the last grid every mode does. While that leaves more than was found, the search goes on with the grids of modes at
    most twice as quick as the supply, up to twelve times.
    """
    speeds = np.concatenate([np.abs(one.modes), one.omega[None]])
    steps = 2.0 * np.pi / FINE / np.where(speeds > 0.0, speeds, one.omega)
    steps = np.sort(steps, axis=0)
    best = np.zeros(one.omega.shape)
    last = np.zeros(one.omega.shape)
    for number, step in enumerate(steps):
        if number and np.all(step <= steps[number - 1] * (1.0 + 1e-9)):
            continue  # the other of a pair of modes that turn against each other
        resolved = np.abs(one.modes) * step <= 2.0 * np.pi / FEWEST
        start = DENSE * np.max(np.where(steps < step / (1.0 + 1e-9), steps, 0.0), axis=0)
        end = np.maximum(DENSE * step, start)
        width = (end - start) / DENSE
        found = _best_on_grid(one, start, width, DENSE, resolved)
        best = np.maximum(best, _refined(one, *found, width, resolved))
        last = np.maximum(last, end)
    for _ in range(LONGER):
        open_ended = _rest(one, last) > best * (1.0 + 1e-9)
        if not np.any(open_ended):
            break
        part = Answer(one.omega[open_ended], one.settled[open_ended], one.modes[:, open_ended], one.shares[:, open_ended])
        grids = steps[:, open_ended]
        step = np.min(grids, axis=0, where=grids >= np.pi / FINE / part.omega, initial=np.inf)
        resolved = np.abs(part.modes) * step <= 2.0 * np.pi / FEWEST
        found = _best_on_grid(part, last[open_ended], step, DENSE, resolved)
        best[open_ended] = np.maximum(best[open_ended], _refined(part, *found, step, resolved))
        last[open_ended] += DENSE * step
    rest = _rest(one, last)
    peak: RealArray = np.where(np.isfinite(rest), np.maximum(best, rest), np.nan)
    return peak


def _rest(one: Answer, time: RealArray) -> RealArray:
    """What |g| cannot exceed from a time on: the settled part and the envelope of every mode."""
    size: RealArray = np.abs(one.settled) + np.sum(np.abs(one.shares) * np.exp(np.real(one.modes) * time), axis=0)
    return size


@dataclass(frozen=True, slots=True)
class PeakOfNetwork:
    """The function of one network's formula."""

    network: Branch

    def __call__(self, *, voltage: Volt, frequency: Hertz, impedances: tuple[ComplexOhm, ...]) -> Ampere:
        """ip = √2 · U · max |g(t)|"""
        spread = np.broadcast_arrays(*np.atleast_1d(voltage, frequency, *impedances))
        volts, omega = spread[0].astype(float), 2.0 * np.pi * spread[1].astype(float)
        one = answer(admittance(self.network, tuple(spread[2:]), omega), omega)
        size = largest_with_capacitors(one) if holds_capacitor(self.network) else largest_without_capacitors(one)
        shape = np.broadcast_shapes(*(np.shape(one) for one in (voltage, frequency, *impedances)))
        return np.reshape(SQRT_2 * volts * size, shape)


def switch_on_peak_of(network: Branch) -> Formula[..., Any]:
    """The formula of the worst first crest of the current into a network, from the impedances its branches take.

    Give `voltage` (rms), `frequency` and `impedances` (in the order of `takes`; a `core` takes R, X and Rc, `several` takes
    the number). The result is NaN where the modes of a case cannot be told apart.
    """
    more = ("; never less than the peak, and above it where a mode still rings when the search ends"
            if holds_capacitor(network) else "")
    return Formula(
        name="switch-on-peak-with-ringing" if more else "switch-on-peak-of-paths", result="ip",
        equation="√2 · {U} · max |g(t)|, g the line's answer from rest to exp(j 2π · {f} · t) through {Zk}",
        symbols={"voltage": "U", "frequency": "f", "impedances": "Zk"}, source=WORST_ANGLE,
        validity=f"linear: an iron core with remanence can exceed it several times{more}",
        function=PeakOfNetwork(network), dimension=CURRENT,
    )
