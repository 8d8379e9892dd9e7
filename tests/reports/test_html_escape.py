"""Nothing in a record becomes markup, script, or a mark that turns the writing direction."""

from __future__ import annotations

import base64
import hashlib
import re
import unicodedata

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from circuitlint.reports.html import render
from circuitlint.reports.page.text import escape
from circuitlint.review import record as r
from tests.reports.page_reading import Page, read
from tests.reports.sample_record import assemble, circuits, sample_record
from tests.reports.sample_texts import HOSTILE_SERVES, HOSTILE_TAG

HARMLESS = {
    "html", "head", "meta", "title", "style", "body", "a", "div", "header", "p", "h1", "h2", "h3", "h4", "nav", "ol", "ul",
    "li", "main", "section", "table", "thead", "tbody", "tr", "th", "td", "dl", "dt", "dd", "code", "span", "bdi", "strong",
    "small", "i", "br", "sub", "details", "summary", "figure", "figcaption", "fieldset", "legend", "label", "input", "select",
    "option", "button", "footer", "script", "svg", "defs", "pattern", "path", "g", "rect", "circle", "text", "tspan",
    "symbol", "use", "desc",
}  # fmt: skip


def everywhere(text: str) -> r.Record:
    """A record of one circuit that carries a text in every place a text can stand."""
    one = circuits()[0]

    def put(value: object) -> object:
        if isinstance(value, r.Part):
            words = {"result", "basis", "severity", "state", "sense", "system", "kind", "dimension", "known", "hold_at"}
            words |= {"id", "check", "sha256", "figure", "across", "up", "of"}
            fields = {
                name: put(getattr(value, name)) if name not in words else getattr(value, name)
                for name in type(value).model_fields
                if not (isinstance(value, r.Phasor) and name == "name")
            }
            return value.model_copy(update=fields)
        if isinstance(value, str):
            return text
        if isinstance(value, tuple):
            return tuple(put(inner) for inner in value)
        return value

    changed = put(one)
    assert isinstance(changed, r.Circuit)
    kept = changed.model_copy(update={"figures": one.figures, "regions": one.regions, "phasors": one.phasors})
    record = assemble((kept,), title=text)
    return record.model_copy(
        update={
            "statement": text,
            "cautions": dict.fromkeys(kept.cautions, text),
            "ruleset": put(record.ruleset),
            "documents": put(record.documents),
            "plugins": put(record.plugins),
            "problems": put(record.problems),
        }
    )


def test_hostile_words_are_shown_as_they_are_and_do_nothing() -> None:
    page = render(sample_record())
    parsed = read(page)
    assert set(parsed.shape) <= HARMLESS
    assert len(parsed.named("script")) == 1
    assert len(parsed.named("style")) == 1
    assert parsed.named("img") == []
    assert not any(name.startswith("on") for one in parsed.elements for name in one.attributes)
    assert "<script>alert('in')</script>" in parsed.text
    assert "=X<1>\"&'‹U+202E›9Y-‹U+2066›‹U+001B›[31m" in parsed.text
    assert "&lt;b&gt;" in parsed.text


@pytest.mark.parametrize("text", [HOSTILE_TAG, HOSTILE_SERVES, "\u202e", "</svg><svg onload=a>", "--><!--", "]]>", "\x00"])
def test_a_text_in_every_place_leaves_the_page_as_it_is_built(text: str) -> None:
    drawn = ("text", "path", "tspan")
    shapes = [[name for name in read(render(everywhere(words))).shape if name not in drawn] for words in ("plain", text)]
    assert shapes[0] == shapes[1]


def test_a_record_whose_every_text_is_empty_still_makes_a_page() -> None:
    assert len(read(render(everywhere(""))).named("section")) == 8


@given(text=st.text(max_size=60))
@settings(max_examples=60)
def test_any_title_and_tag_leave_the_shape_of_the_page(text: str) -> None:
    one = circuits()[5]
    shapes = []
    for words in ("plain", text or "plain"):
        checks = tuple(check.model_copy(update={"what": words, "why": words}) for check in one.checks)
        record = assemble((one.model_copy(update={"tag": words, "serves": words, "checks": checks}),), title=words)
        shapes.append(read(render(record)).shape)
    assert shapes[0] == shapes[1]


@given(text=st.text())
def test_an_escaped_text_holds_no_markup_and_nothing_unseen(text: str) -> None:
    made = escape(text)
    assert not set("<>\"'") & set(made)
    assert re.sub(r"&(amp|lt|gt|quot|#39);", "", made).count("&") == 0
    assert not [one for one in made if unicodedata.category(one) in ("Cc", "Cf", "Cs", "Zl", "Zp")]
    made.encode("utf-8")


@pytest.mark.parametrize(
    ("text", "shown"),
    [
        ("a\u202eb", "a‹U+202E›b"),
        ("\u200f", "‹U+200F›"),
        ("\x1b[31m", "‹U+001B›[31m"),
        ("two\nlines\tand a tab", "two lines and a tab"),
        ("\ud800", "‹U+D800›"),
        ("\ufeff", "‹U+FEFF›"),
        ("Ω µ ± 5 % שלום", "Ω µ ± 5 % שלום"),
    ],
)  # fmt: skip
def test_marks_that_steer_are_shown_by_their_code_point(text: str, shown: str) -> None:
    assert escape(text) == shown


def digests(page: str, kind: str) -> tuple[str, str]:
    """The digest that the policy allows, and that of what stands in the page."""
    allowed = re.search(rf"{kind}-src 'sha256-([^']+)'", page)
    found = re.search(rf"<{kind}>(.*?)</{kind}>", page, re.S)
    assert allowed is not None
    assert found is not None
    return allowed[1], base64.b64encode(hashlib.sha256(found[1].encode()).digest()).decode()


@pytest.mark.parametrize("kind", ["style", "script"])
def test_the_policy_allows_the_pages_own_style_and_script_and_nothing_else(kind: str) -> None:
    page = render(sample_record())
    allowed, found = digests(page, kind)
    assert allowed == found
    policy = next(one for one in parsed_metas(page) if one.get("http-equiv") == "Content-Security-Policy")["content"]
    assert policy.startswith("default-src 'none';")
    assert "unsafe" not in policy


def parsed_metas(page: str) -> list[dict[str, str]]:
    made: Page = read(page)
    return [one.attributes for one in made.named("meta")]


def test_no_element_carries_a_style_of_its_own() -> None:
    """A style attribute would be refused by the policy, so that the page would look otherwise than it was seen to."""
    assert not any("style" in one.attributes for one in read(render(sample_record())).elements)
