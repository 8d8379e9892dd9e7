"""The house keeps its shape: what lies where, how long a module is, which words are used, what imports alone."""

from __future__ import annotations

import ast
import fnmatch
import importlib.metadata
import json
import re
import subprocess
import sys
import tomllib
from collections.abc import Iterator
from importlib import resources
from pathlib import Path
from typing import Any

import pytest

ROOT = Path(__file__).parents[1]
TOP_LEVEL = {
    "README.md", "DEVELOPERS.md", "pyproject.toml", "circuitlint", "plugins", "rulesets", "tests", "LICENSE",
}  # fmt: skip
LONGEST = 400
SOURCES = ("circuitlint", "plugins", "rulesets", "tests")
TEXTS = (".py", ".md", ".yaml", ".yml", ".toml", ".css", ".js", ".html", ".json", ".txt")

# What the tool never says of a circuit, in whatever it may print.
NEVER_SAID = re.compile(r"(?<!fail-)\b(safe|safely|approved|compliant)\b", re.IGNORECASE)
# What no file holds. Written so that this file does not hold it either.
NEVER_WRITTEN = {
    "a folder of one machine": re.compile(r"(?<![\w.])/(?:work|tmp|root|home)/"),
    "a folder beside the project": re.compile(r"\.\./" r"shared"),
    "work put off": re.compile(r"\b(?:TO" r"DO|FIX" r"ME|XX" r"X)\b"),
    "a check switched off for a whole line or file": re.compile(
        r"^\s*# (?:no" r"qa|ruff: no" r"qa|mypy: ig" r"nore)", re.M
    ),
    "a test that is not run": re.compile(r"\bpytest\.(?:sk" r"ip|importor" r"skip)|\bmark\.(?:sk" r"ip|xf" r"ail)"),
    "a number of a piece of work": re.compile(r"\b(?:issue|ticket) #?\d", re.IGNORECASE),
}


def ignored() -> list[str]:
    """Names that .gitignore keeps out of the project."""
    lines = (ROOT / ".gitignore").read_text(encoding="utf-8").splitlines()
    return [line.rstrip("/") for line in lines if line and not line.startswith("#")]


def kept(path: Path) -> bool:
    """Whether a path belongs to the project, by .gitignore."""
    patterns = ignored()
    return not any(fnmatch.fnmatch(step, pattern) for step in path.relative_to(ROOT).parts for pattern in patterns)


def files(*endings: str, folders: tuple[str, ...] = SOURCES) -> list[Path]:
    """The project's files with one of the endings, in order."""
    found = [
        path
        for folder in folders
        for path in sorted((ROOT / folder).rglob("*"))
        if path.suffix in endings and kept(path)
    ]
    assert found, f"no {endings} below {folders}"
    return found


def name_of(path: Path) -> str:
    return path.relative_to(ROOT).as_posix()


def module_of(path: Path, base: Path) -> str:
    steps = path.relative_to(base).with_suffix("").parts
    return ".".join(steps[:-1] if steps[-1] == "__init__" else steps)


def shipped_modules() -> list[str]:
    """Every module of the wheel, by the name it is imported under."""
    found = [module_of(path, ROOT) for path in files(".py", folders=("circuitlint",))]
    found += [module_of(path, ROOT / "plugins") for path in files(".py", folders=("plugins/circuitlint_rules",))]
    return found


def test_the_top_level_holds_what_it_is_to_hold_and_nothing_else() -> None:
    visible = {path.name for path in ROOT.iterdir() if not path.name.startswith(".") and kept(path)}
    assert visible == TOP_LEVEL


def test_no_module_is_longer_than_400_lines() -> None:
    lengths = {name_of(path): len(path.read_text(encoding="utf-8").splitlines()) for path in files(".py")}
    assert {name: length for name, length in lengths.items() if length > LONGEST} == {}


def test_every_module_opens_with_what_it_is_and_postpones_annotations() -> None:
    wrong = []
    for path in files(".py"):
        text = path.read_text(encoding="utf-8")
        tree = ast.parse(text)
        annotated = any(isinstance(node, (ast.FunctionDef, ast.ClassDef, ast.AnnAssign)) for node in tree.body)
        if tree.body and not ast.get_docstring(tree):
            wrong.append(f"{name_of(path)}: no docstring")
        if annotated and "from __future__ import annotations" not in text:
            wrong.append(f"{name_of(path)}: annotations are not postponed")
    assert wrong == []


def test_every_folder_of_tests_is_a_package() -> None:
    folders = {path.parent for path in files(".py", folders=("tests",))}
    assert sorted(name_of(folder) for folder in folders if not (folder / "__init__.py").exists()) == []


@pytest.mark.parametrize("what", NEVER_WRITTEN)
def test_no_file_holds(what: str) -> None:
    hidden = [path for path in (ROOT / ".ci" / "run", ROOT / ".gitignore") if path.exists()]
    texts = [path for path in ROOT.iterdir() if path.suffix in TEXTS] + hidden + files(*TEXTS)
    found = [
        f"{name_of(path)}: {match.group()}"
        for path in texts
        for match in NEVER_WRITTEN[what].finditer(path.read_text(encoding="utf-8"))
    ]
    assert found == []


def _words_printed(path: Path) -> Iterator[tuple[int, str]]:
    """Text that may reach a reader: the strings of a module that are not docstrings, the lines of any other file."""
    text = path.read_text(encoding="utf-8")
    if path.suffix != ".py":
        yield from enumerate(text.splitlines(), 1)
        return
    tree = ast.parse(text)
    spoken_for = {
        id(node.body[0].value)
        for node in ast.walk(tree)
        if isinstance(node, (ast.Module, ast.ClassDef, ast.FunctionDef))
        and node.body
        and isinstance(node.body[0], ast.Expr)
    }
    for node in ast.walk(tree):
        if isinstance(node, ast.Constant) and isinstance(node.value, str) and id(node) not in spoken_for:
            yield node.lineno, node.value


def test_the_tool_never_says_safe_approved_or_compliant() -> None:
    found = [
        f"{name_of(path)}, line {line}: {text.strip()[:80]}"
        for path in files(".py", ".yaml", ".js", ".css", folders=("circuitlint", "plugins", "rulesets"))
        for line, text in _words_printed(path)
        if NEVER_SAID.search(text)
    ]
    assert found == []


def _setuptools() -> dict[str, Any]:
    table: dict[str, Any] = tomllib.loads((ROOT / "pyproject.toml").read_text(encoding="utf-8"))["tool"]["setuptools"]
    return table


def test_the_packages_listed_for_the_wheel_are_all_there_are() -> None:
    listed = _setuptools()["packages"]
    is_package = {
        path.parent for path in files(".py", folders=("circuitlint", "plugins/circuitlint_rules", "rulesets"))
    }
    renamed = {"plugins.circuitlint_rules": "circuitlint_rules", "rulesets": "circuitlint_rulesets"}
    names = set()
    for folder in is_package:
        dotted = ".".join(folder.relative_to(ROOT).parts)
        old = next((old for old in renamed if dotted == old or dotted.startswith(old + ".")), "")
        names.add(renamed[old] + dotted.removeprefix(old) if old else dotted)
    assert listed == sorted(names)


def test_the_types_are_announced_to_whoever_installs_the_package() -> None:
    assert (resources.files("circuitlint") / "py.typed").is_file()


def test_what_is_tested_is_what_stands_here() -> None:
    """A package installed before the last change would be tested in its place, and nobody would notice."""
    mapping: dict[str, str] = _setuptools()["package-dir"]
    stale = []
    for package, folder in mapping.items():
        installed = Path(str(resources.files(package)))
        for path in files(*TEXTS, folders=(folder,)):
            copy = installed / path.relative_to(ROOT / folder)
            if not copy.exists() or copy.read_bytes() != path.read_bytes():
                stale.append(name_of(path))
    assert stale == [], "the installed package is another one: install again"


def test_the_entry_points_lead_to_the_command_and_the_common_rules() -> None:
    found = {
        (each.group, each.name, each.value) for each in importlib.metadata.distribution("circuitlint").entry_points
    }
    assert found == {
        ("console_scripts", "circuitlint", "circuitlint.cli:main"),
        ("circuitlint", "circuitlint_rules", "circuitlint_rules"),
    }


# Forks, so that each module meets an interpreter that has seen no other module of the package, while the dependencies
# are loaded once. Warnings are errors from the start.
IMPORT_EACH_ALONE = """
import importlib, json, os, sys, traceback
import numpy, pint, pluggy, pydantic, yaml
failed = {}
for name in json.load(sys.stdin):
    read, write = os.pipe()
    child = os.fork()
    if child == 0:
        told = ""
        try:
            importlib.import_module(name)
        except BaseException:
            told = traceback.format_exc(limit=-2)
        os.write(write, told[-4000:].encode())
        os._exit(0)
    os.close(write)
    with os.fdopen(read, encoding="utf-8", errors="replace") as pipe:
        told = pipe.read()
    status = os.waitpid(child, 0)[1]
    if told or status:
        failed[name] = told or f"ended with status {status}"
json.dump(failed, sys.stdout)
"""


def imported_alone(modules: list[str], folder: Path) -> dict[str, str]:
    """What went wrong with each module that does not import on its own without a warning."""
    done = subprocess.run(
        [sys.executable, "-W", "error", "-c", IMPORT_EACH_ALONE],
        cwd=folder, input=json.dumps(modules), capture_output=True, text=True, timeout=300,
    )  # fmt: skip
    assert done.returncode == 0, done.stderr
    failed: dict[str, str] = json.loads(done.stdout)
    return failed


def test_every_module_imports_alone_and_without_a_warning(tmp_path: Path) -> None:
    modules = [name for name in shipped_modules() if not name.endswith("__main__")]
    assert "circuitlint.errors" in modules
    assert imported_alone(modules, tmp_path) == {}


def test_a_module_that_warns_breaks_or_dies_is_noticed(tmp_path: Path) -> None:
    (tmp_path / "warns.py").write_text("import warnings\nwarnings.warn('old way', DeprecationWarning)\n")
    (tmp_path / "breaks.py").write_text("import no_such_module_anywhere\n")
    (tmp_path / "dies.py").write_text("import os\nos._exit(3)\n")
    (tmp_path / "fine.py").write_text("")
    assert set(imported_alone(["warns", "breaks", "dies", "fine"], tmp_path)) == {"warns", "breaks", "dies"}


def test_the_public_names_are_complete_and_none_hides_a_module() -> None:
    tree = ast.parse((ROOT / "circuitlint" / "__init__.py").read_text(encoding="utf-8"))
    offered: list[str] = []
    made: set[str] = set()
    for node in tree.body:
        name = getattr(node.targets[0], "id", "") if isinstance(node, ast.Assign) else ""
        if name == "__all__" and isinstance(node, ast.Assign):
            offered = ast.literal_eval(node.value)
        elif name == "__version__":
            made.add(name)
        elif isinstance(node, ast.ImportFrom):
            made |= {alias.asname or alias.name for alias in node.names if node.module != "__future__"}
        else:
            docstring = isinstance(node, ast.Expr) and isinstance(node.value, ast.Constant)
            assert docstring, f"line {node.lineno}: public names and the version, nothing else"
    modules = {path.stem for path in (ROOT / "circuitlint").iterdir() if path.suffix == ".py" or path.is_dir()}
    assert "__version__" in offered
    assert sorted(offered) == sorted(made)
    assert set(offered) & modules == set()


def test_the_version_installed_is_the_version_the_package_tells() -> None:
    told = subprocess.run(
        [sys.executable, "-c", "import circuitlint; print(circuitlint.__version__)"], capture_output=True, text=True
    )
    assert told.stdout.strip() == importlib.metadata.version("circuitlint")
