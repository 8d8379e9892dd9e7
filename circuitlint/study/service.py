"""Coils, contacts and capacitors in service: letting go, pulling in hot, holding in, switching off, compensating."""

from __future__ import annotations

from circuitlint import si
from circuitlint.definition.models import CircuitEntry
from circuitlint.errors import OutOfTable
from circuitlint.physics import (
    capacitors,
    coil_closing,
    contact_duty,
    duties,
    metering,
    power_factor,
    switching_off,
    switching_on,
)
from circuitlint.sources import Source
from circuitlint.study.data import DataSheet
from circuitlint.study.feeding import Feed
from circuitlint.study.plan import Plan
from circuitlint.study.worksheet import Key
from circuitlint.tables import capacitors as capacitor_table
from circuitlint.tables import contacts

DIODE = Source("forward voltage of a silicon diode, 0.6 V to 1.2 V", known="common practice")
REFERENCE = Source("pull-in voltages are stated at 20 °C", known="common practice")
NINETY_FIVE = Source("IEC 60947-5-1", "time to 95 % of the settled current", known="read")
ONE_RESISTOR = Source("one resistor across one capacitor")
ONE_COIL = "the closed form holds for one coil on direct current"
SWITCHING = ("rated_current", "rated_voltage", "withstand", "smallest_current", "leakage_current", "release_within", "operations")
SUPPRESSOR = ("clamp_voltage", "resistance", "energy", "power")
METER = ("burden_voltage", "resolution", "test_current", "range")
RESIDUALS = {"75": "IEC 60831-1", "50": "NEC 460.6"}


def collect(entry: CircuitEntry, feed: Feed, sheet: DataSheet) -> None:
    """Note what the definition says of contact, suppressor, meter and control cable; nothing where it is silent."""
    sheet.state("duty", entry.duty)
    for index, run in enumerate(entry.cable or ()):
        sheet.state(f"cable[{index}].capacitance", run.capacitance)
    for word in METER if entry.meter is not None else ():
        sheet.state(f"meter.{word}", getattr(entry.meter, word))
    _exact(sheet, "pull-in reference", si.TEMPERATURE, 20.0, REFERENCE)
    _exact(sheet, "share settled", si.RATIO, 0.95, NINETY_FIVE)
    if any(path.endswith(".discharge_resistance") for path in sheet.data):
        _exact(sheet, "discharge connection", si.RATIO, 1.0, ONE_RESISTOR)
        for volt, rule in RESIDUALS.items():
            left, _, source = capacitor_table.discharge_limit(rule)
            _exact(sheet, f"residual {volt} V", si.VOLTAGE, left, source)
    if entry.suppressor is not None:
        sheet.token("suppressor", entry.suppressor.kind)
        for word in SUPPRESSOR:
            sheet.state(f"suppressor.{word}", getattr(entry.suppressor, word))
        if entry.suppressor.kind == "diode":
            sheet.assume("suppressor.clamp_voltage", si.VOLTAGE, 0.9, 0.6, 1.2, DIODE)
    if entry.switching is not None:
        for word in SWITCHING:
            sheet.state(f"switching.{word}", getattr(entry.switching, word))
        _collect_duty(entry, feed, sheet)


def _exact(sheet: DataSheet, path: str, dimension: si.Dimension, value: float, source: Source) -> None:
    sheet.assume(path, dimension, value, value, value, source)


def _collect_duty(entry: CircuitEntry, feed: Feed, sheet: DataSheet) -> None:
    """What the contact may make and break, from its category and rated current or from its pilot-duty code."""
    switching = entry.switching
    assert switching is not None
    category = switching.category
    paths = ("switching.make_current", "switching.break_current")
    if category is None:
        for path in paths:
            sheet.lack(path, "switching.category", why="what the contact is made for is not known")
        return
    try:
        if "-" in category:
            duty = contacts.category_duty(category)
            if switching.rated_current is None:
                for path in paths:
                    sheet.lack(path, "switching.rated_current", why="what the contact may switch is not known")
                return
            made, broken, source = duty.make, duty.breaking, duty.source
            made, broken = made * switching.rated_current.low, broken * switching.rated_current.low
        else:
            table = contacts.pilot_duty_dc if feed.kind == "dc" else contacts.pilot_duty_ac
            pilot = table(category, feed.supply.voltage.nominal * feed.scale)
            made, broken, source = pilot.make, pilot.breaking, pilot.source
        for path, value in zip(paths, (made, broken), strict=True):
            sheet.table(path, si.CURRENT, value, source)
        per_watt, _ = contacts.time_to_95_percent(1.0)
        longest, where = contacts.time_to_95_percent(1e6)
        _exact(sheet, "proven time per watt", si.TIME_PER_POWER, per_watt, where)
        _exact(sheet, "longest proven time", si.TIME, longest, where)
    except OutOfTable as error:
        for path in paths:
            sheet.lack(path, why=str(error))


def write(plan: Plan, way: tuple[str, ...]) -> None:
    """Write the figures each state has of its coils, its contact, its cable and its capacitors."""
    name = plan.state.name
    coils = [place for place, kind in plan.leaves if kind.name == "coil"]
    if name == "cold":
        _write_switching(plan, coils)
        _write_meter(plan, coils)
        if not plan.direct:
            _write_held_in(plan, coils, way)
    if name == "steady" and plan.direct:
        for place in coils:
            _write_pull_in(plan, place)
    if name in ("cold", "steady") and not plan.direct:
        _write_capacitors(plan)


def _write_switching(plan: Plan, coils: list[str]) -> None:
    """Switching off with a suppressor, and how slow the coil is for its contact."""
    put = plan.sheet.put
    kind = plan.token("suppressor")
    voltage = Key("voltage", "")
    if kind in ("diode", "zener", "varistor"):
        formula = switching_off.clamped_peak if plan.direct else duties.clamped_peak_alternating
        put("switch-off-peak", "", formula, supply=voltage, clamp_voltage=plan.datum("suppressor.clamp_voltage"))
    elif kind == "resistor" and plan.direct:
        put("switch-off-peak", "", switching_off.peak_with_resistor, supply=voltage, current=Key("current", ""),
            parallel_resistance=plan.datum("suppressor.resistance"))
    elif kind == "resistor":
        plan.sheet.lack("switch-off-peak", "", why=ONE_COIL)
    for place in coils if plan.direct else ():
        if plan.has("longest proven time"):
            slow = put("rise-time", place, contact_duty.time_to_share, time_constant=Key("time-constant", place),
                       share=plan.datum("share settled"))
            proven = put("proven-time", place, contact_duty.category_time, time_per_watt=plan.datum("proven time per watt"),
                         power=Key("active-power", place), longest=plan.datum("longest proven time"))
            put("rise-time-share", place, duties.share_of_time, time=slow, proven=proven)
    if len(coils) == 1 and plan.direct:
        _write_release(plan, coils[0], kind)
    elif plan.has("switching.release_within"):
        plan.sheet.lack("release-time", "", why=ONE_COIL)


def _write_release(plan: Plan, place: str, kind: str) -> None:
    """Decay of one coil's current through its suppressor, and what the suppressor has to take."""
    put, sheet = plan.sheet.put, plan.sheet
    line = sheet.index.get(Key("time-constant", place))
    if kind not in ("diode", "zener", "varistor") or line is None:
        if plan.has("switching.release_within"):
            needs = () if kind else ("suppressor",)
            sheet.lack("release-time", "", *needs, why="how the current decays is not known without a clamp voltage")
        return
    inductance = line.arguments["inductance"]
    current, resistance = Key("current", place), Key("resistance", place)
    clamp = plan.datum("suppressor.clamp_voltage")
    energy = put("suppressor-energy", "", switching_off.clamp_energy, clamp_voltage=clamp, inductance=inductance,
                 resistance=resistance, current=current)
    if plan.has("suppressor.power"):
        put("suppressor-power", "", switching_off.mean_clamp_power, energy=energy, rate=plan.datum("switching.operations"))
    if plan.has("switching.release_within"):
        release = put("release-time", "", switching_off.release_time, current=current, clamp_voltage=clamp,
                      drop_out_current=plan.datum(f"{place}.drop_out_current"), inductance=inductance, resistance=resistance)
        sheet.apart.add(release)


def _write_meter(plan: Plan, coils: list[str]) -> None:
    put = plan.sheet.put
    if plan.has("meter.burden_voltage"):
        put("burden-voltage", "", metering.burden_voltage, full_scale_burden=plan.datum("meter.burden_voltage"),
            current=Key("current", ""), meter_range=plan.datum("meter.range"))
    for place in coils if plan.has("meter.test_current") else ():
        line = plan.sheet.index.get(Key("time-constant", place))
        if line is None:
            plan.sheet.lack("test-energy", place, f"{place}.inductance", why="the inductance is not known")
            continue
        put("test-energy", place, switching_on.stored_energy, inductance=line.arguments["inductance"],
            current=plan.datum("meter.test_current"))


def _write_held_in(plan: Plan, coils: list[str], way: tuple[str, ...]) -> None:
    """Whether the control cable's capacitance holds a coil in when the contact at its start opens."""
    put = plan.sheet.put
    runs = [place for place in way if place.startswith("cable")]
    if not any(plan.has(f"{place}.capacitance") for place in runs):
        return
    held = put("cable-capacitance", "", duties.cable_capacitance,
               per_length=tuple(plan.datum(f"{place}.capacitance") for place in runs),
               lengths=tuple(plan.datum(f"{place}.length") for place in runs))
    for place in coils:
        if len(coils) > 1:
            plan.sheet.lack("held-in-share", place, why="the closed form holds for one coil behind the cable")
            continue
        share = put("drop-out-share", place, coil_closing.drop_out_share, voltage=Key("voltage", ""),
                    drop_out_voltage=plan.datum(f"{place}.drop_out_voltage"))
        permitted = put("permitted-capacitance", place, coil_closing.hold_in_capacitance_with_resistance,
                        drop_out_share=share, impedance=Key("impedance", place), resistance=Key("resistance", place),
                        frequency=plan.frequency())
        put("held-in-share", place, duties.share_of_capacitance, capacitance=held, permitted=permitted)


def _write_pull_in(plan: Plan, place: str) -> None:
    if not plan.has(f"{place}.pull_in_voltage"):
        return
    put = plan.sheet.put
    needed = put("pull-in-voltage", place, coil_closing.hot_pull_in_voltage,
                 pull_in_voltage=plan.datum(f"{place}.pull_in_voltage"), temperature=Key("winding-temperature", place),
                 reference_temperature=plan.datum("pull-in reference"), inferred_zero=plan.datum(f"{place}.inferred_zero"))
    put("pull-in-share", place, duties.share_of_pull_in, pull_in_voltage=needed, voltage=Key("voltage", place))


def _write_capacitors(plan: Plan) -> None:
    """What the capacitors give against what the load takes, resonance with the source, time to discharge."""
    put = plan.sheet.put
    places = [place for place, kind in plan.leaves if kind.name == "capacitor"]
    if not places:
        return
    given = put("given-reactive-power", "", duties.given_reactive_power,
                powers=tuple(Key("reactive-power", place) for place in places))
    # A load without reactive power of its own has no such share.
    share = put("correction-share", "", duties.correction_share, given=given, remaining=Key("reactive-power", ""))
    plan.sheet.apart.add(share)
    if plan.has("supply.fault_current") and plan.state.name == "cold":
        formula, across = (power_factor.three_phase_apparent_power, "line-voltage") if plan.alike else (
            power_factor.apparent_power, "voltage")
        power = put("short-circuit-power", "", formula, voltage=Key(across, ""), current=plan.datum("supply.fault_current"))
        put("resonance-order", "", capacitors.resonance_order, short_circuit_power=power, reactive_power=given)
    for place in places if plan.state.name == "cold" else ():
        for volt in RESIDUALS if plan.has(f"{place}.discharge_resistance") else ():
            put(f"time-to-{volt}-volts", place, capacitors.discharge_time, connection=plan.datum("discharge connection"),
                resistance=plan.datum(f"{place}.discharge_resistance"), capacitance=plan.datum(f"{place}.capacitance"),
                voltage=Key("voltage", place), residual_voltage=plan.datum(f"residual {volt} V"))
