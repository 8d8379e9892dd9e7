"""Hand-built review records: all clear, one of each result, one whose every text is hostile. Invented throughout."""

from __future__ import annotations

from circuitlint.review import record as r
from tests.reports.building import RULES, RULESET, check, circuit, kind, place, record, unknown

HOSTILE = (
    "=H\x1b[2J\u202eevil\u2066 <script>alert(1)</script> ]( http://x ) [m](1) {0}"
    " | \"q\" 'q' & \x00\x9b\n  major  forged 線圈\u0301"
)
"""Markup, quotes, links, a placeholder, control characters, marks of direction, a forged line, wide characters."""


def clear(number: int) -> r.Record:
    """A record of circuits that all conform with room to spare."""
    return record(
        tuple(
            circuit(
                f"=F{n}-Y1",
                "fender valve",
                (
                    check(f"=F{n}-Y1", "minimum-power-factor", "power-factor", "circuit", 0.98, 0.97, n + 10),
                    check(f"=F{n}-Y1", "voltage-drop", "voltage-drop-share", "running", 0.012, 0.014, n + 10),
                ),
                n + 10,
            )
            for n in range(number)
        )
    )


def mixed() -> r.Record:
    """Seven circuits: held, held by kind, in the worst case only, near the limit, conceded, clear, not solved."""
    one, two, three, four, five, six, seven = (f"=R3-Y{n}" for n in range(1, 8))
    return record(
        (
            circuit(
                four,
                "ramp latch valve",
                (check(four, "voltage-drop", "voltage-drop-share", "running", 0.046, 0.0491, 95, of="cable[0]"),),
            ),
            circuit(
                one,
                "ramp brake magnet, west",
                (
                    check(one, "minimum-power-factor", "power-factor", "circuit", 0.1809, 0.1654, 24),
                    check(
                        one,
                        "voltage-drop",
                        "voltage-drop-share",
                        "running",
                        0.0478,
                        0.0532,
                        26,
                        of="cable[0]",
                        state="switch-on",
                    ),
                    check(one, "meter-range", "current", "share_of_range", 10.95, 11.52, 31, state="direct-current"),
                    unknown(one, "conductor-heating", ("cable[0].ambient", "cable[0].grouped_circuits"), 27),
                    check(one, "meter-range", "current", "share_of_range", 1.9, 2.3, 31),
                ),
            ),
            circuit(
                two,
                "fender holding magnet",
                (kind(two, 58), unknown(two, "conductor-heating", ("cable[0].ambient",), 61, "minor")),
            ),
            circuit(
                three,
                "ramp brake magnet, east",
                (
                    check(three, "minimum-power-factor", "power-factor", "circuit", 0.92, 0.88, 77),
                    unknown(three, "conductor-heating", ("cable[0].ambient", "cable[0].grouped_circuits"), 79),
                ),
            ),
            circuit(
                five,
                "bilge pump contactor",
                (check(five, "minimum-power-factor", "power-factor", "circuit", 0.71, 0.69, 110, concession=0),),
            ),
            circuit(
                six,
                "fender valve, north",
                (check(six, "voltage-drop", "voltage-drop-share", "running", 0.01, 0.011, 130),),
            ),
            circuit(
                seven,
                "winch magnets",
                (
                    unknown(
                        seven,
                        "voltage-drop",
                        (),
                        140,
                        why="in some case the temperatures do not settle (thermal runaway)",
                    ),
                ),
                figures=(),
                phasors=(),
                regions=(),
                curves=(),
                not_solved="temperatures do not settle (thermal runaway)",
            ),
        ),
        concessions=(
            r.ConcessionRecord(
                tag=five,
                rule="minimum-power-factor",
                by="A. Competent Person",
                reason="short duty",
                until="2027-06-30",
                state="in force",
                place=place(150, "concessions[0]"),
            ),
            r.ConcessionRecord(
                tag="=R3-Z9",
                rule="voltage-drop",
                by="A. Competent Person",
                reason="was taken out",
                until="2027-06-30",
                state="matches nothing",
                place=place(151, "concessions[1]"),
            ),
        ),
        plugins=(
            r.PluginRecord(name="circuitlint_rules", version="0.1.0", origin="installed", offers=tuple(RULES)),
            r.PluginRecord(
                name="yard_rules", version="2.0", origin="given path", failed="ImportError: no module named yard_tables"
            ),
        ),
        problems=(
            r.Problem(
                plugin="circuitlint_rules",
                rule="conductor-heating",
                what="ZeroDivisionError: float division by zero",
                circuits=(seven,),
            ),
        ),
    )


def hostile() -> r.Record:
    """A record whose every foreign text tries to break out of the report."""
    bad = HOSTILE
    finding = check(
        bad,
        "voltage-drop",
        "voltage-drop-share",
        "running",
        0.07,
        0.08,
        5,
        of=bad,
        moved_by=bad,
        why=bad,
        help=bad,
        what=bad,
        state=bad,
        concession=0,
        place=r.Place(file=bad, line=3, column=2, path=bad),
    )
    fact = kind(bad, 9, what=bad, help=bad, why=bad)
    gap = unknown(bad, "conductor-heating", (bad, "cable"), 4, why=bad)
    return record(
        (circuit(bad, bad, (finding, fact, gap), fed_from=bad, not_solved=bad, cautions=("isolate",)),),
        title=bad,
        documents=(r.Document(file=bad, sha256="00" * 32, kind="definition"),),
        statement=bad,
        cautions={"isolate": bad},
        problems=(r.Problem(plugin=bad, rule=bad, what=bad, circuits=(bad,)),),
        concessions=(r.ConcessionRecord(tag=bad, rule=bad, by=bad, reason=bad, until=bad, state="in force", place=place(1)),),
        plugins=(r.PluginRecord(name=bad, version=bad, origin=bad, offers=(bad,), failed=bad),),
        ruleset=RULESET.model_copy(update={"name": bad, "edition": bad, "built_on": (bad,), "title": bad}),
    )
