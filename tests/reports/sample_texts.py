"""Words of the hand-made record: rules, formulas, sources, cautions, and texts that try to break out of a report."""

from __future__ import annotations

from circuitlint.review import record as r

HOSTILE_TAG = "=X<1>\"&'\u202e9Y-\u2066\x1b[31m"
HOSTILE_SERVES = (
    "</title></style></script><script>alert('in')</script><img src=x onerror=alert(1)> \u200f\x00\x07\x9b "
    "&lt;b&gt; ]]> --> {{7*7}} ${x} `x` \ufeff"
)
STATEMENT = (
    "This record says which stated limits were checked, with what figures, what was found, and what could not be "
    "checked. Local codes and the responsible licensed person prevail over everything in it."
)


def _rule(
    name: str, title: str, purpose: str, helps: str, needs: tuple[str, ...] = (), required: bool = True
) -> r.RuleRecord:
    return r.RuleRecord(
        name=name,
        title=title,
        purpose=purpose,
        applies_to="every circuit",
        needs=needs,
        helps=helps,
        plugin="circuitlint_rules",
        required=required,
    )


RULES = (
    _rule("minimum-power-factor", "Least power factor", "keeps the current for the power drawn low", "a capacitor"),
    _rule(
        "voltage-drop", "Voltage drop to the load", "keeps the voltage at the coil within its band", "a larger section"
    ),
    _rule("meter-range", "Current within the meter's range", "keeps the meter's fuse whole", "a clamp"),
    _rule(
        "conductor-heating",
        "Conductor temperature",
        "keeps the insulation within its class",
        "a larger section",
        ("cable.ambient",),
    ),
    _rule(
        "winding-temperature",
        "Winding temperature",
        "keeps the winding within its class",
        "a larger frame",
        ("load.coil.temperature_rise",),
    ),
)

SOURCES = {
    "practice": r.SourceRecord(work="agreed with the yard", known="common practice"),
    "drop": r.SourceRecord(
        work="IEC 60364-5-52", edition="2009", place="annex G, table G.52.1", known="value from memory"
    ),
    "ohm": r.SourceRecord(work="Ohm's law for rms magnitudes", known="derived"),
    "power": r.SourceRecord(work="IEC 60050-131", edition="2002", place="131-11-42", known="value from memory"),
}

RULESET = r.RulesetRecord(
    name="low-voltage-50hz",
    title="Low voltage, 50 Hz",
    edition="2026-11-01",
    jurisdiction="none; an invented set for tests",
    statement="The limits of this set are a starting point. Local codes and the responsible person prevail.",
    built_on=("common-ground",),
    sha256="a7" * 32,
    limits=(
        r.LimitRecord(
            name="least",
            value=0.85,
            dimension="ratio",
            path="rules.minimum-power-factor.limits.least",
            set_by="low-voltage-50hz",
            source="practice",
        ),
        r.LimitRecord(
            name="running",
            value=11.5,
            dimension="voltage",
            path="rules.voltage-drop.limits.running",
            set_by="common-ground",
            source="drop",
        ),
    ),
    severities={"minimum-power-factor": {"nominal": "major", "worst_case": "minor", "near_limit": "observation"}},
    near_the_limit=0.05,
)


def _formula(
    result: str, equation: str, dimension: str, source: str = "ohm", validity: str = "steady state"
) -> r.FormulaRecord:
    return r.FormulaRecord(result=result, equation=equation, validity=validity, source=source, dimension=dimension)


FORMULAS = {
    "impedance-of-parts": _formula("Z", "√({R}² + {X}²)", "resistance"),
    "angle-of-parts": _formula("φ", "arctan({X} / {R})", "angle"),
    "current-through": _formula("I", "{U} / {Z}", "current"),
    "active-power": _formula("P", "{I}² · {R}", "active power", "power"),
    "reactive-power": _formula("Q", "{I}² · {X}", "reactive power", "power"),
    "apparent-power": _formula("S", "{U} · {I}", "apparent power", "power"),
    "power-factor": _formula("cos φ", "{P} / {S}", "ratio", "power", "sinusoidal voltage and current"),
    "voltage-drop": _formula("ΔU", "{U} − {Ut}", "voltage", validity=""),
}

CAUTIONS = {
    "stored-energy": "Coils store energy: opening the circuit raises a voltage far above the supply's. "
    "Measure before touching.",
    "hot-surfaces": "Windings and cores run hot in normal service and stay hot after switching off.",
    "capacitors": "Capacitors hold their charge after the supply is off. Discharge them and prove it.",
}
