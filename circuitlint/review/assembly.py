"""Puts the record together: circuits with their checks, coverage, findings worst first, concessions, problems, sources."""

from __future__ import annotations

from collections.abc import Iterable, Mapping, Sequence
from datetime import date
from typing import Any

import circuitlint
from circuitlint.definition.reading import Installation
from circuitlint.limits.models import OCCASIONS, Limit, Ruleset
from circuitlint.physics.formula import Formula
from circuitlint.review import concessions, drawing
from circuitlint.review import record as r
from circuitlint.review.boards import records_of
from circuitlint.review.cautions import CAUTIONS, cautions_for
from circuitlint.review.rule import Rule
from circuitlint.review.worked import inputs_of
from circuitlint.sources import Source
from circuitlint.study.cases import FEW, FEW_WITH_CAPACITOR, in_words
from circuitlint.study.plan import Kinds
from circuitlint.study.solving import has_capacitor
from circuitlint.study.study import CircuitStudy

RANK = {"major": 0, "minor": 1, "observation": 2}
WORST_FIRST: tuple[r.Coverage, ...] = ("nonconforming", "not assessed", "conforms")


class Assembly:
    """One review's record in the making."""

    def __init__(
        self, installation: Installation, ruleset: Ruleset, kinds: Kinds, hold_at: str, on_date: str, figures: bool
    ) -> None:
        self.installation, self.ruleset, self.kinds = installation, ruleset, kinds
        self.hold_at, self.on_date, self.figures = hold_at, on_date, figures
        self.sources: dict[str, r.SourceRecord] = {}
        self.formulas: dict[str, r.FormulaRecord] = {}
        self.problems: dict[tuple[str, str, str], list[str]] = {}
        self.lost_required = False
        self.lost_rules: dict[str, str] = {}
        self.studies: list[tuple[CircuitStudy, Mapping[str, Sequence[r.Check] | None]]] = []

    def source(self, source: Source) -> str:
        """Note a source and give its key, which is how a person would cite it."""
        key = str(source) if source.known != "read" else f"{source} (read)"
        number = 2
        entry = r.SourceRecord(work=source.work, place=source.place, edition=source.edition, known=source.known,
                               note=source.note)
        wanted = key
        while self.sources.setdefault(wanted, entry) != entry:
            wanted = f"{key} [{number}]"
            number += 1
        return wanted

    def formula(self, formula: Formula[..., Any]) -> str:
        """Note a formula and give its key."""
        if formula.name not in self.formulas:
            self.formulas[formula.name] = r.FormulaRecord(
                result=formula.result, equation=formula.equation, validity=formula.validity,
                source=self.source(formula.source), dimension=formula.dimension.name,
            )
        return formula.name

    def problem(self, plugin: str, rule: str, what: str, circuits: Iterable[str], *, fatal: bool) -> None:
        """Note a failure that was contained; a fatal one holds the review."""
        self.problems.setdefault((plugin, rule, what), []).extend(circuits)
        self.lost_required = self.lost_required or fatal

    def lost(self, rule: str, plugin: str, what: str, required: bool) -> None:
        """Note a rule that the ruleset names and no plugin offers."""
        self.lost_rules[rule] = what
        tags = [one.entry.tag for one in self.installation.circuits]
        self.problem(plugin, rule, what, tags, fatal=required)

    def add(self, circuit: CircuitStudy, checks: Mapping[str, Sequence[r.Check] | None]) -> None:
        """Take in one circuit with the checks of every rule; None where a rule does not apply."""
        self.studies.append((circuit, checks))

    def record(
        self, rules: Sequence[tuple[Rule, str, bool, Mapping[str, Limit]]], plugins: Sequence[r.PluginRecord]
    ) -> r.Record:
        """The finished record."""
        given, covered = self._concessions()
        circuits = tuple(self._circuit(one, checks, covered) for one, checks in self.studies)
        findings = self._findings(circuits)
        held = self.lost_required or any(one.held for one in circuits)
        used = dict.fromkeys(key for one in circuits for key in one.cautions)
        return r.Record(
            title=self.installation.title, tool="circuitlint", version=circuitlint.__version__,
            reviewed_on=self.on_date if self.installation.concessions else "",
            hold_at=self.hold_at, documents=self._documents(), plugins=tuple(plugins),  # type: ignore[arg-type]
            rules=tuple(
                r.RuleRecord(name=rule.name, title=rule.title, purpose=rule.purpose, applies_to=rule.applies_to,
                             needs=rule.needs, helps=rule.helps, plugin=plugin, required=required)
                for rule, plugin, required, _ in rules
            ),
            ruleset=self._ruleset(rules), circuits=circuits, boards=self._boards(), findings=findings, concessions=tuple(given),
            problems=tuple(
                r.Problem(plugin=plugin, rule=rule, what=what, circuits=tuple(dict.fromkeys(tags)))
                for (plugin, rule, what), tags in self.problems.items()
            ),
            formulas=dict(sorted(self.formulas.items())), sources=dict(sorted(self.sources.items())),
            cautions={key: text for key, text in CAUTIONS.items() if key in used}, statement=self.ruleset.statement,
            held=held, counts=_counts(circuits, findings),
        )

    def _documents(self) -> tuple[r.Document, ...]:
        made = [r.Document(file=file, sha256=digest, kind="definition") for file, digest in self.installation.documents]
        made += [r.Document(file=file, sha256=digest, kind="ruleset") for file, digest in self.ruleset.documents]
        return tuple(made)

    def _boards(self) -> tuple[r.BoardRecord, ...]:
        return records_of(self.studies[0][0].boards, self.installation.boards) if self.studies else ()

    def _concessions(self) -> tuple[list[r.ConcessionRecord], dict[str, int]]:
        flat = [(circuit.tag, check) for circuit, checks in self.studies for some in checks.values() for check in some or ()]
        given: list[r.ConcessionRecord] = []
        covered: dict[str, int] = {}
        for one in self.installation.concessions:
            state, ids = concessions.state_of(one, self.on_date or date.today().isoformat(), flat)
            covered.update({check: len(given) for check in ids})
            given.append(concessions.record_of(one, state))
        return given, covered

    def _circuit(
        self, one: CircuitStudy, checks: Mapping[str, Sequence[r.Check] | None], covered: Mapping[str, int]
    ) -> r.Circuit:
        flat = tuple(check for some in checks.values() for check in some or ())
        if covered:
            flat = tuple(
                check.model_copy(update={"concession": covered[check.id]}) if check.id in covered else check for check in flat
            )
        coverage = {name: _coverage(some) for name, some in checks.items()}
        coverage |= dict.fromkeys(self.lost_rules, "not assessed")
        spot = one.definition.spot()
        inputs = tuple(dict.fromkeys(path for solution in one.solutions.values() for path in solution.inputs))
        refined = any(solution.refined for solution in one.solutions.values())
        running = [solution for solution in one.solutions.values() if not solution.state.mistake]
        faulty = sorted({solution.faulty[one.position] for solution in running if solution.faulty[one.position]})
        drawn = self.figures
        return r.Circuit(
            tag=one.tag, serves=one.entry.serves, fed_from=one.entry.fed_from, system=one.system,  # type: ignore[arg-type]
            place=r.Place(file=spot.file, line=spot.line, column=spot.column, path=spot.path),
            tree=drawing.tree(one, self.kinds),
            cases=r.Cases(count=sum(solution.studied for solution in one.solutions.values()), inputs=inputs,
                          method=in_words(max((len(s.inputs) for s in one.solutions.values()), default=0), _few(one), refined)),
            figures=tuple(self._figures(one)) if drawn else (), phasors=tuple(drawing.phasors(one)) if drawn else (),
            curves=tuple(drawing.curves(one)) if drawn else (), regions=tuple(drawing.regions(one)) if drawn else (),
            checks=flat, coverage=coverage, held=any(self._holds(check) for check in flat), cautions=cautions_for(one),
            not_solved="; ".join(faulty),
        )

    def _figures(self, one: CircuitStudy) -> Iterable[r.Figure]:
        for figure in one.figures():
            yield r.Figure(
                name=figure.name, of=figure.of, state=figure.state, dimension=figure.dimension.name,
                nominal=figure.nominal, lowest=figure.lowest, highest=figure.highest,
                formula=self.formula(figure.formula) if figure.formula else "", inputs=inputs_of(one, figure),
                moved_by=figure.moved_by, note=figure.note,
            )

    def _holds(self, check: r.Check) -> bool:
        if check.severity is None or check.concession is not None or self.hold_at == "never":
            return False
        return RANK[check.severity] <= RANK[self.hold_at]

    def _findings(self, circuits: Sequence[r.Circuit]) -> tuple[r.FindingRef, ...]:
        found = [
            ((RANK[check.severity], check.result != "nonconforming", check.margin if check.margin is not None else 0.0, number),
             r.FindingRef(tag=one.tag, check=check.id, severity=check.severity))
            for number, one in enumerate(circuits)
            for check in one.checks
            if check.severity is not None
        ]
        return tuple(finding for _, finding in sorted(found, key=lambda pair: pair[0]))

    def _ruleset(self, rules: Sequence[tuple[Rule, str, bool, Mapping[str, Limit]]]) -> r.RulesetRecord:
        limits = tuple(
            r.LimitRecord(name=limit.name, value=limit.value, dimension=limit.quantity.dimension.name, path=limit.path,
                          set_by=limit.set_by, source=self.source(limit.source))
            for _, _, _, given in rules
            for limit in given.values()
        )
        severities = {
            name: {occasion: terms.severities[occasion] for occasion in OCCASIONS} for name, terms in self.ruleset.rules.items()
        }
        ruleset = self.ruleset
        return r.RulesetRecord(
            name=ruleset.name, title=ruleset.title, edition=ruleset.edition, jurisdiction=ruleset.jurisdiction,
            statement=ruleset.statement, built_on=ruleset.built_on, sha256=ruleset.sha256, limits=limits,
            severities=severities, near_the_limit=ruleset.near_the_limit,  # type: ignore[arg-type]
        )


def _few(one: CircuitStudy) -> int:
    return FEW_WITH_CAPACITOR if has_capacitor(one.tree) else FEW


def _coverage(checks: Sequence[r.Check] | None) -> r.Coverage:
    if checks is None:
        return "not applicable"
    results = {check.result for check in checks}
    return next(result for result in WORST_FIRST if result in results)


def _counts(circuits: Sequence[r.Circuit], findings: Sequence[r.FindingRef]) -> dict[str, int]:
    checks = [check for one in circuits for check in one.checks]
    counts = {result: sum(check.result == result for check in checks) for result in ("conforms", "nonconforming", "not assessed")}
    counts |= {severity: sum(one.severity == severity for one in findings) for severity in r.SEVERITIES}
    counts["circuits held"] = sum(one.held for one in circuits)
    counts["circuits clear"] = len(circuits) - counts["circuits held"]
    return counts
