"""Report kinds by name, those of plugins included."""

from __future__ import annotations

import pytest

from circuitlint.errors import InputError, PluginError, RecordError
from circuitlint.reports import kinds
from circuitlint.review.record import Record
from tests.reports.building import SOURCES
from tests.reports.records import clear, mixed

MEANINGS = {"voltage-drop": {"running": "largest drop while running, as a share", "switch_on": "largest drop at switch-on"}}


@pytest.mark.parametrize("kind", ["text", "json", "sarif", "html"])
def test_every_kind_renders_a_record(kind: str) -> None:
    kinds.check(kind)
    assert len(kinds.render(kind, mixed())) > 1000


def test_an_unknown_kind_is_refused_with_those_there_are() -> None:
    with pytest.raises(InputError, match=r"no report is of kind 'pdf'; accepted: one of text, json, sarif, html, table"):
        kinds.check("pdf", {"table": lambda record: ""})


def test_a_kind_of_a_plugin_is_rendered_and_cannot_take_a_shipped_name() -> None:
    added = {
        "tags": lambda record: " ".join(one.tag for one in record.circuits),
        "text": lambda record: "taken",
        "json": lambda record: "taken",
    }
    assert kinds.render("tags", clear(2), added) == "=F0-Y1 =F1-Y1"
    for kind in ("text", "json"):
        assert kinds.render(kind, clear(2), added) == kinds.render(kind, clear(2))


def failing(record: Record) -> str:
    raise ZeroDivisionError("division by zero")


def refusing(record: Record) -> str:
    raise RecordError("the record has no figures")


def test_a_kind_of_a_plugin_that_fails_is_named_and_contained() -> None:
    with pytest.raises(PluginError, match="report kind 'mine' of a plugin failed: ZeroDivisionError: division by zero"):
        kinds.render("mine", clear(1), {"mine": failing})
    with pytest.raises(PluginError, match="gave int, not text"):
        kinds.render("mine", clear(1), {"mine": lambda record: 7})  # type: ignore[dict-item, return-value]
    with pytest.raises(RecordError, match="no figures"):
        kinds.render("mine", clear(1), {"mine": refusing})


def test_width_and_colour_are_for_text() -> None:
    assert kinds.render("text", mixed(), width=140) != kinds.render("text", mixed(), width=80)
    assert "\x1b[" in kinds.render("text", mixed(), colour=True)
    assert kinds.render("json", mixed(), width=140, colour=True) == kinds.render("json", mixed())


def test_the_catalogue_tells_each_rule_its_limits_and_their_sources() -> None:
    text = " ".join(kinds.catalogue(mixed(), MEANINGS).split())
    assert "voltage-drop: Voltage drop from the origin to the terminals" in text
    assert "largest drop while running, as a share: 5 %; IEC 60364-5-52:2009, annex G, table G.52.1" in text
    assert "largest drop at switch-on: the ruleset gives none, so what depends on it is not assessed" in text
    assert f"circuit: 0.9; {SOURCES['thresholds'].work} (common practice)" in text
    assert "prevail" in text


def test_one_rule_is_told_whole() -> None:
    text = " ".join(kinds.catalogue(mixed(), MEANINGS, "voltage-drop").split())
    assert "minimum-power-factor" not in text
    assert "needs cable; load" in text
    assert "helps a larger section" in text
    assert "severity nominal major, worst case minor" in text


def test_the_sheet_tells_every_circuit() -> None:
    sheet = kinds.sheet(mixed(), 100)
    assert all(one.tag in sheet for one in mixed().circuits)
