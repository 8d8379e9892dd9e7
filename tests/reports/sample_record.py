"""A hand-made review record of six invented circuits, for the tests of every report.

`sample_record()` has: a brake magnet on 230 V 50 Hz with cable and meter that fails its least power factor; the same
with a capacitor across it; a holding magnet on 24 V direct current with a check that cannot be made; a mixed tree in
series and parallel; a circuit whose words are hostile; and one that could not be solved. `record_of(n)` has n circuits.
"""

from __future__ import annotations

from typing import Any

from circuitlint.review import record as r
from tests.reports import sample_circuits as s
from tests.reports.sample_parts import BATTERY, FEED, circuit, limit, place, unknown
from tests.reports.sample_texts import (
    CAUTIONS,
    FORMULAS,
    HOSTILE_SERVES,
    HOSTILE_TAG,
    RULES,
    RULESET,
    SOURCES,
    STATEMENT,
)

COIL = s.Leaf("coil", "brake magnet", ("21 ohm ± 5 %", "0.36 H ± 10 %"), 21.0, 0.36, spread=0.08)
PAIR = s.Group("parallel", (COIL, s.Leaf("capacitor", "", ("27 uF ± 5 %",), capacitance=27e-6, spread=0.05)))
MIXED = s.Group(
    "series",
    (
        s.Leaf("coil", "choke", ("9 ohm", "0.11 H"), 9.0, 0.11, spread=0.05),
        s.Group(
            "parallel",
            (
                s.Leaf("resistor", "heater", ("150 ohm",), 150.0),
                s.Group(
                    "series",
                    (s.Leaf("resistor", "", ("47 ohm",), 47.0), s.Leaf("capacitor", "", ("10 uF",), capacitance=1e-5)),
                ),
                s.Leaf("coil", "valve", ("60 ohm", "0.8 H"), 60.0, 0.8, spread=0.1),
            ),
        ),
    ),
)
HOLDING = s.Leaf("coil", "holding magnet", ("9.6 ohm ± 5 %", "0.18 H"), 9.6, 0.18, spread=0.05)
POWER_FACTOR = (
    "minimum-power-factor",
    "power-factor",
    "at least",
    limit("minimum-power-factor", "least", 0.85, "ratio"),
)
DROP = ("voltage-drop", "voltage-drop", "at most", limit("voltage-drop", "running", 11.5, "voltage", "drop"))


def held_current(value: float) -> tuple[str, str, Any, r.LimitRecord]:
    """The meter's range as a limit of the current."""
    return ("meter-range", "current", "at most", limit("meter-range", "range", value, "current"))


def circuits() -> tuple[r.Circuit, ...]:
    """The six circuits."""
    first = circuit(
        "=R3-Y1",
        "ramp brake magnet, west",
        COIL,
        FEED,
        24,
        curve=s.switch_on(230.0, 50.0, 22.2, 0.36),
        limits=(POWER_FACTOR, DROP, held_current(2.35)),
        extra=(
            unknown(
                "=R3-Y1",
                "conductor-heating",
                ("cable[0].ambient", "cable[0].grouped_circuits"),
                "how warm the conductor runs is not known",
                27,
            ),
        ),
    )
    second = circuit(
        "=R3-Y2",
        "ramp brake magnet, east",
        PAIR,
        FEED,
        41,
        limits=(POWER_FACTOR, DROP, held_current(10.0)),
        cautions=("stored-energy", "capacitors"),
    )
    third = circuit(
        "=R3-K5",
        "fender holding magnet",
        HOLDING,
        BATTERY,
        58,
        "dc",
        s.switch_on(24.0, 0.0, 9.91, 0.18),
        limits=(DROP, held_current(10.0)),
        extra=(
            unknown(
                "=R3-K5",
                "winding-temperature",
                ("load.coil.temperature_rise",),
                "how warm the winding runs is not known",
                61,
                "minor",
            ),
        ),
    )
    fourth = circuit(
        "=R3-L7",
        "lamp and valve group",
        MIXED,
        FEED,
        75,
        limits=(POWER_FACTOR, DROP, held_current(3.0)),
        extra=(
            r.Check(
                id="minimum-power-factor|=R3-L7|agreed",
                rule="minimum-power-factor",
                state="steady",
                result="nonconforming",
                basis="matter of kind",
                severity="minor",
                what="the group has a capacitor that stays connected when the valve opens",
                help="a discharge resistor across it",
                place=place(79, "circuits[3].load"),
                concession=0,
            ),
        ),
    )
    fifth = circuit(HOSTILE_TAG, HOSTILE_SERVES, COIL, FEED, 98, limits=(DROP,), fed_from='"shore" & <b>more</b>')
    sixth = circuit(
        "=R3-M9",
        "pump, not solved",
        COIL,
        FEED,
        110,
        figures=(),
        phasors=(),
        regions=(),
        limits=(),
        extra=(unknown("=R3-M9", "voltage-drop", (), "in some case the temperatures do not settle", 110),),
        not_solved="in some case within the tolerances the temperatures do not settle (thermal runaway)",
    )
    return first, second, third, fourth, fifth, sixth


def assemble(made: tuple[r.Circuit, ...], title: str = "Ferry slip 3, ramp and fender controls") -> r.Record:
    """A record of these circuits."""
    order = {word: rank for rank, word in enumerate(r.SEVERITIES)}
    found = [
        (order[check.severity], number, check)
        for number, one in enumerate(made)
        for check in one.checks
        if check.severity is not None
    ]
    findings = tuple(
        r.FindingRef(tag=made[number].tag, check=check.id, severity=check.severity)
        for _, number, check in sorted(found, key=lambda item: item[:2])
        if check.severity is not None
    )
    results = [check.result for one in made for check in one.checks]
    counts = {word: results.count(word) for word in ("conforms", "nonconforming", "not assessed")}
    counts |= {word: sum(one.severity == word for one in findings) for word in r.SEVERITIES}
    counts |= {"held": sum(one.held for one in made), "clear": sum(not one.held for one in made)}
    return r.Record(
        title=title,
        tool="circuitlint",
        version="0.1.0",
        reviewed_on="2026-12-01",
        hold_at="major",
        documents=(
            r.Document(file="slip-3.yaml", sha256="3f" * 32, kind="definition"),
            r.Document(file="low-voltage-50hz.yaml", sha256="a7" * 32, kind="ruleset"),
        ),
        plugins=(
            r.PluginRecord(name="circuitlint_rules", version="0.1.0", origin="installed", offers=("12 rules",)),
            r.PluginRecord(
                name="yard_rules", version="2.0", origin="given path", failed="ImportError: no module named yard_tables"
            ),
        ),
        rules=RULES,
        ruleset=RULESET,
        circuits=made,
        findings=findings,
        concessions=(
            r.ConcessionRecord(
                tag="=R3-L7",
                rule="minimum-power-factor",
                by="A. Competent Person",
                reason="short duty",
                until="2027-06-30",
                state="in force",
                place=place(130, "concessions[0]"),
            ),
            r.ConcessionRecord(
                tag="=R3-Z0",
                rule="voltage-drop",
                by="A. Competent Person",
                reason="taken out",
                until="2027-06-30",
                state="matches nothing",
                place=place(131, "concessions[1]"),
            ),
        ),
        problems=(r.Problem(plugin="yard_rules", rule="", what="the plugin did not load", circuits=()),),
        formulas=FORMULAS,
        sources=SOURCES,
        cautions=CAUTIONS,
        statement=STATEMENT,
        held=any(one.held for one in made),
        counts=counts,
    )


def sample_record() -> r.Record:
    """The record of the six circuits."""
    return assemble(circuits())


def record_of(number: int) -> r.Record:
    """A record of many circuits: the six, again and again under tags of their own."""
    made = []
    six = circuits()
    for index in range(number):
        one = six[index % 6]
        tag = f"{one.tag}.{index // 6}" if index >= 6 else one.tag
        checks = tuple(check.model_copy(update={"id": check.id.replace(one.tag, tag)}) for check in one.checks)
        made.append(one.model_copy(update={"tag": tag, "checks": checks}))
    return assemble(tuple(made), title=f"Yard of {number} circuits")
