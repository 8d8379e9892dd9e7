"""Figures, checks and circuits of the hand-made record, from the small impedance trees of `sample_circuits`."""

from __future__ import annotations

from typing import Any

from circuitlint.review import record as r
from tests.reports import sample_circuits as s
from tests.reports.sample_texts import RULES, RULESET

UNITS = {
    "resistance": "resistance",
    "reactance": "reactance",
    "impedance": "resistance",
    "impedance-angle": "angle",
    "voltage": "voltage",
    "terminal-voltage": "voltage",
    "voltage-drop": "voltage",
    "current": "current",
    "active-power": "active power",
    "reactive-power": "reactive power",
    "apparent-power": "apparent power",
    "power-factor": "ratio",
    "conductor-loss": "active power",
}
FEED = s.Feed(230.0, 216.2, 253.0, 50.0, complex(1.21, 0.008))
BATTERY = s.Feed(24.0, 20.4, 26.4, 0.0, complex(0.31, 0.0))


def place(line: int, path: str, file: str = "slip-3.yaml") -> r.Place:
    """A place in the definition."""
    return r.Place(file=file, line=line, column=5, path=path)


def figures_of(load: s.Load, feed: s.Feed, state: str) -> tuple[r.Figure, ...]:
    """Figures of one state with their range over the corners."""
    found = [s.quantities(case, load, not feed.frequency) for case in s.cases(load, feed)]
    made = []
    for (name, of), nominal in found[0].items():
        values = [one[name, of] for one in found]
        key, symbols = FORMULAS_OF[name]
        inputs = tuple(
            r.Input(
                symbol=symbol,
                value=found[0].get((source, of), found[0].get((source, ""), feed.voltage)),
                dimension=UNITS[source],
                what=f"{source} of {of}" if of else source,
            )
            for symbol, source in symbols
        )
        made.append(
            r.Figure(
                name=name,
                of=of,
                state=state,
                dimension=UNITS[name],
                nominal=nominal,
                lowest=min(values),
                highest=max(values),
                formula=key,
                inputs=inputs,
                moved_by="supply.voltage" if min(values) != max(values) else "",
                note="lagging" if name == "power-factor" else "",
            )
        )
    return tuple(made)


FORMULAS_OF: dict[str, tuple[str, tuple[tuple[str, str], ...]]] = {
    "resistance": ("", ()),
    "reactance": ("", ()),
    "voltage": ("", ()),
    "impedance": ("impedance-of-parts", (("R", "resistance"), ("X", "reactance"))),
    "impedance-angle": ("angle-of-parts", (("R", "resistance"), ("X", "reactance"))),
    "current": ("current-through", (("U", "voltage"), ("Z", "impedance"))),
    "active-power": ("active-power", (("I", "current"), ("R", "resistance"))),
    "reactive-power": ("reactive-power", (("I", "current"), ("X", "reactance"))),
    "apparent-power": ("apparent-power", (("U", "voltage"), ("I", "current"))),
    "power-factor": ("power-factor", (("P", "active-power"), ("S", "apparent-power"))),
    "terminal-voltage": ("", ()),
    "conductor-loss": ("active-power", (("I", "current"), ("R", "resistance"))),
    "voltage-drop": ("voltage-drop", (("U", "voltage"), ("Ut", "terminal-voltage"))),
}


def limit(rule: str, name: str, value: float, dimension: str, source: str = "practice") -> r.LimitRecord:
    """A limit of the invented ruleset."""
    return r.LimitRecord(
        name=name,
        value=value,
        dimension=dimension,
        path=f"rules.{rule}.limits.{name}",
        set_by=RULESET.name,
        source=source,
    )


def compare(
    tag: str, rule: str, figure: r.Figure, sense: Any, held_to: r.LimitRecord, line: int, **more: Any
) -> r.Check:
    """A figure held against a limit, judged here by the plain rules of nominal, worst case and room left."""
    worst = figure.lowest if sense == "at least" else figure.highest
    sign = 1.0 if sense == "at least" else -1.0
    margin = sign * (worst - held_to.value) / held_to.value
    nominal_margin = sign * (figure.nominal - held_to.value) / held_to.value
    basis = (
        "nominal" if nominal_margin < 0 else "worst case" if margin < 0 else "near the limit" if margin < 0.05 else None
    )
    severity = {"nominal": "major", "worst case": "minor", "near the limit": "observation", None: None}[basis]
    word = figure.name.replace("-", " ")
    return r.Check.model_validate(
        {
            "id": f"{rule}|{tag}|{figure.of}|{figure.state}|{held_to.name}",
            "rule": rule,
            "state": figure.state,
            "figure": figure.name,
            "of": figure.of,
            "sense": sense,
            "dimension": figure.dimension,
            "nominal": figure.nominal,
            "worst": worst,
            "limit": held_to,
            "result": "nonconforming" if margin < 0 else "conforms",
            "basis": basis,
            "severity": severity,
            "margin": margin,
            "nominal_margin": nominal_margin,
            "moved_by": "load.coil.resistance",
            "what": f"{word} ({figure.state}) {figure.nominal:.3f} with worst {worst:.3f} "
            f"held to {sense} {held_to.value:g}",
            "why": f"cos φ = P / S = (90.1 W) / (498 VA) = {figure.nominal:.3f}" if severity else "",
            "help": "a capacitor across the coil, or a coil of better power factor" if severity else "",
            "place": place(line, f"circuits[0].{figure.of or 'load'}"),
            **({"share_beyond": 0.31, "share_beyond_uncertainty": 0.005} if basis == "worst case" else {}),
            **more,
        }
    )


def unknown(tag: str, rule: str, needs: tuple[str, ...], why: str, line: int, severity: Any = "observation") -> r.Check:
    """A check that cannot be made."""
    return r.Check(
        id=f"{rule}|{tag}|steady",
        rule=rule,
        state="steady",
        figure=rule,
        result="not assessed",
        basis="missing data",
        severity=severity,
        needs=needs,
        what=f"{rule.replace('-', ' ')} could not be assessed",
        why=why,
        help=f"state {', '.join(needs)}" if needs else "",
        place=place(line, "circuits[0]"),
    )


def circuit(
    tag: str,
    serves: str,
    load: s.Load,
    feed: s.Feed,
    line: int,
    system: Any = "single-phase",
    curve: Any = None,
    limits: tuple[tuple[str, str, Any, r.LimitRecord], ...] = (),
    extra: tuple[r.Check, ...] = (),
    **more: Any,
) -> r.Circuit:
    """A circuit with figures, phasors, regions, checks and coverage. `limits`: rule, figure name, sense, limit."""
    steady, cold = figures_of(load, feed, "steady"), figures_of(load, feed, "cold")
    named = {(one.name, one.of): one for one in steady}
    checks = tuple(compare(tag, rule, named[name, ""], sense, to, line) for rule, name, sense, to in limits) + extra
    coverage = {rule.name: "not applicable" for rule in RULES}
    for check in checks:
        if coverage[check.rule] != "nonconforming":
            coverage[check.rule] = check.result
    supply = ("230 V +10/-6 %", "50 Hz ± 1 %") if feed.frequency else ("24 V -15/+10 %",)
    elements = (
        r.Element(of="cable[0]", kind="cable", values=("1.5 mm2, 42 m", "copper, pvc-70, B2")),
        r.Element(of="meter", kind="meter", label="in-line", values=("range 10 A", "fuse 10 A")),
        s.tree(load, "load"),
    )
    solved = [s.quantities(one, load, not feed.frequency) for one in s.cases(load, feed)]
    pairs = [("steady", "current", "active-power")]
    if feed.frequency:
        pairs = [
            ("steady", "resistance", "reactance"),
            ("steady", "active-power", "reactive-power"),
            ("steady", "current", "power-factor"),
            ("cold", "current", "power-factor"),
        ]
    regions = tuple(
        r.Region(
            of="", state=state, across=across, up=up, points=s.hull([(one[across, ""], one[up, ""]) for one in solved])
        )
        for state, across, up in pairs
    )
    return r.Circuit.model_validate(
        {
            "tag": tag,
            "serves": serves,
            "fed_from": "shore" if feed.frequency else "battery",
            "system": system,
            "place": place(line, "circuits[0]"),
            "tree": r.Element(
                of="", kind="supply", label="shore" if feed.frequency else "battery", values=supply, parts=elements
            ),
            "cases": r.Cases(
                count=len(solved),
                inputs=("supply.voltage", "load.coil.resistance"),
                method="corners, then local refinement of what a check depends on",
            ),
            "figures": steady + cold,
            "phasors": s.phasors(s.cases(load, feed)[0], load, "steady") if feed.frequency else (),
            "curves": (curve,) if curve else (),
            "regions": regions,
            "checks": checks,
            "coverage": coverage,
            "held": any(one.severity == "major" and one.concession is None for one in checks),
            "cautions": ("stored-energy", "hot-surfaces"),
            **more,
        }
    )
