"""The two worked plugins of this repository load from where they lie, pass their own tests, and leave the others alone."""

from __future__ import annotations

import json
import os
import subprocess
import sys
import tomllib
from pathlib import Path
from typing import Any

import pytest

from circuitlint.cli import main

ROOT = Path(__file__).parents[2]
WORKED = sorted(path.parent for path in (ROOT / "plugins").glob("*/pyproject.toml"))
DEMO = ["review", "--demo", "--hold-at", "never", "--on", "2026-12-01", "--report"]


def recipe(plugin: Path) -> dict[str, Any]:
    return tomllib.loads((plugin / "pyproject.toml").read_text(encoding="utf-8"))


def test_there_are_two_of_different_nature() -> None:
    assert len(WORKED) == 2
    sources = ["".join(one.read_text(encoding="utf-8") for one in plugin.rglob("*.py")) for plugin in WORKED]
    assert ["circuitlint_load_kinds" in text for text in sources] == [False, True]
    assert all("circuitlint_rules" in text and "circuitlint_rulesets" in text and "circuitlint_parts" in text for text in sources)


@pytest.mark.parametrize("plugin", WORKED, ids=lambda plugin: plugin.name)
def test_its_entry_point_and_its_folder_have_one_name(plugin: Path) -> None:
    made = recipe(plugin)
    assert list(made["project"]["entry-points"]["circuitlint"]) == [plugin.name] == [made["project"]["name"]]
    assert made["project"]["dependencies"] == ["circuitlint"]


@pytest.mark.parametrize("plugin", WORKED, ids=lambda plugin: plugin.name)
def test_its_own_tests_pass(plugin: Path) -> None:
    plain = {name: value for name, value in os.environ.items() if not name.startswith("PYTEST")}
    call = [sys.executable, "-m", "pytest", "-q", "-p", "no:cacheprovider", "-c", "pyproject.toml", "--rootdir", "."]
    done = subprocess.run(call, cwd=plugin, env={**plain, "PYTHONPATH": str(plugin), "PYTHONDONTWRITEBYTECODE": "1"},
                          capture_output=True, text=True, timeout=300)  # fmt: skip
    assert done.returncode == 0, done.stdout + done.stderr


@pytest.mark.parametrize("plugin", WORKED, ids=lambda plugin: plugin.name)
def test_the_demo_is_reviewed_with_it_and_the_common_rules_say_what_they_say(plugin: Path, tmp_path: Path) -> None:
    plain, with_it = tmp_path / "plain.json", tmp_path / "with.json"
    assert main([*DEMO, f"json={plain}"]) == 0
    assert main([*DEMO, f"json={with_it}", "--plugin", str(plugin)]) == 0
    before, after = (json.loads(path.read_text(encoding="utf-8")) for path in (plain, with_it))
    assert [one["checks"] for one in before["circuits"]] == [one["checks"] for one in after["circuits"]]
    assert [one["failed"] for one in after["plugins"]] == ["", ""]


@pytest.mark.parametrize("plugin", WORKED, ids=lambda plugin: plugin.name)
def test_its_ruleset_runs_its_rules_beside_the_common_ones(plugin: Path, tmp_path: Path) -> None:
    target = tmp_path / "own.json"
    (ruleset,) = [path.stem for path in plugin.glob("*/*.yaml") if "rules:" in path.read_text(encoding="utf-8")]
    assert main([*DEMO, f"json={target}", "--plugin", str(plugin), "--ruleset", ruleset]) == 0
    made = json.loads(target.read_text(encoding="utf-8"))
    own = {one["name"] for one in made["rules"] if one["plugin"] != "circuitlint_rules"}
    assert own and "voltage-drop" in {one["name"] for one in made["rules"]}
    assert made["ruleset"]["built_on"] == ["low-voltage-50hz"]


def test_the_load_kind_comes_from_outside_without_a_word_in_the_package() -> None:
    words = ("holding_magnets", "holding-force-share", "magnet-current", "trace_heating", "heat-per-metre")
    for path in (ROOT / "circuitlint").rglob("*"):
        if path.suffix in (".py", ".yaml", ".js", ".css"):
            text = path.read_text(encoding="utf-8")
            assert [word for word in words if word in text] == [], path
