"""Clean environments: the interpreter, what a distribution declares that it needs, and nothing else.

What is needed is linked from the environment that runs the tests, so that no network is asked and the test is quick;
what is not declared is not there.
"""

from __future__ import annotations

import importlib.metadata
import os
import shutil
import subprocess
import sys
import tomllib
import venv
from collections.abc import Iterable
from pathlib import Path

from packaging.requirements import Requirement

ROOT = Path(__file__).parents[1]
LEFT_BEHIND = shutil.ignore_patterns(
    ".*", "build", "dist", "*.egg-info", "__pycache__", "*.pyc"
)  # hidden files build nothing; a stale build folder would smuggle old modules into the wheel


def declared() -> list[str]:
    """The dependencies that pyproject.toml declares."""
    needed: list[str] = tomllib.loads((ROOT / "pyproject.toml").read_text(encoding="utf-8"))["project"]["dependencies"]
    return needed


def copy_of_the_project(target: Path) -> Path:
    """The project as a fresh clone has it, in a folder of its own."""
    shutil.copytree(ROOT, target, ignore=LEFT_BEHIND)
    return target


def distributions(requirements: Iterable[str]) -> dict[str, importlib.metadata.Distribution]:
    """The distributions that satisfy requirements, with all that they need in turn, by name."""
    found: dict[str, importlib.metadata.Distribution] = {}
    queue = [Requirement(text) for text in requirements]
    while queue:
        wanted = queue.pop()
        if wanted.name.lower() in found or (wanted.marker and not wanted.marker.evaluate({"extra": ""})):
            continue
        one = importlib.metadata.distribution(wanted.name)
        assert wanted.specifier.contains(one.version, prereleases=True), f"{wanted} is wanted, {one.version} is here"
        found[wanted.name.lower()] = one
        queue += [Requirement(text) for text in one.requires or ()]
    return found


class Environment:
    """A virtual environment in a folder, without pip; the running environment's pip installs into it."""

    def __init__(self, folder: Path, requirements: Iterable[str]) -> None:
        venv.create(folder, with_pip=False, symlinks=True)
        self.programs = folder / "bin"
        self.site = next((folder / "lib").glob("python*/site-packages"))
        for one in distributions(requirements).values():
            for top in sorted({path.parts[0] for path in one.files or ()} - {"..", "__pycache__"}):
                (self.site / top).symlink_to(str(one.locate_file(top)))

    def install(self, *arguments: str) -> None:
        """Install without asking the network. Raises AssertionError with pip's words when it fails."""
        options = ["--no-deps", "--no-index", "--no-build-isolation", "--no-cache-dir", "--disable-pip-version-check"]
        pip = [sys.executable, "-m", "pip", "--python", str(self.programs / "python")]
        done = subprocess.run([*pip, "install", *options, *arguments], capture_output=True, text=True, timeout=300)
        assert done.returncode == 0, done.stderr
        check = subprocess.run([*pip, "check"], capture_output=True, text=True, timeout=300)
        assert check.returncode == 0, check.stdout

    def run(self, program: str, *arguments: str, folder: Path) -> subprocess.CompletedProcess[bytes]:
        """Run a program of the environment in a folder, with nothing of the running one in sight."""
        environment = {name: value for name, value in os.environ.items() if not name.startswith("PYTHON")}
        environment |= {"PATH": f"{self.programs}{os.pathsep}{os.defpath}", "NO_COLOR": "1", "PYTHONUTF8": "1"}
        command = [str(self.programs / program), *arguments]
        return subprocess.run(command, cwd=folder, env=environment, capture_output=True, timeout=300)


def build_wheel(project: Path, target: Path) -> Path:
    """The wheel of a project, built by the tools its pyproject.toml names."""
    pip = [sys.executable, "-m", "pip", "wheel", "--no-deps", "--no-index", "--no-build-isolation"]
    options = ["--disable-pip-version-check", "--wheel-dir", str(target), str(project)]
    done = subprocess.run([*pip, *options], capture_output=True, text=True, timeout=300)
    assert done.returncode == 0, done.stderr
    (wheel,) = target.glob("*.whl")
    return wheel
