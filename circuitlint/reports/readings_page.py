"""The account of readings as one self-contained page: predicted range and reading side by side, as numbers and as a picture."""

from __future__ import annotations

from collections.abc import Iterator

from circuitlint.readings.record import CircuitReadings, Evidence, Explanation, Measured, ReadingResult, ReadingsRecord
from circuitlint.reports.page.text import escape
from circuitlint.reports.readings_shell import facts, page, signatures, table
from circuitlint.reports.readings_words import (
    RULES,
    STANDS,
    certainty,
    interval,
    limit_of,
    predicted,
    result,
    sigmas,
    spoken,
    with_uncertainty,
)
from circuitlint.reports.words import amount, place_of

WIDE, HIGH, PAD = 260.0, 22.0, 8.0
KEY = (
    '<p class="key"><span><svg viewBox="0 0 46 16" class="bar" aria-hidden="true"><rect class="band" x="1" y="2" width="44" '
    'height="12"/><path class="middle" d="M23 2V14"/></svg>predicted range, nominal value</span><span>'
    '<svg viewBox="0 0 46 16" class="bar" aria-hidden="true"><path class="span" d="M6 8H40"/>'
    '<circle class="dot" cx="23" cy="8" r="4"/></svg>reading with its interval</span>'
    "<span>Each picture has a scale of its own.</span></p>"
)


def render(record: ReadingsRecord) -> str:
    """The page as text, to be written as UTF-8. The same record gives the same bytes."""
    said = [("Read on", record.taken_on), ("Read by", record.by), ("Seen by", record.witness),
            ("Held against", ", ".join(one.file for one in record.definition)), ("Ruleset", record.ruleset),
            ("Decision rule", f"{record.decision_rule}: {RULES[record.decision_rule]}"),
            ("Intervals", f"each holds {100 * record.coverage:.0f} % of the values that may be meant")]
    held = " held" if record.held else ""
    header = f'<p class="verdict{held}">{escape(result(record))}</p>{facts(said)}'
    circuits = "".join(_circuit(record, one, number == 0) for number, one in enumerate(record.circuits))
    return page("Readings held against the prediction", record.title or "Readings", header, circuits + _closing(record))


def _circuit(record: ReadingsRecord, circuit: CircuitReadings, first: bool) -> str:
    own = [one for one in record.readings if one.tag == circuit.tag]
    departs = " departs" if circuit.departs else ""
    told = escape(circuit.told[:1].upper() + circuit.told[1:])
    heading = f"<h2>{escape(circuit.tag)}<small>{escape(own[0].serves)}</small></h2>"
    parts = [f'<section class="circuit{" first" if first else ""}">{heading}<p class="told{departs}">{told}.</p>']
    if circuit.explanations:
        parts.append(f"<h3>What it may mean</h3><p>{escape(certainty(circuit))}</p>")
        parts += [_idea(number, one) for number, one in enumerate(circuit.explanations, 1)]
    for one in own:
        parts.append(_reading(one))
    parts.append(KEY)
    if circuit.limits:
        rows = [
            f'<tr><th scope="row">{escape(each.rule.replace("-", " "))}<td>{escape(spoken(each.figure))}, {escape(each.state)}'
            f'<td class="n">{escape(amount(each.value, each.dimension, each.figure))}<td class="n">{escape(interval(each))}'
            f'<td class="n">{escape(limit_of(each))}<td class="{"" if each.accepted else "bad"}">{escape(each.statement)}'
            f"{'' if each.accepted else '; not accepted'}<td>{escape(each.reviewed)}" for each in circuit.limits
        ]
        parts.append("<h3>Limits judged again with what was measured</h3>" + table(
            f"Limits of {circuit.tag}", (("Rule", ""), ("Figure", ""), ("Measured", "n"), ("Interval", "n"), ("Limit", "n"),
                                         ("Statement", ""), ("Review, before", "")), rows))
    if circuit.not_measured:
        further = f"{circuit.not_measured} further limits of the review are not touched by these readings."
        parts.append(f'<p class="quiet">{further}</p>')
    return "".join(parts) + "</section>"


def _reading(one: ReadingResult) -> str:
    where = one.of or "circuit at its origin"
    read = "; ".join(
        f"{spoken(each.quantity)} {amount(each.value, each.dimension)}{f', mean of {each.sets} sets' if each.sets > 1 else ''}"
        f"{f' ({each.instrument})' if each.instrument else ''}" for each in one.inputs)
    notes = [*one.notes, *((f"as written: {one.note}",) if one.note else ())]
    listed = f'<ul class="notes">{"".join(f"<li>{escape(note)}" for note in notes)}</ul>' if notes else ""
    head = (("Result", ""), ("Value(u)", "n"), ("Interval", "n"), ("Predicted", "n"), ("Picture", ""), ("Stands", ""))
    return (
        f"<h3>{escape(where)}, {escape(one.state)}: {escape(one.method)}</h3>"
        f'<p class="quiet">Read: {escape(read)}.<br>{escape(place_of(one.place))}</p>'
        f"{table(f'Results of {where}, {one.state}', head, _rows(one.results))}{listed}"
    )


def _rows(results: tuple[Measured, ...]) -> Iterator[str]:
    for one in results:
        stands = STANDS[one.agreement] if one.predicted is not None or one.low is None else "nothing predicted"
        bad = ' class="bad"' if one.agreement == "outside" else ""
        yield (f'<tr><th scope="row">{escape(spoken(one.name))}<td class="n">'
               f'{escape(with_uncertainty(one.value, one.uncertainty, one.dimension))}<td class="n">{escape(interval(one))}'
               f'<td class="n">{escape(predicted(one))}<td>{_picture(one)}<td{bad}>{escape(stands)}')


def _picture(one: Measured) -> str:
    """Predicted range as a band, the reading as a dot with its interval, on one scale."""
    if one.predicted is None:
        return ""
    nominal, least, most = one.predicted
    low, high = (one.low, one.high) if one.low is not None and one.high is not None else (one.value, one.value)
    ends = (least, most, low, high, one.value)
    start, stop = min(ends), max(ends)
    room = (stop - start) or abs(stop) or 1.0

    def x(value: float) -> str:
        return f"{PAD + (WIDE - 2 * PAD) * (value - start) / room:.1f}"

    out = " out" if one.agreement == "outside" else ""
    read = amount(one.value, one.dimension, one.name)
    words = f"{spoken(one.name)}: predicted {predicted(one)}, read {read}, {STANDS[one.agreement]}"
    width = max(1.5, float(x(most)) - float(x(least)))
    return (
        f'<svg class="bar" role="img" viewBox="0 0 {WIDE:.0f} {HIGH:.0f}"><title>{escape(words)}</title>'
        f'<path class="end" d="M0 {HIGH / 2:.0f}H{WIDE:.0f}"/>'
        f'<rect class="band" x="{x(least)}" y="3" width="{width:.1f}" height="{HIGH - 6:.0f}"/>'
        f'<path class="middle" d="M{x(nominal)} 3V{HIGH - 3:.0f}"/>'
        f'<path class="span{out}" d="M{x(low)} {HIGH / 2:.0f}H{x(high)}"/>'
        f'<circle class="dot{out}" cx="{x(one.value)}" cy="{HIGH / 2:.0f}" r="4"/></svg>'
    )


def _idea(number: int, one: Explanation) -> str:
    rows = [_evidence(each) for each in one.evidence]
    head = (("Reading", ""), ("Read", "n"), ("If so", "n"), ("Away", "n"), ("As defined", "n"), ("Away", "n"), ("Speaks", ""))
    name = one.name.replace("-", " ")
    title, what = (escape(words[:1].upper() + words[1:]) for words in (name, one.what))
    return (
        f'<div class="idea"><h4>{number}. {title}</h4><p>{what}; '
        f"{escape(one.amount)} fits best. Weight {one.weight:.2g} of the best.</p>{table(f'Evidence on {name}', head, rows)}"
        f'<p class="quiet">To settle it: {escape(one.check)}. Distances are in standard uncertainties u of reading and '
        "expectation together.</p></div>"
    )


def _evidence(one: Evidence) -> str:
    name, _, state = one.what.partition(", ")
    return (f'<tr><th scope="row">{escape(spoken(name))}, {escape(state)}<td class="n">{escape(amount(one.read, one.dimension))}'
            f'<td class="n">{escape(amount(one.expected, one.dimension))}<td class="n">{sigmas(one.away)}'
            f'<td class="n">{escape(amount(one.without, one.dimension))}<td class="n">{sigmas(one.away_without)}'
            f'<td>{one.standing if one.standing != "neither" else "—"}')


def _yes_or_no(known: bool | None) -> str:
    return "—" if known is None else "yes" if known else "no"


def _closing(record: ReadingsRecord) -> str:
    parts = ["<section><h2>Instruments and remarks</h2>"]
    if record.instruments:
        rows = [
            f'<tr><th scope="row">{escape(one.name)}<td>{escape(one.called)}<td>{escape(one.serial)}<td>{escape(one.category)}'
            f"<td>{_yes_or_no(one.true_rms)}<td>{escape(one.calibrated)}"
            f"<td>{escape(one.calibration_due)}<td>{'<br>'.join(escape(f'{spoken(k)} {v}') for k, v in one.inputs.items())}"
            for one in record.instruments
        ]
        head = ("Instrument", "Called", "Serial", "Category", "True rms", "Calibrated", "Due", "Accuracy")
        parts.append(table("Instruments", tuple((words, "") for words in head), rows))
    for problem in record.problems:
        parts.append(f'<p class="told departs">Failed: {escape(f"{problem.plugin} {problem.rule}: {problem.what}")}</p>')
    if record.remarks:
        rows = [f'<tr><th scope="row">{escape(one.severity)}<td>{escape(one.what)}<td>{escape(one.help)}'
                f"<td>{escape(place_of(one.place))}" for one in record.remarks]
        parts.append("<h3>Remarks on the readings</h3>" + table(
            "Remarks", (("Severity", ""), ("What", ""), ("What would help", ""), ("Where", "")), rows))
    if record.not_read:
        parts.append(f"<p>Not read: {escape(', '.join(record.not_read))}.</p>")
    if record.unfilled:
        parts.append(f"<p>{record.unfilled} lines of test sheets were left empty.</p>")
    parts.append(f'<p class="quiet">Evaluated after {escape("; ".join(record.sources))}. Seed {record.seed}, {record.trials:,} '
                 "trials.</p>")
    parts.append(signatures(("Read by", "Seen by", "Licensed person responsible")))
    parts.append(f'<p class="statement">{escape(record.statement)}</p></section>')
    return "".join(parts)
