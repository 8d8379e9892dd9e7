"""The page holds what the record holds, in order, and stands on its own."""

from __future__ import annotations

import hashlib
import itertools
import math
import os
import re
import subprocess
import sys
from pathlib import Path

import pytest

from circuitlint.reports import json_record
from circuitlint.reports.html import digest_of, render
from circuitlint.reports.page.text import escape, quantity
from circuitlint.review.record import Record
from tests.reports.page_reading import Page, read, section, titles
from tests.reports.sample_record import record_of, sample_record

ORDER = ("reviewed", "summary", "findings", "margins", "circuits", "equations", "open", "sign")


@pytest.fixture(scope="module")
def record() -> Record:
    return sample_record()


@pytest.fixture(scope="module")
def page(record: Record) -> str:
    return render(record)


@pytest.fixture(scope="module")
def parsed(page: str) -> Page:
    return read(page)


def test_the_sections_stand_in_the_promised_order(parsed: Page) -> None:
    assert tuple(one.attributes["id"] for one in parsed.named("section")) == ORDER


def test_what_was_reviewed_names_documents_digests_versions_and_the_sources_of_limits(page: str, record: Record) -> None:
    said = section(page, "reviewed")
    for document in record.documents:
        assert document.file in said
        assert document.sha256 in said
    for plugin in record.plugins:
        assert f"{plugin.name} {plugin.version}" in said
    assert record.ruleset.statement in said
    assert record.ruleset.edition in said
    for limit in record.ruleset.limits:
        assert limit.path in said
        assert limit.set_by in said
    assert f"{record.tool} {record.version}" in read(page).text


def test_the_summary_says_held_or_clear_in_words_and_counts(page: str) -> None:
    said = section(page, "summary")
    assert "1 of 6 circuits must not go on to the next stage; findings hold at severity major." in said
    assert "3 circuits have something that was not assessed." in said
    for number, word in ((1, "held"), (5, "clear"), (1, "major"), (4, "minor"), (2, "observation")):
        assert f"{word} {number}" in said
    assert "did not load" in said


def test_a_clear_review_says_so(record: Record) -> None:
    clear = tuple(one.model_copy(update={"held": False}) for one in record.circuits)
    said = section(render(record.model_copy(update={"circuits": clear, "held": False})), "summary")
    assert "No finding holds any of 6 circuits; findings hold at severity major." in said


def test_a_review_that_lost_a_rule_is_held_though_no_circuit_is(record: Record) -> None:
    clear = tuple(one.model_copy(update={"held": False}) for one in record.circuits)
    said = section(render(record.model_copy(update={"circuits": clear, "held": True})), "summary")
    assert "the review as a whole must not go on" in said


def test_findings_stand_in_the_order_of_the_record_with_all_they_hold(page: str, record: Record) -> None:
    said = section(page, "findings")
    checks = {check.id: check for one in record.circuits for check in one.checks}
    places = [said.index(checks[one.check].what[1:]) for one in record.findings]
    assert places == sorted(places)
    first = checks[record.findings[0].check]
    assert first.limit is not None
    for wanted in (first.why, first.help, f"{first.place.file}:{first.place.line}:{first.place.column}", first.place.path):
        assert wanted in said
    assert f"at least 0.85, set by {first.limit.set_by}" in said
    assert f"{quantity(first.nominal, 'ratio')}, lowest {quantity(first.worst, 'ratio')}" in said


def test_a_worst_case_finding_says_how_much_of_the_tolerance_box_lies_beyond(page: str) -> None:
    assert "31.0 % ± 0.5 % of the tolerance box" in section(page, "findings")


def test_the_calculation_sheet_shows_every_figure_with_its_range_and_its_equation_in_numbers(record: Record) -> None:
    said = section(render(record.model_copy(update={"circuits": record.circuits[:1]})), "circuits")
    for figure in record.circuits[0].figures:
        row = " ".join(quantity(value, figure.dimension) for value in (figure.nominal, figure.lowest, figure.highest))
        assert row in said
    assert "Z = √(R² + X²) = √((22.21 Ω)² + (113.1 Ω)²)" in said
    assert "I = U / Z = 230.0 V / 115.3 Ω" in said
    assert "U: voltage; Z: impedance" in said


def test_each_equation_leads_to_its_source(page: str, parsed: Page, record: Record) -> None:
    ids = {one.attributes["id"] for one in parsed.elements if "id" in one.attributes}
    assert {f"e{number}" for number in range(1, len(record.formulas) + 1)} <= ids
    assert {f"s{number}" for number in range(1, len(record.sources) + 1)} <= ids
    said = section(page, "equations")
    assert "IEC 60364-5-52:2009, annex G, table G.52.1 (value from memory)" in said


def test_every_circuit_shows_coverage_concessions_and_cautions(page: str, record: Record) -> None:
    said = section(page, "circuits")
    for one in record.circuits:
        for key in one.cautions:
            assert record.cautions[key] in said
    assert "minimum power factor A. Competent Person short duty 2027-06-30 In force" in said
    assert "winding temperature" in said


def test_what_was_not_assessed_is_listed_with_what_is_needed(page: str, record: Record) -> None:
    said = section(page, "open")
    for one in record.circuits:
        for check in one.checks:
            if check.result == "not assessed":
                for need in check.needs:
                    assert need in said
                assert check.why in said
    assert "no module named yard_tables" in said
    assert "thermal runaway" in said


def test_a_rule_without_a_check_that_counts_as_not_assessed_is_listed_too(record: Record) -> None:
    first = record.circuits[0]
    changed = first.model_copy(update={"coverage": {**first.coverage, "winding-temperature": "not assessed"}})
    said = section(render(record.model_copy(update={"circuits": (changed,)})), "open")
    assert "winding temperature no check was made" in said


def test_the_block_to_sign_names_the_record_and_defers_to_codes_and_licensed_people(page: str, record: Record) -> None:
    said = section(page, "sign")
    assert "Name Date Signature" in said
    assert digest_of(record) in said
    assert "Local codes and the licensed person responsible prevail" in said


def test_the_digest_is_that_of_the_stored_record(tmp_path: Path, record: Record) -> None:
    """Whoever holds the signed page and the stored record can see that they belong together."""
    stored = tmp_path / "record.json"
    stored.write_bytes(json_record.render(record).encode("utf-8"))
    assert hashlib.sha256(stored.read_bytes()).hexdigest() == digest_of(record)


def test_a_number_that_is_not_finite_is_called_so_and_nothing_fails(record: Record) -> None:
    one = record.circuits[0]
    figures = tuple(figure.model_copy(update={"nominal": math.nan, "highest": math.inf}) for figure in one.figures)
    checks = tuple(check.model_copy(update={"margin": math.nan, "worst": math.inf}) for check in one.checks)
    changed = one.model_copy(update={"figures": figures, "checks": checks})
    page = render(record.model_copy(update={"circuits": (changed,), "findings": ()}))
    assert "not a number" in section(page, "circuits")
    assert not re.search(r'="[^"]*\b(nan|inf)\b', page)


def test_direct_current_has_no_phasors_and_no_triangles(record: Record) -> None:
    first, third = record.circuits[0], record.circuits[2]
    odd = third.model_copy(update={"phasors": first.phasors})
    names = [name for name, _ in titles(render(record.model_copy(update={"circuits": (odd,)})))]
    assert any(name.startswith("Switch-on current") for name in names)
    assert not any("triangle" in name or "Phasor" in name for name in names)


def test_a_circuit_that_could_not_be_solved_says_so_and_shows_no_figure(record: Record) -> None:
    said = section(render(record.model_copy(update={"circuits": record.circuits[5:]})), "circuits")
    assert "the circuit could not be studied, since in some case within the tolerances" in said
    assert "There are no figures." in said


def test_an_empty_record_still_makes_a_page(record: Record) -> None:
    empty = record.model_copy(
        update={"circuits": (), "findings": (), "concessions": (), "problems": (), "plugins": (), "formulas": {},
                "sources": {}, "title": "", "held": False}
    )  # fmt: skip
    page = render(empty)
    assert "There are no findings." in page
    assert "There are no circuits." in page
    assert "Every check of the ruleset that applies was made." in page


def test_every_drawing_has_a_name_and_a_description(page: str, record: Record) -> None:
    found = titles(page)
    assert len(found) == page.count('role="img"')
    assert all(name and told for name, told in found)
    tag = escape(record.circuits[0].tag)
    for kind in ("One-line diagram", "Phasor diagram", "Impedance triangle", "Power triangle", "Worst-case region"):
        assert any(name.startswith(f"{kind} of {tag}") for name, _ in found), kind
    assert any(name.startswith("Switch-on current of") for name, _ in found)


def test_headings_never_leave_out_a_level(parsed: Page) -> None:
    levels = [int(one.name[1]) for one in parsed.elements if re.fullmatch(r"h[1-6]", one.name)]
    assert levels[0] == 1
    assert levels.count(1) == 1
    assert all(after - before <= 1 for before, after in itertools.pairwise(levels))


def test_every_table_head_has_a_scope_and_every_table_a_name(parsed: Page) -> None:
    assert all(one.attributes.get("scope") in ("col", "row", "rowgroup") for one in parsed.named("th"))
    assert all({"aria-label", "aria-labelledby"} & set(one.attributes) for one in parsed.named("table"))


def test_no_identifier_stands_twice_and_every_link_leads_somewhere(parsed: Page) -> None:
    ids = [one.attributes["id"] for one in parsed.elements if "id" in one.attributes]
    assert len(ids) == len(set(ids))
    targets = [one.attributes["href"] for one in parsed.elements if "href" in one.attributes]
    assert all(target.startswith("#") for target in targets)
    assert {target[1:] for target in targets} <= set(ids)


def test_there_are_landmarks_and_a_way_past_the_contents(parsed: Page) -> None:
    for name in ("header", "nav", "main", "footer"):
        assert len(parsed.named(name)) == 1, name
    first = next(one for one in parsed.elements if one.name == "a")
    assert first.attributes == {"class": "skip", "href": "#findings"}


def test_the_page_asks_nothing_of_anybody(page: str, parsed: Page) -> None:
    fetching = {"src", "srcset", "data", "action", "formaction", "poster", "background", "ping", "manifest"}
    assert not any(fetching & set(one.attributes) for one in parsed.elements)
    assert "link" not in parsed.shape
    assert "://" not in page
    assert "url(" not in re.sub(r"url\(#[\w-]+\)", "", page)
    assert "@import" not in page


def test_the_controls_are_hidden_until_the_script_shows_them(parsed: Page) -> None:
    shown = {one.attributes["id"]: one.attributes for one in parsed.elements if "controls" in one.attributes.get("class", "")}
    assert set(shown) == {"severities", "find"}
    assert all("hidden" in attributes for attributes in shown.values())


def test_the_same_record_gives_the_same_bytes_in_another_process(tmp_path: Path, page: str, record: Record) -> None:
    stored = tmp_path / "record.json"
    stored.write_text(record.model_dump_json(), encoding="utf-8")
    program = (
        "import sys; from pathlib import Path; from circuitlint.reports.html import render;"
        "from circuitlint.review.record import Record;"
        "sys.stdout.buffer.write(render(Record.model_validate_json(Path(sys.argv[1]).read_bytes())).encode())"
    )
    made = [
        subprocess.run(
            [sys.executable, "-c", program, str(stored)], capture_output=True, check=True,
            env={**os.environ, "PYTHONHASHSEED": seed},
        ).stdout
        for seed in ("1", "2")
    ]  # fmt: skip
    assert made[0] == made[1] == page.encode()


def test_the_markup_of_a_circuit_stays_lean() -> None:
    """What a circuit adds to the page is its drawings and its rows, and no more than 70 elements for each drawing."""
    few, many = render(record_of(12)), render(record_of(24))
    grown = len(read(many).elements) - len(read(few).elements)
    drawn = many.count('role="img"') - few.count('role="img"')
    rows = many.count("<tr") - few.count("<tr")
    assert grown < 70 * drawn + 9 * rows
    assert len(many) - len(few) < 40_000 * 12
