"""The end of the page: equations and sources, what was not assessed, and the block to sign."""

from __future__ import annotations

from circuitlint.reports.page.overview import DEFERENCE, table
from circuitlint.reports.page.sheet import References, symbolic
from circuitlint.reports.page.text import escape, isolated, words
from circuitlint.review.record import Record, SourceRecord


def source_words(one: SourceRecord) -> str:
    """Work with edition, place in it, how the value is known, and a note."""
    work = f"{one.work}:{one.edition}" if one.edition else one.work
    said = [escape(part) for part in (work, one.place) if part]
    known = "" if one.known == "read" else f" ({one.known})"
    return ", ".join(said) + known + (f". {escape(one.note)}" if one.note else "")


def equations(record: Record, references: References) -> str:
    """The equations used and the sources referred to, numbered."""
    rows = "".join(
        f'<tr id="e{number}"><th scope="row">{number}<td>{symbolic(one)}<td>{escape(one.validity)}'
        f"<td>{references.to_source(one.source)}"
        for number, one in enumerate(record.formulas.values(), 1)
    )
    made = ""
    if rows:
        made = (
            '<h3>Equations</h3><table class="equations" aria-label="Equations"><thead><tr><th scope="col">No.'
            '<th scope="col">Equation<th scope="col">Holds<th scope="col">Source</thead>'
            f"<tbody>{rows}</tbody></table>"
        )
    listed = "".join(f'<li id="s{number}">{source_words(one)}' for number, one in enumerate(record.sources.values(), 1))
    return f'{made}<h3>Sources</h3><ol class="sources">{listed}</ol>' if listed else made or "<p>None.</p>"


def not_assessed(record: Record, anchors: dict[str, int]) -> str:
    """Every check that could not be made with what is needed for it, and whatever failed."""
    rows = []
    for number, circuit in enumerate(record.circuits, 1):
        link = f'<a href="#k{number}">{isolated(circuit.tag)}</a>'
        if circuit.not_solved:
            rows.append((link, "all figures", escape(circuit.not_solved), ""))
        said = set()
        for one in circuit.checks:
            if one.result == "not assessed":
                said.add(one.rule)
                needs = ", ".join(f"<code>{escape(need)}</code>" for need in one.needs)
                rows.append((link, words(one.rule), escape(one.why or one.what), needs))
        rows += [
            (link, words(name), "no check was made", "")
            for name, found in circuit.coverage.items()
            if found == "not assessed" and name not in said
        ]
    failed = [(escape(one.name), "plugin", escape(one.failed), "") for one in record.plugins if one.failed]
    for problem in record.problems:
        which = ", ".join(map(isolated, problem.circuits[:20]))
        more = f" and {len(problem.circuits) - 20} more" if len(problem.circuits) > 20 else ""
        failed.append((escape(problem.plugin), words(problem.rule) or "plugin", escape(problem.what), which + more))
    if not rows and not failed:
        return "<p>Every check of the ruleset that applies was made.</p>"
    made = ""
    if rows:
        made = table("Not assessed", ("Circuit", "Rule", "Why", "What would let it be assessed"), rows, "open")
    if failed:
        made += "<h3>Rules and plugins that failed</h3>" + table(
            "Failed", ("Plugin", "Rule", "What happened", "Circuits not assessed"), failed
        )
    return made


def signatures(digest: str) -> str:
    """The deference to local codes and licensed practice, and the block for name, date and signature."""
    rows = "".join(
        f'<tr><th scope="row">{who}<td class="blank"><td class="blank"><td class="blank wide">'
        for who in ("Reviewed by", "Licensed person responsible")
    )
    return (
        f'<p class="deference">{DEFERENCE}</p><table class="sign" aria-label="Name, date and signature"><thead><tr>'
        '<th scope="col">Signed as<th scope="col">Name<th scope="col">Date<th scope="col">Signature</thead>'
        f'<tbody>{rows}</tbody></table><p class="remarks">Remarks</p>'
        f'<p class="quiet">What is signed is the review record of SHA-256 <code class="digest">{digest}</code>.</p>'
    )
