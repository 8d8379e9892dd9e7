"""The head of the page: title block, what was reviewed, summary."""

from __future__ import annotations

from collections import Counter
from collections.abc import Iterable

from circuitlint.reports.page.marks import held_or_not, mark, not_assessed
from circuitlint.reports.page.sheet import References
from circuitlint.reports.page.text import count, escape, isolated, percent, sentence, stated, words
from circuitlint.reports.words import amount
from circuitlint.review.record import SEVERITIES, LimitRecord, Record

DEFERENCE = (
    "Local codes and the licensed person responsible prevail over everything in this record. It decides nothing that "
    "they decide. It says which stated limits were checked, with what figures, what was found, and what could not be "
    "checked."
)


def cells(pairs: Iterable[tuple[str, str]], kind: str = "cells") -> str:
    """Captions and what belongs to them, as the cells of a title block. The second of each pair is markup."""
    made = "".join(f"<div><dt>{caption}</dt><dd>{said}</dd></div>" for caption, said in pairs)
    return f'<dl class="{kind}">{made}</dl>'


def table(label: str, heads: Iterable[str], rows: Iterable[Iterable[str]], kind: str = "") -> str:
    """A table whose first column heads its rows. Heads and cells are markup."""
    listed = tuple(heads)
    top = "".join(f'<th scope="col">{head}' for head in listed)
    body = []
    for first, *rest in rows:
        named = zip(listed[1:], rest, strict=True)
        body.append(f'<tr><th scope="row">{first}' + "".join(f'<td data-l="{head}">{cell}' for head, cell in named))
    looks = f' class="{kind}"' if kind else ""
    return f'<table{looks} aria-label="{label}"><thead><tr>{top}</thead><tbody>{"".join(body)}</tbody></table>'


def verdict(record: Record) -> str:
    """Held or clear in words, and why. Markup."""
    held = sum(one.held for one in record.circuits)
    open_ends = sum(not_assessed(one) for one in record.circuits)
    at = (
        "never"
        if record.hold_at == "never"
        else f"at severity {record.hold_at} or above"
        if (record.hold_at != "major")
        else "at severity major"
    )
    holds = "nothing holds in this review" if record.hold_at == "never" else f"findings hold {at}"
    if held:
        said = f"{held} of {count(len(record.circuits), 'circuit')} must not go on to the next stage; {holds}."
    elif record.held:
        said = f"No circuit by itself, but the review as a whole must not go on; {holds}. See what was not assessed."
    else:
        said = f"No finding holds any of {count(len(record.circuits), 'circuit')}; {holds}."
    if open_ends:
        said += f" {count(open_ends, 'circuit has', 'circuits have')} something that was not assessed."
    return said


def title_block(record: Record, digest: str) -> str:
    """The page's header."""
    block = cells([
        ("Reviewed on", escape(record.reviewed_on) or "not dated"),
        ("Ruleset", f"{escape(record.ruleset.title or record.ruleset.name)}, {escape(record.ruleset.edition)}"),
        ("Circuits", str(len(record.circuits))),
        ("Findings", str(len(record.findings))),
        ("Made with", f"{escape(record.tool)} {escape(record.version)}"),
        ("Record digest", f'<code title="SHA-256 {digest}">{digest[:16]}</code>'),
    ])  # fmt: skip
    state = "held" if record.held else held_or_not(record, record.circuits)
    kind = state.replace(" ", "-")
    title = isolated(record.title) if record.title.strip() else "Untitled"
    return (
        f'<header class="block"><div class="name"><p class="kind">Review record</p><h1>{title}</h1></div>'
        f'<div class="verdict {kind}"><p class="word">{mark(state, capital=True)}</p><p>{verdict(record)}</p></div>'
        f"{block}</header>"
    )


def reviewed(record: Record, references: References) -> str:
    """Documents with digests, the ruleset with its statement and the sources of its limits, plugins and rules."""
    documents = table("Documents", ("Document", "Kind", "SHA-256"), (
        (f"<code>{escape(one.file)}</code>", one.kind, f'<code class="digest">{escape(one.sha256)}</code>')
        for one in record.documents))  # fmt: skip
    ruleset = record.ruleset
    facts = cells([
        ("Ruleset", f"{escape(ruleset.title)} <code>{escape(ruleset.name)}</code>"),
        ("Edition", escape(ruleset.edition)),
        ("Jurisdiction", escape(ruleset.jurisdiction)),
        ("Built on", ", ".join(map(escape, ruleset.built_on)) or "no other ruleset"),
        ("Close to a limit", f"less than {percent(ruleset.near_the_limit, signed=False)} of it left"),
        ("Resolved ruleset, SHA-256", f'<code class="digest">{escape(ruleset.sha256)}</code>'),
    ], "facts")  # fmt: skip
    statement = f'<p class="statement">{escape(ruleset.statement)}</p>' if ruleset.statement else ""
    limits = table(
        "Limits of the ruleset",
        ("Limit", "Value", "Set by", "Source"),
        (_limit_row(one, references) for one in ruleset.limits),
        "limits",
    )
    plugins = table(
        "Plugins",
        ("Plugin", "Version", "Origin", "Offers", "Took part"),
        (
            (
                escape(one.name),
                escape(one.version),
                escape(one.origin),
                ", ".join(map(escape, one.offers)) or "nothing",
                f"<strong>failed</strong>: {escape(one.failed)}" if one.failed else "yes",
            )
            for one in record.plugins
        ),
    )
    rules = table(
        "Rules",
        ("Rule", "What for", "Applies to", "Plugin"),
        (
            (
                f"{escape(one.title)} <code>{escape(one.name)}</code>",
                escape(one.purpose),
                escape(one.applies_to) + ("" if one.required else "; not required"),
                escape(one.plugin),
            )
            for one in record.rules
        ),
    )
    return (
        f"{documents}{facts}{statement}{plugins}"
        f'<details class="more"><summary>Limits of the ruleset and their sources: {count(len(ruleset.limits), "limit")}'
        f"</summary>{limits}</details>"
        f'<details class="more"><summary>Rules that took part: {count(len(record.rules), "rule")}</summary>'
        f"{rules}</details>"
    )


def _limit_row(one: LimitRecord, references: References) -> tuple[str, ...]:
    return (
        f"<code>{escape(one.path)}</code>",
        stated(one.value, one.dimension),
        escape(one.set_by),
        references.to_source(one.source),
    )


def summary(record: Record) -> str:
    """Held and clear in words, the counts, what went wrong, and the concessions."""
    held = [one for one in record.circuits if one.held]
    results = Counter(check.result for one in record.circuits for check in one.checks)
    found = Counter(one.severity for one in record.findings)
    counted = "".join(
        f'<div class="count"><dt>{mark(name)}</dt><dd>{number}</dd></div>'
        for name, number in (
            ("held", len(held)), ("not held" if record.hold_at == "never" else "clear", len(record.circuits) - len(held)),
            *((name, found[name]) for name in SEVERITIES),
            ("conforms", results["conforms"]), ("not assessed", results["not assessed"]),
        )
    )  # fmt: skip
    made = [
        f'<p class="lead">{verdict(record)}</p>',
        '<div class="counts"><p>Circuits</p><p>Findings</p><p>Checks</p>',
        f"<dl>{counted}</dl></div>",
    ]
    if record.problems:
        listed = "".join(f"<li>{_problem(one.plugin, one.rule)}: {escape(one.what)}" for one in record.problems)
        made.append(f'<div class="note"><h3>What failed</h3><ul>{listed}</ul></div>')
    if record.concessions:
        made.append(f"<h3>Concessions</h3>{concessions(record, range(len(record.concessions)))}")
    if record.boards:
        made.append(f"<h3>Boards, at nominal values with everything running</h3>{_boards(record)}")
    if record.statement.strip() != record.ruleset.statement.strip():
        made.append(f'<p class="statement">{escape(record.statement)}</p>')
    return "".join(made)


def _boards(record: Record) -> str:
    rows = []
    for one in record.boards:
        currents = ", ".join(f"{conductor.name} {amount(conductor.current, 'current')}" for conductor in one.conductors)
        factor = "none" if one.power_factor is None else amount(one.power_factor, "ratio")
        if one.power_factor != one.power_factor_uncorrected and one.power_factor_uncorrected is not None:
            factor += f", {amount(one.power_factor_uncorrected, 'ratio')} without its capacitor"
        power = f"{amount(one.active_power, 'active power')}, {amount(one.reactive_power, 'reactive power')}"
        rows.append((escape(one.name), escape(one.fed_from), str(len(one.circuits)), currents, power, factor))
    return table("Boards", ("Board", "Fed from", "Circuits", "Current", "Power", "Power factor"), rows)


def _problem(plugin: str, rule: str) -> str:
    return f"plugin {escape(plugin)}" + (f", rule {escape(rule)}" if rule else "")


def concessions(record: Record, chosen: Iterable[int]) -> str:
    """The chosen concessions as a table."""
    rows = []
    for index in chosen:
        one = record.concessions[index]
        where = f"<code>{escape(one.place.file)}:{one.place.line}</code>"
        rows.append(
            (
                isolated(one.tag),
                words(one.rule),
                escape(one.by),
                escape(one.reason),
                escape(one.until),
                sentence(one.state),
                where,
            )
        )
    return table("Concessions", ("Circuit", "Rule", "By", "Reason", "Until", "State", "Where"), rows)
