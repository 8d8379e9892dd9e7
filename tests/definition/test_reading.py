"""Whatever stands in a definition file, the answer is a definition or faults with their places: never a traceback or a hang."""

from __future__ import annotations

import io
import os
import time
from pathlib import Path

import pytest
from hypothesis import given
from hypothesis import strategies as st

from circuitlint.definition.reading import read_contents, read_paths, read_text
from circuitlint.errors import DefinitionError, Fault, InputError

GOOD = """\
format: 1
title: invented
supplies: {s: {system: single-phase, voltage: 230 V, frequency: 50 Hz}}
circuits:
  - {tag: A, fed_from: s, cable: [], load: {resistor: {resistance: 5 ohm}}}
"""


def faults_of(content: str | bytes) -> tuple[Fault, ...]:
    raw = content if isinstance(content, bytes) else content.encode()
    with pytest.raises(DefinitionError) as caught:
        read_contents([("file.yaml", raw)])
    return caught.value.faults


def test_a_good_definition_is_read_with_the_place_of_each_entry() -> None:
    circuit = read_text(GOOD, "x.yaml").circuits[0]
    spot = circuit.spot(("load", "resistor", "resistance"))
    assert (spot.file, spot.line, spot.path) == ("x.yaml", 5, "circuits[0].load.resistor.resistance")
    assert GOOD.splitlines()[spot.line - 1][spot.column - 1 :].startswith("5 ohm")


FAULTY = {
    "empty": (b"", "the file is empty"),
    "a list": (b"- a\n- b\n", "not a mapping"),
    "UTF-16": (GOOD.encode("utf-16"), "not UTF-8"),
    "Latin-1": (b"format: 1\ntitle: caf\xe9\n", "not UTF-8"),
    "binary": (bytes(range(256)), "not"),
    "NUL": (b"format: 1\x00\n", "not YAML"),
    "tab": (b"format: 1\n\ttitle: x\n", "not YAML"),
    "open bracket": (b"format: [1\n", "not YAML"),
    "two documents": (b"format: 1\n---\nformat: 1\n", "not YAML"),
    "Python object": (b"format: 1\ntitle: !!python/object/apply:os.system [true]\n", "tag"),
    "own tag": (b"format: 1\ntitle: !x y\n", "tag"),
    "merge key": (b"a: &a {format: 1}\n<<: *a\n", "merge key"),
    "key twice": (b"format: 1\nformat: 1\n", "stands twice"),
    "key is a list": (b"? [a, b]\n: c\n", "not a plain word"),
    "itself": (b"format: 1\nsupplies: &s {s: *s}\n", "refers to itself"),
    "deep brackets": (b"format: " + b"[" * 100_000, "nested too deeply"),
    "deep blocks": ("".join(" " * depth + "a:\n" for depth in range(400)).encode(), "deeply"),
}


@pytest.mark.parametrize("name", list(FAULTY))
def test_a_file_that_is_no_definition_is_refused_in_words(name: str) -> None:
    content, told = FAULTY[name]
    start = time.perf_counter()
    faults = faults_of(content)
    assert time.perf_counter() - start < 10.0
    assert any(told in fault.what for fault in faults), faults
    assert all(fault.line >= 1 and fault.column >= 1 for fault in faults)


def test_aliases_that_multiply_are_stopped_within_bounds() -> None:
    lines = ["format: 1", "a0: &a0 [x, x, x, x, x, x, x, x, x, x]"]
    lines += [f"a{n}: &a{n} [{', '.join([f'*a{n - 1}'] * 10)}]" for n in range(1, 12)]
    start = time.perf_counter()
    faults = faults_of("\n".join(lines))
    assert time.perf_counter() - start < 10.0
    assert any("aliases multiply" in fault.what for fault in faults)


def test_a_misspelt_key_offers_the_nearest_known_one_at_its_own_place() -> None:
    faults = faults_of(GOOD.replace("resistance:", "resistence:"))
    told = next(fault for fault in faults if "resistence" in fault.what)
    assert "did you mean 'resistance'" in told.accepted
    assert GOOD.splitlines()[told.line - 1][told.column - 1 :].startswith("resistance")


def test_a_fault_inside_a_part_is_told_once_where_the_part_stands() -> None:
    text = """\
format: 1
supplies: {s: {system: single-phase, voltage: 230 V, frequency: 50 Hz}}
parts:
  lamp: {resistor: {resistance: 5 volt}}
circuits:
  - {tag: A, fed_from: s, cable: [], load: {part: lamp}}
  - {tag: B, fed_from: s, cable: [], load: {part: lamp}}
"""
    faults = faults_of(text)
    assert [(fault.line, "voltage" in fault.what or "volt" in fault.what) for fault in faults] == [(4, True)]


def test_parts_are_known_by_name_over_all_files_and_what_stands_beside_goes_over_them() -> None:
    parts = b"format: 1\nparts:\n  run: {section: 1.5 mm2, length: 5 m, conductor: copper}\n"
    main = GOOD.replace("cable: []", "cable: [{part: run, length: 9 m}]").encode()
    installation = read_contents([("parts.yaml", parts), ("main.yaml", main)])
    cable = installation.circuits[0].entry.cable
    assert cable is not None and cable[0].length.nominal == 9.0 and cable[0].section.nominal == 1.5e-6
    assert installation.circuits[0].spot(("cable", 0, "section")).file == "parts.yaml"


PARTS = {
    "unknown": ("parts: {lamp: {resistor: {resistance: 5 ohm}}}", "{part: lmap}", "no part is named 'lmap'"),
    "circle": ("parts: {a: {part: b}, b: {part: a}}", "{part: a}", "in a circle"),
    "not used, misspelt": ("parts: {lamp: {resistor: {resistence: 5 ohm}}}", "{resistor: {resistance: 5 ohm}}", "resistence"),
    "not used, wrong unit": ("parts: {run: {section: 1.5 kg, length: 5 m}}", "{resistor: {resistance: 5 ohm}}", "kg"),
}


@pytest.mark.parametrize("name", list(PARTS))
def test_a_faulty_part_shows(name: str) -> None:
    parts, load, told = PARTS[name]
    faults = faults_of(GOOD.replace("{resistor: {resistance: 5 ohm}}", load) + parts + "\n")
    assert any(told in fault.what for fault in faults), faults


def test_a_byte_order_mark_and_carriage_returns_do_no_harm() -> None:
    assert read_contents([("x.yaml", b"\xef\xbb\xbf" + GOOD.replace("\n", "\r\n").encode())]).circuits[0].entry.tag == "A"


def test_folders_are_read_in_order_of_name_hidden_files_and_loops_left_out(tmp_path: Path) -> None:
    (tmp_path / "b").mkdir()
    other = GOOD.replace("supplies: {s", "supplies: {t").replace("tag: A, fed_from: s", "tag: B, fed_from: t")
    (tmp_path / "b" / "two.yml").write_text(other)
    (tmp_path / "a.yaml").write_text(GOOD)
    (tmp_path / ".hidden.yaml").write_text("format: 9")
    (tmp_path / "notes.txt").write_text("not mine")
    os.symlink(tmp_path, tmp_path / "b" / "loop")
    found = read_paths([str(tmp_path)])
    assert [one.entry.tag for one in found.circuits] == ["A", "B"]


def test_paths_that_cannot_be_read_are_told(tmp_path: Path) -> None:
    (tmp_path / "empty").mkdir()
    pipe = tmp_path / "pipe"
    os.mkfifo(pipe)
    for path in ("missing.yaml", str(tmp_path / "empty"), str(pipe), "nul\x00byte"):
        with pytest.raises(InputError) as caught:
            read_paths([path])
        assert not isinstance(caught.value, DefinitionError) and str(caught.value)


def test_standard_input_is_read_for_a_dash() -> None:
    assert read_paths(["-"], stdin=io.BytesIO(GOOD.encode())).circuits[0].file == "-"


def outcome(text: str) -> tuple[Fault, ...] | None:
    """The faults of a text, or None where it is a definition. Anything else raised is a failure of the test."""
    try:
        read_text(text)
    except DefinitionError as error:
        return error.faults
    return None


@given(st.text(max_size=200))
def test_any_text_gives_a_definition_or_faults(text: str) -> None:
    found = outcome(text)
    assert found is None or (found and [fault.line for fault in found] == sorted(fault.line for fault in found))


LINES = GOOD.splitlines()


@given(st.integers(0, len(GOOD) - 1), st.sampled_from(["", "{", "]", ":", "- ", "\t", "&a ", "*a ", "!x ", "#", "'", "\n", "5"]))
def test_a_slip_of_the_hand_anywhere_gives_a_definition_or_faults(at: int, slip: str) -> None:
    found = outcome(GOOD[:at] + slip + GOOD[at + 1 :])
    assert found is None or found
