"""Findings, worst first, and the margins of all checks."""

from __future__ import annotations

import math
from collections import Counter
from collections.abc import Iterator

from circuitlint.reports.page import margins
from circuitlint.reports.page.marks import mark, result_of
from circuitlint.reports.page.overview import cells
from circuitlint.reports.page.sheet import References
from circuitlint.reports.page.text import NOT_A_NUMBER, count, escape, isolated, percent, quantity, sentence, stated, words
from circuitlint.review.record import SEVERITIES, Check, Circuit, Record

TIGHTEST = 30


def place_words(check: Check) -> str:
    """File, line, column and path of a check."""
    at = check.place
    return f"<code>{escape(at.file)}:{at.line}:{at.column}</code> <code>{escape(at.path)}</code>"


def figure_words(check: Check) -> str:
    """Nominal figure and worst case with their unit."""
    if check.nominal is None:
        return ""
    said = quantity(check.nominal, check.dimension)
    if check.worst is not None and check.worst != check.nominal:
        end = "lowest" if check.sense == "at least" else "highest"
        said += f", {end} {quantity(check.worst, check.dimension)}"
    return said


def limit_words(check: Check, references: References) -> str:
    """The limit, who set it, and its source."""
    if check.limit is None:
        return ""
    one = check.limit
    return f"{check.sense} {stated(one.value, one.dimension)}, set by {escape(one.set_by)}, {references.to_source(one.source)}"


def margin_words(check: Check) -> str:
    """The margin drawn and in numbers; empty where there is none."""
    if check.margin is None:
        return ""
    if not math.isfinite(check.margin):
        return NOT_A_NUMBER
    return f"{margins.bar(check.margin, check.nominal_margin, check.margin < 0.0)} {percent(check.margin)}"


def _share(check: Check) -> str:
    if check.share_beyond is None:
        return ""
    spread = check.share_beyond_uncertainty
    said = percent(check.share_beyond, signed=False)
    return said + (f" ± {percent(spread, signed=False)}" if spread else "") + " of the tolerance box"


def findings(record: Record, anchors: dict[str, int], references: References) -> str:
    """Every finding with what, figure, limit, margin, why, what would help, and where."""
    if not record.findings:
        return "<p>There are no findings.</p>"
    checks = {(one.tag, check.id): (one, check) for one in record.circuits for check in one.checks}
    found = Counter(one.severity for one in record.findings)
    boxes = "".join(
        f'<label><input type="checkbox" value="{name}" checked> {mark(name)} <span class="quiet">{found[name]}</span></label>'
        for name in SEVERITIES
        if found[name]
    )
    controls = (
        f'<fieldset class="controls" id="severities" hidden><legend>Show findings of severity</legend>{boxes}'
        '</fieldset><p class="told" id="found" role="status"></p>'
    )
    items = []
    for one in record.findings:
        known = checks.get((one.tag, one.check))
        if known is not None:
            items.append(_finding(*known, one.severity, record, anchors, references))
        else:
            items.append(
                f'<li class="finding {one.severity}" data-severity="{one.severity}"><p class="what">'
                f"{mark(one.severity)} {isolated(one.tag)} <code>{escape(one.check)}</code>"
            )
    return f'{controls}<ol class="findings">{"".join(items)}</ol>'


def _finding(
    circuit: Circuit, check: Check, severity: str, record: Record, anchors: dict[str, int], references: References
) -> str:
    measured = [
        ("Figure", figure_words(check)),
        ("Limit", limit_words(check, references)),
        ("Margin", margin_words(check)),
        ("Beyond it", _share(check)),
    ]
    told = [
        ("Why", escape(check.why)),
        ("Needed", "; ".join(f"<code>{escape(need)}</code>" for need in check.needs)),
        ("Would help", escape(check.help)),
        ("Concession", _concession(check, record)),
        ("Where", place_words(check)),
    ]
    lists = "".join(
        cells(((caption, said) for caption, said in facts if said), "facts")
        for facts in (measured, told)
        if any(said for _, said in facts)
    )
    link = f'<a href="#k{anchors[circuit.tag]}">{isolated(circuit.tag)}</a>'
    basis = f', <span class="basis">{check.basis}</span>' if check.basis else ""
    return (
        f'<li class="finding {severity}" data-severity="{severity}"><p class="what">{mark(severity)} {link} '
        f'<span class="rule">{words(check.rule)}</span>{basis}</p><p class="is">{escape(sentence(check.what))}</p>'
        f'<div class="two">{lists}</div>'
    )


def _concession(check: Check, record: Record) -> str:
    if check.concession is None or not 0 <= check.concession < len(record.concessions):
        return ""
    one = record.concessions[check.concession]
    return f"{one.state}: by {escape(one.by)}, until {escape(one.until)}, {escape(one.reason)}"


def _margins(record: Record) -> Iterator[tuple[Circuit, Check, float]]:
    for circuit in record.circuits:
        for check in circuit.checks:
            if check.margin is not None and math.isfinite(check.margin):
                yield circuit, check, check.margin


def margins_chart(record: Record, anchors: dict[str, int]) -> str:
    """Margins of all checks by rule, and the tightest ones by name."""
    listed = list(_margins(record))
    if not listed:
        return "<p>No check has a margin.</p>"
    by_rule: dict[str, list[tuple[Circuit, Check, float]]] = {}
    for each in listed:
        by_rule.setdefault(each[1].rule, []).append(each)
    ordered = list(dict.fromkeys([*(one.name for one in record.rules), *by_rule]))
    open_ends = Counter(check.rule for one in record.circuits for check in one.checks if check.result == "not assessed")
    rows = "".join(_rule_row(name, by_rule.get(name, []), open_ends[name], anchors) for name in ordered)
    scale = margins.scale_head()
    tightest = sorted(listed, key=lambda each: each[2])[:TIGHTEST]
    names = "".join(_tight_row(circuit, check, margin, anchors) for circuit, check, margin in tightest)
    which = "All checks with a margin" if len(listed) <= TIGHTEST else f"The {TIGHTEST} tightest of {len(listed)} checks"
    return (
        "<p>Room left in the worst case as a share of the limit. Hatched: beyond the limit. One stroke for each "
        "check.</p>"
        '<table class="margins" aria-label="Margins by rule"><thead><tr><th scope="col">Rule'
        f'<th scope="col"><span class="hidden">Margins to scale</span>{scale}'
        '<th scope="col">Checks<th scope="col">Beyond'
        f'<th scope="col">Not assessed<th scope="col">Least margin</thead><tbody>{rows}</tbody></table>'
        f"<h3>{which}, tightest first</h3><p>Ring: at nominal values. Dot: in the worst case.</p>"
        '<table class="margins tight" aria-label="Checks by margin"><thead><tr><th scope="col">Circuit'
        '<th scope="col">Check'
        f'<th scope="col"><span class="hidden">Margin to scale</span>{margins.scale_head(margins.SMALL_WIDE)}'
        '<th scope="col">Worst case<th scope="col">At nominal<th scope="col">Result</thead>'
        f"<tbody>{names}</tbody></table>"
    )


def _rule_row(name: str, members: list[tuple[Circuit, Check, float]], open_ends: int, anchors: dict[str, int]) -> str:
    if not members:
        return f'<tr><th scope="row">{words(name)}<td class="quiet">no check with a margin<td>0<td>0<td>{open_ends}<td>'
    inside = [margin for _, _, margin in members if margin >= 0.0]
    beyond = [margin for _, _, margin in members if margin < 0.0]
    circuit, _, least = min(members, key=lambda each: each[2])
    where = f'<a href="#k{anchors[circuit.tag]}">{isolated(circuit.tag)}</a>'
    return (
        f'<tr><th scope="row">{words(name)}<td>{margins.strip(inside, beyond)}<td>{len(members)}'
        f"<td>{len(beyond)}<td>{open_ends}<td>{percent(least)}, {where}"
    )


def _tight_row(circuit: Circuit, check: Check, margin: float, anchors: dict[str, int]) -> str:
    nominal = "" if check.nominal_margin is None else percent(check.nominal_margin)
    of = f" of {escape(check.of)}" if check.of else ""
    state = f", {escape(check.state)}" if check.state else ""
    return (
        f'<tr><th scope="row"><a href="#k{anchors[circuit.tag]}">{isolated(circuit.tag)}</a><td>{words(check.rule)}'
        f'<br><span class="quiet">{words(check.figure)}{of}{state}</span>'
        f"<td>{margins.bar(margin, check.nominal_margin, margin < 0.0)}<td>{percent(margin)}<td>{nominal}"
        f"<td>{result_of(check)}"
    )


def least_margin(circuit: Circuit) -> Check | None:
    """The check of a circuit with the least margin."""
    known = [one for one in circuit.checks if one.margin is not None and math.isfinite(one.margin)]
    return min(known, key=lambda one: one.margin or 0.0, default=None)


def found_words(circuit: Circuit) -> str:
    """How many findings of each severity a circuit has."""
    found = Counter(one.severity for one in circuit.checks if one.severity is not None)
    said = [count(found[name], name, name if name != "observation" else "observations") for name in SEVERITIES if found[name]]
    return ", ".join(said) or "no findings"
