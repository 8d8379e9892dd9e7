"""The text report: worst first, aligned, quiet when clear, and nothing a definition says can break it."""

from __future__ import annotations

import re

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from circuitlint.reports.terminal import columns
from circuitlint.reports.text import render
from circuitlint.review import record as r
from tests.reports.arbitrary import records as any_record
from tests.reports.building import CAUTIONS, STATEMENT, check, circuit, record, unknown
from tests.reports.records import clear, hostile, mixed

MIXED = mixed()
WIDTHS = (80, 140)
# Said of a circuit, these would claim what no review can.
NEVER_SAID = re.compile(r"\b(safe|safely|approved|compliant)\b", re.IGNORECASE)


def flowing(text: str) -> str:
    """Text without its line breaks and indents."""
    return " ".join(text.split())


@pytest.mark.parametrize("width", WIDTHS)
def test_it_opens_with_what_was_reviewed_against_what(width: int) -> None:
    head = render(MIXED, width=width).split("\n\n")[0]
    assert head.startswith("Ferry slip 3, ramp and fender controls (invented)\n")
    for word in ("slip-3.yaml", "low-voltage-50hz", "edition 2026-12-01", "hold at major"):
        assert word in head


@pytest.mark.parametrize("width", WIDTHS)
def test_circuits_come_worst_first_and_so_do_the_findings_of_each(width: int) -> None:
    text = render(MIXED, width=width)
    blocks = re.findall(r"^(held|not solved|clear)  (=R3-Y\d)", text, re.M)
    assert blocks == [
        ("held", "=R3-Y2"), ("held", "=R3-Y1"), ("not solved", "=R3-Y7"), ("clear", "=R3-Y5"), ("clear", "=R3-Y3"),
        ("clear", "=R3-Y4"),
    ]  # fmt: skip
    first = text[text.index("held  =R3-Y1") : text.index("not solved  =R3-Y7")]
    rows = re.findall(r"^  (major|minor|observation) +(\S+) .*?([−+][\d.]+) %$", first, re.M)
    assert [(severity, rule) for severity, rule, _ in rows] == [
        ("major", "minimum-power-factor"), ("major", "meter-range"), ("minor", "voltage-drop"),
    ]  # fmt: skip
    assert [margin for *_, margin in rows] == ["−81.6", "−15.2", "−6.4"]


@pytest.mark.parametrize("width", WIDTHS)
def test_a_finding_tells_figure_worst_limit_margin_why_help_and_where(width: int) -> None:
    text = render(MIXED, width=width)
    block = flowing(text[text.index("held  =R3-Y1") : text.index("not solved  =R3-Y7")])
    for told in (
        "ramp brake magnet, west", "0.1809 0.1654 ≥ 0.9 −81.6 %", "10.95 A 11.52 A ≤ 10 A −15.2 %",
        "4.780 % 5.320 % ≤ 5 % −6.4 %", "why cos φ = P / S = 90.1 W / 498.2 VA = 0.1809",
        "help a correction capacitor at the load", "where slip-3.yaml:24:5 circuits[0].load",
        "below the limit (circuit) at nominal values",
        "above the limit (running) in the worst case", "31.0 ± 0.5 % of the tolerance box",
        "load.coil.inductance moves it most",
    ):  # fmt: skip
        assert told in block, told


@pytest.mark.parametrize("width", WIDTHS)
def test_figures_stand_below_each_other_over_the_whole_report(width: int) -> None:
    lines = [line for line in render(MIXED, width=width).splitlines() if re.search(r"[≤≥] .* %$", line)]
    assert len(lines) == 6
    assert len({columns(line) for line in lines}) == 1, "every margin ends in one column"
    heads = [line for line in render(MIXED, width=width).splitlines() if line.endswith("margin")]
    assert {columns(line) for line in heads} == {columns(lines[0])}


def test_a_wide_page_puts_rule_subject_and_figures_on_one_line() -> None:
    assert re.search(r"major +minimum-power-factor  power factor, steady +0\.1809 +0\.1654", render(MIXED, width=140))
    assert not re.search(r"minimum-power-factor  power factor, steady +0\.1809", render(MIXED, width=80))


def test_what_could_not_be_assessed_is_grouped_by_what_is_needed() -> None:
    text = render(MIXED)
    assert "Not assessed: 4 checks" in text
    section = text[text.index("Not assessed: 4") : text.index("Concessions")]
    assert "needs cable[0].ambient; cable[0].grouped_circuits\n    observation  conductor-heating: =R3-Y1, =R3-Y3\n" in section
    assert "minor        conductor-heating: =R3-Y2" in section
    assert section.index("minor ") < section.index("observation"), "worst first here too"
    assert "thermal runaway" in section, "where nothing is needed, the reason stands in its place"


def test_many_circuits_lacking_the_same_are_counted_rather_than_listed() -> None:
    gaps = [unknown(f"=F{n}", "conductor-heating", ("cable[0].ambient",), n + 1) for n in range(900)]
    text = render(record(tuple(circuit(f"=F{n}", "valve", (gap,)) for n, gap in enumerate(gaps))))
    section = text[text.index("Not assessed: 900 checks") :].split("\n\n")[0]
    shown = set(re.findall(r"=F\d+", section))
    more = re.search(r"and ([\d,]+) more circuits", flowing(section))
    assert more is not None
    assert len(shown) + int(more[1].replace(",", "")) == 900
    assert len(section.splitlines()) <= 6


def test_a_rule_or_plugin_that_failed_comes_before_any_finding() -> None:
    text = render(MIXED)
    assert text.index("\nFailed\n") < text.index("held  =R3-Y2")
    assert "conductor-heating of circuitlint_rules: ZeroDivisionError" in flowing(text)
    assert "not assessed: =R3-Y7" in text
    assert "plugin yard_rules: ImportError: no module named yard_tables" in flowing(text)


def test_a_circuit_that_was_not_solved_is_never_called_clear() -> None:
    text = render(MIXED)
    assert "not solved  =R3-Y7" in text
    assert not re.search(r"clear +=R3-Y7", text)


def test_the_table_gives_every_eventful_circuit_its_result_and_counts() -> None:
    text = render(MIXED, width=140)
    table = text[text.index("Circuits ") :].split("\n\n")[0]
    assert table.splitlines()[0].split() == ["Circuits", "major", "minor", "vation", "assessed", "conforms"]
    found = {row.split()[-6 - row.count("not solved")]: row for row in table.splitlines()[1:] if "=R3" in row}
    assert len(found) >= 1
    assert re.search(r"held +=R3-Y1  ramp brake magnet, west +2 +1 +· +1 +1$", table, re.M)
    assert re.search(r"clear +=R3-Y4  ramp latch valve +· +· +1 +· +1$", table, re.M)
    assert "=R3-Y6" not in table
    assert "1 more circuit, clear: every check conforms with room to spare" in table


def test_a_concession_is_told_beside_its_finding_and_a_stray_one_is_told_too() -> None:
    text = flowing(render(MIXED))
    assert "leave by A. Competent Person until 2027-06-30: short duty" in text
    assert "matches nothing =R3-Z9, voltage-drop" in text


@pytest.mark.parametrize("number", [1, 20, 2000])
def test_a_clear_record_of_any_size_prints_a_handful_of_lines(number: int) -> None:
    text = render(clear(number))
    assert len(text.splitlines()) <= 12
    assert f"Clear: {number:,} circuit" in text
    assert flowing(STATEMENT) in flowing(text)
    assert all(name in text for name in CAUTIONS)


def test_cautions_and_who_prevails_close_the_report() -> None:
    text = flowing(render(MIXED))
    assert text.endswith(flowing(STATEMENT))
    for name, caution in CAUTIONS.items():
        assert f"{name} {flowing(caution)}" in text
    assert "Local codes and the responsible person prevail" in render(record((), statement=""))


def test_a_circuit_no_rule_applies_to_is_named_and_not_called_clear() -> None:
    text = render(record((circuit("=F1", "valve", ()), *clear(2).circuits)))
    assert "no rule applies to: =F1" in text
    nothing = render(record((circuit("=F1", "valve", ()),)))
    assert "no check could be made" in nothing
    assert "Clear" not in nothing


def test_nothing_is_called_clear_while_something_was_not_assessed() -> None:
    one = circuit("=F1", "valve", (unknown("=F1", "conductor-heating", ("cable",), 3),))
    assert "Not held: 1 circuit; 1 check not assessed, 0 conform." in render(record((one,)))


def test_a_review_that_lost_a_required_rule_is_held_though_no_circuit_is() -> None:
    assert "Held: a rule that is required was lost; 2 circuits" in flowing(render(clear(2).model_copy(update={"held": True})))


def test_colour_adds_escapes_and_changes_no_word() -> None:
    plain, coloured = render(MIXED), render(MIXED, colour=True)
    assert "\x1b" not in plain
    assert coloured.count("\x1b[") > 10
    assert re.sub(r"\x1b\[[\d;]*m", "", coloured) == plain


def test_it_never_claims_what_no_review_can() -> None:
    for one in (MIXED, clear(3), record(())):
        assert NEVER_SAID.search(render(one)) is None


@pytest.mark.parametrize("width", WIDTHS)
def test_hostile_text_is_shown_and_does_nothing(width: int) -> None:
    text = render(hostile(), width=width)
    assert all(line.isprintable() for line in text.splitlines())
    assert "\\x1b[2J\\u202eevil\\u2066" in text
    assert not re.search(r"^  major  forged", text, re.M), "no line of a report can be forged"
    assert all(columns(line) <= width for line in text.splitlines())


@settings(max_examples=60)
@given(any_record(), st.integers(60, 160))
def test_no_line_of_any_record_leaves_the_page_or_steers_the_terminal(one: r.Record, width: int) -> None:
    text = render(one, width=width)
    assert text.endswith("\n")
    for line in text.splitlines():
        assert columns(line) <= width, line
        assert line.isprintable(), repr(line)


def test_no_check_with_a_severity_is_left_out() -> None:
    checks = [
        check(f"=F{n}", "voltage-drop", "voltage-drop-share", "running", 0.04 + n / 1000, 0.045 + n / 1000, n + 1)
        for n in range(20)
    ]
    text = render(record(tuple(circuit(f"=F{n}", "valve", (one,)) for n, one in enumerate(checks))))
    for n, one in enumerate(checks):
        assert (f"slip-3.yaml:{n + 1}:5" in text) == (one.severity is not None)
