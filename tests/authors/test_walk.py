"""An author's way from an empty folder to an installed plugin: the commands of DEVELOPERS.md, each run as it stands there."""

from __future__ import annotations

import json
import os
import subprocess
from pathlib import Path

import pytest

from tests.documents import block, commands
from tests.environments import Environment, build_wheel, copy_of_the_project, declared

DOCUMENT, WALK = "DEVELOPERS.md", "walk"
PROGRAM = "#!{python}\nimport sys\nfrom {module} import {name}\nsys.exit({name}())\n"
# What pip would fetch is here already, and no network is asked.
OFFLINE = {"PIP_NO_INDEX": "1", "PIP_NO_BUILD_ISOLATION": "0", "PIP_NO_CACHE_DIR": "1", "PIP_DISABLE_PIP_VERSION_CHECK": "1"}


class Workshop:
    """A fresh environment with circuitlint from its wheel, pytest and pip, and an empty folder to work in."""

    def __init__(self, folder: Path) -> None:
        self.environment = Environment(folder / "environment", [*declared(), "setuptools", "pip", "pytest"])
        self.environment.install(str(build_wheel(copy_of_the_project(folder / "project"), folder / "wheels")))
        for name, module, function in (("pip", "pip", "main"), ("pytest", "pytest", "console_main")):
            program = self.environment.programs / name
            text = PROGRAM.format(python=self.environment.programs / "python", module=module, name=function)
            program.write_text(text, encoding="utf-8")
            program.chmod(0o755)
        self.folder = folder / "empty"
        self.folder.mkdir()

    def run(self, line: str) -> subprocess.CompletedProcess[str]:
        """One command line, as a person types it."""
        plain = {name: value for name, value in os.environ.items() if not name.startswith(("PYTHON", "PYTEST", "PIP"))}
        path = f"{self.environment.programs}{os.pathsep}{os.defpath}"
        return subprocess.run(["bash", "-c", line], cwd=self.folder, env={**plain, **OFFLINE, "PATH": path, "NO_COLOR": "1"},
                              capture_output=True, text=True, encoding="utf-8", timeout=300)  # fmt: skip


@pytest.fixture(scope="module")
def walked(tmp_path_factory: pytest.TempPathFactory) -> dict[str, subprocess.CompletedProcess[str]]:
    """Every command of the walk with what became of it; each must end with status 0."""
    workshop = Workshop(tmp_path_factory.mktemp("authors"))
    done = {}
    for line in commands(block(DOCUMENT, "command", WALK)):
        done[line] = workshop.run(line)
        assert done[line].returncode == 0, f"{line}\n{done[line].stdout}\n{done[line].stderr}"
    done["the record"] = workshop.run(
        "circuitlint review --ruleset house --report json slipway/definitions && rm -rf slipway && circuitlint plugins --as json")
    return done


def words(lines: dict[str, subprocess.CompletedProcess[str]], word: str) -> list[str]:
    return [line for line in lines if word in line]


def test_the_walk_begins_with_an_empty_folder_and_does_every_step(
    walked: dict[str, subprocess.CompletedProcess[str]]
) -> None:
    lines = list(walked)
    steps = ["circuitlint begin", "sed", "pytest", "--settings", "pip wheel", "pip install", "circuitlint plugins", "--ruleset house"]
    places = [next(number for number, line in enumerate(lines) if step in line) for step in steps]
    assert places == sorted(places), "in this order"


def test_the_number_that_is_edited_is_there_and_is_what_the_review_holds_against(
    walked: dict[str, subprocess.CompletedProcess[str]]
) -> None:
    (edit,) = words(walked, "sed")
    assert "value: 20 W" in edit and "value: 25 W" in edit
    printed = walked["the record"].stdout
    record, _ = json.JSONDecoder().raw_decode(printed)
    (limit,) = [one for one in record["ruleset"]["limits"] if one["path"] == "rules.winding-loss.limits.coil"]
    assert limit["value"] == 25.0


def test_the_installed_plugin_has_its_say_without_being_named_and_without_its_folder(
    walked: dict[str, subprocess.CompletedProcess[str]]
) -> None:
    record, end = json.JSONDecoder().raw_decode(walked["the record"].stdout)
    assert record["circuits"][0]["coverage"]["winding-loss"] == "conforms"
    listed = json.loads(walked["the record"].stdout[end:])["plugins"]
    (own,) = [one for one in listed if one["name"] == "house-rules"]
    assert own["origin"] == "installed" and own["version"] == "0.1.0" and own["failed"] == ""
    assert own["offers"] == ["rule winding-loss", "ruleset house"]
