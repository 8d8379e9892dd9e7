"""Every published worked example that is known is entered as a circuit, or left out with the reason."""

from __future__ import annotations

from pathlib import Path
from typing import Any

import yaml

HERE = Path(__file__).parent
KNOWN: list[dict[str, Any]] = yaml.safe_load((HERE / "textbook_left_out.yaml").read_text("utf-8"))
CIRCUITS = {one["name"] for one in yaml.safe_load((HERE / "textbook_circuits.yaml").read_text("utf-8"))}
HELD = {
    one["name"]
    for path in sorted((HERE.parent / "published").glob("*.yaml"))
    for one in yaml.safe_load(path.read_text("utf-8"))
}


def test_every_known_example_is_entered_or_explained() -> None:
    assert len(KNOWN) >= 29
    assert [one["id"] for one in KNOWN if not one.get("entered") and len(one.get("why", "")) < 30] == []
    assert [one["id"] for one in KNOWN if not one["source"]] == []
    names = [one["id"] for one in KNOWN]
    assert len(names) == len(set(names))


def test_what_is_said_to_be_entered_is_among_the_circuits() -> None:
    assert [(one["id"], name) for one in KNOWN for name in one.get("entered", ()) if name not in CIRCUITS] == []


def test_every_circuit_entered_from_a_book_is_one_of_the_known_examples() -> None:
    assert CIRCUITS - {name for one in KNOWN for name in one.get("entered", ())} == set()


def test_what_is_said_to_hold_an_example_without_a_circuit_is_among_the_published_cases() -> None:
    assert [(one["id"], name) for one in KNOWN for name in one.get("held_by", ()) if name not in HELD] == []


def test_an_example_is_told_with_nothing_but_what_is_understood() -> None:
    assert {word for one in KNOWN for word in one} == {"id", "source", "entered", "why", "held_by"}
