"""Definitions of any size for measuring: invented circuits, no two alike, the same for the same seed."""

from __future__ import annotations

import random
from collections.abc import Iterator

_HEAD = """\
format: 1
title: {title}
ruleset: low-voltage-50hz

supplies:
  mains:
    system: single-phase
    voltage: 230 V +10/-6 %
    frequency: 50 Hz ± 1 %
    fault_current: 1 kA
    measurement_category: III
  control:
    system: single-phase
    voltage: 48 V ± 10 %
    frequency: 50 Hz ± 1 %
  battery:
    system: dc
    voltage: 24 V -15/+20 %

circuits:
"""
_SUPPLIES = {"mains": 230.0, "control": 48.0, "battery": 24.0}
_SECTIONS = ("0.75", "1", "1.5", "2.5", "4")
_TOLERANCES = (2, 5, 10)


def definition(circuits: int, seed: int = 1, title: str = "Invented circuits for measuring") -> str:
    """The text of one definition with so many circuits: about 24 lines each, every quantity with its own number."""
    draw = random.Random(seed)
    return _HEAD.format(title=title) + "".join(
        line + "\n" for number in range(circuits) for line in _circuit(number, draw)
    )


def _circuit(number: int, draw: random.Random) -> Iterator[str]:
    supply = draw.choices(list(_SUPPLIES), weights=(5, 2, 3))[0]
    volts = _SUPPLIES[supply]
    amperes = draw.uniform(0.2, 2.5)
    direct = supply == "battery"
    impedance = volts / amperes
    resistance = impedance if direct else impedance * draw.uniform(0.15, 0.5)
    inductance = impedance * draw.uniform(0.01, 0.1) if direct else (impedance**2 - resistance**2) ** 0.5 / 314.159
    yield f"  - tag: =M{number // 40:03d}-Y{number % 40:02d}.{number}"
    yield f"    serves: invented load {number}"
    yield f"    fed_from: {supply}"
    yield f"    ambient: {draw.randint(10, 45)} degC"
    yield "    cable:"
    for _ in range(draw.choice((1, 1, 1, 2))):
        yield f"      - section: {draw.choice(_SECTIONS)} mm2"
        yield f"        length: {draw.uniform(2, 60):.1f} m"
        yield "        conductor: copper"
        yield "        insulation: pvc-70"
        yield f"        method: {draw.choice(('B1', 'B2', 'C'))}"
        yield f"        ambient: {draw.randint(20, 45)} degC"
        yield f"        grouped_circuits: {draw.randint(1, 6)}"
    yield "    meter:"
    yield f"      connection: {draw.choice(('in-line', 'clamp'))}"
    yield "      range: 10 A"
    yield "      fuse: 10 A"
    yield "      category: CAT III 600 V"
    yield "      responds: true rms"
    yield "    load:"
    yield from _load(draw, resistance, inductance, direct, volts)


def _load(draw: random.Random, resistance: float, inductance: float, direct: bool, volts: float) -> Iterator[str]:
    shape = "alone" if direct else draw.choices(("alone", "series", "compensated"), weights=(6, 2, 2))[0]
    coil = (
        f"made_for: {'direct' if direct else 'alternating'} current",
        f"resistance: {resistance:.4g} ohm ± {draw.choice(_TOLERANCES)} %",
        f"inductance: {1e3 * inductance:.4g} mH ± {draw.choice(_TOLERANCES)} %",
        "open_gap:",
        f"  inductance: {1e3 * inductance * draw.uniform(0.2, 0.5):.4g} mH ± 15 %",
        f"rated_voltage: {volts:g} V",
        f"temperature_rise: {draw.randint(35, 70)} K",
        'thermal_class: "130"',
        "lowest_voltage: 80 %",
        "highest_voltage: 120 %",
        "pull_in_voltage: 17 V" if direct else "rated_frequency: 50 Hz",
    )
    if shape == "alone":
        yield "      coil:"
        yield from (f"        {line}" for line in coil)
        return
    yield "      series:" if shape == "series" else "      parallel:"
    yield "        - coil:"
    yield from (f"            {line}" for line in coil)
    if shape == "series":
        yield f"        - resistor: {{resistance: {resistance * draw.uniform(0.2, 0.8):.4g} ohm ± 5 %}}"
    else:
        yield f"        - capacitor: {{capacitance: {draw.uniform(0.5, 6):.3g} uF ± 10 %, rated_voltage: 450 V}}"
