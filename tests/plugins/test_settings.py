"""A project's settings: read where they are named and nowhere else, and the call goes over them."""

from __future__ import annotations

import json
from pathlib import Path

import pytest

from circuitlint.cli import main

LOUD = 'import sys\nsys.stderr.write("loaded\\n")\nfrom circuitlint.authoring import offers\n\n@offers\ndef circuitlint_parts():\n    return []\n'
DEFINITION = """\
format: 1
supplies: {s: {system: dc, voltage: 24 V}}
circuits: {tag: A, fed_from: s, cable: [], load: {resistor: {resistance: 100 ohm}}}
"""
SETTINGS = "format: 1\ndefinitions: [circuits]\nruleset: low-voltage-60hz\nplugins: [loud.py]\nhold_at: observation\n"


@pytest.fixture
def project(tmp_path: Path) -> Path:
    folder = tmp_path / "project"
    (folder / "circuits").mkdir(parents=True)
    (folder / "circuits" / "a.yaml").write_text(DEFINITION, encoding="utf-8")
    (folder / "loud.py").write_text(LOUD, encoding="utf-8")
    (folder / "circuitlint.settings").write_text(SETTINGS, encoding="utf-8")
    return folder


def record(capsys: pytest.CaptureFixture[str]) -> dict[str, object]:
    made: dict[str, object] = json.loads(capsys.readouterr().out)
    return made


def test_settings_say_what_is_reviewed_against_what_with_which_plugins_and_what_holds(
    project: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    main(["review", "--settings", str(project / "circuitlint.settings"), "--report", "json"])
    made = record(capsys)
    assert made["ruleset"]["name"] == "low-voltage-60hz"  # type: ignore[index]
    assert made["hold_at"] == "observation"
    assert [one["name"] for one in made["plugins"]] == ["circuitlint_rules", "loud"]  # type: ignore[attr-defined]
    assert made["documents"][0]["file"].endswith("project/circuits/a.yaml")  # type: ignore[index]


def test_what_the_call_says_goes_over_the_settings(project: Path, capsys: pytest.CaptureFixture[str]) -> None:
    settings = str(project / "circuitlint.settings")
    main(["review", "--demo", "--settings", settings, "--ruleset", "low-voltage-50hz", "--hold-at", "never", "--report", "json"])
    made = record(capsys)
    assert made["ruleset"]["name"] == "low-voltage-50hz"  # type: ignore[index]
    assert made["hold_at"] == "never"
    assert made["documents"][0]["file"] == "ferry-slip.yaml"  # type: ignore[index]


def test_settings_that_are_not_named_are_not_read_and_load_nothing(project: Path, capsys: pytest.CaptureFixture[str]) -> None:
    main(["review", str(project), "--report", "json"])
    printed, told = capsys.readouterr()
    assert "loaded" not in told
    assert f"{project / 'circuitlint.settings'} is not read; accepted: --settings" in told
    made = json.loads(printed)
    assert made["ruleset"]["name"] == "low-voltage-50hz"
    assert [one["name"] for one in made["plugins"]] == ["circuitlint_rules"]


@pytest.mark.parametrize("where", ["title: x\nplugins: [loud.py]\n", "title: x\nsettings: circuitlint.settings\n"])
def test_a_definition_names_no_plugin_and_no_settings(where: str, project: Path, capsys: pytest.CaptureFixture[str]) -> None:
    file = project / "circuits" / "a.yaml"
    file.write_text(DEFINITION + where, encoding="utf-8")
    assert main(["review", str(file)]) == 2
    told = capsys.readouterr().err
    assert "unknown key" in told and "loaded" not in told


@pytest.mark.parametrize("call", [["rules"], ["plugins"], ["figures"]])
def test_other_commands_read_settings_too(call: list[str], project: Path, capsys: pytest.CaptureFixture[str]) -> None:
    assert main([*call, "--settings", str(project / "circuitlint.settings")]) == 0
    assert "loaded" in capsys.readouterr().err


@pytest.mark.parametrize(
    ("text", "told"),
    [
        ("format: 1\nplugin: [a.py]\n", "circuitlint.settings:2:1: unknown key 'plugin'"),
        ("format: 2\n", "circuitlint.settings:1:9"),
        ("format: 1\nhold_at: sometimes\n", "circuitlint.settings:2:10"),
        ("format: 1\nplugins: one.py\n", "not a list"),
        ("- format\n", "the file is not a mapping"),
        ("", "the file is"),
        ("format: 1\nformat: 1\n", "circuitlint.settings:2"),
        ("format: [", "the file is not YAML"),
    ],
)
def test_settings_with_faults_are_refused_with_their_place(
    text: str, told: str, project: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    (project / "circuitlint.settings").write_text(text, encoding="utf-8")
    assert main(["review", "--settings", str(project / "circuitlint.settings")]) == 2
    complaint = capsys.readouterr().err
    assert told in complaint
    assert "loaded" not in complaint


def test_settings_that_are_not_there_are_told(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["review", "--settings", str(tmp_path / "none")]) == 2
    assert main(["review", "--settings", str(tmp_path)]) == 2
    assert capsys.readouterr().err.count("the settings cannot be read") == 2
