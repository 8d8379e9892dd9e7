"""What protects a circuit, and the figures it is held against: fault current, fault loop, what conductors withstand."""

from __future__ import annotations

import math

from circuitlint import si
from circuitlint.definition.models import Cable, CircuitEntry, Protection
from circuitlint.errors import OutOfTable
from circuitlint.physics import duties, fault_loop, phasors
from circuitlint.sources import Source
from circuitlint.study.data import DataSheet
from circuitlint.study.feeding import Feed
from circuitlint.study.plan import Plan
from circuitlint.tables import devices, short_circuit

TO_EARTH = Source("voltage between a line and earth of the supply")
RESIDUAL = Source("a residual-current device operates at its rated residual current", known="common practice")
LONGEST_AT_ONCE = 0.1
"""Seconds within which the instantaneous release of a circuit-breaker has opened (IEC 60898-1)."""


def collect(entry: CircuitEntry, feed: Feed, sheet: DataSheet) -> None:
    """Note what the definition and the tables say of device, supply and conductors; nothing where it is silent."""
    supply = feed.supply
    sheet.state("supply.fault_current", supply.fault_current)
    sheet.state("supply.loop_impedance", supply.loop_impedance)
    scale = 1.0 / math.sqrt(3.0) if supply.system == "three-phase" else 1.0
    to_earth = supply.voltage.nominal * scale
    sheet.assume("voltage to earth", si.VOLTAGE, to_earth, to_earth, to_earth, TO_EARTH)
    sheet.token("earthing", supply.earthing or "")
    for place, run in (*feed.runs, *((f"cable[{index}]", run) for index, run in enumerate(entry.cable or ()))):
        sheet.state(f"{place}.section", run.section)
        sheet.state(f"{place}.protective_section", run.protective_section)
        if entry.protection is not None and entry.protection.let_through is not None:
            _collect_withstand(place, run, sheet)
    device = entry.protection
    if device is None:
        return
    factor, source = devices.constant("voltage-factor")
    sheet.table("voltage factor", si.RATIO, factor, source)
    for word in ("rating", "breaking_capacity", "let_through", "residual_current"):
        sheet.state(f"protection.{word}", getattr(device, word))
    sheet.token("protection.device", device.device)
    _collect_operating(device, sheet)
    _collect_trip(device, supply.system, to_earth, supply.earthing or "", sheet)


def _collect_withstand(place: str, run: Cable, sheet: DataSheet) -> None:
    if run.insulation is None:
        sheet.lack(f"{place}.withstand", f"{place}.insulation", why="what the insulation withstands is not known")
        return
    try:
        found = short_circuit.live_conductor(run.insulation, run.conductor)
    except OutOfTable as error:
        sheet.lack(f"{place}.withstand", why=str(error))
        return
    sheet.table(f"{place}.withstand", si.WITHSTAND, found.constant, found.source)


def _collect_operating(device: Protection, sheet: DataSheet) -> None:
    """Conventional tripping current, and the current below which the device does not open at once."""
    try:
        if device.device == "fuse":
            _, factor, source = devices.fuse_conventional(device.rating.nominal)
        else:
            _, factor, source = devices.breaker_conventional()
        sheet.table("protection.tripping_current", si.CURRENT, factor * device.rating.high, source)
    except OutOfTable as error:
        sheet.lack("protection.tripping_current", why=str(error))
    if device.curve is None:
        sheet.lack("protection.holds_below", "protection.curve", why="at which current it opens at once is not known")
        return
    try:
        if device.device == "fuse":
            current, source = devices.fuse_gate(device.rating.nominal, "smallest_100ms")
        else:
            low, _, source = devices.instantaneous_band(device.curve)
            current = low * device.rating.low
        sheet.table("protection.holds_below", si.CURRENT, current, source)
    except OutOfTable as error:
        sheet.lack("protection.holds_below", why=str(error))


def _collect_trip(device: Protection, system: str, to_earth: float, earthing: str, sheet: DataSheet) -> None:
    """The current that surely opens the device in the time demanded."""
    path = "protection.operating_current"
    if not earthing:
        sheet.lack(path, "supply.earthing", why="in which time a fault must be disconnected is not known")
        return
    try:
        kind = "dc" if system == "dc" else "ac"
        time, _ = devices.disconnection_time(to_earth, earthing.partition("-")[0], kind)
        if device.residual_current is not None:
            high = device.residual_current.high
            sheet.table(path, si.CURRENT, high, RESIDUAL)
            return
        if device.curve is None:
            sheet.lack(path, "protection.curve", why="at which current it opens at once is not known")
        elif time < LONGEST_AT_ONCE:
            sheet.lack(path, "protection.residual_current", why=f"{time:g} s are less than its tables tell")
        elif device.device == "fuse":
            current, source = devices.fuse_gate(device.rating.nominal, "largest_5s" if time >= 5.0 else "largest_100ms")
            sheet.table(path, si.CURRENT, current, source)
        else:
            _, high, source = devices.instantaneous_band(device.curve)
            sheet.table(path, si.CURRENT, high * device.rating.high, source)
    except OutOfTable as error:
        sheet.lack(path, why=str(error))


def write(plan: Plan, way: tuple[str, ...]) -> None:
    """Write the figures: fault current at the board and withstand of each run cold, the fault loop hot."""
    if plan.state.name == "cold":
        _write_cold(plan, way)
    if plan.state.name == "steady" and not plan.direct:
        _write_loop(plan, way)


def _write_cold(plan: Plan, way: tuple[str, ...]) -> None:
    put = plan.sheet.put
    if plan.has("supply.fault_current"):
        feeders = tuple(plan.phasor("impedance", place) for place in way if place.startswith("feeder"))
        if "feeders" in plan.present.lacks:
            feeders = (plan.datum("feeders"),)
        if feeders:
            total = put("feeder impedance phasor", "", phasors.series_impedance, figure=False, impedances=feeders)
            put("fault-current", "", duties.fault_current_behind, voltage=plan.datum("supply.voltage"),
                fault_current=plan.datum("supply.fault_current"), feeders=total)
    if not plan.has("protection.let_through"):
        return
    for place in way:
        if place.startswith("cable"):
            put("withstand-energy", place, fault_loop.withstand_energy, constant=plan.datum(f"{place}.withstand"),
                section=plan.datum(f"{place}.section"))


def _write_loop(plan: Plan, way: tuple[str, ...]) -> None:
    if not plan.has("protection.rating"):
        return
    put = plan.sheet.put
    runs = []
    for path in ("cable", "feeders"):
        if path in plan.present.lacks:
            runs.append(plan.datum(path))
    for place in way:
        runs.append(put("loop-impedance", place, duties.loop_impedance_of_run, impedance=plan.phasor("impedance", place),
                        conductors=plan.datum("conductors"), section=plan.datum(f"{place}.section"),
                        protective_section=plan.datum(f"{place}.protective_section")))
    loop = put("fault-loop-impedance", "", duties.fault_loop_impedance, external=plan.datum("supply.loop_impedance"),
               runs=tuple(runs))
    put("smallest-fault-current", "", fault_loop.fault_current, voltage_factor=plan.datum("voltage factor"),
        voltage=plan.datum("voltage to earth"), loop_impedance=loop)
