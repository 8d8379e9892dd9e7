"""The package is one staircase: each module imports only from the steps below it, wherever in the module it says so.

The table is the only place that knows the order. Imports are read from the syntax tree, so those inside functions,
under `if TYPE_CHECKING:` and through `importlib.import_module("circuitlint...")` count like any other.
"""

from __future__ import annotations

import ast
import shutil
import sys
from collections.abc import Iterator, Mapping
from graphlib import CycleError, TopologicalSorter
from pathlib import Path
from typing import NamedTuple

import pytest

# From the ground up. A name covers the module and, for a package, everything inside it that has no line of its own.
# Modules of one line may import each other, though never in a circle.
STAIRCASE: tuple[tuple[str, ...], ...] = (
    ("circuitlint.errors", "circuitlint.sources", "circuitlint.si"),
    ("circuitlint.numbers", "circuitlint.units"),
    ("circuitlint.quantity",),
    ("circuitlint.physics.formula",),
    ("circuitlint.physics",),
    ("circuitlint.tables",),
    ("circuitlint.definition",),
    ("circuitlint.limits",),
    ("circuitlint.study",),
    ("circuitlint.review",),
    ("circuitlint.readings",),
    ("circuitlint.isolation",),
    ("circuitlint.hooks",),
    ("circuitlint.authoring",),
    ("circuitlint.plugins",),
    ("circuitlint.engine",),
    ("circuitlint.promises",),
    ("circuitlint.testing",),
    ("circuitlint.reports",),
    ("circuitlint.demo", "circuitlint.starting"),
    ("circuitlint.commands.output", "circuitlint.commands.settings", "circuitlint.commands.job", "circuitlint.commands.stored"),
    ("circuitlint.commands",),
    ("circuitlint.cli",),
    ("circuitlint.__main__",),
)
# Of the package, these may import only what is listed, beside themselves.
ONLY: Mapping[str, tuple[str, ...]] = {
    "circuitlint.reports": (
        "circuitlint.review",
        "circuitlint.readings",
        "circuitlint.errors",
        "circuitlint.sources",
        "circuitlint.quantity",
        "circuitlint.si",
    ),
    "circuitlint.__main__": ("circuitlint.cli",),
}
# A plugin, the common rules not excepted, has one door; its tests have one more. Beside that: the standard library.
PLUGIN_DOOR = ("circuitlint.authoring",)
SHIPPED_PLUGINS = ("circuitlint_rules",)
"""The others may write formulas of their own, for which they need numpy."""
PLUGIN_TEST_DOOR = ("circuitlint.authoring", "circuitlint.testing", "pytest")
# Packages from outside, and who may import them; an empty tuple means everybody. pint stays behind the edge, and what
# is not listed is no dependency of the package.
OUTSIDE: Mapping[str, tuple[str, ...]] = {
    "numpy": (),
    "pydantic": (),
    "pydantic_core": (),
    "annotated_types": (),
    "yaml": (
        "circuitlint.tables",
        "circuitlint.definition",
        "circuitlint.limits",
        "circuitlint.readings",
        "circuitlint.testing",
        "circuitlint.engine",
        "circuitlint.cli",
    ),
    "pluggy": ("circuitlint.hooks", "circuitlint.authoring", "circuitlint.plugins"),
    "pint": ("circuitlint.quantity", "circuitlint.units"),
}
# The only modules that may import a module whose name they learn while running: plugins by place, physics one by one.
LOADS_BY_NAME = ("circuitlint.plugins", "circuitlint.authoring")

ROOT = Path(__file__).parents[1]


class Import(NamedTuple):
    """One import: by which module, of which, on which line."""

    by: str
    of: str
    line: int


def modules_of(root: Path) -> dict[str, Path]:
    """Every module below `circuitlint` and `plugins`, by dotted name; plugin names start at their own folder."""
    found = {}
    for base in (root / "circuitlint", *sorted(path for path in (root / "plugins").iterdir() if path.is_dir())):
        for path in sorted(base.rglob("*.py")):
            steps = path.relative_to(base.parent).with_suffix("").parts
            found[".".join(steps[:-1] if steps[-1] == "__init__" else steps)] = path
    return found


def imports_of(name: str, path: Path, modules: Mapping[str, Path]) -> Iterator[Import]:
    """Every import a module makes, at whatever depth. A name that is only learnt while running is given as `?`."""
    package = name if path.name == "__init__.py" else name.rpartition(".")[0]
    for node in ast.walk(ast.parse(path.read_text(encoding="utf-8"), str(path))):
        if isinstance(node, ast.Import):
            for alias in node.names:
                yield Import(name, alias.name, node.lineno)
        elif isinstance(node, ast.ImportFrom):
            base = node.module or ""
            if node.level:
                above = package.split(".")[: len(package.split(".")) - node.level + 1]
                base = ".".join((*above, base) if base else above)
            for alias in node.names:
                inner = f"{base}.{alias.name}"
                yield Import(
                    name, inner if inner in modules or step_of(inner, exact=True) is not None else base, node.lineno
                )
        elif isinstance(node, ast.Call) and _called(node.func) in ("import_module", "__import__"):
            target = node.args[0] if node.args else None
            literal = isinstance(target, ast.Constant) and isinstance(target.value, str)
            yield Import(name, str(target.value) if isinstance(target, ast.Constant) and literal else "?", node.lineno)


def _called(function: ast.expr) -> str:
    return (
        function.attr if isinstance(function, ast.Attribute) else function.id if isinstance(function, ast.Name) else ""
    )


def inside(name: str, place: str) -> bool:
    """Whether a module is the place or lies inside it."""
    return name == place or name.startswith(place + ".")


def step_of(name: str, exact: bool = False) -> int | None:
    """How high a module stands, by the longest name in the table that covers it; None where it has no place."""
    covering = [
        (len(place), step)
        for step, places in enumerate(STAIRCASE)
        for place in places
        if (name == place if exact else inside(name, place))
    ]
    return max(covering)[1] if covering else None


def trespasses(root: Path) -> list[str]:
    """Every import that breaks the order, every module without a place, every circle."""
    modules = modules_of(root)
    wrong = []
    height = _height_of_the_package(modules)
    graph: dict[str, set[str]] = {name: set() for name in modules}
    for name, path in modules.items():
        if name != "circuitlint" and inside(name, "circuitlint") and step_of(name) is None:
            wrong.append(f"{name} has no place in the table")
            continue
        for one in imports_of(name, path, modules):
            reason = _refused(one, path, height)
            if reason:
                wrong.append(f"{name}, line {one.line}: imports {one.of}: {reason}")
            if one.of in graph:
                graph[name].add(one.of)
    try:
        TopologicalSorter(graph).prepare()
    except CycleError as error:
        wrong.append("in a circle: " + " <- ".join(error.args[1]))
    return wrong


def _height_of_the_package(modules: Mapping[str, Path]) -> int:
    """The package itself stands as high as the highest module it offers names of; on the ground if it offers none."""
    offered = imports_of("circuitlint", modules["circuitlint"], modules)
    return max((step_of(each.of) or 0 for each in offered if inside(each.of, "circuitlint")), default=0)


def _refused(one: Import, path: Path, height: int) -> str:
    top = one.of.partition(".")[0]
    if one.of == "?":
        return "" if one.by in LOADS_BY_NAME else "only plugins.py and authoring.py learn module names while running"
    if not inside(one.by, "circuitlint"):
        return _refused_in_plugin(one, path)
    if top in sys.stdlib_module_names:
        return ""
    if top != "circuitlint":
        users = OUTSIDE.get(top)
        if users is None:
            return "not a dependency of the package"
        return "" if not users or any(inside(one.by, user) for user in users) else f"only {', '.join(users)} may"
    if one.by == "circuitlint":
        return (
            ""
            if one.of not in ("circuitlint.cli", "circuitlint.__main__")
            else "the command line offers no public names"
        )
    target = height if one.of == top else step_of(one.of)
    if target is None:
        return "it has no place in the table"
    for place, allowed in ONLY.items():
        if inside(one.by, place) and one.of != top and not any(inside(one.of, each) for each in (*allowed, place)):
            return f"{place} imports only {', '.join(allowed)}"
    own = step_of(one.by)
    assert own is not None
    return "" if target <= own else "upwards"


def _refused_in_plugin(one: Import, path: Path) -> str:
    top = one.of.partition(".")[0]
    plugins = next(above for above in path.parents if above.name == "plugins")
    folder = plugins / path.relative_to(plugins).parts[0]
    own = {folder.name, *(entry.stem for entry in folder.iterdir())}
    if top in sys.stdlib_module_names or top in own:
        return ""
    if top == "numpy" and folder.name not in SHIPPED_PLUGINS:
        return ""
    test = "tests" in path.relative_to(folder).parts or path.name.startswith("test_")
    door = PLUGIN_TEST_DOOR if test else PLUGIN_DOOR
    return "" if one.of in door else f"a plugin imports only {', '.join(door)}"


def test_every_module_imports_only_from_the_steps_below_it() -> None:
    assert modules_of(ROOT), "no modules found: the test looked in the wrong place"
    assert trespasses(ROOT) == []


def test_every_place_in_the_table_is_named_once() -> None:
    places = [place for step in STAIRCASE for place in step]
    assert len(places) == len(set(places))


class Plant(NamedTuple):
    """What is added to which files, and what the refusal says."""

    told: str
    added: Mapping[str, str]


PLANTS = {
    "at the top": Plant("upwards", {"circuitlint/errors.py": "import circuitlint.engine"}),
    "as a name of the package": Plant("upwards", {"circuitlint/errors.py": "from circuitlint import engine"}),
    "inside a function": Plant(
        "upwards", {"circuitlint/sources.py": "def planted():\n    from circuitlint.study import cases"}
    ),
    "under a type guard": Plant(
        "upwards",
        {
            "circuitlint/si.py": "from typing import TYPE_CHECKING\n"
            "if TYPE_CHECKING:\n    from circuitlint.review.record import Check"
        },
    ),
    "by its name as text": Plant(
        "upwards",
        {"circuitlint/definition/__init__.py": "import importlib\nX = importlib.import_module('circuitlint.limits')"},
    ),
    "by a name learnt while running": Plant(
        "learn module names",
        {"circuitlint/study/__init__.py": "from importlib import import_module\nX = import_module('circuit' + 'lint')"},
    ),
    "relatively": Plant("upwards", {"circuitlint/physics/formula.py": "from ..limits import reading"}),
    "among physics, from its foundation": Plant(
        "upwards", {"circuitlint/physics/formula.py": "from circuitlint.physics import steps"}
    ),
    "of the package by its own foundations": Plant(
        "upwards",
        {
            "circuitlint/__init__.py": "from circuitlint.engine import review",
            "circuitlint/errors.py": "from circuitlint import __version__",
        },
    ),
    "of the study by a report": Plant("imports only", {"circuitlint/reports/__init__.py": "import circuitlint.study"}),
    "of the engine by a common rule": Plant(
        "a plugin imports only", {"plugins/circuitlint_rules/__init__.py": "from circuitlint.engine import review"}
    ),
    "of the common rules by the core": Plant(
        "not a dependency", {"circuitlint/study/__init__.py": "import circuitlint_rules"}
    ),
    "of pint outside its edge": Plant("only circuitlint.quantity", {"circuitlint/study/__init__.py": "import pint"}),
    "of a package nobody declared": Plant("not a dependency", {"circuitlint/study/__init__.py": "import scipy"}),
    "by a module without a place": Plant("has no place", {"circuitlint/odds_and_ends.py": ""}),
    "in a circle": Plant(
        "in a circle",
        {"circuitlint/sources.py": "import circuitlint.si", "circuitlint/si.py": "import circuitlint.sources"},
    ),
}


@pytest.mark.parametrize("plant", PLANTS)
def test_a_planted_trespass_is_refused(plant: str, tmp_path: Path) -> None:
    for folder in ("circuitlint", "plugins"):
        shutil.copytree(ROOT / folder, tmp_path / folder, ignore=shutil.ignore_patterns("__pycache__"))
    clean = trespasses(tmp_path)
    for file, text in PLANTS[plant].added.items():
        target = tmp_path / file
        before = target.read_text(encoding="utf-8") if target.exists() else ""
        target.write_text(f"{before}\n{text}\n", encoding="utf-8")
    new = [told for told in trespasses(tmp_path) if told not in clean]
    assert [told for told in new if PLANTS[plant].told in told], new
