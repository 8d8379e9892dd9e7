"""From the origin to the load: the data of a circuit, and the worksheet of each state."""

from __future__ import annotations

from collections.abc import Sequence

from circuitlint import si
from circuitlint.definition.loads import LoadEntry
from circuitlint.definition.models import Cable, CircuitEntry
from circuitlint.errors import OutOfTable
from circuitlint.physics import conductor_heating, conductors, feeding, phasors, power_factor, steps
from circuitlint.sources import Source
from circuitlint.study import protection, service, switching
from circuitlint.study.data import DataSheet, Datum
from circuitlint.study.extras import write_extras
from circuitlint.study.feeding import Feed
from circuitlint.study.plan import Kinds, Node, Plan, impedance_of, share_out, write_power_figures
from circuitlint.study.states import State
from circuitlint.study.worksheet import Key, Worksheet
from circuitlint.tables import ampacity, materials
from circuitlint.tables import conductors as conductor_table

COLD_REFERENCE = Source("20 °C where no ambient is stated", known="common practice")
WARM_OR_COLD = Source("a conductor may be anywhere between its surroundings and its insulation's limit", known="derived")
TYPICAL_REACTANCE = Source(
    "typical reactance of multicore and single-core cables at 50 Hz, 0.07 to 0.15 Ω/km", "handbook tables", known="read"
)
OTHER = Source("IEC 60038", "50 Hz and 60 Hz are the mains frequencies", known="value from memory")
OTHERS = Source("currents of the others on the boards at nominal values", known="derived")
NEED_HEAT = ("insulation", "method", "ambient", "grouped_circuits")


def collect(
    entry: CircuitEntry, feed: Feed, load: LoadEntry, kinds: Kinds, others: complex | None = None, unknown: Sequence[str] = ()
) -> DataSheet:
    """Every number the study of one circuit starts from. `others` is what the others drop, over the nominal loop voltage."""
    sheet, supply = DataSheet(), feed.supply
    sheet.token("feed", feed.kind)
    stated = supply.voltage
    sheet.data["supply.voltage"] = Datum(
        "supply.voltage", si.VOLTAGE, stated.nominal * feed.scale, stated.low * feed.scale, stated.high * feed.scale,
        text=stated.text,
    )
    _collect_upstream(sheet, feed, others, unknown)
    at = supply.frequency.nominal if supply.frequency else 50.0
    _exact(sheet, "cable frequency", si.FREQUENCY, at, Source("the cables' reactance holds at the supply's frequency"))
    back = Source("three phases alike: no current flows back" if feed.balanced else "the current flows out and back")
    _exact(sheet, "conductors", si.RATIO, 1.0 if feed.balanced else 2.0, back)
    _exact(sheet, "supply.nominal_voltage", si.VOLTAGE, stated.nominal * feed.scale, Source("nominal voltage of the supply"))
    if supply.frequency is not None:
        sheet.state("supply.frequency", supply.frequency)
        _exact(sheet, "supply.nominal_frequency", si.FREQUENCY, supply.frequency.nominal, Source("nominal frequency"))
        other = 60.0 if abs(supply.frequency.nominal - 50.0) < abs(supply.frequency.nominal - 60.0) else 50.0
        _exact(sheet, "other frequency", si.FREQUENCY, other, OTHER)
    else:
        _exact(sheet, "mains frequency", si.FREQUENCY, 50.0, OTHER)
    if not sheet.state("ambient", entry.ambient):
        sheet.assume("assumed ambient", si.TEMPERATURE, 20.0, 20.0, 20.0, COLD_REFERENCE)
        sheet.lack("ambient", "ambient", why="the temperature around the load is not stated")
    if entry.cable is None:
        sheet.lack("cable", "cable, or `cable: []` where there is none", why="the way to the load is not stated")
    for index, run in enumerate(entry.cable or ()):
        _collect_cable(sheet, f"cable[{index}]", run, feed)
    if entry.correction is not None:
        kinds["capacitor"].data(entry.correction, "correction", sheet)
    for place, number in counts_of(load, "load"):
        _exact(sheet, f"{place}.count", si.RATIO, float(number), Source("the definition"))
    for place, kind, part in leaves_of(load, "load"):
        kinds[kind].data(part, place, sheet)
    protection.collect(entry, feed, sheet)
    service.collect(entry, feed, sheet)
    return sheet


def _exact(sheet: DataSheet, path: str, dimension: si.Dimension, value: float, source: Source) -> None:
    sheet.assume(path, dimension, value, value, value, source)


def _collect_upstream(sheet: DataSheet, feed: Feed, others: complex | None, unknown: Sequence[str]) -> None:
    """Feeders on the way, and what the others on the boards drop along them; they may run or not."""
    for path in feed.missing:
        sheet.lack("feeders", path, why="the way from the origin to the board is not stated")
    for place, run in feed.runs:
        _collect_cable(sheet, place, run, feed)
    if unknown and feed.boards:
        sheet.lack("feeders", *(f"the data of {tag}" for tag in unknown), why="what the others on the boards draw is not known")
    if others is None or not feed.boards:
        return
    sheet.token("others", "known")
    _exact(sheet, "others' drop in phase", si.RATIO, others.real, OTHERS)
    _exact(sheet, "others' drop across", si.RATIO, others.imag, OTHERS)
    sheet.assume("others running", si.RATIO, 1.0, 0.0, 1.0, OTHERS)


def _collect_cable(sheet: DataSheet, place: str, run: Cable, feed: Feed) -> None:
    supply = feed.supply
    sheet.state(f"{place}.length", run.length)
    section = run.section.nominal
    zero, source = materials.inferred_zero(run.conductor)
    sheet.table(f"{place}.inferred_zero", si.TEMPERATURE_RISE, zero, source)
    try:
        if run.conductor_class is not None:
            value, source = conductor_table.resistance_per_metre(section, run.conductor, int(run.conductor_class))
            sheet.table(f"{place}.resistance_per_metre", si.RESISTANCE_PER_LENGTH, value, source)
        else:
            value, source = conductor_table.resistance_per_metre(section, run.conductor, 2)
            try:
                other, _ = conductor_table.resistance_per_metre(section, run.conductor, 5)
            except OutOfTable:
                other = value
            sheet.table(f"{place}.resistance_per_metre", si.RESISTANCE_PER_LENGTH, value, source,
                        min(value, other), max(value, other))
    except OutOfTable as error:
        sheet.lack(f"{place}.resistance_per_metre", f"{place}.section", why=str(error))
    if run.reactance is not None:
        sheet.state(f"{place}.reactance", run.reactance)
    else:
        scale = 1e-3 * (supply.frequency.nominal if supply.frequency else 50.0) / 50.0
        sheet.assume(f"{place}.reactance", si.RESISTANCE_PER_LENGTH, 0.1 * scale, 0.07 * scale, 0.15 * scale,
                     TYPICAL_REACTANCE)
    _collect_heat(sheet, place, run, 3 if feed.balanced else 2, shared=place.startswith("feeder"))


def _collect_heat(sheet: DataSheet, place: str, run: Cable, loaded: int, shared: bool) -> None:
    """What the conductor's temperature needs; where it is not stated, the range it can lie in."""
    absent = tuple(f"{place}.{word}" for word in NEED_HEAT if getattr(run, word) is None)
    if shared:
        absent = ("the current of the whole board",)
    highest = ampacity.highest_temperature(run.insulation)[0] if run.insulation else 90.0
    if not sheet.state(f"{place}.ambient", run.ambient):
        sheet.assume(f"assumed {place}.ambient", si.TEMPERATURE, 20.0, 20.0, 20.0, COLD_REFERENCE)
        low = nominal = 20.0
    else:
        assert run.ambient is not None
        low, nominal = run.ambient.low, run.ambient.nominal
    high = max(highest, nominal)
    sheet.assume(f"{place}.temperature at switch-on", si.TEMPERATURE, nominal, low, high, WARM_OR_COLD)
    if absent:
        why = "how warm the conductor runs is not known"
        _no_heat(sheet, place, absent, why)
        sheet.assume(f"{place}.temperature in service", si.TEMPERATURE, high, low, high, WARM_OR_COLD)
        return
    assert run.insulation and run.method and run.grouped_circuits and run.ambient
    try:
        tabled, source = ampacity.ampacity(run.section.nominal, run.method, run.insulation, run.conductor, loaded)
        sheet.table(f"{place}.tabled_ampacity", si.CURRENT, tabled, source)
        factor, source = ampacity.grouping_factor(run.grouped_circuits, "bunched", run.method)
        sheet.table(f"{place}.grouping_factor", si.RATIO, factor, source)
    except OutOfTable as error:
        _no_heat(sheet, place, (f"{place}.section", f"{place}.method"), str(error))
        sheet.assume(f"{place}.temperature in service", si.TEMPERATURE, high, low, high, WARM_OR_COLD)
        return
    limit, source = ampacity.highest_temperature(run.insulation)
    sheet.table(f"{place}.highest_temperature", si.TEMPERATURE, limit, source)
    reference, source = ampacity.reference_ambient(run.method)
    sheet.table(f"{place}.reference_ambient", si.TEMPERATURE, reference, source)


def _no_heat(sheet: DataSheet, place: str, needs: tuple[str, ...], why: str) -> None:
    for word in ("tabled_ampacity", "grouping_factor", "highest_temperature", "reference_ambient"):
        sheet.data.pop(f"{place}.{word}", None)
        sheet.lack(f"{place}.{word}", *needs, why=why)


def leaves_of(load: LoadEntry, place: str) -> list[tuple[str, str, object]]:
    """Place, kind and model of every leaf of a load tree, in order."""
    kind = load.kind
    if kind not in ("series", "parallel"):
        return [(f"{place}.{kind}", kind, load.part)]
    found = []
    for index, one in enumerate(load.part):
        found += leaves_of(one, f"{place}.{kind}[{index}]")
    return found


def counts_of(load: LoadEntry, place: str) -> list[tuple[str, int]]:
    """Places where several equal loads stand, with their number."""
    found = [(place, load.count)] if load.count != 1 else []
    if load.kind in ("series", "parallel"):
        for index, one in enumerate(load.part):
            found += counts_of(one, f"{place}.{load.kind}[{index}]")
    return found


def circuit_tree(entry: CircuitEntry, load: LoadEntry, feed: Feed) -> Node:
    """The load tree of a circuit, inside a delta where it stands between the lines of three phases."""
    tree = tree_of(load, "load")
    # A motor's plate tells what the lines carry, whichever way its windings are joined.
    if feed.balanced and entry.connection == "delta" and load.kind != "motor":
        tree = Node("delta", "delta", (tree,))
    if entry.correction is not None:
        tree = Node("parallel", "terminals", (tree, Node("capacitor", "correction")))
    return tree


def tree_of(load: LoadEntry, place: str) -> Node:
    """The load tree without its numbers."""
    kind = load.kind
    if kind in ("series", "parallel"):
        below = tuple(tree_of(one, f"{place}.{kind}[{index}]") for index, one in enumerate(load.part))
        node = Node(kind, f"{place}.{kind}", below)
    else:
        node = Node(kind, f"{place}.{kind}")
    return node if load.count == 1 else Node("several", place, (node,))


def way_of(feed: Feed, entry: CircuitEntry) -> tuple[str, ...]:
    """Places of every feeder and cable run from the origin to the load."""
    return (*(place for place, _ in feed.runs), *(f"cable[{index}]" for index in range(len(entry.cable or ()))))


def worksheet(state: State, system: str, present: DataSheet, tree: Node, way: tuple[str, ...], kinds: Kinds) -> Worksheet:
    """The lines of one state, from the load upward for impedance and from the origin downward for voltage and current."""
    plan = Plan(Worksheet(), state, system, present)
    put = plan.sheet.put
    if "cable" in present.lacks:
        cables: list[Key] = [plan.datum("cable")]
    else:
        cables = [_cable(plan, place) for place in way]
    if "feeders" in present.lacks:
        cables = [plan.datum("feeders"), *cables]
    load = impedance_of(plan, tree, kinds)
    supply = "supply.voltage" if state.source in ("as supplied", "other frequency") else "supply.nominal_voltage"
    source = put("supply phasor", "", steps.reference_phasor, figure=False, voltage=plan.datum(supply))
    put("voltage", "", phasors.magnitude_of_voltage, voltage=source)
    if plan.alike:
        put("line-voltage", "", feeding.line_voltage, voltage=Key("voltage", ""))
    arriving = _less_others(plan, source)
    if load is None:
        current = put("current phasor", "", steps.blocked_current, figure=False, voltage=source)
        for key in cables:
            if key in plan.sheet.lacks:
                current = plan.sheet.lack("current phasor", "", *plan.sheet.lacks[key].needs)
        terminal = put("voltage phasor", tree.place, steps.shared_voltage, figure=False, voltage=arriving)
    else:
        total = put("impedance phasor", "", phasors.series_impedance, figure=False, impedances=(*cables, load))
        put("resistance", "", steps.resistance_part, impedance=total)
        if not plan.direct:
            put("reactance", "", steps.reactance_part, impedance=total)
        put("impedance", "", steps.magnitude_of_impedance, impedance=total)
        if not plan.direct:
            put("impedance-angle", "", steps.angle_of_impedance, impedance=total)
        current = put("current phasor", "", phasors.current_phasor, figure=False, voltage=arriving, impedance=total)
        terminal = put("voltage phasor", tree.place, phasors.voltage_phasor, figure=False, current=current, impedance=load)
    if load is None:
        put("current", "", phasors.magnitude_of_current, current=current)
    else:
        put("current", "", steps.current_through, voltage=Key("arriving-voltage" if arriving != source else "voltage", ""),
            impedance=Key("impedance", ""))
    write_power_figures(plan, "", source, current)
    for place in way:
        _cable_figures(plan, place, current)
    _drop(plan, terminal)
    entry = put("current phasor", tree.place, steps.shared_current, figure=False, current=current)
    share_out(plan, tree, kinds, terminal, entry)
    if state.name == "switch-on" and load is None:
        plan.sheet.lack("switch-on-peak", "", "the source's impedance", why="only the source limits what charges a capacitor")
    elif state.name == "switch-on":
        switching.write_peak(plan, tree, way, kinds)
    protection.write(plan, way)
    service.write(plan, way)
    write_extras(plan, kinds)
    return plan.sheet.finish()


def _less_others(plan: Plan, source: Key) -> Key:
    """The source less what the others on the boards drop; the source itself where there are none."""
    if plan.token("others") != "known":
        return source
    put = plan.sheet.put
    dropped = put("voltage phasor", "others", feeding.drop_of_the_others, figure=False, voltage=source,
                  share=plan.datum("others running"), in_phase=plan.datum("others' drop in phase"),
                  across=plan.datum("others' drop across"))
    arriving = put("arriving voltage phasor", "", feeding.arriving_voltage, figure=False, sending=source, dropped=dropped)
    put("arriving-voltage", "", phasors.magnitude_of_voltage, voltage=arriving)
    return arriving


def _cable(plan: Plan, place: str) -> Key:
    put = plan.sheet.put
    if plan.state.open_gap and not plan.state.hot:
        temperature = plan.datum(f"{place}.temperature at switch-on")
    elif not plan.state.hot:
        temperature = plan.surroundings(place)
    elif plan.has(f"{place}.tabled_ampacity"):
        temperature = plan.sheet.guess("settled conductor temperature", place, si.TEMPERATURE)
    else:
        temperature = plan.datum(f"{place}.temperature in service")
    per_metre = put("resistance-per-metre", place, conductors.conductor_resistance_at,
                    resistance_per_length_20=plan.datum(f"{place}.resistance_per_metre"), temperature=temperature,
                    inferred_zero=plan.datum(f"{place}.inferred_zero"))
    resistance = put("resistance", place, conductors.run_resistance, resistance_per_length=per_metre,
                     length=plan.datum(f"{place}.length"), conductors=plan.datum("conductors"))
    if plan.direct:
        return put("impedance phasor", place, steps.resistive_impedance, figure=False, resistance=resistance)
    at_frequency = put("reactance-per-metre", place, conductors.reactance_at_frequency,
                       reactance_per_length=plan.datum(f"{place}.reactance"), frequency=plan.frequency(),
                       tabled_frequency=plan.datum("cable frequency"))
    reactance = put("reactance", place, conductors.run_reactance, reactance_per_length=at_frequency,
                    length=plan.datum(f"{place}.length"), conductors=plan.datum("conductors"))
    return put("impedance phasor", place, phasors.impedance_phasor, figure=False, resistance=resistance, reactance=reactance)


def _cable_figures(plan: Plan, place: str, current: Key) -> None:
    put = plan.sheet.put
    flow = put("current", place, phasors.magnitude_of_current, current=current)
    share = put("voltage phasor", place, phasors.voltage_phasor, figure=False, current=current,
                impedance=plan.phasor("impedance", place))
    put("voltage", place, phasors.magnitude_of_voltage, voltage=share)
    put("conductor-loss", place, power_factor.active_power, current=flow, resistance=Key("resistance", place))
    put("loss-per-metre", place, conductor_heating.loss_per_metre, current=flow,
        resistance_per_length=Key("resistance-per-metre", place))
    if not plan.state.hot:
        return
    carried = put("grouped-ampacity", place, steps.grouped_ampacity,
                  tabled=plan.datum(f"{place}.tabled_ampacity"), grouping_factor=plan.datum(f"{place}.grouping_factor"))
    factor = put("ambient-factor", place, conductor_heating.ambient_factor,
                 ambient=plan.datum(f"{place}.ambient"), highest_temperature=plan.datum(f"{place}.highest_temperature"),
                 reference_ambient=plan.datum(f"{place}.reference_ambient"))
    corrected = put("ampacity", place, conductor_heating.corrected_ampacity, tabled=plan.datum(f"{place}.tabled_ampacity"),
        ambient_factor=factor, grouping_factor=plan.datum(f"{place}.grouping_factor"))
    put("ampacity-share", place, steps.share_of_ampacity, current=flow, ampacity=corrected)
    warm = put("conductor-temperature", place, conductor_heating.conductor_temperature, current=flow, ampacity=carried,
               ambient=plan.datum(f"{place}.ambient"), highest_temperature=plan.datum(f"{place}.highest_temperature"),
               reference_ambient=plan.datum(f"{place}.reference_ambient"),
               inferred_zero=plan.datum(f"{place}.inferred_zero"))
    if plan.has(f"{place}.tabled_ampacity"):
        plan.sheet.settle(Key("settled conductor temperature", place), warm, plan.datum(f"{place}.ambient"))


def _drop(plan: Plan, terminal: Key) -> None:
    put = plan.sheet.put
    receiving = put("terminal-voltage", "", phasors.magnitude_of_voltage, voltage=terminal)
    drop = put("voltage-drop", "", conductors.voltage_drop, sending=Key("voltage", ""), receiving=receiving)
    put("voltage-drop-share", "", conductors.drop_share, drop=drop, nominal=plan.datum("supply.nominal_voltage"))
