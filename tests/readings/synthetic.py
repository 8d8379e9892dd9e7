"""Readings made up from a circuit that is known, by arithmetic of its own: complex numbers and coupled meshes.

Nothing here calls the package's formulas. Errors are drawn evenly within each instrument's stated accuracy.
"""

from __future__ import annotations

import cmath
import math
from dataclasses import dataclass, replace

import numpy as np

DEFINITION = """
format: 1
title: two coils for readings
supplies:
  bench: {system: single-phase, voltage: 230 V ± 5 %, frequency: 50 Hz ± 1 %}
circuits:
  - tag: A
    fed_from: bench
    ambient: 10..30 degC
    cable: []
    load:
      coil:
        resistance: 21 ohm ± 5 %
        inductance: 0.36 H ± 5 %
        open_gap: {inductance: 75 mH ± 15 %}
        rated_voltage: 230 V
        rated_frequency: 50 Hz
        temperature_rise: 55 K
  - tag: B
    fed_from: bench
    ambient: 10..30 degC
    cable: []
    load:
      coil:
        resistance: 60 ohm ± 5 %
        inductance: 0.50 H ± 5 %
        open_gap: {inductance: 0.2 H ± 15 %}
        rated_voltage: 230 V
        rated_frequency: 50 Hz
        temperature_rise: 45 K
"""


@dataclass(frozen=True)
class Coil:
    """A coil and its surroundings as they truly are."""

    resistance: float
    inductance: float
    cold: float
    hot: float
    voltage: float
    frequency: float
    core: float = math.inf
    shorted: float = 0.0
    ammeter: float = 1.0
    bridge: float = 1.0


def sound(
    random: np.random.Generator, resistance: float = 21.0, inductance: float = 0.36, hot: tuple[float, float] = (55.0, 75.0)
) -> Coil:
    """A coil within its tolerances on a supply within its bands."""
    return Coil(resistance * random.uniform(0.95, 1.05), inductance * random.uniform(0.95, 1.05), random.uniform(10.0, 30.0),
                random.uniform(*hot), 230.0 * random.uniform(0.96, 1.04), 50.0 * random.uniform(0.992, 1.008))


def impedance(coil: Coil, temperature: float, frequency: float) -> complex:
    """Impedance at a temperature, by solving the two meshes of winding and shorted section."""
    omega = 2.0 * math.pi * frequency
    winding = coil.resistance * (234.5 + temperature) / 254.5
    share = coil.shorted
    if share:
        own, part = (1 - share) ** 2 * coil.inductance, share**2 * coil.inductance
        mutual = 0.95 * math.sqrt(own * part)
        meshes = np.array([[1j * omega * own, 1j * omega * mutual], [1j * omega * mutual, share * winding + 1j * omega * part]])
        rest = complex(1.0 / np.linalg.solve(meshes, np.array([1.0, 0.0]))[0])
    else:
        rest = 1j * omega * coil.inductance
    if math.isfinite(coil.core):
        rest = rest * coil.core / (rest + coil.core)
    return (1 - share) * winding + rest


INSTRUMENTS = {
    "voltage": (0.005, 2, 0.1), "current": (0.008, 3, 0.001), "power": (0.01, 2, 0.1), "resistance": (0.003, 2, 0.01),
    "temperature": (0.0, 5, 0.1), "frequency": (0.001, 1, 0.01), "inductance": (0.01, 3, 0.0001),
}
UNITS = {"voltage": "V", "current": "A", "power": "W", "resistance": "ohm", "temperature": "degC", "frequency": "Hz",
         "inductance": "H"}


def in_error(random: np.random.Generator, name: str, value: float) -> str:
    """A reading as an instrument within its accuracy shows it."""
    share, digits, step = INSTRUMENTS[name]
    shown = value + random.uniform(-1.0, 1.0) * (share * abs(value) + digits * step)
    return f"{shown:.9f} {UNITS[name]}"


def readings(random: np.random.Generator, coil: Coil, *, tag: str = "A", true_rms: bool = True, top: float = 10.0,
             frequency_read: bool = True, bridge_at: str = "50 Hz") -> str:
    """A readings file of one coil: cold resistance with temperature, bridge, then voltage, current and power running."""
    inputs = "\n".join(
        f"      {name}: {{accuracy: ± ({100 * share:g} % + {digits}), "
        f"resolution: {step:g} {'K' if name == 'temperature' else UNITS[name]}"
        + (f", range: {top:g} A" if name == "current" else f", test_frequency: {bridge_at}" if name == "inductance" else "") + "}"
        for name, (share, digits, step) in INSTRUMENTS.items()
    )
    z = impedance(coil, coil.hot, coil.frequency)
    current = coil.voltage / abs(z)
    power = coil.voltage * current * math.cos(cmath.phase(z))
    cold = (1 - coil.shorted) * coil.resistance * (234.5 + coil.cold) / 254.5
    hot = (1 - coil.shorted) * coil.resistance * (234.5 + coil.hot) / 254.5
    at = impedance(coil, coil.cold, 50.0)
    bridge = at.imag / (2 * math.pi * 50.0) * coil.bridge
    extra = f", frequency: {in_error(random, 'frequency', coil.frequency)}" if frequency_read else ""
    return (
        "format: 1\ninstruments:\n  set:\n"
        f"    true_rms: {'yes' if true_rms else 'no'}\n    inputs:\n{inputs}\nreadings:\n"
        f"  - {{tag: {tag}, state: cold, four_wire: yes, instrument: set, resistance: {in_error(random, 'resistance', cold)}, "
        f"temperature: {in_error(random, 'temperature', coil.cold)}}}\n"
        f"  - {{tag: {tag}, state: cold, instrument: set, inductance: {in_error(random, 'inductance', bridge)}}}\n"
        f"  - {{tag: {tag}, state: steady, four_wire: yes, instrument: set, resistance: {in_error(random, 'resistance', hot)}}}\n"
        f"  - {{tag: {tag}, state: steady, instrument: set, voltage: {in_error(random, 'voltage', coil.voltage)}, "
        f"current: {in_error(random, 'current', current / coil.ammeter)}, power: {in_error(random, 'power', power)}{extra}}}\n"
    )


def planted(random: np.random.Generator, name: str) -> tuple[Coil, dict[str, object]]:
    """A coil with one thing wrong, and how it was read."""
    coil = sound(random)
    if name == "winding-warmer":
        return replace(coil, hot=random.uniform(150.0, 190.0)), {}
    if name == "open-gap":
        return replace(coil, inductance=coil.inductance * random.uniform(0.3, 0.7)), {}
    if name == "shorted-turns":
        return replace(coil, shorted=random.uniform(0.03, 0.12)), {}
    if name == "core-loss":
        return replace(coil, core=random.uniform(250.0, 700.0)), {}
    if name == "wrong-tap":
        scale = (float(random.choice([110.0, 400.0])) / 230.0) ** 2
        return replace(coil, resistance=coil.resistance * scale, inductance=coil.inductance * scale), {}
    if name == "wrong-frequency":
        return replace(coil, frequency=60.0 * random.uniform(0.995, 1.005)), {"frequency_read": bool(random.integers(2))}
    if name == "supply-outside-band":
        return replace(coil, voltage=230.0 * random.uniform(0.7, 0.88)), {}
    if name == "inductance-at-wrong-frequency":
        return replace(coil, bridge=random.uniform(0.4, 0.7)), {"bridge_at": "1 kHz"}
    if name == "average-responding-meter":
        return replace(coil, ammeter=random.uniform(1.15, 1.4)), {"true_rms": False}
    if name == "meter-out-of-range":
        return replace(coil, ammeter=random.uniform(1.3, 1.9)), {"top": 1.0}
    if name == "exchanged-circuits":
        return sound(random, 60.0, 0.50, (40.0, 55.0)), {}
    raise ValueError(name)


FAULTS = ("winding-warmer", "open-gap", "shorted-turns", "core-loss", "wrong-tap", "wrong-frequency", "supply-outside-band",
          "inductance-at-wrong-frequency", "average-responding-meter", "meter-out-of-range", "exchanged-circuits")
