"""The review record: everything one review took in and put out.

Every report is a view of this record, so a stored record gives the same report again. Nothing in it depends on the machine,
the time of day or the order of hashing: the same inputs give the same bytes. Magnitudes are in the coherent SI unit of the
dimension named beside them (degree Celsius for temperatures); rounding is left to the reports.
"""

from __future__ import annotations

from typing import Literal

from pydantic import BaseModel, ConfigDict, Field

from circuitlint.sources import Known

RECORD_FORMAT = 1

Result = Literal["conforms", "nonconforming", "not assessed"]
Coverage = Literal["conforms", "nonconforming", "not assessed", "not applicable"]
Severity = Literal["major", "minor", "observation"]
Basis = Literal["nominal", "worst case", "near the limit", "matter of kind", "missing data", "rule failed"]
SEVERITIES: tuple[Severity, ...] = ("major", "minor", "observation")


class Part(BaseModel):
    """Base of every part of the record: unchangeable, and closed to unknown keys."""

    model_config = ConfigDict(frozen=True, extra="forbid")


class Place(Part):
    """Where in the definition something stands."""

    file: str = Field(description="File name as given, with forward slashes.")
    line: int = Field(description="Line, counted from 1.")
    column: int = Field(description="Column, counted from 1.")
    path: str = Field(description="Path of keys inside the file, such as `circuits[3].load.coil`.")


class SourceRecord(Part):
    """A published work, the place in it, and how the value taken from it is known."""

    work: str = Field(description="Title or number of the work, as it is cited.")
    place: str = Field(default="", description="Clause, table or page.")
    edition: str = Field(default="", description="Edition or year.")
    known: Known = Field(default="read", description="How the value is known.")
    note: str = Field(default="", description="What a reader must know before relying on it.")


class Input(Part):
    """A number put into a formula."""

    symbol: str = Field(description="Symbol used in the equation.")
    value: float = Field(description="Nominal value in the SI unit; the magnitude where the input is a phasor.")
    angle: float | None = Field(default=None, description="Angle in radian where the input is a phasor, else null.")
    dimension: str = Field(description="Name of the dimension, as `circuitlint.si` lists it.")
    what: str = Field(description="What the number is: a figure name with its part, or a path in the definition.")


class Figure(Part):
    """One derived quantity of one part in one state."""

    name: str = Field(description="Trade word of the quantity, such as `power-factor`.")
    of: str = Field(description="Part inside the circuit, such as `load.series[0]` or `cable[0]`; empty for the circuit.")
    state: str = Field(description="State the figure belongs to, such as `steady`.")
    dimension: str = Field(description="Name of the dimension, as `circuitlint.si` lists it.")
    nominal: float = Field(description="Value of the nominal case.")
    lowest: float = Field(description="Lowest value over the cases studied.")
    highest: float = Field(description="Highest value over the cases studied.")
    formula: str = Field(description="Key into `formulas`; empty for a stated datum.")
    inputs: tuple[Input, ...] = Field(default=(), description="What was put into the formula, at nominal values.")
    moved_by: str = Field(default="", description="The tolerance that moves the figure most, as a path in the circuit.")
    note: str = Field(default="", description="A word that belongs to the figure, such as `lagging`, or its bound.")


class Phasor(Part):
    """A complex rms quantity of one part in one state at nominal values; angle against the supply voltage."""

    name: Literal[
        "voltage", "current", "impedance", "resistive-voltage", "inductive-voltage", "capacitive-voltage", "power"
    ] = Field(description="Quantity.")
    of: str = Field(description="Part inside the circuit; empty for the circuit.")
    state: str = Field(description="State it belongs to.")
    real: float = Field(description="Part in phase with the supply voltage.")
    imaginary: float = Field(description="Part a quarter period ahead of the supply voltage.")


class Curve(Part):
    """A quantity over time, for drawing: the switch-on current of the worst angle, for one."""

    name: str = Field(description="Trade word of the quantity.")
    of: str = Field(description="Part inside the circuit; empty for the circuit.")
    state: str = Field(description="State it belongs to.")
    dimension: str = Field(description="Name of the dimension of the values.")
    times: tuple[float, ...] = Field(description="Times in second, rising.")
    values: tuple[float, ...] = Field(description="One value for each time.")
    note: str = Field(default="", description="What case the curve shows, in words.")


class Region(Part):
    """Pairs of two figures over the cases studied, for drawing the worst case as a region."""

    of: str = Field(description="Part inside the circuit; empty for the circuit.")
    state: str = Field(description="State it belongs to.")
    across: str = Field(description="Name of the figure drawn to the right.")
    up: str = Field(description="Name of the figure drawn upwards.")
    points: tuple[tuple[float, float], ...] = Field(description="Convex hull, counter-clockwise.")


class LimitRecord(Part):
    """What a figure is held against."""

    name: str = Field(description="Name of the limit within its rule, such as `final_circuit`.")
    value: float = Field(description="Magnitude in the SI unit of the dimension.")
    dimension: str = Field(description="Name of the dimension, as `circuitlint.si` lists it.")
    path: str = Field(description="Path inside the ruleset, such as `rules.voltage-drop.limits.running`.")
    set_by: str = Field(description="Name of the ruleset, or the datum of the definition, that set the value.")
    source: str = Field(description="Key into `sources`.")


class Check(Part):
    """One figure held against one limit, for one circuit in one state; or a matter of kind; or what could not be checked."""

    id: str = Field(description="Stable name of the check: rule, tag, part, state and limit.")
    rule: str = Field(description="Name of the rule.")
    state: str = Field(default="", description="State the check belongs to; empty for every state.")
    figure: str = Field(default="", description="Name of the figure, empty for a matter of kind.")
    of: str = Field(default="", description="Part inside the circuit; empty for the circuit.")
    sense: Literal["at least", "at most", ""] = Field(
        default="", description="Whether the figure must be at least or at most the limit; empty for a matter of kind."
    )
    dimension: str = Field(
        default="", description="Name of the dimension of figure and limit; empty for a matter of kind."
    )
    nominal: float | None = Field(default=None, description="The figure's nominal value; null where there is none.")
    worst: float | None = Field(default=None, description="The figure's end that is worst for this limit.")
    limit: LimitRecord | None = Field(
        default=None, description="What the figure is held against; null for a matter of kind."
    )
    result: Result = Field(description="Whether the circuit conforms in this check.")
    basis: Basis | None = Field(default=None, description="What the result rests on; null when it conforms with room to spare.")
    severity: Severity | None = Field(default=None, description="Null when there is nothing to report.")
    margin: float | None = Field(
        default=None,
        description="Room left in the worst case as a share of the limit; negative beyond the limit.",
    )
    nominal_margin: float | None = Field(
        default=None, description="Room left at nominal values as a share of the limit; negative beyond the limit."
    )
    moved_by: str = Field(default="", description="The tolerance that moves the figure most.")
    share_beyond: float | None = Field(default=None, description="Share of the tolerance box beyond the limit.")
    share_beyond_uncertainty: float | None = Field(default=None, description="Standard uncertainty of that share.")
    needs: tuple[str, ...] = Field(default=(), description="Data that would let the check be made.")
    what: str = Field(description="What is, in one sentence, without markup.")
    why: str = Field(default="", description="The formula with its numbers, or why it could not be assessed.")
    help: str = Field(default="", description="What would help, in one sentence.")
    place: Place = Field(description="Where in the definition the part at fault stands.")
    concession: int | None = Field(default=None, description="Index into `concessions` when one covers the check.")


class Element(Part):
    """One part of the circuit's tree, for drawing it."""

    of: str = Field(description="Part inside the circuit; empty for the supply.")
    kind: str = Field(description="`supply`, `board`, `cable`, `meter`, `series`, `parallel`, `coil`, `resistor` ...")
    label: str = Field(default="", description="Name of the part.")
    values: tuple[str, ...] = Field(default=(), description="What the definition states, as printed beside the part.")
    parts: tuple[Element, ...] = Field(default=(), description="What the part is made of, or feeds, in order.")


class Cases(Part):
    """How the worst case was looked for."""

    count: int = Field(description="Number of cases solved.")
    inputs: tuple[str, ...] = Field(description="Toleranced inputs, as paths in the circuit.")
    method: str = Field(description="In words: corners, sensitivity vertices, interior points, local refinement.")


class Circuit(Part):
    """One circuit as reviewed."""

    tag: str = Field(description="Reference designation of the circuit.")
    serves: str = Field(default="", description="What the circuit serves.")
    fed_from: str = Field(default="", description="Name of the supply or board it is fed from.")
    system: Literal["dc", "single-phase", "three-phase"] = Field(description="Kind of current.")
    place: Place = Field(description="Where in the definition the circuit stands.")
    tree: Element = Field(description="The circuit from its supply down, for drawing it.")
    cases: Cases = Field(description="How many cases were solved, and which.")
    figures: tuple[Figure, ...] = Field(description="Every derived quantity, part by part and state by state.")
    phasors: tuple[Phasor, ...] = Field(
        default=(), description="Complex quantities at nominal values, for drawing them."
    )
    curves: tuple[Curve, ...] = Field(default=(), description="Quantities over time, for drawing them.")
    regions: tuple[Region, ...] = Field(default=(), description="The worst case as regions, for drawing them.")
    checks: tuple[Check, ...] = Field(description="Every check, the conforming ones too.")
    coverage: dict[str, Coverage] = Field(description="Each rule of the ruleset with its result for this circuit.")
    held: bool = Field(description="Whether the circuit must not go on to the next stage.")
    cautions: tuple[str, ...] = Field(default=(), description="Keys into the record's `cautions`.")
    not_solved: str = Field(default="", description="Why the circuit could not be studied, else empty.")


class Conductor(Part):
    """Voltage to neutral and current of one conductor of a board's feeder, rms, nominal."""

    name: str = Field(description="`L1`, `L2`, `L3`, `N`; `L1` stands for the loop where the supply is not three-phase.")
    voltage: float | None = Field(description="Volt to neutral; null for the neutral itself.")
    current: float = Field(description="Ampere in the feeder, the phasor sum of all that runs.")
    angle: float = Field(description="Angle of the current in radian, against the supply's line 1 to neutral.")


class BoardRecord(Part):
    """A board at nominal values with everything running, each circuit with its diversity."""

    name: str = Field(description="Name of the board.")
    fed_from: str = Field(description="Name of the supply or board it is fed from.")
    system: Literal["dc", "single-phase", "three-phase"] = Field(description="System of its supply.")
    circuits: tuple[str, ...] = Field(description="Tags of the circuits on the board itself.")
    conductors: tuple[Conductor, ...] = Field(description="Conductors of its feeder.")
    active_power: float = Field(description="Watt.")
    reactive_power: float = Field(description="Var; positive where the current lags.")
    power_factor: float | None = Field(description="At the board, its own capacitor included; null on direct current.")
    power_factor_uncorrected: float | None = Field(description="The same without the board's own capacitor.")


class FormulaRecord(Part):
    """An equation used by a figure. Argument symbols stand in braces."""

    result: str = Field(description="Symbol of the result.")
    equation: str = Field(description="Right-hand side, argument symbols in braces.")
    validity: str = Field(description="Where the equation holds, in words.")
    source: str = Field(description="Key into `sources`.")
    dimension: str = Field(description="Name of the dimension of the result.")


class Document(Part):
    """An input file."""

    file: str = Field(description="File name as given, with forward slashes.")
    sha256: str = Field(description="SHA-256 digest of the content, in hexadecimal.")
    kind: Literal["definition", "ruleset"] = Field(description="What the file is.")


class PluginRecord(Part):
    """A plugin that took part, or failed to."""

    name: str = Field(description="Name of the plugin.")
    version: str = Field(description="Version as the plugin states it.")
    origin: str = Field(description="Where it came from: installed, or a given path.")
    offers: tuple[str, ...] = Field(default=(), description="What it offers, by name.")
    failed: str = Field(default="", description="Why it did not load, or what it did wrong; empty when all went well.")


class RuleRecord(Part):
    """A rule that took part."""

    name: str = Field(description="Name of the rule.")
    title: str = Field(description="One line, as in a table of contents.")
    purpose: str = Field(description="What goes wrong where the rule is not kept.")
    applies_to: str = Field(description="Which circuits it looks at, in words.")
    needs: tuple[str, ...] = Field(description="Data of the definition without which it cannot be assessed.")
    helps: str = Field(description="What usually helps.")
    plugin: str = Field(description="Name of the plugin that offers it.")
    required: bool = Field(description="Whether a review that lost the rule is held.")


class RulesetRecord(Part):
    """The resolved ruleset."""

    name: str = Field(description="Name of the ruleset.")
    title: str = Field(description="Title of the ruleset.")
    edition: str = Field(description="Date of the edition.")
    jurisdiction: str = Field(description="Where its figures are usual, in words.")
    statement: str = Field(description="Who prevails over the ruleset.")
    built_on: tuple[str, ...] = Field(description="Names of the rulesets it is laid over, nearest first.")
    sha256: str = Field(description="SHA-256 digest of the resolved ruleset, in hexadecimal.")
    limits: tuple[LimitRecord, ...] = Field(description="Every limit of the resolved set.")
    severities: dict[str, dict[str, Severity]] = Field(description="Severity of each result, by rule and occasion.")
    near_the_limit: float = Field(description="Room, as a share of the limit, that counts as close to it.")


class ConcessionRecord(Part):
    """Recorded leave to accept a named nonconformity."""

    tag: str = Field(description="Circuit it is for.")
    rule: str = Field(description="Rule it is for.")
    by: str = Field(description="Who gave it.")
    reason: str = Field(description="Why.")
    until: str = Field(description="Last day, ISO 8601.")
    state: Literal["in force", "expired", "matches nothing", "too broad"] = Field(
        description="What became of it in this review."
    )
    place: Place = Field(description="Where in the definition it stands.")


class Problem(Part):
    """A rule or plugin that failed, contained: who, what, and which circuits are therefore not assessed."""

    plugin: str = Field(description="Name of the plugin.")
    rule: str = Field(description="Name of the rule; empty for the plugin as a whole.")
    what: str = Field(description="What went wrong.")
    circuits: tuple[str, ...] = Field(
        default=(), description="Tags of the circuits that are not assessed because of it."
    )


class FindingRef(Part):
    """A finding: which check of which circuit, worst first."""

    tag: str = Field(description="Circuit the finding is of.")
    check: str = Field(description="The check's `id`.")
    severity: Severity = Field(description="Its severity.")


class Record(Part):
    """One review."""

    format: Literal[1] = Field(default=1, description="Format of the record.")
    title: str = Field(description="Title of the definition.")
    tool: str = Field(description="Name of the tool.")
    version: str = Field(description="Version of the tool.")
    reviewed_on: str = Field(description="Date the concessions were compared with, ISO 8601, as given or of the day.")
    hold_at: Literal["major", "minor", "observation", "never"] = Field(
        description="Least severity that holds a circuit."
    )
    documents: tuple[Document, ...] = Field(description="Every input file with its digest.")
    plugins: tuple[PluginRecord, ...] = Field(description="Every plugin that took part or failed to.")
    rules: tuple[RuleRecord, ...] = Field(description="Every rule that took part.")
    ruleset: RulesetRecord = Field(description="The ruleset the circuits were held against, resolved.")
    circuits: tuple[Circuit, ...] = Field(description="Every circuit, in the order of the definition.")
    boards: tuple[BoardRecord, ...] = Field(default=(), description="Every board, in the order of the definition.")
    findings: tuple[FindingRef, ...] = Field(description="Every finding, worst first.")
    concessions: tuple[ConcessionRecord, ...] = Field(
        default=(), description="Every concession with what became of it."
    )
    problems: tuple[Problem, ...] = Field(default=(), description="Every failure that was contained.")
    formulas: dict[str, FormulaRecord] = Field(description="Formulas used, by name.")
    sources: dict[str, SourceRecord] = Field(description="Sources of formulas and limits, by key.")
    cautions: dict[str, str] = Field(description="Cautions that apply, by key.")
    statement: str = Field(description="Who prevails over the review.")
    held: bool = Field(description="Whether anything is held.")
    counts: dict[str, int] = Field(description="Checks by result, findings by severity, circuits held and clear.")
