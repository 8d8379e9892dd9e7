"""For each rule the smallest definition it holds for, the smallest it breaks, and one for which it cannot be assessed.

Each is a circuit's body; `SUPPLIES` stands before it. A breaking definition must break that rule alone.
"""

from __future__ import annotations

SUPPLIES = """\
format: 1
supplies:
  ac: {system: single-phase, voltage: 230 V, frequency: 50 Hz}
  dc: {system: dc, voltage: 24 V}
  site: {system: single-phase, voltage: 230 V, frequency: 50 Hz, earthing: TN-S, loop_impedance: 0.3 ohm, fault_current: 1 kA,
         measurement_category: III}
  weak: {system: single-phase, voltage: 230 V, frequency: 50 Hz, fault_current: 20 A}
circuits:
"""

LAMP = "{resistor: {resistance: 100 ohm}}"
CABLE = ("{section: 2.5 mm2, length: 10 m, conductor: copper, conductor_class: 2, insulation: pvc-70, method: C, "
          "ambient: 25 degC, grouped_circuits: 1}")
_COIL = "made_for: alternating current, armature: none, thermal_resistance: 0.05 K/W"


def circuit(load: str, cable: str = "[]", more: str = "", supply: str = "ac") -> str:
    """One circuit as text."""
    return f"  - {{tag: A, fed_from: {supply}, ambient: 25 degC, cable: {cable}, load: {load}{more}}}\n"


def coil(plate: str) -> str:
    """A load of one choke, made for alternating current, that hardly warms."""
    return f"{{coil: {{{plate}, {_COIL}}}}}"


RATED = "rated_voltage: 230 V, rated_frequency: 50 Hz"
METER = ", meter: {connection: in-line, range: 10 A, fuse: 10 A, continuous: 10 A}"

DEFINITIONS: dict[str, tuple[str, str, str]] = {
    "minimum-power-factor": (
        circuit(LAMP),
        circuit(coil("resistance: 40 ohm, inductance: 0.3 H")),
        circuit("{coil: {made_for: alternating current, armature: none, resistance: 40 ohm}}"),
    ),
    "voltage-drop": (
        circuit(LAMP, CABLE),
        circuit("{resistor: {resistance: 20 ohm}}", CABLE.replace("10 m", "90 m")),
        f"  - {{tag: A, fed_from: ac, ambient: 25 degC, load: {LAMP}}}\n",
    ),
    "conductor-heating": (
        circuit(LAMP, CABLE),
        circuit("{resistor: {resistance: 9.75 ohm}}",
                CABLE.replace("10 m", "2 m").replace("2.5 mm2", "1.5 mm2").replace("pvc-70", "xlpe-90")),
        circuit(LAMP, CABLE.replace(", grouped_circuits: 1", "")),
    ),
    "conductor-current": (
        circuit(LAMP, CABLE),
        circuit("{resistor: {resistance: 7.8 ohm}}", CABLE.replace("10 m", "2 m")),
        circuit(LAMP, CABLE.replace(", method: C", "")),
    ),
    "meter-range": (
        circuit(LAMP, more=METER),
        circuit("{resistor: {resistance: 20 ohm}}", more=METER),
        circuit(LAMP, more=METER.replace("range: 10 A, ", "")),
    ),
    "supply-match": (
        circuit("{parallel: [" + coil(f"resistance: 400 ohm, inductance: 0.05 H, {RATED}") + "]}"),
        circuit(coil(f"resistance: 400 ohm, inductance: 0.05 H, {RATED}").replace("alternating", "direct")),
        circuit(coil("resistance: 400 ohm, inductance: 0.05 H, rated_voltage: 230 V")),
    ),
    "nameplate-contradiction": (
        circuit(coil("resistance: 400 ohm ± 1 %, inductance: 0.05 H, impedance: 400 ohm ± 1 %")),
        circuit(coil("resistance: 400 ohm ± 1 %, inductance: 0.05 H, impedance: 460 ohm ± 1 %")),
        circuit("{coil: {made_for: alternating current, armature: none, thermal_resistance: 0.05 K/W, resistance: 400 ohm, "
                "quality_factor: 0.04, current: 0.57 A, rated_frequency: 50 Hz}}", supply="ac")
        .replace("{coil:", "{series: [{coil:").replace("50 Hz}}", "50 Hz}}, {resistor: {resistance: 1 ohm}}]}"),
    ),
}
