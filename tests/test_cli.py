"""The command line: exit statuses, where results and complaints go, and reports written whole or not at all."""

from __future__ import annotations

import json
import os
import subprocess
import sys
from pathlib import Path

import pytest

from circuitlint.cli import main
from tests.test_promises import SIX_MISTAKES

CLEAR = """\
format: 1
title: invented lamp
supplies: {s: {system: single-phase, voltage: 230 V, frequency: 50 Hz}}
circuits:
  - {tag: A, fed_from: s, ambient: 20 degC, cable: [], load: {resistor: {resistance: 100 ohm}}}
"""


def run(*arguments: str, stdin: str = "") -> subprocess.CompletedProcess[str]:
    return subprocess.run([sys.executable, "-m", "circuitlint", *arguments], input=stdin, capture_output=True, text=True,
                          encoding="utf-8", env={**os.environ, "PYTHONUTF8": "1"}, timeout=120)


def test_nothing_held_ends_with_0_and_says_little(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    file = tmp_path / "lamp.yaml"
    file.write_text(CLEAR)
    assert main(["review", str(file)]) == 0
    out, err = capsys.readouterr()
    assert err == "" and len(out.splitlines()) < 25


def test_something_held_ends_with_1_and_never_holds_with_0(capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["review", "--demo"]) == 1
    assert main(["review", "--demo", "--hold-at", "never"]) == 0
    assert capsys.readouterr().err == ""


def test_a_faulty_definition_ends_with_2_names_each_fault_and_prints_no_result() -> None:
    done = run("review", "-", stdin=SIX_MISTAKES)
    assert done.returncode == 2 and done.stdout == ""
    assert "Traceback" not in done.stderr
    assert done.stderr.count("accepted:") >= 6
    assert "-:3:" in done.stderr, "line and column of the first mistake"


@pytest.mark.parametrize("arguments", [
    ["review"], ["review", "missing.yaml"], ["review", "--demo", "--ruleset", "no-such-set"],
    ["review", "--demo", "--report", "papyrus"], ["review", "--demo", "--report", "json=/no/such/folder/x.json"],
    ["review", "--demo", "--on", "tomorrow"], ["review", "--demo", "--plugin", "missing.py"],
    ["figures", "--demo", "--tag", "=Q"],
    ["rules", "no-such-rule"], ["report", "missing.json"], ["compare", "missing.json", "missing.json"], ["no-such-command"],
])  # fmt: skip
def test_a_call_at_fault_ends_with_2_and_says_what_would_be_accepted(arguments: list[str]) -> None:
    done = run(*arguments)
    assert done.returncode == 2, done
    assert done.stderr and "Traceback" not in done.stderr
    assert done.stdout == ""


def test_a_report_file_is_written_whole_or_not_at_all(tmp_path: Path) -> None:
    target = tmp_path / "folder"
    target.mkdir()
    done = run("review", "--demo", "--hold-at", "never", "--report", f"json={target}")
    assert done.returncode == 2 and "cannot be written" in done.stderr
    assert list(tmp_path.iterdir()) == [target], "nothing half-written is left behind"
    file = tmp_path / "record.json"
    assert run("review", "--demo", "--hold-at", "never", "--report", f"json={file}").returncode == 0
    assert json.loads(file.read_text("utf-8"))["format"] == 1


def test_a_reader_that_goes_away_does_no_harm() -> None:
    line = f"{sys.executable} -m circuitlint figures --demo | head -n 1"
    done = subprocess.run(["bash", "-c", line], capture_output=True, text=True, timeout=120)
    assert done.returncode == 0 and "Traceback" not in done.stderr


def test_two_runs_under_different_hashing_give_the_same_bytes() -> None:
    found = {
        subprocess.run([sys.executable, "-m", "circuitlint", "review", "--demo", "--report", "json"], capture_output=True,
                       env={**os.environ, "PYTHONHASHSEED": seed}, timeout=120).stdout
        for seed in ("1", "2")
    }
    assert len(found) == 1


def test_the_calculation_sheet_shows_formula_numbers_result_and_source(capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["figures", "--demo", "--tag", "=R3-Y1", "--width", "200"]) == 0
    out = capsys.readouterr().out
    for told in ("X = 2π · f · L", "360.0 mH", "113.1 Ω", "IEC 60228", "Lessons in Electric Circuits"):
        assert told in out


@pytest.mark.parametrize("of", ["definition", "ruleset", "record"])
def test_every_schema_is_json_schema(of: str, capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["schema", of]) == 0
    assert json.loads(capsys.readouterr().out)["$schema"] == "https://json-schema.org/draft/2020-12/schema"


def test_one_ruleset_laid_over_another_changes_its_limit_alone(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    own = tmp_path / "own.yaml"
    own.write_text("""\
format: 1
name: own
title: Own limits (invented)
edition: 2026-12-01
built_on: low-voltage-50hz
jurisdiction: here
sources: {house: {known: firm's own, work: the house}}
rules: {minimum-power-factor: {limits: {circuit: {value: "0.15", source: house}}}}
""")
    records = []
    for arguments in ([], ["--ruleset", str(own)]):
        main(["review", "--demo", "--report", "json", *arguments])
        records.append(json.loads(capsys.readouterr().out))
    before, after = ({(one["path"]): one for one in record["ruleset"]["limits"]} for record in records)
    changed = {path for path in before if before[path] != after[path]}
    assert changed == {"rules.minimum-power-factor.limits.circuit"}
    assert after["rules.minimum-power-factor.limits.circuit"]["set_by"] == "own"


RULESETS = {
    "no source": ('{value: "0.9"}', "source"),
    "unknown source": ('{value: "0.9", source: hous}', "did you mean 'house'"),
    "wrong dimension": ("{value: 5 V, source: house}", "not a ratio"),
}


@pytest.mark.parametrize("name", list(RULESETS))
def test_a_faulty_limit_is_refused_with_its_place(name: str, tmp_path: Path) -> None:
    limit, told = RULESETS[name]
    own = tmp_path / "own.yaml"
    own.write_text(f"""\
format: 1
name: own
title: Own limits (invented)
edition: 2026-12-01
built_on: low-voltage-50hz
jurisdiction: here
sources: {{house: {{known: firm's own, work: the house}}}}
rules:
  minimum-power-factor: {{limits: {{circuit: {limit}}}}}
""")
    done = run("review", "--demo", "--ruleset", str(own))
    assert done.returncode == 2 and told in done.stderr and "own.yaml:9:" in done.stderr


def test_a_rule_nobody_knows_is_refused_with_the_nearest_name(tmp_path: Path) -> None:
    own = tmp_path / "own.yaml"
    own.write_text("""\
format: 1
name: own
title: Own limits (invented)
edition: 2026-12-01
built_on: low-voltage-50hz
jurisdiction: here
rules:
  voltage-drops: {severities: {nominal: minor, worst_case: minor, near_limit: minor, kind: minor, not_assessed: minor}}
""")
    done = run("review", "--demo", "--ruleset", str(own))
    assert done.returncode == 2 and "did you mean 'voltage-drop'" in done.stderr and "own.yaml:8:" in done.stderr
