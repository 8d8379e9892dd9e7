"""The account of readings in every form, the command line, and rules on readings as plugins."""

from __future__ import annotations

import json
import re
from html.parser import HTMLParser
from pathlib import Path

import jsonschema
import pytest

from circuitlint import demo
from circuitlint.cli import main
from circuitlint.errors import RecordError
from circuitlint.plugins import gather
from circuitlint.quantity import write as write_quantity
from circuitlint.readings.holding import Options
from circuitlint.readings.test_sheet import make
from circuitlint.reports import readings, readings_json, readings_page, readings_sheet_page
from circuitlint.reports.readings_words import with_uncertainty
from circuitlint.si import DIMENSIONS
from tests.readings.held import BENCH, held, reviewed

TEXT = """
format: 1
title: '<b>bench</b> & co'
taken_on: 2027-05-01
by: A. Person
instruments:
  old: {calibrated: 2020-01-01, calibration_due: 2021-01-01, inputs: {current: {accuracy: ± 1 %, range: 1 A}}}
readings:
  - {tag: AC, state: steady, instrument: old, current: 1.90 A, note: '<script>alert(1)</script>'}
"""



@pytest.fixture(scope="module")
def record():
    rules = [(rule, plugin.name) for rule, plugin in gather().reading_rules.values()]
    return held(TEXT, options=Options(rules=rules, trials=500))


def test_the_record_goes_to_json_and_back_and_keeps_its_own_schema(record) -> None:
    text = readings_json.render(record)
    again = readings_json.load(text.encode())
    assert again == record
    assert readings_page.render(again) == readings_page.render(record)
    jsonschema.validate(json.loads(text), readings_json.schema())


@pytest.mark.parametrize("content", [b"", b"{}", b"[1]", b"\xff", b'{"format": 2}'])
def test_what_is_no_record_of_readings_is_refused(content: bytes) -> None:
    with pytest.raises(RecordError, match="no record of readings"):
        readings_json.load(content)


@pytest.mark.parametrize("width", [60, 80, 130])
def test_the_text_keeps_within_its_width_and_says_predicted_beside_measured(record, width: int) -> None:
    text = readings.render(record, width=width)
    assert max(map(len, text.splitlines())) <= width
    flat = " ".join(text.split())
    due = "calibration of old fell due on 2021-01-01"
    for word in ("1.900(11) A", "guarded", "as predicted", "conforms", due, "Not read: DC"):
        assert word in flat, word


class Page(HTMLParser):
    """Tags of a page, and addresses it would ask for."""

    def __init__(self) -> None:
        super().__init__()
        self.tags: list[str] = []
        self.asked: list[str] = []

    def handle_starttag(self, tag, attrs) -> None:
        self.tags.append(tag)
        self.asked += [value or "" for name, value in attrs if name in ("src", "href")]


def test_the_page_escapes_what_came_from_a_file_and_asks_for_nothing(record) -> None:
    page = Page()
    page.feed(readings_page.render(record))
    assert "script" not in page.tags and "b" not in page.tags
    assert page.asked == []
    assert page.tags.count("h1") == 1


def test_the_picture_shows_the_predicted_range_and_the_reading_to_one_scale(record) -> None:
    (one,) = record.readings[0].results
    _, least, most = one.predicted
    picture = re.search(r'<svg class="bar" role="img".*?</svg>', readings_page.render(record), re.S)[0]
    band = re.search(r'<rect class="band" x="([\d.]+)" y="3" width="([\d.]+)"', picture)
    left, wide = float(band[1]), float(band[2])
    dot = float(re.search(r'cx="([\d.]+)"', picture)[1])
    assert (dot - left) / wide == pytest.approx((one.value - least) / (most - least), abs=0.01)


def test_the_printed_test_sheet_names_range_category_expectation_and_when_to_stop() -> None:
    sheet = make(*reviewed())
    page = readings_sheet_page.render(sheet)
    for circuit in sheet.circuits:
        assert f"<h2>{circuit.tag}<small>" in page
        assert all(line.stop and line.category for line in circuit.lines)
    assert "CAT III 300 V or more" in page
    quantities = {line.quantity for line in sheet.circuits[0].lines}
    assert {"resistance", "temperature", "voltage", "current", "power", "frequency"} <= quantities
    assert not {"power", "frequency"} & {line.quantity for line in sheet.circuits[1].lines}, "direct current has neither"


@pytest.mark.parametrize(("value", "uncertainty", "dimension", "told"), [
    # JCGM 100:2008, 7.2.2: m = 100.02147(35) g and the like; here in units of the trade.
    (100.02147, 0.00035, "resistance", "100.02147(35) Ω"), (0.01966, 0.0000095, "current", "19.6600(95) mA"),
    (230.0, 1.24, "voltage", "230.0(12) V"), (127.732, 0.071, "resistance", "127.732(71) Ω"),
    (5.0, 0.0996, "voltage", "5.00(10) V"), (1.0, 2.0, "voltage", "1.000 V, u = 2.0 V"), (2.0, None, "voltage", "2.000 V"),
    (-0.010, 0.001, "angle", "−0.573(57)°"),
])
def test_an_uncertainty_is_told_in_units_of_the_last_digits(value, uncertainty, dimension, told) -> None:
    assert with_uncertainty(value, uncertainty, dimension) == told


def write(folder: Path, name: str, text: str) -> str:
    (folder / name).write_text(text, encoding="utf-8")
    return str(folder / name)


GOOD = "format: 1\nreadings: [{tag: AC, state: steady, current: 1.90 A ± 0.01 A}]\n"


@pytest.mark.parametrize(("text", "status"), [
    (GOOD, 0), (GOOD.replace("1.90", "2.20"), 1), (GOOD.replace(" ± 0.01 A", ""), 1), (GOOD.replace("AC", "XX"), 2), ("", 2),
])
def test_the_exit_status_says_whether_anything_is_held(text: str, status: int, tmp_path: Path, capsys) -> None:
    arguments = ["readings", write(tmp_path, "d.yaml", BENCH), write(tmp_path, "r.yaml", text)]
    assert main(arguments) == status
    said = capsys.readouterr()
    assert (said.out == "") is (status == 2)
    assert "Traceback" not in said.err


@pytest.mark.parametrize("arguments", [
    [], ["d.yaml"], ["--demo", "--report", "pdf"], ["--demo", "x.yaml"], ["no.yaml", "no.yaml"],
])
def test_a_call_that_cannot_be_meant_is_refused_in_words(arguments: list[str], capsys) -> None:
    assert main(["readings", *arguments]) == 2
    assert capsys.readouterr().err.startswith("circuitlint: ")


def test_the_demo_readings_show_a_sound_magnet_and_a_choke_with_shorted_turns(tmp_path: Path, capsys) -> None:
    file = tmp_path / "r.json"
    assert main(["readings", "--demo", "--report", f"json={file}", "--report", "text"]) == 1
    made = readings_json.load(file.read_bytes())
    told = {one.tag: (one.departs, [idea.name for idea in one.explanations]) for one in made.circuits}
    assert told["=R3-Y1"] == (False, []) and told["=F1-Y1"] == (False, [])
    assert told["=T1-L1"] == (True, ["shorted-turns"])
    assert "invented" in demo.readings()[1].decode()
    assert "shorted turns" in capsys.readouterr().out


@pytest.mark.parametrize("kind", ["text", "csv", "html", "json"])
def test_the_test_sheet_command_prints_every_form(kind: str, capsys) -> None:
    assert main(["test-sheet", "--demo", "--tag", "=R3-Y1", "--report", kind]) == 0
    out = capsys.readouterr().out
    assert "=R3-Y1" in out and "=F1-Y1" not in out
    assert "CAT III 300 V or more" in out


def test_every_sheet_of_the_demo_filled_in_as_expected_is_held_without_a_departure(tmp_path: Path, capsys) -> None:
    assert main(["test-sheet", "--demo", "--report", "json"]) == 0
    lines = []
    for circuit in json.loads(capsys.readouterr().out)["circuits"]:
        for one in circuit["lines"]:
            if one["lowest"] is not None:
                dimension = DIMENSIONS[one["dimension"]]
                shown = write_quantity((one["lowest"] + one["highest"]) / 2.0, dimension)
                span = "0.5 K" if one["quantity"] == "temperature" else "2 %"
                lines.append(f'{circuit["tag"]},{one["state"]},{one["of"]},{one["quantity"]},{shown} ± {span}')
    assert len(lines) > 40
    definition = write(tmp_path, "d.yaml", demo.content()[1].decode())
    sheet = write(tmp_path, "s.csv", "tag,state,of,quantity,value\n" + "\n".join(lines) + "\n")
    file = tmp_path / "r.json"
    assert main(["readings", definition, sheet, "--report", f"json={file}", "--report", "text", "--report", "html"]) in (0, 1)
    made = readings_json.load(file.read_bytes())
    assert len(made.circuits) >= 8
    assert not [one.tag for one in made.circuits if one.departs]


PLUGIN = """
from circuitlint.authoring import Noticed, ReadingRule, offers

class Odd(ReadingRule):
    name = "odd-reading"
    title = "Readings are not odd"
    def notice(self, reading, instruments):
        {body}

@offers
def circuitlint_reading_rules():
    return [Odd]
"""


def test_a_rule_on_readings_comes_from_a_plugin_like_any_other(tmp_path: Path, capsys) -> None:
    body = 'yield Noticed("the current is odd", "read again", "major", "current")'
    plugin = write(tmp_path, "odd.py", PLUGIN.format(body=body))
    arguments = ["readings", write(tmp_path, "d.yaml", BENCH), write(tmp_path, "r.yaml", GOOD), "--plugin", plugin]
    assert main([*arguments, "--width", "200"]) == 1, "a major remark holds"
    assert re.search(r"AC: the current is odd \(odd-reading, major; .*r.yaml:2:46\): read again", capsys.readouterr().out)


@pytest.mark.parametrize("body", ["raise ValueError('no')", "yield 'nonsense'", "import sys; sys.exit(0)"])
def test_a_rule_on_readings_that_fails_is_named_and_holds_and_the_others_go_on(body: str, tmp_path: Path, capsys) -> None:
    plugin = write(tmp_path, "odd.py", PLUGIN.format(body=body))
    arguments = ["readings", write(tmp_path, "d.yaml", BENCH), write(tmp_path, "r.yaml", TEXT), "--plugin", plugin]
    assert main(arguments) == 3
    said = capsys.readouterr()
    assert "odd odd-reading" in said.err and "Traceback" not in said.err
    assert "calibration of old fell due" in " ".join(said.out.split())


def test_a_class_that_is_no_rule_on_readings_is_refused_with_its_plugin_and_the_account_says_so(tmp_path: Path, capsys) -> None:
    text = "from circuitlint.authoring import offers\n@offers\ndef circuitlint_reading_rules():\n    return [int]\n"
    plugin = write(tmp_path, "odd.py", text)
    (failed,) = [one.failed for one in gather([plugin]).plugins if one.failed]
    assert "not a ReadingRule class" in failed
    arguments = ["readings", write(tmp_path, "d.yaml", BENCH), write(tmp_path, "r.yaml", GOOD), "--plugin", plugin]
    assert main(arguments) == 3
    assert "the plugin failed" in capsys.readouterr().err
