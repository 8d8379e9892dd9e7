"""The crest of the first current wave: a closed form for one path, the natural modes of the network for several."""

from __future__ import annotations

from circuitlint.physics import switching_on
from circuitlint.physics.one_ports import Branch, jumps
from circuitlint.physics.transients import switch_on_peak_of
from circuitlint.study.plan import Kinds, Node, Plan
from circuitlint.study.worksheet import Key

PEAK = "switch-on-peak"
NOT_LINEAR = "the first current wave is known for resistances, inductances and capacitances that do not change with current"
UNBOUNDED = "nothing stated limits the first current into a capacitor straight across the supply"


def write_peak(plan: Plan, tree: Node, way: tuple[str, ...], kinds: Kinds) -> None:
    """Write `switch-on-peak` of the circuit at the worst moment of closing; lacking where a part is not linear."""
    put = plan.sheet.put
    if plan.direct:
        put(PEAK, "", switching_on.direct_current, voltage=Key("voltage", ""), resistance=Key("resistance", ""))
        return
    keys: list[Key] = []
    load = _branch(plan, tree, kinds, keys)
    if load is None:
        plan.sheet.lack(PEAK, "", "a load of coils, resistors, impedances and capacitors", why=NOT_LINEAR)
        return
    if _one_path(load):
        put(PEAK, "", switching_on.switch_on_peak, current_rms=Key("current", ""), resistance=Key("resistance", ""),
            reactance=Key("reactance", ""))
        return
    for place in way:
        keys.append(plan.phasor("impedance", place))
    count = len(keys) - len(way)
    network = Branch("series", (*(Branch("coil", (), (count + at,)) for at in range(len(way))), load))
    if jumps(network):
        plan.sheet.lack(PEAK, "", "the cable, or a source impedance", why=UNBOUNDED)
        return
    voltage = Key("arriving-voltage", "")
    if voltage not in plan.sheet.index:
        voltage = Key("voltage", "")
    found = put(PEAK, "", switch_on_peak_of(network), voltage=voltage, frequency=plan.frequency(), impedances=tuple(keys))
    plan.sheet.apart.add(found)


def _branch(plan: Plan, node: Node, kinds: Kinds, keys: list[Key]) -> Branch | None:
    """The node as a branch, the numbers it takes added to `keys`; None where a part is not linear."""
    if node.kind in ("series", "parallel", "delta", "several"):
        parts = [_branch(plan, one, kinds, keys) for one in node.nodes]
        whole = tuple(one for one in parts if one is not None)
        if len(whole) < len(parts):
            return None
        if node.kind != "several":
            return Branch("series" if node.kind == "series" else "parallel" if node.kind == "parallel" else "delta", whole)
        keys.append(plan.datum(f"{node.place}.count"))
        return Branch("several", whole, (len(keys) - 1,))
    found = kinds[node.kind].network(plan, node.place)
    if found is None:
        return None
    kind, needed = found
    keys.extend(needed)
    return Branch(kind, (), tuple(range(len(keys) - len(needed), len(keys))))


def _one_path(branch: Branch) -> bool:
    """Whether one current flows through resistances and inductances only, as far as the line can tell."""
    if branch.kind == "parallel":
        return len(branch.parts) == 1 and _one_path(branch.parts[0])
    if branch.parts:
        return all(_one_path(one) for one in branch.parts)
    return branch.kind in ("coil", "resistor")
