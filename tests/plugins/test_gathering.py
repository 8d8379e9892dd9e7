"""Where plugins come from, what they may offer, and how the list of them tells it."""

from __future__ import annotations

import importlib.metadata
import json
import sys
from pathlib import Path

import pytest

from circuitlint.cli import main
from circuitlint.errors import InputError
from circuitlint.plugins import Plugin, gather
from tests.plugins.hostile import NOTHING, rule

GOOD = rule(NOTHING)


def written(folder: Path, **files: str) -> Path:
    """A folder with files; two underscores in a name stand for a slash."""
    for name, text in files.items():
        target = folder / (name.replace("__in__", "/") + ".py")
        target.parent.mkdir(parents=True, exist_ok=True)
        target.write_text(text, encoding="utf-8")
    return folder


def last(*paths: Path) -> Plugin:
    return gather(map(str, paths), installed=False).plugins[-1]


def test_a_file_is_a_plugin_named_after_itself(tmp_path: Path) -> None:
    found = last(written(tmp_path, wild=GOOD) / "wild.py")
    assert (found.name, found.origin, found.failed, found.offers) == ("wild", "wild.py", "", ["rule house-check"])
    assert found.version.startswith("sha256 ")


def test_a_folder_with_one_module_or_one_package_is_a_plugin(tmp_path: Path) -> None:
    one = written(tmp_path / "one", wild=GOOD, test_wild="", conftest="")
    package = written(tmp_path / "two", house__in____init__="from .checks import *\nfrom .checks import circuitlint_rules\n",
                      house__in__checks=GOOD, tests__in____init__="", tests__in__test_house="")  # fmt: skip
    itself = package / "house"
    assert [last(path).offers for path in (one, package, itself)] == [["rule house-check"]] * 3
    assert [last(path).name for path in (one, package, itself)] == ["wild", "house", "house"]


def test_a_package_may_state_its_version_and_its_digest_covers_every_file(tmp_path: Path) -> None:
    folder = written(tmp_path, house__in____init__='__version__ = "1.2"\nfrom .checks import circuitlint_rules\n',
                     house__in__checks=GOOD)  # fmt: skip
    before = last(folder).version
    assert before.startswith("1.2, sha256 ")
    written(tmp_path, house__in__checks=GOOD + "\n# another word\n")
    assert last(folder).version != before


def test_a_package_that_imports_itself_by_name_is_told_how_to(tmp_path: Path) -> None:
    folder = written(tmp_path, house__in____init__="from house.checks import circuitlint_rules\n", house__in__checks=GOOD)
    assert "accepted: `from . import ...`" in last(folder).failed


def test_a_plugin_is_loaded_anew_each_time_it_is_gathered(tmp_path: Path) -> None:
    written(tmp_path, house__in____init__="from .checks import circuitlint_rules\n", house__in__checks=GOOD)
    assert last(tmp_path).offers == ["rule house-check"]
    written(tmp_path, house__in__checks=GOOD.replace('"house-check"', '"yard-check"'))
    assert last(tmp_path).offers == ["rule yard-check"]


def test_a_plugin_hides_no_module_of_its_name(tmp_path: Path) -> None:
    before = sys.modules["json"]
    assert last(written(tmp_path, json=GOOD) / "json.py").failed == ""
    assert sys.modules["json"] is before


@pytest.mark.parametrize(
    ("make", "told"),
    [
        (lambda folder: folder / "nowhere", "there is no such plugin file or folder"),
        (lambda folder: folder, "the folder holds no plugin"),
        (lambda folder: written(folder, one=GOOD, two=GOOD), "more than one (one.py, two.py)"),
        (lambda folder: (folder / "notes.txt").write_text("") or folder / "notes.txt", "this is not a plugin"),
        (lambda folder: folder / ("long" * 2000), ""),
    ],
)
def test_a_path_that_leads_to_no_plugin_is_refused_with_what_would_do(make: object, told: str, tmp_path: Path) -> None:
    with pytest.raises(InputError) as caught:
        gather([str(make(tmp_path))])  # type: ignore[operator]
    assert told in str(caught.value)


def test_a_plugin_at_a_path_stands_in_for_the_installed_one_of_its_name(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    written(tmp_path / "installed", house_rules=GOOD)
    monkeypatch.syspath_prepend(str(tmp_path / "installed"))
    entry = importlib.metadata.EntryPoint("house-rules", "house_rules", "circuitlint")
    monkeypatch.setattr(importlib.metadata, "entry_points", lambda group: [entry])
    assert [(one.name, one.origin) for one in gather().plugins] == [("house-rules", "installed")]
    working = written(tmp_path / "working", house_rules=GOOD) / "house_rules.py"
    assert [(one.name, one.origin, one.failed) for one in gather([str(working)]).plugins] == [("house_rules", "house_rules.py", "")]


def test_an_installed_plugin_that_does_not_load_is_named_and_the_common_rules_are_there(
    monkeypatch: pytest.MonkeyPatch,
) -> None:
    entries = [importlib.metadata.EntryPoint("gone", "a_module_that_is_nowhere", "circuitlint"),
               importlib.metadata.EntryPoint("circuitlint_rules", "circuitlint_rules", "circuitlint")]  # fmt: skip
    monkeypatch.setattr(importlib.metadata, "entry_points", lambda group: entries)
    gathered = gather()
    assert [(one.name, bool(one.failed)) for one in gathered.plugins] == [("circuitlint_rules", False), ("gone", True)]
    assert "voltage-drop" in gathered.rules


def test_the_common_rules_cannot_be_replaced_from_a_path(tmp_path: Path) -> None:
    text = GOOD.replace('"house-check"', '"voltage-drop"')
    gathered = gather([str(written(tmp_path, circuitlint_rules=text) / "circuitlint_rules.py")])
    assert "taken by circuitlint_rules" in gathered.plugins[-1].failed
    assert gathered.rules["voltage-drop"][1].origin == "installed"


def test_one_hook_that_fails_loses_only_what_it_offers(tmp_path: Path) -> None:
    text = GOOD + "\n\n@offers\ndef circuitlint_rulesets():\n    raise RuntimeError('no limits')\n"
    found = last(written(tmp_path, wild=text) / "wild.py")
    assert found.offers == ["rule house-check"]
    assert "no limits" in found.failed


def test_the_list_tells_name_version_place_offers_and_failures_and_ends_with_status_3(
    tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    good, bad = written(tmp_path, good=GOOD, bad="1 / 0\n") / "good.py", tmp_path / "bad.py"
    assert main(["plugins", "--plugin", str(good)]) == 0
    printed = capsys.readouterr().out
    for word in ("circuitlint_rules", "voltage-drop", "low-voltage-50hz", "good", str(good)[-20:], "rule              house-check"):
        assert word in printed.replace("\n" + " " * 20, "")
    assert main(["plugins", "--plugin", str(good), "--plugin", str(bad)]) == 3
    assert "failed            ZeroDivisionError: division by zero (bad.py, line 1)" in capsys.readouterr().out
    assert main(["plugins", "--plugin", str(bad), "--as", "json"]) == 3
    listed = json.loads(capsys.readouterr().out)["plugins"]
    assert listed[-1]["name"] == "bad" and listed[-1]["place"] == str(bad) and "ZeroDivision" in listed[-1]["failed"]


PARTS = """
from circuitlint.authoring import offers

@offers
def circuitlint_parts():
    return [("store.yaml", {content!r})]
"""
STORE = b"format: 1\nparts:\n  store-lamp: {resistor: {resistance: 100 ohm}}\n"
USES = "format: 1\nsupplies: {s: {system: dc, voltage: 24 V}}\ncircuits: {tag: A, fed_from: s, cable: [], load: {part: store-lamp}}\n"


def test_parts_from_a_plugin_are_named_in_a_definition(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    (tmp_path / "a.yaml").write_text(USES, encoding="utf-8")
    store = written(tmp_path, store=PARTS.format(content=STORE)) / "store.py"
    assert main(["review", str(tmp_path / "a.yaml"), "--hold-at", "never"]) == 2
    assert "'part'" in capsys.readouterr().err
    assert main(["review", str(tmp_path / "a.yaml"), "--plugin", str(store), "--hold-at", "never"]) == 0


@pytest.mark.parametrize(
    ("content", "told"),
    [
        (b"format: 1\nparts: {x: {resistor: {resistance: 100 kg}}}\n", "100 kg"),
        (b"format: 1\nparts: [", "the file is not YAML"),
        (b"format: 1\nsupplies: {}\n", "accepted: nothing but `format:` and `parts:`"),
        ("a text", "accepted: a file name and its content in bytes"),
        (b"\xff\xfe\x00", "store.yaml"),
    ],
)
def test_parts_that_cannot_be_read_cost_the_plugin_its_parts_and_nobody_else_anything(
    content: object, told: str, tmp_path: Path
) -> None:
    store = written(tmp_path, store=PARTS.format(content=content)) / "store.py"
    gathered = gather([str(store)])
    assert told in gathered.plugins[-1].failed
    assert gathered.parts == []
    assert main(["review", "--demo", "--plugin", str(store), "--hold-at", "never"]) == 3


def test_a_part_name_belongs_to_the_plugin_that_came_first(tmp_path: Path) -> None:
    for name in ("first", "second"):
        written(tmp_path, **{name: PARTS.format(content=STORE)})
    gathered = gather([str(tmp_path / "first.py"), str(tmp_path / "second.py")])
    assert "the part name 'store-lamp' is taken by first" in gathered.plugins[-1].failed
    assert len(gathered.parts) == 1


def test_a_ruleset_that_went_with_its_plugin_is_told_with_the_plugins_failure(
    tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    bad = written(tmp_path, bad="1 / 0\n") / "bad.py"
    assert main(["review", "--demo", "--plugin", str(bad), "--ruleset", "house"]) == 2
    told = capsys.readouterr().err
    assert "the plugin bad failed: ZeroDivisionError" in told and "no ruleset is named 'house'" in told
