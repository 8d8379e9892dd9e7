"""Spot checks of every look-up against its published table, and refusals that say what is tabled."""

from __future__ import annotations

import math
from collections.abc import Callable
from itertools import pairwise
from typing import Any

import pytest

from circuitlint.errors import OutOfTable
from circuitlint.tables import (
    ampacity,
    capacitors,
    coils,
    conductors,
    contacts,
    devices,
    materials,
    meters,
    motors,
    preferred,
    short_circuit,
    supply,
    thermal,
    us_conductors,
)
from circuitlint.tables.files import data

FOOT = 0.3048
MEMORY = "value from memory"

# What is asked, what is printed, and how it is known. Sources stand beside the figures in the data files.
FIGURES: list[tuple[Callable[..., tuple[float, Any]], tuple[Any, ...], float, str]] = [
    (conductors.resistance_per_metre, (2.5e-6, "copper-coated", 2), 7.56e-3, "read"),  # IEC 60228
    (conductors.resistance_per_metre, (240e-6, "aluminium", 1), 0.125e-3, "read"),  # IEC 60228
    (conductors.resistance_per_metre, (240e-6, "aluminium", 2), 0.125e-3, MEMORY),
    (conductors.typical_reactance_per_metre, (1.5e-6, "multicore-armoured"), 0.103e-3, "read"),  # Sheldrake, table 9.16
    (conductors.typical_reactance_per_metre, (240e-6, "single-core"), 0.084e-3, "read"),  # cable catalogue
    (conductors.warm_resistance_per_metre, (300e-6,), 0.0802e-3, "read"),  # Sheldrake, table 9.16
    (ampacity.open_laying_ampacity, (1.5e-6, "E"), 18.5, "read"),  # IEC 60364-5-52, table B.52.10
    (ampacity.open_laying_ampacity, (300e-6, "G-vertical"), 659.0, "read"),
    (ampacity.ambient_factor, (40.0, "pvc-70", "C"), 0.87, "read"),  # IEC 60364-5-52, table B.52.14
    (ampacity.ambient_factor, (80.0, "xlpe-90", "B1"), 0.41, "read"),
    (ampacity.ambient_factor, (30.0, "pvc-70", "D1"), 0.89, "read"),  # table B.52.15
    (ampacity.ambient_factor, (60.0, "pvc-70", "D2"), 0.45, MEMORY),
    (ampacity.soil_factor, (1.0, "D2"), 1.5, MEMORY),  # table B.52.16
    (ampacity.reference_ambient, ("D2",), 20.0, "read"),
    (ampacity.reference_ambient, ("C",), 30.0, "read"),
    (ampacity.highest_temperature, ("xlpe-90",), 90.0, "read"),
    (ampacity.grouping_factor, (2, "perforated-tray"), 0.88, MEMORY),  # table B.52.17
    (ampacity.grouping_factor, (9, "ladder"), 0.78, "read"),
    (materials.resistivity, ("aluminium",), 2.8264e-8, "read"),
    (materials.volumetric_heat, ("steel",), 3.8e6, "read"),
    (materials.winding_zero, ("aluminium",), 225.0, "read"),
    (materials.temperature_coefficient, ("copper",), 0.00393, "read"),
    (materials.temperature_coefficient, ("lead",), 0.004, MEMORY),
    (us_conductors.direct_resistance_per_metre, ("14", "copper", "stranded"), 3.14e-3 / FOOT, "read"),  # NEC, table 8
    (us_conductors.direct_resistance_per_metre, ("4/0", "aluminium", "stranded"), 0.1e-3 / FOOT, "read"),
    (us_conductors.alternating_resistance_per_metre, ("500", "copper", "steel"), 0.029e-3 / FOOT, "read"),  # NEC, table 9
    (us_conductors.reactance_per_metre, ("14", "steel"), 0.073e-3 / FOOT, "read"),
    (us_conductors.effective_impedance_per_metre, ("10", "steel"), 1.1e-3 / FOOT, "read"),
    (us_conductors.effective_impedance_per_metre, ("10", "pvc"), 1.1e-3 / FOOT, MEMORY),
    (devices.disconnection_time, (230.0, "TN", "ac"), 0.4, "read"),  # IEC 60364-4-41, table 41.1
    (devices.disconnection_time, (120.0, "TN", "ac"), 0.8, "read"),
    (devices.disconnection_time, (400.5, "TT", "ac"), 0.04, "read"),
    (devices.distribution_disconnection_time, ("TT",), 1.0, "read"),
    (devices.fuse_gate, (16.0, "largest_100ms"), 150.0, MEMORY),  # IEC 60269-1, table 3
    (devices.constant, ("voltage-factor",), 0.95, MEMORY),
    (devices.constant, ("cold-share",), 0.8, "common practice"),
    (devices.constant, ("tripping-over-ampacity",), 1.45, MEMORY),
    (contacts.time_to_95_percent, (50.0,), 0.3, "read"),  # IEC 60947-5-1, footnote on DC-13
    (contacts.time_to_95_percent, (10.0,), 0.06, "read"),
    (contacts.time_to_95_percent, (200.0,), 0.3, "read"),
    (coils.inrush_power_factor, (), 0.4, "read"),
    (coils.resistance_tolerance, (), 0.1, "read"),
    (coils.cable_capacitance_per_metre, ("seven-core",), 0.26e-9, "read"),
    (coils.cable_capacitance_per_metre, ("three-wire",), 0.6e-9, MEMORY),
    (thermal.thermal_class_temperature, ("155",), 155.0, "read"),  # IEC 60085
    (thermal.coil_rise, ("130",), 110.0, "read"),  # IEC 60947-4-1, as quoted
    (thermal.winding_rise, ("130",), 80.0, "read"),  # IEC 60034-1
    (thermal.winding_rise, ("105",), 60.0, MEMORY),
    (capacitors.largest_stress, ("current_with_tolerance",), 1.43, "read"),  # IEC 60831-1, through a national standard
    (capacitors.over_rated_current, ("disconnect",), 1.35, "read"),  # NEC 460.8
    (capacitors.over_rated_current, ("conductor",), 1.35, MEMORY),
    (capacitors.terminal_share, (), 0.9, "read"),
    (capacitors.motor_correction, (11e3, 1500.0), 4e3, "read"),
    (motors.three_phase_current, (20.0,), 27.0, "read"),  # NEC, table 430.250
    (motors.single_phase_current, ("1/6", 115.0), 4.4, MEMORY),  # NEC, table 430.248
    (meters.full_scale_burden, ("ampere",), 0.1, "read"),
    (meters.category_impulse, ("III", 300.0), 4000.0, MEMORY),
    (supply.harmonic_limit, (5,), 0.06, "read"),  # EN 50160
    (supply.harmonic_limit, (24,), 0.005, "read"),
    (supply.total_distortion_limit, (), 0.08, "read"),
    (supply.voltage_band, (), 0.1, MEMORY),  # IEC 60038
    (supply.drop_limit, ("public", "lighting"), 0.03, "read"),  # IEC 60364-5-52, annex G
    (supply.drop_limit, ("private", "other", 150.0), 0.0825, "read"),
    (supply.drop_limit, ("public", "other", 500.0), 0.055, "read"),
    (supply.drop_resistivity, ("copper",), 2.25e-8, "read"),
    (supply.drop_reactance, (), 0.08e-3, MEMORY),
    (supply.smallest_section, ("control-outside", "two_core_screened"), 0.2e-6, MEMORY),  # IEC 60204-1, table 5
]  # fmt: skip


@pytest.mark.parametrize(("look_up", "asked", "printed", "known"), FIGURES)
def test_a_figure_is_the_one_printed_and_says_how_it_is_known(
    look_up: Callable[..., tuple[float, Any]], asked: tuple[Any, ...], printed: float, known: str
) -> None:
    value, source = look_up(*asked)
    assert isinstance(value, float)
    assert value == pytest.approx(printed, rel=1e-12)
    assert source.known == known


REFUSED: list[tuple[Callable[..., Any], tuple[Any, ...], str]] = [
    (conductors.resistance_per_metre, (1.6e-6, "copper", 2), "1.5, 2.5"),
    (conductors.resistance_per_metre, (1.5e-6, "silver", 2), "copper-2"),
    (conductors.typical_reactance_per_metre, (1.5e-6, "overhead"), "multicore"),
    (ampacity.ampacity, (1.5e-6, "H", "pvc-70", "copper", 2), "A1, A2"),
    (ampacity.ampacity, (1.5e-6, "C", "pvc-70", "copper", 4), "pvc-70-2"),
    (ampacity.ampacity, (1.5e-6, "C", "pvc-70", "gold", 2), "copper, aluminium"),
    (ampacity.ampacity, (10e-6, "D2", "pvc-70", "aluminium", 2), "16, 25"),
    (ampacity.open_laying_ampacity, (1.5e-6, "F-trefoil"), "25, 35"),
    (ampacity.ambient_factor, (42.0, "pvc-70", "C"), "40, 45"),
    (ampacity.ambient_factor, (65.0, "pvc-70", "C"), "55, 60"),
    (ampacity.ambient_factor, (40.0, "paper", "C"), "pvc-70"),
    (ampacity.highest_temperature, ("paper",), "pvc-70"),
    (ampacity.reference_ambient, ("H",), "A1"),
    (ampacity.grouping_factor, (3, "heap"), "bunched"),
    (ampacity.grouping_factor, (10, "wall"), "1 to 9"),
    (ampacity.grouping_factor, (2, "bunched", "D1"), "cables in air"),
    (ampacity.soil_factor, (1.2, "D1"), "0.5, 0.7"),
    (materials.inferred_zero, ("gold",), "copper"),
    (materials.winding_zero, ("steel",), "aluminium"),
    (materials.rounded_temperature_factor, (65.0,), "60, 70"),
    (us_conductors.direct_resistance_per_metre, ("6", "copper", "solid"), "14, 12, 10, 8"),
    (us_conductors.direct_resistance_per_metre, ("14", "copper", "braided"), "copper-stranded"),
    (us_conductors.alternating_resistance_per_metre, ("14", "aluminium", "pvc"), "12, 10"),
    (devices.instantaneous_band, ("K",), "B, C, D"),
    (devices.fuse_conventional, (17.0,), "16, 20"),
    (devices.fuse_gate, (200.0, "largest_5s"), "160"),
    (devices.fuse_gate, (16.0, "largest_1s"), "largest_5s"),
    (devices.disconnection_time, (230.0, "IT", "ac"), "TN-ac"),
    (devices.disconnection_time, (48.0, "TN", "ac"), "above 50 V"),
    (devices.disconnection_time, (math.nan, "TN", "ac"), "above 50 V"),
    (devices.disconnection_time, (110.0, "TN", "dc"), "demands no time"),
    (devices.constant, ("guess",), "voltage-factor"),
    (short_circuit.live_conductor, ("paper", "copper"), "pvc-70"),
    (short_circuit.live_conductor, ("pvc-70", "steel"), "copper, aluminium"),
    (contacts.category_duty, ("AC-99",), "AC-15"),
    (contacts.category_use, ("AC-99",), "DC-14"),
    (contacts.pilot_duty_ac, ("A300", 400.0), "up to 300 V"),
    (contacts.pilot_duty_ac, ("Z300", 120.0), "A150"),
    (contacts.pilot_duty_dc, ("N150", 250.0), "up to 150 V"),
    (contacts.pilot_duty_dc, ("N150", math.nan), "up to 150 V"),
    (contacts.smallest_load, ("platinum",), "silver-nickel"),
    (coils.voltage_window, ("contactor", "stay"), "close"),
    (coils.voltage_window, ("door", "close"), "contactor"),
    (coils.cable_capacitance_per_metre, ("wireless",), "two-wire"),
    (thermal.thermal_class_temperature, ("131",), "130"),
    (thermal.class_of_letter, ("Z",), "A, E, B"),
    (thermal.intermittent_duty, ("2",), "0.1"),
    (capacitors.discharge_limit, ("hearsay",), "IEC 60831-1"),
    (capacitors.motor_correction, (12e3, 1500.0), "11, 15"),
    (motors.three_phase_current, (4.0,), "3, 5"),
    (motors.single_phase_current, ("1/3", 400.0), "115, 230"),
    (motors.locked_rotor_band, ("I",), "A, B"),
    (meters.in_line_input, ("pocket",), "handheld"),
    (meters.category_impulse, ("I", 300.0), "II, III, IV"),
    (supply.harmonic_limit, (26,), "2, 3, 4"),
    (supply.machine_window, ("dc-solar",), "dc-battery"),
    (supply.drop_limit, ("public", "motors"), "lighting"),
    (supply.smallest_section, ("data-outside", "two_core_screened"), "three_core_or_more"),
    (preferred.series, ("E13",), "E12"),
    (preferred.preferred_value, (0.0, "E12", "up"), "above zero"),
    (preferred.preferred_value, (math.nan, "E12", "up"), "above zero"),
    (preferred.preferred_section, (400e-6, "up"), "0.0003"),
]  # fmt: skip


@pytest.mark.parametrize(("look_up", "asked", "told"), REFUSED)
def test_what_is_not_tabled_is_refused_and_the_refusal_says_what_is(
    look_up: Callable[..., Any], asked: tuple[Any, ...], told: str
) -> None:
    with pytest.raises(OutOfTable) as refused:
        look_up(*asked)
    assert told in str(refused.value)


@pytest.mark.parametrize("nearly", [1.0 + 5e-10, 1.0 - 5e-10])
def test_a_section_out_by_the_last_digits_of_a_change_of_unit_is_still_itself(nearly: float) -> None:
    assert conductors.resistance_per_metre(1.5e-6 * nearly, "copper", 2)[0] == pytest.approx(12.1e-3)


@pytest.mark.parametrize("off", [1.0 + 2e-9, 1.0 - 2e-9])
def test_a_section_out_by_more_is_another(off: float) -> None:
    with pytest.raises(OutOfTable):
        conductors.resistance_per_metre(1.5e-6 * off, "copper", 2)


def test_a_doubtful_cell_carries_its_doubt() -> None:
    assert "26 A" in ampacity.ampacity(4e-6, "C", "pvc-70", "aluminium", 2)[1].note
    assert ampacity.ampacity(6e-6, "C", "pvc-70", "aluminium", 2)[1].note == ""
    assert "1 s" in devices.disconnection_time(230.0, "TN", "dc")[1].note
    assert "0.12" in us_conductors.alternating_resistance_per_metre("1/0", "copper", "aluminium")[1].note


def test_nothing_of_the_three_wire_xlpe_table_passes_for_read() -> None:
    for metal in ("copper", "aluminium"):
        for row in data("ampacity")["tables"]["xlpe-90-3"][metal]["rows"]:
            for method in ("A1", "A2", "B1", "B2", "C", "D1"):
                assert ampacity.ampacity(row[0] * 1e-6, method, "xlpe-90", metal, 3)[1].known == MEMORY


def test_breakers_and_fuses_have_the_bands_of_their_standards() -> None:
    assert devices.instantaneous_band("C")[:2] == (5.0, 10.0)  # IEC 60898-1 (read)
    assert devices.instantaneous_band("C")[2].known == "read"
    assert devices.instantaneous_band("B")[:2] == (3.0, 5.0)  # value from memory
    assert devices.instantaneous_band("B")[2].known == MEMORY
    assert devices.breaker_conventional()[:2] == (1.13, 1.45)  # IEC 60898-1, table 7 (read)
    assert devices.fuse_conventional(10.0)[:2] == (1.5, 1.9)  # IEC 60269-1 (value from memory)
    assert devices.fuse_conventional(16.0)[:2] == (1.25, 1.6)
    assert all(devices.fuse_conventional(one)[1] >= 1.6 for one in devices.fuse_ratings()[0])
    assert 32.0 in devices.breaker_ratings()[0]


def test_a_fuse_melts_within_a_tenth_where_one_of_1_6_times_the_rating_holds() -> None:
    """Selectivity rule of IEC 60269-1 (value from memory): for 16 A to 160 A, whose gates are tabled in that ratio."""
    pairs = [(16.0, 25.0), (20.0, 32.0), (25.0, 40.0), (32.0, 50.0), (40.0, 63.0), (50.0, 80.0), (63.0, 100.0),
             (80.0, 125.0), (100.0, 160.0)]  # fmt: skip
    for small, large in pairs:
        assert devices.fuse_gate(small, "largest_100ms")[0] == devices.fuse_gate(large, "smallest_100ms")[0]


def test_fuse_gates_grow_with_the_rating_and_shrink_with_time() -> None:
    ratings = [row[0] for row in data("devices")["fuse-gates"]["rows"]]
    for gate in ("smallest_10s", "largest_5s", "smallest_100ms", "largest_100ms"):
        values = [devices.fuse_gate(one, gate)[0] for one in ratings]
        assert values == sorted(set(values))
    for one in ratings:
        assert devices.fuse_gate(one, "smallest_10s")[0] < devices.fuse_gate(one, "largest_5s")[0]
        assert devices.fuse_gate(one, "smallest_100ms")[0] < devices.fuse_gate(one, "largest_100ms")[0]


def test_contacts_make_and_break_what_their_category_says() -> None:
    heavy = contacts.category_duty("AC-15")  # IEC 60947-5-1, through a handbook (read)
    assert (heavy.make, heavy.breaking, heavy.make_power_factor) == (10, 1, 0.3)
    motor = contacts.category_duty("AC-3")  # IEC 60947-4-1 (read)
    assert (motor.make, motor.breaking, motor.source.known) == (10, 8, "read")
    assert contacts.category_duty("AC-4").source.known == MEMORY
    assert contacts.category_duty("DC-13").make_power_factor is None
    assert contacts.category_use("AC-15") != contacts.category_use("AC-14")
    assert contacts.category_use("DC-14")[1].known == MEMORY


# NEMA ICS 5 pilot-duty codes (read): amperes at 120 V and 240 V, volt-amperes between.
@pytest.mark.parametrize(
    ("code", "voltage", "make", "breaking"),
    [("A300", 120.0, 60.0, 6.0), ("A300", 240.0, 30.0, 3.0), ("A600", 480.0, 15.0, 1.5), ("D300", 120.0, 3.6, 0.6),
     ("A300", 200.0, 36.0, 3.6), ("A300", 24.0, 60.0, 6.0)],
)  # fmt: skip
def test_alternating_pilot_duty_is_the_one_printed(code: str, voltage: float, make: float, breaking: float) -> None:
    found = contacts.pilot_duty_ac(code, voltage)
    assert (found.make, found.breaking) == (pytest.approx(make), pytest.approx(breaking))


@pytest.mark.parametrize(
    ("code", "voltage", "amperes"),
    [("N300", 125.0, 2.2), ("N300", 250.0, 1.1), ("R300", 24.0, 1.0), ("R300", 250.0, 0.11), ("N600", 400.0, 0.4),
     ("P300", 48.0, 138.0 / 48.0)],
)  # fmt: skip
def test_direct_pilot_duty_is_the_one_printed(code: str, voltage: float, amperes: float) -> None:
    found = contacts.pilot_duty_dc(code, voltage)
    assert (found.make, found.breaking) == (pytest.approx(amperes), pytest.approx(amperes))


def test_pilot_duty_never_grows_with_the_voltage() -> None:
    for code in data("contacts")["pilot-duty-ac"]["codes"]:
        made = [contacts.pilot_duty_ac(code, float(one)).make for one in range(5, int(code[1:]) + 1, 5)]
        assert made == sorted(made, reverse=True)


def test_windows_limits_and_bands_of_coils_capacitors_motors_and_meters() -> None:
    assert coils.voltage_window("contactor", "close")[:2] == (0.85, 1.1)  # IEC 60947-4-1 (value from memory)
    assert coils.voltage_window("contactor", "open-dc")[:2] == (0.1, 0.75)
    assert coils.voltage_window("release", "close")[2].known == "read"  # IEC 60947-2
    assert coils.inrush_over_sealed()[:2] == (3.0, 15.0)
    assert coils.varistor_added_release()[:2] == (0.002, 0.005)
    assert contacts.smallest_load("gold-5um")[:2] == (0.005, 5.0)
    assert contacts.smallest_load("contactor-auxiliary")[:2] == (0.005, None)
    assert thermal.class_of_letter("F")[0] == "155"  # IEC 60085 (read)
    assert thermal.intermittent_duty("0.1")[:2] == (300.0, 180.0)
    assert capacitors.capacitance_tolerance()[:2] == (-0.05, 0.1)
    assert capacitors.discharge_limit("IEC 60831-1")[:2] == (75.0, 180.0)
    assert capacitors.discharge_limit("NEC 460.6")[:2] == (50.0, 60.0)
    assert capacitors.resonance_distance()[0] == 0.35
    assert motors.locked_rotor_band("G")[:2] == (5600.0, 6290.0)  # NEC, table 430.7(B) (read)
    assert motors.locked_rotor_band("H")[2].known == MEMORY
    assert motors.locked_rotor_band("V")[1] == math.inf
    assert motors.start_over_rated()[:2] == (5.0, 8.0)
    assert motors.first_half_wave()[:2] == (1.8, 2.8)  # IEC 60034-12 (read)
    assert motors.start_power_factor()[:2] == (0.2, 0.4)
    assert meters.in_line_input("handheld")[:2] == (10.0, 15.0)
    assert "socket outlets" in meters.category_place("III")[0]
    assert supply.frequency_band("interconnected")[:2] == (0.01, 0.995)
    assert supply.machine_window("dc-battery")[:2] == (0.85, 1.15)
    assert "230/400" in supply.nominal_voltages("50")[0]


def test_letter_bands_of_locked_rotors_follow_each_other_without_a_gap() -> None:
    rows = data("motors")["code-letter"]["rows"]
    for (_, _, high), (_, low, _) in pairwise(rows):
        assert low == pytest.approx(high + 0.01)


def test_preferred_values_follow_the_series_of_the_standard() -> None:
    """IEC 60063 (read): each E series divides the decade evenly by ratio, printed to two digits, with known exceptions."""
    for name, count in (("E3", 3), ("E6", 6), ("E12", 12), ("E24", 24)):
        values, _ = preferred.series(name)
        assert len(values) == count
        for place, value in enumerate(values):
            assert value == pytest.approx(10.0 ** (place / count), rel=0.055)
    assert set(preferred.series("E3")[0]) < set(preferred.series("E6")[0]) < set(preferred.series("E12")[0])
    assert set(preferred.series("E12")[0]) < set(preferred.series("E24")[0])


def test_the_next_preferred_value_lies_where_it_is_asked_for() -> None:
    assert preferred.preferred_value(16.1e-6, "E12", "down")[0] == pytest.approx(15e-6)
    assert preferred.preferred_value(16.1e-6, "E12", "up")[0] == pytest.approx(18e-6)
    assert preferred.preferred_value(16.1e-6, "E12", "nearest")[0] == pytest.approx(15e-6)
    assert preferred.preferred_value(9.5, "E12", "up")[0] == pytest.approx(10.0)
    assert preferred.preferred_value(1.0, "E3", "down")[0] == pytest.approx(1.0)
    assert preferred.preferred_value(0.99, "E3", "down")[0] == pytest.approx(0.47)
    assert preferred.preferred_section(1.6e-6, "up")[0] == pytest.approx(2.5e-6)
    assert preferred.preferred_section(1.6e-6, "down")[0] == pytest.approx(1.5e-6)
    assert preferred.preferred_section(2.5e-6, "up")[0] == pytest.approx(2.5e-6)
    assert preferred.next_rating(11.0, devices.breaker_ratings()[0], "up") == 13.0
    assert preferred.correction_steps("metric")[0][0] == 2500.0


@pytest.mark.parametrize("exponent", range(-12, 7))
def test_every_preferred_value_is_its_own_neighbour_in_every_decade(exponent: int) -> None:
    for digit in preferred.series("E24")[0]:
        value = digit * 10.0**exponent
        for towards in ("down", "up", "nearest"):
            assert preferred.preferred_value(value, "E24", towards)[0] == pytest.approx(value, rel=1e-9)
