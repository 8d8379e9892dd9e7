"""What hand-built review records are put together from, for the tests of text, JSON, SARIF and comparison.

An invented scenario: brake magnets of a ferry slip's ramp and valves of its fenders. No real place, plant or product.
The numbers are chosen to show something and are no expectation of what the program calculates.
"""

from __future__ import annotations

from typing import Any

from circuitlint.review import record as r

RULES = {
    "minimum-power-factor": ("Power factor at the origin", "a correction capacitor at the load"),
    "voltage-drop": (
        "Voltage drop from the origin to the terminals",
        "a larger section, a shorter run, or a higher supply voltage",
    ),
    "meter-range": ("Current through the test meter", "a clamp instead of an input in the loop"),
    "conductor-heating": ("Heat in the conductor", "a larger section, or fewer circuits side by side"),
}
LIMITS = {
    "circuit": r.LimitRecord(
        name="circuit",
        value=0.9,
        dimension="ratio",
        path="rules.minimum-power-factor.limits.circuit",
        set_by="low-voltage-50hz",
        source="thresholds",
    ),
    "running": r.LimitRecord(
        name="running",
        value=0.05,
        dimension="ratio",
        path="rules.voltage-drop.limits.running",
        set_by="low-voltage-50hz",
        source="annex",
    ),
    "share_of_range": r.LimitRecord(
        name="share_of_range",
        value=10.0,
        dimension="current",
        path="rules.meter-range.limits.share_of_range",
        set_by="low-voltage-50hz, meter.range",
        source="practice",
    ),
}
RULESET = r.RulesetRecord(
    name="low-voltage-50hz",
    title="Inductive circuits on 50 Hz low-voltage supplies",
    edition="2026-12-01",
    jurisdiction="an invented set",
    statement="Local codes and the licensed person responsible prevail over this review.",
    built_on=(),
    sha256="b0" * 32,
    limits=tuple(LIMITS.values()),
    near_the_limit=0.05,
    severities={
        rule: {
            "nominal": "major",
            "worst_case": "minor",
            "near_limit": "observation",
            "kind": "major",
            "not_assessed": "observation",
        }
        for rule in RULES
    },
)
SOURCES = {
    "thresholds": r.SourceRecord(work="power-factor thresholds of utilities", known="common practice"),
    "annex": r.SourceRecord(work="IEC 60364-5-52", edition="2009", place="annex G, table G.52.1", known="read"),
    "practice": r.SourceRecord(work="the meter's own range", known="common practice"),
    "ohm": r.SourceRecord(work="Ohm's law for rms magnitudes", known="derived"),
}
FORMULAS = {
    "impedance": r.FormulaRecord(
        result="Z", equation="√({R}² + {X}²)", validity="steady sinusoidal state", source="ohm", dimension="resistance"
    ),
    "power-factor": r.FormulaRecord(result="cos φ", equation="{P} / {S}", validity="", source="ohm", dimension="ratio"),
    "sum": r.FormulaRecord(result="Z", equation="Σ {Z}", validity="", source="ohm", dimension="resistance"),
}
CAUTIONS = {
    "isolate": "Isolate every source, lock it off and prove the circuit dead before any work on it.",
    "stored energy": "Opening the circuit of a coil raises a high voltage at the opening contact: use rated devices, "
    "never by pulling a lead or a probe.",
}
STATEMENT = (
    "This review holds stated figures against stated limits. Local codes and the judgement of the licensed or "
    "competent person responsible prevail over it."
)


def place(line: int, path: str = "circuits[0]", column: int = 5) -> r.Place:
    """A place in the invented definition."""
    return r.Place(file="slip-3.yaml", line=line, column=column, path=path)


def check(
    tag: str,
    rule: str,
    figure: str,
    limit: str,
    nominal: float,
    worst: float,
    line: int,
    *,
    state: str = "steady",
    of: str = "",
    dimension: str = "",
    **more: Any,
) -> r.Check:
    """A figure held against a limit, with the result that follows."""
    to = LIMITS[limit]
    sense = "at least" if limit == "circuit" else "at most"
    sign = 1.0 if sense == "at least" else -1.0
    margin, nominal_margin = sign * (worst - to.value) / to.value, sign * (nominal - to.value) / to.value
    basis = "nominal" if nominal_margin < 0 else "worst case" if margin < 0 else "near the limit" if margin < 0.05 else None
    severity = {"nominal": "major", "worst case": "minor", "near the limit": "observation"}.get(basis or "")
    return r.Check.model_validate(
        {
            "id": "|".join(part for part in (rule, tag, of, state, figure, limit) if part),
            "rule": rule,
            "state": state,
            "figure": figure,
            "of": of,
            "sense": sense,
            "dimension": dimension or to.dimension,
            "nominal": nominal,
            "worst": worst,
            "limit": to,
            "result": "nonconforming" if margin < 0 else "conforms",
            "basis": basis,
            "severity": severity,
            "margin": margin,
            "nominal_margin": nominal_margin,
            "moved_by": "load.coil.inductance" if severity else "",
            "share_beyond": 0.31 if basis == "worst case" else None,
            "share_beyond_uncertainty": 0.005 if basis == "worst case" else None,
            "what": f"{figure.replace('-', ' ')} ({state}) as stated",
            "help": RULES[rule][1] if severity else "",
            "why": "cos φ = P / S = 90.1 W / 498.2 VA = 0.1809" if severity else "",
            "place": place(line, "circuits[0].load"),
            **more,
        }
    )


def unknown(tag: str, rule: str, needs: tuple[str, ...], line: int, severity: str = "observation", why: str = "") -> r.Check:
    """A check that cannot be made."""
    return r.Check.model_validate(
        {
            "id": f"{rule}|{tag}|steady|conductor-temperature",
            "rule": rule,
            "state": "steady",
            "figure": "conductor-temperature",
            "result": "not assessed",
            "basis": "missing data",
            "severity": severity,
            "needs": needs,
            "why": why,
            "what": "conductor temperature (steady) could not be assessed",
            "help": f"state {', '.join(needs)}" if needs else "",
            "place": place(line),
        }
    )


def kind(tag: str, line: int, **more: Any) -> r.Check:
    """A matter of kind that is a finding in itself."""
    return r.Check.model_validate(
        {
            "id": f"meter-range|{tag}|wrong coil",
            "rule": "meter-range",
            "result": "nonconforming",
            "basis": "matter of kind",
            "severity": "major",
            "what": "an alternating-current coil stands on a direct-current supply",
            "help": "a coil wound for direct current",
            "place": place(line, "circuits[1].load.coil", 7),
            **more,
        }
    )


def figures(scale: float = 1.0) -> tuple[r.Figure, ...]:
    """A short calculation: data, an impedance made of them, the power factor, and one figure with phasors put in."""

    def figure(name: str, dimension: str, nominal: float, spread: float, formula: str = "", **more: Any) -> r.Figure:
        more = {"of": "load.coil", "state": "steady", **more}
        return r.Figure(
            name=name,
            dimension=dimension,
            nominal=nominal,
            lowest=nominal * (1 - spread),
            highest=nominal * (1 + spread),
            formula=formula,
            moved_by="load.coil.inductance" if spread else "",
            **more,
        )

    put = r.Input
    return (
        figure("resistance", "resistance", 21.0, 0.05),
        figure("reactance", "reactance", 113.1 * scale, 0.1),
        figure(
            "impedance",
            "resistance",
            115.03 * scale,
            0.1,
            "impedance",
            inputs=(
                put(symbol="R", value=21.0, dimension="resistance", what="load.coil.resistance"),
                put(symbol="X", value=113.1 * scale, dimension="reactance", what="reactance of load.coil"),
            ),
        ),
        figure(
            "power-factor",
            "ratio",
            0.1809 / scale,
            0.08,
            "power-factor",
            of="",
            note="lagging",
            inputs=(
                put(symbol="P", value=90.1, dimension="active power", what="active power"),
                put(symbol="S", value=498.2, dimension="apparent power", what="apparent power"),
            ),
        ),
        figure(
            "impedance",
            "resistance",
            116.4 * scale,
            0.0,
            "sum",
            of="",
            state="switch-on",
            inputs=(
                put(symbol="Z", value=1.21, angle=0.0, dimension="resistance", what="impedance of cable[0]"),
                put(symbol="Z", value=115.03 * scale, angle=1.387, dimension="resistance", what="impedance of load.coil"),
            ),
        ),
    )


def circuit(tag: str, serves: str, checks: tuple[r.Check, ...], line: int = 20, scale: float = 1.0, **more: Any) -> r.Circuit:
    """A circuit with its checks; held by a major finding that no concession covers."""
    coverage: dict[str, str] = dict.fromkeys(RULES, "not applicable")
    for one in sorted(checks, key=lambda one: ("conforms", "not assessed", "nonconforming").index(one.result)):
        coverage[one.rule] = one.result
    return r.Circuit.model_validate(
        {
            "tag": tag,
            "serves": serves,
            "fed_from": "shore",
            "system": "single-phase",
            "place": place(line),
            "tree": r.Element(
                of="",
                kind="supply",
                label="shore",
                values=("230 V +10/-6 %", "50 Hz ± 1 %"),
                parts=(
                    r.Element(of="cable[0]", kind="cable", values=("1.5 mm2, 42 m",)),
                    r.Element(of="load.coil", kind="coil", label="brake magnet", values=("21 ohm ± 5 %", "0.36 H ± 10 %")),
                ),
            ),
            "cases": r.Cases(count=64, inputs=("supply.voltage", "load.coil.inductance"), method="corners and interior points"),
            "figures": figures(scale),
            "checks": checks,
            "coverage": coverage,
            "cautions": ("isolate", "stored energy"),
            "phasors": (r.Phasor(name="current", of="", state="steady", real=0.35, imaginary=-1.9),),
            "curves": (
                r.Curve(
                    name="current",
                    of="",
                    state="switch-on",
                    dimension="current",
                    times=(0.0, 0.005, 0.01),
                    values=(0.0, 2.5, 4.1),
                ),
            ),
            "regions": (
                r.Region(
                    of="",
                    state="steady",
                    across="resistance",
                    up="reactance",
                    points=((20.0, 100.0), (23.0, 100.0), (22.0, 124.0)),
                ),
            ),
            "held": any(one.severity == "major" and one.concession is None for one in checks),
            **more,
        }
    )


def record(circuits: tuple[r.Circuit, ...], **more: Any) -> r.Record:
    """A record of these circuits."""
    rank = {word: number for number, word in enumerate(r.SEVERITIES)}
    found = [
        (rank[one.severity], r.FindingRef(tag=each.tag, check=one.id, severity=one.severity))
        for each in circuits
        for one in each.checks
        if one.severity is not None
    ]
    checks = [one for each in circuits for one in each.checks]
    counts = {result: sum(one.result == result for one in checks) for result in ("conforms", "nonconforming", "not assessed")}
    counts |= {
        "circuits held": sum(each.held for each in circuits),
        "circuits clear": sum(not each.held for each in circuits),
    }
    return r.Record.model_validate(
        {
            "title": "Ferry slip 3, ramp and fender controls (invented)",
            "tool": "circuitlint",
            "version": "0.1.0",
            "reviewed_on": "2026-12-01",
            "hold_at": "major",
            "documents": (
                r.Document(file="slip-3.yaml", sha256="3f" * 32, kind="definition"),
                r.Document(file="low-voltage-50hz.yaml", sha256="a7" * 32, kind="ruleset"),
            ),
            "plugins": (r.PluginRecord(name="circuitlint_rules", version="0.1.0", origin="installed", offers=tuple(RULES)),),
            "rules": tuple(
                r.RuleRecord(
                    name=name,
                    title=title,
                    purpose="what goes wrong otherwise",
                    applies_to="every circuit",
                    needs=("cable", "load"),
                    helps=helps,
                    plugin="circuitlint_rules",
                    required=True,
                )
                for name, (title, helps) in RULES.items()
            ),
            "ruleset": RULESET,
            "circuits": circuits,
            "findings": tuple(ref for _, ref in sorted(found, key=lambda pair: pair[0])),
            "formulas": FORMULAS,
            "sources": SOURCES,
            "cautions": CAUTIONS,
            "statement": STATEMENT,
            "held": any(each.held for each in circuits),
            "counts": counts,
            **more,
        }
    )
