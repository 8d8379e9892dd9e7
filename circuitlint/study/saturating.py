"""The choke whose inductance falls with its current: the current that agrees with its own inductance.

Flux linkage rises with current in every law and table that is accepted, so exactly one current agrees. The search runs on
bounded laws; the figure told afterwards is NaN, and so nothing is told, where the current found lies beyond them.
"""

from __future__ import annotations

from circuitlint import si
from circuitlint.definition.saturation import Saturation
from circuitlint.physics.saturation import Measured, by_law, by_table
from circuitlint.sources import Source
from circuitlint.study.data import DataSheet
from circuitlint.study.plan import Plan
from circuitlint.study.worksheet import Key

NOT_CONSTANT = "the inductance falls with current, so that no one time constant holds"
GUESS = "settled working current"


def collect(stated: Saturation | None, place: str, into: DataSheet) -> None:
    """The law's two parameters, or the table's points."""
    if stated is None:
        return
    at = f"{place}.saturation"
    into.token(at, stated.inductance_is)
    into.token(f"{at}.source", stated.source)
    into.state(f"{at}.current", stated.current)
    into.state(f"{at}.exponent", stated.exponent)
    into.token(f"{at}.table", str(len(stated.table or ())))
    for number, point in enumerate(stated.table or ()):
        into.state(f"{at}.table[{number}].current", point.current)
        into.state(f"{at}.table[{number}].inductance", point.inductance)
    first = stated.current or (stated.table or [])[0].current
    into.assume(f"{at}.start", si.CURRENT, first.nominal, first.nominal, first.nominal, Source("where the search starts"))


def saturates(plan: Plan, place: str) -> bool:
    """Whether the coil's inductance falls with its current."""
    return bool(plan.token(f"{place}.saturation"))


def working_inductance(plan: Plan, place: str, unsaturated: Key | None) -> Key:
    """The inductance at the guessed current; `tell` settles the guess."""
    guess = plan.sheet.guess(GUESS, place, si.CURRENT)
    return _put(plan, place, "working inductance", guess, unsaturated, told=False)


def tell(plan: Plan, place: str, unsaturated: Key | None) -> Key:
    """Write `inductance` at the current that flows, and settle the guess where there is one."""
    told = _put(plan, place, "inductance", Key("current", place), unsaturated, told=True)
    if plan.direct:
        plan.sheet.apart.add(told)
    else:
        plan.sheet.settle(Key(GUESS, place), Key("current", place), plan.datum(f"{place}.saturation.start"), scale=1e-6)
    return told


def _put(plan: Plan, place: str, name: str, current: Key, unsaturated: Key | None, told: bool) -> Key:
    at = f"{place}.saturation"
    measured: Measured = "chord" if plan.token(at) == "chord" else "differential"
    points = int(plan.token(f"{at}.table"))
    if points:
        columns = [tuple(plan.datum(f"{at}.table[{one}].{word}") for one in range(points)) for word in ("current", "inductance")]
        return plan.sheet.put(name, place, by_table(measured, not plan.direct, told), figure=told, note=measured, current=current,
                              currents=columns[0], inductances=columns[1])
    assert unsaturated is not None
    return plan.sheet.put(name, place, by_law(measured, not plan.direct, told), figure=told, note=measured,
                          unsaturated_inductance=unsaturated, current=current,
                          saturation_current=plan.datum(f"{at}.current"), exponent=plan.datum(f"{at}.exponent"))
