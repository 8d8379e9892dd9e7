"""What is shipped is the built wheel: it holds all it needs, and does what an editable install does."""

from __future__ import annotations

import json
import zipfile
from pathlib import Path
from typing import NamedTuple

import pytest

from tests.documents import command
from tests.environments import ROOT, Environment, build_wheel, copy_of_the_project, declared

# Folder in the project, and the package it becomes.
SHIPPED = {
    "circuitlint": "circuitlint",
    "plugins/circuitlint_rules": "circuitlint_rules",
    "rulesets": "circuitlint_rulesets",
}
DATA = (".py", ".yaml", ".css", ".js", ".typed")


class Installs(NamedTuple):
    """The two ways to install, each in a clean environment, and a folder that holds nothing of the project."""

    wheel: Path
    from_wheel: Environment
    editable: Environment
    elsewhere: Path


@pytest.fixture(scope="module")
def installs(tmp_path_factory: pytest.TempPathFactory) -> Installs:
    folder = tmp_path_factory.mktemp("installs with a space")
    project = copy_of_the_project(folder / "project")
    wheel = build_wheel(project, folder / "wheels")
    from_wheel = Environment(folder / "from wheel", declared())
    from_wheel.install(str(wheel))
    editable = Environment(folder / "editable", [*declared(), "setuptools"])
    editable.install("--editable", str(project))
    elsewhere = folder / "elsewhere"
    elsewhere.mkdir()
    return Installs(wheel, from_wheel, editable, elsewhere)


def demo_arguments() -> list[str]:
    """The arguments of README's first command."""
    return command("README.md", "demo").rpartition("&&")[2].split()[1:]


def test_the_wheel_holds_every_module_and_data_file_and_nothing_else(installs: Installs) -> None:
    here = {
        f"{package}/{path.relative_to(ROOT / folder).as_posix()}": path.read_bytes()
        for folder, package in SHIPPED.items()
        for path in (ROOT / folder).rglob("*")
        if path.is_file() and path.suffix != ".pyc"
    }
    assert {Path(name).suffix for name in here} <= set(DATA), "pyproject.toml ships no other kinds of file"
    with zipfile.ZipFile(installs.wheel) as archive:
        shipped = {name: archive.read(name) for name in archive.namelist() if ".dist-info/" not in name}
        licences = [name for name in archive.namelist() if name.endswith("/LICENSE")]
    assert sorted(shipped) == sorted(here)
    assert shipped == here
    assert len(licences) == 1


def test_the_demo_is_reviewed_from_the_wheel_as_from_an_editable_install(installs: Installs) -> None:
    arguments = demo_arguments()
    for report in ([], ["--report", "json"]):
        done = [
            each.run(program, *before, *arguments, *report, folder=installs.elsewhere)
            for each in (installs.from_wheel, installs.editable)
            for program, *before in (["circuitlint"], ["python", "-m", "circuitlint"])
        ]
        assert [each.returncode for each in done] == [0, 0, 0, 0], done[0].stderr.decode()
        assert len({each.stdout for each in done}) == 1
        assert done[0].stdout
    record = json.loads(done[0].stdout)
    assert record, "the record is JSON and holds something"


@pytest.mark.parametrize("arguments", [["rules"], ["schema"]])
def test_rules_and_schemas_are_the_same_from_both(installs: Installs, arguments: list[str]) -> None:
    wheel, editable = (
        each.run("circuitlint", *arguments, folder=installs.elsewhere)
        for each in (installs.from_wheel, installs.editable)
    )
    assert wheel.returncode == editable.returncode == 0, wheel.stderr.decode()
    assert wheel.stdout == editable.stdout
    assert wheel.stdout


def test_the_clean_environment_holds_nothing_but_what_is_declared(installs: Installs) -> None:
    for stranger in ("pytest", "scipy", "hypothesis", "tests"):
        assert installs.from_wheel.run("python", "-c", f"import {stranger}", folder=installs.elsewhere).returncode == 1
    where = installs.from_wheel.run(
        "python", "-c", "import circuitlint; print(circuitlint.__file__)", folder=installs.elsewhere
    )
    assert Path(where.stdout.decode().strip()).is_relative_to(installs.from_wheel.site)
