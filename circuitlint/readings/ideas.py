"""The explanations that are considered, each with the amounts of it that are tried."""

from __future__ import annotations

import math
from collections.abc import Callable, Iterator, Mapping, Sequence
from dataclasses import dataclass

import numpy as np

from circuitlint.readings.evaluation import Evaluated
from circuitlint.readings.prediction import Prediction
from circuitlint.readings.seeing import winding_of
from circuitlint.readings.winding import AS_DEFINED, Band, Cause, Observed, Winding, exchanged

TAPS = (12.0, 24.0, 42.0, 48.0, 110.0, 120.0, 127.0, 208.0, 220.0, 230.0, 240.0, 277.0, 380.0, 400.0, 415.0, 440.0, 480.0)
"""Voltages coils are wound for; common practice."""
FREQUENCIES = (16.7, 50.0, 60.0, 400.0)
LEAST_OF_RANGE = 0.05
"""Share of its range below which an ammeter is out of it; common practice."""


@dataclass(frozen=True, slots=True)
class Idea:
    """One explanation to be tried: name, sentence, what would settle it, and its amounts with the cause and words of each."""

    name: str
    what: str
    check: str
    amounts: tuple[float, ...]
    cause: Callable[[float], Cause]
    tell: Callable[[float], str]
    whole: bool = False
    """Whether there is nothing between the amounts."""
    stands_for: tuple[Winding, Observed] | None = None


def _grid(low: float, high: float, count: int = 40) -> tuple[float, ...]:
    return tuple(float(one) for one in np.geomspace(low, high, count))


def ideas(found: Sequence[Evaluated], prediction: Prediction, seen: Observed, winding: Winding,
          predictions: Mapping[str, Prediction], tag: str, place: str) -> Iterator[Idea]:
    """Every explanation that the readings of one coil could have, with the amounts to be tried."""
    coil = prediction.coils[place]
    alternating = any(not one.direct for one in seen.moments)
    if any(not one.temperature_read for one in seen.moments):
        yield Idea("winding-warmer", "the winding is warmer than thought", "read its temperature, or let it cool and read again",
                   _grid(8.0, 150.0), lambda x: Cause(warmer=x), lambda x: f"{x:.0f} K warmer")
    if alternating and coil.armature != "none":
        least = 0.15
        if coil.open_gap is not None and coil.open_gap.inductance is not None:
            least = min(0.8, coil.open_gap.inductance.low / winding.inductance.high)
        yield Idea("open-gap", "the armature does not close fully, or not at all",
                   "with the supply off and locked, look at the pole faces and the travel; then read again",
                   tuple(np.linspace(least, 0.93, 40).tolist()), lambda x: Cause(gap=x),
                   lambda x: f"inductance {100 * x:.0f} % of that with the gap closed")
    yield Idea("shorted-turns", "turns of the winding are shorted",
               "compare the losses with those of a sound coil at reduced voltage; a direct-current reading within tolerance "
               "excludes nothing", _grid(0.002, 0.4, 60), lambda x: Cause(shorted=x),
               lambda x: f"about {100 * x:.2g} % of the turns")
    if alternating:
        reactance = 2.0 * math.pi * seen.moments[0].frequency.middle * winding.inductance.middle
        most = min(winding.core, 60.0 * reactance)
        yield Idea("core-loss", "the core takes more power than stated",
                   "read the power at two voltages, and the winding's resistance right after switching off",
                   _grid(0.02 * most, 0.8 * most), lambda x: Cause(core=x), lambda x: f"as {x:.3g} Ω across the inductance")
        yield from _frequencies(prediction)
        yield from _ammeters(found, prediction)
    yield from _taps(coil.rated_voltage.nominal if coil.rated_voltage is not None else None)
    if any("voltage" in one.results for one in seen.moments):
        yield Idea("supply-outside-band", "the supply's voltage lies outside its stated band",
                   "read the voltage at the origin, over a day",
                   (*np.linspace(0.4, 0.97, 30).tolist(), *np.linspace(1.03, 1.6, 30).tolist()), lambda x: Cause(voltage=x),
                   lambda x: f"{100 * (x - 1):+.0f} % beside the middle of its band")
    if any("bridge-inductance" in one.results for one in seen.moments) and _bridge_elsewhere(found, prediction):
        yield Idea("inductance-at-wrong-frequency", "the bridge read at another frequency or level than the coil works at",
                   "read the inductance at mains frequency and working voltage", (*_grid(0.15, 0.95), *_grid(1.06, 2.0, 12)),
                   lambda x: Cause(bridge=x), lambda x: f"{100 * x:.0f} % of the working inductance")
    yield from _others(seen, predictions, tag)


def _frequencies(prediction: Prediction) -> Iterator[Idea]:
    stated = prediction.supply.frequency if prediction.supply is not None else None
    amounts = tuple(one for one in FREQUENCIES if stated is None or not 0.95 < one / stated.nominal < 1.05)
    if amounts:
        yield Idea("wrong-frequency", "the supply has another frequency than stated", "read the frequency", amounts,
                   lambda x: Cause(frequency=x), lambda x: f"{x:g} Hz", True)


def _ammeters(found: Sequence[Evaluated], prediction: Prediction) -> Iterator[Idea]:
    stated = prediction.supply.frequency if prediction.supply is not None else None
    out, band_left, average = False, False, False
    for one in found:
        value, full = one.inputs.values.get("current"), one.used.get("current", ("", None))[1]
        if value is None or one.ammeter is None:
            continue
        out = out or (full is not None and not LEAST_OF_RANGE * full <= value <= full)
        band = one.ammeter.inputs.current.frequencies
        band_left = band_left or (band is not None and stated is not None and not band.low <= stated.nominal <= band.high)
        average = average or one.ammeter.true_rms is False
    if out or band_left:
        what = f"the ammeter was used outside its {'range' if out else 'bandwidth'}"
        yield Idea("meter-out-of-range", what, "read again with a range whose upper half holds the current",
                   (*_grid(0.4, 0.97, 30), *_grid(1.03, 3.0)), lambda x: Cause(ammeter=x),
                   lambda x: f"true current {100 * x:.0f} % of that read")
    if average:
        yield Idea("average-responding-meter", "an average-responding meter reads a distorted current too low",
                   "read again with a true-rms meter", _grid(1.03, 1.6), lambda x: Cause(ammeter=x),
                   lambda x: f"true current {100 * x:.0f} % of that read")


def _taps(rated: float | None) -> Iterator[Idea]:
    if rated is None:
        return
    amounts = tuple(one for one in TAPS if abs(one / rated - 1.0) > 0.03 and 0.2 < one / rated < 5.0)
    if amounts:
        yield Idea("wrong-tap", "the coil is one for another voltage, or on another tap", "read the coil's plate", amounts,
                   lambda x: Cause(tap=x / rated), lambda x: f"a winding for {x:g} V, not {rated:g} V", True)


def _bridge_elsewhere(found: Sequence[Evaluated], prediction: Prediction) -> bool:
    stated = prediction.supply.frequency if prediction.supply is not None else None
    for one in found:
        if "bridge_inductance" in one.inputs.values:
            at = one.bridge_frequency
            if at is None or stated is None or abs(at / stated.nominal - 1.0) > 0.05:
                return True
    return False


def _others(seen: Observed, predictions: Mapping[str, Prediction], tag: str) -> Iterator[Idea]:
    for other, prediction in predictions.items():
        if other == tag or prediction.direct != predictions[tag].direct:
            continue
        for place in prediction.coils:
            winding = winding_of(prediction, place)
            if winding is None or _alike(winding, winding_of(predictions[tag], next(iter(predictions[tag].coils)))):
                continue
            voltage = prediction.range("voltage", place, "steady")
            moments = exchanged(seen.moments, Band(voltage[0][1], voltage[0][2]) if voltage else None)
            if any("voltage" in one.results for one in moments) and voltage is None:
                continue
            theirs = Observed(moments, seen.values, seen.covariance, seen.names)
            yield Idea("exchanged-circuits", f"the readings are those of {other}", f"trace the wires of {tag} and {other}",
                       (1.0,), lambda x: AS_DEFINED, lambda x: "as the other circuit is defined", True, (winding, theirs))


def _alike(one: Winding, other: Winding | None) -> bool:
    return other is not None and all(abs(getattr(one, name).middle / getattr(other, name).middle - 1.0) < 0.02
                                     for name in ("resistance", "inductance"))
