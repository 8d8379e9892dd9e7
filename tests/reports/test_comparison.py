"""A comparison as text, JSON and HTML."""

from __future__ import annotations

import json
import re
from html.parser import HTMLParser

import jsonschema
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from circuitlint.errors import InputError
from circuitlint.reports.comparison import KINDS, render, render_json, render_text
from circuitlint.reports.terminal import columns
from circuitlint.review import record as r
from circuitlint.review.changes import Comparison
from circuitlint.review.comparison import compare
from tests.reports.arbitrary import records as any_record
from tests.reports.arbitrary import steers
from tests.reports.building import check, circuit, record
from tests.reports.records import clear, hostile, mixed


def flowing(text: str) -> str:
    return " ".join(text.split())


def drops(*worst: float) -> r.Record:
    """Circuits whose drop is held against 5 %, each with the worst case given."""
    return record(tuple(
        circuit(f"=F{n}", f"fender valve {n}", (
            check(f"=F{n}", "voltage-drop", "voltage-drop-share", "running", each - 0.005, each, n + 10),
        ), scale=1.0 + each)
        for n, each in enumerate(worst)
    ))  # fmt: skip


CHANGE = compare(drops(0.02, 0.07, 0.03, 0.01), drops(0.07, 0.02, 0.031, 0.01))


class Page(HTMLParser):
    """Tags that are open, tags that were seen, and the text of a page."""

    def __init__(self, page: str) -> None:
        super().__init__(convert_charrefs=True)
        self.open: list[str] = []
        self.seen: set[str] = set()
        self.attributes: set[str] = set()
        self.text = ""
        self.feed(page)
        self.close()

    def handle_starttag(self, tag: str, attrs: list[tuple[str, str | None]]) -> None:
        self.seen.add(tag)
        self.attributes |= {name for name, _ in attrs}
        if tag not in ("meta", "br"):
            self.open.append(tag)

    def handle_endtag(self, tag: str) -> None:
        assert self.open.pop() == tag

    def handle_data(self, data: str) -> None:
        if "style" not in self.open:
            self.text += data + " "


@pytest.mark.parametrize("width", [80, 140])
def test_text_tells_new_and_gone_with_numbers_help_and_place(width: int) -> None:
    text = flowing(render_text(CHANGE, width=width))
    for told in (
        "Newly held: =F0. No longer held: =F1. Findings: 1 new, 1 gone.",
        "New findings major =F0 fender valve 0 voltage-drop: voltage drop share, steady; was within its limit before "
        "worst 2.000 % → 7.000 %, limit ≤ 5 %, margin +60.0 % → −40.0 %",
        "help a larger section, a shorter run, or a higher supply voltage where slip-3.yaml:10:5",
        "Findings gone major =F1 fender valve 1 voltage-drop: voltage drop share, steady; conforms now",
        "=F2 voltage drop share, steady 3.000 % → 3.100 % +40.0 % → +38.0 %",
    ):
        assert told in text, told


def test_what_stayed_is_not_mentioned_and_nothing_is_told_twice() -> None:
    text = render_text(CHANGE)
    assert "=F3" not in text
    margins = text[text.index("Margins moved") : text.index("Figures moved")]
    assert "=F0" not in margins, "the finding above has told of it"
    assert "Limits changed" not in text
    assert "Terms changed" not in text


@pytest.mark.parametrize("kind", KINDS)
def test_when_nothing_changed_that_is_said(kind: str) -> None:
    text = render(kind, compare(mixed(), mixed()))
    if kind == "json":
        read = json.loads(text)
        assert all(not value for name, value in read.items() if name not in ("before", "after"))
    else:
        assert "Nothing changed" in text
    assert len(render_text(compare(mixed(), mixed())).splitlines()) <= 6


def test_large_changes_are_summed_up_rather_than_listed_without_end() -> None:
    old, new = drops(*(0.01 for _ in range(200))), drops(*(0.02 + n / 1e5 for n in range(200)))
    text = render_text(compare(old, new))
    assert len(text.splitlines()) < 150
    assert "and 180 margins that moved less" in text
    assert re.search(r"and \d+ more circuits", text)


def test_json_is_whole_and_valid_against_the_schema_of_a_comparison() -> None:
    text = render_json(CHANGE)
    read = json.loads(text)
    jsonschema.validate(read, Comparison.model_json_schema(mode="serialization"), cls=jsonschema.Draft202012Validator)
    assert Comparison.model_validate_json(text) == CHANGE
    assert read["new_held"] is True
    assert {one["tag"] for one in read["margins"]} == {"=F0", "=F1", "=F2"}
    assert [one["crossed"] for one in read["margins"]] == ["beyond", "back within", ""]


def test_every_field_of_a_comparison_is_described() -> None:
    schema = Comparison.model_json_schema(mode="serialization")
    for name, model in {"Comparison": schema, **schema["$defs"]}.items():
        assert [field for field, told in model["properties"].items() if not told.get("description")] == [], name


def test_the_page_is_whole_and_self_contained() -> None:
    page = render("html", CHANGE)
    read = Page(page)
    assert read.open == []
    assert not read.seen & {"script", "link", "img", "iframe", "object"}
    assert not read.attributes & {"src", "href", "onclick", "onload"}
    assert "url(" not in page
    assert "@import" not in page
    for told in (
        "Newly held: =F0.",
        "worst 2.000 % → 7.000 %, limit ≤ 5 %",
        "holds the circuit now",
        "prevail over both",
    ):
        assert told in flowing(read.text)


@pytest.mark.parametrize("kind", KINDS)
def test_hostile_text_is_shown_and_does_nothing(kind: str) -> None:
    for change in (compare(clear(1), hostile()), compare(hostile(), clear(1))):
        text = render(kind, change)
        assert not any(map(steers, text))
        assert "evil" in text
        if kind == "html":
            read = Page(text)
            assert read.open == []
            assert "script" not in read.seen
            assert "<script>alert(1)</script>" in read.text
        if kind == "text":
            assert not re.search(r"^  major  forged", text, re.M)


@settings(max_examples=40)
@given(any_record(2), any_record(2), st.integers(60, 140))
def test_any_two_records_can_be_compared_in_every_form(one: r.Record, other: r.Record, width: int) -> None:
    change = compare(one, other)
    for line in render_text(change, width=width).splitlines():
        assert columns(line) <= width
        assert line.isprintable()
    assert Comparison.model_validate_json(render_json(change)) == change
    read = Page(render("html", change))
    assert read.open == []
    assert "script" not in read.seen


def test_numbers_of_the_page_break_at_their_arrow_only() -> None:
    assert '<td class="n">3.000\u00a0%\u00a0→ 3.100\u00a0%</td>' in render("html", CHANGE)


def test_an_unknown_kind_is_refused_with_those_there_are() -> None:
    with pytest.raises(InputError, match="accepted: one of text, json, html"):
        render("pdf", CHANGE)


def test_colour_adds_escapes_and_changes_no_word() -> None:
    coloured = render_text(CHANGE, colour=True)
    assert "\x1b[" in coloured
    assert re.sub(r"\x1b\[[\d;]*m", "", coloured) == render_text(CHANGE)
