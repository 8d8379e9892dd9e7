"""What readings of one coil would show, all being as defined or one thing being otherwise.

The model is a winding and an inductance in series, with core loss across the inductance: enough to tell one cause from
another, and no more. What is not known exactly (tolerances, temperatures, the supply's bands) is carried as a spread.
"""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass, field, replace

import numpy as np

from circuitlint.si import ComplexArray, Real, RealArray
from circuitlint.sources import Source

SHORTED = Source("coupled-circuit equations, shorted section of a winding as a secondary", known="derived")
COUPLING = 0.95
"""Coupling of a shorted section to the rest of its winding; common practice for one limb."""
ABSENT = 1e12


@dataclass(frozen=True, slots=True)
class Band:
    """A value between two ends; its spread is that of a rectangular distribution."""

    low: float
    high: float

    @property
    def middle(self) -> float:
        """Middle of the band."""
        return (self.low + self.high) / 2.0

    @property
    def spread(self) -> float:
        """Standard uncertainty."""
        return (self.high - self.low) / math.sqrt(12.0)


@dataclass(frozen=True, slots=True)
class Moment:
    """One reading's circumstances: what is believed of temperature, frequency and voltage, and which results it gives.

    `power` says how resistance was found, since an ammeter's error then goes into it squared.
    """

    state: str
    temperature: Band
    temperature_read: bool
    frequency: Band
    voltage: Band | None
    direct: bool
    power: bool
    results: tuple[str, ...]
    test_frequency: float | None = None
    label: str = ""


@dataclass(frozen=True, slots=True)
class Winding:
    """A coil as defined: resistance at 20 °C, inductance, core resistance where one is defined."""

    resistance: Band
    inductance: Band
    zero: float
    core: float = ABSENT


@dataclass(frozen=True, slots=True)
class Cause:
    """One thing that may be otherwise, by how much. The neutral one changes nothing."""

    warmer: float = 0.0
    gap: float = 1.0
    shorted: float = 0.0
    core: float = ABSENT
    tap: float = 1.0
    frequency: float | None = None
    voltage: float = 1.0
    ammeter: float = 1.0
    """True current over current read."""
    bridge: float = 1.0


AS_DEFINED = Cause()


@dataclass(frozen=True, slots=True)
class Fit:
    """How well a cause tells the readings: log evidence, squared distance, expected values and their spread."""

    cause: Cause
    log_evidence: float
    distance: float
    expected: RealArray
    spread: RealArray


@dataclass(slots=True)
class Observed:
    """All results of one coil's readings that the model tells, with their covariance."""

    moments: list[Moment]
    values: RealArray
    covariance: RealArray
    names: list[str] = field(default_factory=list)


def impedance(
    resistance: Real, inductance: Real, core: float, omega: Real, shorted: float
) -> ComplexArray:
    """Impedance of the coil, of which a share `shorted` of the turns may be closed on itself.

    Z = (1 − s) R + jω (1 − s)² L + (ω k s (1 − s) L)² / (s R + jω s² L), with 1/Rc across what is not winding resistance.
    """
    rest = 1j * omega * inductance * (1.0 - shorted) ** 2
    if shorted > 0.0:
        mutual = omega * COUPLING * shorted * (1.0 - shorted) * inductance
        rest += mutual**2 / (shorted * resistance + 1j * omega * shorted**2 * inductance)
    return np.asarray((1.0 - shorted) * resistance + 1.0 / (1.0 / rest + 1.0 / core))


def layout(moments: Sequence[Moment]) -> list[int]:
    """For each moment, which of the temperatures it has: moments of one state share theirs unless it was read."""
    keys: list[tuple[str, int]] = []
    found = []
    for number, one in enumerate(moments):
        key = (one.state, number if one.temperature_read else -1)
        if key not in keys:
            keys.append(key)
        found.append(keys.index(key))
    return found


def expected(moments: Sequence[Moment], winding: Winding, at: RealArray, cause: Cause) -> RealArray:
    """Results that would be read, shape (results, points). `at` is what `prior` gives the middles of, one column a point."""
    values: list[RealArray] = []
    scale = cause.tap**2
    core = 1.0 / (1.0 / (winding.core * scale) + 1.0 / cause.core)
    warm = layout(moments)
    voltages = 3 + max(warm) + 1
    cold = all(one.state == "cold" for one in moments)
    for number, one in enumerate(moments):
        temperature, voltage = at[3 + warm[number]], at[voltages + number]
        frequency = at[2] if cause.frequency is None else cause.frequency * at[2] / one.frequency.middle
        hot = cause.warmer if not one.temperature_read and (one.state != "cold" or cold) else 0.0
        resistance = at[0] * scale * (winding.zero + temperature + hot) / (winding.zero + 20.0)
        gap = cause.gap if one.state not in ("switch-on", "stuck-open") else 1.0
        inductance = at[1] * scale * gap
        if one.direct:
            z = (1.0 - cause.shorted) * resistance + 0j
        else:
            z = impedance(resistance, inductance, core, 2.0 * math.pi * frequency, cause.shorted)
        real, size = z.real * (cause.ammeter**2 if one.power else cause.ammeter), np.abs(z) * cause.ammeter
        omega = 2.0 * math.pi * (one.test_frequency or frequency)
        told = {
            "direct-current-resistance": (1.0 - cause.shorted) * resistance,
            "resistance": real,
            "reactance": np.sqrt(np.maximum(size**2 - real**2, 0.0)) if one.power else z.imag * cause.ammeter,
            "impedance": size,
            "frequency": frequency,
            "voltage": voltage * cause.voltage,
        }
        if "bridge-inductance" in one.results:
            told["bridge-inductance"] = impedance(resistance, inductance, core, omega, cause.shorted).imag / omega * cause.bridge
        values += [told[name] for name in one.results]
    return np.array(values)


def prior(moments: Sequence[Moment], winding: Winding) -> tuple[RealArray, RealArray]:
    """Middles and spreads of what is not known exactly: resistance, inductance, frequency, temperatures, voltages."""
    warm = layout(moments)
    temperatures = [moments[warm.index(key)].temperature for key in range(max(warm) + 1)]
    bands = [winding.resistance, winding.inductance, moments[0].frequency, *temperatures,
             *(one.voltage or Band(1.0, 1.0) for one in moments)]
    return np.array([band.middle for band in bands]), np.array([band.spread for band in bands])


def fit(seen: Observed, winding: Winding, cause: Cause = AS_DEFINED) -> Fit:
    """How well a cause tells the readings, everything not known exactly being averaged over to first order."""
    middle, spread = prior(seen.moments, winding)

    # The middle, then each unknown moved up and down by half its spread, all at once.
    count = len(middle)
    points = middle[:, None] + np.column_stack([np.zeros(count), np.diag(0.5 * spread), np.diag(-0.5 * spread)])
    found = expected(seen.moments, winding, points, cause)
    at, scaled = found[:, 0], found[:, 1 : count + 1] - found[:, count + 1 :]
    covariance = seen.covariance + scaled @ scaled.T
    # A floor keeps results that no uncertainty touches from weighing infinitely.
    covariance = covariance + np.diag((1e-6 * np.abs(seen.values)) ** 2 + 1e-30)
    off = seen.values - at
    _, logarithm = np.linalg.slogdet(covariance)
    distance = float(off @ np.linalg.solve(covariance, off))
    evidence = -0.5 * (distance + float(logarithm) + len(off) * math.log(2.0 * math.pi))
    return Fit(cause, evidence, distance, at, np.sqrt(np.diag(covariance)))


def chance(distance: float, count: int) -> float:
    """Chance of a squared distance at least so large from `count` normal readings: upper tail of chi-squared."""
    half = distance / 2.0
    if count % 2:
        total = math.erfc(math.sqrt(half))
        term = math.sqrt(half / math.pi) * 2.0 * math.exp(-half) if half < 700.0 else 0.0
        for number in range(1, count // 2 + 1):
            total += term
            term *= half / (number + 0.5)
        return min(1.0, total)
    term = total = math.exp(-half) if half < 700.0 else 0.0
    for number in range(1, count // 2):
        term *= half / number
        total += term
    return min(1.0, total)


def exchanged(moments: Sequence[Moment], voltage: Band | None) -> list[Moment]:
    """The same moments with another circuit's voltage."""
    return [replace(one, voltage=voltage if one.voltage is not None else None) for one in moments]
