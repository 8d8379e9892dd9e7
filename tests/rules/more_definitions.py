"""The three definitions of the rules on windings, protection, switching, compensation and meters."""

from __future__ import annotations

from tests.rules.definitions import CABLE, LAMP, METER, circuit, coil

_MAGNET = "made_for: direct current, resistance: 480 ohm, inductance: 0.9 H, thermal_resistance: 20 K/W"
_HOT = "resistance: 400 ohm, inductance: 0.05 H, made_for: alternating current, armature: none"
_JAMMED = ("resistance: 400 ohm, inductance: 0.6 H, made_for: alternating current, thermal_resistance: 0.85 K/W, "
           "open_gap: {inductance: 1 mH}")
_NO_WAY = f"  - {{tag: A, fed_from: ac, ambient: 25 degC, load: {LAMP}, "
_SITE_CABLE = CABLE.replace("10 m", "60 m").replace("section", "protective_section: 2.5 mm2, section", 1)
_CHOKE = "{coil: {resistance: 400 ohm, inductance: 0.6 H, made_for: alternating current, armature: none, thermal_resistance: 0.05 K/W}}"


def magnet(more: str = "", after: str = "") -> str:
    """A direct-current magnet of 480 ohm on 24 V: 50 mA."""
    return circuit(f"{{coil: {{{_MAGNET}, open_gap: {{inductance: 0.3 H}}{more}}}}}", more=after, supply="dc")


def dc_coil(more: str = "", after: str = "") -> str:
    """The same without an armature."""
    return circuit(f"{{coil: {{{_MAGNET}, armature: none{more}}}}}", more=after, supply="dc")


def guarded(words: str, load: str = LAMP, cable: str = "[]", supply: str = "ac") -> str:
    """A circuit behind a circuit-breaker."""
    return circuit(load, cable, f", protection: {{device: circuit-breaker, {words}}}", supply)


def switched(words: str, load: str = LAMP) -> str:
    """A circuit behind a contact."""
    return circuit(load, more=f", switching: {{{words}}}")


def compensated(capacitor: str, supply: str = "ac", load: str = _CHOKE) -> str:
    """A choke that takes 51 var, with a capacitor beside it."""
    return circuit(f"{{parallel: [{load}, {{capacitor: {{{capacitor}}}}}]}}", supply=supply)


def read_with(words: str, load: str = LAMP, supply: str = "site") -> str:
    """A circuit with a clamp around it."""
    return circuit(load, more=f", meter: {{connection: clamp, range: 40 A{words}}}", supply=supply)


_APART = f"{{series: [{_CHOKE}, {{resistor: {{resistance: 1 ohm}}}}]}}"
_MOTOR = "{motor: {rated_voltage: 230 V, current: 4 A, power_factor: 0.95, starting_ratio: 6, starting_power_factor: 0.5}}"
_ZENER = ", suppressor: {kind: zener, clamp_voltage: 36 V"

MORE: dict[str, tuple[str, str, str]] = {
    "operating-voltage": (
        magnet(", rated_voltage: 24 V, lowest_voltage: 85 %, highest_voltage: 110 %"),
        magnet(", rated_voltage: 21 V, lowest_voltage: 85 %, highest_voltage: 110 %"),
        magnet(", rated_voltage: 24 V"),
    ),
    "winding-temperature": (
        circuit(f"{{coil: {{{_HOT}, thermal_resistance: 0.05 K/W, thermal_class: 105}}}}"),
        circuit(f"{{coil: {{{_HOT}, thermal_resistance: 1.5 K/W, thermal_class: 105}}}}"),
        circuit(f"{{coil: {{{_HOT}, thermal_resistance: 0.05 K/W}}}}"),
    ),
    "stuck-open": (
        circuit(f"{{coil: {{{_JAMMED}, thermal_class: 130}}}}"),
        circuit(f"{{coil: {{{_JAMMED}, thermal_class: 105}}}}"),
        circuit(f"{{coil: {{{_JAMMED.partition(', open_gap')[0]}, thermal_class: 130}}}}"),
    ),
    "pull-in-when-hot": (magnet(", pull_in_voltage: 14 V"), magnet(", pull_in_voltage: 23 V"), magnet()),
    "saturation-current": (
        dc_coil(", saturation_current: 60 mA"),
        dc_coil(", saturation_current: 40 mA"),
        dc_coil(", saturation_current: 60 mA").replace("cable: [], ", ""),
    ),
    "minimum-section": (
        circuit(LAMP, CABLE), circuit(LAMP, CABLE.replace("2.5 mm2", "1 mm2")), _NO_WAY + "diversity: 1.0}\n",
    ),
    "overload-coordination": (
        guarded("curve: C, rating: 16 A", cable=CABLE),
        guarded("curve: C, rating: 32 A", cable=CABLE),
        guarded("curve: C, rating: 16 A", cable=CABLE.replace(", method: C", "")),
    ),
    "nuisance-trip": (guarded("curve: B, rating: 6 A"), guarded("curve: B, rating: 6 A", _MOTOR), guarded("rating: 6 A")),
    "breaking-capacity": (
        guarded("curve: C, rating: 16 A, breaking_capacity: 6 kA", supply="site"),
        guarded("curve: C, rating: 16 A, breaking_capacity: 500 A", supply="site"),
        guarded("curve: C, rating: 16 A, breaking_capacity: 6 kA"),
    ),
    "fault-loop": (
        guarded("curve: B, rating: 16 A", cable=_SITE_CABLE, supply="site"),
        guarded("curve: D, rating: 16 A", cable=_SITE_CABLE, supply="site"),
        guarded("curve: B, rating: 16 A", cable=CABLE, supply="site"),
    ),
    "fault-heating": (
        guarded("curve: B, rating: 16 A, let_through: 20000 A2s", cable=CABLE),
        guarded("curve: B, rating: 16 A, let_through: 100000 A2s", cable=CABLE),
        guarded("curve: B, rating: 16 A", cable=CABLE),
    ),
    "contact-duty": (
        switched("category: AC-12, rated_current: 5 A, rated_voltage: 240 V"),
        switched("category: AC-12, rated_current: 2 A, rated_voltage: 240 V"),
        switched("rated_current: 5 A, rated_voltage: 240 V"),
    ),
    "switch-off-voltage": (
        dc_coil(after=_ZENER + "}, switching: {withstand: 100 V}"),
        dc_coil(after=_ZENER + "}, switching: {withstand: 50 V}"),
        dc_coil(after=", switching: {withstand: 100 V}"),
    ),
    "release-time": (
        dc_coil(", drop_out_current: 5 mA", ", suppressor: {kind: diode}, switching: {release_within: 50 ms}"),
        dc_coil(", drop_out_current: 5 mA", ", suppressor: {kind: diode}, switching: {release_within: 2 ms}"),
        dc_coil("", ", suppressor: {kind: diode}, switching: {release_within: 50 ms}"),
    ),
    "stored-energy": (
        dc_coil(after=_ZENER + ", energy: 5 mJ}"), dc_coil(after=_ZENER + ", energy: 0.1 mJ}"), dc_coil(after=_ZENER + "}"),
    ),
    "held-in": (
        dc_coil(", drop_out_current: 5 mA", ", switching: {leakage_current: 1 mA}"),
        dc_coil(", drop_out_current: 5 mA", ", switching: {leakage_current: 4 mA}"),
        dc_coil("", ", switching: {leakage_current: 1 mA}"),
    ),
    "minimum-contact-load": (
        switched("smallest_current: 10 mA"), switched("smallest_current: 5 A"), _NO_WAY + "switching: {smallest_current: 10 mA}}\n",
    ),
    "over-correction": (
        compensated("capacitance: 1 uF"),
        compensated("capacitance: 4 uF"),
        compensated("capacitance: 1 uF", load="{coil: {resistance: 400 ohm, armature: none, made_for: alternating current}}"),
    ),
    "capacitor-stress": (
        compensated("capacitance: 1 uF, rated_voltage: 450 V"),
        compensated("capacitance: 1 uF, rated_voltage: 200 V"),
        compensated("capacitance: 1 uF"),
    ),
    "capacitor-discharge": (
        compensated("capacitance: 1 uF, discharge_resistance: 1 Mohm", load=_APART),
        compensated("capacitance: 1 uF, discharge_resistance: 1 Gohm", load=_APART),
        compensated("capacitance: 1 uF", load=_APART),
    ),
    "resonance": (compensated("capacitance: 2.6 uF", "weak"), compensated("capacitance: 2.29 uF", "weak"),
                  compensated("capacitance: 2.29 uF")),
    "meter-category": (read_with(", category: CAT III 600 V"), read_with(", category: CAT II 600 V"), read_with("")),
    "meter-burden": (
        circuit("{resistor: {resistance: 4 ohm}}", more=METER[:-1] + ", burden_voltage: 0.4 V}", supply="dc"),
        circuit("{resistor: {resistance: 4 ohm}}", more=METER[:-1] + ", burden_voltage: 2 V}", supply="dc"),
        circuit("{resistor: {resistance: 4 ohm}}", more=", meter: {connection: in-line, burden_voltage: 0.4 V}", supply="dc"),
    ),
    "meter-resolution": (
        read_with(", resolution: 1 mA"), read_with(", resolution: 0.1 A"),
        read_with(", resolution: 1 mA").replace("cable: [], ", ""),
    ),
    "meter-waveform": (
        read_with(", responds: true rms", coil("resistance: 400 ohm, inductance: 0.05 H")),
        read_with(", responds: average", coil("resistance: 400 ohm, inductance: 0.05 H")),
        read_with("", coil("resistance: 400 ohm, inductance: 0.05 H")),
    ),
    "ohmmeter-on-a-coil": (
        read_with(", test_current: 1 mA", _CHOKE), read_with(", test_current: 2 A", _CHOKE),
        read_with(", test_current: 1 mA", "{coil: {resistance: 400 ohm, armature: none, made_for: alternating current}}"),
    ),
    "missing-data": (
        guarded("curve: C, rating: 16 A"), f"  - {{tag: A, fed_from: ac, load: {LAMP}}}\n", circuit(LAMP),
    ),
}
