"""What `circuitlint begin` writes works as it stands."""

from __future__ import annotations

import os
import subprocess
import sys
from pathlib import Path

import pytest

from circuitlint.cli import main
from circuitlint.starting import project
from tests.test_house import NEVER_WRITTEN
from tests.test_readme import run

LONGEST_RULE = 35


@pytest.fixture(scope="module")
def begun(tmp_path_factory: pytest.TempPathFactory) -> Path:
    folder = tmp_path_factory.mktemp("begin") / "slip way"
    assert main(["begin", str(folder)]) == 0
    return folder


def done(line: str, folder: Path) -> subprocess.CompletedProcess[str]:
    """A command line in the project; pytest knows nothing of this run's options."""
    return run(f"unset PYTEST_ADDOPTS PYTEST_XDIST_WORKER; {line}", folder)


def test_every_file_is_there_and_nothing_else(begun: Path) -> None:
    there = {path.relative_to(begun).as_posix() for path in begun.rglob("*") if path.is_file() and "__pycache__" not in path.parts}
    assert there - {"review.sarif", "review.html"} == set(project())
    wanted = ("circuitlint.settings", "definitions/", "house_rules/house.yaml", "tests/", "pyproject.toml", "ci/", "hooks/pre-commit")
    for piece in wanted:
        assert any(name.startswith(piece) for name in there)


def test_its_tests_pass_and_its_review_holds_nothing(begun: Path) -> None:
    tests = done("pytest -q -p no:cacheprovider", begun)
    assert tests.returncode == 0, tests.stdout + tests.stderr
    reviewed = done("circuitlint review --settings circuitlint.settings", begun)
    assert (reviewed.returncode, reviewed.stderr) == (0, "")
    assert "built on low-voltage-50hz" in reviewed.stdout


def test_the_example_of_a_ci_job_runs_and_leaves_its_reports(begun: Path) -> None:
    ran = done("ci/review", begun)
    assert ran.returncode == 0, ran.stdout + ran.stderr
    assert (begun / "review.sarif").is_file() and (begun / "review.html").is_file()


def test_the_example_of_a_ci_job_does_not_pass_when_something_is_held(begun: Path, tmp_path: Path) -> None:
    folder = tmp_path / "held"
    assert main(["begin", str(folder)]) == 0
    ruleset = folder / "house_rules" / "house.yaml"
    ruleset.write_text(ruleset.read_text(encoding="utf-8").replace("20 W", "9 W"), encoding="utf-8")
    assert done("ci/review", folder).returncode == 1
    assert done("hooks/pre-commit", folder).returncode == 1


def test_git_runs_the_pre_commit_example_and_keeps_what_is_held_out(tmp_path: Path) -> None:
    folder = tmp_path / "kept"
    assert main(["begin", str(folder)]) == 0
    git = "git -c user.name=author -c user.email=author@example.org"
    first = done(f"git init -q . && git config core.hooksPath hooks && git add -A && {git} commit -q -m begin", folder)
    assert first.returncode == 0, first.stderr
    ruleset = folder / "house_rules" / "house.yaml"
    ruleset.write_text(ruleset.read_text(encoding="utf-8").replace("20 W", "9 W"), encoding="utf-8")
    second = done(f"git add -A && {git} commit -q -m less", folder)
    assert second.returncode != 0
    assert "winding-loss" in second.stdout + second.stderr


def test_the_rule_is_short() -> None:
    assert len(project()["house_rules/winding_loss.py"].splitlines()) <= LONGEST_RULE


def test_nothing_that_is_there_is_written_over(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    (tmp_path / "mine").write_text("mine\n", encoding="utf-8")
    assert main(["begin", str(tmp_path)]) == 2
    assert main(["begin", str(tmp_path / "mine")]) == 2
    assert main(["begin", str(tmp_path / "mine" / "below")]) == 2
    told = capsys.readouterr().err
    assert told.count("accepted: a new or an empty folder") == 2
    assert [path.name for path in tmp_path.iterdir()] == ["mine"]
    (tmp_path / "empty").mkdir()
    assert main(["begin", str(tmp_path / "empty")]) == 0


def test_no_file_of_it_holds_what_no_file_may_hold() -> None:
    for name, text in project().items():
        for what, pattern in NEVER_WRITTEN.items():
            assert not pattern.search(text), (name, what)


def test_it_is_the_same_from_an_installed_package(tmp_path: Path) -> None:
    call = [sys.executable, "-m", "circuitlint", "begin", "there"]
    assert subprocess.run(call, cwd=tmp_path, capture_output=True, env={**os.environ}).returncode == 0
    assert (tmp_path / "there" / "ci" / "review").stat().st_mode & 0o111
