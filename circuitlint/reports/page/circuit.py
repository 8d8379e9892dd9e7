"""One circuit: diagrams, checks, calculation sheet, coverage, concessions, cautions."""

from __future__ import annotations

from circuitlint.reports.page import margins
from circuitlint.reports.page.curve import curve_plot
from circuitlint.reports.page.findings import (
    figure_words,
    found_words,
    least_margin,
    limit_words,
    margin_words,
    place_words,
)
from circuitlint.reports.page.marks import held_or_not, mark, not_assessed, result_of, standing
from circuitlint.reports.page.oneline import one_line
from circuitlint.reports.page.overview import cells, concessions
from circuitlint.reports.page.phasor import Reference, arrows_of, phasor_diagram
from circuitlint.reports.page.ranges import region_plot
from circuitlint.reports.page.sheet import References, calculation_sheet
from circuitlint.reports.page.text import count, escape, isolated, percent, plain, sentence, words
from circuitlint.reports.page.triangles import impedance_triangle, power_triangle
from circuitlint.review.record import Check, Circuit, Record

ON_TRIANGLES = (("resistance", "reactance"), ("active-power", "reactive-power"))
NOTHING = '<p class="plate quiet">The record holds no phasors, regions or curves of this circuit.</p>'
COVERAGE = ("nonconforming", "not assessed", "conforms", "not applicable")


def circuits(record: Record, references: References, reference: Reference) -> str:
    """Every circuit, folded, with the controls that a script brings to life."""
    options = "".join(
        f'<option value="{value}">{said}'
        for value, said in (
            ("all", "All circuits"),
            ("held", "Held"),
            ("clear", "Clear"),
            ("open", "Something not assessed"),
        )
    )
    orders = "".join(
        f'<option value="{value}">{said}'
        for value, said in (
            ("given", "As in the definition"),
            ("margin", "Least margin first"),
            ("findings", "Most findings first"),
            ("tag", "By tag"),
        )
    )
    controls = (
        '<div class="controls" id="find" role="search" hidden>'
        '<label>Find <input type="search" id="words" autocomplete="off"></label>'
        f'<label>Show <select id="which">{options}</select></label><label>Order <select id="order">{orders}</select>'
        '</label><label><input type="checkbox" id="sheets" checked> Print calculation sheets</label>'
        '<button type="button" id="unfold">Unfold all shown</button></div>'
        '<p class="told" id="shown" role="status"></p>'
    )
    listed = "".join(_circuit(one, number, record, references, reference) for number, one in enumerate(record.circuits, 1))
    return f'{controls}<div class="circuits" id="list">{listed}</div>' if listed else "<p>There are no circuits.</p>"


def _circuit(circuit: Circuit, number: int, record: Record, references: References, reference: Reference) -> str:
    least = least_margin(circuit)
    margin = "" if least is None or least.margin is None else f"{least.margin:.6g}"
    drawn = '<span class="quiet">no margin</span>'
    if least is not None and least.margin is not None:
        bar = margins.bar(least.margin, least.nominal_margin, least.margin < 0.0)
        drawn = f"{bar} <span>{percent(least.margin)}</span>"
    many = sum(one.severity is not None for one in circuit.checks)
    data = (
        f' data-held="{int(circuit.held)}" data-open="{int(not_assessed(circuit))}" data-margin="{margin}" data-findings="{many}"'
    )
    head = (
        f'<summary><h3>{isolated(circuit.tag)}</h3> <span class="serves">{isolated(circuit.serves)}</span> '
        f'<span class="least"><span class="hidden">Least margin </span>{drawn}</span> '
        f'<span class="standing">{standing(record, circuit)}</span></summary>'
    )
    single = " open" if len(record.circuits) == 1 else ""
    return (
        f'<details class="circuit" id="c{number}"{data}{single}>{head}'
        f"{_body(circuit, number, record, references, reference)}"
        "</details>"
    )


def _body(circuit: Circuit, number: int, record: Record, references: References, reference: Reference) -> str:
    made = [f'<div class="sheet" id="k{number}">', _facts(record, circuit)]
    if circuit.not_solved:
        made.append(
            f'<p class="note">{mark("not assessed")}: the circuit could not be studied, since {escape(circuit.not_solved)}.</p>'
        )
    made.append(_plates(circuit, reference))
    made.append(f"<h4>Checks</h4>{_checks(circuit, references)}")
    made.append(f"<h4>Calculation sheet</h4>{calculation_sheet(circuit, record.formulas, references, number)}")
    chosen = sorted(
        {index for index, one in enumerate(record.concessions) if one.tag == circuit.tag}
        | {one.concession for one in circuit.checks if one.concession is not None and one.concession < len(record.concessions)}
    )
    granted = f"<h4>Concessions</h4>{concessions(record, chosen)}" if chosen else ""
    texts = [record.cautions.get(key, key) for key in circuit.cautions]
    listed = "".join(f"<li>{escape(text)}" for text in texts)
    made.append(
        f'<div class="ends"><div><h4>Coverage</h4>{_coverage(circuit)}'
        f"{'' if chosen else '<h4>Concessions</h4><p>None.</p>'}"
        f"</div><div><h4>Cautions</h4>{f'<ul>{listed}</ul>' if listed else '<p>None by the parts of this circuit.</p>'}"
        f"</div></div>{granted}</div>"
    )
    return "".join(made)


def _facts(record: Record, circuit: Circuit) -> str:
    at = circuit.place
    inputs = ", ".join(f"<code>{escape(one)}</code>" for one in circuit.cases.inputs) or "none"
    cases = circuit.cases
    return cells([
        ("Standing", f"{mark(held_or_not(record, [circuit]))}, {found_words(circuit)}"),
        ("Fed from", f"{escape(circuit.fed_from)}, {circuit.system}"),
        ("Defined at", f"<code>{escape(at.file)}:{at.line}</code>"),
        ("Worst case", f"{count(cases.count, 'case')}: {escape(cases.method)}"),
        ("Toleranced", inputs),
    ], "facts")  # fmt: skip


def _plates(circuit: Circuit, reference: Reference) -> str:
    """The drawings that the record holds the numbers for; worst-case regions of other states, and those that the
    triangles already show, stand folded."""
    state = (
        "steady"
        if any(one.state == "steady" for one in circuit.phasors)
        else next((one.state for one in circuit.phasors), "steady")
    )
    plates = []
    if circuit.system != "dc":
        plates = [
            _plate(f"Phasors, {state}", phasor_diagram(circuit, state, reference), _key(circuit, state)),
            _plate(f"Impedance, {state}", impedance_triangle(circuit, state)),
            _plate(f"Power, {state}", power_triangle(circuit, state)),
        ]
    folded = ""
    for one in circuit.regions:
        plate = _plate(f"Worst-case region, {one.state}", region_plot(circuit, one))
        if circuit.phasors and circuit.system != "dc" and (one.state != state or (one.across, one.up) in ON_TRIANGLES):
            folded += plate
        else:
            plates.append(plate)
    for curve in circuit.curves:
        caption = sentence(plain(curve.name))
        caption += f", {curve.state}" if curve.state and not curve.name.startswith(curve.state) else ""
        plates.append(
            _plate(caption, curve_plot(circuit, curve), f'<p class="key">{escape(curve.note)}</p>' if curve.note else "")
        )
    made = (
        f'<div class="plates"><figure class="plate tall"><figcaption>One line</figcaption>{one_line(circuit)}</figure>'
        f'<div class="grid">{"".join(plates) or NOTHING}</div></div>'
    )
    if folded:
        made += (
            f'<details class="more"><summary>Worst-case regions with their axes</summary>'
            f'<div class="plates only"><div class="grid">{folded}</div></div></details>'
        )
    return made


def _plate(caption: str, drawing: str, key: str = "") -> str:
    if not drawing:
        return ""
    return f'<figure class="plate"><figcaption>{escape(caption)}</figcaption>{drawing}{key}</figure>'


def _key(circuit: Circuit, state: str) -> str:
    """Which part each numbered phasor belongs to, where the letters alone do not say it."""
    arrows, closes = arrows_of(circuit, state)
    named = [one for one in arrows if one.of and one.sub not in ("R", "L", "C", "cable")]
    parts = [f"{one.lead}<sub>{escape(one.sub)}</sub> <code>{escape(one.of)}</code>" for one in named]
    if not closes and any(one.of and one.lead == "U" for one in arrows):
        parts.append("parts drawn from the origin, since the record does not hold all that add up to the supply voltage")
    return f'<p class="key">{"; ".join(parts)}</p>' if parts else ""


def _checks(circuit: Circuit, references: References) -> str:
    if not circuit.checks:
        return "<p>No check was made.</p>"
    rows = "".join(_check(one, references) for one in circuit.checks)
    return (
        '<table class="checks" aria-label="Checks"><thead><tr><th scope="col">Rule<th scope="col">What is'
        '<th scope="col">Figure<th scope="col">Limit<th scope="col">Margin<th scope="col">Result</thead>'
        f"<tbody>{rows}</tbody></table>"
    )


def _check(one: Check, references: References) -> str:
    lines = [escape(sentence(one.what))]
    lines += [f"<small>{escape(one.why)}</small>"] if one.why else []
    lines += [f"<small>Needed: {', '.join(map(escape, one.needs))}</small>"] if one.needs else []
    lines += [f"<small>Would help: {escape(one.help)}</small>"] if one.help else []
    lines += [f"<small>Moved most by {escape(one.moved_by)}</small>"] if one.moved_by and one.worst != one.nominal else []
    state = f'<br><span class="quiet">{escape(one.state)}</span>' if one.state else ""
    where = f"<small>{place_words(one)}</small>" if one.severity is not None else ""
    return (
        f'<tr><th scope="row">{words(one.rule)}{state}<td>{"<br>".join(lines)}{"<br>" + where if where else ""}'
        f"<td>{figure_words(one)}<td>{limit_words(one, references)}<td>{margin_words(one)}<td>{result_of(one)}"
    )


def _coverage(circuit: Circuit) -> str:
    pairs = []
    for result in COVERAGE:
        names = [words(name) for name, found in circuit.coverage.items() if found == result]
        if names:
            pairs.append((mark(result), ", ".join(names)))
    return cells(pairs, "facts") if pairs else "<p>No rule applies.</p>"
